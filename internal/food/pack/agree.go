package main

import (
	"fmt"
	"strconv"
	"strings"

	"gramlaw/internal/food"
)

// agree checks that the two composition tables say the same, and that the
// register fits the published list of components.
func agree(t *tables) error {
	if err := registered(t.list); err != nil {
		return err
	}
	cells := map[[2]string]string{}
	for _, row := range t.wide.rows {
		for i, column := range t.wide.heading {
			if number, ok := component(column); ok && row[i] != "" {
				cells[[2]string{row[0], number}] = row[i]
			}
		}
	}
	for _, row := range t.long.rows {
		key := [2]string{t.long.cell(row, "ndb_no"), t.long.cell(row, "nutr_no")}
		if amount := t.long.cell(row, "amount_per_100g"); cells[key] != amount {
			return fmt.Errorf("food %s nutrient %s: %q in the wide table, %q in the long one", key[0], key[1], cells[key], amount)
		}
		delete(cells, key)
	}
	if len(cells) > 0 {
		return fmt.Errorf("%d values of the wide table are not in the long one", len(cells))
	}
	return nil
}

// component tells the USDA number of a column of the wide table.
func component(column string) (string, bool) {
	number, ok := strings.CutPrefix(column, "n")
	if _, err := strconv.Atoi(number); err != nil || !ok {
		return "", false
	}
	return number, true
}

func registered(list *table) error {
	if len(list.rows) != food.SRCount {
		return fmt.Errorf("%s: %d components, the register has %d", list.name, len(list.rows), food.SRCount)
	}
	for i, row := range list.rows {
		c, err := byNumber(list.cell(row, "nutr_no"))
		if err != nil {
			return err
		}
		if int(c.ID) != i+1 || string(c.Unit) != list.cell(row, "unit") || strconv.Itoa(c.Decimals) != list.cell(row, "decimals") {
			return fmt.Errorf("%s: nutrient %d does not fit the register's %s", list.name, c.USDA, c.Tag)
		}
	}
	return nil
}

func byNumber(number string) (food.Component, error) {
	n, err := strconv.Atoi(number)
	if err != nil {
		return food.Component{}, err
	}
	c, ok := food.ByUSDANumber(n)
	if !ok {
		return food.Component{}, fmt.Errorf("nutrient %s is not in the register", number)
	}
	return c, nil
}
