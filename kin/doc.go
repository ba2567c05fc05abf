// Package kin holds the kinematics of closed-chain machines: frames and
// poses, leg kinds, robot families, inverse and forward kinematics, inverse
// Jacobians and leg clearances. It knows nothing of duties, briefs or searches.
//
// Units are SI and radians. Vectors are in the base frame unless a comment says
// "platform axes". The base frame has its origin at the centre of the base
// joints' circle, z from base to platform; the platform frame has its origin at
// the centre of the platform joints' circle. A twist is (v, ω) of the tool point
// and a wrench (f, m) about it, both in base axes, linear part first.
//
// A Machine is constant after it is built and may be shared between goroutines.
// A State is scratch and belongs to one goroutine.
package kin
