package handover

import (
	"math"
	"strings"
	"testing"

	"legwright/kin"
	"legwright/objective"

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
// the least and the most. Figures have six digits, which the sums of larger ones show.
func TestForcesAddUp(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		f := d.a.Plan.Family
		_, _, rows := read(t, files["forces-together.csv"])
		planar := !f.Has(kin.Z) && !f.Has(kin.Roll)
		sums := 0
		var force, moment kin.Vec
		most := 1.0 // of the members, whose digits are left in the sum
		for _, row := range rows {
			fo, mo := load(t, row, "")
			if !strings.HasPrefix(row["part"], "sum") {
				if row["plate"] == onPlatform && f.Name != "level-arm" {
					force = r3.Add(force, fo)
					most = math.Max(most, r3.Norm(fo))
					moment = r3.Add(moment, r3.Cross(r3.Sub(d.jointAt(t, row), d.toolAt(t, row)), fo))
				}
				continue
			}
			sums++
			if f.Name != "level-arm" && !planar {
				near(t, "force", r3.Norm(r3.Sub(force, fo)), 0, 2e-5*most)
				off := r3.Sub(moment, mo)
				if f.Free > 0 {
					off.Z = 0 // the shaft's
				}
				near(t, "moment", r3.Norm(off), 0, 2e-5*most)
			}
			force, moment, most = kin.Vec{}, kin.Vec{}, 1
		}
		if sums != len(d.task.Cases) {
			t.Errorf("%d sums for %d cases", sums, len(d.task.Cases))
		}
		_, _, rows = read(t, files["forces.csv"])
		for _, row := range rows {
			fo, _ := load(t, row, "_then")
			largest := cell(t, row, "resultant_N")
			near(t, "resultant", r3.Norm(fo), largest, 1e-5*math.Max(1, largest))
			for k, v := range map[string]float64{"fx": fo.X, "fy": fo.Y, "fz": fo.Z} {
				lo, hi := cell(t, row, k+"_least_N"), cell(t, row, k+"_most_N")
				slack := 1e-5 * math.Max(1, largest)
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

// Turned by 90° about z, all legs of a 6-UPS run along one linear complex and hold nothing about it (K. H. Hunt 1978,
// Kinematic Geometry of Mechanisms, from memory): the forces are unbounded, which is a word and no formula, and the case has
// no forces that act together, which its sheet says.
func TestForcesWithoutBound(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := starterTask(f)
	task.Zones = append(task.Zones, objective.Zone{Name: "turned", Kind: objective.Listed, Poses: []kin.Coords{{kin.Yaw: math.Pi / 2}}})
	task.Cases[0].Zones, task.Cases[1].Zones = []int{0}, []int{1}
	task.Prepare()
	files := Files(task, appraised(f, task, 0.3), wicked)
	_, _, rows := read(t, files["forces.csv"])
	singular := 0
	for _, row := range rows {
		if row["case"] != "pushed" {
			if row["resultant_is"] == "singular" {
				t.Errorf("%v", row)
			}
			continue
		}
		singular++
		for _, head := range []string{"fx_least_N", "fz_most_N", "resultant_N"} {
			if row[head] != "unbounded" {
				t.Errorf("%s of %s is %q", head, row["point"], row[head])
			}
		}
		if row["resultant_is"] != "singular" {
			t.Errorf("%v", row)
		}
	}
	block, _, rows := read(t, files["forces-together.csv"])
	if singular == 0 || !strings.HasPrefix(block["left out"], "pushed: the legs cannot hold") {
		t.Errorf("%d rows, left out %q", singular, block["left out"])
	}
	for _, row := range rows {
		if row["case"] == "pushed" {
			t.Errorf("%v", row)
		}
	}
	for name, b := range files {
		if strings.HasSuffix(name, ".csv") && strings.Contains(strings.ToLower(string(b)), ",-inf") {
			t.Errorf("%s has a cell -inf", name)
		}
	}
}

// What is zero but for rounding is written as zero: of a case's forces none is smaller than 1e-7 of the largest.
func TestRoundingIsNoForce(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		for _, name := range []string{"forces.csv", "forces-together.csv"} {
			_, heads, rows := read(t, files[name])
			most := map[string]float64{}
			each := func(check func(row map[string]string, v float64)) {
				for _, row := range rows {
					for _, h := range heads {
						if strings.HasPrefix(h, "f") && row[h] != "" {
							check(row, math.Abs(cell(t, row, h)))
						}
					}
				}
			}
			each(func(row map[string]string, v float64) { most[row["case"]] = math.Max(most[row["case"]], v) })
			each(func(row map[string]string, v float64) {
				if v != 0 && v < 0.9e-7*most[row["case"]] {
					t.Errorf("%s: %g N at %s, the largest is %g N", name, v, row["point"], most[row["case"]])
				}
			})
		}
	})
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
