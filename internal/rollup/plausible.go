package rollup

import (
	"fmt"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
)

var proximates = []string{"WATER", "PROCNT", "FAT", "CHOCDF", "ASH", "ALC"}

// plausible looks for what cannot be: it finds, it does not refuse, because official tables break these too.
func (b *Batch) plausible() {
	for _, l := range b.Leaves {
		if l.pure == 0 {
			b.proximates(l)
			b.partsAgainstWholes(l)
			b.acidsAgainstFat(l)
		}
	}
	wet := b.Total(food.Water)
	if wet.High().Sign() < 0 {
		short := wet.High().Neg()
		b.find(nil, "below-dry-matter", fmt.Sprintf("the finished food weighs less than the dry matter that went in: %s g more water is lost than there is", short.Brief(2)))
	}
}

func (b *Batch) find(l *Leaf, code, says string) {
	f := Finding{Code: code, Says: says}
	if l != nil {
		f.Pointer, f.Ingredient = l.Pointer, l.Path
	}
	b.Findings = append(b.Findings, f)
}

// proximates must not exceed 100 g per 100 g; rounding of six values allows half a gram.
func (b *Batch) proximates(l *Leaf) {
	var sum quantity.Ratio
	for _, tag := range proximates {
		c, _ := food.Lookup(tag)
		if l.known.Has(c.ID) {
			sum = sum.Add(l.entries[l.place[c.ID]-1].low())
		}
	}
	if sum.Cmp(quantity.Scaled(1005, -1)) > 0 {
		b.find(l, "over-100", fmt.Sprintf("water, protein, fat, carbohydrate, ash and alcohol add up to %s g per 100 g", sum.Brief(2)))
	}
}

// acidsAgainstFat compares fatty acids as triglycerides with the fat; official profiles go up to about 4 % over.
// Reference: USDA SR28 profiles; common practice, no source, for the 5 %.
func (b *Batch) acidsAgainstFat(l *Leaf) {
	if l.profile() == nil {
		return
	}
	var sum quantity.Ratio
	for _, a := range l.Acids() {
		sum = sum.Add(a.Triglyceride.Low())
	}
	most := l.Component(food.Fat).High()
	if sum.Cmp(most.Mul(quantity.Scaled(105, -2))) > 0 {
		b.find(l, "acids-over-fat", "the fatty acids, as triglycerides, are more than 5 % above the fat")
	}
}

// partsAgainstWholes finds a stated part above its stated whole, by more than 5 % and half a gram: published tables stay within that.
func (b *Batch) partsAgainstWholes(l *Leaf) {
	if l.IsFood {
		return
	}
	for id, ok := l.known.Next(0); ok; id, ok = l.known.Next(id) {
		for _, whole := range id.WithinList() {
			if !l.known.Has(whole) {
				continue
			}
			part, most := l.entries[l.place[id]-1].low(), l.entries[l.place[whole]-1].high()
			if part.Cmp(most.Mul(quantity.Scaled(105, -2)).Add(quantity.Scaled(5, -1))) > 0 {
				b.find(l, "part-over-whole", fmt.Sprintf("%s, %s g, is part of %s, %s g, and more than it", id.Tag(), part.Brief(2), whole.Tag(), most.Brief(2)))
			}
		}
	}
}
