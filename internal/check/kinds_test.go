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
		"xx/jurisdiction.json": `{"jurisdiction":"xx","name":"X","languages":["en"],"editions":[],"assumed":[],"unlisted_claims":null,
			"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`,
		"xx/definitions.json": rules(quantity("fat", "FAT"), quantity("protein", "PROCNT"), quantity("salt", "NACL")),
		"xx/energy.json": rules(`{"id":"xx/energy/energy","versions":[{` + source + `,"name":{"en":"energy"},"unit":"kcal",
			"methods":[{"method":"general factors","factors":{"fat":"9","protein":"4"}}]}]}`),
		"xx/reference_values.json": rules(`{"id":"xx/reference/protein","versions":[{` + source + `,"quantity":"protein","amounts":{"general population":"50 g"}}]}`),
		"xx/rounding.json": rules(`{"id":"xx/rounding/mass","versions":[{`+source+`,"quantities":["fat","protein","salt"],"ties":"up","bands":[{"nearest":"0.1 g"}]}]}`,
			`{"id":"xx/rounding/energy","versions":[{`+source+`,"quantities":["energy"],"ties":"up","bands":[{"nearest":"1 kcal"}]}]}`),
		"xx/declaration.json": rules(declaration("")),
	}
	for name, s := range files {
		set["xx/"+name] = strings.ReplaceAll(rules(s), "SOURCE", source)
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
