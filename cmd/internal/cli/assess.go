package cli

import (
	"github.com/spf13/cobra"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

func newAssessCommand() *cobra.Command {
	o := &studyOptions{}
	c := &cobra.Command{
		Use:   "assess CASE",
		Short: "Analyse the slope of a case as it is",
		Long: `assess analyses the slope of a case file as it is: the factor of safety in every design situation by every method, and
the critical slips. It sizes nothing and writes no files.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example:           "  standfast assess case.yaml",
		Args:              oneArgument("a case file"),
		ValidArgsFunction: completeCases,
		RunE:              func(c *cobra.Command, args []string) error { return runAssess(c, o, args[0]) },
	}
	o.addFlags(c)
	return c
}

func runAssess(c *cobra.Command, o *studyOptions, path string) error {
	ctx := c.Context()
	settings, err := o.settings()
	if err != nil {
		return err
	}
	read, err := readCase(path)
	if err != nil {
		return err
	}
	if err := applyTargets(read.Job, o.targets); err != nil {
		return err
	}
	if !o.quiet {
		printWarnings(c, read.Warnings)
	}
	existing, err := remedies.Assess(ctx, read.Job, settings)
	if err != nil {
		return finished(ctx, err)
	}
	result := &remedies.Result{Job: read.Job, Settings: settings, Existing: *existing}
	file := report.New(result, sourceOf(read, o.overrides()))
	w := c.OutOrStdout()
	switch {
	case o.json:
		return file.Encode(w)
	case o.quiet:
		return nil
	}
	return report.WriteAssessment(w, file, lookOf(w))
}
