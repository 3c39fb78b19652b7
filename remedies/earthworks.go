package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
)

// earthworks is any remedy that gives the slope a new surface.
type earthworks struct {
	noun  string // For messages: "berm".
	soil  int    // Soil of the fill; noSoil: none was named and nothing may be filled.
	cuts  bool   // Some size may cut.
	fills bool   // Some size is meant to fill, and not only a hollow of the ground.
	shape func(s *slope, x []float64) shape
	under *blanket // Between ground and fill; nil: none.
}

// blanket is a layer of a soil of its own that lies on the ground under a fill.
type blanket struct {
	soil      int
	thickness int // Place of its parameter.
}

// Apply cuts and fills to the shape at x.
func (w *earthworks) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	p.mayFill = p.mayFill || w.soil != noSoil
	p.mayCut = p.mayCut || w.cuts
	p.fillFirst = p.fillFirst || w.fills
	f := slopeOf(j, on)
	sh := w.shape(f, x).own(f)
	p.Violations = append(p.Violations, sh.faults...)
	if sh.line != nil {
		p.Dimensions = append(p.Dimensions, sh.dims...)
		w.build(j, p, &sh, f.mirrored, x)
	}
	p.finish(j)
	return p
}

// build does the works of a shape, in the section's own coordinates: cut first, then fill.
func (w *earthworks) build(j *Job, p *Proposal, sh *shape, mirrored bool, x []float64) {
	var done []run
	if sh.cut {
		done = p.cutTo(j, spliced(p.Section.Ground, sh.line, sh.from(), sh.to(), lower), w.noun)
	}
	if sh.fill {
		after := spliced(p.Section.Ground, sh.line, sh.from(), sh.to(), upper)
		if w.soil == noSoil {
			if h, at := highest(after, p.Section.Ground, sh.from(), sh.to()); h > limitSlack {
				p.violate("fill", h, "the %s runs %s m above the ground at x = %s m and no fill soil is named: name one under fill", w.noun, metres(h), metres(at))
			}
		} else {
			if w.under != nil {
				top := spliced(after, shifted(p.Section.Ground, x[w.under.thickness]), sh.from(), sh.to(), lower)
				done = append(done, p.fillTo(j, top, w.under.soil, "drainage blanket")...)
			}
			done = append(done, p.fillTo(j, after, w.soil, w.noun)...)
		}
	}
	left, right := sh.uphill, sh.foot
	if mirrored {
		left, right = right, left
	}
	p.checkFences(j, done, left, right)
	p.plantOn(j, sh)
	if len(done) > 0 {
		p.checkForm(j, sh, w.soil != noSoil && j.Section.Soils[w.soil].FreeDraining, w.noun)
	}
}

// plantOn lets plant stand on the level parts of a shape, and behind the top of a shape that has none.
func (p *Proposal) plantOn(j *Job, sh *shape) {
	level := false
	for i := 1; i < len(sh.line); i++ {
		a, b := sh.line[i-1], sh.line[i]
		if math.Abs(b.Y-a.Y) <= flat*(b.X-a.X) {
			p.addPlant(j, a.X, b.X)
			level = true
		}
	}
	switch {
	case level:
	case j.Facing() > 0:
		p.addPlant(j, sh.from()-plantStrip, sh.from())
	default:
		p.addPlant(j, sh.to(), sh.to()+plantStrip)
	}
}

// cutTo lowers the ground, measures the cut by soil, clips the water lines to it and checks the no-dig zones. It returns the
// stretches that it cut.
func (p *Proposal) cutTo(j *Job, after lem.Profile, noun string) []run {
	runs := runsAbove(p.Section.Ground, after)
	for _, r := range runs {
		addSoilAreas(p.Quantities.Cut, &p.Section, p.Section.Ground, after, r.from, r.to)
		p.addTopsoil(j, after, r.from, r.to)
		p.checkDig(j, after, r.from, r.to, noun)
	}
	p.Section.Ground = after
	p.clipWater(j, runs)
	return runs
}

// fillTo raises the ground by bodies of a soil, measures them, marks the soils that they load and checks the no-load zones and
// maximum levels. It returns the stretches that it filled.
func (p *Proposal) fillTo(j *Job, after lem.Profile, soil int, noun string) []run {
	ground := p.Section.Ground
	runs := runsAbove(after, ground)
	for _, r := range runs {
		p.Quantities.Fill[soil] += r.area
		p.addBase(j, soil, r.from, r.to)
		addSoilAreas(p.loaded, &p.Section, ground, shifted(ground, r.from-r.to), r.from, r.to)
		p.checkLoad(j, after, r.from, r.to, noun)
	}
	for i := range runs {
		p.Section.Placed = append(p.Section.Placed, lem.Body{Soil: soil, Outline: runs[i].outline()})
	}
	p.Section.Ground = after
	return runs
}

// addTopsoil measures the part of a cut that lies within the strip depth.
func (p *Proposal) addTopsoil(j *Job, after lem.Profile, from, to float64) {
	depth := j.Economics.StripDepth
	if depth == 0 {
		return
	}
	under := spliced(after, shifted(j.Section.Ground, -depth), from, to, upper)
	addSoilAreas(p.Quantities.Topsoil, &p.Section, p.Section.Ground, under, from, to)
}

// benchedFrom is the slope of ground, rise over run, above which it is benched before it is filled: 1V:5H (common practice, no source).
const benchedFrom = 0.2

// addBase measures the ground before works under a fill: where it is stripped, and where it is benched.
func (p *Proposal) addBase(j *Job, soil int, from, to float64) {
	for _, q := range pieces(p.Section.Ground, j.Section.Ground, from, to) {
		if q.apart() { // cut or filled already
			continue
		}
		p.Quantities.FillBase[soil] += q.x1 - q.x0
		if math.Abs(q.a1-q.a0) > benchedFrom*(q.x1-q.x0) {
			p.Quantities.FaceRun += q.x1 - q.x0
		}
	}
}

// violate adds a violation.
func (p *Proposal) violate(limit string, by float64, format string, args ...any) {
	p.Violations = append(p.Violations, Violation{Limit: limit, Detail: fmt.Sprintf(format, args...), By: by})
}

// geometry adds a violation that says why works cannot be drawn at all.
func (p *Proposal) geometry(limit string, by float64, format string, args ...any) {
	p.Violations = append(p.Violations, Violation{Limit: limit, Detail: fmt.Sprintf(format, args...), By: math.Max(by, 0), Geometry: true})
}

// note adds a note unless it is there already.
func (p *Proposal) note(format string, args ...any) {
	p.Notes = appendOnce(p.Notes, fmt.Sprintf(format, args...))
}

// appendOnce appends a text that is not in the list yet.
func appendOnce(list []string, text string) []string {
	for _, t := range list {
		if t == text {
			return list
		}
	}
	return append(list, text)
}
