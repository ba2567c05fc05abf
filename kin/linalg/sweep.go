package linalg

// spreadMax bounds the spread of the pivots up to which [sweep] is trusted. Its
// relative error against elimination with pivoting grows with the root of the
// spread and stays below 3e-13 times the condition number up to here (the worst
// of 400 000 random matrices); about one pose in a hundred of random six-leg
// machines lies beyond.
const spreadMax = 1e9

// sweep writes the inverse of j into x by Gauss-Jordan elimination without
// pivoting. det is the determinant, the product of the pivots; spread is the
// sum of their squares times the sum of their squared reciprocals, at least 36,
// and the caller's measure of trust: NaN, infinite or large if a pivot vanishes.
//
// All six steps are the same code: each eliminates with the element at the top
// left and moves the matrix up and left by one, so that row and column of the
// pivot come in again at the far end. After six steps everything is back in its
// place. A short loop runs faster here than straight lines, which the processor
// has to decode anew each time.
func sweep(j, x *[36]float64) (det, spread float64) {
	*x = *j
	det = 1
	var squares, inverses float64
	for range 6 {
		pivot := x[0]
		inv := 1 / pivot
		det *= pivot
		squares += float64(pivot * pivot)
		inverses += float64(inv * inv)
		k1, k2, k3, k4, k5 := x[1]*inv, x[2]*inv, x[3]*inv, x[4]*inv, x[5]*inv
		for i := 0; i < 30; i += 6 {
			row := (*[12]float64)(x[i : i+12]) // a row and, after it, the one that moves there
			f := row[6]
			row[0] = row[7] - float64(f*k1)
			row[1] = row[8] - float64(f*k2)
			row[2] = row[9] - float64(f*k3)
			row[3] = row[10] - float64(f*k4)
			row[4] = row[11] - float64(f*k5)
			row[5] = -f * inv
		}
		x[30], x[31], x[32], x[33], x[34], x[35] = k1, k2, k3, k4, k5, inv
	}
	return det, squares * inverses
}
