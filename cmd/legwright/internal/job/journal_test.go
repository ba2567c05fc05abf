package job

import (
	"context"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"
	"time"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// folder is a locked study folder.
func folder(t *testing.T, dir string) *study.Folder {
	t.Helper()
	f, err := study.Create(dir, study.Intent{Force: true})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

// journal opens the journal of a folder.
func journal(t *testing.T, f *study.Folder, fresh bool) (*Journal, *study.Kept) {
	t.Helper()
	log, kept, err := f.OpenLog([32]byte{1}, fresh)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { log.Close() })
	return NewJournal(log, kept, time.Hour, func(text string) { t.Error(text) }), kept
}

// A result reads back bit by bit, NaN included.
func TestRecordsReadBack(t *testing.T) {
	nan := math.NaN()
	for _, r := range []opt.Result{
		{Goals: []float64{1.0 / 3, -2}, Excess: []float64{0, -1, 0}},
		{Goals: []float64{nan, nan}, Excess: []float64{0.5, 0, math.Copysign(0, -1)}, Violation: 0.5},
		{Goals: []float64{nan, nan}, Excess: []float64{0, 0, 0}, Violation: math.Inf(1), Fault: "panic: über"},
		{Goals: []float64{nan, 1}, Excess: []float64{0, 0, 0}, Violation: math.Inf(1), Fault: "goal 0 is NaN"},
		{Goals: []float64{math.Copysign(0, -1), 0}, Excess: []float64{0, 0, 0}},
	} {
		b := encode(nil, &r)
		got := opt.Result{Goals: []float64{nan, nan}, Excess: make([]float64, 3)}
		if !decode(b, &got) {
			t.Fatalf("%+v does not read back", r)
		}
		bits := func(r opt.Result) (out []uint64) {
			for _, v := range slices.Concat(r.Goals, r.Excess, []float64{r.Violation}) {
				out = append(out, math.Float64bits(v))
			}
			return out
		}
		if !slices.Equal(bits(got), bits(r)) || got.Fault != r.Fault {
			t.Errorf("%+v reads back as %+v", r, got)
		}
	}
}

const journalBrief = `
title: Stage
family: 3-RPR
dimensions: {base_radius: [200 mm, 500 mm], platform_radius: [50 mm, 200 mm], home_heading: [20 deg, 160 deg], leg_min: sized, stroke: sized}
duty: {zones: [{name: work, box: {x: 20 mm, y: 20 mm, yaw: 5 deg}, samples: 20}]}
goals: [{minimise: footprint}, {maximise: conditioning}]
limits: [{measure: conditioning, at_least: 0.05}]
`

// A run that is broken off anywhere and gone on with, again and again, ends where an unbroken one does,
// with any number of workers, and evaluates nothing twice but what the log did not hold.
func TestJournalGoesOn(t *testing.T) {
	s := studyOf(t, journalBrief)
	run := Run{Evaluations: 1500, Seed: 3, Workers: 1}
	want, err := s.Search(t.Context(), run)
	if err != nil {
		t.Fatal(err)
	}
	f := folder(t, t.TempDir())
	fresh := true
	for n := 0; ; n++ {
		j, kept := journal(t, f, fresh)
		if !fresh && kept.Records == 0 {
			t.Fatal("nothing was kept")
		}
		fresh = false
		ctx, stop := context.WithCancel(t.Context())
		run.Journal, run.Workers = j, 1+n%3
		at := 250 * (n + 1)
		run.Progress = func(p opt.Progress) {
			if p.Evaluations >= at {
				stop()
			}
		}
		got, err := s.Search(ctx, run)
		stop()
		if err != nil {
			t.Fatal(err)
		}
		if got.Status == opt.Interrupted {
			continue
		}
		if n < 4 {
			t.Errorf("broken off %d times; the test tests little", n)
		}
		if !reflect.DeepEqual(got, want) {
			t.Error("ends elsewhere than the unbroken run")
		}
		break
	}
	// All of it from the log now: no design is new.
	j, kept := journal(t, f, false)
	run.Journal, run.Progress = j, nil
	if kept.Records != 1500 {
		t.Errorf("%d records of 1500 evaluations", kept.Records)
	}
	if got, err := s.Search(t.Context(), run); err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("the replay ends elsewhere: %v", err)
	}
	if !j.begun.IsZero() {
		t.Error("the replay evaluates")
	}
}

// A log of another program's evaluations is told, not gone on with in silence.
func TestForeignJournal(t *testing.T) {
	s := studyOf(t, journalBrief)
	f := folder(t, t.TempDir())
	j, _ := journal(t, f, true)
	r := opt.Result{Goals: []float64{1, 2}, Excess: []float64{0}}
	for i := range mostAhead + 2000 {
		j.record(0, []float64{float64(i)}, &r)
	}
	if err := j.Flush(); err != nil {
		t.Fatal(err)
	}
	j, _ = journal(t, f, false)
	_, err := s.Search(t.Context(), Run{Evaluations: 1000, Journal: j})
	if err == nil || !strings.Contains(err.Error(), "--force") {
		t.Errorf("got %v", err)
	}
}

// Time that processes before have spent counts; time while results are recalled does not.
func TestTimeOverProcesses(t *testing.T) {
	s := studyOf(t, journalBrief)
	f := folder(t, t.TempDir())
	j, _ := journal(t, f, true)
	run := Run{Evaluations: 600, Seed: 3, Workers: 1, Journal: j}
	ctx, stop := context.WithCancel(t.Context())
	run.Progress = func(p opt.Progress) {
		if p.Evaluations > 300 {
			stop()
		}
	}
	if _, err := s.Search(ctx, run); err != nil {
		t.Fatal(err)
	}
	j, kept := journal(t, f, false)
	if kept.Spent < 0 || kept.Spent > time.Hour || kept.Records < 300 {
		t.Fatalf("kept %+v", kept)
	}
	j.before = time.Hour
	run.Journal, run.Progress, run.Time = j, nil, time.Minute // long over
	got, err := s.Search(t.Context(), run)
	if err != nil {
		t.Fatal(err)
	}
	if got.Status != opt.TimeSpent || got.Front.StoppedBy != "time" || got.Front.Evaluations < kept.Records || got.Front.Evaluations > kept.Records+100 {
		t.Errorf("%v by %s after %d, with %d in the log", got.Status, got.Front.StoppedBy, got.Front.Evaluations, kept.Records)
	}
	if j.spent() < time.Hour {
		t.Errorf("spent %v", j.spent())
	}
}

// A disk that is full for a while loses nothing; one that stays full ends the saving, not the search.
func TestJournalOnAFullDisk(t *testing.T) {
	f := folder(t, t.TempDir())
	log, kept, err := f.OpenLog([32]byte{1}, true)
	if err != nil {
		t.Fatal(err)
	}
	var told []string
	j := NewJournal(log, kept, time.Hour, func(s string) { told = append(told, s) })
	r := opt.Result{Goals: []float64{1, 2}, Excess: []float64{0}}
	j.record(0, []float64{1}, &r)
	log.Close() // every write fails now, as on a full disk
	if err := j.Flush(); err == nil || len(told) != 1 || !strings.Contains(told[0], "1 evaluations are not saved yet") {
		t.Errorf("told %q, %v", told, err)
	}
	j.record(0, []float64{2}, &r)
	log, _, err = f.OpenLog([32]byte{1}, false)
	if err != nil {
		t.Fatal(err)
	}
	j.log = log // room again
	if err := j.Flush(); err != nil {
		t.Fatal(err)
	}
	if _, kept, _ = f.OpenLog([32]byte{1}, false); kept.Records != 2 {
		t.Errorf("%d records", kept.Records)
	}
	log.Close()
	told = nil
	long := opt.Result{Goals: []float64{1, 2}, Excess: []float64{0}, Violation: math.Inf(1), Fault: strings.Repeat("x", 1<<16)}
	for i := range 2000 {
		j.record(0, []float64{float64(i)}, &long)
		if i%100 == 99 {
			j.Flush()
		}
	}
	if !j.dead || len(j.buf) != 0 || !strings.Contains(told[len(told)-1], "no more of it is saved") {
		t.Errorf("%d bytes wait; told %q", len(j.buf), told)
	}
}

// studyOf makes the study of a brief.
func studyOf(t *testing.T, text string) *Study {
	t.Helper()
	path := filepath.Join(t.TempDir(), "brief.yaml")
	if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
		t.Fatal(err)
	}
	return load(t, path)
}

// BenchmarkReplay measures what an evaluation of the embedded example costs when it comes from the log,
// in wall time of one worker, beside what judging it costs.
func BenchmarkReplay(b *testing.B) {
	const evaluations = 4000
	br, err := brief.Load(briefs+"tilt-table.yaml", *Known())
	if err != nil {
		b.Fatal(err)
	}
	s, err := New(br)
	if err != nil {
		b.Fatal(err)
	}
	f, err := study.Create(b.TempDir(), study.Intent{})
	if err != nil {
		b.Fatal(err)
	}
	defer f.Close()
	search := func(fresh bool) time.Duration {
		log, kept, err := f.OpenLog([32]byte{1}, fresh)
		if err != nil {
			b.Fatal(err)
		}
		defer log.Close()
		j := NewJournal(log, kept, time.Hour, func(string) {})
		p := s.problem(1)
		set := opt.Settings{Evaluations: evaluations, Workers: 1}
		j.attach(&p, &set, func() {})
		begin := time.Now()
		if _, err := opt.Search(context.Background(), p, set); err != nil {
			b.Fatal(err)
		}
		d := time.Since(begin)
		if err := j.Flush(); err != nil {
			b.Fatal(err)
		}
		return d
	}
	var judged, replayed time.Duration
	for b.Loop() {
		judged += search(true)
		replayed += search(false)
	}
	n := float64(b.N * evaluations)
	b.ReportMetric(0, "ns/op")
	b.ReportMetric(float64(judged.Microseconds())/n, "µs/judged")
	b.ReportMetric(float64(replayed.Microseconds())/n, "µs/replayed")
}
