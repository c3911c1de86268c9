package lipid

import (
	"fmt"
	"strconv"
)

// ErrorKind sorts what can be wrong with a notation.
type ErrorKind uint8

// The kinds of fault. Nobody needs to read the sentence to tell them apart.
const (
	Empty         ErrorKind = iota // nothing written
	TooLong                        // more than MaxNotation bytes
	Unknown                        // no notation and no name we know
	Impossible                     // a notation of a structure that cannot exist, or that no food acid has
	Contradictory                  // two parts of the notation exclude each other
	Ambiguous                      // a name used for acids of different formula
)

func (k ErrorKind) String() string {
	return [...]string{"empty", "too long", "unknown", "impossible", "contradictory", "ambiguous"}[min(k, Ambiguous)]
}

// NotationError says what is wrong with a notation and what would be right.
type NotationError struct {
	Notation string // as given, cut at MaxNotation bytes
	Kind     ErrorKind
	Says     string // one sentence
}

func (e *NotationError) Error() string {
	return "fatty acid " + strconv.Quote(e.Notation) + ": " + e.Says
}

// fault is a NotationError before its notation is known.
func fault(kind ErrorKind, format string, args ...any) *NotationError {
	return &NotationError{Kind: kind, Says: fmt.Sprintf(format, args...)}
}
