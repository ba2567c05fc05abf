package objective

// Measures are all measures, in the order in which they are listed.
func Measures() []*Measure {
	return []*Measure{
		coverage(),
		conditioning(),
		meanConditioning(),
		regularity(),
		legForce(),
		motorTorque(),
		pushForce(),
		pullForce(),
		legSpeed(),
		motorSpeed(),
		legPower(),
		stiffness(),
		turnStiffness(),
		deflection(),
		positionError(),
		angleError(),
		baseSwing(),
		platformSwing(),
		legClearance(),
		jointSpacing(),
		bucklingMargin(),
		footprint(),
		stroke(),
		legMin(),
		legMax(),
		homeHeight(),
	}
}
