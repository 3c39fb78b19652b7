// Package sheet makes the client sheet: one self-contained HTML page that sets the options side by side, for a meeting, a phone and the
// printer.
//
// A sheet is made from a [report.File] alone, so that a finished result folder can be turned into one again. Every number and every
// judgement on it is worked out here and written into the page, rounded as everywhere: a factor of safety (FS) down, a quantity up.
// The script of the page (ui/, TypeScript) only shows what it was given. It draws the sections at the width of the screen or paper
// and, as the required FS is moved, chooses among the designs that were sized, never between them (see pick.go).
//
// The page needs no network and forbids it: its content policy names the hashes of its own style and script and nothing else.
//
// The script and style are bundled by "go generate"; a test fails when the bundle is older than its sources.
package sheet

//go:generate go test -run TestBundleIsCurrent -update .
