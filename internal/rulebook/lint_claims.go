package rulebook

import (
	"slices"
	"strconv"
	"strings"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
)

func (c *checker) declarations() {
	bodies(c.m.Declarations, func(id, field string, d *Declaration) {
		bad := func(f, format string, args ...any) { c.bad("declaration", id, field+f, format, args...) }
		for _, lang := range c.m.Market.Languages {
			if _, ok := d.Number[lang]; !ok {
				bad("/number", "says nothing about %q", lang)
			}
		}
		seen := map[string]bool{}
		for i := range d.Lines {
			line, at := &d.Lines[i], "/lines/"+strconv.Itoa(i)
			if seen[line.Quantity] {
				bad(at, "the quantity %s has a line already", line.Quantity)
			}
			seen[line.Quantity] = true
			c.line(id, field+at, line)
		}
		c.shortForms(id, field, d, seen)
		c.condition("declaration", id, field+"/required unless", "required", d.RequiredUnless)
		if (d.RequiredUnless != nil) != (len(d.NotRequired) > 0) {
			bad("/not required says", "goes with required unless")
		}
		for _, group := range d.Together {
			for _, q := range group {
				if !seen[q] {
					bad("/together", "%q has no line", q)
				}
			}
		}
		for i, s := range d.Statements {
			c.statement("declaration", id, field+"/statements/"+strconv.Itoa(i), "statement/"+Name(id), s)
		}
	})
}

// shortForms checks the shorter formats and the count of servings.
func (c *checker) shortForms(id, field string, d *Declaration, lines map[string]bool) {
	for i := range d.Simplified {
		c.simplified(id, field+"/simplified/"+strconv.Itoa(i), &d.Simplified[i], lines)
	}
	if s := d.Servings; s != nil {
		c.countBands(id, field+"/servings per package", s.Bands)
		c.condition("declaration", id, field+"/servings per package/varied if", "servings", s.VariedIf)
		if (s.VariedIf != nil) != (len(s.Varied) > 0) {
			c.bad("declaration", id, field+"/servings per package", "varied goes with varied if")
		}
	}
	if s := d.Serving; s != nil {
		c.countBands(id, field+"/serving size", s.Bands)
		c.words("declaration", id, field+"/serving size/text", s.Text)
		c.condition("declaration", id, field+"/serving size/single if", "servings", s.SingleIf)
		if (s.SingleIf != nil) != (len(s.Single) > 0) {
			c.bad("declaration", id, field+"/serving size", "single goes with single if")
		}
	}
}

func (c *checker) countBands(id, at string, bands []CountBand) {
	for i, b := range bands {
		if open := b.Below == nil && b.AtMost == nil; open != (i == len(bands)-1) || !b.Nearest.IsPositive() {
			c.bad("declaration", id, at+"/bands", "must have edges but for the last, and steps above zero")
		}
	}
	if len(bands) == 0 {
		c.bad("declaration", id, at+"/bands", "is empty")
	}
}

func (c *checker) simplified(id, at string, f *Simplified, lines map[string]bool) {
	bad := func(f, format string, args ...any) { c.bad("declaration", id, at+f, format, args...) }
	c.words("declaration", id, at+"/name", f.Name)
	c.condition("declaration", id, at+"/where", "simplified", f.Where)
	c.condition("declaration", id, at+"/says if", "simplified", f.SaysIf)
	if f.Needed > len(f.Of) || f.Needed < 1 && len(f.Of) > 0 {
		bad("", "%d of %d cannot be insignificant", f.Needed, len(f.Of))
	}
	leaves := len(f.Of)+len(f.Leaves) > 0
	if leaves == (len(f.Shows) > 0) || f.Repeats && leaves {
		bad("", "either leaves lines out (of, leaves out) or shows some alone; what is repeated is shown")
	}
	members := func(what string, list []Insignificant, always bool) {
		for _, one := range list {
			c.condition("declaration", id, at+"/"+what+"/"+one.Quantity, "simplified", one.If)
			if !lines[one.Quantity] || one.If == nil && !always {
				bad("/"+what, "%q has no line or no condition", one.Quantity)
			}
		}
	}
	members("of", f.Of, false)
	members("leaves out", f.Leaves, true)
	for _, q := range slices.Concat(f.Keeps, f.Shows) {
		if !lines[q] {
			bad("", "%q has no line", q)
		}
	}
}

func (c *checker) line(id, at string, line *Line) {
	bad := func(f, format string, args ...any) { c.bad("declaration", id, at+f, format, args...) }
	c.quantity("declaration", id, at+"/quantity", line.Quantity, quantity.NoDimension)
	if _, ok := food.Lookup(line.Component); !ok {
		bad("/component", "%q is no component of the register", line.Component)
	}
	if !slices.Contains([]string{"mandatory", "optional", "forbidden"}, line.Presence) {
		bad("/presence", "%q is none of mandatory, optional, forbidden", line.Presence)
	}
	if !slices.Contains([]string{"shown", "optional", "none"}, line.Percent) {
		bad("/percent", "%q is none of shown, optional, none", line.Percent)
	}
	if u, ok := quantity.ParseUnit(line.Unit); line.Unit != "" && (!ok || u.Dimension() != c.dims[line.Quantity]) {
		bad("/unit", "%q does not fit the quantity", line.Unit)
	}
	if len(c.m.Market.Languages) > 1 {
		line.first = map[string]string{}
	}
	for _, lang := range c.m.Market.Languages {
		if len(line.Terms[lang]) == 0 {
			bad("/terms", "has no words in %q", lang)
			continue
		}
		if line.first != nil {
			line.first[lang] = line.Terms[lang][0]
		}
	}
	node := "line/" + line.Quantity
	for i := range line.TermsIf {
		o := &line.TermsIf[i]
		c.condition("declaration", id, at+"/terms if", "terms/"+line.Quantity, o.If)
		for _, lang := range c.m.Market.Languages {
			if len(o.Terms[lang]) == 0 || o.If == nil {
				bad("/terms if", "has no condition, or no words in %q", lang)
			}
		}
	}
	c.condition("declaration", id, at+"/mandatory if", node, line.MandatoryIf)
	c.condition("declaration", id, at+"/forbidden if", node, line.ForbiddenIf)
	c.condition("declaration", id, at+"/leave out if", node, line.LeaveOutIf)
	c.condition("declaration", id, at+"/no amount if", "amount/"+line.Quantity, line.NoAmountIf)
	c.condition("declaration", id, at+"/percent mandatory if", "percent/"+line.Quantity, line.PercentIf)
	c.condition("declaration", id, at+"/percent none if", "percent/"+line.Quantity, line.NoPercentIf)
}

func (c *checker) statement(kind, id, at, node string, s Statement) {
	c.words(kind, id, at+"/text", s.Text)
	if !slices.Contains([]string{"", "mandatory", "optional"}, s.Presence) {
		c.bad(kind, id, at+"/presence", "%q is neither mandatory nor optional", s.Presence)
	}
	c.condition(kind, id, at+"/if", node, s.If)
}

func (c *checker) claims() {
	c.claimsOf("claims", c.m.Claims)
	c.claimsOf("health_claims", c.m.HealthClaims)
}

func (c *checker) claimsOf(kind string, rules []Rule[Claim]) {
	bodies(rules, func(id, field string, cl *Claim) {
		node := "claim/" + Name(id)
		c.words(kind, id, field+"/name", cl.Name)
		decides := 0
		for _, set := range []bool{cl.Condition != nil, cl.Prohibited, cl.Undecided != nil} {
			if set {
				decides++
			}
		}
		if decides != 1 {
			c.bad(kind, id, field, "must have exactly one of condition, prohibited and undecided")
		}
		c.condition(kind, id, field+"/barred if", "barred/"+Name(id), cl.BarredIf)
		if compares, reaches := c.relative(cl.Condition); compares && !cl.Against || cl.Against && !reaches {
			c.bad(kind, id, field+"/needs reference food", "must be true exactly when the condition compares with one")
		}
		c.condition(kind, id, field+"/condition", node, cl.Condition)
		for i, s := range cl.Statements {
			c.statement(kind, id, field+"/statements/"+strconv.Itoa(i), "statement/"+Name(id), s)
		}
		for _, q := range cl.NeedsLines {
			c.quantity(kind, id, field+"/mandatory lines", q, quantity.NoDimension)
		}
		c.stated(id, field+"/stated", cl.Stated)
	})
}

func (c *checker) stated(id, field string, s *Stated) {
	if s == nil {
		return
	}
	for _, q := range sorted(s.Of) {
		c.quantity("claims", id, field+"/of", q, quantity.NoDimension)
	}
	if !slices.Contains(StatedAs, s.As) {
		c.bad("claims", id, field+"/as", "%q is none of %s", s.As, strings.Join(StatedAs, ", "))
	}
	if s.As == "declared amount" && len(s.Of) != 1 {
		c.bad("claims", id, field+"/of", "only one quantity has a declared amount")
	}
}

func (c *checker) limits() {
	bodies(c.m.Disclosures, func(id, field string, d *Disclosure) {
		c.quantity("disclosure", id, field+"/quantity", d.Quantity, quantity.NoDimension)
		if d.Effect != "statement" && d.Effect != "bars" {
			c.bad("disclosure", id, field+"/effect", "%q is neither statement nor bars", d.Effect)
		}
		if d.Presence != "" && (d.Presence != "mandatory" && d.Presence != "optional" || d.Effect != "statement") {
			c.bad("disclosure", id, field+"/presence", "%q of a statement is neither mandatory nor optional", d.Presence)
		}
		if d.Condition == nil {
			c.bad("disclosure", id, field+"/condition", "is missing")
		}
		c.condition("disclosure", id, field+"/when", "disclosure/"+Name(id), d.When)
		c.condition("disclosure", id, field+"/condition", "disclosure/"+Name(id), d.Condition)
	})
	c.limitsOf("limits", c.m.Limits)
	c.limitsOf("serving", c.m.Serving)
}

func (c *checker) limitsOf(kind string, rules []Rule[Limit]) {
	bodies(rules, func(id, field string, l *Limit) {
		if !slices.Contains([]string{"refused", "warning", "note"}, l.Severity) {
			c.bad(kind, id, field+"/severity", "%q is none of refused, warning, note", l.Severity)
		}
		if l.Condition == nil || !plainName(l.Code) {
			c.bad(kind, id, field, "needs a condition and a code")
		}
		c.words(kind, id, field+"/says", l.Says)
		c.condition(kind, id, field+"/where", kind+"/"+Name(id), l.Where)
		c.condition(kind, id, field+"/condition", kind+"/"+Name(id), l.Condition)
	})
}

func (c *checker) naming() {
	bodies(c.m.Conditions, func(id, field string, n *Named) {
		if n.Condition == nil {
			c.bad("conditions", id, field+"/condition", "is missing")
		}
		c.condition("conditions", id, field+"/condition", "condition/"+Name(id), n.Condition)
	})
	bodies(c.m.Naming, func(id, field string, n *Naming) {
		c.words("naming", id, field+"/says", n.Says)
		if (n.Ingredients == nil) == (n.Condition == nil) {
			c.bad("naming", id, field, "must be about ingredients, or have a condition of the product's name")
		}
		c.condition("naming", id, field+"/where", "naming/"+Name(id), n.Where)
		c.condition("naming", id, field+"/condition", "naming/"+Name(id), n.Condition)
	})
}

// cycles walks the graph of what depends on what and reports one cycle.
func (c *checker) cycles() {
	const (
		open = 1
		done = 2
	)
	state := map[string]int{}
	var path []string
	var visit func(string) bool
	visit = func(n string) bool {
		switch state[n] {
		case done:
			return true
		case open:
			c.bad("claims", "", "", "rules depend on each other in a circle: %s", strings.Join(append(path, n), " -> "))
			return false
		}
		state[n] = open
		path = append(path, n)
		for _, d := range c.deps[n] {
			if !visit(d) {
				return false
			}
		}
		path = path[:len(path)-1]
		state[n] = done
		return true
	}
	for _, n := range sorted(c.deps) {
		if !visit(n) {
			return
		}
	}
}

func (l *loader) presumptions() {
	bodies(l.book.Presumptions, func(id, field string, p *Presumption) {
		file := "practice/presumptions.json"
		for _, tag := range p.Components {
			if _, ok := food.Lookup(tag); !ok {
				l.problem(file, id, field+"/components", "%q is no component of the register", tag)
			}
		}
		if !slices.Contains([]string{"zero", "equal to", "at most"}, p.Take) {
			l.problem(file, id, field+"/take", "%q is none of zero, equal to, at most", p.Take)
		}
		if _, ok := food.Lookup(p.Of); (p.Take != "zero") != ok {
			l.problem(file, id, field+"/of", "%q must be a component exactly when something other than zero is taken", p.Of)
		}
		if (p.Take == "at most") != (p.Share != nil) {
			l.problem(file, id, field+"/share", "goes with at most, and only with it")
		}
		if p.Reason == "" {
			l.problem(file, id, field+"/reason", "is empty")
		}
	})
}
