package main

import (
	"bytes"
	"fmt"
	"path/filepath"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
	"legwright/objective"
)

func newAppraise(c *common) *cobra.Command {
	var (
		briefFile, posesFile string
		modes, strokes       bool
	)
	cmd := &cobra.Command{
		Use:   "appraise DESIGN",
		Short: "every measure of one geometry, with the pose, leg and case that decide it",
		Long: `appraise judges the design file against its brief: every measure, every limit with
its margin, what each leg must do, and how far each coordinate goes alone. It exits
with 3 if a limit does not hold.`,
		Args: cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			s, task, plan, err := job.Design(args[0], briefFile)
			if err != nil {
				return inputError{err}
			}
			values := plan.Single()
			a := objective.Appraise(task, plan, values)
			a.Excursions = objective.Excurse(task, a)
			if modes {
				objective.ModeSeparation(task, a)
			}
			a.Notes = append(s.Notes(), a.Notes...)
			if posesFile != "" {
				if filepath.Ext(posesFile) != ".csv" {
					return inputError{fmt.Errorf("--poses %s: the file is a CSV; give a name that ends in .csv", posesFile)}
				}
				var b bytes.Buffer
				if err := study.WritePoses(&b, task, a); err != nil {
					return err
				}
				if err := study.WriteFile(posesFile, b.Bytes()); err != nil {
					return inputError{err}
				}
				c.hint("wrote %d poses to %s", a.Poses, posesFile)
			}
			d := study.FromAppraisal(task, a)
			if strokes {
				w, ok := objective.Strokes(task, plan, a.Values)
				if !ok {
					c.hint("--whole-stroke: the design has no actuator range, or home is singular; nothing was followed")
				} else {
					d.WholeStroke = study.WholeStrokeOf(w)
				}
			}
			if c.json {
				err = printJSON(c.out, d)
			} else {
				err = report.Appraisal(c.out, &d, report.PageOf(c.out))
			}
			if err != nil {
				return err
			}
			if !a.Feasible {
				return status(exitLimit)
			}
			return nil
		},
	}
	cmd.Flags().StringVar(&briefFile, "brief", "", "brief to judge by, in place of the one that the design file names")
	cmd.Flags().StringVar(&posesFile, "poses", "", "write what the design does at every pose to a CSV `file`")
	cmd.Flags().BoolVar(&modes, "modes", false, "also the distance to other assembly modes of a platform that tilts, which takes some seconds")
	cmd.Flags().BoolVar(&strokes, "whole-stroke", false, "also where the platform goes when actuators run to the ends of their strokes, outside the duty")
	return cmd
}
