package linalg_test

import (
	"fmt"
	"math"

	"legwright/kin/linalg"
)

func ExampleSix() {
	// Rows are legs: here each drives one direction, two of them through a
	// lever, and the last two are exchanged.
	j := [36]float64{0: 1, 7: 1, 14: 0.5, 21: 2, 29: 1, 34: 1}
	var s linalg.Six
	fmt.Println("sign of det J:", s.Factor(&j))
	fmt.Println("third direction from third leg:", s.X[14])
	fmt.Printf("1/κ = %.3f\n", math.Sqrt(s.Ratio2(&j, 2)))
	// Output:
	// sign of det J: -1
	// third direction from third leg: 2
	// 1/κ = 0.250
}

func ExampleRatio2() {
	a := [36]float64{3, 0, 0, 4} // [3 0; 0 4]
	fmt.Println(linalg.Ratio2(2, &a))
	// Output: 0.5625
}
