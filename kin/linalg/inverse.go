package linalg

import "math"

// singularPivot is the size of a pivot, relative to the largest element of the
// matrix, below which rounding errors alone decide its sign: a matrix with such
// a pivot has sign 0.
const singularPivot = 8 * 0x1p-52

// Inverse writes the inverse of the matrix a of order n into x and returns the
// sign of its determinant. It returns 0 if a is singular to rounding or not
// finite; x is then not to be used. a and x may be the same array.
//
// Method: Gauss-Jordan elimination in place with partial pivoting (common
// practice; Higham 2002, Accuracy and Stability of Numerical Algorithms,
// section 14.4, for its errors). Cost: 2n³ operations, about 0.25 µs at order
// six.
func Inverse(n int, a, x *[36]float64) (sign int) {
	top := largest(n, a)
	if !(top > 0) || math.IsInf(top, 1) {
		return 0
	}
	*x = *a
	var perm [6]int
	sign = 1
	for k := range n {
		p := pivotRow(n, x, k)
		perm[k] = p
		if p != k {
			sign = -sign
			swapRows(n, x, k, p)
		}
		pivot := x[n*k+k]
		if !(math.Abs(pivot) > singularPivot*top) {
			return 0
		}
		if pivot < 0 {
			sign = -sign
		}
		eliminate(n, x, k, 1/pivot)
	}
	for k := n - 1; k >= 0; k-- { // row swaps of a are column swaps of its inverse
		if p := perm[k]; p != k {
			swapColumns(n, x, k, p)
		}
	}
	return sign
}

// pivotRow returns the row, from k on, with the largest magnitude in column k.
func pivotRow(n int, x *[36]float64, k int) int {
	row, best := k, math.Abs(x[n*k+k])
	for i := k + 1; i < n; i++ {
		if v := math.Abs(x[n*i+k]); v > best {
			row, best = i, v
		}
	}
	return row
}

func swapRows(n int, x *[36]float64, p, q int) {
	for j := range n {
		x[n*p+j], x[n*q+j] = x[n*q+j], x[n*p+j]
	}
}

func swapColumns(n int, x *[36]float64, p, q int) {
	for i := range n {
		x[n*i+p], x[n*i+q] = x[n*i+q], x[n*i+p]
	}
}

// eliminate clears column k of x in every row but k, and puts the column that
// the inverse has instead in its place. inv is the reciprocal of the pivot.
func eliminate(n int, x *[36]float64, k int, inv float64) {
	pivot := x[n*k : n*k+n : n*k+n]
	pivot[k] = 1
	for j := range pivot {
		pivot[j] *= inv
	}
	for i := range n {
		if i == k {
			continue
		}
		row := x[n*i : n*i+n : n*i+n]
		f := row[k]
		row[k] = 0
		for j, v := range pivot {
			row[j] -= float64(f * v)
		}
	}
}
