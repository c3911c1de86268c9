package check_test

import (
	"encoding/json"
	"fmt"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
)

// document writes a recipe of n ingredients, three of them oils with a profile in % of FAME, the rest foods of the open table.
func document(n int) []byte {
	profile := map[string]string{"14:0": "0.1", "16:0": "4.6", "18:0": "1.7", "20:0": "0.6", "22:0": "0.3", "16:1 9c": "0.2", "18:1 9c": "59.6", "18:1 11c": "3.2",
		"20:1 11c": "1.2", "18:2 9c,12c": "19.0", "18:3 n-3": "9.3", "18:2 t": "0.1", "18:3 t": "0.1"}
	zeros := map[string]string{"FAT": "100 g", "WATER": "0 g", "PROCNT": "0 g", "CHOCDF": "0 g", "FIBTG": "0 g", "SUGAR": "0 g", "SUGAD": "0 g", "ALC": "0 g", "CHOLE": "0 mg", "NA": "0 mg"}
	foods := []string{"sr:08120", "sr:20081", "sr:19335", "sr:01145", "sr:01123", "sr:01088", "sr:02047", "sr:11215", "sr:09152", "sr:15046", "sr:12061", "sr:18372", "sr:01053", "sr:20027", "sr:11282", "sr:02046", "sr:19165"}
	var in []any
	for i := range n {
		one := map[string]any{"id": fmt.Sprint("i", i), "name": fmt.Sprint("ingredient ", i), "amount": fmt.Sprintf("%d.%d g", 10+i%90, i%10)}
		if i < 3 {
			profile["18:1 9c"] = fmt.Sprintf("59.%d", i+5)
			clone := map[string]string{}
			for k, v := range profile {
				clone[k] = v
			}
			one["process"] = "refined"
			one["composition"] = map[string]any{"components": zeros, "fatty_acids": map[string]any{"basis": "percent of FAME", "profile": clone, "complete": true}}
		} else {
			one["food"] = foods[i%len(foods)]
		}
		in = append(in, one)
	}
	doc, err := json.Marshal(map[string]any{"id": "bench", "name": "Bench", "ingredients": in, "serving": map[string]any{"default": map[string]any{"amount": "30 g"}},
		"reference_amount": map[string]any{"default": "30 g"}, "state": map[string]any{"default": "solid"},
		"claims": []any{map[string]any{"claim": "fat-low"}, map[string]any{"claim": "saturated-fat-low"}, map[string]any{"claim": "omega-3-source"}, map[string]any{"claim": "trans-fat-free"}}})
	if err != nil {
		panic(err)
	}
	return doc
}

// Decoding and checking in all markets of the set.
func BenchmarkDecodeAndCheck(b *testing.B) {
	rules := book(b)
	for _, n := range []int{10, 20, 100, 1000} {
		doc := document(n)
		b.Run(fmt.Sprint(n, " ingredients"), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				r, faults := recipe.Decode(doc)
				if len(faults) > 0 {
					b.Fatal(faults)
				}
				if _, faults := check.Check(r, rules, check.Request{On: "2026-12-01"}); len(faults) > 0 {
					b.Fatal(faults)
				}
			}
		})
	}
}
