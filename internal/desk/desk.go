// Package desk is the command: verbs and flags around the core, for a person or a script.
//
// Run reads its arguments, writes to the given streams and returns the exit status. A verb is an entry of verbs; what it
// needs from outside comes in an Env.
package desk

import (
	"errors"
	"fmt"
	"io"
	"time"

	"gramlaw/internal/rulebook"
)

// Exit statuses. They are part of the contract.
const (
	AllWell   = 0
	Refused   = 1 // a claim or a limit is refused
	BadCall   = 2 // the call or a document is wrong; nothing of it stands on standard output
	Undecided = 3 // something is undetermined and nothing refused
)

// Env is what the command takes from outside.
type Env struct {
	Now   func() time.Time
	Rules func() (*rulebook.Book, error)
}

// A call is one run of a verb.
type call struct {
	args           []string
	stdin          io.Reader
	stdout, stderr io.Writer
	env            Env
	place          string         // of the rules; empty is the program's own
	book           *rulebook.Book // once loaded
}

// A verb is what the command can do. Its run returns the exit status, or an error for status 2.
type verb struct {
	name  string
	line  string // one line for the list
	usage string // what -h prints above the flags
	run   func(*call) (int, error)
	flags func() *flags
}

func verbs() []verb {
	return []verb{
		{"check", "check recipes against the rules of markets", checkUsage, runCheck, func() *flags { return checkFlags(&checkOptions{}) }},
		{"coverage", "tell what the rule set covers and what it lacks", coverageUsage, runCoverage, func() *flags { return coverageFlags(&coverageOptions{}) }},
		{"foods", "search the open food table, or show one food of it", foodsUsage, runFoods, func() *flags { return foodsFlags(&foodsOptions{}) }},
		{"recheck", "tell what a change of date or rules does to stored recipes", recheckUsage, runRecheck, func() *flags { return recheckFlags(&recheckOptions{}) }},
		{"rules", "keep rule sets in a store: put, list, use, back", rulesUsage, runRules, func() *flags { return rulesFlags(&rulesOptions{}) }},
		{"serve", "answer over HTTP on this machine", serveUsage, runServe, func() *flags { return serveFlags(&serveOptions{}) }},
		{"wording", "tell what words on a pack are in law", wordingUsage, runWording, func() *flags { return wordingFlags(&wordingOptions{}) }},
	}
}

// Run runs the command on its arguments, the program's name left out.
func Run(args []string, stdin io.Reader, stdout, stderr io.Writer, env Env) int {
	c := &call{stdin: stdin, stdout: stdout, stderr: stderr, env: env}
	if len(args) == 0 {
		fmt.Fprint(stderr, overview())
		return BadCall
	}
	name, rest := args[0], args[1:]
	if help(name) {
		return c.help(rest)
	}
	v, ok := find(name)
	if !ok {
		return c.fail("desk", unknownVerb(name))
	}
	c.args = rest
	status, err := v.run(c)
	if errors.Is(err, errHelp) {
		return c.help([]string{v.name})
	}
	if err != nil {
		return c.fail("desk "+v.name, err)
	}
	return status
}

func help(s string) bool { return s == "help" || s == "-h" || s == "-help" || s == "--help" }

func find(name string) (verb, bool) {
	for _, v := range verbs() {
		if v.name == name {
			return v, true
		}
	}
	return verb{}, false
}

func unknownVerb(name string) error {
	return fmt.Errorf("%q is no verb; known are %s; desk help tells more", name, names())
}

func names() string {
	s := ""
	for _, v := range verbs() {
		s += v.name + ", "
	}
	return s + "help"
}

// help tells about all verbs or about one.
func (c *call) help(args []string) int {
	if len(args) == 0 || help(args[0]) {
		fmt.Fprint(c.stdout, overview())
		return AllWell
	}
	v, ok := find(args[0])
	if !ok {
		return c.fail("desk help", unknownVerb(args[0]))
	}
	fmt.Fprint(c.stdout, v.usage)
	v.flags().describe(c.stdout)
	return AllWell
}

// fail writes why nothing was done. An error may have several lines.
func (c *call) fail(who string, err error) int {
	fmt.Fprintf(c.stderr, "%s: %s\n", who, plain(err.Error()))
	return BadCall
}

func overview() string {
	s := "Checks what a food label may say: values, claims and limits, market by market.\n\nUsage: desk VERB [flags] [arguments]\n\n"
	for _, v := range verbs() {
		s += fmt.Sprintf("  %-9s %s\n", v.name, v.line)
	}
	return s + "  help      this, or help on a verb: desk help check\n\n" +
		"Exit status: 0 all well; 1 a claim or a limit is refused; 2 the call or the\ndocument is wrong; 3 something is not determined and nothing is refused.\n"
}
