package lem

import "sort"

// Point is a position in the section: X to the right, Y up, m.
type Point struct{ X, Y float64 }

// Profile is a line across the section from left to right: X never decreases; two points with the same X are a vertical
// step. Beyond its ends a profile is held level.
type Profile []Point

// At returns the level of the profile at x, m. At a vertical step it is the upper level, so that mirroring a section does not
// change it. It panics if the profile is empty.
func (p Profile) At(x float64) float64 {
	n := len(p)
	if x < p[0].X {
		return p[0].Y
	}
	if x > p[n-1].X {
		return p[n-1].Y
	}
	i := sort.Search(n, func(k int) bool { return p[k].X >= x }) // first point at or right of x
	y := p[i].Y
	if p[i].X > x {
		a, b := p[i-1], p[i]
		return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
	}
	for ; i < n && p[i].X == x; i++ {
		y = max(y, p[i].Y)
	}
	return y
}

// Left returns the smallest x of the profile, m.
func (p Profile) Left() float64 { return p[0].X }

// Right returns the greatest x of the profile, m.
func (p Profile) Right() float64 { return p[len(p)-1].X }

// Mirror returns the profile reflected about x = 0, again from left to right.
func (p Profile) Mirror() Profile {
	if p == nil {
		return nil
	}
	q := make(Profile, len(p))
	for i, a := range p {
		q[len(p)-1-i] = Point{-a.X, a.Y}
	}
	return q
}
