package cli

import (
	"errors"
	"fmt"
	"io/fs"
	"os"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
)

func newNewCommand() *cobra.Command {
	return &cobra.Command{
		Use:   "new FILE",
		Short: "Write a commented starter case",
		Long: `new writes a commented case file that runs as it is, to be changed into yours. It never writes over a file.

` + exitCodes(exitOK, exitInput, exitOther),
		Example: "  standfast new case.yaml",
		Args:    oneArgument("the file to write"),
		RunE:    func(c *cobra.Command, args []string) error { return runNew(c, args[0]) },
	}
}

func runNew(c *cobra.Command, path string) error {
	if err := writeNew(path, casefile.Starter()); err != nil {
		return err
	}
	_, err := fmt.Fprintf(c.OutOrStdout(), "Wrote %s. Change it into your case, then: standfast compare %[1]s\n", path)
	return err
}

// writeNew writes a file that does not exist yet.
func writeNew(path string, text []byte) error {
	f, err := os.OpenFile(path, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
	switch {
	case errors.Is(err, fs.ErrExist):
		return usagef("%s exists already; name a file that does not", path)
	case errors.Is(err, fs.ErrNotExist):
		return usagef("%s: its folder does not exist", path)
	case err != nil:
		return err
	}
	_, err = f.Write(text)
	if err = errors.Join(err, f.Close()); err != nil {
		return errors.Join(err, os.Remove(path))
	}
	return nil
}
