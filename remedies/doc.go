// Package remedies is the domain: what is asked ([Job]), the remedial works that can answer it ([Kind], [Remedy], [Proposal]),
// their quantities, and the [Study] that sizes every remedy by putting the engine (package lem) inside the optimiser (package
// optimize).
//
// Works are geometry first: a [Kind] describes its sizes as data, its shape is set out on a slope that descends to the right
// (mirrored where it does not), and what follows from the shape - cut by soil, bodies of fill, water clipped to the new ground,
// limits broken, stages to check - is the same for all kinds. Several remedies are folded cuts first, then fills, then drains.
//
// Units are m, kN, kPa and radians, quantities m3 per metre run; the section's own coordinates are used throughout. The package
// knows nothing of files, flags or drawings.
package remedies
