package main

import (
	_ "embed"
	"fmt"
	"math"
	"slices"
	"strings"
	"text/template"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

//go:embed starter.tmpl
var starterText string

func newStarter(c *common) *cobra.Command {
	return &cobra.Command{
		Use:     "starter FAMILY",
		Short:   "print a commented brief to start from",
		Example: "  legwright starter 6-UPS > brief.yaml && legwright search brief.yaml -o out",
		Args:    cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			f, err := family(args[0])
			if err != nil {
				return err
			}
			text, err := starter(f)
			if err != nil {
				return err
			}
			if c.json {
				return printJSON(c.out, map[string]string{"family": f.Name, "brief": text})
			}
			_, err = fmt.Fprint(c.out, text)
			return err
		},
	}
}

// starter is the commented brief of a family, from the starter duty of its registry entry.
func starter(f *kin.Family) (string, error) {
	quantity := func(v float64, k units.Kind) string { return units.Format(v, k, 4) }
	t, err := template.New("starter").Funcs(template.FuncMap{
		"length": func(v float64) string { return quantity(v, units.Length) },
		"angle":  func(v float64) string { return quantity(v, units.Angle) },
		"box":    func(b kin.Coords) string { return starterBox(f, b) },
		"centre": func(v kin.Vec) string {
			return fmt.Sprintf("[%s, %s, %s]", quantity(v.X, units.Length), quantity(v.Y, units.Length), quantity(v.Z, units.Length))
		},
		"span":     func(d kin.Dimension) string { return starterRange(&d) },
		"pad":      func(d kin.Dimension) string { return strings.Repeat(" ", max(0, 20-len(d.Name))) },
		"comment":  func(text string) string { return "# " + strings.ReplaceAll(text, "\n", "\n# ") },
		"optional": func(d kin.Dimension) bool { return d.Optional },
		"turns":    func() bool { return slices.ContainsFunc(f.Freedoms, kin.Freedom.Angular) },
		"legs":     func() bool { return objective.MeasureNamed("leg_clearance").Has(f) },
		"linear":   func() bool { return f.Drive == kin.Linear },
		"inertia":  func(m float64) string { return units.Format(m*0.06, units.Inertia, 2) },
	}).Parse(starterText)
	if err != nil {
		return "", err
	}
	var b strings.Builder
	err = t.Execute(&b, f)
	return b.String(), err
}

func starterBox(f *kin.Family, b kin.Coords) string {
	var parts []string
	for _, q := range f.Freedoms {
		k := units.Length
		if q.Angular() {
			k = units.Angle
		}
		parts = append(parts, fmt.Sprintf("%s: %s", q, units.Format(b[q], k, 4)))
	}
	return "{" + strings.Join(parts, ", ") + "}"
}

func starterRange(d *kin.Dimension) string {
	if d.Role != kin.Shape {
		return "sized"
	}
	k := study.DimensionUnit(d.Unit)
	if math.Abs(d.High-d.Low) == 0 {
		return units.Format(d.Low, k, 4)
	}
	return fmt.Sprintf("[%s, %s]", units.Format(d.Low, k, 4), units.Format(d.High, k, 4))
}
