package recipe

import (
	"os"
	"strings"
	"testing"

	"github.com/shopspring/decimal"

	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
)

func TestSketchDecodes(t *testing.T) {
	doc, err := os.ReadFile("testdata/sketch.json")
	if err != nil {
		t.Fatal(err)
	}
	r := decoded(t, string(doc))
	fat, syrup := r.Ingredients[1], r.Ingredients[3]
	same(t, "id", r.ID, "oat-biscuit")
	same(t, "digest", r.Digest, "sha256:9649393710848071ac0e149491c71e5eacb86c1d032f99a4e901e085c785dc7a")
	same(t, "food", r.Ingredients[0].Food, "sr:20038")
	same(t, "nature", r.Ingredients[0].ZeroByNature[0], Nature{"FATRN", "unrefined seed"})
	same(t, "pointer", fat.Pointer, "/ingredients/1")
	same(t, "process", fat.Process, "refined")
	same(t, "per", fat.Composition.Per.String(), "100 g")
	same(t, "water", fat.Composition.Components["WATER"].High.String(), "0.1")
	same(t, "acids", len(fat.Composition.Acids.Acids), 5)
	same(t, "complete", fat.Composition.Acids.Complete, true)
	same(t, "unidentified", fat.Composition.Acids.Unidentified.Central.String(), "1.8")
	same(t, "label", r.Ingredients[2].Label.Serving.String(), "14 g")
	same(t, "density", syrup.Recipe.Ingredients[1].Density.String(), "0.998")
	same(t, "pointer in a part", syrup.Recipe.Ingredients[1].Pointer, "/ingredients/3/recipe/ingredients/1")
	same(t, "yield", syrup.Recipe.Yield.Mass.String(), "88 g")
	same(t, "units", r.Package.Units.String(), "6")
	same(t, "surface", r.Package.Surface.String(), "240")
	same(t, "serving", r.Serving["default"].Measure, "2 biscuits")
	same(t, "state", r.State["default"], "solid")
	same(t, "flag", r.Facts["sweetening ingredients"].Flag, quantity.Yes)
	same(t, "text", r.Facts["intended for"].Text, "general population")
	same(t, "stated", r.Claims[2].Stated.String(), "30 %")
	same(t, "claim", r.Claims[1].Pointer, "/claims/1")
	same(t, "reference", r.References["classic"].Pointer, "/reference_foods/classic")
}

// acceptedCases are documents with every form that a member may have.
var acceptedCases = []struct{ name, doc string }{
	{"smallest", `{"id":"x","ingredients":[{"id":"a","amount":"0 g","food":"sr:20038"}]}`},
	{"values", specified(`"components":{"FAT":"1.5 g","WATER":"<0.1 g","CHOLE":"< 2mg","PROCNT":{"low":"1 g","high":"2000 mg"},"FATRN":{"low":"0 g","value":"0.1 g","high":"0.2 g"}}`)},
	{"numbers of a profile", profiled(`"16:0":"44.1","18:0":"<0.1","18:1 9c":{"low":"30","value":"33","high":"35"}`, "")},
	{"exactly 102", profiled(`"16:0":"60","18:0":"42"`, "")},
	{"200 acids", specified(`"fatty_acids":{"basis":"g per 100 g fat","profile":{` + distinctAcids(MaxAcids) + `}}`)},
	{"settled beside a member", profiled(`"18:1":"30","18:1 9c":"2"`, `,"settle":[{"group":"18:1","as":"18:1 t","reason":"x"}]`)},
	{"origins", one(`"food":"sr:20038","trans_origin":[{"origin":"ruminant","share":"40 %"},{"origin":"refining","share":"60%"}]`)},
	{"origin and retention", one(`"food":"sr:20038","trans_origin":"ruminant","retention":"usda-r6:0352","iodine_value":"54"`)},
	{"retention by tagname", one(`"food":"sr:20038","retention":{"VITC":"0.85","THIA":"1"},"with":{"FATRN":"0.2 g"}`)},
	{"volumes", `{"id":"x","ingredients":[{"id":"a","amount":"10 mL","density":"0.92g/ml","composition":{"per":"1 L","components":{"FAT":"900 g"}}}],
		"density":{"us":"1.03 kg/L","eu":"1 g/mL"},"jurisdictions":["us","eu"],"serving":{"default":{"amount":"1 cup"}},"package":{"net":"1 L"},
		"reference_amount":{"us":"240 mL","ca":{"amount":"1 tbsp","grams":"14 g"}}}`},
	{"changes", sold(`"yield":{"water":{"loss":"100 %"},"fat":{"gain":"8 %","oil":{"composition":{"components":{"FAT":"100 g"}}}}}`)},
	{"gain of water", sold(`"yield":{"water":{"gain":"250 %"}}`)},
	{"facts", sold(`"facts":{"alcohol by volume":"5 %","sold to":"other business","beverage":false,"protein efficiency ratio":"2.5","free acidity":"0.8 %",
		"nutrients added as such":["vitamin-d","vitamin-e"]}`)},
	{"claims", sold(`"claims":[{"text":"riche en oméga-3","language":"fr-CA"},{"claim":"fat-reduced","against":"r/1"}],"reference_foods":{"r/1":{"kind":"similar product","food":"sr:20038"}}`)},
	{"lines that are wanted", sold(`"declares":{"us":["vitamin-d","polyunsaturated-fat"],"default":["starch"]}`)},
	{"escapes", `{"\u0069d":"\ud83d\ude00","ingredients":[{"id":"a\u0000","amount":"1\u0020g","food":"sr:20038"}]}`},
	{"8 levels", nested(MaxLevels)},
	{"2000 ingredients", `{"id":"x","ingredients":[` + many(MaxIngredients-2) + `],"reference_foods":{"r":{"kind":"similar product","recipe":{"ingredients":[` + many(2) + `]}}}}`},
	{"longest text", sold(`"name":"` + strings.Repeat("ä", MaxText) + `"`)},
	{"longest id", strings.Replace(sold(`"name":"x"`), `"x"`, `"`+strings.Repeat("ä", MaxIDText)+`"`, 1)},
	{"exactly 1 MiB", strings.Repeat(" ", MaxBytes-len(sold(`"name":"x"`))) + sold(`"name":"x"`)},
	{"wide object", sold(`"category":{"zzzz":"x",` + categories(100) + `}`)},
}

func TestAccepted(t *testing.T) {
	for _, c := range acceptedCases {
		t.Run(c.name, func(t *testing.T) { decoded(t, c.doc) })
	}
}

func TestValues(t *testing.T) {
	cases := []struct {
		name, value        string
		low, central, high string
		typical            bool
		unit               quantity.Unit
	}{
		{"exact", `"1.5 g"`, "1.5", "1.5", "1.5", true, quantity.Gram},
		{"zero is a value", `"0 g"`, "0", "0", "0", true, quantity.Gram},
		{"below", `"<0.1 g"`, "0", "0", "0.1", false, quantity.Gram},
		{"range", `{"low":"1.5 g","high":"2.2 g"}`, "1.5", "0", "2.2", false, quantity.Gram},
		{"range with its typical value", `{"low":"1.5 g","value":"1.8 g","high":"2.2 g"}`, "1.5", "1.8", "2.2", true, quantity.Gram},
		{"range in several units", `{"low":"150 mg","value":"0.18 g","high":"0.0002 kg"}`, "150", "180", "200", true, quantity.Milligram},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			v := decoded(t, specified(`"components":{"FAT":`+c.value+`}`)).Ingredients[0].Composition.Components["FAT"]
			same(t, "low", v.Low.String(), c.low)
			same(t, "central", v.Central.String(), c.central)
			same(t, "high", v.High.String(), c.high)
			same(t, "typical", v.Typical, c.typical)
			same(t, "unit", v.Unit, c.unit)
		})
	}
}

func TestMissingStaysMissing(t *testing.T) {
	r := decoded(t, `{"id":"x","ingredients":[{"id":"a","amount":"1 g","composition":{"components":{"FAT":"1 g"}}}]}`)
	in := r.Ingredients[0]
	if in.IodineValue != nil || in.Retention != nil || in.TransOrigin != nil || in.With != nil || in.Composition.Acids != nil {
		t.Errorf("something came from nothing: %+v", in)
	}
	if r.Yield != nil || r.Package != nil || r.Facts != nil || r.Density != nil {
		t.Errorf("something came from nothing: %+v", r)
	}
}

func TestComplete(t *testing.T) {
	cases := []struct {
		name, basis, profile, more string
		want                       bool
	}{
		{"sum of 98", "percent of FAME", `"16:0":"60","18:0":"38"`, "", true},
		{"sum below 98", "percent of FAME", `"16:0":"60","18:0":"37.9"`, "", false},
		{"traces do not fill it", "percent of FAME", `"16:0":"60","18:0":"37.9","14:0":"<1"`, "", false},
		{"unidentified", "percent of fatty acids", `"16:0":"60","unidentified":"1"`, "", true},
		{"grams of fatty acids", "g per 100 g fat", `"16:0":"60","18:0":"38"`, "", false},
		{"said so", "g per 100 g food", `"16:0":"3"`, `,"complete":true`, true},
		{"said not", "percent of FAME", `"16:0":"60","18:0":"40"`, `,"complete":false`, false},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			p := decoded(t, specified(`"fatty_acids":{"basis":"`+c.basis+`","profile":{`+c.profile+`}`+c.more+`}`)).Ingredients[0].Composition.Acids
			same(t, "complete", p.Complete, c.want)
		})
	}
}

func TestBasisGivesTheUnit(t *testing.T) {
	for _, basis := range Bases {
		want := quantity.Gram
		if strings.HasPrefix(basis, "percent") {
			want = quantity.PerCent
		}
		p := decoded(t, specified(`"fatty_acids":{"profile":{"16:0":"3","unidentified":"<1"},"basis":"`+basis+`"}`)).Ingredients[0].Composition.Acids
		same(t, basis, p.Acids[0].Value.Unit, want)
		same(t, basis+", unidentified", p.Unidentified.Unit, want)
	}
}

func TestSettledGroup(t *testing.T) {
	p := decoded(t, profiled(`"C18:1":"40"`, `,"settle":[{"group":"18:1","as":"oleic acid","reason":"no trans found"}]`)).Ingredients[0].Composition.Acids
	want, err := lipid.Parse("18:1 9c")
	if err != nil {
		t.Fatal(err)
	}
	same(t, "species", p.Acids[0].Species, want)
	same(t, "notation", p.Acids[0].Notation, "C18:1")
	same(t, "reason", p.Acids[0].Settled, "no trans found")
	same(t, "kept", p.Settled[0], Settlement{"18:1", "oleic acid", "no trans found"})
}

func TestTransOriginAndYield(t *testing.T) {
	r := decoded(t, one(`"food":"sr:20038","trans_origin":"ruminant"`))
	same(t, "origin", r.Ingredients[0].TransOrigin[0].Origin, "ruminant")
	same(t, "all of it", r.Ingredients[0].TransOrigin[0].Share.Equal(decimal.New(100, 0)), true)
	y := decoded(t, sold(`"yield":{"water":{"loss":"12 %"},"fat":{"gain":"8 g","oil":{"food":"sr:04053"}}}`)).Yield
	same(t, "water", y.Water.Gain, false)
	same(t, "fat", y.Fat.Gain, true)
	same(t, "oil", y.Fat.Oil.Food, "sr:04053")
	same(t, "gain", y.Fat.Amount.String(), "8 g")
}

func TestPerMarket(t *testing.T) {
	m := PerMarket[string]{"us": "a", "default": "b"}
	for _, c := range []struct{ market, want string }{{"us", "a"}, {"ca", "b"}} {
		got, ok := m.For(c.market)
		same(t, c.market, got, c.want)
		same(t, c.market, ok, true)
	}
	_, ok := PerMarket[string]{"us": "a"}.For("ca")
	same(t, "no default", ok, false)
}

func TestTenFaultsAtOnce(t *testing.T) {
	_, faults := Decode([]byte(`{"id": 1, "ingredients": [
		{"id": "a", "amount": "3", "food": "sr:20038", "proces": "refined"},
		{"id": "a", "amount": null, "composition": {"components": {"FATT": "1 g", "FAT": "1 mL"}, "fatty_acids": {"basis": "percent of FAME", "profile": {"18:1": "5", "18:1 t": "1"}}}}],
		"yield": {}, "claims": [{"claim": "fat-low", "against": "classic"}]}`))
	same(t, "faults", strings.Join(places(faults), "\n"), strings.Join([]string{
		"/id wrong-type",
		"/ingredients/0/amount bad-amount",
		"/ingredients/0/proces unknown-member",
		"/ingredients/1/id duplicate-id",
		"/ingredients/1/amount null",
		"/ingredients/1/composition/components/FATT unknown-component",
		"/ingredients/1/composition/components/FAT wrong-unit",
		"/ingredients/1/composition/fatty_acids/profile/18:1 group-beside-member",
		"/yield yield-empty",
		"/claims/0/against unknown-reference-food",
	}, "\n"))
}

func TestFaultsAreAnError(t *testing.T) {
	_, faults := Decode([]byte(`{"id":"x"}`))
	same(t, "one", faults.Err().Error(), `the document: the member "ingredients" is missing: What goes in, in any order. At most 2,000 ingredients in the whole document. (missing-member)`)
	_, faults = Decode([]byte(sold(`"yield":{},"name":1`)))
	same(t, "two", faults.Err().Error(), "/yield: nothing is stated; give mass, or the change of water or of fat (yield-empty) and 1 more")
	_, faults = Decode([]byte(sold(`"name":"x"`)))
	same(t, "none", faults.Err(), nil)
}

func decoded(t *testing.T, doc string) *Recipe {
	t.Helper()
	r, faults := Decode([]byte(doc))
	if faults != nil {
		t.Fatalf("refused: %v", faults)
	}
	return r
}

func same[T comparable](t *testing.T, what string, got, want T) {
	t.Helper()
	if got != want {
		t.Errorf("%s: got %v, want %v", what, got, want)
	}
}

func TestFactsOfEveryForm(t *testing.T) {
	r, faults := Decode([]byte(sold(`"facts":{"protein efficiency ratio":"2.5","free acidity":"0.8 %","nutrients added as such":["vitamin-d","vitamin-e"]}`)))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	same(t, "a plain number", r.Facts["protein efficiency ratio"].Number.String(), "250 %")
	same(t, "an amount", r.Facts["free acidity"].Number.String(), "0.8 %")
	same(t, "a list", strings.Join(r.Facts["nutrients added as such"].List, " "), "vitamin-d vitamin-e")
	same(t, "what the list implies", r.Facts["vitamins or minerals added"].Flag, quantity.Yes)
}
