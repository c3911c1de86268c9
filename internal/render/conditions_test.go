package render

import (
	"strings"
	"testing"

	"gramlaw/internal/check"
)

// perBasis is a fulfilled comparison that differs from others in its basis.
func perBasis(per, value string) check.Condition {
	holds := true
	return check.Condition{Says: "fat at most 3 g per " + per, Exact: &value, Relation: "<=", Threshold: "3", Unit: "g", Holds: &holds}
}

func TestConditions(t *testing.T) {
	yes, no := new(bool), new(bool)
	*yes = true
	text := func(s string) *string { return &s }
	leaf := func(says string, holds *bool) check.Condition { return check.Condition{Says: says, Holds: holds} }
	fat := func(c check.Condition) check.Condition {
		c.Says, c.Relation, c.Threshold, c.Unit = "fat at most 3 g", "<=", "3", "g"
		return c
	}
	for _, c := range []struct {
		name string
		c    check.Condition
		want string
	}{
		{"groups of one vanish", check.Condition{All: []check.Condition{{All: []check.Condition{leaf("a", yes)}, Holds: yes}}, Holds: yes}, "yes   a\n"},
		{"any", check.Condition{Any: []check.Condition{leaf("a", yes), leaf("b", no)}, Holds: yes}, "yes   one of these at least:\n      yes   a\n      NO    b\n"},
		{"an open alternative beside one that holds", check.Condition{Any: []check.Condition{leaf("a", yes), leaf("b", nil), leaf("c", no)}, Holds: yes},
			"yes   one of these at least:\n      yes   a\n      NO    c\n"},
		{"an open alternative where none holds", check.Condition{Any: []check.Condition{leaf("a", no), leaf("b", nil)}}, "open  one of these at least:\n      NO    a\n      open  b\n"},
		{"count", check.Condition{AtLeast: 2, Of: []check.Condition{leaf("a", yes), leaf("b", nil)}}, "open  2 of these at least:\n      yes   a\n      open  b\n"},
		{"not", check.Condition{Not: &check.Condition{Says: "a", Holds: no}, Holds: yes}, "yes   does not hold: a\n"},
		{"not a group", check.Condition{Not: &check.Condition{All: []check.Condition{leaf("a", yes), leaf("b", no)}, Holds: no}, Holds: yes},
			"yes   not this:\n      yes   a\n      NO    b\n"},
		{"a group with words of the law", check.Condition{Says: "as sold:", All: []check.Condition{leaf("a", yes), leaf("b", yes)}, Holds: yes},
			"yes   as sold: all of these:\n      yes   a\n      yes   b\n"},
		{"inside", fat(check.Condition{Exact: text("2.5"), Headroom: "0.5", Holds: yes}), "yes   fat at most 3 g: 2.5 g; inside by 0.5 g\n"},
		{"at the threshold", fat(check.Condition{Exact: text("3"), Headroom: "0", Holds: yes}), "yes   fat at most 3 g: 3 g; exactly at the threshold\n"},
		{"just outside", fat(check.Condition{Exact: text("3.0000012"), Headroom: "-0.0000012", Holds: no}),
			"NO    fat at most 3 g: ≈3.000001 g; outside by 0.0000012 g\n"},
		{"a decided range", fat(check.Condition{Low: "3.5", High: "4", Holds: no}), "NO    fat at most 3 g: 3.5 to 4 g; outside by 0.5 g or more\n"},
		{"an open range", fat(check.Condition{Low: "2.5", High: "4", Needs: []string{"oats (FAT)", "oats (FASAT)", "salt"}}),
			"open  fat at most 3 g: 2.5 to 4 g; settled by data on oats (FAT, FASAT), salt\n"},
		{"an open range with a typical value", fat(check.Condition{Low: "2.5", High: "4", Exact: text("2.9"), Headroom: "0.1"}),
			"open  fat at most 3 g: typically 2.9 g, possible 2.5 to 4 g; inside by 0.1 g\n"},
		{"undecided by the law itself", check.Condition{Says: "the law does not say", Needs: []string{"the law does not say"}}, "open  the law does not say\n"},
		{"no upper end", fat(check.Condition{Low: "2.5", High: "0"}), "open  fat at most 3 g: 2.5 g or more\n"},
		{"nothing known", fat(check.Condition{Low: "0", High: "0"}), "open  fat at most 3 g: the value is not determined\n"},
		{"no value", fat(check.Condition{Low: "0", High: "0", Holds: no}), "NO    fat at most 3 g: no single value can be told\n"},
		{"nothing to be a share of", fat(check.Condition{NoValue: "there is nothing to be a share of", Holds: no}), "NO    fat at most 3 g: there is nothing to be a share of\n"},
		{"words of the law without the figure", check.Condition{Says: "it is poor in fat", Exact: text("3.5"), Relation: "<=", Threshold: "3", Unit: "g", Headroom: "-0.5", Holds: no},
			"NO    it is poor in fat: 3.5 g is not ≤ 3 g; outside by 0.5 g\n"},
		{"words without the figure, open", check.Condition{Says: "it is poor in fat", Low: "2", High: "4", Relation: "<=", Threshold: "3", Unit: "g"},
			"open  it is poor in fat: 2 to 4 g, asked for is ≤ 3 g\n"},
		{"the same on two bases", check.Condition{All: []check.Condition{perBasis("serving", "1"), perBasis("reference amount", "1"), perBasis("50 g", "2")}, Holds: yes},
			"yes   fat at most 3 g per serving and per reference amount: 1 g\nyes   fat at most 3 g per 50 g: 2 g\n"},
		{"an alternative keeps its parts together", check.Condition{Any: []check.Condition{{All: []check.Condition{leaf("a", yes), leaf("b", no)}, Holds: no}, leaf("c", yes)}, Holds: yes},
			"yes   one of these at least:\n      NO    all of these:\n            yes   a\n            NO    b\n      yes   c\n"},
		{"an alternative on two bases is one line", check.Condition{Any: []check.Condition{{All: []check.Condition{perBasis("serving", "1"), perBasis("50 g", "1")}, Holds: yes}, leaf("c", no)}, Holds: yes},
			"yes   one of these at least:\n      yes   fat at most 3 g per serving and per 50 g: 1 g\n      NO    c\n"},
		{"what asked for nothing is left out", check.Condition{All: []check.Condition{leaf("a", yes), {Holds: yes}, {Not: &check.Condition{Holds: yes}, Holds: no}}}, "yes   a\n"},
		{"one of two bases is not both", check.Condition{Any: []check.Condition{perBasis("serving", "1"), perBasis("reference amount", "1")}, Holds: yes},
			"yes   one of these at least:\n      yes   fat at most 3 g per serving: 1 g\n      yes   fat at most 3 g per reference amount: 1 g\n"},
	} {
		t.Run(c.name, func(t *testing.T) {
			p := &page{}
			p.decided(0, &c.c)
			if got := p.String(); got != c.want {
				t.Errorf("reads\n%s\nwant\n%s", got, strings.TrimSpace(c.want))
			}
		})
	}
}
