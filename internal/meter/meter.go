// Package meter writes measurements as lines of JSON in the CloudWatch embedded metric format: whoever collects a program's output turns
// them into metrics, and no call to a service is needed.
//
// Reference: Amazon CloudWatch User Guide, "Specification: Embedded metric format".
package meter

import (
	"encoding/json"
	"io"
	"time"
)

// A Line is one set of measurements that share their dimensions.
type Line struct {
	Namespace  string
	Dimensions []Dimension // metrics are kept under all of them together, and over all
	Metrics    []Metric
	Properties map[string]any // can be searched, and make no metric
}

// A Dimension divides a metric. Its values must be few: each makes metrics of its own.
type Dimension struct{ Name, Value string }

// A Metric is one measurement; Unit is one of CloudWatch's, such as "Milliseconds", "Count" or "Percent".
type Metric struct {
	Name   string
	Unit   string
	Value  float64
	Absent bool // nothing was measured; the metric is left out
}

type definition struct {
	Name string
	Unit string
}

type directive struct {
	Namespace  string
	Dimensions [][]string
	Metrics    []definition
}

// Write writes a line measured at a time. The error is the writer's.
func Write(w io.Writer, at time.Time, l Line) error {
	d := directive{Namespace: l.Namespace, Dimensions: [][]string{{}}, Metrics: []definition{}}
	root := map[string]any{}
	for name, value := range l.Properties {
		root[name] = value
	}
	var names []string
	for _, one := range l.Dimensions {
		names = append(names, one.Name)
		root[one.Name] = one.Value
	}
	if len(names) > 0 {
		d.Dimensions = append(d.Dimensions, names)
	}
	for _, m := range l.Metrics {
		if !m.Absent {
			d.Metrics = append(d.Metrics, definition{m.Name, m.Unit})
			root[m.Name] = m.Value
		}
	}
	root["_aws"] = map[string]any{"Timestamp": at.UnixMilli(), "CloudWatchMetrics": []directive{d}}
	b, err := json.Marshal(root)
	if err != nil {
		return err
	}
	_, err = w.Write(append(b, '\n')) // one call, so that lines of several requests do not mix
	return err
}
