package wording

// ReadPattern writes a pattern out, for tests from outside.
func ReadPattern(p string) int {
	out, err := ways(p, map[string]slot{"your": firstSet}, '.')
	if err != nil {
		return 0
	}
	return len(out)
}
