package wording_test

import (
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"
)

// phrase200 has 200 characters.
const phrase200 = "Now with 50 % less saturated fat than our classic: low in sugar and salt, rich in fibre, vitamins A, C and D, no trans fat, 0 g trans fat per serving; free from palm oil. Keeps your heart healthy!!!!!"

func BenchmarkJudge200(b *testing.B) {
	book, e := engine(b)
	if n := utf8.RuneCountInString(phrase200); n != 200 {
		b.Fatalf("the phrase has %d characters", n)
	}
	for _, j := range book.Jurisdictions() {
		b.Run(j, func(b *testing.B) {
			law := lawOf(book, j)
			e.Judge(law, phrase200, "en") // compiles the wordings of the law
			b.ReportAllocs()
			for b.Loop() {
				if _, err := e.Judge(law, phrase200, "en"); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkHostile shows that twice the text takes twice the time.
func BenchmarkHostile(b *testing.B) {
	book, e := engine(b)
	law := lawOf(book, "eu")
	for name, piece := range map[string]string{"list": "fat and ", "head": "low in ", "denied": "not a ", "compared": "less fat than ", "health": "keeps your heart healthy and ", "amount": "5 g fat per 100 g, ", "marks": "\u0301"} {
		for _, n := range []int{500, 1000, 2000} {
			text := "x" + strings.Repeat(piece, (n-1)/utf8.RuneCountInString(piece))
			b.Run(name+"/"+strconv.Itoa(n), func(b *testing.B) {
				for b.Loop() {
					if _, err := e.Judge(law, text, "en"); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
