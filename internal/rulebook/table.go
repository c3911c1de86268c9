package rulebook

import (
	"bytes"
	"fmt"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

// practice is the folder of what practice presumes.
const practice = "practice"

// A table is all rules of one kind, whatever the kind.
type table interface {
	kind() string // the name of the file without .json
	decode(l *loader, f ruleFile, jurisdiction string)
	heads(visit func(kind, id string, h *Head))
}

// tables are the kinds of a market. A new kind needs its line here.
func (m *Rules) tables() []table {
	return []table{
		&rows[Definition]{"definitions", "quantity", &m.Definitions},
		&rows[Energy]{"energy", "energy", &m.Energy},
		&rows[Reference]{"reference_values", "reference", &m.References},
		&rows[Rounding]{"rounding", "rounding", &m.Roundings},
		&rows[Declaration]{"declaration", "declaration", &m.Declarations},
		&rows[ReferenceAmount]{"reference_amounts", "reference-amount", &m.ReferenceAmounts},
		&rows[Claim]{"claims", "claim", &m.Claims},
		&rows[Disclosure]{"disclosure", "disclosure", &m.Disclosures},
		&rows[Limit]{"limits", "limit", &m.Limits},
		&rows[Limit]{"serving", "serving", &m.Serving},
		&rows[Claim]{"health_claims", "health-claim", &m.HealthClaims},
		&rows[Naming]{"naming", "naming", &m.Naming},
		&rows[Named]{"conditions", "condition", &m.Conditions},
	}
}

// tables are the kinds of practice.
func (b *Book) tables() []table {
	return []table{
		&rows[Presumption]{"presumptions", "presumption", &b.Presumptions},
		&rows[Origin]{"origins", "origin", &b.Origins},
	}
}

// rows are the rules of a kind whose body is T. segment is the kind's name in identifiers.
type rows[T any] struct {
	file, segment string
	rules         *[]Rule[T]
}

func (t *rows[T]) kind() string { return t.file }

func (t *rows[T]) heads(visit func(kind, id string, h *Head)) {
	for i := range *t.rules {
		r := &(*t.rules)[i]
		for _, h := range r.heads() {
			visit(t.file, r.ID, h)
		}
	}
}

// decode reads a file, writes families out, and checks what is common to all kinds.
func (t *rows[T]) decode(l *loader, f ruleFile, jurisdiction string) {
	var doc struct {
		Jurisdiction string           `json:"jurisdiction"`
		Rules        []jsontext.Value `json:"rules"`
	}
	if !l.decode(f.name, f.data, &doc) {
		return
	}
	if doc.Jurisdiction != jurisdiction {
		l.problem(f.name, "", "jurisdiction", "is %q in the folder %q", doc.Jurisdiction, jurisdiction)
	}
	seen := map[string]bool{}
	for i, raw := range doc.Rules {
		family, texts := l.expand(f.name, i, raw)
		for _, text := range texts {
			r := Rule[T]{}
			if err := json.Unmarshal(text, &r, json.RejectUnknownMembers(true)); err != nil {
				l.problem(f.name, ruleID(text), "", "%v", err)
				continue
			}
			if seen[r.ID] {
				l.problem(f.name, r.ID, "id", "stands twice")
			}
			seen[r.ID] = true
			r.ForEach = family
			l.common(f.name, r.ID, jurisdiction+"/"+t.segment+"/", r.heads())
			*t.rules = append(*t.rules, r)
		}
	}
}

func (r *Rule[T]) heads() []*Head {
	out := make([]*Head, len(r.Versions))
	for i := range r.Versions {
		out[i] = &r.Versions[i].Head
	}
	return out
}

func ruleID(raw []byte) string {
	var r struct {
		ID string `json:"id"`
	}
	if json.Unmarshal(raw, &r) != nil {
		return ""
	}
	return r.ID
}

// expand writes a family out: "{each}" and the other names of a family member are replaced in the rule's text.
func (l *loader) expand(file string, i int, raw jsontext.Value) (family []map[string]string, texts []jsontext.Value) {
	if !bytes.Contains(raw, []byte(`"for each"`)) {
		return nil, []jsontext.Value{raw}
	}
	var rule struct {
		ForEach []map[string]string `json:"for each"`
		Rest    jsontext.Value      `json:",embed"`
	}
	if err := json.Unmarshal(raw, &rule); err != nil {
		l.problem(file, fmt.Sprintf("rule %d", i), "for each", "%v", err)
		return nil, nil
	}
	if rule.ForEach == nil {
		return nil, []jsontext.Value{raw}
	}
	for _, member := range rule.ForEach {
		texts = append(texts, fill(rule.Rest, member))
	}
	return rule.ForEach, texts
}

// fill replaces every {name} of text that is a name of the member. Values stand in JSON strings and are quoted for them.
func fill(text []byte, member map[string]string) []byte {
	out := make([]byte, 0, len(text))
	for {
		at := bytes.IndexByte(text, '{')
		if at < 0 {
			return append(out, text...)
		}
		out, text = append(out, text[:at]...), text[at:]
		end := bytes.IndexByte(text, '}')
		value, ok := "", false
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
	if err != nil { // not UTF-8: the decoder will say so
		return append(out, s...)
	}
	return append(out, quoted[1:len(quoted)-1]...)
}
