package lipid

// Class is a compiled Predicate, safe for concurrent use.
type Class struct {
	carbons, bonds span
	ok             featureSet // combinations that hold
	cisOnly        bool       // a ring's double bond, which has no geometry, spoils it
	ends           uint64     // methyl end asked for, 0 for any
	listed         []Species  // nil for any
}

// Holds tells whether the class holds for s: Yes when every acid s can mean is in the class, No when none is, else Open.
// For a listed class a group too large to list may be Open where a longer search could decide; an answer of Yes or No is
// always right.
func (c *Class) Holds(s Species) Truth {
	switch {
	case s == Species{}:
		return Open
	case !s.IsGroup():
		return c.holdsAcid(s.acid)
	case c.listed == nil:
		return c.holdsGroup(s.set)
	}
	if acids, few := s.set.members(); few {
		return over(acids, c.holdsAcid)
	}
	return both(c.holdsGroup(s.set), c.listedGroup(s))
}

func (c *Class) holdsAcid(a FattyAcid) Truth {
	in := c.carbons.has(a.Carbons()) && c.bonds.has(a.DoubleBonds()) && a.features()&c.ok != 0 &&
		!(c.cisOnly && a.ringDouble) && (c.ends == 0 || c.ends>>a.MethylEnd()&1 == 1)
	if in && c.listed != nil {
		in = c.listedAcid(a)
	}
	return decide(in, !in)
}

func (c *Class) listedAcid(a FattyAcid) bool {
	for _, l := range c.listed {
		if l.containsAcid(a) == Yes {
			return true
		}
	}
	return false
}

func (c *Class) listedGroup(s Species) Truth {
	answer := No
	for _, l := range c.listed {
		switch l.Contains(s) {
		case Yes:
			return Yes
		case Open:
			answer = Open
		}
	}
	return answer
}

// holdsGroup looks for a member that is in the class and one that is not.
func (c *Class) holdsGroup(g group) Truth {
	some, someNot := false, c.shorter(g) || c.longer(g)
	g.carbons = g.carbons.meet(c.carbons)
	if g.carbons.void() {
		return decide(some, someNot)
	}
	ends := c.ends
	if ends == 0 {
		ends = ^uint64(0)
	}
	for d, s := range g.reach(ends) {
		in := s != 0 && c.bonds.has(d) && (c.ends == 0 || d > 0)
		some = some || in && s&c.ok != 0
		someNot = someNot || s != 0 && !in || s&^c.ok != 0
	}
	if c.ends != 0 && !someNot {
		someNot = g.somewhere(^c.ends)
	}
	return decide(some, someNot)
}

// shorter and longer report members with fewer or more carbons than the class allows.
func (c *Class) shorter(g group) bool {
	if g.carbons.lo >= c.carbons.lo {
		return false
	}
	g.carbons.hi = min(g.carbons.hi, c.carbons.lo-1)
	return !g.empty()
}

func (c *Class) longer(g group) bool {
	if g.carbons.hi <= c.carbons.hi {
		return false
	}
	g.carbons.lo = max(g.carbons.lo, c.carbons.hi+1)
	return !g.empty()
}
