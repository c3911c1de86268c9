package wording

// A vocabulary numbers words. A word nobody wrote is 0.
type vocabulary map[string]uint32

// A trie holds written-out patterns. Tries that share a vocabulary number words alike.
type trie struct {
	vocabulary vocabulary
	nodes      []node
}

// A node is a place in patterns: what may come next, and the patterns that end here.
type node struct {
	words map[uint32]int32
	slots []edge
	ends  []int32
}

type edge struct {
	slot slot
	to   int32
}

func newTrie(v vocabulary) *trie { return &trie{vocabulary: v, nodes: make([]node, 1)} }

// add puts a written-out pattern in. end is what it leads to.
func (t *trie) add(way []item, end int32) {
	at := int32(0)
	for _, i := range way {
		at = t.step(at, i)
	}
	t.nodes[at].ends = append(t.nodes[at].ends, end)
}

func (t *trie) step(at int32, i item) int32 {
	if i.slot != noSlot {
		for _, e := range t.nodes[at].slots {
			if e.slot == i.slot {
				return e.to
			}
		}
		to := t.node()
		t.nodes[at].slots = append(t.nodes[at].slots, edge{i.slot, to})
		return to
	}
	id := t.vocabulary.number(i.word)
	if to, ok := t.nodes[at].words[id]; ok {
		return to
	}
	to := t.node()
	if t.nodes[at].words == nil {
		t.nodes[at].words = map[uint32]int32{}
	}
	t.nodes[at].words[id] = to
	return to
}

func (t *trie) node() int32 {
	t.nodes = append(t.nodes, node{})
	return int32(len(t.nodes) - 1)
}

func (v vocabulary) number(key string) uint32 {
	id, ok := v[key]
	if !ok {
		id = uint32(len(v) + 1)
		v[key] = id
	}
	return id
}

// ids are the numbers of a text's words.
func (v vocabulary) ids(text []token) []uint32 {
	out := make([]uint32, len(text))
	for i := range text {
		out[i] = v[text[i].key]
	}
	return out
}

// longest is the longest pattern of plain words that begins at a place: what it leads to and where it ends; end is 0 where none does.
func (t *trie) longest(ids []uint32, at int) (leads int32, end int) {
	node := int32(0)
	for i := at; i < len(ids); i++ {
		to, ok := t.nodes[node].words[ids[i]]
		if !ok {
			break
		}
		node = to
		if n := t.nodes[node].ends; len(n) > 0 {
			leads, end = n[0], i+1
		}
	}
	return leads, end
}
