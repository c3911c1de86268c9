package rulebook

import (
	"fmt"
	"maps"
	"slices"
	"strconv"
	"strings"
	"time"

	"gramlaw/internal/quantity"
)

// common checks what every rule has: identifier, versions, dates, source.
func (l *loader) common(file, id, prefix string, heads []*Head) {
	bad := func(field, format string, args ...any) { l.problem(file, id, field, format, args...) }
	if name, ok := strings.CutPrefix(id, prefix); !ok || !plainName(name) {
		bad("id", "must be %s followed by lower-case letters, digits and hyphens", prefix)
	}
	if len(heads) == 0 {
		bad("versions", "is empty")
	}
	last := ""
	for i, h := range heads {
		v := "versions/" + strconv.Itoa(i)
		l.head(file, id, v, h)
		if h.From < last {
			bad(v, "begins before the version above it; the oldest stands first")
		}
		last = h.From
	}
}

func (l *loader) head(file, id, v string, h *Head) {
	bad := func(field, format string, args ...any) { l.problem(file, id, v+"/"+field, format, args...) }
	if !isDate(h.From) {
		bad("from", "%q is no date yyyy-mm-dd", h.From)
	}
	if h.Until != "" && (!isDate(h.Until) || h.Until <= h.From) {
		bad("until", "%q is no date after %s", h.Until, h.From)
	}
	for i, r := range h.RequiredFrom {
		if !isDate(r.Date) || r.Date < h.From {
			bad(fmt.Sprintf("required_from/%d", i), "%q is no date from %s on", r.Date, h.From)
		}
	}
	if !slices.Contains(Attachments, h.AppliesTo) {
		bad("applies_to", "%q is none of %s", h.AppliesTo, strings.Join(Attachments[1:], ", "))
	}
	l.source(file, id, v+"/source", h.Source)
}

func (l *loader) source(file, id, field string, s Source) {
	if strings.TrimSpace(s.Ref) == "" {
		l.problem(file, id, field+"/ref", "is empty; say where the rule stands")
	}
	if !slices.Contains(Evidences, s.Evidence) {
		l.problem(file, id, field+"/evidence", "%q is none of %s", s.Evidence, strings.Join(Evidences, ", "))
	}
	if !slices.Contains(Forces, s.Force) {
		l.problem(file, id, field+"/force", "%q is none of %s", s.Force, strings.Join(Forces, ", "))
	}
}

func isDate(s string) bool {
	_, err := time.Parse("2006-01-02", s)
	return err == nil
}

func plainName(s string) bool {
	if s == "" || s[0] == '-' || s[len(s)-1] == '-' {
		return false
	}
	for _, c := range s {
		if (c < 'a' || c > 'z') && (c < '0' || c > '9') && c != '-' {
			return false
		}
	}
	return true
}

// check goes through a set whose files are all well formed: references, dimensions, bands, cycles.
func (l *loader) check() {
	if l.book.Version == "" {
		l.problem("set.json", "", "version", "is missing")
	}
	work := []func(*loader){(*loader).presumptions, (*loader).words}
	for _, j := range l.book.Jurisdictions() {
		work = append(work, func(own *loader) {
			c := &checker{loader: own, j: j, m: l.book.markets[j]}
			c.market()
		})
	}
	l.sideBySide(work)
}

// A checker lints one market.
type checker struct {
	*loader
	j    string
	m    *Rules
	dims map[string]quantity.Dimension // of every quantity
	deps map[string][]string           // what a rule's result depends on

	claimed    map[string]*Rule[Claim] // claims and health claims by identifier
	conditions map[string]*Rule[Named]
}

func (c *checker) bad(kind, id, field, format string, args ...any) {
	c.problem(c.j+"/"+kind+".json", id, field, format, args...)
}

func (c *checker) market() {
	if c.m.Market.Jurisdiction == "" {
		c.problem(c.j+"/jurisdiction.json", "", "", "is missing")
	}
	if c.m.Market.Caution == "" {
		c.bad("jurisdiction", "", "caution", "is missing")
	}
	c.editions()
	c.page()
	c.claimed, c.conditions = byID(c.m.Claims), byID(c.m.Conditions)
	maps.Copy(c.claimed, byID(c.m.HealthClaims))
	c.dims, c.deps = map[string]quantity.Dimension{}, map[string][]string{}
	c.quantities()
	c.bases()
	c.references()
	c.roundings()
	c.declarations()
	c.claims()
	c.limits()
	c.naming()
	c.wordings()
	c.cycles()
}

// page checks words and bases of jurisdiction.json.
func (c *checker) page() {
	for _, lang := range c.m.Market.Languages {
		if c.m.Market.And != nil && c.m.Market.And[lang] == "" {
			c.bad("jurisdiction", "", "and", "has no word in %q", lang)
		}
	}
}

func (c *checker) bases() {
	for i := range c.m.Market.DefaultBases {
		b := &c.m.Market.DefaultBases[i]
		if _, err := ParsePer(b.Per); err != nil {
			c.bad("jurisdiction", "", "bases", "%v", err)
		}
		if b.Edition != "" && !slices.ContainsFunc(c.m.Market.Editions, func(e Edition) bool { return e.Edition == b.Edition }) {
			c.bad("jurisdiction", "", "bases", "%q is no edition", b.Edition)
		}
		c.condition("jurisdiction", "", "bases/if", "basis", b.If)
	}
}

func (c *checker) editions() {
	known := map[string]bool{"": true}
	for _, e := range c.m.Market.Editions {
		known[e.Edition] = true
		c.source(c.j+"/jurisdiction.json", e.Edition, "source", e.Source)
		if !isDate(e.From) {
			c.bad("jurisdiction", e.Edition, "from", "%q is no date", e.From)
		}
	}
	each(c.m, func(kind, id string, h *Head) {
		for _, e := range slices.Concat(h.Editions, []string{h.Edition}) {
			if !known[e] {
				c.bad(kind, id, "edition", "%q is no edition of jurisdiction.json", e)
			}
		}
		if h.Edition != "" && len(h.Editions) > 0 {
			c.bad(kind, id, "editions", "stands beside edition")
		}
	})
}

// each visits the head of every version of a market's rules.
func each(m *Rules, visit func(kind, id string, h *Head)) {
	for _, t := range m.tables() {
		t.heads(visit)
	}
}

// bodies visits every version's body.
func bodies[T any](rules []Rule[T], visit func(id, field string, b *T)) {
	for i := range rules {
		for j := range rules[i].Versions {
			visit(rules[i].ID, "versions/"+strconv.Itoa(j), &rules[i].Versions[j].Body)
		}
	}
}
