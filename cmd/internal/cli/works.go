package cli

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"unicode"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// writeWorks writes everything that a comparison gives to the folder out and returns what stands in its result.json.
func writeWorks(ctx context.Context, out string, c *casefile.Case, r *remedies.Result, src report.Source) (*report.File, error) {
	outputs, err := drawingsOf(r)
	if err != nil {
		return nil, err
	}
	names := fileNames(r.Options)
	for i := range r.Options {
		o := &r.Options[i]
		if o.Proposal == nil {
			continue
		}
		text, err := c.Proposed(o)
		if err != nil {
			return nil, fmt.Errorf("%s as a case file: %w", o.Title, err)
		}
		outputs = append(outputs, output{names[i] + ".yaml", func(w io.Writer) error { _, err := w.Write(text); return err }})
	}
	witnesses := report.NewWitnesses(r, src)
	outputs = append(outputs, output{"witnesses.json", witnesses.Encode})
	src.Files = []string{resultName}
	for _, o := range outputs {
		src.Files = append(src.Files, o.name)
	}
	file := report.New(r, src)
	outputs = append(outputs, output{resultName, file.Encode})
	return file, writeFolder(ctx, out, outputs)
}

// drawingsOf draws the section as it is, every option that has works, and the trade-off.
func drawingsOf(r *remedies.Result) ([]output, error) {
	var out []output
	add := func(name string, f *drawing.Figure, err error) error {
		switch {
		case errors.Is(err, drawing.ErrNothingToDraw):
			return nil
		case err != nil:
			return fmt.Errorf("drawing %s: %w", name, err)
		}
		out = append(out, output{name + ".svg", f.WriteSVG}, output{name + ".png", f.WritePNG})
		return nil
	}
	f, err := drawing.Section(r.Job, &r.Existing, drawing.Options{})
	if err := add("section-existing", f, err); err != nil {
		return nil, err
	}
	names := fileNames(r.Options)
	for i := range r.Options {
		if r.Options[i].Proposal == nil {
			continue
		}
		f, err := drawing.Section(r.Job, &r.Options[i], drawing.Options{})
		if err := add("section-"+names[i], f, err); err != nil {
			return nil, err
		}
	}
	f, err = drawing.Tradeoff(r.Job.Title, r.Options, drawing.Options{})
	return out, add("tradeoff", f, err)
}

// fileNames returns a name for the files of each option: the option's own with what no file system likes replaced, and told apart by
// a number where two would be the same.
func fileNames(options []remedies.Option) []string {
	names := make([]string, len(options))
	taken := map[string]bool{"existing": true}
	for i := range options {
		base := strings.Map(func(r rune) rune {
			if unicode.IsLetter(r) || unicode.IsDigit(r) || strings.ContainsRune("+_-", r) {
				return r
			}
			return '-'
		}, options[i].Name)
		name := base
		for n := 2; taken[strings.ToLower(name)]; n++ {
			name = fmt.Sprintf("%s-%d", base, n)
		}
		taken[strings.ToLower(name)] = true
		names[i] = name
	}
	return names
}

// writePair writes a figure as base.svg and base.png, both or none. The folder is made if need be.
func writePair(ctx context.Context, base string, f *drawing.Figure) (err error) {
	if err := os.MkdirAll(filepath.Dir(base), 0o777); err != nil {
		return err
	}
	aside, err := os.MkdirTemp(filepath.Dir(base), ".standfast-*")
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, os.RemoveAll(aside)) }()
	pair := []output{{".svg", f.WriteSVG}, {".png", f.WritePNG}}
	for _, o := range pair {
		if err := writeFile(filepath.Join(aside, o.name), o.write); err != nil {
			return err
		}
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	for _, o := range pair {
		if err := os.Rename(filepath.Join(aside, o.name), base+o.name); err != nil {
			return err
		}
	}
	return nil
}
