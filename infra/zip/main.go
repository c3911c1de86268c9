// Command zip packs one program as the bootstrap of a Lambda function. The same program gives the same archive, byte for byte:
// one entry, executable, with a fixed time.
//
// Usage: zip OUT.zip PROGRAM
package main

import (
	"archive/zip"
	"bytes"
	"fmt"
	"os"
	"time"
)

func main() {
	if len(os.Args) != 3 {
		fmt.Fprintln(os.Stderr, "usage: zip OUT.zip PROGRAM")
		os.Exit(2)
	}
	if err := pack(os.Args[1], os.Args[2]); err != nil {
		fmt.Fprintln(os.Stderr, "zip:", err)
		os.Exit(1)
	}
}

func pack(out, program string) error {
	b, err := os.ReadFile(program)
	if err != nil {
		return err
	}
	var archive bytes.Buffer
	w := zip.NewWriter(&archive)
	// The earliest time the format can say.
	h := &zip.FileHeader{Name: "bootstrap", Method: zip.Deflate, Modified: time.Date(1980, 1, 1, 0, 0, 0, 0, time.UTC)}
	h.SetMode(0o755)
	entry, err := w.CreateHeader(h)
	if err != nil {
		return err
	}
	if _, err := entry.Write(b); err != nil {
		return err
	}
	if err := w.Close(); err != nil {
		return err
	}
	return os.WriteFile(out, archive.Bytes(), 0o644)
}
