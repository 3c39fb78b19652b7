package drawing

import (
	"math"
	"testing"
)

func length(lines [][]xy) float64 {
	var sum float64
	for _, l := range lines {
		sum += math.Hypot(l[1].X-l[0].X, l[1].Y-l[0].Y)
	}
	return sum
}

func TestHatchFillsItsRegion(t *testing.T) {
	square := [][]xy{{{0, 0}, {100, 0}, {100, 100}, {0, 100}}}
	hole := append(square, []xy{{25, 25}, {75, 25}, {75, 75}, {25, 75}})
	half := [][]xy{{{0, 0}, {50, 0}, {50, 100}, {0, 100}}}
	tests := []struct {
		name    string
		regions [][][]xy
		area    float64
	}{
		{"square", [][][]xy{square}, 100 * 100},
		{"square with a hole", [][][]xy{hole}, 100*100 - 50*50},
		{"common part of two", [][][]xy{square, half}, 50 * 100},
		{"nothing in common", [][][]xy{half, {{{60, 0}, {90, 0}, {90, 90}}}}, 0},
	}
	const spacing, tol = 0.5, 0.01 // Closed form: lines spacing apart measure area/spacing.
	for _, c := range tests {
		for _, angle := range []float64{0, cutHatchAngle, fillHatchAngle, 1} {
			t.Run(c.name, func(t *testing.T) {
				if got := length(hatch(angle, spacing, c.regions...)) * spacing; math.Abs(got-c.area) > tol*100*100 {
					t.Errorf("at %.2f rad the hatch stands for an area of %.1f, want %.1f", angle, got, c.area)
				}
			})
		}
	}
}

// direction returns the angle of a pen's lines in a figure, and their number.
func direction(f *Figure, p pen) (angle float64, n int) {
	for _, m := range f.marks {
		s, ok := m.(stroke)
		if !ok || s.pen.colour != p.colour || s.pen.width != p.width {
			continue
		}
		for _, l := range s.lines {
			if len(l) == 2 {
				angle, n = math.Atan2(l[1].Y-l[0].Y, l[1].X-l[0].X), n+1
			}
		}
	}
	return angle, n
}

func TestCutAndFillAreHatchedInDifferentDirections(t *testing.T) {
	d := regradeWithDrains()
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		t.Fatal(err)
	}
	a, cuts := direction(f, cutPen)
	b, fills := direction(f, fillPen)
	if cuts == 0 || fills == 0 {
		t.Fatalf("%d lines of cut and %d of fill, want some of both", cuts, fills)
	}
	if d := math.Abs(math.Remainder(a-b, math.Pi)); math.Abs(d-quarterTurn) > 1e-9 {
		t.Errorf("the hatches of cut and fill meet at %.3f rad, want a right angle", d)
	}
}
