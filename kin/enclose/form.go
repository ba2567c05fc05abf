// Package enclose encloses functions over a box of pose coordinates to first order: a value, a slope for each
// coordinate, and a remainder that no function value escapes, rounding included.
//
// Over a box of half-width h in each direction the remainder shrinks with h², which is what lets a branch-and-bound
// come near an extreme value without its boxes piling up there (first-order Taylor models with intervals as
// remainders: M. Berz and K. Makino 1998, Reliable Computing 4:361; affine arithmetic: from memory).
package enclose

// Coords is the number of coordinates of a box: x, y, z, roll, pitch, yaw.
const Coords = 6

// Form encloses a function f over a box: for every point of the box, given by its normal coordinates t, each in
// [-1, 1], f(t) lies within C + Σ G[k] t[k] ± R. R is +Inf or NaN where nothing is known; no bound of such a form holds.
type Form struct {
	C float64         // at the centre, up to R
	G [Coords]float64 // slope over the half-width of each coordinate
	R float64         // remainder, at least 0
}

// Vec is a vector of forms.
type Vec [3]Form

// Box is a box of pose coordinates about home: metres, and radians of roll, pitch and yaw.
type Box struct {
	Low, High [Coords]float64
}
