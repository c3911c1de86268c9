package wording

import (
	"slices"
	"strings"
)

// compare gives the frames before a comparison, or else those after it, the food compared with.
func (r *reader) compare(frames []Frame) []Frame {
	for i := 0; i < len(r.tokens); i++ {
		end := r.comparing(frames, i)
		if end == 0 {
			continue
		}
		before, after := r.around(frames, i)
		upTo := r.reference(end, frames, len(before) > 0)
		if len(before) == 0 {
			before = after
		}
		for _, k := range before {
			r.compareWith(&frames[k], i, end, upTo)
		}
		frames = slices.DeleteFunc(frames, func(f Frame) bool { return f.from >= end && f.from < upTo })
		i = max(end, upTo) - 1
	}
	return frames
}

// comparing is where words end that begin a comparison at a token; 0 where none do, or where another pattern has read them.
func (r *reader) comparing(frames []Frame, at int) int {
	means, end := r.compares.longest(r.ids, at)
	if end == 0 {
		return 0
	}
	c, behind := r.comparisons[means], false
	for i := range frames {
		f := &frames[i]
		if f.from <= at && at < f.upTo {
			return 0
		}
		behind = behind || f.upTo == at && slices.Contains(c.behind, f.Relation)
	}
	if len(c.behind) > 0 && !behind {
		return 0
	}
	return end - c.ahead
}

// around lists the frames of a sentence before a token and behind it that compare with nothing yet.
func (r *reader) around(frames []Frame, at int) (before, after []int) {
	from, to := r.sentence(at)
	for k := range frames {
		switch f := &frames[k]; {
		case f.from < from || f.from >= to || f.Compares:
		case f.from < at:
			before = append(before, k)
		default:
			after = append(after, k)
		}
	}
	return before, after
}

func (r *reader) compareWith(f *Frame, marker, end, upTo int) {
	f.Compares = true
	if upTo > end {
		f.compared = r.span(end, upTo)
	}
	if f.upTo == marker {
		f.upTo = max(end, upTo)
		f.Span[1] = r.tokens[f.upTo-1].end
	}
}

// reference is where the name of a food ends that begins at a token. A frame ends it, but where nothing has joined it to what is compared.
func (r *reader) reference(at int, frames []Frame, swallows bool) int {
	for i := at; i < len(r.tokens); i++ {
		if r.tokens[i].kind == mark && strings.Contains(".!?;|•,:()", r.tokens[i].key) {
			return i
		}
		if r.joins[i].end > 0 {
			swallows = false
		}
		if !swallows && slices.ContainsFunc(frames, func(f Frame) bool { return f.from == i }) {
			return r.unjoined(i)
		}
	}
	return r.unjoined(len(r.tokens))
}

// unjoined goes back over conjunctions at the end.
func (r *reader) unjoined(at int) int {
	for at > 0 && r.joins[at-1].end == int32(at) {
		at--
	}
	return at
}
