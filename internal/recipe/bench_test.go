package recipe

import (
	"fmt"
	"strings"
	"testing"
)

// A recipe of n ingredients of which the first three have a full profile.
func recipeOf(n int) []byte {
	var b strings.Builder
	b.WriteString(`{"id":"x","name":"x","ingredients":[`)
	for i := range n {
		if i > 0 {
			b.WriteByte(',')
		}
		fmt.Fprintf(&b, `{"id":"i%d","name":"ingredient %d","amount":"%d.5 g",`, i, i, i+1)
		if i < 3 {
			b.WriteString(`"composition":{"source":"specification","components":{"FAT":"99.9 g","WATER":"0.1 g","CHOLE":"<1 mg","ENERC_KCAL":"899 kcal"},"fatty_acids":` + oil + `}}`)
		} else {
			b.WriteString(`"food":"sr:20038","with":{"FATRN":"0 g"}}`)
		}
	}
	b.WriteString(`],"yield":{"mass":"10 g"},"serving":{"default":{"amount":"30 g"}},"claims":[{"claim":"fat-low","in":["us","eu"]}]}`)
	return []byte(b.String())
}

const oil = `{"basis":"percent of FAME","profile":{"4:0":"0.1","6:0":"0.1","8:0":"0.2","10:0":"0.3","12:0":"1.2","14:0":"3.4","14:1 9c":"<0.1",
	"15:0":"0.3","16:0":"22.1","16:1 9c":"0.8","17:0":"0.2","18:0":"8.2","18:1 9c":"33.0","18:1 11c":"1.1","18:1 t":"0.9","18:2 9c,12c":"21.5",
	"18:2 conjugated":"<0.1","18:3 9c,12c,15c":"1.9","18:3 6c,9c,12c":"0.2","20:0":"0.4","20:1 11c":"0.3","20:4 5c,8c,11c,14c":"0.1","EPA":"0.1","22:0":"0.3",
	"22:1 13c":"0.1","DHA":"0.1","24:0":"0.2","unidentified":"1.8"}}`

func benchmark(b *testing.B, doc []byte, accepted bool) {
	b.SetBytes(int64(len(doc)))
	b.ReportAllocs()
	for b.Loop() {
		if r, faults := Decode(doc); (r != nil) != accepted {
			b.Fatal(faults)
		}
	}
}

func BenchmarkDecode20Ingredients(b *testing.B)   { benchmark(b, recipeOf(20), true) }
func BenchmarkDecode1000Ingredients(b *testing.B) { benchmark(b, recipeOf(1000), true) }
func BenchmarkDecode2000Ingredients(b *testing.B) { benchmark(b, recipeOf(2000), true) }

// Refusing asks the schema as well.
func BenchmarkRefuseOneSlip(b *testing.B) {
	benchmark(b, []byte(strings.Replace(string(recipeOf(20)), `"amount"`, `"amout"`, 1)), false)
}

// The worst documents of 1 MiB that the bounds let through.
func BenchmarkRefuseMiB(b *testing.B) {
	fill := func(head, each, tail string) []byte {
		var s strings.Builder
		s.WriteString(head)
		for i := 0; s.Len()+len(each)+len(tail)+12 < MaxBytes; i++ {
			s.WriteString(strings.ReplaceAll(each, "#", fmt.Sprint(i)) + ",")
		}
		return []byte(strings.TrimSuffix(s.String(), ",") + tail)
	}
	b.Run("unknown members", func(b *testing.B) { benchmark(b, fill(`{`, `"#":1`, `}`), false) })
	b.Run("texts for ingredients", func(b *testing.B) { benchmark(b, fill(`{"ingredients":[`, `"        "`, `]}`), false) })
	b.Run("unknown components", func(b *testing.B) {
		benchmark(b, fill(`{"id":"x","ingredients":[{"id":"a","amount":"1 g","composition":{"components":{`, `"#":"1 g"`, `}}}]}`), false)
	})
	b.Run("profiles of groups", func(b *testing.B) {
		groups := strings.TrimSuffix(strings.Repeat(`"18:1":"0.1","18:1 t":"0.1","18:1 n-9":"0.1",`, 1), ",")
		var more strings.Builder
		for i := range MaxAcids - 3 {
			fmt.Fprintf(&more, `,"18:2 %d,%d":"0.1"`, 2+i/12, 3+i/12+i%12)
		}
		benchmark(b, fill(`{"id":"x","ingredients":[`, `{"id":"a","amount":"1 g","composition":{"fatty_acids":{"basis":"g per 100 g fat","profile":{`+groups+more.String()+`}}}}`, `]}`), false)
	})
}
