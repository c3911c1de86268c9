package recipe

import (
	"cmp"
	"slices"
	"strings"
)

// explanation turns broken keywords into faults. It reads names and examples from the schema and the document, never
// from the library's messages.
type explanation struct {
	document, schema *tree
	formats          map[string]func(string) error
	found            []found
}

func (e *explanation) add(v violation) {
	_, pointer, _ := strings.Cut(v.keyword, "#")
	cut := strings.LastIndexByte(pointer, '/')
	in, ok := e.schema.locate(root, pointer[:max(cut, 0)])
	if cut < 0 || !ok {
		e.say(v.at, WrongValue, "the value does not fit the schema of recipes")
		return
	}
	switch pointer[cut+1:] {
	case "required":
		e.missing(v.at, in)
	case "additionalProperties":
		e.unknown(v.at, in)
	case "type":
		e.wrongType(v.at, in)
	case "enum":
		e.notListed(v.at, in)
	case "format":
		e.badFormat(v.at, in)
	case "pattern": // stands beside every format, for readers that do not know the formats
		if e.schema.member(in, "format") == 0 {
			e.say(v.at, BadFormat, "the text is not written as wanted"+e.example(in))
		}
	case "minItems", "minProperties", "minLength":
		if e.document.nodes[v.at].count == 0 { // else its content lies beyond the last fault that is listed
			e.say(v.at, Empty, "something is wanted here"+e.example(in))
		}
	case "maxItems", "maxProperties", "maxLength":
		e.say(v.at, TooMany, "at most "+e.schema.nodes[e.schema.member(in, pointer[cut+1:])].text+" are read")
	default:
		e.say(v.at, WrongValue, "the value does not fit"+e.example(in))
	}
}

func (e *explanation) say(at int32, code, says string) {
	e.found = append(e.found, found{at: at, code: code, says: says})
}

func (e *explanation) missing(at, in int32) {
	for _, name := range e.schema.texts(e.schema.member(in, "required")) {
		if e.document.member(at, name) != 0 {
			continue
		}
		says := "the member " + quote(name) + " is missing"
		if m := e.schema.path(in, "properties", name, "description"); m != 0 {
			says += ": " + e.schema.nodes[m].text
		}
		e.say(at, MissingMember, says)
	}
}

func (e *explanation) unknown(at, in int32) {
	known := e.schema.names(e.schema.member(in, "properties"))
	for _, name := range e.document.names(at) {
		if slices.Contains(known, name) {
			continue
		}
		m := e.document.member(at, name)
		more := func() string { return cmp.Or(suggest(name, known), "; known are "+list(known, "and")) }
		if !e.document.nodes[m].faulty {
			e.found = append(e.found, found{m, UnknownMember, quote(name) + " is not known here", more})
		}
	}
}

// typeWords are JSON types in words.
func typeWords(name string) string {
	switch name {
	case "object":
		return "an object"
	case "array":
		return "a list"
	case "string":
		return "a text in quotation marks"
	case "boolean":
		return "true or false"
	}
	return name
}

func (e *explanation) wrongType(at, in int32) {
	m := e.schema.member(in, "type")
	names := e.schema.texts(m)
	if e.schema.nodes[m].kind == '"' {
		names = []string{e.schema.nodes[m].text}
	}
	wanted := make([]string, len(names))
	for i, name := range names {
		wanted[i] = typeWords(name)
	}
	e.say(at, WrongType, e.given(at)+" is given and "+list(wanted, "or")+" is wanted"+e.example(in))
}

func (e *explanation) given(at int32) string {
	switch e.document.nodes[at].kind {
	case '{':
		return "an object"
	case '[':
		return "a list"
	case '"':
		return "a text"
	case '0':
		return "a number"
	}
	return "true or false"
}

// example quotes the first example of the schema, where it is a text.
func (e *explanation) example(in int32) string {
	m := e.schema.member(in, "examples")
	if m == 0 {
		return ""
	}
	if first := &e.schema.nodes[e.schema.nodes[m].first]; first.kind == '"' {
		return ", such as " + quote(first.text)
	}
	return ""
}

func (e *explanation) notListed(at, in int32) {
	known := e.schema.texts(e.schema.member(in, "enum"))
	given := e.document.nodes[at].text
	more := func() string { return suggest(given, known) }
	e.found = append(e.found, found{at, WrongValue, quote(given) + " is none of " + list(quoted(known), "and"), more})
}

// badFormat asks the parser itself. A format applies to a member's name where the schema says so of names.
func (e *explanation) badFormat(at, in int32) {
	name := e.schema.nodes[e.schema.member(in, "format")].text
	text := e.document.nodes[at].text
	if name == formatMarketKey {
		text = e.document.nodes[at].name
	}
	code := BadFormat
	switch name {
	case formatAmount, formatValue:
		code = BadAmount
	case formatNumber, formatProfileValue:
		code = BadNumber
	}
	says := "the text is not written as wanted"
	if err := e.formats[name](text); err != nil {
		says = err.Error()
	}
	e.say(at, code, says)
}
