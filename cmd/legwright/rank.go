package main

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
)

func newRank(c *common) *cobra.Command {
	var (
		weights []string
		top     int
	)
	cmd := &cobra.Command{
		Use:   "rank DIR",
		Short: "order a finished front again, with other weights",
		Long: `rank orders the designs of a study by their closeness to the ideal point (TOPSIS,
Hwang and Yoon 1981). The files stay as they are.`,
		Example: "  legwright rank out --weight leg_force=3 --top 20",
		Args:    cobra.ExactArgs(1),
		RunE: func(cmd *cobra.Command, args []string) error {
			if top < 0 || top == 0 && cmd.Flags().Changed("top") {
				return inputError{fmt.Errorf("--top %d: write a number from 1 on", top)}
			}
			f, err := study.Read(args[0])
			if err != nil {
				return inputError{err}
			}
			w, err := parseWeights(f, weights)
			if err != nil {
				return inputError{err}
			}
			study.Rank(f, w)
			page := report.PageOf(c.out)
			page.Dir = args[0]
			switch {
			case c.json:
				err = printJSON(c.out, f)
			case top > 0 && len(f.Designs) > 0:
				err = report.Table(c.out, f, top, page)
			default:
				err = report.FirstScreen(c.out, f, page)
			}
			if err == nil && len(f.Designs) == 0 {
				err = status(exitLimit)
			}
			return err
		},
	}
	cmd.Flags().StringArrayVar(&weights, "weight", nil, "measure=w: weight of a goal, others keep theirs (may be repeated)")
	cmd.Flags().IntVar(&top, "top", 0, "print the best N as one table")
	return cmd
}

// parseWeights puts the weights of the command line over those of the study.
func parseWeights(f *study.Front, given []string) (map[string]float64, error) {
	out := map[string]float64{}
	var names []string
	for _, g := range f.Goals {
		out[g.Measure] = 1
		if w, ok := f.Weights[g.Measure]; ok {
			out[g.Measure] = w
		}
		names = append(names, g.Measure)
	}
	for _, s := range given {
		name, text, ok := strings.Cut(s, "=")
		s = fmt.Sprintf("%.60s", study.Clean(s))
		if !ok {
			return nil, fmt.Errorf("--weight %s: write measure=number, as in --weight %.60s=2", s, study.Clean(names[0]))
		}
		if _, ok := out[name]; !ok {
			return nil, fmt.Errorf("--weight %s: %.60q is no goal of this study; its goals are %.400s", s, name, study.Clean(strings.Join(names, ", ")))
		}
		w, err := strconv.ParseFloat(text, 64)
		if err != nil {
			return nil, fmt.Errorf("--weight %s: %.60q is no weight; write a number of 0 or more", s, text)
		}
		out[name] = w
	}
	if err := study.CheckWeights(f, out); err != nil {
		return nil, err
	}
	return out, nil
}
