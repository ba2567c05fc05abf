package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The places of the shaft's dimensions of delta-4, after those of delta.
const (
	shaftMin = deltaMode + 1 + iota
	shaftStroke
	shaftSwing
)

func delta4() *Family {
	f := &Family{
		Name:     "delta-4",
		Text:     "delta with a telescopic shaft that turns the tool: x, y, z and yaw",
		Freedoms: []Freedom{X, Y, Z, Yaw},
		Legs:     4,
		Drive:    Rotary,
		Free:     1,
		Picture: deltaPicture + ` A telescopic
shaft with a universal joint at each end runs from the base origin to the platform origin and turns the tool on
the platform: the fourth actuator's coordinate is the yaw, between -180° and 180° of home. shaft_min is the
distance between the universal joints with the shaft pushed together, shaft_stroke how much longer it can become,
shaft_swing how far it may lean from the vertical. The angle's range is that of the three arms.`,
		Dimensions: append(append(deltaDimensions(),
			Dimension{Name: "shaft_min", Unit: Metre, Low: 0.15, High: 0.4, Text: "distance between the shaft's joints, pushed together"},
			Dimension{Name: "shaft_stroke", Unit: Metre, Low: 0.2, High: 0.5, Text: "how much longer the shaft can become"},
			Dimension{Name: "shaft_swing", Unit: Radian, Low: 20 * deg, High: 45 * deg, Text: "greatest angle of the shaft from the vertical"},
		), crankRange("arm", -70*deg, 30*deg, 30*deg, 120*deg)...),
		Starter: Starter{
			Title:    "A delta with a turning tool to start from",
			Box:      Coords{X: 0.08, Y: 0.08, Z: 0.04, Yaw: 90 * deg},
			Mass:     1,
			Centre:   Vec{Z: 0.03},
			Accel:    20,
			Speed:    2,
			Spin:     10,
			Diameter: 0.01,
			Swing:    45 * deg,
		},
		Sources: []string{
			"R. Clavel 1988, DELTA, a fast robot with parallel geometry, Int. Symp. Industrial Robots, Lausanne (from memory)",
		},
	}
	freedoms := f.Freedoms
	f.Build = func(d []float64, s *Setup) Machine {
		m := &toolDelta{
			shiftingRods: *newDelta(freedoms, d, s),
			least:        d[shaftMin],
			most:         d[shaftMin] + d[shaftStroke],
			upright:      math.Cos(d[shaftSwing]),
		}
		m.frame.Base = append(m.frame.Base, Vec{})
		m.frame.Platform = append(m.frame.Platform, Vec{})
		m.frame.Rods = append(m.frame.Rods, 0)
		if x := m.least + m.most + m.upright; x-x != 0 {
			m.off[0].X = math.NaN()
		}
		return m
	}
	return f
}

// toolDelta is a delta whose tool is turned on the platform by a shaft. The
// shaft is the fourth leg: End and Rod are its foot and its direction, and
// swings are measured of the rods alone, as the shaft has a stop of its own.
type toolDelta struct {
	shiftingRods
	least, most float64 // length of the shaft
	upright     float64 // least cosine of its angle from z
}

// stopSlack is what a passive stop gives, relative: two routes to the same limit differ by rounding.
const stopSlack = 1e-9

// Move places the platform, which does not turn, then the tool and the shaft. Beyond a stop of the
// shaft it answers Stopped with What "shaft length" or "shaft swing".
func (m *toolDelta) Move(p *Pose, s *State) {
	t, r := &m.frame.Tool, &p.R
	tx, ty, tz := r[0]*t.X+r[1]*t.Y, r[3]*t.X+r[4]*t.Y, t.Z // from the platform origin to the tool point
	d := Vec{X: p.P.X + t.X - tx, Y: p.P.Y + t.Y - ty, Z: p.P.Z + t.Z - tz}
	m.shift(&d, s)
	if s.Fail != Reached {
		return
	}
	for i := range 3 { // the rods turn nothing, but a tool point off the axis moves when the tool turns
		row := (*[6]float64)(s.J[6*i : 6*i+6])
		row[5] = (row[0]*ty - row[1]*tx) * m.invLc
	}
	yaw := math.Atan2(r[3], r[0])
	s.Q[3] = yaw
	row := (*[6]float64)(s.J[18:24])
	*row = [6]float64{5: m.invLc}
	s.BaseChord[3], s.PlatformChord[3] = 0, 0
	shaft := r3.Add(m.frame.Home, d)
	length := r3.Norm(shaft)
	s.End[3], s.Rod[3] = Vec{}, r3.Scale(1/length, shaft)
	switch {
	case yaw-yaw != 0:
		s.Fail, s.Leg = NotFinite, 3
	case length < m.least*(1-stopSlack), length > m.most*(1+stopSlack):
		s.Fail, s.Leg, s.What = Stopped, 3, "shaft length"
	case shaft.Z < length*(m.upright-stopSlack):
		s.Fail, s.Leg, s.What = Stopped, 3, "shaft swing"
	}
}

// Constraints are the couples about x and y: the tool turns on the platform about z. That the platform
// itself must not turn is up to the three parallelograms, as in a delta, and does not show here.
func (m *toolDelta) Constraints(_ *State, rows *[36]float64) int {
	return unitConstraints(m.frame.Freedoms, rows)
}

// Actuation is the rods' unit wrenches on the tool, but for the moments about z that stay in the platform, and the shaft's couple.
func (m *toolDelta) Actuation(s *State, rows *[36]float64) int {
	sin, cos := math.Sincos(s.Q[3])
	t := &m.frame.Tool
	tx, ty := cos*t.X-sin*t.Y, sin*t.X+cos*t.Y
	for i := range 3 {
		b, u := &m.frame.Platform[i], s.Rod[i]
		row := rows[6*i : 6*i+6]
		forceRow(u, Vec{X: b.X - tx, Y: b.Y - ty, Z: b.Z - t.Z}, m.invLc, row)
		row[5] = (u.X*ty - u.Y*tx) * m.invLc
	}
	copy(rows[18:24], []float64{0, 0, 0, 0, 0, 1})
	return 4
}
