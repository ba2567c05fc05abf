package job

import (
	"bytes"
	"context"
	"encoding/binary"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"legwright/cmd/legwright/internal/bounded"
	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/kin"
	"legwright/objective"
	"legwright/objective/proof"
	"legwright/opt"
)

// studied makes the study of a brief and the brief's file.
func studied(f *testing.F, text string) (s *Study, path string) {
	path = filepath.Join(f.TempDir(), "brief.yaml")
	if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
		f.Fatal(err)
	}
	b, err := brief.Load(path, *Known())
	if err != nil {
		f.Fatal(err)
	}
	if s, err = New(b); err != nil {
		f.Fatal(err)
	}
	return s, path
}

// line tells of an error that is not one line of bounded length.
func line(t *testing.T, err error) {
	t.Helper()
	if text := err.Error(); text == "" || len(text) > 2000 || strings.ContainsAny(text, "\n\r\x1b") {
		t.Errorf("an error that is not a line: %.3000q", text)
	}
}

// What a record of any bytes is read as is written, and reads back as the same bits.
func FuzzRecord(f *testing.F) {
	f.Add(encode(nil, &opt.Result{Goals: []float64{1, 2}, Excess: []float64{3}, Violation: 3}))
	f.Add(encode(nil, &opt.Result{Goals: []float64{math.NaN(), math.NaN()}, Excess: []float64{0}, Fault: "panic: too wide"}))
	f.Add([]byte{7})
	blank := func() opt.Result {
		return opt.Result{Goals: []float64{math.NaN(), math.NaN()}, Excess: make([]float64, 1)}
	}
	bits := func(r opt.Result) (out []uint64) {
		for _, v := range slices.Concat(r.Goals, r.Excess, []float64{r.Violation}) {
			out = append(out, math.Float64bits(v))
		}
		return out
	}
	f.Fuzz(func(t *testing.T, b []byte) {
		r := blank()
		if !decode(b, &r) {
			return
		}
		again := blank()
		if !decode(encode(nil, &r), &again) || again.Fault != r.Fault || !slices.Equal(bits(again), bits(r)) {
			t.Errorf("%x reads as %+v, then as %+v", b, r, again)
		}
	})
}

// A journal on a log of any whole block gives a result of the log, or says that the log is none of the search; it
// ends, whatever is asked for.
func FuzzJournal(f *testing.F) {
	var b []byte
	for _, x := range []float64{1, 2, 2, 3} {
		at := len(b)
		b = binary.LittleEndian.AppendUint64(append(b, 0, 0, 0, 0), key(0, []float64{x}))
		b = encode(b, &opt.Result{Goals: []float64{x, 2}, Excess: []float64{0}})
		binary.LittleEndian.PutUint32(b[at:], uint32(len(b)-at-4))
	}
	f.Add(b, 4)
	f.Add(b[:len(b)-3], 1)
	f.Add(b, 1<<30)
	dir, err := study.Create(f.TempDir(), study.Intent{})
	if err != nil {
		f.Fatal(err)
	}
	defer dir.Close()
	f.Fuzz(func(t *testing.T, payload []byte, records int) {
		log, _, err := dir.OpenLog([32]byte{1}, true)
		if err != nil {
			t.Fatal(err)
		}
		defer log.Close()
		if err := log.Append(payload, records, time.Second); err != nil {
			t.Fatal(err)
		}
		ended := 0
		bounded.Read(t, len(payload), func() {
			j := NewJournal(log, &study.Kept{Records: 4}, time.Hour, func(text string) { t.Error(text) })
			j.window, j.lost = 100, func() { ended++ }
			for range 2 {
				for _, x := range []float64{1, 2, 2, 4, 3} {
					r := opt.Result{Goals: []float64{math.NaN(), math.NaN()}, Excess: make([]float64, 1)}
					if j.recall(0, []float64{x}, &r) != r.Recalled {
						t.Error("recalled and not marked so")
					}
				}
				if (j.err != nil) != (ended > 0) || ended > 1 {
					t.Errorf("%v, and the search was ended %d times", j.err, ended)
				}
				if j.count < 0 || j.count > 102 {
					t.Errorf("%d records wait", j.count)
				}
				if j.err == nil {
					j.Rewind()
				}
			}
		})
	})
}

// A checkpoint that is read is written, and reads back; it goes on with itself, and says in a line why another does not.
func FuzzCheckpoint(f *testing.F) {
	text, err := os.ReadFile("testdata/checkpoint.json")
	if err != nil {
		f.Fatal(err)
	}
	f.Add(text)
	f.Add([]byte(`{"program": "legwright 0.1.0", "part": "merge"}`))
	f.Add([]byte("null"))
	f.Fuzz(func(t *testing.T, b []byte) {
		var c *Checkpoint
		var err error
		bounded.Read(t, len(b), func() { c, err = ReadCheckpoint(b) })
		if err != nil {
			line(t, err)
			return
		}
		if c == nil {
			return
		}
		written, err := c.Bytes()
		if err != nil {
			t.Fatal(err)
		}
		back, err := ReadCheckpoint(written)
		if err != nil || *back != *c || back.Key() != c.Key() {
			t.Fatalf("%+v reads back as %+v: %v", c, back, err)
		}
		if err := back.Continues(c); (err == nil) != (c.Part != Merging) {
			t.Errorf("%+v against itself: %v", c, err)
		}
		if err := (&Checkpoint{Program: Program(), Seed: 1}).Continues(c); err != nil {
			line(t, err)
		}
	})
}

// A part of the command line is read as it is written, and the shares of all parts are the whole.
func FuzzParsePart(f *testing.F) {
	for _, s := range []string{"", "3/16", "1/1", "0/4", "5/4", "1/100000", "1/100001", "+1/2", "1/2 ", "１/２", "1/9999999999999999999"} {
		f.Add(s, 1000)
	}
	f.Fuzz(func(t *testing.T, text string, evaluations int) {
		p, err := ParsePart(text)
		if err != nil {
			line(t, err)
			return
		}
		if p.String() != text || !p.Whole() && (p.Number < 1 || p.Number > p.Of || p.Of > study.MostParts) {
			t.Errorf("%q is read as %+v", text, p)
		}
		evaluations = max(0, min(evaluations, 1_000_000_000))
		if sum := 0; p.Of <= 1000 && !p.Whole() {
			for n := range p.Of {
				sum += Part{n + 1, p.Of}.Share(evaluations)
			}
			if sum != evaluations {
				t.Errorf("%d parts of %d evaluations sum up to %d", p.Of, evaluations, sum)
			}
		}
	})
}

// A part of any text is refused, or merges into a front that can be written and read.
func FuzzMerge(f *testing.F) {
	s, _ := studied(f, journalBrief)
	text, err := os.ReadFile("testdata/part.json")
	if err != nil {
		f.Fatal(err)
	}
	f.Add(text)
	f.Fuzz(func(t *testing.T, b []byte) {
		if len(b) > 20_000 {
			t.Skip()
		}
		p, err := study.DecodePart(b)
		if err != nil {
			return
		}
		if p.Of > 1000 || len(p.Outcome.Kept)+len(p.Outcome.Near)+len(p.Outcome.Single) > 50 {
			t.Skip() // it only takes longer
		}
		p.Program = Program()
		if err := CheckParts([]*study.Part{p}, func(*study.Part) string { return "part" }); err != nil {
			t.Fatalf("one part alone does not belong to itself: %v", err)
		}
		found, err := s.Merge([]*study.Part{p}, 1)
		if err != nil {
			line(t, err)
			return
		}
		front := found.Front
		study.Rank(front, nil)
		written, err := study.Encode(front)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := study.Decode(written); err != nil {
			t.Errorf("%v\n%s", err, written)
		}
		if len(front.Parts.Present)+len(front.Parts.Missing) != p.Of {
			t.Errorf("parts %+v of %d", front.Parts, p.Of)
		}
	})
}

const fuzzedDesign = "brief: brief.yaml\nfamily: 3-RPR\ndimensions: {base_radius: 400 mm, platform_radius: 150 mm, home_heading: 60 deg, leg_min: 150 mm, stroke: 300 mm}\n"

// A design file of any text is refused, or is a machine that can be located, judged and reported.
func FuzzDesignFile(f *testing.F) {
	_, path := studied(f, journalBrief)
	f.Add([]byte(fuzzedDesign))
	f.Add([]byte("family: 3-RPR\ndimensions: {leg_min: 150 mm, stroke: 300 mm}\njoints:\n  base: [[1 m, 0 m, 0 m], [0 m, 1 m, 0 m], [-1 m, 0 m, 0 m]]\n  platform: [[10 cm, 0 m, 0 m], [0 m, 10 cm, 0 m], [-10 cm, 0 m, 0 m]]\nhome: [0 m, 0 m, 0 m, 0 deg, 0 deg, 30 deg]\n"))
	for _, name := range []string{"design.yaml", "joints.yaml", "rails.yaml"} {
		text, err := os.ReadFile("../brief/testdata/" + name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	for _, family := range Known().Families { // each with its middling design
		var b bytes.Buffer
		b.WriteString("family: " + family.Name + "\ndimensions:\n")
		k := kin.FamilyNamed(family.Name)
		for i := range k.Dimensions {
			d := &k.Dimensions[i]
			if d.Optional {
				continue
			}
			v := (d.Low + d.High) / 2
			if d.Unit == kin.Sign {
				v = 1
			}
			b.WriteString("  " + d.Name + ": " + exact(v, d.Unit) + "\n")
		}
		f.Add(b.Bytes())
	}
	file := filepath.Join(f.TempDir(), "design.yaml")
	f.Fuzz(func(t *testing.T, text []byte) {
		if err := os.WriteFile(file, text, 0o666); err != nil {
			t.Fatal(err)
		}
		m, family, _, err := Machine(file)
		if err == nil {
			q := make([]float64, family.Legs)
			kin.Locate(m, q, kin.NewPose(kin.Coords{}))
			Beyond(file, q)
		}
		_, task, plan, err := Design(file, path)
		if err != nil {
			return
		}
		a := objective.Appraise(task, plan, plan.Single())
		if _, err := study.Encode(study.FromAppraisal(task, a)); err != nil {
			t.Error(err)
		}
	})
}

func exact(v float64, u kin.Unit) string {
	text, _ := json.Marshal(v)
	return strings.TrimSpace(string(text) + " " + study.DimensionUnit(u).SI())
}

// A certificate of any text is refused in a line, or holds: then it claims no more than is proved anew.
func FuzzProof(f *testing.F) {
	_, path := studied(f, journalBrief)
	file := filepath.Join(f.TempDir(), "design.yaml")
	if err := os.WriteFile(file, []byte(fuzzedDesign), 0o666); err != nil {
		f.Fatal(err)
	}
	s, err := NewSubject(file, path)
	if err != nil {
		f.Fatal(err)
	}
	set := proof.Settings{Workers: 1, Time: 5 * time.Second}
	good := s.Prove(context.Background(), set)
	c, err := s.Certificate(good)
	if err != nil || c == nil {
		f.Fatalf("%v %v", c, err)
	}
	text, err := study.Encode(c)
	if err != nil {
		f.Fatal(err)
	}
	f.Add(text)
	f.Add([]byte(`{"format": "legwright-proof/1", "record": {}}`))
	f.Fuzz(func(t *testing.T, b []byte) {
		c, err := study.ReadCertificate(b)
		if err != nil {
			line(t, err)
			return
		}
		c.Design, c.Brief = s.designHash, s.briefHash
		var boxes int64
		bounded.Read(t, len(b)+1<<10, func() { boxes, err = s.Check(context.Background(), c, set) })
		if err != nil {
			line(t, err)
			return
		}
		for _, claim := range c.Record.Claims {
			o := &good.Outcomes[claim.Place]
			if o.Name != claim.Property || o.Answer != proof.Proved {
				t.Errorf("%+v holds in %d boxes, and is %v", claim, boxes, o.Answer)
			}
			if o.Bounded && o.AtLeast && claim.Target > o.Found || o.Bounded && !o.AtLeast && claim.Target < o.Found {
				t.Errorf("%+v holds, and %g is met", claim, o.Found)
			}
		}
	})
}

// A front of any text is refused, is none of the brief, or gives the data of a page and the sheets of its designs.
func FuzzSheet(f *testing.F) {
	s, _ := studied(f, journalBrief)
	for _, name := range []string{"front.json", "infeasible.json"} {
		text, err := os.ReadFile("../study/testdata/" + name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	sources := &study.Sources{Brief: study.File{Name: "brief.yaml", Bytes: []byte(journalBrief)}}
	f.Fuzz(func(t *testing.T, b []byte) {
		front, err := study.Decode(b)
		if err != nil || len(front.Designs) > 3 {
			t.Skip()
		}
		data, err := s.Sheet(front, SheetRun{Sources: sources, Folder: "out", Workers: 1})
		if err != nil {
			line(t, err)
			return
		}
		if _, err := json.Marshal(data); err != nil {
			t.Error(err)
		}
		for i := range front.Designs {
			if _, err := s.Sheets(front.Designs[i], sources); err != nil {
				line(t, err)
			}
		}
	})
}
