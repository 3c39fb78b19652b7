package report

import (
	"encoding/json"
	"math"

	"standfast/lem"
)

// Number is a value that may be unknown: NaN in the program, null in the file.
type Number float64

var nan = Number(math.NaN())

// MarshalJSON writes the number unrounded, and null if it is not finite.
func (n Number) MarshalJSON() ([]byte, error) {
	if !n.Known() {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// UnmarshalJSON reads a number; null becomes NaN.
func (n *Number) UnmarshalJSON(b []byte) error {
	if string(b) == "null" {
		*n = Number(math.NaN())
		return nil
	}
	return json.Unmarshal(b, (*float64)(n))
}

// Known reports whether the number is finite.
func (n Number) Known() bool {
	v := float64(n)
	return !math.IsNaN(v) && !math.IsInf(v, 0)
}

// Point is a position in the section: x, y, m.
type Point [2]float64

func point(p lem.Point) Point { return Point{p.X, p.Y} }

func points(line []lem.Point) []Point {
	if line == nil {
		return nil
	}
	out := make([]Point, len(line))
	for i, p := range line {
		out[i] = point(p)
	}
	return out
}

// degrees converts an angle to degrees. Of the values that turn back into the same angle it takes the one with few decimals, so that 23
// degrees in a case file are 23 degrees in the result.
func degrees(rad float64) float64 {
	const decimals = 1e9
	d := rad * 180 / math.Pi
	if short := math.Round(d*decimals) / decimals; short*math.Pi/180 == rad {
		return short
	}
	return d
}
