// Command check is the Lambda function: the HTTP service behind an HTTP API, a function URL and direct invocation; see
// internal/gateway and infra/README.md.
package main

import (
	"context"
	"log/slog"
	"os"
	"time"

	"github.com/aws/aws-lambda-go/lambda"

	"gramlaw/internal/gateway"
	"gramlaw/internal/web"
)

func main() {
	log := slog.New(slog.NewJSONHandler(os.Stdout, nil))
	a, err := adapter(context.Background(), log)
	if err != nil {
		log.Error("the function cannot start", "cause", err.Error())
		os.Exit(1)
	}
	lambda.Start(a)
}

// adapter is the service before Lambda's events. Rules are loaded here, while the environment starts.
func adapter(ctx context.Context, log *slog.Logger) (*gateway.Adapter, error) {
	rules, err := source(ctx, os.Getenv("GRAMLAW_RULES"), log)
	if err != nil {
		return nil, err
	}
	service, err := web.New(web.Options{
		Rules: rules, Now: time.Now, Version: os.Getenv("GRAMLAW_VERSION"), Log: log, Metrics: os.Stdout,
		Limits: web.Limits{Answer: gateway.MaxResponse},
	})
	if err != nil {
		return nil, err
	}
	return &gateway.Adapter{
		Handler: service, Direct: "/v1/check", Open: map[string]bool{"/health": true}, Refuse: web.Refuse, Log: log,
	}, nil
}
