package web

import (
	"errors"
	"maps"
	"net/url"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"
)

const shownText = 40 // bytes of a foreign text that an answer repeats

// cut shortens a text that somebody sent.
func cut(s string) string {
	s = strings.ToValidUTF8(s, "\uFFFD")
	if len(s) <= shownText {
		return s
	}
	i := shownText
	for !utf8.RuneStart(s[i]) {
		i--
	}
	return s[:i] + "…"
}

func quote(s string) string { return strconv.Quote(cut(s)) }

// listed names what would be known.
func listed(known []string) string {
	if len(known) == 0 {
		return "; none is"
	}
	return "; known are " + strings.Join(known, ", ")
}

func sortedNames[T any](m map[string]T) []string { return slices.Sorted(maps.Keys(m)) }

// parseQuery is strict: what cannot be read is not passed over.
func parseQuery(raw string) (url.Values, error) {
	values, err := url.ParseQuery(raw)
	if err != nil {
		return nil, err
	}
	for name, list := range values {
		if !utf8.ValidString(name) || !utf8.ValidString(strings.Join(list, "")) {
			return nil, errors.New("not UTF-8")
		}
	}
	return values, nil
}
