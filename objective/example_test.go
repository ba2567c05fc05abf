package objective_test

import (
	"fmt"
	"math"

	"legwright/kin"
	"legwright/objective"
)

// A six-legged table that tilts 100 kg by ±10° about two axes, its actuators
// sized by the duty.
func ExampleAppraise() {
	const deg = math.Pi / 180
	task := &objective.Task{
		Zones: []objective.Zone{{
			Name: "tilt", Kind: objective.Box, Samples: 200,
			Low:  kin.Coords{kin.Roll: -10 * deg, kin.Pitch: -10 * deg},
			High: kin.Coords{kin.Roll: 10 * deg, kin.Pitch: 10 * deg},
		}},
		Cases: []objective.Case{{
			Name:  "test",
			Loads: []objective.Load{{Name: "cell", Mass: 100, Centre: kin.Vec{Z: 0.2}}},
		}},
		Gravity:  kin.Vec{Z: -objective.Gravity},
		Actuator: objective.Actuator{Reserve: 0.01, DeadLength: math.NaN()},
		Legs:     objective.Legs{Diameter: 0.05},
		Rule:     objective.LengthOfPlatform,
		Singular: 1e-6,
		Coverage: 1,
	}
	task.Prepare()

	family := kin.FamilyNamed("6-UPS")
	fixed := func(v float64) objective.Spec { return objective.Spec{Kind: objective.Fixed, Values: []float64{v}} }
	sized := objective.Spec{Kind: objective.Sized}
	plan := objective.NewPlan(task, family, []objective.Spec{
		fixed(0.6), fixed(0.4), fixed(10 * deg), fixed(12 * deg), fixed(0.7), sized, sized})

	a := objective.Appraise(task, plan, plan.Single())
	for _, name := range []string{"conditioning", "leg_force", "leg_min", "stroke"} {
		fmt.Printf("%s %.4g\n", name, a.Reading(name).Value)
	}
	c := a.Reading("leg_force").Pose.Coords
	fmt.Printf("worst leg force where roll and pitch are %.0f° and %.0f° to either side\n", math.Abs(c[kin.Roll])/deg, math.Abs(c[kin.Pitch])/deg)
	// Output:
	// conditioning 0.3405
	// leg_force 251.2
	// leg_min 0.7053
	// stroke 0.1903
	// worst leg force where roll and pitch are 10° and 10° to either side
}
