package check

import (
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// servings is how many servings the package holds, by the declaration's bands.
func (v *view) servings(d *rulebook.Declaration) *Servings {
	s := d.Servings
	if s == nil {
		return nil
	}
	net, ok1 := v.Size("package")
	serving, ok2 := v.subject.Basis(rulebook.Per{Name: "serving"})
	if !ok1 || !ok2 || serving.IsZero() {
		return nil
	}
	exact := net.Quo(serving)
	n := count(s.Bands, exact)
	out, varied := &Servings{Exact: exactText(exact), Texts: map[string]string{}}, v.surely(s.VariedIf)
	for _, lang := range v.law.Market.Languages {
		number := strings.ReplaceAll(n.String(), ".", d.Number[lang].Decimal)
		if exact.CmpDecimal(n) != 0 {
			number = strings.ReplaceAll(s.About.In(lang), "{n}", number)
		}
		if varied {
			number = s.Varied.In(lang)
		}
		words := s.Text
		if s.One != nil && n.Equal(decimal.NewFromInt(1)) {
			words = s.One
		}
		out.Texts[lang] = strings.ReplaceAll(words.In(lang), "{n}", number)
	}
	out.Text = out.Texts[v.language()]
	return out
}

// servingSize is the line that tells the serving; nil where none is known.
func (v *view) servingSize(d *rulebook.Declaration) *ServingSize {
	s := d.Serving
	serving, grams, ok := v.serving()
	if s == nil || !ok {
		return nil
	}
	metric, unit := serving.Amount.Ratio(), serving.Amount.Unit.Base()
	if grams != nil {
		metric, unit = grams.Ratio(), quantity.Gram
	}
	words := s.Text
	if v.surely(s.SingleIf) {
		words = s.Single
	} else if serving.Measure == "" && s.Plain != nil {
		words = s.Plain
	}
	out := &ServingSize{Texts: map[string]string{}}
	for _, lang := range v.law.Market.Languages {
		amount := v.inLanguage(count(s.Bands, metric).String(), lang) + " " + unit.String()
		out.Texts[lang] = strings.NewReplacer("{measure}", serving.Measure, "{amount}", amount).Replace(words.In(lang))
	}
	out.Text = out.Texts[v.language()]
	return out
}

func count(bands []rulebook.CountBand, exact quantity.Ratio) decimal.Decimal {
	for _, b := range bands {
		if b.Below != nil && exact.CmpDecimal(*b.Below) >= 0 || b.AtMost != nil && exact.CmpDecimal(*b.AtMost) > 0 {
			continue
		}
		return exact.Round(b.Nearest, quantity.TiesUp)
	}
	return decimal.Zero // lint sees to a last band without an edge
}
