package recipe

// A FactKind is the form of a fact's value.
type FactKind uint8

// Forms of a fact.
const (
	YesNo FactKind = iota
	OneOf
	Measure
	Listed
)

// A FactRule describes one fact of the closed register.
type FactRule struct {
	Name   string
	Kind   FactKind
	Values []string // of OneOf and Listed
	Unit   string   // of Measure; empty is a plain number, which may also be written in per cent
	Says   string

	Within map[string]string // of OneOf: the wider value that a value belongs to

	Implies   string // a yes-or-no fact that holds when a Listed one names one of ImpliedBy
	ImpliedBy []string
}

// wider are the facts of which a value can belong to a wider one.
var wider = func() map[string]map[string]string {
	out := map[string]map[string]string{}
	for i := range Facts {
		if Facts[i].Within != nil {
			out[Facts[i].Name] = Facts[i].Within
		}
	}
	return out
}()

// WiderFact is the wider value of a fact that a value belongs to; empty where there is none.
func WiderFact(name, value string) string { return wider[name][value] }

// Facts is the closed register. An unstated fact is unknown, never false; what a market takes instead stands in its rules.
var Facts = []FactRule{
	{Name: "meal type", Kind: OneOf, Values: []string{"individual food", "main dish", "meal", "prepackaged meal"}, Says: "what the food is sold as"},
	{Name: "intended for", Kind: OneOf, Values: []string{"general population", "children 1 to 3", "infants", "pregnant or lactating", "pregnant", "lactating"},
		Within: map[string]string{"pregnant": "pregnant or lactating", "lactating": "pregnant or lactating"}, Says: "for whom the food is made"},
	{Name: "annual food sales", Kind: OneOf, Values: []string{"10 million or more", "under 10 million"}, Says: "the maker's yearly food sales in the market's currency, where transition dates depend on them"},
	{Name: "alcohol by volume", Kind: Measure, Unit: "%", Says: "ethanol, per cent by volume"},
	{Name: "naturally free", Kind: YesNo, Says: "foods of this kind are free of or low in the nutrient without special processing"},
	{Name: "specially processed", Kind: YesNo, Says: "the nutrient was lowered by processing, alteration or formulation"},
	{Name: "fat ingredients added", Kind: YesNo, Says: "an added ingredient is a fat or generally understood to contain fat"},
	{Name: "saturated fat ingredients added", Kind: YesNo, Says: "an added ingredient is generally understood to contain saturated fat"},
	{Name: "cholesterol ingredients added", Kind: YesNo, Says: "an added ingredient is generally understood to contain cholesterol"},
	{Name: "sugars added", Kind: YesNo, Says: "sugars, or an ingredient used for its sweetening, are added"},
	{Name: "salt added", Kind: YesNo, Says: "salt or another sodium-bearing ingredient is added"},
	{Name: "sweetening ingredients", Kind: YesNo, Says: "the food has sweeteners or sweetening ingredients"},
	{Name: "vitamins or minerals added", Kind: YesNo, Says: "vitamins or minerals are added as such"},
	{Name: "sold to", Kind: OneOf, Values: []string{"final consumer", "other business"}, Says: "who buys the food"},
	{Name: "table-top sweetener", Kind: YesNo, Says: "the food is a table-top sweetener"},
	{Name: "single-portion package", Kind: YesNo, Says: "the package holds a single portion"},
	{Name: "kind of drink", Kind: OneOf, Values: []string{"semi-skimmed milk", "natural mineral water", "other water", "wine", "other drink"}, Says: "which kind of drink, where limits differ"},
	{Name: "beverage", Kind: YesNo, Says: "the food is a drink"},
	{Name: "seafood or game meat product", Kind: YesNo, Says: "the food is a seafood or game meat product as packaged"},
	{Name: "discrete product", Kind: YesNo, Says: "the product is whole pieces, not a mixture"},
	{Name: "mixed dish not measurable with a cup", Kind: YesNo, Says: "the food is a mixed dish such as a burrito or a sandwich"},
	{Name: "replaced food has added sugars", Kind: YesNo, Says: "the food that this one resembles and replaces normally contains added sugars"},
	{Name: "replaced food has added salt", Kind: YesNo, Says: "the food that this one resembles and replaces is normally processed with salt"},
	{Name: "protein level reached after correction for quality", Kind: YesNo, Says: "the protein level of the claim is reached after correction for digestibility and amino acids"},
	{Name: "named food in the meal meets the level", Kind: YesNo, Says: "the meal contains a food that meets the level of the claim, and the claim names it"},
	{Name: "food group amounts for healthy reached", Kind: YesNo, Says: "the food group equivalents that the claim “healthy” (2024 text) asks of the product are reached"},
	{Name: "contains grain, fruit or vegetables", Kind: YesNo, Says: "the food is or contains a grain product, fruit or vegetable"},
	{Name: "claimed nutrient without fortification", Kind: YesNo, Says: "the level of the claimed nutrient is reached without fortification"},
	{Name: "whole grain 51 % or more", Kind: YesNo, Says: "whole grain makes 51 % or more of the weight per reference amount"},
	{Name: "named food amount reached", Kind: YesNo, Says: "the food is what the claim names, or holds as much of it as the rule asks for"},
	{Name: "further limits of the letter met", Kind: YesNo, Says: "limits of a letter or notification that the rule set does not hold are met"},
	{Name: "preformed vitamin A within the daily value", Kind: YesNo, Says: "preformed vitamin A is not above the daily value"},
	{Name: "fat only from the named food", Kind: YesNo, Says: "all fat comes from the whole food that the claim names"},
	{Name: "soluble fibre from", Kind: OneOf, Values: []string{"whole oats or barley", "oatrim or barley betafiber", "psyllium husk", "other"}, Says: "which source gives the soluble fibre"},
	{Name: "soy protein per reference amount", Kind: Measure, Unit: "g", Says: "soy protein in a reference amount"},
	{Name: "plant sterol esters per reference amount", Kind: Measure, Unit: "g", Says: "plant sterol esters in a reference amount"},
	{Name: "plant stanol esters per reference amount", Kind: Measure, Unit: "g", Says: "plant stanol esters in a reference amount"},
	{Name: "spreadable fat", Kind: OneOf, Values: []string{"milk fat", "other fat", "blend", "other fat with 3 to 10 % of milk fat", "no"}, Says: "the product is a spreadable fat, and of which group of fats"},
	{Name: "kind of oil", Kind: OneOf, Values: []string{"camelina, mustard or borage oil", "other vegetable oil", "animal fat or oil"}, Says: "which kind of oil, where limits differ"},
	{Name: "food supplement", Kind: YesNo, Says: "the product is a food supplement"},
	{Name: "exempt from the nutrition declaration", Kind: YesNo, Says: "the food belongs to those that the law excuses from a nutrition declaration"},
	{Name: "declaration exemption", Kind: OneOf, Values: exemptions, Says: "why the food might need no nutrition declaration; each law has its own list of these"},
	{Name: "prepacked", Kind: YesNo, Says: "the food is sold prepacked; no means loose, packed on request or packed for immediate sale"},
	{Name: "very low energy diet", Kind: YesNo, Says: "the food is for a very low energy diet"},
	{Name: "phosphorus without phytate at most calcium", Kind: YesNo, Says: "the food has no more phosphorus, without that of phytate, than calcium"},
	{Name: "protein digestibility-corrected amino acid score", Kind: Measure, Says: "the score (PDCAAS) of the food's protein"},
	{Name: "protein efficiency ratio", Kind: Measure, Says: "the efficiency ratio (PER) of the food's protein, determined by the law's official method"},
	{Name: "protein efficiency ratio against casein", Kind: Measure, Says: "the efficiency ratio of the food's protein over that of casein"},
	{Name: "reasonable daily intake", Kind: Measure, Unit: "g", Says: "what the law takes for a day's intake of the food, where its category does not tell"},
	{Name: "nutrients added as such", Kind: Listed, Values: append([]string{"polyols"}, micronutrients...), Implies: "vitamins or minerals added", ImpliedBy: micronutrients,
		Says: "which vitamins, minerals and sugar alcohols are added, by the names of quantities"},
	{Name: "replaced food has added fat", Kind: YesNo, Says: "the food that this one resembles and replaces normally contains added fat"},
	{Name: "reduction of added sodium", Kind: Measure, Unit: "%", Says: "how much less sodium is added than to the similar food"},
	{Name: "fermentable carbohydrate", Kind: Measure, Unit: "%", Says: "starch, dextrins, sugars, oligosaccharides and other fermentable carbohydrate, by weight"},
	{Name: "plaque pH stays at 5.7 or above", Kind: YesNo, Says: "the food does not lower plaque pH below 5.7 by bacterial fermentation during 30 minutes after eating"},
	{Name: "random weight", Kind: YesNo, Says: "packages of the food differ in weight"},
	{Name: "no nutrition table allowed", Kind: OneOf, Values: []string{"formulated liquid diet", "human milk fortifier or substitute", "meal replacement", "nutritional supplement", "very low energy diet food", "supplemented food", "no"}, Says: "the food is of a kind that has a table of its own law"},
	{Name: "for children under 2", Kind: YesNo, Says: "the food is made for children under 2 years"},
	{Name: "enriched grain product under a standard", Kind: YesNo, Says: "the food is an enriched grain product that conforms to a standard of identity"},
	{Name: "half of the usual sodium added", Kind: YesNo, Says: "50 per cent less sodium is added than is normally added to the reference food"},
	{Name: "antioxidant activity recognised", Kind: YesNo, Says: "every nutrient named has a reference intake and recognised antioxidant activity"},
	{Name: "served for immediate consumption", Kind: YesNo, Says: "the food is served in a restaurant or the like"},
	{Name: "fats and oils predominate", Kind: YesNo, Says: "fats and oils together weigh at least as much as the heaviest other ingredient"},
	{Name: "single-ingredient sugar, honey or syrup", Kind: YesNo, Says: "the food is sugar, honey or a syrup, and nothing else"},
	{Name: "similar supplements exceed low calorie", Kind: YesNo, Says: "similar dietary supplements are above the level of low calorie"},
	{Name: "unit is usually divided", Kind: YesNo, Says: "the unit is divided for eating, such as a cake, a pie or a pizza"},
	{Name: "two thirds of the nutrients reach the daily value", Kind: YesNo, Says: "two thirds at least of the vitamins and minerals present at 2 per cent of the daily value or more reach 100 per cent"},
	{Name: "polydextrose or erythritol added", Kind: OneOf, Values: []string{"polydextrose", "erythritol", "both", "no"}, Says: "whether polydextrose or erythritol is added"},
	{Name: "reference food representative of its type", Kind: YesNo, Says: "the value of the reference food stands for its type of food, as a market leader's or the maker's own regular product's does"},
	{Name: "food group", Kind: OneOf, Values: []string{"vegetable", "fruit", "grain", "dairy", "game meat", "seafood", "egg", "beans, peas or lentils", "nuts, seeds or soy", "oil", "oil-based spread", "oil-based dressing",
		"mixed product", "encouraged foods with nothing but water", "water, tea or coffee"}, Says: "which food group the food belongs to, where a claim has limits by group"},
	{Name: "saturated fat not inherent in seafood, nuts, seeds or soy", Kind: Measure, Unit: "%", Says: "share of the food's saturated fat that does not come with seafood, nuts, seeds or soy"},
	{Name: "added plant sterols", Kind: OneOf, Values: []string{"sterols", "stanols", "both", "no"}, Says: "whether plant sterols, plant stanols or their esters are added"},
	{Name: "infant formula", Kind: OneOf, Values: []string{"infant formula", "follow-on formula", "no"}, Says: "the food is a formula for infants, and of which kind"},
	{Name: "minced meat", Kind: OneOf, Values: []string{"lean minced meat", "minced pure beef", "minced meat containing pigmeat", "minced meat of other species", "no"}, Says: "the food is minced meat, and of which name"},
	{Name: "collagen to protein ratio", Kind: Measure, Unit: "%", Says: "collagen in meat protein"},
	{Name: "kind of olive oil", Kind: OneOf, Values: []string{"extra virgin olive oil", "virgin olive oil", "olive oil composed of refined and virgin olive oils", "olive-pomace oil", "no"}, Says: "the food is an olive oil, and of which name"},
	{Name: "free acidity", Kind: Measure, Unit: "%", Says: "free fatty acids of the oil, as oleic acid in g per 100 g"},
	{Name: "animal fat in the fat", Kind: Measure, Unit: "%", Says: "fat of animal origin in all fat of the food"},
	{Name: "made directly from milk or cream", Kind: YesNo, Says: "the butter is made directly from milk or cream"},
	{Name: "oil group for 3-MCPD", Kind: OneOf, Values: []string{"coconut, maize, rapeseed, sunflower, soybean, palm kernel or olive oil", "other vegetable, fish or marine oil", "mixture", "virgin olive oil"}, Says: "the group of oils that decides the limit of 3-MCPD"},
	{Name: "3-MCPD and its esters", Kind: Measure, Unit: "µg", Says: "3-monochloropropanediol and its fatty-acid esters, as 3-MCPD, in 1 kg"},
	{Name: "glycidyl esters", Kind: Measure, Unit: "µg", Says: "glycidyl fatty-acid esters, as glycidol, in 1 kg"},
	{Name: "benzo(a)pyrene", Kind: Measure, Unit: "µg", Says: "benzo(a)pyrene in 1 kg"},
	{Name: "four polycyclic aromatic hydrocarbons", Kind: Measure, Unit: "µg", Says: "benzo(a)pyrene, benz(a)anthracene, benzo(b)fluoranthene and chrysene together, in 1 kg"},
	{Name: "made for baby food", Kind: YesNo, Says: "the oil or fat is meant for the making of food for infants and young children"},
	{Name: "kind of food", Kind: OneOf, Values: []string{"fat or oil", "fruit or vegetable", "dairy product", "mayonnaise or dressing", "snack bar", "mustard", "meat or poultry, not ground", "ground meat or poultry", "fish or seafood", "chewing gum", "hard candy or breath freshener", "other food"}, Says: "which kind of food, where a rule names kinds"},
	{Name: "trans origin", Kind: OneOf, Values: []string{"ruminant", "industrial"}, Says: "where all trans fatty acids of the product come from"},
}

// exemptions are the kinds of food and of sale that a law may excuse from a nutrition declaration.
var exemptions = []string{
	"none",
	"unprocessed product of one ingredient", "product of one ingredient, matured only", "water", "herb or spice", "salt", "table-top sweetener", "coffee or chicory",
	"tea or infusion", "fermented vinegar", "flavouring", "additive", "processing aid", "enzyme", "gelatine", "jam-setting compound", "yeast", "chewing gum",
	"small packaging", "small quantities supplied directly", "fresh fruit or vegetable", "raw meat, poultry or fish of one ingredient",
	"alcoholic drink", "flavour extract or food colour", "dehydrated vegetables as a condiment", "small retailer", "low-volume product", "restaurant or ready to eat",
	"portion served with a meal", "prepared where it is sold", "sold by the maker at a market", "portion for immediate consumption", "small package with a sticker",
	"milk or cream in a refillable container",
}

// micronutrients are the quantities of vitamins and minerals as every market names them.
var micronutrients = []string{
	"vitamin-a", "vitamin-d", "vitamin-e", "vitamin-k", "vitamin-c", "thiamin", "riboflavin", "niacin", "vitamin-b6", "folate", "vitamin-b12", "biotin",
	"pantothenic-acid", "choline", "calcium", "iron", "potassium", "phosphorus", "iodine", "magnesium", "zinc", "selenium", "copper", "manganese", "chromium",
	"molybdenum", "chloride", "fluoride", "sodium",
}
