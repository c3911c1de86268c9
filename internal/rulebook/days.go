package rulebook

import "slices"

// Days lists the days after one and up to another on which a rule of a market can begin, end or become a duty, in order. Practice has no days.
func (b *Book) Days(jurisdiction, after, until string) []string {
	m, ok := b.markets[jurisdiction]
	if !ok {
		return nil
	}
	seen := map[string]bool{}
	note := func(day string) {
		if day > after && day <= until {
			seen[day] = true
		}
	}
	head := func(from, until string, required []Required) {
		note(from)
		note(until)
		for _, r := range required {
			note(r.Date)
		}
	}
	for _, e := range m.Market.Editions {
		head(e.From, e.Until, e.RequiredFrom)
	}
	for _, t := range m.tables() {
		t.heads(func(_, _ string, h *Head) { head(h.From, h.Until, h.RequiredFrom) })
	}
	out := sorted(seen)
	slices.Sort(out)
	return out
}
