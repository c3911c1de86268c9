package recipe

import (
	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// yield reads the yield of a recipe on the given level.
func (d *decoder) yield(at int32, level int) *Yield {
	y := &Yield{}
	known := d.object(at, func(name string, m int32) bool {
		switch name {
		case "mass":
			a := d.aboveZero(m, quantity.Mass)
			y.Mass = &a
		case "water":
			y.Water = d.change(m)
		case "fat":
			y.Fat = d.fatChange(m, level)
		case "explanation":
			y.Explanation = d.text(m)
		default:
			return false
		}
		return true
	})
	changes := y.Water != nil || y.Fat != nil
	switch {
	case known && y.Mass == nil && !changes:
		d.fault(at, YieldEmpty, "nothing is stated; give mass, or the change of water or of fat")
	case y.Mass != nil && changes:
		d.fault(at, YieldTwice, "mass and changes are given; give the final mass, or what water and fat changed by")
	}
	return y
}

func (d *decoder) change(at int32) *Change {
	c := &Change{}
	if d.object(at, func(name string, m int32) bool { return d.gainOrLoss(c, name, m) }) {
		d.oneDirection(at)
	}
	return c
}

func (d *decoder) fatChange(at int32, level int) *Change {
	c := &Change{}
	known := d.object(at, func(name string, m int32) bool {
		if name == "oil" {
			c.Oil = d.oil(m, level)
			return true
		}
		return d.gainOrLoss(c, name, m)
	})
	if !known {
		return c
	}
	d.oneDirection(at)
	oil, gain := d.member(at, "oil") != 0, d.member(at, "gain") != 0
	switch {
	case gain && !oil:
		d.fault(at, GainNeedsOil, "fat is gained; name the oil it comes from in oil")
	case oil && !gain:
		d.fault(d.member(at, "oil"), OilWithoutGain, "an oil is named and no gain of fat; leave it out")
	}
	return c
}

func (d *decoder) gainOrLoss(c *Change, name string, m int32) bool {
	if name != "gain" && name != "loss" {
		return false
	}
	var ok bool
	c.Gain = name == "gain"
	c.Amount, ok = d.amount(m, quantity.Mass, quantity.Percent)
	percent := c.Amount.Unit.Dimension() == quantity.Percent
	if ok && !c.Gain && percent && c.Amount.Value.GreaterThan(decimal.New(100, 0)) {
		d.fault(m, OutOfRange, "more than 100 % cannot be lost")
	}
	return true
}

func (d *decoder) oneDirection(at int32) {
	if (d.member(at, "gain") != 0) == (d.member(at, "loss") != 0) {
		d.fault(at, GainOrLoss, "give exactly one of gain and loss")
	}
}

func (d *decoder) oil(at int32, level int) *Source {
	s := &Source{}
	if d.object(at, func(name string, m int32) bool { return d.source(s, name, m, level) }) {
		d.oneSource(at)
		d.sourceVolumes(at, *s, false)
	}
	return s
}
