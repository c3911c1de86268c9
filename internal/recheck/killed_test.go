package recheck_test

import (
	"context"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"testing"
	"time"

	"gocloud.dev/blob"
	"gocloud.dev/blob/memblob"

	"gramlaw/internal/check"
	"gramlaw/internal/recheck"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/store/bucket"
	"gramlaw/rules"
)

// childIn and childOut make this test binary a run of its own, which its parent kills.
const childIn, childOut = "RECHECK_TEST_IN", "RECHECK_TEST_OUT"

func TestMain(m *testing.M) {
	if os.Getenv(childIn) == "" {
		os.Exit(m.Run())
	}
	if err := child(); err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(1)
	}
}

func child() error {
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		return err
	}
	plan, faults := recheck.New(check.Side{Book: book, On: "2019-06-01"}, check.Side{Book: book, On: "2026-12-01"}, check.Request{})
	if len(faults) > 0 {
		return fmt.Errorf("%v", faults)
	}
	var open [2]*blob.Bucket
	for i, name := range []string{childIn, childOut} {
		if open[i], _, err = bucket.Open(context.Background(), "file://"+os.Getenv(name)); err != nil {
			return err
		}
	}
	_, err = (&recheck.Run{Recipes: open[0], Out: open[1], Steps: []recheck.Step{{From: "2019-06-01", To: "2026-12-01", Plan: plan}}, Batch: 3}).Do(context.Background())
	return err
}

// A process that is killed, without a word, after some of its parts leaves what the next start ends in the same bytes.
func TestKilledProcessesEndAlike(t *testing.T) {
	in, out := t.TempDir(), t.TempDir()
	recipes, found := openFolder(t, in), openFolder(t, out)
	fill(t, recipes, 60)
	whole := memblob.OpenBucket(nil)
	do(t, &recheck.Run{Recipes: recipes, Out: whole, Steps: steps(t, book(t), check.Request{}, "2019-06-01", "2026-12-01"), Batch: 3})
	want := results(t, whole)
	killed := 0
	for wanted := 2; wanted <= 14; wanted += 4 {
		cmd := exec.Command(os.Args[0])
		cmd.Env = append(os.Environ(), childIn+"="+in, childOut+"="+out)
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		for parts(t, out) < wanted && !finished(out) {
			time.Sleep(time.Millisecond)
		}
		if err := cmd.Process.Kill(); err != nil && !finished(out) {
			t.Fatal(err)
		}
		if err := cmd.Wait(); err != nil {
			killed++
		}
	}
	if killed == 0 {
		t.Fatal("no process was killed before its end")
	}
	do(t, &recheck.Run{Recipes: recipes, Out: found, Steps: steps(t, book(t), check.Request{}, "2019-06-01", "2026-12-01"), Batch: 3})
	for name, text := range results(t, found) {
		if text != want[name] {
			t.Errorf("%s is another", name)
		}
	}
}

func openFolder(t *testing.T, dir string) *blob.Bucket {
	t.Helper()
	b, _, err := bucket.Open(context.Background(), "file://"+dir)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { b.Close() })
	return b
}

func parts(t *testing.T, dir string) int {
	t.Helper()
	names, err := filepath.Glob(filepath.Join(dir, "parts", "*", "*.json"))
	if err != nil {
		t.Fatal(err)
	}
	return len(names)
}

func finished(dir string) bool {
	_, err := os.Stat(filepath.Join(dir, recheck.SummaryName))
	return err == nil
}
