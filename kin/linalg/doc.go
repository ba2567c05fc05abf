// Package linalg is the small-matrix algebra of the kinematics core: inverses,
// determinant signs, singular values and condition numbers of square matrices
// of order one to six, on fixed-size arrays, without allocation.
//
// A matrix of order n is stored row-major with stride n in the first n*n places
// of a [36]float64. For inverse Jacobians the rows are the legs.
//
// Two forms stand side by side. [Singular], [SingularValues] and [Inverse] are
// the readable ones: looped, pivoted, good for any scale and any condition
// number. [Six], [Ratio2Six] and [Ratio2] are the fast ones, for the inner loop
// over poses; where their guards say that speed would cost accuracy, they call
// the readable ones.
//
// Conditioning is handed out as the squared ratio (σmin/σmax)² = 1/κ², because
// the fast methods find squared singular values and a search for the worst pose
// needs no root.
//
// Ordinary outcomes are values: a singular or non-finite matrix has sign 0 and
// ratio 0. An order outside one to six is the caller's bug and panics.
//
// Every product that is added or subtracted is wrapped in float64(), which
// forbids the compiler to fuse the two operations; results are the same to the
// last bit on every processor.
package linalg

//go:generate go run ./gen -o gram_generated.go
