package objective

import (
	"math"

	"legwright/kin"
)

// Excursion is how far one coordinate goes alone from home until a pose limit fails.
type Excursion struct {
	Freedom   kin.Freedom
	Low, High float64 // SI; -Inf and +Inf where nothing fails
	LowFails  string  // which limit fails beyond, "" where none does
	HighFails string
}

const (
	excursionSteps = 2000 // along half a turn, or a length that no leg could follow
	excursionCuts  = 60   // bisections of the step in which the limit fails
)

// Excurse finds the single-axis excursions of an appraised design. They are not
// reachable together. The march along each axis has steps of 0.09° and of 1/2000 of five times the longest leg at home
// (with rotary drives and rails: the radius of the base in plan, the platform's distance from the base origin, or a rod and
// the rail that its carriage has); a failure narrower than that may be stepped over.
func Excurse(t *Task, a *Appraisal) []Excursion {
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	d := Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine}
	l := newPoseLimits(t, v, a.Plan, &d)
	f := a.Machine.Frame()
	most := l.farthest(f)
	var out []Excursion
	for _, q := range f.Freedoms {
		far := 5 * most
		if q.Angular() {
			far = math.Pi
		}
		e := Excursion{Freedom: q}
		e.Low, e.LowFails = excurse(l, q, -far, len(t.Zones))
		e.High, e.HighFails = excurse(l, q, far, len(t.Zones))
		out = append(out, e)
	}
	return out
}

// farthest is a fifth of the length that no axis of the machine could follow.
func (l *poseLimits) farthest(f *kin.Frame) float64 {
	v, p := l.v, l.plan
	most := 0.0
	if p.Family.Drive != kin.Rotary && f.Rails == nil {
		for _, q := range v.homeQ[:v.n] {
			most = math.Max(most, q)
		}
		return most
	}
	most = math.Max(enclosing(f.Base), norm(f.Home))
	if f.Rails == nil {
		return most
	}
	rail := 0.0 // the farthest that a carriage goes from where its coordinate is 0
	low, high := l.d.Values[p.least], l.d.Values[p.least]+l.d.Values[p.span]
	for _, q := range append([]float64{low, high}, v.homeQ[:v.n]...) {
		if !math.IsInf(q, 0) && !math.IsNaN(q) {
			rail = math.Max(rail, math.Abs(q))
		}
	}
	for _, rod := range f.Rods {
		most = math.Max(most, rod+rail)
	}
	return most
}

// excurse marches coordinate q from home towards far.
func excurse(l *poseLimits, q kin.Freedom, far float64, zone int) (reach float64, fails string) {
	try := func(x float64) string {
		var c kin.Coords
		c[q] = x
		return l.fails(&Sample{Coords: c, Pose: kin.NewPose(c), Zone: zone})
	}
	if f := try(0); f != "" {
		return 0, f
	}
	if far == 0 {
		panic("objective: an excursion with nowhere to go")
	}
	good := 0.0
	for k := 1; k <= excursionSteps; k++ {
		x := far * float64(k) / excursionSteps
		f := try(x)
		if f == "" {
			good = x
			continue
		}
		for range excursionCuts {
			mid := good/2 + x/2
			if mid == good || mid == x {
				break
			}
			if g := try(mid); g == "" {
				good = mid
			} else {
				x, f = mid, g
			}
		}
		return good, f
	}
	return math.Copysign(math.Inf(1), far), ""
}
