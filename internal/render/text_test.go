package render

import (
	"bytes"
	"encoding/json"
	"errors"
	"flag"
	"os"
	"reflect"
	"strings"
	"testing"
	"unicode"

	"gramlaw/internal/check"
)

var update = flag.Bool("update", false, "write the golden files anew")

// sample is an invented report with one of everything.
func sample(t *testing.T) *check.Report {
	t.Helper()
	b, err := os.ReadFile("testdata/report.json")
	if err != nil {
		t.Fatal(err)
	}
	var r check.Report
	d := json.NewDecoder(bytes.NewReader(b))
	d.DisallowUnknownFields()
	if err := d.Decode(&r); err != nil {
		t.Fatal(err)
	}
	return &r
}

func write(t *testing.T, r *check.Report, o Options) string {
	t.Helper()
	var b bytes.Buffer
	if err := Text(&b, r, o); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func golden(t *testing.T, name, got string) {
	t.Helper()
	file := "testdata/" + name
	if *update {
		if err := os.WriteFile(file, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Errorf("%s differs; read it and run with -update if it is right\n%s", name, got)
	}
}

func TestTextGolden(t *testing.T) {
	r := sample(t)
	golden(t, "report.txt", write(t, r, Options{GapsHint: "-gaps lists them"}))
	golden(t, "report-fr.txt", write(t, r, Options{Language: "fr", Gaps: true}))
}

func TestJSONGivesTheReportBack(t *testing.T) {
	r := sample(t)
	for _, compact := range []bool{true, false} {
		var one, two bytes.Buffer
		if err := errors.Join(JSON(&one, r, compact), JSON(&two, r, compact)); err != nil {
			t.Fatal(err)
		}
		if one.String() != two.String() {
			t.Error("the same report gave other bytes")
		}
		var back check.Report
		if err := json.Unmarshal(one.Bytes(), &back); err != nil {
			t.Fatal(err)
		}
		if !reflect.DeepEqual(&back, r) {
			t.Error("the report did not come back")
		}
		if got := strings.Count(one.String(), "\n"); compact != (got == 1) {
			t.Errorf("compact %v has %d lines", compact, got)
		}
		if strings.Contains(one.String(), `\u003c`) {
			t.Error("a relation is escaped")
		}
	}
}

var hostile = []struct{ name, text string }{
	{"long word", strings.Repeat("x", 1000)},
	{"many words", strings.Repeat("flour and ", 100)},
	{"wide", strings.Repeat("燕麦餅", 300)},
	{"wide and narrow", strings.Repeat("a燕", 400)},
	{"marks", strings.Repeat("e\u0301\u0302\u0303", 300)},
	{"escape sequences", strings.Repeat("\x1b[2J\x1b]0;title\a", 60)},
	{"directions", strings.Repeat("\u202eabc\u2066 ", 100)},
	{"lines", strings.Repeat("a\n\nb\r\n\u2028", 100)},
	{"joined pictures", strings.Repeat("👩\u200d🌾\ufe0f", 200)},
	{"held together", strings.Repeat("1"+bond+"g"+bond, 300)},
	{"nothing", ""},
	{"space", " "},
}

// Whatever stands in whatever text of a report: no line is too wide, and nothing reaches the terminal but text.
func TestHostileTextsStayOnThePage(t *testing.T) {
	for _, h := range hostile {
		t.Run(h.name, func(t *testing.T) {
			r := sample(t)
			fill(reflect.ValueOf(r).Elem(), h.text)
			out := write(t, r, Options{Gaps: true, Language: "fr"})
			for line := range strings.Lines(out) {
				line = strings.TrimSuffix(line, "\n")
				if n := columns(line); n > Width {
					t.Fatalf("%d columns: %q", n, line)
				}
				for _, c := range line {
					if unicode.IsControl(c) || unicode.Is(unicode.Bidi_Control, c) {
						t.Fatalf("%U reaches the terminal: %q", c, line)
					}
				}
			}
		})
	}
}

// fill puts a text into every string of a value.
func fill(v reflect.Value, text string) {
	switch v.Kind() {
	case reflect.String:
		v.SetString(text)
	case reflect.Pointer:
		if !v.IsNil() {
			fill(v.Elem(), text)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			if v.Type().Field(i).IsExported() {
				fill(v.Field(i), text)
			}
		}
	case reflect.Slice:
		for i := range v.Len() {
			fill(v.Index(i), text)
		}
	case reflect.Map:
		for _, k := range v.MapKeys() {
			if v.Type().Elem().Kind() == reflect.String {
				v.SetMapIndex(k, reflect.ValueOf(text))
			}
		}
	}
}

// Hostile words in names only: statuses and numbers stay as they are, so that every part of the page is written.
func TestHostileNamesStayOnThePage(t *testing.T) {
	for _, h := range hostile {
		t.Run(h.name, func(t *testing.T) {
			r := sample(t)
			r.Recipe.Name, r.Recipe.ID = h.text, h.text
			for i := range r.Jurisdictions {
				m := &r.Jurisdictions[i]
				fill(reflect.ValueOf(&m.Presumed).Elem(), h.text)
				for j := range m.Claims {
					m.Claims[j].Asked = h.text
					fill(reflect.ValueOf(&m.Claims[j].Needs).Elem(), h.text)
				}
				for j := range m.Declaration.Lines {
					l := &m.Declaration.Lines[j]
					l.Term, l.Terms = h.text, nil
					fill(reflect.ValueOf(&l.Needs).Elem(), h.text)
					for k := range l.Values {
						fill(reflect.ValueOf(&l.Values[k].Contributions).Elem(), h.text)
					}
				}
			}
			for line := range strings.Lines(write(t, r, Options{})) {
				if n := columns(strings.TrimSuffix(line, "\n")); n > Width {
					t.Fatalf("%d columns: %q", n, line)
				}
			}
		})
	}
}

type broken struct{}

func (broken) Write([]byte) (int, error) { return 0, errors.New("closed") }

func TestWritersErrorComesBack(t *testing.T) {
	if err := Text(broken{}, sample(t), Options{}); err == nil {
		t.Error("Text says nothing")
	}
	if err := JSON(broken{}, sample(t), false); err == nil {
		t.Error("JSON says nothing")
	}
}

// A report always carries the cautions: of every market, and of the whole at the end.
func TestCautionEndsEveryReport(t *testing.T) {
	r := sample(t)
	r.Caution = check.Caution
	out := strings.Join(strings.Fields(write(t, r, Options{})), " ")
	if !strings.HasSuffix(out, strings.Join(strings.Fields(check.Caution), " ")) {
		t.Error("the caution does not end the text")
	}
	for _, m := range r.Jurisdictions {
		if !strings.Contains(out, m.Caution) {
			t.Errorf("the caution of %s is missing", m.Name)
		}
	}
}

func TestManyCandidatesAreToldByName(t *testing.T) {
	some := func(n int, health bool) []check.Candidate {
		out := make([]check.Candidate, n)
		for i := range out {
			out[i] = check.Candidate{Claim: "aa/claim/c" + string(rune('a'+i)), Name: "words", Verdict: check.Permitted, Health: health}
		}
		return out
	}
	few := append(some(1, false), check.Candidate{Claim: "aa/claim/z", Name: "zinc", Verdict: check.WithStatement})
	for _, c := range []struct {
		name   string
		list   []check.Candidate
		health bool
		want   string
	}{
		{"none", some(3, true), false, ""},
		{"few", few, false, "T: words [ca]; with a statement: zinc [z].\n"},
		{"more", some(7, false), false, "T: ca, cb, cc, cd, ce, cf, cg.\n"},
		{"many", some(26, true), true, "T: ca, cb, cc, cd, ce, cf, cg, ch, ci, cj, ck, cl, cm, cn, co, cp, cq, cr, cs,\n  ct, cu, cv, cw, cx and 2 more, which JSON lists.\n"},
	} {
		p := &page{}
		p.candidates("T", c.list, c.health)
		if got := p.String(); got != c.want {
			t.Errorf("%s: %q, want %q", c.name, got, c.want)
		}
	}
}
