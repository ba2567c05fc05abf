package study

import (
	"bytes"
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
	"legwright/opt"
)

// real is the text of a whole file of testdata.
func real(f *testing.F, name string) []byte {
	text, err := os.ReadFile(filepath.Join("testdata", name))
	if err != nil {
		f.Fatal(err)
	}
	return text
}

// sentence tells of an error that is not one line of bounded length.
func sentence(t *testing.T, err error) {
	t.Helper()
	if text := err.Error(); text == "" || len(text) > 2000 || strings.ContainsAny(text, "\n\r\x1b") {
		t.Errorf("an error that is not a line: %.3000q", text)
	}
}

// A front that is read is written, and reads back as the same bytes; it can be ranked, chosen from and tabled, and
// what comes of that reads back too.
func FuzzFront(f *testing.F) {
	b, _ := Encode(tilter())
	f.Add(b)
	f.Add(real(f, "front.json"))
	f.Add(real(f, "infeasible.json"))
	f.Add([]byte("{}"))
	f.Fuzz(func(t *testing.T, b []byte) {
		var front *Front
		var err error
		bounded.Read(t, len(b), func() { front, err = Decode(b) })
		if err != nil {
			sentence(t, err)
			return
		}
		written := readsBack(t, front)
		order := make([]string, len(front.Designs))
		Rank(front, nil)
		for i := range front.Designs {
			order[i] = front.Designs[i].ID
		}
		slices.Sort(order)
		if len(slices.Compact(order)) != len(front.Designs) {
			t.Errorf("ranking loses or doubles a design of\n%s", written)
		}
		if n := len(Choose(front, 7)); n > 7 {
			t.Errorf("%d designs chosen", n)
		}
		readsBack(t, front)
		if err := writeTable(new(bytes.Buffer), front); err != nil {
			t.Error(err)
		}
	})
}

// readsBack tells of a front that does not read back as it is written.
func readsBack(t *testing.T, f *Front) []byte {
	t.Helper()
	written, err := Encode(f)
	if err != nil {
		t.Fatalf("cannot be written: %v", err)
	}
	back, err := Decode(written)
	if err != nil {
		t.Fatalf("%v\n%s", err, written)
	}
	if again, _ := Encode(back); !bytes.Equal(again, written) {
		t.Errorf("written as\n%s\nthen as\n%s", written, again)
	}
	return written
}

// A part that is taken is written and reads back as the same bytes, and merges with others and itself: counts add up,
// and the order of parts does not show.
func FuzzPart(f *testing.F) {
	b, _ := json.Marshal(part())
	f.Add(b)
	f.Add(real(f, "part.json"))
	f.Add([]byte(`{"format": "legwright-part/1", "number": 1, "of": 1, "outcome": {}}`))
	f.Fuzz(func(t *testing.T, b []byte) {
		var p *Part
		var err error
		bounded.Read(t, len(b), func() { p, err = DecodePart(b) })
		if err != nil {
			sentence(t, err)
			return
		}
		written, err := json.Marshal(p)
		if err != nil {
			t.Fatal(err)
		}
		back, err := DecodePart(written)
		if err != nil {
			t.Fatalf("%v\n%s", err, written)
		}
		if again, _ := json.Marshal(back); !bytes.Equal(again, written) {
			t.Errorf("written as\n%s\nthen as\n%s", written, again)
		}
		outs := []*opt.Outcome{p.Outcome.Outcome(), p.Outcome.Outcome(), p.Outcome.Outcome()}
		for _, l := range [][]opt.Design{outs[0].Kept, outs[0].Near, outs[0].Failed} {
			if len(l) > 0 {
				l[0].Order++ // so that it is told from the others
			}
		}
		m := opt.Merge(outs, 10, nil)
		slices.Reverse(outs)
		if o := opt.Merge(outs, 10, nil); text(o) != text(m) {
			t.Errorf("the order of parts shows:\n%s\n%s", text(m), text(o))
		}
		if m.Evaluations < 0 || m.Evaluations != 3*p.Outcome.Evaluations || m.Feasible != 3*p.Outcome.Feasible || m.Failures != 3*p.Outcome.Failures || len(m.Front) > 10 || len(p.Outcome.Kept) > 0 && len(m.Front) == 0 {
			t.Errorf("%d evaluations, %d feasible, %d failed, %d designs of %s", m.Evaluations, m.Feasible, m.Failures, len(m.Front), written)
		}
	})
}

// text is what an outcome holds, to be compared.
func text(o *opt.Outcome) string {
	b, err := json.Marshal(NewPartOutcome(o))
	if err != nil {
		panic(err)
	}
	return string(b)
}

// A log of any bytes gives whole blocks and what is lost after them, and takes another block. With mend the header and
// the sums of blocks are made right first, so that their contents are what is tried.
func FuzzLog(f *testing.F) {
	head := append([]byte(logMagic), make([]byte, 32)...)
	f.Add(head, false)
	f.Add(append(bytes.Clone(head), 0xff, 0xff, 0xff, 0xff, 1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0), false)
	whole := bytes.Clone(head)
	for _, p := range []string{"first", "", "\x00\xff third"} {
		h := make([]byte, blockHead)
		binary.LittleEndian.PutUint32(h, uint32(len(p)))
		binary.LittleEndian.PutUint32(h[4:], 2)
		binary.LittleEndian.PutUint64(h[8:], 1000)
		whole = append(append(whole, h...), p...)
	}
	f.Add(whole, true)
	f.Add(append(bytes.Clone(whole), whole[logHead:]...), true)
	f.Add(real(f, "checkpoint.log"), false)
	dir := f.TempDir()
	f.Fuzz(func(t *testing.T, text []byte, mend bool) {
		if mend {
			text = mended(text)
		}
		os.WriteFile(filepath.Join(dir, logFile), text, 0o666)
		var l *Log
		var k *Kept
		bounded.Read(t, len(text), func() { l, k = openLog(t, dir, 0, false) })
		defer l.Close()
		held := blocks(t, l)
		n := 0
		for _, p := range held {
			n += len(p) + blockHead
		}
		if !k.Other && len(text) > 0 && int(k.Lost)+n+logHead != len(text) || k.Other && len(held) > 0 {
			t.Errorf("%d bytes in blocks and %d lost of %d", n, k.Lost, len(text))
		}
		if k.Records < 0 || k.Spent < 0 || k.Lost < 0 {
			t.Errorf("kept %+v", k)
		}
		if err := l.Append([]byte("more"), 1, time.Second); err != nil {
			t.Fatal(err)
		}
		l.Close()
		m, again := openLog(t, dir, 0, false)
		defer m.Close()
		if got := blocks(t, m); !slices.Equal(got, append(held, "more")) || again.Lost != 0 || again.Other || again.Records != k.Records+1 || again.Spent != time.Second {
			t.Errorf("%q and one more read back as %q, %+v", held, got, again)
		}
	})
}

// mended is the text with the header of a log and right sums of its blocks, as far as their lengths allow.
func mended(text []byte) []byte {
	text = bytes.Clone(text)
	if len(text) < logHead {
		return text
	}
	clear(text[copy(text, logMagic):logHead])
	for b := text[logHead:]; len(b) >= blockHead; {
		n := uint64(binary.LittleEndian.Uint32(b))
		if n > uint64(len(b)-blockHead) {
			break
		}
		binary.LittleEndian.PutUint32(b[16:], checksum(b[:16], b[blockHead:blockHead+n]))
		b = b[blockHead+n:]
	}
	return text
}

// A certificate that is read is written, and reads back as the same bytes.
func FuzzCertificate(f *testing.F) {
	f.Add(real(f, "certificate.json"))
	f.Add([]byte(`{"format": "legwright-proof/1", "record": {}}`))
	f.Fuzz(func(t *testing.T, b []byte) {
		var c *Certificate
		var err error
		bounded.Read(t, len(b), func() { c, err = ReadCertificate(b) })
		if err != nil {
			sentence(t, err)
			return
		}
		written, err := Encode(c)
		if err != nil {
			t.Fatal(err)
		}
		back, err := ReadCertificate(written)
		if err != nil {
			t.Fatalf("%v\n%s", err, written)
		}
		if again, _ := Encode(back); !bytes.Equal(again, written) {
			t.Errorf("written as\n%s\nthen as\n%s", written, again)
		}
	})
}

// Weights that are taken rank any front; what is no weight is refused.
func FuzzWeights(f *testing.F) {
	f.Add(1.0, 0.0)
	f.Add(-1.0, 2.0)
	f.Add(math.MaxFloat64, 5e-324)
	f.Fuzz(func(t *testing.T, a, b float64) {
		front := tilter()
		w := map[string]float64{"conditioning": a, "footprint": b}
		if err := CheckWeights(front, w); err != nil {
			sentence(t, err)
			if a >= 0 && b >= 0 && a+b > 0 && !math.IsInf(a+b, 0) {
				t.Errorf("%v are refused: %v", w, err)
			}
			return
		}
		Rank(front, w)
		for i := range front.Designs {
			if s := float64(front.Designs[i].Score); !(s >= 0 && s <= 1) {
				t.Errorf("weights %v give a score of %v", w, s)
			}
		}
	})
}
