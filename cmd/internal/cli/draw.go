package cli

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/drawing"
)

type drawOptions struct {
	out   string
	json  bool
	quiet bool
}

func newDrawCommand() *cobra.Command {
	o := &drawOptions{}
	c := &cobra.Command{
		Use:   "draw CASE",
		Short: "Check a case file and draw what was read",
		Long: `draw reads a case file, reports what is wrong with it, and draws the cross-section as it was read, to scale:
<case>-section.svg, .png, .pdf and .dxf. It analyses nothing.

With --json it prints what it read and drew, or every fault with its line, for an editor or another program to read.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example:           "  standfast draw case.yaml --out drawings",
		Args:              oneArgument("a case file"),
		ValidArgsFunction: completeCases,
		RunE:              func(c *cobra.Command, args []string) error { return runDraw(c, o, args[0]) },
	}
	c.Flags().StringVar(&o.out, "out", ".", "folder for the drawings, made if need be; nothing else in it is touched")
	c.Flags().BoolVar(&o.json, "json", false, "print what was read and drawn, or the faults, as JSON")
	c.Flags().BoolVarP(&o.quiet, "quiet", "q", false, "print nothing but errors")
	return c
}

// drawn is what draw --json prints. One of Drawings and Faults is empty.
type drawn struct {
	Case     string      `json:"case"`     // Name of the case file, without its folder.
	Drawings []string    `json:"drawings"` // Paths of the drawings written.
	Notes    []string    `json:"notes"`    // What was deduced or assumed.
	Warnings []string    `json:"warnings"` // What is legal but probably not meant.
	Faults   []drawFault `json:"faults"`   // What is wrong with the case file.
}

// drawFault is a fault of a case file.
type drawFault struct {
	Line       int    `json:"line"`       // From 1; 0: the file as a whole.
	Column     int    `json:"column"`     // From 1; 0: the file as a whole.
	Path       string `json:"path"`       // Keys down to the value.
	Message    string `json:"message"`    // What is wrong.
	Suggestion string `json:"suggestion"` // What would be right; may be empty.
}

func runDraw(c *cobra.Command, o *drawOptions, path string) error {
	w := c.OutOrStdout()
	read, err := readCase(path)
	if faults := casefile.Faults(err); o.json && len(faults) > 0 {
		out := drawn{Case: filepath.Base(path), Drawings: []string{}, Notes: []string{}, Warnings: []string{}}
		for _, f := range faults {
			out.Faults = append(out.Faults, drawFault{f.Line, f.Column, f.Path, f.Message, f.Suggestion})
		}
		return errors.Join(err, printJSON(w, out))
	}
	if err != nil {
		return err
	}
	outputs, err := drawSection(caseName(path)+"-section", read.Job, nil)
	if err != nil {
		return err
	}
	if len(outputs) == 0 {
		return drawing.ErrNothingToDraw
	}
	if err := os.MkdirAll(o.out, 0o777); err != nil {
		return err
	}
	if err := writeAmong(c.Context(), o.out, outputs); err != nil {
		return finished(c.Context(), err)
	}
	drawings := outputNames(outputs)
	for i, name := range drawings {
		drawings[i] = filepath.ToSlash(filepath.Join(o.out, name))
	}
	switch {
	case o.json:
		return printJSON(w, drawn{filepath.Base(read.File), drawings, list(read.Notes), list(read.Warnings), []drawFault{}})
	case o.quiet:
		return nil
	}
	printWarnings(c, read.Warnings)
	fmt.Fprintf(w, "%s was read without faults\n", filepath.Base(read.File))
	for _, n := range read.Notes {
		fmt.Fprintf(w, "Note: %s\n", n)
	}
	_, err = fmt.Fprintf(w, "Drawn: %s\n", strings.Join(drawings, ", "))
	return err
}

// list returns a list that is never nil, so that it is written as [] and not as null.
func list(s []string) []string { return append([]string{}, s...) }
