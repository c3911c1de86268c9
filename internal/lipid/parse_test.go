package lipid

import (
	"encoding/csv"
	"errors"
	"os"
	"strings"
	"testing"
)

// table reads a CSV of testdata as one map per row; its columns source and status say where each row comes from.
func table(t testing.TB, name string) []map[string]string {
	t.Helper()
	f, err := os.Open("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []map[string]string
	for _, row := range rows[1:] {
		m := map[string]string{}
		for i, v := range row {
			m[rows[0][i]] = v
		}
		out = append(out, m)
	}
	return out
}

func must(t testing.TB, notation string) Species {
	t.Helper()
	s, err := Parse(notation)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func TestNomenclatureVectors(t *testing.T) {
	asked := map[string]string{ // the rows marked "reject or ask": what is asked for, or that it is refused
		"18:1": "FA 18:1", "C18:2": "FA 18:2", "FA 18:2": "FA 18:2", "18:2(9,12)": "FA 18:2(9,12)",
		"linolenic acid": "18:3 cis methylene-interrupted n-3/n-6", "DPA": "22:5 cis methylene-interrupted n-3/n-6",
		"CLA": "18:2 conjugated", "omega-3": "omega-3", "18:3 n-5": "18:3 n-5",
		"18:4 n-2": "", "20:4(4Z,8Z,11Z,4Z)": "",
	}
	for _, row := range table(t, "nomenclature_tests.csv") {
		t.Run(row["input"], func(t *testing.T) {
			want := row["canonical_lipid_maps"]
			if row["expected"] != "accept" {
				want = asked[row["input"]]
			}
			s, err := Parse(row["input"])
			if want == "" {
				var fault *NotationError
				if !errors.As(err, &fault) || fault.Kind != Impossible {
					t.Fatalf("got %v, %v; want an impossible notation", s, err)
				}
				return
			}
			if err != nil || s.String() != want {
				t.Fatalf("got %v, %v; want %s", s, err, want)
			}
			if s.IsGroup() == (row["expected"] == "accept") {
				t.Errorf("IsGroup = %v", s.IsGroup())
			}
			if name, _, _ := strings.Cut(row["trivial_name"], " ("); s.Trivial() != name {
				t.Errorf("trivial name %q, want %q", s.Trivial(), name)
			}
		})
	}
}

// Notations suppliers write; forms of the trade, common practice, no source.
func TestSupplierNotations(t *testing.T) {
	for notation, want := range map[string]string{
		"C4:0": "FA 4:0", " c 18 : 0 ": "FA 18:0", "C18:1 trans": "18:1 trans", "C18:1 cis": "18:1 cis", "18:1 9c": "FA 18:1(9Z)",
		"C18:1n9c": "FA 18:1(9Z)", "C18:1n-9 cis": "FA 18:1(9Z)", "C18:2n6c": "FA 18:2(9Z,12Z)", "C18:3n3": "FA 18:3(9Z,12Z,15Z)",
		"C20:5n3": "FA 20:5(5Z,8Z,11Z,14Z,17Z)", "C18:1n9t": "FA 18:1(9E)", "18:1 total trans": "18:1 trans",
		"C18:1 cis isomers": "18:1 cis", "18:1 t": "18:1 trans", "18:1 TR": "18:1 trans", "trans 18:1": "18:1 trans",
		"t-18:1": "18:1 trans", "18:1 E": "18:1 trans", "FA tr18:1 (n-9)": "FA 18:1(9E)", "18:1 n-9": "FA 18:1(9)", "18:1(n-7)": "FA 18:1(11)",
		"18:1-11 t": "FA 18:1(11E)", "18:1 t9": "FA 18:1(9E)", "9c11t-18:2": "FA 18:2(9Z,11E)", "c9t11 18:2": "FA 18:2(9Z,11E)",
		"CLA c9,t11": "FA 18:2(9Z,11E)", "18:2 CLAs": "18:2 conjugated", "18:2 t,t": "18:2 trans,trans", "18:2 tt": "18:2 trans,trans",
		"18:2 c,t": "18:2 cis,trans", "18:2 i": "18:2 isomers", "18:3i": "18:3 isomers", "18:2 n-6 c,c": "FA 18:2(9Z,12Z)",
		"18:3 n-3 c,c,c (ALA)": "FA 18:3(9Z,12Z,15Z)", "22:6 n-3 (DHA)": "FA 22:6(4Z,7Z,10Z,13Z,16Z,19Z)",
		"18:1 undifferentiated": "FA 18:1", "18:2 t not": "", "delta9,12-18:2": "FA 18:2(9,12)", "18:1Δ9c": "FA 18:1(9Z)",
		"18:3 ω−3": "FA 18:3(9Z,12Z,15Z)", "C₁₈:₁ ⁹c": "FA 18:1(9Z)", "18:2 cis-Δ⁹,¹²": "FA 18:2(9Z,12Z)", "18∶0": "FA 18:0",
		"16:0 iso": "FA 15:0;14Me", "i-15:0": "FA 14:0;13Me", "ai-15:0": "FA 14:0;12Me", "a-17:0": "FA 16:0;14Me",
		"FA 16:0;3Me,7Me,11Me,15Me": "FA 16:0;3Me,7Me,11Me,15Me", "FA 18:1(9Z);12OH": "FA 18:1(9Z);12OH",
		"ricinoleic acid": "FA 18:1(9Z);12OH", "Ricinoleic 18:1": "FA 18:1(9Z);12OH", "Oleic acid (C18:1)": "FA 18:1(9Z)",
		"Palmitic acid C16:0": "FA 16:0", "linoleic acid (18:2n-6)": "FA 18:2(9Z,12Z)", "α-Linolenic acid": "FA 18:3(9Z,12Z,15Z)",
		"cis-vaccenic": "FA 18:1(11Z)", "trans vaccenic acid": "FA 18:1(11E)", "vaccenic": "FA 18:1(11)", "DPA n-3": "FA 22:5(7Z,10Z,13Z,16Z,19Z)",
		"linolenic n-6": "FA 18:3(6Z,9Z,12Z)", "oleate": "FA 18:1(9Z)", "LA": "FA 18:2(9Z,12Z)", "gla": "FA 18:3(6Z,9Z,12Z)", "Epa": "FA 20:5(5Z,8Z,11Z,14Z,17Z)",
		"Eicosapentaenoic acid (EPA)": "FA 20:5(5Z,8Z,11Z,14Z,17Z)", "hexadecanoic acid": "FA 16:0", "octadecenoic acid": "FA 18:1",
		"10:1(9)": "FA 10:1(9Z)", "18:2(9Z,12)": "FA 18:2(9Z,12)", "omega 6": "omega-6", "n-3 PUFA": "polyunsaturated n-3",
		"saturated fatty acids": "saturated", "MUFA": "monounsaturated", "trans fatty acids": "unsaturated trans", "FATRN": "unsaturated trans",
		"18:2 n-6 trans": "18:2 trans n-6", "20:4 n-6 (ARA)": "FA 20:4(5Z,8Z,11Z,14Z)", "FA 36:4": "FA 36:4",
		"C18:3 conjugated": "18:3 conjugated", "all-trans-18:2": "18:2 trans,trans", "18:2(9,12) trans": "18:2(9,12) trans",
	} {
		t.Run(notation, func(t *testing.T) {
			s, err := Parse(notation)
			if (err != nil) != (want == "") || s.String() != want {
				t.Fatalf("got %q, %v; want %q", s, err, want)
			}
		})
	}
}

// Tagnames: INFOODS (UNU 80734e) and USDA SR28 NUTR_DEF; F18D2CN6F secondary.
func TestTagnames(t *testing.T) {
	for tag, want := range map[string]string{
		"F4D0": "FA 4:0", "F15D0I": "FA 14:0;13Me", "F15D0AI": "FA 14:0;12Me", "F18D1": "FA 18:1", "F18D1C": "18:1 cis", "F18D1T": "18:1 trans",
		"F18D1CN9": "FA 18:1(9Z)", "F18D1TN7": "FA 18:1(11E)", "F18D2CN6": "FA 18:2(9Z,12Z)", "F18D2N6": "FA 18:2(9Z,12Z)",
		"F18D2TT": "18:2 trans,trans", "F18D2CLA": "18:2 conjugated", "F18D3N3": "FA 18:3(9Z,12Z,15Z)", "F18D3CN6": "FA 18:3(6Z,9Z,12Z)",
		"F20D3N9": "FA 20:3(5Z,8Z,11Z)", "F22D5": "FA 22:5", "f22d6n3": "FA 22:6(4Z,7Z,10Z,13Z,16Z,19Z)", "F18D2CN6F": "FA 18:2(9Z,12Z)",
		"F18D2TTN6": "18:2 trans,trans n-6", "F18D": "", "F18D2X": "", "F18D0T": "",
	} {
		t.Run(tag, func(t *testing.T) {
			s, err := Parse(tag)
			if (err != nil) != (want == "") || s.String() != want {
				t.Fatalf("got %q, %v; want %q", s, err, want)
			}
		})
	}
}

func TestFaults(t *testing.T) {
	for notation, want := range map[string]ErrorKind{
		"": Empty, " -- ": Empty, strings.Repeat("1", MaxNotation+1): TooLong, "butter": Unknown, "18:1 \xff": Unknown, "18%": Unknown,
		"18": Unknown, "18:": Unknown, "18:1 (9Z": Unknown, "cis-9": Unknown, "acid": Unknown,
		"18:1(18Z)": Impossible, "18:1(1Z)": Impossible, "18:2(9Z)": Impossible, "18:2(9Z,9Z)": Impossible, "4:3": Impossible, "99:1": Impossible,
		"18:9": Impossible, "18:13": Impossible, "1:0": Impossible, "16:4 n-6": Impossible, "18:1 n-17": Impossible, "18:2 c,c,t": Impossible,
		"18:3 n-2": Impossible, "FA 18:0;1OMe": Impossible, "FA 18:0;99OH": Impossible,
		"18:0 trans": Contradictory, "18:0 n-3": Contradictory, "18:1(9Z) n-7": Contradictory, "18:1 cis trans": Impossible,
		"18:2(9Z,12Z) trans": Contradictory, "18:1 conjugated": Contradictory, "18:2(9Z,12Z) conjugated": Contradictory,
		"oleic acid 18:2": Contradictory, "18:1 18:2": Contradictory, "10:1(9E)": Contradictory, "saturated n-3": Contradictory,
		"AA": Ambiguous,
	} {
		t.Run(notation, func(t *testing.T) {
			s, err := Parse(notation)
			var fault *NotationError
			if !errors.As(err, &fault) || fault.Kind != want || fault.Says == "" || s != (Species{}) {
				t.Fatalf("got %v, %v; want kind %v", s, err, want)
			}
		})
	}
}

func TestRecordsParse(t *testing.T) {
	open := map[string]bool{"eicosadienoic": true, "docosadienoic": true, "F10D1": true, "F12D1": true, "F18D2CLA": true, "F18D2TTN6": true}
	for _, r := range Known() {
		acid := must(t, r.Notation)
		if acid.String() != r.Notation || acid.Trivial() != r.Trivial {
			t.Errorf("%s: reads back as %s, %s", r.Notation, acid, acid.Trivial())
		}
		for _, n := range append([]string{r.Trivial, r.Trivial + " acid", r.Systematic, r.Tag}, r.Names...) {
			if n == "" {
				continue
			}
			s, err := Parse(n)
			exact := s == acid
			if open[strings.TrimSuffix(n, " acid")] {
				exact = s.IsGroup() && s.Contains(acid) == Yes
			}
			if err != nil || !exact {
				t.Errorf("%q: got %v, %v; want %s", n, s, err, acid)
			}
		}
	}
}

func FuzzParse(f *testing.F) {
	for _, s := range []string{"18:1", "CLA", "omega-3", "18:2 c,t n-6", "FA 18:1(9Z);12OH", "F18D2CLA", "FA 19:0;[9-11cy3:1(9)]",
		"(9Z,12Z)-octadeca-9,12-dienoic acid", "DPA n-3", "18:3ω3", "PUFA trans", "18:2 i", "18:2(9,12) trans", "22:5 n-3/n-6"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, notation string) {
		s, err := Parse(notation)
		if err != nil {
			var fault *NotationError
			if !errors.As(err, &fault) || s != (Species{}) {
				t.Fatalf("error %v with %v", err, s)
			}
			return
		}
		again, err := Parse(s.String())
		if err != nil || again != s {
			t.Fatalf("%q: %q reads back as %q, %v", notation, s, again, err)
		}
		if s.Contains(s) == No {
			t.Fatalf("%q does not contain itself", s)
		}
		if _, _, _, ok := s.Formula(); ok != (s.Carbons() > 0 && s.DoubleBonds() >= 0) {
			t.Fatalf("%q: formula known = %v", s, ok)
		}
	})
}
