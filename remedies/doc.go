// Package remedies is the domain: what is asked ([Job]), the remedial works that can answer it ([Kind], [Remedy], [Proposal]),
// their quantities, and the [Study] that sizes every remedy by putting the engine (package lem) inside the optimiser (package
// optimize).
//
// Units are m, kN, kPa and radians, quantities m3 per metre run; the section's own coordinates are used throughout. The package
// knows nothing of files, flags or drawings.
package remedies
