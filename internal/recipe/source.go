package recipe

import (
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// sourceMembers are the four ways to know a composition.
var sourceMembers = []string{"composition", "food", "label", "recipe"}

// source reads one of the four members; level is that of the recipe around it.
func (d *decoder) source(s *Source, name string, m int32, level int) bool {
	switch name {
	case "composition":
		s.Composition = d.composition(m)
	case "food":
		s.Food = d.food(m)
	case "label":
		s.Label = d.label(m)
	case "recipe":
		s.Recipe = d.part(m, level+1)
	default:
		return false
	}
	return true
}

func (d *decoder) oneSource(at int32) {
	var given []string
	for _, name := range sourceMembers {
		if d.member(at, name) != 0 {
			given = append(given, quote(name))
		}
	}
	switch len(given) {
	case 0:
		d.fault(at, OneSource, "nothing tells the composition; give exactly one of composition, food, label and recipe")
	case 1:
	default:
		d.fault(at, OneSource, list(given, "and")+" are given; give exactly one of composition, food, label and recipe")
	}
}

// part reads a recipe inside a recipe.
func (d *decoder) part(at int32, level int) *Part {
	p := &Part{}
	if level == MaxLevels+1 {
		d.fault(at, TooManyLevels, "this recipe is nested deeper than 8; mix the innermost ones in a recipe of their own")
	}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "ingredients":
			p.Ingredients = d.ingredientList(m, level)
		case "yield":
			p.Yield = d.yield(m, level)
		default:
			return false
		}
		return true
	}, "ingredients")
	return p
}

func (d *decoder) food(at int32) string {
	name, ok := scalar(d, at, parseFood)
	if ok && !strings.HasPrefix(name, ownPrefix) && !foodExists(name) {
		d.fault(at, UnknownFood, "no open table in use has the food "+quote(name))
	}
	return name
}

func (d *decoder) label(at int32) *Label {
	l := &Label{}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "jurisdiction":
			l.Jurisdiction, _ = scalar(d, m, parseMarket)
		case "on":
			l.On, _ = scalar(d, m, parseDate)
		case "serving":
			l.Serving = d.massOrVolume(m)
		case "declared":
			l.Declared = d.components(m)
			if d.nodes[m].kind == '{' && d.nodes[m].count == 0 {
				d.shape(m)
			}
		default:
			return false
		}
		return true
	}, "jurisdiction", "serving", "declared")
	return l
}

func (d *decoder) composition(at int32) *Composition {
	c := &Composition{Per: quantity.Amount{Value: decimal.New(100, 0), Unit: quantity.Gram}}
	known := d.object(at, func(name string, m int32) bool {
		switch name {
		case "per":
			c.Per = d.massOrVolume(m)
		case "source":
			c.Source = d.text(m)
		case "components":
			c.Components = d.components(m)
		case "fatty_acids":
			c.Acids = d.profile(m)
		default:
			return false
		}
		return true
	})
	if known && d.nothing(at, "components") && d.nothing(at, "fatty_acids") {
		d.fault(at, NoComposition, "nothing is stated; give components, fatty_acids or both")
	}
	return c
}

// nothing reports that a member is not there or is an empty object.
func (d *decoder) nothing(at int32, name string) bool {
	m := d.member(at, name)
	return m == 0 || d.nodes[m].kind == '{' && d.nodes[m].count == 0
}
