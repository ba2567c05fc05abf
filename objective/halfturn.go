package objective

import (
	"math"

	"legwright/kin"
)

// HalfTurn tells whether half a turn about z leaves the whole task unchanged:
// every zone, load, speed and mounting axis. A design and its twin (see
// kin.Family.Twin) are then one machine, placed in two ways.
func (t *Task) HalfTurn() bool {
	upright := func(v kin.Vec) bool { return v.X == 0 && v.Y == 0 }
	if !upright(t.Tool) || !upright(t.Gravity) {
		return false
	}
	if t.Joints.Axis.Kind == kin.AxisVector && !upright(t.Joints.Axis.Vec) {
		return false
	}
	for i := range t.Cases {
		for k := range t.Cases[i].Loads {
			l := &t.Cases[i].Loads[k]
			if !upright(l.Centre) || l.Inertia[4] != 0 || l.Inertia[5] != 0 || !upright(l.Force) || !upright(l.Moment) {
				return false
			}
			if l.Off && !upright(l.At) {
				return false
			}
		}
	}
	for i := range t.Zones {
		if !t.Zones[i].halfTurn() {
			return false
		}
	}
	return true
}

// halfTurn tells whether the zone is its own image.
func (z *Zone) halfTurn() bool {
	if z.Kind == Listed {
		seen := map[kin.Coords]bool{}
		for _, c := range z.Poses {
			seen[rounded(c)] = true
		}
		for _, c := range z.Poses {
			if !seen[rounded(turnedBack(c))] {
				return false
			}
		}
		return true
	}
	for _, q := range [4]kin.Freedom{kin.X, kin.Y, kin.Roll, kin.Pitch} {
		if z.Low[q] != -z.High[q] {
			return false
		}
	}
	return true
}

// turnedBack are the coordinates of a pose after half a turn about z.
func turnedBack(c kin.Coords) kin.Coords {
	return kin.Coords{-c[kin.X], -c[kin.Y], c[kin.Z], -c[kin.Roll], -c[kin.Pitch], c[kin.Yaw]}
}

// rounded makes coordinates comparable that differ by rounding, and -0 equal to 0.
func rounded(c kin.Coords) kin.Coords {
	for k := range c {
		c[k] = math.Round(c[k]*1e9)/1e9 + 0
	}
	return c
}

// TwinOf gives the dimension values of the design's twin, or nil if the
// family has none or the twin lies outside what the plan allows. d holds the
// values of all dimensions.
func (p *Plan) TwinOf(d []float64) []float64 {
	if p.Family.Twin == nil || p.Joints != nil {
		return nil
	}
	t := p.Family.Twin(d)
	for i := range t {
		if t[i] == d[i] || p.derived(i) {
			continue
		}
		if !p.Specs[i].holds(t[i]) {
			return nil
		}
	}
	return t
}

// holds tells whether a value is allowed.
func (s *Spec) holds(v float64) bool {
	switch s.Kind {
	case Range:
		return v >= s.Low && v <= s.High
	case Steps:
		k := math.Round((v - s.Low) / s.Step)
		return k >= 0 && k < float64(s.Levels) && math.Abs(s.at(int(k))-v) <= 1e-9*math.Abs(v)
	case Fixed, Choices:
		for _, w := range s.Values {
			if math.Abs(w-v) <= 1e-9*math.Abs(v) {
				return true
			}
		}
		return false
	}
	return true
}
