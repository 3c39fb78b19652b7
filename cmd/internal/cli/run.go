package cli

import (
	"context"
	"io"
	"os"
	"os/signal"
	"syscall"

	"github.com/spf13/cobra"
)

// Main runs the program with the arguments and streams of the process and returns its exit code. An interrupt stops the work in an
// orderly way; a second one at once.
func Main() int {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	context.AfterFunc(ctx, stop)
	return run(ctx, os.Args[1:], os.Stdin, os.Stdout, os.Stderr)
}

// run runs one command and returns the exit code.
func run(ctx context.Context, args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	root, started := newRootCommand()
	root.SetArgs(args)
	root.SetIn(stdin)
	root.SetOut(stdout)
	root.SetErr(stderr)
	err := root.ExecuteContext(ctx)
	if err != nil && !*started { // Refused by cobra before a command of ours ran.
		err = &usageError{explainCommand(root, err)}
	}
	if err == nil && ctx.Err() != nil {
		err = ctx.Err()
	}
	code := exitCode(err)
	printError(stderr, err, code)
	return code
}

// newRootCommand returns the program's command and a flag that is set once a subcommand runs.
func newRootCommand() (root *cobra.Command, started *bool) {
	started = new(bool)
	root = &cobra.Command{
		Use:   "standfast",
		Short: "Size the least works that make a failing slope stand",
		Long: `standfast sizes the remedial works that bring a failing slope to a required factor of safety (FS) in every design
situation and construction stage, with the least earthworks, and compares them.

A preliminary sizing aid for use by a competent engineer: what it says must be checked before anything is built.

` + exitCodes(exitOK, exitInput, exitNothingMeets, exitInterrupted, exitOther),
		Example:           "  standfast new case.yaml\n  standfast compare case.yaml",
		Version:           version(),
		SilenceErrors:     true,
		SilenceUsage:      true,
		PersistentPreRun:  func(*cobra.Command, []string) { *started = true },
		CompletionOptions: cobra.CompletionOptions{DisableDefaultCmd: true},
	}
	root.SetVersionTemplate("standfast {{.Version}}\n")
	root.SetFlagErrorFunc(explainFlag)
	root.AddCommand(newCompareCommand(), newAssessCommand(), newBackanalyseCommand(), newDrawCommand(), newNewCommand(), newImportCommand(), newReportCommand(), newVerifyCommand(), newSchemaCommand(), newCompletionCommand())
	return root, started
}
