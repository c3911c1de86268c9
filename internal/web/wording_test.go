package web

import (
	"encoding/json"
	"net/http/httptest"
	"slices"
	"strings"
	"testing"
)

func askWords(t *testing.T, body string) *httptest.ResponseRecorder {
	t.Helper()
	h := handler(t, options())
	r := request("POST", "/v1/wording", body, "Content-Type: application/json")
	w := httptest.NewRecorder()
	h.ServeHTTP(w, r)
	conform(t, h, r, w)
	return w
}

func TestWordsAreRead(t *testing.T) {
	w := askWords(t, `{"text": "🥑 low in fat", "in": ["eu"], "food": "sr:08120", "on": "2026-12-01"}`)
	var got struct {
		Jurisdictions []struct {
			Readings []struct {
				Claim, Verdict string
				Span           []int
			}
		}
		Recipe struct{ ID string }
	}
	if err := json.Unmarshal(w.Body.Bytes(), &got); err != nil || w.Code != 200 {
		t.Fatalf("%d %s %v", w.Code, w.Body, err)
	}
	if r := got.Jurisdictions[0].Readings; len(r) != 1 || r[0].Claim != "eu/claim/fat-low" || !slices.Equal(r[0].Span, []int{2, 12}) || got.Recipe.ID != "sr:08120" {
		t.Errorf("%s", w.Body)
	}
	if w := askWords(t, `{"text": "low fat", "language": "ja"}`); w.Code != 200 || strings.Count(w.Body.String(), `"not_judged":"the language is not supported`) != 3 {
		t.Errorf("an unsupported language: %d %s", w.Code, w.Body)
	}
}

// Every fault is told at once, at its place.
func TestFaultsOfWords(t *testing.T) {
	for _, c := range []struct {
		name, body string
		want       []string
	}{
		{"nothing", `{}`, []string{"/text missing-member"}},
		{"empty", `{"text": ""}`, []string{"/text empty-text"}},
		{"too long", `{"text": "` + strings.Repeat("ä", 2001) + `"}`, []string{"/text text-too-long"}},
		{"no text", `{"text": 5}`, []string{"/text wrong-type"}},
		{"unknown names", `{"text": "low fat", "language": "zz", "in": ["xx"], "on": "soon", "colour": "red"}`, []string{"/colour unknown-member", "/in unknown-market", "/language unknown-language", "/on not-a-date"}},
		{"two products", `{"text": "low fat", "food": "sr:08120", "recipe": ` + oats + `}`, []string{"/food two-products"}},
		{"no such food", `{"text": "low fat", "food": "sr:99999"}`, []string{"/food unknown-food"}},
		{"a faulty recipe", `{"text": "low fat", "recipe": {"id": "x"}}`, []string{"/recipe missing-member"}},
		{"a list", `[]`, []string{" wrong-type"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			w := askWords(t, c.body)
			var p Problem
			if err := json.Unmarshal(w.Body.Bytes(), &p); err != nil || w.Code != 422 {
				t.Fatalf("%d %s", w.Code, w.Body)
			}
			var got []string
			for _, f := range p.Faults {
				got = append(got, *f.Pointer+" "+f.Code)
			}
			slices.Sort(got)
			if !slices.Equal(got, c.want) {
				t.Errorf("%q, want %q", got, c.want)
			}
		})
	}
}
