package check_test

import (
	"strings"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
)

// checkOne checks a recipe of one ingredient in the United States.
func checkOne(t *testing.T, ingredient string) (*check.Report, recipe.Faults) {
	t.Helper()
	r, faults := recipe.Decode([]byte(`{"id":"r","name":"r","ingredients":[` + ingredient + `],"serving":{"default":{"amount":"14 g"}}}`))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return check.Check(r, book(t), check.Request{On: "2026-12-01", In: []string{"us"}})
}

// A US "0 g trans" on 14 g may hide almost 0.5 g, 3.57 g per 100 g; "4 g fat" stands for 3.75 to 4.25 g.
func TestALabelIsAnInterval(t *testing.T) {
	rep, faults := checkOne(t, `{"id":"chips","name":"chips","amount":"14 g","label":{"jurisdiction":"us","serving":"14 g","declared":{"FAT":"4 g","FATRN":"0 g","CHOLE":"<5 mg"}}}`)
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	for tag, want := range map[string][2]string{"FATRN": {"0", "3.5714"}, "FAT": {"26.785", "30.357"}, "CHOLE": {"14.285", "35.714"}} {
		c := rep.Composition.Components[tag]
		if !strings.HasPrefix(c.Low, want[0]) || !strings.HasPrefix(c.High, want[1]) {
			t.Errorf("%s lies between %s and %s, want %s and %s", tag, c.Low, c.High, want[0], want[1])
		}
		if c.Value != nil {
			t.Errorf("%s has the value %s although only a range is known", tag, *c.Value)
		}
	}
}

func TestLabelsThatCannotBeAreRefused(t *testing.T) {
	for _, c := range []struct{ name, label, code, pointer string }{
		{"an unknown market", `{"jurisdiction":"zz","serving":"14 g","declared":{"FAT":"4 g"}}`, "unknown-market", "/ingredients/0/label/jurisdiction"},
		{"a value that never prints", `{"jurisdiction":"us","serving":"14 g","declared":{"FAT":"0.3 g"}}`, "label-value", "/ingredients/0/label/declared/FAT"},
		{"no such line", `{"jurisdiction":"us","serving":"14 g","declared":{"F16D0":"1 g"}}`, "label-line", "/ingredients/0/label/declared/F16D0"},
		{"a serving by volume", `{"jurisdiction":"us","serving":"30 mL","declared":{"FAT":"4 g"}}`, "label-serving", "/ingredients/0/label/serving"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, faults := checkOne(t, `{"id":"chips","name":"chips","amount":"14 g","density":"1 g/mL","label":`+c.label+`}`)
			if len(faults) != 1 || faults[0].Code != c.code || faults[0].Pointer != c.pointer {
				t.Errorf("faults %+v, want %s at %s", faults, c.code, c.pointer)
			}
		})
	}
}

func TestRequestsAreAccepted(t *testing.T) {
	r, faults := recipe.Decode([]byte(`{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"1 g","food":"sr:01001"}]}`))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	_, faults = check.Check(r, book(t), check.Request{On: "2026-13-01", In: []string{"us", "zz"}, Transition: "later", Detail: "much", Without: []string{"practice/presumption/x"}})
	var got []string
	for _, f := range faults {
		got = append(got, f.Pointer)
	}
	if strings.Join(got, " ") != "detail in on transition without" {
		t.Errorf("faults at %v", got)
	}
}

// Presumptions are listed, can be switched off one by one, and then leave the value open.
func TestPresumptionsCanBeSwitchedOff(t *testing.T) {
	r, faults := recipe.Decode([]byte(`{"id":"r","name":"r","ingredients":[{"id":"flour","name":"flour","amount":"100 g","food":"sr:20081"}],"serving":{"default":{"amount":"30 g"}}}`))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	for _, c := range []struct {
		without []string
		listed  bool
	}{{nil, true}, {[]string{"practice/presumption/trans-in-unprocessed-plants"}, false}, {[]string{"all"}, false}} {
		rep, faults := check.Check(r, book(t), check.Request{On: "2026-12-01", In: []string{"us"}, Without: c.without})
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		listed := false
		for _, p := range rep.Jurisdictions[0].Presumed {
			listed = listed || p.Component == "FATRN" && p.Ingredient == "flour"
		}
		trans := rep.Composition.Components["FATRN"]
		if listed != c.listed || (trans.High == "0") != c.listed {
			t.Errorf("without %v: listed %v, trans from %s to %s", c.without, listed, trans.Low, trans.High)
		}
	}
}
