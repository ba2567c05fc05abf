// Package proof shows, for every pose of a duty's continuous zones and not for samples of them, that a design keeps its
// limits: every pose has a posture in the working mode, actuators and joints stay within their ranges, no pose is
// singular, and legs keep their distance; efforts, buckling, rates, power, conditioning and parasitic motions stay within what a
// brief asks for.
//
// [Prove] looks for a counterexample first. Then it splits the zones into boxes, and tests each box on the
// machine's first-order enclosure over it (see package enclose): what is convex in that is decided at the
// vertices of the box, the rest enters as a remainder of second order. Rounding is part of every bound.
//
// Boxes are split until the limits are shown, no further, so that bounds come out as weak as the limits allow. Where the proof
// of a property took few boxes some more are spent on its bound, which is then nearer to the true extreme.
//
// What is proved holds for the model: rigid links, exact dimensions and joints, the payload as the brief states it.
// A proof knows nothing of elasticity, tolerances, the payload's shape, faults of the control, or poses outside the duty.
package proof
