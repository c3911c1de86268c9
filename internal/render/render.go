// Package render writes a report for people and programs: Text for an 80-column terminal, JSON for everything else.
//
// Nothing is computed here and nothing is left out of JSON. Text shortens long numbers and marks them with "≈"; it never
// shortens one past the threshold it is compared with.
package render

import (
	"fmt"
	"io"

	"gramlaw/internal/check"
)

// Options say how a text is written.
type Options struct {
	Language string // of terms, printed values and statements; "" is each market's first
	Gaps     bool   // list the known gaps of the rules instead of counting them
	GapsHint string // tells the reader how to get the list
}

// Text writes the report in plain UTF-8, never wider than Width columns. Control and direction characters of names are
// replaced, so that a document cannot steer the terminal. The error is the writer's.
func Text(w io.Writer, r *check.Report, o Options) error {
	p := &page{}
	p.front(r)
	for i := range r.Jurisdictions {
		p.market(r, &r.Jurisdictions[i], o)
	}
	p.presumed(r.Jurisdictions)
	p.heading("Caution", '=')
	p.line(0, r.Caution)
	_, err := io.WriteString(w, p.String())
	return err
}

// front tells what was checked, and how it ended in each market.
func (p *page) front(r *check.Report) {
	p.heading(r.Recipe.Name, '=')
	p.line(0, fmt.Sprintf("Recipe %s (%s), %s of finished food.", r.Recipe.ID, digest(r.Recipe.Digest), spaced(r.Composition.Mass)))
	p.line(0, fmt.Sprintf("Labelling date %s; of two editions in force at once, the %s one.", r.Date, r.Transition))
	p.line(0, fmt.Sprintf("Rule set %s (%s).", r.Rules.Version, digest(r.Rules.Digest)))
	t := table{gap: 2}
	for i := range r.Jurisdictions {
		m := &r.Jurisdictions[i]
		t.row(cell{text: m.Name}, cell{text: outcome(m)})
	}
	p.blank()
	p.table(2, t)
	if len(r.Findings) > 0 {
		p.heading("About the recipe", '-')
		p.findings(r.Findings)
	}
}

// digest is the beginning of a digest, enough to tell two apart.
func digest(s string) string {
	const most = len("sha256:") + 12
	if len(s) <= most {
		return s
	}
	return s[:most] + "…"
}

// market writes one jurisdiction's part.
func (p *page) market(r *check.Report, m *check.Market, o Options) {
	title := m.Name
	if m.Edition != "" {
		title += ", edition " + m.Edition
	}
	p.heading(fmt.Sprintf("%s, labelled on %s", title, r.Date), '=')
	p.declaration(m, o)
	p.claims(m, o)
	if len(m.FrontOfPack) > 0 {
		p.heading("Front of pack", '-')
		p.items(m.FrontOfPack)
	}
	if len(m.NotJudged) > 0 {
		p.heading("Not judged here, and needed", '-')
		p.items(m.NotJudged)
	}
	if len(m.Findings) > 0 {
		p.heading("Findings", '-')
		p.findings(m.Findings)
	}
	p.naming(m.Naming)
	p.assumed(m.Assumed)
	p.other(m.Other)
	p.gaps(m.Gaps, o)
	if m.Caution != "" {
		if o.Gaps || len(m.Gaps) == 0 {
			p.blank()
		}
		p.line(0, m.Caution)
	}
}
