package web

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"github.com/go-json-experiment/json/jsontext"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// Bounds of the members around a recipe.
const (
	maxNames    = 100 // entries of a list
	maxNameText = 200 // bytes of a text
)

// An order is one check asked for: a recipe alone, or an envelope with the recipe and how to check it.
type order struct {
	recipe  *recipe.Recipe
	request check.Request
	rules   string // digest of the rule set wanted; empty takes the one loaded
	within  string // pointer to the recipe in the document
}

// readOrder reads a document that has a member "recipe" as an envelope and any other as a recipe. It gives the order, or every fault.
func readOrder(doc []byte) (*order, recipe.Faults) {
	e := &envelope{doc: doc}
	if !e.scan() {
		r, faults := recipe.Decode(doc)
		return &order{recipe: r}, faults
	}
	return e.read()
}

// An envelope is the outermost object of a document, its members not yet read.
type envelope struct {
	doc     []byte
	members []member
	broken  *recipe.Fault // where the document stops being JSON
	faults  recipe.Faults
}

type member struct {
	name   string
	value  jsontext.Value
	broken bool // the value is the rest of a document that cannot be read
}

func envelopeMembers() []string {
	return []string{"recipe", "on", "in", "detail", "transition", "rules", "without"}
}

// scan lists the members and tells whether one of them is a recipe.
func (e *envelope) scan() bool {
	in := jsontext.NewDecoder(bytes.NewBuffer(e.doc), jsontext.AllowDuplicateNames(true), jsontext.AllowInvalidUTF8(true))
	if in.PeekKind() != '{' {
		return false
	}
	if err := e.walk(in); err != nil {
		e.broken = syntaxFault(err)
	} else if _, err := in.ReadToken(); err != io.EOF {
		e.broken = &recipe.Fault{Code: recipe.TrailingData, Says: fmt.Sprintf("the document ends at byte %d and something follows; send one JSON object", in.InputOffset())}
	}
	return slices.ContainsFunc(e.members, func(m member) bool { return m.name == "recipe" })
}

func (e *envelope) walk(in *jsontext.Decoder) error {
	if _, err := in.ReadToken(); err != nil {
		return err
	}
	for in.PeekKind() == '"' {
		name, err := in.ReadToken()
		if err != nil {
			return err
		}
		m := member{name: name.String()}
		in.PeekKind()
		start := in.InputOffset()
		raw, err := in.ReadValue()
		if err != nil {
			m.value, m.broken = afterColon(e.doc[start:]), true
			e.members = append(e.members, m)
			return err
		}
		end := in.InputOffset()
		m.value = e.doc[end-int64(len(raw)) : end]
		e.members = append(e.members, m)
	}
	_, err := in.ReadToken()
	return err
}

func afterColon(rest []byte) []byte {
	return bytes.TrimLeft(rest, ": \t\r\n")
}

func syntaxFault(err error) *recipe.Fault {
	var at *jsontext.SyntacticError
	if errors.As(err, &at) {
		return &recipe.Fault{Pointer: string(at.JSONPointer), Code: recipe.BadSyntax, Says: fmt.Sprintf("the document is not JSON from byte %d on", at.ByteOffset)}
	}
	return &recipe.Fault{Code: recipe.BadSyntax, Says: "the document ends before its value does"}
}

func (e *envelope) fault(pointer, code, format string, args ...any) {
	e.faults = append(e.faults, recipe.Fault{Pointer: pointer, Code: code, Says: fmt.Sprintf(format, args...)})
}

// read turns members into an order.
func (e *envelope) read() (*order, recipe.Faults) {
	o := &order{within: "/recipe"}
	e.each(func(m member, at string) { e.take(o, m, at) })
	return o, e.faults
}

// each gives every member with its pointer, and tells members that stand twice and where reading stopped.
func (e *envelope) each(take func(m member, at string)) {
	seen := map[string]bool{}
	for _, m := range e.members {
		at := "/" + pointerToken(m.name)
		switch {
		case seen[m.name]:
			e.fault(at, recipe.DuplicateName, "the object has the member %s twice; keep one", quote(m.name))
		case m.broken && m.name != "recipe":
		default:
			take(m, at)
		}
		seen[m.name] = true
		if len(e.faults) > recipe.MaxFaults {
			return
		}
	}
	if e.broken != nil && !e.stopped() {
		e.faults = append(e.faults, *e.broken)
	}
}

// stopped tells whether the recipe's own faults say already where reading ended.
func (e *envelope) stopped() bool {
	if len(e.members) == 0 {
		return false
	}
	last := e.members[len(e.members)-1]
	return last.broken && last.name == "recipe" && len(e.faults) > 0
}

// memberMarkets lists markets in every request.
const memberMarkets = "in"

func (e *envelope) take(o *order, m member, at string) {
	switch m.name {
	case "recipe":
		e.recipe(o, m)
	case "on":
		o.request.On = e.text(m, at)
	case memberMarkets:
		o.request.In = e.texts(m, at)
	case "detail":
		o.request.Detail = e.text(m, at)
	case "transition":
		o.request.Transition = rulebook.Transition(e.text(m, at))
	case "rules":
		o.rules = e.digest(m, at)
	case "without":
		o.request.Without = e.texts(m, at)
	default:
		e.fault(at, recipe.UnknownMember, "%s is not known here%s", quote(m.name), listed(envelopeMembers()))
	}
}

func (e *envelope) recipe(o *order, m member) {
	r, faults := recipe.Decode(m.value)
	o.recipe = r
	for _, f := range faults {
		f.Pointer = o.within + f.Pointer
		e.faults = append(e.faults, f)
	}
}

func pointerToken(name string) string {
	return strings.NewReplacer("~", "~0", "/", "~1").Replace(strings.ToValidUTF8(name, "\uFFFD"))
}
