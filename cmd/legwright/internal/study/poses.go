package study

import (
	"bufio"
	"io"
	"strconv"
	"strings"

	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// WritePoses writes as CSV what a design does at each of its required poses, by zone and in the order
// of generation or of the file: the pose about home, then for each leg its coordinate, the largest
// absolute effort and rate over all cases and the swings of its joints, then the clearance, the
// conditioning, ok (true or false) and the first limit that failed. Beyond the pose the cells of a
// pose that cannot be reached are empty. Numbers have 15 significant digits.
func WritePoses(w io.Writer, t *objective.Task, a *objective.Appraisal) error {
	b := bufio.NewWriter(w)
	family := a.Plan.Family
	coordinate, effort, rate := DriveKinds(family.Name)
	legs := a.Machine.Frame().Legs()

	b.WriteString(strings.Join(poseHeads(family, legs), ",") + "\n")
	rows := objective.Poses(t, a)
	for i := range rows {
		r := &rows[i]
		for q, c := range r.Sample.Coords {
			k := units.Length
			if kin.Freedom(q).Angular() {
				k = units.Angle
			}
			b.WriteString(plain(c, k) + ",")
		}
		cell := func(v float64, k units.Kind) {
			if r.Reached {
				b.WriteString(plain(v, k))
			}
			b.WriteByte(',')
		}
		for l := range legs {
			cell(r.Q[l], coordinate)
			cell(r.Effort[l], effort)
			cell(r.Rate[l], rate)
			cell(r.BaseSwing[l], units.Angle)
			cell(r.PlatformSwing[l], units.Angle)
		}
		cell(r.Clearance, units.Length)
		cell(r.Conditioning, units.Ratio)
		b.WriteString(strconv.FormatBool(r.Fails == "") + "," + quote(r.Fails) + "\n")
	}
	return b.Flush()
}

// poseHeads are the headings of WritePoses.
func poseHeads(f *kin.Family, legs int) []string {
	names := [3]string{"_length_mm", "_force_N", "_speed_mm_s"}
	if f.Drive == kin.Rotary {
		names = [3]string{"_angle_deg", "_torque_Nm", "_speed_rad_s"}
	}
	out := []string{"x_mm", "y_mm", "z_mm", "roll_deg", "pitch_deg", "yaw_deg"}
	for i := range legs {
		leg := "leg" + strconv.Itoa(i+1)
		for _, n := range names {
			out = append(out, leg+n)
		}
		out = append(out, leg+"_base_swing_deg", leg+"_platform_swing_deg")
	}
	return append(out, "leg_clearance_mm", "conditioning", "ok", "failed")
}

// quote makes a text fit for a CSV cell.
func quote(s string) string {
	if strings.ContainsAny(s, ",\"\n\r") {
		return `"` + strings.ReplaceAll(s, `"`, `""`) + `"`
	}
	return s
}
