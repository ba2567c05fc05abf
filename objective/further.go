package objective

import "legwright/kin"

// Further is a pose that a duty must hold besides those of its sampling, such as one that refuted a design.
type Further struct {
	Zone   int // to which it belongs: its cases apply
	Coords kin.Coords
}

// With is the prepared task with further required poses among its scouts, so that designs which fail at them are refused early.
// Averages over the volume leave them out.
func (t *Task) With(poses []Further) *Task {
	s := *t
	s.samples = nil
	for _, p := range poses {
		s.samples = append(s.samples, Sample{Coords: p.Coords, Pose: kin.NewPose(p.Coords), Zone: p.Zone, Row: -1})
	}
	s.samples = append(s.samples, t.samples...)
	s.scouts = t.scouts + len(poses)
	return &s
}
