package study

// Twins gives for each design of a ranked front the place of the one that stands for its group of
// near-twins: the first, in the order of rank, that differs from it in no goal by more than 2 % of the
// goal's range over the front and is of the same family; itself where there is none.
func Twins(f *Front) []int {
	maximise := make([]bool, len(f.Goals))
	for i, g := range f.Goals {
		maximise[i] = g.Sense == Maximise
	}
	scaled := unit(f.goalValues(), maximise)
	out := make([]int, len(f.Designs))
	var first []int
next:
	for i := range out {
		for _, k := range first {
			if _, largest := apart(scaled[k], scaled[i]); largest < twin && f.Designs[k].Family == f.Designs[i].Family {
				out[i] = k
				continue next
			}
		}
		out[i] = i
		first = append(first, i)
	}
	return out
}
