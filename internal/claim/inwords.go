package claim

import (
	"strconv"
	"strings"

	"gramlaw/internal/rulebook"
)

// A Speaker names quantities, and finds the conditions that have a rule of their own.
type Speaker interface {
	Namer
	Named(id string) (*rulebook.Condition, bool)
}

// InWords writes a condition in English, without deciding it. A nil condition says nothing.
func InWords(c *rulebook.Condition, x Speaker) string { return speaker{x}.say(c, false) }

type speaker struct{ Speaker }

// say writes a condition; inner ones with several parts stand in parentheses.
func (x speaker) say(c *rulebook.Condition, inner bool) string {
	switch {
	case c == nil:
		return ""
	case c.Says != nil:
		return c.Says.In("en")
	}
	switch c.Op {
	case rulebook.OpCompare:
		return x.compared(c)
	case rulebook.OpAll:
		return x.joined(c.Parts, "; ", inner)
	case rulebook.OpAny:
		return x.joined(c.Parts, "; or ", inner)
	case rulebook.OpCount:
		return "at least " + strconv.Itoa(c.N) + " of " + x.joined(c.Parts, "; ", true)
	case rulebook.OpNot:
		return "not " + x.enclosed(c.Parts[0])
	case rulebook.OpWhen:
		return x.when(c)
	case rulebook.OpHolds:
		named, _ := x.Named(c.Name)
		return x.say(named, inner)
	}
	return atomSays(c, x)
}

func (x speaker) enclosed(c *rulebook.Condition) string {
	s := x.say(c, true)
	if strings.HasPrefix(s, "(") {
		return s
	}
	return "(" + s + ")"
}

func (x speaker) joined(parts []*rulebook.Condition, by string, inner bool) string {
	var said []string
	for _, p := range parts {
		if s := x.say(p, true); s != "" {
			said = append(said, s)
		}
	}
	s := strings.Join(said, by)
	if inner && len(said) > 1 {
		s = "(" + s + ")"
	}
	return s
}

// when leaves out a branch that asks nothing.
func (x speaker) when(c *rulebook.Condition) string {
	guard, then, other := x.say(c.Parts[0], true), x.say(c.Parts[1], true), x.say(c.Parts[2], true)
	switch {
	case then == "" && other == "":
		return ""
	case then == "":
		return "unless " + guard + ": " + other
	case other == "":
		return "if " + guard + ": " + then
	}
	return "if " + guard + ": " + then + ", else " + other
}

func (x speaker) compared(c *rulebook.Condition) string {
	return compareSays(c, strings.Join(c.Per, " and per "), x)
}
