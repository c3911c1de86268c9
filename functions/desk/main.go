// Command desk checks recipes on a person's machine; see internal/desk.
package main

import (
	"os"
	"time"

	"gramlaw/internal/desk"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func main() {
	env := desk.Env{Now: time.Now, Rules: func() (*rulebook.Book, error) { return rulebook.Load(rules.FS) }}
	os.Exit(desk.Run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr, env))
}
