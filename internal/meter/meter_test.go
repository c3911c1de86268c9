package meter_test

import (
	"bytes"
	"errors"
	"math"
	"testing"
	"time"

	"gramlaw/internal/meter"
)

// The line's form is that of the format's specification: a directive under _aws, everything it names at the root.
func TestLine(t *testing.T) {
	var b bytes.Buffer
	err := meter.Write(&b, time.UnixMilli(1796115600000), meter.Line{
		Namespace: "Example", Dimensions: []meter.Dimension{{Name: "Route", Value: "/a"}},
		Metrics:    []meter.Metric{{Name: "Duration", Unit: "Milliseconds", Value: 1.5}, {Name: "Share", Unit: "Percent", Absent: true}},
		Properties: map[string]any{"Codes": map[string]int{"x": 2}},
	})
	const want = `{"Codes":{"x":2},"Duration":1.5,"Route":"/a","_aws":{"CloudWatchMetrics":[{"Namespace":"Example","Dimensions":[[],["Route"]],` +
		`"Metrics":[{"Name":"Duration","Unit":"Milliseconds"}]}],"Timestamp":1796115600000}}` + "\n"
	if err != nil || b.String() != want {
		t.Errorf("%v\n%s\nwant\n%s", err, &b, want)
	}
}

func TestLineWithoutDimensions(t *testing.T) {
	var b bytes.Buffer
	if err := meter.Write(&b, time.Unix(0, 0), meter.Line{Namespace: "Example"}); err != nil || !bytes.Contains(b.Bytes(), []byte(`"Dimensions":[[]],"Metrics":[]`)) {
		t.Errorf("%v %s", err, &b)
	}
}

type closed struct{ calls int }

func (c *closed) Write([]byte) (int, error) { c.calls++; return 0, errors.New("nobody listens") }

// A line is one call of the writer, so that those of several requests do not mix; what cannot be written is not begun.
func TestWriting(t *testing.T) {
	w := &closed{}
	if err := meter.Write(w, time.Unix(0, 0), meter.Line{}); err == nil || w.calls != 1 {
		t.Errorf("%v after %d calls", err, w.calls)
	}
	if err := meter.Write(w, time.Unix(0, 0), meter.Line{Metrics: []meter.Metric{{Name: "x", Value: math.NaN()}}}); err == nil || w.calls != 1 {
		t.Errorf("no number: %v after %d calls", err, w.calls)
	}
}
