package study

import (
	"bytes"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"
)

func TestFrontRoundTrip(t *testing.T) {
	f := tilter()
	b, err := Encode(f)
	if err != nil {
		t.Fatal(err)
	}
	g, err := Decode(b)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(f, g) {
		t.Errorf("read back\n%+v\nwritten\n%+v", g, f)
	}
	c, _ := Encode(g)
	if !bytes.Equal(b, c) {
		t.Error("the same record gives other bytes the second time")
	}
	for _, want := range []string{`"format": "legwright-front/1"`, `"hypervolume": 0.3333333333333333`, `1.7000000000000002`,
		`"leg_clearance": null`, `"leg_clearance": true`, `"low": null`, `"low": true`} {
		if !bytes.Contains(b, []byte(want)) {
			t.Errorf("front.json lacks %s", want)
		}
	}
}

func TestDecodeFailingDesign(t *testing.T) {
	inf := Number(0)
	inf.UnmarshalJSON([]byte("null"))
	f := tilter()
	f.Help = &Help{Nearest: []Design{{Limits: []Limit{
		{Measure: "leg_clearance", Unit: "m", Sense: AtLeast, Value: -inf, Unbounded: true, Margin: -inf},
		{Measure: "push_force", Unit: "N", Sense: AtMost, Bound: 9, Value: inf, Unbounded: true, Margin: -inf},
	}}}}
	b, err := Encode(f)
	if err != nil {
		t.Fatal(err)
	}
	g, err := Decode(b)
	if err != nil {
		t.Fatal(err)
	}
	l := g.Help.Nearest[0].Limits
	if l[0].Value != -inf || l[0].Margin != -inf || l[1].Value != inf || l[1].Margin != -inf {
		t.Errorf("signs are lost: %+v", l)
	}
	if got := g.Help.Nearest[0].Tightest().Measure; got != "leg_clearance" {
		t.Errorf("tightest is %s", got)
	}
}

func TestDecodeTolerance(t *testing.T) {
	b, _ := Encode(tilter())
	more := bytes.Replace(b, []byte(`"title"`), []byte(`"later_version": {"a": [1]}, "title"`), 1)
	if _, err := Decode(more); err != nil {
		t.Errorf("an unknown field: %v", err)
	}
}

func TestDecodeRefuses(t *testing.T) {
	good, _ := Encode(tilter())
	for _, c := range []struct{ why, old, new, want string }{
		{"another format", "legwright-front/1", "legwright-front/9", `format is "legwright-front/9"`},
		{"cut off", "}\n", "", "line"},
		{"a wrong type", `"evaluations": 900`, `"evaluations": "many"`, "line 7"},
		{"no goals", `"goals"`, `"aims"`, "goals: the list is empty"},
		{"a wrong sense", `"maximise"`, `"maximize"`, "goals[0]"},
		{"an id that leads elsewhere", `"id": "001"`, `"id": "../1"`, "designs[0].id"},
		{"an id twice", `"id": "002"`, `"id": "001"`, "is there twice"},
		{"a goal without value", `"conditioning": 0.`, `"other": 0.`, "goal conditioning is missing"},
		{"no family", `"family": "3-RPR"`, `"family": ""`, "family: is missing"},
	} {
		text := strings.ReplaceAll(string(good), c.old, c.new)
		if c.why == "cut off" {
			text = text[:len(text)/2]
		}
		_, err := Decode([]byte(text))
		if err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), "; ") {
			t.Errorf("%s: got %v, want a message with %q and what to do", c.why, err, c.want)
		}
	}
	if _, err := Decode(append(good, '1')); err == nil {
		t.Error("text after the front is taken")
	}
}

func TestReadNamesTheFile(t *testing.T) {
	dir := t.TempDir()
	if _, err := Read(dir); err == nil || !strings.Contains(err.Error(), dir) || !strings.Contains(err.Error(), "search -o") {
		t.Errorf("no front: %v", err)
	}
	path := filepath.Join(dir, "front.json")
	os.WriteFile(path, []byte("{"), 0o666)
	if _, err := Read(dir); err == nil || !strings.Contains(err.Error(), path) {
		t.Errorf("damaged front: %v", err)
	}
	if _, err := Read(path); err == nil || !strings.Contains(err.Error(), "is a file") {
		t.Errorf("a file: %v", err)
	}
}

// Words of a file are quoted in errors up to a bounded length.
func TestErrorsAreBounded(t *testing.T) {
	long := strings.Repeat("x", 100_000)
	front, _ := Encode(tilter())
	certificate := `{"format": "legwright-proof/1"}`
	for what, read := range map[string]func() error{
		"front's format": func() error { _, err := Decode([]byte(`{"format": "` + long + `"}`)); return err },
		"part's format":  func() error { _, err := DecodePart([]byte(`{"format": "` + long + `"}`)); return err },
		"certificate's format": func() error {
			_, err := ReadCertificate([]byte(strings.Replace(certificate, "legwright", long, 1)))
			return err
		},
		"id": func() error {
			_, err := Decode(bytes.Replace(front, []byte(`"001"`), []byte(`"`+long+`"`), 1))
			return err
		},
		"number": func() error {
			_, err := Decode(bytes.Replace(front, []byte(`"evaluations": 900`), []byte(`"evaluations": 1`+strings.Repeat("0", len(long))), 1))
			return err
		},
		"goal": func() error {
			return CheckWeights(&Front{Goals: []Goal{{Measure: long}}}, map[string]float64{long: -1})
		},
	} {
		err := read()
		if err == nil {
			t.Errorf("%s: is taken", what)
		} else if len(err.Error()) > 1000 {
			t.Errorf("%s: an error of %d bytes", what, len(err.Error()))
		}
	}
}
