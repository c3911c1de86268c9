package coverage_test

import (
	"reflect"
	"strings"
	"testing"

	"gramlaw/internal/coverage"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func load(t *testing.T) *rulebook.Book {
	t.Helper()
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// A kind added to the rule book must be counted too: fields are found by reflection, so that none is forgotten.
func TestEveryKindIsWalked(t *testing.T) {
	m := &rulebook.Rules{}
	v := reflect.ValueOf(m).Elem()
	want := 0
	for i := range v.NumField() {
		if f := v.Field(i); f.Kind() == reflect.Slice {
			one := reflect.New(f.Type().Elem()).Elem()
			versions := one.FieldByName("Versions")
			versions.Set(reflect.MakeSlice(versions.Type(), 2, 2))
			f.Set(reflect.Append(f, one))
			want++
		}
	}
	kinds, visits := map[string]bool{}, 0
	coverage.Walk(m, func(kind, _ string, _ *rulebook.Head) { kinds[kind] = true; visits++ })
	if want == 0 || len(kinds) != want || visits != 2*want {
		t.Errorf("%d kinds and %d versions are walked, want %d and %d", len(kinds), visits, want, 2*want)
	}
}

func TestSumsAgree(t *testing.T) {
	r, err := coverage.Of(load(t), nil, "confirm")
	if err != nil {
		t.Fatal(err)
	}
	if r.Version == "" || !strings.HasPrefix(r.Digest, "sha256:") || r.Caution != "confirm" {
		t.Errorf("the head is %q, %q, %q", r.Version, r.Digest, r.Caution)
	}
	for _, m := range r.Markets {
		ruleCount, versions := 0, 0
		for _, k := range append(m.Kinds, m.Total) {
			if sum(k.Evidence) != k.Versions || sum(k.Force) != k.Versions {
				t.Errorf("%s %s: grades of %d and %d for %d versions", m.Jurisdiction, k.Kind, sum(k.Evidence), sum(k.Force), k.Versions)
			}
			if k.Rules == 0 || k.Rules > k.Versions || k.First == "" {
				t.Errorf("%s %s: %d rules, %d versions from %q", m.Jurisdiction, k.Kind, k.Rules, k.Versions, k.First)
			}
		}
		for _, k := range m.Kinds {
			ruleCount, versions = ruleCount+k.Rules, versions+k.Versions
		}
		if ruleCount != m.Total.Rules || versions != m.Total.Versions {
			t.Errorf("%s: the kinds sum to %d and %d, the total is %+v", m.Jurisdiction, ruleCount, versions, m.Total)
		}
	}
	if last := r.Markets[len(r.Markets)-1].Jurisdiction; last != "practice" {
		t.Errorf("%s stands last", last)
	}
}

func sum(m map[string]int) int {
	n := 0
	for _, x := range m {
		n += x
	}
	return n
}

func TestMarketsAreChosen(t *testing.T) {
	b := load(t)
	some := b.Jurisdictions()[:1]
	r, err := coverage.Of(b, some, "")
	if err != nil || len(r.Markets) != 2 || r.Markets[0].Jurisdiction != some[0] {
		t.Errorf("%v gives %+v, %v", some, r, err)
	}
	if _, err := coverage.Of(b, []string{"zz"}, ""); err == nil || !strings.Contains(err.Error(), some[0]) {
		t.Errorf("an unknown market gives %v", err)
	}
}
