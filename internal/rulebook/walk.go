package rulebook

// A Visit takes the version of a rule that holds: the kind is the name of its file, the head what the version says of itself, the body a
// pointer to what it says.
type Visit func(kind, id string, h *Head, body any)

// Each visits every rule that holds, kind by kind, in the order of the files.
func (l *Law) Each(visit Visit) {
	visitEach("definitions", l.Definitions, visit)
	visitEach("energy", l.Energy, visit)
	visitEach("reference_values", l.References, visit)
	visitEach("rounding", l.Roundings, visit)
	visitEach("declaration", l.Declarations, visit)
	visitEach("reference_amounts", l.ReferenceAmounts, visit)
	visitEach("claims", l.Claims, visit)
	visitEach("health_claims", l.HealthClaims, visit)
	visitEach("disclosure", l.Disclosures, visit)
	visitEach("limits", l.Limits, visit)
	visitEach("serving", l.Serving, visit)
	visitEach("naming", l.Naming, visit)
	visitEach("conditions", l.Conditions, visit)
	visitEach("wording", l.Wordings, visit)
}

func visitEach[T any](kind string, l List[T], visit Visit) {
	for _, a := range l.All {
		visit(kind, a.ID, a.Head, a.Body)
	}
}
