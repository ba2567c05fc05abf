package opt_test

import (
	"context"
	"fmt"
	"math"

	"legwright/opt"
)

// A strut: thin is light, thick is stiff, the material is one of two, and
// nothing above 3 kg is wanted.
func ExampleSearch() {
	density := []float64{2700, 7850}
	modulus := []float64{70e9, 210e9}
	problem := opt.Problem{
		Spaces: []opt.Space{{Name: "strut", Vars: []opt.Var{
			{Name: "diameter", Low: 0.01, High: 0.08},
			{Name: "material", Kind: opt.Choice, Levels: 2},
		}}},
		Goals:  2,
		Limits: 1,
		Evaluate: func(_, _ int, x []float64, r *opt.Result) {
			m := int(x[1])
			area := math.Pi * x[0] * x[0] / 4
			mass := density[m] * area * 0.5
			r.Goals[0] = mass
			r.Goals[1] = 0.5 / (modulus[m] * area) // compliance
			r.Excess[0] = mass/3 - 1
			r.Violation = max(0, r.Excess[0])
		},
	}
	out, err := opt.Search(context.Background(), problem, opt.Settings{Evaluations: 2000, Seed: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(out.Status)
	heaviest := out.Front[len(out.Front)-1]
	fmt.Printf("stiffest: %.2f kg\n", heaviest.Goals[0])
	// Output:
	// budget spent
	// stiffest: 3.00 kg
}

func ExampleTOPSIS() {
	// Price to be low, range to be high, range twice as important.
	score := opt.TOPSIS([][]float64{{100, 40}, {130, 60}, {200, 65}}, []bool{false, true}, []float64{1, 2})
	fmt.Printf("%.2f\n", score)
	// Output:
	// [0.43 0.76 0.57]
}
