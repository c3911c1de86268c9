package render

import (
	"encoding/json"
	"io"

	"gramlaw/internal/check"
)

// JSON writes the whole report; the same report gives the same bytes. The error is the writer's.
func JSON(w io.Writer, r *check.Report, compact bool) error {
	e := json.NewEncoder(w)
	e.SetEscapeHTML(false)
	if !compact {
		e.SetIndent("", "  ")
	}
	return e.Encode(r)
}
