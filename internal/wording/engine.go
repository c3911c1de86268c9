package wording

import (
	"fmt"
	"slices"
	"strings"
	"sync"
	"unicode/utf8"

	tags "golang.org/x/text/language"

	"gramlaw/internal/rulebook"
)

// MaxText is the longest text that is read, in code points.
const MaxText = 2000

// An Engine reads texts with the words of one book. It may be used by many at once.
type Engine struct {
	book      *rulebook.Book
	languages map[string]func() (*language, error) // compiled when first asked for
}

// kept is the key of what a book and its laws remember for this package.
type kept string

// Of is the engine of a book, always the same one. A language is compiled when it is first read, once; one whose words cannot be compiled is a
// *Fault then. Tests hold the book's own files free of that.
func Of(book *rulebook.Book) *Engine {
	return book.Memo.Keep(kept("engine"), func() any {
		e := &Engine{book: book, languages: map[string]func() (*language, error){}}
		for _, code := range book.Languages() {
			e.languages[code] = sync.OnceValues(func() (*language, error) {
				data, _ := book.Language(code)
				return compile(data)
			})
		}
		return e
	}).(*Engine)
}

// language is a language compiled; nil where the book does not know its words.
func (e *Engine) language(base string) (*language, error) {
	compiled, ok := e.languages[base]
	if !ok {
		return nil, nil
	}
	l, err := compiled()
	if err != nil {
		return nil, &Fault{CodeWords, err.Error(), "language"}
	}
	return l, nil
}

// A Fault tells why a text is not read.
type Fault struct {
	Code, Says string
	Member     string // "text" or "language"
}

func (f *Fault) Error() string { return f.Says }

// Codes of faults. They are stable.
const (
	CodeEmpty    = "empty-text"
	CodeLong     = "text-too-long"
	CodeBadText  = "bad-text"
	CodeLanguage = "unknown-language"
	CodeWords    = "words-unusable" // of a rule set
)

// Faults tells why a text in a language is not read; none where it is. A language that exists and whose words the book does not know is no
// fault: see Supports. An empty one is English.
func (e *Engine) Faults(text, code string) []*Fault {
	var out []*Fault
	switch n := utf8.RuneCountInString(text); {
	case !utf8.ValidString(text):
		out = append(out, &Fault{CodeBadText, "the text is not valid UTF-8", "text"})
	case strings.TrimSpace(text) == "":
		out = append(out, &Fault{CodeEmpty, "words are wanted, and none are given", "text"})
	case n > MaxText:
		out = append(out, &Fault{CodeLong, fmt.Sprintf("the text has %d characters; at most %d are read", n, MaxText), "text"})
	}
	if _, ok := Base(code); !ok {
		out = append(out, &Fault{CodeLanguage, fmt.Sprintf("%q is no language; write a code such as en or fr", clip(code)), "language"})
	}
	return out
}

// Base is the language of a tag, without region: "fr" of "fr-CA". It reports false for what is no language. None is English.
func Base(code string) (string, bool) {
	if code == "" {
		return "en", true
	}
	tag, err := tags.Parse(code)
	if err != nil || tag == tags.Und {
		return "", false
	}
	base, _ := tag.Base()
	return base.String(), true
}

// Supports tells whether the book knows the words of a language.
func (e *Engine) Supports(code string) bool {
	base, ok := Base(code)
	return ok && e.languages[base] != nil
}

// Languages lists the languages whose words the book knows.
func (e *Engine) Languages() []string { return e.book.Languages() }

// Read gives the frames of a text, in its order. It knows no law. The error is a *Fault; a language without words gives no frames.
func (e *Engine) Read(text, code string) ([]Frame, error) {
	if f := e.Faults(text, code); len(f) > 0 {
		return nil, f[0]
	}
	base, _ := Base(code)
	l, err := e.language(base)
	if l == nil {
		return nil, err
	}
	r := l.reader(text)
	return r.read(nil, text), nil
}

// read chooses among the matches of the language, and of a law's wordings where they are given.
func (r *reader) read(listed *wordings, text string) []Frame {
	byStart := make([][]match, len(r.tokens))
	if listed != nil {
		r.matches(listed.trie, listed.vocabulary.ids(r.tokens), true, byStart)
	}
	r.matches(r.patterns, r.ids, false, byStart)
	taken := best(byStart, func(a, b *match) bool { return a.listed && !b.listed })
	frames := r.frames(taken)
	if listed != nil {
		frames = listed.describe(r, frames, byStart)
	}
	frames = append(r.follow(frames), r.cued(taken)...)
	slices.SortStableFunc(frames, func(a, b Frame) int { return a.from - b.from })
	runes := []rune(text)
	for i := range frames {
		if c := frames[i].compared; c[1] > c[0] {
			frames[i].Compared = string(runes[c[0]:c[1]])
		}
	}
	return frames
}

func clip(s string) string {
	if len(s) > 20 {
		return s[:20] + "…"
	}
	return s
}
