package kin

import "gonum.org/v1/gonum/spatial/r3"

// Settle gives the pose that the platform takes for p: with the parasitic
// coordinates that follow where the family's freedoms are tied to them (see
// Frame.Tied), and p itself elsewhere. Loads, errors and small motions in base
// axes belong to the settled pose.
func Settle(m Machine, p *Pose) Pose {
	f := m.Frame()
	if !f.Tied {
		return *p
	}
	if t, ok := m.(*tripod); ok {
		return t.settle(p)
	}
	origin, rot := m.Place(p)
	back := Rot{f.HomeRot[0], f.HomeRot[3], f.HomeRot[6], f.HomeRot[1], f.HomeRot[4], f.HomeRot[7], f.HomeRot[2], f.HomeRot[5], f.HomeRot[8]}
	home := r3.Add(f.Home, f.HomeRot.Apply(f.Tool))
	return Pose{P: r3.Sub(r3.Add(origin, rot.Apply(f.Tool)), home), R: rot.Mul(&back)}
}
