package check_test

import (
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"os"
	"slices"
	"testing"

	"github.com/shopspring/decimal"

	"gramlaw/internal/check"
	"gramlaw/internal/food"
	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

const propertyRounds = 40

var allFoods = func() []food.Food {
	var out []food.Food
	for f := range food.All {
		out = append(out, f)
	}
	return out
}()

func gram(n int64, e int32) quantity.Amount {
	return quantity.Amount{Value: decimal.New(n, e), Unit: quantity.Gram}
}

// randomRecipe draws up to eight foods of the open table.
func randomRecipe(r *rand.Rand) *recipe.Recipe {
	out := &recipe.Recipe{ID: "random", Name: "random"}
	for i := range 1 + r.IntN(8) {
		f := allFoods[r.IntN(len(allFoods))]
		out.Ingredients = append(out.Ingredients, recipe.Ingredient{
			Pointer: fmt.Sprintf("/ingredients/%d", i), ID: fmt.Sprint("i", i), Amount: gram(1+r.Int64N(99999), -2), Source: recipe.Source{Food: f.Ref()},
		})
	}
	if r.IntN(2) == 0 {
		out.Ingredients = append(out.Ingredients, randomOil(r))
	}
	if r.IntN(2) == 0 {
		out.Yield = &recipe.Yield{Water: &recipe.Change{Gain: r.IntN(2) == 0, Amount: quantity.Amount{Value: decimal.New(r.Int64N(20), -1), Unit: quantity.PerCent}}}
	}
	out.Serving = recipe.PerMarket[recipe.Serving]{"default": {Amount: gram(1+r.Int64N(2000), -1)}}
	out.ReferenceAmount = recipe.PerMarket[recipe.ReferenceAmount]{"default": {Amount: gram(1+r.Int64N(100), 0)}}
	out.State = recipe.PerMarket[string]{"default": "solid"}
	for _, c := range []string{"fat-low", "fat-free", "saturated-fat-low", "saturated-fat-free", "trans-fat-free", "cholesterol-low", "cholesterol-free", "omega-3-source", "unsaturated-fat-high"} {
		out.Claims = append(out.Claims, recipe.Claim{Claim: c})
	}
	return out
}

// randomOil is a fat known by a specification per some amount, with a profile in per cent of FAME.
func randomOil(r *rand.Rand) recipe.Ingredient {
	exact := func(n int64, e int32) recipe.Value {
		d := decimal.New(n, e)
		return recipe.Value{Low: d, High: d, Central: d, Typical: true, Unit: quantity.PerCent}
	}
	per := gram(1+r.Int64N(200), 0)
	fat := exact(per.Value.CoefficientInt64(), 0)
	fat.Unit = quantity.Gram
	profile := &recipe.Profile{Basis: recipe.PercentFAME, Complete: true}
	rest := int64(1000)
	for _, notation := range []string{"12:0", "16:0", "18:0", "18:1", "18:1 9c", "18:2 9c,12c", "18:3 n-3", "22:6 n-3"} {
		s, err := lipid.Parse(notation)
		if err != nil {
			panic(err)
		}
		x := r.Int64N(rest/2 + 1)
		rest -= x
		profile.Acids = append(profile.Acids, recipe.Acid{Notation: notation, Species: s, Value: exact(x, -1)})
	}
	profile.Unidentified = exact(rest, -1)
	return recipe.Ingredient{Pointer: "/ingredients/9", ID: "oil", Amount: gram(1+r.Int64N(99999), -2), Process: "refined",
		Source: recipe.Source{Composition: &recipe.Composition{Per: per, Components: map[string]recipe.Value{"FAT": fat}, Acids: profile}}}
}

// result is what a label shows and a claim is judged by, without the names of ingredients.
func result(t *testing.T, b *rulebook.Book, r *recipe.Recipe) string {
	t.Helper()
	rep, faults := check.Check(r, b, check.Request{On: "2026-12-01"})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	type shown struct {
		Line   string
		Values []check.Value
	}
	var out []any
	for _, m := range rep.Jurisdictions {
		for _, l := range m.Declaration.Lines {
			out = append(out, shown{l.Quantity + l.Presence + l.Status, l.Values})
		}
		for _, c := range m.Claims {
			out = append(out, c.Asked, c.Verdict)
		}
		out = append(out, m.AlsoPermitted)
	}
	j, err := json.Marshal(out)
	if err != nil {
		t.Fatal(err)
	}
	return string(j)
}

func properties(t *testing.T, same func(r *rand.Rand, in *recipe.Recipe) *recipe.Recipe) {
	t.Helper()
	b := book(t)
	for seed := range uint64(propertyRounds) {
		r := rand.New(rand.NewPCG(seed, 1))
		in := randomRecipe(r)
		want := result(t, b, in)
		if got := result(t, b, same(r, in)); got != want {
			t.Fatalf("seed %d: the label changed%s", seed, firstDifference(want, got))
		}
	}
}

// firstDifference shows both sides around the place where they part.
func firstDifference(a, b string) string {
	i := 0
	for i < min(len(a), len(b)) && a[i] == b[i] {
		i++
	}
	around := func(s string) string { return s[max(0, i-80):min(len(s), i+80)] }
	return "\n" + around(a) + "\n" + around(b)
}

func clone(in *recipe.Recipe) *recipe.Recipe {
	out := *in
	out.Ingredients = slices.Clone(in.Ingredients)
	return &out
}

func TestScalingChangesNothing(t *testing.T) {
	properties(t, func(r *rand.Rand, in *recipe.Recipe) *recipe.Recipe {
		out := clone(in)
		k := decimal.New(1+r.Int64N(9999), -int32(r.IntN(4)))
		for i := range out.Ingredients {
			out.Ingredients[i].Amount.Value = out.Ingredients[i].Amount.Value.Mul(k)
		}
		return out
	})
}

func TestReorderingChangesNothing(t *testing.T) {
	properties(t, func(r *rand.Rand, in *recipe.Recipe) *recipe.Recipe {
		out := clone(in)
		r.Shuffle(len(out.Ingredients), func(i, j int) {
			out.Ingredients[i], out.Ingredients[j] = out.Ingredients[j], out.Ingredients[i]
		})
		return out
	})
}

func TestSplittingAnIngredientChangesNothing(t *testing.T) {
	properties(t, func(r *rand.Rand, in *recipe.Recipe) *recipe.Recipe {
		out := clone(in)
		first := out.Ingredients[0]
		part := first.Amount.Value.Mul(decimal.New(1+r.Int64N(98), -2))
		second := first
		second.ID, second.Amount.Value = "second", first.Amount.Value.Sub(part)
		first.Amount.Value = part
		out.Ingredients = append([]recipe.Ingredient{first}, append(out.Ingredients[1:], second)...)
		return out
	})
}

func TestNestingChangesNothing(t *testing.T) {
	properties(t, func(r *rand.Rand, in *recipe.Recipe) *recipe.Recipe {
		out := clone(in)
		k := r.IntN(len(in.Ingredients)) + 1
		inner := slices.Clone(in.Ingredients[:k])
		sum := decimal.Zero
		for i := range inner {
			sum = sum.Add(inner[i].Amount.Value)
			inner[i].Amount.Value = inner[i].Amount.Value.Mul(decimal.New(7, 0)) // the part is made in another batch size
		}
		part := recipe.Ingredient{Pointer: "/ingredients/0", ID: "part", Amount: quantity.Amount{Value: sum, Unit: quantity.Gram}, Source: recipe.Source{Recipe: &recipe.Part{Ingredients: inner}}}
		out.Ingredients = append([]recipe.Ingredient{part}, in.Ingredients[k:]...)
		return out
	})
}

// blend is 100 g of a food stated in full, with the trans fatty acids as given.
func blend(trans recipe.Value) *recipe.Recipe {
	exactly := func(s string) recipe.Value {
		a, err := quantity.ParseAmount(s)
		if err != nil {
			panic(err)
		}
		return recipe.Value{Low: a.Value, High: a.Value, Central: a.Value, Typical: true, Unit: a.Unit}
	}
	components := map[string]recipe.Value{
		"FAT": exactly("20 g"), "FASAT": exactly("1 g"), "FAMSCIS": exactly("9 g"), "CHOLE": exactly("0 mg"), "PROCNT": exactly("5 g"), "CHOCDF": exactly("60 g"),
		"FIBTG": exactly("2 g"), "SUGAR": exactly("9 g"), "SUGAD": exactly("4 g"), "NA": exactly("100 mg"), "ALC": exactly("0 g"), "POLYL": exactly("0 g"), "FATRN": trans,
	}
	return &recipe.Recipe{ID: "blend", Name: "blend",
		Ingredients:     []recipe.Ingredient{{Pointer: "/ingredients/0", ID: "all", Amount: gram(100, 0), Source: recipe.Source{Composition: &recipe.Composition{Components: components}}}},
		Serving:         recipe.PerMarket[recipe.Serving]{"default": {Amount: gram(30, 0)}},
		ReferenceAmount: recipe.PerMarket[recipe.ReferenceAmount]{"default": {Amount: gram(55, 0)}},
		State:           recipe.PerMarket[string]{"default": "solid"},
		Claims:          []recipe.Claim{{Claim: "saturated-fat-free"}, {Claim: "saturated-fat-low"}, {Claim: "trans-fat-free"}},
	}
}

func at(hundredths int64) recipe.Value {
	d := decimal.New(hundredths, -2)
	return recipe.Value{Low: d, High: d, Central: d, Typical: true, Unit: quantity.Gram}
}

// More trans never prints less, in any market that prints it.
func TestMoreTransNeverPrintsLess(t *testing.T) {
	b := book(t)
	last := map[string]decimal.Decimal{}
	printed := 0
	for x := int64(0); x <= 1000; x += 7 {
		rep, faults := check.Check(blend(at(x)), b, check.Request{On: "2026-12-01"})
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		for _, m := range rep.Jurisdictions {
			_, v, err := printedLine(m, "trans-fat", "")
			if err != nil {
				continue
			}
			d, err := decimal.NewFromString(deref(v.Declared))
			if err != nil {
				t.Fatalf("%s: %v", m.Jurisdiction, err)
			}
			if d.LessThan(last[m.Jurisdiction]) {
				t.Errorf("%s: %d hundredths print %s, less than before", m.Jurisdiction, x, d)
			}
			last[m.Jurisdiction] = d
			printed++
		}
	}
	if printed == 0 {
		t.Error("no market prints trans fat")
	}
}

// An interval's result contains every point's: a text or verdict that a point gives and the interval calls determined is the
// interval's own.
func TestIntervalsContainPoints(t *testing.T) {
	b := book(t)
	for seed := range uint64(60) {
		r := rand.New(rand.NewPCG(seed, 2))
		lo := r.Int64N(300)
		hi := lo + r.Int64N(200)
		whole := judged(t, b, blend(recipe.Value{Low: decimal.New(lo, -2), High: decimal.New(hi, -2), Unit: quantity.Gram}))
		for range 5 {
			x := lo + r.Int64N(hi-lo+1)
			for k, got := range judged(t, b, blend(at(x))) {
				if w := whole[k]; w != "undetermined" && w != got {
					t.Fatalf("seed %d: %s is %q at %d, but %q over %d..%d", seed, k, got, x, w, lo, hi)
				}
			}
		}
	}
}

// judged lists what is determined: prints by line and verdicts by claim.
func judged(t *testing.T, b *rulebook.Book, in *recipe.Recipe) map[string]string {
	t.Helper()
	rep, faults := check.Check(in, b, check.Request{On: "2026-12-01"})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	out := map[string]string{}
	for _, m := range rep.Jurisdictions {
		for _, l := range m.Declaration.Lines {
			for _, v := range l.Values {
				k := m.Jurisdiction + " " + l.Quantity + " " + v.Basis
				out[k] = "undetermined"
				if l.Status == "determined" {
					out[k] = v.Text
				}
			}
		}
		for _, c := range m.Claims {
			verdict := c.Verdict
			if verdict == check.WithStatement {
				verdict = check.Permitted
			}
			out[m.Jurisdiction+" "+c.Asked] = verdict
		}
	}
	return out
}

// The same inputs give the same report, byte for byte.
func TestCheckIsPure(t *testing.T) {
	b := book(t)
	doc, err := os.ReadFile("../../testdata/recipes/oat-biscuit.json")
	if err != nil {
		t.Fatal(err)
	}
	once := func() string {
		r, faults := recipe.Decode(doc)
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		rep, faults := check.Check(r, b, check.Request{On: "2026-12-01", Detail: "contributions"})
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		j, err := json.Marshal(rep)
		if err != nil {
			t.Fatal(err)
		}
		return string(j)
	}
	first := once()
	for range 5 {
		if once() != first {
			t.Fatal("two checks of one recipe differ")
		}
	}
}
