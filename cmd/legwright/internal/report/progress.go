package report

import (
	"fmt"
	"io"
	"os"
	"strings"
	"sync"
	"time"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"

	"github.com/jedib0t/go-pretty/v6/text"
	"golang.org/x/term"
)

// Progress tells how a search goes on: on a terminal in one line that is drawn again and again,
// elsewhere in plain lines at a slow beat. The zero value and nil tell nothing. Its methods may be
// called from any goroutine.
type Progress struct {
	mu     sync.Mutex
	w      io.Writer
	live   bool
	width  int
	budget int
	now    func() time.Time

	started, told time.Time
	last          Count
	line          string // on the terminal now
	pending       bool   // last was not told yet
}

// Count is what a search has done so far.
type Count struct {
	Evaluations int
	Feasible    int     // designs among the evaluated
	Hypervolume float64 // 0 before there is one
	Phase       string  // what the search is doing
}

// The beats of the progress: between two drawings on a terminal, and between two plain lines.
const (
	liveBeat  = 100 * time.Millisecond
	plainBeat = 10 * time.Second
)

// NewProgress starts to tell of a search with a budget of evaluations, or of phases alone where it is below zero. Quiet
// makes it tell nothing.
func NewProgress(w io.Writer, budget int, quiet bool) *Progress {
	if quiet {
		return nil
	}
	p := &Progress{w: w, budget: budget, now: time.Now, width: usualWidth}
	if f, ok := w.(*os.File); ok && term.IsTerminal(int(f.Fd())) && os.Getenv("TERM") != "dumb" {
		p.live = true
		if width, _, err := term.GetSize(int(f.Fd())); err == nil && width > 0 {
			p.width = width
		}
	}
	p.started = p.now()
	p.told = p.started
	return p
}

// Show takes note of what was done, and tells it if it is time to.
func (p *Progress) Show(c Count) {
	if p == nil || p.w == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.last, p.pending = c, true
	beat := plainBeat
	if p.live {
		beat = liveBeat
	}
	if p.now().Sub(p.told) >= beat {
		p.tell()
	}
}

// Done tells the last state, if it was not told yet, and ends the line.
func (p *Progress) Done() {
	if p == nil || p.w == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.pending {
		p.tell()
	}
	if p.live && p.line != "" {
		fmt.Fprintln(p.w)
		p.line = ""
	}
}

// tell writes the state.
func (p *Progress) tell() {
	p.told, p.pending = p.now(), false
	t := p.words()
	if !p.live {
		fmt.Fprintln(p.w, t)
		return
	}
	t = text.Trim(t, max(p.width-1, 1))
	blank := max(text.StringWidth(p.line)-text.StringWidth(t), 0)
	fmt.Fprint(p.w, "\r", t, strings.Repeat(" ", blank), strings.Repeat("\b", blank))
	p.line = t
}

// words is the state in a line.
func (p *Progress) words() string {
	c := p.last
	if p.budget < 0 {
		return study.Clean(c.Phase)
	}
	parts := []string{fmt.Sprintf("%d of %d evaluations", c.Evaluations, p.budget)}
	if p.budget <= 0 {
		parts[0] = fmt.Sprintf("%d evaluations", c.Evaluations)
	}
	spent := p.now().Sub(p.started).Seconds()
	if c.Evaluations > 0 && spent > 0 {
		rate := float64(c.Evaluations) / spent
		parts = append(parts, units.Digits(rate, 3)+"/s")
		if left := p.budget - c.Evaluations; left > 0 {
			parts = append(parts, clock(float64(left)/rate)+" left")
		}
	}
	if c.Evaluations > 0 {
		parts = append(parts, units.Digits(100*float64(c.Feasible)/float64(c.Evaluations), 2)+" % feasible")
	}
	if c.Hypervolume > 0 {
		parts = append(parts, "hypervolume "+units.Digits(c.Hypervolume, fewDigits))
	}
	if c.Phase != "" {
		parts = append(parts, study.Clean(c.Phase))
	}
	return strings.Join(parts, ", ")
}

// clock shows seconds as a person would say them: 12 s, 3 min 05 s, 2 h 10 min.
func clock(seconds float64) string {
	const most = 1000 * 3600
	if !(seconds < most) {
		return "over 1000 h"
	}
	n := int(seconds + 0.5)
	switch {
	case n < 60:
		return fmt.Sprintf("%d s", n)
	case n < 3600:
		return fmt.Sprintf("%d min %02d s", n/60, n%60)
	}
	return fmt.Sprintf("%d h %02d min", n/3600, n%3600/60)
}
