package handover

import (
	"math"
	"strings"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// near fails the test where got is farther than tol from want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.15g, want %.15g within %g", what, got, want, tol)
	}
}

// place is a point of a table, in mm.
func place(t *testing.T, row map[string]string, frame string) kin.Vec {
	t.Helper()
	return kin.Vec{X: cell(t, row, frame+"_x_mm"), Y: cell(t, row, frame+"_y_mm"), Z: cell(t, row, frame+"_z_mm")}
}

// The joint table has the machine's joints: base ones as they are, platform ones in their own frame, and in the base frame
// at home, where the link table's distances lie between them. Crank ends and carriages are as far as the
// machine's own coordinates at home put them. Tables are written to 1e-6 mm.
func TestJointsAndLinks(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		fr := d.a.Machine.Frame()
		_, _, joints := read(t, files["joints.csv"])
		at := map[string]kin.Vec{}
		for _, row := range joints {
			at[row["point"]] = place(t, row, "base_frame")
			if row["plate"] == onPlatform {
				own := r3.Scale(1e-3, place(t, row, "platform_frame"))
				home := r3.Scale(1000, r3.Add(fr.Home, fr.HomeRot.Apply(own)))
				near(t, row["point"]+" at home", r3.Norm(r3.Sub(at[row["point"]], home)), 0, 2e-6)
			}
		}
		if d.a.Plan.Family.Name != "level-arm" {
			home := kin.NewPose(kin.Coords{})
			var s kin.State
			d.a.Machine.Move(&home, &s)
			ends := kin.Ends(d.a.Machine, s.Q[:fr.Legs()])
			for i := range fr.Legs() {
				n := legName(i)
				near(t, "B"+n, r3.Norm(r3.Sub(at["B"+n], r3.Scale(1000, fr.Base[i]))), 0, 1e-6)
				p := r3.Scale(1000, r3.Add(fr.Home, fr.HomeRot.Apply(fr.Platform[i])))
				near(t, "P"+n, r3.Norm(r3.Sub(at["P"+n], p)), 0, 1e-6)
				if k, ok := at["K"+n]; ok {
					near(t, "K"+n, r3.Norm(r3.Sub(k, r3.Scale(1000, ends[i]))), 0, 1e-6)
				} else if fr.Rods != nil && i < d.legs() {
					t.Errorf("K%s is missing", n)
				}
			}
		}
		_, _, links := read(t, files["links.csv"])
		for _, row := range links {
			from, to := at[row["from"]], at[row["to"]]
			want := r3.Norm(r3.Sub(to, from))
			switch {
			case strings.HasPrefix(row["what"], "wrist_drop"):
				want = from.Z - to.Z
			case strings.HasPrefix(row["what"], "wrist_offset"), strings.HasPrefix(row["what"], "base_offset"):
				want = math.Hypot(to.X-from.X, to.Y-from.Y)
			}
			near(t, row["what"], math.Abs(cell(t, row, "length_mm")), want, 3e-6)
		}
		if len(links) < d.legs() {
			t.Errorf("%d links", len(links))
		}
	})
}

// Axes are unit vectors, their angles are theirs, and those of platforms are turned to base axes. Directions are written
// to 1e-9, angles to 1e-6°.
func TestAxes(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		_, _, rows := read(t, files["axes.csv"])
		for _, row := range rows {
			for _, frame := range []string{"", "base_frame_"} {
				v := kin.Vec{X: cell(t, row, frame+"x"), Y: cell(t, row, frame+"y"), Z: cell(t, row, frame+"z")}
				near(t, "length", r3.Norm(v), 1, 1e-9)
				sin, cos := math.Sincos(cell(t, row, frame+"azimuth_deg") * math.Pi / 180)
				up, level := math.Sincos(cell(t, row, frame+"elevation_deg") * math.Pi / 180)
				near(t, "azimuth and elevation", r3.Norm(r3.Sub(v, kin.Vec{X: level * cos, Y: level * sin, Z: up})), 0, 2e-8)
				if row["frame"] == onPlatform && frame == "" {
					w := d.a.Machine.Frame().HomeRot.Apply(v)
					near(t, "in base axes", w.X, cell(t, row, "base_frame_x"), 2e-9)
					near(t, "in base axes", w.Y, cell(t, row, "base_frame_y"), 2e-9)
				}
			}
		}
		if len(rows) == 0 {
			t.Error("no axes")
		}
	})
}

// A hole has the radius and the angle of its place; each hole's number is that of a point of the joint table. Angles are written to
// 1e-6°, which is 2e-8 of the radius.
func TestHoles(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		_, _, joints := read(t, files["joints.csv"])
		_, _, holes := read(t, files["holes.csv"])
		for _, h := range holes {
			x, y := cell(t, h, "x_mm"), cell(t, h, "y_mm")
			sin, cos := math.Sincos(cell(t, h, "angle_deg") * math.Pi / 180)
			near(t, "x", cell(t, h, "radius_mm")*cos, x, 2e-5)
			near(t, "y", cell(t, h, "radius_mm")*sin, y, 2e-5)
			found := false
			for _, j := range joints {
				frame := "base_frame"
				if j["plate"] == onPlatform {
					frame = "platform_frame"
				}
				if j["point"] == h["hole"] && j["plate"] == h["plate"] {
					found = true
					near(t, h["hole"], r3.Norm(r3.Sub(place(t, j, frame), kin.Vec{X: x, Y: y, Z: cell(t, h, "z_mm")})), 0, 1e-9)
				}
			}
			if !found || h["diameter_mm"] != "to be chosen" {
				t.Errorf("hole %v", h)
			}
		}
	})
}
