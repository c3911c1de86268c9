package render

import (
	"slices"
	"strings"
)

// A cell is a text in a table, wrapped where its column is too narrow.
type cell struct {
	text   string
	indent int
	right  bool
}

// A table is rows of cells in columns as wide as they need to be.
type table struct {
	gap  int // spaces between columns
	rows [][]cell
}

func (t *table) row(cells ...cell) { t.rows = append(t.rows, cells) }

// dropEmpty takes a column out that holds nothing below its head and its rule.
func (t *table) dropEmpty(column int) {
	for _, row := range t.rows[2:] {
		if row[column].text != "" {
			return
		}
	}
	for i := range t.rows {
		t.rows[i] = slices.Delete(t.rows[i], column, column+1)
	}
}

// rule is a row that draws a line under every column.
const rule = "\x00rule"

// table writes rows at an indentation; what is wider than the page wraps within its column.
func (p *page) table(indent int, t table) {
	widths := t.fit(Width - indent)
	for _, row := range t.rows {
		p.row(indent, t.gap, row, widths)
	}
}

// fit gives every column what it needs, and takes from the widest until all fit: first from columns that can give without
// breaking a word.
func (t *table) fit(most int) []int {
	widths, least := t.wanted()
	sum := t.gap * (len(widths) - 1)
	for _, w := range widths {
		sum += w
	}
	for ; sum > most; sum-- {
		i := widest(widths, least)
		if i < 0 {
			i = widest(widths, make([]int, len(widths)))
		}
		widths[i]--
	}
	return widths
}

// wanted is the width of every column on one line, and with a line for every word.
func (t *table) wanted() (widths, least []int) {
	for _, row := range t.rows {
		for i, c := range row {
			if i == len(widths) {
				widths, least = append(widths, 1), append(least, 1)
			}
			if c.text == rule {
				continue
			}
			text := clean(c.text)
			widths[i] = max(widths[i], c.indent+columns(text))
			for _, word := range strings.Split(text, " ") {
				least[i] = max(least[i], c.indent+columns(word))
			}
		}
	}
	return widths, least
}

// widest is the widest column above its least width, -1 where there is none.
func widest(widths, least []int) int {
	best := -1
	for i, w := range widths {
		if w > least[i] && (best < 0 || w > widths[best]) {
			best = i
		}
	}
	return best
}

func (p *page) row(indent, gap int, row []cell, widths []int) {
	columnsOf := make([][]string, len(row))
	height := 1
	for i, c := range row {
		columnsOf[i] = c.lines(widths[i])
		height = max(height, len(columnsOf[i]))
	}
	for n := range height {
		var b strings.Builder
		b.WriteString(strings.Repeat(" ", indent))
		for i := range row {
			if i > 0 {
				b.WriteString(strings.Repeat(" ", gap))
			}
			text := ""
			if n < len(columnsOf[i]) {
				text = columnsOf[i][n]
			}
			fill := strings.Repeat(" ", max(widths[i]-columns(text), 0))
			if row[i].right {
				text = fill + text
			} else {
				text += fill
			}
			b.WriteString(text)
		}
		p.put(b.String())
	}
}

func (c cell) lines(most int) []string {
	if c.text == rule {
		return []string{strings.Repeat("-", most)}
	}
	indent := min(c.indent, most/2)
	lines := wrap(c.text, most-indent)
	for i := range lines {
		lines[i] = strings.Repeat(" ", indent) + lines[i]
	}
	return lines
}
