package desk

import (
	"errors"
	"flag"
	"fmt"
	"io"
	"strings"
	"unicode"
)

// errHelp asks for the help of a verb.
var errHelp = errors.New("help")

// flags are a verb's flags; they may stand before or after the arguments.
type flags struct{ *flag.FlagSet }

func newFlags(name string) *flags {
	f := flag.NewFlagSet(name, flag.ContinueOnError)
	f.SetOutput(io.Discard)
	f.Usage = func() {}
	return &flags{f}
}

// parse reads flags wherever they stand and gives the other arguments. After "--" everything is an argument.
func (f *flags) parse(args []string) ([]string, error) {
	var rest []string
	for {
		err := f.Parse(args)
		switch {
		case errors.Is(err, flag.ErrHelp):
			return nil, errHelp
		case err != nil:
			return nil, fmt.Errorf("%w; desk %s -h lists the flags", err, f.Name())
		}
		left := f.Args()
		if read := args[:len(args)-len(left)]; len(read) > 0 && read[len(read)-1] == "--" || len(left) == 0 {
			return append(rest, left...), nil
		}
		rest, args = append(rest, left[0]), left[1:]
	}
}

// describe lists the flags, each with its default.
func (f *flags) describe(w io.Writer) {
	fmt.Fprint(w, "\nFlags, before or after the arguments:\n\n")
	f.VisitAll(func(x *flag.Flag) {
		value, usage := flag.UnquoteUsage(x)
		fmt.Fprintf(w, "  -%s\n", strings.TrimSpace(x.Name+" "+value))
		fmt.Fprintf(w, "        %s\n", strings.ReplaceAll(usage, "\n", "\n        "))
	})
}

// words is a flag that takes names, with commas between them.
type words []string

func (w *words) String() string { return strings.Join(*w, ",") }

// Set reads the names; the same name twice counts once.
func (w *words) Set(s string) error {
	*w = nil
	seen := map[string]bool{}
	for _, name := range strings.Split(s, ",") {
		name = strings.TrimSpace(name)
		if name == "" {
			return errors.New("names with commas between them are wanted")
		}
		if !seen[name] {
			seen[name] = true
			*w = append(*w, name)
		}
	}
	return nil
}

// plain replaces what could steer a terminal in a message that quotes a document or an argument.
func plain(s string) string {
	return strings.Map(func(r rune) rune {
		if r != '\n' && (unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r)) {
			return unicode.ReplacementChar
		}
		return r
	}, s)
}
