package main

import (
	"compress/gzip"
	"encoding/csv"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
)

// table is a CSV file with a heading.
type table struct {
	name    string
	columns map[string]int
	heading []string
	rows    [][]string
}

func (t *table) cell(row []string, column string) string { return row[t.columns[column]] }

// tables are the published files.
type tables struct {
	wide, long, weights, footnotes     *table
	groups, sources, derivations, list *table
	retention                          *table
}

func load(dir string) (*tables, error) {
	t := &tables{}
	files := []struct {
		into **table
		path string
		want string // columns that must be there
	}{
		{&t.wide, "sr28/composition.csv", "ndb_no food_group description short_description sci_name refuse_pct n_factor pro_factor fat_factor cho_factor n255"},
		{&t.long, "sr28/usda_sr28_composition_long.csv.gz", "ndb_no nutr_no amount_per_100g n_data_points std_error src_cd deriv_cd ref_ndb_no min max"},
		{&t.weights, "sr28/household_weights.csv", "ndb_no seq amount measure grams n_data_points std_dev"},
		{&t.footnotes, "sr28/usda_sr28_footnotes.csv", "ndb_no footnote_no type nutr_no text"},
		{&t.groups, "sr28/food_groups.csv", "food_group name"},
		{&t.sources, "sr28/source_codes.csv", "src_cd meaning"},
		{&t.derivations, "sr28/derivation_codes.csv", "deriv_cd meaning"},
		{&t.list, "sr28/nutrients.csv", "nutr_no unit decimals"},
		{&t.retention, "retention.csv", "retention_code description n301"},
	}
	for _, f := range files {
		one, err := readTable(filepath.Join(dir, filepath.FromSlash(f.path)))
		if err != nil {
			return nil, err
		}
		for _, column := range strings.Fields(f.want) {
			if _, ok := one.columns[column]; !ok {
				return nil, fmt.Errorf("%s: no column %s", f.path, column)
			}
		}
		*f.into = one
	}
	return t, nil
}

func readTable(path string) (*table, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	var in io.Reader = f
	if strings.HasSuffix(path, ".gz") {
		if in, err = gzip.NewReader(f); err != nil {
			return nil, fmt.Errorf("%s: %w", path, err)
		}
	}
	records, err := csv.NewReader(in).ReadAll()
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	if len(records) == 0 {
		return nil, fmt.Errorf("%s: empty", path)
	}
	t := &table{name: filepath.Base(path), heading: records[0], rows: records[1:], columns: map[string]int{}}
	for i, column := range t.heading {
		t.columns[column] = i
	}
	return t, nil
}

// byFood groups the rows of a table by their NDB number.
func (t *table) byFood() map[string][][]string {
	m := map[string][][]string{}
	for _, row := range t.rows {
		ndb := t.cell(row, "ndb_no")
		m[ndb] = append(m[ndb], row)
	}
	return m
}
