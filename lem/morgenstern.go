package lem

import "math"

// Bounds and tolerances of the two equations.
const (
	// Bounds of lambda times the greatest f, the tangent of the interslice inclination: -45 to 63 degrees, wider than any that soil can carry.
	inclineMin, inclineMax = -1.0, 2.0

	closureTol  = 1e-6 // Stop when |dF| <= closureTol * F and |dlambda| <= closureTol: Newton's next step would be of the order of its square.
	bracketTol  = 1e-9 // The same where lambda is bracketed and the steps shrink more slowly.
	newtonSteps = 16
	forceSteps  = 40
	mostFStep   = 0.3 // Greatest step of Newton's method in F, as a share of F,
	mostLStep   = 0.4 // and in lambda.
	scanSteps   = 24
	bracketing  = 60
	mostF       = 10 // The force equation is followed up to this multiple of the start.
)

// morgensternPrice solves the method of Morgenstern and Price (1965), which is that of Spencer (1967) when the side-force function is constant:
// the F and lambda at which forces and moments close. Newton's method in both unknowns with exact derivatives, started from a simplified method
// on the same slip; where that finds nothing, or an answer far off or inadmissible with lambda below 0, a search in lambda. No start is carried over from
// other slips, so that an answer never depends on what the workspace did before.
func (ws *Workspace) morgensternPrice(shape *SideForce, leftward bool) (f, lambda float64, reason Reason, st Status) {
	f = ws.startF(leftward)
	ws.prepareClosure(shape, leftward)
	if !(f > 0) || ws.sidePeak == 0 {
		return math.NaN(), math.NaN(), Admissible, NotConverged
	}
	pole := ws.pole()
	start := max(f, pole*startAbovePole)
	f, lambda, ok := ws.newton(start, ws.startLambda(leftward), pole, leftward)
	if ok {
		reason = ws.judge(f, lambda, leftward).Reason
	}
	doubtful := !ok || f > farFromStart*start || f*farFromStart < start || reason != Admissible && lambda < 0
	if doubtful && start < scanUpTo {
		if a, b, why, found := ws.scanLambda(start, pole, leftward); found && (!ok || why == Admissible) {
			f, lambda, reason, ok = a, b, why, true
		}
	}
	if !ok || reason != Admissible {
		if free, idle := ws.idleSlices(start, pole, leftward); idle {
			return free, 0, Admissible, Converged
		}
	}
	switch {
	case !ok:
		return math.NaN(), math.NaN(), Admissible, NotConverged
	case reason != Admissible:
		return f, lambda, reason, Inadmissible
	}
	return f, lambda, reason, Converged
}

// idleSlices looks for the F at which every slice is in equilibrium on its own, as on a plane without cohesion: there is then no force between
// slices, moments close whatever lambda is, and there is no line of thrust to judge.
func (ws *Workspace) idleSlices(start, pole float64, leftward bool) (f float64, ok bool) {
	for i := range ws.slice[:ws.n] {
		if ws.slice[i].cl != 0 {
			return 0, false
		}
	}
	if f, _, ok = ws.forceF(start, 0, pole, leftward); !ok {
		return 0, false
	}
	ws.trace(f, 0, leftward)
	var load, greatest float64
	for i := range ws.slice[:ws.n] {
		load += math.Abs(ws.slice[i].q)
		greatest = max(greatest, math.Abs(ws.forces[i].e))
	}
	return f, greatest <= idleShare*load
}

// When the fallback is called, and what counts as no force between slices.
const (
	idleShare    = 1e-6 // Of the vertical load.
	farFromStart = 3    // An answer further from its start than by this ratio is looked at twice: the equations have answers without sense too.
	scanUpTo     = 10   // Slips whose simplified F is above this are not: they do not matter, and there are many in a search.
)

// startAbovePole is how far above the largest pole of m-alpha the iteration starts at least.
const startAbovePole = 1.01

// startF returns the F of a simplified method: Bishop's on an arc, Janbu's on a polyline, the Ordinary method's where these have none.
func (ws *Workspace) startF(leftward bool) float64 {
	var f float64
	if ws.arc {
		f, _ = ws.bishop(leftward)
	} else {
		f, _ = ws.janbu()
	}
	if !(f > 0) {
		f, _ = ws.ordinary(leftward)
	}
	return f
}

// startLambda is the tangent of 0.7 of the mean inclination of the slip (a common guess, no source), for the greatest f.
func (ws *Workspace) startLambda(leftward bool) float64 {
	a, b := ws.edge(0, -1, leftward), ws.edge(ws.n-1, 1, leftward)
	drop := (a.Y - b.Y) / (b.X - a.X)
	if leftward {
		drop = -drop
	}
	return 0.7 * max(0, drop) / ws.sidePeak
}

// pole returns the F below which m-alpha of some slice is negative.
func (ws *Workspace) pole() float64 {
	var p float64
	ss := ws.rising()
	for i := range ss {
		if s := &ss[i]; -s.sin*s.tan > p*s.cos {
			p = -s.sin * s.tan / s.cos
		}
	}
	return p
}

// rising returns slices among which are all whose base rises towards the exit; on an arc they lie at the exit, and there are no others.
func (ws *Workspace) rising() []slice {
	ss := ws.slice[:ws.n]
	if !ws.arc {
		return ss
	}
	if ss[0].sin < ss[len(ss)-1].sin {
		i := 0
		for i < len(ss) && ss[i].sin < 0 {
			i++
		}
		return ss[:i]
	}
	i := len(ss)
	for i > 0 && ss[i-1].sin < 0 {
		i--
	}
	return ss[i:]
}

// newton solves both equations together. It gives up where an iterate leaves the range in which every m-alpha and every 1 + g lambda f is
// positive.
func (ws *Workspace) newton(f, lambda, pole float64, leftward bool) (float64, float64, bool) {
	for range newtonSteps {
		c := ws.closure(f, lambda, leftward)
		det := c.eF*c.mL - c.eL*c.mF
		df := -(c.e*c.mL - c.eL*c.m) / det
		dl := -(c.eF*c.m - c.e*c.mF) / det
		if !(c.least > 0) || math.IsNaN(df+dl) || math.IsInf(df+dl, 0) {
			break
		}
		scale := min(1, mostFStep*f/math.Abs(df), mostLStep/(ws.sidePeak*math.Abs(dl)))
		if f+scale*df <= pole {
			scale = (f - pole) / (2 * math.Abs(df))
		}
		f += scale * df
		lambda += scale * dl
		if incline := lambda * ws.sidePeak; !(incline >= inclineMin && incline <= inclineMax) {
			break
		}
		if scale == 1 && math.Abs(df) <= closureTol*f && math.Abs(dl) <= closureTol {
			return f, lambda, true
		}
	}
	return 0, 0, false
}

// scanLambda is the safeguarded fallback: for each lambda the force equation gives F, and every change of sign of the moment over the range of
// lambda is bracketed and closed. Of several answers an admissible one counts first, then the one nearest to lambda = 0.
func (ws *Workspace) scanLambda(start, pole float64, leftward bool) (f, lambda float64, reason Reason, ok bool) {
	prevL, prevM, prevOK := 0.0, 0.0, false
	for i := range scanSteps + 1 {
		l := (inclineMin + (inclineMax-inclineMin)*float64(i)/scanSteps) / ws.sidePeak
		fl, m, good := ws.forceF(start, l, pole, leftward)
		if good && prevOK && (m > 0) != (prevM > 0) {
			if a, b, found := ws.bracketed(fl, pole, prevL, l, prevM, m, leftward); found {
				why := ws.judge(a, b, leftward).Reason
				if !ok || why == Admissible && reason != Admissible || (why == Admissible) == (reason == Admissible) && math.Abs(b) < math.Abs(lambda) {
					f, lambda, reason, ok = a, b, why, true
				}
			}
		}
		prevL, prevM, prevOK = l, m, good
	}
	return f, lambda, reason, ok
}

// bracketed closes in on the lambda between a and b, whose moments have different signs, by regula falsi with the Illinois safeguard.
func (ws *Workspace) bracketed(start, pole, a, b, ma, mb float64, leftward bool) (f, lambda float64, ok bool) {
	f = start
	side := 0
	for range bracketing {
		lambda = b - mb*(b-a)/(mb-ma)
		var m float64
		if f, m, ok = ws.forceF(f, lambda, pole, leftward); !ok {
			return 0, 0, false
		}
		before := side
		if (m > 0) == (ma > 0) {
			a, ma, side = lambda, m, 1
			if before == 1 {
				mb /= 2
			}
		} else {
			b, mb, side = lambda, m, -1
			if before == -1 {
				ma /= 2
			}
		}
		if m == 0 || math.Abs(b-a) <= bracketTol {
			return f, lambda, true
		}
	}
	return 0, 0, false
}

// forceF solves the force equation for F at a given lambda, by Newton's method kept between bounds, and returns the moment left over.
func (ws *Workspace) forceF(start, lambda, pole float64, leftward bool) (f, moment float64, ok bool) {
	lo, hi := pole, math.Inf(1)
	f = start
	for range forceSteps {
		c := ws.closure(f, lambda, leftward)
		if !(c.least > 0) || f > mostF*start {
			return 0, 0, false
		}
		if c.e > 0 {
			hi = f
		} else {
			lo = f
		}
		next := f - c.e/c.eF
		if !(next > lo && next < hi || next == f) { // Outside the bounds, or not a number.
			if next = (lo + hi) / 2; math.IsInf(hi, 1) {
				next = 2 * f
			}
		}
		if math.Abs(next-f) <= bracketTol*next {
			return next, c.m + c.mF*(next-f), true
		}
		f = next
	}
	return 0, 0, false
}
