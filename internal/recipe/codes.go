package recipe

// Codes of faults. They are stable: clients may act on them, and none ever changes its meaning.
const (
	TooLarge       = "too-large"
	BadSyntax      = "bad-syntax"
	BadText        = "bad-text"
	TooDeep        = "too-deep"
	TooManyValues  = "too-many-values"
	TrailingData   = "trailing-data"
	DuplicateName  = "duplicate-name"
	StringTooLong  = "string-too-long"
	NumberTooLong  = "number-too-long"
	Null           = "null"
	MoreFaults     = "more-faults"
	WrongType      = "wrong-type"
	MissingMember  = "missing-member"
	UnknownMember  = "unknown-member"
	WrongValue     = "wrong-value"
	BadAmount      = "bad-amount"
	BadNumber      = "bad-number"
	BadFormat      = "bad-format"
	Empty          = "empty"
	TooMany        = "too-many"
	OneSource      = "one-source"
	DuplicateID    = "duplicate-id"
	Repeated       = "repeated"
	WrongUnit      = "wrong-unit"
	NotAboveZero   = "not-above-zero"
	OutOfRange     = "out-of-range"
	RangeReversed  = "range-reversed"
	CentreOutside  = "centre-outside"
	NeedsDensity   = "needs-density"
	UnknownTag     = "unknown-component"
	UnknownFood    = "unknown-food"
	UnknownAcid    = "unknown-fatty-acid"
	SameAcid       = "same-acid-twice"
	GroupAndMember = "group-beside-member"
	OverWhole      = "profile-over-100"
	AllZero        = "profile-all-zero"
	BadSettlement  = "bad-settlement"
	NoComposition  = "empty-composition"
	SharesNot100   = "shares-not-100"
	UnknownCode    = "unknown-retention"
	YieldTwice     = "yield-twice"
	YieldEmpty     = "yield-empty"
	GainOrLoss     = "gain-or-loss"
	GainNeedsOil   = "gain-needs-oil"
	OilWithoutGain = "oil-without-gain"
	UnknownFact    = "unknown-fact"
	WrongFactValue = "wrong-fact-value"
	EmptyClaim     = "empty-claim"
	UnknownAgainst = "unknown-reference-food"
	TooManyParts   = "too-many-ingredients"
	TooManyLevels  = "too-many-levels"
)

// A CodeRule tells what one code means.
type CodeRule struct{ Code, Says string }

// Codes is the closed list of fault codes.
var Codes = []CodeRule{
	{TooLarge, "the document is longer than 1 MiB"},
	{BadSyntax, "the document is not JSON; nothing after this place was read"},
	{BadText, "a text is not valid UTF-8 or has half of a surrogate pair"},
	{TooDeep, "objects and arrays are nested more than 64 deep"},
	{TooManyValues, "the document has more than 100,000 values"},
	{TrailingData, "something follows the document's value"},
	{DuplicateName, "an object has the same member twice"},
	{StringTooLong, "a text or a member's name has more than 1,000 characters"},
	{NumberTooLong, "a JSON number has more than 40 characters"},
	{Null, "a member is null; what is not known is left out"},
	{MoreFaults, "the document has more faults than are listed"},
	{WrongType, "the value has another JSON type than the one wanted"},
	{MissingMember, "a member that must be there is not"},
	{UnknownMember, "a member has a name that is not known here"},
	{WrongValue, "the text is none of the listed ones"},
	{BadAmount, "the text is no amount: a number and its unit, such as 420 g"},
	{BadNumber, "the text is no number, such as 44.1"},
	{BadFormat, "the text is not written as wanted here"},
	{Empty, "a text, a name, a list or an object is empty where something is wanted"},
	{TooMany, "a text, a list or an object is longer than allowed here"},
	{OneSource, "exactly one of composition, food, label and recipe is wanted"},
	{DuplicateID, "two ingredients of one list have the same id"},
	{Repeated, "a list names the same thing twice"},
	{WrongUnit, "the unit measures something else than what is wanted here"},
	{NotAboveZero, "a number that must be above zero is zero"},
	{OutOfRange, "a number lies outside what is possible here"},
	{RangeReversed, "the low end of a range lies above its high end"},
	{CentreOutside, "the value of a range lies outside its ends"},
	{NeedsDensity, "a volume is given and nothing tells its mass"},
	{UnknownTag, "the component register has no such tagname"},
	{UnknownFood, "the open table has no such food"},
	{UnknownAcid, "the notation of a fatty acid cannot be read"},
	{SameAcid, "a profile gives the same fatty acid twice, perhaps in two notations"},
	{GroupAndMember, "a profile gives a group of fatty acids and a member of it"},
	{AllZero, "a complete fatty-acid profile in per cent has no value above zero"},
	{OverWhole, "the shares of a profile sum to more than 102"},
	{BadSettlement, "a group is settled that is not in the profile, or as something that is not a part of it"},
	{NoComposition, "a composition states neither components nor fatty acids"},
	{SharesNot100, "shares do not sum to 100 %"},
	{UnknownCode, "the retention table has no such code"},
	{YieldTwice, "a yield states the final mass and changes as well"},
	{YieldEmpty, "a yield states neither the final mass nor a change"},
	{GainOrLoss, "exactly one of gain and loss is wanted"},
	{GainNeedsOil, "fat is gained and nothing tells which"},
	{OilWithoutGain, "an oil is named and no fat is gained"},
	{UnknownFact, "the register of facts has no such fact"},
	{WrongFactValue, "the fact cannot have this value"},
	{EmptyClaim, "a claim has neither words nor a name"},
	{UnknownAgainst, "reference_foods has no food of this name"},
	{TooManyParts, "the document has more than 2,000 ingredients in all"},
	{TooManyLevels, "recipes are nested more than 8 deep"},
}
