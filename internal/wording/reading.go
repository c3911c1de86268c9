package wording

import (
	"slices"
	"strings"

	"gramlaw/internal/rulebook"
)

// A Reading is what some words of a text are in one law.
type Reading struct {
	Frame
	Text    string // the words
	Claim   rulebook.Active[rulebook.Claim]
	Health  bool // Claim is a health claim
	Matched string
	Says    string // what is to be said of it, in English
	Rule    string // identifier of the rule of wording that decided; empty for listed words
	Source  *rulebook.Source
	Nearest []rulebook.Active[rulebook.Claim] // listed claims nearest to words that are none
}

// Is tells whether the words are a claim that the law lists.
func (r *Reading) Is() bool { return r.Claim.Body != nil }

// Covers tells whether a law takes labels in a language, so that words of it are judged.
func (e *Engine) Covers(law *rulebook.Law, code string) bool {
	base, ok := Base(code)
	page := law.Page()
	return ok && e.languages[base] != nil && page != nil && slices.Contains(page.Languages, base)
}

// Judge gives the readings of a text in a law, in its order. The error is a *Fault; words of a language that the law or the book does not
// cover (see Covers) give no reading.
func (e *Engine) Judge(law *rulebook.Law, text, code string) ([]Reading, error) {
	if f := e.Faults(text, code); len(f) > 0 {
		return nil, f[0]
	}
	if !e.Covers(law, code) {
		return nil, nil
	}
	base, _ := Base(code)
	l, err := e.language(base)
	if err != nil {
		return nil, err
	}
	w := wordingsOf(law, l)
	j := &judge{law: law, wordings: w}
	runes := []rune(text)
	var out []Reading
	for _, f := range l.reader(text).read(w, text) {
		reading := j.read(f)
		reading.Text = string(runes[f.Span[0]:f.Span[1]])
		if reading.Matched != rulebook.MatchPassed {
			out = append(out, reading)
		}
	}
	return out, nil
}

// A judge tells frames what they are in a law.
type judge struct {
	law      *rulebook.Law
	wordings *wordings
}

func (j *judge) read(f Frame) Reading {
	r := Reading{Frame: f}
	switch {
	case f.Negated:
		r.Matched, r.Says = rulebook.MatchNone, "the words deny it"
	case f.listed >= 0:
		l := &j.wordings.of[f.listed]
		j.byRule(&r)
		if l.blank && r.Is() && r.Claim.ID != l.claim.ID { // a rule knows what the number makes of it
			break
		}
		if r.Claim.ID != l.claim.ID || r.Matched == rulebook.MatchMeaning {
			r.Says, r.Rule, r.Matched = "", "", l.how
		}
		r.Claim, r.Health, r.Source = l.claim, l.health, &l.claim.Head.Source
	default:
		j.byRule(&r)
	}
	if !r.Is() && r.Matched != rulebook.MatchNone && r.Matched != rulebook.MatchAmount {
		r.Nearest = j.nearest(&r.Frame)
	}
	return r
}

// byRule finds the first rule that takes the frame and leads to something.
func (j *judge) byRule(r *Reading) {
	r.Matched = rulebook.MatchNothing
	for i := range j.law.Wordings.All {
		rule := &j.law.Wordings.All[i]
		w := rule.Body
		if !takes(w, &r.Frame) {
			continue
		}
		if !j.claim(r, w) && w.Matched == "" {
			continue
		}
		r.Matched, r.Says, r.Rule, r.Source = w.Matched, w.Says.In("en"), rule.ID, &rule.Head.Source
		if r.Matched == "" {
			r.Matched = rulebook.MatchMeaning
		}
		return
	}
}

// takes tells whether a rule is about a frame.
func takes(w *rulebook.Wording, f *Frame) bool {
	in := func(list []string, name string) bool { return len(list) == 0 || slices.Contains(list, name) }
	if w.Things || f.Thing != "" {
		return w.Things && f.Thing != "" && in(w.Relations, f.Relation)
	}
	if !slices.Contains(w.Relations, f.Relation) || !in(w.Components, f.Component) || !in(w.Functions, f.Function) || !in(w.Forms, f.Form) {
		return false
	}
	if w.Bare && (f.Component != "" || f.Function != "") || w.Percent != "" && w.Percent != f.Percent {
		return false
	}
	switch w.Amount {
	case "none":
		return f.Amount == "" && f.Percent == ""
	case "zero":
		return f.Zero()
	case "above zero":
		return f.Amount != "" && !f.Zero()
	case "percent":
		return f.Percent != ""
	}
	return true
}

// claim finds the first claim of a rule that the law lists.
func (j *judge) claim(r *Reading, w *rulebook.Wording) bool {
	for _, form := range w.Claims {
		for _, name := range filled(form, &r.Frame) {
			if c, ok := j.law.Claims.Get(name); ok {
				r.Claim = c
				return true
			}
			if c, ok := j.law.HealthClaims.Get(name); ok {
				r.Claim, r.Health = c, true
				return true
			}
		}
	}
	return false
}

// filled writes out a claim's name for the component of a frame, or for each component that a function of the body may be said of.
func filled(form string, f *Frame) []string {
	form = strings.ReplaceAll(form, "{function}", f.Function)
	subjects := []string{f.Component}
	if f.Function != "" {
		subjects = f.Subjects
	}
	if !strings.Contains(form, "{component}") {
		return []string{form}
	}
	var out []string
	for _, s := range subjects {
		if s != "" {
			out = append(out, strings.ReplaceAll(form, "{component}", s))
		}
	}
	return out
}

// mostNearest bounds the nearest claims that are told.
const mostNearest = 4

// nearest lists claims about the same component or function of the body, those first that the relation's rules speak of.
func (j *judge) nearest(f *Frame) []rulebook.Active[rulebook.Claim] {
	about := func(name string) bool {
		if f.Function != "" {
			return strings.HasSuffix(name, "-"+f.Function) || strings.Contains(name, "-"+f.Function+"-")
		}
		rest, ok := strings.CutPrefix(name, f.Component+"-")
		return ok && f.Component != "" && !strings.Contains(rest, "-")
	}
	var out []rulebook.Active[rulebook.Claim]
	list := j.law.Claims.All
	if f.Function != "" {
		list = j.law.HealthClaims.All
	}
	for _, c := range list {
		if about(c.Name()) && !c.Body.Prohibited && c.Body.Condition != nil {
			out = append(out, c)
		}
	}
	slices.SortStableFunc(out, func(a, b rulebook.Active[rulebook.Claim]) int {
		return j.distance(f, a.Name()) - j.distance(f, b.Name())
	})
	return out[:min(len(out), mostNearest)]
}

// distance puts claims first that the words are nearest to.
func (j *judge) distance(f *Frame, name string) int {
	switch {
	case f.Function != "" && slices.ContainsFunc(f.Subjects, func(s string) bool { return strings.HasPrefix(name, s+"-") }):
		return 0
	case f.Relation != "" && strings.HasSuffix(name, "-"+f.Relation):
		return 0
	}
	return 1
}
