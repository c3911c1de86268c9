package lipid

import (
	"encoding/json"
	"strings"
	"testing"
)

func class(t testing.TB, rule string) *Class {
	t.Helper()
	dec := json.NewDecoder(strings.NewReader(rule))
	dec.DisallowUnknownFields()
	var p Predicate
	if err := dec.Decode(&p); err != nil {
		t.Fatal(err)
	}
	c, err := p.Compile()
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// Definitions as rule data. Sources: Regulation (EU) 1169/2011 Annex I (secondary), 21 CFR 101.9(c)(2) (memory and
// secondary), NZ Gazette 8 May 2015 p. 58 (seen), as listed by authority in the science tables.
const (
	saturated     = `{"double bonds": "0"}`
	mono          = `{"double bonds": "1", "all": "cis"}`
	poly          = `{"double bonds": "2+", "all": "cis", "spacing": "3"}`
	isolatedTrans = `{"any": "trans", "conjugated": false}` // Codex, EU, US, Canada
	anyTransBond  = `{"any": "trans"}`                      // Australia and New Zealand, literal reading
	omega3        = `{"methyl end": "n-3", "double bonds": "2+"}`
)

func TestPredicates(t *testing.T) {
	for _, c := range []struct {
		notation, rule string
		want           Truth
	}{
		{"18:1 t", isolatedTrans, Yes}, {"18:1 t", saturated, No}, {"18:1 t", mono, No}, {"18:1 t", anyTransBond, Yes},
		{"18:1", saturated, No}, {"18:1", isolatedTrans, Open}, {"18:1", mono, Open}, {"18:1", poly, No},
		{"18:1 cis", mono, Yes}, {"18:1 cis", isolatedTrans, No}, {"18:1 n-9", mono, Open},
		{"CLA", isolatedTrans, No}, {"CLA", anyTransBond, Open}, {"CLA", poly, No}, {"CLA", mono, No}, {"CLA", saturated, No},
		{"CLA 9c,11t", isolatedTrans, No}, {"CLA 9c,11t", anyTransBond, Yes}, {"CLA 9c,11t", poly, No}, {"CLA trans", anyTransBond, Yes},
		{"9c,11t,15c-18:3", isolatedTrans, No}, {"11t,15c-18:2", isolatedTrans, Yes}, {"9c,15c-18:2", poly, No},
		{"18:2 t,t", isolatedTrans, Yes}, {"18:2 t", isolatedTrans, Yes}, {"18:2 t", poly, No}, {"18:2 c,t", isolatedTrans, Yes},
		{"18:2 c,c", poly, Open}, {"18:2 c,c", isolatedTrans, No}, {"18:2", poly, Open}, {"18:2", anyTransBond, Open}, {"18:2", mono, No},
		{"18:2(9,12)", poly, Open}, {"18:2(9,11)", isolatedTrans, No}, {"18:2(9,11)", anyTransBond, Open}, {"18:2(9,13)", poly, No},
		{"18:2 i", poly, No}, {"18:2 i", isolatedTrans, Open}, {"18:3 n-5", omega3, No},
		{"omega-3", omega3, Open}, {"omega-3", `{"methyl end": "n-3"}`, Yes}, {"omega-3", `{"methyl end": "n-6"}`, No}, {"omega-3", saturated, No},
		{"n-3 PUFA", omega3, Yes}, {"omega-3", isolatedTrans, Open}, {"saturated", saturated, Yes}, {"saturated", omega3, No},
		{"fatty acids", saturated, Open}, {"fatty acids", `{"every": true}`, Yes}, {"fatty acids", omega3, Open},
		{"DPA", poly, Yes}, {"DPA", omega3, Open}, {"linolenic acid", poly, Yes}, {"linolenic acid", isolatedTrans, No},
		{"DPA", `{"listed": ["DPA n-3", "DPA n-6"]}`, Yes}, {"DPA", `{"listed": ["DPA n-3", "DHA"]}`, Open}, {"DPA", `{"listed": ["DHA"]}`, No},
		{"18:1 n-9", `{"listed": ["18:1(9Z)", "18:1(9E)"]}`, Yes}, {"18:2", `{"listed": ["LA"]}`, Open}, {"18:3", `{"listed": ["LA"]}`, No},
		{"CLA", `{"listed": ["18:2 conjugated"]}`, Yes}, {"omega-3", `{"listed": ["ALA", "EPA", "DHA"]}`, Open},
		{"CLA", `{"conjugated": true}`, Yes}, {"18:1", `{"conjugated": false}`, Yes}, {"18:2", `{"conjugated": true}`, Open},
		{"16:0", `{"carbons": "12"}`, No}, {"12:0", `{"carbons": "12"}`, Yes}, {"8:0", `{"carbons": "4-10", "double bonds": "0"}`, Yes},
		{"22:6", `{"carbons": "20+"}`, Yes}, {"saturated", `{"carbons": "12"}`, Open}, {"saturated", `{"carbons": "2-40"}`, Yes}, {"omega-3", `{"carbons": "20+"}`, Open},
		{"16:0 iso", `{"carbons": "16"}`, Yes}, {"saturated", `{"carbons": "4-10"}`, Open}, {"18:1", `{"carbons": "4-10"}`, No}, {"omega-3", `{"carbons": "2-10"}`, Open}, {"sterculic", saturated, No}, {"sterculic", mono, No}, {"lactobacillic", saturated, Yes},
		{"18:2 t,t", `{"all": "trans"}`, Yes}, {"18:0", `{"all": "cis"}`, No}, {"18:1", `{"any": "cis"}`, Open}, {"4:1", `{"any": "cis"}`, Open},
		{"3:1", `{"all": "cis"}`, Yes},
	} {
		t.Run(c.notation+" "+c.rule, func(t *testing.T) {
			if got := class(t, c.rule).Holds(must(t, c.notation)); got != c.want {
				t.Fatalf("got %v, want %v", got, c.want)
			}
		})
	}
	if got := class(t, saturated).Holds(Species{}); got != Open {
		t.Errorf("nothing at all: %v", got)
	}
}

func TestPredicateFaults(t *testing.T) {
	yes, no := true, false
	for name, p := range map[string]Predicate{
		"nothing": {}, "double bonds": {DoubleBonds: "two"}, "range": {DoubleBonds: "3-1"}, "both": {Carbons: "4+-6"}, "all": {All: "E"}, "any": {Any: "both"},
		"spacing": {Spacing: "2"}, "methyl end": {MethylEnd: "omega-3"}, "methyl end 0": {MethylEnd: "n-0"}, "listed": {Listed: []string{"butter"}},
		"every beside another": {Every: true, All: "cis"}, "conjugated true": {Any: "trans", Conjugated: &yes}, "any cis": {Any: "cis", Conjugated: &no},
	} {
		t.Run(name, func(t *testing.T) {
			if c, err := p.Compile(); err == nil || c != nil {
				t.Fatal("compiled")
			}
		})
	}
}

// Class columns of the acids table, under the wording of the US and the EU and under "any trans counts".
func TestClassesOfKnownAcids(t *testing.T) {
	names := []string{"saturated", "monounsaturated", "polyunsaturated", "trans"}
	strict := []*Class{class(t, saturated), class(t, mono), class(t, poly), class(t, isolatedTrans)}
	literal := []*Class{strict[0], strict[1], strict[2], class(t, anyTransBond)}
	for i, row := range table(t, "fatty_acids.csv") {
		acid := must(t, Known()[i].Notation)
		for _, reading := range []struct {
			column  string
			classes []*Class
		}{{"class_US_EU_wording", strict}, {"class_if_any_trans_counts", literal}} {
			got := "none (total fat only)"
			for k, c := range reading.classes {
				if c.Holds(acid) == Yes {
					got = names[k]
				}
			}
			if got != row[reading.column] {
				t.Errorf("%s, %s: got %s, want %s", row["trivial_name"], reading.column, got, row[reading.column])
			}
		}
		if got := class(t, `{"methyl end": "n-3", "double bonds": "2+", "all": "cis", "spacing": "3"}`).Holds(acid) == Yes; got != (row["cis_n3_PUFA"] == "yes") {
			t.Errorf("%s: cis n-3 %v", row["trivial_name"], got)
		}
	}
}

// every lists all straight acids of a chain, by brute force.
func every(carbons, bonds int) (out []FattyAcid) {
	for at := uint64(0); at < 1<<carbons; at += 4 {
		var positions []int
		for p := 2; p < carbons; p++ {
			if at>>p&1 == 1 {
				positions = append(positions, p)
			}
		}
		if len(positions) != bonds {
			continue
		}
		for pattern := range 1 << bonds {
			a := FattyAcid{chain: uint8(carbons)}
			for i, p := range positions {
				if pattern>>i&1 == 1 {
					a.trans |= 1 << p
				} else {
					a.cis |= 1 << p
				}
			}
			if a.trans>>(carbons-1)&1 == 0 {
				out = append(out, a)
			}
		}
	}
	return out
}

// Whatever a group answers must be what all its members answer, and Open only when they differ.
func TestGroupsAgreeWithTheirMembers(t *testing.T) {
	rules := []string{saturated, mono, poly, isolatedTrans, anyTransBond, omega3, `{"any": "cis"}`, `{"all": "trans"}`, `{"conjugated": true}`,
		`{"conjugated": false}`, `{"spacing": "3"}`, `{"methyl end": "n-6"}`, `{"methyl end": "n-1"}`, `{"carbons": "10+"}`,
		`{"any": "trans", "spacing": "3", "methyl end": "n-3"}`}
	words := []string{"", " trans", " cis", " conjugated", " conjugated trans", " methylene-interrupted", " isomers", " n-5", " n-3/n-6", " n-3 trans", " c,t", " t,t", " c,c,t", " methylene-interrupted c,t"}
	tried := 0
	for _, chain := range []struct{ carbons, bonds int }{{4, 1}, {5, 2}, {8, 2}, {9, 1}, {10, 3}, {11, 2}, {12, 3}, {13, 2}, {10, 4}} {
		acids := every(chain.carbons, chain.bonds)
		var groups []Species
		for _, w := range words {
			s, err := Parse(group{carbons: span{uint8(chain.carbons), uint8(chain.carbons)}, bonds: span{uint8(chain.bonds), uint8(chain.bonds)}}.String()[3:] + w)
			if err != nil || !s.IsGroup() {
				continue
			}
			groups = append(groups, s)
			for _, rule := range rules {
				c, some, someNot := class(t, rule), false, false
				for _, a := range acids {
					if s.containsAcid(a) == Yes {
						some = some || c.holdsAcid(a) == Yes
						someNot = someNot || c.holdsAcid(a) == No
					}
				}
				if got := c.Holds(s); !some && !someNot || got != decide(some, someNot) {
					t.Errorf("%v %s: got %v, members yes %v no %v", s, rule, got, some, someNot)
				}
			}
		}
		tried += len(groups)
		checkContains(t, groups, acids)
	}
	if tried < 60 {
		t.Errorf("only %d groups tried", tried)
	}
}

// checkContains compares every pair of groups member by member. Open may also stand where Yes was too hard to see.
func checkContains(t *testing.T, groups []Species, acids []FattyAcid) {
	t.Helper()
	for _, a := range groups {
		for _, b := range groups {
			some, someNot := false, false
			for _, acid := range acids {
				if b.containsAcid(acid) == Yes {
					some = some || a.containsAcid(acid) == Yes
					someNot = someNot || a.containsAcid(acid) == No
				}
			}
			if got := a.Contains(b); got == Yes && someNot || (got == No) == some {
				t.Errorf("%v contains %v: got %v, members yes %v no %v", a, b, got, some, someNot)
			}
		}
	}
}

func TestContains(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want Truth
	}{
		{"18:1", "oleic", Yes}, {"oleic", "18:1", Open}, {"18:1 t", "oleic", No}, {"18:1 t", "18:1", Open}, {"18:1", "18:1 t", Yes},
		{"18:1 cis", "18:1 trans", No}, {"18:1(9)", "18:1 trans", Open}, {"CLA", "18:2", Open}, {"18:2", "CLA", Yes}, {"CLA", "LA", No}, {"CLA", "rumenic", Yes},
		{"CLA", "18:2 t,t", No}, {"18:2 t", "18:2 t,t", Yes}, {"18:2 i", "LA", No}, {"18:2 i", "18:2 t", Yes}, {"18:2 i", "18:2(9E,12E)", Yes},
		{"omega-3", "ALA", Yes}, {"omega-3", "LA", No}, {"omega-3", "DPA", Open}, {"22:5", "DPA", Yes}, {"DPA", "22:5 n-3", Yes}, {"omega-3", "omega-6", No},
		{"polyunsaturated", "omega-3", Open}, {"unsaturated", "omega-3", Yes}, {"polyunsaturated n-3", "EPA", Yes}, {"saturated", "phytanic", Yes},
		{"18:1", "ricinoleic", No}, {"16:0", "16:0 iso", No}, {"saturated", "18:1", No}, {"unsaturated trans", "18:1 t", Yes}, {"18:1", "18:2", No},
		{"18:2 n-6 t", "18:2 t,t", Open}, {"18:2(9,12)", "18:2 t,t", Open}, {"18:2", "18:2(9,12)", Yes}, {"oleic", "C18:1n9c", Yes}, {"linolenic", "18:3 n-3", Yes},
	} {
		if got := must(t, c.a).Contains(must(t, c.b)); got != c.want {
			t.Errorf("%s contains %s: got %v, want %v", c.a, c.b, got, c.want)
		}
	}
	if !must(t, "oleic").Overlaps(must(t, "18:1")) || must(t, "18:1 t").Overlaps(must(t, "oleic")) {
		t.Error("overlaps")
	}
}
