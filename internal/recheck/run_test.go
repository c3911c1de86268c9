package recheck_test

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"net/http/httptest"
	"runtime"
	"slices"
	"strings"
	"testing"

	"github.com/johannesboyne/gofakes3"
	"github.com/johannesboyne/gofakes3/backend/s3mem"
	"gocloud.dev/blob"
	"gocloud.dev/blob/memblob"

	"gramlaw/internal/check"
	"gramlaw/internal/recheck"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/store/bucket"
)

func steps(t testing.TB, b *rulebook.Book, q check.Request, days ...string) []recheck.Step {
	t.Helper()
	var out []recheck.Step
	for i := range days[1:] {
		p, faults := recheck.New(check.Side{Book: b, On: days[i]}, check.Side{Book: b, On: days[i+1]}, q)
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		out = append(out, recheck.Step{From: days[i], To: days[i+1], Plan: p})
	}
	return out
}

func do(t testing.TB, r *recheck.Run) *recheck.Summary {
	t.Helper()
	s, err := r.Do(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// results are what a run leaves behind, and nothing else.
func results(t testing.TB, b *blob.Bucket) map[string]string {
	t.Helper()
	out := map[string]string{}
	for it := b.List(nil); ; {
		o, err := it.Next(context.Background())
		if err != nil {
			break
		}
		doc, err := b.ReadAll(context.Background(), o.Key)
		if err != nil {
			t.Fatal(err)
		}
		out[o.Key] = string(doc)
	}
	for _, name := range []string{recheck.ChangesName, recheck.FailedName, recheck.SummaryName, recheck.TextName} {
		if _, ok := out[name]; !ok {
			t.Errorf("%s was not written", name)
		}
	}
	if len(out) != 4 {
		t.Errorf("%d objects are left, want 4", len(out))
	}
	return out
}

// Whatever the workers and the size of a batch, the result is the same, and every recipe is accounted for.
func TestTheSameWhateverTheWorkers(t *testing.T) {
	b := book(t)
	in := memblob.OpenBucket(nil)
	fill(t, in, 60)
	var first map[string]string
	for _, c := range []struct{ batch, workers int }{{7, 1}, {7, 4}, {60, 2}, {1, 3}, {1000, 1}} {
		out := memblob.OpenBucket(nil)
		s := do(t, &recheck.Run{Recipes: in, Out: out, Steps: steps(t, b, check.Request{}, "2019-06-01", "2026-12-01"), Batch: c.batch, Workers: c.workers})
		if f, _ := out.ReadAll(context.Background(), recheck.FailedName); len(f) > 0 {
			t.Fatalf("%.600s", f)
		}
		if s.Counts.Seen != 60 || s.Counts.Changed != 60 || !s.Counts.Whole() {
			t.Errorf("%+v", s.Counts)
		}
		got := results(t, out)
		if first == nil {
			first = got
		}
		for name := range first {
			if got[name] != first[name] {
				t.Errorf("batches of %d, %d workers: %s is another", c.batch, c.workers, name)
			}
		}
	}
}

// A run that is stopped anywhere, and one whose parts were spoilt, ends as if it had never been stopped.
func TestStoppedRunsEndAlike(t *testing.T) {
	b := book(t)
	in := memblob.OpenBucket(nil)
	fill(t, in, 40)
	put(t, in, "bad.json", []byte(`{"id":"x"`))
	run := func(out *blob.Bucket) *recheck.Run {
		return &recheck.Run{Recipes: in, Out: out, Steps: steps(t, b, check.Request{}, "2019-06-01", "2026-12-01"), Batch: 5, Workers: 2}
	}
	whole := memblob.OpenBucket(nil)
	do(t, run(whole))
	want := results(t, whole)
	for stopAfter := range 8 {
		out := memblob.OpenBucket(nil)
		ctx, stop := context.WithCancel(context.Background())
		r, seen := run(out), 0
		r.Progress = func(recheck.Counts) {
			if seen++; seen > stopAfter {
				stop()
			}
		}
		if _, err := r.Do(ctx); !errors.Is(err, context.Canceled) {
			t.Fatalf("stopped after %d: %v", stopAfter, err)
		}
		stop()
		spoil(t, out, stopAfter)
		do(t, run(out))
		for name, text := range results(t, out) {
			if text != want[name] {
				t.Errorf("stopped after %d parts: %s is another", stopAfter, name)
			}
		}
	}
}

// spoil cuts the first part in half, as a broken disk would.
func spoil(t *testing.T, b *blob.Bucket, n int) {
	t.Helper()
	o, err := b.List(&blob.ListOptions{Prefix: "parts/"}).Next(context.Background())
	if err != nil || n%2 == 0 {
		return
	}
	doc, err := b.ReadAll(context.Background(), o.Key)
	if err != nil {
		t.Fatal(err)
	}
	put(t, b, o.Key, doc[:len(doc)/2])
}

// What cannot be compared fails alone, under its name, with all its faults.
func TestFailuresAreQuarantined(t *testing.T) {
	b := book(t)
	in, out := memblob.OpenBucket(nil), memblob.OpenBucket(nil)
	fill(t, in, 3)
	huge := append([]byte(`{"id":"huge","ingredients":[`), bytes.Repeat([]byte(" "), 1<<20)...)
	for key, doc := range map[string][]byte{
		"broken.json": []byte(`{"id":"x","ingredients":[`), "empty.json": nil, "faults.json": []byte(`{"id":"x","ingredients":[{"id":"a","amount":"1 stone","food":"sr:99999"}]}`),
		"huge.json": huge, "no-mass.json": []byte(`{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"sr:20038"}],"yield":{"mass":"0 g"}}`),
		"unknown-market.json": []byte(`{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"sr:20038"}],"category":{"zz":"cookies"}}`),
		"own.json":            []byte(`{"id":"x","ingredients":[{"id":"a","amount":"10 g","food":"own:nowhere"}]}`), "notes.txt": []byte("no recipe"),
	} {
		put(t, in, key, doc)
	}
	s := do(t, &recheck.Run{Recipes: in, Out: out, Steps: steps(t, b, check.Request{}, "2019-06-01", "2026-12-01")})
	if s.Counts.Seen != 10 || s.Counts.Failed != 7 || !s.Counts.Whole() {
		t.Errorf("%+v", s.Counts)
	}
	codes := map[string]string{}
	faults := map[string]int{}
	for scan := bufio.NewScanner(strings.NewReader(results(t, out)[recheck.FailedName])); scan.Scan(); {
		var f recheck.Failure
		if err := json.Unmarshal(scan.Bytes(), &f); err != nil {
			t.Fatal(err)
		}
		codes[f.Key], faults[f.Key] = f.Code, len(f.Faults)
	}
	want := map[string]string{"broken.json": "document", "empty.json": "document", "faults.json": "document", "huge.json": "too-large", "no-mass.json": "document",
		"unknown-market.json": "check", "own.json": "own-ingredient"}
	for key, code := range want {
		if codes[key] != code {
			t.Errorf("%s failed as %q, want %q", key, codes[key], code)
		}
	}
	if faults["faults.json"] < 2 {
		t.Errorf("faults.json has two faults, %d are told", faults["faults.json"])
	}
}

// An own ingredient stands in every recipe that names it.
func TestOwnIngredients(t *testing.T) {
	b := book(t)
	in, out := memblob.OpenBucket(nil), memblob.OpenBucket(nil)
	put(t, in, "own/fat.json", []byte(`{"name":"baking fat","process":"refined","food":"sr:04053","with":{"FATRN":"0 g"}}`))
	put(t, in, "own/bad.json", []byte(`{"amount":"1 g","food":"sr:04053"}`))
	put(t, in, "with.json", []byte(`{"id":"a","ingredients":[{"id":"oats","amount":"80 g","food":"sr:20038"},{"id":"fat","amount":"20 g","food":"own:fat"}],"serving":{"default":{"amount":"30 g"}}}`))
	put(t, in, "plain.json", []byte(`{"id":"a","ingredients":[{"id":"oats","amount":"80 g","food":"sr:20038"},{"id":"fat","name":"baking fat","amount":"20 g","process":"refined","food":"sr:04053","with":{"FATRN":"0 g"}}],"serving":{"default":{"amount":"30 g"}}}`))
	put(t, in, "bad.json", []byte(`{"id":"a","ingredients":[{"id":"fat","amount":"20 g","food":"own:bad"}]}`))
	s := do(t, &recheck.Run{Recipes: in, Out: out, Steps: steps(t, b, check.Request{}, "2019-06-01", "2026-12-01")})
	if s.Counts.Seen != 3 || s.Counts.Changed != 2 || s.Counts.Failed != 1 {
		t.Fatalf("%+v", s.Counts)
	}
	got := results(t, out)
	var changes [][]recheck.Market
	for scan := bufio.NewScanner(strings.NewReader(got[recheck.ChangesName])); scan.Scan(); {
		var f recheck.Found
		if err := json.Unmarshal(scan.Bytes(), &f); err != nil {
			t.Fatal(err)
		}
		changes = append(changes, f.Markets)
	}
	if fmt.Sprint(changes[0]) != fmt.Sprint(changes[1]) {
		t.Errorf("the recipe with the own ingredient changes otherwise:\n%v\n%v", changes[0], changes[1])
	}
	if !strings.Contains(got[recheck.FailedName], "/amount") {
		t.Errorf("the fault of own/bad.json is not told: %s", got[recheck.FailedName])
	}
}

// A calendar is the comparisons of its days, and days without a change are not in it.
func TestCalendar(t *testing.T) {
	b := book(t)
	in, out := memblob.OpenBucket(nil), memblob.OpenBucket(nil)
	fill(t, in, 5)
	days := append([]string{"2019-06-01"}, b.Days("us", "2019-06-01", "2022-01-01")...)
	if !slices.Contains(days, "2020-01-01") {
		t.Fatalf("days are %q", days)
	}
	s := do(t, &recheck.Run{Recipes: in, Out: out, Steps: steps(t, b, check.Request{In: []string{"us"}}, days...)})
	var got []string
	for _, step := range s.Steps {
		if len(step.Markets) == 0 {
			t.Errorf("%s to %s changes nothing and is told", step.From, step.To)
		}
		got = append(got, step.To)
	}
	for i := range days[1:] {
		alone := do(t, &recheck.Run{Recipes: in, Out: memblob.OpenBucket(nil), Steps: steps(t, b, check.Request{In: []string{"us"}}, days[i], days[i+1])})
		if changes := alone.Counts.Changed > 0; changes != slices.Contains(got, days[i+1]) {
			t.Errorf("%s: changes %v, in the calendar %v", days[i+1], changes, !changes)
		}
	}
	if len(got) == 0 {
		t.Error("no day changes anything")
	}
}

// The same over the protocol of S3, through the AWS SDK.
func TestOverS3(t *testing.T) {
	t.Setenv("AWS_ACCESS_KEY_ID", "test")
	t.Setenv("AWS_SECRET_ACCESS_KEY", "test")
	backend := s3mem.New()
	server := httptest.NewServer(gofakes3.New(backend).Server())
	t.Cleanup(server.Close)
	for _, name := range []string{"recipes", "results"} {
		if err := backend.CreateBucket(name); err != nil {
			t.Fatal(err)
		}
	}
	open := func(name string) *blob.Bucket {
		b, _, err := bucket.Open(context.Background(), "s3://"+name+"?region=eu-central-1&use_path_style=true&endpoint="+server.URL)
		if err != nil {
			t.Fatal(err)
		}
		t.Cleanup(func() { b.Close() })
		return b
	}
	book := book(t)
	memory, out := memblob.OpenBucket(nil), memblob.OpenBucket(nil)
	recipes, found := open("recipes"), open("results")
	fill(t, memory, 12)
	fill(t, recipes, 12)
	do(t, &recheck.Run{Recipes: memory, Out: out, Steps: steps(t, book, check.Request{}, "2019-06-01", "2026-12-01"), Batch: 5})
	do(t, &recheck.Run{Recipes: recipes, Out: found, Steps: steps(t, book, check.Request{}, "2019-06-01", "2026-12-01"), Batch: 5, Workers: 3})
	want := results(t, out)
	for name, text := range results(t, found) {
		if text != want[name] {
			t.Errorf("%s is another over S3", name)
		}
	}
}

// Recipes a second, and the most memory in use beside the recipes' own folder, for a pair of dates that changes one market. One core: -cpu 1.
func BenchmarkRecheck(b *testing.B) {
	rules := book(b)
	for _, n := range []int{1_000, 10_000, 100_000} {
		b.Run(fmt.Sprint(n, " recipes"), func(b *testing.B) {
			in, _, err := bucket.Open(context.Background(), "file://"+b.TempDir())
			if err != nil {
				b.Fatal(err)
			}
			fill(b, in, n)
			peak := uint64(0)
			watch := func(recheck.Counts) {
				var m runtime.MemStats
				runtime.ReadMemStats(&m)
				peak = max(peak, m.HeapAlloc)
			}
			b.ResetTimer()
			for b.Loop() {
				do(b, &recheck.Run{Recipes: in, Out: memblob.OpenBucket(nil), Steps: steps(b, rules, check.Request{}, "2025-12-31", "2026-01-01"), Workers: runtime.GOMAXPROCS(0), Progress: watch})
			}
			b.ReportMetric(float64(n*b.N)/b.Elapsed().Seconds(), "recipes/s")
			b.ReportMetric(float64(peak)/(1<<20), "MB-peak")
		})
	}
}
