package cli

import (
	"fmt"
	"path/filepath"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/drawing"
)

type drawOptions struct {
	out   string
	quiet bool
}

func newDrawCommand() *cobra.Command {
	o := &drawOptions{}
	c := &cobra.Command{
		Use:   "draw CASE",
		Short: "Check a case file and draw what was read",
		Long: `draw reads a case file, reports what is wrong with it, and draws the cross-section as it was read, to scale:
<case>-section.svg and <case>-section.png. It analyses nothing.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example: "  standfast draw case.yaml --out drawings",
		Args:    oneArgument("a case file"),
		RunE:    func(c *cobra.Command, args []string) error { return runDraw(c, o, args[0]) },
	}
	c.Flags().StringVar(&o.out, "out", ".", "folder for the two drawings, made if need be; nothing else in it is touched")
	c.Flags().BoolVarP(&o.quiet, "quiet", "q", false, "print nothing but errors")
	return c
}

func runDraw(c *cobra.Command, o *drawOptions, path string) error {
	read, err := readCase(path)
	if err != nil {
		return err
	}
	figure, err := drawing.Section(read.Job, nil, drawing.Options{})
	if err != nil {
		return err
	}
	base := filepath.Join(o.out, caseName(path)+"-section")
	if err := writePair(c.Context(), base, figure); err != nil {
		return err
	}
	if o.quiet {
		return nil
	}
	printWarnings(c, read.Warnings)
	w := c.OutOrStdout()
	fmt.Fprintf(w, "%s was read without faults\n", filepath.Base(read.File))
	for _, n := range read.Notes {
		fmt.Fprintf(w, "Note: %s\n", n)
	}
	_, err = fmt.Fprintf(w, "Drawn: %s.svg and %[1]s.png\n", filepath.ToSlash(base))
	return err
}
