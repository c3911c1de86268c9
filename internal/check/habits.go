package check

import (
	"slices"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

var hundred = decimal.New(100, 0)

// habits are the rules of practice, ready for look-up by component.
type habits struct {
	by      map[food.ID][]*rulebook.Rule[rulebook.Presumption]
	origins []rulebook.Rule[rulebook.Origin]
	names   map[*rollup.Leaf]string // lower-case food names
	used    []Presumed
	seen    map[Presumed]bool
}

func newHabits(b *rulebook.Book, without []string) *habits {
	h := &habits{by: map[food.ID][]*rulebook.Rule[rulebook.Presumption]{}, names: map[*rollup.Leaf]string{}, seen: map[Presumed]bool{}}
	if slices.Contains(without, "all") {
		return h
	}
	for _, r := range b.Origins {
		if !slices.Contains(without, r.ID) {
			h.origins = append(h.origins, r)
		}
	}
	for i := range b.Presumptions {
		r := &b.Presumptions[i]
		if slices.Contains(without, r.ID) {
			continue
		}
		for _, tag := range r.Versions[len(r.Versions)-1].Body.Components {
			c, _ := food.Lookup(tag)
			h.by[c.ID] = append(h.by[c.ID], r)
		}
	}
	return h
}

// selects tells whether a selection takes a leaf's food.
func (h *habits) selects(s *rulebook.Selection, l *rollup.Leaf) bool {
	if s.Stated {
		return l.Ingredient != nil && (l.Ingredient.Composition != nil || l.Ingredient.Label != nil)
	}
	if len(s.Processes) > 0 {
		return l.Ingredient != nil && l.Ingredient.Composition != nil && slices.Contains(s.Processes, l.Ingredient.Process)
	}
	if !l.IsFood {
		return false
	}
	if len(s.Foods) > 0 {
		return slices.Contains(s.Foods, l.Food.Ref())
	}
	if len(s.Groups) > 0 && !slices.Contains(s.Groups, l.Food.Group().Code) {
		return false
	}
	n, ok := h.names[l]
	if !ok {
		n = strings.ToLower(l.Food.Name())
		h.names[l] = n
	}
	has := func(w string) bool { return strings.Contains(n, w) }
	return (len(s.Words) == 0 || slices.ContainsFunc(s.Words, has)) && !slices.ContainsFunc(s.Without, has)
}

// presume is what practice takes for a component of a leaf.
func (h *habits) presume(l *rollup.Leaf, id food.ID) (rollup.Presumed, bool) {
	for _, r := range h.by[id] {
		p := &r.Versions[len(r.Versions)-1].Body
		if !h.selects(&p.Foods, l) {
			continue
		}
		h.note(l, id, r.ID, p)
		out := rollup.Presumed{Rule: r.ID}
		if p.Take != "zero" {
			of, _ := food.Lookup(p.Of)
			out.Of, out.Share = of.ID, quantity.FromInt(1)
			if p.Share != nil {
				out.Share = quantity.FromDecimal(p.Share.Value.Shift(-2))
			}
			out.Upto = p.Take == "at most"
		}
		return out, true
	}
	return rollup.Presumed{}, false
}

func (h *habits) note(l *rollup.Leaf, id food.ID, rule string, p *rulebook.Presumption) {
	taken := p.Take
	if p.Share != nil {
		taken += " " + p.Share.String() + " of"
	}
	if p.Of != "" {
		taken += " " + p.Of
	}
	h.use(Presumed{Component: id.Tag(), Ingredient: l.Path, Taken: taken, Reason: p.Reason, Rule: rule})
}

func (h *habits) use(n Presumed) {
	if !h.seen[n] {
		h.seen[n] = true
		h.used = append(h.used, n)
	}
}

// origin is where practice takes a leaf's trans fatty acids to come from, which is noted; empty where it takes nothing.
func (h *habits) origin(l *rollup.Leaf) string {
	for i := range h.origins {
		r := &h.origins[i]
		o := &r.Versions[len(r.Versions)-1].Body
		if o.Origin != "" && h.selects(&o.Foods, l) && littleTrans(o.TransAtMost, l) {
			h.use(Presumed{Component: TransOrigin, Ingredient: l.Path, Taken: o.Origin, Reason: o.Reason, Rule: r.ID})
			return o.Origin
		}
	}
	return ""
}

// process is how practice takes a leaf's fat to have been processed, which is noted; empty where it takes nothing.
func (h *habits) process(l *rollup.Leaf) string {
	for i := range h.origins {
		r := &h.origins[i]
		o := &r.Versions[len(r.Versions)-1].Body
		if o.Process != "" && h.selects(&o.Foods, l) && littleTrans(o.TransAtMost, l) {
			h.use(Presumed{Component: Process, Ingredient: l.Path, Taken: o.Process, Reason: o.Reason, Rule: r.ID})
			return o.Process
		}
	}
	return ""
}

// littleTrans tells whether a leaf has trans fatty acids, and surely no more than a share of its fat.
func littleTrans(limit *quantity.Amount, l *rollup.Leaf) bool {
	if limit == nil {
		return true
	}
	most := l.Component(food.Fat).Low().Times(limit.Value.Shift(-2))
	held := l.Component(food.TransFat).High()
	return held.Sign() > 0 && held.Cmp(most) <= 0
}
