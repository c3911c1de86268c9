package web

import (
	"mime"
	"net/http"
	"strconv"
	"strings"
)

// Media types of the service.
const (
	typeJSON    = "application/json"
	typeSchema  = "application/schema+json"
	typeProblem = "application/problem+json"
	typeNDJSON  = "application/x-ndjson"
	typeJSONL   = "application/jsonl"
)

// choose is the offer the client likes best, by the most specific range that fits each (RFC 9110, 12.5.1); the first of equals.
func (x *exchange) choose(offers ...string) (string, *Problem) {
	accept := strings.Join(x.r.Header.Values("Accept"), ",")
	if strings.TrimSpace(accept) == "" {
		return offers[0], nil
	}
	best, most := "", 0
	for _, offer := range offers {
		if q := quality(accept, offer); q > most {
			best, most = offer, q
		}
	}
	if best == "" {
		return "", problem(notAcceptable, "This path answers in "+strings.Join(offers, " or ")+".")
	}
	return best, nil
}

// quality is the weight of an offer in thousandths.
func quality(accept, offer string) int {
	family, _, _ := strings.Cut(offer, "/")
	weight, rank := 0, -1
	for part := range strings.SplitSeq(accept, ",") {
		name, parameters, err := mime.ParseMediaType(part)
		if err != nil {
			continue
		}
		fits := map[string]int{"*/*": 0, family + "/*": 1, offer: 2}
		if r, ok := fits[name]; ok && r > rank {
			weight, rank = thousandths(parameters["q"]), r
		}
	}
	return weight
}

func thousandths(q string) int {
	if q == "" {
		return 1000
	}
	f, err := strconv.ParseFloat(q, 64)
	if err != nil || !(f >= 0 && f <= 1) {
		return 0
	}
	return int(f * 1000)
}

// takesGzip tells whether the client reads gzip.
func takesGzip(r *http.Request) bool {
	weight, named := 0, false
	for part := range strings.SplitSeq(strings.Join(r.Header.Values("Accept-Encoding"), ","), ",") {
		name, parameters, _ := strings.Cut(part, ";")
		name = strings.ToLower(strings.TrimSpace(name))
		if name != "gzip" && (name != "*" || named) {
			continue
		}
		_, q, _ := strings.Cut(parameters, "=")
		weight, named = thousandths(strings.TrimSpace(q)), named || name == "gzip"
	}
	return weight > 0
}
