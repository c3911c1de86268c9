// Command pack turns the published CSV tables into the embedded files of package
// food, or with -verify compares every cell of the tables with what package
// food answers. The packed form is described in package layout.
//
// DIR holds retention.csv and a folder sr28 with composition.csv,
// usda_sr28_composition_long.csv.gz and the code lists. To pack for the first
// time, empty sr28.bin and retention.bin must exist, for package food embeds
// them.
package main

import (
	"flag"
	"fmt"
	"io"
	"log"
	"os"
	"path/filepath"
)

func main() {
	log.SetFlags(0)
	from := flag.String("from", "", "folder with the published tables")
	out := flag.String("out", "sr28.bin", "packed composition")
	retention := flag.String("retention", "", "packed retention factors, default retention.bin beside -out")
	verify := flag.Bool("verify", false, "compare the tables with the embedded files instead of packing")
	flag.Parse()
	if *retention == "" {
		*retention = filepath.Join(filepath.Dir(*out), "retention.bin")
	}
	if err := run(*from, *out, *retention, *verify, os.Stdout); err != nil {
		log.Fatalf("pack: %v", err)
	}
}

func run(from, out, retention string, verify bool, report io.Writer) error {
	tables, err := load(from)
	if err != nil {
		return err
	}
	if err := agree(tables); err != nil {
		return err
	}
	if verify {
		return compare(tables, report)
	}
	packed, err := pack(tables)
	if err != nil {
		return err
	}
	factors, err := packRetention(tables.retention)
	if err != nil {
		return err
	}
	fmt.Fprintf(report, "%s %d bytes, %s %d bytes\n", out, len(packed), retention, len(factors))
	if err := os.WriteFile(out, packed, 0o644); err != nil {
		return err
	}
	return os.WriteFile(retention, factors, 0o644)
}
