// Package survey reads cross-sections that people already have: tables of offset and level as CSV, and drawings with polylines on layers as
// DXF. Both become a casefile.Sketch. Every fault is a casefile.Fault with its line, and all of them are told at once.
package survey
