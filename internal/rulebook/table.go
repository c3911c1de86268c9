package rulebook

import (
	"bytes"

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
	difference(jurisdiction string, now table) []Change // to the same kind in another set
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
		&rows[Wording]{"wording", "wording", &m.Wordings},
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

// decode reads a file rule by rule, writes families out, and checks what is common to all kinds.
func (t *rows[T]) decode(l *loader, f ruleFile, jurisdiction string) {
	in := &ruleReader{loader: l, file: f.name, dec: jsontext.NewDecoder(bytes.NewBuffer(f.data))}
	prefix, seen := jurisdiction+"/"+t.segment+"/", map[string]bool{}
	err := in.document(func(text []byte, family []map[string]string) {
		var r Rule[T]
		if err := json.Unmarshal(text, &r, json.RejectUnknownMembers(true)); err != nil {
			l.problem(f.name, ruleID(text), "", "%v", err)
			return
		}
		if seen[r.ID] {
			l.problem(f.name, r.ID, "id", "stands twice")
		}
		seen[r.ID] = true
		r.ForEach = family
		l.common(f.name, r.ID, prefix, r.heads())
		*t.rules = append(*t.rules, r)
	})
	switch {
	case err != nil:
		l.problem(f.name, "", "", "%v", err)
	case in.jurisdiction != jurisdiction:
		l.problem(f.name, "", "jurisdiction", "is %q in the folder %q", in.jurisdiction, jurisdiction)
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
