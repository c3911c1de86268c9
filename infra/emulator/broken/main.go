// Command broken is the adapter before a handler that panics at /v1/check and answers elsewhere: it shows, under the emulator,
// that a panic is answered with a problem document and the process goes on. No program of the service has such a path.
package main

import (
	"io"
	"log/slog"
	"net/http"
	"os"

	"github.com/aws/aws-lambda-go/lambda"

	"gramlaw/internal/gateway"
)

func main() {
	lambda.Start(&gateway.Adapter{
		Handler: http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
			if r.URL.Path == "/v1/check" {
				panic("a secret of the recipe")
			}
			io.WriteString(w, "well")
		}),
		Direct: "/v1/check", Open: map[string]bool{"/health": true}, Log: slog.New(slog.NewJSONHandler(os.Stdout, nil)),
		Refuse: func(w http.ResponseWriter, r *http.Request, problem, detail string) {
			w.Header().Set("Content-Type", "application/problem+json")
			w.WriteHeader(http.StatusInternalServerError)
			io.WriteString(w, `{"type":"/problems/`+problem+`"}`)
		},
	})
}
