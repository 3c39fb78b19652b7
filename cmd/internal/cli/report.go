package cli

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/report"
)

type reportOptions struct {
	json  bool
	quiet bool
}

func newReportCommand() *cobra.Command {
	o := &reportOptions{}
	c := &cobra.Command{
		Use:   "report FOLDER",
		Short: "Make the drawings and tables of a finished comparison again",
		Long: `report makes the drawings, setting-out tables and quantities of a finished comparison again from its result.json alone, byte
for byte as compare wrote them. It analyses nothing, needs no case file and touches nothing else in the folder.

` + exitCodes(exitOK, exitInput, exitInterrupted, exitOther),
		Example:           "  standfast report case-works",
		Args:              oneArgument("the folder of a comparison"),
		ValidArgsFunction: completeFolders,
		RunE:              func(c *cobra.Command, args []string) error { return runReport(c, o, args[0]) },
	}
	c.Flags().BoolVar(&o.json, "json", false, "print the names of the files made, as JSON")
	c.Flags().BoolVarP(&o.quiet, "quiet", "q", false, "print nothing but errors")
	return c
}

func runReport(c *cobra.Command, o *reportOptions, folder string) error {
	raw, file, err := readResult(folder)
	if err != nil {
		return err
	}
	outputs, err := deliverables(file)
	if err != nil {
		if errors.Is(err, report.ErrIncomplete) {
			return usagef("%s: %w", filepath.ToSlash(filepath.Join(folder, resultName)), err)
		}
		return err
	}
	made := outputNames(outputs)
	if err := checkForeign(folder, file.Files, made); err != nil {
		return err
	}
	if listed := union(file.Files, made); len(listed) > len(file.Files) {
		outputs = append(outputs, output{resultName, func(w io.Writer) error { return report.EncodeWithFiles(w, raw, listed) }})
	}
	if err := writeAmong(c.Context(), folder, outputs); err != nil {
		return finished(c.Context(), err)
	}
	w := c.OutOrStdout()
	switch {
	case o.json:
		return printJSON(w, struct {
			Files []string `json:"files"`
		}{made})
	case o.quiet:
		return nil
	}
	_, err = fmt.Fprintf(w, "Made %d drawings and tables again in %s\n", len(made), filepath.ToSlash(folder))
	return err
}

// readResult reads the result file of a folder, as bytes and as what they say.
func readResult(folder string) ([]byte, *report.File, error) {
	path := filepath.Join(folder, resultName)
	raw, err := os.ReadFile(path)
	if err != nil {
		if info, statErr := os.Stat(folder); statErr == nil && !info.IsDir() {
			return nil, nil, usagef("%s is no folder; name the folder that compare wrote", folder)
		}
		return nil, nil, usagef("%s holds no %s; name the folder that compare wrote", folder, resultName)
	}
	file, err := report.Read(path)
	if errors.Is(err, report.ErrFormat) {
		return nil, nil, usagef("%s: %w", filepath.ToSlash(path), err)
	}
	return raw, file, err
}

// checkForeign returns an error of the user's if a file that is not ours stands where one of ours is to be.
func checkForeign(folder string, ours, made []string) error {
	for _, name := range made {
		_, err := os.Lstat(filepath.Join(folder, name))
		switch {
		case errors.Is(err, fs.ErrNotExist) || slices.Contains(ours, name):
		case err != nil:
			return err
		default:
			return usagef("%s holds %s, which standfast did not write; move it elsewhere first", folder, name)
		}
	}
	return nil
}

// union returns list with those of more that it does not hold behind it.
func union(list, more []string) []string {
	out := slices.Clone(list)
	for _, s := range more {
		if !slices.Contains(out, s) {
			out = append(out, s)
		}
	}
	return out
}
