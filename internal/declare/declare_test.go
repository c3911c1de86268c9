package declare_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"github.com/go-json-experiment/json"
	"github.com/shopspring/decimal"

	"gramlaw/internal/declare"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func bands(t *testing.T, s string) rulebook.Bands {
	t.Helper()
	var b rulebook.Bands
	if err := json.Unmarshal([]byte(s), &b); err != nil {
		t.Fatal(err)
	}
	return b
}

func never(*rulebook.Condition) quantity.Truth  { return quantity.No }
func always(*rulebook.Condition) quantity.Truth { return quantity.Yes }
func open(*rulebook.Condition) quantity.Truth   { return quantity.Open }

var plain = rulebook.Number{Decimal: ".", Unit: "{n} {u}", LessThan: "less than {n} {u}"}
var comma = rulebook.Number{Decimal: ",", TrailingZeros: true, Unit: "{n} {u}", LessThan: "<{n} {u}"}

const (
	halfSteps = `[{"below":"0.5 g","declare":"0 g"},{"below":"5 g","nearest":"0.5 g"},{"nearest":"1 g"}]`
	tenths    = `[{"at most":"0.5 g","declare":"0 g","or":[{"less than":"0.5 g"}]},{"below":"10 g","nearest":"0.1 g"},{"nearest":"1 g"}]`
	ifFree    = `[{"below":"0.5 g","declare":"0 g","if":{"meets":"x/claim/free"}},{"below":"0.5 g","nearest":"0.1 g"},{"nearest":"0.5 g"}]`
	small     = `[{"below":"2 mg","declare":"0 mg"},{"at most":"5 mg","less than":"5 mg"},{"nearest":"5 mg"}]`
	figures   = `[{"figures":3}]`
)

func TestRoundAndText(t *testing.T) {
	for _, c := range []struct {
		bands, exact, unit string
		number             rulebook.Number
		holds              declare.Holds
		want               string
	}{
		{halfSteps, "0.4999", "g", plain, never, "0 g"}, {halfSteps, "0.5", "g", plain, never, "0.5 g"}, {halfSteps, "4.75", "g", plain, never, "5 g"},
		{halfSteps, "5.49", "g", plain, never, "5 g"}, {halfSteps, "5.5", "g", plain, never, "6 g"}, {halfSteps, "-0.1", "g", plain, never, "0 g"},
		{tenths, "0.5", "g", comma, never, "0 g"}, {tenths, "0.51", "g", comma, never, "0,5 g"}, {tenths, "9.94", "g", comma, never, "9,9 g"},
		{tenths, "9.96", "g", comma, never, "10 g"}, {tenths, "3", "g", comma, never, "3,0 g"}, {tenths, "10.4", "g", comma, never, "10 g"},
		{ifFree, "0.44", "g", plain, always, "0 g"}, {ifFree, "0.44", "g", plain, never, "0.4 g"}, {ifFree, "0.5", "g", plain, always, "0.5 g"},
		{small, "0.0019", "mg", plain, never, "0 mg"}, {small, "0.002", "mg", plain, never, "less than 5 mg"}, {small, "0.005", "mg", comma, never, "<5 mg"}, {small, "0.0051", "mg", plain, never, "5 mg"},
		{figures, "0.123456", "mg", plain, never, "123 mg"}, {figures, "0.00012345", "mg", comma, never, "0,123 mg"}, {figures, "0.0009996", "mg", comma, never, "1,00 mg"},
	} {
		t.Run(fmt.Sprint(c.exact, c.unit, c.want), func(t *testing.T) {
			d, err := decimal.NewFromString(c.exact)
			if err != nil {
				t.Fatal(err)
			}
			u, _ := quantity.ParseUnit(c.unit)
			o := declare.Round(bands(t, c.bands), quantity.TiesUp, quantity.FromDecimal(d), u, c.holds)
			if len(o) != 1 {
				t.Fatalf("%d outcomes", len(o))
			}
			if got := declare.Text(o[0].Printed, c.unit, c.number); got != c.want {
				t.Errorf("prints %q, want %q", got, c.want)
			}
		})
	}
}

func TestAnOpenConditionLeavesTwoOutcomes(t *testing.T) {
	o := declare.Round(bands(t, ifFree), quantity.TiesUp, quantity.Scaled(44, -2), quantity.Gram, open)
	if len(o) != 2 || !o[0].Printed.Zero() || o[1].Printed.Value.String() != "0.4" {
		t.Errorf("outcomes %+v", o)
	}
}

func TestAlternativesAreOffered(t *testing.T) {
	o := declare.Round(bands(t, tenths), quantity.TiesUp, quantity.Scaled(3, -1), quantity.Gram, never)
	if len(o[0].Alternatives) != 1 || !o[0].Alternatives[0].LessThan {
		t.Errorf("alternatives %+v", o[0].Alternatives)
	}
}

// A US "0 g" of trans on a serving of 14 g may hide almost 0.5 g.
func TestInvertZero(t *testing.T) {
	r := &rulebook.Rounding{Bands: bands(t, halfSteps)}
	low, high, ok := declare.Invert(r, declare.Printed{}, quantity.Gram)
	if !ok || !low.IsZero() || high.String() != "0.499999999999999" {
		t.Errorf("0 g stands for %s to %s, %v", low, high, ok)
	}
	if _, _, ok := declare.Invert(r, declare.Printed{Value: decimal.New(3, -1)}, quantity.Gram); ok {
		t.Error("0.3 g, which the bands never print, has a source")
	}
	low, high, _ = declare.Invert(r, declare.Printed{Value: decimal.New(5, 0)}, quantity.Gram)
	if low.String() != "4.75" || high.String() != "5.499999999999999" {
		t.Errorf("5 g stands for %s to %s", low, high)
	}
}

// Whatever prints, in any market, the interval behind the print contains what it came from.
func TestInvertContainsWhatWasRounded(t *testing.T) {
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	r := rand.New(rand.NewPCG(1, 1))
	n := 0
	for _, j := range book.Jurisdictions() {
		m, _ := book.Rules(j)
		for _, rule := range m.Roundings {
			for _, v := range rule.Versions {
				body := v.Body
				if len(body.Bands) == 0 {
					continue
				}
				n++
				for range 200 {
					inverts(t, rule.ID, &body, decimal.New(r.Int64N(1_000_000), -int32(r.IntN(9))))
				}
			}
		}
	}
	if n == 0 {
		t.Error("no rounding was tried")
	}
}

func inverts(t *testing.T, id string, r *rulebook.Rounding, exact decimal.Decimal) {
	t.Helper()
	unit := quantity.Gram
	for _, b := range r.Bands {
		for _, a := range []*quantity.Amount{b.Nearest, b.Declare} {
			if a != nil {
				unit = a.Unit
			}
		}
	}
	for _, holds := range []declare.Holds{never, always} {
		for _, o := range declare.Round(r.Bands, r.Ties, quantity.FromDecimal(exact), unit, holds) {
			for _, p := range append([]declare.Printed{o.Printed}, o.Alternatives...) {
				low, high, ok := declare.Invert(r, p, unit)
				if !ok || exact.LessThan(low) || exact.GreaterThan(high) {
					t.Errorf("%s: %s prints %+v, which stands for %s to %s, %v", id, exact, p, low, high, ok)
				}
			}
		}
	}
}
