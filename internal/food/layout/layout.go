// Package layout is the packed form of the food table, shared by the program
// that writes it and the package that reads it in place.
//
// A file is the magic, then one 32-bit little-endian offset per section and one
// for the end, then the sections. Numbers inside are unsigned varints (seven
// bits a byte, low first) unless said otherwise. Texts are numbers into the
// text pool.
//
//	Groups       per group: 4 bytes of code, 2 bytes little-endian text
//	Sources      per source: 1 byte code, 2 bytes text
//	Derivations  per derivation: 2 bytes text of the code, 2 bytes text of the meaning
//	Kinds        per kind of value: source code, derivation + 1 (0 none), flags; 1 byte each
//	Index        per food by NDB number: 4 bytes number, 4 bytes offset into Records
//	Records      see below
//	TextIndex    per text and one for the end: 4 bytes offset into Texts
//	Texts        bytes
//	Vocabulary   per distinct word of the names, in order: 1 byte length, the word, bytes of its posting
//	Postings     per word: the positions of foods in Index, as differences
//
// A record: name (length, bytes), short name (length, bytes), group (1 byte
// into Groups), refuse per cent, nitrogen factor, energy factors of protein, fat
// and carbohydrate (in hundredths; each plus 1, 0 none), scientific name (text
// plus 1, 0 none), presence of the 150 components (19 bytes, bit ID-1), values
// (length, then in the order of IDs: kind, amount in units of the
// component's published decimals, and what the flags of the kind announce),
// household weights (count, each: sequence, decimals of amount × 16 + decimals
// of grams as a byte, amount, measure text, grams, samples plus 1, standard
// deviation plus 1 and, if there is one, its decimals), footnotes (count, each:
// number, type as a byte, USDA nutrient number or 0, text).
//
// Retention: the magic, 2 bytes rows, 2 bytes columns, 2 bytes USDA number per
// column; then per code in order 2 bytes code, 4 bytes offset of the
// description, 1 byte its length, 1 byte per cent per column; then descriptions.
package layout

// The magic of the two files; a change of layout changes it.
const (
	Magic          = "SR28pk1\n"
	RetentionMagic = "RETR6p1\n"
)

// The sections in file order.
const (
	Groups = iota
	Sources
	Derivations
	Kinds
	Index
	Records
	TextIndex
	Texts
	Vocabulary
	Postings
	Sections
)

// Flags of a kind: which numbers follow the amount, in this order.
const (
	HasSamples = 1 << iota
	HasStdErr
	HasMin
	HasMax
	HasReference
)

// Widths in bytes.
const (
	GroupWidth      = 6
	SourceWidth     = 3
	DerivationWidth = 4
	KindWidth       = 3
	IndexWidth      = 8
	PresenceWidth   = 19
)

// StdErrDecimals are the decimals of every published standard error.
const StdErrDecimals = 3

// FactorDecimals are the decimals of nitrogen and energy factors.
const FactorDecimals = 2

// Uvarint reads a number at i and gives the place after it. A number that runs
// past the end reads as what is there.
func Uvarint(s string, i int) (uint64, int) {
	var v uint64
	for shift := uint(0); i < len(s); shift += 7 {
		c := s[i]
		i++
		v |= uint64(c&0x7f) << shift
		if c < 0x80 {
			break
		}
	}
	return v, i
}

// Uint16 reads two bytes at i, low first.
func Uint16(s string, i int) int { return int(s[i]) | int(s[i+1])<<8 }

// Uint32 reads four bytes at i, low first.
func Uint32(s string, i int) int { return Uint16(s, i) | Uint16(s, i+2)<<16 }
