package render

import (
	"fmt"
	"io"
	"strings"

	"gramlaw/internal/food"
)

const notPublished = "not published"

// Foods lists foods with a few values per 100 g edible portion. more tells that there may be others.
func Foods(w io.Writer, list []food.Food, more bool) error {
	p := &page{}
	shown := []struct{ tag, head string }{{"ENERC_KCAL", "kcal"}, {"FAT", "fat g"}, {"FASAT", "saturated g"}, {"FATRN", "trans g"}}
	head := []cell{{text: "Reference"}, {text: "Food, per 100 g"}}
	ruled := []cell{{text: rule}, {text: rule}}
	for _, s := range shown {
		head = append(head, cell{text: s.head, right: true})
		ruled = append(ruled, cell{text: rule})
	}
	t := table{gap: 2}
	t.row(head...)
	t.row(ruled...)
	for _, f := range list {
		row := []cell{{text: f.Ref()}, {text: f.Name()}}
		for _, s := range shown {
			row = append(row, cell{text: published(f, s.tag), right: true})
		}
		t.row(row...)
	}
	p.table(0, t)
	if more {
		p.blank()
		p.line(0, "There may be more: name more words, or raise -n.")
	}
	_, err := io.WriteString(w, p.String())
	return err
}

func published(f food.Food, tag string) string {
	c, _ := food.Lookup(tag)
	v, ok := f.Value(c.ID)
	if !ok {
		return notPublished
	}
	return v.String()
}

// Food writes everything that was published about one food.
func Food(w io.Writer, f food.Food) error {
	p := &page{}
	p.heading(f.Ref()+"  "+f.Name(), '=')
	p.facts(f)
	p.heading(fmt.Sprintf("%d values per 100 g edible portion", f.Values()), '-')
	p.table(0, valuesOf(f))
	p.blank()
	p.line(0, "Samples: analyses behind a value; 0 where it was taken over, calculated or assumed. What is not listed was not published and is unknown, not zero.")
	p.weights(f.Weights())
	if notes := f.Footnotes(); len(notes) > 0 {
		p.heading("Footnotes of the table", '-')
		for _, n := range notes {
			s := n.Text
			if c, ok := food.ByID(n.About); ok {
				s = c.Tag + ": " + s
			}
			p.item(2, s)
		}
	}
	_, err := io.WriteString(w, p.String())
	return err
}

func (p *page) facts(f food.Food) {
	put := func(what string, n food.Number, ok bool, unit string) {
		if ok {
			p.line(0, what+": "+strings.TrimSpace(n.String()+" "+unit))
		}
	}
	p.line(0, "Group: "+f.Group().Name)
	if s := f.ScientificName(); s != "" {
		p.line(0, "Scientific name: "+s)
	}
	n, ok := f.Refuse()
	put("Refuse", n, ok && n.Mantissa > 0, "% of the food as bought")
	n, ok = f.NitrogenFactor()
	put("Nitrogen to protein", n, ok && n.Mantissa > 0, "")
	n, ok = f.ProteinEnergy()
	put("Energy of protein", n, ok, "kcal/g")
	n, ok = f.FatEnergy()
	put("Energy of fat", n, ok, "kcal/g")
	n, ok = f.CarbohydrateEnergy()
	put("Energy of carbohydrate by difference", n, ok, "kcal/g")
}

func valuesOf(f food.Food) table {
	t := table{gap: 2}
	var head, ruled []cell
	for i, s := range []string{"Component", "", "Value", "Unit", "Samples", "Std. error", "Minimum", "Maximum"} {
		head = append(head, cell{text: s, right: i == 2 || i > 3})
		ruled = append(ruled, cell{text: rule})
	}
	t.row(head...)
	t.row(ruled...)
	f.Each(func(id food.ID, v food.Value) bool {
		c, _ := food.ByID(id)
		t.row(cell{text: c.Tag}, cell{text: c.Name}, cell{text: v.String(), right: true}, cell{text: string(c.Unit)},
			cell{text: fmt.Sprint(v.Samples), right: true}, optional(v.StdErr, v.HasStdErr), optional(v.Min, v.HasMin), optional(v.Max, v.HasMax))
		return true
	})
	return t
}

func optional(n food.Number, ok bool) cell {
	if !ok {
		return cell{}
	}
	return cell{text: n.String(), right: true}
}

func (p *page) weights(list []food.Weight) {
	if len(list) == 0 {
		return
	}
	p.heading("Household measures", '-')
	t := table{gap: 2}
	for _, w := range list {
		s := w.Grams.String() + " g"
		if w.HasSamples && w.Samples > 0 {
			s += fmt.Sprintf(" (%d weighed", w.Samples)
			if w.HasStdDev {
				s += ", standard deviation " + w.StdDev.String() + " g"
			}
			s += ")"
		}
		t.row(cell{text: w.Amount.String(), right: true}, cell{text: w.Measure}, cell{text: s})
	}
	p.table(2, t)
}
