package handover

import (
	"math"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// heightRows are the heights' rows by what they are.
func heightRows(t *testing.T, b []byte) map[string]map[string]string {
	t.Helper()
	_, _, rows := read(t, b)
	by := map[string]map[string]string{}
	for _, row := range rows {
		by[row["what"]] = row
	}
	return by
}

// The collapsed height is one of the two ends, or the sheet says why it is not known; planar machines have none.
func TestCollapsedHeight(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		row := heightRows(t, files["heights.csv"])["platform origin, collapsed"]
		h := objective.PlatformHeights(d.task, d.a)
		c := h.Collapsed()
		switch remark := row["remark"]; {
		case !d.a.Plan.Family.Has(kin.Z):
			if row["height_mm"] != "" || !strings.HasPrefix(remark, "does not apply") {
				t.Errorf("%v", row)
			}
		case c == nil:
			if row["height_mm"] != "" || !strings.HasPrefix(remark, "not known: ") {
				t.Errorf("%v", row)
			}
		default:
			near(t, "height", cell(t, row, "height_mm"), units.Display(units.Length).From(c.Height), 1e-3)
		}
	})
}

// Legs that draw in to less than the distance of their joints in plan leave the collapsed height open.
func TestCollapsedHeightNotKnown(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := starterTask(f)
	v := appraised(f, task, 0.3).Values
	least, span := f.Range()
	plan := math.Sqrt(v[0]*v[0] + v[1]*v[1] - 2*v[0]*v[1]*math.Cos(math.Pi/3-v[2]-v[3])) // law of cosines
	v[span], v[least] = 2*v[least], plan/2
	specs := make([]objective.Spec, len(v))
	for i := range specs {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: v[i : i+1]}
	}
	a := objective.Appraise(task, objective.NewPlan(task, f, specs), v)
	row := heightRows(t, Files(task, a, wicked)["heights.csv"])["platform origin, collapsed"]
	if row["height_mm"] != "" || !strings.HasPrefix(row["remark"], "not known: no posture on the way") {
		t.Errorf("%v", row)
	}
}
