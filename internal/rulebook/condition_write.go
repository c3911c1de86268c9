package rulebook

import (
	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

type member struct {
	name  string
	value any
}

// MarshalJSONTo writes what UnmarshalJSONFrom reads.
func (c *Condition) MarshalJSONTo(enc *jsontext.Encoder) error {
	if err := enc.WriteToken(jsontext.BeginObject); err != nil {
		return err
	}
	members := c.members()
	if len(c.Says) > 0 {
		members = append(members, member{"says", c.Says})
	}
	for _, m := range members {
		if err := enc.WriteToken(jsontext.String(m.name)); err != nil {
			return err
		}
		if err := json.MarshalEncode(enc, m.value); err != nil {
			return err
		}
	}
	return enc.WriteToken(jsontext.EndObject)
}

func (c *Condition) members() []member {
	switch c.Op {
	case OpCount:
		return []member{{string(AtLeast), c.N}, {"of", c.Parts}}
	case OpAll, OpAny:
		return []member{{string(c.Op), c.Parts}}
	case OpNot:
		return []member{{"not", c.Parts[0]}}
	case OpWhen:
		return c.whenMembers()
	case OpDeclared:
		return c.some(member{"declared", c.Name}, member{"is", c.Is})
	case OpMeets:
		return c.some(member{"meets", c.Name}, member{"subject", c.Subject})
	case OpFact:
		return append(c.some(member{"fact", c.Name}, member{"is", c.Is}, member{"has", c.Has}), c.statedOrRelated()...)
	case OpUndecided:
		return []member{{string(OpUndecided), c.Why}}
	case OpSize:
		return append(c.some(member{string(OpSize), c.Name}, member{"as", c.As}), c.statedOrRelated()...)
	case OpCompare:
		return c.compareMembers()
	case OpIngredient:
		what := ingredientTest{c.Process, c.IodineAbove}
		return []member{{string(OpIngredient), what}}
	}
	return c.listed()
}

// listed are the members of a condition that is a list or a name.
func (c *Condition) listed() []member {
	switch {
	case c.Op == OpAmount:
		return []member{{string(OpAmount), amountTest{c.Amounts}}}
	case c.Label:
		return []member{{"claimed on the label about", c.About}}
	case c.Op == OpAbout:
		return []member{{string(OpAbout), c.About}}
	case c.Op == OpKind, c.Op == OpCategory:
		return append([]member{{string(c.Op), c.Kinds}}, c.statedOrRelated()...)
	}
	return []member{{string(OpHolds), c.Name}}
}

// some leaves out what is empty.
func (c *Condition) some(key member, more ...member) []member {
	out := []member{key}
	for _, m := range more {
		if m.value != "" {
			out = append(out, m)
		}
	}
	return out
}

func (c *Condition) statedOrRelated() []member {
	if c.Stated {
		return []member{{"stated", true}}
	}
	return c.related()
}

func (c *Condition) related() []member {
	switch c.Relation {
	case "":
		return nil
	case NotMore:
		return []member{{string(NotMore), referenceFood}}
	}
	return []member{{string(c.Relation), c.Threshold}}
}

func (c *Condition) whenMembers() []member {
	out := []member{{"when", c.Parts[0]}, {"then", c.Parts[1]}}
	if e := c.Parts[2]; e.Op != OpAll || len(e.Parts) > 0 || len(e.Says) > 0 {
		out = append(out, member{"else", e})
	}
	return out
}

func (c *Condition) compareMembers() []member {
	out := []member{{"of", c.Of}}
	switch len(c.Per) {
	case 0:
	case 1:
		out = append(out, member{"per", c.Per[0]})
	default:
		out = append(out, member{"per", c.Per})
	}
	if c.Origin != "" {
		out = append(out, member{"from", originTest{c.Origin}})
	}
	if len(c.Times) > 0 {
		out = append(out, member{"times", c.Times})
	}
	out = append(out, c.some(member{}, member{"as", c.As}, member{"subject", c.Subject})[1:]...)
	return append(out, c.related()...)
}
