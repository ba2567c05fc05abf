package objective

import (
	"math"
	"syscall"
	"testing"
	"time"

	"legwright/kin"
)

// kernelTask is the duty by which the pose kernel is compared with other
// programs: a box of ±0.1 m and ±10°, a force of (0, 0, -600) N ± (200, 200, 300) N and
// ±50 N m, speeds of ±0.2 m/s and ±0.5 rad/s, characteristic length 0.4 m.
func kernelTask(t testing.TB) *Task {
	half := kin.Coords{0.1, 0.1, 0.1, 10 * deg, 10 * deg, 10 * deg}
	z := Zone{Name: "box", Kind: Box, High: half, Samples: 500}
	for k, h := range half {
		z.Low[k] = -h
	}
	task := &Task{
		Zones: []Zone{z},
		Cases: []Case{{Name: "process",
			Loads: []Load{{Name: "process", Force: kin.Vec{Z: 600}, ForceSpread: kin.Vec{X: 200, Y: 200, Z: 300},
				MomentSpread: kin.Vec{X: 50, Y: 50, Z: 50}}},
			Linear:  Set{Kind: PerAxis, Half: kin.Vec{X: 0.2, Y: 0.2, Z: 0.2}},
			Angular: Set{Kind: PerAxis, Half: kin.Vec{X: 0.5, Y: 0.5, Z: 0.5}}}},
		Gravity:  kin.Vec{Z: -Gravity},
		Actuator: Actuator{DeadLength: math.NaN()},
		Rule:     LengthGiven,
		Length:   0.4,
		Singular: 1e-6,
		Coverage: 1,
	}
	task.Prepare()
	return task
}

func kernelTrackers(t testing.TB, names ...string) (ts []tracker, need Need) {
	for _, n := range names {
		m := measured(t, n)
		ts = append(ts, tracker{m: m})
		need |= m.Need
	}
	return ts, need
}

// BenchmarkKernel is everything per pose: lengths, both swings, clearance,
// conditioning, exact worst force and speed, with the six neighbouring pairs of legs
// and with all fifteen. DEVELOPERS.md says how to run it beside other programs.
func BenchmarkKernel(b *testing.B) {
	task := kernelTask(b)
	for _, bench := range []struct {
		name       string
		neighbours bool
		exact      Need
	}{{"neighbours", true, 0}, {"all pairs", false, 0}, {"all pairs, every conditioning", false, NeedExact}} {
		b.Run(bench.name, func(b *testing.B) {
			setup := task.setup()
			setup.Neighbours = bench.neighbours
			m := kin.FamilyNamed("6-UPS").Build([]float64{0.65, 0.4, 18 * deg, 12 * deg, 0.8, 0.65, 0.45}, &setup)
			ts, need := kernelTrackers(b, "conditioning", "leg_force", "leg_speed", "base_swing", "platform_swing", "leg_clearance")
			v := newView(task)
			b.ReportAllocs()
			start := cpuTime()
			for b.Loop() {
				v.begin(m)
				for i := range ts {
					ts[i].reset()
				}
				v.walk(0, len(task.samples), need|bench.exact, ts)
			}
			b.ReportMetric(float64((cpuTime()-start).Nanoseconds())/float64(b.N*len(task.samples)), "cpu-ns/pose")
		})
	}
}

// BenchmarkFamilies is everything per pose of every family: a machine within the usual ranges in its starter's
// box, under the loads and speeds of kernelTask. Each is measured in turns with 6-UPS, so that the ratio of the two holds
// on a machine with other load.
func BenchmarkFamilies(b *testing.B) {
	for _, exact := range []Need{0, NeedExact} {
		name := "worst conditioning"
		if exact != 0 {
			name = "every conditioning"
		}
		b.Run(name, func(b *testing.B) {
			for _, f := range kin.Families() {
				b.Run(f.Name, func(b *testing.B) {
					unit, w := newFamilyWalk(b, kin.FamilyNamed("6-UPS"), exact), newFamilyWalk(b, f, exact)
					b.ReportAllocs()
					for b.Loop() {
						unit.run()
						w.run()
					}
					poses := float64(b.N * len(w.v.task.samples))
					b.ReportMetric(float64(w.spent.Nanoseconds())/poses, "cpu-ns/pose")
					b.ReportMetric(float64(w.spent)/float64(unit.spent), "of-6-UPS")
				})
			}
		})
	}
}

// familyWalk walks one machine of a family again and again.
type familyWalk struct {
	v     *View
	m     kin.Machine
	ts    []tracker
	need  Need
	spent time.Duration
}

func newFamilyWalk(b *testing.B, f *kin.Family, exact Need) *familyWalk {
	task := kernelTask(b)
	task.Zones = []Zone{ranged(f, Box, 1, 500)}
	task.Prepare()
	setup := task.setup()
	names := []string{"conditioning", "base_swing", "platform_swing", "leg_clearance", "leg_force", "leg_speed"}
	if f.Drive == kin.Rotary {
		names = append(names[:4], "motor_torque", "motor_speed")
	}
	w := &familyWalk{v: newView(task), m: f.Build(soundDesign(f), &setup)}
	w.ts, w.need = kernelTrackers(b, names...)
	w.need |= exact
	w.run()
	if w.v.lost > 0 || w.v.homeSign == 0 {
		b.Fatalf("%d poses out of reach, sign at home %d", w.v.lost, w.v.homeSign)
	}
	w.spent = 0
	return w
}

func (w *familyWalk) run() {
	start := cpuTime()
	w.v.begin(w.m)
	for i := range w.ts {
		w.ts[i].reset()
	}
	w.v.walk(0, len(w.v.task.samples), w.need, w.ts)
	w.spent += cpuTime() - start
}

// cpuTime is the processor time of the process, which other load disturbs less than the wall's.
func cpuTime() time.Duration {
	var r syscall.Rusage
	if err := syscall.Getrusage(syscall.RUSAGE_SELF, &r); err != nil {
		panic(err)
	}
	return time.Duration(r.Utime.Nano() + r.Stime.Nano())
}
