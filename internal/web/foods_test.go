package web

import (
	"encoding/json"
	"net/http"
	"slices"
	"testing"
)

// Foods are those of the open table. Butter, salted: SR28, sr:01001.
func TestFoods(t *testing.T) {
	h := handler(t, options())
	type list struct {
		Foods []struct{ Reference, Name string }
		More  bool
	}
	for _, c := range []struct {
		target string
		n      int
		more   bool
		has    string
	}{
		{"/v1/foods?q=butter+salted&limit=1", 1, false, "sr:01001"}, {"/v1/foods?q=oil+olive+salad", 1, false, "sr:04053"}, {"/v1/foods?q=buttr&limit=5", 5, true, ""}, {"/v1/foods?q=zzzzz", 0, false, ""},
		{"/v1/foods?q=milk", 20, true, ""}, {"/v1/foods?q=milk&limit=100", 100, true, ""},
	} {
		got := show[list](t, h, c.target)
		found := c.has == ""
		for _, f := range got.Foods {
			found = found || f.Reference == c.has
		}
		if len(got.Foods) != c.n || got.More != c.more || !found {
			t.Errorf("%s: %d foods, more %t: %v", c.target, len(got.Foods), got.More, got.Foods)
		}
	}
	type page struct {
		Reference, Name string
		Components      map[string]struct{ Value, Unit string }
		Measures        []struct{ Amount, Measure, Grams string }
	}
	butter := show[page](t, h, "/v1/foods/sr:01001")
	if w := butter.Components["WATER"]; butter.Name != "Butter, salted" || w.Value != "15.87" || w.Unit != "g" || len(butter.Measures) == 0 {
		t.Errorf("%+v", butter)
	}
	for _, reference := range []string{"sr:99999", "sr:1001", "01001", "sr:0100x", "sr:", "xx:01001"} {
		if w := ask(t, h, "GET", "/v1/foods/"+reference, ""); w.Code != http.StatusNotFound {
			t.Errorf("%s: %d", reference, w.Code)
		}
	}
}

// A check says what each ingredient brings, by its id, where that is asked for; a claim stays in the markets it is asked for in.
func TestCheckAnswersWhatIsAsked(t *testing.T) {
	h := handler(t, options())
	doc := `{"id": "r", "ingredients": [{"id": "flour-7", "amount": "60 g", "food": "sr:20081"}, {"id": "mix", "amount": "40 g", "recipe": {"ingredients": [{"id": "butter-3", "amount": "10 g", "food": "sr:01001"}]}}],
		"claims": [{"claim": "fat-low", "in": ["us"]}], "serving": {"default": {"amount": "30 g"}}}`
	type report struct {
		Jurisdictions []struct {
			Jurisdiction string
			Claims       []struct{ Asked string }
			Declaration  struct {
				Lines []struct {
					Values []struct{ Contributions []struct{ Ingredient string } }
				}
			}
		}
	}
	for _, c := range []struct {
		detail string
		want   []string
	}{{"", nil}, {`, "detail": "contributions"`, []string{"flour-7", "mix/butter-3"}}} {
		var got report
		w := ask(t, h, "POST", "/v1/check", `{"recipe": `+doc+`, "in": ["ca", "us"]`+c.detail+`}`, "Content-Type: application/json")
		if err := json.Unmarshal(w.Body.Bytes(), &got); err != nil || w.Code != 200 || len(got.Jurisdictions) != 2 || got.Jurisdictions[0].Jurisdiction != "ca" {
			t.Fatalf("%d %v %.300s", w.Code, err, w.Body)
		}
		if len(got.Jurisdictions[0].Claims) != 0 || len(got.Jurisdictions[1].Claims) != 1 {
			t.Errorf("claims %+v", got)
		}
		brought := map[string]bool{}
		for _, m := range got.Jurisdictions {
			for _, l := range m.Declaration.Lines {
				for _, v := range l.Values {
					for _, one := range v.Contributions {
						brought[one.Ingredient] = true
					}
				}
			}
		}
		if names := sortedNames(brought); !slices.Equal(names, c.want) {
			t.Errorf("contributions of %q, want %q", names, c.want)
		}
	}
}
