package web

import (
	"net/http"
	"net/url"
	"path"
	"strings"
)

// A route is a path with what answers its methods. Patterns are those of OpenAPI, too.
type route struct {
	pattern string
	get     endpoint
	post    endpoint
	open    bool // let in whatever the load
}

// An endpoint answers an exchange or tells why not.
type endpoint func(*exchange) *Problem

// unknownRoute stands in logs for every path that is none of the routes.
const unknownRoute = "none"

func routes() []route {
	return []route{
		{pattern: "/v1/check", post: postCheck},
		{pattern: "/v1/check/batch", post: postBatch},
		{pattern: "/v1/wording", post: postWording},
		{pattern: "/v1/rules", get: getRules},
		{pattern: "/v1/rules/{jurisdiction}", get: getMarket},
		{pattern: "/v1/rules/{jurisdiction}/changes", get: getChanges},
		{pattern: "/v1/foods", get: getFoods},
		{pattern: "/v1/foods/{reference}", get: getFood},
		{pattern: "/schemas", get: getSchemas},
		{pattern: "/schemas/{name}", get: getSchema},
		{pattern: "/problems", get: getProblems},
		{pattern: "/problems/{name}", get: getProblem},
		{pattern: "/openapi.json", get: getOpenAPI},
		{pattern: "/health", get: getHealth, open: true},
	}
}

// pick is the endpoint of a method. A HEAD is a GET whose body is not sent.
func (t route) pick(method string) endpoint {
	switch method {
	case http.MethodGet, http.MethodHead:
		return t.get
	case http.MethodPost:
		return t.post
	}
	return nil
}

// allow lists the methods of a path that exists.
func (t route) allow() string {
	if t.get != nil {
		return "GET, HEAD"
	}
	return "POST"
}

// plainPath tells whether a path is written in the one way the routes know: no empty segment, dot segment, slash at the end, backslash or
// control character, and no slash that is encoded.
func plainPath(u *url.URL) bool {
	p := u.Path
	if !strings.HasPrefix(p, "/") || path.Clean(p) != p || strings.Contains(strings.ToLower(u.RawPath), "%2f") {
		return false
	}
	return !strings.ContainsFunc(p, func(c rune) bool { return c < ' ' || c == '\\' || c == 0x7f || c == '\uFFFD' })
}
