package recipe

import (
	"fmt"
	"slices"
	"strings"
	"testing"
)

// one is a document with one ingredient, whose members are given besides id and amount.
func one(members string) string {
	return `{"id":"x","ingredients":[{"id":"a","amount":"10 g",` + members + `}]}`
}

// sold is a document with a sound ingredient and the given members.
func sold(members string) string {
	return `{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"sr:20038"}],` + members + `}`
}

// specified is a document whose ingredient has the given composition.
func specified(members string) string { return one(`"composition":{` + members + `}`) }

// profiled is a document whose ingredient has the given fatty acids in per cent.
func profiled(acids, more string) string {
	return specified(`"fatty_acids":{"basis":"percent of FAME","profile":{` + acids + `}` + more + `}`)
}

const (
	atIngredient = "/ingredients/0"
	atComponents = "/ingredients/0/composition/components"
	atProfile    = "/ingredients/0/composition/fatty_acids/profile"
	atSettle     = "/ingredients/0/composition/fatty_acids/settle/0"
)

// faultCases are documents with everything that is wrong with them, as pointer and code.
var faultCases = []struct {
	name, doc string
	want      []string
}{
	// The bounded pass.
	{"one byte too many", strings.Repeat(" ", MaxBytes-len(sold(`"name":"x"`))+1) + sold(`"name":"x"`), []string{" too-large"}},
	{"empty", "", []string{" bad-syntax"}},
	{"not JSON", `{"id":"x",}`, []string{" bad-syntax"}},
	{"ends early", `{"id":"x","ingredients":[{"id":`, []string{"/ingredients/0/id bad-syntax"}},
	{"65 levels", `{"x":` + strings.Repeat("[", 64) + strings.Repeat("]", 64) + `}`, []string{"/x" + strings.Repeat("/0", 62) + " too-deep"}},
	{"100,001 values", `{"id":"x","ingredients":[1` + strings.Repeat(",1", MaxValues-3) + `]}`, []string{" too-many-values"}},
	{"two documents", sold(`"name":"x"`) + `{}`, []string{" trailing-data"}},
	{"faults before the end of JSON", `{"id":null,"id":1,}`, []string{"/id null", "/id duplicate-name", " bad-syntax"}},
	{"half a surrogate pair", sold(`"name":"\ud83d"`), []string{"/name bad-text"}},
	{"invalid UTF-8", sold("\"name\":\"\xff\""), []string{"/name bad-text"}},
	{"invalid UTF-8 in a name", sold("\"\xff\":\"x\""), []string{"/\uFFFD bad-text"}},
	{"a member twice", sold(`"name":"x","name":"y"`), []string{"/name duplicate-name"}},
	{"a member twice in a wide object", sold(`"category":{` + categories(40) + `,"aaa":"x"}`), []string{"/category/aaa duplicate-name"}},
	{"long text", sold(`"name":"` + strings.Repeat("ä", MaxText+1) + `"`), []string{"/name string-too-long"}},
	{"long member name", sold(`"` + strings.Repeat("n", MaxText+1) + `":1`), []string{"/" + strings.Repeat("n", MaxText+1) + " string-too-long"}},
	{"long number", sold(`"name":` + strings.Repeat("1", MaxNumberText+1)), []string{"/name number-too-long"}},
	{"null", sold(`"name":null,"yield":null,"claims":[null]`), []string{"/name null", "/yield null", "/claims/0 null"}},
	{"null where a member is required", `{"id":null,"ingredients":null}`, []string{"/id null", "/ingredients null"}},

	// Shape.
	{"no name", sold(`"":"x","category":{"":1,"us":""}`), []string{"/ empty", "/category/ empty", "/category/us empty"}},
	{"not an object", `[]`, []string{" wrong-type"}},
	{"nothing in it", `{}`, []string{" missing-member", " missing-member"}},
	{"an amount as a number", `{"id":"x","ingredients":[{"id":"a","amount":420,"food":"sr:20038"}]}`, []string{atIngredient + "/amount wrong-type"}},
	{"types", sold(`"name":true,"yield":[],"package":"","serving":{"us":1},"facts":{"beverage":1},"jurisdictions":{},"claims":{},"reference_foods":[]`),
		[]string{"/name wrong-type", "/yield wrong-type", "/package wrong-type", "/serving/us wrong-type", "/facts/beverage wrong-type",
			"/jurisdictions wrong-type", "/claims wrong-type", "/reference_foods wrong-type"}},
	{"value as a list", specified(`"components":{"FAT":[]}`), []string{atComponents + "/FAT wrong-type"}},
	{"complete as a text", profiled(`"16:0":"40"`, `,"complete":"yes"`), []string{"/ingredients/0/composition/fatty_acids/complete wrong-type"}},
	{"missing and misspelt", `{"id":"x","ingredients":[{"id":"a","amout":"10 g","food":"sr:20038"}]}`,
		[]string{atIngredient + " missing-member", atIngredient + "/amout unknown-member"}},
	{"a range without its ends", specified(`"components":{"FAT":{"value":"3 g"}}`), []string{atComponents + "/FAT missing-member", atComponents + "/FAT missing-member"}},
	{"process", one(`"food":"sr:20038","process":"Refined"`), []string{atIngredient + "/process wrong-value"}},
	{"basis", specified(`"fatty_acids":{"basis":"percent","profile":{"16:0":"40"}}`), []string{"/ingredients/0/composition/fatty_acids/basis wrong-value"}},
	{"kind and state", sold(`"state":{"us":"gas"},"reference_foods":{"r":{"kind":"rival","food":"sr:20038"}}`),
		[]string{"/state/us wrong-value", "/reference_foods/r/kind wrong-value"}},
	{"amounts", sold(`"yield":{"mass":"1,5 g"},"package":{"net":"-1 g"},"claims":[{"claim":"fat-reduced","stated":"a third"}]`),
		[]string{"/yield/mass bad-amount", "/package/net bad-amount", "/claims/0/stated bad-amount"}},
	{"values", specified(`"components":{"FAT":"<","WATER":"> 1 g","CHOLE":{"low":"1","high":"<2 mg"}}`),
		[]string{atComponents + "/FAT bad-amount", atComponents + "/WATER bad-amount", atComponents + "/CHOLE/low bad-amount", atComponents + "/CHOLE/high bad-amount"}},
	{"numbers", profiled(`"16:0":"40 %","18:0":{"low":".5","high":"1"}`, `,"share_of_fat":"94,5"`),
		[]string{atProfile + "/16:0 bad-number", atProfile + "/18:0/low bad-number", "/ingredients/0/composition/fatty_acids/share_of_fat bad-number"}},
	{"more digits than are exact", one(`"food":"sr:20038","iodine_value":"1.234567890123456"`), []string{atIngredient + "/iodine_value bad-number"}},
	{"formats", one(`"density":"0.92","food":"20038","trans_origin":"cow","retention":"0352"`),
		[]string{atIngredient + "/density bad-format", atIngredient + "/food bad-format", atIngredient + "/trans_origin bad-format", atIngredient + "/retention bad-format"}},
	{"more formats", sold(`"package":{"surface":"240"},"category":{"USA":"cookies"},"jurisdictions":["US"],"claims":[{"text":"x","language":"English","claim":"Fat Low","in":["u"]}]`),
		[]string{"/package/surface bad-format", "/category/USA bad-format", "/jurisdictions/0 bad-format", "/claims/0/language bad-format", "/claims/0/claim bad-format", "/claims/0/in/0 bad-format"}},
	{"label", one(`"label":{"jurisdiction":"default","on":"2026-02-30","serving":"14 g","declared":{}}`),
		[]string{atIngredient + "/label/jurisdiction bad-format", atIngredient + "/label/on bad-format", atIngredient + "/label/declared empty"}},
	{"share", one(`"food":"sr:20038","trans_origin":[{"origin":"ruminant","share":"1"}]`), []string{atIngredient + "/trans_origin/0/share bad-format"}},
	{"empty", `{"id":"","ingredients":[],"jurisdictions":[],"claims":[],"facts":{"beverage":""}}`,
		[]string{"/id empty", "/ingredients empty", "/jurisdictions empty", "/claims empty", "/facts/beverage empty"}},
	{"long id", strings.Replace(sold(`"name":"x"`), `"x"`, `"`+strings.Repeat("ä", MaxIDText+1)+`"`, 1), []string{"/id too-many"}},
	{"201 acids", profiled(acids(MaxAcids+1), ""), []string{atProfile + " too-many"}},

	// Meaning: where a composition comes from.
	{"no source", `{"id":"x","ingredients":[{"id":"a","amount":"10 g"}]}`, []string{atIngredient + " one-source"}},
	{"two sources", one(`"food":"sr:20038","composition":{"components":{"FAT":"1 g"}}`), []string{atIngredient + " one-source"}},
	{"no source of an oil", sold(`"yield":{"fat":{"gain":"1 g","oil":{}}}`), []string{"/yield/fat/oil one-source"}},
	{"no source of a reference food", sold(`"reference_foods":{"r":{"kind":"similar product"}}`), []string{"/reference_foods/r one-source"}},
	{"nothing in a composition", specified(`"components":{}`), []string{"/ingredients/0/composition empty-composition"}},
	{"unknown foods", `{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"sr:99999"},{"id":"b","amount":"10 g","food":"other:1"}]}`,
		[]string{"/ingredients/0/food unknown-food", "/ingredients/1/food unknown-food"}},
	{"ids", `{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"sr:20038"},{"id":"a","amount":"10 g","food":"sr:20038"}]}`, []string{"/ingredients/1/id duplicate-id"}},

	// Meaning: components and values.
	{"tagnames", one(`"food":"sr:20038","with":{"Fat":"1 g"},"zero_by_nature":[{"component":"TRANS","reason":"x"}],"retention":{"VIT":"1"}`),
		[]string{atIngredient + "/with/Fat unknown-component", atIngredient + "/zero_by_nature/0/component unknown-component", atIngredient + "/retention/VIT unknown-component"}},
	{"units of components", specified(`"components":{"FAT":"1 mL","WATER":"10 %","ENERC_KCAL":"100 kJ","PROCNT":{"low":"1 g","high":"2 mL"},"VITA_IU":"3 g"}`),
		[]string{atComponents + "/FAT wrong-unit", atComponents + "/WATER wrong-unit", atComponents + "/ENERC_KCAL wrong-unit", atComponents + "/PROCNT wrong-unit", atComponents + "/VITA_IU wrong-unit"}},
	{"units of amounts", sold(`"yield":{"mass":"1 L"},"package":{"net":"10 %"},"serving":{"us":{"amount":"5 kcal"}},"reference_amount":{"us":{"amount":"10 g","grams":"1 mL"}}`),
		[]string{"/yield/mass wrong-unit", "/package/net wrong-unit", "/serving/us/amount wrong-unit", "/reference_amount/us/grams wrong-unit"}},
	{"units of changes", sold(`"yield":{"water":{"loss":"5 mL"}}`), []string{"/yield/water/loss wrong-unit"}},
	{"zeros", sold(`"yield":{"mass":"0 g"},"package":{"net":"0 g","units":"0","surface":"0 cm2"},"serving":{"us":{"amount":"0 g"}},"reference_amount":{"us":"0 g"},"density":{"us":"0 g/mL"}`),
		[]string{"/yield/mass not-above-zero", "/package/net not-above-zero", "/package/units not-above-zero", "/package/surface not-above-zero",
			"/serving/us/amount not-above-zero", "/reference_amount/us not-above-zero", "/density/us not-above-zero"}},
	{"per nothing", one(`"composition":{"per":"0 g","components":{"FAT":"1 g"}}`), []string{"/ingredients/0/composition/per not-above-zero"}},
	{"ranges", specified(`"components":{"FAT":{"low":"2 g","high":"1 g"},"CHOLE":{"low":"1 mg","value":"2.5 mg","high":"0.002 g"}}`),
		[]string{atComponents + "/FAT range-reversed", atComponents + "/CHOLE centre-outside"}},
	{"volumes", `{"id":"x","ingredients":[{"id":"a","amount":"10 mL","food":"sr:20038"},
		{"id":"b","amount":"1 g","composition":{"per":"100 mL","components":{"FAT":"1 g"}}},
		{"id":"c","amount":"1 g","label":{"jurisdiction":"us","serving":"1 tbsp","declared":{"FAT":"1 g"}}}],
		"package":{"net":"1 L"},"serving":{"default":{"amount":"1 cup"}},"reference_amount":{"us":"240 mL"}}`,
		[]string{"/ingredients/0/amount needs-density", "/ingredients/1/composition/per needs-density", "/ingredients/2/label/serving needs-density",
			"/package/net needs-density", "/serving/default/amount needs-density", "/reference_amount/us needs-density"}},
	{"a density for one market of two", sold(`"jurisdictions":["us","eu"],"density":{"us":"1 g/mL"},"serving":{"default":{"amount":"1 cup"}}`), []string{"/serving/default/amount needs-density"}},

	// Meaning: fatty acids.
	{"notation", profiled(`"stearinish":"40"`, ""), []string{atProfile + "/stearinish unknown-fatty-acid"}},
	{"two notations", profiled(`"18:1 9c":"40","C18:1n9c":"1"`, ""), []string{atProfile + "/C18:1n9c same-acid-twice"}},
	{"group and member", profiled(`"18:1":"40","18:1 t":"1"`, ""), []string{atProfile + "/18:1 group-beside-member"}},
	{"more than all", profiled(`"16:0":"60","18:0":"42.1"`, ""), []string{atProfile + " profile-over-100"}},
	{"more than all with the rest", profiled(`"16:0":"60","18:0":"40","unidentified":"2.1"`, ""), []string{atProfile + " profile-over-100"}},
	{"nothing at all", profiled(`"16:0":"0","unidentified":"0"`, `,"complete":true`), []string{atProfile + " profile-all-zero"}},
	{"settled what is not there", profiled(`"18:1":"40"`, `,"settle":[{"group":"18:2","as":"18:2 9c,12c","reason":"x"}]`), []string{atSettle + "/group bad-settlement"}},
	{"settled as another", profiled(`"18:1":"40"`, `,"settle":[{"group":"18:1","as":"18:2 9c,12c","reason":"x"}]`), []string{atSettle + "/as bad-settlement"}},
	{"settled twice", profiled(`"18:1":"40"`, `,"settle":[{"group":"18:1","as":"18:1 c","reason":"x"},{"group":"18:1","as":"18:1 t","reason":"x"}]`),
		[]string{"/ingredients/0/composition/fatty_acids/settle/1/group bad-settlement"}},
	{"settled by a notation that cannot be read", profiled(`"18:1":"40"`, `,"settle":[{"group":"18:1","as":"oilic","reason":"x"}]`), []string{atSettle + "/as unknown-fatty-acid"}},
	{"settled into a double", profiled(`"18:1":"40","18:1 9c":"2"`, `,"settle":[{"group":"18:1","as":"18:1 9c","reason":"x"}]`), []string{atProfile + "/18:1 9c same-acid-twice"}},
	{"share of fat", specified(`"fatty_acids":{"basis":"percent of FAME","profile":{"16:0":"40"},"share_of_fat":"94.5"}`), []string{"/ingredients/0/composition/fatty_acids/share_of_fat out-of-range"}},
	{"origins", one(`"food":"sr:20038","trans_origin":[{"origin":"ruminant","share":"40 %"},{"origin":"refining","share":"59.9 %"}]`), []string{atIngredient + "/trans_origin shares-not-100"}},

	// Meaning: yield and retention.
	{"retention", one(`"food":"sr:20038","retention":"usda-r6:9999"`), []string{atIngredient + "/retention unknown-retention"}},
	{"retained too much", one(`"food":"sr:20038","retention":{"VITC":"85"}`), []string{atIngredient + "/retention/VITC out-of-range"}},
	{"mass and changes", sold(`"yield":{"mass":"9 g","water":{"loss":"10 %"}}`), []string{"/yield yield-twice"}},
	{"empty yield", sold(`"yield":{"explanation":"x"}`), []string{"/yield yield-empty"}},
	{"gain and loss", sold(`"yield":{"water":{"gain":"1 g","loss":"1 g"},"fat":{}}`), []string{"/yield/water gain-or-loss", "/yield/fat gain-or-loss"}},
	{"fat from nowhere", sold(`"yield":{"fat":{"gain":"8 %"}}`), []string{"/yield/fat gain-needs-oil"}},
	{"oil for nothing", sold(`"yield":{"fat":{"loss":"8 %","oil":{"food":"sr:04053"}}}`), []string{"/yield/fat/oil oil-without-gain"}},
	{"lost more than all", sold(`"yield":{"water":{"loss":"100.1 %"}}`), []string{"/yield/water/loss out-of-range"}},

	// Meaning: facts, markets and claims.
	{"facts", sold(`"facts":{"beverag":true,"beverage":"yes","sold to":"anybody","intended for":true,"alcohol by volume":"5 g","annual food sales":"lots"}`),
		[]string{"/facts/beverag unknown-fact", "/facts/beverage wrong-fact-value", "/facts/sold to wrong-fact-value", "/facts/intended for wrong-fact-value",
			"/facts/alcohol by volume wrong-fact-value", "/facts/annual food sales wrong-fact-value"}},
	{"facts of the wrong form", sold(`"facts":{"beverage":["yes"],"sold to":["anybody"],"free acidity":"0.8","protein efficiency ratio":"2.5 g","nutrients added as such":["vitamin-z","iron"],"very low energy diet":[]}`),
		[]string{"/facts/beverage wrong-fact-value", "/facts/sold to wrong-fact-value", "/facts/free acidity wrong-fact-value", "/facts/protein efficiency ratio wrong-fact-value",
			"/facts/nutrients added as such/0 wrong-fact-value", "/facts/very low energy diet empty"}},
	{"lines that are wanted", sold(`"declares":{"us":["vitamin-d","vitamin-d"],"eu":[],"ca":["Vitamin D"]}`),
		[]string{"/declares/us/1 repeated", "/declares/eu empty", "/declares/ca/0 bad-format"}},
	{"a list that is none", sold(`"facts":{"nutrients added as such":"iron"}`), []string{"/facts/nutrients added as such wrong-fact-value"}},
	{"markets twice", sold(`"jurisdictions":["us","us"],"claims":[{"claim":"fat-low","in":["eu","eu"]}]`), []string{"/jurisdictions/1 repeated", "/claims/0/in/1 repeated"}},
	{"claim of nothing", sold(`"claims":[{"in":["us"]}]`), []string{"/claims/0 empty-claim"}},
	{"against what", sold(`"claims":[{"claim":"fat-reduced","against":"clasic"}],"reference_foods":{"classic":{"kind":"similar product","food":"sr:20038"}}`), []string{"/claims/0/against unknown-reference-food"}},
	{"against nothing", sold(`"claims":[{"claim":"fat-reduced","against":"classic"}]`), []string{"/claims/0/against unknown-reference-food"}},

	// Limits over the whole document.
	{"2001 ingredients", `{"id":"x","ingredients":[` + many(MaxIngredients-1) + `],"reference_foods":{"r":{"kind":"similar product","recipe":{"ingredients":[` + many(2) + `]}}}}`,
		[]string{"/reference_foods/r/recipe/ingredients/1 too-many-ingredients"}},
	{"nine levels", nested(9), []string{strings.Repeat("/ingredients/0/recipe", 8) + " too-many-levels"}},
	{"600 ingredients of the wrong type", `{"ingredients":[1` + strings.Repeat(",1", 599) + `],"id":"x"}`, append(wrongTypes(MaxFaults), " more-faults")},
	{"502 faults", sold(`"facts":{` + unknownFacts(502) + `}`), append(placesOfFacts(MaxFaults), " more-faults")},
}

func TestFaults(t *testing.T) {
	for _, c := range faultCases {
		t.Run(c.name, func(t *testing.T) {
			r, faults := Decode([]byte(c.doc))
			if r != nil {
				t.Error("a recipe came with the faults")
			}
			if got := places(faults); !slices.Equal(got, c.want) {
				t.Errorf("got %q\nwant %q", got, c.want)
			}
			for _, f := range faults {
				if f.Says == "" {
					t.Errorf("%s %s says nothing", f.Pointer, f.Code)
				}
			}
		})
	}
}

func TestEveryCodeIsReachedAndListed(t *testing.T) {
	reached := map[string]bool{}
	for _, c := range faultCases {
		for _, w := range c.want {
			reached[w[strings.LastIndexByte(w, ' ')+1:]] = true
		}
	}
	for _, c := range Codes {
		if !reached[c.Code] {
			t.Errorf("no case reaches %s", c.Code)
		}
		delete(reached, c.Code)
	}
	for code := range reached {
		t.Errorf("%s is not in Codes", code)
	}
}

func TestSentencesSayWhatIsRight(t *testing.T) {
	cases := []struct{ name, doc, says string }{
		{"misspelt member", `{"id":"x","ingredients":[{"id":"a","amount":"1 g","food":"sr:20038","amout":"1 g"}]}`, `"amout" is not known here; did you mean "amount"?`},
		{"far from every member", sold(`"weather":"fine"`), `"weather" is not known here; known are id, name, ingredients, yield, package, serving, category, reference_amount, state, density, declares, facts, jurisdictions, claims and reference_foods`},
		{"missing member", one(`"label":{"jurisdiction":"us","declared":{"FAT":"4 g"}}`), `the member "serving" is missing: What the declared values are per: a mass, or a volume with the ingredient's density.`},
		{"number for an amount", sold(`"yield":{"mass":655}`), `a number is given and a text in quotation marks is wanted, such as "420 g"`},
		{"no unit", sold(`"yield":{"mass":"655"}`), `"655" has no unit; write for instance 655 g`},
		{"case of a tagname", specified(`"components":{"fat":"1 g"}`), `"fat" is no tagname of the component register; did you mean "FAT"?`},
		{"case of a listed word", one(`"food":"sr:20038","process":"Refined"`), `"Refined" is none of "unrefined", "refined", "partially hydrogenated", "fully hydrogenated", "hydrogenated", "interesterified" and "fractionated"; did you mean "refined"?`},
		{"two sources", one(`"food":"sr:20038","recipe":{"ingredients":[{"id":"b","amount":"1 g","food":"sr:20038"}]}`), `"food" and "recipe" are given; give exactly one of composition, food, label and recipe`},
		{"long value", sold(`"state":{"us":"` + strings.Repeat("s", 200) + `"}`), `"` + strings.Repeat("s", 40) + `…" is none of "solid" and "liquid"`},
		{"group beside members", profiled(`"18:1":"1","18:1 9c":"2","18:1 t":"3"`, ""), `"18:1" is a group that contains "18:1 9c" and "18:1 t"; leave one side out, or settle which acids the group stands for`},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, faults := Decode([]byte(c.doc))
			if len(faults) != 1 || faults[0].Says != c.says {
				t.Errorf("got %v\nwant %s", faults, c.says)
			}
		})
	}
}

func places(faults Faults) []string {
	out := make([]string, len(faults))
	for i, f := range faults {
		out[i] = f.Pointer + " " + f.Code
	}
	return out
}

func many(n int) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, `,{"id":"i%d","amount":"1 g","food":"sr:20038"}`, i)
	}
	return b.String()[1:]
}

func nested(levels int) string {
	inner := `"food":"sr:20038"`
	for range levels - 1 {
		inner = `"recipe":{"ingredients":[{"id":"a","amount":"1 g",` + inner + `}]}`
	}
	return one(inner)
}

func acids(n int) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, `,"%d:0%s":"0.1"`, i%30+4, strings.Repeat(" ", i/30))
	}
	return b.String()[1:]
}

func categories(n int) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, `,"aa%c%c":"x"`, 'a'+i/26, 'a'+i%26)
	}
	return `"aaa":"x"` + b.String()
}

func unknownFacts(n int) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, `,"unheard of %d":true`, i)
	}
	return b.String()[1:]
}

func placesOfFacts(n int) (out []string) {
	for i := range n {
		out = append(out, fmt.Sprintf("/facts/unheard of %d unknown-fact", i))
	}
	return out
}

// distinctAcids are saturated acids and positional isomers, none twice.
func distinctAcids(n int) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, `,"%d:1(%d%c)":"0.1"`, 16+2*(i/26), 2+i/2%13, "ZE"[i%2])
	}
	return b.String()[1:]
}

func wrongTypes(n int) (out []string) {
	for i := range n {
		out = append(out, fmt.Sprintf("/ingredients/%d wrong-type", i))
	}
	return out
}

func TestReportStaysSmall(t *testing.T) {
	name := strings.Repeat("n", MaxText)
	_, faults := Decode([]byte(sold(`"` + name + `":[` + strings.Repeat("null,", 499) + `null]`)))
	size := 0
	for _, f := range faults {
		size += len(f.Pointer) + len(f.Says)
	}
	if last := faults[len(faults)-1]; last.Code != MoreFaults || size > maxReport+2000 {
		t.Errorf("%d bytes in %d faults, the last %q", size, len(faults), last.Code)
	}
}
