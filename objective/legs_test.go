package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// What each leg must do is the extreme of the pose table, leg by leg; over all legs it is the duty-wide measure. Exact.
func TestLegsOfAnAppraisal(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(171)
		for range 3 {
			task := richTask(rng, f)
			task.Prepare()
			task = pinned(task)
			a := appraise(task, f, randomDesign(rng, f))
			home := staticsOf(a.Machine.Frame(), kin.Coords{}).leng
			rows := Poses(task, a)
			most := map[string]float64{}
			for i, l := range a.Legs {
				near(t, "home", l.Home, home[i], 1e-15)
				least, longest, base, platform, speed, force := l.Home, l.Home, 0.0, 0.0, 0.0, 0.0
				for _, r := range rows {
					least, longest = math.Min(least, r.Q[i]), math.Max(longest, r.Q[i])
					base, platform = math.Max(base, r.BaseSwing[i]), math.Max(platform, r.PlatformSwing[i])
					speed, force = math.Max(speed, r.Rate[i]), math.Max(force, r.Effort[i])
				}
				near(t, "least", l.Least, least, 0)
				near(t, "most", l.Most, longest, 0)
				near(t, "base swing", l.BaseSwing, base, 0)
				near(t, "platform swing", l.PlatformSwing, platform, 0)
				near(t, "speed", l.Speed, speed, 0)
				near(t, "larger of push and pull", math.Max(l.Push, l.Pull), force, 0)
				for at, q := range map[*Sample]float64{l.LeastAt: l.Least, l.MostAt: l.Most} {
					c := kin.Coords{}
					if at != nil {
						c = at.Coords
					}
					near(t, "length where it is said to be", staticsOf(a.Machine.Frame(), c).leng[i], q, 1e-15)
				}
				for name, v := range map[string]float64{"push_force": l.Push, "pull_force": l.Pull, "leg_speed": l.Speed,
					"base_swing": l.BaseSwing, "platform_swing": l.PlatformSwing} {
					most[name] = math.Max(most[name], v)
				}
			}
			for name, v := range most {
				near(t, name, v, value(t, a, name), 0)
			}
		}
	})
}

// mean_conditioning leaves out the corners and centres of boxes and ellipsoids, and excursions, and counts every
// pose of files: by hand over the pose table, 1e-14. With excursions alone it is over them.
func TestWhatTheMeanIsOver(t *testing.T) {
	eachFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(172), f)
		k := len(f.Freedoms)
		mean := func(counts func(s *Sample) bool) (got, want float64) {
			task.Prepare()
			a := appraise(task, f, soundDesign(f))
			sum, n := 0.0, 0
			for _, r := range Poses(task, a) {
				if counts(r.Sample) {
					sum += r.Conditioning
					n++
				}
			}
			return value(t, a, "mean_conditioning"), sum / float64(n)
		}
		got, want := mean(func(s *Sample) bool {
			switch s.Zone {
			case 0:
				return s.Row > 1<<k // after the corners and the centre
			case 1:
				return false
			case 2: // half of what follows the centre and the ends is on the surface
				free := task.Zones[2].Samples - 1 - 2*k
				return s.Row > 2*k+free-free/2
			}
			return true
		})
		near(t, "mean_conditioning", got, want, 1e-14)
		task.Zones, task.Cases = task.Zones[1:2], nil
		got, want = mean(func(*Sample) bool { return true })
		near(t, "mean over excursions", got, want, 1e-14)
	})
}
