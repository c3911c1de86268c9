package schemas

import (
	_ "embed"
)

//go:embed openapi.json
var openapi []byte

// OpenAPI is the description of the HTTP service.
func OpenAPI() ([]byte, error) { return openapi, nil }
