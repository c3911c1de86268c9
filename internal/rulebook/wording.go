package rulebook

import (
	"slices"
	"strings"
)

// A Wording says which frames of words are which claims of the law. The first rule, in the order of the file, that takes a frame and
// whose claim the law lists decides.
type Wording struct {
	Relations  []string `json:"relations,omitzero"`  // frames with one of these relations
	Things     bool     `json:"things,omitzero"`     // frames about what is no nutrient, whatever the relation; other rules take none of them
	Components []string `json:"components,omitzero"` // about one of these; none is any
	Functions  []string `json:"functions,omitzero"`  // of one of these functions of the body; none is any
	Forms      []string `json:"forms,omitzero"`      // said in one of these ways; none is any
	Bare       bool     `json:"bare,omitzero"`       // frames that name neither component nor function
	Percent    string   `json:"percent,omitzero"`    // frames that state just this per cent
	Amount     string   `json:"amount,omitzero"`     // one of FrameAmounts: how much is stated
	Claims     []string `json:"claims,omitzero"`     // shared names in order of preference; {component} and {function} are filled in
	Matched    string   `json:"matched,omitzero"`    // one of Matches, where it is not the same meaning
	Says       Words    `json:"says,omitzero"`

	// Of the one rule that is about all words of a market:
	Languages []string `json:"languages,omitzero"` // of labels
	Listed    string   `json:"listed,omitzero"`    // what the wordings of claims.json are: "prescribed" or "listed"
	Health    string   `json:"health,omitzero"`    // the same of health_claims.json
}

// FrameAmounts tell frames apart by the number they state.
var FrameAmounts = []string{"none", "zero", "above zero", "percent"}

// Matches tell how words were matched.
const (
	MatchPrescribed = "prescribed"
	MatchListed     = "listed"
	MatchMeaning    = "same meaning"
	MatchForbidden  = "forbidden form"
	MatchAmount     = "amount statement"
	MatchHealth     = "health statement"
	MatchNone       = "no nutrition claim"
	MatchNothing    = "unmatched"
	MatchPassed     = "passed over" // nothing that the law or this rule set looks at; there is no reading
)

// matches are those that a rule may give.
var matches = []string{"", MatchMeaning, MatchForbidden, MatchAmount, MatchHealth, MatchNone, MatchNothing, MatchPassed}

// Page is the rule about all words of the market; nil where the law says nothing of words.
func (l *Law) Page() *Wording {
	for i := range l.Wordings.All {
		if w := l.Wordings.All[i].Body; len(w.Languages) > 0 {
			return w
		}
	}
	return nil
}

func (c *checker) wordings() {
	bodies(c.m.Wordings, func(id, field string, w *Wording) {
		bad := func(f, format string, args ...any) { c.bad("wording", id, field+f, format, args...) }
		if page := len(w.Languages) > 0; page == (len(w.Relations) > 0 || w.Things) {
			bad("", "is about relations, about things, or about all words of the market")
		} else if page {
			c.wordingPage(bad, w)
			return
		}
		for _, r := range w.Relations {
			c.concept(bad, "/relations", r, c.book.concepts.Relations)
		}
		for _, q := range w.Components {
			c.concept(bad, "/components", q, c.book.concepts.Components)
		}
		for _, f := range w.Functions {
			c.concept(bad, "/functions", f, c.book.concepts.Functions)
		}
		if !slices.Contains(append([]string{""}, FrameAmounts...), w.Amount) {
			bad("/amount", "%q is none of %s", w.Amount, strings.Join(FrameAmounts, ", "))
		}
		if !slices.Contains(matches, w.Matched) {
			bad("/matched", "%q is no way to match", w.Matched)
		}
		if len(w.Claims) == 0 && w.Matched == "" {
			bad("", "leads to nothing: claims or matched is wanted")
		}
	})
}

func (c *checker) concept(bad func(string, string, ...any), at, name string, known []string) {
	if !slices.Contains(known, name) {
		bad(at, "%q is no concept of words/concepts.json", name)
	}
}

func (c *checker) wordingPage(bad func(string, string, ...any), w *Wording) {
	for at, s := range map[string]string{"/listed": w.Listed, "/health": w.Health} {
		if s != MatchPrescribed && s != MatchListed {
			bad(at, "%q is neither prescribed nor listed", s)
		}
	}
}
