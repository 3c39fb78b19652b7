package sheet

import (
	"fmt"
	"math"

	"standfast/cmd/internal/report"
)

// Kinds of limits, as the figures draw them.
const (
	limitFence    = "fence"    // At From; the works stay on the side of Inward.
	limitZone     = "zone"     // Along the ground from From to To.
	limitLevel    = "level"    // Works stay below Level from From to To.
	limitOverhead = "overhead" // The thing itself, at Level.
)

// limit is a limit of the works.
type limit struct {
	Kind   string  `json:"kind"`
	Words  string  `json:"words"` // Name, and what it forbids.
	From   float64 `json:"from"`
	To     float64 `json:"to"`
	Level  float64 `json:"level"`
	Inward int     `json:"inward"` // Of a fence: the sign of x towards the works.
	Dig    bool    `json:"dig"`    // Of a zone: nothing may be dug deeper than Free below the ground.
	Load   bool    `json:"load"`   // Of a zone: nothing may be placed.
	Free   float64 `json:"free"`
}

// force is a line load on the ground: its direction as a unit vector, positive to the right and downwards.
type force struct {
	Name string  `json:"name"`
	X    float64 `json:"x"`
	Dx   float64 `json:"dx"`
	Dy   float64 `json:"dy"`
}

// post is a row of elements that holds slips back.
type post struct {
	X      float64 `json:"x"`
	Top    float64 `json:"top"`
	Bottom float64 `json:"bottom"`
}

// site adds what limits the works, and what loads and holds the ground beside surcharges.
func (b *builder) site() {
	d, l := &b.m.Data, &b.f.Limits
	d.Limits = []limit{}
	add := func(v limit) { d.Limits = append(d.Limits, v) }
	if l.Left != nil {
		add(limit{Kind: limitFence, Words: l.Left.Name, From: l.Left.X, To: l.Left.X, Inward: 1})
	}
	if l.Right != nil {
		add(limit{Kind: limitFence, Words: l.Right.Name, From: l.Right.X, To: l.Right.X, Inward: -1})
	}
	for i := range l.KeepClear {
		k := &l.KeepClear[i]
		v := limit{Kind: limitZone, Words: k.Name + ": " + forbidden(k), From: k.FromX, To: k.ToX, Dig: k.NoDig, Load: k.NoLoad}
		if k.DigBelow != nil {
			v.Free = *k.DigBelow
		}
		add(v)
	}
	for _, m := range l.MaxLevels {
		add(limit{Kind: limitLevel, Words: m.Name + ": works no higher than " + report.SizeText(m.Level) + " m", From: m.FromX, To: m.ToX, Level: m.Level})
	}
	for _, o := range l.Overhead {
		words := fmt.Sprintf("%s: works stay %s m below", o.Name, report.SizeText(o.Clearance))
		add(limit{Kind: limitOverhead, Words: words, From: o.FromX, To: o.ToX, Level: o.Level})
		add(limit{Kind: limitLevel, From: o.FromX, To: o.ToX, Level: o.Level - o.Clearance})
	}
	d.Forces, d.Known = []force{}, []int{}
	for _, p := range b.f.Existing.Section.LineLoads {
		if size := math.Hypot(p.Vertical, p.Horizontal); size > 0 {
			d.Forces = append(d.Forces, force{Name: p.Name, X: p.X, Dx: round(p.Horizontal / size), Dy: round(p.Vertical / size)})
		}
	}
	for _, k := range b.f.Existing.Section.Known {
		d.Known = append(d.Known, b.line(k.Line))
	}
}

// forbidden says what a keep-clear zone forbids.
func forbidden(k *report.KeepClear) string {
	dig := "no dig"
	if k.DigBelow != nil {
		dig += " deeper than " + report.SizeText(*k.DigBelow) + " m"
	}
	switch {
	case k.NoDig && k.NoLoad:
		return dig + ", no load"
	case k.NoDig:
		return dig
	}
	return "no load"
}

// posts lists the rows of elements in a section.
func posts(s *report.Section) []post {
	out := []post{}
	for _, r := range s.Restraints {
		out = append(out, post{X: r.X, Top: r.Top, Bottom: r.Bottom})
	}
	return out
}

// loadWords names a surcharge with its pressure.
func loadWords(l *report.Surcharge) string {
	out := l.Name + " " + report.SizeText(l.Pressure)
	if l.PressureTo != nil && *l.PressureTo != l.Pressure {
		out += " to " + report.SizeText(*l.PressureTo)
	}
	return out + " kPa"
}

// seeLimits shows the limits beside the works.
func (b *builder) seeLimits(see func(x, y float64)) {
	before := points(b.m.Data.Lines[b.m.Data.Before])
	for _, l := range b.m.Data.Limits {
		for _, x := range []float64{l.From, l.To} {
			y := levelAt(before, x)
			if l.Kind == limitLevel || l.Kind == limitOverhead {
				y = l.Level
			}
			see(x, y)
		}
	}
}
