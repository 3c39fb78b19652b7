package cli

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"math"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// studyOptions are the flags of every command that analyses.
type studyOptions struct {
	json    bool
	quiet   bool
	targets []string
	jobs    int
	seed    uint64
}

func (o *studyOptions) addFlags(c *cobra.Command) {
	f := c.Flags()
	f.BoolVar(&o.json, "json", false, "print result.json to stdout instead of tables")
	f.BoolVarP(&o.quiet, "quiet", "q", false, "print nothing but errors")
	f.StringArrayVar(&o.targets, "target", nil, "required FS, as `[SITUATION=]FS`; of every situation if none is named (repeatable)")
	f.IntVar(&o.jobs, "jobs", 0, "cores to use, 0 for all; results do not depend on it")
	f.Uint64Var(&o.seed, "seed", 0, "seed of the searches")
}

func (o *studyOptions) settings() (remedies.Settings, error) {
	if o.jobs < 0 {
		return remedies.Settings{}, usagef("--jobs %d: must be 0 or more", o.jobs)
	}
	return remedies.Settings{Workers: o.jobs, Seed: o.seed}, nil
}

// open reads the flags and the case, with the required FS that the flags ask for, and prints what the case is warned of.
func (o *studyOptions) open(c *cobra.Command, path string) (*casefile.Case, remedies.Settings, error) {
	settings, err := o.settings()
	if err != nil {
		return nil, settings, err
	}
	read, err := readCase(path)
	if err != nil {
		return nil, settings, err
	}
	if err := applyTargets(read.Job, o.targets); err != nil {
		return nil, settings, err
	}
	if !o.quiet {
		printWarnings(c, read.Warnings)
	}
	return read, settings, nil
}

// overrides lists the flags that change what the case asks, as they go into the results.
func (o *studyOptions) overrides() []string {
	var out []string
	for _, t := range o.targets {
		out = append(out, "--target "+t)
	}
	return out
}

// readCase reads a case file; whatever is wrong with it is an error of the user's.
func readCase(path string) (*casefile.Case, error) {
	c, err := casefile.Read(path)
	var onDisk *fs.PathError
	if errors.As(err, &onDisk) {
		return nil, usagef("cannot read the case file %s: %w", path, onDisk.Err)
	}
	return c, err
}

// oneArgument refuses anything but one argument, in words of the command.
func oneArgument(what string) cobra.PositionalArgs {
	return func(c *cobra.Command, args []string) error {
		if len(args) == 1 {
			return nil
		}
		return fmt.Errorf("%s takes one argument, %s, and got %d; see standfast %[1]s --help", c.Name(), what, len(args))
	}
}

// caseName returns the name of a case file without folder and extension; outputs are named after it.
func caseName(path string) string {
	base := filepath.Base(path)
	return strings.TrimSuffix(base, filepath.Ext(base))
}

func sourceOf(c *casefile.Case, overrides []string) report.Source {
	return report.Source{
		File: filepath.Base(c.File), SHA256: c.SHA256, Text: c.Source, Version: version(), Notes: c.Notes, Overrides: overrides,
	}
}

// applyTargets sets the required FS that the user asks for; a target for one situation goes before one for all.
func applyTargets(j *remedies.Job, targets []string) error {
	type target struct {
		situation int // Index; -1: all.
		fs        float64
	}
	var parsed []target
	for _, t := range targets {
		name, value := "", t
		if i := strings.LastIndexByte(t, '='); i >= 0 {
			name, value = strings.TrimSpace(t[:i]), strings.TrimSpace(t[i+1:])
		}
		fs, err := strconv.ParseFloat(value, 64)
		if err != nil || math.IsNaN(fs) || !(fs > 0 && fs <= maxTarget) {
			return usagef("--target %s: %q is not a factor of safety above 0 and at most %v", t, value, maxTarget)
		}
		at := -1
		if name != "" {
			names := situationNames(j)
			if at = slices.Index(names, name); at < 0 {
				return unknownName("situation", name, names)
			}
		}
		parsed = append(parsed, target{at, fs})
	}
	slices.SortStableFunc(parsed, func(a, b target) int { return min(a.situation, 0) - min(b.situation, 0) })
	for _, t := range parsed {
		for i := range j.Situations {
			if t.situation < 0 || t.situation == i {
				j.Situations[i].RequiredFS, j.Situations[i].RatioToExisting = t.fs, 0
			}
		}
	}
	return nil
}

// maxTarget bounds a required FS: beyond it a typing error is likelier than a wish.
const maxTarget = 10.0

func situationNames(j *remedies.Job) []string {
	var names []string
	for _, s := range j.Situations {
		names = append(names, s.Name)
	}
	return names
}

// applyOnly keeps only the remedies and trial works that are named.
func applyOnly(j *remedies.Job, only []string) error {
	if len(only) == 0 {
		return nil
	}
	var there []string
	for _, r := range j.Requests {
		there = append(there, r.Kind)
	}
	for _, t := range j.Trials {
		there = append(there, t.Name)
	}
	for _, name := range only {
		if slices.Contains(there, name) {
			continue
		}
		if _, known := remedies.Find(name); known {
			return usagef("--only %s: the case does not ask for it; it asks for: %s", name, quoted(there))
		}
		return unknownName("remedy", name, there)
	}
	j.Requests = slices.DeleteFunc(j.Requests, func(r remedies.Request) bool { return !slices.Contains(only, r.Kind) })
	j.Trials = slices.DeleteFunc(j.Trials, func(t remedies.Trial) bool { return !slices.Contains(only, t.Name) })
	j.Combinations = slices.DeleteFunc(j.Combinations, func(names []string) bool {
		return slices.ContainsFunc(names, func(n string) bool { return !slices.Contains(only, n) })
	})
	return nil
}

// finished returns the error of a context that ended, else err.
func finished(ctx context.Context, err error) error {
	if ctx.Err() != nil {
		return ctx.Err()
	}
	return err
}
