package food

import (
	"fmt"
	"sort"

	"gramlaw/internal/food/layout"
)

const (
	prefix   = "sr:"
	numerals = 5
	shown    = 40 // bytes of a wrong reference an error repeats
)

// NotReferenceError tells that a text is not of the form sr:NNNNN.
type NotReferenceError struct{ Ref string }

func (e *NotReferenceError) Error() string {
	return fmt.Sprintf("%q is not a food reference: want sr: and five digits, such as sr:01001", e.Ref)
}

// UnknownFoodError tells that the release has no food of that number. Nearest
// are the references just below and just above.
type UnknownFoodError struct {
	Ref     string
	Nearest []string
}

func (e *UnknownFoodError) Error() string {
	return fmt.Sprintf("SR28 has no food %s; the nearest are %v", e.Ref, e.Nearest)
}

// Find opens the food of a reference such as "sr:01001". The error is a
// *NotReferenceError or an *UnknownFoodError.
func Find(ref string) (Food, error) {
	ndb, ok := parseRef(ref)
	if !ok {
		return Food{}, &NotReferenceError{Ref: ref[:min(len(ref), shown)]}
	}
	at := position(ndb)
	if at < foodCount() {
		if f := foodAt(at); f.ndb == ndb {
			return f, nil
		}
	}
	return Food{}, &UnknownFoodError{Ref: ref, Nearest: around(at)}
}

// All opens every food in the order of NDB numbers until yield returns false.
func All(yield func(Food) bool) {
	for i := range foodCount() {
		if !yield(foodAt(i)) {
			return
		}
	}
}

func parseRef(ref string) (ndb int, ok bool) {
	if len(ref) != len(prefix)+numerals || ref[:len(prefix)] != prefix {
		return 0, false
	}
	for _, c := range []byte(ref[len(prefix):]) {
		if c < '0' || c > '9' {
			return 0, false
		}
		ndb = 10*ndb + int(c-'0')
	}
	return ndb, true
}

// position is where the number stands in the index, or would stand.
func position(ndb int) int {
	index := section(layout.Index)
	return sort.Search(foodCount(), func(i int) bool {
		return layout.Uint32(index, i*layout.IndexWidth) >= ndb
	})
}

func around(at int) []string {
	var refs []string
	for _, i := range []int{at - 1, at} {
		if i >= 0 && i < foodCount() {
			refs = append(refs, foodAt(i).Ref())
		}
	}
	return refs
}
