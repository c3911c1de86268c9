// Package check is the core: a recipe, the rules and a request give a report. Check is a pure function; the same inputs
// give the same report, byte for byte.
//
// The order of evaluation has no circles (lint proves it): quantities by each law's definitions, claims' conditions on exact
// values, declared values, claims asked for with their statements, presence of lines, findings.
package check

import (
	"fmt"
	"slices"
	"strings"

	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

// A Request says how to check. On is the labelling date yyyy-mm-dd.
type Request struct {
	On         string
	In         []string // markets; none takes the recipe's, and without those all of the set
	Transition rulebook.Transition
	Detail     string   // "" or "contributions"
	Without    []string // rules of practice to leave out; "all" leaves all out
}

// Caution stands in every report.
const Caution = "The law may have changed since these rules were written. Confirm every value, claim and statement against the current local " +
	"regulation, with licensed or qualified practice where local codes ask for it. Allergens and food safety are outside a nutrition declaration. " +
	"A value at the edge of a threshold is not a safe pass."

// A checker carries one check.
type checker struct {
	recipe  *recipe.Recipe
	book    *rulebook.Book
	request Request
	batch   *rollup.Batch
	refs    map[string]*rollup.Batch
	habits  *habits
	laws    map[string]*rulebook.Law // of labels, by market and date
	shared  map[shared][]part
}

// Check judges a recipe. Faults are about the recipe or the request and point into the document ("/…") or name the
// member of the request ("on", "in", "without").
func Check(r *recipe.Recipe, book *rulebook.Book, q Request) (*Report, recipe.Faults) {
	c := newChecker(r, book, q)
	if faults := c.accept(); len(faults) > 0 {
		return nil, faults
	}
	c.habits = newHabits(book, c.request.Without)
	if faults := c.roll(); len(faults) > 0 {
		return nil, faults
	}
	out := &Report{
		Recipe: Identity{r.ID, r.Name, r.Digest}, Rules: RuleSet{book.Version, book.Digest}, Date: q.On, Transition: string(c.request.Transition),
		Caution: Caution, Jurisdictions: []Market{}, Findings: []Finding{},
	}
	for _, f := range c.batch.Findings {
		out.Findings = append(out.Findings, Finding{Kind: "recipe", Severity: "open", Code: f.Code, Says: name(f.Ingredient) + f.Says, Pointer: f.Pointer})
	}
	tags := map[string]bool{}
	var markets []*market
	for _, j := range c.request.In {
		m := c.open(j, c.request.Transition)
		out.Jurisdictions = append(out.Jurisdictions, m.report(tags))
		markets = append(markets, m)
	}
	for i, m := range markets {
		out.Jurisdictions[i].Presumed = m.presumed()
	}
	out.Composition = c.contents(tags)
	return out, nil
}

func newChecker(r *recipe.Recipe, book *rulebook.Book, q Request) *checker {
	if q.Transition == "" {
		q.Transition = rulebook.WhenRequired
	}
	return &checker{recipe: r, book: book, request: q, refs: map[string]*rollup.Batch{}, laws: map[string]*rulebook.Law{}, shared: map[shared][]part{}}
}

func name(ingredient string) string {
	if ingredient == "" {
		return ""
	}
	return ingredient + ": "
}

// accept checks the request and settles the markets.
func (c *checker) accept() recipe.Faults {
	faults := c.request.Faults(c.book)
	bad := func(at, code, format string, args ...any) {
		faults = append(faults, recipe.Fault{Pointer: at, Code: code, Says: fmt.Sprintf(format, args...)})
	}
	known := c.book.Jurisdictions()
	unknown := func(at, j, more string) {
		if !slices.Contains(known, j) {
			bad(at, "unknown-market", "%q is no market of this rule set; known are %s%s", j, strings.Join(known, ", "), more)
		}
	}
	if len(c.request.In) == 0 {
		c.request.In = c.recipe.Jurisdictions
		for _, j := range c.request.In {
			unknown("/jurisdictions", j, "")
		}
	}
	if len(c.request.In) == 0 {
		c.request.In = known
	}
	for i, cl := range c.recipe.Claims {
		for _, j := range cl.In {
			unknown(fmt.Sprintf("/claims/%d/in", i), j, "")
		}
		if cl.Text != "" && cl.Claim != "" {
			bad(fmt.Sprintf("/claims/%d", i), "claim-twice", "a claim is asked for by its words or by its name, not by both")
		}
	}
	for member, keys := range c.perMarket() {
		for _, j := range keys {
			if j != "default" {
				unknown("/"+member+"/"+j, j, ", and default")
			}
		}
	}
	slices.SortStableFunc(faults, func(a, b recipe.Fault) int { return strings.Compare(a.Pointer, b.Pointer) })
	return faults
}

// perMarket lists the markets that the recipe's members name.
func (c *checker) perMarket() map[string][]string {
	r := c.recipe
	return map[string][]string{
		"serving": sortedKeys(r.Serving), "category": sortedKeys(r.Category), "reference_amount": sortedKeys(r.ReferenceAmount),
		"state": sortedKeys(r.State), "density": sortedKeys(r.Density), "declares": sortedKeys(r.Declares),
	}
}

// roll computes the product and its reference foods once for all markets.
func (c *checker) roll() recipe.Faults {
	options := rollup.Options{Label: c.label, Presume: c.habits.presume}
	b, fault := rollup.Roll(recipe.Part{Ingredients: c.recipe.Ingredients, Yield: c.recipe.Yield}, options)
	if fault != nil {
		return recipe.Faults{{Pointer: fault.Pointer, Code: fault.Code, Says: fault.Says}}
	}
	c.batch = b
	for i, n := range sortedKeys(c.recipe.References) {
		ref := c.recipe.References[n]
		options.FirstVariable = (i + 1) << 24
		in := recipe.Ingredient{Pointer: ref.Pointer, ID: n, Name: ref.Name, Source: ref.Source, With: ref.With,
			Amount: quantity.Amount{Value: hundred, Unit: quantity.Gram}}
		b, fault := rollup.Roll(recipe.Part{Ingredients: []recipe.Ingredient{in}}, options)
		if fault != nil {
			return recipe.Faults{{Pointer: fault.Pointer, Code: fault.Code, Says: fault.Says}}
		}
		c.refs[n] = b
	}
	return nil
}
