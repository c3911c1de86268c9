package check

import (
	"fmt"

	"gramlaw/internal/recipe"
	"gramlaw/internal/wording"
)

// Codes is the closed list of codes of faults that Check finds. Like recipe.Codes they are stable.
var Codes = []recipe.CodeRule{
	{Code: "not-a-date", Says: "the text is no date of the form yyyy-mm-dd"},
	{Code: "unknown-transition", Says: `the transition is neither "required" nor "newest"`},
	{Code: "unknown-detail", Says: `the detail is not "contributions"`},
	{Code: "unknown-market", Says: "the rule set has no such market"},
	{Code: wording.CodeEmpty, Says: "there are no words to read"},
	{Code: wording.CodeLong, Says: fmt.Sprintf("the words have more than %d characters", wording.MaxText)},
	{Code: wording.CodeLanguage, Says: "the code is that of no language"},
	{Code: wording.CodeWords, Says: "the words of the rule set cannot be used"},
	{Code: "unknown-presumption", Says: "the rule set has no such presumption"},
	{Code: "claim-twice", Says: "a claim is asked for by its words and by its name"},
	{Code: "over-100", Says: "an ingredient holds more than 100 g of a component in 100 g"},
	{Code: "no-mass", Says: "the finished food, or a part of it, has no mass left"},
	{Code: "own-food", Says: "an ingredient is one of a store of recipes, which a single check does not read"},
	{Code: "volume-without-density", Says: "an amount is a volume, and the ingredient has no density"},
	{Code: "fat-loss-needs-fat", Says: "fat is lost in cooking, and how much comes in is not stated exactly"},
	{Code: "fat-loss-too-large", Says: "more fat is lost than there is"},
	{Code: "too-fine", Says: "the recipe has too many different divisors to be computed exactly"},
	{Code: "label-serving", Says: "the serving of another product's label is no mass above zero"},
	{Code: "label-line", Says: "the declaration of that market has no such line, or no rounding for it"},
	{Code: "label-value", Says: "no amount prints like that under the rounding of that market"},
}
