// Package assembly finds every assembly mode of a machine: all real solutions of
// the forward kinematics, and how many complex ones there are besides.
//
//	SixLegs      six rods of a body in space        40 solutions   continuation
//	ThreeRPS     three hinged legs, 6-3 platforms   16             continuation
//	ThreePlanar  three rods of a body in a plane     6             polynomial
//	Delta        three rods to a point in space      2             closed form
//	FiveBar      two rods to a point in a plane      2             closed form
//
// They take rods' ends and lengths as plain numbers. Modes picks the solver for a machine of
// package kin. Follow drives a machine along a straight line of actuator coordinates up to
// a singular posture, Reached tells in which mode it arrives from home, and Separation how
// far the modes are apart.
//
// Continuation follows the known solutions of a generic system with complex parameters
// while it is deformed into the one to be solved; with probability one the
// paths meet no singularity on the way (A. Morgan and A. Sommese 1989, Applied Mathematics and Computation
// 29:123; A. Sommese and C. Wampler 2005, The Numerical Solution of Systems of
// Polynomials). A tracker predicts by the Runge-Kutta method and corrects by Newton's (tracker.go); ends that
// are multiple or at infinity are found by Cauchy's integral (endgame.go). Every path is accounted
// for in a Result: as a simple solution, at infinity, singular or lost.
//
// Results are the same whatever the number of processors; a seed chooses among starts.
package assembly
