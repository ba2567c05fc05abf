package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// stop bounds an angle: Least to Least + Span.
type stop struct{ least, span float64 }

// on gives the angle a on the turn that starts at the stop, and whether it is within the range.
func (s *stop) on(a float64) (float64, bool) {
	if a < s.least-stopSlack {
		a += 2 * math.Pi
	} else if a > s.least+2*math.Pi {
		a -= 2 * math.Pi
	}
	return a, a >= s.least-stopSlack && a <= s.least+s.span+stopSlack
}

// arm is a column that turns the plane of two links, each driven by its own
// angle from the level, and a wrist plate that stays level: the tool turns on it
// about the vertical. Coordinates are the column's angle, those of the two links, and
// the tool's angle against the plane of the arm, since its motor is carried round
// by the column.
//
// The column's angle is undetermined where the platform origin is on the column's
// axis, and the links cannot follow where they are in line: such poses count as out of reach.
type arm struct {
	frame               Frame
	home                Vec // tool point at home, base frame
	tool                Vec // tool point, platform axes
	inner               float64
	height              float64 // of the shoulder over the platform origin where the wrist is level with it
	upper, fore, mode   float64
	upperStop, foreStop stop
	elbowStop           stop
	invLc               float64
	wrong               float64 // NaN where a dimension is no finite number
}

// newArm builds the machine. Where the setup has no characteristic length it is the forearm's.
func newArm(freedoms []Freedom, d []float64, s *Setup) *arm {
	shoulder := Vec{X: d[armBaseOffset], Z: d[armBaseHeight]}
	lc := s.Length
	if lc == 0 {
		lc = d[armForearm]
	}
	m := &arm{
		frame: Frame{
			Freedoms: freedoms,
			Base:     []Vec{{}, shoulder, shoulder, {Z: d[armBaseHeight]}},
			Platform: make([]Vec, 4),
			Rods:     make([]float64, 4), // no leg is prismatic, and none has a rod
			Home:     Vec{X: d[armHomeReach], Z: d[armHomeHeight]},
			HomeRot:  Identity(),
			Tool:     s.Tool,
			Length:   lc,
		},
		tool:      s.Tool,
		inner:     d[armBaseOffset] + d[armWristOffset],
		height:    d[armBaseHeight] - d[armWristDrop],
		upper:     d[armUpper],
		fore:      d[armForearm],
		mode:      sign(d[armMode]),
		upperStop: stop{d[armStops], d[armStops+1]},
		foreStop:  stop{d[armStops+2], d[armStops+3]},
		elbowStop: stop{d[armStops+4], d[armStops+5]},
		invLc:     1 / lc,
	}
	m.home = r3.Add(m.frame.Home, s.Tool)
	for _, v := range d {
		m.wrong += 0 * v
	}
	return m
}

func (m *arm) Frame() *Frame { return &m.frame }

// Move is the inverse kinematics in closed form. Only the heading of the pose's rotation is looked at.
func (m *arm) Move(p *Pose, s *State) {
	cos, sin := p.R[0], p.R[3]
	tx, ty := cos*m.tool.X-sin*m.tool.Y, sin*m.tool.X+cos*m.tool.Y
	x := m.home.X + p.P.X - tx
	y := m.home.Y + p.P.Y - ty
	z := m.home.Z + p.P.Z - m.tool.Z - m.height
	r2 := x*x + y*y
	r := math.Sqrt(r2)
	w := r - m.inner
	d2 := w*w + z*z
	if e := d2 + (p.R[1] + p.R[4]) + m.wrong; e-e != 0 {
		s.Fail, s.Leg = NotFinite, 0
		return
	}
	if !(r > 0) {
		s.Fail, s.Leg = OutOfReach, 0
		return
	}
	// With the links as two sides of a triangle, d the third: 2·upper·fore times cosine and sine of the angle between them.
	along := d2 - m.upper*m.upper - m.fore*m.fore
	sum, diff := m.upper+m.fore, m.upper-m.fore
	room := (sum*sum - d2) * (d2 - diff*diff)
	if !(room > 0) {
		s.Fail, s.Leg = OutOfReach, 1
		return
	}
	across := math.Sqrt(room)
	// The upper arm's direction is that to the wrist, turned by the angle at the shoulder.
	u, v := (2*m.upper*m.upper+along)/(2*m.upper*d2), m.mode*across/(2*m.upper*d2)
	c2, s2 := u*w-v*z, u*z+v*w
	c3, s3 := (w-m.upper*c2)/m.fore, (z-m.upper*s2)/m.fore

	cx, cy := x/r, y/r // the plane of the arm
	fold := 1 / (2 * m.upper * m.fore)
	cs := [6]float64{cx, c2, c3, cos*cx + sin*cy, along * fold}
	sn := [6]float64{cy, s2, s3, sin*cx - cos*cy, across * fold}
	var ok [3]bool
	angles(5, &cs, &sn, &s.Q)
	s.Q[1], ok[0] = m.upperStop.on(s.Q[1])
	s.Q[2], ok[1] = m.foreStop.on(s.Q[2])
	_, ok[2] = m.elbowStop.on(s.Q[4])
	s.Q[4] = 0
	for i, within := range ok {
		if !within {
			s.Fail, s.Leg, s.What = Stopped, 1+i%2, [3]string{"upper arm", "forearm", "parallelogram"}[i]
			return
		}
	}

	// Rates. The platform origin moves with v - ω × (R tool); r' and z' are those of the wrist.
	s.J = [36]float64{}
	lead := -(tx*cx + ty*cy) * m.invLc // outward and leftward parts of ω × r, r from the tool point to the origin
	side := (ty*cx - tx*cy) * m.invLc
	column := (*[6]float64)(s.J[0:6])
	column[0], column[1], column[5] = -cy/r, cx/r, lead/r
	det := m.mode * across * fold // sin(θ2-θ3)
	bar := func(row *[6]float64, c, sn, length float64) {
		k := 1 / (length * det)
		row[0], row[1], row[2], row[5] = -c*cx*k, -c*cy*k, -sn*k, -c*side*k
	}
	bar((*[6]float64)(s.J[6:12]), c3, s3, m.upper)
	bar((*[6]float64)(s.J[12:18]), -c2, -s2, m.fore)
	turn := (*[6]float64)(s.J[18:24])
	turn[0], turn[1], turn[5] = -column[0], -column[1], m.invLc-column[5]

	s.BaseChord, s.PlatformChord = [6]float64{}, [6]float64{}
	s.Fail, s.Leg = Reached, -1
}

// Gap is +Inf: there is one arm alone.
func (m *arm) Gap(*State) (gap float64, i, j int) { return math.Inf(1), -1, -1 }

// GapBelow is Gap.
func (m *arm) GapBelow(*State, float64) (gap float64, i, j int) { return math.Inf(1), -1, -1 }

// Constraints are the couples about x and y, which the parallelograms take.
func (m *arm) Constraints(_ *State, rows *[36]float64) int {
	return unitConstraints(m.frame.Freedoms, rows)
}

// Place is that of the frame.
func (m *arm) Place(p *Pose) (Vec, Rot) { return m.frame.Place(p) }

// Serial is |sin(θ2-θ3)|, as each link's motor moves the wrist square to that link, against a
// force along the other one; or, where that is less, the platform origin's distance from the column's axis
// over that of the arm stretched out level, as nothing moves sideways on the axis.
func (m *arm) Serial(s *State) float64 {
	lever := 1 / (math.Hypot(s.J[0], s.J[1]) * (m.inner + m.upper + m.fore))
	return math.Min(math.Abs(math.Sin(s.Q[1]-s.Q[2])), lever)
}

// Tie is not wanted: the freedoms are free of each other.
func (m *arm) Tie(*Pose, *[36]float64) { panic("kin: freedoms are not tied") }

// sweep is the square around the circle that the shoulder describes as the column turns.
func (m *arm) sweep(_, _ float64) []Vec {
	r, z := m.frame.Base[1].X, m.frame.Base[1].Z
	return []Vec{{X: r, Z: z}, {Y: r, Z: z}, {X: -r, Z: z}, {Y: -r, Z: z}}
}
