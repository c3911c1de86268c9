package food

import (
	"errors"
	"slices"
	"strconv"
	"strings"
	"testing"

	"gramlaw/internal/food/layout"
)

func mustFind(t testing.TB, ndb string) Food {
	t.Helper()
	f, err := Find("sr:" + ndb)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func mustUSDA(t testing.TB, number string) ID {
	t.Helper()
	n, err := strconv.Atoi(number)
	c, ok := ByUSDANumber(n)
	if err != nil || !ok {
		t.Fatalf("no component %s", number)
	}
	return c.ID
}

// Counts of the release documentation, SR28 (2016): 8,789 foods, 150
// components, 679,045 values.
func TestCounts(t *testing.T) {
	foods, values, weights, notes := 0, 0, 0, 0
	for f := range All {
		foods++
		for range f.Each {
			values++
		}
		weights += len(f.Weights())
		notes += len(f.Footnotes())
	}
	got := []int{foods, SRCount, values, weights, notes, len(Groups())}
	if want := []int{8789, 150, 679045, 15438, 552, 25}; !slices.Equal(got, want) {
		t.Errorf("foods, components, values, weights, footnotes, groups = %v, want %v", got, want)
	}
}

// testdata/sr28_sample.csv: one value and one empty cell of every component,
// taken from the published table.
func TestSampledValues(t *testing.T) {
	for _, row := range readCSV(t, "testdata/sr28_sample.csv") {
		id := mustUSDA(t, row["nutr_no"])
		f := mustFind(t, row["ndb_no"])
		v, ok := f.Value(id)
		got := ""
		if ok {
			got = v.String()
		}
		if got != row["amount_per_100g"] || ok != f.Has(id) {
			t.Errorf("food %s nutrient %s: %q, published %q", row["ndb_no"], row["nutr_no"], got, row["amount_per_100g"])
		}
	}
}

func orEmpty(n Number, ok bool) string {
	if !ok {
		return ""
	}
	return n.String()
}

// testdata/sr28_detail_sample.csv: rows of the published long table.
func TestSampledDetail(t *testing.T) {
	for _, row := range readCSV(t, "testdata/sr28_detail_sample.csv") {
		v, _ := mustFind(t, row["ndb_no"]).Value(mustUSDA(t, row["nutr_no"]))
		reference := ""
		if v.Reference != 0 {
			reference = Food{ndb: v.Reference}.Ref()[len(prefix):]
		}
		got := []string{v.String(), strconv.Itoa(v.Samples), orEmpty(v.StdErr, v.HasStdErr), orEmpty(v.Min, v.HasMin), orEmpty(v.Max, v.HasMax),
			strconv.Itoa(int(v.Source)), v.Derivation.Code(), reference}
		want := []string{row["amount_per_100g"], row["n_data_points"], row["std_error"], row["min"], row["max"], row["src_cd"], row["deriv_cd"], row["ref_ndb_no"]}
		if !slices.Equal(got, want) {
			t.Errorf("food %s nutrient %s: %q, published %q", row["ndb_no"], row["nutr_no"], got, want)
		}
		if v.Source.Meaning() == "" || (v.Derivation.Code() == "") != (v.Derivation.Meaning() == "") {
			t.Errorf("food %s nutrient %s: a code without a meaning", row["ndb_no"], row["nutr_no"])
		}
	}
}

// SR28, food descriptions.
func TestButter(t *testing.T) {
	f := mustFind(t, "01001")
	got := []string{f.Ref(), f.Name(), f.ShortName(), f.Group().Code, f.Group().Name, orEmpty(f.Refuse()), orEmpty(f.NitrogenFactor()),
		orEmpty(f.ProteinEnergy()), orEmpty(f.FatEnergy()), orEmpty(f.CarbohydrateEnergy()), f.ScientificName()}
	want := []string{"sr:01001", "Butter, salted", "BUTTER,WITH SALT", "0100", "Dairy and Egg Products", "0", "6.38", "4.27", "8.79", "3.87", ""}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
	if f := mustFind(t, "20038"); f.ScientificName() != "Avena sativa L." {
		t.Errorf("oats are %q", f.ScientificName())
	}
}

// NDB 04652, SR28: saturated + mono + poly as published already hold the trans
// acids: 24.750 + 61.248 + 9.295 = 95.293, trans 34.162 = 29.638 + 4.524, label
// mono 31.610, poly without trans 4.771 (conjugated 18:2 has no
// value); butter's label poly 3.043 - 0.296 - 0.267 = 2.480.
func TestTransIsIncludedInMonoAndPoly(t *testing.T) {
	amount := func(ndb string, usda string) int64 {
		v, ok := mustFind(t, ndb).Value(mustUSDA(t, usda))
		if !ok || v.Exponent != -3 {
			t.Fatalf("%s %s: %v %t", ndb, usda, v, ok)
		}
		return v.Mantissa
	}
	o := func(usda string) int64 { return amount("04652", usda) }
	got := []int64{o("606") + o("645") + o("646"), o("693") + o("695") - o("605"), o("605"), o("645") - o("693"), o("646") - o("695"),
		amount("01001", "646") - amount("01001", "695") - amount("01001", "670")}
	if want := []int64{95293, 0, 34162, 31610, 4771, 2480}; !slices.Equal(got, want) {
		t.Errorf("mg per 100 g %v, want %v", got, want)
	}
	for _, ndb := range []string{"04034", "04031", "04053"} { // two partially hydrogenated soybean, olive: no trans published
		if v, ok := mustFind(t, ndb).Value(mustUSDA(t, "605")); ok {
			t.Errorf("food %s: trans %s, published empty", ndb, v)
		}
	}
}

// Counted in the published table: of 220 fats and oils 132 have no trans value.
func TestMissingTransOfFats(t *testing.T) {
	fats, missing := 0, 0
	id := mustUSDA(t, "605")
	for f := range All {
		if f.Group().Code == "0400" {
			fats++
			if !f.Has(id) {
				missing++
			}
		}
	}
	if fats != 220 || missing != 132 {
		t.Errorf("%d of %d fats without trans, want 132 of 220", missing, fats)
	}
}

func TestEachIsValueInOrder(t *testing.T) {
	f := mustFind(t, "01002")
	n, last := 0, ID(0)
	for id, v := range f.Each {
		if alone, ok := f.Value(id); !ok || alone != v || id <= last {
			t.Errorf("%d: Each %+v, Value %+v", id, v, alone)
		}
		n, last = n+1, id
	}
	if n != f.Values() {
		t.Errorf("%d values by Each, %d by Values", n, f.Values())
	}
	for range f.Each {
		break
	}
}

// testdata/household_sample.csv: all measures of five foods, SR28.
func TestHouseholdWeights(t *testing.T) {
	published := map[string][]map[string]string{}
	for _, row := range readCSV(t, "testdata/household_sample.csv") {
		published[row["ndb_no"]] = append(published[row["ndb_no"]], row)
	}
	for ndb, rows := range published {
		weights := mustFind(t, ndb).Weights()
		if len(weights) != len(rows) {
			t.Fatalf("food %s: %d measures, published %d", ndb, len(weights), len(rows))
		}
		for i, row := range rows {
			compareWeight(t, weights[i], row)
		}
	}
}

func compareWeight(t *testing.T, w Weight, row map[string]string) {
	t.Helper()
	samples := ""
	if w.HasSamples {
		samples = strconv.Itoa(w.Samples)
	}
	got := []string{strconv.Itoa(w.Sequence), w.Amount.String(), w.Measure, w.Grams.String(), samples, orEmpty(w.StdDev, w.HasStdDev)}
	want := []string{row["seq"], row["amount"], row["measure"], row["grams"], row["n_data_points"], row["std_dev"]}
	for i := range want {
		if strings.HasPrefix(want[i], ".") {
			want[i] = "0" + want[i]
		}
	}
	if !slices.Equal(got, want) {
		t.Errorf("food %s: %q, published %q", row["ndb_no"], got, want)
	}
}

// SR28 footnotes, food 02030.
func TestFootnote(t *testing.T) {
	notes := mustFind(t, "02030").Footnotes()
	want := Footnote{Number: 1, Type: 'N', About: mustUSDA(t, "204"), USDA: 204,
		Text: "Total proximates do not equal 100% because piperine was subtracted from lipid value."}
	if len(notes) != 1 || notes[0] != want {
		t.Errorf("got %+v", notes)
	}
}

func TestFindErrors(t *testing.T) {
	for _, ref := range []string{"", "sr:", "sr:1001", "sr:010011", "SR:01001", "sr:0100a", "01001", " sr:01001", "sr:٠١٠٠١", strings.Repeat("x", 5000)} {
		_, err := Find(ref)
		var wrong *NotReferenceError
		if !errors.As(err, &wrong) || len(err.Error()) > 300 {
			t.Errorf("Find(%.20q): %v", ref, err)
		}
	}
	for ref, nearest := range map[string]string{"sr:00000": "sr:01001", "sr:01310": "sr:01306 sr:02001", "sr:99999": "sr:93600"} {
		_, err := Find(ref)
		var unknown *UnknownFoodError
		if !errors.As(err, &unknown) || strings.Join(unknown.Nearest, " ") != nearest || unknown.Error() == "" {
			t.Errorf("Find(%s): %v, want nearest %s", ref, err, nearest)
		}
	}
}

func TestZeroFood(t *testing.T) {
	var f Food
	if _, ok := f.Value(1); ok || f.Has(1) || f.Values() != 0 || f.Name() != "" || f.Weights() != nil || f.Footnotes() != nil {
		t.Error("the zero Food has contents")
	}
	if _, ok := f.Refuse(); ok || f.Group() != (Group{}) || f.ScientificName() != "" {
		t.Error("the zero Food has contents")
	}
}

func TestValueOutsideTheRelease(t *testing.T) {
	f := mustFind(t, "01001")
	for _, id := range []ID{0, SRCount + 1, Count, Count + 1, 65535} {
		if v, ok := f.Value(id); ok {
			t.Errorf("component %d: %v", id, v)
		}
	}
}

func TestEmbeddedSize(t *testing.T) {
	const limit = 6 << 20
	if size := len(sr28) + len(retentionTable); size == 0 || size > limit {
		t.Errorf("%d bytes embedded, limit %d", size, limit)
	}
	if !strings.HasPrefix(sr28, layout.Magic) || !strings.HasPrefix(retentionTable, layout.RetentionMagic) {
		t.Error("the embedded files are of another layout: pack them again")
	}
}

func FuzzFind(f *testing.F) {
	for _, seed := range []string{"sr:01001", "sr:99999", "sr:", "x", "sr:0100\x00"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, ref string) {
		food, err := Find(ref)
		if err == nil && food.Ref() != ref {
			t.Errorf("Find(%q) gave %s", ref, food.Ref())
		}
		if err != nil && len(err.Error()) > 500 {
			t.Errorf("an error of %d bytes", len(err.Error()))
		}
	})
}

func BenchmarkFindAndValue(b *testing.B) {
	id := mustUSDA(b, "605")
	b.ReportAllocs()
	for b.Loop() {
		f, err := Find("sr:20649")
		if err != nil {
			b.Fatal(err)
		}
		f.Value(id)
	}
}

func BenchmarkEach(b *testing.B) {
	f := mustFind(b, "01001")
	b.ReportAllocs()
	sum := int64(0)
	for b.Loop() {
		for _, v := range f.Each {
			sum += v.Mantissa
		}
	}
	if sum == 0 {
		b.Fatal("nothing read")
	}
}

func BenchmarkWholeTable(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		for f := range All {
			for _, v := range f.Each {
				_ = v.Mantissa
			}
		}
	}
}
