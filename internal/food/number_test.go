package food

import "testing"

func TestNumber(t *testing.T) {
	cases := []struct {
		name, in, out string
		want          Number
	}{
		{"whole", "717", "717", Number{717, 0}},
		{"published zero keeps its decimals", "0.000", "0.000", Number{0, -3}},
		{"no leading zero", ".5", "0.5", Number{5, -1}},
		{"small", "0.012", "0.012", Number{12, -3}},
		{"large", "100000.0", "100000.0", Number{1000000, -1}},
		{"fifteen digits", "999999999999999", "999999999999999", Number{999999999999999, 0}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			n, err := ParseNumber(c.in)
			if err != nil || n != c.want || n.String() != c.out {
				t.Errorf("ParseNumber(%q) = %+v %v, printed %q; want %+v, %q", c.in, n, err, n, c.want, c.out)
			}
		})
	}
}

func TestNumberRefused(t *testing.T) {
	for _, s := range []string{"", ".", "1.", "-1", "+1", "1e3", " 1", "1,5", "1.2.3", "1234567890123456", "١"} {
		if n, err := ParseNumber(s); err == nil {
			t.Errorf("ParseNumber(%q) = %v, want an error", s, n)
		}
	}
}

func TestNumberString(t *testing.T) {
	for want, n := range map[string]Number{
		"1200": {12, 2}, "0": {0, 5}, "-0.05": {-5, -2}, "-9223372036854775808": {-1 << 63, 0},
	} {
		if n.String() != want {
			t.Errorf("%d x 10^%d prints %q, want %q", n.Mantissa, n.Exponent, n, want)
		}
	}
}
