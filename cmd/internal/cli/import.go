package cli

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/survey"
)

type importOptions struct {
	out    string
	ground string
	strata []string
	waters []string
	scale  float64
}

func newImportCommand() *cobra.Command {
	o := &importOptions{}
	c := &cobra.Command{
		Use:   "import SURVEY",
		Short: "Begin a case file from a CSV table or a DXF drawing",
		Long: `import takes ground, strata and water lines over from a survey and writes a commented case file in which everything else is left
empty, to be filled in. It never writes over a file.

A CSV table has a row a point and names its columns in the first row: offset and level, then any number of strata (top of stiff clay)
and water lines (water high). A cell may be empty. Other columns are left out.

A DXF drawing has the section in its x and y. Say which layer is what: --ground, --stratum and --water. Lines that meet are joined.

` + exitCodes(exitOK, exitInput, exitOther),
		Example:           "  standfast import section.dxf --ground EXISTING --stratum \"CLAY=stiff clay\" --water GWL=high",
		Args:              oneArgument("a CSV or DXF file"),
		ValidArgsFunction: completeSurveys,
		RunE:              func(c *cobra.Command, args []string) error { return runImport(c, o, args[0]) },
	}
	f := c.Flags()
	f.StringVar(&o.out, "out", "", "case file to write (default ./<survey>.yaml)")
	f.StringVar(&o.ground, "ground", "", "`LAYER` of the ground in a DXF")
	f.StringArrayVar(&o.strata, "stratum", nil, "`LAYER[=SOIL]` of the top of a stratum in a DXF (repeatable)")
	f.StringArrayVar(&o.waters, "water", nil, "`LAYER[=NAME]` of a water line in a DXF (repeatable)")
	f.Float64Var(&o.scale, "scale", 0, "metres to a unit of a DXF (default 1)")
	return c
}

// completeSurveys completes the one argument that is a survey.
func completeSurveys(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
	if len(args) > 0 {
		return nil, cobra.ShellCompDirectiveNoFileComp
	}
	return []string{"csv", "txt", "dxf"}, cobra.ShellCompDirectiveFilterFileExt
}

func runImport(c *cobra.Command, o *importOptions, path string) error {
	out := o.out
	if out == "" {
		out = caseName(path) + ".yaml"
	}
	s, notes, err := o.read(path)
	if err != nil {
		return err
	}
	s.Title, s.Source = caseName(path), filepath.Base(path)
	if err := writeNew(out, casefile.Skeleton(s)); err != nil {
		return err
	}
	w := c.OutOrStdout()
	fmt.Fprintf(w, "Wrote %s: ground of %d points from x = %s to %s, %d strata below the uppermost, %d water lines\n", filepath.ToSlash(out),
		len(s.Ground), metresOf(s.Ground.Left()), metresOf(s.Ground.Right()), len(s.Strata), len(s.Waters))
	for _, n := range notes {
		fmt.Fprintf(w, "Note: %s\n", n)
	}
	_, err = fmt.Fprintf(w, "Fill in what is empty; this lists what is: standfast draw %s\n", filepath.ToSlash(out))
	return err
}

// metresOf writes a coordinate as short as it is.
func metresOf(v float64) string { return fmt.Sprint(v) }

// read reads a survey as its ending says.
func (o *importOptions) read(path string) (*casefile.Sketch, []string, error) {
	mapped := o.ground != "" || len(o.strata) > 0 || len(o.waters) > 0 || o.scale != 0
	kind := strings.ToLower(filepath.Ext(path))
	switch {
	case kind != ".csv" && kind != ".txt" && kind != ".dxf":
		return nil, nil, usagef("%s: is read if it ends in .csv, .txt or .dxf", path)
	case kind != ".dxf" && mapped:
		return nil, nil, usagef("%s: --ground, --stratum, --water and --scale are for DXF drawings; a table names its columns in its first row", path)
	case o.scale < 0:
		return nil, nil, usagef("--scale %v: must be above 0", o.scale)
	}
	src, err := readSurvey(path)
	if err != nil {
		return nil, nil, err
	}
	name := filepath.ToSlash(path)
	if kind != ".dxf" {
		return survey.Table(name, src)
	}
	return survey.Drawing(name, src, survey.Mapping{Ground: o.ground, Strata: layersOf(o.strata), Waters: layersOf(o.waters), Scale: o.scale})
}

// layersOf parts LAYER=NAME.
func layersOf(flags []string) []survey.Layer {
	var out []survey.Layer
	for _, f := range flags {
		layer, name, _ := strings.Cut(f, "=")
		out = append(out, survey.Layer{Layer: strings.TrimSpace(layer), Name: strings.TrimSpace(name)})
	}
	return out
}

// readSurvey reads a file, up to a byte more than is allowed.
func readSurvey(path string) ([]byte, error) {
	f, err := os.Open(path)
	if err != nil {
		var onDisk *fs.PathError
		if errors.As(err, &onDisk) {
			return nil, usagef("cannot read the survey %s: %w", path, onDisk.Err)
		}
		return nil, err
	}
	defer f.Close() //nolint:errcheck // only read from
	src, err := io.ReadAll(io.LimitReader(f, survey.MaxSize+1))
	if err != nil {
		return nil, usagef("cannot read the survey %s: %w", path, err)
	}
	return src, nil
}
