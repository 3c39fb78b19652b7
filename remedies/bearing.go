package remedies

import (
	"fmt"
	"math"
	"slices"

	"standfast/lem"
)

// HandCheck is a check by a closed form, told beside those of slips. Nothing is sized by it.
type HandCheck struct {
	Name     string
	FS       float64 // By the closed form.
	Required float64 // What it is held against; 0: nothing.
	Working  string  // The numbers that went in.
	Source   string
}

// Bearing is the name of the check of the ground under a fill.
const Bearing = "bearing under the fill"

// bearingFactor is the bearing capacity factor of a strip on clay of uniform undrained strength, 2 + pi (Prandtl 1921).
const bearingFactor = 2 + math.Pi

// BearingFS returns the factor of safety of undrained clay under a wide fill, 5.14 cu over the pressure of the fill, kPa.
func BearingFS(cu, pressure float64) float64 { return bearingFactor * cu / pressure }

// checkBearing brings the hand check of the ground under the fill up to date: the lowest undrained strength given for a clay that the fill
// loads, against the heaviest fill at its greatest height with plant on it.
func (p *Proposal) checkBearing(j *Job) {
	p.HandChecks = slices.DeleteFunc(p.HandChecks, func(h HandCheck) bool { return h.Name == Bearing })
	cu, name := math.Inf(1), ""
	for i, s := range j.Section.Soils {
		if j.Clay[i] && s.Undrained != nil && p.loaded[i] > loadedArea {
			if c := leastStrength(s.Undrained); c < cu {
				cu, name = c, s.Name
			}
		}
	}
	height, _ := highest(p.Section.Ground, j.Section.Ground, j.Section.Ground.Left(), j.Section.Ground.Right())
	if name == "" || height <= limitSlack {
		return
	}
	var weight float64
	for i, f := range p.Quantities.Fill {
		if f > 0 {
			weight = math.Max(weight, j.Section.Soils[i].UnitWeight)
		}
	}
	pressure := weight*height + j.Stage.Plant
	h := HandCheck{
		Name: Bearing, FS: BearingFS(cu, pressure), Required: j.Stage.RequiredFS,
		Working: fmt.Sprintf("5.14 x %g kPa (lowest cu given for %s) over %.1f kPa (%s m of fill of %g kN/m3, plant %g kPa)", cu, name, pressure, metres(height), weight, j.Stage.Plant),
		Source:  "Prandtl (1921), wide strip on clay of uniform strength",
	}
	p.HandChecks = append(p.HandChecks, h)
}

// leastStrength returns the lowest undrained strength that a soil is given, kPa.
func leastStrength(u *lem.UndrainedStrength) float64 {
	if len(u.Points) > 0 {
		low := math.Inf(1)
		for _, q := range u.Points {
			low = math.Min(low, q.Strength)
		}
		return low
	}
	if u.Ratio != 0 {
		return u.Minimum
	}
	return u.Strength
}
