package quantity

import (
	"testing"

	"github.com/shopspring/decimal"
)

func dec(t *testing.T, s string) decimal.Decimal {
	t.Helper()
	d, err := decimal.NewFromString(s)
	if err != nil {
		t.Fatal(err)
	}
	return d
}

func TestRoundDecidesOnTheExactValue(t *testing.T) {
	third := FromInt(1).Quo(FromInt(3))
	for _, c := range []struct {
		name string
		r    Ratio
		step string
		ties Ties
		want string
	}{
		{"tie goes up", FromDecimal(dec(t, "2.5")), "1", TiesUp, "3"},
		{"tie goes to even", FromDecimal(dec(t, "2.5")), "1", TiesEven, "2"},
		{"tie at odd goes to even", FromDecimal(dec(t, "3.5")), "1", TiesEven, "4"},
		{"just below a tie", FromDecimal(dec(t, "2.49999999999999")), "1", TiesUp, "2"},
		{"half steps", FromDecimal(dec(t, "4.75")), "0.5", TiesUp, "5"},
		{"half steps below", FromDecimal(dec(t, "4.74")), "0.5", TiesUp, "4.5"},
		{"a third", third, "0.1", TiesUp, "0.3"},
		{"two thirds", third.Add(third), "0.1", TiesUp, "0.7"},
		{"tens", FromInt(145), "10", TiesUp, "150"},
		{"twentieths", FromDecimal(dec(t, "0.025")), "0.05", TiesUp, "0.05"},
		{"zero", Ratio{}, "5", TiesUp, "0"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := c.r.Round(dec(t, c.step), c.ties); got.String() != c.want {
				t.Errorf("got %s, want %s", got, c.want)
			}
		})
	}
}

func TestRoundFigures(t *testing.T) {
	for _, c := range []struct {
		in      string
		figures int
		want    string
	}{
		{"123.456", 3, "123"}, {"0.0123456", 2, "0.012"}, {"999.6", 3, "1000"}, {"99.95", 3, "100"}, {"0", 3, "0"}, {"8765", 2, "8800"}, {"1", 2, "1"},
	} {
		if got := FromDecimal(dec(t, c.in)).RoundFigures(c.figures, TiesUp); got.String() != c.want {
			t.Errorf("%s to %d figures is %s, want %s", c.in, c.figures, got, c.want)
		}
	}
}

func TestExactShowsTwentyDigits(t *testing.T) {
	x := FromInt(2).Quo(FromInt(3)).Exact()
	if x.Text != "0.66666666666666666666" || !x.Truncated || x.Num != "2" || x.Den != "3" {
		t.Errorf("two thirds show as %+v", x)
	}
	whole := FromDecimal(dec(t, "0.033")).Exact()
	if whole.Text != "0.033" || whole.Truncated {
		t.Errorf("0.033 shows as %+v", whole)
	}
	if s := FromInt(1).Quo(FromInt(8)).Exact(); s.Text != "0.125" || s.Truncated {
		t.Errorf("an eighth shows as %+v", s)
	}
}

func TestFloorAndCeilMoveOutward(t *testing.T) {
	third := FromInt(1).Quo(FromInt(3))
	if lo, hi := third.Floor(3), third.Ceil(3); lo.String() != "0.333" || hi.String() != "0.334" {
		t.Errorf("a third lies between %s and %s", lo, hi)
	}
	if lo, hi := FromInt(2).Floor(3), FromInt(2).Ceil(3); !lo.Equal(hi) {
		t.Errorf("two lies between %s and %s", lo, hi)
	}
}

func TestLinearCancelsWhatIsTheSame(t *testing.T) {
	v := &Variable{Index: 1, Low: Ratio{}, High: FromInt(4)}
	w := &Variable{Index: 2, Low: FromInt(1), High: FromInt(2), Central: FromInt(1), Typical: true}
	l := Exactly(FromInt(10)).Add(Of(v)).Sub(Of(v)).Add(Of(w))
	if l.Low().Cmp(FromInt(11)) != 0 || l.High().Cmp(FromInt(12)) != 0 {
		t.Errorf("lies between %s and %s", l.Low().Brief(2), l.High().Brief(2))
	}
	if c, ok := l.Central(); !ok || c.Cmp(FromInt(11)) != 0 {
		t.Errorf("central is %s, %v", c.Brief(2), ok)
	}
	if _, ok := l.Add(Of(v)).Central(); ok {
		t.Error("a form with an untypical variable has a central value")
	}
	if vars := l.Add(Of(v)).Variables(); len(vars) != 2 || vars[0] != v {
		t.Errorf("depends on %v", vars)
	}
}

func TestTruth(t *testing.T) {
	for _, c := range []struct {
		name      string
		got, want Truth
	}{
		{"all with a no", All(Yes, Open, No), No}, {"all with an open", All(Yes, Open), Open}, {"all of nothing", All(), Yes},
		{"any with a yes", Any(No, Open, Yes), Yes}, {"any with an open", Any(No, Open), Open}, {"any of nothing", Any(), No},
		{"two of three", AtLeast(2, Yes, No, Yes), Yes}, {"two of three open", AtLeast(2, Yes, No, Open), Open}, {"two of three lost", AtLeast(2, Yes, No, No), No},
		{"not open", Open.Not(), Open}, {"not yes", Yes.Not(), No},
	} {
		if c.got != c.want {
			t.Errorf("%s is %s, want %s", c.name, c.got, c.want)
		}
	}
}

func TestSumUnitesTheSameVariable(t *testing.T) {
	v := &Variable{Index: 1, High: FromInt(4)}
	w := &Variable{Index: 2, High: FromInt(1)}
	forms := []Linear{Of(w), Of(v), Exactly(FromInt(3)), Of(w).Mul(FromInt(-1)), Of(v)}
	s := Sum(len(forms), func(i int) Linear { return forms[i] })
	if s.High().Cmp(FromInt(11)) != 0 || len(s.Variables()) != 1 {
		t.Errorf("sums to at most %s over %d variables", s.High().Brief(1), len(s.Variables()))
	}
}
