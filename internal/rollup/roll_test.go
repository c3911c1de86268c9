package rollup_test

import (
	"fmt"
	"strings"
	"testing"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rollup"
)

// roll decodes the ingredients (and yield) of a recipe and rolls them up.
func roll(t *testing.T, body string) *rollup.Batch {
	t.Helper()
	b, fault := tryRoll(t, body)
	if fault != nil {
		t.Fatal(fault)
	}
	return b
}

func tryRoll(t *testing.T, body string) (*rollup.Batch, *rollup.Fault) {
	t.Helper()
	r, faults := recipe.Decode([]byte(`{"id":"r","name":"r",` + body + `}`))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return rollup.Roll(recipe.Part{Ingredients: r.Ingredients, Yield: r.Yield}, rollup.Options{})
}

// stated is an ingredient with stated components per 100 g.
func stated(id, amount, components, more string) string {
	return fmt.Sprintf(`{"id":%q,"name":%q,"amount":%q,"composition":{"components":{%s}}%s}`, id, id, amount, components, more)
}

func component(t *testing.T, tag string) food.ID {
	t.Helper()
	c, ok := food.Lookup(tag)
	if !ok {
		t.Fatalf("no component %s", tag)
	}
	return c.ID
}

// per100g is a component's range per 100 g of finished food, in grams to six decimals.
func per100g(t *testing.T, b *rollup.Batch, tag string) string {
	t.Helper()
	l := b.Total(component(t, tag)).Mul(quantity.FromInt(100).Quo(b.Mass))
	low, high := l.Low().Brief(6), l.High().Brief(6)
	if low == high {
		return low
	}
	return low + ".." + high
}

func TestYields(t *testing.T) {
	flour := stated("flour", "60 g", `"FAT":"2 g","WATER":"10 g","NA":"5 mg"`, "")
	water := stated("water", "40 g", `"FAT":"0 g","WATER":"100 g","NA":"0 mg"`, "")
	oil := `{"composition":{"components":{"FAT":"100 g","WATER":"0 g"}}}`
	for _, c := range []struct{ name, yield, mass, fat, water string }{
		{"no yield", "", "100", "1.2", "46"},
		{"final mass", `,"yield":{"mass":"80 g"}`, "80", "1.5", "32.5"},
		{"water lost, per cent of all", `,"yield":{"water":{"loss":"20 %"}}`, "80", "1.5", "32.5"},
		{"water lost, mass", `,"yield":{"water":{"loss":"20 g"}}`, "80", "1.5", "32.5"},
		{"water gained", `,"yield":{"water":{"gain":"50 g"}}`, "150", "0.8", "64"},
		{"fat gained from an oil", `,"yield":{"fat":{"gain":"10 g","oil":` + oil + `}}`, "110", "10.181818", "41.818182"},
		{"fat lost", `,"yield":{"fat":{"loss":"0.6 g"}}`, "99.4", "0.603622", "46.277666"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := roll(t, `"ingredients":[`+flour+`,`+water+`]`+c.yield)
			if got := b.Mass.Brief(6); got != c.mass {
				t.Errorf("mass %s, want %s", got, c.mass)
			}
			if got := per100g(t, b, "FAT"); got != c.fat {
				t.Errorf("fat %s, want %s", got, c.fat)
			}
			if got := per100g(t, b, "WATER"); got != c.water {
				t.Errorf("water %s, want %s", got, c.water)
			}
		})
	}
}

func TestNestedYield(t *testing.T) {
	inner := stated("a", "30 g", `"SUGAR":"50 g"`, "") + "," + stated("b", "30 g", `"SUGAR":"0 g"`, "")
	body := `"ingredients":[{"id":"syrup","name":"syrup","amount":"20 g","recipe":{"ingredients":[` + inner + `],"yield":{"mass":"50 g"}}},` + stated("rest", "80 g", `"SUGAR":"0 g"`, "") + `]`
	b := roll(t, body)
	// 15 g of sugar in 50 g of syrup; 20 g of it in 100 g.
	if got := per100g(t, b, "SUGAR"); got != "6" {
		t.Errorf("sugar %s, want 6", got)
	}
	if got := b.Leaves[0].Path; got != "syrup/a" {
		t.Errorf("the first leaf is %s", got)
	}
}

func TestRetention(t *testing.T) {
	for _, c := range []struct{ name, retention, tag, want string }{
		{"a factor", `,"retention":{"VITC":"0.85"}`, "VITC", "0.0085"},
		{"a factor of another component", `,"retention":{"VITC":"0.85"}`, "THIA", "0.002"},
		// USDA Release 6, code 0001 "CHEESE,BAKED": thiamin keeps 75 %, vitamin C 65 %.
		{"a code", `,"retention":"usda-r6:0001"`, "THIA", "0.0015"},
		{"the same code", `,"retention":"usda-r6:0001"`, "VITC", "0.0065"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := roll(t, `"ingredients":[`+stated("x", "100 g", `"VITC":"10 mg","THIA":"2 mg"`, c.retention)+`]`)
			if got := per100g(t, b, c.tag); got != c.want {
				t.Errorf("keeps %s g, want %s", got, c.want)
			}
		})
	}
}

func TestMissingComponentsAreBounded(t *testing.T) {
	for _, c := range []struct{ name, components, tag, want string }{
		{"trans within fat, beside saturated", `"FAT":"20 g","FASAT":"8 g"`, "FATRN", "0..12"},
		{"trans within no fat", `"FAT":"0 g"`, "FATRN", "0"},
		{"sugars within carbohydrate, beside fibre", `"CHOCDF":"60 g","FIBTG":"5 g"`, "SUGAR", "0..55"},
		{"added sugars within sugars", `"SUGAR":"7 g"`, "SUGAD", "0..7"},
		{"a stated range stays", `"FAT":{"low":"19 g","value":"20 g","high":"21 g"}`, "FAT", "19..21"},
		{"less than", `"FATRN":"<0.2 g"`, "FATRN", "0..0.2"},
		{"fat beside the other proximates", `"WATER":"40 g","PROCNT":"10 g","CHOCDF":"30 g","ASH":"2 g"`, "FAT", "0..18"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := roll(t, `"ingredients":[`+stated("x", "50 g", c.components, "")+`]`)
			if got := per100g(t, b, c.tag); got != c.want {
				t.Errorf("lies in %s, want %s", got, c.want)
			}
		})
	}
}

func TestZeroByNature(t *testing.T) {
	b := roll(t, `"ingredients":[`+stated("x", "50 g", `"FAT":"20 g"`, `,"zero_by_nature":[{"component":"FATRN","reason":"unrefined seed"}]`)+`]`)
	if got := per100g(t, b, "FATRN"); got != "0" {
		t.Errorf("trans %s, want 0", got)
	}
	if how := b.Leaves[0].Component(component(t, "FATRN")).How; how != rollup.ByNature {
		t.Errorf("known as %d", how)
	}
}

func TestCoverageIsByIngoingMass(t *testing.T) {
	b := roll(t, `"ingredients":[`+stated("x", "30 g", `"NA":"5 mg"`, "")+`,`+stated("y", "70 g", `"FAT":"1 g"`, "")+`]`)
	if got := b.Coverage(component(t, "NA")).Brief(2); got != "0.3" {
		t.Errorf("coverage %s, want 0.3", got)
	}
}

// acid finds one entry of the first leaf's profile, in grams of acid and of triglyceride.
func acid(t *testing.T, b *rollup.Batch, notation string) (a, tag string) {
	t.Helper()
	for _, x := range b.Leaves[0].Acids() {
		if x.Species.String() == notation {
			return span(x.Acid), span(x.Triglyceride)
		}
	}
	t.Fatalf("no acid %s", notation)
	return "", ""
}

func span(l quantity.Linear) string {
	low, high := l.Low().Brief(4), l.High().Brief(4)
	if low == high {
		return low
	}
	return low + ".." + high
}

// Factors: AOAC 2012.13 Table A and its arithmetic: palmitic acid FAME -> acid 0.94814, acid -> triglyceride 1.04946; oleic acid 0.95269, 1.04490.
func TestProfileBases(t *testing.T) {
	oil := func(fat, acids string) string {
		return `"ingredients":[{"id":"oil","name":"oil","amount":"100 g","composition":{"components":{"FAT":"` + fat + `"},"fatty_acids":{` + acids + `}}}]`
	}
	for _, c := range []struct{ name, body, acid, tag string }{
		// One acid alone: all fat is its triglyceride; 3·256.430 / 807.339 = 95.2871 g acid.
		{"percent of FAME, one acid", oil("100 g", `"basis":"percent of FAME","profile":{"16:0":"100"}`), "95.2871", "100"},
		{"percent of fatty acids, one acid", oil("100 g", `"basis":"percent of fatty acids","profile":{"16:0":"100"}`), "95.2871", "100"},
		{"percent of fatty acids, share of fat", oil("100 g", `"basis":"percent of fatty acids","share_of_fat":"0.945","profile":{"16:0":"40","18:1 9c":"60"}`), "37.8", "39.6696"},
		{"g per 100 g fat", oil("50 g", `"basis":"g per 100 g fat","profile":{"16:0":"40","18:1 9c":"55"}`), "20", "20.9892"},
		{"g per 100 g food", oil("50 g", `"basis":"g per 100 g food","profile":{"16:0":"20","18:1 9c":"27"}`), "20", "20.9892"},
		{"g triglyceride per 100 g food", oil("50 g", `"basis":"g triglyceride per 100 g food","profile":{"16:0":"20","18:1 9c":"28"}`), "19.0574", "20"},
		// 40 % of FAME palmitic, 60 % oleic: 40·0.94814 of acid in 40·0.99503 + 60·0.99547 of triglycerides.
		{"percent of FAME, two acids", oil("100 g", `"basis":"percent of FAME","profile":{"16:0":"40","18:1 9c":"60"}`), "38.1048", "39.9895"},
		{"a tenth unidentified takes its share", oil("100 g", `"basis":"percent of fatty acids","share_of_fat":"1","profile":{"16:0":"90","unidentified":"10"}`), "90", "94.4514"},
		{"a range encloses its centre", oil("100 g", `"basis":"percent of fatty acids","share_of_fat":"1","complete":true,"profile":{"16:0":{"low":"38","value":"40","high":"42"},"18:1 9c":"60"}`), "38.7755..41.1765", "40.6933..43.2131"},
	} {
		t.Run(c.name, func(t *testing.T) {
			a, tag := acid(t, roll(t, c.body), "FA 16:0")
			if a != c.acid || tag != c.tag {
				t.Errorf("acid %s, triglyceride %s; want %s, %s", a, tag, c.acid, c.tag)
			}
		})
	}
}

// Triglycerides of a profile in per cent of FAME add up to the fat exactly, whatever the acids.
func TestTriglyceridesAddUpToFat(t *testing.T) {
	b := roll(t, `"ingredients":[{"id":"oil","name":"oil","amount":"73 g","composition":{"components":{"FAT":"99.3 g"},"fatty_acids":{"basis":"percent of FAME","complete":true,
		"profile":{"4:0":"3.1","12:0":"2.9","16:0":"27.3","18:1 9c":"25.8","18:2 9c,12c":"30.4","22:6 n-3":"10.4"}}}}]`)
	var sum quantity.Ratio
	for _, a := range b.Leaves[0].Acids() {
		sum = sum.Add(a.Triglyceride.Known)
	}
	fat := b.Total(component(t, "FAT"))
	if !fat.Determined() || sum.Cmp(fat.Known) != 0 {
		t.Errorf("triglycerides %s, fat %s", sum.Brief(10), fat.Known.Brief(10))
	}
}

func TestWhatCannotBeIsFound(t *testing.T) {
	for _, c := range []struct{ name, body, code string }{
		{"over 100 g per 100 g", `"ingredients":[` + stated("x", "50 g", `"FAT":"60 g","WATER":"30 g","PROCNT":"11 g"`, "") + `]`, "over-100"},
		{"less than the dry matter", `"ingredients":[` + stated("x", "50 g", `"WATER":"10 g"`, "") + `],"yield":{"mass":"40 g"}`, "below-dry-matter"},
		{"acids above the fat", `"ingredients":[{"id":"x","name":"x","amount":"50 g","composition":{"components":{"FAT":"20 g"},"fatty_acids":{"basis":"g per 100 g food","profile":{"16:0":"21"}}}}]`, "acids-over-fat"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := roll(t, c.body)
			if len(b.Findings) != 1 || b.Findings[0].Code != c.code {
				t.Errorf("findings %+v, want %s", b.Findings, c.code)
			}
		})
	}
	fine := roll(t, `"ingredients":[{"id":"x","name":"x","amount":"50 g","composition":{"components":{"FAT":"20 g","WATER":"80 g"},"fatty_acids":{"basis":"g per 100 g food","profile":{"16:0":"19.8"}}}}]`)
	if len(fine.Findings) != 0 {
		t.Errorf("an official profile 4 %% above its fat is found: %+v", fine.Findings)
	}
}

func TestRollRefuses(t *testing.T) {
	for _, c := range []struct{ name, body, code string }{
		{"more fat lost than there is", `"ingredients":[` + stated("x", "50 g", `"FAT":"2 g"`, "") + `],"yield":{"fat":{"loss":"5 g"}}`, "fat-loss-too-large"},
		{"fat lost of unknown fat", `"ingredients":[` + stated("x", "50 g", `"WATER":"2 g"`, "") + `],"yield":{"fat":{"loss":"1 g"}}`, "fat-loss-needs-fat"},
		{"no mass left", `"ingredients":[` + stated("x", "50 g", `"WATER":"99 g"`, "") + `],"yield":{"water":{"loss":"100 %"}}`, "no-mass"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, fault := tryRoll(t, c.body)
			if fault == nil || fault.Code != c.code {
				t.Errorf("fault %v, want %s", fault, c.code)
			}
		})
	}
}

// Too many profiles in per cent are refused clearly, not computed for minutes.
func TestTooManyProfilesAreRefused(t *testing.T) {
	var in []string
	for i := range 200 {
		in = append(in, fmt.Sprintf(`{"id":"o%d","name":"o","amount":"1 g","composition":{"components":{"FAT":"100 g"},"fatty_acids":{"basis":"percent of FAME","complete":true,
			"profile":{"4:0":"1.%03d","6:0":"2.1","8:0":"1.7","10:0":"3.1","12:0":"4.9","14:0":"11.3","16:0":"33.3","18:0":"9.9","18:1 9c":"22.8","20:5 n-3":"4.4","22:6 n-3":"5.5"}}}}`, i, i))
	}
	_, fault := tryRoll(t, `"ingredients":[`+strings.Join(in, ",")+`]`)
	if fault == nil || fault.Code != "too-fine" {
		t.Errorf("fault %v, want too-fine", fault)
	}
}

// What cooking keeps of a part applies to all that the part has become.
func TestRetentionOfParts(t *testing.T) {
	fatty := stated("fatty", "100 g", `"FAT":"50 g","WATER":"50 g","VITD":"0 ug","CHOLE":"0 mg"`, "")
	part := func(yield, more string) string {
		return `"ingredients":[{"id":"part","name":"part","amount":"90 g","recipe":{"ingredients":[` + fatty + `],"yield":{"fat":` + yield + `}}` + more + `}]`
	}
	oil := `{"composition":{"components":{"FAT":"100 g","VITD":"10 ug"}}}`
	for _, c := range []struct{ name, body, tag, want string }{
		// 40 of 50 g of fat are left in 90 g; half of them stay.
		{"fat lost inside, retention outside", part(`{"loss":"10 g"}`, `,"retention":{"FAT":"0.5"}`), "FAT", "22.222222"},
		{"no fat lost", part(`{"loss":"0 g"}`, ""), "FAT", "50"},
		{"stated equivalents stand", `"ingredients":[{"id":"rice","amount":"100 g","food":"sr:20081","with":{"FOLDFE":"500 ug"},"retention":"usda-r6:0352"}]`, "FOLDFE", "0.0005"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := per100g(t, roll(t, c.body), c.tag); got != c.want {
				t.Errorf("%s is %s, want %s", c.tag, got, c.want)
			}
		})
	}
	// 1 µg in 110 g, 90 g of it used, half of it kept.
	b := roll(t, part(`{"gain":"10 g","oil":`+oil+`}`, `,"retention":{"VITD":"0.5"}`))
	if got, want := b.Total(component(t, "VITD")).Known, quantity.Scaled(45, -8).Mul(quantity.FromInt(100)).Quo(quantity.FromInt(110)); got.Cmp(want) != 0 {
		t.Errorf("vitamin D of the part is %s g, want %s", got.Brief(12), want.Brief(12))
	}
	if got := b.Leaves[1].Pointer; got != "/ingredients/0/recipe/yield/fat/oil" {
		t.Errorf("the oil stands at %s", got)
	}
}

// Cholesterol is not lost with no fat.
func TestNothingIsLostWithNoFat(t *testing.T) {
	b := roll(t, `"ingredients":[`+stated("lean", "100 g", `"FAT":"0 g","CHOLE":"5 mg"`, "")+`],"yield":{"fat":{"loss":"0 g"}}`)
	if got := per100g(t, b, "CHOLE"); got != "0.005" {
		t.Errorf("cholesterol is %s g, want 0.005", got)
	}
}

// Ends at which a profile holds nothing are no reason to stop, and ranges enclose what they cut.
func TestRangedProfiles(t *testing.T) {
	b := roll(t, `"ingredients":[{"id":"fat","name":"fat","amount":"100 g","composition":{"components":{"FAT":"100 g"},"fatty_acids":{"basis":"percent of FAME","complete":true,"profile":{"16:0":{"low":"0","high":"30"},"18:0":"0","18:1 9c":{"low":"0","high":"60"}}}}}]`)
	for _, a := range b.Leaves[0].Acids() {
		if low, high := a.Triglyceride.Low(), a.Triglyceride.High(); low.Sign() != 0 || high.Cmp(quantity.FromInt(100)) > 0 {
			t.Errorf("%s: %s..%s g of 100 g", a.Species, low.Brief(6), high.Brief(6))
		}
	}
}

// However many divisors a recipe brings, it is computed or refused in little time.
func TestManyDivisors(t *testing.T) {
	var in []string
	for i := range 800 {
		in = append(in, fmt.Sprintf(`{"id":"i%d","name":"x","amount":"10 g","composition":{"per":"%d g","components":{"FAT":"1 g"}}}`, i, 123456789012345+2*i))
	}
	_, fault := tryRoll(t, `"ingredients":[`+strings.Join(in, ",")+`]`)
	if fault == nil || fault.Code != "too-fine" {
		t.Errorf("got %v, want too-fine", fault)
	}
}
