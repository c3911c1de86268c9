package check

import "gramlaw/internal/rulebook"

// other tells what the other choice of edition would change, while two are in force.
func (m *market) other(mine Market) *Other {
	t := rulebook.Newest
	if m.c.request.Transition == rulebook.Newest {
		t = rulebook.WhenRequired
	}
	if edition, _ := m.c.book.EditionAt(m.j, m.c.request.On, t, m.as(nil).truth); edition == m.law.Edition {
		return nil
	}
	theirs := m.c.open(m.j, t).judge()
	return &Other{Transition: string(t), Edition: theirs.Edition, Changes: changes(mine, theirs)}
}

// changes lists lines and verdicts that differ, in words.
func changes(a, b Market) []string {
	out := []string{}
	was, order := shown(a)
	is, more := shown(b)
	for _, k := range append(order, more...) {
		if was[k] != is[k] {
			out = append(out, k+": "+orNothing(was[k])+" -> "+orNothing(is[k]))
			was[k] = is[k]
		}
	}
	return out
}

func orNothing(s string) string {
	if s == "" {
		return "nothing"
	}
	return s
}

func shown(m Market) (map[string]string, []string) {
	out := map[string]string{}
	var order []string
	put := func(k, v string) {
		if _, ok := out[k]; !ok {
			order = append(order, k)
		}
		out[k] = v
	}
	for _, l := range m.Declaration.Lines {
		if l.Presence == "optional" {
			continue
		}
		for _, v := range l.Values {
			s := v.Text
			if v.PercentReference != nil && v.PercentReference.Text != "" {
				s += " (" + v.PercentReference.Text + ")"
			}
			put(l.Quantity+" per "+v.Basis, s)
		}
	}
	for _, c := range m.Claims {
		put("claim “"+c.Asked+"”", c.Verdict)
	}
	return out, order
}
