package cli

import (
	"slices"

	"github.com/spf13/cobra"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
)

// schemas are the files that have a schema, each with its text.
var schemas = []struct {
	name string
	text func() []byte
}{
	{"case", casefile.Schema},
	{"result", report.Schema},
}

func schemaNames() []string {
	var out []string
	for _, s := range schemas {
		out = append(out, s.name)
	}
	return out
}

func newSchemaCommand() *cobra.Command {
	return &cobra.Command{
		Use:   "schema case|result",
		Short: "Print the JSON Schema of the case file or of result.json",
		Long: `schema prints the JSON Schema (draft 2020-12) of the case file or of result.json. An editor that knows YAML completes and checks
a case file with it while you write: save it beside the case and begin the case with the line

  # yaml-language-server: $schema=case.schema.json

` + exitCodes(exitOK, exitInput, exitOther),
		Example:   "  standfast schema case > case.schema.json",
		Args:      oneArgument("case or result"),
		ValidArgs: schemaNames(),
		RunE: func(c *cobra.Command, args []string) error {
			i := slices.Index(schemaNames(), args[0])
			if i < 0 {
				return unknownName("schema", args[0], schemaNames())
			}
			_, err := c.OutOrStdout().Write(schemas[i].text())
			return err
		},
	}
}
