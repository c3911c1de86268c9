package check

import (
	"slices"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// servings is how many servings the package holds, by the declaration's bands.
func (v view) servings(d *rulebook.Declaration) *Servings {
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
	out := &Servings{Exact: exactText(exact), Texts: map[string]string{}}
	for _, lang := range v.law.Market.Languages {
		number := strings.ReplaceAll(n.String(), ".", d.Number[lang].Decimal)
		if exact.CmpDecimal(n) != 0 {
			number = strings.ReplaceAll(s.About.In(lang), "{n}", number)
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

func count(bands []rulebook.CountBand, exact quantity.Ratio) decimal.Decimal {
	for _, b := range bands {
		if b.Below != nil && exact.CmpDecimal(*b.Below) >= 0 || b.AtMost != nil && exact.CmpDecimal(*b.AtMost) > 0 {
			continue
		}
		return exact.Round(b.Nearest, quantity.TiesUp)
	}
	return decimal.Zero // lint sees to a last band without an edge
}

// simplified is the shorter format, where enough quantities are insignificant.
func (v view) simplified(f *rulebook.Simplified) *Simplified {
	if f == nil || f.Where != nil && v.truth(f.Where) != quantity.Yes {
		return nil
	}
	truths := make([]quantity.Truth, len(f.Of))
	out := &Simplified{Name: f.Name.In(v.language()), LeaveOut: []string{}}
	var left []*rulebook.Line
	for i, one := range f.Of {
		truths[i] = v.truth(one.If)
		if truths[i] == quantity.Yes && !slices.Contains(f.Keeps, one.Quantity) && !v.lines[one.Quantity].needed {
			left = append(left, v.lines[one.Quantity].line)
		}
	}
	if quantity.AtLeast(f.Needed, truths...) != quantity.Yes || len(left) == 0 {
		return nil
	}
	out.LeaveOut = termsOf(left, v.language())
	texts := map[string]string{}
	for _, lang := range v.law.Market.Languages {
		if says, ok := f.Says[lang]; ok {
			texts[lang] = strings.ReplaceAll(says, "{names}", joined(termsOf(left, lang), lang))
		}
	}
	out.Says = texts[v.language()]
	if len(texts) > 1 {
		out.Texts = texts
	}
	return out
}

// termsOf are the first terms of lines in a language.
func termsOf(lines []*rulebook.Line, lang string) []string {
	out := make([]string, len(lines))
	for i, l := range lines {
		out[i] = l.Terms[lang][0]
	}
	return out
}
