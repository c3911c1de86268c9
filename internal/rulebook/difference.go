package rulebook

import (
	"slices"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

// Effects of a change. Between two days of one set a rule begins, ends, or is replaced by another version; between two
// sets a version is added, removed or edited.
const (
	Begins   = "begins"
	Ends     = "ends"
	Replaced = "replaced"
	Added    = "added"
	Removed  = "removed"
	Edited   = "edited"
)

// A Change is what differs in one rule.
type Change struct {
	Jurisdiction string   `json:"jurisdiction"`
	Kind         string   `json:"kind"` // name of the file: "claims"
	ID           string   `json:"id"`   // of a market's own page "<jurisdiction>/jurisdiction"
	Effect       string   `json:"effect"`
	Says         string   `json:"says"` // the effect in short, in English
	Was          *Head    `json:"was"`  // null where nothing was
	Is           *Head    `json:"is"`   // null where nothing is
	Members      []Member `json:"members"`
}

// A Member is a member of a rule that differs, with its JSON on both sides; null where it is absent.
type Member struct {
	Member string         `json:"member"`
	Was    jsontext.Value `json:"was"`
	Is     jsontext.Value `json:"is"`
}

// Changes lists the rules of which another version holds in one law than in the other, in the order of the files; rules
// that end stand last. The laws are two of one market, of one rule set or of two; versions that read alike are the same.
func Changes(was, is *Law) []Change {
	type side struct {
		head *Head
		body any
	}
	before := map[string]side{}
	was.Each(func(_, id string, h *Head, body any) { before[id] = side{h, body} })
	out := []Change{}
	put := func(c Change, b, a any) { out = append(out, c.finish(is.Market.Jurisdiction, b, a)) }
	is.Each(func(kind, id string, h *Head, body any) {
		switch old, ok := before[id]; {
		case !ok:
			put(Change{Kind: kind, ID: id, Effect: Begins, Is: h}, nil, nil)
		case old.head != h && !alike(old.head, h, old.body, body):
			put(Change{Kind: kind, ID: id, Effect: Replaced, Was: old.head, Is: h}, old.body, body)
		}
		delete(before, id)
	})
	was.Each(func(kind, id string, h *Head, _ any) {
		if _, ends := before[id]; ends {
			put(Change{Kind: kind, ID: id, Effect: Ends, Was: h}, nil, nil)
		}
	})
	return out
}

// alike tells whether two versions say the same in every member.
func alike(was, is *Head, old, now any) bool {
	return len(members(was, is)) == 0 && len(members(old, now)) == 0
}

// finish compares the bodies, where there are two, and says what was found.
func (c Change) finish(jurisdiction string, was, is any) Change {
	c.Jurisdiction = jurisdiction
	c.Members = slices.Concat([]Member{}, members(was, is), c.Members)
	c.Says = c.says()
	return c
}

// members compares two values of a struct type, member by member of their JSON.
func members(was, is any) []Member {
	if was == nil || is == nil {
		return nil
	}
	old, now := object(was), object(is)
	names := sorted(old)
	for name := range now {
		if _, ok := old[name]; !ok {
			names = append(names, name)
		}
	}
	slices.Sort(names)
	var out []Member
	for _, name := range names {
		if m := (Member{name, old[name], now[name]}); string(m.Was) != string(m.Is) {
			out = append(out, m)
		}
	}
	return out
}

// object is the JSON of a value's members. What was read can be written: an error leaves the object empty.
func object(v any) map[string]jsontext.Value {
	b, err := json.Marshal(v, json.Deterministic(true))
	out := map[string]jsontext.Value{}
	if err == nil {
		err = json.Unmarshal(b, &out)
	}
	if err != nil {
		return nil
	}
	return out
}
