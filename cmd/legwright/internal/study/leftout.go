package study

import "fmt"

// LeftOut says what the figures of a study or an appraisal do not count. Every screen and page that
// shows figures says it.
func LeftOut(poses int) []string {
	return []string{
		fmt.Sprintf("every figure is the worst over %d sampled poses of the duty, not a proof for the poses between them", poses),
		"legs, arms and rods are massless in the efforts; payload, cables and motors are not in the clearances",
		"efforts are quasi-static: without friction, play, vibration and terms in ω²",
	}
}

// Caution is what a reader of figures must not take them for.
const Caution = "This is a study of geometry, not an assessment of safety; see README."
