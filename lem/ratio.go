package lem

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

// ErrBadStrength says that a strength is out of range.
var ErrBadStrength = errors.New("lem: strength out of range")

func checkStrength(s *Section) error {
	var errs []error
	for i := range s.Soils {
		soil := &s.Soils[i]
		if p := soil.PowerLaw; p != nil && !(p.A > 0 && p.B > 0 && p.B <= 1 && !math.IsInf(p.A, 0)) {
			errs = append(errs, fmt.Errorf("%w: %s: power law with a = %g, b = %g", ErrBadStrength, soil.Name, p.A, p.B))
		}
		u := soil.Undrained
		if u == nil || u.Ratio == 0 {
			continue
		}
		if !(u.Ratio > 0 && u.Minimum >= 0) || math.IsInf(u.Ratio+u.Minimum, 0) {
			errs = append(errs, fmt.Errorf("%w: %s: ratio %g, minimum %g kPa", ErrBadStrength, soil.Name, u.Ratio, u.Minimum))
		}
		errs = append(errs, finite(u.WaterBefore))
		if !slices.IsSortedFunc(u.WaterBefore, compareX) {
			errs = append(errs, ErrNotLeftToRight)
		}
	}
	return errors.Join(errs...)
}

// effectiveBefore returns the effective vertical stress before works near a point of a column as base.at(x) - perMetre y, kPa. It holds between the
// boundaries of strata and water before works; above the ground before works it is negative.
func (d *draught) effectiveBefore(c *column, water Profile, x, y float64) (base line, perMetre float64) {
	top := lineOver(d.strata[0], c.x0, c.x1)
	head := nowhere
	if water != nil {
		head = lineOver(water, c.x0, c.x1)
	}
	var levels []line // Boundaries between the ground before works and the point, from the top down.
	for _, p := range d.strata[1:] {
		levels = append(levels, lineOver(p, c.x0, c.x1))
	}
	levels = append(levels, head)
	levels = slices.DeleteFunc(levels, func(l line) bool { return !(l.at(x) < top.at(x) && l.at(x) > y) })
	slices.SortFunc(levels, func(p, q line) int { return compareDown(p.at(x), q.at(x)) })
	gamma := func(y float64) float64 {
		soil := &d.s.Soils[d.s.stratumAt(x, y)]
		if y < head.at(x) && soil.SaturatedUnitWeight > 0 {
			return soil.SaturatedUnitWeight
		}
		return soil.UnitWeight
	}
	for _, l := range levels {
		g := gamma((top.at(x) + l.at(x)) / 2)
		base.a += g * (top.a - l.a)
		base.b += g * (top.b - l.b)
		top = l
	}
	perMetre = gamma(y)
	base.a += perMetre * top.a
	base.b += perMetre * top.b
	if y < head.at(x) {
		base.a -= GammaW * head.a
		base.b -= GammaW * head.b
		perMetre -= GammaW
	}
	return base, perMetre
}
