package recipe

import (
	"gramlaw/internal/food"
)

// component looks a tagname up and gives its unit.
func (d *decoder) component(at int32, tag string) (unit string, ok bool) {
	c, ok := food.Lookup(tag)
	if !ok && !d.nodes[at].faulty {
		d.unknown(at, UnknownTag, quote(tag)+" is no tagname of the component register", tag, tagnames)
	}
	return string(c.Unit), ok
}

// tagnames lists the register.
func tagnames() []string {
	all := food.Components()
	out := make([]string, len(all))
	for i, c := range all {
		out[i] = c.Tag
	}
	return out
}

// foodExists reports that the open table has the food.
func foodExists(ref string) bool {
	_, err := food.Find(ref)
	return err == nil
}

// retentionRow reports that the table of retention factors has the code.
func retentionRow(code string) bool {
	_, ok := food.RetentionCode(code)
	return ok
}
