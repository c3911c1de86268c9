package render

import (
	"fmt"
	"strings"

	"gramlaw/internal/check"
)

// outcome sums a market up in a line, the worst first.
func outcome(m *check.Market) string {
	t := tally(m)
	var parts []string
	for _, x := range []struct {
		n         int
		one, more string
	}{
		{t.limits, "limit broken", "limits broken"},
		{t.refused, "claim refused", "claims refused"},
		{t.lines, "mandatory line not determined", "mandatory lines not determined"},
		{t.open, "claim or finding open", "claims or findings open"},
		{t.unlisted, "claim not listed", "claims not listed"},
		{t.permitted, "claim permitted", "claims permitted"},
	} {
		if x.n > 0 {
			parts = append(parts, fmt.Sprintf("%d %s", x.n, plural(x.n, x.one, x.more)))
		}
	}
	if len(parts) == 0 {
		return "every mandatory line determined; no claim was asked for"
	}
	return strings.Join(parts, ", ")
}

type counts struct{ limits, refused, lines, open, unlisted, permitted int }

func tally(m *check.Market) (t counts) {
	for i := range m.Claims {
		switch c := &m.Claims[i]; {
		case c.Verdict == check.Refused:
			t.refused++
		case c.Verdict == check.NotListed:
			t.unlisted++
		case c.Verdict == check.Undetermined, c.Verdict == check.Unread, !c.Printable:
			t.open++
		default:
			t.permitted++
		}
	}
	for i := range m.Findings {
		switch m.Findings[i].Severity {
		case "refused":
			t.limits++
		case "open":
			t.open++
		}
	}
	for i := range m.Declaration.Lines {
		if l := &m.Declaration.Lines[i]; l.Presence == mandatory && l.Status != determined {
			t.lines++
		}
	}
	return t
}
