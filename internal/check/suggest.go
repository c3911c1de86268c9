package check

import "strings"

// suggest finds the known name nearest to one that is not known: one that holds it or is held by it, else one a few slips away.
func suggest(name string, known []string) string {
	name = strings.ToLower(name)
	best, least := "", len(name)/3+1
	for _, k := range known {
		low := strings.ToLower(k)
		d := slips(name, low)
		if strings.Contains(low, name) || strings.Contains(name, low) {
			d = min(d, 1)
		}
		if d < least || d == least && best != "" && len(k) < len(best) {
			best, least = k, d
		}
	}
	return best
}

// slips is the number of letters to change, add or drop.
func slips(a, b string) int {
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range len(a) {
		last := row[0]
		row[0] = i + 1
		for j := range len(b) {
			cost := last
			if a[i] != b[j] {
				cost++
			}
			last, row[j+1] = row[j+1], min(cost, row[j]+1, row[j+1]+1)
		}
	}
	return row[len(b)]
}
