package wording_test

import (
	"strings"
	"testing"
	"unicode/utf8"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
)

// hostile are texts that are long, repetitive, of several scripts, written from right to left, or full of what has no width.
func hostile() []string {
	return []string{
		"97 % fat free", "fat\u200bfree", "fa\u0301t fre\u0300e", "ＦＡＴ　ＦＲＥＥ", "\u202eeerf taf\u202c low fat", "شومینه low in fat مرحبا", "low\u00a0in\u2009fat",
		"½ the fat", "1/3 less fat than 1/3", "⁄⁄⁄", "'''fat' free'", "- - low-fat -", "fat-", "1.000,5 g fat", "1\u202f000 mg salt", "٣ g fat", "ﷺ fat free", "zucker- und fettfrei",
		strings.Repeat("fat and ", 240) + "fat", strings.Repeat("low in ", 280), strings.Repeat("no ", 600) + "fat", strings.Repeat("than ", 390), strings.Repeat("not a ", 330) + "low fat",
		strings.Repeat("\u0301", 1990) + "fat", "fat" + strings.Repeat("\u200d", 1900) + " free", strings.Repeat("keeps your heart healthy and ", 68), strings.Repeat("5 g fat per 100 g, ", 100),
		strings.Repeat("vitamins A, C, ", 130), strings.Repeat("ﷺ", 1999), "\n\t\r low \n fat", "100 % 100 % 100 % fat free", strings.Repeat("🥑", 500) + " fat free 🥑",
	}
}

// Spans lie in the text, in its order, and hold the words they say; readings of a law are frames of the text.
func checkSpans(t *testing.T, e *wording.Engine, law *rulebook.Law, text, language string) {
	t.Helper()
	readings, err := e.Judge(law, text, language)
	if err != nil {
		return // a fault of the text
	}
	n, last := utf8.RuneCountInString(text), 0
	runes := []rune(text)
	for i := range readings {
		r := &readings[i]
		if r.Span[0] < 0 || r.Span[1] > n || r.Span[0] >= r.Span[1] {
			t.Fatalf("%q: span %v of %d characters", text, r.Span, n)
		}
		if string(runes[r.Span[0]:r.Span[1]]) != r.Text {
			t.Fatalf("%q: %v is not %q", text, r.Span, r.Text)
		}
		if r.Span[0]+60 < last {
			t.Fatalf("%q: a reading at %d behind one at %d", text, r.Span[0], last)
		}
		last = r.Span[0]
		if r.Matched == "" {
			t.Fatalf("%q: %q is matched by nothing and says nothing of it", text, r.Text)
		}
	}
}

func TestSpansOfHostileTexts(t *testing.T) {
	book, e := engine(t)
	for _, text := range hostile() {
		for _, language := range e.Languages() {
			for _, j := range book.Jurisdictions() {
				checkSpans(t, e, lawOf(book, j), text, language)
			}
		}
	}
}

// What must not matter does not: case, width, accents written either way, joiners and marks of direction; the words keep their span.
func TestWritingDoesNotMatter(t *testing.T) {
	book, e := engine(t)
	for _, c := range []struct{ name, text, words string }{
		{"case", "FAT FREE", "FAT FREE"}, {"hyphen", "Fat-free!", "Fat-free"}, {"full width", "ＦＡＴ　ＦＲＥＥ", "ＦＡＴ　ＦＲＥＥ"},
		{"joiner in a word", "so fa\u200dt free", "fa\u200dt free"}, {"combining mark", "fa\u0301t free", "fa\u0301t free"}, {"marks of direction", "\u200efat\u200f free\u200e", "fat\u200f free"},
		{"behind another script", "سلام fat free", "fat free"}, {"behind an emoji", "🥑 fat free", "fat free"}, {"no-break space", "fat\u00a0free", "fat\u00a0free"}, {"quotation marks", "“fat free”", "fat free"},
		{"on two lines", "fat\nfree", "fat\nfree"}, {"glued", "fatfree", "fatfree"}, {"zero-width space", "fat\u200bfree", "fat\u200bfree"}, {"soft hyphen", "fat\u00adfree", "fat\u00adfree"},
	} {
		t.Run(c.name, func(t *testing.T) {
			readings, err := e.Judge(lawOf(book, "us"), c.text, "en")
			if err != nil || len(readings) != 1 || !readings[0].Is() || readings[0].Claim.Name() != "fat-free" || readings[0].Text != c.words {
				t.Errorf("%q is read as %+v, %v", c.text, readings, err)
			}
		})
	}
}

func TestFaults(t *testing.T) {
	_, e := engine(t)
	for _, c := range []struct{ name, text, language, code string }{
		{"empty", "", "en", wording.CodeEmpty}, {"spaces", " \n\t", "en", wording.CodeEmpty}, {"too long", strings.Repeat("ä", wording.MaxText+1), "en", wording.CodeLong},
		{"not UTF-8", "fat \xff", "en", wording.CodeBadText}, {"no language", "low fat", "zz", wording.CodeLanguage}, {"no code", "low fat", "klingon language", wording.CodeLanguage},
	} {
		t.Run(c.name, func(t *testing.T) {
			faults := e.Faults(c.text, c.language)
			if len(faults) != 1 || faults[0].Code != c.code {
				t.Errorf("%v, want %s", faults, c.code)
			}
		})
	}
	if f := e.Faults(strings.Repeat("ä", wording.MaxText), "fr-CA"); len(f) > 0 {
		t.Errorf("the longest text: %v", f)
	}
	if e.Supports("ja") {
		t.Error("a language without words is supported")
	}
}

func FuzzJudge(f *testing.F) {
	book, e := engine(f)
	for _, text := range hostile() {
		f.Add(text, "en")
	}
	f.Add("Sans matières grasses, 30 % de sucres en moins que l'original", "fr")
	f.Add("zucker- und fettfrei", "de")
	f.Fuzz(func(t *testing.T, text, language string) {
		for _, j := range book.Jurisdictions() {
			checkSpans(t, e, lawOf(book, j), text, language)
		}
	})
}

// FuzzPattern reads patterns that nobody checked.
func FuzzPattern(f *testing.F) {
	for _, p := range []string{"{c} free", "free (of|from) [any] {c}", "<your> {h}", "((a|b)|c)", "[", "{", "(|)", "a|b", "{s}frei", "d'{c}"} {
		f.Add(p)
	}
	f.Fuzz(func(t *testing.T, p string) { wording.ReadPattern(p) })
}
