package lipid

import (
	"strings"
	"unicode/utf8"
)

// MaxNotation is the longest notation read, in bytes.
const MaxNotation = 100

// Token kinds are the first byte of what they hold; words and numbers get their own.
const (
	word   = 'w'
	number = '0'
	end    = 0
)

type token struct {
	kind   byte // word, number, end, or the punctuation mark itself
	spaced bool // white space stands before it
	text   string
	n      int
}

// fold writes the notation in lower-case ASCII: Greek letters by name, raised and lowered digits as digits, every dash as
// a hyphen, every space as a space. ok is false at a character that no notation has.
func fold(b []byte, s string) (out []byte, ok bool) {
	for _, r := range s {
		switch {
		case r >= 'A' && r <= 'Z':
			b = append(b, byte(r)+'a'-'A')
		case r >= 'a' && r <= 'z', r >= '0' && r <= '9', r < utf8.RuneSelf && strings.ContainsRune(" :,;-()[]/+", r):
			b = append(b, byte(r))
		default:
			n := len(b)
			if b = foldRune(b, r); len(b) == n && r != '\u200b' && r != '\ufeff' && r != '\u00ad' {
				return b, false
			}
		}
	}
	return b, true
}

func foldRune(b []byte, r rune) []byte {
	switch r {
	case '\u03c9', '\u03a9', '\u2126':
		return append(b, 'w')
	case '\u0394', '\u03b4', '\u2206':
		return append(b, "delta"...)
	case '\u03b1', '\u0391':
		return append(b, "alpha"...)
	case '\u03b2', '\u0392':
		return append(b, "beta"...)
	case '\u03b3', '\u0393':
		return append(b, "gamma"...)
	case '\t', '\u00a0', '\u202f':
		return append(b, ' ')
	case '\u2212', '\u207b', '\u208b', '\u00ad':
		return append(b, '-')
	case '\uff1a', '\u2236':
		return append(b, ':')
	case '\u00b9':
		return append(b, '1')
	case '\u00b2', '\u00b3':
		return append(b, byte(r-'\u00b2')+'2')
	}
	return foldRange(b, r)
}

func foldRange(b []byte, r rune) []byte {
	switch {
	case r >= '\u2070' && r <= '\u2079' && (r == '\u2070' || r >= '\u2074'):
		return append(b, byte(r-'\u2070')+'0')
	case r >= '\u2080' && r <= '\u2089':
		return append(b, byte(r-'\u2080')+'0')
	case r >= '\u2000' && r <= '\u200a':
		return append(b, ' ')
	case r >= '\u2010' && r <= '\u2015':
		return append(b, '-')
	}
	return b
}

// scanner cuts folded text into tokens; it holds one token ahead.
type scanner struct {
	text string
	at   int
	tok  token
}

func newScanner(text string) scanner {
	s := scanner{text: text}
	s.advance()
	return s
}

func (s *scanner) advance() {
	start := s.at
	for s.at < len(s.text) && s.text[s.at] == ' ' {
		s.at++
	}
	t := token{spaced: s.at > start}
	start = s.at
	switch {
	case s.at == len(s.text):
		t.kind = end
	case digit(s.text[s.at]):
		for s.at < len(s.text) && digit(s.text[s.at]) {
			t.n = min(t.n*10+int(s.text[s.at]-'0'), 999)
			s.at++
		}
		t.kind = number
	case letter(s.text[s.at]):
		for s.at < len(s.text) && letter(s.text[s.at]) {
			s.at++
		}
		t.kind = word
	default:
		t.kind = s.text[s.at]
		s.at++
	}
	t.text = s.text[start:s.at]
	s.tok = t
}

// take consumes a token of the given kind if it is next.
func (s *scanner) take(kind byte) bool {
	if s.tok.kind != kind {
		return false
	}
	s.advance()
	return true
}

// takeWord consumes the given word if it is next.
func (s *scanner) takeWord(w string) bool {
	if s.tok.kind != word || s.tok.text != w {
		return false
	}
	s.advance()
	return true
}

// peek is the token after the next one.
func (s scanner) peek() token {
	s.advance()
	return s.tok
}

func digit(c byte) bool  { return c >= '0' && c <= '9' }
func letter(c byte) bool { return c >= 'a' && c <= 'z' }
