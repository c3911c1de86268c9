package quantity

import "github.com/shopspring/decimal"

// A Dimension is what a unit measures.
type Dimension uint8

// Dimensions of the units a label uses.
const (
	NoDimension Dimension = iota
	Mass
	Volume
	EnergyKcal // kilocalories and kilojoules are two dimensions: a law gives each its own factors
	EnergyKJ
	Percent
	Area
)

// A Unit is one of the units that documents and rules may state.
type Unit uint8

// Units. Household measures are the volumes of a label, not of a kitchen: 21 CFR 101.9(b)(5)(viii).
const (
	NoUnit Unit = iota
	Gram
	Milligram
	Microgram
	Kilogram
	Millilitre
	Litre
	Teaspoon
	Tablespoon
	Cup
	Kilocalorie
	Kilojoule
	PerCent
	SquareCentimetre
)

type unitFacts struct {
	name  string
	dim   Dimension
	scale decimal.Decimal // how many base units (g, mL, kcal, kJ, %); a power of ten but for household measures

	household bool
}

func tenTo(e int32) decimal.Decimal { return decimal.New(1, e) }

var units = [...]unitFacts{
	NoUnit:      {"", NoDimension, tenTo(0), false},
	Gram:        {"g", Mass, tenTo(0), false},
	Milligram:   {"mg", Mass, tenTo(-3), false},
	Microgram:   {"µg", Mass, tenTo(-6), false},
	Kilogram:    {"kg", Mass, tenTo(3), false},
	Millilitre:  {"mL", Volume, tenTo(0), false},
	Litre:       {"L", Volume, tenTo(3), false},
	Teaspoon:    {"tsp", Volume, decimal.New(5, 0), true},
	Tablespoon:  {"tbsp", Volume, decimal.New(15, 0), true},
	Cup:         {"cup", Volume, decimal.New(240, 0), true},
	Kilocalorie: {"kcal", EnergyKcal, tenTo(0), false},
	Kilojoule:   {"kJ", EnergyKJ, tenTo(0), false},
	PerCent:     {"%", Percent, tenTo(0), false},

	SquareCentimetre: {"cm2", Area, tenTo(0), false},
}

// ParseUnit knows g, mg, µg (also ug, mcg), kg, mL (also ml), L (also l), tsp, tbsp, cup, kcal, kJ, % and cm2 (also cm²).
func ParseUnit(s string) (Unit, bool) {
	switch s {
	case "ug", "mcg", "μg": // the last is the Greek letter mu
		return Microgram, true
	case "ml":
		return Millilitre, true
	case "l":
		return Litre, true
	case "cm²":
		return SquareCentimetre, true
	}
	for u := Gram; int(u) < len(units); u++ {
		if units[u].name == s {
			return u, true
		}
	}
	return NoUnit, false
}

func (u Unit) String() string { return units[u].name }

// Dimension tells what the unit measures.
func (u Unit) Dimension() Dimension { return units[u].dim }

// Scale is how many base units (g, mL, kcal, kJ, %) one of the unit is; exact.
func (u Unit) Scale() decimal.Decimal { return units[u].scale }

// Base is the unit in which values of the same dimension are computed.
func (u Unit) Base() Unit {
	switch units[u].dim {
	case Mass:
		return Gram
	case Volume:
		return Millilitre
	default:
		return u
	}
}
