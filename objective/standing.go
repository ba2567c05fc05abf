package objective

import (
	"math"

	"legwright/kin"
)

// Standing is how an appraised design stands at one pose.
type Standing struct {
	Reached      bool
	Q            [6]float64
	Conditioning float64
	Fails        string // the first pose limit that fails, "" if none does
}

// Standings looks at poses about home, required or not, with the loads and speeds of all cases.
func Standings(t *Task, a *Appraisal, poses []kin.Coords) []Standing {
	l := limitsOf(t, a)
	out := make([]Standing, len(poses))
	for i, c := range poses {
		out[i] = l.stand(t, c)
	}
	return out
}

// limitsOf prepares an appraised design for being looked at pose by pose.
func limitsOf(t *Task, a *Appraisal) *poseLimits {
	v := newView(t)
	v.serve(a.Plan.Family)
	v.begin(a.Machine)
	return newPoseLimits(t, v, a.Plan, &Design{Family: a.Plan.Family, Values: a.Values, Machine: a.Machine})
}

func (l *poseLimits) stand(t *Task, c kin.Coords) Standing {
	s := Standing{Fails: l.fails(&Sample{Coords: c, Pose: kin.NewPose(c), Zone: len(t.Zones)})}
	if s.Reached = l.v.S.Fail == kin.Reached; s.Reached {
		s.Q, s.Conditioning = l.v.S.Q, math.Sqrt(l.v.ratio2)
	}
	return s
}

// Together is how far the coordinates of a zone go at the same time: the zone drawn larger or smaller
// about home, until a pose limit fails on the straight way from home to one of its outermost poses.
type Together struct {
	Zone   int
	Factor float64    // 1 is the zone as required; +Inf where nothing fails up to 3
	Fails  string     // the limit that fails first beyond, "" for none
	At     kin.Coords // the required pose towards which it fails
}

const (
	mostTogether  = 3
	stepsTogether = 40 // looks at the way from home to a required pose
)

// Simultaneous finds how far the zones go whose coordinates move at the same time. A failure
// narrower than a fortieth of the way may be stepped over. The loads and speeds are those of all cases.
func Simultaneous(t *Task, a *Appraisal) []Together {
	l := limitsOf(t, a)
	var out []Together
	for z := range t.Zones {
		if t.Zones[z].Kind == Axes {
			continue
		}
		g := Together{Zone: z, Factor: math.Inf(1)}
		for i := range t.samples[:t.scouts] {
			if s := &t.samples[i]; s.Zone == z && s.Coords != (kin.Coords{}) {
				l.reach(t, s.Coords, &g)
			}
		}
		out = append(out, g)
	}
	return out
}

// reach goes from home towards the pose c as far as every pose limit holds, and sets g where that is less far than before.
func (l *poseLimits) reach(t *Task, c kin.Coords, g *Together) {
	try := func(x float64) string {
		var at kin.Coords
		for k := range at {
			at[k] = x * c[k]
		}
		return l.fails(&Sample{Coords: at, Pose: kin.NewPose(at), Zone: len(t.Zones)})
	}
	good := 0.0
	for k := 0; k <= mostTogether*stepsTogether && good < g.Factor; k++ {
		bad := math.Min(float64(k)/stepsTogether, g.Factor)
		why := try(bad)
		if why == "" {
			good = bad
			continue
		}
		for bad-good > 1e-9 {
			mid := good/2 + bad/2
			if w := try(mid); w == "" {
				good = mid
			} else {
				bad, why = mid, w
			}
		}
		if good < g.Factor {
			g.Factor, g.Fails, g.At = good, why, c
		}
		return
	}
}

// Unjudged is a design with nothing judged: enough for Standings, Simultaneous, ConditioningMap and
// Excurse. values holds every dimension, sized ones included.
func Unjudged(t *Task, p *Plan, values []float64) *Appraisal {
	return &Appraisal{Plan: p, Values: append([]float64(nil), values...), Machine: p.build(t, values)}
}
