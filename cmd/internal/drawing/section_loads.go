package drawing

import (
	"math"

	"standfast/lem"
)

// Measures of loads, points.
const (
	loadHeight   = 13.0
	loadArrows   = 11.0 // between the arrows of a surcharge
	loadStacking = 17.0
	lineLoadLong = 25.0
	lineLoadOff  = 1.5 // between the tip of a line load and the ground
)

// loadRow returns how many surcharges stand below the i-th: those before it that share an x with it or touch it.
func (p *picture) loadRow(i int) float64 {
	row, l := 0.0, p.sec.Loads[i]
	for _, o := range p.sec.Loads[:i] {
		if o.FromX <= l.ToX && l.FromX <= o.ToX {
			row++
		}
	}
	return row
}

// sky returns the height kept free above the ground for labels, points.
func (p *picture) sky() float64 {
	rows := 0.0
	for i := range p.sec.Loads {
		rows = max(rows, p.loadRow(i))
	}
	if len(p.sec.LineLoads) > 0 {
		rows++
	}
	return skyAbove + rows*loadStacking
}

// loadLine returns the line that a surcharge's arrows hang from, along the ground, its height in proportion to the pressure; nil outside
// the window. Surcharges that share an x stand above each other.
func (p *picture) loadLine(s *sheet, i int) (upper, lower []xy) {
	l := p.sec.Loads[i]
	x0, x1 := max(l.FromX, p.x0), min(l.ToX, p.x1)
	if x0 >= x1 {
		return nil, nil
	}
	most := max(math.Abs(l.Pressure), math.Abs(l.Pressure+l.Rise))
	lower = s.view.line(crop(p.ground, x0, x1))
	for k, q := range lower {
		share := 1.0
		if most > 0 {
			x := s.view.x0 + (q.X-s.view.frame.MinX)/s.view.sx
			share = math.Abs(l.Pressure+l.Rise*(x-l.FromX)/(l.ToX-l.FromX)) / most
		}
		lower[k].Y += p.loadRow(i)*loadStacking + 2
		upper = append(upper, xy{q.X, lower[k].Y + share*loadHeight})
	}
	return upper, lower
}

func (p *picture) drawLoads(s *sheet) {
	for i := range p.sec.Loads {
		up, low := p.loadLine(s, i)
		if up == nil {
			continue
		}
		s.stroke(loadPen, medium, up)
		first, last := up[0].X, up[len(up)-1].X
		n := max(1, math.Round((last-first)/loadArrows))
		for k := 0.0; k <= n; k++ {
			x := first + (last-first)*k/n
			foot, head := xy{x, heightAt(low, x)}, xy{x, heightAt(up, x)}
			if head.Y-foot.Y < arrowHead { // Where a pressure begins at nothing there is no room for an arrow.
				continue
			}
			s.place.marks = append(s.place.marks, Box{x, foot.Y, x, head.Y}.grown(arrowHalf+1.5))
			s.stroke(loadPen, medium, []xy{head, {x, foot.Y + arrowHead/2}})
			s.arrow(loadInk, foot, xy{0, -1})
		}
	}
	for i := range p.sec.LineLoads {
		if tail, tip, ok := p.lineLoad(s, i); ok {
			s.stroke(lineLoadPen, heavy, []xy{tail, tip})
			s.arrow(loadInk, tip, xy{tip.X - tail.X, tip.Y - tail.Y})
		}
	}
}

// lineLoad returns the arrow of a line load, in the direction of its force, with its tip on the ground or, where it pulls, its tail.
func (p *picture) lineLoad(s *sheet, i int) (tail, tip xy, ok bool) {
	l := p.sec.LineLoads[i]
	force := math.Hypot(l.Horizontal, l.Vertical)
	if force == 0 || !p.inWindow(l.X) {
		return xy{}, xy{}, false
	}
	at := s.view.at(lem.Point{X: l.X, Y: p.ground.At(l.X)})
	at.Y += lineLoadOff
	along := xy{lineLoadLong * l.Horizontal / force, -lineLoadLong * l.Vertical / force}
	if l.Vertical < 0 {
		return at, xy{at.X + along.X, at.Y + along.Y}, true
	}
	return xy{at.X - along.X, at.Y - along.Y}, at, true
}

// sampleLoad draws a surcharge in the key.
func sampleLoad(s *sheet, b Box) {
	s.add(stroke{loadPen, [][]xy{{{b.MinX + 4, b.MaxY}, {b.MaxX - 4, b.MaxY}}}})
	for k := range 3 {
		x := b.MinX + 4 + float64(k)*(b.width()-8)/2
		s.add(stroke{loadPen, [][]xy{{{x, b.MaxY}, {x, b.MinY + arrowHead/2}}}})
		s.arrow(loadInk, xy{x, b.MinY}, xy{0, -1})
	}
}

// heightAt returns the height of a line of the page at x.
func heightAt(l []xy, x float64) float64 {
	for i := 0; i+1 < len(l); i++ {
		if a, b := l[i], l[i+1]; x <= b.X && b.X > a.X {
			return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
		}
	}
	return l[len(l)-1].Y
}

// sampleLineLoad draws a line load in the key.
func sampleLineLoad(s *sheet, b Box) {
	x := b.centre().X
	s.add(stroke{lineLoadPen, [][]xy{{{x, b.MaxY}, {x, b.MinY + arrowHead/2}}}})
	s.arrow(loadInk, xy{x, b.MinY}, xy{0, -1})
}

func (p *picture) labelLoads(s *sheet) {
	for i, l := range p.sec.Loads {
		if up, _ := p.loadLine(s, i); up != nil {
			x := (up[0].X + up[len(up)-1].X) / 2
			s.label(noteOf(bodyFace, loadInk, 130, surchargeWords(&l)), above, xy{x, heightAt(up, x)})
		}
	}
	for i, l := range p.sec.LineLoads {
		if tail, tip, ok := p.lineLoad(s, i); ok {
			high := tail
			if tip.Y > tail.Y {
				high = tip
			}
			s.label(noteOf(bodyFace, loadInk, 130, lineLoadWords(&l)), above, high)
		}
	}
}

func surchargeWords(l *lem.Surcharge) string {
	out := number(l.Pressure, 0)
	if l.Rise != 0 {
		out += " to " + number(l.Pressure+l.Rise, 0)
	}
	out += " kPa"
	if l.Shear != 0 {
		out += ", " + number(math.Abs(l.Shear), 0) + " kPa to the " + sideways(l.Shear)
	}
	if l.Variable {
		out += " (variable)"
	}
	return named(l.Name, out)
}

func lineLoadWords(l *lem.LineLoad) string {
	out := number(math.Abs(l.Vertical), 0) + " kN/m"
	if l.Vertical < 0 {
		out += " upwards"
	}
	switch across := number(math.Abs(l.Horizontal), 0) + " kN/m to the " + sideways(l.Horizontal); {
	case l.Horizontal == 0:
	case l.Vertical == 0:
		out = across
	default:
		out += ", " + across
	}
	return named(l.Name, out)
}

// sideways names the direction of a horizontal force.
func sideways(v float64) string {
	if v < 0 {
		return "left"
	}
	return "right"
}

// named puts a name before what it names.
func named(name, what string) string {
	if name == "" {
		return what
	}
	return name + " " + what
}
