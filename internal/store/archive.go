package store

import (
	"archive/zip"
	"bytes"
	"compress/flate"
	"fmt"
	"io"

	"gramlaw/internal/rulebook"
)

// What an archive may hold. Files and set have the bounds of rulebook.
const (
	maxArchive = 16 << 20
	maxFiles   = 1000
)

// pack writes the files into a zip archive, in the order of their names and without times: one set, one archive.
func pack(files rulebook.Files) ([]byte, error) {
	var out bytes.Buffer
	z := zip.NewWriter(&out)
	z.RegisterCompressor(zip.Deflate, func(w io.Writer) (io.WriteCloser, error) { return flate.NewWriter(w, flate.BestCompression) })
	for _, name := range files.Names() {
		w, err := z.CreateHeader(&zip.FileHeader{Name: name, Method: zip.Deflate})
		if err != nil {
			return nil, err
		}
		if _, err := w.Write(files[name]); err != nil {
			return nil, err
		}
	}
	if err := z.Close(); err != nil {
		return nil, err
	}
	if out.Len() > maxArchive {
		return nil, tooLarge("the archive", maxArchive)
	}
	return out.Bytes(), nil
}

// unpack reads an archive that anybody may have written. Names are checked by rulebook: a file that has no place in a set is
// refused there.
func unpack(archive []byte) (rulebook.Files, error) {
	z, err := zip.NewReader(bytes.NewReader(archive), int64(len(archive)))
	if err != nil {
		return nil, err
	}
	if len(z.File) > maxFiles {
		return nil, fmt.Errorf("holds %d files; %d are the most", len(z.File), maxFiles)
	}
	files, left := rulebook.Files{}, int64(rulebook.MaxSet)
	for _, f := range z.File {
		if _, twice := files[f.Name]; twice {
			return nil, fmt.Errorf("%s: stands twice", f.Name)
		}
		b, err := unpackFile(f, min(left, rulebook.MaxFile))
		if err != nil {
			return nil, fmt.Errorf("%s: %w", f.Name, err)
		}
		files[f.Name], left = b, left-int64(len(b))
	}
	return files, nil
}

// unpackFile believes no size but what it has counted.
func unpackFile(f *zip.File, limit int64) ([]byte, error) {
	r, err := f.Open()
	if err != nil {
		return nil, err
	}
	defer r.Close()
	b, err := io.ReadAll(io.LimitReader(r, limit+1))
	if err == nil && int64(len(b)) > limit {
		err = fmt.Errorf("is larger than %d bytes", limit)
	}
	return b, err
}
