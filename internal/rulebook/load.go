package rulebook

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"path"
	"slices"
	"strings"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
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

// Load reads a rule set and refuses it, with every problem, if lint finds any.
func Load(fsys fs.FS) (*Book, error) {
	book, problems := Lint(fsys)
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
	l := &loader{book: &Book{markets: map[string]*Rules{}}}
	files, err := ruleFiles(fsys)
	if err != nil {
		return nil, []Problem{{Says: err.Error()}}
	}
	l.digest(fsys, files)
	for _, f := range files {
		l.file(fsys, f)
	}
	if len(l.problems) == 0 {
		l.check()
	}
	return l.book, l.problems
}

func ruleFiles(fsys fs.FS) ([]string, error) {
	var files []string
	total := int64(0)
	err := fs.WalkDir(fsys, ".", func(p string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || path.Ext(p) != ".json" || strings.HasPrefix(p, "words/") {
			return err
		}
		info, err := d.Info()
		if err != nil {
			return err
		}
		if total += info.Size(); info.Size() > MaxFile || total > MaxSet {
			return fmt.Errorf("%s: the rule set is larger than %d bytes a file or %d in all", p, MaxFile, MaxSet)
		}
		files = append(files, p)
		return nil
	})
	slices.Sort(files)
	return files, err
}

type loader struct {
	book     *Book
	problems []Problem
}

func (l *loader) problem(file, rule, field, format string, args ...any) {
	l.problems = append(l.problems, Problem{file, rule, field, fmt.Sprintf(format, args...)})
}

func (l *loader) digest(fsys fs.FS, files []string) {
	h := sha256.New()
	for _, f := range files {
		b, err := fs.ReadFile(fsys, f)
		if err != nil {
			l.problem(f, "", "", "cannot be read: %v", err)
			continue
		}
		fmt.Fprintf(h, "%s\x00%d\x00", f, len(b))
		h.Write(b)
	}
	l.book.Digest = "sha256:" + hex.EncodeToString(h.Sum(nil))
}

// file reads one file by its place: set.json, <market>/jurisdiction.json or <market>/<kind>.json.
func (l *loader) file(fsys fs.FS, name string) {
	b, err := fs.ReadFile(fsys, name)
	if err != nil {
		return // digest has said so
	}
	if name == "set.json" {
		var set struct {
			Version string `json:"version"`
		}
		l.decode(name, "", b, &set)
		l.book.Version = set.Version
		return
	}
	dir, kind := path.Dir(name), strings.TrimSuffix(path.Base(name), ".json")
	if strings.Contains(dir, "/") || dir == "." {
		l.problem(name, "", "", "is not at <jurisdiction>/<kind>.json")
		return
	}
	if dir == "practice" {
		l.practice(name, kind, b)
		return
	}
	m := l.book.markets[dir]
	if m == nil {
		m = &Rules{}
		l.book.markets[dir] = m
	}
	l.kind(m, name, dir, kind, b)
}

func (l *loader) practice(name, kind string, b []byte) {
	switch kind {
	case "presumptions":
		l.book.Presumptions = rules[Presumption](l, name, "practice", "presumption", b)
	case "origins":
		l.book.Origins = rules[Origin](l, name, "practice", "origin", b)
	default:
		l.problem(name, "", "", "is no kind of practice; known are presumptions and origins")
	}
}

func (l *loader) kind(m *Rules, name, dir, kind string, b []byte) {
	switch kind {
	case "jurisdiction":
		l.decode(name, "", b, &m.Market)
		if m.Market.Jurisdiction != dir {
			l.problem(name, "", "jurisdiction", "is %q in the folder %q", m.Market.Jurisdiction, dir)
		}
	case "definitions":
		m.Definitions = rules[Definition](l, name, dir, "quantity", b)
	case "energy":
		m.Energy = rules[Energy](l, name, dir, "energy", b)
	case "reference_values":
		m.References = rules[Reference](l, name, dir, "reference", b)
	case "rounding":
		m.Roundings = rules[Rounding](l, name, dir, "rounding", b)
	case "declaration":
		m.Declarations = rules[Declaration](l, name, dir, "declaration", b)
	case "reference_amounts":
		m.ReferenceAmounts = rules[ReferenceAmount](l, name, dir, "reference-amount", b)
	case "claims":
		m.Claims = rules[Claim](l, name, dir, "claim", b)
	case "disclosure":
		m.Disclosures = rules[Disclosure](l, name, dir, "disclosure", b)
	case "limits":
		m.Limits = rules[Limit](l, name, dir, "limit", b)
	case "serving":
		m.Serving = rules[Limit](l, name, dir, "serving", b)
	case "health_claims":
		m.HealthClaims = rules[Claim](l, name, dir, "health-claim", b)
	case "conditions":
		m.Conditions = rules[Named](l, name, dir, "condition", b)
	case "naming":
		m.Naming = rules[Naming](l, name, dir, "naming", b)
	default:
		l.problem(name, "", "", "is of no known kind")
	}
}

func (l *loader) decode(file, rule string, b []byte, to any) bool {
	if err := json.Unmarshal(b, to, json.RejectUnknownMembers(true)); err != nil {
		l.problem(file, rule, "", "%v", err)
		return false
	}
	return true
}

// rules decodes a file of one kind, expanding families, and checks what is common to all kinds.
func rules[T any](l *loader, file, jurisdiction, kind string, b []byte) []Rule[T] {
	var doc struct {
		Jurisdiction string           `json:"jurisdiction"`
		Rules        []jsontext.Value `json:"rules"`
	}
	if !l.decode(file, "", b, &doc) {
		return nil
	}
	if doc.Jurisdiction != jurisdiction {
		l.problem(file, "", "jurisdiction", "is %q in the folder %q", doc.Jurisdiction, jurisdiction)
	}
	var out []Rule[T]
	seen := map[string]bool{}
	for i, raw := range doc.Rules {
		for _, one := range l.expand(file, i, raw) {
			var r Rule[T]
			if err := json.Unmarshal(one, &r, json.RejectUnknownMembers(true)); err != nil {
				l.problem(file, ruleID(one), "", "%v", err)
				continue
			}
			if seen[r.ID] {
				l.problem(file, r.ID, "id", "stands twice")
			}
			seen[r.ID] = true
			l.common(file, r.ID, jurisdiction+"/"+kind+"/", heads(r))
			out = append(out, r)
		}
	}
	return out
}

func heads[T any](r Rule[T]) []*Head {
	out := make([]*Head, len(r.Versions))
	for i := range r.Versions {
		out[i] = &r.Versions[i].Head
	}
	return out
}

func ruleID(raw []byte) string {
	var r struct {
		ID string `json:"id"`
	}
	if json.Unmarshal(raw, &r) != nil {
		return ""
	}
	return r.ID
}

// expand writes a family out: "{each}" and the other names of a family member are replaced in the rule's text.
func (l *loader) expand(file string, i int, raw jsontext.Value) []jsontext.Value {
	if !bytes.Contains(raw, []byte(`"for each"`)) {
		return []jsontext.Value{raw}
	}
	var family struct {
		ForEach []map[string]string `json:"for each"`
	}
	if err := json.Unmarshal(raw, &family); err != nil {
		l.problem(file, fmt.Sprintf("rule %d", i), "for each", "%v", err)
		return nil
	}
	if family.ForEach == nil {
		return []jsontext.Value{raw}
	}
	var out []jsontext.Value
	for _, member := range family.ForEach {
		var pairs []string
		for k, v := range member {
			pairs = append(pairs, "{"+k+"}", v)
		}
		out = append(out, jsontext.Value(strings.NewReplacer(pairs...).Replace(string(raw))))
	}
	return out
}
