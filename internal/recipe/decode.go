package recipe

import (
	"crypto/sha256"
	"encoding/hex"

	"github.com/go-json-experiment/json/jsontext"
)

// Limits of a recipe, over all its parts, oils and reference foods.
const (
	MaxIngredients = 2000
	MaxLevels      = 8
	MaxAcids       = 200 // entries of one profile
	MaxIDText      = 100 // characters of an id
)

// Decode reads a recipe document. It gives the recipe, or every fault of the document and no recipe. Where the document
// is not JSON, or is too large or too deep, the last fault is the one that stopped the reading.
func Decode(doc []byte) (*Recipe, Faults) {
	s, fatal := scan(doc)
	if fatal != nil {
		return nil, append(s.report(s.found), *fatal)
	}
	d := decoder{tree: &s.tree, found: s.found}
	r := d.recipe(root)
	if len(d.misshapen) > 0 {
		d.found = append(d.found, d.explain()...)
		if len(d.found) == 0 { // the decoder decides, even where the schema sees nothing
			d.fault(d.misshapen[0], WrongValue, "the value does not fit the schema of recipes")
		}
	}
	if len(d.found) > 0 {
		return nil, d.report(d.found)
	}
	digest := sha256.Sum256(doc)
	r.Digest = "sha256:" + hex.EncodeToString(digest[:])
	return r, nil
}

// decoder reads the tree. What has the wrong shape is only marked: the schema explains it. What a schema cannot say is
// told here.
type decoder struct {
	*tree
	found       []found
	misshapen   []int32
	ingredients int
}

func (d *decoder) fault(at int32, code, says string) {
	d.found = append(d.found, found{at: at, code: code, says: says})
}

// unknown is a fault about a name; the sentence ends with the known name that is nearest.
func (d *decoder) unknown(at int32, code, says, name string, known func() []string) {
	d.found = append(d.found, found{at, code, says, func() string { return suggest(name, known()) }})
}

func (d *decoder) shape(at int32) { d.misshapen = append(d.misshapen, at) }

// is asks for a JSON type. Where the bounded pass has complained already it is silent.
func (d *decoder) is(at int32, kind jsontext.Kind) bool {
	n := &d.nodes[at]
	if n.faulty {
		return false
	}
	if n.kind != kind {
		d.shape(at)
	}
	return n.kind == kind
}

// object hands out the members of an object; take tells whether it knows the name.
func (d *decoder) object(at int32, take func(name string, m int32) bool, required ...string) bool {
	if !d.is(at, '{') {
		return false
	}
	for m := d.nodes[at].first; m != 0; m = d.nodes[m].next {
		if !take(d.nodes[m].name, m) {
			d.shape(m)
		}
	}
	for _, name := range required {
		if d.member(at, name) == 0 {
			d.shape(at)
		}
	}
	return true
}

// entries hands out the members of an object whose names are data.
func (d *decoder) entries(at int32, take func(name string, m int32)) {
	d.object(at, func(name string, m int32) bool {
		take(name, m)
		return true
	})
}

// elements hands out the elements of an array that must not be empty.
func (d *decoder) elements(at int32, take func(m int32)) {
	if !d.is(at, '[') {
		return
	}
	if d.nodes[at].count == 0 {
		d.shape(at)
	}
	for m := d.nodes[at].first; m != 0; m = d.nodes[m].next {
		take(m)
	}
}

func (d *decoder) recipe(at int32) *Recipe {
	r := &Recipe{}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "id":
			r.ID = d.id(m)
		case "name":
			r.Name = d.text(m)
		case "ingredients":
			r.Ingredients = d.ingredientList(m, 1)
		case "yield":
			r.Yield = d.yield(m, 1)
		case "facts":
			r.Facts = d.facts(m)
		case "jurisdictions":
			r.Jurisdictions = d.markets(m)
		case "claims":
			r.Claims = d.claims(m)
		case "reference_foods":
			r.References = d.references(m)
		default:
			return d.sale(r, name, m)
		}
		return true
	}, "id", "ingredients")
	d.checkVolumes(r, at)
	d.checkAgainst(at)
	return r
}

// sale reads the members that tell how the food is sold.
func (d *decoder) sale(r *Recipe, name string, m int32) bool {
	switch name {
	case "package":
		r.Package = d.pack(m)
	case "serving":
		r.Serving = perMarket(d, m, d.serving)
	case "category":
		r.Category = perMarket(d, m, d.text)
	case "reference_amount":
		r.ReferenceAmount = perMarket(d, m, d.referenceAmount)
	case "state":
		r.State = perMarket(d, m, d.state)
	case "density":
		r.Density = perMarket(d, m, d.density)
	case "declares":
		r.Declares = perMarket(d, m, d.quantities)
	default:
		return false
	}
	return true
}
