package lem

import "math"

// The slow obvious twin: every quantity by plain sampling of the section as it was given, every equation by halving an interval. It shares
// no code with the engine.

// twinLevel returns the level of a profile just beside x, held level beyond its ends.
func twinLevel(p Profile, x float64) float64 {
	if x <= p[0].X {
		return p[0].Y
	}
	for i := 1; i < len(p); i++ {
		if x < p[i].X {
			return p[i-1].Y + (p[i].Y-p[i-1].Y)*(x-p[i-1].X)/(p[i].X-p[i-1].X)
		}
	}
	return p[len(p)-1].Y
}

// twinSoil returns the soil at a point below the ground: bodies over strata, the last first; else the lowest stratum whose top is above.
func twinSoil(s *Section, x, y float64) int {
	soil := s.Strata[0].Soil
	for _, st := range s.Strata[1:] {
		if y < twinLevel(st.Top, x) {
			soil = st.Soil
		}
	}
	for _, b := range s.Placed { // Clockwise and convex here: the point lies to the right of every side.
		in := true
		for i, p := range b.Outline {
			q := b.Outline[(i+1)%len(b.Outline)]
			in = in && (q.X-p.X)*(y-p.Y)-(q.Y-p.Y)*(x-p.X) < 0
		}
		if in {
			soil = b.Soil
		}
	}
	return soil
}

// twinFree returns the depth of free water on the ground at x.
func twinFree(s *Section, w *Water, x float64) float64 {
	depth := 0.0
	for _, f := range w.Free {
		if x > f.FromX && x < f.ToX {
			depth = max(depth, f.Level-twinLevel(s.Ground, x))
		}
	}
	return depth
}

// twinHead returns the level of the piezometric head at a point; -Inf if dry.
func twinHead(s *Section, w *Water, x, y float64) float64 {
	head := math.Inf(-1)
	if len(w.Line) > 0 {
		head = twinLevel(w.Line, x)
	}
	if d := twinFree(s, w, x); d > 0 {
		head = max(head, twinLevel(s.Ground, x)+d)
	}
	d := w.Drains
	if d == nil || x <= d.Invert[0].X || x >= d.Invert[len(d.Invert)-1].X {
		return head
	}
	invert := twinLevel(d.Invert, x)
	ratio := make(Profile, len(d.Ratio))
	for i := range ratio {
		ratio[i] = Point{d.Invert[i].X, d.Ratio[i]}
	}
	r := twinLevel(ratio, x)
	switch {
	case head <= invert:
		return head
	case y >= invert:
		return head - r*(head-y)
	}
	return head - r*(head-invert)*max(0, 1-(invert-y)/d.Fade)
}

// twinWeight returns the weight of the ground above a point over a metre square, kPa, by sampling from the top down.
func twinWeight(s *Section, w *Water, x, y float64, samples int) float64 {
	top := twinLevel(s.Ground, x)
	var sum float64
	for i := range samples {
		z := top - (top-y)*(float64(i)+0.5)/float64(samples)
		sum += twinGamma(s, w, x, z)
	}
	return sum * (top - y) / float64(samples)
}

// twinGamma returns the unit weight at a point. Drains lower the pressure, not the line below which the ground is saturated.
func twinGamma(s *Section, w *Water, x, y float64) float64 {
	soil := s.Soils[twinSoil(s, x, y)]
	if soil.SaturatedUnitWeight > 0 && y < twinHead(s, &Water{Line: w.Line, Free: w.Free}, x, y) {
		return soil.SaturatedUnitWeight
	}
	return soil.UnitWeight
}

// twinSlice is a slice of the twin, for movement to the right.
type twinSlice struct {
	x, y, b, sin, cos  float64
	weight, load, free float64 // Ground, permanent surcharge and free water, kN.
	push, pushY        float64 // Free water to the right, kN, and its level.
	quake, quakeY      float64
	u, c, tan, length  float64
}

// beside is how far outside a slip's end the twin looks for the foot of a vertical face, m.
const beside = 1e-4

// twinSlices cuts an arc between two x into slices of equal angle, each with samples down its middle. left says that it moves to the left.
func twinSlices(s *Section, sit *Situation, slip Slip, from, to float64, n, down int, left bool) []twinSlice {
	w := &sit.Water
	out := make([]twinSlice, n)
	c, r := slip.Centre, slip.Radius
	first, last := math.Asin((c.X-from)/r), math.Asin((c.X-to)/r) // Inclination of the base, positive where it falls to the right.
	step := (first - last) / float64(n)
	for i := range out {
		t := &out[i]
		t.sin, t.cos = math.Sincos(first - (float64(i)+0.5)*step)
		t.x, t.y = c.X-r*t.sin, c.Y-r*t.cos
		xl, xr := c.X-r*math.Sin(first-float64(i)*step), c.X-r*math.Sin(first-float64(i+1)*step)
		t.b, t.length = xr-xl, r*step
		above := twinWeight(s, w, t.x, t.y, down)
		t.weight = above * t.b
		for _, l := range s.Loads {
			if !l.Variable {
				t.load += l.Pressure * max(0, min(xr, l.ToX)-max(xl, l.FromX))
			}
		}
		ground := twinLevel(s.Ground, t.x)
		t.free = GammaW * twinFree(s, w, t.x) * t.b
		// Push of the water on the fall of the ground over the slice: from level to level.
		gl, gr := twinLevel(s.Ground, xl), twinLevel(s.Ground, xr)
		if i == 0 { // A slip may leave through a vertical face.
			gl = max(twinLevel(s.Ground, xl-beside), c.Y-r*math.Cos(first))
		}
		if i == n-1 {
			gr = max(twinLevel(s.Ground, xr+beside), c.Y-r*math.Cos(last))
		}
		level := math.Inf(-1)
		for _, f := range w.Free {
			if f.FromX < xr && f.ToX > xl {
				level = max(level, f.Level)
			}
		}
		deep, shallow := max(0, level-min(gl, gr)), max(0, level-max(gl, gr))
		if t.push = GammaW * (deep*deep - shallow*shallow) / 2; t.push != 0 {
			t.pushY = level - 2.0/3*(deep*deep*deep-shallow*shallow*shallow)/(deep*deep-shallow*shallow)
			if gr < gl {
				t.push = -t.push
			}
		}
		t.quake = sit.Kh * (t.weight + t.load)
		t.quakeY = ground
		if sit.Kh != 0 && t.weight+t.load > 0 { // Centroid of the column.
			moment := t.load / t.b * ground
			for k := range down {
				z := ground - (ground-t.y)*(float64(k)+0.5)/float64(down)
				dz := (ground - t.y) / float64(down)
				moment += twinGamma(s, w, t.x, z) * z * dz
			}
			t.quakeY = moment / (above + t.load/t.b)
		}
		soil := twinSoil(s, t.x, t.y)
		t.strength(&s.Soils[soil], soil < len(sit.Undrained) && sit.Undrained[soil], above, twinHead(s, w, t.x, t.y))
		if left {
			t.sin, t.push = -t.sin, -t.push
		}
	}
	if left {
		for i, j := 0, len(out)-1; i < j; i, j = i+1, j-1 {
			out[i], out[j] = out[j], out[i]
		}
		for i := range out {
			out[i].x = -out[i].x
		}
	}
	return out
}

func (t *twinSlice) strength(soil *Soil, undrained bool, above, head float64) {
	if undrained {
		t.c = soil.Undrained.Strength
		if soil.Undrained.Gradient != 0 {
			t.c += soil.Undrained.Gradient * max(0, twinLevel(soil.Undrained.Datum, t.x)-t.y)
		}
		return
	}
	t.c, t.tan = soil.Cohesion, math.Tan(soil.Friction)
	t.u = GammaW * max(0, head-t.y)
	if soil.HasRu {
		t.u = soil.Ru * above
	}
}

func (t *twinSlice) down() float64 { return t.weight + t.load + t.free }

// twinMoment is the overturning moment of all loads about the centre over the radius.
func twinMoment(ts []twinSlice, centre Point, r float64) float64 {
	var m float64
	for _, t := range ts {
		m += t.down()*t.sin + t.push*(centre.Y-t.pushY)/r + t.quake*(centre.Y-t.quakeY)/r
	}
	return m
}

// halve returns the root of a falling function between two bounds.
func halve(f func(float64) float64, lo, hi float64) float64 {
	for range 40 {
		if mid := (lo + hi) / 2; f(mid) > 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

func twinOrdinary(ts []twinSlice, moment float64) float64 {
	var sum float64
	free := false
	for _, t := range ts {
		free = free || t.free != 0
	}
	for _, t := range ts {
		n := t.down()*t.cos - t.quake*t.sin - t.u*t.length
		if free {
			n = (t.down()-t.u*t.b)*t.cos - t.quake*t.sin
		}
		sum += t.c*t.length + n*t.tan
	}
	return sum / moment
}

// twinBishop returns F and the least m-alpha of the slices that rise; F is the root beyond the last pole.
func twinBishop(ts []twinSlice, moment float64) (f, least float64) {
	pole := 1e-6
	for _, t := range ts {
		pole = max(pole, -t.sin/t.cos*t.tan)
	}
	f = halve(func(f float64) float64 {
		var sum float64
		for _, t := range ts {
			sum += (t.c*t.b + (t.down()-t.u*t.b)*t.tan) / (t.cos + t.sin*t.tan/f)
		}
		return sum/f - moment
	}, pole*(1+1e-9), 1000)
	return f, twinMAlpha(ts, f)
}

func twinMAlpha(ts []twinSlice, f float64) float64 {
	least := 1.0
	for _, t := range ts {
		if t.sin < 0 {
			least = min(least, t.cos+t.sin*t.tan/f)
		}
	}
	return least
}

// twinSpencer solves for the two unknowns of Spencer by nested halving: at each inclination lambda the F that closes the horizontal forces,
// then the lambda near a first guess at which the moments of all external forces about the origin vanish.
func twinSpencer(ts []twinSlice, near float64) (f, lambda float64, ok bool) {
	residual := func(f, lambda float64) (force, moment float64) {
		for _, t := range ts {
			sin, cos := t.sin, t.cos
			// Unknown: normal force N and loss of interslice force D: horizontally H + N sin - S cos = D, vertically N cos + S sin = V - lambda D,
			// with S = (c l - u l tan)/F + N tan/F.
			k, s0 := t.tan/f, (t.c*t.length-t.u*t.length*t.tan)/f
			v, h := t.down(), t.push+t.quake
			a11, a12, b1 := sin-cos*k, -1.0, s0*cos-h
			a21, a22, b2 := cos+sin*k, lambda, v-s0*sin
			det := a11*a22 - a12*a21
			n := (b1*a22 - a12*b2) / det
			s := s0 + n*k
			force += n*sin - s*cos + h
			moment += t.y*(n*sin-s*cos) - t.x*(n*cos+s*sin-v) + t.push*t.pushY + t.quake*t.quakeY
		}
		return force, moment
	}
	forceF := func(lambda float64) float64 {
		return halve(func(f float64) float64 { v, _ := residual(f, lambda); return -v }, 0.02, 50)
	}
	g := func(lambda float64) float64 { _, m := residual(forceF(lambda), lambda); return m }
	const reach = 0.05
	lo, hi := near-reach, near+reach
	glo, ghi := g(lo), g(hi)
	if glo*ghi > 0 {
		return 0, 0, false
	}
	lambda = halve(func(l float64) float64 { return g(l) * math.Copysign(1, glo) }, lo, hi)
	return forceF(lambda), lambda, true
}

// twinParts lists where the lower arc lies below the ground with both ends on it, by sampling.
func twinParts(s *Section, slip Slip) []Range {
	const n = 60000
	c, r := slip.Centre, slip.Radius
	width := s.Ground.Right() - s.Ground.Left()
	lo, hi := max(c.X-r*(1-1e-9), s.Ground.Left()-width), min(c.X+r*(1-1e-9), s.Ground.Right()+width)
	depth := func(x float64) float64 {
		return twinLevel(s.Ground, x) - (c.Y - math.Sqrt(max(0, r*r-(x-c.X)*(x-c.X))))
	}
	var out []Range
	start := math.NaN()
	for i := range n {
		a, b := lo+(hi-lo)*float64(i)/n, lo+(hi-lo)*float64(i+1)/n
		da, db := depth(a), depth(b)
		if da > 0 == (db > 0) {
			continue
		}
		x := halve(func(x float64) float64 { return depth(x) * math.Copysign(1, da) }, a, b)
		if db > 0 {
			start = x
		} else if !math.IsNaN(start) {
			out = append(out, Range{start, x})
			start = math.NaN()
		}
	}
	return out
}
