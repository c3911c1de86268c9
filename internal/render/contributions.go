package render

import (
	"strings"

	"gramlaw/internal/check"
)

// contributions lists what each ingredient brings, where the report has it.
func (p *page) contributions(d *check.Table, o Options) {
	started := false
	for i := range d.Lines {
		l := &d.Lines[i]
		for j := range l.Values {
			v := &l.Values[j]
			if len(v.Contributions) == 0 || l.Presence == "optional" && l.Status != determined {
				continue
			}
			if !started {
				p.heading("Where the values come from", '-')
				started = true
			}
			p.derivation(term(l, o)+" per "+v.Basis+": "+exactly(v), v)
		}
	}
}

func (p *page) derivation(title string, v *check.Value) {
	p.blank()
	p.hang(2, 4, "", title+" ("+strings.Trim(v.Rule+"; "+v.Source, "; ")+")")
	t := table{gap: 2}
	var nothing []string
	for _, c := range v.Contributions {
		if c.Low == "0" && c.High == "0" {
			nothing = append(nothing, c.Ingredient)
			continue
		}
		t.row(cell{text: c.Ingredient}, cell{text: exactly(&check.Value{Exact: c.Value, Low: c.Low, High: c.High, Unit: v.Unit})})
	}
	p.table(4, t)
	if len(nothing) > 0 {
		p.line(4, "nothing from "+strings.Join(nothing, ", "))
	}
}
