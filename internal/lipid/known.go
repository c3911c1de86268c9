package lipid

// Record is one known acid with its names and numbers.
type Record struct {
	Trivial      string   // usual name, without the word acid
	Names        []string // other names and abbreviations that mean this acid
	Systematic   string
	Notation     string // canonical, as Species.String prints it
	Tag          string // INFOODS tagname, empty without one; F18D2CLA covers the whole group of conjugated 18:2
	USDA         string // USDA nutrient number the acid is reported under (several acids may share one), empty without one
	MeltingPoint string // °C, a decimal number, empty where none is given; tables differ by 0.5 to 2 °C
	Shorthand    Evidence
}

// Evidence grades where the shorthand notation of a record comes from.
type Evidence string

const (
	computed Evidence = ""     // written by the grammar
	seen     Evidence = "seen" // LIPID MAPS shorthand update 2020, J Lipid Res 61:1539, Table 2B
)

// MeltingPointSource grades every melting point and trivial name of Known: from memory, not checked against the books.
const MeltingPointSource = "Lipid Handbook and CRC tables, from memory"

// Known lists the acids known by name. The list is a fresh copy.
func Known() []Record { return append([]Record(nil), known...) }

// Trivial is the usual name of the acid without the word acid ("oleic"); empty for a group and for an acid without one.
func (s Species) Trivial() string {
	if s.IsGroup() {
		return ""
	}
	return trivial[s.acid.String()]
}

var trivial = func() map[string]string {
	m := make(map[string]string, len(known))
	for _, r := range known {
		m[r.Notation] = r.Trivial
	}
	return m
}()

// Melting point of oleic acid: the alpha form; the beta form melts at 16.3 °C.
var known = []Record{
	{Trivial: "butyric", Systematic: "butanoic acid", Notation: "FA 4:0", Tag: "F4D0", USDA: "607", MeltingPoint: "-5.3"},
	{Trivial: "valeric", Systematic: "pentanoic acid", Notation: "FA 5:0", Tag: "F5D0", MeltingPoint: "-33.7"},
	{Trivial: "caproic", Systematic: "hexanoic acid", Notation: "FA 6:0", Tag: "F6D0", USDA: "608", MeltingPoint: "-3.2"},
	{Trivial: "enanthic", Systematic: "heptanoic acid", Notation: "FA 7:0", Tag: "F7D0", MeltingPoint: "-7.2"},
	{Trivial: "caprylic", Systematic: "octanoic acid", Notation: "FA 8:0", Tag: "F8D0", USDA: "609", MeltingPoint: "16.5"},
	{Trivial: "pelargonic", Systematic: "nonanoic acid", Notation: "FA 9:0", Tag: "F9D0", MeltingPoint: "12.4"},
	{Trivial: "capric", Systematic: "decanoic acid", Notation: "FA 10:0", Tag: "F10D0", USDA: "610", MeltingPoint: "31.6"},
	{Trivial: "undecylic", Systematic: "undecanoic acid", Notation: "FA 11:0", Tag: "F11D0", MeltingPoint: "28.6"},
	{Trivial: "lauric", Systematic: "dodecanoic acid", Notation: "FA 12:0", Tag: "F12D0", USDA: "611", MeltingPoint: "44.8", Shorthand: seen},
	{Trivial: "tridecylic", Systematic: "tridecanoic acid", Notation: "FA 13:0", Tag: "F13D0", USDA: "696", MeltingPoint: "41.8"},
	{Trivial: "myristic", Systematic: "tetradecanoic acid", Notation: "FA 14:0", Tag: "F14D0", USDA: "612", MeltingPoint: "54.4", Shorthand: seen},
	{Trivial: "pentadecylic", Systematic: "pentadecanoic acid", Notation: "FA 15:0", Tag: "F15D0", USDA: "652", MeltingPoint: "52.5"},
	{Trivial: "palmitic", Systematic: "hexadecanoic acid", Notation: "FA 16:0", Tag: "F16D0", USDA: "613", MeltingPoint: "62.9", Shorthand: seen},
	{Trivial: "margaric", Systematic: "heptadecanoic acid", Notation: "FA 17:0", Tag: "F17D0", USDA: "653", MeltingPoint: "61.3"},
	{Trivial: "stearic", Systematic: "octadecanoic acid", Notation: "FA 18:0", Tag: "F18D0", USDA: "614", MeltingPoint: "70.1", Shorthand: seen},
	{Trivial: "nonadecylic", Systematic: "nonadecanoic acid", Notation: "FA 19:0", Tag: "F19D0", MeltingPoint: "69.4"},
	{Trivial: "arachidic", Systematic: "icosanoic acid", Notation: "FA 20:0", Tag: "F20D0", USDA: "615", MeltingPoint: "76.1", Shorthand: seen},
	{Trivial: "heneicosylic", Systematic: "henicosanoic acid", Notation: "FA 21:0", Tag: "F21D0", MeltingPoint: "75.2"},
	{Trivial: "behenic", Systematic: "docosanoic acid", Notation: "FA 22:0", Tag: "F22D0", USDA: "624", MeltingPoint: "80.0", Shorthand: seen},
	{Trivial: "tricosylic", Systematic: "tricosanoic acid", Notation: "FA 23:0", Tag: "F23D0", MeltingPoint: "79.6"},
	{Trivial: "lignoceric", Systematic: "tetracosanoic acid", Notation: "FA 24:0", Tag: "F24D0", USDA: "654", MeltingPoint: "84.2", Shorthand: seen},
	{Trivial: "cerotic", Systematic: "hexacosanoic acid", Notation: "FA 26:0", Tag: "F26D0", MeltingPoint: "87.7"},
	{Trivial: "montanic", Systematic: "octacosanoic acid", Notation: "FA 28:0", MeltingPoint: "90.9"},
	{Trivial: "iso-pentadecanoic", Names: []string{"13-methylmyristic"}, Systematic: "13-methyltetradecanoic acid", Notation: "FA 14:0;13Me", Tag: "F15D0I"},
	{Trivial: "anteiso-pentadecanoic", Names: []string{"12-methylmyristic"}, Systematic: "12-methyltetradecanoic acid", Notation: "FA 14:0;12Me", Tag: "F15D0AI"},
	{Trivial: "iso-palmitic", Systematic: "14-methylpentadecanoic acid", Notation: "FA 15:0;14Me", Tag: "F16D0I"},
	{Trivial: "iso-margaric", Systematic: "15-methylhexadecanoic acid", Notation: "FA 16:0;15Me", Tag: "F17D0I"},
	{Trivial: "anteiso-margaric", Systematic: "14-methylhexadecanoic acid", Notation: "FA 16:0;14Me", Tag: "F17D0AI"},
	{Trivial: "phytanic", Systematic: "3,7,11,15-tetramethylhexadecanoic acid", Notation: "FA 16:0;3Me,7Me,11Me,15Me"},
	{Trivial: "caproleic", Systematic: "(9Z)-dec-9-enoic acid", Notation: "FA 10:1(9Z)", Tag: "F10D1"},
	{Trivial: "lauroleic", Systematic: "(9Z)-dodec-9-enoic acid", Notation: "FA 12:1(9Z)", Tag: "F12D1"},
	{Trivial: "myristoleic", Systematic: "(9Z)-tetradec-9-enoic acid", Notation: "FA 14:1(9Z)", Tag: "F14D1CN5", USDA: "625", MeltingPoint: "-4.5"},
	{Trivial: "cis-10-pentadecenoic", Systematic: "(10Z)-pentadec-10-enoic acid", Notation: "FA 15:1(10Z)", Tag: "F15D1CN5", USDA: "697"},
	{Trivial: "palmitoleic", Names: []string{"Po"}, Systematic: "(9Z)-hexadec-9-enoic acid", Notation: "FA 16:1(9Z)", Tag: "F16D1CN7", USDA: "673", MeltingPoint: "0.5", Shorthand: seen},
	{Trivial: "palmitelaidic", Systematic: "(9E)-hexadec-9-enoic acid", Notation: "FA 16:1(9E)", Tag: "F16D1TN7", USDA: "662", MeltingPoint: "32"},
	{Trivial: "sapienic", Systematic: "(6Z)-hexadec-6-enoic acid", Notation: "FA 16:1(6Z)"},
	{Trivial: "cis-10-heptadecenoic", Systematic: "(10Z)-heptadec-10-enoic acid", Notation: "FA 17:1(10Z)", Tag: "F17D1CN7", USDA: "687"},
	{Trivial: "oleic", Systematic: "(9Z)-octadec-9-enoic acid", Notation: "FA 18:1(9Z)", Tag: "F18D1CN9", USDA: "674", MeltingPoint: "13.4", Shorthand: seen},
	{Trivial: "elaidic", Systematic: "(9E)-octadec-9-enoic acid", Notation: "FA 18:1(9E)", Tag: "F18D1TN9", USDA: "663", MeltingPoint: "45"},
	{Trivial: "petroselinic", Systematic: "(6Z)-octadec-6-enoic acid", Notation: "FA 18:1(6Z)", Tag: "F18D1CN12", MeltingPoint: "29.8"},
	{Trivial: "petroselaidic", Systematic: "(6E)-octadec-6-enoic acid", Notation: "FA 18:1(6E)", MeltingPoint: "53"},
	{Trivial: "cis-vaccenic", Names: []string{"asclepic"}, Systematic: "(11Z)-octadec-11-enoic acid", Notation: "FA 18:1(11Z)", Tag: "F18D1CN7", USDA: "674", MeltingPoint: "14.5"},
	{Trivial: "trans-vaccenic", Systematic: "(11E)-octadec-11-enoic acid", Notation: "FA 18:1(11E)", Tag: "F18D1TN7", USDA: "859", MeltingPoint: "44", Shorthand: seen},
	{Trivial: "trans-10-octadecenoic", Systematic: "(10E)-octadec-10-enoic acid", Notation: "FA 18:1(10E)", USDA: "663"},
	{Trivial: "gadoleic", Systematic: "(9Z)-icos-9-enoic acid", Notation: "FA 20:1(9Z)", Tag: "F20D1CN11", USDA: "628", MeltingPoint: "24"},
	{Trivial: "gondoic", Systematic: "(11Z)-icos-11-enoic acid", Notation: "FA 20:1(11Z)", Tag: "F20D1CN9", USDA: "628", MeltingPoint: "24"},
	{Trivial: "cetoleic", Systematic: "(11Z)-docos-11-enoic acid", Notation: "FA 22:1(11Z)", Tag: "F22D1CN11", USDA: "676", MeltingPoint: "33"},
	{Trivial: "erucic", Systematic: "(13Z)-docos-13-enoic acid", Notation: "FA 22:1(13Z)", Tag: "F22D1CN9", USDA: "676", MeltingPoint: "34.7"},
	{Trivial: "brassidic", Systematic: "(13E)-docos-13-enoic acid", Notation: "FA 22:1(13E)", Tag: "F22D1TN9", USDA: "664", MeltingPoint: "61.9"},
	{Trivial: "nervonic", Names: []string{"selacholeic"}, Systematic: "(15Z)-tetracos-15-enoic acid", Notation: "FA 24:1(15Z)", Tag: "F24D1CN9", USDA: "671", MeltingPoint: "43", Shorthand: seen},
	{Trivial: "linoleic", Names: []string{"LA"}, Systematic: "(9Z,12Z)-octadeca-9,12-dienoic acid", Notation: "FA 18:2(9Z,12Z)", Tag: "F18D2CN6", USDA: "675", MeltingPoint: "-5", Shorthand: seen},
	{Trivial: "linoelaidic", Systematic: "(9E,12E)-octadeca-9,12-dienoic acid", Notation: "FA 18:2(9E,12E)", Tag: "F18D2TTN6", USDA: "669", MeltingPoint: "28.5"},
	{Trivial: "9-cis,12-trans-octadecadienoic", Systematic: "(9Z,12E)-octadeca-9,12-dienoic acid", Notation: "FA 18:2(9Z,12E)", USDA: "668"},
	{Trivial: "9-trans,12-cis-octadecadienoic", Systematic: "(9E,12Z)-octadeca-9,12-dienoic acid", Notation: "FA 18:2(9E,12Z)", USDA: "667"},
	{Trivial: "rumenic", Names: []string{"CLA 9c11t"}, Systematic: "(9Z,11E)-octadeca-9,11-dienoic acid", Notation: "FA 18:2(9Z,11E)", Tag: "F18D2CLA", USDA: "670", MeltingPoint: "20"},
	{Trivial: "10-trans,12-cis CLA", Names: []string{"CLA 10t12c"}, Systematic: "(10E,12Z)-octadeca-10,12-dienoic acid", Notation: "FA 18:2(10E,12Z)", Tag: "F18D2CLA", USDA: "670"},
	{Trivial: "9-trans,11-trans CLA", Names: []string{"mangold acid", "CLA 9t11t"}, Systematic: "(9E,11E)-octadeca-9,11-dienoic acid", Notation: "FA 18:2(9E,11E)", Tag: "F18D2CLA", USDA: "670", MeltingPoint: "54"},
	{Trivial: "9-cis,15-cis-octadecadienoic", Systematic: "(9Z,15Z)-octadeca-9,15-dienoic acid", Notation: "FA 18:2(9Z,15Z)"},
	{Trivial: "11-trans,15-cis-octadecadienoic", Systematic: "(11E,15Z)-octadeca-11,15-dienoic acid", Notation: "FA 18:2(11E,15Z)"},
	{Trivial: "eicosadienoic", Systematic: "(11Z,14Z)-icosa-11,14-dienoic acid", Notation: "FA 20:2(11Z,14Z)", Tag: "F20D2CN6", USDA: "672"},
	{Trivial: "docosadienoic", Names: []string{"brassic"}, Systematic: "(13Z,16Z)-docosa-13,16-dienoic acid", Notation: "FA 22:2(13Z,16Z)", Tag: "F22D2CN6", USDA: "698"},
	{Trivial: "sebaleic", Systematic: "(5Z,8Z)-octadeca-5,8-dienoic acid", Notation: "FA 18:2(5Z,8Z)"},
	{Trivial: "alpha-linolenic", Names: []string{"ALA"}, Systematic: "(9Z,12Z,15Z)-octadeca-9,12,15-trienoic acid", Notation: "FA 18:3(9Z,12Z,15Z)", Tag: "F18D3CN3", USDA: "851", MeltingPoint: "-11", Shorthand: seen},
	{Trivial: "gamma-linolenic", Names: []string{"GLA"}, Systematic: "(6Z,9Z,12Z)-octadeca-6,9,12-trienoic acid", Notation: "FA 18:3(6Z,9Z,12Z)", Tag: "F18D3CN6", USDA: "685", MeltingPoint: "-11", Shorthand: seen},
	{Trivial: "pinolenic", Systematic: "(5Z,9Z,12Z)-octadeca-5,9,12-trienoic acid", Notation: "FA 18:3(5Z,9Z,12Z)"},
	{Trivial: "rumelenic", Systematic: "(9Z,11E,15Z)-octadeca-9,11,15-trienoic acid", Notation: "FA 18:3(9Z,11E,15Z)"},
	{Trivial: "alpha-eleostearic", Systematic: "(9Z,11E,13E)-octadeca-9,11,13-trienoic acid", Notation: "FA 18:3(9Z,11E,13E)", MeltingPoint: "49"},
	{Trivial: "beta-eleostearic", Systematic: "(9E,11E,13E)-octadeca-9,11,13-trienoic acid", Notation: "FA 18:3(9E,11E,13E)", MeltingPoint: "71.5"},
	{Trivial: "punicic", Systematic: "(9Z,11E,13Z)-octadeca-9,11,13-trienoic acid", Notation: "FA 18:3(9Z,11E,13Z)", MeltingPoint: "44.5"},
	{Trivial: "catalpic", Systematic: "(9E,11E,13Z)-octadeca-9,11,13-trienoic acid", Notation: "FA 18:3(9E,11E,13Z)"},
	{Trivial: "jacaric", Systematic: "(8Z,10E,12Z)-octadeca-8,10,12-trienoic acid", Notation: "FA 18:3(8Z,10E,12Z)"},
	{Trivial: "dihomo-gamma-linolenic", Names: []string{"DGLA"}, Systematic: "(8Z,11Z,14Z)-icosa-8,11,14-trienoic acid", Notation: "FA 20:3(8Z,11Z,14Z)", Tag: "F20D3N6", USDA: "853", Shorthand: seen},
	{Trivial: "eicosatrienoic n-3", Names: []string{"dihomo-ALA", "ETE"}, Systematic: "(11Z,14Z,17Z)-icosa-11,14,17-trienoic acid", Notation: "FA 20:3(11Z,14Z,17Z)", Tag: "F20D3N3", USDA: "852", Shorthand: seen},
	{Trivial: "Mead", Systematic: "(5Z,8Z,11Z)-icosa-5,8,11-trienoic acid", Notation: "FA 20:3(5Z,8Z,11Z)", Tag: "F20D3N9", USDA: "861", Shorthand: seen},
	{Trivial: "stearidonic", Names: []string{"moroctic", "SDA"}, Systematic: "(6Z,9Z,12Z,15Z)-octadeca-6,9,12,15-tetraenoic acid", Notation: "FA 18:4(6Z,9Z,12Z,15Z)", Tag: "F18D4N3", USDA: "627", MeltingPoint: "-57", Shorthand: seen},
	{Trivial: "arachidonic", Names: []string{"ARA"}, Systematic: "(5Z,8Z,11Z,14Z)-icosa-5,8,11,14-tetraenoic acid", Notation: "FA 20:4(5Z,8Z,11Z,14Z)", Tag: "F20D4N6", USDA: "855", MeltingPoint: "-49.5", Shorthand: seen},
	{Trivial: "eicosatetraenoic n-3", Names: []string{"ETA"}, Systematic: "(8Z,11Z,14Z,17Z)-icosa-8,11,14,17-tetraenoic acid", Notation: "FA 20:4(8Z,11Z,14Z,17Z)", Tag: "F20D4N3", USDA: "854"},
	{Trivial: "adrenic", Names: []string{"AdA", "DTA"}, Systematic: "(7Z,10Z,13Z,16Z)-docosa-7,10,13,16-tetraenoic acid", Notation: "FA 22:4(7Z,10Z,13Z,16Z)", Tag: "F22D4N6", USDA: "858"},
	{Trivial: "eicosapentaenoic", Names: []string{"timnodonic", "EPA"}, Systematic: "(5Z,8Z,11Z,14Z,17Z)-icosa-5,8,11,14,17-pentaenoic acid", Notation: "FA 20:5(5Z,8Z,11Z,14Z,17Z)", Tag: "F20D5N3", USDA: "629", MeltingPoint: "-54", Shorthand: seen},
	{Trivial: "heneicosapentaenoic", Names: []string{"HPA"}, Systematic: "(6Z,9Z,12Z,15Z,18Z)-henicosa-6,9,12,15,18-pentaenoic acid", Notation: "FA 21:5(6Z,9Z,12Z,15Z,18Z)", Tag: "F21D5N3", USDA: "857"},
	{Trivial: "docosapentaenoic n-3", Names: []string{"clupanodonic", "DPA n-3"}, Systematic: "(7Z,10Z,13Z,16Z,19Z)-docosa-7,10,13,16,19-pentaenoic acid", Notation: "FA 22:5(7Z,10Z,13Z,16Z,19Z)", Tag: "F22D5N3", USDA: "631"},
	{Trivial: "docosapentaenoic n-6", Names: []string{"osbond", "DPA n-6"}, Systematic: "(4Z,7Z,10Z,13Z,16Z)-docosa-4,7,10,13,16-pentaenoic acid", Notation: "FA 22:5(4Z,7Z,10Z,13Z,16Z)", Tag: "F22D5N6"},
	{Trivial: "docosahexaenoic", Names: []string{"cervonic", "DHA"}, Systematic: "(4Z,7Z,10Z,13Z,16Z,19Z)-docosa-4,7,10,13,16,19-hexaenoic acid", Notation: "FA 22:6(4Z,7Z,10Z,13Z,16Z,19Z)", Tag: "F22D6N3", USDA: "621", MeltingPoint: "-44", Shorthand: seen},
	{Trivial: "nisinic", Systematic: "(6Z,9Z,12Z,15Z,18Z,21Z)-tetracosa-6,9,12,15,18,21-hexaenoic acid", Notation: "FA 24:6(6Z,9Z,12Z,15Z,18Z,21Z)", Tag: "F24D6N3"},
	{Trivial: "ricinoleic", Systematic: "(9Z,12R)-12-hydroxyoctadec-9-enoic acid", Notation: "FA 18:1(9Z);12OH", MeltingPoint: "5.5"},
	{Trivial: "vernolic", Systematic: "(9Z)-12,13-epoxyoctadec-9-enoic acid", Notation: "FA 18:1(9Z);12Ep"},
	{Trivial: "lactobacillic", Systematic: "11,12-methyleneoctadecanoic acid (cyclopropane)", Notation: "FA 19:0;[11-13cy3:0]"},
	{Trivial: "sterculic", Systematic: "9,10-methyleneoctadec-9-enoic acid (cyclopropene)", Notation: "FA 19:0;[9-11cy3:1(9)]"},
}
