package lem

import (
	"errors"
	"fmt"
	"math"
)

// LineLoad is a force on the ground along a line at right angles to the section, kN per metre run. It is permanent: an earthquake acts on its
// vertical part. It is the limit of a narrow strip: the base beneath it carries it over no width, so that a curved envelope gives no friction for it.
type LineLoad struct {
	Name       string
	X          float64 // m.
	Vertical   float64 // kN/m, positive downwards.
	Horizontal float64 // kN/m, positive to the right.
}

// ErrBadLoad says that a load is not well formed.
var ErrBadLoad = errors.New("lem: bad load")

// ErrBadEarthquake says that a pseudo-static coefficient is out of range.
var ErrBadEarthquake = errors.New("lem: vertical earthquake coefficient must be greater than -1")

func checkLoads(s *Section, sit *Situation) error {
	var errs []error
	for _, l := range s.Loads {
		if err := finite([]Point{{l.FromX, l.ToX}, {l.Pressure, l.Rise}, {l.Shear, 0}}); err != nil {
			errs = append(errs, fmt.Errorf("%w: %q", err, l.Name))
		}
		if l.FromX > l.ToX {
			errs = append(errs, fmt.Errorf("%w: %q runs from %g to %g", ErrBadLoad, l.Name, l.FromX, l.ToX))
		}
	}
	for _, l := range s.LineLoads {
		if err := finite([]Point{{l.X, l.Vertical}, {l.Horizontal, 0}}); err != nil {
			errs = append(errs, fmt.Errorf("%w: %q", err, l.Name))
		}
	}
	if !(sit.Kv > -1) || math.IsInf(sit.Kv, 0) || math.IsNaN(sit.Kh) || math.IsInf(sit.Kh, 0) {
		errs = append(errs, ErrBadEarthquake)
	}
	return errors.Join(errs...)
}

// pressure returns the vertical pressure of a surcharge as a line over its range.
func (l *Surcharge) pressure() line {
	if l.Rise == 0 {
		return line{a: l.Pressure}
	}
	k := l.Rise / (l.ToX - l.FromX)
	return line{l.Pressure - k*l.FromX, k}
}

// addLoads sets what acts on the ground over a column.
func (m *Model) addLoads(d *draught, c *column, xm float64) {
	for i := range d.s.Loads {
		l := &d.s.Loads[i]
		if l.Variable || xm <= l.FromX || xm >= l.ToX {
			continue
		}
		p := l.pressure()
		c.pressure.a += p.a
		c.pressure.b += p.b
		c.shear += l.Shear
		m.sheared = m.sheared || l.Shear != 0
	}
	for i := range d.s.LineLoads { // A strip as wide as a drawn-out step.
		l := &d.s.LineLoads[i]
		share := (min(c.x1, l.X+d.step/2) - max(c.x0, l.X-d.step/2)) / (d.step * (c.x1 - c.x0))
		if share <= 0 {
			continue
		}
		c.pressure.a += share * l.Vertical
		c.shear += share * l.Horizontal
		m.sheared = m.sheared || l.Horizontal != 0
	}
	for i := range m.varied {
		l := &m.varied[i]
		if l.FromX < xm && xm < l.ToX {
			c.variable |= 1 << i
		}
	}
}

// push adds a horizontal force at a level to a slice, positive in the direction of movement.
func (s *slice) push(force, level float64) {
	total := s.k + force
	if total != 0 {
		s.ky = (s.k*s.ky + force*level) / total
	}
	s.k = total
}

// addVariable puts every variable surcharge on the slices where, by Bishop's influence of a small load at this F, it lowers F on the
// whole. A load on a slice raises F where tan(alpha) < tan(phi)/F (Hutchinson 1977); a horizontal one lowers it as far as it drives. It reports
// whether any was put on.
func (ws *Workspace) addVariable(loads []Surcharge, f float64, leftward bool) bool {
	added := false
	ss := ws.slice[:ws.n]
	for i := range loads {
		bit := uint64(1) << i
		pressure, shear := loads[i].pressure(), loads[i].Shear
		if leftward {
			shear = -shear
		}
		var influence float64
		for k := range ss {
			s := &ss[k]
			if s.variable&bit == 0 {
				continue
			}
			influence += pressure.at(s.x) * s.b * (s.tan/(s.cos+s.sin*s.tan/f) - f*s.sin)
			if ws.arc {
				influence -= f * shear * s.b * (ws.centre.Y - s.ground) / ws.radius
			} else {
				influence -= f * shear * s.b * s.cos
			}
		}
		if influence >= 0 {
			continue
		}
		added = true
		for k := range ss {
			s := &ss[k]
			if s.variable&bit == 0 {
				continue
			}
			p := pressure.at(s.x) * s.b
			s.q += p
			s.frees += p * s.tan
			if shear != 0 {
				s.push(shear*s.b, s.ground)
			}
		}
	}
	return added
}
