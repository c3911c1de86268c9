package web

import (
	"bytes"
	"context"
	"strconv"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
)

// postCheck checks one recipe.
func postCheck(x *exchange) *Problem { return x.document(x.check) }

// document takes a JSON document from the body and gives what work makes of it.
func (x *exchange) document(work func(context.Context, []byte) ([]byte, *Problem)) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	mediaType, p := x.choose(typeJSON)
	if p != nil {
		return p
	}
	if _, p := x.mediaType(typeJSON); p != nil {
		return p
	}
	doc, p := x.body(x.Limits.Body)
	if p != nil {
		return p
	}
	report, p := work(x.r.Context(), doc)
	if p != nil {
		return p
	}
	return x.reply(mediaType, report)
}

// check reads, checks and renders one document, in turn with others.
func (x *exchange) check(ctx context.Context, doc []byte) ([]byte, *Problem) {
	done, p := x.gate.work(ctx)
	if p != nil {
		return nil, p
	}
	defer done()
	o, p := x.order(doc)
	if p != nil {
		return nil, p
	}
	report, faults := check.Check(o.recipe, x.rules.Book, o.request)
	if len(faults) > 0 {
		return nil, faultyDocument(o.place(faults))
	}
	x.record.judged(report)
	var b bytes.Buffer
	if err := render.JSON(&b, report, true); err != nil {
		return nil, problem(internal, "")
	}
	if b.Len() > x.Limits.Report {
		return nil, problem(answerLarge, "The report has "+strconv.Itoa(b.Len())+" bytes.")
	}
	return b.Bytes(), nil
}

// order reads a document. What is wrong with the request beside the recipe is told together with what is wrong with both as documents.
func (x *exchange) order(doc []byte) (*order, *Problem) {
	o, faults := readOrder(doc)
	if o.request.On == "" {
		o.request.On = x.today()
	}
	book := x.rules.Book
	if len(faults) > 0 {
		return nil, faultyDocument(append(faults, o.place(o.request.Faults(book))...))
	}
	if p := x.pinned(o.rules); p != nil {
		return nil, p
	}
	return o, nil
}

// pinned asks for the rule set that a request pins.
func (x *exchange) pinned(digest string) *Problem {
	if digest == "" || digest == x.rules.Book.Digest {
		return nil
	}
	p := problem(notLoaded, "The rule set "+digest+" is not loaded.")
	p.Loaded = x.rules.Book.Digest
	return p
}

// place points faults of a check into the document that was sent.
func (o *order) place(faults recipe.Faults) recipe.Faults {
	out := make(recipe.Faults, len(faults))
	for i, f := range faults {
		if strings.HasPrefix(f.Pointer, "/") || f.Pointer == "" {
			f.Pointer = o.within + f.Pointer
		} else {
			f.Pointer = "/" + f.Pointer
		}
		out[i] = f
	}
	return out
}
