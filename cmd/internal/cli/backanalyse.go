package cli

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// backOptions are the flags of backanalyse.
type backOptions struct {
	find, soil, method, situation string
	cohesion                      string
	out, write                    string
	json, quiet                   bool
}

func newBackanalyseCommand() *cobra.Command {
	o := &backOptions{}
	c := &cobra.Command{
		Use:   "backanalyse CASE",
		Short: "Find the strengths with which a slip that has happened just fails",
		Long: `backanalyse takes the observed_slip of a case file and finds what gives it FS = 1 in the situation at failure: the pairs of cohesion
and friction of one soil, or its friction alone, its undrained strength or its pore pressure ratio. It prints the curve with a low, a middle and a
high point and draws it: <case>-backanalysis.svg and .png. The soil is the one that most of the slip runs in, unless --soil names another.

With --write it writes the case three times with the strength of that soil replaced, to size with: <case>-low.yaml, -middle.yaml and -high.yaml.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example:           "  standfast backanalyse case.yaml --write back",
		Args:              oneArgument("a case file"),
		ValidArgsFunction: completeCases,
		RunE:              func(c *cobra.Command, args []string) error { return runBackanalyse(c, o, args[0]) },
	}
	f := c.Flags()
	f.StringVar(&o.find, "find", remedies.StrengthPair.String(), "what to find: strength (pairs of c' and phi'), friction (phi' with c' = 0), cu or ru")
	f.StringVar(&o.soil, "soil", "", "soil to look into")
	f.StringVar(&o.method, "method", "", "bishop (circles only), spencer or morgenstern-price; default bishop on a circle, spencer on a line")
	f.StringVar(&o.situation, "situation", "", "situation at failure, in place of that of the case")
	f.StringVar(&o.cohesion, "cohesion", "", "cohesions of the low and the high point as `LOW,HIGH`, kPa; default 0 and half of what would hold the slip without friction")
	f.StringVar(&o.out, "out", ".", "folder for the drawing, made if need be; nothing else in it is touched")
	f.StringVar(&o.write, "write", "", "folder for the three cases, made if need be; nothing else in it is touched")
	f.BoolVar(&o.json, "json", false, "print the answer as JSON instead of tables")
	f.BoolVarP(&o.quiet, "quiet", "q", false, "print nothing but errors")
	return c
}

func runBackanalyse(c *cobra.Command, o *backOptions, path string) error {
	read, err := readCase(path)
	if err != nil {
		return err
	}
	if read.Job.Observed == nil {
		return usagef("%s has no `observed_slip`: write the line or the circle of the slip that has happened", path)
	}
	settings, err := o.settings(read.Job)
	if err != nil {
		return err
	}
	b, err := remedies.BackAnalyse(read.Job, read.Job.Observed, settings)
	if errors.Is(err, remedies.ErrNoBackAnalysis) {
		return &usageError{fmt.Errorf("backanalyse: %w", err)}
	}
	if err != nil {
		return err
	}
	if !o.quiet {
		printWarnings(c, read.Warnings)
	}
	file := report.NewBack(read.Job, b, sourceOf(read, nil))
	names, err := o.writeAll(c.Context(), path, read, b, file)
	if err != nil {
		return finished(c.Context(), err)
	}
	w := c.OutOrStdout()
	switch {
	case o.json:
		return printJSON(w, file)
	case o.quiet:
		return nil
	}
	if err := report.WriteBack(w, file, lookOf(w)); err != nil {
		return err
	}
	_, err = fmt.Fprintf(w, "\nWritten: %s\n", strings.Join(names, ", "))
	return err
}

// settings reads the flags; a situation given moves the failure into it.
func (o *backOptions) settings(j *remedies.Job) (remedies.BackSettings, error) {
	var s remedies.BackSettings
	var finds []string
	for _, u := range remedies.Unknowns() {
		finds = append(finds, u.String())
	}
	i := slices.Index(finds, o.find)
	if i < 0 {
		return s, unknownName("thing to find", o.find, finds)
	}
	s.Unknown = remedies.Unknowns()[i]
	if o.soil != "" {
		var soils []string
		for k := range j.Section.Soils {
			soils = append(soils, j.Section.Soils[k].Name)
		}
		if s.Soil = slices.Index(soils, o.soil); s.Soil < 0 {
			return s, unknownName("soil", o.soil, soils)
		}
		s.HasSoil = true
	}
	if o.method != "" {
		var ok bool
		if s.Method, ok = report.MethodNamed(o.method); !ok {
			var methods []string
			for _, m := range report.BackMethods() {
				methods = append(methods, m.String())
			}
			return s, unknownName("method", o.method, methods)
		}
	}
	if o.situation != "" {
		names := situationNames(j)
		at := slices.Index(names, o.situation)
		if at < 0 {
			return s, unknownName("situation", o.situation, names)
		}
		j.Observed.Situation = at
	}
	return s, o.readCohesion(&s)
}

// readCohesion reads the cohesions of the low and the high point.
func (o *backOptions) readCohesion(s *remedies.BackSettings) error {
	if o.cohesion == "" {
		return nil
	}
	if s.Unknown != remedies.StrengthPair {
		return usagef("--cohesion goes with --find %s only", remedies.StrengthPair)
	}
	low, high, ok := strings.Cut(o.cohesion, ",")
	var errLow, errHigh error
	s.Low, errLow = strconv.ParseFloat(strings.TrimSpace(low), 64)
	s.High, errHigh = strconv.ParseFloat(strings.TrimSpace(high), 64)
	if !ok || errLow != nil || errHigh != nil || !(s.Low >= 0 && s.Low < s.High && s.High <= maxCohesion) {
		return usagef("--cohesion %s: write two numbers in kPa, the low one first, such as 0,8", o.cohesion)
	}
	s.HasRange = true
	return nil
}

// maxCohesion bounds a cohesion asked for, kPa: beyond it a typing error is likelier than a wish.
const maxCohesion = 10_000

// writeAll writes the drawing and, if wanted, the cases; it returns their names.
func (o *backOptions) writeAll(ctx context.Context, path string, read *casefile.Case, b *remedies.BackAnalysis, file *report.BackFile) ([]string, error) {
	cases, err := o.cases(path, file)
	if err != nil {
		return nil, err
	}
	figure, err := drawing.BackAnalysis(read.Job.Title, file.Soil, b, drawing.Options{})
	if err != nil {
		return nil, err
	}
	name := caseName(path) + "-backanalysis"
	names, err := writeInto(ctx, o.out, []output{{name + ".svg", figure.WriteSVG}, {name + ".png", figure.WritePNG}})
	if err != nil || len(cases) == 0 {
		return names, err
	}
	more, err := writeInto(ctx, o.write, cases)
	return append(names, more...), err
}

// writeInto writes the outputs to a folder, made if need be, and returns their paths.
func writeInto(ctx context.Context, folder string, outputs []output) ([]string, error) {
	if err := os.MkdirAll(folder, 0o777); err != nil {
		return nil, err
	}
	names := outputNames(outputs)
	for i, name := range names {
		names[i] = filepath.ToSlash(filepath.Join(folder, name))
	}
	return names, writeAmong(ctx, folder, outputs)
}

// backRemark begins every case that backanalyse writes; by it the next run knows them for its own.
const backRemark = "Back-analysed by standfast"

// cases returns the three cases to go on with; none unless they are wanted. A file that an earlier run did not write is not written over.
func (o *backOptions) cases(path string, f *report.BackFile) ([]output, error) {
	if o.write == "" {
		return nil, nil
	}
	src, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	var out []output
	for _, p := range []struct {
		name string
		of   *report.BackPoint
	}{{"low", &f.Low}, {"middle", &f.Middle}, {"high", &f.High}} {
		name := caseName(path) + "-" + p.name + ".yaml"
		there, err := os.ReadFile(filepath.Join(o.write, name))
		if err == nil && !bytes.HasPrefix(there, []byte("# "+backRemark)) {
			return nil, usagef("--write %s: %s stands there already and is not of an earlier back-analysis; move it elsewhere first", o.write, name)
		}
		remark := fmt.Sprintf("%s from %s, %s point: %s in %s give the observed slip FS %.2f (%s, %s).", backRemark, f.Case.File, p.name, p.of.Text(), f.Soil,
			float64(p.of.FS), f.Method, f.Situation)
		change := casefile.SoilChange{Soil: f.Soil, Cohesion: p.of.Cohesion, Friction: p.of.Friction, Strength: p.of.Strength, Ru: p.of.Ru}
		text, err := casefile.WithSoil(src, &change, remark)
		if err != nil {
			return nil, &usageError{fmt.Errorf("--write %s: %w", o.write, err)}
		}
		out = append(out, output{name, func(w io.Writer) error { _, err := w.Write(text); return err }})
	}
	return out, nil
}
