package lem

import (
	"errors"
	"fmt"
	"math"
)

// ErrSoilTwice says that a soil has two lines of its own.
var ErrSoilTwice = errors.New("lem: soil has two water lines of its own")

func checkWater(s *Section, w *Water) error {
	var errs []error
	seen := make([]bool, len(s.Soils))
	for _, own := range w.BySoil {
		switch {
		case own.Soil < 0 || own.Soil >= len(s.Soils):
			errs = append(errs, fmt.Errorf("%w: water line of soil %d", ErrNoSuchSoil, own.Soil))
			continue
		case len(own.Line) == 0:
			errs = append(errs, ErrEmptySection)
		case seen[own.Soil]:
			errs = append(errs, fmt.Errorf("%w: %s", ErrSoilTwice, s.Soils[own.Soil].Name))
		}
		seen[own.Soil] = true
	}
	for _, p := range w.Points {
		errs = append(errs, finite([]Point{{p.X, p.Y}, {p.Pressure, 0}}))
	}
	return errors.Join(errs...)
}

// ownLine returns the soil's own line over a column, and whether it has one. Where free water stands on the soil the head is at least its level.
func (d *draught) ownLine(c *column, soil int) (line, bool) {
	if d.own == nil || d.own[soil] == nil {
		return nowhere, false
	}
	l := lineOver(d.own[soil], c.x0, c.x1)
	if soil == c.surface && c.free > l.at((c.x0+c.x1)/2) {
		l = line{a: c.free}
	}
	return l, true
}

// pressurePerMetre returns the pore pressure per metre of depth below a line, kN/m3: see Water.InclinedLine.
func (w *Water) pressurePerMetre(l line) float64 {
	if w.InclinedLine && !math.IsInf(l.a, 0) {
		return GammaW / (1 + l.b*l.b)
	}
	return GammaW
}

// setPore sets from where a layer takes its pore pressure when it is drained, and returns the level at x below which it is saturated.
func (m *Model) setPore(d *draught, l *layer, c *column, x float64) (saturated float64) {
	w, soil := &d.sit.Water, &d.s.Soils[l.soil]
	l.unit = w.pressurePerMetre(c.water)
	saturated = c.water.at(x)
	own, hasOwn := d.ownLine(c, int(l.soil))
	switch {
	case soil.FreeDraining && (w.HasFreeDrainingLevel || !math.IsInf(c.free, -1)):
		level := c.free
		if w.HasFreeDrainingLevel {
			level = max(level, w.FreeDrainingLevel)
		}
		l.pore, l.head, l.unit = poreOwn, line{a: level}, GammaW
		saturated = level
	case hasOwn:
		l.pore, l.head, l.unit = poreOwn, own, w.pressurePerMetre(own)
		saturated = own.at(x)
	case !math.IsInf(saturated, -1):
		l.pore = poreLine
	}
	switch {
	case soil.HasRu:
		l.pore, l.ru = poreRu, soil.Ru
	case len(m.points) > 0 && (l.pore != poreOwn || hasOwn):
		l.pore = porePoints
	}
	return saturated
}
