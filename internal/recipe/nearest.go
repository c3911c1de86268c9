package recipe

import "strings"

// suggest adds the known name that somebody probably meant, "" when none is near.
func suggest(name string, known []string) string {
	if s := nearest(name, known); s != "" {
		return "; did you mean " + quote(s) + "?"
	}
	return ""
}

func nearest(name string, known []string) string {
	const longest = 40
	best, least := "", 3
	if len(name) > longest {
		return ""
	}
	for _, k := range known {
		if strings.EqualFold(k, name) {
			return k
		}
		// One slip in a short word, two in a long one.
		if n := slips(name, k); n < least && n*3 <= max(len(k), len(name)) {
			best, least = k, n
		}
	}
	return best
}

// slips counts the letters left out, put in, exchanged or swapped with a neighbour between two words; case is ignored.
// Reference: Damerau 1964, Commun ACM 7:171, in the restricted form of optimal string alignment.
func slips(a, b string) int {
	a, b = strings.ToLower(a), strings.ToLower(b)
	var before, above, row []int
	above = make([]int, len(b)+1)
	for j := range above {
		above[j] = j
	}
	for i := range len(a) {
		row = make([]int, len(b)+1)
		row[0] = i + 1
		for j := range len(b) {
			change := above[j]
			if a[i] != b[j] {
				change++
			}
			row[j+1] = min(change, above[j+1]+1, row[j]+1)
			if i > 0 && j > 0 && a[i] == b[j-1] && a[i-1] == b[j] {
				row[j+1] = min(row[j+1], before[j-1]+1)
			}
		}
		before, above = above, row
	}
	return above[len(b)]
}
