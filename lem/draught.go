package lem

import "slices"

// draught is a section drawn out for compiling: every boundary as straight segments that are functions of x.
type draught struct {
	s        *Section
	sit      *Situation
	ground   Profile
	strata   []Profile
	water    Profile
	own      []Profile   // By soil: its own water line; nil: none.
	before   []Profile   // By soil: water before works, of soils whose undrained strength hangs on it.
	ratio    bool        // There is such a soil.
	crack    Profile     // Bottom of the tension crack, when it is given as a line.
	edges    []segment   // Everything that bounds soils or water.
	known    [][]Point   // Known slip surfaces, vertical steps drawn out.
	free     []FreeWater // Free water, held on beyond the ends of the ground.
	step     float64     // Width of a drawn-out vertical step, m.
	from, to float64     // Ends of the columns.
}

// segment is part of a boundary from left to right; upright ones only give a breakpoint.
type segment struct{ a, b Point }

func (g segment) line() line {
	k := (g.b.Y - g.a.Y) / (g.b.X - g.a.X)
	return line{g.a.Y - k*g.a.X, k}
}

func draughtOf(s *Section, sit *Situation) *draught {
	width := s.Ground.Right() - s.Ground.Left()
	d := &draught{s: s, sit: sit, step: stepWidth * width}
	// Slips may daylight beyond the ends: ground and lines are held level there.
	d.from, d.to = s.Ground.Left()-width, s.Ground.Right()+width
	d.ground = d.drawOut(s.Ground)
	d.addLine(d.ground)
	for _, st := range s.Strata {
		p := d.drawOut(st.Top)
		d.strata = append(d.strata, p)
		d.addLine(p)
	}
	if len(sit.Water.Line) > 0 {
		d.water = d.drawOut(sit.Water.Line)
		d.addLine(d.water)
	}
	d.addSoilWater()
	for _, b := range s.Placed {
		for i, p := range b.Outline {
			q := b.Outline[(i+1)%len(b.Outline)]
			if p.X > q.X {
				p, q = q, p
			}
			d.edges = append(d.edges, segment{p, q})
		}
	}
	for i := range s.Known {
		d.addKnown(s.Known[i].Line)
	}
	for _, f := range sit.Water.Free {
		// Water that reaches an end of the ground goes on beyond it, as the ground does: a wall of water there would drive slips.
		if f.FromX <= s.Ground.Left() {
			f.FromX = d.from
		}
		if f.ToX >= s.Ground.Right() {
			f.ToX = d.to
		}
		d.free = append(d.free, f)
		d.edges = append(d.edges, segment{Point{f.FromX, f.Level}, Point{f.ToX, f.Level}})
	}
	if sit.Water.HasFreeDrainingLevel {
		y := sit.Water.FreeDrainingLevel
		d.edges = append(d.edges, segment{Point{d.from, y}, Point{d.to, y}})
	}
	return d
}

// drawOut returns the profile as a function of x over the whole width of the columns: vertical steps become steep, and the ends run on
// level.
func (d *draught) drawOut(p Profile) Profile {
	q := Profile{{min(d.from, p.Left()-1), p[0].Y}}
	for i := 0; i < len(p); {
		j := i
		for j+1 < len(p) && p[j+1].X-p[i].X <= d.step {
			j++
		}
		if j == i {
			q = append(q, p[i])
		} else {
			mid := (p[i].X + p[j].X) / 2
			q = append(q, Point{mid - d.step/2, p[i].Y}, Point{mid + d.step/2, p[j].Y})
		}
		i = j + 1
	}
	return append(q, Point{max(d.to, p.Right()+1), p[len(p)-1].Y})
}

// addSoilWater draws out the water lines of single soils, those before works, and the bottom of the crack.
func (d *draught) addSoilWater() {
	for _, w := range d.sit.Water.BySoil {
		if d.own == nil {
			d.own = make([]Profile, len(d.s.Soils))
		}
		d.own[w.Soil] = d.drawOut(w.Line)
		d.addLine(d.own[w.Soil])
	}
	for i := range d.s.Soils {
		if i >= len(d.sit.Undrained) || !d.sit.Undrained[i] || !d.s.Soils[i].Undrained.byRatio() {
			continue
		}
		if !d.ratio {
			d.ratio, d.before = true, make([]Profile, len(d.s.Soils))
		}
		if w := d.s.Soils[i].Undrained.WaterBefore; len(w) > 0 {
			d.before[i] = d.drawOut(w)
			d.addLine(d.before[i])
		}
	}
	if k := d.s.Crack; k != nil && len(k.Line) > 0 {
		d.crack = d.drawOut(k.Line)
	}
}

func (d *draught) addLine(p Profile) {
	for i := 0; i+1 < len(p); i++ {
		d.edges = append(d.edges, segment{p[i], p[i+1]})
	}
}

// breakpoints returns the sorted x between which no boundary has a vertex and no two boundaries cross.
func (d *draught) breakpoints() []float64 {
	xs := []float64{d.from, d.to}
	add := func(x float64) {
		if x > d.from && x < d.to {
			xs = append(xs, x)
		}
	}
	addBuried := func(p Point) { // A vertex above the ground in force bounds nothing, unless the stress before works counts.
		if d.ratio || p.Y <= d.ground.At(p.X)+d.step {
			add(p.X)
		}
	}
	for i, e := range d.edges {
		addBuried(e.a)
		addBuried(e.b)
		for _, o := range d.edges[:i] {
			if p, ok := crossing(e, o); ok {
				addBuried(p)
			}
		}
	}
	for _, line := range append([]Profile{d.ground, d.water, d.s.FirmBase, d.crack}, d.own...) {
		for _, p := range line { // A head above the ground counts too.
			add(p.X)
		}
	}
	if d.crack != nil { // It does not run on beyond its ends.
		add(d.s.Crack.Line.Left())
		add(d.s.Crack.Line.Right())
	}
	d.ends(add)
	return d.thin(xs)
}

// ends adds where loads, free water, drains and whatever is given by points begin, bend and end.
func (d *draught) ends(add func(x float64)) {
	for _, p := range d.sit.Water.Points {
		add(p.X)
	}
	for _, l := range d.s.LineLoads {
		add(l.X - d.step/2)
		add(l.X + d.step/2)
	}
	for _, l := range d.s.Loads {
		add(l.FromX)
		add(l.ToX)
	}
	for _, f := range d.free {
		add(f.FromX)
		add(f.ToX)
	}
	if dr := d.sit.Water.Drains; dr != nil {
		for _, p := range dr.Invert {
			add(p.X)
		}
	}
	for i := range d.s.Soils {
		if u := d.s.Soils[i].Undrained; u != nil {
			for _, p := range u.Datum {
				add(p.X)
			}
			for _, p := range u.Points {
				add(p.X)
			}
		}
	}
}

// thin sorts breakpoints and leaves out those closer than a quarter of a step to another: they are the same place. The vertices of the
// ground all stay, even where a body's or a stratum's vertex lies in the middle of a step, so that the ground never jumps between columns.
func (d *draught) thin(xs []float64) []float64 {
	near := d.step / 4
	slices.Sort(xs)
	kept := xs[:0]
	g := 0
	for _, x := range xs {
		for g < len(d.ground) && d.ground[g].X < x-near {
			g++
		}
		atGround := g < len(d.ground) && d.ground[g].X <= x+near
		if atGround && d.ground[g].X != x {
			continue
		}
		if n := len(kept); n > 0 && x-kept[n-1] < near {
			continue
		}
		kept = append(kept, x)
	}
	return kept
}

// crossing returns where two segments cross inside both, if they do at one point.
func crossing(e, o segment) (Point, bool) {
	x0, x1 := max(e.a.X, o.a.X), min(e.b.X, o.b.X)
	if x1 <= x0 {
		return Point{}, false
	}
	le, lo := e.line(), o.line()
	d0, d1 := le.at(x0)-lo.at(x0), le.at(x1)-lo.at(x1)
	if d0*d1 >= 0 {
		return Point{}, false
	}
	x := x0 + (x1-x0)*d0/(d0-d1)
	return Point{x, le.at(x)}, true
}

// lineOver returns the line of a profile over a column, from its value at two points inside.
func lineOver(p Profile, x0, x1 float64) line {
	xa, xb := x0+(x1-x0)/4, x1-(x1-x0)/4
	ya, yb := p.At(xa), p.At(xb)
	k := (yb - ya) / (xb - xa)
	return line{ya - k*xa, k}
}

// SoilAt returns the soil at a point, as if the ground were above it: the last placed body that holds the point, else the lowest stratum whose
// top is not below it; above all tops it is the first stratum.
func (s *Section) SoilAt(x, y float64) int {
	for i := len(s.Placed) - 1; i >= 0; i-- {
		if inside(s.Placed[i].Outline, x, y) {
			return s.Placed[i].Soil
		}
	}
	return s.stratumAt(x, y)
}

// stratumAt is SoilAt without the placed bodies.
func (s *Section) stratumAt(x, y float64) int {
	for i := len(s.Strata) - 1; i > 0; i-- {
		if s.Strata[i].Top.At(x) >= y {
			return s.Strata[i].Soil
		}
	}
	return s.Strata[0].Soil
}

// inside reports whether a point lies in an outline (crossing number).
func inside(o []Point, x, y float64) bool {
	in := false
	for i, a := range o {
		b := o[(i+1)%len(o)]
		if (a.X > x) != (b.X > x) && y < a.Y+(b.Y-a.Y)*(x-a.X)/(b.X-a.X) {
			in = !in
		}
	}
	return in
}
