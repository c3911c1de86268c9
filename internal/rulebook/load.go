package rulebook

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"path"
	"slices"
	"strings"
	"sync"

	"github.com/go-json-experiment/json"
)

// MaxFile and MaxSet bound a rule set, in bytes.
const (
	MaxFile = 4 << 20
	MaxSet  = 32 << 20
)

// A Problem is one thing lint found wrong with a rule set.
type Problem struct {
	File, Rule, Field, Says string
}

func (p Problem) Error() string {
	where := p.File
	for _, s := range []string{p.Rule, p.Field} {
		if s != "" {
			where += ": " + s
		}
	}
	return where + ": " + p.Says
}

// Files are the files of a rule set by their paths, such as "us/claims.json".
type Files map[string][]byte

// Load reads a rule set and refuses it, with every problem, if lint finds any.
func Load(fsys fs.FS) (*Book, error) {
	files, err := ReadFiles(fsys)
	if err != nil {
		return nil, err
	}
	return files.Load()
}

// Load is the book of the files. It refuses them, with every problem, if lint finds any, and a file that has no place in a set.
func (f Files) Load() (*Book, error) {
	book, problems := f.lint()
	if len(problems) > 0 {
		errs := make([]error, len(problems))
		for i, p := range problems {
			errs[i] = p
		}
		return nil, errors.Join(errs...)
	}
	return book, nil
}

// Lint reads a rule set and lists every problem. The book is usable only when there is none.
func Lint(fsys fs.FS) (*Book, []Problem) {
	files, err := ReadFiles(fsys)
	if err != nil {
		return nil, []Problem{{Says: err.Error()}}
	}
	return files.lint()
}

func (f Files) lint() (*Book, []Problem) {
	l := &loader{book: &Book{markets: map[string]*Rules{}, languages: map[string]*Language{}}}
	files := f.sorted()
	l.book.Digest = digest(files)
	l.decodeAll(files)
	if len(l.problems) == 0 {
		l.check()
	}
	return l.book, l.problems
}

// A ruleFile is one file of a set.
type ruleFile struct {
	name string
	data []byte
}

func (f Files) sorted() []ruleFile {
	out := make([]ruleFile, 0, len(f))
	for _, name := range sorted(f) {
		out = append(out, ruleFile{name, f[name]})
	}
	return out
}

// ReadFiles reads the files that belong to a set; what is no .json is passed over.
func ReadFiles(fsys fs.FS) (Files, error) {
	files, total := Files{}, 0
	err := fs.WalkDir(fsys, ".", func(p string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || path.Ext(p) != ".json" {
			return err
		}
		info, err := d.Info()
		switch {
		case err != nil:
			return err
		case info.Size() > MaxFile:
			return tooLarge(p)
		}
		b, err := fs.ReadFile(fsys, p)
		if err != nil {
			return err
		}
		if total += len(b); len(b) > MaxFile || total > MaxSet {
			return tooLarge(p)
		}
		files[p] = b
		return nil
	})
	return files, err
}

func tooLarge(name string) error {
	return fmt.Errorf("%s: the rule set is larger than %d bytes a file or %d in all", name, MaxFile, MaxSet)
}

// digest is that of all files with their names.
func digest(files []ruleFile) string {
	h := sha256.New()
	for _, f := range files {
		fmt.Fprintf(h, "%s\x00%d\x00", f.name, len(f.data))
		h.Write(f.data)
	}
	return "sha256:" + hex.EncodeToString(h.Sum(nil))
}

// A loader gathers a book, and what is wrong with it.
type loader struct {
	book     *Book
	problems []Problem
}

func (l *loader) problem(file, rule, field, format string, args ...any) {
	l.problems = append(l.problems, Problem{file, rule, field, fmt.Sprintf(format, args...)})
}

// decodeAll decodes the files side by side. Each writes to a place of its own.
func (l *loader) decodeAll(files []ruleFile) {
	var work []func(*loader)
	for _, f := range files {
		if read := l.reader(f); read != nil {
			work = append(work, read)
		}
	}
	l.sideBySide(work)
}

// sideBySide does work that has nothing to do with each other. Problems come in the order of the work.
func (l *loader) sideBySide(work []func(*loader)) {
	own := make([]loader, len(work))
	var wait sync.WaitGroup
	for i, do := range work {
		own[i].book = l.book
		wait.Go(func() { do(&own[i]) })
	}
	wait.Wait()
	for i := range own {
		l.problems = append(l.problems, own[i].problems...)
	}
}

// reader finds what reads a file by its place: set.json, words/<language>.json, practice/<kind>.json, <market>/jurisdiction.json or
// <market>/<kind>.json. It is nil, and the problem told, for a file that has no place.
func (l *loader) reader(f ruleFile) func(*loader) {
	dir, kind := path.Dir(f.name), strings.TrimSuffix(path.Base(f.name), ".json")
	switch {
	case f.name == "set.json":
		return l.book.readSet(f)
	case !plainName(dir) || path.Ext(f.name) != ".json" || !fs.ValidPath(f.name):
		l.problem(f.name, "", "", "is not at <jurisdiction>/<kind>.json")
		return nil
	case dir == wordsFolder:
		return l.book.readWords(f, kind)
	case dir == practice:
		return l.kind(f, kind, dir, l.book.tables())
	}
	m := l.book.markets[dir]
	if m == nil {
		m = &Rules{}
		l.book.markets[dir] = m
	}
	if kind == "jurisdiction" {
		return m.readMarket(f, dir)
	}
	return l.kind(f, kind, dir, m.tables())
}

func (l *loader) kind(f ruleFile, kind, dir string, tables []table) func(*loader) {
	i := slices.IndexFunc(tables, func(t table) bool { return t.kind() == kind })
	if i < 0 {
		l.problem(f.name, "", "", "is of no known kind")
		return nil
	}
	return func(own *loader) { tables[i].decode(own, f, dir) }
}

func (b *Book) readSet(f ruleFile) func(*loader) {
	return func(own *loader) {
		var set struct {
			Version string `json:"version"`
		}
		own.decode(f.name, f.data, &set)
		b.Version = set.Version
	}
}

func (m *Rules) readMarket(f ruleFile, dir string) func(*loader) {
	return func(own *loader) {
		own.decode(f.name, f.data, &m.Market)
		if m.Market.Jurisdiction != dir {
			own.problem(f.name, "", "jurisdiction", "is %q in the folder %q", m.Market.Jurisdiction, dir)
		}
	}
}

func (l *loader) decode(file string, b []byte, to any) bool {
	if err := json.Unmarshal(b, to, json.RejectUnknownMembers(true)); err != nil {
		l.problem(file, "", "", "%v", err)
		return false
	}
	return true
}

// Digest is "sha256:" and the digest of all files with their names.
func (f Files) Digest() string { return digest(f.sorted()) }

// Names lists the paths in order.
func (f Files) Names() []string { return sorted(f) }
