package opt

// sizes chooses the population at the start and at the end of a search.
func sizes(p *Problem, s Settings) (start, grown int) {
	start = s.Population
	if start == 0 {
		start = 30
	}
	start = min(start, s.Evaluations/len(p.Spaces))
	return start, start
}
