package store_test

import (
	"archive/zip"
	"bytes"
	"errors"
	"io"
	"io/fs"
	"strings"
	"testing"
	"testing/fstest"

	"gocloud.dev/blob"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store"
)

type zipped struct{ name, text string }

// archive is a zip file of what stands there, whatever that is.
func archive(t *testing.T, files ...zipped) []byte {
	t.Helper()
	var out bytes.Buffer
	z := zip.NewWriter(&out)
	for _, f := range files {
		w, err := z.CreateHeader(&zip.FileHeader{Name: f.name, Method: zip.Deflate})
		if err != nil {
			t.Fatal(err)
		}
		if _, err := io.WriteString(w, f.text); err != nil {
			t.Fatal(err)
		}
	}
	if err := z.Close(); err != nil {
		t.Fatal(err)
	}
	return out.Bytes()
}

func filesOf(t *testing.T, fsys fs.FS) []zipped {
	t.Helper()
	files, err := rulebook.ReadFiles(fsys)
	if err != nil {
		t.Fatal(err)
	}
	var out []zipped
	for _, name := range files.Names() {
		out = append(out, zipped{name, string(files[name])})
	}
	return out
}

// digestOf is the digest that a set of these files has.
func digestOf(files []zipped) string {
	set := rulebook.Files{}
	for _, f := range files {
		set[f.name] = []byte(f.text)
	}
	return set.Digest()
}

func lay(t *testing.T, b *blob.Bucket, digest string, doc []byte) {
	t.Helper()
	if err := b.WriteAll(ctx, "rulesets/"+strings.TrimPrefix(digest, "sha256:")+"/rules.zip", doc, nil); err != nil {
		t.Fatal(err)
	}
}

func TestHostileSetsAreRefused(t *testing.T) {
	good := filesOf(t, set("1"))
	with := func(more ...zipped) []zipped { return append(good[:len(good):len(good)], more...) }
	whole := archive(t, good...)
	for _, c := range []struct {
		name  string
		files []zipped // the digest is right for these
		doc   []byte   // what lies there instead of their archive
		says  string
	}{
		{"a path upwards", with(zipped{"../claims.json", "{}"}), nil, "is not at"},
		{"a path upwards inside", with(zipped{"xx/../../claims.json", "{}"}), nil, "is not at"},
		{"a path from the root", with(zipped{"/etc/claims.json", "{}"}), nil, "is not at"},
		{"a path of another system", with(zipped{`..\claims.json`, "{}"}), nil, "is not at"},
		{"a path with nothing in it", with(zipped{"xx//claims.json", "{}"}), nil, "is not at"},
		{"a folder too deep", with(zipped{"xx/yy/claims.json", "{}"}), nil, "is not at"},
		{"a file of another kind", with(zipped{"xx/run.sh", "rm"}), nil, "is not at"},
		{"a file without an end", with(zipped{"xx/claims", "{}"}), nil, "is not at"},
		{"an unknown kind", with(zipped{"xx/magic.json", "{}"}), nil, "no known kind"},
		{"a lint failure", with(zipped{"xx/claims.json", `{"jurisdiction":"xx","rules":[{"id":"xx/claim/c","versions":[]}]}`}), nil, "is empty"},
		{"a huge file", with(zipped{"xx/claims.json", strings.Repeat(" ", rulebook.MaxFile+1)}), nil, "larger than"},
		{"many large files", with(many(9, rulebook.MaxFile)...), nil, "larger than"},
		{"very many files", with(many(1001, 1)...), nil, "are the most"},
		{"a file twice", nil, archive(t, with(good[0])...), "stands twice"},
		{"another set", good, archive(t, filesOf(t, set("2"))...), "the files have the digest"},
		{"a truncated archive", good, whole[:len(whole)-30], "zip"},
		{"an empty object", good, nil, "zip"},
		{"no archive", good, []byte("{}"), "zip"},
		{"a changed byte", good, flipped(whole), ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := open(t, "mem://")
			doc := c.doc
			if doc == nil && c.says != "zip" {
				doc = archive(t, c.files...)
			}
			digest := digestOf(c.files)
			lay(t, b, digest, doc)
			book, err := store.Load(ctx, b, digest)
			if !errors.Is(err, store.ErrBadSet) || book != nil {
				t.Fatalf("%v; want ErrBadSet", err)
			}
			wants(t, err, c.says)
			if _, err := store.Use(ctx, b, digest, nil, at); !errors.Is(err, store.ErrBadSet) {
				t.Errorf("it came into use: %v", err)
			}
		})
	}
}

func many(n, size int) []zipped {
	var out []zipped
	for i := range n {
		out = append(out, zipped{"m" + strings.Repeat("a", i%50) + strings.Repeat("b", i/50) + "/claims.json", strings.Repeat(" ", size)})
	}
	return out
}

// flipped changes a byte of the first file's text.
func flipped(doc []byte) []byte {
	doc = bytes.Clone(doc)
	doc[45] ^= 1
	return doc
}

// An archive larger than any set is not read.
func TestAHugeArchiveIsNotRead(t *testing.T) {
	b := open(t, "mem://")
	digest := digestOf(nil)
	lay(t, b, digest, make([]byte, 16<<20+1))
	_, err := store.Load(ctx, b, digest)
	if !errors.Is(err, store.ErrBadSet) {
		t.Errorf("%v", err)
	}
}

// Storing a good set where a broken one lies under its digest says so instead of calling it stored.
func TestPutFindsABrokenSet(t *testing.T) {
	b := open(t, "mem://")
	lay(t, b, digestOf(filesOf(t, set("1"))), []byte("PK"))
	if _, err := store.Put(ctx, b, set("1")); !errors.Is(err, store.ErrBadSet) {
		t.Errorf("%v; want ErrBadSet", err)
	}
}

// What is no part of a set stays out of the archive.
func TestPutLeavesOtherFilesOut(t *testing.T) {
	b := open(t, "mem://")
	one := set("1")
	one["words/README.md"] = &fstest.MapFile{Data: []byte("no rule")}
	one[".env"] = &fstest.MapFile{Data: []byte("secret")}
	book, err := store.Put(ctx, b, one)
	if err != nil {
		t.Fatal(err)
	}
	doc, err := b.ReadAll(ctx, "rulesets/"+strings.TrimPrefix(book.Digest, "sha256:")+"/rules.zip")
	if err != nil {
		t.Fatal(err)
	}
	z, err := zip.NewReader(bytes.NewReader(doc), int64(len(doc)))
	if err != nil || len(z.File) != 3 {
		t.Errorf("%d files, %v", len(z.File), err)
	}
}
