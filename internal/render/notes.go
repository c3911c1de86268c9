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

// presumed lists what practice takes where nobody stated a value, once for all markets: a paragraph for a rule.
func (p *page) presumed(markets []check.Market) {
	in := map[check.Presumed][]string{}
	var order []check.Presumed
	for i := range markets {
		for _, x := range markets[i].Presumed {
			if in[x] == nil {
				order = append(order, x)
			}
			in[x] = append(in[x], markets[i].Name)
		}
	}
	if len(order) == 0 {
		return
	}
	p.heading("Presumed by practice, not stated by anyone", '-')
	for _, b := range presumptions(order, in, len(markets)).list {
		p.item(2, sentence(b.key[1])+" "+strings.Join(b.names, "; ")+". ["+b.key[0]+"]")
	}
}

// presumptions joins the foods of a component under a rule, then components with the same foods. The keys are rule and
// reason; the names say what is taken, and where if not in all markets.
func presumptions(list []check.Presumed, in map[check.Presumed][]string, all int) bundles {
	var foods, components, out bundles
	for _, x := range list {
		where := ""
		if len(in[x]) < all {
			where = " (" + strings.Join(in[x], ", ") + ")"
		}
		foods.add(x.Ingredient, x.Rule, x.Reason, x.Taken, where, x.Component)
	}
	for _, b := range foods.list {
		components.add(b.key[4], b.key[0], b.key[1], b.key[2], b.key[3], strings.Join(b.names, ", "))
	}
	for _, b := range components.list {
		out.add(strings.Join(b.names, ", ")+" taken as "+b.key[2]+" in "+b.key[4]+b.key[3], b.key[:2]...)
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
	var parts []string
	for _, a := range list {
		parts = append(parts, a.Fact+" “"+a.Taken+"” ("+a.Why+")")
	}
	if len(parts) > 0 {
		p.blank()
		p.run("Assumed, because the recipe does not say", strings.Join(parts, "; ")+".")
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

// gaps counts the known gaps of the rules, or lists them.
func (p *page) gaps(gaps []string, o Options) {
	if len(gaps) == 0 {
		return
	}
	if o.Gaps {
		p.heading("Known gaps of these rules", '-')
		p.items(gaps)
		return
	}
	s := fmt.Sprintf("These rules have %d known %s", len(gaps), plural(len(gaps), "gap", "gaps"))
	if o.GapsHint != "" {
		s += "; " + o.GapsHint
	}
	p.blank()
	p.line(0, s+".")
}
