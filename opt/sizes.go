package opt

// sizes chooses the population per space at the start and at the end of a
// search. A run starts small, which gets to the front soonest, and ends with
// as many designs as the evaluations per variable can move: a front of one
// dimension more takes more of them. The constants were found on the known
// problems and on the sizing of a six-legged machine.
func sizes(p *Problem, s *Settings) (start, grown int) {
	const (
		usual = 30
		cost  = 33 // evaluations per variable, design and dimension of the front
		most4 = 60 // volumes of four goals are dear
	)
	budget := s.Evaluations / len(p.Spaces)
	vars := 1
	for i := range p.Spaces {
		vars = max(vars, len(newDomain(&p.Spaces[i]).free))
	}
	start = s.Population
	if start == 0 {
		start = min(usual, max(leastPerSpace, budget/10))
	}
	start = min(start, budget)
	grown = min(s.Front, budget/vars*max(1, p.Goals-1)/cost)
	if p.Goals == maxShareGoals {
		grown = min(grown, most4)
	}
	return start, max(start, grown)
}
