package study

import (
	"strings"

	"legwright/objective"
)

// MarkCrosses is the mark of a design whose platform meets a singularity within its strokes, outside the duty or in it.
const MarkCrosses = "singular within strokes"

// WholeStroke is where the platform can go within the strokes, whatever the duty is.
type WholeStroke struct {
	Shortest     Number `json:"shortest"` // the actuators' range: m, or rad of a crank
	Longest      Number `json:"longest"`
	Combinations int    `json:"combinations"` // of shortest and longest actuators that were followed from home
	Singular     int    `json:"singular"`     // combinations that meet a singularity on the way
	Alone        int    `json:"alone"`        // single actuators run to either end, all others at home
	AloneCross   int    `json:"alone_singular"`

	First  *Travel  `json:"first_singular,omitempty"` // the combination that meets a singularity soonest
	Parked Travel   `json:"parked"`                   // all actuators at their shortest
	Single []Travel `json:"single_singular,omitempty"`

	Tilt          *Peak `json:"tilt,omitempty"`           // rad, of the platform's normal from home's
	BaseSwing     *Peak `json:"base_swing,omitempty"`     // rad
	PlatformSwing *Peak `json:"platform_swing,omitempty"` // rad
	Clearance     *Peak `json:"leg_clearance,omitempty"`  // m
}

// Travel is a way from home to given ends of the strokes.
type Travel struct {
	Ends  string `json:"ends"`            // of each actuator: + longest, - shortest, 0 held at home
	Share Number `json:"share"`           // of the way that was gone, 1 to the end
	Stops string `json:"stops,omitempty"` // what ended it sooner: singular, reach, or a passive part
	Pose  *Pose  `json:"pose"`            // where it ended
}

// Peak is the worst value on all ways, and the way on which it is met.
type Peak struct {
	Value Number `json:"value"`
	Ends  string `json:"ends"`
}

// WholeStrokeOf is the record of what objective.Strokes found.
func WholeStrokeOf(w *objective.WholeStroke) *WholeStroke {
	both, alone := w.Crossing()
	out := &WholeStroke{
		Shortest: Number(w.Low), Longest: Number(w.High),
		Combinations: w.Both, Singular: both, Alone: len(w.Runs) - w.Both, AloneCross: alone,
		Parked: travelOf(&w.Runs[0]),
	}
	if k := w.Nearest(); k >= 0 {
		first := travelOf(&w.Runs[k])
		out.First = &first
	}
	for i := w.Both; i < len(w.Runs); i++ {
		if w.Runs[i].Singular() {
			out.Single = append(out.Single, travelOf(&w.Runs[i]))
		}
	}
	peak := func(of func(r *objective.Run) float64, least bool) *Peak {
		at := 0
		for i := range w.Runs {
			if v, best := of(&w.Runs[i]), of(&w.Runs[at]); v != best && (v < best) == least {
				at = i
			}
		}
		v := of(&w.Runs[at])
		if unbounded(v) {
			return nil
		}
		return &Peak{Number(v), endsOf(&w.Runs[at])}
	}
	if w.Tilts {
		out.Tilt = peak(func(r *objective.Run) float64 { return r.Tilt }, false)
	}
	if w.Legs {
		out.BaseSwing = peak(func(r *objective.Run) float64 { return r.BaseSwing }, false)
		out.PlatformSwing = peak(func(r *objective.Run) float64 { return r.PlatformSwing }, false)
		out.Clearance = peak(func(r *objective.Run) float64 { return r.Clearance }, true)
	}
	return out
}

func travelOf(r *objective.Run) Travel {
	return Travel{Ends: endsOf(r), Share: Number(r.Share), Stops: r.Stops, Pose: poseOf(&r.Last)}
}

// endsOf writes a combination like "+ - + - - +".
func endsOf(r *objective.Run) string {
	words := make([]string, len(r.Ends))
	for i, e := range r.Ends {
		words[i] = [3]string{"-", "0", "+"}[e+1]
	}
	return strings.Join(words, " ")
}
