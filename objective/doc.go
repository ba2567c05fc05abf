// Package objective turns one geometry and a duty into numbers: it samples the
// zones of required poses, walks them with a machine, and gives every measure its
// duty-wide value with the pose, leg, zone and case that decide it.
//
// A Task is everything about a study but the geometry and is constant once
// prepared. A Screen is scratch for judging many designs quickly (one per
// goroutine); Appraise is the complete judgement of one design. Both walk the
// poses through the same View and the same measures.
//
// Efforts and rates are exact over the sets of loads and speeds: for a box set
// the bound is the sum of absolute coefficients, for a set of given magnitude in
// any direction it is the Euclidean norm (support functions of the two sets).
package objective
