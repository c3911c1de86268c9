package web

import (
	"io/fs"
	"slices"
	"time"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/schemas"
)

// schemaList names the published schemas.
type schemaList struct {
	Schemas []string `json:"schemas"`
}

// problemList describes every kind of problem and every code of a fault.
type problemList struct {
	Problems []problemPage `json:"problems"`
	Codes    []codePage    `json:"codes"`
}

type problemPage struct {
	Type   string `json:"type"`
	Title  string `json:"title"`
	Status int    `json:"status"`
	Says   string `json:"says"`
}

type codePage struct {
	Code string `json:"code"`
	Says string `json:"says"`
}

// health tells that the service works, and with which rules.
type health struct {
	Status  string    `json:"status"`
	Version string    `json:"version"`
	Rules   loadedSet `json:"rules"`
}

type loadedSet struct {
	check.RuleSet
	Loaded     string `json:"loaded"` // RFC 3339, UTC
	AgeSeconds int64  `json:"age_seconds"`
	Canary     bool   `json:"canary,omitzero"`
	Read       string `json:"read,omitzero"` // RFC 3339, UTC; absent where no store is followed
	Stale      bool   `json:"stale,omitzero"`
}

func getSchemas(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	files, err := fs.Glob(schemas.Files, "*.schema.json")
	if err != nil {
		return problem(internal, "")
	}
	for i := range files {
		files[i] = "/schemas/" + files[i]
	}
	return x.replyJSON(schemaList{files}, true)
}

func getSchema(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	mediaType, p := x.choose(typeSchema, typeJSON)
	if p != nil {
		return p
	}
	name := x.r.PathValue("name")
	body, err := fs.ReadFile(schemas.Files, name)
	if !fs.ValidPath(name) || err != nil {
		return problem(notFound, "There is no such schema; /schemas lists them.")
	}
	return x.replyTagged(mediaType, body)
}

func getOpenAPI(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	mediaType, p := x.choose(typeJSON)
	if p != nil {
		return p
	}
	return x.replyTagged(mediaType, x.openapi)
}

func getProblems(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	list := problemList{}
	for _, k := range kinds() {
		list.Problems = append(list.Problems, k.page())
	}
	for _, c := range slices.Concat(recipe.Codes, check.Codes, ownCodes()) {
		list.Codes = append(list.Codes, codePage(c))
	}
	return x.replyJSON(list, true)
}

func getProblem(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	for _, k := range kinds() {
		if k.Name == x.r.PathValue("name") {
			return x.replyJSON(k.page(), true)
		}
	}
	return problem(notFound, "There is no such problem; /problems lists them.")
}

func (k kind) page() problemPage {
	return problemPage{Type: "/problems/" + k.Name, Title: k.Title, Status: k.Status, Says: k.Says}
}

func getHealth(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	set := loadedSet{RuleSet: x.ruleSet(), Loaded: utc(x.rules.Loaded), AgeSeconds: int64(x.Now().Sub(x.rules.Loaded) / time.Second), Canary: x.rules.Canary, Stale: x.rules.Stale}
	if !x.rules.Read.IsZero() {
		set.Read = utc(x.rules.Read)
	}
	return x.replyJSON(health{"ok", x.Version, set}, false)
}

func utc(t time.Time) string { return t.UTC().Format(time.RFC3339) }
