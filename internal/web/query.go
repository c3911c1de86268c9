package web

import (
	"slices"
	"time"
)

// parameters reads a query whose parameters are all known and stand once.
func (x *exchange) parameters(known ...string) (map[string]string, *Problem) {
	query, err := parseQuery(x.r.URL.RawQuery)
	if err != nil {
		return nil, faultyParameters(&Fault{Code: codeBadQuery, Says: "the query cannot be read: a percent sign without two hexadecimal digits, a semicolon, or text that is not UTF-8"})
	}
	out := map[string]string{}
	var faults []*Fault
	for _, name := range sortedNames(query) {
		switch {
		case !slices.Contains(known, name):
			faults = append(faults, &Fault{Parameter: cut(name), Code: codeUnknownParameter, Says: "the parameter is not known here" + listed(known)})
		case len(query[name]) > 1:
			faults = append(faults, &Fault{Parameter: name, Code: codeRepeatedParameter, Says: "the parameter stands more than once; keep one"})
		}
		out[name] = query[name][0]
	}
	return out, faultyParameters(faults...)
}

// date is a parameter that is a day, or the default where it is not stated.
func date(parameters map[string]string, name, otherwise string) (string, *Fault) {
	text, stated := parameters[name]
	switch {
	case !stated && otherwise == "":
		return "", &Fault{Parameter: name, Code: codeMissingParameter, Says: "a date is wanted, yyyy-mm-dd"}
	case !stated:
		return otherwise, nil
	}
	if _, err := time.Parse(time.DateOnly, text); err != nil {
		return "", &Fault{Parameter: name, Code: "not-a-date", Says: "the text is no date; write yyyy-mm-dd"}
	}
	return text, nil
}

// today is the labelling date where none is named.
func (x *exchange) today() string { return x.Now().UTC().Format(time.DateOnly) }
