// Package validation checks the engine, the water and the quantities against values from outside the project: published worked examples,
// charts and closed forms. The table of checks is the one that the package's tests run, and from which docs/validation.md is written:
//
//	go test ./cmd/internal/validation -update
//
// A value that this project computed is never the value that a check wants. Sources marked "recalled from memory" were not at hand when their
// numbers were written down.
package validation
