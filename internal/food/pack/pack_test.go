package main

import (
	"strconv"
	"strings"
	"testing"

	"gramlaw/internal/food"
)

func grid(name string, rows ...string) *table {
	t := &table{name: name, columns: map[string]int{}, heading: strings.Split(rows[0], ",")}
	for i, column := range t.heading {
		t.columns[column] = i
	}
	for _, row := range rows[1:] {
		t.rows = append(t.rows, strings.Split(row, ","))
	}
	return t
}

// published lists the components as the register has them.
func published() *table {
	t := grid("nutrients.csv", "nutr_no,unit,decimals")
	for _, c := range food.Components()[:food.SRCount] {
		t.rows = append(t.rows, []string{strconv.Itoa(c.USDA), string(c.Unit), strconv.Itoa(c.Decimals)})
	}
	return t
}

func TestAgree(t *testing.T) {
	wide := grid("wide", "ndb_no,n255,n605", "01001,15.87,", "01002,16.72,2.669")
	cases := []struct {
		name, says string
		long       *table
	}{
		{"the same", "", grid("long", "ndb_no,nutr_no,amount_per_100g", "01001,255,15.87", "01002,255,16.72", "01002,605,2.669")},
		{"another amount", "wide table", grid("long", "ndb_no,nutr_no,amount_per_100g", "01001,255,15.88", "01002,255,16.72", "01002,605,2.669")},
		{"a value more", "wide table", grid("long", "ndb_no,nutr_no,amount_per_100g", "01001,255,15.87", "01001,605,0.000", "01002,255,16.72", "01002,605,2.669")},
		{"a value less", "not in the long one", grid("long", "ndb_no,nutr_no,amount_per_100g", "01001,255,15.87", "01002,255,16.72")},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			err := agree(&tables{list: published(), wide: wide, long: c.long})
			if (err == nil) != (c.says == "") || (err != nil && !strings.Contains(err.Error(), c.says)) {
				t.Errorf("error %v, want %q", err, c.says)
			}
		})
	}
}

func TestRegisterMustFit(t *testing.T) {
	list := published()
	list.rows[3][1] = "kg"
	if err := registered(list); err == nil {
		t.Error("another unit passes")
	}
	list.rows = list.rows[:10]
	if err := registered(list); err == nil {
		t.Error("a short list passes")
	}
}

func TestDecimalsMustBeAsPublished(t *testing.T) {
	if n, err := exactly("0.050", 3); err != nil || n != 50 {
		t.Errorf("%d %v", n, err)
	}
	for _, cell := range []string{"0.05", "5", "", "x", "-0.050"} {
		if _, err := exactly(cell, 3); err == nil {
			t.Errorf("%q passes as three decimals", cell)
		}
	}
}

func TestRetentionRowsAreChecked(t *testing.T) {
	heading := "retention_code,description,n301,n392"
	if b, err := packRetention(grid("r", heading, "0003,B,90,80", "0001,A,100,75")); err != nil || len(b) != 8+4+4+2*9+2 {
		t.Errorf("%d bytes, %v", len(b), err)
	}
	for name, row := range map[string]string{"over 100": "0001,A,101,75", "empty": "0001,A,,75", "code": "01,A,100,75"} {
		if _, err := packRetention(grid("r", heading, row)); err == nil {
			t.Errorf("%s passes", name)
		}
	}
	if _, err := packRetention(grid("r", heading, "0001,A,100,75", "0001,A,100,75")); err == nil {
		t.Error("a doubled code passes")
	}
}
