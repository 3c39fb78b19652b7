package casefile

import (
	_ "embed" // the starter case is a file of its own, so that it reads as a case file does
	"slices"
)

//go:embed starter.yaml
var starter []byte

// Starter returns a commented case to start from: an invented small cutting that runs as it is.
func Starter() []byte { return slices.Clone(starter) }
