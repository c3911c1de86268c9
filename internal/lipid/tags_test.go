package lipid

import (
	"strings"
	"testing"
)

// Every tagname and every name of the public tables must be read, and tag and name of one row must overlap.
func TestPublicTagsAndNames(t *testing.T) {
	for _, file := range []string{"infoods_tags.csv", "usda_fatty_acids.csv"} {
		for _, row := range table(t, file) {
			name, _ := strings.CutPrefix(row["name"], "fatty acid ")
			s := must(t, name)
			if row["tag"] != "" && !must(t, row["tag"]).Overlaps(s) {
				t.Errorf("%s is %v, its name %q is %v", row["tag"], must(t, row["tag"]), row["name"], s)
			}
		}
	}
}
