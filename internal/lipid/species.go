package lipid

import "math/bits"

// Species is what a notation means: one fatty acid, or the group of acids it leaves open. Values are comparable with ==.
// The zero value is no species; Parse never returns it without an error.
type Species struct {
	acid FattyAcid // zero for a group
	set  group     // zero for an acid
}

// IsGroup reports whether the notation leaves several acids open.
func (s Species) IsGroup() bool { return s.acid == FattyAcid{} }

// Acid returns the acid, and false for a group.
func (s Species) Acid() (FattyAcid, bool) { return s.acid, !s.IsGroup() }

// String is canonical: LIPID MAPS shorthand for an acid ("FA 18:1(9Z)") and for what it can say of a group ("FA 18:2",
// "FA 18:2(9,12)"); else plain words ("18:1 trans", "18:2 conjugated", "omega-3"). Parse reads it back to an equal Species.
func (s Species) String() string {
	switch {
	case s == Species{}:
		return ""
	case s.IsGroup():
		return s.set.String()
	}
	return s.acid.String()
}

// Carbons counts carbons, branches included; -1 when the notation leaves it open.
func (s Species) Carbons() int {
	if !s.IsGroup() {
		return s.acid.Carbons()
	}
	if !s.set.carbons.one() {
		return -1
	}
	return int(s.set.carbons.lo)
}

// DoubleBonds counts double bonds; -1 when the notation leaves it open.
func (s Species) DoubleBonds() int {
	if !s.IsGroup() {
		return s.acid.DoubleBonds()
	}
	if !s.set.bonds.one() {
		return -1
	}
	return int(s.set.bonds.lo)
}

// Members lists the acids when the notation means only a few; ok is false when they are too many to list.
func (s Species) Members() (acids []FattyAcid, ok bool) {
	if !s.IsGroup() {
		return []FattyAcid{s.acid}, true
	}
	return s.set.members()
}

// Contains tells whether every acid that other can mean is one that s can mean: Yes for every one, No for none, Open when
// some are or when it cannot be told. A profile that gives both s and other counts something twice when s.Contains(other)
// or other.Contains(s) is Yes, and perhaps when it is Open.
func (s Species) Contains(other Species) Truth {
	if a, one := other.Acid(); one {
		return s.containsAcid(a)
	}
	if acids, few := other.set.members(); few {
		return over(acids, s.containsAcid)
	}
	if !s.IsGroup() {
		if other.set.admits(s.acid) {
			return Open
		}
		return No
	}
	return s.set.contains(other.set)
}

// Overlaps tells whether some acid can be meant by both: the test for double counting.
func (s Species) Overlaps(other Species) bool {
	return s.Contains(other) != No || other.Contains(s) != No
}

func (s Species) containsAcid(a FattyAcid) Truth {
	in := s.acid == a
	if s.IsGroup() {
		in = s.set.admits(a)
	}
	return decide(in, !in)
}

// over asks the same question of every member.
func over(acids []FattyAcid, ask func(FattyAcid) Truth) Truth {
	some, someNot := false, false
	for _, a := range acids {
		t := ask(a)
		some = some || t != No
		someNot = someNot || t != Yes
	}
	return decide(some, someNot)
}

func (g group) contains(other group) Truth {
	both := g.meet(other)
	if both.carbons.void() || both.bonds.void() || both.clash() || both.empty() {
		return No
	}
	return decide(true, !g.covers(other))
}

// meet puts the words of both groups together.
func (g group) meet(o group) group {
	g.carbons, g.bonds = g.carbons.meet(o.carbons), g.bonds.meet(o.bonds)
	switch {
	case g.positions == 0:
		g.positions = o.positions
	case o.positions != 0 && o.positions != g.positions:
		g.carbons = span{1, 0}
	}
	switch {
	case g.ends == 0:
		g.ends = o.ends
	case o.ends != 0 && o.ends&g.ends == 0:
		g.carbons = span{1, 0}
	case o.ends != 0:
		g.ends &= o.ends
	}
	g.cis, g.trans = g.cis|o.cis, g.trans|o.trans
	g.allCis, g.isolated, g.anyTrans = g.allCis || o.allCis, g.isolated || o.isolated, g.anyTrans || o.anyTrans
	g.interrupted, g.conjugated = g.interrupted || o.interrupted, g.conjugated || o.conjugated
	g.isomers, g.branched = g.isomers || o.isomers, g.branched && o.branched
	return g
}

// clash finds one bond that would be cis and trans at once.
func (g group) clash() bool { return g.cis&g.trans != 0 || g.allCis && g.trans != 0 }

// covers reports that every member of o surely belongs to g: each of g's words follows from o's.
func (g group) covers(o group) bool {
	if !o.carbons.within(g.carbons) || !o.bonds.within(g.bonds) || o.branched && !g.branched {
		return false
	}
	if g.positions != 0 && g.positions != o.positions || g.ends != 0 && !o.endsWithin(g.ends) {
		return false
	}
	if g.cis&^o.cis != 0 && !o.allCis || g.trans&^o.trans != 0 {
		return false
	}
	ok := g.admitted()
	if g.interrupted {
		ok &^= with[hasUneven]
	}
	if g.allCis {
		ok &^= with[hasTrans]
	}
	for _, s := range o.reach(^uint64(0)) {
		if s&^ok != 0 {
			return false
		}
	}
	return true
}

func (g group) endsWithin(ends uint64) bool {
	if g.positions != 0 {
		return ends>>(int(g.carbons.hi)-bits.Len64(g.positions)+1)&1 == 1
	}
	return g.ends != 0 && g.ends&^ends == 0
}
