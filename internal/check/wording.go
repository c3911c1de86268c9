package check

import (
	"slices"

	"gramlaw/internal/claim"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
)

// A WordingRequest asks what words are in law. On is the labelling date yyyy-mm-dd.
type WordingRequest struct {
	Text       string
	Language   string // of the words; none is English
	On         string
	In         []string // markets; none is all of the set
	Transition rulebook.Transition
}

// A WordingReport tells, market by market, which claims words on a pack are.
type WordingReport struct {
	Text     string          `json:"text"`
	Language string          `json:"language"`
	Recipe   *Identity       `json:"recipe,omitzero"`
	Rules    RuleSet         `json:"rules"`
	Date     string          `json:"date"`
	Markets  []WordingMarket `json:"jurisdictions"`
	Caution  string          `json:"caution"`
}

// A WordingMarket is one jurisdiction's part.
type WordingMarket struct {
	Jurisdiction string    `json:"jurisdiction"`
	Name         string    `json:"name"`
	Edition      string    `json:"edition,omitzero"`
	NotJudged    string    `json:"not_judged,omitzero"` // why the words are not judged here
	Readings     []Reading `json:"readings"`
	Caution      string    `json:"caution"`
}

// A Reading is what some of the words are. A product given, the verdict and its reasons are decided; else the condition stands in words.
type Reading struct {
	Text      string  `json:"text"`
	Span      []int   `json:"span"`  // code points of the text: first, and first behind
	Claim     *string `json:"claim"` // the rule that lists it; null where the words are none
	Name      string  `json:"name,omitzero"`
	Relation  string  `json:"relation,omitzero"`
	Component string  `json:"component,omitzero"`
	Thing     string  `json:"thing,omitzero"`    // what is no nutrient
	Function  string  `json:"function,omitzero"` // of the body
	Amount    string  `json:"amount,omitzero"`
	Unit      string  `json:"unit,omitzero"`
	Percent   string  `json:"percent,omitzero"`
	Basis     string  `json:"basis,omitzero"`
	Compared  string  `json:"compared,omitzero"` // the food named, as it stands in the text
	Denied    bool    `json:"denied,omitzero"`

	Matched     string      `json:"matched"`
	Verdict     string      `json:"verdict,omitzero"`
	Why         []string    `json:"why"`
	Condition   *Condition  `json:"condition,omitzero"`
	InWords     string      `json:"condition_in_words,omitzero"`
	Statements  []Statement `json:"statements"`
	Disclosure  []Statement `json:"disclosure"`
	Lines       []string    `json:"needs_lines"` // lines of the declaration that the claim makes mandatory
	Needs       []string    `json:"needs,omitzero"`
	Nearest     []Listed    `json:"nearest"`
	Instead     []Listed    `json:"instead"`
	Rule        string      `json:"rule,omitzero"`    // that lists the claim, or else that says what the words are
	ReadBy      string      `json:"read_by,omitzero"` // the rule of wording that led to the claim, where its own words do not stand in the text
	Source      string      `json:"source,omitzero"`
	Force       string      `json:"force,omitzero"`
	Evidence    string      `json:"evidence,omitzero"`
	WeakestRule string      `json:"weakest_rule,omitzero"`
}

// A Listed is a claim with the words that the law lists for it.
type Listed struct {
	Claim    string   `json:"claim"`
	Name     string   `json:"name"`
	Wordings []string `json:"wordings"` // in the language of the text
	Verdict  string   `json:"verdict,omitzero"`
}

// Outcome sums the report up as the exit status of a check does: 0 all well, 1 something refused, 3 something not determined, not listed or
// not judged, and nothing refused.
func (r *WordingReport) Outcome() int {
	open := false
	for i := range r.Markets {
		open = open || r.Markets[i].NotJudged != ""
		for _, reading := range r.Markets[i].Readings {
			switch reading.Verdict {
			case Refused:
				return 1
			case Undetermined, NotListed:
				open = true
			}
		}
	}
	if open {
		return 3
	}
	return 0
}

// Wording reads words and, with a recipe, judges them for it; r may be nil. Faults are about the request and name its member ("text",
// "language", "on", "in"), or about the recipe.
func Wording(r *recipe.Recipe, book *rulebook.Book, q WordingRequest) (*WordingReport, recipe.Faults) {
	if q.Transition == "" {
		q.Transition = rulebook.WhenRequired
	}
	if faults := q.Faults(book); len(faults) > 0 {
		return nil, faults
	}
	w := &worder{engine: wording.Of(book), book: book, recipe: r, q: q}
	return w.report()
}

// Faults lists what is wrong with a request whatever the recipe. Each names the member: "text", "language", "on", "in" or "transition".
func (q WordingRequest) Faults(book *rulebook.Book) recipe.Faults {
	faults := Request{On: q.On, In: q.In, Transition: q.Transition}.Faults(book)
	for _, f := range wording.Of(book).Faults(q.Text, q.Language) {
		faults = append(faults, recipe.Fault{Pointer: f.Member, Code: f.Code, Says: f.Says})
	}
	return faults
}

// A worder answers one request.
type worder struct {
	engine *wording.Engine
	book   *rulebook.Book
	recipe *recipe.Recipe
	q      WordingRequest
}

func (w *worder) report() (*WordingReport, recipe.Faults) {
	language, _ := wording.Base(w.q.Language)
	out := &WordingReport{Text: w.q.Text, Language: language, Rules: RuleSet{w.book.Version, w.book.Digest}, Date: w.q.On, Markets: []WordingMarket{}, Caution: Caution}
	if w.recipe != nil {
		out.Recipe = &Identity{w.recipe.ID, w.recipe.Name, w.recipe.Digest}
	}
	if len(w.q.In) == 0 {
		w.q.In = w.book.Jurisdictions()
	}
	for _, j := range w.q.In {
		m, faults := w.market(j, language)
		if len(faults) > 0 {
			return nil, faults
		}
		out.Markets = append(out.Markets, m)
	}
	return out, nil
}

// market reads the words for one market.
func (w *worder) market(j, language string) (WordingMarket, recipe.Faults) {
	c := &checker{recipe: &recipe.Recipe{}, book: w.book, request: Request{On: w.q.On}, laws: map[string]*rulebook.Law{}, shared: map[shared][]part{}}
	if w.recipe != nil {
		c.recipe = w.recipe
	}
	m := c.open(j, w.q.Transition)
	out := WordingMarket{Jurisdiction: j, Name: m.law.Market.Name, Edition: m.law.Edition, Readings: []Reading{}, Caution: m.law.Market.Caution}
	switch {
	case !m.covered():
		out.NotJudged = "the rule set does not cover this market on " + w.q.On
		return out, nil
	case !w.engine.Covers(m.law, language):
		out.NotJudged = w.unsupported(m.law, language)
		return out, nil
	}
	readings, err := w.engine.Judge(m.law, w.q.Text, language)
	if err != nil {
		return out, recipe.Faults{{Pointer: "text", Code: wording.CodeWords, Says: err.Error()}}
	}
	for i := range readings {
		out.Readings = append(out.Readings, m.reading(&readings[i], language))
	}
	if w.recipe != nil {
		return out, w.judge(&out, m, readings, language)
	}
	return out, nil
}

func (w *worder) unsupported(law *rulebook.Law, language string) string {
	if !w.engine.Supports(language) {
		return "the language is not supported: the rule set knows no words of it, and judges nothing"
	}
	return "the language is not supported for this market: the rule set knows no words of it for " + law.Market.Name + ", and judges nothing"
}

// judge decides the claims among the readings for the recipe.
func (w *worder) judge(out *WordingMarket, m *market, readings []wording.Reading, language string) recipe.Faults {
	asking := *w.recipe
	asking.Claims = nil
	var at []int
	for i := range readings {
		if r := &readings[i]; r.Is() && !r.Negated {
			asking.Claims = append(asking.Claims, asked(r, m.j, w.recipe))
			at = append(at, i)
		}
	}
	report, faults := Check(&asking, w.book, Request{On: w.q.On, In: []string{m.j}, Transition: w.q.Transition})
	if len(faults) > 0 {
		return faults
	}
	judged := &report.Jurisdictions[0]
	out.Edition = judged.Edition
	for k, i := range at {
		out.Readings[i].take(&judged.Claims[k])
	}
	for i := range out.Readings {
		out.Readings[i].Instead = m.instead(&readings[i], &out.Readings[i], judged.AlsoPermitted, language)
	}
	return nil
}

// asked is the claim that a reading asks for.
func asked(r *wording.Reading, j string, of *recipe.Recipe) recipe.Claim {
	out := recipe.Claim{Claim: r.Claim.Name(), In: []string{j}, Stated: stated(r), Against: against(r, of)}
	return out
}

// stated is the number in the words, where it has a unit that rules know.
func stated(r *wording.Reading) *quantity.Amount {
	text := r.Amount + " " + r.Unit
	if r.Percent != "" {
		text = r.Percent + " %"
	}
	a, err := quantity.ParseAmount(text)
	if err != nil {
		return nil
	}
	return &a
}

// against is the reference food the words mean: the one the recipe has, or the one whose name stands in them.
func against(r *wording.Reading, of *recipe.Recipe) string {
	if !r.Claim.Body.Against {
		return ""
	}
	names := sortedKeys(of.References)
	if len(names) == 1 {
		return names[0]
	}
	for _, n := range names {
		if said := folded(r.Compared); said != "" && (contains(said, n) || contains(said, of.References[n].Name)) {
			return n
		}
	}
	return ""
}

// take puts a decided claim into the reading.
func (r *Reading) take(c *Claim) {
	r.Verdict, r.Condition, r.Needs, r.WeakestRule, r.Evidence = c.Verdict, c.Condition, c.Needs, c.Weakest, c.Evidence
	r.Statements, r.Disclosure, r.Lines = []Statement{}, []Statement{}, c.NeedsLines
	for _, s := range c.Statements {
		if s.Rule != c.Rule {
			r.Disclosure = append(r.Disclosure, s)
		} else {
			r.Statements = append(r.Statements, s)
		}
	}
	if c.Why != "" && !slices.Contains(r.Why, c.Why) {
		r.Why = append(r.Why, c.Why)
	}
	if r.Matched == rulebook.MatchForbidden {
		r.Verdict = Refused
	}
}

// speaker names a law's quantities and conditions.
type speaker struct{ *market }

func (s speaker) Name(q string) string { return s.as(nil).Name(q) }

func (s speaker) Named(id string) (*rulebook.Condition, bool) { return s.as(nil).Named(id) }

var _ claim.Speaker = speaker{}
