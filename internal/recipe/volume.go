package recipe

import "gramlaw/internal/quantity"

// needsDensity complains about a volume whose mass nobody can tell.
func (d *decoder) needsDensity(at int32, a quantity.Amount, dense bool) {
	if at != 0 && !dense && a.Unit.Dimension() == quantity.Volume {
		d.fault(at, NeedsDensity, "the amount is a volume and no density is given; add one, such as 0.92 g/mL, or state a mass")
	}
}

// sourceVolumes does so for the amounts that a composition or a label is per.
func (d *decoder) sourceVolumes(at int32, s Source, dense bool) {
	if s.Composition != nil {
		d.needsDensity(d.path(at, "composition", "per"), s.Composition.Per, dense)
	}
	if s.Label != nil {
		d.needsDensity(d.path(at, "label", "serving"), s.Label.Serving, dense)
	}
}

// checkVolumes does so for the amounts of the product itself.
func (d *decoder) checkVolumes(r *Recipe, at int32) {
	if r.Package != nil && r.Package.Net != nil {
		d.needsDensity(d.path(at, "package", "net"), *r.Package.Net, len(r.Density) > 0)
	}
	for name, s := range r.Serving {
		d.needsDensity(d.path(at, "serving", name, "amount"), s.Amount, r.denseIn(name))
	}
	for name, a := range r.ReferenceAmount {
		d.needsDensity(d.path(at, "reference_amount", name), a.Amount, a.Grams != nil || r.denseIn(name))
	}
}

// denseIn reports that the density is known where a value of this key counts. One for "default" counts in every market
// without its own, so that densities for all of the document's markets do as well.
func (r *Recipe) denseIn(key string) bool {
	if _, ok := r.Density.For(key); ok {
		return true
	}
	for _, market := range r.Jurisdictions {
		if _, ok := r.Density[market]; !ok {
			return false
		}
	}
	return key == "default" && len(r.Jurisdictions) > 0
}
