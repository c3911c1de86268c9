package web

import (
	"bytes"
	"context"
	"slices"

	"github.com/go-json-experiment/json"

	"gramlaw/internal/check"
	"gramlaw/internal/food"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
)

// maxWords bounds a text in bytes before its characters are counted.
const maxWords = 8 * wording.MaxText

// A wordsOrder asks what words are in law, by themselves or for one product.
type wordsOrder struct {
	order
	check.WordingRequest
	ofFood bool // the recipe was made of one food
	stated bool // the text stands in the document
}

func wordingMembers() []string {
	return []string{"text", "language", "in", "recipe", "food", "on", "rules"}
}

// postWording reads words.
func postWording(x *exchange) *Problem { return x.document(x.wording) }

// wording reads and judges one document, in turn with others.
func (x *exchange) wording(ctx context.Context, doc []byte) ([]byte, *Problem) {
	done, p := x.gate.work(ctx)
	if p != nil {
		return nil, p
	}
	defer done()
	o, faults := readWording(doc)
	if o.On == "" {
		o.On = x.today()
	}
	if len(faults) > 0 {
		return nil, faultyDocument(o.withOthers(faults, x.rules.Book))
	}
	if p := x.pinned(o.rules); p != nil {
		return nil, p
	}
	report, faults := check.Wording(o.recipe, x.rules.Book, o.WordingRequest)
	if len(faults) > 0 {
		return nil, faultyDocument(o.placeWords(faults))
	}
	var b bytes.Buffer
	if err := render.WordingJSON(&b, report, true); err != nil {
		return nil, problem(internal, "")
	}
	return b.Bytes(), nil
}

// withOthers adds what is wrong with the request to what is wrong with the document, where the same member has no fault yet.
func (o *wordsOrder) withOthers(faults recipe.Faults, book *rulebook.Book) recipe.Faults {
	for _, f := range o.place(o.WordingRequest.Faults(book)) {
		if f.Pointer == "/text" && o.Text == "" && !o.stated {
			continue
		}
		if !slices.ContainsFunc(faults, func(had recipe.Fault) bool { return had.Pointer == f.Pointer }) {
			faults = append(faults, f)
		}
	}
	return faults
}

// placeWords points faults into the document sent; those of a recipe made of one food to that food.
func (o *wordsOrder) placeWords(faults recipe.Faults) recipe.Faults {
	out := o.place(faults)
	for i := range out {
		if o.ofFood && len(out[i].Pointer) > len(o.within) && out[i].Pointer[:len(o.within)] == o.within {
			out[i].Pointer = "/food"
		}
	}
	return out
}

// readWording reads the document of a request for words. It gives the order, or every fault.
func readWording(doc []byte) (*wordsOrder, recipe.Faults) {
	e := &envelope{doc: doc}
	e.scan()
	o := &wordsOrder{order: order{within: "/recipe"}}
	if doc := bytes.TrimLeft(doc, " \t\r\n"); e.broken == nil && (len(doc) == 0 || doc[0] != '{') {
		e.fault("", recipe.WrongType, "an object with the member text is wanted")
		return o, e.faults
	}
	stated := map[string]bool{}
	e.each(func(m member, at string) {
		stated[m.name] = true
		e.words(o, m, at)
	})
	o.stated = stated["text"]
	switch {
	case stated["recipe"] && stated["food"]:
		e.fault("/food", codeTwoProducts, "a recipe stands beside the food; keep one")
	case !stated["text"] && e.broken == nil:
		e.fault("/text", recipe.MissingMember, "the words to be read are wanted")
	}
	return o, e.faults
}

// words takes one member.
func (e *envelope) words(o *wordsOrder, m member, at string) {
	switch m.name {
	case "text":
		o.Text, _ = e.unquote(m.value, at, maxWords)
	case "language":
		o.Language = e.text(m, at)
	case "on":
		o.On = e.text(m, at)
	case memberMarkets:
		o.In = e.texts(m, at)
	case "rules":
		o.rules = e.digest(m, at)
	case "recipe":
		e.recipe(&o.order, m)
	case "food":
		e.food(o, m, at)
	default:
		e.fault(at, recipe.UnknownMember, "%s is not known here%s", quote(m.name), listed(wordingMembers()))
	}
}

// food makes a recipe of one food of the open table.
func (e *envelope) food(o *wordsOrder, m member, at string) {
	reference := e.text(m, at)
	if reference == "" {
		return
	}
	f, err := food.Find(reference)
	if err != nil {
		e.fault(at, recipe.UnknownFood, "the open table has no such food; a reference is sr: and five digits, such as sr:01001")
		return
	}
	o.recipe, o.ofFood = ofFood(f), true
}

// ofFood is a recipe of 100 g of one food.
func ofFood(f food.Food) *recipe.Recipe {
	type part struct {
		ID     string `json:"id"`
		Name   string `json:"name"`
		Amount string `json:"amount"`
		Food   string `json:"food"`
	}
	doc, err := json.Marshal(map[string]any{"id": f.Ref(), "name": f.Name(), "ingredients": []part{{"food", f.Name(), "100 g", f.Ref()}}}, json.Deterministic(true))
	if err != nil {
		return nil
	}
	r, _ := recipe.Decode(doc)
	return r
}
