package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// Part is one of the independent searches into which a study may be cut. The zero value is the whole.
type Part struct{ Number, Of int } // from 1

// Whole reports that nothing is cut.
func (p Part) Whole() bool { return p.Of == 0 }

// ParsePart reads 3/16; "" is the whole.
func ParsePart(text string) (Part, error) {
	if text == "" {
		return Part{}, nil
	}
	var p Part
	var rest string
	n, _ := fmt.Sscanf(text, "%d/%d%s", &p.Number, &p.Of, &rest)
	if n != 2 || fmt.Sprintf("%d/%d", p.Number, p.Of) != text || p.Of < 1 || p.Of > study.MostParts || p.Number < 1 || p.Number > p.Of {
		return Part{}, fmt.Errorf("--part %.60s: write the number of the part and of how many, such as 3/16, with at most %d parts", study.Clean(text), study.MostParts)
	}
	return p, nil
}

// String is the part as --part takes it.
func (p Part) String() string {
	if p.Whole() {
		return ""
	}
	return fmt.Sprintf("%d/%d", p.Number, p.Of)
}

// stream is the seed of a part's random numbers: that of the study for the whole, else one that depends
// on the study's, the part and the number of parts. The mixing is that of SplitMix64 (Steele, Lea, Flood
// 2014), whose outputs differ for different inputs.
func (p Part) stream(seed int64) uint64 {
	if p.Whole() {
		return uint64(seed)
	}
	return mix(mix(mix(uint64(seed))^uint64(p.Of)) ^ uint64(p.Number))
}

func mix(z uint64) uint64 {
	z += 0x9e3779b97f4a7c15
	z = (z ^ z>>30) * 0xbf58476d1ce4e5b9
	z = (z ^ z>>27) * 0x94d049bb133111eb
	return z ^ z>>31
}

// Share is a part's share of the evaluations of the whole: equal but for a rest that the first parts get.
func (p Part) Share(evaluations int) int {
	if p.Whole() {
		return evaluations
	}
	share := evaluations / p.Of
	if p.Number <= evaluations%p.Of {
		share++
	}
	return share
}

// name is the part as files record it.
func (p Part) name(seed int64) study.PartName {
	return study.PartName{Number: p.Number, Of: p.Of, Stream: fmt.Sprintf("%016x", p.stream(seed))}
}

// part is what merging needs of a finished part, but for the hash of its brief.
func (s *Study) part(out *opt.Outcome, r *Run, f *study.Front) *study.Part {
	p := &study.Part{
		Format: study.PartFormat, Program: Program(), Seed: r.Seed, Whole: r.Evaluations,
		PartName: r.Part.name(r.Seed), StoppedBy: f.StoppedBy, Budget: f.Budget, Outcome: study.NewPartOutcome(out),
	}
	for _, plan := range s.Plans {
		p.Dimensions = append(p.Dimensions, len(space(plan).Vars))
	}
	return p
}
