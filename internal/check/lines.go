package check

import (
	"slices"

	"gramlaw/internal/claim"
	"gramlaw/internal/declare"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

// A column is a basis of the declaration with its mass.
type column struct {
	Basis
	grams quantity.Ratio
	share quantity.Ratio // of the product's batch
	known bool
}

// A lineState is a line on its way to the report.
type lineState struct {
	line   *rulebook.Line
	rule   rulebook.Active[rulebook.Declaration]
	needed bool // a claim makes it mandatory
	wanted bool // the maker wants it
}

// text writes what the line prints.
func (l *lineState) text(p declare.Printed, u quantity.Unit, lang string) string {
	return declare.Text(p, l.shown(u, lang), l.rule.Body.Number[lang])
}

// shown is the unit as the line prints it.
func (l *lineState) shown(u quantity.Unit, lang string) string {
	if l.line.ShownUnit != nil {
		return l.line.ShownUnit.In(lang)
	}
	return u.String()
}

// openColumns settles the bases. A liquid is declared per 100 mL where a solid is per 100 g.
func (m *market) openColumns(out *Market) {
	liquid := m.liquid()
	for i := range m.law.Market.DefaultBases {
		b := &m.law.Market.DefaultBases[i]
		per := b.Per
		if per == "100 mL" || !m.hasBasis(b) {
			continue
		}
		if per == "100 g" && liquid {
			per = "100 mL"
		}
		p, _ := rulebook.ParsePer(per)
		g, ok := m.product.Basis(p)
		if !ok && b.Presence == "optional" {
			continue
		}
		c := column{Basis: Basis{ID: per, Amount: m.amountOf(p)}, grams: g, known: ok}
		if ok {
			c.share = g.Quo(m.product.Mass())
			c.Grams = exactText(g) + " g"
		} else {
			out.Findings = append(out.Findings, Finding{Kind: "serving", Severity: "open", Code: "basis-unknown", Says: "the mass of the basis “" + per + "” is not known: " + missingBasis(per)})
		}
		m.columns = append(m.columns, c)
	}
	if _, stated := m.c.recipe.Serving.For(m.j); !stated && slices.ContainsFunc(m.columns, func(c column) bool { return c.ID == "serving" && c.known }) {
		out.Findings = append(out.Findings, Finding{Kind: "serving", Severity: "note", Code: "serving-not-stated", Says: "no serving was stated; the reference amount was taken"})
	}
}

// hasBasis tells whether a basis belongs to the market's label of this edition and product.
func (m *market) hasBasis(b *rulebook.BasisRule) bool {
	if b.Edition != "" && b.Edition != m.law.Edition {
		return false
	}
	v := m.as(m.product)
	return b.If == nil || v.truth(b.If) == quantity.Yes
}

func missingBasis(per string) string {
	switch per {
	case "serving":
		return "state a serving or a category, and a density where it is a volume"
	case "package", "unit":
		return "state the package's net quantity and number of units, and a density where it is a volume"
	}
	return "state a density"
}

func (m *market) amountOf(p rulebook.Per) string {
	switch p.Name {
	case "serving":
		s, _, ok := m.serving()
		if !ok {
			return ""
		}
		if s.Measure != "" && s.Measure != s.Amount.String() {
			return s.Measure + " (" + s.Amount.String() + ")"
		}
		return s.Amount.String()
	case "":
		return p.Amount.String()
	}
	return p.Name
}

func (m *market) openLines() {
	d, ok := m.law.Declaration()
	if !ok {
		return
	}
	for i := range d.Body.Lines {
		l := &lineState{line: &d.Body.Lines[i], rule: d}
		m.lines[l.line.Quantity] = l
		m.order = append(m.order, l)
	}
	wanted, _ := m.c.recipe.Declares.For(m.j)
	for _, q := range wanted {
		if l, ok := m.lines[q]; ok {
			l.wanted = true
		}
	}
}

// noLines finds what the maker wants to declare and the market's table has no line for.
func (m *market) noLines() []Finding {
	var out []Finding
	for _, q := range m.c.recipe.Declares[m.j] { // what is wanted by default is wanted where there is a line
		if l, ok := m.lines[q]; !ok || l.line.Presence == "forbidden" {
			out = append(out, Finding{Kind: "coverage", Severity: "warning", Code: "no-such-line", Pointer: "/declares", Says: "the declaration has no line for “" + q + "”"})
		}
	}
	return out
}

// stands tells whether a line is in the declaration: by itself, or because one it belongs together with is.
func (v *view) stands(l *lineState) bool {
	if v.standsAlone(l) {
		return true
	}
	for _, group := range l.rule.Body.Together {
		if !slices.Contains(group, l.line.Quantity) {
			continue
		}
		for _, q := range group {
			if v.standsAlone(v.lines[q]) {
				return true
			}
		}
	}
	return false
}

// standsAlone: wanted by the maker, mandatory, or raised by a condition or a claim.
func (v *view) standsAlone(l *lineState) bool { return l.wanted || v.raised(l) }

// raised tells whether the law makes a line mandatory, or a claim.
func (v *view) raised(l *lineState) bool {
	return l.needed || l.line.Presence == "mandatory" || l.line.MandatoryIf != nil && v.truth(l.line.MandatoryIf) == quantity.Yes
}

// on brings a quantity of the product to a column's basis, in base units.
func (c column) on(q quantity.Linear) quantity.Linear { return q.Mul(c.share) }

// possible lists what a quantity may print as on the first column: one print when determined.
func (v *view) possible(q string) []declare.Printed { return v.on(v.subject, q).printed() }

// on rounds a food's quantity on the first column; nothing where the law does not round it or the column has no mass.
func (v *view) on(p *product, q string) outcomes {
	if len(v.columns) == 0 || !v.columns[0].known {
		return nil
	}
	l, ok := p.Quantity(q)
	r, rounded := v.law.RoundingOf(q)
	if !ok || !rounded || len(r.Body.Bands) == 0 {
		return nil
	}
	return v.outcomes(r.Body, l, v.columns[0].grams.Quo(p.Mass()), v.unit(q))
}

// unit is the unit in which a quantity is printed.
func (v *view) unit(q string) quantity.Unit {
	name := ""
	if l, ok := v.lines[q]; ok && l.line.Unit != "" {
		name = l.line.Unit
	} else if d, ok := v.law.Definitions.Get(q); ok {
		name = d.Body.Unit
	} else if e, ok := v.law.Energy.Get(q); ok {
		name = e.Body.Unit
	}
	u, _ := quantity.ParseUnit(name)
	return u
}

type outcomes []declare.Outcome

// outcomes rounds both ends of a quantity's share. Rounding is monotonic, so the ends enclose what is between.
func (v *view) outcomes(r *rulebook.Rounding, q quantity.Linear, share quantity.Ratio, u quantity.Unit) outcomes {
	out := outcomes(declare.Round(r.Bands, r.Ties, q.Low().Mul(share), u, v.truth))
	if !q.Determined() {
		out = append(out, declare.Round(r.Bands, r.Ties, q.High().Mul(share), u, v.truth)...)
	}
	return out
}

func (o outcomes) printed() []declare.Printed {
	out := make([]declare.Printed, len(o))
	for i := range o {
		out[i] = o[i].Printed
	}
	return out
}

// determined tells whether all outcomes print alike.
func (o outcomes) determined() bool {
	for i := range o {
		if !o[i].Printed.Equal(o[0].Printed) {
			return false
		}
	}
	return len(o) > 0
}

// table builds the declaration.
func (m *market) table() Table {
	t := Table{Lines: make([]Line, 0, len(m.order)), NotKnown: []OpenLine{}, Statements: []Statement{}, Bases: []Basis{}}
	for _, c := range m.columns {
		t.Bases = append(t.Bases, c.Basis)
	}
	v := m.as(m.product)
	for _, l := range m.order {
		if rounding, _ := m.law.RoundingOf(l.line.Quantity); m.untouched(rounding.ID, l.rule.ID) {
			continue
		}
		if v.open(l) {
			q, _ := v.subject.Quantity(l.line.Quantity)
			t.NotKnown = append(t.NotKnown, OpenLine{l.line.Quantity, v.term(l), v.needs(q.Variables())})
		} else if line, ok := v.reportLine(l); ok {
			t.Lines = append(t.Lines, line)
		}
	}
	if d, ok := m.law.Declaration(); ok {
		t.Title, t.Rule = d.Body.Title.In(m.language()), d.ID
		t.Statements = append(t.Statements, v.statements(d.Body.Statements, d.ID, nil)...)
		t.Serving, t.Servings, t.NotRequired = v.servingSize(d.Body), v.servings(d.Body), v.required(d.Body)
		t.free()
		if f := v.formats(d.Body.Simplified); len(f) > 0 {
			t.Simplified, t.OtherFormats = &f[0], f[1:]
		}
	}
	return t
}

// conditional are the terms that stand in place of a line's own; nil where none do.
func (v *view) conditional(l *lineState) rulebook.Terms {
	for i := range l.line.TermsIf {
		if v.surely(l.line.TermsIf[i].If) {
			return l.line.TermsIf[i].Terms
		}
	}
	return nil
}

// term is the preferred term of a line in the first language.
func (v *view) term(l *lineState) string {
	if t := v.conditional(l); t != nil {
		return t[v.language()][0]
	}
	return l.line.Terms[v.language()][0]
}

// terms are the preferred terms by language, where there is more than one language.
func (v *view) terms(l *lineState) map[string]string {
	t := v.conditional(l)
	if t == nil || l.line.FirstTerms() == nil {
		return l.line.FirstTerms()
	}
	out := make(map[string]string, len(t))
	for lang, words := range t {
		out[lang] = words[0]
	}
	return out
}

// required tells why the law might ask for no declaration; nil where it asks for one.
func (v *view) required(d *rulebook.Declaration) *NotRequired {
	if d.RequiredUnless == nil {
		return nil
	}
	switch v.truth(d.RequiredUnless) {
	case quantity.Yes:
		return &NotRequired{Says: d.NotRequired.In(v.language())}
	case quantity.Open:
		return &NotRequired{Says: d.NotRequired.In(v.language()), Open: true, Needs: v.needsFor(d.RequiredUnless)}
	}
	return nil
}

// free makes every line optional where the law asks for no declaration.
func (t *Table) free() {
	if t.NotRequired == nil || t.NotRequired.Open {
		return
	}
	for i := range t.Lines {
		t.Lines[i].Presence = "optional"
	}
}

func (m *market) language() string { return m.law.Market.Languages[0] }

// open tells whether an optional line's print is not determined on some column.
func (v *view) open(l *lineState) bool {
	q, ok := v.subject.Quantity(l.line.Quantity)
	if !ok || q.Determined() || l.line.Presence == "forbidden" || v.stands(l) {
		return false
	}
	r, ok := v.law.RoundingOf(l.line.Quantity)
	if !ok || len(r.Body.Bands) == 0 {
		return false
	}
	u := v.unit(l.line.Quantity)
	return slices.ContainsFunc(v.columns, func(c column) bool { return c.known && !v.outcomes(r.Body, q, c.share, u).determined() })
}

func (v *view) reportLine(l *lineState) (Line, bool) {
	q, ok := v.subject.Quantity(l.line.Quantity)
	if !ok || l.line.Presence == "forbidden" || l.line.ForbiddenIf != nil && v.truth(l.line.ForbiddenIf) == quantity.Yes {
		return Line{}, false
	}
	out := Line{Quantity: l.line.Quantity, Component: l.line.Component, Level: l.line.Level, Status: "determined", Presence: "optional",
		Values: []Value{}, Term: v.term(l), Terms: v.terms(l)}
	if v.raised(l) || !l.wanted && v.stands(l) {
		out.Presence = "mandatory"
		if l.line.LeaveOutIf != nil && !l.needed && v.truth(l.line.LeaveOutIf) == quantity.Yes {
			out.Presence = "may be left out"
			out.LeftOut = l.line.LeftOut.In(v.language())
		}
	}
	for _, c := range v.columns {
		if !c.known {
			out.Status = "undetermined"
			continue
		}
		value, settled := v.value(l, c, c.on(q))
		if !settled {
			out.Status = "undetermined"
		}
		out.Values = append(out.Values, value)
	}
	if out.Status != "determined" {
		out.Needs = append(v.needs(q.Variables()), v.bandNeeds(l.line.Quantity)...)
	}
	return out, true
}

// bandNeeds lists what the open conditions of a rounding's bands lack.
func (v *view) bandNeeds(q string) []string {
	r, ok := v.law.RoundingOf(q)
	if !ok {
		return nil
	}
	var out []string
	if p := r.Body.Percent; p != nil && len(p.Times) > 0 && v.percentMust(v.lines[q].line) {
		if _, missing := claim.Weigh(p.Times, v); missing != "" {
			out = append(out, missing)
		}
	}
	for i := range r.Body.Bands {
		c := r.Body.Bands[i].If
		if c == nil || v.truth(c) != quantity.Open {
			continue
		}
		for _, n := range v.needsFor(v.unfolded(c)) {
			if !slices.Contains(out, n) {
				out = append(out, n)
			}
		}
	}
	return out
}

// unfolded puts a claim's condition in place of the question whether it is met, so that what is open in it can be told.
func (v *view) unfolded(c *rulebook.Condition) *rulebook.Condition {
	if c.Op != rulebook.OpMeets || c.Subject != "" {
		return c
	}
	if cl, ok := v.law.Claims.Get(rulebook.Name(c.Name)); ok && cl.Body.Condition != nil {
		return cl.Body.Condition
	}
	return c
}

// mostNeeds bounds the list of what is missing: who has so many gaps needs no longer list.
const mostNeeds = 50

// needs names the ingredients on whose data variables depend.
func (m *market) needs(vars []*quantity.Variable) []string {
	var out []string
	add := func(b *rollup.Batch, prefix string, x *quantity.Variable) {
		s, ok := b.Owner(x)
		if !ok {
			return
		}
		if prefix != "" {
			s = prefix + s
		}
		if !slices.Contains(out, s) {
			out = append(out, s)
		}
	}
	for _, x := range vars {
		if len(out) > mostNeeds {
			break
		}
		add(m.c.batch, "", x)
	}
	for _, n := range sortedKeys(m.c.refs) {
		for _, x := range vars {
			add(m.c.refs[n], "reference food ", x)
		}
	}
	return out
}
