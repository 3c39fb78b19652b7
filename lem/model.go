package lem

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

// Model is a section in one situation, compiled for evaluation: vertical columns between whose edges every boundary is
// straight, so that weights and pore pressures are linear functions. It keeps no reference to the Section. A Model is read-only after
// Compile and may be used by many goroutines, each with its own Workspace.
type Model struct {
	cols   []column
	layers []layer
	kh     float64
	soils  []strength  // By soil of the section.
	varied []Surcharge // Variable surcharges.
	pooled bool        // Free water stands somewhere.
	firm   bool        // A firm base is given.

	left, right float64   // Ends of the ground as given; the columns go on beyond them, level.
	low, high   float64   // Lowest and highest ground, m.
	known       [][]Point // Known slip surfaces, vertical steps drawn out.
}

// column is a vertical strip of the section; the lines are y = a + b x.
type column struct {
	x0, x1      float64
	ground      line
	tangent     float64 // sin of the ground's inclination: where an arc runs parallel to the ground, dx = tangent * radius.
	water       line    // Piezometric head, free water included; level -Inf if dry.
	free        float64 // Level of free water; -Inf if none.
	pressure    float64 // Permanent surcharge, kPa.
	variable    uint64  // Bit set of Model.varied acting here.
	firm        line    // Firm base; -Inf if none.
	invert      line    // Drains' invert, when drained.
	ratio       line    // Drains' ratio lowered, when drained.
	fade        float64 // m; 0: no drains here.
	first, last int32   // Layers of the column: layers[first:last], from the top down.
}

// layer is one soil in one column. The weight of soil above a point in it is sigma + slope x - gamma y, kPa.
type layer struct {
	bottom       line // -Inf for the lowest.
	sigma, slope float64
	gamma        float64
	soil         int32
	pore         poreKind
	freeLevel    float64 // For pore == poreLevel.
	ru           float64 // For pore == poreRu.
	kind         strengthKind
	c, tan       float64 // Cohesion (or cu at the datum), kPa; tangent of the friction angle.
	gradient     float64
	datum        line
	known        int32 // 1 + index of the known slip surface that the layer is the band of; 0: none.
}

type line struct{ a, b float64 }

func (l line) at(x float64) float64 { return l.a + l.b*x }

var nowhere = line{a: math.Inf(-1)}

type poreKind uint8

const (
	poreNone  poreKind = iota // Undrained or dry.
	poreLine                  // Piezometric line of the column.
	poreRu                    // Ratio to the weight above.
	poreLevel                 // Free-draining: hydrostatic below a level.
)

type strengthKind uint8

const (
	strengthConstant strengthKind = iota // c and tan.
	strengthGradient                     // cu = c + gradient * depth below datum.
	strengthPoints                       // cu interpolated between points.
)

// strength is what the model keeps of a soil.
type strength struct {
	verticals []vertical
}

// Errors of Compile.
var (
	ErrEmptySection     = errors.New("lem: section has no ground, no strata or no soils")
	ErrNoUndrained      = errors.New("lem: soil is to act undrained but has no undrained strength")
	ErrNotLeftToRight   = errors.New("lem: line does not run from left to right")
	ErrTooManyVariable  = errors.New("lem: more than 64 variable surcharges")
	ErrNotFinite        = errors.New("lem: number is not finite")
	ErrNoSuchSoil       = errors.New("lem: soil index out of range")
	ErrBadDrawdownRatio = errors.New("lem: drains need one ratio a point of the invert and a fade above 0")
)

// stepWidth is the share of the section's width over which a vertical step is drawn out, so that the ground is a function of x.
const stepWidth = 1e-7

// Compile prepares the section in a situation for evaluation. It returns an error if the section is not well formed. The model's
// memory is used again.
func (m *Model) Compile(s *Section, sit *Situation) error {
	if err := check(s, sit); err != nil {
		return err
	}
	m.cols, m.layers, m.soils, m.varied = m.cols[:0], m.layers[:0], m.soils[:0], m.varied[:0]
	m.kh = sit.Kh
	m.left, m.right = s.Ground.Left(), s.Ground.Right()
	m.low, m.high = extent(s.Ground)
	m.pooled, m.firm = len(sit.Water.Free) > 0, s.FirmBase != nil
	for i := range s.Soils {
		m.soils = append(m.soils, strength{verticals: verticals(s.Soils[i].Undrained)})
	}
	for _, l := range s.Loads {
		if l.Variable {
			m.varied = append(m.varied, l)
		}
	}
	d := draughtOf(s, sit)
	m.known = d.known
	xs := d.breakpoints()
	for i := 0; i+1 < len(xs); i++ {
		m.addColumn(d, xs[i], xs[i+1])
	}
	return nil
}

func extent(p Profile) (low, high float64) {
	low, high = p[0].Y, p[0].Y
	for _, q := range p {
		low, high = min(low, q.Y), max(high, q.Y)
	}
	return low, high
}

// check validates what the engine relies on; the sense of the numbers is the caller's affair.
func check(s *Section, sit *Situation) error {
	if len(s.Ground) < 2 || len(s.Strata) == 0 || len(s.Soils) == 0 {
		return ErrEmptySection
	}
	var errs []error
	lines := []Profile{s.Ground, s.FirmBase, sit.Water.Line}
	for _, st := range s.Strata {
		if st.Soil < 0 || st.Soil >= len(s.Soils) {
			errs = append(errs, fmt.Errorf("%w: stratum of soil %d", ErrNoSuchSoil, st.Soil))
		}
		if len(st.Top) == 0 {
			return ErrEmptySection
		}
		lines = append(lines, st.Top)
	}
	for i := range s.Known {
		if len(s.Known[i].Line) < 2 {
			return ErrEmptySection
		}
		lines = append(lines, s.Known[i].Line)
	}
	for _, b := range s.Placed {
		if b.Soil < 0 || b.Soil >= len(s.Soils) {
			errs = append(errs, fmt.Errorf("%w: placed body of soil %d", ErrNoSuchSoil, b.Soil))
		}
		errs = append(errs, finite(b.Outline))
	}
	for i, u := range sit.Undrained {
		if !u || i >= len(s.Soils) {
			continue
		}
		if s.Soils[i].Undrained == nil {
			errs = append(errs, fmt.Errorf("%w: %s", ErrNoUndrained, s.Soils[i].Name))
		}
	}
	if d := sit.Water.Drains; d != nil {
		lines = append(lines, d.Invert)
		if len(d.Ratio) != len(d.Invert) || !(d.Fade > 0) {
			errs = append(errs, ErrBadDrawdownRatio)
		}
	}
	for _, l := range lines {
		errs = append(errs, finite(l))
		if !slices.IsSortedFunc(l, func(a, b Point) int {
			switch {
			case a.X < b.X:
				return -1
			case a.X > b.X:
				return 1
			}
			return 0
		}) {
			errs = append(errs, ErrNotLeftToRight)
		}
	}
	variable := 0
	for _, l := range s.Loads {
		if l.Variable {
			variable++
		}
	}
	if variable > 64 {
		errs = append(errs, ErrTooManyVariable)
	}
	return errors.Join(errs...)
}

func finite(ps []Point) error {
	for _, p := range ps {
		if math.IsNaN(p.X+p.Y) || math.IsInf(p.X+p.Y, 0) {
			return ErrNotFinite
		}
	}
	return nil
}
