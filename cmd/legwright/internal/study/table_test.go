package study

import (
	"bytes"
	"encoding/csv"
	"strings"
	"testing"
)

func TestWriteTable(t *testing.T) {
	f := tilter()
	f.Designs[1].Family = "6-UPS"
	f.Designs[1].Dimensions = map[string]Number{"platform_half_angle": 0.3, "stroke": 0.5701}
	var b bytes.Buffer
	if err := writeTable(&b, f); err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(&b).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	want := "id,rank,score,family,marks,base_radius_mm,platform_half_angle_deg,stroke_mm,home_heading_deg,conditioning,leg_clearance_mm,footprint_mm,tightest_limit,tightest_margin_percent"
	if got := strings.Join(rows[0], ","); got != want {
		t.Errorf("headings\n%s\nwant\n%s", got, want)
	}
	if len(rows) != 6 {
		t.Fatalf("%d rows", len(rows))
	}
	cell := func(row int, head string) string {
		for i, h := range rows[0] {
			if h == head {
				return rows[row][i]
			}
		}
		t.Fatalf("no column %s", head)
		return ""
	}
	for _, c := range []struct {
		row        int
		head, want string
	}{
		{2, "stroke_mm", "570.1"}, {2, "home_heading_deg", ""}, {1, "home_heading_deg", "20"}, {1, "platform_half_angle_deg", ""},
		{1, "leg_clearance_mm", "inf"}, {1, "id", "001"}, {1, "rank", "1"}, {1, "tightest_limit", "base_swing"},
	} {
		if got := cell(c.row, c.head); got != c.want {
			t.Errorf("row %d, %s: %q, want %q", c.row, c.head, got, c.want)
		}
	}
}

func TestClean(t *testing.T) {
	if got := Clean("a\x1b[31m\u202eb\r\nc\t\u0085d\x7fé"); got != "a[31mb c dé" {
		t.Errorf("got %q", got)
	}
}
