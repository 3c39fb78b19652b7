package report

import (
	"standfast/lem"
	"standfast/remedies"
)

// Source is what a result does not know of itself.
type Source struct {
	File      string   // Name of the case file, without its folder.
	SHA256    string   // Of the case file's bytes.
	Text      string   // The case file itself.
	Version   string   // Of the program.
	Notes     []string // What was deduced when the case was read.
	Overrides []string // Command-line flags that changed what the case file asks.
	Files     []string // Names of the files of the output folder.
}

// New lays out a result as the contents of result.json.
func New(r *remedies.Result, src Source) *File {
	b := &builder{job: r.Job, soils: soilNames(r.Job.Section.Soils)}
	f := &File{
		Format: Format,
		Case: Case{
			Title: r.Job.Title, File: src.File, SHA256: src.SHA256, Length: r.Job.Length,
			Crest: point(r.Job.Crest), Toe: point(r.Job.Toe), Notes: list(src.Notes), Source: src.Text,
		},
		Program:       Program{Version: src.Version},
		Settings:      settingsOf(r, src.Overrides),
		Soils:         b.soilTable(),
		SoilOrder:     list(b.soils),
		WaterLines:    b.waterLines(),
		Limits:        limitsOf(&r.Job.Limits),
		OnSite:        b.onSite(),
		Economics:     b.economics(),
		StageSettings: b.stageSettings(),
		Options:       make([]Option, 0, len(r.Options)),
		Cautions:      Cautions(),
		Files:         list(src.Files),
	}
	f.Existing = b.option(&r.Existing)
	for i := range r.Options {
		f.Options = append(f.Options, b.option(&r.Options[i]))
	}
	f.Situations = b.situations(r)
	f.BackAnalysis = b.backAnalysis(r.Points)
	if r.Least != "" {
		least := r.Least
		f.LeastEarthworks = &least
	}
	return f
}

// builder holds what every part of a file looks up.
type builder struct {
	job   *remedies.Job
	soils []string
}

func soilNames(soils []lem.Soil) []string {
	names := make([]string, len(soils))
	for i := range soils {
		names[i] = soils[i].Name
	}
	return names
}

// list returns a copy that is never nil, so that it is written as [] and not as null.
func list(s []string) []string { return append(make([]string, 0, len(s)), s...) }

func settingsOf(r *remedies.Result, overrides []string) Settings {
	s := Settings{
		Objective: r.Job.Objective.String(), Seed: r.Settings.Seed, DepthOfInterest: r.Job.MinDepth, Allowance: r.Settings.Allowance, Slices: r.Settings.Slices,
		GammaW: lem.GammaW, Direction: directions[r.Job.Direction],
		SearchRanges: SearchRanges{Head: rangeOf(r.Job.Head), Exit: rangeOf(r.Job.Exit)}, SideForce: sideForceOf(&r.Job.SideForce), Overrides: list(overrides),
	}
	if s.Allowance == 0 {
		s.Allowance = remedies.DefaultAllowance
	}
	if s.Slices == 0 {
		s.Slices = lem.DefaultSlices
	}
	return s
}

// directions are the names of the directions of movement.
var directions = [...]string{lem.EitherWay: "either", lem.LeftwardOnly: "left", lem.RightwardOnly: "right"}

func rangeOf(r lem.Range) *[2]float64 {
	if r == (lem.Range{}) {
		return nil
	}
	return &[2]float64{r.From, r.To}
}

func (b *builder) soilTable() map[string]Soil {
	table := make(map[string]Soil, len(b.soils))
	for i, name := range b.soils {
		s := &b.job.Section.Soils[i]
		out := Soil{
			UnitWeight: s.UnitWeight, SaturatedUnitWeight: s.SaturatedUnitWeight,
			Drained:      Drained{Cohesion: s.Cohesion, Friction: degrees(s.Friction)},
			Undrained:    undrainedOf(s.Undrained),
			FreeDraining: s.FreeDraining,
			SlowDraining: i < len(b.job.Clay) && b.job.Clay[i],
		}
		if p := s.PowerLaw; p != nil {
			out.Drained = Drained{}
			out.PowerLaw = &PowerLaw{A: p.A, B: p.B, Atmospheric: lem.AtmosphericPressure, LeastStress: lem.LeastEnvelopeStress}
		}
		if out.SaturatedUnitWeight == 0 {
			out.SaturatedUnitWeight = s.UnitWeight
		}
		if s.HasRu {
			out.Ru = &s.Ru
		}
		table[name] = out
	}
	return table
}

func undrainedOf(u *lem.UndrainedStrength) *Undrained {
	if u == nil {
		return nil
	}
	out := &Undrained{Strength: u.Strength, Gradient: u.Gradient}
	if y, level := levelOf(u.Datum); level {
		out.DatumY = &y
	} else {
		out.Datum = points(u.Datum)
	}
	for _, p := range u.Points {
		out.Points = append(out.Points, [3]float64{p.X, p.Y, p.Strength})
	}
	if u.Ratio != 0 && len(u.Points) == 0 {
		out.Ratio, out.Minimum, out.WaterBefore = &u.Ratio, &u.Minimum, points(u.WaterBefore)
	}
	return out
}

// levelOf returns the level of a line and reports whether all of it has that level.
func levelOf(line lem.Profile) (Number, bool) {
	if len(line) == 0 {
		return 0, false
	}
	for _, p := range line {
		if p.Y != line[0].Y {
			return 0, false
		}
	}
	return Number(line[0].Y), true
}

// situations lists the design situations, each followed by the variants that options add to it.
func (b *builder) situations(r *remedies.Result) []Situation {
	out := make([]Situation, 0, len(b.job.Situations))
	for i := range b.job.Situations {
		s := &b.job.Situations[i]
		working := Number(s.DrainsWorking)
		base := Situation{
			Name: s.Name, RequiredFS: s.RequiredFS, Strength: strengthOf(b.soils, s.Undrained), Kh: s.Kh, Kv: s.Kv, DrainsWorking: &working,
			WaterLine: b.waterName(s.Water),
		}
		if o := answerTo(&r.Existing, i); o != nil && s.RatioToExisting != 0 {
			base.RequiredFS = o.Check.Required
		}
		out = append(out, base)
		out = append(out, b.variants(r, i)...)
	}
	return out
}

// answerTo returns the outcome of situation i itself, nil if there is none.
func answerTo(o *remedies.Option, i int) *remedies.Outcome {
	for k := range o.Situations {
		if c := &o.Situations[k].Check; c.SituationI == i && c.Note == "" {
			return &o.Situations[k]
		}
	}
	return nil
}

// variants lists what options check in situation i besides the situation itself, in the order in which they first appear.
func (b *builder) variants(r *remedies.Result, i int) []Situation {
	var out []Situation
	at := map[string]int{}
	for _, o := range r.Options {
		for k := range o.Situations {
			c := &o.Situations[k].Check
			if c.SituationI != i || c.Note == "" {
				continue
			}
			name := c.Label()
			n, seen := at[name]
			if !seen {
				n = len(out)
				at[name] = n
				out = append(out, Situation{
					Name: name, RequiredFS: c.Required, Strength: strengthOf(b.soils, c.Situation.Undrained), Kh: c.Situation.Kh, Kv: c.Situation.Kv,
					WaterLine: b.waterName(b.job.Situations[i].Water), VariantOf: b.job.Situations[i].Name, Variant: c.Note,
				})
			}
			out[n].AppliesTo = append(out[n].AppliesTo, o.Name)
		}
	}
	return out
}
