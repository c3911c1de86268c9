package desk_test

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/rogpeppe/go-internal/testscript"

	"gramlaw/internal/desk"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

// today is the date of all scripts.
func today() time.Time { return time.Date(2026, 12, 1, 9, 0, 0, 0, time.UTC) }

// env has the embedded rules, or those of the folder in RULES.
func env() desk.Env {
	return desk.Env{Now: today, Rules: func() (*rulebook.Book, error) {
		if dir := os.Getenv("RULES"); dir != "" {
			return rulebook.Load(os.DirFS(dir))
		}
		return rulebook.Load(rules.FS)
	}}
}

// status runs the command and ends well when the exit status is its first argument.
func status() {
	want, err := strconv.Atoi(os.Args[1])
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(100)
	}
	if got := desk.Run(os.Args[2:], os.Stdin, os.Stdout, os.Stderr, env()); got != want {
		fmt.Fprintf(os.Stderr, "exit status %d, want %d\n", got, want)
		os.Exit(100)
	}
}

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"status": status, "http": httpClient})
}

// digest NAME FOLDER sets a variable to the 64 digits of a rule set's digest.
func digest(s *testscript.TestScript, _ bool, args []string) {
	book, err := rulebook.Load(os.DirFS(s.MkAbs(args[1])))
	s.Check(err)
	s.Setenv(args[0], strings.TrimPrefix(book.Digest, "sha256:"))
}

// The scripts of testdata run against the invented market there; RULES= in a script takes the embedded rules.
func TestScripts(t *testing.T) {
	dir, err := filepath.Abs("testdata/rules")
	if err != nil {
		t.Fatal(err)
	}
	demo, err := filepath.Abs("../../testdata/recipes")
	if err != nil {
		t.Fatal(err)
	}
	testscript.Run(t, testscript.Params{Dir: "testdata", Cmds: map[string]func(*testscript.TestScript, bool, []string){"digest": digest}, RequireExplicitExec: true, RequireUniqueNames: true, Setup: func(e *testscript.Env) error {
		e.Setenv("RULES", dir)
		e.Setenv("DEMO", demo)
		e.Setenv("ADDRESS", freeAddress(t))
		return nil
	}})
}

type closed struct{}

func (closed) Write([]byte) (int, error) { return 0, errors.New("nobody listens") }
func (closed) Read([]byte) (int, error)  { return 0, errors.New("nothing comes") }

func run(t *testing.T, e desk.Env, args ...string) (int, string, string) {
	t.Helper()
	var out, errs bytes.Buffer
	code := desk.Run(args, strings.NewReader(oats), &out, &errs, e)
	return code, out.String(), errs.String()
}

const oats = `{"id": "o", "name": "Oats", "ingredients": [{"id": "oats", "name": "oats", "amount": "100 g", "food": "sr:08120"}]}`

func testEnv() desk.Env {
	return desk.Env{Now: today, Rules: func() (*rulebook.Book, error) { return rulebook.Load(os.DirFS("testdata/rules")) }}
}

func TestWithoutDateTheClockDecides(t *testing.T) {
	_, out, _ := run(t, testEnv(), "check", "-")
	if !strings.Contains(out, "Labelling date 2026-12-01") {
		t.Errorf("the date is not the clock's:\n%s", out)
	}
	later := testEnv()
	later.Now = func() time.Time { return time.Date(2031, 5, 6, 0, 0, 0, 0, time.UTC) }
	_, out, _ = run(t, later, "check", "-")
	if !strings.Contains(out, "Labelling date 2031-05-06") {
		t.Errorf("the date is not the clock's:\n%s", out)
	}
}

func TestTroubleOutsideIsABadCall(t *testing.T) {
	noRules := testEnv()
	noRules.Rules = func() (*rulebook.Book, error) { return nil, errors.New("two problems") }
	code, out, errs := run(t, noRules, "check", "-")
	if code != desk.BadCall || out != "" || !strings.Contains(errs, "two problems") {
		t.Errorf("broken rules: status %d, output %q, message %q", code, out, errs)
	}
	var b bytes.Buffer
	if code := desk.Run([]string{"check", "-"}, strings.NewReader(oats), closed{}, &b, testEnv()); code != desk.BadCall || !strings.Contains(b.String(), "nobody listens") {
		t.Errorf("closed output: status %d, message %q", code, &b)
	}
	b.Reset()
	if code := desk.Run([]string{"check", "-"}, closed{}, &b, &b, testEnv()); code != desk.BadCall || !strings.Contains(b.String(), "nothing comes") {
		t.Errorf("broken input: status %d, message %q", code, &b)
	}
}

// A message quotes arguments and documents; nothing of them may steer the terminal.
func TestMessagesAreText(t *testing.T) {
	for _, args := range [][]string{
		{"\x1b[2J"}, {"check", "\x1b[2J\u202e"}, {"check", "-in", "\x1b", "-"}, {"check", "-\x1b[2J", "-"}, {"foods", "\x1b]0;x\a"}, {"foods", "sr:\x1b"}, {"help", "\x1b"},
	} {
		code, out, errs := run(t, testEnv(), args...)
		if code != desk.BadCall || out != "" || errs == "" || strings.ContainsAny(errs, "\x1b\a\u202e") {
			t.Errorf("%q: status %d, output %q, message %q", args, code, out, errs)
		}
	}
}
