package cli

import (
	"fmt"
	"path/filepath"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

type compareOptions struct {
	studyOptions
	out  string
	only []string

	pairs    bool
	skipBack bool
}

func newCompareCommand() *cobra.Command {
	o := &compareOptions{}
	c := &cobra.Command{
		Use:   "compare CASE",
		Short: "Size every remedy of a case and say which needs the least earthworks, or costs least",
		Long: `compare analyses the slope of a case file as it is, sizes every remedy that the case asks for, compares them, and
writes the results, drawings and proposed sections to a folder.

What is made least is the ` + "`objective`" + ` of the case: earthworks unless it says cost or carbon, by the user's own rates and factors.

Remedies are sized one by one, and the ` + "`combinations`" + ` of the case together. With --pairs every pair that can be built together is
sized too. A pair has as many designs as its two remedies multiplied, so that this takes minutes where their ranges are fine.

A case with an ` + "`observed_slip`" + ` is back-analysed as backanalyse does without flags, and everything is sized again with the low, the middle
and the high strength with which that slip just fails, to show whether the choice hangs on what one failure leaves open. This takes about as
long again as the rest; --skip-back-analysis leaves it out.

` + exitCodes(exitOK, exitInput, exitNothingMeets, exitInterrupted, exitOther),
		Example:           "  standfast compare case.yaml --only berm,regrade --target \"high water=1.25\"",
		Args:              oneArgument("a case file"),
		ValidArgsFunction: completeCases,
		RunE:              func(c *cobra.Command, args []string) error { return runCompare(c, o, args[0]) },
	}
	o.addFlags(c)
	c.Flags().StringVar(&o.out, "out", "", "folder for the results (default ./<case>-works); one of an earlier run is replaced, any other refused")
	c.Flags().StringSliceVar(&o.only, "only", nil, "size only these remedies, such as berm,regrade")
	c.Flags().BoolVar(&o.pairs, "pairs", false, "also size every pair of remedies that can be built together; takes minutes on fine ranges")
	c.Flags().BoolVar(&o.skipBack, "skip-back-analysis", false, "do not size again with the strengths that the observed slip of the case leaves open")
	if err := c.RegisterFlagCompletionFunc("only", completeRemedies); err != nil {
		panic("cli: " + err.Error()) // The flag is not defined: a programmer's error.
	}
	return c
}

func runCompare(c *cobra.Command, o *compareOptions, path string) error {
	ctx := c.Context()
	read, settings, err := o.open(c, path)
	if err != nil {
		return err
	}
	if err := applyOnly(read.Job, o.only); err != nil {
		return err
	}
	if len(read.Job.Requests)+len(read.Job.Trials) == 0 {
		return nothingToSize(path, read.Finished)
	}
	out := o.out
	if out == "" {
		out = caseName(path) + "-works"
	}
	if err := checkFolder(out); err != nil {
		return err
	}
	settings.Curves, settings.Relaxations, settings.Sensitivity, settings.Pairs = true, true, true, o.pairs
	settings.Points, settings.Fronts = !o.skipBack, true
	progress := newProgress(c.ErrOrStderr(), o.quiet)
	settings.Progress, settings.Finished = progress.show, progress.finished
	result, err := remedies.Study(ctx, read.Job, settings)
	progress.clear()
	if err != nil {
		return finished(ctx, err)
	}
	file, err := writeWorks(ctx, out, read, result, sourceOf(read, o.overrides()))
	if err != nil {
		return finished(ctx, err)
	}
	if err := o.print(c, file, out); err != nil {
		return err
	}
	if !file.Met() {
		return errNothingMeets
	}
	return nil
}

func (o *compareOptions) overrides() []string {
	out := o.studyOptions.overrides()
	for _, name := range o.only {
		out = append(out, "--only "+name)
	}
	if o.pairs {
		out = append(out, "--pairs")
	}
	if o.skipBack {
		out = append(out, "--skip-back-analysis")
	}
	return out
}

func (o *compareOptions) print(c *cobra.Command, f *report.File, out string) error {
	w := c.OutOrStdout()
	switch {
	case o.json:
		return f.Encode(w)
	case o.quiet:
		return nil
	}
	if err := report.WriteComparison(w, f, lookOf(w)); err != nil {
		return err
	}
	_, err := fmt.Fprintf(w, "\nResults, drawings and proposed sections are in %s\n", filepath.ToSlash(out))
	return err
}

// nothingToSize says why a case asks compare for nothing.
func nothingToSize(path string, proposed bool) error {
	if proposed {
		return usagef("%s is a proposed section: there is nothing to size in it; use `standfast assess %s`", path, path)
	}
	return usagef("%s names no `remedies` and no `trials`; name some, or use `standfast assess %s`", path, path)
}
