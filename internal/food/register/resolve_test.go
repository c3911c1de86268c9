package main

import (
	"strings"
	"testing"
)

func TestResolveDrawsConsequences(t *testing.T) {
	r, err := resolve([]row{
		{tag: "A1", within: []string{"A"}, aliases: []string{"A-one"}},
		{tag: "A", family: "f"}, {tag: "B", family: "f"}, {tag: "B1", within: []string{"B"}},
	})
	if err != nil {
		t.Fatal(err)
	}
	if !r.wholes[0][1] || !r.apart[0][3] || !r.apart[3][0] || r.apart[0][1] || r.index["A-one"] != 0 {
		t.Errorf("wholes %v, apart %v", r.wholes, r.apart)
	}
	if r.order[0] == 0 || r.order[3] != 3 {
		t.Errorf("order %v", r.order)
	}
}

func TestResolveRefuses(t *testing.T) {
	cases := []struct {
		name, says string
		rows       []row
	}{
		{"doubled tagname", "stands twice", []row{{tag: "A"}, {tag: "B", aliases: []string{"A"}}}},
		{"unknown whole", "unknown B", []row{{tag: "A", within: []string{"B"}}}},
		{"unknown sibling", "unknown B", []row{{tag: "A", disjoint: []string{"B"}}}},
		{"circle", "part of itself", []row{{tag: "A", within: []string{"B"}}, {tag: "B", within: []string{"A"}}}},
		{"part of what it excludes", "", []row{{tag: "A", within: []string{"B"}, disjoint: []string{"B"}}, {tag: "B"}}},
		{"part of two that exclude each other", "disjoint from itself", []row{
			{tag: "A", within: []string{"B", "C"}}, {tag: "B", disjoint: []string{"C"}}, {tag: "C"}}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			if _, err := resolve(c.rows); err == nil || !strings.Contains(err.Error(), c.says) {
				t.Errorf("error %v, want %q", err, c.says)
			}
		})
	}
}
