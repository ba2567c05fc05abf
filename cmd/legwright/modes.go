package main

import (
	"fmt"

	"legwright/kin"
	"legwright/kin/assembly"
)

// mode is one posture as JSON gives it: the platform frame in the base frame.
type mode struct {
	Position    [3]float64    `json:"position"`
	Rotation    [3][3]float64 `json:"rotation"`
	Residual    float64       `json:"residual"`
	Determinant float64       `json:"determinant"`
	FromHome    bool          `json:"from_home,omitempty"` // reached from home without passing a singular posture
}

func modeOf(p kin.Vec, r kin.Rot, residual, determinant float64) mode {
	return mode{
		Position: [3]float64{p.X, p.Y, p.Z},
		Rotation: [3][3]float64{{r[0], r[1], r[2]}, {r[3], r[4], r[5]}, {r[6], r[7], r[8]}},
		Residual: residual, Determinant: determinant,
	}
}

// modeSeed starts the continuation. Any seed finds the same modes.
const modeSeed = 1

// locateAll prints every assembly mode for the actuator values q. home tells whether the design says where home is.
func locateAll(c *common, f *kin.Family, m kin.Machine, q []float64, home bool) error {
	found, ok := assembly.Modes(m.Frame(), kin.Ends(m, q), q, modeSeed)
	if !ok { // no closed loops of rods: one posture
		p, ok := kin.Locate(m, q, kin.NewPose(kin.Coords{}))
		if err := showPosture(c, f, &p, ok); err != nil {
			return err
		}
		if !ok {
			return status(exitLimit)
		}
		return nil
	}
	reached := -1
	if home {
		reached = assembly.Reached(m, found.Modes, q)
	}
	modes := []mode{}
	for i, k := range found.Modes {
		n := modeOf(k.Origin, k.Rot, k.Residual, determinant(m, &k, q))
		n.FromHome = i == reached
		modes = append(modes, n)
	}
	if found.Lost > 0 {
		c.hint("%d of the %d solutions of a general machine of this kind could not be followed to their ends: modes may be missing", found.Lost, found.Paths)
	}
	if c.json {
		if err := printJSON(c.out, map[string]any{"modes": modes, "lost": found.Lost}); err != nil {
			return err
		}
	} else {
		fmt.Fprintf(c.out, "%d assembly modes (a general machine of this kind has up to %d)\n", len(modes), found.Paths)
		for i, k := range found.Modes {
			mark := ""
			if i == reached {
				mark = ", reached from home"
			}
			fmt.Fprintf(c.out, "\nmode %d%s\n", i+1, mark)
			showFrame(c.out, k.Origin, k.Rot)
			fmt.Fprintf(c.out, "residual %.2g, determinant of the inverse Jacobian %.6g\n", k.Residual, modes[i].Determinant)
		}
		if home && reached < 0 && len(modes) > 0 {
			fmt.Fprintln(c.out, "\nNone of them is reached from home on a straight way in the actuators without passing a singular posture.")
		}
	}
	if len(modes) == 0 {
		return status(exitLimit)
	}
	return nil
}

// determinant is that of the inverse Jacobian in the mode, or of the legs' unit wrenches where
// the machine holds the mode only in another working mode.
func determinant(m kin.Machine, k *assembly.Mode, q []float64) float64 {
	if !assembly.Holds(m, k, q) {
		return k.Determinant
	}
	var s kin.State
	p := k.Pose(m.Frame())
	if m.Move(&p, &s); s.Fail != kin.Reached {
		return k.Determinant
	}
	return kin.Determinant(m, &s)
}
