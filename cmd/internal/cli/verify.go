package cli

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

type verifyOptions struct {
	json bool
	jobs int
}

func newVerifyCommand() *cobra.Command {
	o := &verifyOptions{}
	c := &cobra.Command{
		Use:   "verify FOLDER",
		Short: "Try to refute a finished comparison",
		Long: `verify checks a finished comparison from its result.json and witnesses.json alone. It evaluates every witness again: the cheaper
design, the slip, its FS. Then it searches every option that meets the target anew, with other trial slips and four times the effort. An option
for which it finds a slip below the required FS is refuted, and the slip is printed. So is every option that meets the target with a strength
that an observed slip leaves open.

What is not refuted is not thereby proven: no slip below the target was found in so many searches.

` + exitCodes(exitOK, exitInput, exitNothingMeets, exitInterrupted, exitOther),
		Example:           "  standfast verify case-works",
		Args:              oneArgument("the folder of a comparison"),
		ValidArgsFunction: completeFolders,
		RunE:              func(c *cobra.Command, args []string) error { return runVerify(c.Context(), c, o, args[0]) },
	}
	c.Flags().BoolVar(&o.json, "json", false, "print the verdicts as JSON")
	c.Flags().IntVar(&o.jobs, "jobs", 0, "cores to use, 0 for all")
	return c
}

// verdict is what verify found of one option.
type verdict struct {
	Option     string        `json:"option"`
	Point      string        `json:"point,omitempty"` // Of a back-analysis, that the option is judged at.
	Witnesses  int           `json:"witnesses"`
	Mismatches []mismatch    `json:"mismatches"`
	Searches   int           `json:"searches"`
	Refuting   []report.Slip `json:"refuting_slips"`
	Lines      []string      `json:"remarks"`
}

// mismatch is a witness that does not hold.
type mismatch struct {
	X    []float64     `json:"x"`
	Said report.Number `json:"fs_said"`
	Got  report.Number `json:"fs_found"`
	Why  string        `json:"why"`
}

func runVerify(ctx context.Context, c *cobra.Command, o *verifyOptions, folder string) error {
	_, file, err := readResult(folder)
	if err != nil {
		return err
	}
	witnesses, err := readWitnesses(folder)
	if err != nil {
		return err
	}
	result, err := report.Rebuild(file)
	if err != nil {
		return usagef("%s: %w", filepath.ToSlash(filepath.Join(folder, resultName)), err)
	}
	job, err := askedJob(file, result.Job)
	if err != nil {
		return err
	}
	side, err := witnesses.SideForce.Engine()
	if err != nil {
		return usagef("%s: %w", witnessesName, err)
	}
	if side != job.SideForce || side != result.Job.SideForce {
		return usagef("the side-force function in %s or %s is not that of the case", resultName, witnessesName)
	}
	settings := remedies.Settings{
		Workers: o.jobs, Seed: file.Settings.Seed, Slices: file.Settings.Slices, Allowance: file.Settings.Allowance,
	}
	var verdicts []verdict
	for i := range result.Options {
		v, err := verifyOption(ctx, job, result.Job, &result.Options[i], witnesses, settings)
		if err != nil {
			return finished(ctx, err)
		}
		verdicts = append(verdicts, v)
	}
	points, err := verifyPoints(ctx, job, file, settings)
	if err != nil {
		return finished(ctx, err)
	}
	return printVerdicts(c, o, append(verdicts, points...))
}

// readWitnesses reads the witnesses of a folder.
func readWitnesses(folder string) (*report.Witnesses, error) {
	path := filepath.Join(folder, witnessesName)
	f, err := os.Open(path)
	if err != nil {
		var onDisk *fs.PathError
		if errors.As(err, &onDisk) {
			return nil, usagef("cannot read %s: %w", filepath.ToSlash(path), onDisk.Err)
		}
		return nil, err
	}
	defer f.Close() //nolint:errcheck // only read from
	w, err := report.DecodeWitnesses(f)
	if err != nil {
		return nil, usagef("%s: %w", filepath.ToSlash(path), err)
	}
	return w, nil
}

// askedJob reads the case that the result holds, with the required FS of the result, which flags may have changed.
func askedJob(file *report.File, rebuilt *remedies.Job) (*remedies.Job, error) {
	read, err := casefile.Parse(file.Case.File, []byte(file.Case.Source))
	if err != nil {
		return nil, &usageError{err}
	}
	if read.SHA256 != file.Case.SHA256 {
		return nil, usagef("the case in %s is not the one whose SHA-256 it gives", resultName)
	}
	j := read.Job
	for i := range j.Situations {
		for k := range rebuilt.Situations {
			if s := &rebuilt.Situations[k]; s.Name == j.Situations[i].Name {
				j.Situations[i].RequiredFS, j.Situations[i].RatioToExisting = s.RequiredFS, 0
			}
		}
	}
	return j, nil
}

func verifyOption(ctx context.Context, asked, rebuilt *remedies.Job, o *remedies.Option, w *report.Witnesses, s remedies.Settings) (verdict, error) {
	v := verdict{Option: o.Name, Mismatches: []mismatch{}, Refuting: []report.Slip{}, Lines: []string{}}
	if held, ok := w.Options[o.Name]; ok {
		common := lem.Setting{Window: lem.Window{Direction: asked.Direction, Head: asked.Head, Toe: asked.Exit}, SideForce: asked.SideForce}
		pool, designs, err := held.Certificate(common)
		if err != nil {
			return v, usagef("%s: %w", witnessesName, err)
		}
		bad, err := remedies.Replay(ctx, asked, o.Remedies, pool, designs, s)
		if err != nil {
			return v, err
		}
		v.Witnesses = len(designs)
		for _, m := range bad {
			v.Mismatches = append(v.Mismatches, mismatch{m.X, report.Number(m.Said), report.Number(m.Got), m.Why})
			v.Lines = append(v.Lines, fmt.Sprintf("the witness against x = %v does not hold: %s", m.X, m.Why))
		}
	}
	for _, c := range remedies.Contradict(rebuilt, o, s) {
		v.Lines = append(v.Lines, fmt.Sprintf("in %s the reported slip has FS %s (%s) on the reported section, which is not what is reported",
			c.Check.Label(), report.FactorText(report.Number(c.FS)), c.Method))
	}
	if o.Status != remedies.MeetsTarget {
		return v, nil
	}
	refuting, searches, err := remedies.Refute(ctx, rebuilt, o, s)
	if err != nil {
		return v, err
	}
	v.Searches = searches
	for i := range refuting {
		r := &refuting[i]
		slip := report.SlipOf(r)
		v.Refuting = append(v.Refuting, *slip)
		v.Lines = append(v.Lines, fmt.Sprintf("refuted in %s: FS %s (%s), required %s; %s", r.Check.Label(), report.FactorText(report.Number(r.FS)), r.Method,
			report.RequiredText(report.Number(r.Check.Required)), slip))
	}
	return v, nil
}

// summary says in a line what was found.
func (v *verdict) summary() string {
	name := v.Option
	var parts []string
	if v.Point != "" {
		name += " at the " + v.Point + " point"
	} else {
		parts = append(parts, fmt.Sprintf("%d witnesses hold", v.Witnesses-len(v.Mismatches)))
	}
	switch {
	case v.Searches > 0 && len(v.Refuting) > 0:
		parts = append(parts, fmt.Sprintf("%d searches", v.Searches))
	case v.Searches > 0:
		parts = append(parts, fmt.Sprintf("no slip below target found in %d searches", v.Searches))
	case v.Point != "": // Its slips were evaluated again.
		parts = append(parts, "does not meet the target")
	}
	return name + ": " + strings.Join(parts, "; ")
}

func printVerdicts(c *cobra.Command, o *verifyOptions, verdicts []verdict) error {
	refuted := false
	for _, v := range verdicts {
		refuted = refuted || len(v.Lines) > 0
	}
	w := c.OutOrStdout()
	if o.json {
		if err := printJSON(w, verdicts); err != nil {
			return err
		}
	} else {
		for _, v := range verdicts {
			if _, err := fmt.Fprintln(w, v.summary()); err != nil {
				return err
			}
			for _, l := range v.Lines {
				if _, err := fmt.Fprintf(w, "  %s\n", l); err != nil {
					return err
				}
			}
		}
	}
	if refuted {
		return errRefuted
	}
	return nil
}
