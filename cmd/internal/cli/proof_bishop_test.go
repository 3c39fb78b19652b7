package cli

import (
	"math"
	"slices"
	"sort"
)

// stranger is a plain analysis of one check by Bishop's simplified method (Bishop 1955, Geotechnique 5), from result.json alone: vertical
// slices of equal width, one column of soil a slice, F by repeated substitution. It shares no code with the engine.
type stranger struct {
	file     *theirFile
	section  *theirSection
	water    theirWater
	strength theirStrength
	kh       float64
}

// leastMAlpha bars slips with exits so steep that the force on their base has no sense (Whitman and Bailey 1967 warn below 0.2).
const leastMAlpha = 0.2

// at returns the level of a line, held level beyond its ends.
func (l theirLine) at(x float64) float64 {
	i := sort.Search(len(l), func(k int) bool { return l[k][0] >= x })
	switch i {
	case 0:
		return l[0][1]
	case len(l):
		return l[i-1][1]
	}
	a, b := l[i-1], l[i]
	return a[1] + (b[1]-a[1])*(x-a[0])/(b[0]-a[0])
}

// crossings returns the levels at which the vertical at x meets a closed outline.
func (l theirLine) crossings(x float64) (ys []float64) {
	for i, b := range l {
		if a := l[(i+len(l)-1)%len(l)]; (a[0] < x) != (b[0] < x) {
			ys = append(ys, a[1]+(b[1]-a[1])*(x-a[0])/(b[0]-a[0]))
		}
	}
	return ys
}

// soil returns the soil at a point: the last body placed there, else the lowest stratum that reaches so high.
func (g *stranger) soil(x, y float64) string {
	for i := len(g.section.Placed) - 1; i >= 0; i-- {
		above := 0
		for _, c := range g.section.Placed[i].Outline.crossings(x) {
			if c > y {
				above++
			}
		}
		if above%2 == 1 {
			return g.section.Placed[i].Soil
		}
	}
	for i := len(g.section.Strata) - 1; i > 0; i-- {
		if g.section.Strata[i].Top.at(x) >= y {
			return g.section.Strata[i].Soil
		}
	}
	return g.section.Strata[0].Soil
}

// pool returns the level of water standing on the ground at x, -Inf if there is none. Like the ground it goes on beyond the ends.
func (g *stranger) pool(x float64) float64 {
	level := math.Inf(-1)
	x = min(max(x, g.section.Ground[0][0]), g.section.Ground[len(g.section.Ground)-1][0])
	for _, f := range g.water.Free {
		if f.From <= x && x <= f.To && f.Level > g.section.Ground.at(x) {
			level = max(level, f.Level)
		}
	}
	return level
}

// head returns the piezometric level at a point in a soil, and the level of the water line there without drains.
func (g *stranger) head(soil string, x, y float64) (head, line float64) {
	line = g.pool(x)
	if by, ok := g.water.BySoil[soil]; ok && by.Ru == nil && (by.Level != nil || !math.IsInf(line, -1)) {
		if by.Level != nil {
			line = max(line, *by.Level)
		}
		return line, line
	}
	before, d := g.water.Line, g.water.Drains
	if d != nil {
		before = d.Before
	}
	if before != nil {
		line = max(line, before.at(x))
	}
	if d == nil || x <= d.Invert[0][0] || x >= d.Invert[len(d.Invert)-1][0] {
		return line, line
	}
	ratios := slices.Clone(d.Invert)
	for i := range ratios {
		ratios[i][1] = d.Ratio[i]
	}
	invert, ratio := d.Invert.at(x), ratios.at(x)
	switch {
	case invert >= line || y <= invert-d.Fade:
		return line, line
	case y >= invert:
		return line - ratio*(line-y), line
	}
	return line - ratio*(line-invert)*(1-(invert-y)/d.Fade), line
}

// column returns the weight of the ground above a point, kPa, and the level of its centroid.
func (g *stranger) column(x, y float64) (weight, centroid float64) {
	top := g.section.Ground.at(x)
	levels := []float64{y, top}
	for _, s := range g.section.Strata {
		levels = append(levels, s.Top.at(x))
	}
	for _, p := range g.section.Placed {
		levels = append(levels, p.Outline.crossings(x)...)
	}
	for soil := range g.file.Soils {
		_, line := g.head(soil, x, y)
		levels = append(levels, line)
	}
	slices.Sort(levels)
	for i := 1; i < len(levels); i++ {
		a, b := levels[i-1], levels[i]
		if a < y || b > top || a == b {
			continue
		}
		soil := g.soil(x, (a+b)/2)
		gamma := g.file.Soils[soil].Moist
		if _, line := g.head(soil, x, y); (a+b)/2 < line {
			gamma = g.file.Soils[soil].Wet
		}
		weight += gamma * (b - a)
		centroid += gamma * (b - a) * (a + b) / 2
	}
	return weight, centroid / weight
}

// shear returns cohesion, kPa, and tan(phi) of a soil at a point.
func (g *stranger) shear(soil string, x, y float64) (c, tan float64) {
	s := g.file.Soils[soil]
	if !g.strength.undrained(soil) {
		return s.Drained.Cohesion, math.Tan(s.Drained.Friction * math.Pi / 180)
	}
	u := s.Undrained
	switch {
	case len(u.Points) > 0:
		verticals := map[float64]theirLine{} // By x: strength against level.
		for _, p := range u.Points {
			verticals[p[0]] = append(verticals[p[0]], theirPoint{p[1], p[2]})
		}
		var across theirLine // Strength at this level against x.
		for at, v := range verticals {
			slices.SortFunc(v, func(a, b theirPoint) int { return slices.Compare(a[:], b[:]) })
			across = append(across, theirPoint{at, v.at(y)})
		}
		slices.SortFunc(across, func(a, b theirPoint) int { return slices.Compare(a[:], b[:]) })
		return across.at(x), 0
	case u.DatumY != nil:
		return u.Strength + u.Gradient*max(0, *u.DatumY-y), 0
	case u.Datum != nil:
		return u.Strength + u.Gradient*max(0, u.Datum.at(x)-y), 0
	}
	return u.Strength, 0
}

// theirSlice is a slice: its base and forces. Signs of sin, push and shake are those of a slip to the right; pushX and shakeY are levels.
type theirSlice struct{ x, y, b, sin, q, u, c, tan, push, pushY, shake, shakeY float64 }

// cut cuts a slip between x = from and to into n slices; base gives its level and the sine of its inclination. It reports false if the slip
// is not wholly in the ground, too shallow or through the firm base.
func (g *stranger) cut(base func(x float64) (y, sin float64), from, to float64, n int) (ss []theirSlice, ok bool) {
	depth, b := 0.0, (to-from)/float64(n)
	for i := range n {
		s := theirSlice{x: from + b*(float64(i)+0.5), b: b}
		s.y, s.sin = base(s.x)
		ground := g.section.Ground.at(s.x)
		if !(ground > s.y) || g.section.FirmBase != nil && s.y < g.section.FirmBase.at(s.x) {
			return nil, false
		}
		depth = max(depth, ground-s.y)
		soil := g.soil(s.x, s.y)
		weight, centroid := g.column(s.x, s.y)
		s.c, s.tan = g.shear(soil, s.x, s.y)
		if by := g.water.BySoil[soil]; by.Ru != nil {
			s.u = *by.Ru * weight
		} else {
			head, _ := g.head(soil, s.x, s.y)
			s.u = g.file.Settings.GammaW * max(0, head-s.y)
		}
		if g.strength.undrained(soil) {
			s.u = 0
		}
		s.q, s.shakeY = weight*b, weight*b*centroid
		for _, l := range g.section.Surcharges {
			if l.Kind == "permanent" && l.From < s.x && s.x < l.To {
				s.q += l.KPa * b
				s.shakeY += l.KPa * b * ground
			}
		}
		s.shake, s.shakeY = g.kh*s.q, s.shakeY/s.q
		if p := g.file.Settings.GammaW * (g.pool(s.x) - ground); p > 0 {
			s.q += p * b
			s.push, s.pushY = p*(g.section.Ground.at(s.x+b/2)-g.section.Ground.at(s.x-b/2)), ground
		}
		ss = append(ss, s)
	}
	return ss, depth > g.file.Settings.Depth*shallower
}

// arc returns the base of a circle.
func arc(c theirPoint, r float64) func(x float64) (y, sin float64) {
	return func(x float64) (y, sin float64) { return c[1] - math.Sqrt(r*r-(x-c[0])*(x-c[0])), (c[0] - x) / r }
}

// chain returns the base of a polyline.
func chain(l theirLine) func(x float64) (y, sin float64) {
	return func(x float64) (y, sin float64) {
		i := sort.Search(len(l)-2, func(k int) bool { return l[k+1][0] >= x })
		a, b := l[i], l[i+1]
		return l.at(x), (a[1] - b[1]) / math.Hypot(b[0]-a[0], b[1]-a[1])
	}
}

// shallower forgives the deepest point of a slip falling between two slices.
const shallower = 0.995

// solution finds F of slices that are turned to the direction of movement.
type solution func(ss []theirSlice) float64

// solve returns F of slices, NaN if there is none that is admissible, and whether the slip moves to the left. Variable surcharges are left
// out, one by one, where they raise F.
func (g *stranger) solve(ss []theirSlice, by solution) (f float64, leftward bool) {
	var weigh float64
	for _, s := range ss {
		weigh += s.q * s.sin
	}
	if leftward = weigh < 0; leftward { // Reflect the slip, so that it moves to the right.
		ss = slices.Clone(ss)
		slices.Reverse(ss)
		for i := range ss {
			s := &ss[i]
			s.x, s.sin, s.push = -s.x, -s.sin, -s.push
		}
	}
	f = by(ss)
	for _, l := range g.section.Surcharges {
		if l.Kind != "variable" {
			continue
		}
		loaded := slices.Clone(ss)
		for i := range loaded {
			s := &loaded[i]
			if x := s.x; l.From < x && x < l.To && !leftward || l.From < -x && -x < l.To && leftward {
				s.q += l.KPa * s.b
			}
		}
		if with := by(loaded); with < f {
			ss, f = loaded, with
		}
	}
	return f, leftward
}

// bishop is the simplified method on a circle, by repeated substitution.
func bishop(centreY, r float64) solution {
	return func(ss []theirSlice) float64 {
		f := 1.0
		for range 200 {
			var resisting, driving float64
			admissible := true
			for _, s := range ss {
				m := math.Sqrt(1-s.sin*s.sin) + s.sin*s.tan/f
				admissible = admissible && (m >= leastMAlpha || s.sin >= 0)
				resisting += (s.c*s.b + (s.q-s.u*s.b)*s.tan) / m
				driving += s.q*s.sin + (s.push*(centreY-s.pushY)+s.shake*(centreY-s.shakeY))/r
			}
			next := resisting / driving
			if !(next > 0) {
				return math.NaN()
			}
			if math.Abs(next-f) < 1e-8 {
				if !admissible {
					return math.NaN()
				}
				return next
			}
			f = next
		}
		return math.NaN()
	}
}
