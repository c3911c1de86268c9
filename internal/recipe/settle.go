package recipe

import "gramlaw/internal/lipid"

// settle applies what the document says of open groups.
func (d *decoder) settle(p *Profile, at int32) {
	open := make(map[lipid.Species]int, len(p.Acids))
	for i, a := range p.Acids {
		open[a.Species] = i
	}
	d.elements(at, func(m int32) {
		var s Settlement
		known := d.object(m, func(name string, v int32) bool {
			switch name {
			case "group":
				s.Group = d.text(v)
			case "as":
				s.As = d.text(v)
			case "reason":
				s.Reason = d.text(v)
			default:
				return false
			}
			return true
		}, "group", "as", "reason")
		p.Settled = append(p.Settled, s)
		if known && s.Group != "" && s.As != "" {
			d.apply(p, s, open, d.member(m, "group"), d.member(m, "as"))
		}
	})
}

func (d *decoder) apply(p *Profile, s Settlement, open map[lipid.Species]int, atGroup, atAs int32) {
	group, readable := d.species(atGroup, s.Group)
	as, also := d.species(atAs, s.As)
	if !readable || !also {
		return
	}
	i, there := open[group]
	switch {
	case !there:
		d.fault(atGroup, BadSettlement, quote(s.Group)+" is not in the profile")
	case p.Acids[i].Settled != "":
		d.fault(atGroup, BadSettlement, quote(s.Group)+" is settled already")
	case as == group || group.Contains(as) != lipid.Yes:
		d.fault(atAs, BadSettlement, quote(s.As)+" is no part of "+quote(s.Group))
	default:
		p.Acids[i].Species, p.Acids[i].Settled = as, s.Reason
	}
}
