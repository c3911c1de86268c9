package check_test

import (
	"encoding/json"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/declare"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func book(t testing.TB) *rulebook.Book {
	t.Helper()
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// caseFiles lists a kind of case file over all markets. A market without one is an error: nothing is skipped.
func caseFiles(t *testing.T, b *rulebook.Book, kind string, visit func(t *testing.T, jurisdiction string, doc []byte)) {
	t.Helper()
	for _, j := range b.Jurisdictions() {
		t.Run(j, func(t *testing.T) {
			doc, err := os.ReadFile(filepath.Join("../../testdata/rules", j, kind+".json"))
			if err != nil {
				t.Fatal(err)
			}
			visit(t, j, doc)
		})
	}
}

func decodeCases(t *testing.T, doc []byte, to any) {
	t.Helper()
	d := json.NewDecoder(strings.NewReader(string(doc)))
	d.DisallowUnknownFields()
	if err := d.Decode(to); err != nil {
		t.Fatal(err)
	}
}

type roundingCases struct {
	Jurisdiction string `json:"jurisdiction"`
	Tables       []struct {
		Quantity, On, Source, Evidence, Transition, Note string
		Rows                                             []roundingRow `json:"rows"`
	} `json:"tables"`
}

type roundingRow struct {
	Exact, Text, Percent, Note string
	Alternatives               []string
	Meets, Declared, Facts     map[string]string
}

// Every rounding rule just below, at and just above each edge, written from the law texts; sources stand in the files.
func TestRoundingCases(t *testing.T) {
	b := book(t)
	caseFiles(t, b, "rounding", func(t *testing.T, j string, doc []byte) {
		var cases roundingCases
		decodeCases(t, doc, &cases)
		n := 0
		for _, table := range cases.Tables {
			for _, row := range table.Rows {
				n++
				t.Run(table.Quantity+" "+row.Exact, func(t *testing.T) { roundOne(t, b, j, table.On, table.Transition, table.Quantity, row) })
			}
		}
		if n == 0 {
			t.Error("no row")
		}
	})
}

func (r roundingRow) holds(c *rulebook.Condition) quantity.Truth {
	answer := func(s string, ok bool) quantity.Truth {
		switch {
		case !ok:
			return quantity.No
		case s == "yes":
			return quantity.Yes
		case s == "open":
			return quantity.Open
		}
		return quantity.No
	}
	switch c.Op {
	case rulebook.OpMeets:
		s, ok := r.Meets[c.Name]
		return answer(s, ok)
	case rulebook.OpDeclared:
		s, ok := r.Declared[c.Name]
		if c.Is == "" {
			return quantity.TruthOf(ok)
		}
		return quantity.TruthOf(ok && s == c.Is)
	case rulebook.OpFact:
		return quantity.TruthOf(r.Facts[c.Name] == c.Is)
	case rulebook.OpNot:
		return r.holds(c.Parts[0]).Not()
	}
	parts := make([]quantity.Truth, len(c.Parts))
	for i, p := range c.Parts {
		parts[i] = r.holds(p)
	}
	if c.Op == rulebook.OpAny {
		return quantity.Any(parts...)
	}
	return quantity.All(parts...)
}

func roundOne(t *testing.T, b *rulebook.Book, j, on, transition, q string, row roundingRow) {
	law, _ := b.At(j, on, rulebook.Transition(transition), row.holds)
	r, ok := law.RoundingOf(q)
	if !ok {
		t.Fatalf("%s has no rounding on %s", q, on)
	}
	exact, err := quantity.ParseAmount(row.Exact)
	if err != nil {
		t.Fatal(err)
	}
	unit, shown, number := lineFormat(t, law, q, exact.Unit)
	value := quantity.FromDecimal(exact.Base())
	var printed declare.Printed
	if len(r.Body.Bands) > 0 {
		o := declare.Round(r.Body.Bands, r.Body.Ties, value, unit, row.holds)
		printed = o[0].Printed
		if got := declare.Text(printed, shown, number); row.Text != "" && got != row.Text {
			t.Errorf("prints %q, want %q", got, row.Text)
		}
		for _, want := range row.Alternatives {
			if !slices.ContainsFunc(o[0].Alternatives, func(p declare.Printed) bool { return declare.Text(p, shown, number) == want }) {
				t.Errorf("alternative %q is not offered", want)
			}
		}
	}
	if row.Percent != "" {
		checkPercent(t, law, r.Body, q, value, printed, unit, row)
	}
}

func lineFormat(t *testing.T, law *rulebook.Law, q string, u quantity.Unit) (unit quantity.Unit, shown string, n rulebook.Number) {
	t.Helper()
	d, ok := law.Declaration()
	if !ok {
		t.Fatal("no declaration holds")
	}
	lang := law.Market.Languages[0]
	unit, shown = u, u.String()
	for _, l := range d.Body.Lines {
		if l.Quantity == q && l.Unit != "" {
			unit, _ = quantity.ParseUnit(l.Unit)
			shown = unit.String()
			if l.ShownUnit != nil {
				shown = l.ShownUnit.In(lang)
			}
		}
	}
	return unit, shown, d.Body.Number[lang]
}

func checkPercent(t *testing.T, law *rulebook.Law, r *rulebook.Rounding, q string, value quantity.Ratio, printed declare.Printed, unit quantity.Unit, row roundingRow) {
	t.Helper()
	ref, ok := law.ReferenceOf(q)
	if !ok || r.Percent == nil {
		t.Fatalf("%s has no per cent", q)
	}
	if r.Percent.From == "declared" {
		value = quantity.FromDecimal(printed.Value.Mul(unit.Scale()))
	}
	got := "0 %"
	if r.Percent.ZeroIf == nil || row.holds(r.Percent.ZeroIf) != quantity.Yes {
		a := ref.Body.Amounts["general population"]
		share := value.Mul(quantity.FromInt(100)).Quo(quantity.FromDecimal(a.Base()))
		o := declare.Round(r.Percent.Bands, r.Ties, share, quantity.PerCent, row.holds)
		got = o[0].Printed.Value.String() + " %"
		if o[0].Printed.LessThan {
			got = "less than " + got
		}
	}
	if got != row.Percent {
		t.Errorf("per cent is %q, want %q", got, row.Percent)
	}
}

// given is a food as a label specialist writes it in a case.
type given struct {
	Per             string                     `json:"per"`
	Components      map[string]json.RawMessage `json:"components"`
	FattyAcids      json.RawMessage            `json:"fatty_acids"`
	Serving         string                     `json:"serving"`
	ReferenceAmount json.RawMessage            `json:"reference_amount"`
	Category        string                     `json:"category"`
	State           string                     `json:"state"`
	Density         string                     `json:"density"`
	Process         string                     `json:"process"`
	TransOrigin     json.RawMessage            `json:"trans_origin"`
	IodineValue     string                     `json:"iodine_value"`
	Package         json.RawMessage            `json:"package"`
	Facts           map[string]json.RawMessage `json:"facts"`
	References      map[string]json.RawMessage `json:"reference_foods"`
	Declares        []string                   `json:"declares"`
}

// document writes the case's food as a recipe of one ingredient.
func (g given) document(claims ...map[string]any) []byte {
	per := g.Per
	if per == "" {
		per = "100 g"
	}
	composition := map[string]any{"per": per, "source": "case", "components": g.Components}
	in := map[string]any{"id": "food", "name": "food", "amount": per, "composition": composition}
	doc := map[string]any{"id": "case", "name": "case", "ingredients": []any{in}}
	if len(claims) > 0 {
		doc["claims"] = claims
	}
	put := func(m map[string]any, name string, v any, set bool) {
		if set {
			m[name] = v
		}
	}
	every := func(v any) map[string]any { return map[string]any{"default": v} }
	put(composition, "fatty_acids", g.FattyAcids, len(g.FattyAcids) > 0)
	put(in, "density", g.Density, g.Density != "")
	put(in, "process", g.Process, g.Process != "")
	put(in, "trans_origin", g.TransOrigin, len(g.TransOrigin) > 0)
	put(in, "iodine_value", g.IodineValue, g.IodineValue != "")
	put(doc, "serving", every(map[string]any{"amount": g.Serving}), g.Serving != "")
	put(doc, "reference_amount", every(g.ReferenceAmount), len(g.ReferenceAmount) > 0)
	put(doc, "category", every(g.Category), g.Category != "")
	put(doc, "state", every(g.State), g.State != "")
	put(doc, "density", every(g.Density), g.Density != "")
	put(doc, "declares", every(g.Declares), len(g.Declares) > 0)
	put(doc, "package", g.Package, len(g.Package) > 0)
	put(doc, "facts", g.Facts, len(g.Facts) > 0)
	put(doc, "reference_foods", g.References, len(g.References) > 0)
	b, err := json.Marshal(doc)
	if err != nil {
		panic(err)
	}
	return b
}

func run(t *testing.T, b *rulebook.Book, j, on, transition string, doc []byte) check.Market {
	t.Helper()
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		t.Fatalf("the case is no recipe: %v\n%s", faults, doc)
	}
	report, faults := check.Check(r, b, check.Request{On: on, In: []string{j}, Transition: rulebook.Transition(transition)})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return report.Jurisdictions[0]
}

// A caseHead is what cases of every kind say of themselves, and the food they give.
type caseHead struct {
	Name, Source, Evidence, On, Transition, Note string
	Given                                        given
}

func (h caseHead) head() caseHead { return h }

// report checks the case's food with the claims asked for.
func (h caseHead) report(t *testing.T, b *rulebook.Book, j string, claims ...map[string]any) check.Market {
	t.Helper()
	return run(t, b, j, h.On, h.Transition, h.Given.document(claims...))
}

// casesIn is a file of cases.
type casesIn[C any] struct {
	Jurisdiction string `json:"jurisdiction"`
	Cases        []C    `json:"cases"`
}

// eachCase runs every case of a kind in every market.
func eachCase[C interface{ head() caseHead }](t *testing.T, kind string, visit func(t *testing.T, b *rulebook.Book, j string, c C)) {
	t.Helper()
	b := book(t)
	caseFiles(t, b, kind, func(t *testing.T, j string, doc []byte) {
		var file casesIn[C]
		decodeCases(t, doc, &file)
		if len(file.Cases) == 0 {
			t.Error("no case")
		}
		for _, c := range file.Cases {
			t.Run(c.head().Name, func(t *testing.T) { visit(t, b, j, c) })
		}
	})
}

type claimCase struct {
	caseHead
	Claim, Text, Against, Stated, Verdict string
	Statements                            []string
	NotStatements                         []string `json:"not_statements"` // parts that no statement may hold
	Printable                             *bool
	tableCase
}

// Every claim just under, at and just over its thresholds, written from the dossiers; sources stand in the files.
func TestClaimCases(t *testing.T) { eachCase(t, "claims", judgeClaim) }

func TestHealthClaimCases(t *testing.T) { eachCase(t, "health_claims", judgeClaim) }

func judgeClaim(t *testing.T, b *rulebook.Book, j string, c claimCase) {
	asked := map[string]any{}
	for k, v := range map[string]string{"claim": c.Claim, "text": c.Text, "against": c.Against, "stated": c.Stated} {
		if v != "" {
			asked[k] = v
		}
	}
	m := c.report(t, b, j, asked)
	got := m.Claims[0]
	if got.Verdict != c.Verdict {
		why, _ := json.MarshalIndent(got, "", " ")
		t.Errorf("verdict %s, want %s\n%s", got.Verdict, c.Verdict, why)
	}
	stated := func(part string) bool {
		return slices.ContainsFunc(got.Statements, func(s check.Statement) bool { return strings.Contains(s.Text, part) })
	}
	for _, want := range c.Statements {
		if !stated(want) {
			t.Errorf("statement %q is missing from %v", want, got.Statements)
		}
	}
	for _, not := range c.NotStatements {
		if stated(not) {
			t.Errorf("a statement holds %q: %v", not, got.Statements)
		}
	}
	c.look(t, m)
	if c.Printable != nil && got.Printable != *c.Printable {
		t.Errorf("printable is %v", got.Printable)
	}
}

type findingCase struct {
	caseHead
	Findings   map[string]string // code -> severity; "none" says that it must be absent
	Naming     []string          // parts of what is said of names
	NotNamed   []string          `json:"not_named"` // parts that must not be said
	Serving    string            // the line that tells the serving
	Servings   string            // servings per package
	Simplified *bool             // whether a shorter format applies
	Format     string            // name of the format meant, where several apply
	LeaveOut   []string          `json:"leave_out"` // terms it leaves out
	Keeps      []string          // terms it must not leave out
	Says       *string           // part of its statement; "" is none
	Claims     []string          // names of claims that the label makes
}

// Limits, servings, packages, names and simplified formats, written from the dossiers; sources stand in the files.
func TestFindingCases(t *testing.T) {
	eachCase(t, "findings", func(t *testing.T, b *rulebook.Book, j string, c findingCase) {
		m := c.report(t, b, j, claimed(c.Claims)...)
		for code, want := range c.Findings {
			if got := severityOf(m, code); got != want {
				t.Errorf("%s is %s, want %s", code, got, want)
			}
		}
		named := func(part string) bool {
			return slices.ContainsFunc(m.Naming, func(n check.Naming) bool { return strings.Contains(n.Name+" "+n.Says, part) })
		}
		for _, want := range c.Naming {
			if !named(want) {
				t.Errorf("nothing named says %q: %v", want, m.Naming)
			}
		}
		for _, not := range c.NotNamed {
			if named(not) {
				t.Errorf("something named says %q: %v", not, m.Naming)
			}
		}
		if s := m.Declaration.Serving; c.Serving != "" && (s == nil || s.Text != c.Serving) {
			t.Errorf("the serving is %+v, want %q", s, c.Serving)
		}
		if s := m.Declaration.Servings; c.Servings != "" && (s == nil || s.Text != c.Servings) {
			t.Errorf("servings per package are %+v, want %q", s, c.Servings)
		}
		shortFormCase(t, m.Declaration, c)
	})
}

func severityOf(m check.Market, code string) string {
	for _, f := range m.Findings {
		if f.Code == code {
			return f.Severity
		}
	}
	return "none"
}
