package recipe

import (
	"fmt"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// ingredientList reads the ingredients of a recipe on the given level, 1 for the product itself.
func (d *decoder) ingredientList(at int32, level int) []Ingredient {
	out := make([]Ingredient, 0, min(d.nodes[at].count, MaxIngredients))
	ids := make(map[string]int32, min(d.nodes[at].count, MaxIngredients))
	d.elements(at, func(m int32) {
		if d.ingredients++; d.ingredients > MaxIngredients {
			d.tooMany(m)
			return
		}
		in := d.ingredient(m, level)
		d.uniqueID(m, in.ID, ids)
		out = append(out, in)
	})
	return out
}

// tooMany complains once; what lies beyond the limit is not read.
func (d *decoder) tooMany(at int32) {
	if d.ingredients == MaxIngredients+1 {
		d.fault(at, TooManyParts, fmt.Sprintf("this is ingredient %d of the document; at most %d are read", d.ingredients, MaxIngredients))
	}
}

func (d *decoder) uniqueID(at int32, id string, seen map[string]int32) {
	first, twice := seen[id]
	switch m := d.path(at, "id"); {
	case m == 0 || d.nodes[m].kind != '"' || id == "":
	case twice:
		d.fault(m, DuplicateID, quote(id)+" is the id of "+d.pointer(first)+" too; ids within a list differ")
	default:
		seen[id] = at
	}
}

func (d *decoder) ingredient(at int32, level int) Ingredient {
	in := Ingredient{Pointer: d.pointer(at)}
	known := d.object(at, func(name string, m int32) bool {
		switch name {
		case "id":
			in.ID = d.id(m)
		case "name":
			in.Name = d.text(m)
		case "amount":
			in.Amount, _ = d.amount(m, quantity.Mass, quantity.Volume)
		case "density":
			in.Density = d.density(m)
		default:
			return d.source(&in.Source, name, m, level) || d.treatment(&in, name, m)
		}
		return true
	}, "id", "amount")
	if !known {
		return in
	}
	d.oneSource(at)
	dense := d.member(at, "density") != 0
	d.needsDensity(d.member(at, "amount"), in.Amount, dense)
	d.sourceVolumes(at, in.Source, dense)
	return in
}

// treatment reads what is known of an ingredient besides its composition.
func (d *decoder) treatment(in *Ingredient, name string, m int32) bool {
	switch name {
	case "with":
		in.With = d.components(m)
	case "zero_by_nature":
		in.ZeroByNature = d.natures(m)
	case "process":
		in.Process = d.oneOf(m, Processes)
	case "iodine_value":
		if v, ok := scalar(d, m, quantity.ParseNumber); ok {
			in.IodineValue = &v
		}
	case "trans_origin":
		in.TransOrigin = d.transOrigin(m)
	case "retention":
		in.Retention = d.retention(m)
	default:
		return false
	}
	return true
}

func (d *decoder) natures(at int32) []Nature {
	out := make([]Nature, 0, d.nodes[at].count)
	d.elements(at, func(m int32) {
		var n Nature
		d.object(m, func(name string, v int32) bool {
			switch name {
			case "component":
				if n.Component = d.text(v); n.Component != "" && d.nodes[v].kind == '"' {
					d.component(v, n.Component)
				}
			case "reason":
				n.Reason = d.text(v)
			default:
				return false
			}
			return true
		}, "component", "reason")
		out = append(out, n)
	})
	return out
}

func (d *decoder) transOrigin(at int32) []TransShare {
	if d.nodes[at].kind != '[' {
		origin, _ := scalar(d, at, parseOrigin)
		return []TransShare{{origin, decimal.New(100, 0)}}
	}
	before := len(d.misshapen)
	sum := decimal.Zero
	out := make([]TransShare, 0, d.nodes[at].count)
	d.elements(at, func(m int32) {
		s := d.transShare(m)
		sum = sum.Add(s.Share)
		out = append(out, s)
	})
	if before == len(d.misshapen) && !sum.Equal(decimal.New(100, 0)) {
		d.fault(at, SharesNot100, "the shares sum to "+sum.String()+" %; 100 % is wanted")
	}
	return out
}

func (d *decoder) transShare(at int32) (s TransShare) {
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "origin":
			s.Origin, _ = scalar(d, m, parseOrigin)
		case "share":
			s.Share, _ = scalar(d, m, parsePercentage)
		default:
			return false
		}
		return true
	}, "origin", "share")
	return s
}

func (d *decoder) retention(at int32) *Retention {
	if d.nodes[at].kind != '{' {
		code, ok := scalar(d, at, parseRetention)
		if ok && !retentionRow(code) {
			d.fault(at, UnknownCode, "the USDA table of retention factors, release 6, has no code "+code)
		}
		return &Retention{Code: code}
	}
	out := &Retention{Factors: make(map[string]decimal.Decimal, d.nodes[at].count)}
	d.entries(at, func(tag string, m int32) {
		d.component(m, tag)
		v, ok := scalar(d, m, quantity.ParseNumber)
		if ok && v.GreaterThan(decimal.New(1, 0)) {
			d.fault(m, OutOfRange, "a share kept lies between 0 and 1; write 0.85 for 85 %")
		}
		out.Factors[tag] = v
	})
	return out
}
