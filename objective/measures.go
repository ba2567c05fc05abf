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
		gainLeast(),
		gainMost(),
		modeSeparation(),
		parasiticMotion(),
		parasiticTurn(),
		stroke(),
		legMin(),
		legMax(),
		homeHeight(),
	}
}

// MeasureNamed is the measure of that name, or nil.
func MeasureNamed(name string) *Measure {
	for _, m := range Measures() {
		if m.Name == name {
			return m
		}
	}
	return nil
}
