package lem

import (
	"slices"
	"sort"
)

// vertical holds the undrained strengths known on one vertical, from the top down.
type vertical struct {
	x  float64
	y  []float64
	cu []float64
}

// verticals groups strength points by x.
func verticals(u *UndrainedStrength) []vertical {
	if u == nil || len(u.Points) == 0 {
		return nil
	}
	ps := slices.Clone(u.Points)
	sort.SliceStable(ps, func(i, j int) bool {
		if ps[i].X != ps[j].X {
			return ps[i].X < ps[j].X
		}
		return ps[i].Y > ps[j].Y
	})
	var vs []vertical
	for _, p := range ps {
		if len(vs) == 0 || vs[len(vs)-1].x != p.X {
			vs = append(vs, vertical{x: p.X})
		}
		v := &vs[len(vs)-1]
		v.y, v.cu = append(v.y, p.Y), append(v.cu, p.Strength)
	}
	return vs
}

func (v *vertical) at(y float64) float64 {
	n := len(v.y)
	if y >= v.y[0] {
		return v.cu[0]
	}
	for i := 1; i < n; i++ {
		if y >= v.y[i] {
			return v.cu[i] + (v.cu[i-1]-v.cu[i])*(y-v.y[i])/(v.y[i-1]-v.y[i])
		}
	}
	return v.cu[n-1]
}

// undrainedAt interpolates cu at a point: linear on each vertical and between verticals, held beyond.
func undrainedAt(vs []vertical, x, y float64) float64 {
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
