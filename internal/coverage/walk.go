package coverage

import "gramlaw/internal/rulebook"

// A Visit takes one version of a rule: the kind is the name of its file, the head what the version says of itself.
type Visit func(kind, id string, h *rulebook.Head)

// Walk visits every version of a market's rules, kind by kind, in the order of the files.
func Walk(m *rulebook.Rules, visit Visit) {
	each("definitions", m.Definitions, visit)
	each("energy", m.Energy, visit)
	each("reference_values", m.References, visit)
	each("rounding", m.Roundings, visit)
	each("declaration", m.Declarations, visit)
	each("reference_amounts", m.ReferenceAmounts, visit)
	each("claims", m.Claims, visit)
	each("health_claims", m.HealthClaims, visit)
	each("disclosure", m.Disclosures, visit)
	each("limits", m.Limits, visit)
	each("serving", m.Serving, visit)
	each("naming", m.Naming, visit)
	each("conditions", m.Conditions, visit)
	each("wording", m.Wordings, visit)
}

// Practice visits what practice presumes, in all markets.
func Practice(b *rulebook.Book, visit Visit) {
	each("presumptions", b.Presumptions, visit)
	each("origins", b.Origins, visit)
}

func each[T any](kind string, rules []rulebook.Rule[T], visit Visit) {
	for i := range rules {
		for j := range rules[i].Versions {
			visit(kind, rules[i].ID, &rules[i].Versions[j].Head)
		}
	}
}
