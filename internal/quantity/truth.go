package quantity

// Truth is three-valued: what is uncertain may leave a condition open.
type Truth uint8

// The three answers. The zero value is Open: what nobody has decided is not decided.
const (
	Open Truth = iota
	No
	Yes
)

func (t Truth) String() string { return [...]string{"open", "no", "yes"}[t] }

// Not turns yes into no and leaves open open.
func (t Truth) Not() Truth {
	switch t {
	case Yes:
		return No
	case No:
		return Yes
	}
	return Open
}

// TruthOf is the two-valued answer.
func TruthOf(b bool) Truth {
	if b {
		return Yes
	}
	return No
}

// All holds when every part does; one no decides.
func All(parts ...Truth) Truth {
	out := Yes
	for _, p := range parts {
		if p == No {
			return No
		}
		if p == Open {
			out = Open
		}
	}
	return out
}

// Any holds when one part does.
func Any(parts ...Truth) Truth {
	out := No
	for _, p := range parts {
		if p == Yes {
			return Yes
		}
		if p == Open {
			out = Open
		}
	}
	return out
}

// AtLeast holds when n parts do.
func AtLeast(n int, parts ...Truth) Truth {
	yes, open := 0, 0
	for _, p := range parts {
		switch p {
		case Yes:
			yes++
		case Open:
			open++
		}
	}
	switch {
	case yes >= n:
		return Yes
	case yes+open < n:
		return No
	}
	return Open
}
