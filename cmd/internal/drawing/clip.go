package drawing

// clipped returns a mark cut to a box; texts and marks of other kinds are returned as they are.
func clipped(m mark, b Box) mark {
	switch v := m.(type) {
	case stroke:
		return stroke{v.pen, clipLines(v.lines, b)}
	case fill:
		rings := make([][]xy, 0, len(v.rings))
		for _, r := range v.rings {
			if c := clipRing(r, b); len(c) > 2 {
				rings = append(rings, c)
			}
		}
		return fill{v.colour, rings}
	}
	return m
}

// clipLines cuts polylines to a box; one that leaves it and comes back falls into parts.
func clipLines(lines [][]xy, b Box) [][]xy {
	var out [][]xy
	for _, l := range lines {
		var part []xy
		for i := 0; i+1 < len(l); i++ {
			p, q, ok := clipSegment(l[i], l[i+1], b)
			if !ok {
				continue
			}
			if len(part) == 0 || part[len(part)-1] != p {
				if len(part) > 0 {
					out = append(out, part)
				}
				part = []xy{p}
			}
			part = append(part, q)
		}
		if len(part) > 0 {
			out = append(out, part)
		}
	}
	return out
}

// clipSegment returns the part of the line from p to q inside a box and reports whether there is one (Liang and Barsky 1984).
func clipSegment(p, q xy, b Box) (xy, xy, bool) {
	t0, t1 := 0.0, 1.0
	for _, e := range [4][2]float64{
		{p.X - q.X, p.X - b.MinX},
		{q.X - p.X, b.MaxX - p.X},
		{p.Y - q.Y, p.Y - b.MinY},
		{q.Y - p.Y, b.MaxY - p.Y},
	} {
		d, room := e[0], e[1]
		switch {
		case d == 0:
			if room < 0 {
				return p, q, false
			}
		case d > 0:
			t1 = min(t1, room/d)
		default:
			t0 = max(t0, room/d)
		}
	}
	if t0 >= t1 {
		return p, q, false
	}
	at := func(t float64) xy { return xy{p.X + t*(q.X-p.X), p.Y + t*(q.Y-p.Y)} }
	a, z := p, q
	if t0 > 0 {
		a = at(t0)
	}
	if t1 < 1 {
		z = at(t1)
	}
	return a, z, true
}

// clipRing cuts a polygon to a box (Sutherland and Hodgman 1974). Parts of a polygon that fall asunder stay joined along the
// edge of the box, which does not show when it is filled.
func clipRing(ring []xy, b Box) []xy {
	for _, depth := range []func(p xy) float64{
		func(p xy) float64 { return p.X - b.MinX }, func(p xy) float64 { return b.MaxX - p.X },
		func(p xy) float64 { return p.Y - b.MinY }, func(p xy) float64 { return b.MaxY - p.Y },
	} {
		var out []xy
		for i, p := range ring {
			q := ring[(i+1)%len(ring)]
			dp, dq := depth(p), depth(q)
			if dp >= 0 {
				out = append(out, p)
			}
			if dp*dq < 0 {
				t := dp / (dp - dq)
				out = append(out, xy{p.X + t*(q.X-p.X), p.Y + t*(q.Y-p.Y)})
			}
		}
		ring = out
	}
	return ring
}
