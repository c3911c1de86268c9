// Command check is the Lambda function: the HTTP service behind an HTTP API, a function URL and direct invocation; see
// internal/gateway and infra/README.md.
package main

import (
	"fmt"
	"log/slog"
	"os"
	"time"

	"github.com/aws/aws-lambda-go/lambda"

	"gramlaw/internal/gateway"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/web"
	"gramlaw/rules"
)

func main() {
	log := slog.New(slog.NewJSONHandler(os.Stdout, nil))
	a, err := adapter(log)
	if err != nil {
		log.Error("the function cannot start", "cause", err.Error())
		os.Exit(1)
	}
	lambda.Start(a)
}

func adapter(log *slog.Logger) (*gateway.Adapter, error) {
	if url := os.Getenv("GRAMLAW_RULES"); url != "" {
		return nil, fmt.Errorf("GRAMLAW_RULES is %q; only the rule set that the program carries can be used", url)
	}
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		return nil, err
	}
	set := web.Rules{Book: book, Loaded: time.Now()}
	service, err := web.New(web.Options{
		Rules: func() web.Rules { return set }, Now: time.Now, Version: os.Getenv("GRAMLAW_VERSION"), Log: log, Metrics: os.Stdout,
		Limits: web.Limits{Answer: gateway.MaxResponse},
	})
	if err != nil {
		return nil, err
	}
	return &gateway.Adapter{
		Handler: service, Direct: "/v1/check", Open: map[string]bool{"/health": true}, Refuse: web.Refuse, Log: log,
	}, nil
}
