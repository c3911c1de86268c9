package check_test

import (
	"slices"
	"strings"
	"testing"
	"testing/fstest"

	"gramlaw/internal/check"
	"gramlaw/internal/rulebook"
)

// smallMarket is an invented market with the quantities energy, fat, protein and salt; files replaces or adds some of its files.
func smallMarket(t *testing.T, files map[string]string) *rulebook.Book {
	t.Helper()
	const source = `"from":"2000-01-01","source":{"ref":"x","evidence":"memory","force":"law"}`
	quantity := func(name, tag string) string {
		return `{"id":"xx/quantity/` + name + `","versions":[{` + source + `,"name":{"en":"` + name + `"},"unit":"g","ways":[{"sum":{"` + tag + `":"1"}}]}]}`
	}
	rules := func(list ...string) string { return `{"jurisdiction":"xx","rules":[` + strings.Join(list, ",") + `]}` }
	set := map[string]string{
		"set.json": `{"version":"1"}`,
		"xx/jurisdiction.json": `{"jurisdiction":"xx","name":"X","languages":["en"],"and":{"en":"and"},"editions":[],"assumed":[],"unlisted_claims":null,
			"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`,
		"xx/definitions.json": rules(quantity("fat", "FAT"), quantity("protein", "PROCNT"), quantity("salt", "NACL")),
		"xx/energy.json": rules(`{"id":"xx/energy/energy","versions":[{` + source + `,"name":{"en":"energy"},"unit":"kcal",
			"methods":[{"method":"general factors","factors":{"fat":"9","protein":"4"}}]}]}`),
		"xx/reference_values.json": rules(`{"id":"xx/reference/protein","versions":[{` + source + `,"quantity":"protein","amounts":{"general population":"50 g","infants":"50 g"}}]}`),
		"xx/rounding.json": rules(`{"id":"xx/rounding/mass","versions":[{`+source+`,"quantities":["fat","protein","salt"],"ties":"up","bands":[{"nearest":"0.1 g"}]}]}`,
			`{"id":"xx/rounding/energy","versions":[{`+source+`,"quantities":["energy"],"ties":"up","bands":[{"nearest":"1 kcal"}]}]}`),
		"xx/declaration.json": rules(declaration("")),
	}
	for name, s := range files {
		if name != "jurisdiction.json" {
			s = rules(s)
		}
		set["xx/"+name] = s
	}
	fsys := fstest.MapFS{}
	for name, s := range set {
		fsys[name] = &fstest.MapFile{Data: []byte(strings.ReplaceAll(s, "SOURCE", source))}
	}
	b, err := rulebook.Load(fsys)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// declaration has a line for every quantity, and more members.
func declaration(more string, lines ...string) string {
	for _, l := range [][2]string{{"energy", "ENERC_KCAL"}, {"fat", "FAT"}, {"protein", "PROCNT"}, {"salt", "NACL"}} {
		if !slices.ContainsFunc(lines, func(s string) bool { return strings.Contains(s, `"quantity":"`+l[0]+`"`) }) {
			unit := map[bool]string{true: "kcal", false: "g"}[l[0] == "energy"]
			lines = append(lines, `{"quantity":"`+l[0]+`","component":"`+l[1]+`","terms":{"en":["`+l[0]+`"]},"unit":"`+unit+`","percent":"none","presence":"mandatory"}`)
		}
	}
	return `{"id":"xx/declaration/standard","versions":[{SOURCE,"title":{"en":"T"},"number":{"en":{"decimal":".","unit":"{n} {u}","less than":"<{n} {u}"}},
		"lines":[` + strings.Join(lines, ",") + `]` + more + `}]}`
}

// dish is a recipe of one ingredient with these components, and more members.
func dish(components, more string) []byte {
	return []byte(`{"id":"f","ingredients":[{"id":"a","name":"food","amount":"100 g","composition":{"per":"100 g","components":` + components + `}}]` + more + `}`)
}

func TestShorterFormats(t *testing.T) {
	const zero = `"if":{"declared":"QUANTITY","is":"0"}`
	member := func(q string) string { return strings.ReplaceAll(`{"quantity":"QUANTITY",`+zero+`}`, "QUANTITY", q) }
	counted := `"name":{"en":"short"},"at least":2,"of":[` + member("fat") + `,` + member("protein") + `,` + member("salt") + `],"keeps":["protein"],"says":{"en":"No source of {names}"}`
	for _, c := range []struct {
		name, format, components, more string
		want                           *check.Simplified
	}{
		{"two of three, one of them kept", `{` + counted + `}`, `{"FAT":"0 g","PROCNT":"0 g","NACL":"1 g"}`, "",
			&check.Simplified{LeaveOut: []string{"fat"}, Says: "No source of fat"}},
		{"one of three is too little", `{` + counted + `}`, `{"FAT":"0 g","PROCNT":"1 g","NACL":"1 g"}`, "", nil},
		{"what goes uncounted is not named", `{` + counted + `,"leaves out":[{"quantity":"energy"}]}`, `{"FAT":"0 g","PROCNT":"0 g","NACL":"1 g"}`, "",
			&check.Simplified{LeaveOut: []string{"fat", "energy"}, Says: "No source of fat"}},
		{"what a claim is about stays", `{` + counted + `,"keeps claimed":true}`, `{"FAT":"0 g","PROCNT":"0 g","NACL":"0 g"}`, `,"claims":[{"claim":"fat-free"}]`,
			&check.Simplified{LeaveOut: []string{"salt"}, Says: "No source of salt"}},
		{"the statement is free without a claim", `{` + counted + `,"says if":{"claimed about":["any"]}}`, `{"FAT":"0 g","PROCNT":"0 g","NACL":"1 g"}`, "",
			&check.Simplified{LeaveOut: []string{"fat"}, Says: "No source of fat", SaysPresence: "optional"}},
		{"the statement stands with a claim", `{` + counted + `,"says if":{"claimed about":["any"]}}`, `{"FAT":"0 g","PROCNT":"0 g","NACL":"1 g"}`, `,"claims":[{"claim":"fat-free"}]`,
			&check.Simplified{LeaveOut: []string{"fat"}, Says: "No source of fat"}},
		{"no count and no statement", `{"name":{"en":"n"},"leaves out":[` + member("salt") + `]}`, `{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`, "",
			&check.Simplified{LeaveOut: []string{"salt"}}},
		{"some lines alone", `{"name":{"en":"n"},"where":{"fact":"alcohol by volume","above":"1.2 %"},"shows":["energy"]}`, `{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`,
			`,"facts":{"alcohol by volume":"5 %"}`, &check.Simplified{LeaveOut: []string{"fat", "protein", "salt"}}},
		{"not elsewhere", `{"name":{"en":"n"},"where":{"fact":"alcohol by volume","above":"1.2 %"},"shows":["energy"]}`, `{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`,
			`,"facts":{"alcohol by volume":"1.2 %"}`, nil},
		{"what may be repeated", `{"name":{"en":"n"},"repeats":true,"shows":["energy","fat"]}`, `{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`, "",
			&check.Simplified{Repeats: []string{"energy", "fat"}}},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := smallMarket(t, map[string]string{"declaration.json": declaration(`,"simplified":[` + c.format + `]`),
				"claims.json": `{"id":"xx/claim/fat-free","versions":[{SOURCE,"name":{"en":"fat free"},"about":["fat"],"condition":{"of":{"fat":"1"},"per":"100 g","below":"0.5 g"}}]}`})
			got := run(t, b, "xx", "2026-01-01", "", dish(c.components, c.more)).Declaration.Simplified
			if (got == nil) != (c.want == nil) {
				t.Fatalf("the format is %+v", got)
			}
			if got == nil {
				return
			}
			if !slices.Equal(got.LeaveOut, c.want.LeaveOut) || !slices.Equal(got.Repeats, c.want.Repeats) || got.Says != c.want.Says || got.SaysPresence != c.want.SaysPresence {
				t.Errorf("the format is %+v, want %+v", got, c.want)
			}
		})
	}
}

func TestPerCentWeighedByAFact(t *testing.T) {
	const weighed = `{"id":"xx/rounding/protein","versions":[{SOURCE,"quantities":["protein"],"ties":"up","bands":[{"nearest":"1 g"}],
		"percent":{"from":"exact","times":[{"fact":"protein efficiency ratio against casein","if":{"fact":"intended for","is":"infants"},"at most":"100 %"},
		{"fact":"protein digestibility-corrected amino acid score","at most":"100 %"}],"bands":[{"nearest":"1 %"}]}}]}`
	line := `{"quantity":"protein","component":"PROCNT","terms":{"en":["protein"]},"unit":"g","percent":"optional","presence":"mandatory",
		"percent mandatory if":{"claimed on the label about":["protein"]},"percent none if":{"fact":"protein efficiency ratio against casein","below":"40 %"},
		"no amount if":{"fact":"state","is":"liquid"}}`
	b := smallMarket(t, map[string]string{"declaration.json": declaration("", line), "rounding.json": weighed,
		"claims.json": `{"id":"xx/claim/protein-source","versions":[{SOURCE,"name":{"en":"source of protein"},"about":["protein"],"mandatory lines":["protein"],
			"condition":{"of":{"protein":"1"},"per":"100 g","at least":"5 g"}}]}`})
	for _, c := range []struct{ name, more, percent, status string }{
		{"the score of 0.5", `,"facts":{"intended for":"general population","protein digestibility-corrected amino acid score":"0.5"}`, "10 %", "determined"},
		{"a score above 1 counts as 1", `,"facts":{"intended for":"general population","protein digestibility-corrected amino acid score":"1.21"}`, "20 %", "determined"},
		{"infants by another fact", `,"facts":{"intended for":"infants","protein efficiency ratio against casein":"0.8"}`, "16 %", "determined"},
		{"no per cent by a condition", `,"facts":{"intended for":"infants","protein efficiency ratio against casein":"0.399"}`, "none", "determined"},
		{"an optional per cent nobody knows", "", "none", "determined"},
		{"a mandatory per cent nobody knows", `,"facts":{"intended for":"general population"},"claims":[{"claim":"protein-source"}]`, "none", "undetermined"},
	} {
		t.Run(c.name, func(t *testing.T) {
			m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"0 g","PROCNT":"10 g","NACL":"0 g"}`, c.more))
			l, v, err := printedLine(m, "protein", "")
			if err != nil || percentOf(v) != c.percent || l.Status != c.status || v.Text != "10 g" {
				t.Errorf("%v, %s with %s, %s; want %s, %s", err, v.Text, percentOf(v), l.Status, c.percent, c.status)
			}
			if c.status != "determined" && !slices.Contains(l.Needs, "the fact “protein digestibility-corrected amino acid score”") {
				t.Errorf("what is missing is %v", l.Needs)
			}
		})
	}
	m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"0 g","PROCNT":"10 g","NACL":"0 g"}`, `,"state":{"default":"liquid"},"density":{"default":"1 kg/L"},
		"facts":{"intended for":"general population","protein digestibility-corrected amino acid score":"1"}`))
	if _, v, _ := printedLine(m, "protein", ""); v.Text != "" || percentOf(v) != "20 %" {
		t.Errorf("the line shows %q with %s, want its per cent alone", v.Text, percentOf(v))
	}
}

func TestDailyIntake(t *testing.T) {
	b := smallMarket(t, map[string]string{
		"reference_amounts.json": `{"id":"xx/reference-amount/bread","versions":[{SOURCE,"names":{"en":["Bread"]},"amount":"75 g","daily intake":"150 g"}]},
			{"id":"xx/reference-amount/soup","versions":[{SOURCE,"names":{"en":["Soup"]},"amount":"200 g"}]}`,
		"claims.json": `{"id":"xx/claim/protein-source","versions":[{SOURCE,"name":{"en":"source of protein"},"about":["protein"],
			"condition":{"of":{"protein":"1"},"per":"daily intake","times":[{"fact":"protein efficiency ratio"},{"fact":"protein digestibility-corrected amino acid score","factor":"2.5"}],"at least":"20 g"}}]}`})
	for _, c := range []struct{ name, more, verdict string }{
		{"15 g in 150 g of bread, ratio 1.34", `,"category":{"default":"bread"},"facts":{"protein efficiency ratio":"1.34"}`, "permitted"},
		{"15 g in 150 g of bread, ratio 1.33", `,"category":{"default":"bread"},"facts":{"protein efficiency ratio":"1.33"}`, "refused"},
		{"15 g in 150 g of bread, score 0.54", `,"category":{"default":"bread"},"facts":{"protein digestibility-corrected amino acid score":"0.54"}`, "permitted"},
		{"20 g in the reference amount of soup, ratio 1", `,"category":{"default":"soup"},"facts":{"protein efficiency ratio":"1"}`, "permitted"},
		{"a stated intake", `,"category":{"default":"bread"},"facts":{"protein efficiency ratio":"1","reasonable daily intake":"200 g"}`, "permitted"},
		{"no ratio", `,"category":{"default":"bread"}`, "undetermined"},
		{"no intake", `,"facts":{"protein efficiency ratio":"3"}`, "undetermined"},
	} {
		t.Run(c.name, func(t *testing.T) {
			m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"0 g","PROCNT":"10 g","NACL":"0 g"}`, c.more+`,"claims":[{"claim":"protein-source"}]`))
			if got := m.Claims[0]; got.Verdict != c.verdict {
				t.Errorf("%s, want %s: %+v", got.Verdict, c.verdict, got.Condition)
			}
		})
	}
}

func TestClaimsSeeTheReferenceFoodThroughOthers(t *testing.T) {
	b := smallMarket(t, map[string]string{
		"conditions.json": `{"id":"xx/condition/less-fat","versions":[{"from":"2000-01-01","source":{"ref":"y","evidence":"memory","force":"law"},"condition":{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}}]}`,
		"claims.json": `{"id":"xx/claim/reduced","versions":[{"from":"2000-01-01","source":{"ref":"y","evidence":"official text","force":"law"},"name":{"en":"reduced"},"about":["fat"],"needs reference food":true,"condition":{"holds":"xx/condition/less-fat"}}]},
			{"id":"xx/claim/diet","versions":[{SOURCE,"name":{"en":"diet"},"about":["fat"],"condition":{"any":[{"of":{"fat":"1"},"per":"100 g","below":"1 g"},{"meets":"xx/claim/reduced"}]}}]}`})
	for _, c := range []struct{ name, fat, more, verdict string }{
		{"by itself", "0.9 g", `,"claims":[{"claim":"diet"}]`, "permitted"},
		{"without a reference food", "3 g", `,"claims":[{"claim":"diet"}]`, "undetermined"},
		{"25 % less than the reference food", "3 g", `,"claims":[{"claim":"diet","against":"r"}]`, "permitted"},
		{"just not 25 % less", "3.01 g", `,"claims":[{"claim":"diet","against":"r"}]`, "refused"},
		{"through a named condition", "3 g", `,"claims":[{"claim":"reduced","against":"r"}]`, "permitted"},
	} {
		t.Run(c.name, func(t *testing.T) {
			m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"`+c.fat+`","PROCNT":"1 g","NACL":"0 g"}`, c.more+
				`,"reference_foods":{"r":{"kind":"similar product","composition":{"per":"100 g","components":{"FAT":"4 g","PROCNT":"1 g","NACL":"0 g"}}}}`))
			got := m.Claims[0]
			if got.Verdict != c.verdict || got.Evidence != "memory" {
				t.Errorf("%s from %s, want %s: %+v", got.Verdict, got.Evidence, c.verdict, got.Condition)
			}
		})
	}
}

func TestClaimsThatAreNotOffered(t *testing.T) {
	b := smallMarket(t, map[string]string{"claims.json": `{"id":"xx/claim/fresh","versions":[{SOURCE,"name":{"en":"fresh"},"about":[],"not offered":true,"condition":{"all":[]}}]},
		{"id":"xx/claim/lean","versions":[{SOURCE,"name":{"en":"lean"},"about":[],"condition":{"all":[]}}]}`})
	m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`, ""))
	if len(m.AlsoPermitted) != 1 || m.AlsoPermitted[0].Claim != "xx/claim/lean" {
		t.Errorf("also permitted: %+v", m.AlsoPermitted)
	}
	m = run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`, `,"claims":[{"claim":"fresh"}]`))
	if m.Claims[0].Verdict != "permitted" {
		t.Errorf("asked for, it is %s", m.Claims[0].Verdict)
	}
}

func TestNoDeclarationRequired(t *testing.T) {
	b := smallMarket(t, map[string]string{"declaration.json": declaration(`,"required unless":{"all":[{"fact":"prepacked","is":"no"},{"not":{"claimed on the label about":["any"]}}]},"not required says":{"en":"sold loose"}`),
		"claims.json": `{"id":"xx/claim/fat-free","versions":[{SOURCE,"name":{"en":"fat free"},"about":["fat"],"condition":{"of":{"fat":"1"},"per":"100 g","below":"0.5 g"}}]}`})
	for _, c := range []struct{ name, more, says, presence string }{
		{"loose", `,"facts":{"prepacked":false}`, "sold loose", "optional"},
		{"prepacked", `,"facts":{"prepacked":true}`, "", "mandatory"},
		{"loose with a claim", `,"facts":{"prepacked":false},"claims":[{"claim":"fat-free"}]`, "", "mandatory"},
		{"nobody says", "", "sold loose", "mandatory"},
	} {
		t.Run(c.name, func(t *testing.T) {
			d := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"0 g","PROCNT":"1 g","NACL":"0 g"}`, c.more)).Declaration
			says := ""
			if n := d.NotRequired; n != nil {
				says = n.Says
				if n.Open != (c.presence == "mandatory") || n.Open != (len(n.Needs) > 0) {
					t.Errorf("it is %+v", n)
				}
			}
			if says != c.says || d.Lines[0].Presence != c.presence {
				t.Errorf("%q with lines that are %s, want %q and %s", says, d.Lines[0].Presence, c.says, c.presence)
			}
		})
	}
}

// A second column stands by a condition on the package, on labels of one edition.
func TestBasesByCondition(t *testing.T) {
	page := func(edition string) string {
		return `{"jurisdiction":"xx","name":"X","languages":["en"],"editions":[{"edition":"new","from":"2020-01-01","source":{"ref":"x","evidence":"memory","force":"law"}}],"assumed":[],"unlisted_claims":null,
		"bases":[{"per":"serving","presence":"mandatory"},{"per":"package","presence":"mandatory","edition":"` + edition + `","if":{"size of":"package","as":"share of reference amount","at least":"200 %"}}],"gaps":[],"caution":"c"}`
	}
	for _, c := range []struct {
		name, edition, net, on string
		want                   []string
	}{
		{"twice the reference amount", "new", "60 g", "2026-01-01", []string{"serving", "package"}},
		{"just below", "new", "59 g", "2026-01-01", []string{"serving"}},
		{"before the edition", "new", "60 g", "2019-12-31", []string{"serving"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := smallMarket(t, map[string]string{"jurisdiction.json": page(c.edition)})
			m := run(t, b, "xx", c.on, "", dish(`{"FAT":"10 g","PROCNT":"1 g","NACL":"0 g"}`, `,"reference_amount":{"default":"30 g"},"serving":{"default":{"amount":"30 g"}},"package":{"net":"`+c.net+`"}`))
			var got []string
			for _, basis := range m.Declaration.Bases {
				got = append(got, basis.ID)
			}
			if !slices.Equal(got, c.want) {
				t.Errorf("the bases are %v, want %v", got, c.want)
			}
		})
	}
}

func TestDisclosuresThatMayStand(t *testing.T) {
	b := smallMarket(t, map[string]string{
		"disclosure.json": `{"id":"xx/disclosure/diet","versions":[{SOURCE,"quantity":"fat","named":{"en":"fat"},"condition":{"all":[]},"effect":"statement","presence":"optional","statement":{"en":"Eat a varied diet."}}]}`,
		"claims.json":     `{"id":"xx/claim/fat-free","versions":[{SOURCE,"name":{"en":"fat free"},"about":["fat"],"condition":{"of":{"fat":"1"},"per":"100 g","below":"0.5 g"}}]}`})
	got := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"0 g","PROCNT":"1 g","NACL":"0 g"}`, `,"claims":[{"claim":"fat-free"}]`)).Claims[0]
	if got.Verdict != "permitted" || len(got.Statements) != 1 || got.Statements[0].Presence != "optional" {
		t.Errorf("%s with %+v", got.Verdict, got.Statements)
	}
}

// A number in a claim must be true, stated beside it or read from its words.
func TestNumbersInClaims(t *testing.T) {
	claim := func(as, wording string) string {
		return `{"id":"xx/claim/c","versions":[{SOURCE,"name":{"en":"c"},"about":["fat"],"condition":{"all":[]},"stated":{"of":{"fat":"1"},"as":"` + as + `"},"wordings":{"en":["` + wording + `"]}}]}`
	}
	for _, c := range []struct{ name, as, fat, asked, verdict string }{
		{"97 % free of 3 g", "free share", "3 g", `"claim":"c","stated":"97 %"`, "permitted"},
		{"97 % free of 3.01 g", "free share", "3.01 g", `"claim":"c","stated":"97 %"`, "refused"},
		{"free by grams", "free share", "3 g", `"claim":"c","stated":"97 g"`, "undetermined"},
		{"at most 3 g", "at most", "3 g", `"claim":"c","stated":"3 g"`, "permitted"},
		{"at most 3 g of 3.01 g", "at most", "3.01 g", `"claim":"c","stated":"3 g"`, "refused"},
		{"declared 3.1 g", "declared amount", "3.12 g", `"claim":"c","stated":"3100 mg"`, "permitted"},
		{"declared 3.1 g, said 3 g", "declared amount", "3.12 g", `"claim":"c","stated":"3 g"`, "refused"},
		{"an amount by volume", "amount", "3 g", `"claim":"c","stated":"3 mL"`, "undetermined"},
		{"the number in the words", "free share", "3 g", `"text":"97% Fat-Free"`, "permitted"},
		{"the number in the words, too high", "free share", "3 g", `"text":"98 percent fat-free"`, "refused"},
		{"words without their number", "free share", "3 g", `"text":"all fat-free"`, "unread"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := smallMarket(t, map[string]string{"claims.json": claim(c.as, "{number} fat-free")})
			got := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"`+c.fat+`","PROCNT":"1 g","NACL":"0 g"}`, `,"claims":[{`+c.asked+`}]`)).Claims[0]
			if got.Verdict != c.verdict {
				t.Errorf("%s, want %s: %+v", got.Verdict, c.verdict, got.Condition)
			}
		})
	}
}

func TestLinesTheMakerWants(t *testing.T) {
	salt := `{"quantity":"salt","component":"NACL","terms":{"en":["salt"]},"unit":"g","percent":"none","presence":"optional"}`
	protein := `{"quantity":"protein","component":"PROCNT","terms":{"en":["protein"]},"unit":"g","percent":"none","presence":"optional"}`
	fat := `{"quantity":"fat","component":"FAT","terms":{"en":["fat"]},"unit":"g","percent":"none","presence":"optional","mandatory if":{"declared":"salt"}}`
	b := smallMarket(t, map[string]string{"declaration.json": declaration(`,"together":[["salt","protein"]]`, fat, protein, salt)})
	for _, c := range []struct{ name, more, salt, protein, fat, finding string }{
		{"none", "", "optional", "optional", "optional", "none"},
		{"salt", `,"declares":{"xx":["salt"]}`, "optional", "mandatory", "mandatory", "none"},
		{"salt by default", `,"declares":{"default":["salt","biotin"]}`, "optional", "mandatory", "mandatory", "none"},
		{"what has no line", `,"declares":{"xx":["biotin"]}`, "optional", "optional", "optional", "warning"},
	} {
		t.Run(c.name, func(t *testing.T) {
			m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"1 g"}`, c.more))
			for q, want := range map[string]string{"salt": c.salt, "protein": c.protein, "fat": c.fat} {
				if l, _, err := printedLine(m, q, ""); err != nil || l.Presence != want {
					t.Errorf("%s is %s, want %s", q, l.Presence, want)
				}
			}
			if got := severityOf(m, "no-such-line"); got != c.finding {
				t.Errorf("the finding is %s, want %s", got, c.finding)
			}
		})
	}
}

// Factors of definitions are exact fractions: 3 g and five thirds of 1.2 g are 5 g.
func TestFractionsInDefinitions(t *testing.T) {
	b := smallMarket(t, map[string]string{"definitions.json": `{"id":"xx/quantity/fat","versions":[{SOURCE,"name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"1","PROCNT":"5/3"}}]}]},
		{"id":"xx/quantity/protein","versions":[{SOURCE,"name":{"en":"protein"},"unit":"g","ways":[{"of":{"fat":"1/5"}}]}]},{"id":"xx/quantity/salt","versions":[{SOURCE,"name":{"en":"salt"},"unit":"g","ways":[{"sum":{"NACL":"1"}}]}]}`})
	m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"3 g","PROCNT":"1.2 g","NACL":"1 g"}`, ""))
	for q, want := range map[string]string{"fat": "5", "protein": "1"} {
		if _, v, err := printedLine(m, q, ""); err != nil || deref(v.Exact) != want {
			t.Errorf("%s is %s, want %s", q, deref(v.Exact), want)
		}
	}
}

func TestServingSize(t *testing.T) {
	b := smallMarket(t, map[string]string{"declaration.json": declaration(`,"serving size":{"bands":[{"below":"10","nearest":"0.1"},{"nearest":"1"}],"text":{"en":"Per {measure} ({amount})"},"plain":{"en":"Per {amount}"},
		"single":{"en":"Per package ({amount})"},"single if":{"size of":"serving","as":"share of package","at least":"100 %"}},
		"servings per package":{"bands":[{"nearest":"1"}],"text":{"en":"{n} per package"},"about":{"en":"about {n}"},"varied":{"en":"varied"},"varied if":{"fact":"random weight","is":"yes"}}`)})
	for _, c := range []struct{ name, more, text, servings string }{
		{"with a measure", `,"serving":{"default":{"amount":"30.4 g","measure":"2 biscuits"}},"package":{"net":"91.2 g"}`, "Per 2 biscuits (30 g)", "3 per package"},
		{"a small one", `,"serving":{"default":{"amount":"9.96 g"}},"package":{"net":"100 g"}`, "Per 10 g", "about 10 per package"},
		{"below ten", `,"serving":{"default":{"amount":"9.94 g"}},"package":{"net":"99.4 g"},"facts":{"random weight":true}`, "Per 9.9 g", "varied per package"},
		{"by volume", `,"serving":{"default":{"amount":"1 cup","measure":"1 cup"}},"density":{"default":"1 g/mL"},"package":{"net":"480 g"}`, "Per 1 cup (240 mL)", "2 per package"},
		{"the whole package", `,"serving":{"default":{"amount":"30 g","measure":"1 bar"}},"package":{"net":"30 g"}`, "Per package (30 g)", "1 per package"},
	} {
		t.Run(c.name, func(t *testing.T) {
			d := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"1 g"}`, c.more)).Declaration
			if d.Serving == nil || d.Serving.Text != c.text || d.Servings == nil || d.Servings.Text != c.servings {
				t.Errorf("%+v and %+v, want %q and %q", d.Serving, d.Servings, c.text, c.servings)
			}
		})
	}
}

func TestTermsByCondition(t *testing.T) {
	salt := `{"quantity":"salt","component":"NACL","terms":{"en":["sodium chloride"]},"terms if":[{"if":{"fact":"salt added","is":"yes"},"terms":{"en":["salt"]}}],"unit":"g","percent":"none","presence":"mandatory"}`
	b := smallMarket(t, map[string]string{"declaration.json": declaration("", salt)})
	for more, want := range map[string]string{`,"facts":{"salt added":true}`: "salt", `,"facts":{"salt added":false}`: "sodium chloride", "": "sodium chloride"} {
		l, _, err := printedLine(run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"1 g"}`, more)), "salt", "")
		if err != nil || l.Term != want {
			t.Errorf("%q: the term is %q, want %q", more, l.Term, want)
		}
	}
}

// A narrower population takes its own reference value, or that of the wider one.
func TestNarrowerPopulations(t *testing.T) {
	b := smallMarket(t, map[string]string{"reference_values.json": `{"id":"xx/reference/protein","versions":[{SOURCE,"quantity":"protein","amounts":{"general population":"50 g","pregnant or lactating":"80 g","lactating":"100 g"}}]}`,
		"claims.json": `{"id":"xx/claim/c","versions":[{SOURCE,"name":{"en":"c"},"about":[],"condition":{"all":[{"of":{"protein":"1"},"as":"share of reference value","per":"100 g","at least":"10 %"},
			{"fact":"intended for","is":"pregnant or lactating"}]}}]}`})
	for who, want := range map[string]string{"pregnant": "permitted", "pregnant or lactating": "permitted", "lactating": "refused", "general population": "refused"} {
		m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"8 g","NACL":"1 g"}`, `,"facts":{"intended for":"`+who+`"},"claims":[{"claim":"c"}]`))
		if got := m.Claims[0]; got.Verdict != want {
			t.Errorf("%s: %s, want %s", who, got.Verdict, want)
		}
	}
}

func TestAnotherLessThan(t *testing.T) {
	d := strings.Replace(declaration(""), `"less than":"<{n} {u}"`, `"less than":"<{n} {u}","or less than":"contains less than {n} {u}"`, 1)
	b := smallMarket(t, map[string]string{"declaration.json": d, "rounding.json": `{"id":"xx/rounding/fat","versions":[{SOURCE,"quantities":["fat"],"ties":"up","bands":[{"below":"1 g","less than":"1 g"},{"nearest":"1 g"}]}]}`})
	for fat, want := range map[string][]string{"0.9 g": {"contains less than 1 g"}, "1 g": {}} {
		_, v, err := printedLine(run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"`+fat+`","PROCNT":"1 g","NACL":"1 g"}`, "")), "fat", "")
		if err != nil || !slices.Equal(v.Alternatives, want) {
			t.Errorf("%s: the law also allows %q, want %q", fat, v.Alternatives, want)
		}
	}
}

// A measured fact is the product's: of a reference food it is what the market assumes, or open.
func TestMeasuredFactsAreTheProducts(t *testing.T) {
	page := `{"jurisdiction":"xx","name":"X","languages":["en"],"editions":[],"assumed":[{"fact":"alcohol by volume","is":"0 %","why":"w"}],"unlisted_claims":null,"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`
	b := smallMarket(t, map[string]string{"jurisdiction.json": page,
		"claims.json": `{"id":"xx/claim/sober","versions":[{SOURCE,"name":{"en":"s"},"about":[],"condition":{"fact":"alcohol by volume","at most":"1.2 %"}}]},
			{"id":"xx/claim/sour","versions":[{SOURCE,"name":{"en":"s"},"about":[],"condition":{"fact":"free acidity","at most":"1.2 %"}}]},
			{"id":"xx/claim/against-sober","versions":[{SOURCE,"name":{"en":"a"},"about":[],"needs reference food":true,"condition":{"meets":"xx/claim/sober","subject":"reference food"}}]},
			{"id":"xx/claim/against-sour","versions":[{SOURCE,"name":{"en":"a"},"about":[],"needs reference food":true,"condition":{"meets":"xx/claim/sour","subject":"reference food"}}]}`})
	for claim, want := range map[string]string{"sober": "refused", "against-sober": "permitted", "sour": "refused", "against-sour": "undetermined"} {
		m := run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"0 g"}`, `,"facts":{"alcohol by volume":"5 %","free acidity":"5 %"},"claims":[{"claim":"`+claim+`","against":"r"}],
			"reference_foods":{"r":{"kind":"similar product","composition":{"per":"100 g","components":{"FAT":"4 g","PROCNT":"1 g","NACL":"0 g"}}}}`))
		if got := m.Claims[0].Verdict; got != want {
			t.Errorf("%s is %s, want %s", claim, got, want)
		}
	}
}
