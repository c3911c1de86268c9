package recipe

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"

	"github.com/go-json-experiment/json/jsontext"
)

// Bounds of a document. A recipe of 2,000 ingredients with full compositions stays below them.
const (
	MaxBytes      = 1 << 20
	MaxDepth      = 64
	MaxValues     = 100_000 // objects, arrays, texts, numbers and literals
	MaxText       = 1000    // characters of a text or a member's name
	MaxNumberText = 40      // characters of a JSON number
)

// scanner is the bounded pass: it builds the tree and complains about what no recipe may hold.
type scanner struct {
	tree
	doc   string
	in    *jsontext.Decoder
	found []found
	open  []frame
}

// frame is an object or array that has not ended.
type frame struct {
	at, last int32
	name     string // of the member whose value comes next
	named    bool
	rawBad   bool // that name is no valid text
	seen     map[string]bool
}

// scan reads the document. Where fatal is not nil the rest could not be read.
func scan(doc []byte) (s *scanner, fatal *Fault) {
	if len(doc) > MaxBytes {
		return &scanner{}, &Fault{"", TooLarge, fmt.Sprintf("the document has %d bytes; at most %d (1 MiB) are read", len(doc), MaxBytes)}
	}
	// Duplicate names and bad text are looked for here, so that one of them does not hide the next.
	in := jsontext.NewDecoder(bytes.NewBuffer(doc), jsontext.AllowDuplicateNames(true), jsontext.AllowInvalidUTF8(true))
	s = &scanner{doc: string(doc), in: in}
	s.nodes = make([]node, 0, 16+len(doc)/24)
	s.open = make([]frame, 0, 16)
	for {
		if fatal := s.step(); fatal != nil {
			return s, fatal
		}
		if len(s.nodes) > MaxValues {
			return s, &Fault{"", TooManyValues, fmt.Sprintf("the document has more than %d values; no recipe needs as many", MaxValues)}
		}
		if len(s.open) == 0 {
			return s, s.end()
		}
	}
}

// end looks for something after the document's value.
func (s *scanner) end() *Fault {
	if _, err := s.in.ReadToken(); err != io.EOF {
		return &Fault{"", TrailingData, fmt.Sprintf("the document ends at byte %d and something follows; send one JSON object", s.in.InputOffset())}
	}
	return nil
}

// step reads a name, a value or a delimiter.
func (s *scanner) step() *Fault {
	switch kind := s.in.PeekKind(); kind {
	case '{', '[':
		if len(s.open) == MaxDepth {
			return &Fault{string(s.in.StackPointer()), TooDeep, fmt.Sprintf("objects and arrays are nested more than %d deep", MaxDepth)}
		}
		if _, err := s.in.ReadToken(); err != nil {
			return s.broken(err)
		}
		s.open = append(s.open, frame{at: s.add(node{kind: kind})})
	case '}', ']':
		if _, err := s.in.ReadToken(); err != nil {
			return s.broken(err)
		}
		s.open = s.open[:len(s.open)-1]
	default:
		raw, err := s.in.ReadValue()
		if err != nil {
			return s.broken(err)
		}
		s.scalar(kind, raw)
	}
	return nil
}

func (s *scanner) broken(err error) *Fault {
	var at *jsontext.SyntacticError
	if errors.As(err, &at) {
		return &Fault{string(at.JSONPointer), BadSyntax, fmt.Sprintf("the document is not JSON from byte %d on", at.ByteOffset)}
	}
	return &Fault{"", BadSyntax, "the document ends before its value does"}
}

func (s *scanner) scalar(kind jsontext.Kind, raw []byte) {
	text, ok := "", true
	if kind == '"' {
		text, ok = s.unquote(raw)
		if f := s.top(); f != nil && s.nodes[f.at].kind == '{' && !f.named {
			f.name, f.named, f.rawBad = text, true, !ok
			return
		}
	} else if kind == '0' {
		text = s.slice(raw)
	}
	at := s.add(node{kind: kind, text: text})
	switch {
	case !ok:
		s.complain(at, BadText, "the text is not valid UTF-8, or escapes half of a surrogate pair")
	case kind == 'n':
		s.complain(at, Null, "null is not a value here; leave out what is not known")
	case kind == '0' && len(text) > MaxNumberText:
		s.complain(at, NumberTooLong, fmt.Sprintf("the number has %d characters; at most %d are read", len(text), MaxNumberText))
	case kind == '"' && tooLong(text):
		s.complain(at, StringTooLong, fmt.Sprintf("the text has more than %d characters", MaxText))
	}
}

func tooLong(text string) bool { return len(text) > MaxText && utf8.RuneCountInString(text) > MaxText }

// slice is the part of the document just read, without a copy.
func (s *scanner) slice(raw []byte) string {
	end := s.in.InputOffset()
	return s.doc[end-int64(len(raw)) : end]
}

func (s *scanner) unquote(raw []byte) (text string, ok bool) {
	if bytes.IndexByte(raw, '\\') < 0 {
		text = s.slice(raw)
		text = text[1 : len(text)-1]
		if utf8.ValidString(text) {
			return text, true
		}
		return strings.ToValidUTF8(text, "\uFFFD"), false
	}
	// The syntax is already known to be right, so an error here is about the text.
	b, err := jsontext.AppendUnquote(nil, raw)
	return string(b), err == nil
}

func (s *scanner) top() *frame {
	if len(s.open) == 0 {
		return nil
	}
	return &s.open[len(s.open)-1]
}

func (s *scanner) complain(at int32, code, says string) {
	s.nodes[at].faulty = true
	s.found = append(s.found, found{at: at, code: code, says: says})
}

// add hangs a node into the tree. A member without a name, or whose name was there before, stays outside: it is
// complained about, not read.
func (s *scanner) add(n node) int32 {
	at := int32(len(s.nodes))
	f := s.top()
	if f == nil {
		n.parent = -1
		s.nodes = append(s.nodes, n)
		return at
	}
	n.parent, n.name = f.at, f.name
	outside := f.named && (f.name == "" || s.twice(f))
	if s.nodes[f.at].kind == '[' {
		n.index = s.nodes[f.at].count
	}
	s.nodes = append(s.nodes, n)
	if !outside {
		s.link(f, at)
	}
	s.nameFaults(f, at, outside)
	f.name, f.named, f.rawBad = "", false, false
	return at
}

func (s *scanner) link(f *frame, at int32) {
	if f.last == 0 {
		s.nodes[f.at].first = at
	} else {
		s.nodes[f.last].next = at
	}
	f.last = at
	s.nodes[f.at].count++
}

func (s *scanner) nameFaults(f *frame, at int32, outside bool) {
	switch {
	case f.rawBad:
		s.complain(at, BadText, "the member's name is not valid UTF-8, or escapes half of a surrogate pair")
	case outside && f.name == "":
		s.complain(at, Empty, "the member's name is empty")
	case outside:
		s.complain(at, DuplicateName, "the object has the member "+quote(f.name)+" twice; keep one")
	case tooLong(f.name):
		s.complain(at, StringTooLong, fmt.Sprintf("the member's name has more than %d characters", MaxText))
	}
}

// twice looks the next name up among the object's members: by comparing in a small object, by hash in a wide one.
func (s *scanner) twice(f *frame) bool {
	const narrow = 16
	if s.nodes[f.at].count < narrow {
		return s.tree.member(f.at, f.name) != 0
	}
	if f.seen == nil {
		f.seen = make(map[string]bool, 4*narrow)
		for _, name := range s.names(f.at) {
			f.seen[name] = true
		}
	}
	was := f.seen[f.name]
	f.seen[f.name] = true
	return was
}
