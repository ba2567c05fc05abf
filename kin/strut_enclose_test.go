package kin_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"
	"legwright/kin/enclose"

	"gonum.org/v1/gonum/spatial/r3"
)

// boxWithin is a box of poses about some pose within 1.5 times the starter box, of up to `part` of it; some widths are 0.
func boxWithin(rng *rand.Rand, f *kin.Family, part float64) (b enclose.Box) {
	c := randomCoords(rng, f, 1.5)
	for k := range b.Low {
		h := part * f.Starter.Box[k] * rng.Float64()
		if rng.IntN(10) == 0 {
			h = 0
		}
		b.Low[k], b.High[k] = c[k]-h, c[k]+h
	}
	return b
}

// placeIn is a pose of the box, in normal coordinates and as such: often at an end of a coordinate.
func placeIn(rng *rand.Rand, b *enclose.Box) (t [6]float64, p kin.Pose) {
	var q kin.Coords
	for k := range q {
		c, h := b.Normal(k)
		switch rng.IntN(4) {
		case 0:
			q[k] = b.Low[k]
		case 1:
			q[k] = b.High[k]
		default:
			q[k] = b.Low[k] + (b.High[k]-b.Low[k])*rng.Float64()
		}
		if h > 0 {
			t[k] = (q[k] - c) / h
		}
	}
	return t, kin.NewPose(q)
}

// usedBy is the share of the form's remainder that the value needs at t.
func usedBy(f *enclose.Form, t *[6]float64, value float64) float64 {
	x := f.C
	for k := range t {
		x += f.G[k] * t[k]
	}
	if !f.Known() || x == value {
		return 0
	}
	return math.Abs(value-x) / f.R
}

// strutFamilies are the families whose legs are all prismatic, and which are free.
var strutFamilies = []string{"6-UPS", "3-RPR"}

// No pose of a box leaves the enclosure: lengths, rows, chords, wrenches, the platform's place and the legs' ends, for boxes
// from nearly nothing to 1.5 times the starter box and more, against the plain kinematics, whose own rounding is a hundredth
// of the slack. The greatest share of a remainder that is used tells that they are not merely huge.
func TestStrutEnclosureHoldsEveryPose(t *testing.T) {
	boxes, each := 10000, 50
	if testing.Short() {
		boxes = 1000
	}
	for _, name := range strutFamilies {
		rng := seeded(21)
		f := kin.FamilyNamed(name)
		n := len(f.Freedoms)
		most := map[string]float64{}
		var (
			e kin.Enclosure
			s kin.State
			w [36]float64
		)
		for i := range boxes {
			setup := offCentre()
			setup.Axis.Kind = kin.AxisKind(i % 3)
			setup.Axis.Vec = kin.Vec{X: 0.2, Y: 0.3, Z: 1}
			m := f.Build(randomDesign(rng, f), setup)
			b := boxWithin(rng, f, 2*math.Exp2(-24*rng.Float64()*rng.Float64()))
			m.(kin.Encloser).Enclose(&b, &e)
			for range each {
				at, p := placeIn(rng, &b)
				check := func(what string, form *enclose.Form, value float64) {
					u := usedBy(form, &at, value)
					if u > 1 {
						t.Fatalf("%s: %s leaves its enclosure, %g of the remainder %g", name, what, u, form.R)
					}
					most[what] = max(most[what], u)
				}
				m.Move(&p, &s)
				for leg := range n {
					check("length", &e.Q[leg], s.Q[leg])
					check("base chord", &e.BaseChord[leg], s.BaseChord[leg])
					check("platform chord", &e.PlatformChord[leg], s.PlatformChord[leg])
					for c := range 6 {
						check([]string{"force", "moment"}[c/3], &e.J[6*leg+c], s.J[6*leg+c])
					}
					from, to := joints(m.Frame(), &p, leg)
					for c := range 3 {
						check("base joint", &e.Links[leg].From[c], [3]float64{from.X, from.Y, from.Z}[c])
						check("platform joint", &e.Links[leg].To[c], [3]float64{to.X, to.Y, to.Z}[c])
					}
				}
				for c, x := range []float64{p.P.X, p.P.Y, p.P.Z} {
					z := &e.P[c]
					for k := range at {
						x -= z.G[k] * at[k]
					}
					near(t, "place", x, z.C, 1e-15)
				}
				for c := range p.R {
					check("rotation", &e.R[c], p.R[c])
				}
				kin.Wrenches(m, &s, &w)
				for c := range w {
					check("wrench", &e.Wrenches[c], w[c])
				}
			}
		}
		for _, what := range []string{"length", "force", "moment", "base chord", "platform chord", "platform joint", "rotation"} {
			t.Logf("%s: %-14s %.3f of the remainder used", name, what, most[what])
			if most[what] < 0.5 {
				t.Errorf("%s: %s: only %.3f of the remainder used", name, what, most[what])
			}
		}
	}
}

// plainStruts is the same enclosure, of forms alone.
func plainStruts(m kin.Machine, b *enclose.Box, ua, ub []kin.Vec, e *kin.Enclosure) {
	f := m.Frame()
	var box enclose.Box
	for _, q := range f.Freedoms {
		box.Low[q], box.High[q] = b.Low[q], b.High[q]
	}
	enclose.Rotation(&box, &e.R)
	home := r3.Add(f.Home, f.HomeRot.Apply(f.Tool))
	var tool enclose.Vec
	for c := range tool {
		tool[c].Coordinate(&box, c)
	}
	tool.AddConst(&tool, home)
	for i := range f.Base {
		var u, s, n, v, moment enclose.Vec
		u.Turn(&e.R, f.HomeRot.Apply(r3.Sub(f.Platform[i], f.Tool)))
		s.AddConst(s.Add(&tool, &u), r3.Scale(-1, f.Base[i]))
		e.Q[i].Norm(&s)
		n.Unit(&s)
		moment.Scale(moment.Cross(&u, &n), 1/f.Length)
		copy(e.J[6*i:], n[:])
		copy(e.J[6*i+3:], moment[:])
		z := &e.BaseChord[i]
		z.AddConst(z.Scale(z.Along(&n, ua[i]), -2), 1+r3.Norm2(ua[i]))
		z = &e.PlatformChord[i]
		v.Turn(&e.R, ub[i])
		z.AddConst(z.Scale(z.Dot(&n, &v), -2), 1+r3.Norm2(ub[i]))
	}
}

// The enclosure by hand is narrower than the one by plain arithmetic on forms, both being rigorous: entry by entry for boxes
// of a tenth of the starter's, up to what rounding takes; on the mean, and never by more than a third wider, up to half of it.
func TestStrutEnclosureIsNarrowerThanThePlainOne(t *testing.T) {
	for _, name := range strutFamilies {
		f := kin.FamilyNamed(name)
		for _, part := range []float64{1, 0.5, 0.25, 0.1, 0.03, 0.01} {
			rng := seeded(22)
			var a, b kin.Enclosure
			worst, sum, n := map[string]float64{}, map[string]float64{}, map[string]float64{}
			for range 300 {
				m := f.Build(randomDesign(rng, f), offCentre())
				box := boxWithin(rng, f, part)
				m.(kin.Encloser).Enclose(&box, &a)
				ua := make([]kin.Vec, len(f.Freedoms))
				fr, home := m.Frame(), atHome()
				for i := range ua {
					from, to := joints(fr, &home, i)
					ua[i] = r3.Unit(r3.Sub(to, from))
				}
				plainStruts(m, &box, ua, ua, &b)
				check := func(what string, x, y *enclose.Form) {
					if !y.Known() || y.R < 1e-9 {
						return
					}
					u := x.R / y.R
					worst[what] = max(worst[what], u)
					sum[what] += math.Log(u)
					n[what]++
				}
				for i := range ua {
					check("length", &a.Q[i], &b.Q[i])
					check("base chord", &a.BaseChord[i], &b.BaseChord[i])
					check("platform chord", &a.PlatformChord[i], &b.PlatformChord[i])
					for c := range 6 {
						check([]string{"force", "moment"}[c/3], &a.J[6*i+c], &b.J[6*i+c])
					}
				}
			}
			for what := range worst {
				mean := math.Exp(sum[what] / n[what])
				t.Logf("%s, boxes up to %g: remainder of the %s %.3f of the plain one on the mean, %.3f at most", name, part, what, mean, worst[what])
				if part <= 0.5 && !(mean < 1) || part <= 0.1 && worst[what] > 1.01 {
					t.Errorf("%s, boxes up to %g: remainder of the %s %.3f of the plain one on the mean, %.3f at most", name, part, what, mean, worst[what])
				}
			}
		}
	}
}

// A leg whose length can be 0 within the box has no enclosure, and says so; the others have theirs.
func TestStrutEnclosureOfALegWithoutLength(t *testing.T) {
	j := &kin.Joints{
		Base:     []kin.Vec{{}, {X: 1}, {Y: 1}, {X: -1}, {Y: -1}, {X: 1, Y: 1}},
		Platform: []kin.Vec{{}, {X: 1, Z: 1}, {Y: 1, Z: 1}, {X: -1, Z: 1}, {Y: -1, Z: 1}, {X: 1, Y: 1, Z: 1}},
		Home:     kin.Vec{Z: 0.1}, HomeRot: kin.Identity(),
	}
	m := kin.FamilyNamed("6-UPS").Outright(j, &kin.Setup{Length: 1, Axis: kin.Axis{Kind: kin.AxisPlate}}).(kin.Encloser)
	var e kin.Enclosure
	for _, h := range []float64{0.09, 0.11} {
		var b enclose.Box
		b.Low[2], b.High[2] = -h, h
		m.Enclose(&b, &e)
		known := e.Q[0].Known() && e.J[0].Known() && e.J[3].Known() && e.BaseChord[0].Known() && e.PlatformChord[0].Known()
		if reaches := e.Reach == kin.AllReach; known != (h < 0.1) || reaches != known || (e.Leg == 0) == known {
			t.Errorf("legs down to %g: reach %v, leg %d, known %v", 0.1-h, e.Reach, e.Leg, known)
		}
		if !e.Q[1].Known() || !e.J[6].Known() {
			t.Error("a leg of a metre is unknown")
		}
	}
}

// A box without width is a pose, and only rounding is left; boxes that are not finite give no answer.
func TestStrutEnclosureOfAPose(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	m := f.Build(midRange(f), offCentre())
	var e kin.Enclosure
	c := randomCoords(seeded(24), f, 1)
	m.(kin.Encloser).Enclose(&enclose.Box{Low: c, High: c}, &e)
	s := moved(t, m, kin.NewPose(c))
	for i := range e.J {
		near(t, "row", e.J[i].C, s.J[i], 1e-14)
		if !(e.J[i].R < 1e-11) || e.J[i].Spread() != 0 {
			t.Errorf("an enclosed pose has the form %+v", e.J[i])
		}
	}
	for _, x := range []float64{math.Inf(1), math.NaN(), math.MaxFloat64} {
		b := enclose.Box{Low: c, High: c}
		b.High[kin.Roll] = x
		m.(kin.Encloser).Enclose(&b, &e)
		if e.Reach != kin.Unsure || e.Q[0].Known() || e.J[3].Known() || e.PlatformChord[0].Known() {
			t.Errorf("roll up to %g: reach %v, length %+v", x, e.Reach, e.Q[0])
		}
	}
}

// Once filled, an enclosure takes no memory.
func TestStrutEnclosureAllocatesNothing(t *testing.T) {
	for _, name := range strutFamilies {
		f := kin.FamilyNamed(name)
		m := f.Build(midRange(f), offCentre()).(kin.Encloser)
		b := boxWithin(seeded(25), f, 0.2)
		var e kin.Enclosure
		m.Enclose(&b, &e)
		if n := testing.AllocsPerRun(100, func() { m.Enclose(&b, &e) }); n != 0 {
			t.Errorf("%s: %g allocations a box", name, n)
		}
	}
}

// A box costs a few microseconds and no memory.
func BenchmarkStrutEnclosure(b *testing.B) {
	for _, name := range strutFamilies {
		b.Run(name, func(b *testing.B) {
			f := kin.FamilyNamed(name)
			m := f.Build(sound(f), offCentre()).(kin.Encloser)
			rng := seeded(23)
			boxes := make([]enclose.Box, 64)
			for k := range boxes {
				boxes[k] = boxWithin(rng, f, 0.2)
			}
			var e kin.Enclosure
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				m.Enclose(&boxes[i%len(boxes)], &e)
			}
		})
	}
}
