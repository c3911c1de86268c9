package recipe

import (
	"gramlaw/internal/quantity"
)

func (d *decoder) claims(at int32) []Claim {
	out := make([]Claim, 0, d.nodes[at].count)
	d.elements(at, func(m int32) { out = append(out, d.claim(m)) })
	return out
}

// claimMarkets is the member that lists the markets a claim is asked in.
const claimMarkets = "in"

func (d *decoder) claim(at int32) Claim {
	c := Claim{Pointer: d.pointer(at)}
	known := d.object(at, func(name string, m int32) bool {
		switch name {
		case "text":
			c.Text = d.text(m)
		case "language":
			c.Language, _ = scalar(d, m, parseLanguage)
		case "claim":
			c.Claim, _ = scalar(d, m, parseClaimName)
		case claimMarkets:
			c.In = d.markets(m)
		case "stated":
			if a, ok := scalar(d, m, quantity.ParseAmount); ok {
				c.Stated = &a
			}
		case "against":
			c.Against = d.text(m)
		default:
			return false
		}
		return true
	})
	if known && d.member(at, "text") == 0 && d.member(at, "claim") == 0 {
		d.fault(at, EmptyClaim, "give text, the words on the pack, or claim, the shared name, such as fat-low")
	}
	return c
}

// checkAgainst looks up the reference foods that claims name.
func (d *decoder) checkAgainst(at int32) {
	list := d.path(at, "claims")
	if list == 0 || d.nodes[list].kind != '[' {
		return
	}
	known := func() []string {
		if foods := d.path(at, "reference_foods"); foods != 0 && d.nodes[foods].kind == '{' {
			return d.names(foods)
		}
		return nil
	}
	for c := d.nodes[list].first; c != 0; c = d.nodes[c].next {
		m := d.path(c, "against")
		if m == 0 || d.nodes[m].kind != '"' || d.nodes[m].faulty || d.nodes[m].text == "" {
			continue
		}
		if name := d.nodes[m].text; d.path(at, "reference_foods", name) == 0 {
			d.unknown(m, UnknownAgainst, "reference_foods has no "+quote(name), name, known)
		}
	}
}

func (d *decoder) references(at int32) map[string]ReferenceFood {
	out := make(map[string]ReferenceFood, d.nodes[at].count)
	d.entries(at, func(name string, m int32) {
		f := ReferenceFood{Pointer: d.pointer(m)}
		if d.object(m, func(name string, v int32) bool { return d.reference(&f, name, v) }, "kind") {
			d.oneSource(m)
			d.sourceVolumes(m, f.Source, false)
		}
		out[name] = f
	})
	return out
}

func (d *decoder) reference(f *ReferenceFood, name string, m int32) bool {
	switch name {
	case "kind":
		f.Kind = d.oneOf(m, ReferenceKinds)
	case "name":
		f.Name = d.text(m)
	case "with":
		f.With = d.components(m)
	default:
		// Its recipe is on the first level, like the product's own.
		return d.source(&f.Source, name, m, 0)
	}
	return true
}
