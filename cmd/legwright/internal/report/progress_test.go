package report

import (
	"bytes"
	"strings"
	"testing"
	"time"
)

// at makes a progress with a clock that the test turns.
func at(p *Progress, clock *time.Time) *Progress {
	p.now = func() time.Time { return *clock }
	p.started, p.told = *clock, *clock
	return p
}

func TestProgressBeatsSlowlyOffTerminals(t *testing.T) {
	var b bytes.Buffer
	clock := time.Unix(1000, 0)
	p := at(NewProgress(&b, 20000, false), &clock)
	for i := range 250 {
		clock = clock.Add(100 * time.Millisecond)
		p.Show(Count{Evaluations: 80 * (i + 1), Feasible: 20 * (i + 1), Hypervolume: 0.25, Phase: "search"})
	}
	p.Done()
	p.Done()
	want := "8000 of 20000 evaluations, 800/s, 15 s left, 25 % feasible, hypervolume 0.25, search\n" +
		"16000 of 20000 evaluations, 800/s, 5 s left, 25 % feasible, hypervolume 0.25, search\n" +
		"20000 of 20000 evaluations, 800/s, 25 % feasible, hypervolume 0.25, search\n"
	if b.String() != want {
		t.Errorf("got\n%swant\n%s", b.String(), want)
	}
}

func TestProgressRedrawsOneLineOnATerminal(t *testing.T) {
	var b bytes.Buffer
	clock := time.Unix(1000, 0)
	p := at(NewProgress(&b, 1000, false), &clock)
	p.live, p.width = true, 80
	for i := range 10 {
		clock = clock.Add(50 * time.Millisecond)
		p.Show(Count{Evaluations: 100 * (i + 1), Phase: strings.Repeat("x", 10-i)})
	}
	p.Done()
	if n := strings.Count(b.String(), "\n"); n != 1 {
		t.Errorf("%d lines were ended, want the last state alone: %q", n, b.String())
	}
	if got := screen(b.String()); got != "1000 of 1000 evaluations, 2000/s, 0 % feasible, x\n" {
		t.Errorf("the terminal shows %q", got)
	}
}

// screen plays carriage returns and backspaces as a terminal does.
func screen(s string) string {
	var out strings.Builder
	var line []rune
	col := 0
	for _, r := range s {
		switch r {
		case '\r':
			col = 0
		case '\b':
			col--
		case '\n':
			out.WriteString(strings.TrimRight(string(line), " ") + "\n")
			line, col = nil, 0
		default:
			if col == len(line) {
				line = append(line, r)
			} else {
				line[col] = r
			}
			col++
		}
	}
	return out.String() + string(line)
}

func TestProgressQuiet(t *testing.T) {
	var b bytes.Buffer
	p := NewProgress(&b, 10, true)
	p.Show(Count{Evaluations: 5})
	p.Done()
	new(Progress).Show(Count{Evaluations: 1})
	if b.Len() != 0 {
		t.Errorf("quiet, but said %q", b.String())
	}
}

func TestProgressNarrowTerminal(t *testing.T) {
	var b bytes.Buffer
	clock := time.Unix(1000, 0)
	p := at(NewProgress(&b, 100000, false), &clock)
	p.live, p.width = true, 20
	clock = clock.Add(time.Second)
	p.Show(Count{Evaluations: 50000, Feasible: 1, Hypervolume: 0.1})
	for l := range strings.SplitSeq(b.String(), "\r") {
		if len(l) > 19 {
			t.Errorf("line of %d columns would wrap: %q", len(l), l)
		}
	}
}

func TestClock(t *testing.T) {
	for _, c := range []struct {
		seconds float64
		want    string
	}{{0, "0 s"}, {59.4, "59 s"}, {59.6, "1 min 00 s"}, {185, "3 min 05 s"}, {7800, "2 h 10 min"}, {1e300, "over 1000 h"}} {
		if got := clock(c.seconds); got != c.want {
			t.Errorf("clock(%v) = %q, want %q", c.seconds, got, c.want)
		}
	}
}
