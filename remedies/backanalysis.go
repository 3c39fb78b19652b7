package remedies

import (
	"errors"
	"fmt"
	"math"

	"standfast/lem"
)

// Observed is a slip that has happened.
type Observed struct {
	Slip      lem.Slip
	Situation int // Index into Job.Situations: the state in which it happened.
}

// Unknown is what a back-analysis looks for.
type Unknown uint8

// The unknowns.
const (
	StrengthPair  Unknown = iota // c' and phi' together.
	FrictionAlone                // phi' with c' = 0, as on a surface sheared to its residual strength.
	UndrainedCu                  // cu.
	PressureRatio                // ru with the strength as given.
)

// String returns the unknown in a word.
func (u Unknown) String() string { return [...]string{"strength", "friction", "cu", "ru"}[u] }

// Unknowns returns every unknown.
func Unknowns() []Unknown { return []Unknown{StrengthPair, FrictionAlone, UndrainedCu, PressureRatio} }

// BackSettings say how a slip is back-analysed. The zero value looks for pairs of c' and phi' of the soil that most of the slip runs in.
type BackSettings struct {
	Unknown Unknown
	HasSoil bool
	Soil    int        // Index into Section.Soils, when HasSoil.
	Method  lem.Method // Bishop, Spencer or MorgensternPrice; 0: Bishop on a circle, Spencer on a polyline.
	Slices  int        // 0: lem.DefaultSlices.
	// Low and High are the cohesions of the low and the high point, kPa, when HasRange; else 0 and half of the cohesion that would hold the slip
	// without friction.
	HasRange  bool
	Low, High float64
}

// BackPoint is a strength, or a pore pressure, with the FS that it gives the observed slip.
type BackPoint struct {
	Cohesion float64 // c', kPa; as in the case for PressureRatio.
	Friction float64 // phi', rad; likewise.
	Strength float64 // cu, kPa; UndrainedCu only.
	Ru       float64 // PressureRatio only.
	FS       float64
}

// BackAnalysis is the answer: what would have made the observed slip just fail.
type BackAnalysis struct {
	Unknown   Unknown
	Soil      int
	Share     float64 // Of the length of the slip that runs in the soil.
	Situation int
	Method    lem.Method
	AsGiven   float64 // FS of the observed slip with the strengths of the case; NaN if it has none.
	From, To  lem.Point
	Depth     float64 // m.
	// Curve has the pairs that give FS = 1, from the least cohesion up; for a single unknown it has FS over a range of it.
	Curve []BackPoint
	// Low, Middle and High are the points to go on with: pairs at FS = 1 from low to high cohesion; or the single unknown where FS is 1, between
	// its values where FS is 1 less and 1 plus Margin.
	Low, Middle, High BackPoint
	Margin            float64
	// Bend is the greatest distance of the curve of c' over tan(phi') from the straight line between its ends, over its greatest cohesion.
	Bend float64
}

// backMargin is how far from 1 the FS of a slip that has happened may be calculated, for a model that is not exact (common practice, no source).
const backMargin = 0.05

// Greatest strengths that a back-analysis tries.
const (
	mostFriction = 60 * math.Pi / 180 // rad
	mostCohesion = 1e4                // kPa
	mostRu       = 1.0
)

// curvePoints is the number of points of a curve.
const curvePoints = 13

// ErrNoBackAnalysis says that no strength or pressure brings the observed slip to FS = 1; the error tells why.
var ErrNoBackAnalysis = errors.New("no answer")

// BackAnalyse finds what gives the observed slip of a job FS = 1. The error wraps ErrNoBackAnalysis where nothing does, or ErrRequest where the
// settings do not fit the job.
func BackAnalyse(j *Job, o *Observed, s BackSettings) (*BackAnalysis, error) {
	b, err := newBackSolver(j, o, &s)
	if err != nil {
		return nil, err
	}
	if err := b.describe(); err != nil {
		return nil, err
	}
	switch s.Unknown {
	case StrengthPair:
		err = b.pairs(&s)
	case FrictionAlone:
		err = b.single(math.Tan(mostFriction), false)
	case UndrainedCu:
		err = b.single(mostCohesion, false)
	case PressureRatio:
		err = b.single(mostRu, true)
	}
	if err != nil {
		return nil, err
	}
	return &b.out, nil
}

// pairs finds the curve of c' over phi' and the points on it.
func (b *backSolver) pairs(s *BackSettings) error {
	if f := b.pair(0, 0); f >= 1 {
		return fmt.Errorf("%w: FS of the observed slip is %s even if %s had no strength at all: what else holds it is too strong, or the water at failure stood higher", ErrNoBackAnalysis, floorFS(f), b.name())
	}
	all, ok := rootOf(func(c float64) float64 { return b.pair(c, 0) }, mostCohesion)
	if !ok {
		return fmt.Errorf("%w: no cohesion up to %g kPa gives the observed slip FS 1: %s", ErrNoBackAnalysis, mostCohesion, b.why())
	}
	steepest, ok := b.frictionAt(0)
	if !ok { // Even the greatest angle needs some cohesion.
		steepest = math.Tan(mostFriction)
	}
	for i := range curvePoints {
		tan := steepest * float64(curvePoints-1-i) / (curvePoints - 1)
		c := 0.0
		switch {
		case i == curvePoints-1:
			c = all
		case i > 0 || !ok:
			if c, _ = rootOf(func(c float64) float64 { return b.pair(c, tan) }, mostCohesion); math.IsNaN(c) {
				continue
			}
		}
		b.out.Curve = append(b.out.Curve, BackPoint{Cohesion: c, Friction: math.Atan(tan), FS: b.pair(c, tan)})
	}
	b.out.Bend = bendOf(b.out.Curve)
	low, high := b.out.Curve[0].Cohesion, all/2
	if s.HasRange {
		low, high = s.Low, s.High
	}
	return b.choose(low, high)
}

// choose finds the points at the cohesions chosen.
func (b *backSolver) choose(low, high float64) error {
	for _, p := range []struct {
		to *BackPoint
		c  float64
	}{{&b.out.Low, low}, {&b.out.Middle, (low + high) / 2}, {&b.out.High, high}} {
		tan, ok := b.frictionAt(p.c)
		if !ok {
			first, last := b.out.Curve[0], b.out.Curve[len(b.out.Curve)-1]
			return fmt.Errorf("%w: with a cohesion of %.2f kPa no angle of friction gives FS 1; it may be from %.2f to %.2f kPa", ErrNoBackAnalysis, p.c, first.Cohesion, last.Cohesion)
		}
		*p.to = BackPoint{Cohesion: p.c, Friction: math.Atan(tan), FS: b.pair(p.c, tan)}
	}
	return nil
}

// frictionAt returns tan(phi') that goes with a cohesion.
func (b *backSolver) frictionAt(c float64) (tan float64, ok bool) {
	return rootOf(func(tan float64) float64 { return b.pair(c, tan) }, math.Tan(mostFriction))
}

// bendOf returns how far a curve of c' over tan(phi') leaves the straight line between its ends.
func bendOf(curve []BackPoint) float64 {
	first, last := curve[0], curve[len(curve)-1]
	t0, t1 := math.Tan(first.Friction), math.Tan(last.Friction)
	var bend float64
	for _, p := range curve {
		line := first.Cohesion + (last.Cohesion-first.Cohesion)*(math.Tan(p.Friction)-t0)/(t1-t0)
		bend = max(bend, math.Abs(p.Cohesion-line)/last.Cohesion)
	}
	return bend
}

// single finds the one unknown at FS = 1 and at the margins about it, and FS over a range about it.
func (b *backSolver) single(most float64, falling bool) error {
	at := func(fs float64) (BackPoint, bool) {
		g := func(v float64) float64 { return b.alone(v).FS + 1 - fs }
		if falling {
			g = func(v float64) float64 { return 1 + fs - b.alone(v).FS }
		}
		v, ok := rootOf(g, most)
		return b.alone(v), ok
	}
	var ok bool
	if b.out.Middle, ok = at(1); !ok {
		lowest, greatest := b.alone(0), b.alone(most)
		why := b.why()
		if math.IsNaN(lowest.FS) && greatest.FS > 1 || math.IsNaN(greatest.FS) && lowest.FS > 1 {
			why = fmt.Sprintf("where it should be 1 %s gives no answer on the slip", b.setting.Method)
		}
		return fmt.Errorf("%w: FS of the observed slip goes from %s to %s as %s goes from 0 to %s, and is 1 nowhere: %s", ErrNoBackAnalysis,
			fsOrNone(lowest.FS), fsOrNone(greatest.FS), b.unknown(), b.limit(most), why)
	}
	b.out.Margin = backMargin
	down, up := 1-backMargin, 1+backMargin
	if falling {
		down, up = up, down
	}
	if b.out.Low, ok = at(down); !ok {
		b.out.Low = b.alone(0)
	}
	if b.out.High, ok = at(up); !ok {
		b.out.High = b.alone(most)
	}
	value := b.valueOf(&b.out.Middle)
	for i := range curvePoints {
		const half = 0.5 // The range shown, from half to one and a half times the answer.
		v := min(value*(1-half+2*half*float64(i)/(curvePoints-1)), most)
		if p := b.alone(v); !math.IsNaN(p.FS) {
			b.out.Curve = append(b.out.Curve, p)
		}
	}
	return nil
}

// Limits of the search for a root.
const (
	rootTol   = 1e-7 // |FS - 1| that counts as 1.
	rootSteps = 200
)

// rootOf returns where f, which rises, is 1 between 0 and most: it looks for a bracket by doubling from a small value, then closes it by the
// Illinois variant of regula falsi, halving where f has no value at the lower end, as the methods often have none for a weak slip. ok is false
// where f is above 1 from the start, stays below, or has no value where it should be 1.
func rootOf(f func(float64) float64, most float64) (v float64, ok bool) {
	const first = 1.0 / (1 << 20) // Of the greatest value.
	lo, flo := 0.0, f(0)
	if flo > 1+rootTol {
		return math.NaN(), false
	}
	hi := most * first
	fhi := f(hi)
	for ; !(fhi >= 1) && hi < most; fhi = f(hi) {
		if !math.IsNaN(fhi) {
			lo, flo = hi, fhi
		}
		hi = min(2*hi, most)
	}
	if !(fhi >= 1) {
		return math.NaN(), false
	}
	side := 0
	for range rootSteps {
		mid := (lo + hi) / 2
		if !math.IsNaN(flo) {
			if t := hi - (fhi-1)*(hi-lo)/(fhi-flo); t > lo && t < hi {
				mid = t
			}
		}
		fm := f(mid)
		switch {
		case math.Abs(fm-1) <= rootTol:
			return mid, true
		case fm > 1:
			hi, fhi = mid, fm
			if side == 1 && !math.IsNaN(flo) {
				flo = 1 - (1-flo)/2
			}
			side = 1
		default: // Below 1, or no value.
			lo, flo = mid, fm
			if side == -1 {
				fhi = 1 + (fhi-1)/2
			}
			side = -1
		}
	}
	return math.NaN(), false
}
