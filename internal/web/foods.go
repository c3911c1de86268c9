package web

import (
	"fmt"
	"strconv"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/food"
	"gramlaw/internal/recipe"
)

const (
	someFoods = 20
	mostFoods = 100
	foodTable = "USDA National Nutrient Database for Standard Reference, Release 28; per 100 g of edible portion. What is not listed was not published and is unknown, not zero."
)

// foodList is what a search found.
type foodList struct {
	Foods   []foodHead `json:"foods"`
	More    bool       `json:"more"` // there may be others
	Source  string     `json:"source"`
	Caution string     `json:"caution"`
}

type foodHead struct {
	Reference string    `json:"reference"`
	Name      string    `json:"name"`
	Group     foodGroup `json:"group"`
}

type foodGroup struct {
	Code string `json:"code"`
	Name string `json:"name"`
}

// foodPage is all that was published about one food.
type foodPage struct {
	foodHead
	ShortName      string               `json:"short_name"`
	ScientificName string               `json:"scientific_name,omitzero"`
	Refuse         string               `json:"refuse_percent,omitzero"`
	NitrogenFactor string               `json:"nitrogen_to_protein,omitzero"`
	Components     map[string]foodValue `json:"components"`
	Measures       []foodMeasure        `json:"measures"`
	Footnotes      []foodNote           `json:"footnotes"`
	Source         string               `json:"source"`
	Caution        string               `json:"caution"`
}

type foodValue struct {
	Name       string `json:"name"`
	Value      string `json:"value"`
	Unit       string `json:"unit"`
	Samples    int    `json:"samples"` // analyses behind it; 0 where it was not analysed
	StdErr     string `json:"standard_error,omitzero"`
	Min        string `json:"minimum,omitzero"`
	Max        string `json:"maximum,omitzero"`
	Source     string `json:"source,omitzero"`
	Derivation string `json:"derivation,omitzero"`
	TakenFrom  string `json:"taken_from,omitzero"` // the food it was taken over from
}

type foodMeasure struct {
	Amount  string `json:"amount"`
	Measure string `json:"measure"`
	Grams   string `json:"grams"`
}

type foodNote struct {
	About string `json:"about,omitzero"` // a tagname
	Text  string `json:"text"`
}

// getFoods searches the open table.
func getFoods(x *exchange) *Problem {
	parameters, p := x.parameters("q", "limit")
	if p != nil {
		return p
	}
	text, badText := wordsOf(parameters)
	limit, badLimit := limitOf(parameters)
	if p := faultyParameters(badText, badLimit); p != nil {
		return p
	}
	found := food.Search(text, limit+1)
	list := foodList{Foods: []foodHead{}, More: len(found) > limit, Source: foodTable, Caution: check.Caution}
	for _, f := range found[:min(limit, len(found))] {
		list.Foods = append(list.Foods, headOf(f))
	}
	return x.replyJSON(list, true)
}

func wordsOf(parameters map[string]string) (string, *Fault) {
	text := parameters["q"]
	switch {
	case strings.TrimSpace(text) == "":
		return "", &Fault{Parameter: "q", Code: codeMissingParameter, Says: "words of a food's name are wanted"}
	case len(text) > food.MaxQuery:
		return "", &Fault{Parameter: "q", Code: recipe.TooMany, Says: fmt.Sprintf("at most %d bytes are read", food.MaxQuery)}
	}
	return text, nil
}

func limitOf(parameters map[string]string) (int, *Fault) {
	text, stated := parameters["limit"]
	if !stated {
		return someFoods, nil
	}
	n, err := strconv.Atoi(text)
	if err != nil || n < 1 || n > mostFoods {
		return 0, &Fault{Parameter: "limit", Code: "out-of-range", Says: fmt.Sprintf("a number from 1 to %d is wanted", mostFoods)}
	}
	return n, nil
}

func headOf(f food.Food) foodHead {
	g := f.Group()
	return foodHead{f.Ref(), f.Name(), foodGroup{g.Code, g.Name}}
}

// getFood shows one food.
func getFood(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	f, err := food.Find(x.r.PathValue("reference"))
	if err != nil {
		return problem(notFound, "The open table has no such food; a reference is sr: and five digits, such as sr:01001.")
	}
	return x.replyJSON(pageOf(f), true)
}

func pageOf(f food.Food) foodPage {
	p := foodPage{
		foodHead: headOf(f), ShortName: f.ShortName(), ScientificName: f.ScientificName(), Components: map[string]foodValue{},
		Measures: []foodMeasure{}, Footnotes: []foodNote{}, Source: foodTable, Caution: check.Caution,
	}
	p.Refuse = number(f.Refuse())
	factor, ok := f.NitrogenFactor()
	p.NitrogenFactor = number(factor, ok && factor.Mantissa > 0)
	f.Each(func(id food.ID, v food.Value) bool {
		c, _ := food.ByID(id)
		p.Components[c.Tag] = valueOf(c, v)
		return true
	})
	for _, w := range f.Weights() {
		p.Measures = append(p.Measures, foodMeasure{w.Amount.String(), w.Measure, w.Grams.String()})
	}
	for _, n := range f.Footnotes() {
		c, _ := food.ByID(n.About)
		p.Footnotes = append(p.Footnotes, foodNote{c.Tag, n.Text})
	}
	return p
}

func valueOf(c food.Component, v food.Value) foodValue {
	out := foodValue{
		Name: c.Name, Value: v.String(), Unit: string(c.Unit), Samples: v.Samples, StdErr: number(v.StdErr, v.HasStdErr),
		Min: number(v.Min, v.HasMin), Max: number(v.Max, v.HasMax), Source: v.Source.Meaning(), Derivation: v.Derivation.Meaning(),
	}
	if v.Reference > 0 {
		out.TakenFrom = fmt.Sprintf("sr:%05d", v.Reference)
	}
	return out
}

// number is empty where none was published.
func number(n food.Number, ok bool) string {
	if !ok {
		return ""
	}
	return n.String()
}
