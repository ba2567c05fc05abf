package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"time"

	"github.com/spf13/cobra"

	"legwright/cmd/legwright/internal/job"
	"legwright/cmd/legwright/internal/report"
	"legwright/cmd/legwright/internal/study"
	"legwright/objective/proof"
)

// exitUndecided is the status of a proof that ran out of time.
const exitUndecided = 4

// proveFlags are the flags of prove.
type proveFlags struct {
	brief, check, out string
	resize, force     bool
	timed             bool // --time was given
	set               proof.Settings
}

func newProve(c *common) *cobra.Command {
	var flags proveFlags
	cmd := &cobra.Command{
		Use:   "prove DESIGN",
		Short: "the limits over the continuous duty, not at samples",
		Long: `prove shows for every pose of the duty's continuous zones, rotations included, that
the design can take it, that actuators and joints stay in range, that no pose is
singular, and that the brief's limits on clearance, conditioning, efforts and rates
hold. It looks for a counterexample first, then splits the zones into boxes and
bounds everything on each. The answer holds for the model: rigid links, exact
dimensions, the payload as stated. It exits with 0 if everything is proved, 3 if
something is refuted, by a pose that it names, and 4 if time is out or undecided.

A limit that a pose meets exactly cannot be proved: where the worst pose found is
nearer to the limit than --gap, the limit is proved less the gap, and that is said.
What was proved is written beside the design as a certificate; --check FILE replays
one, without any search. --resize first widens an actuator range that the brief
leaves to the duty to what all poses need for certain, and writes the widened design.`,
		Args: cobra.ExactArgs(1),
		RunE: func(cmd *cobra.Command, args []string) error {
			flags.timed = cmd.Flags().Changed("time")
			return prove(cmd.Context(), c, args[0], &flags)
		},
	}
	f := cmd.Flags()
	f.StringVar(&flags.brief, "brief", "", "brief to prove by, in place of the one that the design file names")
	f.DurationVar(&flags.set.Time, "time", time.Minute, "time after which to stop undecided; a --check takes what it needs unless this is given")
	f.Float64Var(&flags.set.Gap, "gap", proof.DefaultGap, "relative distance to which a limit that is met, or nearly, is proved")
	f.IntVar(&flags.set.Workers, "workers", 0, "boxes tested side by side (default: all processors); never changes the answer")
	f.BoolVar(&flags.resize, "resize", false, "widen the actuator range to the proved one first, and write the widened design")
	f.StringVarP(&flags.out, "output", "o", "", "`file` for the widened design (default: DESIGN with .resized before its ending)")
	f.BoolVar(&flags.force, "force", false, "replace the file of a widened design that exists")
	f.StringVar(&flags.check, "check", "", "replay the certificate in this `file` and prove nothing else")
	return cmd
}

func prove(ctx context.Context, c *common, file string, flags *proveFlags) error {
	switch {
	case !(flags.set.Gap > 0 && flags.set.Gap <= proof.MostGap):
		return inputError{fmt.Errorf("--gap %g: a gap is a share above 0 and at most %g, such as 0.01 for 1 %%", flags.set.Gap, proof.MostGap)}
	case flags.set.Time <= 0:
		return inputError{fmt.Errorf("--time %v: give a time above 0, such as 60s", flags.set.Time)}
	case flags.out != "" && !flags.resize:
		return inputError{fmt.Errorf("-o %s: only --resize writes a design; give that too, or leave -o out", flags.out)}
	}
	s, err := job.NewSubject(file, flags.brief)
	if err != nil {
		return inputError{err}
	}
	bar := report.NewProgress(c.err, -1, c.quiet)
	flags.set.Progress = func(p proof.Progress) { bar.Show(report.Settled(p.Settled, p.Boxes)) }
	if flags.check != "" {
		if !flags.timed {
			flags.set.Time = 0
		}
		err := checkProof(ctx, c, s, flags)
		bar.Done()
		return err
	}
	begun := time.Now()
	var resized *study.Resized
	if flags.resize {
		if resized, err = resize(ctx, s, file, flags); err != nil {
			bar.Done()
			if ctx.Err() != nil {
				return status(exitInterrupted)
			}
			return inputError{err}
		}
		file = resized.File
	}
	if flags.set.Time -= time.Since(begun); flags.set.Time <= 0 {
		flags.set.Time = 1
	}
	r := s.Prove(ctx, flags.set)
	bar.Done()
	p := study.FromProof(s.Task, s.Plan.Family.Name, r)
	p.Resized, p.Own = resized, s.Own()
	p.Notes = study.LeftOut(0)[1:]
	if s.Task.Coverage < 1 || s.Task.CoverageGoal {
		p.Notes = append(p.Notes, "the brief lets poses fail (coverage); the proof is about all of them")
	}
	if r.Answer != proof.Refuted && r.Regions > 0 {
		if p.Certificate, err = writeCertificate(s, r, file+study.CertificateEnding); err != nil {
			return err
		}
	}
	if c.json {
		err = printJSON(c.out, p)
	} else {
		err = report.Proof(c.out, &p, report.PageOf(c.out))
	}
	switch {
	case err != nil:
		return err
	case r.Answer == proof.Refuted || len(p.Broken()) > 0:
		return status(exitLimit)
	case r.Interrupted:
		return status(exitInterrupted)
	case r.Answer == proof.Undecided:
		return status(exitUndecided)
	}
	return nil
}

// writeCertificate writes what was proved, and gives the file's path, "" where it is nothing.
func writeCertificate(s *job.Subject, r *proof.Result, path string) (string, error) {
	cert, err := s.Certificate(r)
	if err != nil || cert == nil {
		return "", err
	}
	text, err := study.Encode(cert)
	if err != nil {
		return "", err
	}
	if err := study.WriteFile(path, text); err != nil {
		return "", inputError{err}
	}
	return path, nil
}

// resize widens the range of s and writes the widened design.
func resize(ctx context.Context, s *job.Subject, file string, flags *proveFlags) (*study.Resized, error) {
	out := flags.out
	if out == "" {
		end := filepath.Ext(file)
		out = strings.TrimSuffix(file, end) + ".resized.yaml"
	}
	if end := filepath.Ext(out); end != ".yaml" && end != ".yml" {
		return nil, fmt.Errorf("-o %s: the file is YAML; give a name that ends in .yaml", out)
	}
	if _, err := os.Stat(out); err == nil && !flags.force {
		return nil, fmt.Errorf("%s exists; give another name with -o, or --force to replace it", out)
	}
	r, text, err := s.Resize(ctx, out, flags.set)
	if err != nil {
		return nil, err
	}
	return r, study.WriteFile(out, text)
}

// checkProof replays a certificate.
func checkProof(ctx context.Context, c *common, s *job.Subject, flags *proveFlags) error {
	cert, err := study.LoadCertificate(flags.check)
	if err != nil {
		return inputError{fmt.Errorf("--check %s: %w", flags.check, err)}
	}
	boxes, err := s.Check(ctx, cert, flags.set)
	switch {
	case ctx.Err() != nil:
		return status(exitInterrupted)
	case errors.Is(err, proof.ErrTime):
		c.hint("--check %s: time is out before all boxes were replayed; nothing is shown. Give more with --time, or leave it out.", flags.check)
		return status(exitUndecided)
	case err != nil:
		return inputError{fmt.Errorf("--check %s: the certificate is refused: %w", flags.check, err)}
	}
	if c.json {
		return printJSON(c.out, map[string]any{"certificate": flags.check, "holds": true, "boxes": boxes, "properties": cert.Claims, "outside_model": study.OutsideModel()})
	}
	if err := report.Checked(c.out, cert, boxes, report.PageOf(c.out)); err != nil || cert.Answer == proof.Proved.String() {
		return err
	}
	c.hint("the certificate is of a proof that left other properties of the design undecided")
	return status(exitUndecided)
}
