// Command register turns register.csv, which people review, into a Go table that
// needs no work when a program starts. It checks the file as it goes: unknown
// or doubled tagnames, circles and contradictions are errors.
package main

import (
	"encoding/csv"
	"flag"
	"fmt"
	"log"
	"os"
	"strconv"
	"strings"
)

func main() {
	log.SetFlags(0)
	in := flag.String("in", "register.csv", "reviewed register")
	out := flag.String("out", "register_table.go", "generated Go file of components")
	orders := flag.String("orders", "register_orders.go", "generated Go file of their orders")
	flag.Parse()
	if err := run(*in, *out, *orders); err != nil {
		log.Fatalf("register: %v", err)
	}
}

func run(in, out, orders string) error {
	rows, err := read(in)
	if err != nil {
		return err
	}
	r, err := resolve(rows)
	if err != nil {
		return fmt.Errorf("%s: %w", in, err)
	}
	for file, write := range map[string]func() ([]byte, error){out: r.source, orders: r.orders} {
		source, err := write()
		if err != nil {
			return err
		}
		if err := os.WriteFile(file, source, 0o644); err != nil {
			return err
		}
	}
	return nil
}

// row is one line of register.csv.
type row struct {
	tag, unit, name, evidence, note, family string
	usda, decimals                          int
	own                                     bool
	aliases, within, disjoint               []string
}

func read(path string) ([]row, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		return nil, err
	}
	rows := make([]row, 0, len(records))
	for _, r := range records[1:] {
		one, err := parse(r)
		if err != nil {
			return nil, fmt.Errorf("%s: %w", r[0], err)
		}
		rows = append(rows, one)
	}
	return rows, nil
}

func parse(r []string) (row, error) {
	usda, err := number(r[3], 0)
	if err != nil {
		return row{}, err
	}
	decimals, err := number(r[4], -1)
	if err != nil {
		return row{}, err
	}
	return row{
		tag: r[0], unit: r[1], name: r[2], usda: usda, decimals: decimals,
		aliases: strings.Fields(r[5]), within: strings.Fields(r[6]), family: r[7],
		disjoint: strings.Fields(r[8]), own: r[9] == "yes", evidence: r[10], note: r[11],
	}, nil
}

func number(s string, empty int) (int, error) {
	if s == "" {
		return empty, nil
	}
	return strconv.Atoi(s)
}
