// Package study reads and writes a study folder: the front, its designs and the
// record of the run. All numbers in files with the ending .json are SI and radians.
package study

import (
	"encoding/json"
	"math"
)

// Format names the layout of front.json.
const Format = "legwright-front/1"

// Number is a float64 that is null in JSON where it has no bound.
type Number float64

// MarshalJSON writes null for infinite values and NaN.
func (n Number) MarshalJSON() ([]byte, error) {
	if f := float64(n); math.IsInf(f, 0) || math.IsNaN(f) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// UnmarshalJSON reads null as +Inf.
func (n *Number) UnmarshalJSON(b []byte) error {
	if string(b) == "null" {
		*n = Number(math.Inf(1))
		return nil
	}
	return json.Unmarshal(b, (*float64)(n))
}

// Front is what front.json holds.
type Front struct {
	Format         string             `json:"format"`
	Program        string             `json:"program"`
	Title          string             `json:"title"`
	Seed           int64              `json:"seed"`
	Status         string             `json:"status"`
	StoppedBy      string             `json:"stopped_by,omitempty"` // evaluations, time, stall, interrupt or exhausted
	Evaluations    int                `json:"evaluations"`
	Budget         int                `json:"budget,omitempty"` // evaluations allowed; 0 if not recorded
	Feasible       int                `json:"feasible"`         // feasible designs among the evaluated
	Population     int                `json:"population"`       // that the search started with
	Poses          int                `json:"poses"`            // sampled poses of the duty
	Goals          []Goal             `json:"goals"`
	Weights        map[string]float64 `json:"weights"` // of the goals, for the ranking
	ReferencePoint []Number           `json:"reference_point"`
	Hypervolume    Number             `json:"hypervolume"`
	Designs        []Design           `json:"designs"`            // best rank first
	Families       []FamilyLine       `json:"families,omitempty"` // a line for each, where a brief names several
	Help           *Help              `json:"infeasible,omitempty"`
	Part           *PartName          `json:"part,omitempty"`     // where the study is a part of another
	Parts          *Parts             `json:"parts,omitempty"`    // what a merged front is made of
	Failures       int                `json:"failures,omitempty"` // designs that could not be judged, of the evaluated
	Failed         []Failed           `json:"failed,omitempty"`   // the first of them
	Notes          []string           `json:"notes"`              // what holds for the whole study

	Counterexamples []Counterexample `json:"counterexamples,omitempty"` // poses that refuted designs on the way, and are required since
}

// Failed is a design that could not be judged. Sized dimensions are unknown.
type Failed struct {
	Family     string            `json:"family"`
	Dimensions map[string]Number `json:"dimensions"`
	Why        string            `json:"why"`
}

// Goal is one goal of the study.
type Goal struct {
	Measure string `json:"measure"`
	Sense   string `json:"sense"` // maximise or minimise
	Unit    string `json:"unit"`
}

// Design is one design of the front, or one that was appraised alone.
type Design struct {
	ID          string            `json:"id"` // 001, 002, …
	Rank        int               `json:"rank"`
	Score       Number            `json:"score"` // TOPSIS closeness, 0 to 1
	Family      string            `json:"family"`
	Feasible    bool              `json:"feasible"`
	Dimensions  map[string]Number `json:"dimensions"`
	Measures    map[string]Number `json:"measures"`
	Unbounded   map[string]bool   `json:"unbounded,omitempty"` // measures that are null
	Worst       map[string]Worst  `json:"worst"`
	Joints      Joints            `json:"joints"`
	Limits      []Limit           `json:"limits"`
	Legs        []Leg             `json:"legs"`
	Excursions  []Excursion       `json:"excursions,omitempty"`
	Proof       *Proof            `json:"proof,omitempty"` // of the continuous duty
	WholeStroke *WholeStroke      `json:"whole_stroke,omitempty"`
	Marks       []string          `json:"marks"`
	Notes       []string          `json:"notes,omitempty"`
	Poses       int               `json:"poses,omitempty"` // required poses at which it was judged
}

// Worst is what decides a measure.
type Worst struct {
	Pose *Pose  `json:"pose,omitempty"`
	Leg  int    `json:"leg,omitempty"`  // from 1
	Mate int    `json:"mate,omitempty"` // the other leg of a pair, from 1
	Zone string `json:"zone,omitempty"`
	Case string `json:"case,omitempty"`
	Near string `json:"near,omitempty"` // kind of singularity: serial, actuator or constraint
}

// Pose is about home.
type Pose struct {
	X     float64 `json:"x"`
	Y     float64 `json:"y"`
	Z     float64 `json:"z"`
	Roll  float64 `json:"roll"`
	Pitch float64 `json:"pitch"`
	Yaw   float64 `json:"yaw"`
}

// Joints are joint centres: base ones in the base frame, platform ones in the platform frame.
type Joints struct {
	Base     [][3]float64 `json:"base"`
	Platform [][3]float64 `json:"platform"`
}

// Limit is a limit with the design's value.
type Limit struct {
	Measure string `json:"measure"`
	Origin  string `json:"origin"` // key of the brief that states it
	Unit    string `json:"unit"`
	Sense   string `json:"sense"` // at_least or at_most
	Bound   Number `json:"bound"`
	Value   Number `json:"value"`
	Holds   bool   `json:"holds"`
	Margin  Number `json:"margin"` // relative to the bound, or to a scale of the measure where the bound is 0

	Unbounded bool `json:"unbounded,omitempty"` // the value is null
}

// Leg is what one leg must do over all required poses.
type Leg struct {
	Shortest      Number `json:"shortest"` // actuator coordinate: m, or rad of a crank
	Home          Number `json:"home"`
	Longest       Number `json:"longest"`
	Push          Number `json:"push"` // N or N m
	Pull          Number `json:"pull"`
	Speed         Number `json:"speed"`
	BaseSwing     Number `json:"base_swing"`
	PlatformSwing Number `json:"platform_swing"`

	ShortestAt *Pose           `json:"shortest_at,omitempty"` // absent where home decides
	LongestAt  *Pose           `json:"longest_at,omitempty"`
	Unbounded  map[string]bool `json:"unbounded,omitempty"` // fields that are null
}

// Excursion is how far one coordinate goes alone from home until a pose limit fails.
type Excursion struct {
	Coordinate string `json:"coordinate"`
	Low        Number `json:"low"` // null where nothing fails
	LowFails   string `json:"low_fails,omitempty"`
	High       Number `json:"high"`
	HighFails  string `json:"high_fails,omitempty"`

	Unbounded map[string]bool `json:"unbounded,omitempty"` // "low", "high": fields that are null
}

// Help is what a study without a feasible design still tells.
type Help struct {
	Binding     []Binding    `json:"binding"`     // constraints by how often they failed among the nearest designs
	Nearest     []Design     `json:"nearest"`     // least violating first
	Relaxations []Relaxation `json:"relaxations"` // single limits whose change would admit a design seen
}

// Binding is one constraint among the nearest designs.
type Binding struct {
	Constraint string `json:"constraint"`
	Designs    int    `json:"designs"` // of the nearest designs, how many break it
	Of         int    `json:"of"`
	Least      Number `json:"least"` // the least relative excess among those that break it
}

// Relaxation is the smallest change of one limit alone that would admit a design that was met.
type Relaxation struct {
	Constraint string `json:"constraint"`
	Origin     string `json:"origin"`
	Unit       string `json:"unit"`
	Bound      Number `json:"bound"`
	Needed     Number `json:"needed"`
	Design     int    `json:"design"` // index into Nearest
}
