package kin_test

import (
	"flag"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"legwright/kin"
	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// The long run, with 10⁶ poses of each family, is
//
//	go test ./kin -run EnclosuresHold -boxes 40000
//
// and takes some minutes on one core.
var enclosedBoxes = flag.Int("boxes", 0, "boxes of each family in TestEnclosuresHoldAllPostures; 0 stands for 4000, or 400 in short runs")

// encloser is the machine as one that encloses its postures, which every family's must be.
func encloser(t *testing.T, f *kin.Family, m kin.Machine) kin.Encloser {
	t.Helper()
	e, ok := m.(kin.Encloser)
	if !ok {
		t.Fatalf("%s: %T does not implement kin.Encloser", f.Name, m)
	}
	return e
}

// anySetup is offCentre with any mounting axes and links of any thickness.
func anySetup(rng *rand.Rand) *kin.Setup {
	s := offCentre()
	s.Tool = ball(rng, 0.1)
	s.Axis.Kind = kin.AxisKind(rng.IntN(3))
	s.Axis.Vec = r3.Add(kin.Vec{Z: 1}, ball(rng, 0.7))
	s.Diameter, s.Crank = between(rng, 0.005, 0.05), float64(rng.IntN(2))*between(rng, 0.005, 0.05)
	s.Neighbours = rng.IntN(4) == 0
	return s
}

// tightStops is the design of a levelled arm with its stops a little beyond its posture.
func tightStops(t *testing.T, rng *rand.Rand, x trial) []float64 {
	t.Helper()
	s := moved(t, x.m, x.p)
	d := slices.Clone(x.d)
	for i, a := range []float64{s.Q[1], s.Q[2], math.Abs(s.Q[1] - s.Q[2])} {
		k := x.f.Index([]string{"upper_angle_min", "forearm_angle_min", "elbow_angle_min"}[i])
		d[k] = a - between(rng, 0.01, 0.5)
		d[k+1] = a + between(rng, 0.01, 0.5) - d[k]
	}
	return d
}

// randomBox is a box of any size about the centre, up to 1.5 times the starter box; some coordinates are fixed.
// In freedoms that the family lacks it says anything.
func randomBox(rng *rand.Rand, f *kin.Family, centre kin.Coords) (b enclose.Box) {
	size := math.Pow(10, between(rng, -5, 0.2))
	for q := range kin.Freedom(6) {
		half := between(rng, 0, 1)
		if f.Has(q) {
			half *= size * f.Starter.Box[q]
		}
		if rng.IntN(8) == 0 {
			half = 0
		}
		b.Low[q], b.High[q] = centre[q]-half, centre[q]+half
	}
	return b
}

// inBox is a pose in the box, of the family's own freedoms: at a corner, on an edge or inside.
func inBox(rng *rand.Rand, f *kin.Family, b *enclose.Box) (c kin.Coords) {
	ends := rng.IntN(3)
	for _, q := range f.Freedoms {
		c[q] = between(rng, b.Low[q], b.High[q])
		if rng.IntN(3) < ends {
			c[q] = [2]float64{b.Low[q], b.High[q]}[rng.IntN(2)]
		}
		c[q] = math.Max(b.Low[q], math.Min(b.High[q], c[q]))
	}
	return c
}

// normal are the pose's normal coordinates in the box.
func normal(b *enclose.Box, c *kin.Coords) (t [6]float64) {
	for k := range t {
		if centre, half := b.Normal(k); half > 0 {
			t[k] = (c[k] - centre) / half
		}
	}
	return t
}

// at is the form's value at the normal coordinates t, up to its remainder.
func at(z *enclose.Form, t *[6]float64) float64 {
	v := z.C
	for k := range t {
		v += z.G[k] * t[k]
	}
	return v
}

// enclosed checks true values against forms at one pose.
type enclosed struct {
	t    *testing.T
	at   [6]float64
	free float64 // what plain arithmetic may be off, over the value's size or 1
}

// in checks that the form holds the value.
func (x *enclosed) in(what string, i int, z *enclose.Form, v float64) {
	if d := math.Abs(at(z, &x.at) - v); d > z.R+x.free*math.Max(1, math.Abs(v)) {
		x.t.Helper()
		x.t.Errorf("%s[%d] = %.17g is %g from the form, which allows %g", what, i, v, d, z.R)
	}
}

// each is in for all values.
func (x *enclosed) each(what string, z []enclose.Form, v []float64) {
	x.t.Helper()
	for i := range v {
		x.in(what, i, &z[i], v[i])
	}
}

// vec is in for a vector.
func (x *enclosed) vec(what string, i int, z *enclose.Vec, v kin.Vec) {
	x.t.Helper()
	for c, v := range [3]float64{v.X, v.Y, v.Z} {
		x.in(what, 10*i+c, &z[c], v)
	}
}

// posture checks everything in e against the posture s at the pose.
func (x *enclosed) posture(f *kin.Family, m kin.Machine, e *kin.Enclosure, p *kin.Pose, s *kin.State) {
	x.t.Helper()
	n := f.Legs
	for i := range n {
		q := s.Q[i]
		if f.Drive == kin.Rotary {
			q += 2 * math.Pi * math.Round((at(&e.Q[i], &x.at)-q)/(2*math.Pi))
		}
		x.in("Q", i, &e.Q[i], q)
	}
	x.each("J", e.J[:], s.J[:6*n])
	x.each("BaseChord", e.BaseChord[:], s.BaseChord[:n])
	x.each("PlatformChord", e.PlatformChord[:], s.PlatformChord[:n])
	var rows [36]float64
	kin.Wrenches(m, s, &rows)
	x.each("Wrenches", e.Wrenches[:], rows[:])
	settled := kin.Settle(m, p)
	x.vec("P", 0, &e.P, settled.P)
	x.each("R", e.R[:], settled.R[:])
	if m.Frame().Tied {
		m.Tie(p, &rows)
		x.each("T", e.T[:], rows[:])
	}
	x.links(m, e, &settled, s)
}

// links checks the ends of all links, and that the listed pairs have the gap that Gap finds.
func (x *enclosed) links(m kin.Machine, e *kin.Enclosure, p *kin.Pose, s *kin.State) {
	x.t.Helper()
	type axis struct{ from, to kin.Vec }
	f := m.Frame()
	mount := kin.Mountings(m)
	of := make([][]axis, f.Legs())
	for i := range of {
		base, joint := f.Base[i], kin.Vec{}
		switch {
		case f.Rods == nil:
			_, joint = joints(f, p, i)
			of[i] = []axis{{base, joint}}
			continue
		case f.Rods[i] == 0:
			continue
		case f.Rails == nil:
			of[i] = []axis{{base, s.End[i]}}
		}
		joint = r3.Add(s.End[i], r3.Scale(f.Rods[i], s.Rod[i]))
		o := mount[i].Side
		of[i] = append(of[i], axis{r3.Add(s.End[i], o), r3.Add(joint, o)})
		if o != (kin.Vec{}) {
			of[i] = append(of[i], axis{r3.Sub(s.End[i], o), r3.Sub(joint, o)})
		}
	}
	gap, i, _ := m.Gap(s)
	if i < 0 && len(e.Links) == 0 && len(e.Pairs) == 0 {
		return
	}
	least := math.Inf(1)
	axes := make([]axis, len(e.Links))
	first, apart := -1, kin.Vec{}
	for k := range e.Links {
		l := &e.Links[k]
		if len(of[l.Leg]) == 0 {
			x.t.Errorf("leg %d has more links than it should", l.Leg)
			return
		}
		axes[k] = of[l.Leg][0]
		of[l.Leg] = of[l.Leg][1:]
		x.vec("Link.From", k, &l.From, axes[k].from)
		x.vec("Link.To", k, &l.To, axes[k].to)
		tip := l.Tip
		switch l.Hold {
		case kin.Turned:
			tip = p.R.Apply(tip)
		case kin.Loose:
			continue
		}
		if first < 0 {
			first, apart = k, r3.Sub(axes[k].to, tip)
		}
		if d := r3.Norm(r3.Sub(r3.Sub(axes[k].to, tip), apart)); !(d < 1e-12) {
			x.t.Errorf("ends %d and %d are %g from where they should be to each other", first, k, d)
		}
	}
	for i := range of {
		if len(of[i]) > 0 {
			x.t.Errorf("leg %d lacks %d links", i, len(of[i]))
		}
	}
	for _, pair := range e.Pairs {
		a, b := axes[pair[0]], axes[pair[1]]
		d := enumerated(a.from, a.to, b.from, b.to) - e.Links[pair[0]].Radius - e.Links[pair[1]].Radius
		least = math.Min(least, d)
	}
	if math.Abs(least-gap) > 1e-9 && !(math.IsInf(gap, 1) && math.IsInf(least, 1)) {
		x.t.Errorf("least gap of the pairs %v, Gap %v", least, gap)
	}
}

// No posture of any family's machine, at any pose of any box, lies outside its enclosure, and no answer about reach is wrong.
func TestEnclosuresHoldAllPostures(t *testing.T) {
	const poses = 25
	boxes := *enclosedBoxes
	if boxes == 0 {
		boxes = 4000
		if testing.Short() {
			boxes = 400
		}
	}
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			rng := seeded(31)
			var (
				m     kin.Encloser
				e     kin.Enclosure
				s     kin.State
				count [3]int
			)
			for k := range boxes {
				if k%10 == 0 {
					setup := anySetup(rng)
					x := postured(t, rng, f, setup, 1.5)
					if f.Index("elbow_angle_min") >= 0 && rng.IntN(3) == 0 {
						x.m = f.Build(tightStops(t, rng, x), setup)
					}
					m = encloser(t, f, x.m)
				}
				b := randomBox(rng, f, randomCoords(rng, f, between(rng, 0, 3)))
				m.Enclose(&b, &e)
				count[e.Reach]++
				for range poses {
					c := inBox(rng, f, &b)
					p := kin.NewPose(c)
					s = kin.State{}
					m.Move(&p, &s)
					if s.Fail != kin.Reached {
						if e.Reach == kin.AllReach {
							t.Errorf("all reached, but for %v: fail %d at leg %d %s", c, s.Fail, s.Leg, s.What)
						}
						continue
					}
					if e.Reach == kin.NoReach {
						t.Errorf("none reached because of leg %d, but %v", e.Leg, c)
						continue
					}
					x := enclosed{t: t, at: normal(&b, &c), free: 1e-14 / math.Pow(m.Serial(&s), 3)}
					x.posture(f, m, &e, &p, &s)
				}
				if t.Failed() {
					t.Fatalf("box %d: %v, machine %+v", k, b, m.Frame())
				}
			}
			t.Logf("%d boxes unsure, %d reached, %d not", count[0], count[1], count[2])
			if count[kin.AllReach] < boxes/4 {
				t.Errorf("only %d of %d boxes known to be reached", count[kin.AllReach], boxes)
			}
			if m.Frame().Rods != nil && count[kin.NoReach] < boxes/100 {
				t.Errorf("only %d of %d boxes known to be out of reach", count[kin.NoReach], boxes)
			}
		})
	}
}

func TestEncloseAllocatesNothing(t *testing.T) {
	for _, f := range kin.Families() {
		m := encloser(t, f, f.Build(sound(f), offCentre()))
		var e kin.Enclosure
		b := about(f, kin.Coords{}, 0.1)
		m.Enclose(&b, &e)
		if n := testing.AllocsPerRun(20, func() { m.Enclose(&b, &e) }); n != 0 {
			t.Errorf("%s: %g allocations", f.Name, n)
		}
	}
}

func BenchmarkEnclose(b *testing.B) {
	for _, f := range kin.Families() {
		m, ok := f.Build(sound(f), offCentre()).(kin.Encloser)
		if !ok {
			continue
		}
		box := about(f, kin.Coords{}, 0.1)
		var e kin.Enclosure
		b.Run(f.Name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				m.Enclose(&box, &e)
			}
		})
	}
}
