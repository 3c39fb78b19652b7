package lem

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
)

// Model is a section in one situation, compiled for evaluation: vertical columns between whose edges every boundary is
// straight, so that weights and pore pressures are linear functions. It keeps no reference to the Section. A Model is read-only after
// Compile and may be used by many goroutines, each with its own Workspace.
type Model struct {
	cols    []column
	layers  []layer
	kh      float64
	vert    float64     // 1 + kv: vertical force over weight.
	soils   []strength  // By soil of the section.
	varied  []Surcharge // Variable surcharges.
	pooled  bool        // Free water stands somewhere.
	firm    bool        // A firm base is given.
	sheared bool        // Some load has a horizontal part.
	curved  bool        // Some soil has a curved envelope.
	crack   *crackWater // Water in the tension crack; nil: there is none.
	rows    []Restraint // Restraints of the section.
	points  []vertical  // Pore pressures at points.

	left, right float64   // Ends of the ground as given; the columns go on beyond them, level.
	low, high   float64   // Lowest and highest ground, m.
	known       [][]Point // Known slip surfaces, vertical steps drawn out.
	jumps       []float64 // Line loads: F of slips jumps where an end passes them.
}

// column is a vertical strip of the section; the lines are y = a + b x.
type column struct {
	x0, x1      float64
	ground      line
	tangent     float64 // sin of the ground's inclination: where an arc runs parallel to the ground, dx = tangent * radius.
	water       line    // Piezometric head, free water included; level -Inf if dry.
	free        float64 // Level of free water; -Inf if none.
	pressure    line    // Permanent surcharge, kPa.
	shear       float64 // Horizontal pressure on the ground to the right, kPa.
	variable    uint64  // Bit set of Model.varied acting here.
	firm        line    // Firm base; -Inf if none.
	crack       line    // Bottom of the tension crack; +Inf where there is none.
	surface     int     // Soil at the ground.
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
	head         line    // For pore == poreOwn.
	unit         float64 // For poreLine and poreOwn: pressure per metre of depth below the head, kN/m3.
	ru           float64 // For pore == poreRu.
	kind         strengthKind
	c, tan       float64 // Cohesion (or cu at the datum, or least cu), kPa; tangent of the friction angle.
	gradient     float64
	datum        line
	curve        envelope // For kind == strengthCurved.
	known        int32    // 1 + index of the known slip surface that the layer is the band of; 0: none.
	plain        bool     // Model.fillPlain does for slices whose base lies in it.
}

type line struct{ a, b float64 }

func (l line) at(x float64) float64 { return l.a + l.b*x }

var nowhere = line{a: math.Inf(-1)}

type poreKind uint8

const (
	poreNone   poreKind = iota // Undrained or dry.
	poreLine                   // Piezometric line of the column.
	poreRu                     // Ratio to the weight above.
	poreOwn                    // Head line of the layer: a soil's own line, or the level in a free-draining soil.
	porePoints                 // Interpolated between points.
)

type strengthKind uint8

const (
	strengthConstant strengthKind = iota // c and tan.
	strengthGradient                     // cu = c + gradient * depth below datum.
	strengthPoints                       // cu interpolated between points.
	strengthRatio                        // cu = max(c, datum - gradient * y).
	strengthCurved                       // Curved envelope.
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
	m.kh, m.vert = sit.Kh, 1+sit.Kv
	m.left, m.right = s.Ground.Left(), s.Ground.Right()
	m.low, m.high = extent(s.Ground)
	m.pooled, m.firm = len(sit.Water.Free) > 0, s.FirmBase != nil
	m.sheared, m.curved = false, false
	m.crack = crackWaterOf(s.Crack)
	m.rows = append(m.rows[:0], s.Restraints...)
	m.points = pressureVerticals(sit.Water.Points)
	for i := range s.Soils {
		m.soils = append(m.soils, strength{verticals: strengthVerticals(s.Soils[i].Undrained)})
	}
	for _, l := range s.Loads {
		if l.Variable {
			m.varied = append(m.varied, l)
		}
	}
	m.jumps = m.jumps[:0]
	for _, l := range s.LineLoads {
		m.jumps = append(m.jumps, l.X)
	}
	d := draughtOf(s, sit)
	m.known = d.known
	xs := d.breakpoints()
	for i := 0; i+1 < len(xs); i++ {
		m.addColumn(d, xs[i], xs[i+1])
	}
	m.markPlain()
	return nil
}

// markPlain marks the layers whose slices need nothing but constant strength, a water line and permanent pressures.
func (m *Model) markPlain() {
	if m.pooled || m.curved || m.sheared || m.kh != 0 {
		return
	}
	for i := range m.cols {
		c := &m.cols[i]
		for k := c.first; k < c.last; k++ {
			l := &m.layers[k]
			l.plain = l.kind == strengthConstant && (l.pore == poreNone || l.pore == poreLine && c.fade == 0)
		}
	}
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
	for _, w := range sit.Water.BySoil {
		lines = append(lines, w.Line)
	}
	if s.Crack != nil {
		lines = append(lines, s.Crack.Line)
	}
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
	errs = append(errs, checkLines(lines))
	variable := 0
	for _, l := range s.Loads {
		if l.Variable {
			variable++
		}
	}
	if variable > 64 {
		errs = append(errs, ErrTooManyVariable)
	}
	errs = append(errs, checkWater(s, &sit.Water), checkStrength(s), checkLoads(s, sit), s.Crack.check(), checkRestraints(s.Restraints))
	return errors.Join(errs...)
}

// checkLines returns an error where lines are not finite or run back.
func checkLines(lines []Profile) error {
	var errs []error
	for _, l := range lines {
		errs = append(errs, finite(l))
		if !slices.IsSortedFunc(l, compareX) {
			errs = append(errs, ErrNotLeftToRight)
		}
	}
	return errors.Join(errs...)
}

func compareX(a, b Point) int { return cmp.Compare(a.X, b.X) }

// compareDown sorts levels from the top down.
func compareDown(a, b float64) int { return cmp.Compare(b, a) }

func finite(ps []Point) error {
	for _, p := range ps {
		if math.IsNaN(p.X+p.Y) || math.IsInf(p.X+p.Y, 0) {
			return ErrNotFinite
		}
	}
	return nil
}
