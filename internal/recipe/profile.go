package recipe

import (
	"github.com/shopspring/decimal"

	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
)

// unidentified is the entry of a profile for what nobody has named.
const unidentified = "unidentified"

// Bases are the bases of a fatty-acid profile.
var Bases = []string{
	string(PercentFAME), string(PercentAcids), string(PerFat), string(PerFood), string(TriglyceridePerFood),
}

// Bounds for the sum of a profile in per cent or in grams per 100 g: figures rounded one by one may sum to a little more
// or less than 100. Common practice, no source.
var (
	leastWhole = decimal.New(98, 0)
	mostWhole  = decimal.New(102, 0)
)

func (d *decoder) profile(at int32) *Profile {
	p := &Profile{}
	known := d.object(at, func(name string, m int32) bool {
		switch name {
		case "basis":
			p.Basis = Basis(d.oneOf(m, Bases))
		case "share_of_fat":
			p.ShareOfFat = d.fraction(m)
		case "complete":
			p.Complete = d.flag(m)
		case "profile", "settle": // below, because the one needs the basis and the other the acids
		default:
			return false
		}
		return true
	}, "basis", "profile")
	if !known {
		return p
	}
	ids := d.acids(p, d.member(at, "profile"))
	if m := d.member(at, "settle"); m != 0 {
		d.settle(p, m)
	}
	d.doubles(p, ids)
	d.sum(p, at)
	return p
}

// fraction is a share of the fat: above 0, at most 1.
func (d *decoder) fraction(at int32) decimal.Decimal {
	v, ok := scalar(d, at, quantity.ParseNumber)
	if ok && (v.IsZero() || v.GreaterThan(decimal.New(1, 0))) {
		d.fault(at, OutOfRange, "a share of the fat lies above 0 and not above 1; write 0.945 for 94.5 %")
	}
	return v
}

func (b Basis) unit() quantity.Unit {
	if b == PercentFAME || b == PercentAcids {
		return quantity.PerCent
	}
	return quantity.Gram
}

// acids reads the entries and gives their places.
func (d *decoder) acids(p *Profile, at int32) []int32 {
	if at == 0 {
		return nil
	}
	n := d.nodes[at].count
	if d.nodes[at].kind == '{' && (n == 0 || n > MaxAcids) {
		d.shape(at)
	}
	p.Acids = make([]Acid, 0, min(n, MaxAcids))
	places := make([]int32, 0, min(n, MaxAcids))
	d.entries(at, func(name string, m int32) {
		v, _ := d.value(m, parseShare, plain)
		v.Unit = p.Basis.unit()
		if name == unidentified {
			p.Unidentified = v
			return
		}
		if s, known := d.species(m, name); known {
			p.Acids, places = append(p.Acids, Acid{Notation: name, Species: s, Value: v}), append(places, m)
		}
	})
	return places
}

func (d *decoder) species(at int32, notation string) (lipid.Species, bool) {
	s, err := lipid.Parse(notation)
	if err != nil && !d.nodes[at].faulty {
		d.fault(at, UnknownAcid, quote(notation)+" names no fatty acid that can be read; write for instance 18:2 9c,12c, 18:1 t or EPA")
	}
	return s, err == nil
}

// doubles looks for what a profile would count twice. Settled groups count as what they were settled as.
func (d *decoder) doubles(p *Profile, places []int32) {
	if len(p.Acids) > MaxAcids {
		return
	}
	first := make(map[lipid.Species]string, len(p.Acids))
	for i, a := range p.Acids {
		if other, twice := first[a.Species]; twice {
			d.fault(places[i], SameAcid, quote(a.Notation)+" and "+quote(other)+" are the same; give one of them")
			continue
		}
		first[a.Species] = a.Notation
		if a.Species.IsGroup() {
			d.groupBeside(p, i, places[i])
		}
	}
}

func (d *decoder) groupBeside(p *Profile, group int, at int32) {
	const shown = 3
	var members []string
	g := p.Acids[group]
	for _, a := range p.Acids {
		if len(members) < shown && a.Species != g.Species && g.Species.Contains(a.Species) == lipid.Yes {
			members = append(members, quote(a.Notation))
		}
	}
	if len(members) > 0 {
		d.fault(at, GroupAndMember, quote(g.Notation)+" is a group that contains "+list(members, "and")+
			"; leave one side out, or settle which acids the group stands for")
	}
}

// sum refuses a profile of more than everything, and tells whether it is complete where the document does not.
func (d *decoder) sum(p *Profile, at int32) {
	least, central := p.Unidentified.Low, p.Unidentified.middle()
	for _, a := range p.Acids {
		least, central = least.Add(a.Value.Low), central.Add(a.Value.middle())
	}
	values := d.member(at, "profile")
	if least.GreaterThan(mostWhole) {
		d.fault(values, OverWhole, "the values sum to "+least.String()+"; together they cannot be more than 100")
	}
	if d.member(at, "complete") != 0 {
		if p.Complete && len(p.Acids) > 0 && p.Basis.unit() == quantity.PerCent && !p.most().IsPositive() {
			d.fault(values, AllZero, "every value is 0, and a profile that is complete shares out all of the fat")
		}
		return
	}
	whole := central.GreaterThanOrEqual(leastWhole) && central.LessThanOrEqual(mostWhole)
	named := values != 0 && d.path(values, unidentified) != 0
	p.Complete = named || whole && p.Basis.unit() == quantity.PerCent
	if rest := hundredPercent.Sub(central); p.Complete && !named && rest.IsPositive() {
		// What is missing to 100 has no name; only "complete": true says that there is nothing more.
		p.Unidentified = Value{Low: rest, High: rest, Central: rest, Typical: true, Unit: quantity.PerCent}
	}
}

var hundredPercent = decimal.New(100, 0)

// most is the sum of all upper ends.
func (p *Profile) most() decimal.Decimal {
	sum := p.Unidentified.High
	for _, a := range p.Acids {
		sum = sum.Add(a.Value.High)
	}
	return sum
}

// middle is the typical value, else the low end.
func (v Value) middle() decimal.Decimal {
	if v.Typical {
		return v.Central
	}
	return v.Low
}
