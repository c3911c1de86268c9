package check_test

import (
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
)

var codeInSource = regexp.MustCompile(`(?:Fault\{[^,\n]+, (?:Code: )?|bad\([^\n]*?, )"([a-z0-9-]+)"`)

// codeOfWords finds the codes of faults of words.
var codeOfWords = regexp.MustCompile(`Code[A-Za-z]+ += "([a-z-]+)"`)

// Every code of a fault that the sources of check and roll-up write stands in the closed list, and no other.
func TestCodesAreClosed(t *testing.T) {
	var listed, written []string
	for _, c := range check.Codes {
		listed = append(listed, c.Code)
	}
	for _, dir := range []string{".", "../rollup"} {
		files, err := filepath.Glob(dir + "/*.go")
		if err != nil {
			t.Fatal(err)
		}
		for _, file := range files {
			if strings.HasSuffix(file, "_test.go") {
				continue
			}
			b, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			for _, m := range codeInSource.FindAllStringSubmatch(string(b), -1) {
				written = append(written, m[1])
			}
		}
	}
	b, err := os.ReadFile("../wording/engine.go")
	if err != nil {
		t.Fatal(err)
	}
	for _, m := range codeOfWords.FindAllStringSubmatch(string(b), -1) {
		written = append(written, m[1])
	}
	for _, code := range written {
		if !slices.Contains(listed, code) && code != recipe.UnknownFood && code != recipe.BadText {
			t.Errorf("%s is told and not listed", code)
		}
	}
	for _, code := range listed {
		if !slices.Contains(written, code) {
			t.Errorf("%s is listed and never told", code)
		}
	}
}
