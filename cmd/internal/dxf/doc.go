// Package dxf writes and reads drawings in the DXF exchange format, as text: what it writes is release 12 (AC1009), which every program
// that takes DXF takes; of what it reads it keeps the lines, polylines and their layers.
//
// Coordinates are those of the drawing's user, here metres with x across and y up. Text is ASCII with other characters as \U+XXXX. The same
// drawing gives the same bytes.
package dxf
