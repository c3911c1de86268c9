package recheck

import (
	"maps"
	"slices"
	"strings"

	"gramlaw/internal/check"
)

// listed are the things a report says, by kind and name, in its order.
type listed struct {
	by    map[string]item
	order []string
}

func (l *listed) add(it item) {
	key := it.kind + "\x00" + it.what
	for n := 2; ; n++ { // two findings of one code are two things
		if _, twice := l.by[key]; !twice {
			break
		}
		key = it.kind + "\x00" + it.what + " (" + string(rune('0'+n%10)) + ")"
	}
	l.by[key] = it
	l.order = append(l.order, key)
}

// keys are those of both, the first's order leading.
func keys(a, b listed) []string {
	out := slices.Clone(a.order)
	for _, k := range b.order {
		if _, ok := a.by[k]; !ok {
			out = append(out, k)
		}
	}
	return out
}

func sortedKeys(m map[string]bool) []string { return slices.Sorted(maps.Keys(m)) }

// items lists what a market's report says that can stand on a label or keep something off it.
func items(m *check.Market) listed {
	out := listed{by: map[string]item{}}
	out.table(&m.Declaration)
	for i := range m.Claims {
		out.claim(&m.Claims[i])
	}
	for _, c := range m.AlsoPermitted {
		out.add(item{kind: offerItem, what: c.Claim, text: c.Verdict, rules: []string{c.Claim}})
	}
	for i := range m.Findings {
		f := &m.Findings[i]
		kind := findingItem
		if f.Severity == "note" {
			kind = Note
		}
		out.add(item{kind: kind, what: f.Code, text: f.Severity + ": " + f.Says, rules: []string{f.Rule}})
	}
	for _, n := range m.Naming {
		out.add(item{kind: Name, what: strings.TrimSpace(n.Rule + " " + n.Ingredient), text: nameText(n), rules: []string{n.Rule}})
	}
	for _, a := range m.Assumed {
		out.add(item{kind: Note, what: "assumed " + a.Fact, text: a.Taken})
	}
	return out
}

func nameText(n check.Naming) string {
	holds := "open"
	if n.Holds != nil {
		holds = map[bool]string{true: "holds", false: "does not hold"}[*n.Holds]
	}
	return holds + ": " + strings.TrimSpace(n.Name+" "+n.Says)
}

func (l *listed) table(t *check.Table) {
	for i := range t.Lines {
		line := &t.Lines[i]
		for j := range line.Values {
			v := &line.Values[j]
			it := item{kind: Line, what: line.Quantity + " per " + v.Basis, text: lineText(line, v), rules: []string{v.Rule, t.Rule}}
			if v.PercentReference != nil {
				it.rules = append(it.rules, v.PercentReference.Rule)
			}
			l.add(it)
		}
	}
	for _, s := range t.Statements {
		l.add(item{kind: Statement, what: "with the declaration: " + s.Rule, text: s.Presence + ": " + s.Text, rules: []string{s.Rule, t.Rule}})
	}
	if t.Title != "" {
		l.add(item{kind: Line, what: "title of the declaration", text: t.Title, rules: []string{t.Rule}})
	}
	for _, b := range t.Bases {
		l.add(item{kind: Line, what: "column " + b.ID, text: strings.TrimSpace(b.Amount + " " + b.Grams)})
	}
	if t.Servings != nil {
		l.add(item{kind: Line, what: "servings per package", text: t.Servings.Text, rules: []string{t.Rule}})
	}
	if t.Serving != nil {
		l.add(item{kind: Line, what: "serving size", text: t.Serving.Text, rules: []string{t.Rule}})
	}
	if t.Simplified != nil {
		l.add(item{kind: Line, what: "shorter format", text: t.Simplified.Name + ": without " + strings.Join(t.Simplified.LeaveOut, ", ") + "; " + t.Simplified.Says, rules: []string{t.Rule}})
	}
	if t.NotRequired != nil {
		l.add(item{kind: Line, what: "declaration", text: t.NotRequired.Says, rules: []string{t.Rule}})
	}
}

// lineText is what stands on the label, with its per cent and how it stands there.
func lineText(l *check.Line, v *check.Value) string {
	s := l.Term + " " + v.Text
	if v.PercentReference != nil && v.PercentReference.Text != "" {
		s += " (" + v.PercentReference.Text + ")"
	}
	return strings.TrimSpace(s) + ", " + l.Presence
}

func (l *listed) claim(c *check.Claim) {
	it := item{kind: claimItem, what: c.Asked, text: c.Verdict, rules: []string{c.Rule, c.Claim},
		may: c.Verdict == check.Permitted || c.Verdict == check.WithStatement, open: c.Verdict == check.Undetermined}
	if it.may && !c.Printable {
		it.text += ", not printable yet"
	}
	for _, s := range c.Statements {
		it.text += "; " + s.Presence + ": “" + s.Text + "”"
		it.rules = append(it.rules, s.Rule)
	}
	if len(c.NeedsLines) > 0 {
		it.text += "; makes mandatory: " + strings.Join(c.NeedsLines, ", ")
	}
	l.add(it)
}
