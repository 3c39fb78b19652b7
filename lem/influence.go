package lem

import (
	"fmt"
	"math"
	"slices"
)

// Influence is what small loads on the ground do to the F of a fixed slip: its influence line (Hutchinson 1977, 1984). A load placed where the line
// is positive raises F, one removed lowers it; the slip that governs may then be another, so that it guides and does not prove.
type Influence struct {
	Load    float64 // The load that changes are given for, kN per metre run.
	F       float64 // Without it.
	Points  []InfluencePoint
	Neutral []NeutralPoint // Where the line changes its sign, from left to right.
}

// InfluencePoint is the influence line over the middle of a slice.
type InfluencePoint struct {
	X, Ground   float64 // m.
	Inclination float64 // alpha of the base, rad, positive where it falls in the direction of movement.
	Drained     Change  // No excess pore pressure: the long term.
	Undrained   Change  // Excess pore pressure equal to the pressure of the load, B = 1: the short term.
}

// Change is what a load does to F. Formula is that of a vanishing load, scaled up:
//
//	dF/dW = [(1 - B) tan(phi)/m - F sin(alpha)]/(D - dR/dF)                               on a circle,
//	dF/dW = [(1 - B) tan(phi)/(m cos(alpha)) - F tan(alpha)]/(D - dR/dF)                  on a polyline,
//
// from F D = R(F), D and R being the driving and the resisting sums of Bishop's and of Janbu's method. Both vanish where
// tan(alpha) = (1 - B sec^2(alpha)) tan(phi)/F, Hutchinson's neutral point. Placed and Removed are finite differences by the method itself;
// NaN where it has no answer.
type Change struct{ Formula, Placed, Removed float64 }

// NeutralPoint is where a load leaves F as it is.
type NeutralPoint struct {
	X, Ground   float64 // m.
	Undrained   bool
	Differences bool    // By finite differences of the method, not by the formula.
	Inclination float64 // alpha that the formula asks for there, rad.
}

// NeutralAngle returns the inclination alpha, rad, at which a small load with the excess pore pressure ratio B leaves F as it is, phiM being the
// mobilised friction, tan(phiM) = tan(phi)/F: alpha = [phiM + asin((1 - 2 B) sin(phiM))]/2, the solution of Hutchinson's
// tan(alpha) = (1 - B sec^2(alpha)) tan(phiM).
func NeutralAngle(phiM, b float64) float64 { return (phiM + math.Asin((1-2*b)*math.Sin(phiM))) / 2 }

// Influence returns the influence line of the part of a slip that counts, for a load in kN per metre run. It allocates. The error is that of Detail.
func (m *Model) Influence(s *Slip, o Setting, load float64) (Influence, error) {
	d, err := m.Detail(s, o)
	if err != nil {
		return Influence{}, err
	}
	if d.Result.Status != Converged {
		return Influence{}, fmt.Errorf("%w: %s", ErrNoWorking, d.Result.Reason)
	}
	var ws Workspace
	r, p := m.lowest(&ws, s, &o)
	m.slicePart(&ws, p, s, &o)
	m.resolve(&ws, p, s, &o, r)
	n := &nudge{m: m, ws: &ws, o: &o, r: r, load: load, slices: slices.Clone(ws.slice[:ws.n])}
	out := Influence{Load: load, F: r.F}
	line := ws.influence(d.F, load*d.Correction, r.Leftward)
	for i := range n.slices {
		c := &n.slices[i]
		at := InfluencePoint{X: c.x, Ground: c.ground, Inclination: d.Slices[i].Inclination}
		at.Drained = Change{line[i][0], n.change(i, load, 0), n.change(i, -load, 0)}
		at.Undrained = Change{line[i][1], n.change(i, load, 1), n.change(i, -load, 1)}
		out.Points = append(out.Points, at)
	}
	out.findNeutral(&d)
	return out, nil
}

// influence returns the formula for a load on each slice, drained and undrained.
func (ws *Workspace) influence(f, load float64, leftward bool) [][2]float64 {
	out := make([][2]float64, ws.n)
	var driving, slope float64 // D, and dR/dF.
	for i := range ws.slice[:ws.n] {
		c := &ws.slice[i]
		m := c.cos + c.sin*c.tan/f
		over := 1.0
		if !ws.arc {
			over = c.cos
			driving += c.h + c.k + c.q*c.sin/c.cos
		}
		slope += c.frees * c.sin * c.tan / (f * f * m * m * over)
		out[i] = [2]float64{(c.tan/m - f*c.sin) / over, -f * c.sin / over}
	}
	if ws.arc {
		driving = ws.driving(leftward)
	}
	for i := range out {
		for k := range out[i] {
			out[i][k] *= load / (driving - slope)
		}
	}
	return out
}

// nudge evaluates a slip with a load on one slice.
type nudge struct {
	m      *Model
	ws     *Workspace
	o      *Setting
	r      Result
	load   float64
	slices []slice // Without it.
}

// change returns what a load on the i-th slice, with the excess pore pressure ratio b, does to F.
func (n *nudge) change(i int, load, b float64) float64 {
	copy(n.ws.slice, n.slices)
	c := &n.ws.slice[i]
	c.q += load
	c.ul += b * load / c.cos
	c.frees += (1 - b) * load * c.tan
	r := n.r
	n.m.answer(n.ws, n.o.Method, &r)
	if r.Status != Converged {
		return math.NaN()
	}
	return r.F - n.r.F
}

// findNeutral finds where the lines cross zero.
func (v *Influence) findNeutral(d *Detail) {
	lines := []struct {
		undrained, differences bool
		of                     func(p *InfluencePoint) float64
	}{
		{false, false, func(p *InfluencePoint) float64 { return p.Drained.Formula }},
		{false, true, func(p *InfluencePoint) float64 { return p.Drained.Placed }},
		{true, false, func(p *InfluencePoint) float64 { return p.Undrained.Formula }},
		{true, true, func(p *InfluencePoint) float64 { return p.Undrained.Placed }},
	}
	for i := 0; i+1 < len(v.Points); i++ {
		p, q := &v.Points[i], &v.Points[i+1]
		for _, l := range lines {
			a, b := l.of(p), l.of(q)
			if !(a*b < 0) && (a == 0 || b != 0) {
				continue
			}
			t := a / (a - b)
			tan := d.Slices[i].TanFriction
			if t > 0.5 {
				tan = d.Slices[i+1].TanFriction
			}
			excess := 0.0
			if l.undrained {
				excess = 1
			}
			v.Neutral = append(v.Neutral, NeutralPoint{
				X: p.X + t*(q.X-p.X), Ground: p.Ground + t*(q.Ground-p.Ground), Undrained: l.undrained, Differences: l.differences,
				Inclination: NeutralAngle(math.Atan(tan/d.F), excess),
			})
		}
	}
}
