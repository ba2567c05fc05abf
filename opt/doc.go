// Package opt searches mixed design spaces for the designs that no other beats
// in every goal (the Pareto front), under limits, with an exact budget of
// evaluations. It knows numbers only: what a variable or a goal means is the
// caller's business.
//
// The search is genetic, driven by eaopt: one population per Space, variation
// by simulated binary crossover, differential evolution, coordinate resets and,
// with few variables, steps that local linear models of goals and limits expect
// most of, whose shares follow their success, survival by constrained domination and
// exclusive hypervolume. The budget moves towards the spaces that still improve
// the common front. Now and then gonum's Nelder-Mead polishes extremes,
// knee and gaps of the front. Every feasible design that is not dominated is
// kept in an Archive; the reported front is the subset of it that covers most
// hypervolume.
//
// All goals are minimised. A run is a function of Problem and Settings: the
// number of workers changes its duration, never a bit of its Outcome.
package opt
