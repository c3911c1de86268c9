package claim

import (
	"strings"
	"testing"

	"github.com/go-json-experiment/json"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// food is a subject of 100 g with quantities in grams (energy in kcal).
type food map[string]quantity.Linear

func (f food) Quantity(name string) (quantity.Linear, bool) { q, ok := f[name]; return q, ok }
func (f food) From(name, _ string) (quantity.Linear, bool)  { q, ok := f[name]; return q, ok }
func (f food) Mass() quantity.Ratio                         { return quantity.FromInt(100) }
func (f food) Meets(string) quantity.Truth                  { return quantity.Open }
func (f food) Basis(p rulebook.Per) (quantity.Ratio, bool) {
	switch {
	case p.Name == "serving", p.Name == "reference amount":
		return quantity.FromInt(30), true
	case p.Amount.Unit.Dimension() == quantity.Mass:
		return quantity.FromDecimal(p.Amount.Base()), true
	}
	return quantity.Ratio{}, false
}

type world struct{ product, reference food }

func (w world) Product() Subject           { return w.product }
func (w world) Reference() (Subject, bool) { return w.reference, w.reference != nil }
func (w world) Meets(id string) quantity.Truth {
	return quantity.TruthOf(id == "x/claim/lower" && w.reference != nil)
}
func (w world) Name(q string) string                { return q }
func (w world) Declared(_, _ string) quantity.Truth { return quantity.Open }
func (w world) Fact(name, is string) quantity.Truth {
	if name == "state" {
		return quantity.TruthOf(is == "solid")
	}
	return quantity.Open
}
func (w world) Has(name, item string) quantity.Truth {
	if name == "nutrients added as such" {
		return quantity.TruthOf(item == "iron")
	}
	return quantity.Open
}
func (w world) Stated(name string) bool { return name == "alcohol by volume" }
func (w world) Measured(name string) (quantity.Ratio, bool) {
	measured := map[string]quantity.Ratio{"alcohol by volume": quantity.Scaled(12, -1), "score": quantity.FromInt(50), "high score": quantity.FromInt(120)}
	v, ok := measured[name]
	return v, ok
}
func (w world) Size(name string) (quantity.Ratio, bool) {
	return quantity.FromInt(60), name == "package"
}
func (w world) EnergyFactor(_, energy string) (quantity.Ratio, bool) {
	return quantity.FromInt(map[string]int64{"energy": 9, "energy-kj": 37}[energy]), true
}
func (w world) ReferenceValue(string) (quantity.Ratio, bool)     { return quantity.FromInt(20), true }
func (w world) ReferenceAmount([]quantity.Amount) quantity.Truth { return quantity.Yes }
func (w world) ClaimedAbout([]string, bool) quantity.Truth       { return quantity.No }
func (w world) Named(id string) (*rulebook.Condition, bool) {
	return &rulebook.Condition{Op: rulebook.OpFact, Name: "state", Is: "solid"}, id == "x/condition/solid"
}
func (w world) NoIngredient(*rulebook.Condition) (quantity.Truth, string) { return quantity.Yes, "" }
func (w world) Category(names []string) quantity.Truth {
	return map[string]quantity.Truth{"bread": quantity.Yes, "sugar": quantity.No}[names[0]]
}
func (w world) ReferenceKind([]string) quantity.Truth { return quantity.Open }

func parse(t *testing.T, s string) *rulebook.Condition {
	t.Helper()
	var c rulebook.Condition
	if err := json.Unmarshal([]byte(s), &c); err != nil {
		t.Fatal(err)
	}
	return &c
}

func exactly(n int64, e int32) quantity.Linear { return quantity.Exactly(quantity.Scaled(n, e)) }

func somewhere(i int, low, high int64) quantity.Linear {
	return quantity.Of(&quantity.Variable{Index: i, Low: quantity.FromInt(low), High: quantity.FromInt(high)})
}

var (
	water = food{"fat": {}, "mono": {}, "fatty-acids": {}, "energy": {}}
	bread = food{"fat": exactly(3, 0), "mono": exactly(1, 0), "fatty-acids": exactly(28, -1), "energy": exactly(250, 0), "energy-kj": exactly(1000, 0)}
	hazy  = food{"fat": somewhere(1, 2, 4), "mono": somewhere(2, 0, 1), "fatty-acids": exactly(3, 0), "energy": exactly(100, 0)}
)

func TestConditions(t *testing.T) {
	for _, c := range []struct {
		name, condition string
		w               world
		want            quantity.Truth
	}{
		{"at most, exactly at", `{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}`, world{product: bread}, quantity.Yes},
		{"below, exactly at", `{"of":{"fat":"1"},"per":"100 g","below":"3 g"}`, world{product: bread}, quantity.No},
		{"at least, exactly at", `{"of":{"fat":"1"},"per":"100 g","at least":"3 g"}`, world{product: bread}, quantity.Yes},
		{"above, exactly at", `{"of":{"fat":"1"},"per":"100 g","above":"3 g"}`, world{product: bread}, quantity.No},
		{"per serving", `{"of":{"fat":"1"},"per":"serving","at most":"0.9 g"}`, world{product: bread}, quantity.Yes},
		{"per serving, just over", `{"of":{"fat":"1"},"per":"serving","at most":"0.8999 g"}`, world{product: bread}, quantity.No},
		{"every basis of a list", `{"of":{"fat":"1"},"per":["100 g","serving"],"at most":"2 g"}`, world{product: bread}, quantity.No},
		{"per 100 kcal", `{"of":{"fat":"1"},"per":"100 kcal","at most":"1.2 g"}`, world{product: bread}, quantity.Yes},
		{"share of energy: 27 of 250", `{"of":{"fat":"1"},"as":"share of energy","at most":"10.8 %"}`, world{product: bread}, quantity.Yes},
		{"share of energy, just under", `{"of":{"fat":"1"},"as":"share of energy","at most":"10.79 %"}`, world{product: bread}, quantity.No},
		{"share of energy in kJ: 111 of 1000", `{"of":{"fat":"1"},"as":"share of energy in kJ","at most":"11.1 %"}`, world{product: bread}, quantity.Yes},
		{"share of energy in kJ, just under", `{"of":{"fat":"1"},"as":"share of energy in kJ","at most":"11.09 %"}`, world{product: bread}, quantity.No},
		{"share of fatty acids: 1 of 2.8", `{"of":{"mono":"1"},"as":"share of fatty acids","at least":"35.7 %"}`, world{product: bread}, quantity.Yes},
		{"share of reference value: 3 of 20", `{"of":{"fat":"1"},"as":"share of reference value","per":"100 g","at least":"15 %"}`, world{product: bread}, quantity.Yes},
		{"sum with weights", `{"of":{"fat":"1","mono":"-1"},"per":"100 g","at most":"2 g"}`, world{product: bread}, quantity.Yes},

		{"water: at least a share never holds", `{"of":{"mono":"1"},"as":"share of fatty acids","at least":"0 %"}`, world{product: water}, quantity.No},
		{"water: above a share never holds", `{"of":{"fat":"1"},"as":"share of energy","above":"0 %"}`, world{product: water}, quantity.No},
		{"water: at most a share holds for nothing", `{"of":{"fat":"1"},"as":"share of energy","at most":"10 %"}`, world{product: water}, quantity.Yes},
		{"water: below a share holds for nothing", `{"of":{"fat":"1"},"as":"share of energy","below":"10 %"}`, world{product: water}, quantity.Yes},
		{"water: at least per 100 kcal never holds", `{"of":{"fat":"1"},"per":"100 kcal","at least":"0 g"}`, world{product: water}, quantity.No},
		{"water: reduced from nothing never holds", `{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`, world{water, water}, quantity.No},

		{"interval below", `{"of":{"fat":"1"},"per":"100 g","at most":"4 g"}`, world{product: hazy}, quantity.Yes},
		{"interval above", `{"of":{"fat":"1"},"per":"100 g","below":"2 g"}`, world{product: hazy}, quantity.No},
		{"interval across", `{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}`, world{product: hazy}, quantity.Open},
		{"the same unknown on both sides cancels", `{"of":{"fat":"1"},"per":"100 g fat","at most":"100 g"}`, world{product: hazy}, quantity.Yes},
		{"one no decides all", `{"all":[{"of":{"fat":"1"},"per":"100 g","at most":"3 g"},{"of":{"fat":"1"},"per":"100 g","at most":"1 g"}]}`, world{product: hazy}, quantity.No},
		{"open stays open under not", `{"not":{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}}`, world{product: hazy}, quantity.Open},
		{"an open guard whose branches agree", `{"when":{"fact":"x","is":"y"},"then":{"fact":"state","is":"solid"},"else":{"fact":"state","is":"solid"}}`, world{product: bread}, quantity.Yes},
		{"an open guard whose branches differ", `{"when":{"fact":"x","is":"y"},"then":{"fact":"state","is":"solid"},"else":{"fact":"state","is":"liquid"}}`, world{product: bread}, quantity.Open},
		{"a measured fact at its limit", `{"fact":"alcohol by volume","above":"1.2 %"}`, world{product: bread}, quantity.No},
		{"a measured fact below its limit", `{"fact":"alcohol by volume","below":"1.3 %"}`, world{product: bread}, quantity.Yes},
		{"a measured fact nobody stated", `{"fact":"polyols","above":"10 %"}`, world{product: bread}, quantity.Open},
		{"weighed by a fact: 3 at 0.5", `{"of":{"fat":"1"},"times":[{"fact":"score"}],"per":"100 g","at least":"1.5 g"}`, world{product: bread}, quantity.Yes},
		{"weighed by a fact, just under", `{"of":{"fat":"1"},"times":[{"fact":"score"}],"per":"100 g","at least":"1.51 g"}`, world{product: bread}, quantity.No},
		{"weighed by a fact times 2.5", `{"of":{"fat":"1"},"times":[{"fact":"ratio"},{"fact":"score","factor":"2.5"}],"per":"100 g","at least":"3.75 g"}`, world{product: bread}, quantity.Yes},
		{"weighed by a fact that is capped", `{"of":{"fat":"1"},"times":[{"fact":"high score","at most":"100 %"}],"per":"100 g","above":"3 g"}`, world{product: bread}, quantity.No},
		{"weighed, as a share of the reference value: 1.5 of 20", `{"of":{"fat":"1"},"times":[{"fact":"score"}],"as":"share of reference value","per":"100 g","at least":"7.5 %"}`, world{product: bread}, quantity.Yes},
		{"weighed by a fact nobody stated", `{"of":{"fat":"1"},"times":[{"fact":"ratio"}],"per":"100 g","at least":"0 g"}`, world{product: bread}, quantity.Open},
		{"weighed by the fact whose condition holds", `{"of":{"fat":"1"},"times":[{"fact":"high score","if":{"fact":"state","is":"liquid"}},{"fact":"score"}],"per":"100 g","at most":"1.5 g"}`, world{product: bread}, quantity.Yes},
		{"weighed by one of two facts, nobody knows which", `{"of":{"fat":"1"},"times":[{"fact":"high score","if":{"fact":"x","is":"y"}},{"fact":"score"}],"per":"100 g","at most":"9 g"}`, world{product: bread}, quantity.Open},
		{"weighed against a food whose facts nobody knows", `{"of":{"fat":"1"},"times":[{"fact":"score"}],"per":"100 g","increased by":"25 %"}`, world{bread, bread}, quantity.Open},
		{"the category", `{"category is":["bread"]}`, world{product: bread}, quantity.Yes},
		{"a category nobody stated", `{"category is":["soup"]}`, world{product: bread}, quantity.Open},
		{"a category nobody stated, asked for as stated", `{"category is":["soup"],"stated":true}`, world{product: bread}, quantity.No},
		{"another category", `{"category is":["sugar"]}`, world{product: bread}, quantity.No},
		{"a list that holds it", `{"fact":"nutrients added as such","has":"iron"}`, world{product: bread}, quantity.Yes},
		{"a list without it", `{"fact":"nutrients added as such","has":"zinc"}`, world{product: bread}, quantity.No},
		{"a list nobody stated", `{"fact":"other list","has":"zinc"}`, world{product: bread}, quantity.Open},
		{"a fact that is stated", `{"fact":"alcohol by volume","stated":true}`, world{product: bread}, quantity.Yes},
		{"a fact that is not stated", `{"fact":"polyols","stated":true}`, world{product: bread}, quantity.No},
		{"what data cannot decide", `{"undecided":{"en":"the order of the words"}}`, world{product: bread}, quantity.Open},
		{"a package of twice the reference amount", `{"size of":"package","as":"share of reference amount","at least":"200 %"}`, world{product: bread}, quantity.Yes},
		{"a package below twice the reference amount", `{"size of":"package","as":"share of reference amount","below":"200 %"}`, world{product: bread}, quantity.No},
		{"a package by mass", `{"size of":"package","at most":"60 g"}`, world{product: bread}, quantity.Yes},
		{"a serving as a share of the package", `{"size of":"package","as":"share of serving","at least":"200 %"}`, world{product: bread}, quantity.Yes},
		{"a size that is stated", `{"size of":"package","stated":true}`, world{product: bread}, quantity.Yes},
		{"a size that is not stated", `{"size of":"surface","stated":true}`, world{product: bread}, quantity.No},
		{"a named condition", `{"holds":"x/condition/solid"}`, world{product: bread}, quantity.Yes},
		{"a named condition that is not in force", `{"holds":"x/condition/other"}`, world{product: bread}, quantity.No},
		{"a unit nobody weighed", `{"size of":"unit","at most":"60 g"}`, world{product: bread}, quantity.Open},
		{"one of two", `{"at least":1,"of":[{"fact":"state","is":"solid"},{"fact":"x","is":"y"}]}`, world{product: bread}, quantity.Yes},

		{"reduced by exactly 25 %", `{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`, world{bread, food{"fat": exactly(4, 0)}}, quantity.Yes},
		{"reduced by just under 25 %", `{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`, world{bread, food{"fat": exactly(399, -2)}}, quantity.No},
		{"not more than the reference", `{"of":{"fat":"1"},"per":"100 g","not more than":"reference food"}`, world{bread, food{"fat": exactly(3, 0)}}, quantity.Yes},
		{"less by an amount", `{"of":{"fat":"1"},"per":"100 g","less by":"2 g"}`, world{bread, food{"fat": exactly(5, 0)}}, quantity.Yes},
		{"more by a share of the reference value", `{"of":{"fat":"1"},"as":"share of reference value","per":"100 g","more by":"10 %"}`, world{bread, food{"fat": exactly(1, 0)}}, quantity.Yes},
		{"another claim that compares", `{"meets":"x/claim/lower"}`, world{bread, bread}, quantity.Yes},
		{"no reference food", `{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`, world{product: bread}, quantity.Open},
	} {
		t.Run(c.name, func(t *testing.T) {
			r := Evaluate(parse(t, c.condition), c.w)
			if r.Truth != c.want {
				t.Errorf("is %s, want %s: %+v", r.Truth, c.want, r.Compare)
			}
			if got := Decide(parse(t, c.condition), c.w); got != c.want {
				t.Errorf("is decided as %s, want %s", got, c.want)
			}
		})
	}
}

// Headroom is how far a value is inside its threshold, in the threshold's unit.
func TestHeadroom(t *testing.T) {
	for _, c := range []struct{ condition, exact, headroom, says string }{
		{`{"of":{"fat":"1"},"per":"serving","at most":"1 g"}`, "0.9", "0.1", "fat at most 1 g per serving"},
		{`{"of":{"fat":"1"},"per":"serving","at most":"800 mg"}`, "900", "-100", "fat at most 800 mg per serving"},
		{`{"of":{"mono":"1"},"as":"share of fat","at least":"45 %"}`, "33.333", "-11.667", "mono as share of fat at least 45 %"},
		{`{"of":{"fat":"1"},"per":"100 kcal","above":"1 g"}`, "1.2", "0.2", "fat above 1 g per 100 kcal"},
	} {
		r := Evaluate(parse(t, c.condition), world{product: bread})
		if got := r.Compare.Exact.Brief(3); got != c.exact {
			t.Errorf("%s: exact %s, want %s", c.condition, got, c.exact)
		}
		if got := r.Compare.Headroom.Brief(3); got != c.headroom {
			t.Errorf("%s: headroom %s, want %s", c.condition, got, c.headroom)
		}
		if r.Says != c.says {
			t.Errorf("says %q, want %q", r.Says, c.says)
		}
	}
}

func TestOpenNamesWhatIsMissing(t *testing.T) {
	r := Evaluate(parse(t, `{"of":{"fat":"1"},"per":"100 mL","at most":"1 g"}`), world{product: bread})
	if r.Truth != quantity.Open || !strings.Contains(r.Missing, "density") {
		t.Errorf("is %s, missing %q", r.Truth, r.Missing)
	}
	r = Evaluate(parse(t, `{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}`), world{product: hazy})
	if len(r.Compare.Variables) != 1 || r.Compare.Variables[0].Index != 1 {
		t.Errorf("depends on %v", r.Compare.Variables)
	}
}
