package handover

import (
	"math"
	"strings"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// load is the force and the moment of a row.
func load(t *testing.T, row map[string]string, after string) (f, m kin.Vec) {
	t.Helper()
	f = kin.Vec{X: cell(t, row, "fx"+after+"_N"), Y: cell(t, row, "fy"+after+"_N"), Z: cell(t, row, "fz"+after+"_N")}
	if row["mx"+after+"_Nm"] != "" {
		m = kin.Vec{X: cell(t, row, "mx"+after+"_Nm"), Y: cell(t, row, "my"+after+"_Nm"), Z: cell(t, row, "mz"+after+"_Nm")}
	}
	return f, m
}

// As the sheet has them, the forces on the platform that act together add up to the sum in the last row, about the tool point,
// where the legs alone carry the wrench; and the largest resultants are those of their components then, within
// the least and the most. Figures have nine digits.
func TestForcesAddUp(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		f := d.a.Plan.Family
		_, _, rows := read(t, files["forces-together.csv"])
		planar := !f.Has(kin.Z) && !f.Has(kin.Roll)
		sums := 0
		var force, moment kin.Vec
		for _, row := range rows {
			fo, mo := load(t, row, "")
			if !strings.HasPrefix(row["part"], "sum") {
				if row["plate"] == onPlatform && f.Name != "level-arm" {
					force = r3.Add(force, fo)
					moment = r3.Add(moment, r3.Cross(r3.Sub(d.jointAt(t, row), d.toolAt(t, row)), fo))
				}
				continue
			}
			sums++
			if f.Name != "level-arm" && !planar {
				size := math.Max(1, r3.Norm(fo))
				near(t, "force", r3.Norm(r3.Sub(force, fo)), 0, 1e-6*size)
				off := r3.Sub(moment, mo)
				if f.Free > 0 {
					off.Z = 0 // the shaft's
				}
				near(t, "moment", r3.Norm(off), 0, 1e-6*size)
			}
			force, moment = kin.Vec{}, kin.Vec{}
		}
		if sums != len(d.task.Cases) {
			t.Errorf("%d sums for %d cases", sums, len(d.task.Cases))
		}
		_, _, rows = read(t, files["forces.csv"])
		for _, row := range rows {
			fo, _ := load(t, row, "_then")
			largest := cell(t, row, "resultant_N")
			near(t, "resultant", r3.Norm(fo), largest, 1e-6*math.Max(1, largest))
			for k, v := range map[string]float64{"fx": fo.X, "fy": fo.Y, "fz": fo.Z} {
				lo, hi := cell(t, row, k+"_least_N"), cell(t, row, k+"_most_N")
				slack := 1e-6 * math.Max(1, largest)
				if v < lo-slack || v > hi+slack {
					t.Errorf("%s %s: %s then %g, outside [%g, %g]", row["point"], row["part"], k, v, lo, hi)
				}
			}
			if is := row["resultant_is"]; is != "exact" && is != "found" {
				t.Errorf("resultant is %q", is)
			}
		}
	})
}

// poseOf is the pose of a row.
func poseOf(t *testing.T, row map[string]string) kin.Pose {
	t.Helper()
	var c kin.Coords
	for q, h := range poseHeads[:6] {
		c[q] = cell(t, row, h) / 1000
		if q > 2 {
			c[q] = cell(t, row, h) * math.Pi / 180
		}
	}
	return kin.NewPose(c)
}

// jointAt is where the platform point of a row is at the row's pose, base frame.
func (d *design) jointAt(t *testing.T, row map[string]string) kin.Vec {
	t.Helper()
	p := poseOf(t, row)
	origin, rot := d.a.Machine.Place(&p)
	if d.a.Plan.Family.Free > 0 {
		rot = kin.Identity()
	}
	for _, q := range d.plan.points {
		if q.name == row["point"] {
			return r3.Add(origin, rot.Apply(q.own))
		}
	}
	t.Fatalf("there is no point %s", row["point"])
	return kin.Vec{}
}

// toolAt is where the tool point is at the row's pose.
func (d *design) toolAt(t *testing.T, row map[string]string) kin.Vec {
	t.Helper()
	p := poseOf(t, row)
	origin, rot := d.a.Machine.Place(&p)
	return r3.Add(origin, rot.Apply(d.a.Machine.Frame().Tool))
}

// A design without cases has no forces, and its sheets say so.
func TestNoCases(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := starterTask(f)
	task.Cases = nil
	files := Files(task, appraised(f, task, 0.3), wicked)
	for _, name := range []string{"forces.csv", "forces-together.csv"} {
		block, _, rows := read(t, files[name])
		if len(rows) != 0 || !strings.Contains(block["cases"], "no cases") {
			t.Errorf("%s: %d rows, cases %q", name, len(rows), block["cases"])
		}
	}
}
