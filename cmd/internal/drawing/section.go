package drawing

import (
	"errors"
	"fmt"
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// Options are the settings of a drawing. The zero value is the default.
type Options struct {
	Credit string // Printed at the right of the foot, such as the program with its version; "" for none.
}

// ErrNothingToDraw says that there is no ground, or no curve, to draw.
var ErrNothingToDraw = errors.New("drawing: nothing to draw")

// Section draws a cross-section at equal scales. With an option it shows the ground before and after, cut and fill, water before and
// after, the limits of works, the dimensions of the works and the governing slip; with nil, or an option without works, the section
// as it was read with every water line by name, and the governing slip if the option has one. It returns ErrNothingToDraw for a
// section without ground.
func Section(j *remedies.Job, o *remedies.Option, opts Options) (*Figure, error) {
	p := picture{job: j, opt: o, sec: &j.Section}
	if o != nil && o.Proposal != nil {
		p.sec = &o.Proposal.Section
	}
	if !drawable(p.sec) {
		return nil, fmt.Errorf("section of %q: %w", j.Title, ErrNothingToDraw)
	}
	p.gather()
	s := p.layOut(opts, nil)
	if len(s.unplaced) > 0 {
		s = p.layOut(opts, s.unplaced)
	}
	return &s.fig, nil
}

// drawable reports whether a section has ground, and every stratum a top.
func drawable(s *lem.Section) bool {
	for _, t := range s.Strata {
		if len(t.Top) == 0 {
			return false
		}
	}
	return len(s.Strata) > 0 && len(s.GroundBefore()) > 1 && len(s.Ground) > 1
}

// picture is a section about to be drawn, in section coordinates.
type picture struct {
	job *remedies.Job
	opt *remedies.Option // nil: the section as read.
	sec *lem.Section
	gov *remedies.Outcome // The outcome whose slip is drawn; nil: none.

	whole          bool // Show the whole section, however long.
	works          bool // The ground, the bodies or the water differ from the section as read.
	reshaped       bool // The ground does.
	x0, x1, lo, hi float64
	before, ground lem.Profile
	stage          lem.Profile // Ground of the governing stage where it differs; nil otherwise.
	tops           []lem.Profile
	cuts, fills    [][]lem.Point
	bodies         []body
	waters         []waterDrawn
	free           []freeDrawn
	known          []lem.PressurePoint
	drains         *lem.Drawdown
	slip           []lem.Point
	key            key
}

// body is placed material cut to the window.
type body struct {
	soil    int
	outline []lem.Point
	added   bool // Part of the works.
}

func (p *picture) gather() {
	if p.opt != nil {
		p.gov = p.opt.Governing()
		if p.gov != nil && math.IsNaN(p.gov.FS) {
			p.gov = nil
		}
	}
	p.gatherWorks()
	if p.gov != nil {
		p.slip = slipLine(p.gov)
	}
	p.chooseWidth()
	p.before = crop(p.sec.GroundBefore(), p.x0, p.x1)
	p.ground = crop(p.sec.Ground, p.x0, p.x1)
	if p.gov != nil && p.gov.Check.Section != nil {
		if st := crop(p.gov.Check.Section.Ground, p.x0, p.x1); !same(st, p.ground) {
			p.stage = st
		}
	}
	p.gatherWater()
	p.chooseHeight()
	p.gatherStrata()
	p.cuts = between(p.before, lower(p.before, p.ground))
	p.fills = between(p.ground, lower(p.before, p.ground))
	old := len(p.job.Section.Placed)
	for i, b := range p.sec.Placed {
		if o := clipX(b.Outline, p.x0, p.x1); len(o) > 2 {
			p.bodies = append(p.bodies, body{b.Soil, o, i >= old})
		}
	}
}

func (p *picture) gatherWorks() {
	if p.opt == nil || p.opt.Proposal == nil {
		return
	}
	q := p.opt.Proposal
	p.reshaped = !same(p.sec.Ground, p.sec.GroundBefore())
	p.works = p.reshaped || len(q.Section.Placed) > len(p.job.Section.Placed) || q.Quantities.Earthworks() > 0 ||
		q.Quantities.Drain > 0 || p.waterChanged()
}

// shownAround is how much ground is shown on each side of what matters in a long section, in heights of the slope.
const shownAround = 1.5

// shownWhole is the length of a section, in lengths of what matters, up to which it is shown whole.
const shownWhole = 1.6

// chooseWidth sets the range of x: the whole section, or what matters of a long one that has been analysed.
func (p *picture) chooseWidth() {
	g := p.sec.GroundBefore()
	p.x0, p.x1 = g.Left(), g.Right()
	if p.opt == nil || p.whole {
		return
	}
	lo, hi := min(p.job.Crest.X, p.job.Toe.X), max(p.job.Crest.X, p.job.Toe.X)
	see := func(x float64) {
		if x >= g.Left() && x <= g.Right() {
			lo, hi = min(lo, x), max(hi, x)
		}
	}
	for _, q := range p.slip {
		see(q.X)
	}
	for _, s := range spans(p.sec.Ground, g) {
		if math.Abs(s.a0-s.b0)+math.Abs(s.a1-s.b1) > thinnest {
			see(s.x0)
			see(s.x1)
		}
	}
	for _, f := range []*remedies.Fence{p.job.Limits.Left, p.job.Limits.Right} {
		if f != nil {
			see(f.X)
		}
	}
	for _, k := range p.job.Limits.KeepClear {
		see(k.FromX)
		see(k.ToX)
	}
	pad := shownAround * max(p.job.Height(), (hi-lo)/10)
	lo, hi = max(lo-pad, p.x0), min(hi+pad, p.x1)
	if p.x1-p.x0 > shownWhole*(hi-lo) {
		p.x0, p.x1 = max(math.Floor(lo), p.x0), min(math.Ceil(hi), p.x1)
	}
}

// chooseHeight sets the range of levels that must be seen.
func (p *picture) chooseHeight() {
	p.lo, p.hi = math.Inf(1), math.Inf(-1)
	see := func(ps []lem.Point) {
		for _, q := range ps {
			p.lo, p.hi = min(p.lo, q.Y), max(p.hi, q.Y)
		}
	}
	see(p.before)
	see(p.ground)
	see(p.stage)
	see(p.slip)
	for _, b := range p.sec.Placed {
		see(b.Outline)
	}
	if p.opt != nil && p.opt.Proposal != nil {
		for _, d := range p.opt.Proposal.Dimensions {
			see([]lem.Point{d.From, d.To})
		}
	}
	if p.drains != nil {
		see(p.drains.Invert)
	}
	for _, f := range p.free {
		see([]lem.Point{{X: f.FromX, Y: f.Level}})
	}
	p.seeLimits(see)
	// Lines far below the slope are shown only in the section as read: they would make the slope small.
	deepest := p.lo - 0.6*(p.hi-p.lo)
	if p.opt == nil || p.whole {
		deepest = math.Inf(-1)
	}
	floor := p.lo
	for _, l := range p.otherLines() {
		for _, q := range l {
			p.hi = max(p.hi, q.Y)
			if q.Y >= deepest {
				floor = min(floor, q.Y)
			}
		}
	}
	p.lo = floor
	p.lo -= 0.14 * max(p.hi-p.lo, (p.x1-p.x0)/20)
}

// seeLimits shows the levels of limits, restraints and known slips in the window.
func (p *picture) seeLimits(see func([]lem.Point)) {
	for _, m := range p.job.Limits.MaxLevels {
		if max(m.FromX, p.x0) < min(m.ToX, p.x1) {
			see([]lem.Point{{Y: m.Level}})
		}
	}
	for _, o := range p.job.Limits.Overhead {
		if max(o.FromX, p.x0) < min(o.ToX, p.x1) {
			see([]lem.Point{{Y: o.Level}})
		}
	}
	for _, r := range p.sec.Restraints {
		if p.inWindow(r.X) {
			see([]lem.Point{{Y: r.Top}, {Y: r.Bottom}})
		}
	}
	for _, k := range p.sec.Known {
		see(cropInside(k.Line, p.x0, p.x1))
	}
	see(p.observedLine())
	see(p.crackLine())
	for _, q := range p.known {
		if p.opt == nil || p.whole {
			see([]lem.Point{{Y: q.Y}})
		}
	}
}

// otherLines returns the strata and water lines in the window.
func (p *picture) otherLines() []lem.Profile {
	var out []lem.Profile
	for _, s := range p.sec.Strata[1:] {
		// A top above the ground is not seen.
		out = append(out, lower(crop(s.Top, p.x0, p.x1), p.before))
	}
	if p.sec.FirmBase != nil {
		out = append(out, crop(p.sec.FirmBase, p.x0, p.x1))
	}
	for _, w := range p.waters {
		out = append(out, w.line)
	}
	return out
}

// gatherStrata finds the tops of the strata as they are seen: the highest top of a stratum and all below it, under both grounds.
func (p *picture) gatherStrata() {
	n := len(p.sec.Strata)
	p.tops = make([]lem.Profile, n)
	cap := lower(p.before, p.ground)
	var e lem.Profile
	for i := n - 1; i >= 0; i-- {
		t := crop(p.sec.Strata[i].Top, p.x0, p.x1)
		if e != nil {
			t = upper(t, e)
		}
		e = t
		p.tops[i] = lower(t, cap)
	}
}

// slipFeet returns the ends of the governing slip on the slip itself, from left to right: at its head that may be the bottom of a tension crack.
func slipFeet(o *remedies.Outcome) (a, b lem.Point) {
	a, b = o.From, o.To
	if a.X > b.X {
		a, b = b, a
	}
	if o.Crack > 0 {
		if a.Y < b.Y {
			b.Y -= o.Crack
		} else {
			a.Y -= o.Crack
		}
	}
	return a, b
}

// slipLine returns the governing slip between its ends on the ground, with the tension crack at its head.
func slipLine(o *remedies.Outcome) []lem.Point {
	a, b := slipFeet(o)
	out := []lem.Point{a}
	if left := leftEnd(o); left != a {
		out = []lem.Point{left, a}
	}
	switch o.Slip.Kind {
	case lem.Polyline:
		for _, q := range o.Slip.Nodes {
			if q.X > a.X && q.X < b.X {
				out = append(out, q)
			}
		}
	case lem.Circle:
		c := o.Slip.Centre
		t0, t1 := math.Atan2(a.Y-c.Y, a.X-c.X), math.Atan2(b.Y-c.Y, b.X-c.X)
		if t0 > 0 { // Left end above the centre: count the angle through the lower arc.
			t0 -= 2 * math.Pi
		}
		const pieces = 72
		for k := 1; k < pieces; k++ {
			s, co := math.Sincos(t0 + (t1-t0)*float64(k)/pieces)
			out = append(out, lem.Point{X: c.X + o.Slip.Radius*co, Y: c.Y + o.Slip.Radius*s})
		}
	}
	out = append(out, b)
	if right := rightEnd(o); right != b {
		out = append(out, right)
	}
	return out
}

func leftEnd(o *remedies.Outcome) lem.Point {
	if o.From.X > o.To.X {
		return o.To
	}
	return o.From
}

func rightEnd(o *remedies.Outcome) lem.Point {
	if o.From.X > o.To.X {
		return o.From
	}
	return o.To
}

// clipX cuts an outline to a range of x.
func clipX(ring []lem.Point, x0, x1 float64) []lem.Point {
	ring = clipHalf(ring, x0, 1)
	return clipHalf(ring, x1, -1)
}

// clipHalf keeps what lies right of x (sign +1) or left of it (sign -1).
func clipHalf(ring []lem.Point, x, sign float64) []lem.Point {
	var out []lem.Point
	for i, a := range ring {
		b := ring[(i+1)%len(ring)]
		da, db := sign*(a.X-x), sign*(b.X-x)
		if da >= 0 {
			out = append(out, a)
		}
		if da*db < 0 {
			out = append(out, lem.Point{X: x, Y: a.Y + (b.Y-a.Y)*da/(da-db)})
		}
	}
	return out
}
