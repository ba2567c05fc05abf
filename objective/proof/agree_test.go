package proof

import (
	"context"
	"fmt"
	"io"
	"strings"
	"testing"
)

// small is a proof of every limit that takes few boxes.
func small(t testing.TB) (*subject, *Result) {
	task := studyA(0.4)
	v := front(t, 30)
	p := slackened(t, task, "6-UPS", v, 0.05, everyLimit...)
	r := prove(t, task, p, v, Settings{Workers: 1})
	if r.Answer != Proved {
		report(t, r)
		t.Fatal("a limit 5 % off is not proved")
	}
	return &subject{task: task, plan: p, values: v}, r
}

// told is everything of a result but the pointers in it.
func told(r *Result) string {
	var b strings.Builder
	for i := range r.Outcomes {
		o := r.Outcomes[i]
		o.Measure, o.At = nil, nil
		fmt.Fprintf(&b, "%+v\n", o)
	}
	fmt.Fprintf(&b, "%d %+v", r.Boxes, r.Worst)
	return b.String()
}

func TestAnyNumberOfWorkersAgrees(t *testing.T) {
	s, one := small(t)
	for _, n := range []int{2, 8} {
		r := prove(t, s.task, s.plan, s.values, Settings{Workers: n})
		if told(r) != told(one) {
			report(t, r)
			t.Errorf("%d workers: %d boxes instead of %d", n, r.Boxes, one.Boxes)
		}
	}
	// and one that ends by its number of boxes
	a := prove(t, s.task, s.plan, s.values, Settings{Workers: 1, Boxes: 300})
	b := prove(t, s.task, s.plan, s.values, Settings{Workers: 3, Boxes: 300})
	if told(a) != told(b) || a.Answer != Undecided || !a.OutOfTime || a.Worst == nil {
		report(t, a)
		report(t, b)
		t.Errorf("ended early, workers disagree")
	}
}

func TestEndOfContext(t *testing.T) {
	s, _ := small(t)
	ctx, cancel := context.WithCancel(context.Background())
	seen := 0.0
	r := Prove(ctx, s.task, s.plan, s.values, Settings{Workers: 1, Progress: func(p Progress) {
		if seen = p.Settled; p.Boxes > 100 {
			cancel()
		}
	}})
	if !r.Interrupted || r.Answer != Undecided || seen <= 0 || r.Worst == nil {
		t.Errorf("interrupted at a share of %g: %+v", seen, r)
	}
	proved := 0
	for i := range r.Outcomes {
		if r.Outcomes[i].Answer == Proved {
			proved++
		}
	}
	if proved == 0 {
		t.Error("nothing that was proved before is told")
	}
}

func TestRecordsAreChecked(t *testing.T) {
	s, r := small(t)
	rec, err := r.Record()
	if err != nil {
		t.Fatal(err)
	}
	ctx := context.Background()
	check := func(rec *Record) error {
		_, err := Check(ctx, s.task, s.plan, s.values, rec, Settings{Workers: 2})
		return err
	}
	if err := check(rec); err != nil {
		t.Fatalf("a good record is refused: %v", err)
	}
	spoil := func(what, says string, f func(c *Record)) {
		t.Helper()
		c := *rec
		c.Claims = append([]Claim(nil), rec.Claims...)
		c.Trees = append([]Branch(nil), rec.Trees...)
		f(&c)
		if err := check(&c); err == nil || !strings.Contains(err.Error(), says) {
			t.Errorf("%s: %v", what, err)
		}
	}
	place := map[string]int{}
	for i, c := range rec.Claims {
		place[c.Property] = i
	}
	spoil("a stronger claim", "neither the limit", func(c *Record) { c.Claims[place["conditioning"]].Target *= 1.06 })
	spoil("a weaker claim", "neither the limit", func(c *Record) { c.Claims[place["leg_force"]].Target *= 1.02 })
	spoil("another property", "none that", func(c *Record) { c.Claims[place["leg_force"]].Property = "leg_speed" })
	spoil("a tree left out", "shown for no box", func(c *Record) { c.Trees = c.Trees[1:] })
	spoil("other splits", "", func(c *Record) {
		text, err := io.ReadAll(inflate(c.Trees[1].Splits))
		if err != nil {
			t.Fatal(err)
		}
		text[0] = (text[0] + 1) % 6
		if c.Trees[1].Splits, err = deflated(text); err != nil {
			t.Fatal(err)
		}
	})
	spoil("branches cut off", "", func(c *Record) {
		text, err := io.ReadAll(inflate(c.Trees[1].Splits))
		if err != nil {
			t.Fatal(err)
		}
		if c.Trees[1].Splits, err = deflated(text[:len(text)/2]); err != nil {
			t.Fatal(err)
		}
	})
	spoil("a whole box claimed", "does not keep", func(c *Record) {
		i := 1
		c.Trees[i].Boxes = 1
		var err error
		if c.Trees[i].Splits, err = deflated([]byte{settled | closes, byte(1<<len(c.Trees[i].Claims) - 1)}); err != nil {
			t.Fatal(err)
		}
	})
}
