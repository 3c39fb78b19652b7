package lem

import "math"

// AtmosphericPressure is the pressure that stresses of a power law are divided by, kPa (standard atmosphere).
const AtmosphericPressure = 101.325

// PowerLaw is a curved strength envelope through the origin: tau = A pa (sigma'/pa)^B, with pa the [AtmosphericPressure] and sigma' the effective
// normal stress on the slip (a power law as Charles and Watts 1980 fitted to rockfill, made free of units; recalled from memory).
type PowerLaw struct {
	A float64 // Shear strength over normal stress at one atmosphere, > 0.
	B float64 // Exponent, 0 < B <= 1; with 1 the envelope is straight.
}

// Strength returns the shear strength at an effective normal stress, kPa. Below [LeastEnvelopeStress] the envelope is straight to the origin.
func (p PowerLaw) Strength(stress float64) float64 {
	e := p.envelope()
	c, tan := e.tangent(stress)
	return c + stress*tan
}

// LeastEnvelopeStress is the effective normal stress, kPa, below which a curved envelope is replaced by its chord to the origin, since a power
// law is infinitely steep there. The chord lies below the curve.
const LeastEnvelopeStress = 1.0

// Limits of the iteration that brings strengths in step with the normal stresses.
const (
	envelopeSteps = 40
	envelopeTol   = 1e-6 // Stop when a step changes F by no more than this share of it.
)

// envelope is a power law in kPa: strength = k stress^b.
type envelope struct{ k, b float64 }

func (p PowerLaw) envelope() envelope {
	return envelope{p.A * math.Pow(AtmosphericPressure, 1-p.B), p.B}
}

// tangent returns the straight strength law that touches the envelope at a normal stress.
func (e envelope) tangent(stress float64) (c, tan float64) {
	if stress < LeastEnvelopeStress {
		return 0, e.k * math.Pow(LeastEnvelopeStress, e.b-1)
	}
	chord := e.k * math.Pow(stress, e.b-1)
	return chord * stress * (1 - e.b), chord * e.b
}

// settle solves the slices by a method, again and again with the tangents to the curved envelopes at the normal stresses of the last answer, until
// F no longer changes. As an envelope never lies above its tangent, the strength that counts at the end is that of the curve. Without an end
// the slip is NotConverged.
func (ws *Workspace) settle(method Method, r *Result) {
	ws.method(method, r)
	for range envelopeSteps {
		if r.Status == NotConverged {
			return
		}
		before := ws.answer
		if !ws.restress(method, r) {
			return
		}
		ws.method(method, r)
		if math.Abs(ws.answer-before) <= envelopeTol*before {
			return
		}
	}
	r.F, r.Status, r.Reason = math.NaN(), NotConverged, Admissible
	if f, st := ws.ordinary(r.Leftward); st == Converged && f > 0 {
		r.Screen = f
	}
}

// restress gives every slice on a curved envelope the tangent at its normal stress in the last answer. It reports whether there is such a slice.
func (ws *Workspace) restress(method Method, r *Result) bool {
	f := ws.answer
	rigorous := method == Spencer || method == MorgensternPrice
	if rigorous {
		ws.trace(f, r.Lambda, r.Leftward)
	}
	any := false
	for j := range ws.n {
		s := &ws.slice[ws.fromHead(j, r.Leftward)]
		if s.curve.k == 0 {
			continue
		}
		any = true
		normal := 0.0 // Effective, kN.
		switch {
		case rigorous:
			normal = ws.forces[j].normal - s.ul
		case method == Ordinary:
			normal = ws.ordinaryNormal(s)
		default: // Vertical equilibrium without vertical forces between slices.
			normal = (s.q - s.ul*s.cos - s.cl*s.sin/f) / (s.cos + s.sin*s.tan/f)
		}
		c, tan := s.curve.tangent(normal / s.length)
		s.tan, s.cl = tan, c*s.length
		s.frees = s.cl*s.cos + (s.q-s.ul*s.cos)*tan
	}
	return any
}
