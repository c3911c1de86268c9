package main

import (
	"fmt"
	"io"
	"strconv"

	"gramlaw/internal/food"
)

// checker compares cells of the tables with answers of package food.
type checker struct {
	cells, values, absent int
	err                   error
}

// same counts a cell and keeps the first difference.
func (c *checker) same(where, published, answered string) {
	c.cells++
	if published != answered && c.err == nil {
		c.err = fmt.Errorf("%s: published %q, embedded %q", where, published, answered)
	}
}

func compare(t *tables, report io.Writer) error {
	c := &checker{}
	weights, notes := t.weights.byFood(), t.footnotes.byFood()
	for _, row := range t.wide.rows {
		f, err := food.Find("sr:" + row[0])
		if err != nil {
			return err
		}
		c.head(t, row, f)
		c.wide(t.wide, row, f)
		c.weights(t.weights, weights[row[0]], f)
		c.footnotes(t.footnotes, notes[row[0]], f)
	}
	c.long(t.long)
	c.each(t)
	c.codes(t)
	c.retention(t.retention)
	if c.err != nil {
		return c.err
	}
	_, err := fmt.Fprintf(report, "foods %d, components %d, values %d, empty cells %d, household weights %d, footnotes %d, retention codes %d: %d cells compared, none differs\n",
		len(t.wide.rows), len(t.list.rows), c.values, c.absent, len(t.weights.rows), len(t.footnotes.rows), len(t.retention.rows), c.cells)
	return err
}

func optional(n food.Number, ok bool) string {
	if !ok {
		return ""
	}
	return n.String()
}

func (c *checker) head(t *tables, row []string, f food.Food) {
	where := "food " + row[0]
	for column, answer := range map[string]string{
		"ndb_no": f.Ref()[len("sr:"):], "food_group": f.Group().Code, "description": f.Name(), "short_description": f.ShortName(),
		"sci_name": f.ScientificName(), "refuse_pct": optional(f.Refuse()), "n_factor": optional(f.NitrogenFactor()),
		"pro_factor": optional(f.ProteinEnergy()), "fat_factor": optional(f.FatEnergy()), "cho_factor": optional(f.CarbohydrateEnergy()),
	} {
		c.same(where+" "+column, t.wide.cell(row, column), answer)
	}
}

func (c *checker) wide(t *table, row []string, f food.Food) {
	for i, column := range t.heading {
		number, ok := component(column)
		if !ok {
			continue
		}
		id, err := byNumber(number)
		if err != nil {
			c.err = err
			return
		}
		v, ok := f.Value(id.ID)
		c.same("food "+row[0]+" "+column, row[i], optional(v.Number, ok))
		if row[i] == "" {
			c.absent++
		}
	}
}

func (c *checker) long(t *table) {
	for _, row := range t.rows {
		id, err := byNumber(t.cell(row, "nutr_no"))
		if err != nil {
			c.err = err
			return
		}
		f, err := food.Find("sr:" + t.cell(row, "ndb_no"))
		if err != nil {
			c.err = err
			return
		}
		v, ok := f.Value(id.ID)
		where := "food " + t.cell(row, "ndb_no") + " nutrient " + t.cell(row, "nutr_no") + " "
		c.same(where+"amount", t.cell(row, "amount_per_100g"), optional(v.Number, ok))
		c.detail(t, row, where, v)
		c.values++
	}
}

func (c *checker) detail(t *table, row []string, where string, v food.Value) {
	reference := ""
	if v.Reference != 0 {
		reference = fmt.Sprintf("%05d", v.Reference)
	}
	c.same(where+"samples", t.cell(row, "n_data_points"), strconv.Itoa(v.Samples))
	c.same(where+"standard error", t.cell(row, "std_error"), optional(v.StdErr, v.HasStdErr))
	c.same(where+"min", t.cell(row, "min"), optional(v.Min, v.HasMin))
	c.same(where+"max", t.cell(row, "max"), optional(v.Max, v.HasMax))
	c.same(where+"source", t.cell(row, "src_cd"), strconv.Itoa(int(v.Source)))
	c.same(where+"derivation", t.cell(row, "deriv_cd"), v.Derivation.Code())
	c.same(where+"reference", t.cell(row, "ref_ndb_no"), reference)
}

// each checks that Each tells the same as Value, in order.
func (c *checker) each(t *tables) {
	total := 0
	for f := range food.All {
		last := food.ID(0)
		for id, v := range f.Each {
			alone, ok := f.Value(id)
			if id <= last || !ok || alone != v {
				c.err = fmt.Errorf("%s: Each and Value differ at %d", f.Ref(), id)
			}
			last = id
			total++
		}
	}
	c.same("values by Each", strconv.Itoa(len(t.long.rows)), strconv.Itoa(total))
}

func (c *checker) weights(t *table, rows [][]string, f food.Food) {
	weights := f.Weights()
	c.same(f.Ref()+" weights", strconv.Itoa(len(rows)), strconv.Itoa(len(weights)))
	for i, row := range rows[:min(len(rows), len(weights))] {
		w, where := weights[i], f.Ref()+" weight "
		samples := ""
		if w.HasSamples {
			samples = strconv.Itoa(w.Samples)
		}
		c.same(where+"sequence", t.cell(row, "seq"), strconv.Itoa(w.Sequence))
		c.same(where+"amount", leadingZero(t.cell(row, "amount")), w.Amount.String())
		c.same(where+"measure", t.cell(row, "measure"), w.Measure)
		c.same(where+"grams", leadingZero(t.cell(row, "grams")), w.Grams.String())
		c.same(where+"samples", t.cell(row, "n_data_points"), samples)
		c.same(where+"standard deviation", leadingZero(t.cell(row, "std_dev")), optional(w.StdDev, w.HasStdDev))
	}
}

// leadingZero writes ".5" as "0.5".
func leadingZero(cell string) string {
	if cell != "" && cell[0] == '.' {
		return "0" + cell
	}
	return cell
}

func (c *checker) footnotes(t *table, rows [][]string, f food.Food) {
	notes := f.Footnotes()
	c.same(f.Ref()+" footnotes", strconv.Itoa(len(rows)), strconv.Itoa(len(notes)))
	for i, row := range rows[:min(len(rows), len(notes))] {
		n, about := notes[i], ""
		if n.USDA != 0 {
			about = strconv.Itoa(n.USDA)
		}
		c.same(f.Ref()+" footnote number", t.cell(row, "footnote_no"), fmt.Sprintf("%02d", n.Number))
		c.same(f.Ref()+" footnote type", t.cell(row, "type"), string(n.Type))
		c.same(f.Ref()+" footnote nutrient", t.cell(row, "nutr_no"), about)
		c.same(f.Ref()+" footnote", t.cell(row, "text"), n.Text)
	}
}

func (c *checker) codes(t *tables) {
	for i, g := range food.Groups() {
		c.same("group", t.groups.rows[i][0], g.Code)
		c.same("group", t.groups.rows[i][1], g.Name)
	}
	for _, row := range t.sources.rows {
		code, _ := strconv.Atoi(row[0])
		c.same("source "+row[0], row[1], food.Source(code).Meaning())
	}
	for i, row := range t.derivations.rows {
		c.same("derivation", row[0], food.Derivation(i+1).Code())
		c.same("derivation", row[1], food.Derivation(i+1).Meaning())
	}
}

func (c *checker) retention(t *table) {
	for _, row := range t.rows {
		r, _ := food.RetentionCode(row[0])
		c.same("retention code", row[0], r.Code())
		c.same("retention "+row[0], row[1], r.Description())
		for i, column := range t.heading[2:] {
			number, _ := component(column)
			for _, usda := range covered(number) {
				id, err := byNumber(usda)
				if err != nil {
					c.err = err
					return
				}
				percent, _ := r.Percent(id.ID)
				c.same("retention "+row[0]+" "+usda, row[i+2], strconv.Itoa(percent))
			}
		}
	}
}

// covered lists the nutrients of a retention column.
func covered(number string) []string {
	if number == "392" {
		return []string{"319", "320"}
	}
	return []string{number}
}
