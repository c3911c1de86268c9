package render

import (
	"slices"
	"strings"
)

// A bundle is names that share something.
type bundle struct{ key, names []string }

// bundles groups names by what they share, in the order of appearance.
type bundles struct {
	list []bundle
	at   map[string]int
}

func (b *bundles) add(name string, key ...string) {
	joined := strings.Join(key, "\x00")
	i, ok := b.at[joined]
	if !ok {
		if b.at == nil {
			b.at = map[string]int{}
		}
		i = len(b.list)
		b.at[joined] = i
		b.list = append(b.list, bundle{key: key})
	}
	b.list[i].names = append(b.list[i].names, name)
}

// unique leaves out names that repeat, such as energy in two units.
func unique(names []string) []string {
	var out []string
	for _, n := range names {
		if !slices.Contains(out, n) {
			out = append(out, n)
		}
	}
	return out
}
