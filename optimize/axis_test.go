package optimize

import (
	"fmt"
	"slices"
	"strconv"
	"testing"
)

func TestAxis(t *testing.T) {
	tests := []struct {
		axis Axis
		len  int
		last float64
	}{
		{Axis{"tenths", 0.5, 3, 0.1}, 26, 3},
		{Axis{"quarters", 3, 8, 0.25}, 21, 8},
		{Axis{"fixed", 2, 2, 0}, 1, 2},
		{Axis{"fixed with step", 2, 2, 0.1}, 1, 2},
		{Axis{"step past max", 0, 1, 3}, 1, 0},
		{Axis{"max off the lattice", 0, 1, 0.3}, 4, 0.9},
		{Axis{"negative", -1.2, 0.9, 0.7}, 4, 0.9},
		{Axis{"levels", 100.05, 109.95, 0.005}, 1981, 109.95},
	}
	for _, tt := range tests {
		t.Run(tt.axis.Name, func(t *testing.T) {
			if got := tt.axis.Len(); got != tt.len {
				t.Errorf("len %d, want %d", got, tt.len)
			}
			if got := tt.axis.At(tt.len - 1); got != tt.last {
				t.Errorf("last %v, want %v", got, tt.last)
			}
		})
	}
}

func TestAxisValuesAreExactDecimals(t *testing.T) {
	a := Axis{"x", 0, 50, 0.1}
	for i := range a.Len() {
		if want, _ := strconv.ParseFloat(fmt.Sprintf("%d.%d", i/10, i%10), 64); a.At(i) != want {
			t.Fatalf("point %d is %v, want %v", i, a.At(i), want)
		}
	}
}

func TestPoint(t *testing.T) {
	axes := []Axis{{"a", 0, 1, 1}, {"b", 7, 7, 0}, {"c", 0, 2, 1}}
	for i, want := range [][]float64{{0, 7, 0}, {0, 7, 1}, {0, 7, 2}, {1, 7, 0}, {1, 7, 1}, {1, 7, 2}} {
		if got := Point(axes, i); !slices.Equal(got, want) {
			t.Errorf("point %d is %v, want %v", i, got, want)
		}
	}
}

func TestCoarsen(t *testing.T) {
	axes := []Axis{{"a", 0, 9, 1}, {"b", 0, 19, 1}}
	got, coarsened := coarsen(axes, 50)
	if !coarsened || latticeSize(got) != 50 || got[0].Step != 2 || got[1].Step != 2 {
		t.Errorf("%+v", got)
	}
	if _, coarsened = coarsen(axes, 200); coarsened {
		t.Error("coarsened without need")
	}
}
