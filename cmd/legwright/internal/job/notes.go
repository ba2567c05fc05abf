package job

import (
	"fmt"

	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
)

// Version is the program's version.
const Version = "0.1.0"

// Program is the program's name and version as files record it.
func Program() string { return "legwright " + Version }

// Notes says what holds for the whole study: what its figures leave out, and its Hints.
func (s *Study) Notes() []string {
	return append(append(study.LeftOut(len(s.Tasks[0].Samples())), s.lengthNote()), s.Hints()...)
}

// Hints says what the brief might say better.
func (s *Study) Hints() []string {
	var notes []string
	for _, p := range s.Plans {
		if p.Derive {
			least, span := p.Family.Range()
			a, b := p.Family.Dimensions[least].Name, p.Family.Dimensions[span].Name
			notes = append(notes, fmt.Sprintf("no goal or limit of the brief depends on where %s and %s lie in their ranges, so each %s gets the shortest that the duty needs within them; write `sized` to drop the ranges", a, b, p.Family.Name))
		}
	}
	for _, p := range s.Plans {
		if p.Family.Drive == kin.Rotary {
			notes = append(notes, fmt.Sprintf("%s: torques are for the payload only; arms, cranks and rods are massless here, so motors need more", p.Family.Name))
		}
	}
	if s.foreign {
		notes = append(notes, "the brief is for another family; its duty, actuators, joints and limits are used as far as this one has them")
	}
	if zones := idle(s.Tasks[0]); zones != "" {
		notes = append(notes, fmt.Sprintf("no case occurs in zone %s: forces and speeds are not looked at there", zones))
	}
	for _, z := range s.Tasks[0].Zones {
		if z.Kind == objective.Axes {
			notes = append(notes, fmt.Sprintf("zone %q asks for each excursion alone; such excursions are not reachable together", z.Name))
		}
	}
	return notes
}
