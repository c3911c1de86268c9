// Package rules embeds the rule set, because go:embed cannot reach up from internal/. README.md explains the kinds.
package rules

import "embed"

// FS holds set.json, one folder per market, practice/ and words/.
//
//go:embed set.json */*.json
var FS embed.FS
