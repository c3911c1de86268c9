package wording_test

import (
	"fmt"
	"os"
	"strings"
	"testing"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
	"gramlaw/rules"
)

func TestSmoke(t *testing.T) {
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	e, err := wording.Of(b)
	if err != nil {
		t.Fatal(err)
	}
	doc, _ := os.ReadFile("/tmp/phrases.txt")
	for _, p := range strings.Split(strings.TrimSpace(string(doc)), "\n") {
		fmt.Println("##", p)
		for _, j := range b.Jurisdictions() {
			law, _ := b.At(j, "2026-12-01", "required", func(*rulebook.Condition) quantity.Truth { return quantity.Open })
			rs, err := e.Judge(law, p, "en")
			if err != nil {
				t.Fatal(err)
			}
			for _, r := range rs {
				n := ""
				for _, x := range r.Nearest {
					n += x.Name() + " "
				}
				fmt.Printf("  %s %q %s [%s] rel=%s c=%s%s%s a=%s%s p=%s per=%s cmp=%q neg=%v near=%s\n", j, r.Text, r.Claim.ID, r.Matched, r.Relation, r.Component, r.Thing, r.Function, r.Amount, r.Unit, r.Percent, r.Basis, r.Compared, r.Negated, n)
			}
		}
	}
}
