package main

import (
	"cmp"
	"fmt"
	"slices"
)

// resolved is the register with tagnames replaced by indexes into rows and
// the consequences of its statements drawn.
type resolved struct {
	rows     []row
	index    map[string]int // tagnames and second spellings
	within   [][]int        // stated
	disjoint [][]int        // stated, by name or by family, both ways
	wholes   [][]bool       // transitive
	apart    [][]bool       // with consequences for parts
	order    []int          // wholes before parts
}

func resolve(rows []row) (*resolved, error) {
	r := &resolved{rows: rows, index: map[string]int{}}
	for i, one := range rows {
		for _, tag := range append([]string{one.tag}, one.aliases...) {
			if _, twice := r.index[tag]; twice {
				return nil, fmt.Errorf("%s stands twice", tag)
			}
			r.index[tag] = i
		}
	}
	for _, step := range []func() error{r.link, r.sort, r.close, r.check} {
		if err := step(); err != nil {
			return nil, err
		}
	}
	return r, nil
}

func (r *resolved) link() error {
	r.within, r.disjoint = make([][]int, len(r.rows)), make([][]int, len(r.rows))
	for i, one := range r.rows {
		for _, tag := range one.within {
			p, ok := r.index[tag]
			if !ok {
				return fmt.Errorf("%s is within unknown %s", one.tag, tag)
			}
			r.within[i] = append(r.within[i], p)
		}
		for _, tag := range one.disjoint {
			d, ok := r.index[tag]
			if !ok {
				return fmt.Errorf("%s is disjoint from unknown %s", one.tag, tag)
			}
			r.separate(i, d)
		}
		for j, other := range r.rows[:i] {
			if one.family != "" && one.family == other.family {
				r.separate(i, j)
			}
		}
	}
	return nil
}

func (r *resolved) separate(i, j int) {
	if !slices.Contains(r.disjoint[i], j) {
		r.disjoint[i] = append(r.disjoint[i], j)
		r.disjoint[j] = append(r.disjoint[j], i)
	}
}

// sort orders wholes before parts and fails on a circle.
func (r *resolved) sort() error {
	depth := make([]int, len(r.rows))
	for changed, rounds := true, 0; changed; rounds++ {
		if rounds > len(r.rows) {
			return fmt.Errorf("a component is part of itself")
		}
		changed = false
		for i := range r.rows {
			for _, p := range r.within[i] {
				if depth[i] <= depth[p] {
					depth[i], changed = depth[p]+1, true
				}
			}
		}
	}
	for i := range r.rows {
		r.order = append(r.order, i)
	}
	slices.SortStableFunc(r.order, func(a, b int) int { return cmp.Compare(depth[a], depth[b]) })
	return nil
}

// close draws the consequences: a part of a part is a part, and the parts of
// disjoint components are disjoint.
func (r *resolved) close() error {
	n := len(r.rows)
	r.wholes, r.apart = square(n), square(n)
	for _, i := range r.order {
		for _, p := range r.within[i] {
			r.wholes[i][p] = true
			for q, above := range r.wholes[p] {
				r.wholes[i][q] = r.wholes[i][q] || above
			}
		}
	}
	for i := range n {
		for j := range n {
			r.apart[i][j] = r.disjointByDescent(i, j)
		}
	}
	return nil
}

func (r *resolved) disjointByDescent(i, j int) bool {
	for x := range r.rows {
		if x != i && !r.wholes[i][x] {
			continue
		}
		for _, y := range r.disjoint[x] {
			if y == j || r.wholes[j][y] {
				return true
			}
		}
	}
	return false
}

func (r *resolved) check() error {
	for i, one := range r.rows {
		if r.apart[i][i] {
			return fmt.Errorf("%s would be disjoint from itself", one.tag)
		}
		for j := range r.rows {
			if r.apart[i][j] && r.wholes[i][j] {
				return fmt.Errorf("%s is part of %s and disjoint from it", one.tag, r.rows[j].tag)
			}
		}
	}
	return nil
}

func square(n int) [][]bool {
	s := make([][]bool, n)
	for i := range s {
		s[i] = make([]bool, n)
	}
	return s
}
