package rollup

import (
	"math/big"

	"github.com/shopspring/decimal"

	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// The arithmetic of a profile. With p the stated value of an acid, α its grams of acid and τ its grams of triglyceride per
// unit of p, P the sum of named values and u what is unnamed:
//
//	per cent bases, fat counted as triglycerides:  acid = F·pα/Σpτ · P/(P+u)
//	per cent bases, share x of the fat is acids:   acid = F·x·pα/Σpα · P/(P+u)
//	gram bases:                                    acid = base/100 · vα
//
// α and τ follow from molar masses: FAME -> acid M(acid)/M(FAME), acid -> triglyceride M(triglyceride)/3M(acid). What is
// unnamed, and groups without a mass, weigh like the mean of the named. Reference: AOAC 996.06 (principle).

// profileSums are the integers the shares are made of.
type profileSums struct {
	species []lipid.Species
	p       [3][]*big.Int // low, central, high, over one power of ten; the last entry is what is unnamed
	scale   int32         // that power of ten
	a, t    []*big.Int    // α and τ over l
	l       *big.Int
}

// weigh prepares the leaf's profile.
func (l *Leaf) weigh() *Fault {
	p := l.profile()
	if p == nil {
		return nil
	}
	s := newSums(p)
	exact := true
	for _, a := range p.Acids {
		exact = exact && a.Value.Low.Equal(a.Value.High)
	}
	exact = exact && p.Unidentified.Low.Equal(p.Unidentified.High)
	l.weights = make([]weight, 0, len(s.species))
	for j := range s.species {
		if j == len(p.Acids) && s.p[2][j].Sign() == 0 {
			continue
		}
		l.weights = append(l.weights, s.weight(p, j, exact))
	}
	if exact {
		reduce(l.weights)
	}
	return nil
}

func newSums(p *recipe.Profile) *profileSums {
	n := len(p.Acids)
	s := &profileSums{species: make([]lipid.Species, n+1)}
	values := make([]decimal.Decimal, 0, 3*(n+1))
	for _, pick := range []func(recipe.Value) decimal.Decimal{low, centre, high} {
		for _, a := range p.Acids {
			values = append(values, pick(a.Value))
		}
		values = append(values, unnamed(p, pick))
	}
	all, scale := integers(values)
	s.scale = scale
	for i := range s.p {
		s.p[i] = all[i*(n+1) : (i+1)*(n+1)]
	}
	for i, a := range p.Acids {
		s.species[i] = a.Species
	}
	s.coefficients(p.Basis, n)
	return s
}

// unnamed is the stated unidentified share; a percentage profile that is not complete leaves the rest of 100 unnamed.
func unnamed(p *recipe.Profile, pick func(recipe.Value) decimal.Decimal) decimal.Decimal {
	u := pick(p.Unidentified)
	if p.Complete || p.Basis != recipe.PercentFAME && p.Basis != recipe.PercentAcids {
		return u
	}
	rest := hundred
	for _, a := range p.Acids {
		rest = rest.Sub(centre(a.Value))
	}
	return decimal.Max(u, rest)
}

func low(v recipe.Value) decimal.Decimal  { return v.Low }
func high(v recipe.Value) decimal.Decimal { return v.High }

func centre(v recipe.Value) decimal.Decimal {
	if v.Typical {
		return v.Central
	}
	return v.Low.Add(v.High).Mul(decimal.New(5, -1))
}

// coefficients fills a and t over l; entries without a mass, the unnamed among them, get the mean of the others.
func (s *profileSums) coefficients(basis recipe.Basis, n int) {
	type fraction struct{ num, den int64 }
	alpha, tau := make([]fraction, n), make([]fraction, n)
	s.l = big.NewInt(1)
	for i := range n {
		acid, ok := s.species[i].AcidMass()
		if !ok {
			continue
		}
		fame, _ := s.species[i].FAMEMass()
		tag, _ := s.species[i].TriglycerideMass()
		switch basis {
		case recipe.PercentFAME:
			alpha[i], tau[i] = fraction{acid, fame}, fraction{tag, 3 * fame}
		case recipe.TriglyceridePerFood:
			alpha[i], tau[i] = fraction{3 * acid, tag}, fraction{1, 1}
		default:
			alpha[i], tau[i] = fraction{1, 1}, fraction{tag, 3 * acid}
		}
		s.l = lcm(lcm(s.l, big.NewInt(alpha[i].den)), big.NewInt(tau[i].den))
	}
	s.a, s.t = make([]*big.Int, n+1), make([]*big.Int, n+1)
	over := func(f fraction) *big.Int {
		k := new(big.Int).Quo(s.l, big.NewInt(f.den))
		return k.Mul(k, big.NewInt(f.num))
	}
	sumP, sumA, sumT := new(big.Int), new(big.Int), new(big.Int)
	for i := range n {
		if alpha[i].den == 0 {
			continue
		}
		s.a[i], s.t[i] = over(alpha[i]), over(tau[i])
		sumP.Add(sumP, s.p[1][i])
		sumA.Add(sumA, new(big.Int).Mul(s.p[1][i], s.a[i]))
		sumT.Add(sumT, new(big.Int).Mul(s.p[1][i], s.t[i]))
	}
	s.mean(sumP, sumA, sumT)
}

func (s *profileSums) mean(sumP, sumA, sumT *big.Int) {
	needed := false
	for i := range s.a {
		if s.a[i] == nil && s.p[2][i].Sign() > 0 {
			needed = true
		}
	}
	if sumP.Sign() == 0 {
		sumP, sumA, sumT = big.NewInt(1), s.l, s.l
	}
	for i := range s.a {
		switch {
		case s.a[i] == nil && !needed:
			s.a[i], s.t[i] = new(big.Int), new(big.Int)
		case s.a[i] == nil:
			s.a[i], s.t[i] = sumA, sumT
		case needed:
			s.a[i], s.t[i] = new(big.Int).Mul(s.a[i], sumP), new(big.Int).Mul(s.t[i], sumP)
		}
	}
	if needed {
		s.l = new(big.Int).Mul(s.l, sumP)
	}
}

// weight is entry j. Its ends take its own end and the opposite ends of all others, so that they enclose every point.
func (s *profileSums) weight(p *recipe.Profile, j int, exact bool) weight {
	w := weight{species: s.species[j], exact: exact}
	for end := range 3 {
		if exact && end != 1 {
			continue
		}
		w.acid[end], w.tag[end], w.den[end] = s.share(p, j, end)
		if !exact {
			w.cut(end)
		}
	}
	return w
}

// cut writes one end of a range over 10^18, the low one no higher and the high one no lower than it was, so that ranges of many
// profiles keep one denominator.
func (w *weight) cut(end int) {
	over := quantity.Pow10(18)
	cut := func(n *big.Int) *big.Int {
		q, rest := new(big.Int).QuoRem(new(big.Int).Mul(n, over), w.den[end], new(big.Int))
		if end == 2 && rest.Sign() > 0 {
			q.Add(q, big.NewInt(1))
		}
		return q
	}
	w.acid[end], w.tag[end], w.den[end] = cut(w.acid[end]), cut(w.tag[end]), over
}

func (s *profileSums) share(p *recipe.Profile, j, end int) (acid, tag, den *big.Int) {
	own := s.p[end][j]
	acid, tag = new(big.Int).Mul(own, s.a[j]), new(big.Int).Mul(own, s.t[j])
	switch p.Basis {
	case recipe.PercentFAME, recipe.PercentAcids:
	default:
		den = new(big.Int).Mul(s.l, quantity.Pow10(2-s.scale))
		return acid, tag, den
	}
	others := s.p[2-end]
	all := func(c []*big.Int) *big.Int {
		sum := new(big.Int).Mul(own, c[j])
		for i := range c {
			if i != j {
				sum.Add(sum, new(big.Int).Mul(others[i], c[i]))
			}
		}
		return sum
	}
	if all(s.a).Sign() == 0 { // nothing is in the profile at this end
		return new(big.Int), new(big.Int), big.NewInt(1)
	}
	if p.ShareOfFat.IsPositive() {
		x := p.ShareOfFat
		acid.Mul(acid, x.Coefficient())
		tag.Mul(tag, x.Coefficient())
		den = all(s.a)
		return acid, tag, den.Mul(den, quantity.Pow10(-x.Exponent()))
	}
	return acid, tag, all(s.t)
}

// reduce divides the weights of a profile by what all have in common, and gives them one denominator.
func reduce(weights []weight) {
	if len(weights) == 0 {
		return
	}
	g := new(big.Int).Set(weights[0].den[1])
	for i := range weights {
		g.GCD(nil, nil, g, weights[i].acid[1])
		g.GCD(nil, nil, g, weights[i].tag[1])
	}
	den := new(big.Int).Quo(weights[0].den[1], g)
	for i := range weights {
		w := &weights[i]
		w.acid[1], w.tag[1], w.den[1] = new(big.Int).Quo(w.acid[1], g), new(big.Int).Quo(w.tag[1], g), den
	}
}
