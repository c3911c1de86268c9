package web

import (
	"bytes"
	"context"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
)

// postCheck checks one recipe.
func postCheck(x *exchange) *Problem {
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
	report, p := x.check(x.r.Context(), doc)
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
	o, faults := readOrder(doc)
	if len(faults) > 0 {
		return nil, faultyDocument(faults)
	}
	book := x.rules.Book
	if o.rules != "" && o.rules != book.Digest {
		p := problem(notLoaded, "The rule set "+o.rules+" is not loaded.")
		p.Loaded = book.Digest
		return nil, p
	}
	if o.request.On == "" {
		o.request.On = x.today()
	}
	report, faults := check.Check(o.recipe, book, o.request)
	if len(faults) > 0 {
		return nil, faultyDocument(o.place(faults))
	}
	x.record.judged(report)
	var b bytes.Buffer
	if err := render.JSON(&b, report, true); err != nil {
		return nil, problem(internal, "")
	}
	return b.Bytes(), nil
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

// requestCodes are the codes of faults that check finds.
func requestCodes() []recipe.CodeRule {
	return []recipe.CodeRule{
		{Code: "not-a-date", Says: "the text is no date of the form yyyy-mm-dd"},
		{Code: "unknown-transition", Says: `the transition is neither "required" nor "newest"`},
		{Code: "unknown-detail", Says: `the detail is not "contributions"`},
		{Code: "unknown-market", Says: "the rule set has no such market"},
		{Code: "unknown-presumption", Says: "the rule set has no such presumption"},
		{Code: "claim-twice", Says: "a claim is asked for by its words and by its name"},
	}
}
