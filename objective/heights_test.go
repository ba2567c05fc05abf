package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// The collapsed height of a 6-UPS whose legs are all alike is that of a prism: leg² = h² + d², d the distance of a
// leg's joints in plan, R² + r² - 2 R r cos(60° - β - α) (law of cosines). So is the height drawn out. 1e-9 m,
// as the pose is found by Newton's method.
func TestCollapsedHeightOfAPrism(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := loadedTask(511, f)
	a := appraise(task, f, soundDesign(f))
	v := a.Values
	d2 := v[0]*v[0] + v[1]*v[1] - 2*v[0]*v[1]*math.Cos(60*deg-v[2]-v[3])
	h := PlatformHeights(task, a)
	for i, leg := range [2]float64{v[5], v[5] + v[6]} {
		e := h.Ends[i]
		if e.Fails != "" || !e.Level {
			t.Fatalf("end %d: %q, level %v", i, e.Fails, e.Level)
		}
		near(t, "height", e.Height, math.Sqrt(leg*leg-d2), 1e-9)
	}
	if c := h.Collapsed(); c != &h.Ends[0] {
		t.Error("drawn in is not the lowest")
	}
}

// Legs that draw in to less than the distance of their joints in plan have no posture there: what is left, the platform
// drawn out, is not the collapsed height. Drawn in to a height below the duty's lowest it is, whatever lies beyond.
func TestCollapsedHeightThatIsNotKnown(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := loadedTask(511, f)
	d := soundDesign(f)
	d[5], d[6] = 0.5*math.Sqrt(d[0]*d[0]+d[1]*d[1]-2*d[0]*d[1]*math.Cos(60*deg-d[2]-d[3])), 1.5
	h := PlatformHeights(task, Appraise(task, fixedRange(task, f, d), d))
	if h.Ends[0].Fails == "" || h.Ends[1].Fails != "" {
		t.Fatalf("ends %+v", h.Ends)
	}
	if c := h.Collapsed(); c != nil {
		t.Errorf("collapsed to %g m, but the duty's lowest is %g m", c.Height, h.Lowest)
	}
	h.Ends[0], h.Ends[1] = End{Height: h.Lowest - 0.01}, h.Ends[0]
	if c := h.Collapsed(); c != &h.Ends[0] {
		t.Errorf("below the duty's lowest, yet %v", c)
	}
	h.Lowest, h.Highest = math.Inf(1), math.Inf(-1)
	if c := h.Collapsed(); c != nil {
		t.Errorf("no pose counts, yet %v", c)
	}
}

// Over a box of heights without rotation, the platform origin is lowest and highest at its ends, and so are the
// joints: exactly.
func TestHeightsOfALift(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := loadedTask(512, f)
	z := Zone{Name: "lift", Kind: Box, Samples: 20}
	z.Low[kin.Z], z.High[kin.Z] = -0.05, 0.07
	task.Zones = []Zone{z}
	task.Prepare()
	a := appraise(task, f, soundDesign(f))
	h := PlatformHeights(task, a)
	near(t, "lowest", h.Lowest, h.Home-0.05, 1e-15)
	near(t, "highest", h.Highest, h.Home+0.07, 1e-15)
	near(t, "lowest joint", h.Under, h.Lowest, 1e-15)
	near(t, "highest joint", h.Over, h.Highest, 1e-15)
}

// Every family says of both ends either how high the platform is or why it cannot be there, and where it can the
// machine's own inverse kinematics gives the end's coordinates. 1e-9.
func TestEndsOfEveryFamily(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := loadedTask(513, f)
		a := appraise(task, f, soundDesign(f))
		h := PlatformHeights(task, a)
		if !(h.Lowest <= h.Highest) || h.Under > h.Lowest && f.Has(kin.Roll) {
			t.Errorf("lowest %g, highest %g, lowest joint %g", h.Lowest, h.Highest, h.Under)
		}
		for i, e := range h.Ends {
			if (e.Fails == "") == math.IsNaN(e.Height) {
				t.Errorf("end %d: height %g, fails %q", i, e.Height, e.Fails)
			}
			if e.Fails != "" || !e.Level || f.Free > 0 {
				continue
			}
			p := kin.NewPose(kin.Coords{kin.Z: e.Height - h.Home})
			var s kin.State
			a.Machine.Move(&p, &s)
			want := a.Values[a.Plan.least] + float64(i)*a.Values[a.Plan.span]
			for l := range f.Legs {
				near(t, "coordinate", s.Q[l], want, 1e-9)
			}
		}
	})
}
