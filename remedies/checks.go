package remedies

import (
	"fmt"
	"math"
	"slices"

	"standfast/lem"
)

// loadedArea is the area of a clay under fill below which it does not count as loaded, m2: rounding.
const loadedArea = 1e-6

// variant is a further state of the water in which a situation must be met.
type variant struct {
	situation int
	note      string
	water     lem.Water
}

// Start returns the slope as it is, before any works.
func Start(j *Job) *Proposal {
	n := len(j.Section.Soils)
	p := &Proposal{
		Section:    j.Section,
		Quantities: newQuantities(n),
		loaded:     make([]float64, n),
	}
	for _, s := range j.Situations {
		w := waterAt(j, s.Water, s.Free)
		w.Drains = s.Drains
		p.Waters = append(p.Waters, w)
	}
	if j.Stage.Given {
		p.stageWater = waterAt(j, j.Stage.Water, nil)
	}
	return p
}

// clone returns a copy that shares nothing that works change.
func (p *Proposal) clone() *Proposal {
	q := *p
	q.Section.Placed = slices.Clone(p.Section.Placed)
	q.Waters = slices.Clone(p.Waters)
	q.variants = slices.Clone(p.variants)
	q.Stages = slices.Clone(p.Stages)
	q.plant = slices.Clone(p.plant)
	q.exchanged = slices.Clone(p.exchanged)
	q.Quantities = p.Quantities.clone()
	q.loaded = slices.Clone(p.loaded)
	q.Violations = slices.Clone(p.Violations)
	q.Dimensions = slices.Clone(p.Dimensions)
	q.NotChecked = slices.Clone(p.NotChecked)
	q.Notes = slices.Clone(p.Notes)
	q.HandChecks = slices.Clone(p.HandChecks)
	return &q
}

// Checks returns every state in which a proposal must stand: each situation of the job with its variants, then the stages. The
// list has the same entries, in the same order, for every size of the same remedies.
func Checks(j *Job, p *Proposal) []Check {
	var out []Check
	for i, s := range j.Situations {
		out = append(out, situationCheck(p, i, &s, "", p.Waters[i]))
		for _, v := range p.variants {
			if v.situation == i {
				out = append(out, situationCheck(p, i, &s, v.note, v.water))
			}
		}
	}
	return append(out, p.Stages...)
}

// situationCheck returns the check of one situation in one state of its water.
func situationCheck(p *Proposal, i int, s *Situation, note string, w lem.Water) Check {
	return Check{
		Name: s.Name, Note: note, Section: &p.Section, SituationI: i, Required: s.RequiredFS,
		Situation: lem.Situation{Name: s.Name, Water: w, Undrained: s.Undrained, Kh: s.Kh, Kv: s.Kv},
	}
}

// finish brings what depends on the whole of the works up to date.
func (p *Proposal) finish(j *Job) {
	p.Quantities.Strip = stripped(j.Section.Ground, p.Section.Ground, p.exchanged)
	p.checkImport(j)
	p.checkBearing(j)
	p.addStages(j)
}

// stripped returns the length along the ground before works over which the ground has changed or was exchanged.
func stripped(before, after lem.Profile, exchanged []lem.Range) float64 {
	var breaks []float64
	for _, r := range exchanged {
		breaks = append(breaks, r.From, r.To)
	}
	var length float64
	for _, p := range pieces(before, after, before.Left(), before.Right(), breaks...) {
		mid := (p.x0 + p.x1) / 2
		if p.apart() || slices.ContainsFunc(exchanged, func(r lem.Range) bool { return r.From < mid && mid < r.To }) {
			length += math.Hypot(p.x1-p.x0, p.a1-p.a0)
		}
	}
	return length
}

// undrainedClays returns which soils act undrained at the end of construction: once fill loads any clay, all clays with an undrained
// strength. A clay counts as loaded when it lies below fill within a depth equal to the base width of the fill (common practice, no
// source); one that is loaded and has no undrained strength is listed as not checked.
func (p *Proposal) undrainedClays(j *Job) []bool {
	undrained := make([]bool, len(j.Section.Soils))
	loaded := false
	for i, s := range j.Section.Soils {
		if !j.Clay[i] {
			continue
		}
		undrained[i] = s.Undrained != nil
		if p.loaded[i] > loadedArea {
			loaded = true
			if s.Undrained == nil {
				p.NotChecked = appendOnce(p.NotChecked, fmt.Sprintf("%s: not checked: no cu given for %s", EndOfConstruction, s.Name))
			}
		}
	}
	if !loaded {
		return nil
	}
	return undrained
}
