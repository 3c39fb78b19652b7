package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
)

// Panels are lengths along the slope in which a hole is dug at a time, with ground left between them.
type Panels struct {
	Open    float64 // Length of one open panel, m.
	Spacing float64 // Of panels that are open at one time, centre to centre, m.
}

// Share returns the share of the length that is open.
func (p Panels) Share() float64 { return math.Min(1, p.Open/p.Spacing) }

// PanelFS returns the factor of safety of one slip over open and intact lengths: resistance over driving, summed over both, with no shear
// on the ends of the panels: (open Ro + intact Ri)/(open Do + intact Di). Resistances and drivings are per metre run.
func (p Panels) PanelFS(openResistance, openDriving, intactResistance, intactDriving float64) float64 {
	o := p.Share()
	return (o*openResistance + (1-o)*intactResistance) / (o*openDriving + (1-o)*intactDriving)
}

// String describes the panels.
func (p Panels) String() string {
	return fmt.Sprintf("%s m open in every %s m", metres(p.Open), metres(p.Spacing))
}

// HoleText says what the FS of an open hole in plane strain means; "" where it says nothing.
func HoleText(fs float64) string {
	switch {
	case math.IsNaN(fs):
		return ""
	case fs < 1:
		return fmt.Sprintf("in plane strain the open hole has FS %s: it does not stand without support", floorFS(fs))
	}
	return fmt.Sprintf("in plane strain the open hole has FS %s", floorFS(fs))
}

// noFade is a fade so long that the head lowered at the invert is lowered by as much everywhere below it, m.
const noFade = 1e6

// averaged returns the section and water that are the mean of an intact section and of the same with its ground lowered to open, over the
// lengths of panels. Resistance and driving of the methods of slices are linear in weight, cohesion and pore pressure of each slice, and
// base and inclination of a slip are the same in open and intact lengths; so one slip has on the mean section the resistance and the
// driving of [Panels.PanelFS]: above the hole's floor there is soil in the intact share of the length only - its weight and strength count
// by that share - and under it the head is the mean of both.
func averaged(s *lem.Section, open lem.Profile, w lem.Water, artesian bool, p Panels) (lem.Section, lem.Water) {
	intact := 1 - p.Share()
	mean := *s
	mean.Soils = append([]lem.Soil(nil), s.Soils...)
	mean.Placed = append([]lem.Body(nil), s.Placed...)
	thinned := map[int]int{} // Soil to its copy.
	runs := runsAbove(s.Ground, open)
	for _, r := range runs {
		slabLayers(s, s.Ground, open, r.from, r.to, func(soil int, outline []lem.Point) {
			k, ok := thinned[soil]
			if !ok {
				k = len(mean.Soils)
				thinned[soil] = k
				mean.Soils = append(mean.Soils, thin(s.Soils[soil], intact))
				for _, l := range w.BySoil {
					if l.Soil == soil {
						w.BySoil = append(w.BySoil[:len(w.BySoil):len(w.BySoil)], lem.SoilWater{Soil: k, Line: l.Line})
					}
				}
			}
			mean.Placed = append(mean.Placed, lem.Body{Soil: k, Outline: outline})
		})
	}
	mean.Known = thinKnown(s.Known, open, runs, intact)
	if len(runs) == 1 && w.Line != nil && w.Drains == nil && !artesian && intact < 1 {
		w.Drains = &lem.Drawdown{Invert: clipped(open, runs[0].from, runs[0].to), Fade: noFade}
		for range w.Drains.Invert {
			w.Drains.Ratio = append(w.Drains.Ratio, p.Share())
		}
	}
	return mean, w
}

// thin returns a soil of which there is only a share of the length.
func thin(s lem.Soil, share float64) lem.Soil {
	s.Name += " in panels"
	s.UnitWeight *= share
	s.SaturatedUnitWeight *= share
	s.Cohesion *= share
	if s.PowerLaw != nil { // share A (sigma)^B = A' (share sigma)^B
		s.PowerLaw = &lem.PowerLaw{A: s.PowerLaw.A * math.Pow(share, 1-s.PowerLaw.B), B: s.PowerLaw.B}
	}
	if s.Undrained != nil {
		u := *s.Undrained
		u.Strength *= share
		u.Gradient *= share
		u.Ratio *= share
		u.Minimum *= share
		u.Points = append([]lem.StrengthPoint(nil), u.Points...)
		for i := range u.Points {
			u.Points[i].Strength *= share
		}
		s.Undrained = &u
	}
	return s
}

// thinKnown reduces the cohesion of known slip surfaces that pass through a hole; along their whole length, which is on the safe side.
func thinKnown(known []lem.KnownSlip, open lem.Profile, runs []run, share float64) []lem.KnownSlip {
	out := append([]lem.KnownSlip(nil), known...)
	for i := range out {
		for _, r := range runs {
			from, to := math.Max(r.from, out[i].Line.Left()), math.Min(r.to, out[i].Line.Right())
			if h, _ := highest(out[i].Line, open, from, to); h > 0 {
				out[i].Cohesion *= share
				break
			}
		}
	}
	return out
}
