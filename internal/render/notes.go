package render

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"gramlaw/internal/check"
)

func sorted[T any](m map[string]T) []string { return slices.Sorted(maps.Keys(m)) }

func (p *page) findings(list []check.Finding) {
	words := map[string]string{"refused": "REFUSED", "open": "NOT DETERMINED", "warning": "warning", "note": "note"}
	for i := range list {
		f := &list[i]
		w, ok := words[f.Severity]
		if !ok {
			w = f.Severity
		}
		s := w + ": " + sentence(strings.TrimPrefix(f.Says, "not determined: "))
		if f.Pointer != "" {
			s += " At " + f.Pointer + "."
		}
		p.hang(0, 2, "", s+" ("+f.Code+")")
		if f.Condition != nil {
			p.decided(2, f.Condition)
		}
		if f.Source != "" {
			p.line(2, "Source: "+sentence(f.Source))
		}
	}
}

// presumedBefore remembers in which market a presumption was told first, so that it is told once.
type presumedBefore map[check.Presumed]string

// presumed lists what practice takes where nobody stated a value: one line for a rule, its components and their foods.
func (p *page) presumed(m *check.Market, told presumedBefore) {
	var fresh []check.Presumed
	var earlier bundles
	for _, x := range m.Presumed {
		if where, ok := told[x]; ok {
			earlier.add("", where)
			continue
		}
		told[x] = m.Name
		fresh = append(fresh, x)
	}
	if len(m.Presumed) == 0 {
		return
	}
	p.heading("Presumed by practice, not stated by anyone", '-')
	for _, e := range earlier.list {
		p.item(2, fmt.Sprintf("%d %s as told for %s.", len(e.names), plural(len(e.names), "presumption", "presumptions"), e.key[0]))
	}
	for _, b := range presumptions(fresh).list {
		p.item(2, strings.Join(b.names, ", ")+" taken as "+b.key[1]+": "+b.key[3])
		p.line(4, "("+sentence(b.key[2])+" Rule "+b.key[0]+".)")
	}
}

// presumptions joins the foods of a component under a rule, then components with the same foods. The keys are rule, what is
// taken, reason and foods.
func presumptions(list []check.Presumed) bundles {
	var by bundles
	for _, x := range list {
		by.add(x.Ingredient, x.Rule, x.Taken, x.Reason, x.Component)
	}
	var out bundles
	for _, b := range by.list {
		out.add(b.key[3], b.key[0], b.key[1], b.key[2], strings.Join(b.names, ", "))
	}
	return out
}

func plural(n int, one, more string) string {
	if n == 1 {
		return one
	}
	return more
}

func (p *page) assumed(list []check.Assumed) {
	if len(list) == 0 {
		return
	}
	p.heading("Assumed, because the recipe does not say", '-')
	for _, a := range list {
		p.item(2, a.Fact+": "+a.Taken+" ("+a.Why+")")
	}
}

func (p *page) other(o *check.Other) {
	if o == nil {
		return
	}
	p.heading("The other edition in force", '-')
	how := "the newest"
	if o.Transition == "required" {
		how = "the one already required"
	}
	s := fmt.Sprintf("Edition %s, %s, may be used on this date too.", o.Edition, how)
	if len(o.Changes) == 0 {
		p.line(0, s+" It would change no line and no verdict.")
		return
	}
	p.line(0, s+" It would change:")
	p.items(o.Changes)
}

func (p *page) gaps(gaps []string, o Options) {
	if len(gaps) == 0 {
		return
	}
	if !o.Gaps {
		s := fmt.Sprintf("These rules have %d known %s", len(gaps), plural(len(gaps), "gap", "gaps"))
		if o.GapsHint != "" {
			s += "; " + o.GapsHint
		}
		p.blank()
		p.line(0, s+".")
		return
	}
	p.heading("Known gaps of these rules", '-')
	p.items(gaps)
}
