package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

// ends notes the dimensions that most designs have at an end of their range: a wider
// range may hold better ones.
func (s *Study) ends(ds []study.Design) []string {
	var notes []string
	for _, p := range s.Plans {
		n := 0
		for i := range ds {
			if ds[i].Family == p.Family.Name {
				n++
			}
		}
		if n < 5 {
			continue
		}
		for _, k := range p.Free() {
			sp, name := &p.Specs[k], p.Family.Dimensions[k].Name
			if sp.Kind == objective.Choices {
				continue
			}
			low, high := bounds(sp)
			atLow, atHigh := 0, 0
			for i := range ds {
				if ds[i].Family != p.Family.Name {
					continue
				}
				switch v := float64(ds[i].Dimensions[name]); {
				case v <= low+0.002*(high-low):
					atLow++
				case v >= high-0.002*(high-low):
					atHigh++
				}
			}
			const most = 0.4
			for _, end := range []struct {
				name  string
				count int
			}{{"lower", atLow}, {"upper", atHigh}} {
				if float64(end.count) >= most*float64(n) {
					notes = append(notes, fmt.Sprintf("%s %s lies at the %s end of its range in %d of %d designs; a wider range may hold better ones", p.Family.Name, name, end.name, end.count, n))
				}
			}
		}
	}
	return notes
}

// lengthNote says which characteristic length the angular columns are divided by.
func (s *Study) lengthNote() string {
	t := s.Tasks[0]
	switch t.Rule {
	case objective.LengthOfPlatform:
		return "conditioning and distances of poses use each design's platform radius as characteristic length"
	case objective.LengthFromDuty:
		return fmt.Sprintf("conditioning and distances of poses use a characteristic length of %.4g mm, from the duty", 1000*t.Length)
	}
	return fmt.Sprintf("conditioning and distances of poses use the characteristic length of %.4g mm that the brief gives", 1000*t.Length)
}
