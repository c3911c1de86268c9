package recipe

import (
	"gramlaw/internal/quantity"
)

// value reads a stated value: a text, or a range. whole reads the text, part the numbers of a range.
func (d *decoder) value(at int32, whole func(string) (Value, error), part func(string) (quantity.Amount, error)) (Value, bool) {
	if d.nodes[at].kind == '{' {
		return d.interval(at, part)
	}
	return scalar(d, at, whole)
}

// interval reads {"low", "value", "high"}; value may be left out.
func (d *decoder) interval(at int32, part func(string) (quantity.Amount, error)) (Value, bool) {
	var low, centre, high quantity.Amount
	var okLow, okCentre, okHigh bool
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "low":
			low, okLow = scalar(d, m, part)
		case "value":
			centre, okCentre = scalar(d, m, part)
		case "high":
			high, okHigh = scalar(d, m, part)
		default:
			return false
		}
		return true
	}, "low", "high")
	if !okLow || !okHigh || !okCentre && d.path(at, "value") != 0 {
		return Value{}, false
	}
	v := Value{Low: low.Value, Unit: low.Unit, Typical: okCentre}
	var same, sameCentre bool
	v.High, same = high.In(low.Unit)
	if v.Central, sameCentre = centre.In(low.Unit); okCentre && !sameCentre || !same {
		d.fault(at, WrongUnit, "the numbers of a range must have units of one kind")
		return Value{}, false
	}
	return v, d.ordered(at, v)
}

func (d *decoder) ordered(at int32, v Value) bool {
	switch {
	case v.Low.GreaterThan(v.High):
		d.fault(at, RangeReversed, "low lies above high")
	case v.Typical && (v.Central.LessThan(v.Low) || v.Central.GreaterThan(v.High)):
		d.fault(at, CentreOutside, "value lies outside low and high")
	default:
		return true
	}
	return false
}

// components reads values by tagname.
func (d *decoder) components(at int32) map[string]Value {
	out := make(map[string]Value, d.nodes[at].count)
	d.entries(at, func(tag string, m int32) {
		unit, known := d.component(m, tag)
		v, ok := d.value(m, parseValue, quantity.ParseAmount)
		if ok && known {
			d.sameKind(m, tag, v.Unit, unit)
			out[tag] = v
		}
	})
	return out
}

func (d *decoder) sameKind(at int32, tag string, got quantity.Unit, unit string) {
	want, ok := quantity.ParseUnit(unit)
	switch {
	case !ok:
		d.fault(at, WrongUnit, tag+" is measured in "+unit+", which a recipe cannot state")
	case got.Dimension() != want.Dimension():
		d.fault(at, WrongUnit, tag+" is stated in "+dimension(want.Dimension())+", not in "+dimension(got.Dimension()))
	}
}
