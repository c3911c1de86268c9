//go:build deployment

package emulator

import (
	"regexp"
	"slices"
	"strconv"
	"testing"
	"time"
)

var initialised = regexp.MustCompile(`INIT REPORT\(durationMs: ([0-9.]+)\)`)

// BenchmarkColdStart starts a new environment each time and sends one event. "init-ms" is what the emulator measures from the start of
// the process until it asks for an event, "first-ms" what the caller waits for the first answer, "second-ms" for the next; each is a
// median. "empty" is a function that does nothing.
func BenchmarkColdStart(b *testing.B) {
	for _, program := range []string{"empty", "check"} {
		b.Run(program, func(b *testing.B) {
			var times [3][]float64
			for b.Loop() {
				f := start(b, program, "GOGC=400", "GOMEMLIMIT=800MiB") // as infra/template.yaml
				payload := event(b, "direct-check")
				for i := range 2 {
					began := time.Now()
					f.invoke(payload)
					times[1+i] = append(times[1+i], float64(time.Since(began))/float64(time.Millisecond))
				}
				f.stop()
				said := initialised.FindStringSubmatch(f.log())
				if said == nil {
					b.Fatalf("the emulator does not say how long it took:\n%s", f.log())
				}
				ms, err := strconv.ParseFloat(said[1], 64)
				if err != nil {
					b.Fatal(err)
				}
				times[0] = append(times[0], ms)
			}
			for i, unit := range []string{"init-ms", "first-ms", "second-ms"} {
				slices.Sort(times[i])
				b.ReportMetric(times[i][len(times[i])/2], unit)
			}
		})
	}
}
