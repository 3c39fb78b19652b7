package lem

import (
	"errors"
	"fmt"
	"math"
)

// Detail is the working of one evaluation, of the part of the slip with the lowest F: what a checker needs to follow F by hand.
//
// In all methods S = (c l + N' tan phi)/F is the shear force that the base mobilises, and
//
//	F = sum(Resisting)/sum(Driving).
//
// Ordinary and Bishop balance moments about the centre on a circle (divided by its radius) and forces along the base on a polyline:
//
//	Resisting = c l + N' tan phi
//	Driving   = Q sin(alpha) + (H + K) cos(alpha)                                on a polyline,
//	            [Q (xc - x) + H (yc - PushLevel) + K (yc - QuakeLevel)]/R        on a circle, x in the direction of movement.
//
// Janbu, Spencer and Morgenstern-Price balance horizontal forces, with N = N' + u l:
//
//	Resisting = (c l + N' tan phi) cos(alpha)
//	Driving   = N sin(alpha) + H + K
//
// The normal force is, with the interslice forces X of Interfaces (none in Bishop and Janbu),
//
//	N' = [Q + X_uphill - X_downhill - (c l - u l tan phi) sin(alpha)/F]/MAlpha - u l,   MAlpha = cos(alpha) + sin(alpha) tan phi/F,
//
// but in Ordinary N' = Q cos(alpha) - K sin(alpha) - u l, or (Q - u l cos(alpha)) cos(alpha) - K sin(alpha) where free water loads the slip. The
// interslice forces follow from slice to slice, from the head to the exit, from
//
//	E_downhill = E_uphill + N sin(alpha) - S cos(alpha) + H + K,   X = lambda Side E,
//	(E Thrust)_downhill = (E Thrust)_uphill + (E_downhill - E_uphill) Base - (X_uphill + X_downhill) Width/2
//	                      + H (PushLevel - Base) + K (QuakeLevel - Base).
type Detail struct {
	Setting    Setting
	Result     Result  // As from FS.
	Verdict    Verdict // By the rules that the method is under; Reason is that of Result.
	F          float64 // F at which the table closes: Result.F before Correction, admissible or not.
	Correction float64 // f0 of Janbu's method; 1 for the others.
	Slices     []SliceRow
	Resisting  float64 // Sum over the slices, kN.
	Driving    float64 // Sum over the slices, kN.
	// Interfaces are the ends and the sides between slices; nil for Ordinary and Bishop, which leave the forces there open.
	Interfaces []Interface
}

// SliceRow is one line of the slice table, from left to right. Directions are those of the movement: horizontal forces are positive downhill,
// alpha is positive where the base falls in the direction of movement.
type SliceRow struct {
	X, Width      float64 // Middle and width, m.
	Base, Ground  float64 // Levels of the base (on an arc its mean) and of the ground at X, m.
	Inclination   float64 // alpha, rad.
	Length        float64 // l, of the base, m.
	Soil          int     // At the base: index into Section.Soils.
	Weight        float64 // Of the ground, kN.
	Surcharge     float64 // On the ground, permanent, and variable where it counts, kN.
	Water         float64 // Weight of free water on the ground, kN.
	QuakeVertical float64 // Vertical earthquake force, positive downwards, kN.
	Vertical      float64 // Q: the sum of the four, kN.
	Push          float64 // H: horizontal push of free water on the ground, kN,
	PushLevel     float64 // and its level, m.
	Quake         float64 // K: other horizontal force, kN: earthquake, horizontal part of loads, water in the tension crack,
	QuakeLevel    float64 // and its level, m.
	Pore          float64 // u on the base, kPa.
	Cohesion      float64 // c on the base, kPa.
	TanFriction   float64 // tan phi on the base.
	MAlpha        float64
	Normal        float64 // N', effective, kN.
	Shear         float64 // S, mobilised, kN.
	Resisting     float64 // Its part of the sum, kN.
	Driving       float64 // Its part of the sum, kN.
}

// Interface is a side between two slices, or an end of the slip.
type Interface struct {
	X            float64
	Base, Ground float64 // Levels of the slip and of the ground, m.
	Side         float64 // Side-force function f; 0 in Janbu.
	E            float64 // Horizontal force, kN, positive in compression.
	Shear        float64 // Vertical force X, kN, positive where the uphill side pulls the downhill side down.
	Thrust       float64 // Level of the line of thrust, m; NaN at the ends, and in Janbu, which does not close moments.
}

// ErrNoWorking says that a slip has no slice table, and is wrapped with the reason: no part of it counts, the method has no answer, or it breaks
// a rule before there is anything to solve. A slip whose answer is inadmissible has one.
var ErrNoWorking = errors.New("lem: slip has no slice table")

// Detail returns the working of the part of a slip that counts. It allocates: it is for the slips that are looked at, not for a search.
func (m *Model) Detail(s *Slip, o Setting) (Detail, error) {
	var ws Workspace
	r, p := m.lowest(&ws, s, &o)
	d := Detail{Setting: o, Result: r, Verdict: Verdict{Reason: r.Reason}}
	switch {
	case r.Reason == NotDaylighting, r.Reason == BelowFirmBase, r.Reason == CirclesOnly:
		return d, fmt.Errorf("%w: %s", ErrNoWorking, r.Reason)
	case r.Status == Missed, r.Status == NotConverged:
		return d, fmt.Errorf("%w: %s", ErrNoWorking, r.Status)
	}
	m.slicePart(&ws, p, s, &o)
	bare := make([]float64, ws.n) // Vertical forces without variable surcharges.
	for i := range bare {
		bare[i] = ws.slice[i].q
	}
	m.resolve(&ws, p, s, &o, r)
	d.F, d.Correction = ws.answer, 1
	if o.Method == Janbu {
		d.Correction = ws.janbuCorrection(r.Leftward)
	}
	d.judge(&ws)
	d.list(m, &ws, bare)
	return d, nil
}

// resolve solves a part of a slip, whose slices are in the workspace, and leaves the slices there as they count in the answer r.
func (m *Model) resolve(ws *Workspace, p part, s *Slip, o *Setting, r Result) {
	if m.solve(ws, o, &r) {
		return
	}
	m.slicePart(ws, p, s, o) // Variable surcharges, if any, do not count: without them.
	m.begin(ws, o, &r)
	m.answer(ws, o.Method, &r)
}

// judge fills in the verdict, and leaves the forces of the answer in the workspace.
func (d *Detail) judge(ws *Workspace) {
	r := &d.Result
	switch d.Setting.Method {
	case Spencer, MorgensternPrice:
		d.Verdict = ws.judge(d.F, r.Lambda, r.Leftward)
	case Janbu, JanbuPlain:
		ws.prepareClosure(&SideForce{Shape: Constant}, r.Leftward)
		ws.trace(d.F, 0, r.Leftward)
		d.Verdict.LeastMAlpha = ws.leastMAlpha(d.F)
	case Bishop:
		d.Verdict.LeastMAlpha = ws.leastMAlpha(d.F)
	case Ordinary, numMethods:
	}
}

// list fills in the table from the workspace.
func (d *Detail) list(m *Model, ws *Workspace, bare []float64) {
	forces := d.Setting.Method != Ordinary && d.Setting.Method != Bishop
	for i := range ws.slice[:ws.n] {
		s := &ws.slice[i]
		row := s.row(m, ws.baseLength(s), bare[i])
		t := s.tan / d.F
		row.MAlpha = s.cos + s.sin*t
		switch {
		case d.Setting.Method == Ordinary:
			row.Normal = ws.ordinaryNormal(s)
		case forces:
			row.Normal = ws.forces[ws.fromHead(i, d.Result.Leftward)].normal - s.ul
		default:
			row.Normal = (s.q-(s.cl-s.ul*s.tan)*s.sin/d.F)/row.MAlpha - s.ul
		}
		row.Resisting = s.cl + row.Normal*s.tan
		row.Shear = row.Resisting / d.F
		row.Driving = ws.drive(s, d.Result.Leftward) / ws.lever()
		if forces {
			row.Resisting *= s.cos
			row.Driving = (row.Normal+s.ul)*s.sin + s.h + s.k
		}
		d.Resisting += row.Resisting
		d.Driving += row.Driving
		d.Slices = append(d.Slices, row)
	}
	if forces {
		for i := range ws.n + 1 {
			d.Interfaces = append(d.Interfaces, d.side(m, ws, i))
		}
	}
}

// row returns what a slice has before it is solved. Its vertical force without variable surcharges is bare.
func (s *slice) row(m *Model, length, bare float64) SliceRow {
	col := &m.cols[m.columnAt(s.x)]
	layer := &m.layers[m.layerAt(col, col.first, s.x, s.y)]
	permanent := col.pressure.at(s.x) * s.b
	row := SliceRow{
		X: s.x, Width: s.b, Base: s.y, Ground: s.ground, Inclination: math.Atan2(s.sin, s.cos), Length: length, Soil: int(layer.soil),
		Weight: s.soilW - permanent, Surcharge: permanent + s.q - bare, Water: bare - s.soilW*m.vert,
		QuakeVertical: (m.vert - 1) * s.soilW, Vertical: s.q,
		Pore: s.ul / length, Cohesion: s.cl / length, TanFriction: s.tan,
	}
	if s.h != 0 {
		row.Push, row.PushLevel = s.h, s.hy
	}
	if s.k != 0 {
		row.Quake, row.QuakeLevel = s.k, s.ky
	}
	return row
}

// baseLength returns the length of the base of a slice, m.
func (ws *Workspace) baseLength(s *slice) float64 {
	if !ws.arc {
		return s.b / s.cos
	}
	at := func(x float64) float64 { return math.Asin(min(max((x-ws.centre.X)/ws.radius, -1), 1)) }
	return ws.radius * (at(s.x+s.b/2) - at(s.x-s.b/2))
}

// side returns the i-th interface from the left.
func (d *Detail) side(m *Model, ws *Workspace, i int) Interface {
	leftward := d.Result.Leftward
	var at Point
	if i < ws.n {
		at = ws.edge(i, -1, leftward)
	} else {
		at = ws.edge(i-1, 1, leftward)
	}
	k := Interface{X: at.X, Base: at.Y, Ground: m.cols[m.columnAt(at.X)].ground.at(at.X), Thrust: math.NaN()}
	j := i // Interfaces from the head.
	if leftward {
		j = ws.n - i
	}
	rigorous := d.Setting.Method == Spencer || d.Setting.Method == MorgensternPrice
	if rigorous {
		k.Side = ws.side[j]
	}
	if j == 0 || j == ws.n {
		return k
	}
	k.E, k.Shear = ws.forces[j-1].e, ws.forces[j-1].x
	if rigorous && k.E != 0 {
		k.Thrust = ws.thrust(j - 1)
	}
	return k
}
