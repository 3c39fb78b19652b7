package sheet

import (
	"encoding/json"
	"math"
	"slices"

	"standfast/cmd/internal/report"
)

// model is the whole sheet: what stands in the page, and what its script is given.
type model struct {
	Data data
	File *report.File

	Answer   string // In a sentence.
	Cards    []card
	Heads    []matrixHead
	Matrix   []matrixRow
	Soils    []soilText
	Rests    []string // What the answer rests on.
	Assumed  []string // What was deduced or assumed.
	Existing existingText

	Points  []pointText         // Of the back-analysis.
	Ranking []report.RankingRow // What options come to at each.
	Verdict []string            // Whether the choice is the same at all of them.
}

// card is an option as it stands in the page before the script moves anything.
type card struct {
	Option *report.Option
	Index  int
	Title  string
	Risk   string
	Notes  []string
	Design *design
	Stop   *stop
	Least  bool
}

// builder gathers what a model is made of.
type builder struct {
	f     *report.File
	m     *model
	lines map[string]int // By their JSON.
	soils map[string]int
	rows  map[string]int
}

func newModel(f *report.File) *model {
	b := newBuilder(f)
	b.addStops()
	b.chooseView()
	b.addPage()
	return b.m
}

// newBuilder lays out every design of a result.
func newBuilder(f *report.File) *builder {
	b := &builder{f: f, m: &model{File: f}, lines: map[string]int{}, soils: map[string]int{}, rows: map[string]int{}}
	d := &b.m.Data
	d.Length = f.Case.Length
	b.section()
	b.addRows()
	d.Existing = b.sized(&f.Existing)
	d.Options = []optionDrawn{}
	for i := range f.Options {
		d.Options = append(d.Options, optionDrawn{Designs: b.designs(&f.Options[i])})
	}
	return b
}

// section adds what all designs share.
func (b *builder) section() {
	d, s := &b.m.Data, b.f.Existing.Section
	d.Before = b.line(s.GroundBefore)
	d.Strata, d.Loads, d.Soils = []stratum{}, []load{}, []soil{}
	for _, st := range s.Strata {
		d.Strata = append(d.Strata, stratum{Soil: b.soil(st.Soil), Top: b.line(st.Top)})
	}
	for i := range s.Surcharges {
		l := &s.Surcharges[i]
		end := l.Pressure
		if l.PressureTo != nil {
			end = *l.PressureTo
		}
		v := load{Name: loadWords(l), From: l.FromX, To: l.ToX, Start: 1, End: 1}
		if most := max(l.Pressure, end); most > 0 {
			v.Start, v.End = round(l.Pressure/most), round(end/most)
		}
		d.Loads = append(d.Loads, v)
	}
	b.site()
}

// line returns the index of a polyline; -1 for none.
func (b *builder) line(ps []report.Point) int {
	if len(ps) == 0 {
		return -1
	}
	out := make([]xy, len(ps))
	for i, p := range ps {
		out[i] = near(p)
	}
	key, _ := json.Marshal(out) // Finite numbers cannot fail.
	at, known := b.lines[string(key)]
	if !known {
		at = len(b.m.Data.Lines)
		b.lines[string(key)] = at
		b.m.Data.Lines = append(b.m.Data.Lines, out)
	}
	return at
}

// near rounds a point to a tenth of a millimetre, for drawing only.
func near(p report.Point) xy { return xy{round(p[0]), round(p[1])} }

func round(v float64) float64 {
	const perMetre = 1e4
	return math.Round(v*perMetre) / perMetre
}

// soil returns the index of a soil. It has the colour of its place in the case.
func (b *builder) soil(name string) int {
	at, known := b.soils[name]
	if !known {
		at = len(b.m.Data.Soils)
		b.soils[name] = at
		b.m.Data.Soils = append(b.m.Data.Soils, soil{Name: name, Tint: max(0, slices.Index(b.f.SoilOrder, name)) % tintCount})
	}
	return at
}

// addRows lists the checks: situations, each with its variants behind it, then the stages of all options.
func (b *builder) addRows() {
	d := &b.m.Data
	d.Rows = []row{}
	add := func(r row) {
		if _, known := b.rows[r.Name]; !known {
			b.rows[r.Name] = len(d.Rows)
			d.Rows = append(d.Rows, r)
		}
	}
	for _, s := range b.f.Situations {
		r := row{Name: s.Name, Parent: -1, required: s.RequiredFS}
		if at, known := b.rows[s.VariantOf]; known {
			r.Parent = at
		}
		add(r)
	}
	for i := range b.f.Options {
		for _, s := range b.f.Options[i].Stages {
			if !s.Advisory { // What nothing is asked of neither passes nor fails.
				add(row{Name: s.Name, Parent: -1, Stage: true, required: s.RequiredFS})
			}
		}
	}
}
