package food

import (
	"strconv"
	"strings"
	"testing"
)

// testdata/retention_sample.csv: rows of the USDA Table of Nutrient Retention
// Factors, Release 6.
func TestRetentionSample(t *testing.T) {
	for _, row := range readCSV(t, "testdata/retention_sample.csv") {
		r, ok := RetentionCode(row["retention_code"])
		if !ok || r.Code() != row["retention_code"] || r.Description() != row["description"] {
			t.Fatalf("%s: %q %q", row["retention_code"], r.Code(), r.Description())
		}
		for column, want := range row {
			number, ok := strings.CutPrefix(column, "n")
			if !ok || number == "392" {
				continue
			}
			if got, _ := r.Percent(mustUSDA(t, number)); strconv.Itoa(got) != want {
				t.Errorf("%s nutrient %s: %d %%, published %s", row["retention_code"], number, got, want)
			}
		}
		for _, tag := range []string{"RETOL", "VITA_RAE"} {
			if got, _ := r.Percent(mustID(t, tag)); strconv.Itoa(got) != row["n392"] {
				t.Errorf("%s %s: %d %%, column 392 has %s", row["retention_code"], tag, got, row["n392"])
			}
		}
	}
}

// What the table has no column for keeps everything by the publisher's
// practice; the caller decides.
func TestRetentionWithoutColumn(t *testing.T) {
	r, _ := RetentionCode("0352")
	for _, tag := range []string{"FAT", "FOLDFE", "VITB12_ADDED", "SE", "TOCPHA", "WATER", "VITD", "SUGFREE"} {
		if percent, ok := r.Percent(mustID(t, tag)); ok {
			t.Errorf("%s: %d %%", tag, percent)
		}
	}
	if _, ok := r.Percent(0); ok {
		t.Error("component 0 has a column")
	}
	if FolateDFEFactor().String() != "1.7" {
		t.Errorf("folate DFE factor %s", FolateDFEFactor())
	}
}

func TestRetentionCounts(t *testing.T) {
	rows, cells, last := 0, 0, ""
	for r := range Retentions {
		rows++
		for _, c := range Components() {
			if percent, ok := r.Percent(c.ID); ok {
				cells++
				if percent > 100 {
					t.Errorf("%s %s: %d %%", r.Code(), c.Tag, percent)
				}
			}
		}
		if r.Code() <= last || r.Description() == "" {
			t.Errorf("%q after %q", r.Code(), last)
		}
		last = r.Code()
	}
	// 26 columns, of which 392 serves two components.
	if rows != 270 || cells != 270*27 {
		t.Errorf("%d codes, %d factors, want 270 and %d", rows, cells, 270*27)
	}
	for range Retentions {
		break
	}
}

func TestUnknownRetentionCodes(t *testing.T) {
	for _, code := range []string{"", "352", "00352", "9999", "0000", "035a", "usda-r6:0352", "65535"} {
		if r, ok := RetentionCode(code); ok {
			t.Errorf("%q is %s", code, r.Description())
		}
	}
	var none Retention
	if _, ok := none.Percent(1); ok || none.Code() != "" || none.Description() != "" {
		t.Error("the zero Retention has contents")
	}
}
