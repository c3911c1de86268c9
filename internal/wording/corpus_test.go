package wording_test

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
	"gramlaw/rules"
)

// corpusDate is the labelling date of the corpora.
const corpusDate = "2026-12-01"

var loaded = sync.OnceValues(func() (*rulebook.Book, error) { return rulebook.Load(rules.FS) })

func engine(t testing.TB) (*rulebook.Book, *wording.Engine) {
	t.Helper()
	book, err := loaded()
	if err != nil {
		t.Fatal(err)
	}
	return book, wording.Of(book)
}

func lawOf(book *rulebook.Book, j string) *rulebook.Law {
	law, _ := book.At(j, corpusDate, rulebook.WhenRequired, func(*rulebook.Condition) quantity.Truth { return quantity.Open })
	return law
}

// A phrase of a corpus, with the readings expected in each market.
type phrase struct {
	Text     string                `json:"text"`
	Language string                `json:"language"`
	Kind     string                `json:"kind"`
	Source   string                `json:"source"`
	Expect   map[string][]expected `json:"expect"`
	HeldOut  bool                  `json:"held_out"`
}

// An expected reading: of which claim, or none; the rest counts where it is stated.
type expected struct {
	Claim   *string `json:"claim"`
	Matched string  `json:"matched"`
	Percent string  `json:"percent"`
	Amount  string  `json:"amount"`
	Words   string  `json:"words"`
}

func corpus(t testing.TB, heldOut bool) map[string][]phrase {
	t.Helper()
	files, err := filepath.Glob("../../testdata/wording/*.json")
	if err != nil {
		t.Fatal(err)
	}
	out := map[string][]phrase{}
	for _, file := range files {
		if strings.HasPrefix(filepath.Base(file), "held_out_") != heldOut {
			continue
		}
		doc, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		var list []phrase
		if err := json.Unmarshal(doc, &list); err != nil {
			t.Fatalf("%s: %v", file, err)
		}
		for _, p := range list {
			out[p.Language] = append(out[p.Language], p)
		}
	}
	return out
}

// claims are the matches that say that the words are a claim.
var claims = []string{rulebook.MatchPrescribed, rulebook.MatchListed, rulebook.MatchMeaning, rulebook.MatchHealth}

// fits tells whether a reading is the expected one.
func (x *expected) fits(r *wording.Reading, text string) bool {
	name := ""
	if r.Is() && r.Matched != rulebook.MatchNone {
		name = r.Claim.Name()
	}
	wanted := ""
	if x.Claim != nil {
		wanted = *x.Claim
	}
	switch {
	case name != wanted && !(r.Is() && slices.Contains(r.Claim.Body.AlsoNamed, wanted)):
		return false
	case x.Matched != "" && x.Matched != r.Matched && !(wanted != "" && slices.Contains(claims, x.Matched) && slices.Contains(claims, r.Matched) && !(x.Matched == rulebook.MatchHealth && !r.Health)):
		return false
	case x.Percent != "" && x.Percent != r.Percent, x.Amount != "" && !strings.HasPrefix(x.Amount, r.Amount):
		return false
	}
	return x.Words == "" || overlaps(x.Words, r, text)
}

// overlaps tells whether the words, wherever they stand, share a character with the reading.
func overlaps(words string, r *wording.Reading, text string) bool {
	at := strings.Index(text, words)
	if at < 0 {
		return false
	}
	from := len([]rune(text[:at]))
	return from < r.Span[1] && r.Span[0] < from+len([]rune(words))
}

// A score counts readings that are expected, those that are not, and those that lack.
type score struct{ right, extra, lacking, phrases, whole int }

func (s *score) add(o score) {
	s.right, s.extra, s.lacking = s.right+o.right, s.extra+o.extra, s.lacking+o.lacking
}

func (s score) String() string {
	return fmt.Sprintf("precision %.3f, recall %.3f (%d right, %d too many, %d missed), %d of %d phrases whole", s.precision(), s.recall(), s.right, s.extra, s.lacking, s.whole, s.phrases)
}

func (s score) precision() float64 { return float64(s.right) / float64(max(1, s.right+s.extra)) }
func (s score) recall() float64    { return float64(s.right) / float64(max(1, s.right+s.lacking)) }

// judge compares the readings of a phrase in one market with what is expected.
func (p *phrase) judge(t testing.TB, book *rulebook.Book, e *wording.Engine, j string) (s score, got string) {
	t.Helper()
	readings, err := e.Judge(lawOf(book, j), p.Text, p.Language)
	if err != nil {
		t.Fatalf("%s: %v", p.Text, err)
	}
	left := slices.Clone(p.Expect[j])
	for i := range readings {
		r := &readings[i]
		got += fmt.Sprintf("\n\t\t%q %s %s %s=%s%s%s %s%%", r.Text, rulebook.Name(r.Claim.ID), r.Matched, r.Relation, r.Component, r.Thing, r.Function, r.Percent)
		k := slices.IndexFunc(left, func(x expected) bool { return x.fits(r, p.Text) })
		if k < 0 {
			s.extra++
			continue
		}
		left = slices.Delete(left, k, k+1)
		s.right++
	}
	s.lacking = len(left)
	for _, x := range left {
		c := "none"
		if x.Claim != nil {
			c = *x.Claim
		}
		got += fmt.Sprintf("\n\t\tmissing: %s %s %q", c, x.Matched, x.Words)
	}
	return s, got
}

// Every phrase of the corpora that the grammar is tuned on is read as expected, in every market.
func TestTunedCorpus(t *testing.T) {
	book, e := engine(t)
	for language, phrases := range corpus(t, false) {
		if !e.Supports(language) {
			continue
		}
		total := score{}
		for i := range phrases {
			p := &phrases[i]
			whole := true
			for _, j := range book.Jurisdictions() {
				if _, stated := p.Expect[j]; !stated || !e.Covers(lawOf(book, j), language) {
					continue
				}
				s, got := p.judge(t, book, e, j)
				total.add(s)
				if s.extra+s.lacking > 0 {
					whole = false
					t.Errorf("%s %s: %q (%s)%s", language, j, p.Text, p.Kind, got)
				}
			}
			total.phrases++
			if whole {
				total.whole++
			}
		}
		t.Logf("tuned %s: %v", language, total)
	}
}

// The held-out corpora are measured, and nothing is ever tuned on them: no phrase of them is shown. The README has the figures.
func TestHeldOutCorpus(t *testing.T) {
	book, e := engine(t)
	readme, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	for language, phrases := range corpus(t, true) {
		if !e.Supports(language) {
			continue
		}
		total := measure(t, book, e, phrases, language)
		t.Logf("held out %s: %v", language, total)
		if row := fmt.Sprintf("| %s | %d | %.3f | %.3f |", language, total.phrases, total.precision(), total.recall()); !strings.Contains(string(readme), row) {
			t.Errorf("the README has not the row %s", row)
		}
	}
}

// measure compares phrases with what is expected, and shows none of them.
func measure(t *testing.T, book *rulebook.Book, e *wording.Engine, phrases []phrase, language string) score {
	t.Helper()
	total := score{phrases: len(phrases)}
	for i := range phrases {
		p, whole := &phrases[i], true
		for _, j := range book.Jurisdictions() {
			if _, stated := p.Expect[j]; !stated || !e.Covers(lawOf(book, j), language) {
				continue
			}
			s, _ := p.judge(t, book, e, j)
			total.add(s)
			whole = whole && s.extra+s.lacking == 0
		}
		if whole {
			total.whole++
		}
	}
	return total
}
