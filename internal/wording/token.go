package wording

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/cases"
	"golang.org/x/text/unicode/norm"
)

// A kind of token.
type kind uint8

const (
	word kind = iota
	number
	mark // punctuation or a symbol
)

// A token is a word, a number or a mark of a text. Its key is what is compared: without case, accents, width and zero-width characters.
// start and end are code points of the text.
type token struct {
	key        string
	kind       kind
	start, end int
	glued      bool // nothing stood between it and the token before
}

// A glyph is one comparable character and where it came from.
type glyph struct {
	c          rune
	start, end int
}

// tokens cuts a text. decimal is the language's decimal sign.
func tokens(text string, decimal rune) []token {
	s := scanner{glyphs: glyphs(text), decimal: decimal}
	for s.at < len(s.glyphs) {
		s.next()
	}
	return s.out
}

// glyphs decomposes a text, folds its case and drops what is not compared: combining marks and characters without width.
func glyphs(text string) []glyph {
	out := make([]glyph, 0, len(text))
	fold := cases.Fold()
	var buffer [64]byte
	for i, at := 0, 0; i < len(text); {
		if c := text[i]; c < utf8.RuneSelf && (i+1 == len(text) || text[i+1] < utf8.RuneSelf) {
			out = append(out, glyph{lower(c), at, at + 1})
			i, at = i+1, at+1
			continue
		}
		if c, n := utf8.DecodeRuneInString(text[i:]); thin(c) || passed(c) {
			out = append(out, glyph{c, at, at + 1})
			i, at = i+n, at+1
			continue
		}
		n := norm.NFKD.NextBoundaryInString(text[i:], true)
		if n <= 0 {
			n = len(text) - i
		}
		end := at + utf8.RuneCountInString(text[i:i+n])
		for _, c := range string(fold.Bytes(norm.NFKD.AppendString(buffer[:0], text[i:i+n]))) {
			if c == '\u2044' { // of ½
				c = '/'
			}
			if !unicode.In(c, unicode.Mn, unicode.Me, unicode.Cf) {
				out = append(out, glyph{c, at, end})
			}
		}
		i, at = i+n, end
	}
	return out
}

func lower(c byte) rune {
	if c >= 'A' && c <= 'Z' {
		c += 'a' - 'A'
	}
	return rune(c)
}

// A scanner turns glyphs into tokens.
type scanner struct {
	glyphs  []glyph
	decimal rune
	at      int
	gap     bool // something that is no token stood before
	out     []token
}

func (s *scanner) next() {
	c := s.glyphs[s.at].c
	switch {
	case unicode.IsSpace(c) || passed(c) || s.joins():
		s.gap = true
		s.at++
	case unicode.IsDigit(c):
		s.number()
	case unicode.IsLetter(c):
		s.word()
	default:
		s.emit(mark, s.at+1)
	}
}

// joins tells whether a hyphen stands between words, where it counts as a space.
func (s *scanner) joins() bool {
	return hyphen(s.glyphs[s.at].c) && s.at > 0 && s.at+1 < len(s.glyphs) && !unicode.IsSpace(s.glyphs[s.at-1].c)
}

// passed knows signs that say nothing: quotation marks, signs of registration and of footnotes.
func passed(c rune) bool { return strings.ContainsRune("\"“”„«»‹›*†‡®©™℠", c) }

// hyphen knows the dashes that join words.
func hyphen(c rune) bool {
	return c == '-' || c == '\u2010' || c == '\u2011' || c == '\u2012' || c == '\u2013'
}

// apostrophe knows the signs of a dropped letter.
func apostrophe(c rune) bool { return c == '\'' || c == '\u2019' || c == '\u02bc' }

// word takes letters, and an apostrophe between them and others.
func (s *scanner) word() {
	end := s.at
	for end < len(s.glyphs) && unicode.IsLetter(s.glyphs[end].c) {
		end++
	}
	if end+1 < len(s.glyphs) && apostrophe(s.glyphs[end].c) && unicode.IsLetter(s.glyphs[end+1].c) {
		s.glyphs[end].c = '\''
		end++
	}
	s.emit(word, end)
}

// number takes digits with one decimal sign, and signs or spaces between groups of three.
func (s *scanner) number() {
	end, point := s.digits(s.at), false
	for end+1 < len(s.glyphs) && unicode.IsDigit(s.glyphs[end+1].c) {
		c, after := s.glyphs[end].c, s.digits(end+1)
		group := after-end-1 == 3 && s.glyphs[s.at].c != '0'
		switch {
		case point || c != '.' && c != ',' && !(group && thin(c)):
			s.decimalEmit(end)
			return
		case thin(c) || group && c != s.decimal:
			s.glyphs[end].c = 0
		default:
			s.glyphs[end].c, point = '.', true
		}
		end = after
	}
	s.decimalEmit(end)
}

// thin knows the spaces that stand inside numbers; a plain space would join two numbers.
func thin(c rune) bool { return c == '\u2009' || c == '\u202f' || c == '\u00a0' }

func (s *scanner) digits(from int) int {
	for from < len(s.glyphs) && unicode.IsDigit(s.glyphs[from].c) {
		from++
	}
	return from
}

// decimalEmit writes digits of any script as 0 to 9.
func (s *scanner) decimalEmit(end int) {
	for i := s.at; i < end; i++ {
		if c := s.glyphs[i].c; c > utf8.RuneSelf {
			s.glyphs[i].c = digit(c)
		}
	}
	s.emit(number, end)
}

// digit is a decimal digit of another script: they lie in runs of ten.
func digit(c rune) rune {
	zero := c
	for unicode.IsDigit(zero-1) && c-zero < 9 {
		zero--
	}
	return '0' + c - zero
}

func (s *scanner) emit(k kind, end int) {
	key := make([]byte, 0, end-s.at)
	for _, g := range s.glyphs[s.at:end] {
		if g.c != 0 {
			key = utf8.AppendRune(key, g.c)
		}
	}
	s.out = append(s.out, token{key: string(key), kind: k, start: s.glyphs[s.at].start, end: s.glyphs[end-1].end, glued: !s.gap && len(s.out) > 0})
	s.at, s.gap = end, false
}
