package wording

import (
	"slices"
	"strings"

	"gramlaw/internal/rulebook"
)

// wordings are the wordings that a law lists in one language.
type wordings struct {
	*trie
	of []listed
}

// A listed wording is of one claim.
type listed struct {
	claim  rulebook.Active[rulebook.Claim]
	health bool
	how    string // prescribed or listed
	blank  bool   // the wording holds a place for a number
}

// leastWords is how many words of a wording with blanks in it must stand together to be known by.
const leastWords = 6

// wordingsOf compiles what a law lists in a language, once.
func wordingsOf(law *rulebook.Law, l *language) *wordings {
	return law.Memo.Keep(kept("wordings/"+l.code), func() any {
		w := &wordings{trie: newTrie(vocabulary{})}
		page := law.Page()
		if page == nil {
			return w
		}
		w.claims(law.Claims.All, l, false, page.Listed)
		w.claims(law.HealthClaims.All, l, true, page.Health)
		return w
	}).(*wordings)
}

func (w *wordings) claims(claims []rulebook.Active[rulebook.Claim], l *language, health bool, how string) {
	for _, c := range claims {
		end := int32(len(w.of))
		w.of = append(w.of, listed{c, health, how, false}, listed{c, health, how, true})
		for _, text := range c.Body.Wordings[l.code] {
			for _, way := range writtenOut(text, l.decimal, c.Body.Stated) {
				at := end
				if len(slotsOf(way)) > 0 {
					at++
				}
				w.add(way, at)
			}
		}
	}
}

// writtenOut turns a wording into patterns: a place for a number takes an amount, a per cent or a bare number, and of a wording with
// other blanks the longest piece without one counts.
func writtenOut(text string, decimal rune, stated *rulebook.Stated) [][]item {
	before, after, ok := strings.Cut(text, "{number}")
	if !ok {
		if way := longestPiece(text, decimal); len(way) > 0 {
			return [][]item{way}
		}
		return nil
	}
	p := &parser{decimal: decimal}
	var out [][]item
	for _, s := range []slot{amountSlot, energySlot, percentSlot} {
		if s == percentSlot && stated != nil && slices.Contains(plainAmounts, stated.As) {
			continue
		}
		out = append(out, slices.Concat(p.plain(before), []item{{slot: s}}, p.plain(after)))
	}
	return out
}

func slotsOf(way []item) []item {
	return slices.DeleteFunc(slices.Clone(way), func(i item) bool { return i.slot == noSlot })
}

// plainAmounts are stated numbers that are never a per cent.
var plainAmounts = []string{"amount", "at most", "declared amount"}

// longestPiece is a wording, or its longest piece between blanks such as [name of food].
func longestPiece(text string, decimal rune) []item {
	p := &parser{decimal: decimal}
	pieces := strings.FieldsFunc(text, func(c rune) bool { return strings.ContainsRune("[]()<>_", c) })
	if len(pieces) == 1 && len(pieces[0]) == len(text) {
		return p.unended(text)
	}
	var best []item
	for _, piece := range pieces {
		if way := p.unended(piece); len(way) > len(best) {
			best = way
		}
	}
	if len(best) < leastWords {
		return nil
	}
	return best
}

// unended is plain words without the mark at their end.
func (p *parser) unended(text string) []item {
	way := p.plain(text)
	for len(way) > 0 && strings.Trim(way[len(way)-1].word, ".,;:!?") == "" {
		way = way[:len(way)-1]
	}
	return way
}

// describe lets the words of a language tell what a listed wording says: its component, relation and number.
func (w *wordings) describe(r *reader, frames []Frame, byStart [][]match) []Frame {
	for i := range frames {
		f := &frames[i]
		if f.listed < 0 {
			continue
		}
		for k := range byStart[f.from] {
			m := &byStart[f.from][k]
			if m.listed || m.end != f.upTo || r.rules[m.leads].decoy {
				continue
			}
			told := r.spread(m, r.rules[m.leads])[0]
			told.listed = f.listed
			*f = told
			break
		}
		w.name(f)
	}
	return frames
}

// name takes the subject of a claim for a component that the words do not name.
func (w *wordings) name(f *Frame) {
	if f.Component == "" && f.Thing == "" && f.Function == "" {
		if about := w.of[f.listed].claim.Body.About; len(about) == 1 {
			f.Component = about[0]
		}
	}
}
