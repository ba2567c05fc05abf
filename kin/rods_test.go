package kin_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"strconv"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// rodLeg is a leg of a drive and a rod, laid out here anew from the families'
// definitions: angles and heights, no vector of the program.
type rodLeg struct {
	crank  bool
	foot   kin.Vec                 // pivot, or rail at coordinate 0
	end    func(q float64) kin.Vec // drive's end
	side   kin.Vec                 // from the middle of a parallelogram to one of its rods
	normal kin.Vec                 // of the plane of the crank
	rod    float64
	mode   float64
}

// polar is the point at the radius, azimuth and height.
func polar(radius, azimuth, z float64) kin.Vec {
	return kin.Vec{X: radius * math.Cos(azimuth), Y: radius * math.Sin(azimuth), Z: z}
}

// rodLegs are the legs of the design d.
func rodLegs(f *kin.Family, d []float64) []rodLeg {
	v := func(name string) float64 { return d[f.Index(name)] }
	var out []rodLeg
	for i := range f.Legs {
		leg := strconv.Itoa(i + 1)
		l := rodLeg{crank: true, mode: 1}
		// turn makes a crank in the plane of the directions a and b.
		turn := func(length float64, a, b kin.Vec) {
			l.normal = r3.Cross(a, b)
			l.end = func(q float64) kin.Vec {
				return r3.Add(l.foot, r3.Add(r3.Scale(length*math.Cos(q), a), r3.Scale(length*math.Sin(q), b)))
			}
		}
		z := kin.Vec{Z: 1}
		switch f.Name {
		case "6-RUS", "6-PUS":
			a := v("base_half_angle")
			azimuth := []float64{a, 120*deg - a, 120*deg + a, 240*deg - a, 240*deg + a, 360*deg - a}[i]
			l.foot = polar(v("base_radius"), azimuth, 0)
			mirror := []float64{1, -1}[i%2]
			l.mode, l.rod = v("mode"), v("rod_length")
			if f.Name == "6-RUS" {
				turn(v("crank_length"), polar(1, azimuth+mirror*v("crank_azimuth"), 0), z)
				break
			}
			l.crank = false
			at, slope := azimuth+mirror*v("rail_azimuth"), v("rail_slope")
			l.end = func(q float64) kin.Vec { return r3.Add(l.foot, polar(q*math.Cos(slope), at, q*math.Sin(slope))) }
		case "delta", "delta-4":
			azimuth := v("leg_azimuths_" + leg)
			l.foot = polar(v("shoulder_radius"), azimuth, 0)
			l.mode, l.rod = v("mode"), v("rod")
			turn(v("arm"), polar(1, azimuth, 0), z)
			l.side = polar(v("rod_spacing")/2, azimuth+90*deg, 0)
		case "linear-delta":
			azimuth, slant := v("leg_azimuths_"+leg), v("rail_slant")
			l.crank = false
			l.foot = polar(v("rail_radius"), azimuth, 0)
			l.mode, l.rod = v("mode"), v("rod")
			l.end = func(q float64) kin.Vec {
				return polar(v("rail_radius")-q*math.Sin(slant), azimuth, q*math.Cos(slant))
			}
			l.side = polar(v("rod_spacing")/2, azimuth+90*deg, 0)
		case "3-RRR":
			azimuth := v("leg_azimuths_"+leg) + v("base_offset_"+leg)
			l.foot = polar(v("base_radius"), azimuth, 0)
			l.mode, l.rod = v("modes_"+leg), v("distal")
			turn(v("proximal"), polar(1, azimuth, 0), polar(1, azimuth+90*deg, 0))
		case "five-bar":
			l.foot = kin.Vec{X: (float64(i) - 0.5) * v("spacing")}
			l.mode, l.rod = v("modes_"+leg), v("distal")
			turn(v("proximal"), kin.Vec{X: 1}, kin.Vec{Y: 1})
		default:
			return nil
		}
		out = append(out, l)
		if f.Name == "delta-4" && len(out) == 3 {
			break
		}
	}
	return out
}

// eachRods runs check on n random machines of each family of drives and rods.
func eachRods(t *testing.T, n int, check func(t *testing.T, x trial, legs []rodLeg)) {
	families := 0
	eachMachine(t, n, func(t *testing.T, _ *rand.Rand, x trial) {
		if prismatic(x.m) || x.f.Name == "level-arm" {
			t.Skip("no legs of a drive and a rod")
		}
		legs := rodLegs(x.f, x.d)
		if legs == nil {
			t.Fatalf("the legs of %s are not laid out", x.f.Name)
		}
		families++
		check(t, x, legs)
	})
	if families == 0 {
		t.Error("no family of drives and rods")
	}
}

// The actuator coordinates close the loops: between the drive's end at that
// coordinate and the platform joint, both laid out anew, lies the rod, on the side
// that the mode says; End and Rod tell the same. 1e-14 m.
func TestRodsCloseTheLoops(t *testing.T) {
	eachRods(t, 50, func(t *testing.T, x trial, legs []rodLeg) {
		s, fr := moved(t, x.m, x.p), x.m.Frame()
		origin, rot := fr.Place(&x.p)
		if x.f.Name == "delta-4" {
			rot = kin.Identity() // the rods' platform does not turn with the tool
		}
		for i, l := range legs {
			end, tip := l.end(s.Q[i]), r3.Add(origin, rot.Apply(fr.Platform[i]))
			rod := r3.Sub(tip, end)
			near(t, "foot", r3.Norm(r3.Sub(fr.Base[i], l.foot)), 0, 1e-15)
			near(t, "length of the frame's rod", fr.Rods[i], l.rod, 0)
			near(t, "rod", r3.Norm(rod), l.rod, 1e-14)
			near(t, "end", r3.Norm(r3.Sub(s.End[i], end)), 0, 1e-14)
			near(t, "unit vector", r3.Norm(r3.Sub(r3.Scale(l.rod, s.Rod[i]), rod)), 0, 1e-14)
			side := r3.Dot(r3.Cross(r3.Sub(end, l.foot), rod), l.normal)
			if !l.crank {
				side = r3.Dot(r3.Sub(end, tip), r3.Sub(l.end(1), l.end(0)))
			}
			if side*l.mode <= 0 {
				t.Errorf("leg %d is in the other working mode: %g", i+1, side)
			}
		}
	})
}

// The serial measure is the cosine between the rod and the way of the drive's end,
// taken here from ends a millionth apart: 1e-9.
func TestSerialIsTheCosineAtTheDrive(t *testing.T) {
	eachRods(t, 20, func(t *testing.T, x trial, legs []rodLeg) {
		s := moved(t, x.m, x.p)
		least := math.Inf(1)
		for i, l := range legs {
			way := r3.Unit(r3.Sub(l.end(s.Q[i]+1e-6), l.end(s.Q[i]-1e-6)))
			least = math.Min(least, math.Abs(r3.Dot(way, s.Rod[i])))
		}
		near(t, "serial", x.m.Serial(s), least, 1e-9)
	})
}

// parts are a leg's links at the coordinate q, with their diameters: crank first.
func (l *rodLeg) parts(q float64, tip kin.Vec, setup *kin.Setup) (links [][2]kin.Vec, thick []float64) {
	end := l.end(q)
	if l.crank {
		links, thick = append(links, [2]kin.Vec{l.foot, end}), append(thick, setup.Crank)
	}
	sides := []float64{-1, 1}
	if r3.Norm(l.side) == 0 {
		sides = sides[:1]
	}
	for _, k := range sides {
		o := r3.Scale(k, l.side)
		links, thick = append(links, [2]kin.Vec{r3.Add(end, o), r3.Add(tip, o)}), append(thick, setup.Diameter)
	}
	return links, thick
}

// Gap is the least over all pairs of links of different legs that share no joint,
// by brute force, and the legs it names have it. 1e-12 m.
func TestGapOfDrivesAndRods(t *testing.T) {
	setup := offCentre()
	setup.Crank, setup.Diameter = 0.03, 0.012
	touching := 0
	eachRods(t, 300, func(t *testing.T, x trial, legs []rodLeg) {
		m := x.f.Build(x.d, setup)
		s, fr := moved(t, m, x.p), m.Frame()
		gap, gi, gj := m.Gap(s)
		best := math.Inf(1)
		for i := range legs {
			for j := range i {
				a, ta := legs[i].parts(s.Q[i], r3.Add(s.End[i], r3.Scale(legs[i].rod, s.Rod[i])), setup)
				b, tb := legs[j].parts(s.Q[j], r3.Add(s.End[j], r3.Scale(legs[j].rod, s.Rod[j])), setup)
				here := math.Inf(1)
				for k := range a {
					for n := range b {
						if a[k][0] == b[n][0] || fr.Platform[i] == fr.Platform[j] && k == len(a)-1 && n == len(b)-1 {
							continue // a shared joint
						}
						here = math.Min(here, enumerated(a[k][0], a[k][1], b[n][0], b[n][1])-(ta[k]+tb[n])/2)
					}
				}
				best = math.Min(best, here)
				if i == max(gi, gj) && j == min(gi, gj) {
					near(t, "gap of the named legs", here, gap, 1e-12)
				}
			}
		}
		near(t, "gap", gap, best, 1e-12)
		if gap < 0 {
			touching++
		}
	})
	if touching < 20 {
		t.Errorf("only %d postures had legs that touch", touching)
	}
}

// Cranks without a diameter of their own are as thick as the rods.
func TestCrankDiameter(t *testing.T) {
	f := kin.FamilyNamed("delta")
	with := func(crank float64) float64 {
		m := f.Build(midRange(f), &kin.Setup{Diameter: 0.02, Crank: crank})
		gap, _, _ := m.Gap(moved(t, m, atHome()))
		return gap
	}
	near(t, "gap", with(0), with(0.02), 0)
	if !(with(0.5) < with(0)) {
		t.Error("thick arms leave the gap as it is")
	}
}

// Crank angles are counted within half a turn of the angle at home, which lies in
// (-π, π]: along any way on which the crank passes ±180° they do not jump.
func TestCrankAnglesDoNotJump(t *testing.T) {
	f := kin.FamilyNamed("6-RUS")
	d := sound(f)
	d[f.Index("mode")] = -1
	d[f.Index("crank_length")], d[f.Index("rod_length")] = 0.15, d[f.Index("home_height")]
	m := f.Build(d, offCentre())
	home := moved(t, m, atHome())
	if home.Q[0] < 150*deg || home.Q[0] > 180*deg {
		t.Fatalf("crank at %g° at home: the test wants it close to 180°", home.Q[0]/deg)
	}
	last, passed := home.Q, false
	for k := range 100 {
		s := moved(t, m, kin.NewPose(kin.Coords{kin.Z: -0.001 * float64(k)}))
		for i, q := range s.Q {
			near(t, "crank angle", q, last[i], 3*deg)
			passed = passed || q > math.Pi
		}
		last = s.Q
	}
	if !passed {
		t.Error("no crank passed 180°")
	}
}

// A pose that a rod is too short for names the leg; so does one for which it is too long.
func TestRodsOutOfReach(t *testing.T) {
	eachRods(t, 3, func(t *testing.T, x trial, legs []rodLeg) {
		for _, far := range []float64{20, -20} {
			p := kin.NewPose(kin.Coords{far, far})
			var s kin.State
			if x.m.Move(&p, &s); s.Fail != kin.OutOfReach || s.Leg < 0 || s.Leg >= len(legs) {
				t.Errorf("20 m away: fail %d at leg %d", s.Fail, s.Leg)
			}
		}
	})
}

// The plan points of Sweep hold the drives' ends over the whole range, and are
// such ends themselves; those of a planar family miss less than a hundredth of the crank.
func TestSweepHoldsTheDrives(t *testing.T) {
	eachRods(t, 10, func(t *testing.T, x trial, legs []rodLeg) {
		l, s := x.f.Range()
		least, span := x.d[l], x.d[s]
		if x.d[0] > x.f.Dimensions[0].Low+0.5*(x.f.Dimensions[0].High-x.f.Dimensions[0].Low) { // half of them: past a whole turn
			least, span = least-3, 7
		}
		points := kin.Sweep(x.m, least, least+span)
		for _, direction := range []float64{0, 1, 2, 3, 4, 5, 6} {
			u := polar(1, direction, 0)
			most, held := math.Inf(-1), math.Inf(-1)
			for _, l := range legs {
				for k := range 1001 {
					most = math.Max(most, r3.Dot(u, l.end(least+span*float64(k)/1000)))
				}
			}
			for _, p := range points {
				held = math.Max(held, r3.Dot(u, p))
			}
			slack := 1e-6 // the points are exact, the drives are sampled every 7e-3 rad or less
			if i := x.f.Index("proximal"); i >= 0 {
				slack = x.d[i] / 100
			}
			if held < most-slack || held > most+1e-5 {
				t.Errorf("towards %g rad: the points reach %g, the drives %g", direction, held, most)
			}
		}
	})
	if slices.ContainsFunc(kin.Families(), func(f *kin.Family) bool {
		m := f.Build(midRange(f), offCentre())
		return prismatic(m) && len(kin.Sweep(m, 0, 1)) > 0
	}) {
		t.Error("prismatic legs sweep")
	}
}
