package recheck_test

import (
	"context"
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"testing"

	"gocloud.dev/blob"
)

// foods are of every kind: grains, fats, dairy, sugar, fish, fruit, nuts, salt.
var foods = []string{"sr:20038", "sr:20081", "sr:04053", "sr:01145", "sr:19335", "sr:15046", "sr:09003", "sr:12061", "sr:02047", "sr:01077", "sr:04047", "sr:20036", "sr:01123", "sr:14429", "sr:05062", "sr:18069"}

// generated is an invented recipe, always the same for a number: 5 to 20 foods, sometimes an oil by specification, a claim or two.
func generated(n int) []byte {
	rnd := rand.New(rand.NewPCG(20260101, uint64(n)))
	var in []any
	for i := range 5 + rnd.IntN(15) {
		in = append(in, map[string]any{"id": fmt.Sprint("i", i), "amount": fmt.Sprintf("%d.%d g", 1+rnd.IntN(200), rnd.IntN(10)), "food": foods[rnd.IntN(len(foods))]})
	}
	if rnd.IntN(3) == 0 {
		in = append(in, map[string]any{"id": "oil", "amount": fmt.Sprintf("%d g", 1+rnd.IntN(50)), "process": "refined", "composition": map[string]any{
			"components":  map[string]string{"FAT": "100 g", "WATER": "0 g", "PROCNT": "0 g", "CHOCDF": "0 g", "FIBTG": "0 g", "SUGAR": "0 g", "SUGAD": "0 g", "CHOLE": "0 mg", "NA": "0 mg"},
			"fatty_acids": map[string]any{"basis": "percent of FAME", "complete": true, "profile": map[string]string{"16:0": fmt.Sprintf("%d.4", 4+rnd.IntN(5)), "18:0": "2.1", "18:1 9c": "60.2", "18:2 9c,12c": "20.3", "18:3 n-3": "9.1"}}}})
	}
	claims := []string{"fat-low", "saturated-fat-low", "sugars-low", "fibre-source", "protein-source", "trans-fat-free", "omega-3-source", "energy-low"}
	rnd.Shuffle(len(claims), func(i, j int) { claims[i], claims[j] = claims[j], claims[i] })
	var asked []any
	for _, c := range claims[:rnd.IntN(4)] {
		asked = append(asked, map[string]any{"claim": c})
	}
	recipe := map[string]any{"id": fmt.Sprint("product-", n), "name": fmt.Sprint("Product ", n), "ingredients": in,
		"serving": map[string]any{"default": map[string]any{"amount": fmt.Sprintf("%d g", 15+rnd.IntN(200))}}, "reference_amount": map[string]any{"default": "55 g"}, "state": map[string]any{"default": "solid"}}
	if len(asked) > 0 {
		recipe["claims"] = asked
	}
	doc, err := json.Marshal(recipe)
	if err != nil {
		panic(err)
	}
	return doc
}

// fill puts generated recipes into a bucket.
func fill(t testing.TB, b *blob.Bucket, n int) {
	t.Helper()
	for i := range n {
		put(t, b, fmt.Sprintf("line-%d/product-%06d.json", i%7, i), generated(i))
	}
}

func put(t testing.TB, b *blob.Bucket, key string, doc []byte) {
	t.Helper()
	if err := b.WriteAll(context.Background(), key, doc, nil); err != nil {
		t.Fatal(err)
	}
}
