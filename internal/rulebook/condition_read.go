package rulebook

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// A form is one shape of condition: the member that tells it from others, and those that may stand beside that.
type form struct {
	key      string
	op       Op
	beside   []string
	relation bool // a relation with its threshold may stand there too
}

// forms are looked for in this order. A list under "of" makes a count of a comparison.
var forms = []form{
	{"of", OpCompare, []string{"per", "as", "subject", "from", "times", "against"}, true},
	{"all", OpAll, nil, false},
	{"any", OpAny, nil, false},
	{"not", OpNot, nil, false},
	{"when", OpWhen, []string{"then", "else"}, false},
	{"declared", OpDeclared, []string{"is"}, false},
	{"meets", OpMeets, []string{"subject"}, false},
	{"fact", OpFact, []string{"is", "has", "stated"}, true},
	{"reference amount", OpAmount, nil, false},
	{"claimed about", OpAbout, nil, false},
	{"claimed on the label about", OpAbout, nil, false},
	{"holds", OpHolds, nil, false},
	{"no ingredient", OpIngredient, nil, false},
	{"size of", OpSize, []string{"as", "stated"}, true},
	{"reference food is", OpKind, nil, false},
	{"undecided", OpUndecided, nil, false},
	{"category is", OpCategory, []string{"stated"}, false},
}

var countForm = form{"of", OpCount, []string{string(AtLeast)}, false}

// A conditionReader holds what was read of one condition.
type conditionReader struct {
	*Condition
	dec        *jsontext.Decoder
	members    []string
	list       bool // "of" was a list
	number     bool // "at least" was a number
	parts      [3]*Condition
	compared   string // what "against" and "not more than" name
	from       originTest
	amount     amountTest
	ingredient ingredientTest
}

// The values of members that are objects.
type (
	originTest struct {
		Origin string `json:"trans origin"`
	}
	amountTest struct {
		AtMost []quantity.Amount `json:"at most"`
	}
	ingredientTest struct {
		Process     []string         `json:"process"`
		IodineAbove *decimal.Decimal `json:"iodine value above,omitzero"`
	}
)

// referenceFood is what a relative comparison is with.
const referenceFood = "reference food"

// UnmarshalJSONFrom reads the forms of rules/README.md.
func (c *Condition) UnmarshalJSONFrom(dec *jsontext.Decoder) error {
	*c = Condition{}
	if dec.PeekKind() != jsontext.KindBeginObject {
		if err := dec.SkipValue(); err != nil {
			return err
		}
		return errors.New("a condition is an object")
	}
	if _, err := dec.ReadToken(); err != nil {
		return err
	}
	r := &conditionReader{Condition: c, dec: dec}
	for dec.PeekKind() != jsontext.KindEndObject {
		if err := r.member(); err != nil {
			return err
		}
	}
	if _, err := dec.ReadToken(); err != nil {
		return err
	}
	return r.finish()
}

func (r *conditionReader) member() error {
	token, err := r.dec.ReadToken()
	if err != nil {
		return err
	}
	name := token.String()
	r.members = append(r.members, name)
	to := r.place(name)
	if to == nil {
		return fmt.Errorf("condition has the unknown member %q", name)
	}
	if err := json.UnmarshalDecode(r.dec, to, json.RejectUnknownMembers(true)); err != nil {
		return err
	}
	if r.compared != "" && r.compared != referenceFood {
		return fmt.Errorf("%q compares with the %q, not with %q", name, referenceFood, r.compared)
	}
	return nil
}

// place says where the value of a member goes; nil where no condition has such a member.
func (r *conditionReader) place(name string) any {
	switch name {
	case "says":
		return &r.Says
	case "of":
		if r.list = r.dec.PeekKind() == jsontext.KindBeginArray; r.list {
			return &r.Parts
		}
		return &r.Of
	case "all", "any":
		return &r.Parts
	case "not", "when":
		return &r.parts[0]
	case "then":
		return &r.parts[1]
	case "else":
		return &r.parts[2]
	case "declared", "meets", "fact", "holds", "size of":
		return &r.Name
	case "is":
		return &r.Is
	case "claimed about", "claimed on the label about":
		r.Label = name == "claimed on the label about"
		return &r.About
	case "has":
		return &r.Has
	case "stated":
		return &r.Stated
	case "undecided":
		return &r.Why
	case "reference amount":
		return &r.amount
	case "no ingredient":
		return &r.ingredient
	case "reference food is", "category is":
		return &r.Kinds
	}
	return r.placeCompared(name)
}

// placeCompared is place for the members of comparisons.
func (r *conditionReader) placeCompared(name string) any {
	switch name {
	case "per":
		if r.dec.PeekKind() == jsontext.KindString {
			r.Per = []string{""}
			return &r.Per[0]
		}
		return &r.Per
	case "as":
		return &r.As
	case "subject":
		return &r.Subject
	case "times":
		return &r.Times
	case "from":
		return &r.from
	case "against", string(NotMore):
		return &r.compared
	case string(AtLeast):
		if r.number = r.dec.PeekKind() == jsontext.KindNumber; r.number {
			return &r.N
		}
	}
	if slices.Contains(relations, Relation(name)) {
		return &r.Threshold
	}
	return nil
}

// finish finds the form of what was read and refuses what does not belong to it.
func (r *conditionReader) finish() error {
	f, ok := r.form()
	if !ok {
		return fmt.Errorf("condition %s is of no known kind", strings.Join(r.members, ", "))
	}
	r.Op = f.op
	for _, name := range r.members {
		related := f.relation && (slices.Contains(relations, Relation(name)) || name == string(NotMore))
		switch {
		case related && r.Relation != "":
			return fmt.Errorf("condition has both %q and %q", r.Relation, name)
		case related:
			r.Relation = Relation(name)
		case name != f.key && name != "says" && !slices.Contains(f.beside, name):
			return fmt.Errorf("condition has the unknown member %q", name)
		}
	}
	r.Process, r.IodineAbove = r.ingredient.Process, r.ingredient.IodineAbove
	r.Origin = r.from.Origin
	if r.Op == OpAmount {
		r.Amounts = r.amount.AtMost
	}
	if err := errors.Join(r.compare(f), r.combine()); err != nil {
		return err
	}
	r.ofProduct = r.asksProductOnly()
	return nil
}

func (r *conditionReader) form() (form, bool) {
	if r.list {
		return countForm, true
	}
	i := slices.IndexFunc(forms, func(f form) bool { return slices.Contains(r.members, f.key) })
	if i < 0 {
		return form{}, false
	}
	return forms[i], true
}

// compare readies a comparison. A fact is asked one thing, or is compared.
func (r *conditionReader) compare(f form) error {
	asked := r.asked()
	valued := len(asked) > 0
	switch {
	case len(asked) > 1:
		return fmt.Errorf("condition has both %q and %q", asked[0], asked[1])
	case valued && asked[0] == "stated" && !r.Stated:
		return errors.New(`"stated" is true, or stands under "not"`)
	case r.number != (r.Op == OpCount):
		return errors.New(`"at least" is a number before a list of conditions, and an amount elsewhere`)
	case valued && r.Relation != "":
		return fmt.Errorf("condition has both %q and %q", asked[0], r.Relation)
	case f.relation && !valued && r.Relation == "":
		return errors.New(`comparison has no relation such as "at most"`)
	case f.relation && !valued:
		r.Prepare()
	}
	return nil
}

// asked lists what a fact or a size is asked besides a comparison.
func (r *conditionReader) asked() (out []string) {
	for _, name := range r.members {
		if r.Op == OpFact && (name == "is" || name == "has") || name == "stated" {
			out = append(out, name)
		}
	}
	return out
}

// combine gathers the parts of a combination.
func (r *conditionReader) combine() error {
	switch r.Op {
	case OpNot:
		r.Parts = []*Condition{r.parts[0]}
	case OpWhen:
		if r.parts[1] == nil {
			return errors.New(`condition has "when" without "then"`)
		}
		if r.parts[2] == nil {
			r.parts[2] = &Condition{Op: OpAll}
		}
		r.Parts = slices.Clone(r.parts[:])
	}
	if slices.Contains(r.Parts, nil) {
		return errors.New("a condition is an object")
	}
	return nil
}
