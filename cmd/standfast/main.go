// Command standfast sizes the remedial works that bring a failing slope to a required factor of safety with least earthworks.
package main

import (
	"os"

	"standfast/cmd/internal/cli"
)

func main() { os.Exit(cli.Main()) }
