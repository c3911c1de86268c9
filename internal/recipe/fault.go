package recipe

import (
	"cmp"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"
)

// A Fault is one thing that is wrong with a document.
type Fault struct {
	Pointer string `json:"pointer"` // RFC 6901; a missing member is told at the object that lacks it
	Code    string `json:"code"`    // one of Codes
	Says    string `json:"says"`    // what would be right
}

// Faults are in the order of the document.
type Faults []Fault

// Bounds of the list; one more fault then tells that there are others.
const (
	MaxFaults = 500
	maxReport = 256 << 10 // bytes of pointers and sentences, because names in a hostile document can be long
)

func (f Faults) Error() string {
	if len(f) == 0 {
		return "no faults"
	}
	s := fmt.Sprintf("%s: %s (%s)", place(f[0].Pointer), f[0].Says, f[0].Code)
	if len(f) > 1 {
		s += fmt.Sprintf(" and %d more", len(f)-1)
	}
	return s
}

// Err is the faults as an error, nil when there are none.
func (f Faults) Err() error {
	if len(f) == 0 {
		return nil
	}
	return f
}

func place(pointer string) string {
	if pointer == "" {
		return "the document"
	}
	return pointer
}

// found is a fault at a place of the tree.
type found struct {
	at         int32
	code, says string
	more       func() string // the rest of says; asked for only where the fault is listed
}

// report sorts what was found by place, so that the same document always gives the same faults.
func (t *tree) report(all []found) Faults {
	order := func(a, b found) int {
		return cmp.Or(cmp.Compare(a.at, b.at), cmp.Compare(a.code, b.code), cmp.Compare(a.says, b.says))
	}
	slices.SortStableFunc(all, order)
	all = slices.CompactFunc(all, func(a, b found) bool { return order(a, b) == 0 })
	out := make(Faults, 0, min(len(all), MaxFaults+1))
	size := 0
	for i, f := range all {
		if i == MaxFaults || size > maxReport {
			return append(out, Fault{"", MoreFaults, fmt.Sprintf("the document has more than %d faults; the first ones are listed", i)})
		}
		if f.more != nil {
			f.says += f.more()
		}
		out = append(out, Fault{t.pointer(f.at), f.code, f.says})
		size += len(out[i].Pointer) + len(out[i].Says)
	}
	return out
}

// quote shows a value of the document, cut short: recipes are trade secrets and faults end up in logs.
func quote(s string) string {
	const most = 40
	if len(s) > most {
		i := most
		for !utf8.RuneStart(s[i]) {
			i--
		}
		s = s[:i] + "…"
	}
	return strconv.Quote(s)
}

func list(words []string, last string) string {
	switch n := len(words); n {
	case 0:
		return "nothing"
	case 1:
		return words[0]
	default:
		return strings.Join(words[:n-1], ", ") + " " + last + " " + words[n-1]
	}
}

func quoted(words []string) []string {
	out := make([]string, len(words))
	for i, w := range words {
		out[i] = quote(w)
	}
	return out
}
