package check

import (
	"fmt"
	"slices"
	"strings"

	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// Faults lists what is wrong with a request whatever the recipe. Each names the member: "on", "in", "transition", "detail" or "without".
func (q Request) Faults(book *rulebook.Book) recipe.Faults {
	var faults recipe.Faults
	bad := func(at, code, format string, args ...any) {
		faults = append(faults, recipe.Fault{Pointer: at, Code: code, Says: fmt.Sprintf(format, args...)})
	}
	if !isDate(q.On) {
		bad("on", "not-a-date", "%q is no date; write yyyy-mm-dd", q.On)
	}
	if t := q.Transition; t != "" && t != rulebook.WhenRequired && t != rulebook.Newest {
		bad("transition", "unknown-transition", `%q is neither "required" nor "newest"`, t)
	}
	if d := q.Detail; d != "" && d != "contributions" {
		bad("detail", "unknown-detail", `%q is no detail; known is "contributions"`, d)
	}
	known := book.Jurisdictions()
	for _, j := range q.In {
		if !slices.Contains(known, j) {
			bad("in", "unknown-market", "%q is no market of this rule set; known are %s", j, strings.Join(known, ", "))
		}
	}
	for _, id := range q.Without {
		if id != "all" && !presumes(book, id) {
			bad("without", "unknown-presumption", "%q is no presumption of this rule set", id)
		}
	}
	return faults
}

func presumes(book *rulebook.Book, id string) bool {
	return slices.ContainsFunc(book.Presumptions, func(r rulebook.Rule[rulebook.Presumption]) bool { return r.ID == id }) ||
		slices.ContainsFunc(book.Origins, func(r rulebook.Rule[rulebook.Origin]) bool { return r.ID == id })
}
