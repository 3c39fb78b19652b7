package lem

import "math"

// Bounds and tolerances of Spencer's two equations.
const (
	lambdaMin, lambdaMax = -1.0, 2.0 // Interslice inclination -45 to 63 degrees: wider than any that soil can carry.
	closureTol           = 1e-9      // Stop when the step in F and lambda is below this.
	newtonSteps          = 30
	thrustBelow          = 0.5 // Thrust may run this share of the interface's height below its base or
	thrustAbove          = 1.5 // up to this share above its base before the answer is inadmissible,
	thrustCounts         = 0.2 // looked at where the interslice force is at least this share of its greatest value.
)

// spencer solves Spencer's method (1967) in the form of Morgenstern and Price (1965) with a constant side-force function: the vertical
// interslice force is X = lambda E. For each slice, from the head down, with C = (c l - u l tan phi)/F, m = cos + sin tan phi/F and
// g = (sin - cos tan phi/F)/m, horizontal and vertical equilibrium give
//
//	E_r = E_l + (T + g Q - C/m)/(1 + g lambda),
//
// moments about the middle of the base give, with M = E times the level of thrust,
//
//	M_r = M_l + (E_r - E_l) y - (X_l + X_r) b/2 + moments of the horizontal loads T.
//
// E and M vanish at the toe. Newton's method with the exact derivatives; if it fails, a search in lambda.
func (ws *Workspace) spencer(leftward bool) (f, lambda float64, st Status) {
	f, st = ws.bishop(leftward)
	if st != Converged && !(f > 0) {
		f, st = ws.ordinary(leftward)
		if st != Converged || !(f > 0) {
			return math.NaN(), math.NaN(), NotConverged
		}
	}
	start := f
	lambda = startLambda(ws)
	for range newtonSteps {
		c := ws.closure(f, lambda, leftward)
		det := c.eF*c.mL - c.eL*c.mF
		df := -(c.e*c.mL - c.eL*c.m) / det
		dl := -(c.eF*c.m - c.e*c.mF) / det
		if math.IsNaN(df+dl) || math.IsInf(df+dl, 0) {
			break
		}
		scale := 1.0
		if lim := 0.3 * f; math.Abs(df) > lim {
			scale = lim / math.Abs(df)
		}
		if lim := 0.4; math.Abs(dl)*scale > lim {
			scale = lim / math.Abs(dl)
		}
		f += scale * df
		lambda += scale * dl
		if lambda < lambdaMin || lambda > lambdaMax {
			break
		}
		if scale == 1 && math.Abs(df) <= closureTol*f && math.Abs(dl) <= closureTol {
			return f, lambda, ws.admittedSpencer(f, lambda, leftward)
		}
	}
	f, lambda, ok := ws.scanLambda(start, leftward)
	if !ok {
		return math.NaN(), math.NaN(), NotConverged
	}
	return f, lambda, ws.admittedSpencer(f, lambda, leftward)
}

// startLambda is the tangent of 0.7 of the mean inclination of the driving slices, a common guess.
func startLambda(ws *Workspace) float64 {
	var drop, width float64
	for i := range ws.slice[:ws.n] {
		s := &ws.slice[i]
		drop += s.sin / s.cos * s.b
		width += s.b
	}
	return 0.7 * max(0, drop/width)
}

// closing holds the errors of closure and their derivatives by F and lambda.
type closing struct{ e, eF, eL, m, mF, mL float64 }

// closure runs through the slices from the head down and returns what is left at the toe.
func (ws *Workspace) closure(f, lambda float64, leftward bool) closing {
	ss := ws.slice[:ws.n]
	var c closing
	inv := 1 / f
	datum := ss[0].y
	for i := range ss {
		k := i
		if leftward {
			k = len(ss) - 1 - i
		}
		s := &ss[k]
		t := s.tan * inv
		m := 1 / (s.cos + s.sin*t)
		n := s.sin - s.cos*t
		g := n * m
		coh := (s.cl - s.ul*s.tan) * inv
		dm := -s.sin * t * inv
		dg := (s.cos*t*inv - g*dm) * m
		r := coh * m
		dr := -(r*inv + r*m*dm)
		a := 1 / (1 + g*lambda)
		step := (s.h + s.k + g*s.q - r) * a
		stepF := (s.q*dg-dr)*a - step*a*lambda*dg
		stepL := -step * a * g
		e, eF, eL := c.e+step, c.eF+stepF, c.eL+stepL
		y, half := s.y-datum, s.b/2
		c.m += step*y - lambda*(c.e+e)*half
		c.mF += stepF*y - lambda*(c.eF+eF)*half
		c.mL += stepL*y - (c.e+e+lambda*(c.eL+eL))*half
		if s.h != 0 || s.k != 0 {
			c.m += s.h*(s.hy-s.y) + s.k*(s.ky-s.y)
		}
		c.e, c.eF, c.eL = e, eF, eL
	}
	return c
}

// scanLambda is the safeguarded fallback: for each lambda the force equation gives F, and the moment's change of sign is bracketed over
// the range of lambda and halved.
func (ws *Workspace) scanLambda(start float64, leftward bool) (f, lambda float64, ok bool) {
	const steps = 24
	prevL, prevM, prevOK := 0.0, 0.0, false
	best := math.Inf(1)
	for i := 0; i <= steps; i++ {
		l := lambdaMin + (lambdaMax-lambdaMin)*float64(i)/steps
		ff, mm, good := ws.forceF(start, l, leftward)
		if good && prevOK && mm*prevM <= 0 {
			if a, b, found := ws.bracketed(start, prevL, l, prevM, leftward); found && math.Abs(b) < best {
				f, lambda, ok, best = a, b, true, math.Abs(b)
			}
		}
		_ = ff
		prevL, prevM, prevOK = l, mm, good
	}
	return f, lambda, ok
}

// bracketed halves an interval of lambda whose ends have moments of different sign.
func (ws *Workspace) bracketed(start, a, b, ma float64, leftward bool) (f, lambda float64, ok bool) {
	for range 60 {
		mid := (a + b) / 2
		ff, mm, good := ws.forceF(start, mid, leftward)
		if !good {
			return 0, 0, false
		}
		f, lambda = ff, mid
		if mm*ma > 0 {
			a, ma = mid, mm
		} else {
			b = mid
		}
		if b-a <= closureTol {
			return f, lambda, true
		}
	}
	return f, lambda, true
}

// forceF solves the force equation for F at a given lambda and returns the moment left over.
func (ws *Workspace) forceF(start, lambda float64, leftward bool) (f, moment float64, ok bool) {
	f = start
	for range newtonSteps {
		c := ws.closure(f, lambda, leftward)
		df := -c.e / c.eF
		if math.IsNaN(df) || math.IsInf(df, 0) {
			return 0, 0, false
		}
		if lim := 0.3 * f; math.Abs(df) > lim {
			df = math.Copysign(lim, df)
		}
		f += df
		if math.Abs(df) <= closureTol*f {
			return f, c.m + c.mF*df, true
		}
	}
	return 0, 0, false
}

// admittedSpencer gives the verdict on an answer: m-alpha, and the line of thrust where the interslice force is considerable.
func (ws *Workspace) admittedSpencer(f, lambda float64, leftward bool) Status {
	if _, st := ws.admitted(f); st != Converged {
		return st
	}
	ss := ws.slice[:ws.n]
	var greatest float64
	for pass := range 2 {
		var e, m float64
		for i := range ss {
			k := i
			if leftward {
				k = len(ss) - 1 - i
			}
			s := &ss[k]
			t := s.tan / f
			mm := 1 / (s.cos + s.sin*t)
			g := (s.sin - s.cos*t) * mm
			before := e
			e += (s.h + s.k + g*s.q - (s.cl-s.ul*s.tan)/f*mm) / (1 + g*lambda)
			m += (e-before)*s.y - lambda*(before+e)*s.b/2 + s.h*(s.hy-s.y) + s.k*(s.ky-s.y)
			if pass == 0 {
				greatest = max(greatest, math.Abs(e))
				continue
			}
			if i == len(ss)-1 || math.Abs(e) < thrustCounts*greatest {
				continue
			}
			height := s.ground - s.y
			if share := (m/e - s.y) / height; height > 0 && (share < -thrustBelow || share > thrustAbove) {
				return Inadmissible
			}
		}
	}
	return Converged
}
