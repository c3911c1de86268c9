package rulebook

import (
	"bytes"
	"fmt"
	"slices"
	"sort"
	"strings"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// Op is the kind of a condition.
type Op string

// Kinds of conditions.
const (
	OpCompare    Op = "compare"
	OpDeclared   Op = "declared"
	OpMeets      Op = "meets"
	OpFact       Op = "fact"
	OpAmount     Op = "reference amount"
	OpAbout      Op = "claimed about"
	OpIngredient Op = "no ingredient"
	OpKind       Op = "reference food is"
	OpSize       Op = "size of"
	OpHolds      Op = "holds"
	OpAll        Op = "all"
	OpAny        Op = "any"
	OpNot        Op = "not"
	OpCount      Op = "count"
	OpWhen       Op = "when"
)

// A Condition is a legal condition as data: a comparison of a linear form, or a combination of conditions. It is
// three-valued when evaluated.
type Condition struct {
	Op    Op
	Says  Words // the law's condition in words, where generated words would not do
	Parts []*Condition
	N     int // OpCount: how many parts must hold

	// OpCompare
	Of        map[string]decimal.Decimal
	Per       []string // every one of these bases
	As        string   // "", "share of energy", "share of fatty acids", "share of reference value", "share of fat"
	Relation  Relation
	Threshold quantity.Amount
	Origin    string // "industrial" or "ruminant": only trans of that origin
	Subject   string // "" is the product, "reference food" the other

	terms []Term
	bases []Per
	limit quantity.Ratio

	// OpDeclared, OpMeets, OpFact
	Name string // line, rule id or fact
	Is   string

	// OpAmount: at most one of these, each in its own unit. OpAbout: subjects. OpKind: kinds of reference food.
	Amounts []quantity.Amount
	About   []string
	Label   bool // OpAbout: of all claims on the label, not of the one judged
	Kinds   []string

	// OpIngredient
	Process     []string
	IodineAbove *decimal.Decimal
}

// A Relation compares a value with a threshold.
type Relation string

// Relations. The last three compare the product with the reference food.
const (
	AtMost      Relation = "at most"
	Below       Relation = "below"
	AtLeast     Relation = "at least"
	Above       Relation = "above"
	ReducedBy   Relation = "reduced by"
	IncreasedBy Relation = "increased by"
	MoreBy      Relation = "more by"
	LessBy      Relation = "less by"
	NotMore     Relation = "not more than" // the reference food has
)

var relations = []Relation{AtMost, Below, AtLeast, Above, ReducedBy, IncreasedBy, MoreBy, LessBy}

// Relative tells whether the relation needs a reference food.
func (r Relation) Relative() bool {
	return r == ReducedBy || r == IncreasedBy || r == MoreBy || r == LessBy || r == NotMore
}

type members map[string]jsontext.Value

// UnmarshalJSON reads the forms of rules/README.md.
func (c *Condition) UnmarshalJSON(b []byte) error {
	var m members
	if err := json.Unmarshal(b, &m); err != nil {
		return err
	}
	r := &reader{m: m, left: keys(m)}
	*c = Condition{}
	if v := r.take("says"); v != nil {
		r.into(v, &c.Says)
	}
	c.read(r)
	if r.err == nil && len(r.left) > 0 {
		r.err = fmt.Errorf("condition has the unknown member %q", r.left[0])
	}
	return r.err
}

func keys(m members) []string {
	out := make([]string, 0, len(m))
	for k := range m {
		out = append(out, k)
	}
	sort.Strings(out)
	return out
}

type reader struct {
	m    members
	left []string
	err  error
}

func (r *reader) take(name string) jsontext.Value {
	v, ok := r.m[name]
	if !ok {
		return nil
	}
	r.left = slices.DeleteFunc(r.left, func(s string) bool { return s == name })
	return v
}

func (r *reader) into(v jsontext.Value, to any) {
	if err := json.Unmarshal(v, to, json.RejectUnknownMembers(true)); err != nil && r.err == nil {
		r.err = err
	}
}

func (c *Condition) read(r *reader) {
	has := func(name string) bool { _, ok := r.m[name]; return ok }
	switch {
	case has("at least") && has("of") && bytes.HasPrefix(r.m["of"], []byte("[")):
		c.Op = OpCount
		r.into(r.take("at least"), &c.N)
		r.into(r.take("of"), &c.Parts)
	case has("of"):
		c.readCompare(r)
	case has("all"):
		c.Op = OpAll
		r.into(r.take("all"), &c.Parts)
	case has("any"):
		c.Op = OpAny
		r.into(r.take("any"), &c.Parts)
	case has("not"):
		c.Op = OpNot
		c.Parts = []*Condition{new(Condition)}
		r.into(r.take("not"), c.Parts[0])
	case has("when"):
		c.readWhen(r)
	default:
		c.readAtom(r)
	}
}

func (c *Condition) readWhen(r *reader) {
	c.Op = OpWhen
	c.Parts = []*Condition{new(Condition), new(Condition), {Op: OpAll}}
	r.into(r.take("when"), c.Parts[0])
	if v := r.take("then"); v != nil {
		r.into(v, c.Parts[1])
	} else {
		r.err = fmt.Errorf(`condition has "when" without "then"`)
	}
	if v := r.take("else"); v != nil {
		r.into(v, c.Parts[2])
	}
}

func (c *Condition) readAtom(r *reader) {
	text := func(name string, to *string) {
		if v := r.take(name); v != nil {
			r.into(v, to)
		}
	}
	switch {
	case r.m["declared"] != nil:
		c.Op = OpDeclared
		text("declared", &c.Name)
		text("is", &c.Is)
	case r.m["meets"] != nil:
		c.Op = OpMeets
		text("meets", &c.Name)
		text("subject", &c.Subject)
	case r.m["fact"] != nil:
		c.Op = OpFact
		text("fact", &c.Name)
		text("is", &c.Is)
		if c.Is == "" {
			c.readRelation(r)
			c.Prepare()
		}
	case r.m["reference amount"] != nil:
		c.Op = OpAmount
		var at struct {
			AtMost []quantity.Amount `json:"at most"`
		}
		r.into(r.take("reference amount"), &at)
		c.Amounts = at.AtMost
	case r.m["claimed about"] != nil:
		c.Op = OpAbout
		r.into(r.take("claimed about"), &c.About)
	case r.m["claimed on the label about"] != nil:
		c.Op, c.Label = OpAbout, true
		r.into(r.take("claimed on the label about"), &c.About)
	case r.m[string(OpHolds)] != nil:
		c.Op = OpHolds
		text(string(OpHolds), &c.Name)
	case r.m["no ingredient"] != nil:
		c.readIngredient(r)
	case r.m[string(OpSize)] != nil:
		c.Op = OpSize
		text(string(OpSize), &c.Name)
		text("as", &c.As)
		c.readRelation(r)
		c.Prepare()
	case r.m[string(OpKind)] != nil:
		c.Op = OpKind
		r.into(r.take(string(OpKind)), &c.Kinds)
	default:
		r.err = fmt.Errorf("condition %v is of no known kind", strings.Join(r.left, ", "))
	}
}

func (c *Condition) readIngredient(r *reader) {
	c.Op = OpIngredient
	var in struct {
		Process     []string         `json:"process"`
		IodineAbove *decimal.Decimal `json:"iodine value above,omitzero"`
	}
	r.into(r.take("no ingredient"), &in)
	c.Process, c.IodineAbove = in.Process, in.IodineAbove
}

func (c *Condition) readCompare(r *reader) {
	c.Op = OpCompare
	r.into(r.take("of"), &c.Of)
	if v := r.take("per"); v != nil {
		if v.Kind() == '"' {
			c.Per = []string{""}
			r.into(v, &c.Per[0])
		} else {
			r.into(v, &c.Per)
		}
	}
	for name, to := range map[string]*string{"as": &c.As, "subject": &c.Subject} {
		if v := r.take(name); v != nil {
			r.into(v, to)
		}
	}
	if v := r.take("from"); v != nil {
		var from struct {
			Origin string `json:"trans origin"`
		}
		r.into(v, &from)
		c.Origin = from.Origin
	}
	c.readRelation(r)
	c.Prepare()
}

// Prepare readies a comparison that was not read from a rule. A basis that cannot be read is left to lint.
func (c *Condition) Prepare() *Condition {
	c.terms, c.bases, c.limit = terms(c.Of), nil, c.Threshold.Ratio()
	for _, s := range c.Per {
		p, _ := ParsePer(s)
		c.bases = append(c.bases, p)
	}
	return c
}

// Terms is the comparison's linear form, Bases what it is per.
func (c *Condition) Terms() []Term { return c.terms }

// Limit is the threshold in base units.
func (c *Condition) Limit() quantity.Ratio { return c.limit }

// Bases are the parsed entries of Per, in order.
func (c *Condition) Bases() []Per { return c.bases }

func (c *Condition) readRelation(r *reader) {
	if v := r.take(string(NotMore)); v != nil {
		c.Relation = NotMore
		var what string
		r.into(v, &what)
		if what != "reference food" && r.err == nil {
			r.err = fmt.Errorf(`"not more than" compares with the "reference food", not with %q`, what)
		}
	}
	for _, rel := range relations {
		if v := r.take(string(rel)); v != nil {
			if c.Relation != "" && r.err == nil {
				r.err = fmt.Errorf("condition has both %q and %q", c.Relation, rel)
			}
			c.Relation = rel
			r.into(v, &c.Threshold)
		}
	}
	if c.Relation == "" && r.err == nil {
		r.err = fmt.Errorf("comparison has no relation such as \"at most\"")
	}
	if v := r.take("against"); v != nil && r.err == nil && string(v) != `"reference food"` {
		r.err = fmt.Errorf("comparison against %s; only the reference food can be compared", v)
	}
}

// Walk visits the condition and all its parts.
func (c *Condition) Walk(visit func(*Condition)) {
	if c == nil {
		return
	}
	visit(c)
	for _, p := range c.Parts {
		p.Walk(visit)
	}
}

// Relative tells whether the condition needs a reference food.
func (c *Condition) Relative() bool {
	found := false
	c.Walk(func(p *Condition) {
		found = found || p.Subject == "reference food" || p.Op == OpKind || p.Op == OpCompare && p.Relation.Relative()
	})
	return found
}
