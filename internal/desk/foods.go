package desk

import (
	"bytes"
	"fmt"
	"strings"

	"gramlaw/internal/food"
	"gramlaw/internal/render"
)

const foodsUsage = `Searches the open food table (USDA SR28) by words of the name, or shows one food
of it with every published value.

Usage: desk foods [flags] TEXT
       desk foods sr:04053

Values are per 100 g of edible portion.
`

const mostFoods = 1000

type foodsOptions struct{ limit int }

func foodsFlags(o *foodsOptions) *flags {
	f := newFlags("foods")
	f.IntVar(&o.limit, "n", 20, "list at most `N` foods, 1 to 1000 (without it 20)")
	return f
}

// runFoods lists foods, or shows one.
func runFoods(c *call) (int, error) {
	var o foodsOptions
	args, err := foodsFlags(&o).parse(c.args)
	if err != nil {
		return 0, err
	}
	text := strings.Join(args, " ")
	switch {
	case strings.TrimSpace(text) == "":
		return 0, fmt.Errorf("words of a food's name or a reference such as sr:04053 are wanted; desk foods -h tells more")
	case o.limit < 1 || o.limit > mostFoods:
		return 0, fmt.Errorf("-n: %d is not between 1 and %d", o.limit, mostFoods)
	}
	var b bytes.Buffer
	if strings.HasPrefix(text, "sr:") {
		one, err := food.Find(text)
		if err != nil {
			return 0, err
		}
		err = render.Food(&b, one)
		if err != nil {
			return 0, err
		}
	} else {
		found := food.Search(text, o.limit)
		if len(found) == 0 {
			return 0, fmt.Errorf("no food of the table has all of these words: %q", text)
		}
		if err := render.Foods(&b, found, len(found) == o.limit); err != nil {
			return 0, err
		}
	}
	_, err = b.WriteTo(c.stdout)
	return AllWell, err
}
