package report

import (
	"fmt"
	"math"
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"

	"standfast/lem"
)

// InfluenceLoad is the load that influence lines are given for, kN per metre run.
const InfluenceLoad = 10.0

// Influence is what a load on the ground does to the FS of the governing slip, held fixed. Guidance only: with the load in place another slip may
// govern.
type Influence struct {
	Load    float64          `json:"load_kN_per_m"`  // The load that changes are given for, kN per metre run.
	Points  []InfluencePoint `json:"points"`         // Over the middle of every slice, from left to right.
	Neutral []NeutralPoint   `json:"neutral_points"` // Where the lines change their sign: a load there leaves the FS as it is.
}

// InfluencePoint is an influence line at one place.
type InfluencePoint struct {
	X         float64 `json:"x"`         // m.
	Ground    float64 `json:"ground"`    // Level of the ground, m.
	Alpha     float64 `json:"alpha_deg"` // Inclination of the slip below, degrees, positive where it falls in the direction of movement.
	Drained   Change  `json:"drained"`   // In the long term, without excess pore pressure.
	Undrained Change  `json:"undrained"` // At once, with an excess pore pressure equal to the pressure of the load.
}

// Change is a change of the FS of the governing slip.
type Change struct {
	Formula Number `json:"formula"` // By the formula for a small load (Hutchinson 1977, in the form of Bishop's or Janbu's method).
	Placed  Number `json:"placed"`  // By the governing method with the load placed; null if it has no answer.
	Removed Number `json:"removed"` // By the governing method with as much removed; null if it has no answer.
}

// NeutralPoint is a place where a load leaves the FS of the governing slip as it is.
type NeutralPoint struct {
	X      float64 `json:"x"`                                              // m.
	Ground float64 `json:"ground"`                                         // Level of the ground, m.
	State  string  `json:"state" jsonschema:"enum=drained,enum=undrained"` // "drained" or "undrained".
	By     string  `json:"by" jsonschema:"enum=formula,enum=differences"`  // "formula", or "differences" of the governing method.
	Alpha  float64 `json:"alpha_deg"`                                      // Inclination of the slip that the formula asks for there, degrees.
}

// SetInfluence adds the influence lines of the slope as it is, one for every situation; nil where there is none.
func (f *File) SetInfluence(lines []*lem.Influence) {
	for i, v := range lines {
		if v != nil {
			f.Existing.Situations[i].Influence = influenceOf(v)
		}
	}
}

func influenceOf(v *lem.Influence) *Influence {
	out := &Influence{Load: v.Load, Points: make([]InfluencePoint, 0, len(v.Points)), Neutral: make([]NeutralPoint, 0, len(v.Neutral))}
	change := func(c lem.Change) Change { return Change{Number(c.Formula), Number(c.Placed), Number(c.Removed)} }
	for _, p := range v.Points {
		out.Points = append(out.Points, InfluencePoint{X: p.X, Ground: p.Ground, Alpha: degrees(p.Inclination), Drained: change(p.Drained), Undrained: change(p.Undrained)})
	}
	for _, n := range v.Neutral {
		at := NeutralPoint{X: n.X, Ground: n.Ground, State: drained, By: "formula", Alpha: degrees(n.Inclination)}
		if n.Undrained {
			at.State = undrained
		}
		if n.Differences {
			at.By = "differences"
		}
		out.Neutral = append(out.Neutral, at)
	}
	return out
}

// neutral prints where a load leaves the FS of the critical slip of each situation as it is.
func (p *printer) neutral(o *Option) {
	var rows []table.Row
	for i := range o.Situations {
		s := &o.Situations[i]
		v := s.Influence
		if v == nil {
			continue
		}
		least, most := v.extremes()
		rows = append(rows, table.Row{
			s.Name, v.at(drained, "formula"), v.at(drained, "differences"), v.at(undrained, "formula"), v.at(undrained, "differences"), least, most,
		})
	}
	if len(rows) == 0 {
		return
	}
	p.heading("Neutral points of load on the critical slips (x, m)")
	right := func(head string) column { return column{head: head, right: true, most: 18} }
	p.table([]column{
		{head: "situation", most: 32},
		right("drained, formula"), right("drained, method"), right("undrained, formula"), right("undrained, method"),
		right("worst place for fill"), right("best place for fill"),
	}, rows)
	p.para("", fmt.Sprintf("A fill downslope of both neutral points raises the FS of that slip, a cut there lowers it; upslope of both it is the other way round. Between them "+
		"fill harms at once and helps later. Worst and best place: where %g kN/m of load, drained, changes the FS most. The slip that governs may then be another.", InfluenceLoad))
}

// at lists the neutral points of one line.
func (v *Influence) at(state, by string) string {
	var out []string
	for _, n := range v.Neutral {
		if n.State == state && n.By == by {
			out = append(out, fmt.Sprintf("%.2f", n.X))
		}
	}
	if len(out) == 0 {
		return unknown
	}
	return strings.Join(out, ", ")
}

// extremes returns where a load lowers FS most, and where it raises it most, by the governing method, with the change.
func (v *Influence) extremes() (least, most string) {
	lo, hi := math.Inf(1), math.Inf(-1)
	least, most = unknown, unknown
	for _, p := range v.Points {
		d := float64(p.Drained.Placed)
		text := fmt.Sprintf("%.2f: %+.4f", p.X, d)
		if d < lo {
			lo, least = d, text
		}
		if d > hi {
			hi, most = d, text
		}
	}
	return least, most
}
