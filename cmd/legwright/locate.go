package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

func newLocate(c *common) *cobra.Command {
	var (
		actuators, near string
		all             bool
	)
	cmd := &cobra.Command{
		Use:   "locate DESIGN --actuators LIST",
		Short: "platform pose from actuator values (forward kinematics)",
		Long: `locate solves the forward kinematics by Newton-Raphson from home, or from the pose
given with --near, both of the platform origin. It has converged when the largest difference of an actuator value
is below 1e-13 of the largest value. A machine has several postures for the same
actuator values; this gives the one that Newton's method reaches from where it
starts. --all gives every assembly mode: in closed form, by a polynomial, or for
six legs by following the 40 solutions of a general platform; the one that the
machine reaches from home on a straight way in its actuators, without passing a
singular posture, is marked. It exits with 3 if there is none.`,
		Example: `  legwright locate design.yaml --actuators "910 mm, 905 mm, 880 mm, 900 mm, 902 mm, 911 mm"`,
		Args:    cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			m, f, home, err := job.Machine(args[0])
			if err != nil {
				return inputError{err}
			}
			kind := units.Length
			if f.Drive == kin.Rotary {
				kind = units.Angle
			}
			if actuators == "" {
				return inputError{fmt.Errorf("legwright locate: no actuator values; give %d with --actuators", f.Legs)}
			}
			q, err := quantities("--actuators", actuators, f.Legs, func(int) units.Kind { return kind })
			if err != nil {
				return inputError{err}
			}
			if text := job.Beyond(args[0], q); text != "" {
				c.hint("note: %s", text)
			}
			if all {
				if near != "" {
					return inputError{fmt.Errorf("legwright locate: --all looks for every posture and needs no --near; leave one of them out")}
				}
				return locateAll(c, f, m, q, home)
			}
			var from kin.Coords
			if near != "" {
				v, err := quantities("--near", near, 6, func(i int) units.Kind {
					if kin.Freedom(i).Angular() {
						return units.Angle
					}
					return units.Length
				})
				if err != nil {
					return inputError{err}
				}
				copy(from[:], v)
			}
			p, ok := kin.Locate(m, q, kin.NewPose(from))
			if err := showPosture(c, f, &p, ok); err != nil {
				return err
			}
			if !ok {
				return status(exitLimit)
			}
			return nil
		},
	}
	cmd.Flags().StringVar(&actuators, "actuators", "", "actuator values with units, leg 1 first, separated by commas")
	cmd.Flags().StringVar(&near, "near", "", "pose of the platform origin to start from, about home: x, y, z, roll, pitch, yaw with units")
	cmd.Flags().BoolVar(&all, "all", false, "every assembly mode")
	return cmd
}

// quantities reads a list of n quantities.
func quantities(flag, text string, n int, kind func(i int) units.Kind) ([]float64, error) {
	parts := strings.Split(text, ",")
	if len(parts) != n {
		return nil, fmt.Errorf("%s: %d values given, %d wanted, separated by commas", flag, len(parts), n)
	}
	out := make([]float64, n)
	for i, p := range parts {
		v, _, err := units.Parse(strings.TrimSpace(p), kind(i))
		if err != nil {
			return nil, fmt.Errorf("%s: value %d: %w", flag, i+1, err)
		}
		out[i] = v
	}
	return out, nil
}

// showPosture prints the posture that Newton's method has found.
func showPosture(c *common, f *kin.Family, p *kin.Posture, ok bool) error {
	if c.json {
		modes := []mode{}
		if ok {
			modes = append(modes, modeOf(p.Origin, p.Rot, p.Residual, p.Determinant))
		}
		return printJSON(c.out, map[string]any{"modes": modes})
	}
	if !ok {
		c.hint("no posture found from there after %d steps: the actuator values may be out of reach or belong to a singular pose, or another start (--near) is needed", p.Steps)
		return nil
	}
	showFrame(c.out, p.Origin, p.Rot)
	q := p.Pose.Coords()
	var parts []string
	for _, k := range f.Freedoms {
		kind := units.Length
		if k.Angular() {
			kind = units.Angle
		}
		parts = append(parts, fmt.Sprintf("%s %s", k, units.Format(tidy(q[k]), kind, 9)))
	}
	fmt.Fprintf(c.out, "platform origin about home         %s\n", strings.Join(parts, "  "))
	fmt.Fprintf(c.out, "residual %.2g, determinant of the inverse Jacobian %.6g, %d steps\n", p.Residual, p.Determinant, p.Steps)
	return nil
}

// showFrame prints the platform frame in the base frame.
func showFrame(w io.Writer, origin kin.Vec, r kin.Rot) {
	origin = kin.Vec{X: tidy(origin.X), Y: tidy(origin.Y), Z: tidy(origin.Z)}
	for i := range r {
		r[i] = tidy(r[i])
	}
	fmt.Fprintf(w, "platform origin in the base frame  x %s  y %s  z %s\n",
		units.Format(origin.X, units.Length, 9), units.Format(origin.Y, units.Length, 9), units.Format(origin.Z, units.Length, 9))
	fmt.Fprintln(w, "platform rotation in the base frame")
	for i := range 3 {
		fmt.Fprintf(w, "  %12.9f %12.9f %12.9f\n", r[3*i], r[3*i+1], r[3*i+2])
	}
}

// tidy makes what is zero but for rounding zero, so that no 1e-17 is printed.
func tidy(x float64) float64 {
	if math.Abs(x) < 1e-12 {
		return 0
	}
	return x
}
