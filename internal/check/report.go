package check

import (
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A Report is the answer: what each market's label may state, which claims may stand beside it, and why. All numbers are
// decimals as text; Exact ones are complete, or their first 20 significant digits with the ratio beside them.
type Report struct {
	Recipe        Identity  `json:"recipe"`
	Rules         RuleSet   `json:"rules"`
	Date          string    `json:"date"`
	Transition    string    `json:"transition"`
	Composition   Contents  `json:"composition"`
	Jurisdictions []Market  `json:"jurisdictions"`
	Findings      []Finding `json:"findings"` // about the recipe itself
	Caution       string    `json:"caution"`
}

// Identity names what was checked.
type Identity struct {
	ID     string `json:"id"`
	Name   string `json:"name"`
	Digest string `json:"digest"`
}

// A RuleSet names the rules it was checked with.
type RuleSet struct {
	Version string `json:"version"`
	Digest  string `json:"digest"`
}

// Contents is the composition of the finished food.
type Contents struct {
	Per        string               `json:"per"`
	Mass       string               `json:"mass"` // of the batch
	Components map[string]Component `json:"components"`
}

// A Component is a value per 100 g of finished food.
type Component struct {
	Value    *string `json:"value"` // null where no typical value is known
	Low      string  `json:"low"`
	High     string  `json:"high"`
	Unit     string  `json:"unit"`
	Coverage string  `json:"coverage"` // share of the ingoing mass whose content is stated or presumed
}

// A Market is one jurisdiction's part of the report.
type Market struct {
	Jurisdiction  string      `json:"jurisdiction"`
	Name          string      `json:"name"`
	Edition       string      `json:"edition,omitzero"`
	Declaration   Table       `json:"declaration"`
	Claims        []Claim     `json:"claims"`
	AlsoPermitted []Candidate `json:"also_permitted"`
	FrontOfPack   []string    `json:"front_of_pack"` // see not_judged for what the set leaves out
	Naming        []Naming    `json:"naming"`
	Findings      []Finding   `json:"findings"`
	Presumed      []Presumed  `json:"presumed"`
	Assumed       []Assumed   `json:"assumed"`
	Other         *Other      `json:"other_edition,omitzero"`
	Gaps          []string    `json:"gaps"`
	NotJudged     []string    `json:"not_judged,omitzero"` // what a label needs besides and this rule set does not judge
	Caution       string      `json:"caution"`
}

// A Table is the declaration.
type Table struct {
	Title      string       `json:"title"`
	Rule       string       `json:"rule"`
	Bases      []Basis      `json:"bases"`
	Lines      []Line       `json:"lines"`
	NotKnown   []OpenLine   `json:"not_known"` // optional lines whose value is not determined
	Statements []Statement  `json:"statements"`
	Serving    *ServingSize `json:"serving_size,omitzero"`
	Servings   *Servings    `json:"servings_per_package,omitzero"`
	// NotRequired is set where the law might ask for no declaration.
	NotRequired *NotRequired `json:"not_required,omitzero"`
	Simplified  *Simplified  `json:"simplified_format,omitzero"`
	// OtherFormats are further shorter formats, and what may be repeated elsewhere.
	OtherFormats []Simplified `json:"other_formats,omitzero"`
}

// NotRequired says why the law asks for no declaration, which may be given all the same. Open is set where that is not determined.
type NotRequired struct {
	Says  string   `json:"says"`
	Open  bool     `json:"open,omitzero"`
	Needs []string `json:"needs,omitzero"`
}

// ServingSize is the line that tells the serving.
type ServingSize struct {
	Text  string            `json:"text"`
	Texts map[string]string `json:"texts,omitzero"`
}

// Servings is how many servings the package holds.
type Servings struct {
	Exact string            `json:"exact"`
	Text  string            `json:"text"`
	Texts map[string]string `json:"texts,omitzero"`
}

// Simplified is a shorter format the law allows this product: which lines may go, and what must then be said.
type Simplified struct {
	Name     string   `json:"name"`
	LeaveOut []string `json:"leave_out"`        // terms
	Repeats  []string `json:"repeats,omitzero"` // terms that may be repeated beside the whole table; then nothing is left out
	Says     string   `json:"says,omitzero"`
	Named    []string `json:"named,omitzero"` // what Says names
	// SaysPresence is "optional" where Says may stand, "open" where that is not determined; empty where it must.
	SaysPresence string `json:"says_presence,omitzero"`
	// Texts is what must be said in each of the market's languages, where it has several.
	Texts map[string]string `json:"texts,omitzero"`
}

// An OpenLine is an optional line that cannot be printed because data are missing.
type OpenLine struct {
	Quantity string   `json:"quantity"`
	Term     string   `json:"term"`
	Needs    []string `json:"needs"`
}

// A Basis is a column of the declaration.
type Basis struct {
	ID     string `json:"id"`
	Amount string `json:"amount"`
	Grams  string `json:"grams,omitzero"`
}

// A Line is one line of the declaration. Status is "determined" or "undetermined".
type Line struct {
	Quantity  string            `json:"quantity"`
	Component string            `json:"component"`
	Term      string            `json:"term"`
	Terms     map[string]string `json:"terms,omitzero"`
	Level     int               `json:"level"`
	Presence  string            `json:"presence"` // "mandatory", "optional", "may be left out"
	Status    string            `json:"status"`
	Values    []Value           `json:"values"`
	LeftOut   string            `json:"left_out_statement,omitzero"`
	Needs     []string          `json:"needs,omitzero"` // ingredients whose data would determine it
	Note      string            `json:"note,omitzero"`
}

// A Value is a line's value on one basis.
type Value struct {
	Basis            string            `json:"basis"`
	Exact            *string           `json:"exact"`
	Truncated        bool              `json:"truncated,omitzero"`
	Ratio            []string          `json:"ratio,omitzero"`
	Low              string            `json:"low"`
	High             string            `json:"high"`
	Declared         *string           `json:"declared"` // null where undetermined or not an amount
	Unit             string            `json:"unit"`
	Text             string            `json:"text"`
	Texts            map[string]string `json:"texts,omitzero"` // in the languages where it differs
	Alternatives     []string          `json:"alternatives"`
	PercentReference *Percent          `json:"percent_reference"`
	Rule             string            `json:"rule"`
	Source           string            `json:"source"`
	Force            string            `json:"force"`
	Evidence         string            `json:"evidence"` // of the weakest of rounding and definition
	Contributions    []Contribution    `json:"contributions,omitzero"`
}

// A Percent is the per cent of a reference value.
type Percent struct {
	Exact        *string  `json:"exact"`
	Declared     *string  `json:"declared"`
	Text         string   `json:"text"`
	Reference    string   `json:"reference"`
	Alternatives []string `json:"alternatives,omitzero"`
	Rule         string   `json:"rule"`
	Source       string   `json:"source"`
}

// A Contribution is what one ingredient brings to a value.
type Contribution struct {
	Ingredient string  `json:"ingredient"`
	Value      *string `json:"value"`
	Low        string  `json:"low"`
	High       string  `json:"high"`
}

// A Statement is text that must or may stand on the pack.
type Statement struct {
	Text     string            `json:"text"`
	Texts    map[string]string `json:"texts,omitzero"`
	Place    string            `json:"place,omitzero"`
	Presence string            `json:"presence"` // "mandatory", "optional" or "open"
	Rule     string            `json:"rule"`
	Needs    []string          `json:"needs,omitzero"` // what would settle whether it must stand, or whether an optional one may

	open bool // an amount in it is not determined
}

// Verdicts on a claim.
const (
	Permitted     = "permitted"
	WithStatement = "permitted-with-statement"
	Refused       = "refused"
	NotListed     = "not-listed"
	Undetermined  = "undetermined"
	Unread        = "unread" // the words are no listed wording
)

// A Claim is a claim asked for, judged.
type Claim struct {
	Asked      string      `json:"asked"`
	Words      string      `json:"words,omitzero"`   // the part of the words asked for that is this claim, where they were read
	Matched    string      `json:"matched,omitzero"` // how they were matched
	Claim      string      `json:"claim,omitzero"`
	Name       string      `json:"name,omitzero"`
	Verdict    string      `json:"verdict"`
	Printable  bool        `json:"printable"`
	Why        string      `json:"why,omitzero"`
	Condition  *Condition  `json:"condition,omitzero"`
	Statements []Statement `json:"statements"`
	NeedsLines []string    `json:"needs_lines"`
	Needs      []string    `json:"needs,omitzero"` // what would have to be known
	Rule       string      `json:"rule,omitzero"`
	Source     string      `json:"source,omitzero"`
	Force      string      `json:"force,omitzero"`
	Evidence   string      `json:"evidence,omitzero"` // of the weakest rule it rests on
	Weakest    string      `json:"weakest_rule,omitzero"`
}

// A Condition is a decided condition. Leaves have numbers where the condition compares.
type Condition struct {
	All       []Condition `json:"all,omitzero"`
	Any       []Condition `json:"any,omitzero"`
	Not       *Condition  `json:"not,omitzero"`
	AtLeast   int         `json:"at_least,omitzero"`
	Of        []Condition `json:"of,omitzero"`
	Says      string      `json:"says,omitzero"`
	Exact     *string     `json:"exact,omitzero"`
	NoValue   string      `json:"no_value,omitzero"` // why there is none: the denominator is zero
	Low       string      `json:"low,omitzero"`
	High      string      `json:"high,omitzero"` // none where there may be nothing to be a share of
	Relation  string      `json:"relation,omitzero"`
	Threshold string      `json:"threshold,omitzero"`
	Unit      string      `json:"unit,omitzero"`
	Holds     *bool       `json:"holds"` // null is open
	Headroom  string      `json:"headroom,omitzero"`
	Needs     []string    `json:"needs,omitzero"`

	least string // of a change against a reference food: the smallest that is possible
}

// A Candidate is a listed claim nobody asked for that the product may carry.
type Candidate struct {
	Claim   string `json:"claim"`
	Name    string `json:"name"`
	Verdict string `json:"verdict"`
	Health  bool   `json:"health,omitzero"` // a health claim
}

// A Finding is something to look at. Severity is "refused", "open", "warning" or "note".
type Finding struct {
	Kind      string     `json:"kind"` // "limit", "recipe", "serving", "definition"
	Severity  string     `json:"severity"`
	Code      string     `json:"code"`
	Says      string     `json:"says"`
	Pointer   string     `json:"pointer,omitzero"`
	Condition *Condition `json:"condition,omitzero"`
	Rule      string     `json:"rule,omitzero"`
	Source    string     `json:"source,omitzero"`
}

// A Naming is how an ingredient must be named, or a reserved name the product may bear. Holds is null where that is open.
type Naming struct {
	Ingredient string `json:"ingredient,omitzero"` // empty is the product
	Name       string `json:"name,omitzero"`
	Says       string `json:"says"`
	Holds      *bool  `json:"holds"`
	Rule       string `json:"rule"`
	Source     string `json:"source"`
}

// Process and TransOrigin stand for the component of a Presumed that tells how an ingredient's fat was processed, or where its trans fatty
// acids come from.
const (
	Process     = "process"
	TransOrigin = "origin of trans fatty acids"
)

// A Presumed is a value, or how a fat was processed or where its trans fatty acids come from, that nobody stated and practice takes.
type Presumed struct {
	Component  string `json:"component"` // a tagname, Process or TransOrigin
	Ingredient string `json:"ingredient"`
	Taken      string `json:"taken"`
	Reason     string `json:"reason"`
	Rule       string `json:"rule"`
}

// An Assumed is a fact nobody stated and the market's rules take.
type Assumed struct {
	Fact  string `json:"fact"`
	Taken string `json:"taken"`
	Why   string `json:"why"`
}

// An Other tells what the other choice of edition would change while two are in force.
type Other struct {
	Transition string   `json:"transition"`
	Edition    string   `json:"edition"`
	Changes    []string `json:"changes"`
}

// Outcome sums a report up as the exit status of the design: 0 all well, 1 a claim or limit refused, 3 something
// undetermined and nothing refused.
func (r *Report) Outcome() int {
	open := false
	for _, f := range r.Findings {
		open = open || f.Severity == "open"
	}
	for i := range r.Jurisdictions {
		m := &r.Jurisdictions[i]
		for _, c := range m.Claims {
			switch c.Verdict {
			case Refused:
				return 1
			case Undetermined, Unread:
				open = true
			}
			open = open || !c.Printable
		}
		for _, f := range m.Findings {
			if f.Severity == "refused" {
				return 1
			}
			open = open || f.Severity == "open"
		}
		for _, l := range m.Declaration.Lines {
			open = open || l.Presence == "mandatory" && l.Status != "determined"
		}
	}
	if open {
		return 3
	}
	return 0
}

func exactText(r quantity.Ratio) string { return r.Text() }

func text(r quantity.Ratio) *string {
	s := exactText(r)
	return &s
}

func truthPointer(t quantity.Truth) *bool {
	if t == quantity.Open {
		return nil
	}
	b := t == quantity.Yes
	return &b
}

func sourceOf(h *rulebook.Head) (ref, force, evidence string) {
	return h.Source.Ref, h.Source.Force, h.Source.Evidence
}
