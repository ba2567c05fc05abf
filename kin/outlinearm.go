package kin

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The moving points of an arm, in order.
const (
	armShoulder = iota
	armElbow
	armWrist
	armFlange   // over the platform origin, level with the wrist
	armTail     // of the crank that drives the forearm, at the shoulder
	armElbowEnd // of its coupler, on the forearm's tail
	armRest     // of the bar that keeps the elbow's plate level, over the shoulder
	armElbowTop
	armWristTop
	armHand // shows where the tool points
	armPoints
)

// outline draws column, links, wrist plate and the bars of the parallelograms. Where these are mounted is no
// dimension of the family: they are drawn at an eighth of the forearm from the joints.
func (m *arm) outline(o *Outline) {
	o.Fixed = []Vec{{}, {Z: m.frame.Base[1].Z}}
	o.Platform = []Vec{{}, m.frame.Tool}
	o.Origin, o.Tool = 2, 3
	o.Moving = armPoints
	o.Base, o.Joints = []int{0, 4 + armShoulder, 4 + armShoulder, 4 + armFlange}, []int{4 + armShoulder, 4 + armElbow, 4 + armWrist, o.Origin}
	at := func(k LineKind, leg, a, b int) { o.line(k, leg, 4+a, 4+b) }
	o.line(LinkLine, 0, 0, 1)
	o.line(LinkLine, 0, 1, 4+armShoulder)
	at(LinkLine, 1, armShoulder, armElbow)
	at(LinkLine, 2, armElbow, armWrist)
	at(PlatformEdge, -1, armWrist, armFlange)
	o.line(ToolLine, 3, 4+armFlange, o.Origin)
	at(CrankLine, 2, armShoulder, armTail)
	at(BarLine, 2, armTail, armElbowEnd)
	at(BarLine, 2, armElbowEnd, armElbow)
	at(BarLine, -1, armShoulder, armRest)
	at(BarLine, -1, armRest, armElbowTop)
	at(BarLine, -1, armElbowTop, armElbow)
	at(BarLine, -1, armElbowTop, armWristTop)
	at(BarLine, -1, armWristTop, armWrist)
	if m.frame.Tool != (Vec{}) {
		o.line(ToolLine, 3, o.Origin, o.Tool)
	}
	o.line(ToolLine, 3, o.Origin, 4+armHand)
}

// links are the moving points at the posture s.
func (m *arm) links(s *State) []Vec {
	sin, cos := math.Sincos(s.Q[0])
	out := Vec{X: cos, Y: sin}
	dir := func(angle float64) Vec {
		z, r := math.Sincos(angle)
		return r3.Add(r3.Scale(r, out), Vec{Z: z})
	}
	u, v := dir(s.Q[1]), dir(s.Q[2])
	short := m.fore / 8
	p := make([]Vec, armPoints)
	p[armShoulder] = r3.Add(r3.Scale(m.frame.Base[1].X, out), Vec{Z: m.frame.Base[1].Z})
	p[armElbow] = r3.Add(p[armShoulder], r3.Scale(m.upper, u))
	p[armWrist] = r3.Add(p[armElbow], r3.Scale(m.fore, v))
	p[armFlange] = r3.Add(p[armWrist], r3.Scale(m.inner-m.frame.Base[1].X, out))
	p[armTail] = r3.Sub(p[armShoulder], r3.Scale(short, v))
	p[armElbowEnd] = r3.Sub(p[armElbow], r3.Scale(short, v))
	p[armRest] = r3.Add(p[armShoulder], Vec{Z: short})
	p[armElbowTop] = r3.Add(p[armElbow], Vec{Z: short})
	p[armWristTop] = r3.Add(p[armWrist], Vec{Z: short})
	yaw := s.Q[0] + s.Q[3]
	drop := m.frame.Base[1].Z - m.height // of the platform origin below the wrist
	p[armHand] = r3.Add(p[armFlange], Vec{X: short * math.Cos(yaw), Y: short * math.Sin(yaw), Z: -drop})
	return p
}
