// Package rulebook holds the law as data: rules by jurisdiction and kind, each with dated versions, a source, its force
// and the evidence for it.
//
// Load reads a rule set and refuses one that fails lint. Book.At picks, for one market and one labelling date, the
// versions that hold, and returns them as a Law. Nothing in this package knows any market: what differs between
// markets stands in rules/.
package rulebook

import (
	"slices"

	"github.com/go-json-experiment/json"
	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
)

// A Source says where a rule stands, how well it is known and how binding it is.
type Source struct {
	Ref      string `json:"ref"`
	Evidence string `json:"evidence"` // one of Evidences
	Force    string `json:"force"`    // one of Forces
	Seen     string `json:"seen,omitzero"`
	Note     string `json:"note,omitzero"`
}

// Evidences, strongest first. What is derived takes the grade of its weakest input.
var Evidences = []string{"official text", "secondary", "memory"}

// Forces a rule can have.
var Forces = []string{"law", "guidance", "enforcement policy", "practice"}

// A Required is a date from which a version must be used, where the law staggers dates by a condition.
type Required struct {
	Date string     `json:"date"`
	When *Condition `json:"when,omitzero"`
}

// A Head is what every version says of itself. Dates are yyyy-mm-dd; From is the first day of use, Until the first day
// on which the version no longer holds.
type Head struct {
	From         string     `json:"from"`
	RequiredFrom []Required `json:"required_from,omitzero"`
	Until        string     `json:"until,omitzero"`
	Edition      string     `json:"edition,omitzero"`
	Editions     []string   `json:"editions,omitzero"`   // where it holds on labels of several, instead of Edition
	AppliesTo    string     `json:"applies_to,omitzero"` // one of AppliesTo
	Source       Source     `json:"source"`
}

// holdsOn tells whether the version holds on labels of an edition.
func (h *Head) holdsOn(edition string) bool {
	if len(h.Editions) > 0 {
		return slices.Contains(h.Editions, edition)
	}
	return h.Edition == "" || h.Edition == edition
}

// Attachments a version's dates can have: what must have happened by then. Empty means labelled.
var Attachments = []string{"", "labelled", "placed on the market", "manufactured"}

// Words are prescribed or shown words by language.
type Words map[string]string

// In gives the words in a language, else in English, else in any language that comes first by name.
func (w Words) In(language string) string {
	if s, ok := w[language]; ok {
		return s
	}
	if s, ok := w["en"]; ok {
		return s
	}
	best := ""
	for l := range w {
		if best == "" || l < best {
			best = l
		}
	}
	return w[best]
}

// A Market is a jurisdiction's own page.
type Market struct {
	Jurisdiction string      `json:"jurisdiction"`
	Name         string      `json:"name"`
	Languages    []string    `json:"languages"`
	And          Words       `json:"and,omitzero"` // the word before the last of several names
	Editions     []Edition   `json:"editions"`
	Assumed      []Assumed   `json:"assumed"`
	Unlisted     *Unlisted   `json:"unlisted_claims"`
	Gaps         []string    `json:"gaps"`                // what the rule set is known to lack
	NotJudged    []string    `json:"not judged,omitzero"` // what a label needs besides and this rule set does not judge
	Caution      string      `json:"caution"`
	DefaultBases []BasisRule `json:"bases"`
}

// An Edition is a reform whose versions go together on one label.
type Edition struct {
	Edition      string     `json:"edition"`
	From         string     `json:"from"`
	RequiredFrom []Required `json:"required_from,omitzero"`
	Until        string     `json:"until,omitzero"`
	AppliesTo    string     `json:"applies_to,omitzero"`
	Source       Source     `json:"source"`
}

// Assumed is what a market takes for a fact nobody stated.
type Assumed struct {
	Fact string `json:"fact"`
	Is   string `json:"is"` // "yes", "no" or the value
	Why  string `json:"why"`
}

// Unlisted says what a law does with nutrition claims it does not list.
type Unlisted struct {
	Verdict string `json:"verdict"` // "refused" or "not-listed"
	Says    Words  `json:"says"`
	Source  Source `json:"source"`
}

// A BasisRule names a basis on which the declaration is given, on labels of an edition or where a condition holds.
type BasisRule struct {
	Per      string     `json:"per"`
	Presence string     `json:"presence"` // "mandatory" or "optional"
	Edition  string     `json:"edition,omitzero"`
	If       *Condition `json:"if,omitzero"`
}

// A Definition says what a law counts as a quantity, by the first way whose data are complete.
type Definition struct {
	Name        Words  `json:"name"`
	Unit        string `json:"unit"`                  // unit in which the quantity is shown
	ExpressedAs string `json:"expressed as,omitzero"` // "fatty acid" (default) or "triglyceride", for predicate ways
	EnergyAs    string `json:"energy as,omitzero"`    // quantity whose energy factor a share of energy uses
	Ways        []Way  `json:"ways"`
	Claimless   bool   `json:"no claims,omitzero"` // values from the last way cannot carry a claim

	key string
}

// Key is equal for definitions that give the same for every ingredient; empty where that depends on other definitions of
// the market.
func (d *Definition) Key() string { return d.key }

// makeKey writes the ways out.
func (d *Definition) makeKey() string {
	key := d.ExpressedAs
	for i := range d.Ways {
		w := &d.Ways[i]
		if w.Of != nil {
			return ""
		}
		b, err := json.Marshal(Way{Acids: w.Acids, Sum: w.Sum}, json.Deterministic(true))
		if err != nil {
			return ""
		}
		key += string(b)
	}
	return key
}

// A Way is one route to a quantity. Exactly one of Acids, Sum and Of is set.
type Way struct {
	Acids *lipid.Predicate    `json:"acids,omitzero"` // over a complete fatty-acid profile
	Sum   map[string]Fraction `json:"sum,omitzero"`   // over components, by tagname
	Of    map[string]Fraction `json:"of,omitzero"`    // over quantities of the same law
	Note  string              `json:"note,omitzero"`

	class *lipid.Class
	parts []Part
	terms []Term
}

// A Term is a factor times a named quantity.
type Term struct {
	Name   string
	Factor quantity.Ratio
}

// A Part is a factor times a component.
type Part struct {
	ID     food.ID
	Factor quantity.Ratio
}

// terms orders a linear form by name.
func terms(m map[string]decimal.Decimal) []Term {
	out := make([]Term, 0, len(m))
	for _, name := range sorted(m) {
		out = append(out, Term{name, quantity.FromDecimal(m[name])})
	}
	return out
}

// Class is the compiled predicate of an Acids way.
func (w *Way) Class() *lipid.Class { return w.class }

// Parts is the linear form of a Sum way.
func (w *Way) Parts() []Part { return w.parts }

// Terms is the linear form of an Of way.
func (w *Way) Terms() []Term { return w.terms }

// An Energy gives the energy of a food from its quantities.
type Energy struct {
	Name    Words    `json:"name"`
	Unit    string   `json:"unit"`    // "kcal" or "kJ"
	Methods []Method `json:"methods"` // the first is taken, the others are alternatives
}

// A Method is one lawful way to compute energy; factors are per gram of the quantity, in the unit of the rule.
type Method struct {
	Method  string                     `json:"method"`
	Factors map[string]decimal.Decimal `json:"factors"`
	Note    string                     `json:"note,omitzero"`
	Source  *Source                    `json:"source,omitzero"` // where the method has another than the rule

	terms []Term
}

// Terms is the method's linear form.
func (m *Method) Terms() []Term { return m.terms }

// A Reference is a daily value, reference intake or the like, by population.
type Reference struct {
	Quantity string                     `json:"quantity"`
	Amounts  map[string]quantity.Amount `json:"amounts"`          // by the values of the fact "intended for"
	Sources  map[string]Source          `json:"sources,omitzero"` // of a population, where it has another than the rule

	texts  map[string]string
	ratios map[string]quantity.Ratio
}

// Text is a population's amount as text.
func (r *Reference) Text(population string) string { return r.texts[population] }

// Amount is a population's amount in base units.
func (r *Reference) Amount(population string) (quantity.Ratio, bool) {
	a, ok := r.ratios[population]
	return a, ok
}

// Source is where a population's amount stands; h is the rule's head.
func (r *Reference) Source(h *Head, population string) Source {
	if s, ok := r.Sources[population]; ok {
		return s
	}
	return h.Source
}

// A Rounding turns exact values of some quantities into declared ones.
type Rounding struct {
	Quantities []string      `json:"quantities"`
	Bands      Bands         `json:"bands,omitzero"`
	Ties       quantity.Ties `json:"ties"`
	TiesSource *Source       `json:"ties source,omitzero"` // where the rule for ties has another source
	Percent    *Percent      `json:"percent,omitzero"`
}

// A Band is one step of a rounding. The first band whose edge takes the value, and whose If holds, decides.
type Band struct {
	Below    *quantity.Amount `json:"below,omitzero"`   // value < edge
	AtMost   *quantity.Amount `json:"at most,omitzero"` // value <= edge
	If       *Condition       `json:"if,omitzero"`
	Nearest  *quantity.Amount `json:"nearest,omitzero"`
	Figures  int              `json:"figures,omitzero"`
	Declare  *quantity.Amount `json:"declare,omitzero"`
	LessThan *quantity.Amount `json:"less than,omitzero"`
	Or       []Band           `json:"or,omitzero"` // what else the law allows here, in order of preference; no edges

	edge    quantity.Ratio // in base units
	bounded bool
}

// Takes tells whether an exact value in base units falls into the band.
func (b *Band) Takes(exact quantity.Ratio) bool {
	switch {
	case !b.bounded:
		return true
	case b.Below != nil:
		return exact.Cmp(b.edge) < 0
	}
	return exact.Cmp(b.edge) <= 0
}

// prepare readies the edges of bands.
func prepare(bands []Band) {
	for i := range bands {
		b := &bands[i]
		if a := b.limit(); a != nil {
			b.edge, b.bounded = a.Ratio(), true
		}
	}
}

func (b *Band) limit() *quantity.Amount {
	if b.Below != nil {
		return b.Below
	}
	return b.AtMost
}

// UnmarshalJSON readies the bands it reads.
func (b *Bands) UnmarshalJSON(doc []byte) error {
	var list []Band
	if err := json.Unmarshal(doc, &list, json.RejectUnknownMembers(true)); err != nil {
		return err
	}
	prepare(list)
	*b = list
	return nil
}

// Bands are the steps of a rounding, edges rising.
type Bands []Band

// A Percent is the per cent of the reference value beside an amount.
type Percent struct {
	From   string     `json:"from"`        // "exact" or "declared": the amount it is computed from
	Or     string     `json:"or,omitzero"` // the other one, where the law allows both
	Times  Times      `json:"times,omitzero"`
	ZeroIf *Condition `json:"zero if,omitzero"`
	Bands  Bands      `json:"bands"`           // edges and steps in %
	Source *Source    `json:"source,omitzero"` // where it differs from the rounding's
}

// Times are measured facts that may weigh a quantity: the first that is stated, of those whose If holds.
type Times []Weight

// A Weight is a measured fact as a factor, such as the efficiency ratio of a protein.
type Weight struct {
	Fact   string           `json:"fact"`
	If     *Condition       `json:"if,omitzero"`
	Factor *decimal.Decimal `json:"factor,omitzero"`  // what the fact itself is multiplied by
	AtMost *quantity.Amount `json:"at most,omitzero"` // more than that counts as that, in per cent
}

// Of is the factor that a value of the fact gives; the value is in per cent.
func (w *Weight) Of(percent quantity.Ratio) quantity.Ratio {
	if w.AtMost != nil {
		percent = quantity.Min(percent, w.AtMost.Ratio())
	}
	f := percent.Mul(quantity.Scaled(1, -2))
	if w.Factor != nil {
		f = f.Times(*w.Factor)
	}
	return f
}

// A Named is a condition that other rules point at.
type Named struct {
	Condition *Condition `json:"condition"`
}

// A Naming says how an ingredient must be named, or which name the product may bear.
type Naming struct {
	Ingredients *IngredientTest `json:"ingredients,omitzero"` // the ingredients it is about; nil is the product
	Where       *Condition      `json:"where,omitzero"`
	Condition   *Condition      `json:"condition,omitzero"` // of the product's name
	Name        Words           `json:"name,omitzero"`
	Says        Words           `json:"says"`
}

// An IngredientTest picks ingredients by how their fat was processed.
type IngredientTest struct {
	Process     []string         `json:"process"`
	IodineAbove *decimal.Decimal `json:"iodine value above,omitzero"`
	IodineUpTo  *decimal.Decimal `json:"iodine value at most,omitzero"`
}

// A ReferenceAmount is the amount of a category customarily eaten at one time.
type ReferenceAmount struct {
	Names   map[string][]string `json:"names"`
	Amount  quantity.Amount     `json:"amount"`
	Measure string              `json:"measure,omitzero"`
	Daily   *quantity.Amount    `json:"daily intake,omitzero"` // what the law takes for a day's intake of such food
}

// A Claim is a listed claim: what it needs and what it brings with it.
type Claim struct {
	Name       Words       `json:"name"`
	AlsoNamed  []string    `json:"also named,omitzero"` // shared names of other markets for the same claim
	About      []string    `json:"about"`               // subjects, for conditions that ask what is claimed about
	Condition  *Condition  `json:"condition,omitzero"`
	Undecided  Words       `json:"undecided,omitzero"` // why the condition cannot be decided from data yet, instead of it
	BarredIf   *Condition  `json:"barred if,omitzero"` // refuses the claim whatever its condition
	Against    bool        `json:"needs reference food,omitzero"`
	Statements []Statement `json:"statements,omitzero"`
	NeedsLines []string    `json:"mandatory lines,omitzero"`
	Stated     *Stated     `json:"stated,omitzero"`
	Wordings   Wordings    `json:"wordings,omitzero"`
	NotOffered bool        `json:"not offered,omitzero"` // judged when asked for, and not listed unasked
	Prohibited bool        `json:"prohibited,omitzero"`  // the law names the claim in order to forbid it
	// ProhibitedSays tells how a claim is forbidden, where the law does not name it.
	ProhibitedSays Words `json:"prohibited says,omitzero"`
}

// Stated checks the number in a claim against the exact value: a claim of "30 %" less must be true.
type Stated struct {
	Of map[string]decimal.Decimal `json:"of"`
	As string                     `json:"as"` // one of StatedAs
	// Per is the basis of a stated amount.
	Per string `json:"per,omitzero"`
}

// StatedAs is what a stated number can be: a reduction or increase against the reference food (%, or an amount), the least or the most that
// the food holds, the amount that the line prints, or what of 100 g is free of the quantity ("97 % fat free").
var StatedAs = []string{"reduction", "increase", "amount", "at most", "declared amount", "free share"}

// Wordings are the listed words of a claim by language.
type Wordings map[string][]string

// A Disclosure is a level that makes claims carry a statement, or bars them.
type Disclosure struct {
	Quantity  string     `json:"quantity"`
	Named     Words      `json:"named"` // how the statement names the quantity
	When      *Condition `json:"when,omitzero"`
	Condition *Condition `json:"condition"` // holds = level exceeded
	Effect    string     `json:"effect"`    // "statement" or "bars"
	Statement Words      `json:"statement,omitzero"`
	Place     string     `json:"place,omitzero"`
	Presence  string     `json:"presence,omitzero"` // of the statement: "mandatory" (default) or "optional"
}

// A Limit must hold for the product to be sold.
type Limit struct {
	Name      Words      `json:"name"`
	Where     *Condition `json:"where,omitzero"`
	Condition *Condition `json:"condition"`
	Severity  string     `json:"severity"` // "refused", "warning" or "note"
	Code      string     `json:"code"`
	Says      Words      `json:"says"`
}

// A Presumption is what practice takes for a component nobody stated.
type Presumption struct {
	Components []string         `json:"components"`
	Foods      Selection        `json:"foods"`
	Take       string           `json:"take"`           // "zero", "equal to" or "at most"
	Of         string           `json:"of,omitzero"`    // tagname, for "equal to" and "at most"
	Share      *quantity.Amount `json:"share,omitzero"` // per cent of Of, for "at most"
	Reason     string           `json:"reason"`
}

// A Selection picks foods of the embedded table by group, words of the name and single reference.
type Selection struct {
	Groups  []string `json:"groups,omitzero"`  // four-digit food group codes; empty is all
	Foods   []string `json:"foods,omitzero"`   // "sr:19335"; when set, only these
	Words   []string `json:"words,omitzero"`   // one of these must occur in the name
	Without []string `json:"without,omitzero"` // none of these may occur
	// Processes picks ingredients with a specification instead of foods of the table, by how they were processed.
	Processes []string `json:"processes,omitzero"`
	// Stated picks every ingredient with a specification or a label instead.
	Stated bool `json:"stated,omitzero"`
}

// An Origin says where the trans fatty acids of some foods come from, or how their fat was processed, or both.
type Origin struct {
	Foods       Selection        `json:"foods"`
	TransAtMost *quantity.Amount `json:"trans at most,omitzero"` // only foods with no more trans fatty acids than that, in % of the fat
	Origin      string           `json:"origin,omitzero"`        // "ruminant" or "industrial"
	Process     string           `json:"process,omitzero"`       // as a recipe states it
	Reason      string           `json:"reason"`
}
