package food

import (
	"fmt"
	"math/bits"

	"gramlaw/internal/food/layout"
)

// Food is one food of SR28. It is a small value that points into the embedded
// table; the zero Food has no name and no values.
type Food struct {
	ndb         int
	name, short string
	head        string // from the group on, up to the presence
	presence    string
	values      string
	tail        string // weights and footnotes
}

// Group is a USDA food group.
type Group struct{ Code, Name string }

func open(ndb int, record string) Food {
	r := reader{s: record}
	f := Food{ndb: ndb, name: r.text(), short: r.text()}
	start := r.i
	r.i++
	for range 6 {
		r.number()
	}
	f.head = record[start:r.i]
	f.presence = r.bytes(layout.PresenceWidth)
	f.values = r.text()
	f.tail = record[r.i:]
	return f
}

// NDB is the number of the food in the release.
func (f Food) NDB() int { return f.ndb }

// Ref is the reference Find accepts, such as "sr:01001".
func (f Food) Ref() string { return fmt.Sprintf("%s%05d", prefix, f.ndb) }

// Name is the published description.
func (f Food) Name() string { return f.name }

// ShortName is the published short description, in capitals.
func (f Food) ShortName() string { return f.short }

// Group is the food group.
func (f Food) Group() Group {
	if f.head == "" {
		return Group{}
	}
	g := section(layout.Groups)[int(f.head[0])*layout.GroupWidth:]
	return Group{Code: g[:4], Name: text(layout.Uint16(g, 4))}
}

// Groups lists the food groups of the table.
func Groups() []Group {
	all := section(layout.Groups)
	groups := make([]Group, 0, len(all)/layout.GroupWidth)
	for at := 0; at < len(all); at += layout.GroupWidth {
		groups = append(groups, Group{Code: all[at : at+4], Name: text(layout.Uint16(all, at+4))})
	}
	return groups
}

// The numbers of a record's head, in order.
const (
	headRefuse = iota
	headNitrogen
	headProtein
	headFat
	headCarbohydrate
	headScientific
)

func (f Food) headNumber(which int) int {
	if f.head == "" {
		return 0
	}
	r := reader{s: f.head, i: 1}
	for range which {
		r.number()
	}
	return r.number()
}

func (f Food) factor(which int, decimals int8) (Number, bool) {
	n := f.headNumber(which)
	if n == 0 {
		return Number{}, false
	}
	return Number{Mantissa: int64(n - 1), Exponent: -decimals}, true
}

// Refuse is the per cent of the food as bought that is not eaten.
func (f Food) Refuse() (Number, bool) { return f.factor(headRefuse, 0) }

// NitrogenFactor turned nitrogen into the protein of this food.
func (f Food) NitrogenFactor() (Number, bool) {
	return f.factor(headNitrogen, layout.FactorDecimals)
}

// ProteinEnergy is the Atwater specific factor, kcal per g of protein.
func (f Food) ProteinEnergy() (Number, bool) { return f.factor(headProtein, layout.FactorDecimals) }

// FatEnergy is the Atwater specific factor, kcal per g of fat.
func (f Food) FatEnergy() (Number, bool) { return f.factor(headFat, layout.FactorDecimals) }

// CarbohydrateEnergy is the Atwater specific factor, kcal per g of carbohydrate
// by difference.
func (f Food) CarbohydrateEnergy() (Number, bool) {
	return f.factor(headCarbohydrate, layout.FactorDecimals)
}

// ScientificName is the Latin name of the plant or animal, often empty.
func (f Food) ScientificName() string {
	n := f.headNumber(headScientific)
	if n == 0 {
		return ""
	}
	return text(n - 1)
}

// Values is how many components have a published value.
func (f Food) Values() int {
	n := 0
	for i := range len(f.presence) {
		n += bits.OnesCount8(f.presence[i])
	}
	return n
}

// Has tells whether a value was published.
func (f Food) Has(id ID) bool {
	i := int(id) - 1
	return i >= 0 && i/8 < len(f.presence) && f.presence[i/8]&(1<<(i%8)) != 0
}
