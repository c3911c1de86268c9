package recipe

import (
	"strconv"
	"strings"

	"github.com/go-json-experiment/json/jsontext"
)

// node is one value of the document. Nodes stand in document order, so a position is also a rank.
type node struct {
	kind        jsontext.Kind // '{' '[' '"' '0' 't' 'f' 'n'
	faulty      bool          // the bounded pass has already complained
	name        string        // of a member
	text        string        // of a string or a number
	parent      int32         // -1 for the document itself
	first, next int32         // 0 for none
	index       int32         // place in an array
	count       int32         // members or elements
}

// tree is the bounded document.
type tree struct {
	nodes []node
	wide  map[int32]map[string]int32 // members by name, of objects with many
	rows  map[int32][]int32          // elements of arrays, for those that were asked by number
}

const root = 0

// pointer is the JSON Pointer of a node.
func (t *tree) pointer(at int32) string {
	if at <= root {
		return ""
	}
	n := &t.nodes[at]
	if t.nodes[n.parent].kind == '[' {
		return t.pointer(n.parent) + "/" + strconv.Itoa(int(n.index))
	}
	return t.pointer(n.parent) + "/" + escape(n.name)
}

func escape(name string) string {
	if !strings.ContainsAny(name, "~/") {
		return name
	}
	return strings.NewReplacer("~", "~0", "/", "~1").Replace(name)
}

// member is the member of an object, 0 when it has none of this name.
func (t *tree) member(of int32, name string) int32 {
	const narrow = 32
	if t.nodes[of].count > narrow {
		return t.index(of)[name]
	}
	for m := t.nodes[of].first; m != 0; m = t.nodes[m].next {
		if t.nodes[m].name == name {
			return m
		}
	}
	return 0
}

func (t *tree) index(of int32) map[string]int32 {
	if byName, ok := t.wide[of]; ok {
		return byName
	}
	byName := make(map[string]int32, t.nodes[of].count)
	for m := t.nodes[of].first; m != 0; m = t.nodes[m].next {
		byName[t.nodes[m].name] = m
	}
	if t.wide == nil {
		t.wide = map[int32]map[string]int32{}
	}
	t.wide[of] = byName
	return byName
}

// path follows member names; 0 when one of them is not there.
func (t *tree) path(from int32, names ...string) int32 {
	for _, name := range names {
		if t.nodes[from].kind != '{' {
			return 0
		}
		if from = t.member(from, name); from == 0 {
			return 0
		}
	}
	return from
}

// names lists an object's members.
func (t *tree) names(of int32) []string {
	out := make([]string, 0, t.nodes[of].count)
	for m := t.nodes[of].first; m != 0; m = t.nodes[m].next {
		out = append(out, t.nodes[m].name)
	}
	return out
}

// texts lists the strings of an array.
func (t *tree) texts(of int32) []string {
	out := make([]string, 0, t.nodes[of].count)
	for m := t.nodes[of].first; m != 0; m = t.nodes[m].next {
		out = append(out, t.nodes[m].text)
	}
	return out
}

// element is the element of an array whose number is written in token, 0 when there is none.
func (t *tree) element(of int32, token string) int32 {
	i, err := strconv.Atoi(token)
	if err != nil || i < 0 || i >= int(t.nodes[of].count) {
		return 0
	}
	if t.rows == nil {
		t.rows = map[int32][]int32{}
	}
	if t.rows[of] == nil {
		row := make([]int32, 0, t.nodes[of].count)
		for m := t.nodes[of].first; m != 0; m = t.nodes[m].next {
			row = append(row, m)
		}
		t.rows[of] = row
	}
	return t.rows[of][i]
}
