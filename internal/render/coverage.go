package render

import (
	"encoding/json"
	"fmt"
	"io"
	"strconv"
	"strings"

	"gramlaw/internal/coverage"
)

// Coverage writes what a rule set covers as a text of at most Width columns. The error is the writer's.
func Coverage(w io.Writer, r *coverage.Report) error {
	p := &page{}
	p.heading("Rule set "+r.Version+" ("+digest(r.Digest)+")", '=')
	p.line(0, "Rules, their dated versions, and of the versions: how well they are known (seen: official text seen; second: from "+
		"a secondary source; memory: text not seen) and how binding they are (law; guide: guidance; policy: enforcement policy; habit: practice).")
	for i := range r.Markets {
		p.covered(&r.Markets[i])
	}
	p.heading("Caution", '=')
	p.line(0, r.Caution)
	_, err := io.WriteString(w, p.String())
	return err
}

// CoverageJSON writes the same as JSON; the same rule set gives the same bytes. The error is the writer's.
func CoverageJSON(w io.Writer, r *coverage.Report) error {
	e := json.NewEncoder(w)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	return e.Encode(r)
}

// grades are the columns, in order, with a short head.
var grades = []struct{ evidence, force, head string }{
	{"official text", "", "seen"}, {"secondary", "", "second"}, {"memory", "", "memory"},
	{"", "law", "law"}, {"", "guidance", "guide"}, {"", "enforcement policy", "policy"}, {"", "practice", "habit"},
}

func (p *page) covered(m *coverage.Market) {
	title := m.Name + " (" + m.Jurisdiction + ")"
	if len(m.Editions) > 0 {
		title += ", " + plural(len(m.Editions), "edition ", "editions ") + strings.Join(m.Editions, ", ")
	}
	p.heading(title, '-')
	if len(m.Languages) > 0 {
		p.line(0, "Languages: "+strings.Join(m.Languages, ", ")+".")
	}
	t := table{gap: 1}
	head := []cell{{text: "Kind"}, {text: "Rules", right: true}, {text: "Versions", right: true}}
	lines := []cell{{text: rule}, {text: rule}, {text: rule}}
	for _, g := range grades {
		head, lines = append(head, cell{text: g.head, right: true}), append(lines, cell{text: rule})
	}
	t.row(head...)
	t.row(lines...)
	for i := range m.Kinds {
		t.row(counted(&m.Kinds[i])...)
	}
	t.row(counted(&m.Total)...)
	t.row(shares(&m.Total)...)
	p.blank()
	p.table(0, t)
	if len(m.Gaps) > 0 {
		p.blank()
		p.line(0, fmt.Sprintf("Known to be missing (%d):", len(m.Gaps)))
		p.items(m.Gaps)
	}
}

func counted(k *coverage.Kind) []cell {
	row := []cell{{text: strings.ReplaceAll(k.Kind, "_", " ")}, {text: strconv.Itoa(k.Rules), right: true}, {text: strconv.Itoa(k.Versions), right: true}}
	for _, g := range grades {
		row = append(row, cell{text: strconv.Itoa(k.Evidence[g.evidence] + k.Force[g.force]), right: true})
	}
	return row
}

// shares are the grades in whole per cent of the versions.
func shares(k *coverage.Kind) []cell {
	row := []cell{{text: "share"}, {}, {}}
	for _, g := range grades {
		n := k.Evidence[g.evidence] + k.Force[g.force]
		row = append(row, cell{text: strconv.Itoa((200*n+k.Versions)/max(2*k.Versions, 1)) + bond + "%", right: true})
	}
	return row
}
