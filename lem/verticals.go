package lem

import (
	"slices"
	"sort"
)

// sample is a value known at a point.
type sample struct{ x, y, v float64 }

// vertical holds the values known on one vertical, from the top down.
type vertical struct {
	x float64
	y []float64
	v []float64
}

// strengthVerticals groups the points of an undrained strength by x.
func strengthVerticals(u *UndrainedStrength) []vertical {
	if u == nil {
		return nil
	}
	ps := make([]sample, len(u.Points))
	for i, p := range u.Points {
		ps[i] = sample{p.X, p.Y, p.Strength}
	}
	return verticals(ps)
}

// pressureVerticals groups points of pore pressure by x.
func pressureVerticals(points []PressurePoint) []vertical {
	ps := make([]sample, len(points))
	for i, p := range points {
		ps[i] = sample{p.X, p.Y, p.Pressure}
	}
	return verticals(ps)
}

// verticals groups samples by x; it sorts them.
func verticals(ps []sample) []vertical {
	sort.SliceStable(ps, func(i, j int) bool {
		if ps[i].x != ps[j].x {
			return ps[i].x < ps[j].x
		}
		return ps[i].y > ps[j].y
	})
	var vs []vertical
	for _, p := range ps {
		if len(vs) == 0 || vs[len(vs)-1].x != p.x {
			vs = append(vs, vertical{x: p.x})
		}
		v := &vs[len(vs)-1]
		v.y, v.v = append(v.y, p.y), append(v.v, p.v)
	}
	return slices.Clip(vs)
}

func (v *vertical) at(y float64) float64 {
	n := len(v.y)
	if y >= v.y[0] {
		return v.v[0]
	}
	for i := 1; i < n; i++ {
		if y >= v.y[i] {
			return v.v[i] + (v.v[i-1]-v.v[i])*(y-v.y[i])/(v.y[i-1]-v.y[i])
		}
	}
	return v.v[n-1]
}

// interpolated returns the value at a point: linear on each vertical and between verticals, held beyond.
func interpolated(vs []vertical, x, y float64) float64 {
	n := len(vs)
	if x <= vs[0].x {
		return vs[0].at(y)
	}
	for i := 1; i < n; i++ {
		if x <= vs[i].x {
			a, b := &vs[i-1], &vs[i]
			t := (x - a.x) / (b.x - a.x)
			return a.at(y)*(1-t) + b.at(y)*t
		}
	}
	return vs[n-1].at(y)
}
