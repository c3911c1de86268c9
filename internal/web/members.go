package web

import (
	"bytes"
	"encoding/hex"
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/go-json-experiment/json/jsontext"

	"gramlaw/internal/recipe"
)

// text reads a text that says something.
func (e *envelope) text(m member, at string) string {
	s, ok := e.unquote(m.value, at, maxNameText)
	if ok && s == "" {
		e.fault(at, recipe.Empty, "something is wanted here; leave the member out otherwise")
	}
	return s
}

// unquote reads a text of so many bytes at most.
func (e *envelope) unquote(v jsontext.Value, at string, most int) (string, bool) {
	switch v.Kind() {
	case '"':
	case 'n':
		e.fault(at, recipe.Null, "null is not a value here; leave out what is not known")
		return "", false
	default:
		e.fault(at, recipe.WrongType, "a text in quotation marks is wanted")
		return "", false
	}
	b, err := jsontext.AppendUnquote(nil, v)
	switch {
	case err != nil || !utf8.Valid(b):
		e.fault(at, recipe.BadText, "the text is not valid UTF-8, or escapes half of a surrogate pair")
		return "", false
	case len(b) > most:
		e.fault(at, recipe.StringTooLong, "the text has more than %d bytes", most)
		return "", false
	}
	return string(b), true
}

// texts reads a list of names that are not empty and stand once.
func (e *envelope) texts(m member, at string) []string {
	if m.value.Kind() != '[' {
		e.fault(at, recipe.WrongType, `a list of texts is wanted, such as ["us", "ca"]`)
		return nil
	}
	in := jsontext.NewDecoder(bytes.NewBuffer(m.value), jsontext.AllowDuplicateNames(true), jsontext.AllowInvalidUTF8(true))
	in.ReadToken() // the bracket; the syntax is known to be right
	var out []string
	i := 0
	for ; in.PeekKind() != ']'; i++ {
		if i == maxNames {
			e.fault(at, recipe.TooMany, "at most %d are read", maxNames)
			return nil
		}
		raw, err := in.ReadValue()
		if err != nil {
			e.faults = append(e.faults, *syntaxFault(err))
			return nil
		}
		out = e.name(out, raw, fmt.Sprintf("%s/%d", at, i))
	}
	if i == 0 {
		e.fault(at, recipe.Empty, "something is wanted here; leave the member out otherwise")
	}
	return out
}

func (e *envelope) name(list []string, raw jsontext.Value, at string) []string {
	s, ok := e.unquote(raw, at, maxNameText)
	switch {
	case !ok:
		return list
	case s == "":
		e.fault(at, recipe.Empty, "the name is empty")
	case slices.Contains(list, s):
		e.fault(at, recipe.Repeated, "%s stands twice; keep one", quote(s))
	}
	return append(list, s)
}

// digest reads the digest of a rule set.
func (e *envelope) digest(m member, at string) string {
	s, ok := e.unquote(m.value, at, maxNameText)
	if !ok {
		return ""
	}
	digits, prefixed := strings.CutPrefix(s, "sha256:")
	if b, err := hex.DecodeString(digits); !prefixed || err != nil || len(b) != 32 || strings.ToLower(s) != s {
		e.fault(at, recipe.BadFormat, "the digest of a rule set is wanted: sha256: and 64 hexadecimal digits, as a report has it")
	}
	return s
}
