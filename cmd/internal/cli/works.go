package cli

import (
	"context"
	"fmt"
	"io"
	"strings"
	"unicode"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// writeWorks writes everything that a comparison gives to the folder out and returns what stands in its result.json.
func writeWorks(ctx context.Context, out string, c *casefile.Case, r *remedies.Result, src report.Source) (*report.File, error) {
	file := report.New(r, src)
	outputs, err := deliverables(file)
	if err != nil {
		return nil, err
	}
	names := fileNames(r.Options)
	resolved := *c
	resolved.Job = r.Job // With required FS where the case has ratios: an option that cannot be built was never checked.
	for i := range r.Options {
		o := &r.Options[i]
		if o.Proposal == nil {
			continue
		}
		text, err := resolved.Proposed(o)
		if err != nil {
			return nil, fmt.Errorf("%s as a case file: %w", o.Title, err)
		}
		outputs = append(outputs, output{names[i] + ".yaml", func(w io.Writer) error { _, err := w.Write(text); return err }})
	}
	witnesses := report.NewWitnesses(r, src)
	outputs = append(outputs, output{witnessesName, witnesses.Encode})
	file.Files = append([]string{resultName}, outputNames(outputs)...)
	outputs = append(outputs, output{resultName, file.Encode})
	return file, writeFolder(ctx, out, outputs)
}

// fileNames returns a name for the files of each option: the option's own with what no file system likes replaced, and told apart by
// a number where two would be the same.
func fileNames(options []remedies.Option) []string {
	names := make([]string, len(options))
	taken := map[string]bool{"existing": true}
	for i := range options {
		base := fileName(options[i].Name)
		name := base
		for n := 2; taken[strings.ToLower(name)]; n++ {
			name = fmt.Sprintf("%s-%d", base, n)
		}
		taken[strings.ToLower(name)] = true
		names[i] = name
	}
	return names
}

// fileName returns a name with what no file system likes replaced.
func fileName(name string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsLetter(r) || unicode.IsDigit(r) || strings.ContainsRune("+_-", r) {
			return r
		}
		return '-'
	}, name)
}
