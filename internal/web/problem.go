package web

import (
	"encoding/json"
	"net/http"

	"gramlaw/internal/recipe"
)

// A Problem tells why a request was not answered, as RFC 9457 asks. Type is a path of this service that tells more.
type Problem struct {
	Type      string  `json:"type"`
	Title     string  `json:"title"`
	Status    int     `json:"status"`
	Detail    string  `json:"detail,omitzero"`
	RequestID string  `json:"request_id,omitzero"`
	Loaded    string  `json:"loaded,omitzero"` // digest of the rule set that is loaded, where another was asked for
	Faults    []Fault `json:"faults,omitzero"`

	header http.Header
}

// A Fault is one thing that is wrong: at a JSON Pointer of the document sent, or in a parameter of the query.
type Fault struct {
	Pointer   *string `json:"pointer,omitzero"`
	Parameter string  `json:"parameter,omitzero"`
	Code      string  `json:"code"`
	Says      string  `json:"says"`
}

// A kind of problem. Names and statuses are stable.
type kind struct {
	Name   string
	Status int
	Title  string
	Says   string
}

// The kinds of problems.
var (
	notJSON       = kind{"not-json", 400, "The body is not JSON", "The body is no JSON text in UTF-8, or something follows it. Nothing of it was used; the faults tell where reading ended."}
	badRequest    = kind{"bad-request", 400, "The request is malformed", "A parameter of the query is not known, stands twice, is missing or cannot be read. Each fault names its parameter."}
	unauthorized  = kind{"unauthorized", 401, "The caller is not known", "A door that lets only known callers in told so. The header WWW-Authenticate tells how to become one."}
	notFound      = kind{"not-found", 404, "There is nothing here", "No route has this path, or the rule set has no such market, the open table no such food, or the service no such schema."}
	notAllowed    = kind{"method-not-allowed", 405, "The method does not fit the path", "The header Allow lists the methods of this path."}
	notAcceptable = kind{"not-acceptable", 406, "No form of the answer is acceptable", "The header Accept excludes every media type in which this path answers."}
	timeout       = kind{"timeout", 408, "The body did not arrive in time", "The body must arrive within the server's time limit. Send it again, faster or in smaller parts."}
	notLoaded     = kind{"rules-not-loaded", 409, "The rule set asked for is not the one loaded", "The request pins a rule set by its digest; loaded is the digest of the set that answers here."}
	tooLarge      = kind{"too-large", 413, "The body is too large", "A recipe may have 1 MiB, a batch 100 recipes and 8 MiB."}
	answerLarge   = kind{"answer-too-large", 413, "The answer would be too large", "Ask for fewer markets, leave contributions out, send fewer recipes at once, or accept gzip."}
	queryLong     = kind{"query-too-long", 414, "The query is too long", "A query may have 2,048 bytes."}
	unsupported   = kind{"unsupported-media-type", 415, "The body's media type or coding is not read here", "The header Accept of the answer lists the media types that are read; Accept-Encoding the codings."}
	faulty        = kind{"faulty-document", 422, "The document has faults", "The body is JSON, but no recipe or request that can be checked. All faults are listed, each with its place."}
	tooMany       = kind{"too-many-requests", 429, "Too many requests of one client at the same time", "Wait for answers before sending more; Retry-After tells how long at least."}
	internal      = kind{"internal", 500, "Something went wrong here", "The fault is the service's. The log has its cause under the request id, and nothing of the recipe."}
	busy          = kind{"busy", 503, "The service is busy", "As many requests are at work and waiting as may be. Retry-After tells when to try again."}
)

func kinds() []kind {
	return []kind{notJSON, badRequest, unauthorized, notFound, notAllowed, notAcceptable, timeout, notLoaded, tooLarge, answerLarge, queryLong, unsupported, faulty, tooMany, internal, busy}
}

// Codes of faults that a recipe alone cannot have. Those of recipes are recipe.Codes, those of requests checkCodes.
const (
	codeUnknownParameter  = "unknown-parameter"
	codeRepeatedParameter = "repeated-parameter"
	codeMissingParameter  = "missing-parameter"
	codeBadQuery          = "bad-query"
	codeTwoProducts       = "two-products"
)

func ownCodes() []recipe.CodeRule {
	return []recipe.CodeRule{
		{Code: codeUnknownParameter, Says: "the query has a parameter that is not known here"},
		{Code: codeRepeatedParameter, Says: "the query has the same parameter twice"},
		{Code: codeMissingParameter, Says: "the query lacks a parameter that must be there"},
		{Code: codeBadQuery, Says: "the query cannot be read"},
		{Code: codeTwoProducts, Says: "a recipe and a food are given; one product is judged"},
	}
}

func problem(k kind, detail string) *Problem {
	return &Problem{Type: "/problems/" + k.Name, Title: k.Title, Status: k.Status, Detail: detail}
}

// with adds a header that goes with the problem.
func (p *Problem) with(name, value string) *Problem {
	if p.header == nil {
		p.header = http.Header{}
	}
	p.header.Set(name, value)
	return p
}

func (p *Problem) bytes() []byte {
	b, err := json.Marshal(p)
	if err != nil { // no field can fail
		return []byte(`{"type":"/problems/internal","title":"Something went wrong here","status":500}`)
	}
	return append(b, '\n')
}

// faultyParameters is a problem of the query; nil where there is no fault.
func faultyParameters(faults ...*Fault) *Problem {
	p := problem(badRequest, "")
	for _, f := range faults {
		if f != nil {
			p.Faults = append(p.Faults, *f)
		}
	}
	if len(p.Faults) == 0 {
		return nil
	}
	return p
}

// faultyDocument sorts faults into the kind of problem that the worst of them is.
func faultyDocument(faults recipe.Faults) *Problem {
	k := faulty
	for _, f := range faults {
		switch f.Code {
		case recipe.TooLarge:
			k = tooLarge
		case recipe.BadSyntax, recipe.BadText, recipe.TrailingData:
			if k.Status != tooLarge.Status {
				k = notJSON
			}
		}
	}
	if len(faults) > recipe.MaxFaults+1 {
		faults = append(faults[:recipe.MaxFaults:recipe.MaxFaults], recipe.Fault{Code: recipe.MoreFaults, Says: "the document has more faults; the first ones are listed"})
	}
	p := problem(k, "")
	for _, f := range faults {
		p.Faults = append(p.Faults, Fault{Pointer: &f.Pointer, Code: f.Code, Says: f.Says})
	}
	return p
}

// Refuse writes a problem that a door finds itself, by the last segment of its type; an unknown one is internal.
func Refuse(w http.ResponseWriter, r *http.Request, name, detail string) {
	p := problem(internal, detail)
	for _, k := range kinds() {
		if k.Name == name {
			p = problem(k, detail)
		}
	}
	if p.Status == unauthorized.Status {
		p.with("WWW-Authenticate", "Bearer")
	}
	p.RequestID = requestID(r)
	secure(w.Header(), p.RequestID)
	p.write(w, r)
}

// write sends a problem.
func (p *Problem) write(w http.ResponseWriter, r *http.Request) (sent int) {
	h := w.Header()
	for _, name := range []string{"ETag", "Vary", "Content-Encoding"} {
		h.Del(name)
	}
	for name, values := range p.header {
		h[name] = values
	}
	h.Set("Cache-Control", "no-store")
	return send(w, r, p.Status, typeProblem, p.bytes())
}
