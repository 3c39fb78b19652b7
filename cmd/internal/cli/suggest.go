package cli

import (
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
)

// unknownName returns the error for a name that is none of those there are, with the one that was probably meant.
func unknownName(what, name string, there []string) error {
	for _, t := range there {
		if near(name, t) {
			return usagef("unknown %s %q; did you mean %q?", what, name, t)
		}
	}
	return usagef("unknown %s %q; there are: %s", what, name, quoted(there))
}

// explainCommand puts the complaint about an unknown command into our words, with the one that was probably meant; any other error is
// returned as it is.
func explainCommand(root *cobra.Command, err error) error {
	var name string
	if _, e := fmt.Sscanf(err.Error(), "unknown command %q", &name); e != nil {
		return err
	}
	var there []string
	for _, c := range root.Commands() {
		if c.IsAvailableCommand() && c.Name() != "help" {
			there = append(there, c.Name())
		}
	}
	return unknownName("command", name, there)
}

// explainFlag adds to the complaint about an unknown flag the one that was probably meant.
func explainFlag(c *cobra.Command, err error) error {
	name, ok := strings.CutPrefix(err.Error(), "unknown flag: --")
	if !ok {
		return fmt.Errorf("%w; see %s --help", err, c.CommandPath())
	}
	meant := ""
	c.Flags().VisitAll(func(f *pflag.Flag) {
		if meant == "" && near(name, f.Name) {
			meant = f.Name
		}
	})
	if meant != "" {
		return fmt.Errorf("%w; did you mean --%s?", err, meant)
	}
	return fmt.Errorf("%w; see %s --help", err, c.CommandPath())
}

func quoted(names []string) string {
	out := make([]string, len(names))
	for i, n := range names {
		out[i] = fmt.Sprintf("%q", n)
	}
	return strings.Join(out, ", ")
}

// near reports whether a is likely a slip of the pen for b: the same letters in another order, or at most a third of them different. Case
// and the joining of words do not count.
func near(a, b string) bool {
	plain := strings.NewReplacer("_", " ", "-", " ")
	s, t := []rune(plain.Replace(strings.ToLower(a))), []rune(plain.Replace(strings.ToLower(b)))
	return distance(s, t) <= max(1, min(len(s), len(t))/3) || slices.Equal(slices.Sorted(slices.Values(s)), slices.Sorted(slices.Values(t)))
}

// distance is the least number of letters added, dropped or changed that turns s into t (Levenshtein 1966).
func distance(s, t []rune) int {
	row := make([]int, len(t)+1) // Distances from the letters of s so far to every beginning of t.
	for j := range row {
		row[j] = j
	}
	for i := range s {
		corner := row[0]
		row[0] = i + 1
		for j := range t {
			change := corner
			if s[i] != t[j] {
				change++
			}
			corner = row[j+1]
			row[j+1] = min(change, row[j]+1, corner+1)
		}
	}
	return row[len(t)]
}
