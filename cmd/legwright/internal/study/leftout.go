package study

import "fmt"

// LeftOut says what the figures of a study or an appraisal do not count. Every screen and page that
// shows figures says it.
func LeftOut(poses int) []string {
	return []string{
		fmt.Sprintf("every figure is the worst over %d sampled poses of the duty and, in boxes, ellipsoids and single excursions, the worst that a search between them finds: not a proof", poses),
		"legs, arms and rods are massless in the efforts; payload, cables and motors are not in the clearances",
		"efforts are quasi-static: without friction, play, vibration and terms in ω²",
	}
}

// Caution is what a reader of figures must not take them for.
const Caution = "This is a study of geometry, not an assessment of safety; see README."

// FullCaution is the caution where results are shown in full.
const FullCaution = "A study of geometry, not an assessment of safety. Legs crush and shear; a platform may fall, run away or reach a singular pose when power, brake, sensor or control fails. Before building: machinery risk assessment, functional safety of the control system, emergency stop, guarding and minimum gaps, electrical, hydraulic and lifting rules where they apply, the rules for rides, simulators or passenger devices where people are aboard, industrial-robot safety, local codes, and sign-off by a competent licensed engineer."
