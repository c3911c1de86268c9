package check_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/rulebook"
)

type labelCase struct {
	caseHead
	Claims []string // names of claims that the label makes
	tableCase
}

// A tableCase is what a case wants of the declaration.
type tableCase struct {
	Basis     string
	Declared  map[string]printedCase
	Absent    []string          // quantities that no line may declare
	LeftOut   map[string]string `json:"left_out"`             // quantity -> part of what the label then states
	States    []string          `json:"table_statements"`     // parts of statements that stand with the table
	StatesNot []string          `json:"not_table_statements"` // parts that no such statement may hold
}

// A printedCase is what a line prints.
type printedCase struct {
	Text, Percent, Presence string
	Alternatives            []string // what the law allows too
}

// claimed are claims by their names, as a recipe asks for them.
func claimed(names []string) (out []map[string]any) {
	for _, n := range names {
		out = append(out, map[string]any{"claim": n})
	}
	return out
}

// The dossiers' published sample labels and worked examples, from values to print.
func TestLabelCases(t *testing.T) {
	eachCase(t, "labels", func(t *testing.T, b *rulebook.Book, j string, c labelCase) {
		c.look(t, c.report(t, b, j, claimed(c.Claims)...))
	})
}

// look holds a report's declaration against the case.
func (c tableCase) look(t *testing.T, m check.Market) {
	t.Helper()
	for q, want := range c.Declared {
		line, value, err := printedLine(m, q, c.Basis)
		if err != nil {
			t.Error(err)
			continue
		}
		if want.Text != "" && value.Text != want.Text {
			t.Errorf("%s prints %q, want %q (exact %v)", q, value.Text, want.Text, deref(value.Exact))
		}
		for _, a := range want.Alternatives {
			if !slices.Contains(value.Alternatives, a) {
				t.Errorf("%s may not print %q: %q", q, a, value.Alternatives)
			}
		}
		if got := percentOf(value); want.Percent != "" && got != want.Percent {
			t.Errorf("%s has per cent %q, want %q", q, got, want.Percent)
		}
		if want.Presence != "" && line.Presence != want.Presence {
			t.Errorf("%s is %s, want %s", q, line.Presence, want.Presence)
		}
	}
	for _, q := range c.Absent {
		if line, _, err := printedLine(m, q, ""); err == nil {
			t.Errorf("%s stands in the declaration, %s", q, line.Presence)
		}
	}
	for q, part := range c.LeftOut {
		if line, _, err := printedLine(m, q, ""); err != nil || line.Presence != "may be left out" || !strings.Contains(line.LeftOut, part) {
			t.Errorf("%s is %s with %q, want it left out with %q", q, line.Presence, line.LeftOut, part)
		}
	}
	c.statements(t, m.Declaration.Statements)
}

func (c tableCase) statements(t *testing.T, list []check.Statement) {
	t.Helper()
	stands := func(part string) bool {
		return slices.ContainsFunc(list, func(s check.Statement) bool { return strings.Contains(s.Text, part) })
	}
	for _, want := range c.States {
		if !stands(want) {
			t.Errorf("no statement with the table holds %q: %+v", want, list)
		}
	}
	for _, not := range c.StatesNot {
		if stands(not) {
			t.Errorf("a statement with the table holds %q: %+v", not, list)
		}
	}
}

// percentOf is the per cent beside a value, "none" where there is none.
func percentOf(v check.Value) string {
	if v.PercentReference == nil {
		return "none"
	}
	return v.PercentReference.Text
}

func deref(s *string) string {
	if s == nil {
		return "open"
	}
	return *s
}

func printedLine(m check.Market, q, basis string) (check.Line, check.Value, error) {
	for _, l := range m.Declaration.Lines {
		if l.Quantity != q {
			continue
		}
		for _, v := range l.Values {
			if basis == "" || v.Basis == basis {
				return l, v, nil
			}
		}
	}
	return check.Line{}, check.Value{}, fmt.Errorf("the declaration has no line for %s", q)
}

// format is the shorter format of a name, or the first; nil where none applies.
func format(d check.Table, name string) *check.Simplified {
	list := d.OtherFormats
	if d.Simplified != nil {
		list = append([]check.Simplified{*d.Simplified}, list...)
	}
	i := slices.IndexFunc(list, func(f check.Simplified) bool { return name == "" || f.Name == name })
	if i < 0 {
		return nil
	}
	return &list[i]
}

func shortFormCase(t *testing.T, d check.Table, c findingCase) {
	t.Helper()
	f := format(d, c.Format)
	if c.Simplified != nil && *c.Simplified != (f != nil) {
		t.Errorf("simplified format is %+v, want %v", f, *c.Simplified)
	}
	if f == nil {
		f = &check.Simplified{}
	}
	for _, want := range c.LeaveOut {
		if !slices.Contains(f.LeaveOut, want) {
			t.Errorf("the simplified format does not leave out %s: %+v", want, f)
		}
	}
	for _, kept := range c.Keeps {
		if slices.Contains(f.LeaveOut, kept) {
			t.Errorf("the simplified format leaves out %s: %+v", kept, f)
		}
	}
	if c.Says != nil && (*c.Says == "" && f.Says != "" || !strings.Contains(f.Says, *c.Says)) {
		t.Errorf("the simplified format states %q, want %q", f.Says, *c.Says)
	}
}
