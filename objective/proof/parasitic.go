package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"
)

// drifts proves the bound of the distance of the platform origin from the z axis.
func (b *bench) drifts(i int) bool {
	var x, turned, sum, square enclose.Form
	f := b.frame
	tool := f.HomeRot.Apply(f.Tool)
	for c, home := range [2]float64{f.Home.X + tool.X, f.Home.Y + tool.Y} {
		x.AddConst(&b.e.P[c], home)
		x.Sub(&x, turned.Along((*enclose.Vec)(b.e.R[3*c:3*c+3]), tool))
		sum.Add(&sum, square.Sqr(&x))
	}
	b.worst[i] = math.Sqrt(max(b.upper(&sum), 0)) * (1 + slack)
	return b.worst[i] <= b.target[i]
}

// twists proves the bound of the platform's yaw.
func (b *bench) twists(i int) bool {
	var x, y, yaw, back enclose.Form
	h := &b.frame.HomeRot
	ahead := kin.Vec{X: h[0], Y: h[3], Z: h[6]}
	x.Along((*enclose.Vec)(b.e.R[:3]), ahead)
	y.Along((*enclose.Vec)(b.e.R[3:6]), ahead)
	yaw.Atan2(&y, &x)
	b.worst[i] = max(b.upper(&yaw), b.upper(back.Neg(&yaw)))
	return b.worst[i] <= b.target[i]
}
