package cli

import (
	"context"
	"errors"
	"fmt"
	"io"
	"strings"

	"standfast/cmd/internal/casefile"
	"standfast/remedies"
)

// The exit codes. docs/outputs.md promises that they stay.
const (
	exitOK           = 0
	exitOther        = 1
	exitInput        = 2
	exitNothingMeets = 3
	exitInterrupted  = 130 // 128 + SIGINT, as shells have it.
)

// exitMeaning says in a help text what a code stands for.
var exitMeaning = map[int]string{
	exitOK:           "done",
	exitOther:        "anything else, such as a full disk",
	exitInput:        "bad input or flags",
	exitNothingMeets: "the answer is no: nothing meets the target, or verify refutes an option; the output says why",
	exitInterrupted:  "interrupted; nothing is half written",
}

// exitCodes lists codes for a help text.
func exitCodes(codes ...int) string {
	var b strings.Builder
	b.WriteString("Exit codes:")
	for _, c := range codes {
		fmt.Fprintf(&b, "\n  %3d  %s", c, exitMeaning[c])
	}
	return b.String()
}

// usageError is an error of the user's: flags, arguments, names.
type usageError struct{ err error }

func (e *usageError) Error() string { return e.err.Error() }
func (e *usageError) Unwrap() error { return e.err }

func usagef(format string, args ...any) error { return &usageError{fmt.Errorf(format, args...)} }

// errNothingMeets says that no option meets the target; the output has said so already.
var errNothingMeets = errors.New("nothing meets the target")

// errRefuted says that verify refuted an option; the output has said so already.
var errRefuted = errors.New("an option is refuted")

// exitCode returns the exit code that an error stands for.
func exitCode(err error) int {
	var usage *usageError
	switch {
	case err == nil:
		return exitOK
	case errors.Is(err, context.Canceled):
		return exitInterrupted
	case errors.Is(err, errNothingMeets), errors.Is(err, errRefuted):
		return exitNothingMeets
	case errors.As(err, &usage), len(casefile.Faults(err)) > 0, errors.Is(err, remedies.ErrRequest),
		errors.Is(err, remedies.ErrBlankRate):
		return exitInput
	}
	return exitOther
}

// printError prints an error for people. Faults of a file stand one below the other, each with its line.
func printError(w io.Writer, err error, code int) {
	switch code {
	case exitOK, exitNothingMeets:
		return
	case exitInterrupted:
		fmt.Fprintln(w, "standfast: interrupted; nothing was written")
		return
	}
	faults := casefile.Faults(err)
	if len(faults) == 0 {
		fmt.Fprintf(w, "standfast: %v\n", err)
		return
	}
	for _, f := range faults {
		fmt.Fprintln(w, f)
	}
	if n := len(faults); n > 1 {
		fmt.Fprintf(w, "standfast: %d faults in %s; nothing was written\n", n, faults[0].File)
		return
	}
	fmt.Fprintf(w, "standfast: a fault in %s; nothing was written\n", faults[0].File)
}
