package cli

import (
	"context"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

// assessOptions are the flags of assess.
type assessOptions struct {
	studyOptions
	out    string
	slices bool
}

func newAssessCommand() *cobra.Command {
	o := &assessOptions{}
	c := &cobra.Command{
		Use:   "assess CASE",
		Short: "Analyse the slope of a case as it is",
		Long: `assess analyses the slope of a case file as it is: the factor of safety in every design situation by every method, the
critical slips, and where on the ground a load raises or lowers the FS of each critical slip. It sizes nothing.

With --out it draws the influence line of load of every situation: <case>-influence-<situation>.svg and .png. With --slices it prints the slice
table of every critical slip, for a check by hand, and writes it with all columns as <case>-slices-<situation>.csv, to the folder of --out or to
the working folder. Without either it writes no files.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example:           "  standfast assess case.yaml\n  standfast assess case.yaml --slices --out check",
		Args:              oneArgument("a case file"),
		ValidArgsFunction: completeCases,
		RunE:              func(c *cobra.Command, args []string) error { return runAssess(c, o, args[0]) },
	}
	o.addFlags(c)
	c.Flags().StringVar(&o.out, "out", "", "folder for drawings and slice tables, made if need be; nothing else in it is touched")
	c.Flags().BoolVar(&o.slices, "slices", false, "print and write the slice table of every critical slip")
	return c
}

func runAssess(c *cobra.Command, o *assessOptions, path string) error {
	ctx := c.Context()
	read, settings, err := o.open(c, path)
	if err != nil {
		return err
	}
	existing, err := remedies.Assess(ctx, read.Job, settings)
	if err != nil {
		return finished(ctx, err)
	}
	result := &remedies.Result{Job: read.Job, Settings: settings, Existing: *existing}
	file := report.New(result, sourceOf(read, o.overrides()))
	found, err := lookInto(existing, read.Job, o.slices)
	if err != nil {
		return err
	}
	file.SetInfluence(found.influence)
	names, err := o.write(ctx, path, read.Job.Title, existing, found)
	if err != nil {
		return finished(ctx, err)
	}
	w := c.OutOrStdout()
	switch {
	case o.json:
		return file.Encode(w)
	case o.quiet:
		return nil
	}
	return o.print(w, file, found, names)
}

// insight is what lies behind the answers to the situations.
type insight struct {
	influence []*lem.Influence // By situation; nil where no slip converged.
	tables    []report.SliceTable
}

// lookInto works out the influence lines of the critical slips, and their slice tables if they are wanted.
func lookInto(o *remedies.Option, j *remedies.Job, slices bool) (*insight, error) {
	out := &insight{influence: make([]*lem.Influence, len(o.Situations))}
	var soils []string
	for i := range j.Section.Soils {
		soils = append(soils, j.Section.Soils[i].Name)
	}
	for i := range o.Situations {
		s := &o.Situations[i]
		if math.IsNaN(s.FS) {
			continue
		}
		v, err := s.Influence(report.InfluenceLoad)
		if err != nil {
			return nil, fmt.Errorf("situation %q: %w", s.Check.Label(), err)
		}
		out.influence[i] = &v
		if !slices {
			continue
		}
		d, err := s.Working()
		if err != nil {
			return nil, fmt.Errorf("situation %q: %w", s.Check.Label(), err)
		}
		out.tables = append(out.tables, report.SliceTable{Situation: s.Check.Label(), Soils: soils, Detail: d})
	}
	return out, nil
}

// write writes the drawings and tables that are asked for and returns their names.
func (o *assessOptions) write(ctx context.Context, path, title string, existing *remedies.Option, found *insight) ([]string, error) {
	var outputs []output
	for i := range found.tables {
		t := &found.tables[i]
		outputs = append(outputs, output{caseName(path) + "-slices-" + fileName(t.Situation) + ".csv", func(w io.Writer) error { return report.WriteSlicesCSV(w, t) }})
	}
	for i, v := range found.influence {
		if v == nil || o.out == "" {
			continue
		}
		s := &existing.Situations[i]
		figure, err := drawing.Influence(title, s, v, drawing.Options{})
		if errors.Is(err, drawing.ErrNothingToDraw) {
			continue
		}
		if err != nil {
			return nil, err
		}
		name := caseName(path) + "-influence-" + fileName(s.Check.Label())
		outputs = append(outputs, output{name + ".svg", figure.WriteSVG}, output{name + ".png", figure.WritePNG})
	}
	if len(outputs) == 0 {
		return nil, nil
	}
	folder := o.out
	if folder == "" {
		folder = "."
	}
	return writeInto(ctx, folder, outputs)
}

func (o *assessOptions) print(w io.Writer, file *report.File, found *insight, names []string) error {
	look := lookOf(w)
	if err := report.WriteAssessment(w, file, look); err != nil {
		return err
	}
	if o.slices {
		if err := report.WriteSlices(w, found.tables, look); err != nil {
			return err
		}
	}
	if len(names) == 0 {
		return nil
	}
	_, err := fmt.Fprintf(w, "\nWritten: %s\n", strings.Join(names, ", "))
	return err
}
