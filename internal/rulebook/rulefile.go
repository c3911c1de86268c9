package rulebook

import (
	"bytes"
	"fmt"
	"io"
	"strconv"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

// A ruleReader reads a file of rules as a stream: a set has thousands, and their texts need no memory at the same time.
type ruleReader struct {
	*loader
	file         string
	dec          *jsontext.Decoder
	jurisdiction string
	read         int    // rules
	buffer       []byte // of a family member's text
}

// visitRule takes the text of one rule, valid until it returns, and the family it is of, if any.
type visitRule func(text []byte, family []map[string]string)

// document reads {"jurisdiction": "...", "rules": [...]} and nothing after it.
func (r *ruleReader) document(visit visitRule) error {
	if err := r.begin(jsontext.KindBeginObject, "an object with jurisdiction and rules"); err != nil {
		return err
	}
	for r.dec.PeekKind() != jsontext.KindEndObject {
		if err := r.member(visit); err != nil {
			return err
		}
	}
	if _, err := r.dec.ReadToken(); err != nil {
		return err
	}
	switch _, err := r.dec.ReadToken(); err {
	case io.EOF:
		return nil
	case nil:
		return fmt.Errorf("holds more than one document")
	default:
		return err
	}
}

func (r *ruleReader) begin(kind jsontext.Kind, wanted string) error {
	token, err := r.dec.ReadToken()
	if err == nil && token.Kind() != kind {
		err = fmt.Errorf("%s: %s is wanted", r.dec.StackPointer(), wanted)
	}
	return err
}

func (r *ruleReader) member(visit visitRule) error {
	name, err := r.dec.ReadToken()
	if err != nil {
		return err
	}
	switch s := name.String(); s {
	case "jurisdiction":
		return json.UnmarshalDecode(r.dec, &r.jurisdiction)
	case "rules":
		return r.rules(visit)
	default:
		return fmt.Errorf("unknown member %q", s)
	}
}

func (r *ruleReader) rules(visit visitRule) error {
	if err := r.begin(jsontext.KindBeginArray, "a list of rules"); err != nil {
		return err
	}
	for r.dec.PeekKind() != jsontext.KindEndArray {
		text, err := r.dec.ReadValue()
		if err != nil {
			return err
		}
		r.expand(text, visit)
		r.read++
	}
	_, err := r.dec.ReadToken()
	return err
}

// expand writes a family out: "{each}" and the other names of a family member are replaced in the rule's text.
func (r *ruleReader) expand(text jsontext.Value, visit visitRule) {
	var rule struct {
		ForEach []map[string]string `json:"for each"`
		Rest    jsontext.Value      `json:",embed"`
	}
	if bytes.Contains(text, []byte(`"for each"`)) {
		if err := json.Unmarshal(text, &rule); err != nil {
			r.problem(r.file, "rule "+strconv.Itoa(r.read), "for each", "%v", err)
			return
		}
	}
	if rule.ForEach == nil {
		visit(text, nil)
		return
	}
	for _, member := range rule.ForEach {
		r.buffer = fill(r.buffer[:0], rule.Rest, member)
		visit(r.buffer, rule.ForEach)
	}
}

// fill appends text with every {name} that is a name of the member replaced. Values are quoted for the JSON strings they stand in.
func fill(out, text []byte, member map[string]string) []byte {
	for {
		at := bytes.IndexByte(text, '{')
		if at < 0 {
			return append(out, text...)
		}
		out, text = append(out, text[:at]...), text[at:]
		value, ok, end := "", false, bytes.IndexByte(text, '}')
		if end > 0 {
			value, ok = member[string(text[1:end])]
		}
		if !ok {
			out, text = append(out, '{'), text[1:]
			continue
		}
		out, text = appendInside(out, value), text[end+1:]
	}
}

// appendInside appends text as it stands between the quotes of a JSON string.
func appendInside(out []byte, s string) []byte {
	quoted, err := jsontext.AppendQuote(nil, s)
	if err != nil { // not UTF-8: the decoder says so
		return append(out, s...)
	}
	return append(out, quoted[1:len(quoted)-1]...)
}
