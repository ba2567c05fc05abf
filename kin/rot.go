package kin

import "math"

// Rot is a rotation matrix, row by row.
type Rot [9]float64

// Identity is the rotation by nothing.
func Identity() Rot { return Rot{1, 0, 0, 0, 1, 0, 0, 0, 1} }

// RPY is Rz(yaw) Ry(pitch) Rx(roll): roll, then pitch, then yaw about fixed
// base axes (ISO 9787 calls the angles A, B, C about x, y, z).
func RPY(roll, pitch, yaw float64) Rot {
	sr, cr := math.Sincos(roll)
	sp, cp := math.Sincos(pitch)
	sy, cy := math.Sincos(yaw)
	return Rot{
		cy * cp, cy*sp*sr - sy*cr, cy*sp*cr + sy*sr,
		sy * cp, sy*sp*sr + cy*cr, sy*sp*cr - cy*sr,
		-sp, cp * sr, cp * cr,
	}
}

// RPY is the inverse of the function RPY. Pitch lies in [-π/2, π/2]; at its
// ends only yaw - roll or yaw + roll is determined, and roll is given as 0.
func (r *Rot) RPY() (roll, pitch, yaw float64) {
	cp := math.Hypot(r[0], r[3])
	pitch = math.Atan2(-r[6], cp)
	if cp < 1e-12 {
		return 0, pitch, math.Atan2(-r[1], r[4])
	}
	return math.Atan2(r[7], r[8]), pitch, math.Atan2(r[3], r[0])
}

// Apply is R·v.
func (r *Rot) Apply(v Vec) Vec {
	return Vec{
		X: r[0]*v.X + r[1]*v.Y + r[2]*v.Z,
		Y: r[3]*v.X + r[4]*v.Y + r[5]*v.Z,
		Z: r[6]*v.X + r[7]*v.Y + r[8]*v.Z,
	}
}

// Unapply is Rᵀ·v.
func (r *Rot) Unapply(v Vec) Vec {
	return Vec{
		X: r[0]*v.X + r[3]*v.Y + r[6]*v.Z,
		Y: r[1]*v.X + r[4]*v.Y + r[7]*v.Z,
		Z: r[2]*v.X + r[5]*v.Y + r[8]*v.Z,
	}
}

// Mul is the matrix product r·s.
func (r *Rot) Mul(s *Rot) Rot {
	var out Rot
	for i := range 3 {
		for j := range 3 {
			out[3*i+j] = r[3*i]*s[j] + r[3*i+1]*s[3+j] + r[3*i+2]*s[6+j]
		}
	}
	return out
}

// Exp is the rotation by the angle |w| about w (Rodrigues' formula).
func Exp(w Vec) Rot {
	t2 := w.X*w.X + w.Y*w.Y + w.Z*w.Z
	a, b := 1.0, 0.5 // sin t / t, (1 - cos t) / t²
	if t2 > 1e-16 {
		t := math.Sqrt(t2)
		s := math.Sin(t / 2)
		a, b = math.Sin(t)/t, 2*s*s/t2
	}
	return Rot{
		1 - b*(w.Y*w.Y+w.Z*w.Z), b*w.X*w.Y - a*w.Z, b*w.X*w.Z + a*w.Y,
		b*w.X*w.Y + a*w.Z, 1 - b*(w.X*w.X+w.Z*w.Z), b*w.Y*w.Z - a*w.X,
		b*w.X*w.Z - a*w.Y, b*w.Y*w.Z + a*w.X, 1 - b*(w.X*w.X+w.Y*w.Y),
	}
}
