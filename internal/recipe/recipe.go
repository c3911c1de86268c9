// Package recipe is the recipe document: what a maker knows about one product, before any law is asked.
//
// Decode turns bytes into a Recipe or into every fault of the document at once, each with a JSON Pointer and a stable
// code. schemas/recipe.schema.json describes the same documents. A missing value stays missing: nothing here is
// defaulted to zero, and JSON null is refused.
package recipe

import (
	"github.com/shopspring/decimal"

	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
)

// A Recipe is one product.
type Recipe struct {
	ID, Name string
	Digest   string // "sha256:" and the hexadecimal digest of the document as it was sent

	Ingredients []Ingredient
	Yield       *Yield

	Package         *Package
	Serving         PerMarket[Serving]
	Category        PerMarket[string]
	ReferenceAmount PerMarket[ReferenceAmount]
	State           PerMarket[string]          // "solid" or "liquid"
	Density         PerMarket[decimal.Decimal] // g per mL
	Declares        PerMarket[[]string]        // optional lines the maker wants, by the names of quantities

	Facts         map[string]Fact // by name of the register in facts.go
	Jurisdictions []string
	Claims        []Claim
	References    map[string]ReferenceFood
}

// PerMarket is a value per jurisdiction with an optional "default".
type PerMarket[T any] map[string]T

// For gives the market's own value, else the default.
func (m PerMarket[T]) For(jurisdiction string) (T, bool) {
	if v, ok := m[jurisdiction]; ok {
		return v, true
	}
	v, ok := m["default"]
	return v, ok
}

// An Ingredient is an amount of something whose composition is known by exactly one of Composition, Food, Label, Recipe.
type Ingredient struct {
	Pointer  string // place in the document, for faults and findings
	ID, Name string
	Amount   quantity.Amount // mass, or volume with Density
	Density  decimal.Decimal // g per mL; zero when not given

	Source
	With         map[string]Value // tagname -> value per 100 g that replaces or adds to the source
	ZeroByNature []Nature

	Process     string           // one of Processes; "" is unknown
	IodineValue *decimal.Decimal // stated, g iodine per 100 g fat
	TransOrigin []TransShare     // empty is unknown
	Retention   *Retention       // nil keeps everything
}

// A Source is where a composition comes from. Exactly one member is set.
type Source struct {
	Composition *Composition
	Food        string // "sr:20038"
	Label       *Label
	Recipe      *Part
}

// Processes of a fat or oil, or of the ingredient that carries it.
var Processes = []string{
	"unrefined", "refined", "partially hydrogenated", "fully hydrogenated", "hydrogenated", "interesterified", "fractionated",
}

// A Part is a recipe inside a recipe.
type Part struct {
	Ingredients []Ingredient
	Yield       *Yield
}

// A Value is a component's stated value with its unit; ends and centre are in the same unit.
type Value struct {
	Low, High decimal.Decimal
	Central   decimal.Decimal
	Typical   bool // Central was stated, or the value is exact
	Unit      quantity.Unit
}

// A Composition is a supplier's specification.
type Composition struct {
	Per        quantity.Amount // 100 g, or another mass or (with a density) volume
	Source     string          // document it was taken from
	Components map[string]Value
	Acids      *Profile
}

// A Profile is a fatty-acid profile. Values follow the basis: % for the two percentages, g else.
type Profile struct {
	Basis        Basis
	Acids        []Acid
	Unidentified Value           // share nobody has named, in the unit of the basis
	ShareOfFat   decimal.Decimal // g fatty acids per g fat; zero when not given: the fat counts as triglycerides
	Complete     bool            // the named acids and Unidentified are all there is
	Settled      []Settlement
}

// An Acid is one entry of a profile.
type Acid struct {
	Notation string
	Species  lipid.Species
	Value    Value
	Settled  string // the reason, where the recipe settled an open group
}

// A Settlement says, with a reason, what an open group is: "18:1" is "18:1 c".
type Settlement struct {
	Group, As, Reason string
}

// A Basis is what a profile's values are per.
type Basis string

// Bases of a fatty-acid profile.
const (
	PercentFAME         Basis = "percent of FAME"
	PercentAcids        Basis = "percent of fatty acids"
	PerFat              Basis = "g per 100 g fat"
	PerFood             Basis = "g per 100 g food"
	TriglyceridePerFood Basis = "g triglyceride per 100 g food"
)

// A Label is another product's printed declaration; its law's rounding is undone into intervals.
type Label struct {
	Jurisdiction string
	On           string          // labelling date yyyy-mm-dd; "" takes the check's
	Serving      quantity.Amount // the amount the declared values are per
	Declared     map[string]Value
}

// A Nature states that a component is absent by nature, with a reason.
type Nature struct {
	Component, Reason string
}

// A TransShare says where a share of an ingredient's trans fatty acids comes from.
type TransShare struct {
	Origin string          // one of TransOrigins
	Share  decimal.Decimal // per cent; 100 for a single origin
}

// TransOrigins of trans fatty acids. Everything but "ruminant" counts as industrial.
var TransOrigins = []string{"ruminant", "hydrogenation", "refining", "industrial"}

// A Retention is a row of the USDA table, or percentages by tagname.
type Retention struct {
	Code    string                     // "0352" of USDA Release 6; "" when Factors is set
	Factors map[string]decimal.Decimal // tagname -> share kept, 0 to 1
}

// A Yield is the final mass, or what water and fat changed by.
type Yield struct {
	Mass        *quantity.Amount
	Water, Fat  *Change
	Explanation string
}

// A Change is a gain or a loss, as a mass or as per cent of all that goes in. A gain of fat names the oil it comes from.
type Change struct {
	Gain   bool
	Amount quantity.Amount
	Oil    *Source
}

// A Package is what is sold.
type Package struct {
	Net     *quantity.Amount
	Units   decimal.Decimal // pieces; zero when not given
	Surface decimal.Decimal // cm² available for labelling; zero when not given
}

// A Serving is the serving of the label.
type Serving struct {
	Amount  quantity.Amount
	Measure string
}

// A ReferenceAmount keeps its own unit; Grams tells its mass where the unit is a volume and no density is given.
type ReferenceAmount struct {
	Amount quantity.Amount
	Grams  *quantity.Amount
}

// A Fact is something only the maker knows.
type Fact struct {
	Text   string           // for a fact with a list of values
	Flag   quantity.Truth   // for a yes-or-no fact
	Number *quantity.Amount // for an amount
	List   []string         // for a fact that lists values
}

// A Claim is asked for by the words on the pack or by the shared name of the claim.
type Claim struct {
	Pointer        string
	Text, Language string
	Claim          string // "fat-low"
	In             []string
	Stated         *quantity.Amount // the number in the claim
	Against        string           // name in References
}

// A ReferenceFood is what a relative claim compares with, per 100 g of itself.
type ReferenceFood struct {
	Pointer string
	Kind    string // one of ReferenceKinds
	Name    string
	Source
	With map[string]Value
}

// ReferenceKinds of a relative claim.
var ReferenceKinds = []string{
	"own regular product", "similar product", "average of similar products", "range of other products", "other food of the same category",
}
