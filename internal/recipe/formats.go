package recipe

import (
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strings"
	"time"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// Names of the formats of schemas/recipe.schema.json. The decoder and the schema use the same parsers.
const (
	formatAmount       = "amount"
	formatValue        = "value"
	formatNumber       = "number"
	formatProfileValue = "profile-value"
	formatDensity      = "density"
	formatArea         = "area"
	formatPercentage   = "percentage"
	formatDate         = "date"
	formatMarket       = "jurisdiction"
	formatMarketKey    = "jurisdiction-key"
	formatLanguage     = "language"
	formatClaim        = "claim-name"
	formatFood         = "food"
	formatRetention    = "retention"
	formatOrigin       = "trans-origin"
)

// formats lists what the schema asserts.
func formats() map[string]func(string) error {
	return map[string]func(string) error{
		formatAmount:       check(quantity.ParseAmount),
		formatValue:        check(parseValue),
		formatNumber:       check(quantity.ParseNumber),
		formatProfileValue: check(parseShare),
		formatDensity:      check(parseDensity),
		formatArea:         check(parseArea),
		formatPercentage:   check(parsePercentage),
		formatDate:         check(parseDate),
		formatMarket:       check(parseMarket),
		formatMarketKey:    check(parseMarketKey),
		formatLanguage:     check(parseLanguage),
		formatClaim:        check(parseClaimName),
		formatFood:         check(parseFood),
		formatRetention:    check(parseRetention),
		formatOrigin:       check(parseOrigin),
	}
}

func check[T any](parse func(string) (T, error)) func(string) error {
	return func(s string) error {
		_, err := parse(s)
		return err
	}
}

// parseValue reads "1.5 g", which is exact, or "<0.1 g", which is anything from zero.
func parseValue(s string) (Value, error) {
	text, below := under(s)
	a, err := quantity.ParseAmount(text)
	return stated(a, below), err
}

// parseShare reads a number of a profile, "44.1" or "<0.1"; its unit follows the basis.
func parseShare(s string) (Value, error) {
	text, below := under(s)
	a, err := plain(text)
	return stated(a, below), err
}

func under(s string) (text string, below bool) {
	text, below = strings.CutPrefix(s, "<")
	if below {
		text = strings.TrimPrefix(text, " ")
	}
	return text, below
}

func stated(a quantity.Amount, below bool) Value {
	if below {
		return Value{High: a.Value, Unit: a.Unit}
	}
	return Value{Low: a.Value, High: a.Value, Central: a.Value, Typical: true, Unit: a.Unit}
}

// plain is a number without a unit in the form of an amount.
func plain(s string) (quantity.Amount, error) {
	d, err := quantity.ParseNumber(s)
	return quantity.Amount{Value: d}, err
}

// measured reads a number and one of the spellings of a unit.
func measured(s, example string, units ...string) (decimal.Decimal, error) {
	for _, u := range units {
		if number, ok := strings.CutSuffix(s, u); ok {
			return quantity.ParseNumber(strings.TrimSuffix(number, " "))
		}
	}
	return decimal.Decimal{}, fmt.Errorf("%s is not written as a number and %s; write for instance %s", quote(s), units[0], example)
}

// A kilogram per litre is a gram per millilitre.
func parseDensity(s string) (decimal.Decimal, error) {
	return measured(s, "0.92 g/mL", "g/mL", "g/ml", "kg/L", "kg/l")
}

func parseArea(s string) (decimal.Decimal, error) { return measured(s, "240 cm2", "cm2", "cm²") }

func parsePercentage(s string) (decimal.Decimal, error) { return measured(s, "40 %", "%") }

func parseDate(s string) (string, error) {
	if _, err := time.Parse(time.DateOnly, s); err != nil {
		return "", fmt.Errorf("%s is not a day of the calendar written as 2026-12-01", quote(s))
	}
	return s, nil
}

func letters(s string) bool {
	return strings.IndexFunc(s, func(r rune) bool { return r < 'a' || r > 'z' }) < 0
}

func parseMarket(s string) (string, error) {
	if len(s) < 2 || len(s) > 5 || !letters(s) {
		return "", fmt.Errorf(`%s is not written as a jurisdiction: two to five small letters, such as "us"`, quote(s))
	}
	return s, nil
}

func parseMarketKey(s string) (string, error) {
	if _, err := parseMarket(s); err != nil && s != "default" {
		return "", fmt.Errorf(`%s is neither "default" nor a jurisdiction of two to five small letters, such as "us"`, quote(s))
	}
	return s, nil
}

var (
	languageTag = regexp.MustCompile(`^[a-z]{2,3}(-[A-Za-z0-9]{2,8}){0,3}$`)
	claimName   = regexp.MustCompile(`^[a-z0-9]+(-[a-z0-9]+)*$`)
	foodName    = regexp.MustCompile(`^[a-z]{1,12}:[A-Za-z0-9._-]{1,40}$`)
	retention   = regexp.MustCompile(`^usda-r6:[0-9]{4}$`)
)

func matching(s string, form *regexp.Regexp, wanted string) (string, error) {
	if !form.MatchString(s) {
		return "", fmt.Errorf("%s is not %s", quote(s), wanted)
	}
	return s, nil
}

func parseLanguage(s string) (string, error) {
	return matching(s, languageTag, `a language tag such as "en" or "zh-Hant"`)
}

func parseClaimName(s string) (string, error) {
	return matching(s, claimName, `the shared name of a claim, such as "saturated-fat-low"`)
}

func parseFood(s string) (string, error) {
	return matching(s, foodName, `a food of an open table, such as "sr:20038", or an ingredient of your own store, such as "own:baking-fat"`)
}

func parseRetention(s string) (string, error) {
	_, err := matching(s, retention, `a row of the retention table, such as "usda-r6:0352"`)
	return strings.TrimPrefix(s, "usda-r6:"), err
}

func parseOrigin(s string) (string, error) {
	if !slices.Contains(TransOrigins, s) {
		return "", errors.New(quote(s) + " is no origin of trans fatty acids; known are " + list(quoted(TransOrigins), "and"))
	}
	return s, nil
}
