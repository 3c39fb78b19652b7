package report

import (
	"maps"
	"slices"

	"standfast/remedies"
)

// BackAnalysis says what the observed slip of the case leaves open: the strengths of one soil with which it just fails, and every option sized
// again with each of them.
type BackAnalysis struct {
	Reason    string  `json:"reason"`                             // Why the observed slip has no answer, and there are no points; else empty.
	Soil      string  `json:"soil"`                               // The soil that most of the slip runs in, whose strength is replaced.
	Share     float64 `json:"share"`                              // Of the length of the slip that runs in it, 0 to 1.
	Situation string  `json:"situation"`                          // Design situation at failure.
	Method    string  `json:"method"`                             // By which the observed slip has FS 1.
	Slip      *Slip   `json:"slip" jsonschema:"nullable"`         // The observed slip; null without points.
	Depth     Number  `json:"slip_depth_m"`                       // Its greatest vertical depth below ground, m.
	AsGiven   Number  `json:"fs_as_given"`                        // Its FS with the strengths of the case; null without an answer.
	Points    []Sized `json:"points"`                             // At the low, the middle and the high cohesion.
	SameLeast *bool   `json:"same_least" jsonschema:"nullable"`   // Whether one option has the least of the objective at all points; null without points.
	SameOrder *bool   `json:"same_ranking" jsonschema:"nullable"` // Whether the options that meet the target are the same in the same order at all points; null likewise.
}

// Sized is every option sized with one strength of the back-analysis.
type Sized struct {
	Name     string  `json:"name" jsonschema:"enum=low,enum=middle,enum=high"` // "low", "middle" or "high".
	Cohesion float64 `json:"cohesion_kPa"`                                     // Effective cohesion c' of the soil, kPa.
	Friction float64 `json:"friction_angle_deg"`                               // Effective angle of friction phi' of the soil, degrees.
	FS       Number  `json:"observed_slip_fs"`                                 // FS of the observed slip with them: 1 but for the tolerance of a root.
	Existing Option  `json:"existing"`                                         // The slope as it is with this strength.
	// Ranked, searched and audited like the options of the file; without curves, moved limits and swings, and the slips that reject cheaper designs are
	// counted only.
	Options []Option `json:"options"`
	// Name of the option with the least of the objective, "existing" if nothing is needed, null if nothing meets the target.
	Least *string `json:"least" jsonschema:"nullable"`
	// The option that least_earthworks of the file names, of the size found with the strengths of the case, searched and audited with this strength; absent
	// if there is none.
	Chosen *Option `json:"chosen,omitempty"`
}

// backAnalysis lays out what an observed slip leaves open; nil if that was not looked into.
func (b *builder) backAnalysis(p *remedies.Points) *BackAnalysis {
	if p == nil {
		return nil
	}
	out := &BackAnalysis{Reason: p.Reason, Depth: nan, AsGiven: nan, Points: make([]Sized, 0, len(p.Sized))}
	if p.Back == nil {
		return out
	}
	a := p.Back
	out.Soil, out.Share, out.Situation, out.Method = b.soils[a.Soil], a.Share, b.job.Situations[a.Situation].Name, a.Method.String()
	out.Slip, out.Depth, out.AsGiven = slipOf(&b.job.Observed.Slip, a.From, a.To), Number(a.Depth), Number(a.AsGiven)
	for i := range p.Sized {
		out.Points = append(out.Points, b.sized(&p.Sized[i]))
	}
	least, order := out.sameLeast(), out.sameOrder()
	out.SameLeast, out.SameOrder = &least, &order
	return out
}

func (b *builder) sized(p *remedies.SizedPoint) Sized {
	out := Sized{
		Name: p.Name, Cohesion: p.Strength.Cohesion, Friction: degrees(p.Strength.Friction), FS: Number(p.Strength.FS),
		Existing: b.option(&p.Existing), Options: make([]Option, 0, len(p.Options)),
	}
	for i := range p.Options {
		out.Options = append(out.Options, b.option(&p.Options[i]))
	}
	if p.Chosen != nil {
		chosen := b.option(p.Chosen)
		out.Chosen = &chosen
	}
	if p.Least != "" {
		least := p.Least
		out.Least = &least
	}
	return out
}

// At returns the file as it would be with the strength of a point: its soil, the slope as it is and the options, and behind them the works
// chosen without it where they are of another size.
func (f *File) At(p *Sized) *File {
	out := *f
	out.BackAnalysis, out.Existing, out.Options, out.LeastEarthworks = nil, p.Existing, slices.Clone(p.Options), p.Least
	out.Soils = maps.Clone(f.Soils)
	s := out.Soils[f.BackAnalysis.Soil]
	s.PowerLaw, s.Drained = nil, Drained{Cohesion: p.Cohesion, Friction: p.Friction}
	out.Soils[f.BackAnalysis.Soil] = s
	if c := p.Chosen; c != nil {
		if o := p.option(c.Name); o != nil && maps.Equal(o.Parameters, c.Parameters) {
			return &out
		}
		chosen := *c
		chosen.Name += " as chosen"
		out.Options = append(out.Options, chosen)
	}
	return &out
}
