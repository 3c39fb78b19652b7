// Package drawing makes the pictures of a study: cross-sections at equal scales and the curve of earthworks against the factor of
// safety reached, as SVG, PNG and PDF.
//
// A drawing is laid out once, in page coordinates (points of 1/72 inch, origin at the lower left, y up), as a [Figure]: a list of
// fills, lines and texts that is then written in any format. Every text is set with the metrics of the font it is drawn in and
// recorded in [Figure.Labels] with its bounding box, so that a test can show that no two texts overlap and none leaves the page.
//
// Texts inside a drawing are placed by a greedy search (place.go): each label tries positions about its anchor, may not touch a
// text that already stands, and pays for the lines that it covers and for its distance.
//
// A factor of safety is printed rounded down to three decimals, a quantity rounded up to two.
package drawing
