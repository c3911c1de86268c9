// Package lipid knows fatty acids: how they are written, what they are made of, which structural class of a law holds for
// them, what they weigh, and how much iodine they take up.
//
// Most callers need two calls: [Parse] turns any notation of the trade ("C18:1n9c", "FA 18:2(9Z,12Z)", "F18D2CLA", "EPA")
// into a [Species], and [Predicate.Compile] turns a structural test written in rule data into a [Class] whose Holds answers
// yes, no or open for it.
//
// A notation often leaves something open: "18:1" says neither where the double bond is nor whether it is cis or trans. Such
// a species is a group. A class holds for a group only when it holds for every acid the notation can mean, and fails only
// when it fails for every one; otherwise the answer is [Open].
//
// Everything here is pure, exact (integers only) and safe for concurrent use.
package lipid

import "gramlaw/internal/quantity"

// Truth is the answer to a question about a species that may be a group.
type Truth = quantity.Truth

// The three answers. Open is the zero value: nothing is claimed until something is known.
const (
	Open = quantity.Open
	No   = quantity.No
	Yes  = quantity.Yes
)

// decide turns "some member does" and "some member does not" into one answer.
func decide(some, someNot bool) Truth {
	switch {
	case some && !someNot:
		return Yes
	case someNot && !some:
		return No
	}
	return Open
}

// both is the three-valued and.
func both(a, b Truth) Truth {
	if a == No || b == No {
		return No
	}
	if a == Yes && b == Yes {
		return Yes
	}
	return Open
}

// Geometry is the arrangement at one double bond.
type Geometry uint8

// Geometries of a double bond.
const (
	UnknownGeometry Geometry = iota
	Cis
	Trans
)

func (g Geometry) String() string {
	switch g {
	case Cis:
		return "cis"
	case Trans:
		return "trans"
	}
	return "unknown"
}

// Bond is one carbon-carbon double bond. Position is the number of its first carbon counted from the carboxyl carbon, 1.
type Bond struct {
	Position int
	Geometry Geometry
}

// Bounds of what is read as a fatty acid. Nothing of interest to food lies outside.
const (
	minCarbons = 2
	maxCarbons = 40
	maxBonds   = 12
)
