package render

import (
	"strings"
	"unicode"

	"golang.org/x/text/width"
)

// Width is the most columns a line of text takes.
const Width = 80

// columns is how many terminal cells a text takes. Sequences that some terminals draw narrower count in full, so the
// answer is never too small.
func columns(s string) int {
	n := 0
	for _, r := range s {
		n += runeColumns(r)
	}
	return n
}

func runeColumns(r rune) int {
	switch {
	case r < 0x300:
		return 1
	case r == '\ufe0f': // asks for the wide picture of the character before
		return 1
	case unicode.In(r, unicode.Mn, unicode.Me), r == '\u200c', r == '\u200d':
		return 0
	}
	switch width.LookupRune(r).Kind() {
	case width.EastAsianWide, width.EastAsianFullwidth:
		return 2
	}
	return 1
}

// clean replaces what could steer a terminal or reorder its text, and drops invisible format characters.
func clean(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\t', r == '\n', r == '\r', r == '\u2028', r == '\u2029':
			return ' '
		case r == '\u200c', r == '\u200d':
			return r
		case unicode.Is(unicode.Bidi_Control, r), unicode.IsControl(r), r == unicode.ReplacementChar:
			return unicode.ReplacementChar
		case unicode.Is(unicode.Cf, r):
			return -1
		}
		return r
	}, s)
}

// wrap breaks a text at spaces into lines of at most most columns; a word that is longer is broken anywhere, but never
// before a mark that belongs to the character before it. There is always one line.
func wrap(s string, most int) []string {
	var lines []string
	line, used := "", 0
	flush := func() {
		if used > 0 {
			lines = append(lines, line)
			line, used = "", 0
		}
	}
	for _, word := range strings.FieldsFunc(clean(s), func(r rune) bool { return r == ' ' }) {
		n := columns(word)
		if used > 0 && used+1+n > most {
			flush()
		}
		if used > 0 {
			line, used = line+" "+word, used+1+n
			continue
		}
		for n > most {
			head := prefix(word, most)
			lines = append(lines, head)
			word = word[len(head):]
			n = columns(word)
		}
		line, used = word, n
	}
	flush()
	if len(lines) == 0 {
		return []string{""}
	}
	return lines
}

// prefix is the longest beginning of a word that fits, at least one character; it ends behind a bond where there is one.
func prefix(word string, most int) string {
	n, end := 0, 0
	for i, r := range word {
		c := runeColumns(r)
		if n += c; n > most && i > 0 && c > 0 {
			if end == 0 {
				end = i
			}
			return word[:end]
		}
		if string(r) == bond {
			end = i + len(bond)
		}
	}
	return word
}
