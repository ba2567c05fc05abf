package main

import (
	"encoding/json"
	"fmt"
	"io"
	"strings"
	"text/tabwriter"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
)

func newFamilies(c *common) *cobra.Command {
	return &cobra.Command{
		Use:   "families [NAME]",
		Short: "the families, their dimensions, joints and frames",
		Args:  cobra.MaximumNArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			fs := kin.Families()
			if len(args) == 1 {
				f, err := family(args[0])
				if err != nil {
					return err
				}
				fs = []*kin.Family{f}
			}
			if c.json {
				return familiesJSON(c.out, fs)
			}
			for i, f := range fs {
				if i > 0 {
					fmt.Fprintln(c.out)
				}
				describe(c.out, f)
			}
			return nil
		},
	}
}

// family finds a family by name.
func family(name string) (*kin.Family, error) {
	if f := kin.FamilyNamed(name); f != nil {
		return f, nil
	}
	var names []string
	for _, f := range kin.Families() {
		if strings.EqualFold(f.Name, name) {
			return f, nil
		}
		names = append(names, f.Name)
	}
	return nil, inputError{fmt.Errorf("unknown family %q; %s (legwright families lists them)", name, brief.Suggest(name, names))}
}

// describe prints everything that a person needs to fill in a family's dimensions.
func describe(w io.Writer, f *kin.Family) {
	fmt.Fprintf(w, "%s: %s\n\n", f.Name, f.Text)
	fmt.Fprintf(w, "Freedoms: %s.\n\n%s\n\n", freedoms(f), f.Picture)
	fmt.Fprintln(w, `Frames: the base frame has its origin at the centre of the base joints' circle and z from base to
platform; the platform frame has its origin at the centre of the platform joints' circle. All angles are
counter-clockwise seen from +z, from +x. Poses are relative to home: R = Rz(yaw) Ry(pitch) Rx(roll).`)
	fmt.Fprintln(w)
	t := tabwriter.NewWriter(w, 0, 0, 2, ' ', 0)
	fmt.Fprintln(t, "dimension\tunit\tusual range\tmeaning")
	for i := range f.Dimensions {
		d := &f.Dimensions[i]
		k := study.DimensionUnit(d.Unit)
		u := units.Display(k)
		span := fmt.Sprintf("%s to %s", units.Digits(u.From(d.Low), 4), units.Digits(u.From(d.High), 4))
		if d.Optional {
			span = "default " + units.Digits(u.From(d.Default), 4)
		}
		text := d.Text
		if d.Role != kin.Shape {
			text += "; may be sized"
		}
		fmt.Fprintf(t, "%s\t%s\t%s\t%s\n", d.Name, u.Symbol, span, text)
	}
	t.Flush()
	if f.Outright != nil {
		outright := "joint centres outright (joints: {base, platform})"
		if f.Rails {
			outright = "rails and joint centres outright (rails: [{point, direction}, …], joints: {platform})"
		}
		fmt.Fprintf(w, "\nA design file may give %s in place of the dimensions that place them.\n", outright)
	}
	fmt.Fprintln(w, "\nSources:")
	for _, s := range f.Sources {
		fmt.Fprintln(w, "  "+s)
	}
}

func freedoms(f *kin.Family) string {
	var names []string
	for _, q := range f.Freedoms {
		names = append(names, q.String())
	}
	return strings.Join(names, ", ")
}

func familiesJSON(w io.Writer, fs []*kin.Family) error {
	type dimension struct {
		Name     string   `json:"name"`
		Unit     string   `json:"unit"`
		Text     string   `json:"text"`
		Low      float64  `json:"low"`
		High     float64  `json:"high"`
		Sizable  bool     `json:"sizable"`
		Optional bool     `json:"optional"`
		Default  *float64 `json:"default,omitempty"`
	}
	type entry struct {
		Name       string      `json:"name"`
		Text       string      `json:"text"`
		Picture    string      `json:"picture"`
		Freedoms   []string    `json:"freedoms"`
		Legs       int         `json:"legs"`
		Dimensions []dimension `json:"dimensions"`
		Sources    []string    `json:"sources"`
	}
	var out []entry
	for _, f := range fs {
		e := entry{Name: f.Name, Text: f.Text, Picture: f.Picture, Freedoms: strings.Split(freedoms(f), ", "), Legs: f.Legs, Sources: f.Sources}
		for i := range f.Dimensions {
			d := &f.Dimensions[i]
			n := dimension{Name: d.Name, Unit: study.DimensionUnit(d.Unit).SI(), Text: d.Text, Low: d.Low, High: d.High,
				Sizable: d.Role != kin.Shape, Optional: d.Optional}
			if d.Optional {
				n.Default = &d.Default
			}
			e.Dimensions = append(e.Dimensions, n)
		}
		out = append(out, e)
	}
	enc := json.NewEncoder(w)
	enc.SetIndent("", "  ")
	return enc.Encode(out)
}
