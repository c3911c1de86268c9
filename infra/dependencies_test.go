package infra

import (
	"os"
	"regexp"
	"strings"
	"testing"
)

var (
	required = regexp.MustCompile(`(?m)^\t(\S+) v\S+$`)
	tool     = regexp.MustCompile(`(?m)^(?:tool |\t)(\S+\.\S+/\S+)$`)
)

// DEVELOPERS.md gives the reason for every module that is used directly, and for every tool.
func TestDependenciesHaveReasons(t *testing.T) {
	told := file(t, "../DEVELOPERS.md")
	reasons := told[strings.Index(told, "## Dependencies"):]
	for name, pattern := range map[string]*regexp.Regexp{"../go.mod": required, "tools.mod": tool, "vulndb.mod": tool} {
		found := pattern.FindAllStringSubmatch(file(t, name), -1)
		if len(found) == 0 {
			t.Errorf("%s names nothing", name)
		}
		for _, m := range found {
			if !explained(reasons, m[1]) {
				t.Errorf("%s: DEVELOPERS.md does not say why %s is there", name, m[1])
			}
		}
	}
}

// explained tells whether the module, or the one that a tool's package lies in, stands in the first column of a table.
func explained(reasons, path string) bool {
	for line := range strings.Lines(reasons) {
		cells := strings.Split(line, "|")
		if len(cells) != 4 || strings.TrimSpace(cells[2]) == "" {
			continue
		}
		for _, word := range strings.Fields(strings.ReplaceAll(cells[1], ",", " ")) {
			if path == word || strings.HasPrefix(path, word+"/") {
				return true
			}
		}
	}
	return false
}

func file(t *testing.T, name string) string {
	t.Helper()
	b, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}
