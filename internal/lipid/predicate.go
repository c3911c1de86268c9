package lipid

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
)

// Predicate is a structural test as rule data writes it. Every member present must hold. The zero value is refused, so that
// a misspelt rule never means "every acid".
type Predicate struct {
	// DoubleBonds is "1", "2+" or "1-3".
	DoubleBonds string `json:"double bonds,omitempty"`
	// All is the geometry every double bond has: "cis" or "trans". An acid without double bonds never holds.
	All string `json:"all,omitempty"`
	// Any is the geometry at least one double bond has: "trans" or "cis".
	Any string `json:"any,omitempty"`
	// Conjugated beside {"any": "trans"} may only be false: the trans bond that counts must be isolated. Alone it says
	// whether the acid has a conjugated pair.
	Conjugated *bool `json:"conjugated,omitempty"`
	// Spacing "3" means methylene-interrupted throughout: neighbouring double bonds three carbons apart.
	Spacing string `json:"spacing,omitempty"`
	// MethylEnd is "n-3": the double bond nearest the methyl end starts there.
	MethylEnd string `json:"methyl end,omitempty"`
	// Listed names the only acids that hold, in any notation.
	Listed []string `json:"listed,omitempty"`
	// Carbons is "12", "20+" or "4-10".
	Carbons string `json:"carbons,omitempty"`
	// Every is true for a total of all fatty acids, and then stands alone.
	Every bool `json:"every,omitzero"`
}

var errEmptyPredicate = errors.New("predicate says nothing; write {\"every\": true} for the total of all fatty acids")

// Compile checks the predicate and makes it ready. Errors name the member and say what it may be.
func (p Predicate) Compile() (*Class, error) {
	c := &Class{carbons: span{0, 255}, bonds: span{0, 255}, ok: ^featureSet(0)}
	var err error
	switch {
	case p.Every:
		err = p.aloneErr()
	case p.saysNothing():
		err = errEmptyPredicate
	default:
		err = errors.Join(c.counts(p), c.geometry(p), c.place(p), c.list(p.Listed))
	}
	if err != nil {
		return nil, err
	}
	return c, nil
}

func (p Predicate) saysNothing() bool {
	return p.DoubleBonds+p.All+p.Any+p.Spacing+p.MethylEnd+p.Carbons == "" && p.Conjugated == nil && len(p.Listed) == 0
}

func (p Predicate) aloneErr() error {
	if !p.saysNothing() {
		return errors.New("every: stands alone; leave the other members out")
	}
	return nil
}

func (c *Class) counts(p Predicate) (err error) {
	var e1, e2 error
	if p.DoubleBonds != "" {
		c.bonds, e1 = parseSpan("double bonds", p.DoubleBonds)
	}
	if p.Carbons != "" {
		c.carbons, e2 = parseSpan("carbons", p.Carbons)
	}
	return errors.Join(e1, e2)
}

func parseSpan(member, s string) (span, error) {
	first, last, ranged := strings.Cut(s, "-")
	first, open := strings.CutSuffix(first, "+")
	lo, err := strconv.ParseUint(first, 10, 7)
	hi := lo
	switch {
	case ranged && !open && err == nil:
		hi, err = strconv.ParseUint(last, 10, 7)
	case ranged:
		err = strconv.ErrSyntax
	case open:
		hi = 255
	}
	if err != nil || lo > hi {
		return span{}, fmt.Errorf("%s: %q is not a count; write it as \"2\", \"2+\" or \"2-4\"", member, s)
	}
	return span{uint8(lo), uint8(hi)}, nil
}

func (c *Class) geometry(p Predicate) error {
	errAll := c.all(p.All)
	errAny := c.any(p)
	if p.Any == "" && p.Conjugated != nil {
		c.require(hasPair, *p.Conjugated)
	}
	return errors.Join(errAll, errAny)
}

func (c *Class) require(fact int, holds bool) {
	if holds {
		c.ok &= with[fact]
	} else {
		c.ok &^= with[fact]
	}
}

func (c *Class) all(geometry string) error {
	switch geometry {
	case "":
	case "cis":
		c.require(hasCis, true)
		c.require(hasTrans, false)
		c.cisOnly = true
	case "trans":
		c.require(hasTrans, true)
		c.require(hasCis, false)
		c.cisOnly = true
	default:
		return fmt.Errorf("all: %q is not a geometry; write \"cis\" or \"trans\"", geometry)
	}
	return nil
}

func (c *Class) any(p Predicate) error {
	switch {
	case p.Any == "":
	case p.Any == "trans" && p.Conjugated == nil:
		c.require(hasTrans, true)
	case p.Any == "trans" && !*p.Conjugated:
		c.require(hasIsolated, true)
	case p.Any == "cis" && p.Conjugated == nil:
		c.require(hasCis, true)
	case p.Any == "trans" || p.Any == "cis":
		return errors.New("conjugated: beside \"any\" only {\"any\": \"trans\", \"conjugated\": false} has a meaning")
	default:
		return fmt.Errorf("any: %q is not a geometry; write \"cis\" or \"trans\"", p.Any)
	}
	return nil
}

func (c *Class) place(p Predicate) error {
	if p.Spacing != "" && p.Spacing != "3" {
		return fmt.Errorf("spacing: %q; only \"3\" (methylene-interrupted) is known", p.Spacing)
	}
	if p.Spacing == "3" {
		c.require(hasUneven, false)
	}
	if p.MethylEnd == "" {
		return nil
	}
	digits, found := strings.CutPrefix(p.MethylEnd, "n-")
	x, err := strconv.ParseUint(digits, 10, 6)
	if !found || err != nil || x < 1 || x > maxCarbons-2 {
		return fmt.Errorf("methyl end: %q; write it as \"n-3\"", p.MethylEnd)
	}
	c.ends = 1 << x
	return nil
}

func (c *Class) list(notations []string) error {
	var errs []error
	for _, n := range notations {
		s, err := Parse(n)
		if err != nil {
			errs = append(errs, fmt.Errorf("listed: %w", err))
		}
		c.listed = append(c.listed, s)
	}
	return errors.Join(errs...)
}
