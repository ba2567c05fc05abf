package brief

import (
	"fmt"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"
)

const planar = `family: 3-RPR
dimensions: {base_radius: 1 m, platform_radius: 300 mm, home_heading: 30 deg, leg_min: sized, stroke: sized}
duty: {zones: [{name: work, box: {x: 10 mm}}]}
goals: [{maximise: conditioning}]
`

// Each row changes one thing of a good brief and names the place, the key and the words of the fault.
var refused = []struct {
	why      string
	old, new string // of planar
	want     string // file:line:column: key: problem; remedy, all or a part
}{
	{"unknown family", "3-RPR", "3-RRP", `b.yaml:1:9: family: unknown family "3-RRP"; did you mean 3-RPR?`},
	{"family by case", "3-RPR", "3-rpr", `b.yaml:1:9: family: unknown family "3-rpr"; did you mean 3-RPR?`},
	{"unlike any family", "3-RPR", "windmill", `known here: 6-UPS, 6-RUS, 6-PUS, 3-RPR, delta`},
	{"no family", "family: 3-RPR\n", "", `b.yaml:1:1: family: is missing; add family`},
	{"family a number", "3-RPR", "6", `b.yaml:1:9: family: 6 is a bare number; write one of 6-UPS`},
	{"family twice", "3-RPR", "[3-RPR, 3-RPR]", `b.yaml:1:17: family[1]: 3-RPR is given twice; name each family once`},
	{"no goals", "goals: [{maximise: conditioning}]", "", `goals: is missing`},
	{"empty goals", "[{maximise: conditioning}]", "[]", `b.yaml:4:8: goals: is an empty list; write a list of goals`},
	{"null goals", "[{maximise: conditioning}]", "", `b.yaml:4:1: goals: has no value; write a list of goals`},
	{"null title", "family:", "title:\nfamily:", `b.yaml:1:1: title: has no value`},
	{"number as title", "family:", "title: 12\nfamily:", `b.yaml:1:8: title: 12 is a bare number; write a text (in quotes`},
	{"date as title", "family:", "title: 2026-01-02\nfamily:", `b.yaml:1:8: title: 2026-01-02 is a date`},
	{"blank title", "family:", "title: '  '\nfamily:", `b.yaml:1:8: title: is empty`},
	{"empty unknown section", "goals:", "serch: {}\ngoals:", `b.yaml:4:1: serch: unknown key "serch"; did you mean search?`},
	{"null unknown section", "goals:", "serch:\ngoals:", `b.yaml:4:1: serch: unknown key "serch"; did you mean search?`},
	{"key twice", "goals:", "family: 3-RPR\ngoals:", `b.yaml:4:1: family: already given on line 1; give each key once`},
	{"key twice by case", "goals:", "Family: 3-RPR\ngoals:", `b.yaml:4:1: Family: already given on line 1; give each key once (case`},
	{"key in capitals", "goals:", "Goals:", `b.yaml:4:1: Goals: unknown key "Goals"; did you mean goals?`},
	{"inner key twice", "base_radius: 1 m,", "base_radius: 1 m, base_radius: 2 m,", `b.yaml:2:32: dimensions.base_radius: already given on line 2`},
	{"dotted key", "goals:", "search.seed: 1\ngoals:", `b.yaml:4:1: search.seed: unknown key "search.seed"`},
	{"second document", "goals:", "---\ngoals:", `b.yaml:4:1: a second document begins here`},
	{"anchor", "family: 3-RPR", "family: &f 3-RPR", `"&f": anchors, aliases and tags are not read`},
	{"alias", "goals:", "title: *f\ngoals:", `not readable as YAML: unknown anchor 'f' referenced`},
	{"tag", "family: 3-RPR", "family: !!str 3-RPR", `"!!str": anchors, aliases and tags are not read`},
	{"merge key", "goals:", "<<: {seed: 1}\ngoals:", `b.yaml:4:1: <<: unknown key "<<"`},
	{"list as key", "goals:", "? [a, b]\n: 1\ngoals:", `unknown key "? [a list or mapping as key]"`},
	{"syntax", "goals: [", "goals: ]", `b.yaml:3:1: not readable as YAML`},
	{"tab", "goals:", "duty:\n\tzones: 1\ngoals:", `b.yaml:5:`},

	{"no unit", "base_radius: 1 m", "base_radius: 1", `b.yaml:2:27: dimensions.base_radius: 1 has no unit; write it as a quantity, such as 650 mm`},
	{"zero without unit", "home_heading: 30 deg", "home_heading: 0", `0 has no unit; write it as a quantity, such as 12 deg`},
	{"other kind of unit", "base_radius: 1 m", "base_radius: 1 N", `N is a unit of force, not of length; write one of mm, cm, m, um, in`},
	{"unknown unit", "base_radius: 1 m", "base_radius: 1 furlong", `unknown unit "furlong"; write one of mm, cm, m`},
	{"unit by case", "base_radius: 1 m", "base_radius: 1 MM", `unknown unit "MM"; did you mean 1 mm?`},
	{"decimal comma", "base_radius: 1 m", `base_radius: "1,5 m"`, `"1,5 m" has a comma in its number; write a decimal point: 1.5 m`},
	{"blank in number", "base_radius: 1 m", "base_radius: 1 500 mm", `"1 500 mm" has two numbers`},
	{"underscore", "base_radius: 1 m", "base_radius: 1_500 mm", `"1_500 mm" has an underscore`},
	{"word", "base_radius: 1 m", "base_radius: big", `"big" is not a quantity; write one such as 650 mm`},
	{"NaN", "base_radius: 1 m", "base_radius: nan mm", `"nan mm" is not a finite number`},
	{"Inf", "base_radius: 1 m", "base_radius: inf m", `"inf m" is not a finite number`},
	{"bare NaN", "base_radius: 1 m", "base_radius: .nan", `".nan" is not a finite number`},
	{"bare Inf", "base_radius: 1 m", "base_radius: -.inf", `"-.inf" is not a finite number`},
	{"1e400", "base_radius: 1 m", "base_radius: 1e400 m", `1e400 is beyond the range of numbers`},
	{"1e-400", "base_radius: 1 m", "base_radius: 1e-400 m", `1e-400 is too small`},
	{"null dimension", "base_radius: 1 m", "base_radius: ", `b.yaml:2:14: dimensions.base_radius: has no value; write 650 mm, [low, high]`},
	{"truth as dimension", "base_radius: 1 m", "base_radius: true", `true is true or false`},
	{"negative radius", "base_radius: 1 m", "base_radius: -1 m", `-1 m is not above 0; write a value above 0`},
	{"reversed range", "base_radius: 1 m", "base_radius: [2 m, 1 m]", `b.yaml:2:27: dimensions.base_radius: the range runs backwards, from 2 m to 1 m; write [1 m, 2 m]`},
	{"empty range", "base_radius: 1 m", "base_radius: [1 m, 1000 mm]", `the range from 1 m to 1000 mm is empty; write 1 m alone to fix it`},
	{"list of one", "base_radius: 1 m", "base_radius: [1 m]", `has 1 items; write [low, high]`},
	{"list of none", "base_radius: 1 m", "base_radius: []", `is an empty list; write [low, high]`},
	{"empty mapping", "base_radius: 1 m", "base_radius: {}", `is an empty mapping; write 650 mm, [low, high]`},
	{"from only", "base_radius: 1 m", "base_radius: {from: 1 m}", `b.yaml:2:14: dimensions.base_radius.to: is missing; add to`},
	{"step of nothing", "base_radius: 1 m", "base_radius: {from: 1 m, to: 2 m, step: 0 mm}", `0 mm is not above 0`},
	{"backward steps", "base_radius: 1 m", "base_radius: {from: 2 m, to: 1 m, step: 1 mm}", `the range runs backwards, from 2 m to 1 m`},
	{"step too long", "base_radius: 1 m", "base_radius: {from: 1 m, to: 2 m, step: 3 m}", `b.yaml:2:54: dimensions.base_radius.step: a step of 3 m does not fit`},
	{"too many steps", "base_radius: 1 m", "base_radius: {from: 1 m, to: 2 m, step: 1e-9 m}", `steps are more than 1000000`},
	{"choices misspelt", "base_radius: 1 m", "base_radius: {choises: [1 m]}", `unknown key "choises"; did you mean choices?`},
	{"no choices", "base_radius: 1 m", "base_radius: {choices: []}", `is an empty list`},
	{"choice twice", "base_radius: 1 m", "base_radius: {choices: [1 m, 100 cm]}", `100 cm is given twice`},
	{"choices and steps", "base_radius: 1 m", "base_radius: {choices: [1 m], step: 1 mm}", `unknown key "step"`},
	{"sized radius", "base_radius: 1 m", "base_radius: sized", `b.yaml:2:27: dimensions.base_radius: base_radius cannot be sized by the duty`},
	{"sized misspelt", "leg_min: sized", "leg_min: size", `"size" is not a quantity; did you mean sized?`},
	{"unknown dimension", "base_radius:", "bass_radius:", `b.yaml:2:14: dimensions.bass_radius: unknown key "bass_radius"; did you mean base_radius?`},
	{"missing dimension", "base_radius: 1 m, ", "", `b.yaml:2:1: dimensions.base_radius: is missing; add base_radius`},
	{"two azimuths", "base_radius: 1 m", "base_radius: 1 m, leg_azimuths: [90 deg, 210 deg]", `has 2 items; write a list of 3: [12 deg, …]`},
	{"one azimuth", "base_radius: 1 m", "base_radius: 1 m, leg_azimuths: 90 deg", `"90 deg" is text; write a list of 3`},
	{"plain for many", "family: 3-RPR", "family: [3-RPR, 6-UPS]", `b.yaml:2:1: dimensions: base_radius stands under no family; write the dimensions of each family: 3-RPR: {…}, 6-UPS: {…}`},
	{"per family", "{base_radius: 1 m,", "{3-RPR: {base_radius: 1 m},", `dimensions.3-RPR: the only family needs no key of its own; write its dimensions directly under dimensions`},

	{"unknown mount", "goals:", "mount: wall\ngoals:", `b.yaml:4:8: mount: unknown mount "wall"; known here: floor, ceiling`},
	{"gravity downward", "goals:", "gravity: -9.8 m/s2\ngoals:", `gravity: -9.8 m/s2 is below 0`},
	{"tool of two", "goals:", "tool: [0 mm, 0 mm]\ngoals:", `b.yaml:4:7: tool: has 2 items; write a list of 3: [650 mm, …]`},
	{"tool bare", "goals:", "tool: [0 mm, 0 mm, 0]\ngoals:", `b.yaml:4:20: tool[2]: 0 has no unit`},
	{"torque of a pusher", "goals:", "actuator: {torque: 1 N m}\ngoals:", `b.yaml:4:20: actuator.torque: the actuators of 3-RPR push; write push and pull instead`},
	{"turning speed", "goals:", "actuator: {speed: 1 rad/s}\ngoals:", `rad/s is a unit of angular speed, not of speed`},
	{"no push", "goals:", "actuator: {push: 0 N}\ngoals:", `0 N is not above 0`},
	{"ratio with a unit", "goals:", "actuator: {dead_length: 1 m, dead_ratio: 1 mm}\ngoals:", `mm is a unit of length, not of ratio; write one of %, no unit`},
	{"ratio in quotes", "goals:", "actuator: {dead_length: 1 m, dead_ratio: '1'}\ngoals:", `"1" is text; write the number without quotes`},
	{"ratio alone", "goals:", "actuator: {dead_ratio: 1}\ngoals:", `does nothing without dead_length`},
	{"stroke twice", "goals:", "actuator: {strokes: [200 mm, 20 cm]}\ngoals:", `20 cm is given twice`},
	{"leg too short", "leg_min: sized, stroke: sized", "leg_min: [300 mm, 400 mm], stroke: [250 mm, 300 mm]}\nactuator: {dead_length: 180 mm", `b.yaml:2:79: dimensions.leg_min: no leg fits: even at its greatest, 400 mm, leg_min is below dead_ratio · stroke + dead_length, at least 430 mm; raise leg_min`},
	{"leg too short for any stroke", "leg_min: sized, stroke: sized", "stroke: sized, leg_min: 300 mm}\nactuator: {dead_length: 180 mm, strokes: [200 mm, 250 mm]", `b.yaml:2:94: dimensions.leg_min: no leg fits`},
	{"swing", "goals:", "joints: {base_swing: 200 deg}\ngoals:", `200 deg is more than half a turn`},
	{"axis", "goals:", "joints: {axis: home}\ngoals:", `unknown axis "home"`},
	{"axis of zero", "goals:", "joints: {axis: [0, 0, 0]}\ngoals:", `the vector has no direction`},
	{"rod without modulus", "goals:", "legs: {rod_diameter: 30 mm}\ngoals:", `legs.modulus: is missing beside rod_diameter`},
	{"length word", "goals:", "characteristic_length: duties\ngoals:", `unknown characteristic length "duties"; known here: platform_radius, duty`},
	{"length of nothing", "goals:", "characteristic_length: 0 mm\ngoals:", `0 mm is not above 0`},
	{"singular_below", "goals:", "singular_below: 2\ngoals:", `2 is out of bounds; write a number from 0 to 1`},
	{"hexadecimal", "goals:", "singular_below: 0x1p-3\ngoals:", `0x1p-3 is not a decimal number`},
	{"octal", "goals:", "search: {seed: 010}\ngoals:", `010 is not a plain whole number`},

	{"no zones", "{zones: [{name: work, box: {x: 10 mm}}]}", "{}", `duty: is an empty mapping`},
	{"empty zones", "[{name: work, box: {x: 10 mm}}]", "[]", `duty.zones: is an empty list`},
	{"zone without shape", ", box: {x: 10 mm}", "", `b.yaml:3:16: duty.zones[0]: the zone has no shape; add one of box, axes, ellipsoid, file`},
	{"zone with two", "box: {x: 10 mm}", "box: {x: 10 mm}, axes: {y: 1 mm}", `duty.zones[0].axes: the zone already has box`},
	{"empty box", "box: {x: 10 mm}", "box: {}", `duty.zones[0].box: is an empty mapping; write coordinates`},
	{"freedom that is not there", "box: {x: 10 mm}", "box: {z: 10 mm}", `b.yaml:3:35: duty.zones[0].box.z: 3-RPR does not move in z; its coordinates are x, y, yaw`},
	{"unknown coordinate", "box: {x: 10 mm}", "box: {jaw: 10 deg}", `unknown key "jaw"; did you mean yaw?`},
	{"angle for length", "x: 10 mm", "x: 10 deg", `deg is a unit of angle, not of length`},
	{"minus", "x: 10 mm", "x: -10 mm", `a single number stands for both directions and is not negative; write 10 mm`},
	{"zone backwards", "x: 10 mm", "x: [10 mm, -10 mm]", `the range runs backwards, from 10 mm to -10 mm; write [-10 mm, 10 mm]`},
	{"far turn", "x: 10 mm", "yaw: 200 deg", `reaches beyond half a turn`},
	{"no samples", "box: {x: 10 mm}", "box: {x: 10 mm}, samples: 0", `0 is out of bounds; write a whole number from 1 to 1000000`},
	{"half a sample", "box: {x: 10 mm}", "box: {x: 10 mm}, samples: 50.5", `50.5 is not a plain whole number`},
	{"negative samples", "box: {x: 10 mm}", "box: {x: 10 mm}, samples: -5", `-5 is not a plain whole number`},
	{"many samples", "box: {x: 10 mm}", "box: {x: 10 mm}, samples: 2000000", `2000000 is out of bounds`},
	{"huge samples", "box: {x: 10 mm}", "box: {x: 10 mm}, samples: 99999999999999999999", `is out of bounds`},
	{"many in all", "{name: work, box: {x: 10 mm}}", "{box: {x: 1 mm}, samples: 600000}, {box: {x: 2 mm}, samples: 600000}", `duty.zones: the zones hold 1200000 poses, more than 1000000`},
	{"too few for the ends", "box: {x: 10 mm}", "axes: {x: 10 mm, y: 1 mm, yaw: 1 deg}, samples: 5", `5 poses do not hold the ends of every excursion; write 6 or more`},
	{"too few for the axes", "box: {x: 10 mm}", "ellipsoid: {x: 10 mm, y: 1 mm, yaw: 1 deg}, samples: 6", `6 poses do not hold the centre of the ellipsoid and the ends of its axes; write 7 or more`},
	{"too few for the corners", "box: {x: 10 mm}", "box: {x: 10 mm, y: 1 mm, yaw: 1 deg}, samples: 8", `8 poses do not hold the corners and the centre of the box; write 9 or more`},
	{"zone name twice", "{name: work, box: {x: 10 mm}}", "{name: work, box: {x: 10 mm}}, {name: work, axes: {y: 1 mm}}", `b.yaml:3:54: duty.zones[1].name: a second zone is named "work"`},
	{"no pose file", "box: {x: 10 mm}", "file: nowhere.csv", `b.yaml:3:35: duty.zones[0].file: there is no file nowhere.csv`},
	{"folder as pose file", "box: {x: 10 mm}", "file: .", `is no plain file`},

	{"case in no zone", "10 mm}}]}", "10 mm}}], cases: [{zones: [wrok]}]}", `duty.cases[0].zones[0]: unknown zone "wrok"; did you mean work?`},
	{"empty case", "10 mm}}]}", "10 mm}}], cases: [{}]}", `duty.cases[0]: is an empty mapping`},
	{"case name twice", "10 mm}}]}", "10 mm}}], cases: [{name: a}, {name: a}]}", `a second case is named "a"`},
	{"empty load", "10 mm}}]}", "10 mm}}], cases: [{loads: [{name: a}]}]}", `the load neither has a mass nor applies a force or a moment`},
	{"centre of nothing", "10 mm}}]}", "10 mm}}], cases: [{loads: [{force: [1 N, 0 N, 0 N], centre: [0 m, 0 m, 0 m]}]}]}", `loads[0].centre: does nothing without mass`},
	{"point of no force", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: 1 kg, at: [0 m, 0 m, 0 m]}]}]}", `loads[0].at: does nothing without force`},
	{"negative mass", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: -1 kg}]}]}", `-1 kg is not above 0`},
	{"negative spread", "10 mm}}]}", "10 mm}}], cases: [{loads: [{force_spread: [-1 N, 0 N, 0 N]}]}]}", `force_spread[0]: -1 N is below 0`},
	{"four terms", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: 1 kg, inertia: [1 kg m2, 1 kg m2, 1 kg m2, 0 kg m2]}]}]}", `has 4 items; write [xx, yy, zz]`},
	{"impossible inertia", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: 1 kg, inertia: [1 kg m2, 1 kg m2, 1 kg m2, 2 kg m2, 0 kg m2, 0 kg m2]}]}]}", `no body has this inertia`},
	{"acceleration of nothing", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: 1 kg, acceleration: {at: tool}}]}]}", `holds none of linear, angular`},
	{"accelerated where", "10 mm}}]}", "10 mm}}], cases: [{loads: [{mass: 1 kg, acceleration: {linear: 1 m/s2, at: home}}]}]}", `unknown point "home"; known here: tool`},
	{"negative speed", "10 mm}}]}", "10 mm}}], cases: [{speeds: {linear: -1 m/s}}]}", `-1 m/s is below 0`},

	{"unknown measure", "conditioning", "conditionning", `b.yaml:4:20: goals[0].maximise: unknown measure "conditionning"; did you mean conditioning?`},
	{"maximize", "maximise", "maximize", `unknown key "maximize"; did you mean maximise?`},
	{"goal the wrong way", "maximise", "minimise", `to minimise conditioning makes a machine worse; write maximise: conditioning`},
	{"goal twice", "[{maximise: conditioning}]", "[{maximise: conditioning}, {maximise: conditioning}]", `b.yaml:4:46: goals[1].maximise: conditioning is already a goal`},
	{"goal of two keys", "[{maximise: conditioning}]", "[{maximise: conditioning, minimise: footprint}]", `a goal has one key`},
	{"goal as a word", "[{maximise: conditioning}]", "[conditioning]", `goals[0]: "conditioning" is text; write keys with values: maximise, minimise`},
	{"goals as a mapping", "[{maximise: conditioning}]", "{maximise: conditioning}", `goals: is a mapping of keys; write a list of goals`},
	{"measure of others", "maximise: conditioning", "minimise: motor_torque", `motor_torque has no value for 3-RPR; measures for all families here: coverage, conditioning, leg_force`},
	{"measure without input", "maximise: conditioning", "maximise: stiffness", `b.yaml:4:20: goals[0].maximise: stiffness needs actuator.stiffness; add actuator.stiffness`},
	{"measure without two inputs", "maximise: conditioning", "maximise: buckling_margin", `buckling_margin needs legs.rod_diameter and legs.modulus`},
	{"limit without bound", "goals:", "limits: [{measure: coverage}]\ngoals:", `b.yaml:4:10: limits[0]: holds none of at_least, at_most`},
	{"limit with two", "goals:", "limits: [{measure: coverage, at_least: 1, at_most: 1}]\ngoals:", `a limit has one bound`},
	{"limit without measure", "goals:", "limits: [{at_least: 1}]\ngoals:", `limits[0].measure: is missing`},
	{"limit unit", "goals:", "limits: [{measure: footprint, at_most: 2 N}]\ngoals:", `N is a unit of force, not of length`},
	{"limit twice", "goals:", "limits: [{measure: footprint, at_most: 2 m}, {measure: footprint, at_most: 3 m}]\ngoals:", `footprint already has this bound`},
	{"limits that clash", "goals:", "limits: [{measure: stroke, at_most: 2 m}, {measure: stroke, at_least: 3 m}]\ngoals:", `no value of stroke holds this and the other bound`},
	{"impossible limit", "goals:", "limits: [{measure: coverage, at_least: 120 %}]\ngoals:", `b.yaml:4:40: limits[0].at_least: coverage lies from 0 to 1, never at 120 %`},
	{"many limits", "goals:", "limits: [" + strings.Repeat("{measure: footprint, at_most: 2 m}, ", 30) + "]\ngoals:", `has 30 limits, more than two for each measure`},
	{"weight of no goal", "goals:", "ranking: {weights: {footprint: 1}}\ngoals:", `ranking.weights.footprint: footprint is no goal`},
	{"weight misspelt", "goals:", "ranking: {weights: {conditionning: 1}}\ngoals:", `unknown measure "conditionning"; did you mean conditioning?`},
	{"negative weight", "goals:", "ranking: {weights: {conditioning: -1}}\ngoals:", `-1 is below 0`},
	{"weights of zero", "goals:", "ranking: {weights: {conditioning: 0}}\ngoals:", `every weight is 0`},
	{"many evaluations", "goals:", "search: {evaluations: 2000000000}\ngoals:", `write a whole number from 4 to 1000000000`},
	{"few evaluations", "goals:", "search: {evaluations: 3}\ngoals:", `3 is out of bounds; write a whole number from 4 to 1000000000`},
	{"small population", "goals:", "search: {population: 3}\ngoals:", `3 designs are too few to breed from; write 4 or more, or 0 to let the search choose`},
	{"big population", "goals:", "search: {population: 100001}\ngoals:", `write a whole number from 0 to 100000`},
	{"evaluations as text", "goals:", "search: {evaluations: '200'}\ngoals:", `"200" is text; write a whole number`},
	{"float evaluations", "goals:", "search: {evaluations: 1e3}\ngoals:", `1e3 is not a plain whole number`},
	{"reference without unit", "goals:", "search: {reference: {conditioning: 1 mm}}\ngoals:", `mm is a unit of length, not of ratio`},
	{"reference of others", "goals:", "search: {reference: {conditioning: 0.1, footprint: 1 m}}\ngoals:", `footprint is no goal`},
	{"reference incomplete", "{maximise: conditioning}]", "{maximise: conditioning}, {minimise: footprint}]\nsearch: {reference: {conditioning: 0.1}}", `search.reference.footprint: is missing`},
}

func TestRefused(t *testing.T) {
	if _, err := Parse("b.yaml", []byte(planar), known()); err != nil {
		t.Fatal(err)
	}
	for _, c := range refused {
		t.Run(c.why, func(t *testing.T) {
			if !strings.Contains(planar, c.old) {
				t.Fatalf("the brief has no %q", c.old)
			}
			_, err := Parse("b.yaml", []byte(strings.Replace(planar, c.old, c.new, 1)), known())
			if err == nil {
				t.Fatal("not refused")
			}
			if !strings.Contains(err.Error(), c.want) {
				t.Errorf("got\n%v\nwant\n%s", err, c.want)
			}
		})
	}
}

func TestAllFaultsInOneGo(t *testing.T) {
	text := `family: 6-UPSS
title:
dimensions:
  base_radius: 400
  platform_radius: [800 mm, 200 mm]
  base_half_angle: 9 N
  platform_half_angel: 9 deg
  home_height: .nan
  leg_min: sized
  stroke: sized
duty:
  zones:
    - {name: work, box: {x: ten}}
  cases:
    - {zones: [wok]}
goals:
  - maximise: conditionning
search: {seed: 1.5}
`
	_, err := Parse("b.yaml", []byte(text), known())
	fs, ok := err.(Faults)
	if !ok {
		t.Fatal(err)
	}
	var at []string
	for _, f := range fs {
		at = append(at, fmt.Sprintf("%d:%d", f.At.Line, f.At.Column))
	}
	want := "1:9 2:1 4:16 5:20 6:20 7:3 8:16 13:29 15:16 17:15 18:16"
	if got := strings.Join(at, " "); got != want {
		t.Errorf("places %s, want %s:\n%v", got, want, err)
	}
}

func TestRefusedFiles(t *testing.T) {
	deep := strings.Repeat("[", 2000)
	for _, c := range []struct{ why, file, text, want string }{
		{"ending", "b.ini", "a=1", `b.ini: ".ini" is no known ending; name the file .yaml, .toml or .json`},
		{"empty", "b.yaml", "  \n", "b.yaml:1:1: the file is empty"},
		{"comment", "b.yaml", "# nothing\n", "b.yaml:1:1: the file holds no value"},
		{"word", "b.yaml", "hello", `b.yaml:1:1: "hello" is text; write keys with values: title, family`},
		{"latin-1", "b.yaml", "title: \xe4\n", "b.yaml:1:8: byte 0xe4 is not UTF-8 text"},
		{"UTF-16", "b.yaml", "\xff\xfet\x00", "b.yaml:1:1: byte 0xff is not UTF-8 text"},
		{"large", "b.yaml", strings.Repeat("#", maxFile+1), "the file has more than 1048576 bytes"},
		{"deep YAML", "b.yaml", "a: " + deep, "b.yaml:"},
		{"deep block YAML", "b.yaml", strings.Repeat("- ", 100) + "a", "more than 30 levels"},
		{"deep JSON", "b.json", deep, "b.json:1:32: more than 30 levels"},
		{"deep TOML", "b.toml", "a = " + deep, "more than 30 levels"},
		{"deeper TOML", "b.toml", "a = " + strings.Repeat("[", 40) + strings.Repeat("]", 40), "b.toml:1:35: more than 30 levels"},
		{"many TOML keys", "b.toml", strings.Repeat("[[goals]]\n", maxKeys+1), "b.toml:10001:3: more than 10000 keys"},
		{"long TOML key", "b.toml", "a" + strings.Repeat(".a", maxDepth) + " = 1", "b.toml:1:1: more than 30 levels"},
		{"many faults", "b.yaml", strings.Repeat("k: 1\n", maxFaults+100), "\nb.yaml: 104 more faults follow; mend these first"},
		{"JSON comment", "b.json", "{\n  // no\n}", "b.json:2:3: not readable as JSON"},
		{"JSON cut short", "b.json", `{"family": `, "b.json:1:12: not readable as JSON: the file ends too early"},
		{"JSON with more", "b.json", "{} {}", "b.json:1:4: something follows the end of the value"},
		{"JSON trailing comma", "b.json", `{"a": 1,}`, "b.json:1:"},
		{"JSON key twice", "b.json", "{\"family\": \"3-RPR\",\n \"family\": \"3-RPR\"}", "b.json:2:2: family: already given on line 1"},
		{"JSON NaN", "b.json", `{"family": NaN}`, "b.json:1:12: not readable as JSON"},
		{"JSON 1e400", "b.json", `{"singular_below": 1e400}`, "b.json:1:20: singular_below: 1e400 is beyond the range of numbers"},
		{"JSON null", "b.json", `{"title": null}`, "b.json:1:2: title: has no value"},
		{"TOML key twice", "b.toml", "family = '3-RPR'\nfamily = '3-RPR'\n", "b.toml:2:1: family: already given on line 1"},
		{"TOML table twice", "b.toml", "[legs]\ndiameter = '1 mm'\n[legs]\nmodulus = '1 GPa'\n", "b.toml:3:2: legs: already given on line 1"},
		{"TOML table into a list", "b.toml", "goals = []\n[[goals]]\nmaximise = 'x'\n", "b.toml:2:3: goals: already given on line 1"},
		{"TOML by case", "b.toml", "family = '3-RPR'\nFamily = '3-RPR'\n", "b.toml:2:1: Family: already given on line 1"},
		{"TOML bare quantity", "b.toml", "tool = [1 mm]\n", "b.toml:1:11: not readable as TOML"},
		{"TOML inf", "b.toml", "singular_below = inf\n", "b.toml:1:18: singular_below: inf is not a finite decimal number"},
		{"TOML date", "b.toml", "title = 2026-01-02\n", "b.toml:1:9: title: 2026-01-02 is a date"},
		{"TOML underscore", "b.toml", "singular_below = 1_0\n", "1_0 is not a finite decimal number"},
		{"BOM and CRLF", "b.yaml", "\ufeff" + strings.ReplaceAll(planar, "\n", "\r\n") + "x: 1\r\n", "b.yaml:5:1: x: unknown key"},
	} {
		t.Run(c.why, func(t *testing.T) {
			_, err := Parse(c.file, []byte(c.text), known())
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got\n%v\nwant\n%s", err, c.want)
			}
		})
	}
}

func TestRefusedPaths(t *testing.T) {
	dir := t.TempDir()
	if _, err := Load(filepath.Join(dir, "none.yaml"), known()); err == nil || !strings.Contains(err.Error(), "there is no file") {
		t.Errorf("missing file: %v", err)
	}
	if err := os.Mkdir(filepath.Join(dir, "b.yaml"), 0o700); err != nil {
		t.Fatal(err)
	}
	if _, err := Load(filepath.Join(dir, "b.yaml"), known()); err == nil || !strings.Contains(err.Error(), "is no plain file") {
		t.Errorf("folder: %v", err)
	}
}

// Families of both sorts ask for both units; a family that turns has no push.
func TestRotaryAndMixed(t *testing.T) {
	delta := `family: delta
dimensions: {shoulder_radius: 200 mm, arm: 300 mm, rod: 600 mm, home_height: 500 mm}
duty: {zones: [{box: {z: 10 mm}}], cases: [{speeds: {linear: 1 m/s}}]}
goals: [{minimise: motor_torque}]
actuator: {torque: 20 N m, speed: 3 rad/s, stiffness: 5 kN m/rad, error: 0.1 mrad}
`
	b, err := Parse("b.yaml", []byte(delta), known())
	if err != nil {
		t.Fatal(err)
	}
	want := Actuator{DeadRatio: 1, Torque: 20, TurnSpeed: 3, TurnStiffness: 5000, TurnError: 1e-4}
	if !reflect.DeepEqual(b.Actuator, want) {
		t.Errorf("actuator %+v, want %+v", b.Actuator, want)
	}
	for _, c := range []struct{ why, old, new, want string }{
		{"push", "torque: 20 N m", "push: 20 N", "actuator.push: the actuators of delta turn"},
		{"speed", "3 rad/s", "3 m/s", "m/s is a unit of speed, not of angular speed"},
		{"turning platform", "linear: 1 m/s", "angular: 1 rad/s", "the platform of delta does not turn"},
		{"list", "3 rad/s", "[3 rad/s]", "actuator.speed: is a list"},
	} {
		_, err := Parse("b.yaml", []byte(strings.Replace(delta, c.old, c.new, 1)), known())
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: got\n%v\nwant\n%s", c.why, err, c.want)
		}
	}
	text, err := os.ReadFile("testdata/whole.yaml")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ why, old, new, want string }{
		{"one kind", "[0.4 m/s, 3 rad/s]", "0.4 m/s", "actuator.speed: some families here have actuators that push, some that turn; write both"},
		{"twice", "[0.4 m/s, 3 rad/s]", "[0.4 m/s, 3 m/s]", "actuator.speed[1]: a second speed"},
		{"family left out", "  6-RUS:\n", "  6-RUSS:\n", `dimensions.6-RUSS: unknown key "6-RUSS"; did you mean 6-RUS?`},
		{"measure of one", "minimise: footprint", "minimise: leg_force", "leg_force has no value for 6-RUS"},
	} {
		changed := strings.Replace(string(text), c.old, c.new, 1)
		_, err := Parse("testdata/b.yaml", []byte(changed), known())
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: got\n%v\nwant\n%s", c.why, err, c.want)
		}
	}
}
