package lipid

import (
	"fmt"
	"testing"
)

func TestMembers(t *testing.T) {
	for notation, want := range map[string]string{
		"oleic": "[FA 18:1(9Z)]", "DPA": "[FA 22:5(7Z,10Z,13Z,16Z,19Z) FA 22:5(4Z,7Z,10Z,13Z,16Z)]", "vaccenic": "[FA 18:1(11Z) FA 18:1(11E)]",
		"18:2(9,12) trans": "[FA 18:2(9E,12Z) FA 18:2(9Z,12E) FA 18:2(9E,12E)]",
		"linolenic":        "[FA 18:3(9Z,12Z,15Z) FA 18:3(6Z,9Z,12Z)]",
		"18:1":             "", "omega-3": "", "22:6(4,7,10,13,16,19)": "",
	} {
		acids, ok := must(t, notation).Members()
		if got := fmt.Sprint(acids); ok != (want != "") || ok && got != want {
			t.Errorf("%s: %v, %v; want %s", notation, got, ok, want)
		}
	}
}

func TestStructure(t *testing.T) {
	a, one := must(t, "9c,11t-18:2").Acid()
	if got := fmt.Sprint(a.Bonds(), a.MethylEnd(), a.Carbons(), a.DoubleBonds()); !one || got != "[{9 cis} {11 trans}] 7 18 2" {
		t.Error(got)
	}
	if b, _ := must(t, "18:0").Acid(); b.MethylEnd() != 0 || len(b.Bonds()) != 0 {
		t.Error("stearic acid has no double bond")
	}
	for notation, want := range map[string]string{"18:1": "18 1", "omega-3": "-1 -1", "saturated": "-1 0", "16:0 iso": "16 0", "CLA": "18 2"} {
		s := must(t, notation)
		if got := fmt.Sprint(s.Carbons(), s.DoubleBonds()); got != want {
			t.Errorf("%s: %s, want %s", notation, got, want)
		}
	}
}

func TestNamesBesideNotations(t *testing.T) {
	for notation, want := range map[string]string{
		"palmitic acid (hexadecanoic acid, C16:0)": "FA 16:0", "eicosapentaenoic n-3 20:5": "FA 20:5(5Z,8Z,11Z,14Z,17Z)",
		"linolenic 18:3": "18:3 cis methylene-interrupted n-3/n-6", "(9E)-vaccenic": "", "vaccenic 18:1 cis": "FA 18:1(11Z)", "octadeca": "",
		"trans oleic acid": "", "palmitic 18:0": "", "stearic acid 18:0 (LA)": "", "palmitate": "FA 16:0", "butate": "", "eleostearic c,t,t": "FA 18:3(9Z,11E,13E)",
		"rumenic acid 18:2 c,t": "FA 18:2(9Z,11E)", "18:2 trans (CLA 9t11t)": "FA 18:2(9E,11E)",
		"linoleic 18:2 c,t": "", "9-cis, 12-cis octadecadienoic acid": "FA 18:2(9Z,12Z)", "FA 17:1(9Z);16Me": "FA 17:1(9Z);16Me", "17:1 iso": "", "3:0 anteiso": "",
		"FA 18:1;12OH": "", "FA 19:0;[11-13cy3:0]": "FA 19:0;[11-13cy3:0]", "FA 19:0;[11-12cy3:0]": "", "FA 18:0;OH": "", "FA 18:0;9OH,9OH": "",
		"FA 18:0;9Ep,10Ep": "", "FA 18:0;9Zz": "", "18:2 β": "", "all 18:1": "", "18:1 n-": "", "18:1 n-60": "", "18:2 all-cis all-trans": "",
		"18:2\u00a0n\u22126": "FA 18:2(9Z,12Z)", "18:1\u20099c": "FA 18:1(9Z)", "18:1\u200b 9c": "FA 18:1(9Z)", "18:3 n³": "FA 18:3(9Z,12Z,15Z)", "18:2 c-9, t-11": "FA 18:2(9Z,11E)",
	} {
		if s, err := Parse(notation); s.String() != want || (err != nil) != (want == "") {
			t.Errorf("%q: got %q, %v; want %q", notation, s, err, want)
		}
	}
}

func TestWords(t *testing.T) {
	got := fmt.Sprint(Yes, No, Open, Cis, Trans, UnknownGeometry, FreeAcid, MethylEster, Triglyceride, Empty, TooLong, Unknown, Impossible, Contradictory, Ambiguous)
	if want := "yes no open cis trans unknown free acid methyl ester triglyceride empty too long unknown impossible contradictory ambiguous"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
	_, err := Parse("18:1(18Z)")
	if want := `fatty acid "18:1(18Z)": no double bond can start at carbon 18 of 18; positions run from 2 to 17`; err == nil || err.Error() != want {
		t.Errorf("got %v", err)
	}
}
