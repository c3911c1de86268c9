package render

import "slices"

// A bundle is names that share something.
type bundle struct{ key, names []string }

// bundles groups names by what they share, in the order of appearance.
type bundles []bundle

func (b *bundles) add(name string, key ...string) {
	for i := range *b {
		if slices.Equal((*b)[i].key, key) {
			(*b)[i].names = append((*b)[i].names, name)
			return
		}
	}
	*b = append(*b, bundle{key, []string{name}})
}

// addOnce is add for names that may repeat, such as energy in two units.
func (b *bundles) addOnce(name string, key ...string) {
	for _, x := range *b {
		if slices.Equal(x.key, key) && slices.Contains(x.names, name) {
			return
		}
	}
	b.add(name, key...)
}
