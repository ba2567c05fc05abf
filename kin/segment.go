package kin

// segmentGap2 is the squared length of segmentApart.
func segmentGap2(d, u, v *Vec, lu, lv float64) float64 {
	r := segmentApart(d, u, v, lu, lv)
	return r.X*r.X + r.Y*r.Y + r.Z*r.Z
}

// segmentApart is the shortest vector from the second to the first of two segments that start d apart
// (start of the first less start of the second), run along the unit vectors
// u and v and have the lengths lu and lv. Closest points by clamping the
// solution of the 2x2 system (the usual method; C. Ericson 2005, Real-Time
// Collision Detection, 5.1.9, from memory). For segments parallel within 3e-8 rad
// the system says nothing but to which end the distance falls; where such
// segments cross, the distance may come out 3e-8 of their length too large.
func segmentApart(d, u, v *Vec, lu, lv float64) Vec {
	b := u.X*v.X + u.Y*v.Y + u.Z*v.Z
	c := u.X*d.X + u.Y*d.Y + u.Z*d.Z
	f := v.X*d.X + v.Y*d.Y + v.Z*d.Z
	s, num := 0.0, b*f-c
	if den := 1 - b*b; den > 1e-15 {
		s = clamp(num/den, lu)
	} else if num > 0 {
		s = lu
	}
	t := b*s + f
	if t < 0 {
		t = 0
		s = clamp(-c, lu)
	} else if t > lv {
		t = lv
		s = clamp(b*lv-c, lu)
	}
	return Vec{X: d.X + s*u.X - t*v.X, Y: d.Y + s*u.Y - t*v.Y, Z: d.Z + s*u.Z - t*v.Z}
}

// clamp keeps x within [0, hi].
func clamp(x, hi float64) float64 {
	if x < 0 {
		return 0
	}
	if x > hi {
		return hi
	}
	return x
}
