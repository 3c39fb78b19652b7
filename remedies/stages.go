package remedies

import (
	"math"
	"slices"

	"standfast/lem"
)

// Names of construction stages.
const (
	// EndOfConstruction is the stage in which fill has been placed and clays have not drained yet.
	EndOfConstruction = "end of construction"
	// FillBeforeCut is the stage in which the fill is placed and the ground not cut yet: the order for anything that moves.
	FillBeforeCut = "fill placed, cut to come"
	// DrainsFirst is the stage in which drains work and nothing else is done.
	DrainsFirst = "drains in place, other works to come"
	// PlantOnWorks is the stage in which plant stands on the finished levels.
	PlantOnWorks = "plant on the works"
	// TopsoilStripped is the stage in which the ground under the works is stripped.
	TopsoilStripped = "topsoil stripped"
	// InPanels marks the mean over open and intact lengths of a hole.
	InPanels = "in panels"
	// PlaneStrain marks the value of an open hole as if it were open along the whole length.
	PlaneStrain = "plane strain"
)

// setStage files a stage under its name and note; one that is there already is brought up to date in its place.
func (p *Proposal) setStage(c Check) {
	c.Stage, c.SituationI = true, -1
	at := slices.IndexFunc(p.Stages, func(s Check) bool { return s.Name == c.Name && s.Note == c.Note })
	if at < 0 {
		p.Stages = append(p.Stages, c)
		return
	}
	p.Stages[at] = c
}

// dropStage takes a stage out.
func (p *Proposal) dropStage(name string) {
	p.Stages = slices.DeleteFunc(p.Stages, func(s Check) bool { return s.Name == name })
}

// stage returns a stage check of a section.
func (j *Job) stage(name string, s *lem.Section, w lem.Water) Check {
	return Check{Name: name, Section: s, Required: j.Stage.RequiredFS, Situation: lem.Situation{Name: name, Water: w}}
}

// before returns the section before works with its ground changed, and the water of stages, lowered to that ground where it is cut.
func (j *Job) before(ground lem.Profile) (*lem.Section, lem.Water) {
	s := j.Section
	s.Ground = ground
	w := waterAt(j, j.Stage.Water, nil)
	if j.Stage.Water == dry {
		return &s, w
	}
	l := &j.Waters[j.Stage.Water]
	for _, r := range runsAbove(j.Section.Ground, ground) {
		if w.Line != nil && !l.Artesian {
			w.Line = spliced(w.Line, ground, r.from, r.to, lower)
		}
		for i, own := range l.BySoil {
			if !own.Artesian {
				w.BySoil[i].Line = spliced(w.BySoil[i].Line, ground, r.from, r.to, lower)
			}
		}
	}
	return &s, w
}

// addStages brings the stages that depend on the whole of the works up to date. Which there are depends on the remedies and the job
// alone, never on sizes.
func (p *Proposal) addStages(j *Job) {
	if !j.Stage.Given {
		if p.mayFill {
			p.note("construction stages are not checked: the case has no stage settings")
		}
		return
	}
	if j.Economics.StripDepth > 0 && (p.mayFill || p.mayCut || p.exchanges) {
		p.stripStage(j)
	}
	if p.mayDrain && (p.mayFill || p.mayCut || p.exchanges) {
		s, w := j.before(j.Section.Ground)
		w.Drains = p.drained
		p.setStage(j.stage(DrainsFirst, s, w))
	}
	if p.fillFirst && p.mayCut {
		s := p.Section
		s.Ground = spliced(p.Section.Ground, j.Section.Ground, p.Section.Ground.Left(), p.Section.Ground.Right(), upper)
		c := j.stage(FillBeforeCut, &s, waterAt(j, j.Stage.Water, nil))
		c.Situation.Undrained = p.undrainedClays(j)
		p.setStage(c)
	}
	p.endOfConstruction(j)
}

// stripStage sets the stage in which the ground is stripped where the works change it.
func (p *Proposal) stripStage(j *Job) {
	before := j.Section.Ground
	bare := shifted(before, -j.Economics.StripDepth)
	ground := before
	for _, r := range slices.Concat(runsAbove(before, p.Section.Ground), runsAbove(p.Section.Ground, before)) {
		ground = spliced(ground, bare, r.from, r.to, lower)
	}
	for _, r := range p.exchanged {
		ground = spliced(ground, bare, r.From, r.To, lower)
	}
	s, w := j.before(ground)
	p.setStage(j.stage(TopsoilStripped, s, w))
}

// endOfConstruction sets the end-of-construction check. It is there for every size of works that may place fill in a job that has clay;
// where this size loads no clay it is a check of the finished works, drained, with the water of stages. Drains do not count in it. Plant
// stands on the works in it; works without such a check get one with plant alone, if there is any.
func (p *Proposal) endOfConstruction(j *Job) {
	s := &p.Section
	if j.Stage.Plant > 0 {
		loaded := p.Section
		loaded.Loads = append(loaded.Loads[:len(loaded.Loads):len(loaded.Loads)], p.plant...)
		s = &loaded
	}
	if p.mayFill && slices.Contains(j.Clay, true) {
		c := j.stage(EndOfConstruction, s, p.stageWater)
		c.Situation.Undrained = p.undrainedClays(j)
		p.dropStage(PlantOnWorks)
		p.setStage(c)
		return
	}
	if j.Stage.Plant > 0 && (p.mayFill || p.mayCut) {
		p.setStage(j.stage(PlantOnWorks, s, p.stageWater))
	}
}

// plantStrip is the greatest width of ground that plant is taken to load at a time, m: about the tracks of an excavator (common practice, no source).
// It is judged strip by strip whether it counts, so that a load that would help never does.
const plantStrip = 3.0

// addPlant lets plant load the ground from x = from to x = to.
func (p *Proposal) addPlant(j *Job, from, to float64) {
	p.plant = append(p.plant, j.plantLoads(from, to)...)
}

// plantLoads returns the loads of plant from x = from to x = to.
func (j *Job) plantLoads(from, to float64) []lem.Surcharge {
	var out []lem.Surcharge
	if j.Stage.Plant == 0 {
		return nil
	}
	n := math.Ceil((to-from)/plantStrip - sameLevel)
	for k := 0.0; k < n; k++ {
		out = append(out, lem.Surcharge{Name: "plant", FromX: from + (to-from)*k/n, ToX: from + (to-from)*(k+1)/n, Pressure: j.Stage.Plant, Variable: true})
	}
	return out
}

// addHole sets the stages of an open hole dug into the ground before works, which is the order for anything that moves. In panels the mean
// over open and intact lengths is what must stand, and the hole in plane strain is told beside it; without panels plane strain must stand.
// Soils act drained, with the water of stages, and plant stands on both sides. A hole that does not exist leaves the ground as it is.
func (p *Proposal) addHole(j *Job, name string, sh *shape, panels *Panels) {
	p.exchanges = true
	if !j.Stage.Given {
		p.note("construction stages are not checked: the case has no stage settings")
		return
	}
	ground := j.Section.Ground
	var plant []lem.Surcharge
	if sh.line != nil {
		ground = spliced(ground, sh.line, sh.from(), sh.to(), lower)
		plant = append(j.plantLoads(sh.from()-plantStrip, sh.from()), j.plantLoads(sh.to(), sh.to()+plantStrip)...)
	}
	s, w := j.before(ground)
	s.Loads = append(s.Loads[:len(s.Loads):len(s.Loads)], plant...)
	open := j.stage(name, s, w)
	if panels == nil {
		p.setStage(open)
		return
	}
	whole := j.Section
	whole.Loads = s.Loads
	artesian := j.Stage.Water != dry && j.Waters[j.Stage.Water].Artesian
	mean, wet := averaged(&whole, ground, waterAt(j, j.Stage.Water, nil), artesian, *panels)
	c := j.stage(name, &mean, wet)
	c.Note, c.Panels = InPanels, panels
	p.setStage(c)
	open.Note, open.Required, open.Advisory, open.Panels = PlaneStrain, 0, true, panels
	p.setStage(open)
	p.note("%s in panels, %s: resistance over driving summed over open and intact lengths, no shear on the ends of the panels", name, panels)
}
