package rulebook

import "github.com/shopspring/decimal"

// A Declaration is the table of a market: lines in order, statements under it, how numbers look.
type Declaration struct {
	Title      Words             `json:"title"`
	Number     map[string]Number `json:"number"` // by language
	Lines      []Line            `json:"lines"`
	Together   [][]string        `json:"together,omitzero"` // lines that all stand once one of them does
	Simplified []Simplified      `json:"simplified,omitzero"`
	Serving    *ServingSize      `json:"serving size,omitzero"`
	Servings   *Servings         `json:"servings per package,omitzero"`
	Statements []Statement       `json:"statements,omitzero"`
	// RequiredUnless says where the law asks for no declaration; NotRequired says so in words.
	RequiredUnless *Condition `json:"required unless,omitzero"`
	NotRequired    Words      `json:"not required says,omitzero"`
}

// A Simplified is a shorter form of the declaration that a law allows, or what of it may be repeated elsewhere.
type Simplified struct {
	Name    Words           `json:"name"`
	Where   *Condition      `json:"where,omitzero"`
	Needed  int             `json:"at least,omitzero"`   // so many of Of must be insignificant
	Of      []Insignificant `json:"of,omitzero"`         // counted, and left out
	Leaves  []Insignificant `json:"leaves out,omitzero"` // left out without being counted or named
	Shows   []string        `json:"shows,omitzero"`      // these lines alone stand
	Repeats bool            `json:"repeats,omitzero"`    // Shows may be repeated beside the whole table
	Keeps   []string        `json:"keeps,omitzero"`      // lines that stay in any case
	// KeepsClaimed keeps the lines of what a claim on the label is about.
	KeepsClaimed bool       `json:"keeps claimed,omitzero"`
	Says         Words      `json:"says,omitzero"`    // with {names} of what of Of is left out; empty where nothing need be said
	SaysIf       *Condition `json:"says if,omitzero"` // where Says must stand; elsewhere it may
}

// Insignificant says when a quantity counts as insignificant; always without a condition.
type Insignificant struct {
	Quantity string     `json:"quantity"`
	If       *Condition `json:"if,omitzero"`
}

// ServingSize is the line that tells the serving: its household measure, and its amount in g or mL by bands of plain numbers.
type ServingSize struct {
	Bands    []CountBand `json:"bands"`
	Text     Words       `json:"text"`            // "Per {measure} ({amount})"
	Plain    Words       `json:"plain,omitzero"`  // where no measure is known: "Per {amount}"
	Single   Words       `json:"single,omitzero"` // where SingleIf holds: "Per package ({amount})"
	SingleIf *Condition  `json:"single if,omitzero"`
}

// Servings is how many servings a package holds, rounded by its own bands of plain numbers.
type Servings struct {
	Bands []CountBand `json:"bands"`
	Text  Words       `json:"text"`         // "{n} servings per container"
	One   Words       `json:"one,omitzero"` // for a single serving; Text where absent
	About Words       `json:"about"`        // "about {n}", where the number was rounded

	Varied   Words      `json:"varied,omitzero"` // in place of the number where VariedIf holds
	VariedIf *Condition `json:"varied if,omitzero"`
}

// A CountBand is a step of a rounded count.
type CountBand struct {
	Below   *decimal.Decimal `json:"below,omitzero"`
	AtMost  *decimal.Decimal `json:"at most,omitzero"`
	Nearest decimal.Decimal  `json:"nearest"`
}

// A Number is how numbers look in a language.
type Number struct {
	Decimal       string `json:"decimal"`
	TrailingZeros bool   `json:"trailing zeros,omitzero"`
	Unit          string `json:"unit"`                  // "{} g" with {} for number and the unit following: "{n} {u}"
	LessThan      string `json:"less than"`             // "less than {n} {u}"
	OrLessThan    string `json:"or less than,omitzero"` // another way the law allows, "contains less than {n} {u}"
}

// A Line is one line of a declaration.
type Line struct {
	Quantity    string     `json:"quantity"`
	Component   string     `json:"component"` // INFOODS tagname nearest to the line
	Terms       Terms      `json:"terms"`
	TermsIf     []TermsIf  `json:"terms if,omitzero"` // terms in place of those, the first whose condition holds
	Level       int        `json:"level,omitzero"`
	Unit        string     `json:"unit,omitzero"`       // "" shows no amount
	ShownUnit   Words      `json:"shown unit,omitzero"` // how the unit is printed, where not as itself
	NoAmountIf  *Condition `json:"no amount if,omitzero"`
	Percent     string     `json:"percent"`                       // "shown", "optional" or "none"
	PercentIf   *Condition `json:"percent mandatory if,omitzero"` // raises an optional per cent
	NoPercentIf *Condition `json:"percent none if,omitzero"`
	Presence    string     `json:"presence"` // "mandatory", "optional" or "forbidden"
	MandatoryIf *Condition `json:"mandatory if,omitzero"`
	ForbiddenIf *Condition `json:"forbidden if,omitzero"`
	LeaveOutIf  *Condition `json:"leave out if,omitzero"`
	LeftOut     Words      `json:"left out says,omitzero"`

	first map[string]string
}

// FirstTerms are the preferred terms by language, where there is more than one language. Never change them.
func (l *Line) FirstTerms() map[string]string { return l.first }

// Terms are the words a line may carry, by language, the preferred first.
type Terms map[string][]string

// TermsIf are terms that a line may carry only where a condition holds.
type TermsIf struct {
	If    *Condition `json:"if"`
	Terms Terms      `json:"terms"`
}

// A Statement is text that must or may stand somewhere.
type Statement struct {
	If       *Condition `json:"if,omitzero"`
	Text     Words      `json:"text"`
	Place    string     `json:"place,omitzero"`
	Presence string     `json:"presence,omitzero"` // "mandatory" (default) or "optional"
}
