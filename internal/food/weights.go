package food

// Weight is a household measure of a food in grams.
type Weight struct {
	Sequence   int
	Amount     Number // how many of the measure, e.g. 1 or 0.25
	Measure    string // "cup", "tbsp", as published
	Grams      Number
	Samples    int // 0 where not published
	HasSamples bool
	StdDev     Number // of the grams
	HasStdDev  bool
}

// Footnote is a published remark on a food or on one of its values.
type Footnote struct {
	Number int
	Type   byte // D description, M measure, N nutrient
	About  ID   // the component of an N footnote, 0 otherwise
	USDA   int  // its USDA nutrient number as published, 0 otherwise
	Text   string
}

// Weights lists the household measures in the published order.
func (f Food) Weights() []Weight {
	if f.tail == "" {
		return nil
	}
	r := reader{s: f.tail}
	weights := make([]Weight, 0, 4)
	for range r.number() {
		weights = append(weights, readWeight(&r))
	}
	return weights
}

func readWeight(r *reader) Weight {
	w := Weight{Sequence: r.number()}
	decimals := r.byte()
	w.Amount = Number{int64(r.number()), -int8(decimals >> 4)}
	w.Measure = text(r.number())
	w.Grams = Number{int64(r.number()), -int8(decimals & 15)}
	if n := r.number(); n > 0 {
		w.Samples, w.HasSamples = n-1, true
	}
	if n := r.number(); n > 0 {
		w.StdDev, w.HasStdDev = Number{int64(n - 1), -int8(r.byte())}, true
	}
	return w
}

// Footnotes lists the remarks on the food.
func (f Food) Footnotes() []Footnote {
	if f.tail == "" {
		return nil
	}
	r := reader{s: f.tail}
	for range r.number() {
		readWeight(&r)
	}
	var notes []Footnote
	for range r.number() {
		n := Footnote{Number: r.number(), Type: r.byte(), USDA: r.number()}
		n.Text = text(r.number())
		if c, ok := ByUSDANumber(n.USDA); ok {
			n.About = c.ID
		}
		notes = append(notes, n)
	}
	return notes
}
