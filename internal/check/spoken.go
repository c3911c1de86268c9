package check

import (
	"cmp"
	"strings"

	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
)

// A spoken claim is one that a recipe asks for, by its name or by words. Words that are several claims are several of these.
type spoken struct {
	recipe.Claim
	reading *wording.Reading // where the words equal no listed wording and were read
	none    bool             // nothing was read in them
}

// spoken reads the claims that are given by words. Words that equal a listed wording need no reading.
func (m *market) spoken(asked []recipe.Claim) []spoken {
	var out []spoken
	for _, a := range asked {
		same := a
		if _, listed := m.find(&same); a.Text == "" || listed {
			out = append(out, spoken{Claim: a})
			continue
		}
		out = append(out, m.heard(a)...)
	}
	return out
}

// heard reads words. Without words of their language they stay unread.
func (m *market) heard(a recipe.Claim) []spoken {
	engine := wording.Of(m.c.book)
	language := cmp.Or(a.Language, m.language())
	if !engine.Covers(m.law, language) || !m.covered() {
		return []spoken{{Claim: a}}
	}
	readings, err := engine.Judge(m.law, a.Text, language)
	if err != nil {
		return []spoken{{Claim: a}}
	}
	if len(readings) == 0 {
		return []spoken{{Claim: a, none: true}}
	}
	out := make([]spoken, len(readings))
	for i := range readings {
		r := &readings[i]
		out[i] = spoken{Claim: a, reading: r}
		if !r.Is() || r.Negated {
			continue
		}
		out[i].Claim.Claim = r.Claim.Name()
		if a.Stated == nil {
			out[i].Stated = stated(r)
		}
		out[i].Against = cmp.Or(a.Against, against(r, m.c.recipe))
	}
	return out
}

// told adds what the words are to the verdict on them.
func (s *spoken) told(out *Claim) {
	switch {
	case s.none:
		out.Verdict, out.Printable = NotListed, true
		out.Matched, out.Why = rulebook.MatchNone, "no nutrition or health claim was read in these words; they must be true and not mislead"
		return
	case s.reading == nil:
		return
	}
	r := s.reading
	out.Words, out.Matched = r.Text, r.Matched
	switch {
	case r.Matched == rulebook.MatchForbidden:
		out.Verdict, out.Printable, out.Why = Refused, false, r.Says
	case r.Is() && !r.Negated:
	case r.Matched == rulebook.MatchNone, r.Matched == rulebook.MatchAmount:
		out.Verdict, out.Printable, out.Why = NotListed, true, r.Says
	default:
		out.Why = s.unread()
	}
}

// unread tells of words that are no claim the law lists, and which are nearest.
func (s *spoken) unread() string {
	why := cmp.Or(s.reading.Says, "the words make a nutrition or health statement that equals no claim of this market")
	var near []string
	for _, c := range s.reading.Nearest {
		near = append(near, c.Name())
	}
	if len(near) > 0 {
		why += "; nearest are " + strings.Join(near, ", ")
	}
	return why
}
