package cli

import (
	"fmt"
	"io"
	"slices"

	"github.com/spf13/cobra"

	"standfast/remedies"
)

// shells are those that completion is written for, each with the writer of its script.
var shells = []struct {
	name  string
	write func(root *cobra.Command, w io.Writer) error
}{
	{"bash", func(root *cobra.Command, w io.Writer) error { return root.GenBashCompletionV2(w, true) }},
	{"zsh", func(root *cobra.Command, w io.Writer) error { return root.GenZshCompletion(w) }},
	{"fish", func(root *cobra.Command, w io.Writer) error { return root.GenFishCompletion(w, true) }},
	{"powershell", func(root *cobra.Command, w io.Writer) error { return root.GenPowerShellCompletionWithDesc(w) }},
}

func shellNames() []string {
	var out []string
	for _, s := range shells {
		out = append(out, s.name)
	}
	return out
}

func newCompletionCommand() *cobra.Command {
	return &cobra.Command{
		Use:   "completion SHELL",
		Short: "Print the script that completes commands, files and flags in a shell",
		Long: `completion prints a script for bash, zsh, fish or powershell. Loaded by the shell, it completes commands, case files, flags and
the names of remedies when Tab is pressed. To have it in every session:

  bash        standfast completion bash > /etc/bash_completion.d/standfast
  zsh         standfast completion zsh > "${fpath[1]}/_standfast"
  fish        standfast completion fish > ~/.config/fish/completions/standfast.fish
  powershell  standfast completion powershell >> $PROFILE

` + exitCodes(exitOK, exitInput, exitOther),
		Example:   "  source <(standfast completion bash)",
		Args:      oneArgument("a shell"),
		ValidArgs: shellNames(),
		RunE: func(c *cobra.Command, args []string) error {
			i := slices.Index(shellNames(), args[0])
			if i < 0 {
				return unknownName("shell", args[0], shellNames())
			}
			if err := shells[i].write(c.Root(), c.OutOrStdout()); err != nil {
				return fmt.Errorf("completion: %w", err)
			}
			return nil
		},
	}
}

// completeCases completes the one argument that is a case file.
func completeCases(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
	if len(args) > 0 {
		return nil, cobra.ShellCompDirectiveNoFileComp
	}
	return []string{"yaml", "yml"}, cobra.ShellCompDirectiveFilterFileExt
}

// completeFolders completes the one argument that is a folder.
func completeFolders(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
	if len(args) > 0 {
		return nil, cobra.ShellCompDirectiveNoFileComp
	}
	return nil, cobra.ShellCompDirectiveFilterDirs
}

// completeRemedies completes the name of a remedy.
func completeRemedies(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
	var out []string
	for _, k := range remedies.Catalogue() {
		out = append(out, k.Name+"\t"+k.Title)
	}
	return out, cobra.ShellCompDirectiveNoFileComp
}
