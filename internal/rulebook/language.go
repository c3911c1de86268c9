package rulebook

import (
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"
)

// wordsFolder is the folder of languages; conceptsFile in it names what their words can mean.
const (
	wordsFolder  = "words"
	conceptsFile = "concepts"
)

// Concepts are the names that the words of every language lead to. They know no law.
type Concepts struct {
	Components []string `json:"components"` // nutrients and the like, as claims name them
	Relations  []string `json:"relations"`  // what is said of a component
	Functions  []string `json:"functions"`  // of the body
}

// A Language is what words of one language mean, whatever the law. rules/words/README.md tells how patterns are written.
type Language struct {
	Language     string              `json:"language"`
	Name         string              `json:"name"`
	Decimal      string              `json:"decimal"` // "." or ","
	Sets         map[string][]string `json:"sets,omitzero"`
	Components   []ComponentWords    `json:"components"`
	Things       []PhraseWords       `json:"things,omitzero"`
	Units        []PhraseWords       `json:"units"`
	Numbers      []PhraseWords       `json:"numbers,omitzero"`
	Bases        []PhraseWords       `json:"bases,omitzero"`
	Relations    []RelationWords     `json:"relations"`
	Comparison   []PatternWords      `json:"comparison,omitzero"`
	Negation     []ListWords         `json:"negation,omitzero"`
	Conjunctions []ListWords         `json:"conjunctions"`
	Health       []HealthWords       `json:"health,omitzero"`
	Decoys       []PatternWords      `json:"decoys,omitzero"`
	Cues         []ListWords         `json:"cues,omitzero"`
}

// Phrases are words by what they mean.
type Phrases map[string][]string

// ComponentWords name components: phrases, short forms before and after others in a list, and stems for compounds.
type ComponentWords struct {
	Phrases Phrases `json:"phrases,omitzero"`
	Before  Phrases `json:"before,omitzero"`
	After   Phrases `json:"after,omitzero"`
	Stems   Phrases `json:"stems,omitzero"`
	Source  Source  `json:"source"`
}

// PhraseWords are a block of phrases.
type PhraseWords struct {
	Phrases Phrases `json:"phrases"`
	Source  Source  `json:"source"`
}

// RelationWords are patterns of one relation.
type RelationWords struct {
	Relation  string   `json:"relation"`
	Form      string   `json:"form,omitzero"`      // which way of saying it, for laws that tell ways apart
	Component string   `json:"component,omitzero"` // where the words mean one without naming it
	Percent   string   `json:"percent,omitzero"`   // what the words mean by themselves
	Denies    bool     `json:"negated,omitzero"`   // the words deny it
	Patterns  []string `json:"patterns"`
	Source    Source   `json:"source"`
}

// PatternWords are patterns without a result of their own.
type PatternWords struct {
	Patterns []string `json:"patterns"`
	Behind   []string `json:"behind,omitzero"` // of a comparison: relations that it must stand right behind
	Source   Source   `json:"source"`
}

// ListWords are words of one kind, and the words that may stand between them and what they belong to.
type ListWords struct {
	Phrases []string `json:"phrases"`
	Over    []string `json:"over,omitzero"`
	Source  Source   `json:"source"`
}

// HealthWords are functions of the body and what may be said of them.
type HealthWords struct {
	Functions Phrases  `json:"functions,omitzero"`
	Form      string   `json:"form,omitzero"` // which way of saying it, for laws that tell ways apart
	Patterns  []string `json:"patterns,omitzero"`
	Source    Source   `json:"source"`
}

// Languages lists the languages whose words the set knows, sorted.
func (b *Book) Languages() []string { return sorted(b.languages) }

// Language gives the words of a language.
func (b *Book) Language(code string) (*Language, bool) {
	l, ok := b.languages[code]
	return l, ok
}

// readWords reads a file of words/. Files are read side by side, so the place in the book is made at once.
func (b *Book) readWords(f ruleFile, name string) func(*loader) {
	if name == conceptsFile {
		return func(own *loader) { own.decode(f.name, f.data, &b.concepts) }
	}
	l := &Language{}
	b.languages[name] = l
	return func(own *loader) {
		if own.decode(f.name, f.data, l) && l.Language != name {
			own.problem(f.name, "", "language", "is %q in the file of %q", l.Language, name)
		}
	}
}

// words checks the languages of a set against the concepts.
func (l *loader) words() {
	for _, code := range sorted(l.book.languages) {
		c := &wordChecker{loader: l, file: wordsFolder + "/" + code + ".json", concepts: &l.book.concepts}
		c.language(l.book.languages[code])
	}
}

// A wordChecker lints one language. Patterns are checked by whoever compiles them.
type wordChecker struct {
	*loader
	file     string
	concepts *Concepts
}

func (c *wordChecker) language(w *Language) {
	if w.Decimal != "." && w.Decimal != "," {
		c.problem(c.file, "", "decimal", `%q is neither "." nor ","`, w.Decimal)
	}
	if w.Name == "" {
		c.problem(c.file, "", "name", "is empty")
	}
	for i, b := range w.Components {
		at := "components/" + strconv.Itoa(i)
		for _, p := range []Phrases{b.Phrases, b.Before, b.After, b.Stems} {
			c.phrases(at, p, c.concepts.Components)
		}
		c.source(c.file, "", at+"/source", b.Source)
	}
	for name, blocks := range map[string][]PhraseWords{"things": w.Things, "units": w.Units, "numbers": w.Numbers, "bases": w.Bases} {
		for i, b := range blocks {
			at := name + "/" + strconv.Itoa(i)
			c.phrases(at, b.Phrases, nil)
			c.source(c.file, "", at+"/source", b.Source)
		}
	}
	c.relations(w)
	for name, blocks := range map[string][]ListWords{"negation": w.Negation, "conjunctions": w.Conjunctions, "cues": w.Cues} {
		for i, b := range blocks {
			at := name + "/" + strconv.Itoa(i)
			c.list(at+"/phrases", b.Phrases)
			c.source(c.file, "", at+"/source", b.Source)
		}
	}
	for name, blocks := range map[string][]PatternWords{"comparison": w.Comparison, "decoys": w.Decoys} {
		for i, b := range blocks {
			at := name + "/" + strconv.Itoa(i)
			c.list(at+"/patterns", b.Patterns)
			c.source(c.file, "", at+"/source", b.Source)
		}
	}
}

func (c *wordChecker) relations(w *Language) {
	for i, r := range w.Relations {
		at := "relations/" + strconv.Itoa(i)
		c.concept(at+"/relation", r.Relation, c.concepts.Relations)
		if r.Component != "" {
			c.concept(at+"/component", r.Component, c.concepts.Components)
		}
		c.list(at+"/patterns", r.Patterns)
		c.source(c.file, "", at+"/source", r.Source)
	}
	for i, h := range w.Health {
		at := "health/" + strconv.Itoa(i)
		c.phrases(at+"/functions", h.Functions, c.concepts.Functions)
		c.source(c.file, "", at+"/source", h.Source)
	}
}

func (c *wordChecker) concept(at, name string, known []string) {
	if !slices.Contains(known, name) {
		c.problem(c.file, "", at, "%q is no concept of %s/%s.json", name, wordsFolder, conceptsFile)
	}
}

// phrases checks words and, where the names are concepts, the names.
func (c *wordChecker) phrases(at string, p Phrases, known []string) {
	for _, name := range sorted(p) {
		if known != nil {
			c.concept(at+"/"+name, name, known)
		}
		c.list(at+"/"+name, p[name])
	}
}

func (c *wordChecker) list(at string, words []string) {
	if len(words) == 0 {
		c.problem(c.file, "", at, "is empty")
	}
	for _, w := range words {
		if strings.TrimSpace(w) == "" || !utf8.ValidString(w) {
			c.problem(c.file, "", at, "%q says nothing", w)
		}
	}
}
