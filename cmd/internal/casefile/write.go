package casefile

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
	"standfast/remedies"
)

// ErrNotWritable is wrapped by the error of [Case.Proposed].
var ErrNotWritable = errors.New("casefile: the option cannot be written as a case file")

// lineWidth is where lines of a written file are folded.
const lineWidth = 120

// Proposed returns an option's section as a case file of its own, which [Parse] reads back to the same section, waters and situations.
// Remedies, trials and stages are left out: the works are there. A required ratio to the existing FS becomes the FS that it came to.
func (c *Case) Proposed(o *remedies.Option) ([]byte, error) {
	if o.Proposal == nil || len(o.Proposal.Waters) != len(c.Job.Situations) {
		return nil, fmt.Errorf("%w: %s has no section", ErrNotWritable, o.Name)
	}
	w := &writer{job: c.Job, option: o, section: &o.Proposal.Section}
	situations, err := w.situations()
	if err != nil {
		return nil, err
	}
	var m mapping
	m.put("title", textNode(clipTitle(c.Job.Title+": "+o.Title)))
	m.put("length", numberNode(c.Job.Length))
	m.put("ground_before", pointsNode(w.section.GroundBefore()))
	m.put("ground", pointsNode(w.section.Ground))
	m.put("slope", w.slope())
	m.put("ignore_slips_shallower_than", numberNode(c.Job.MinDepth))
	m.put("soils", w.soils())
	m.put("strata", w.strata())
	m.put("placed", w.placed())
	m.put("water", w.waters())
	if w.section.FirmBase != nil {
		m.put("firm_base", pointsNode(w.section.FirmBase))
	}
	if k := w.section.Crack; k != nil {
		m.put("tension_crack", crackNode(k))
	}
	m.put("surcharges", w.surcharges())
	m.put("line_loads", w.lineLoads())
	m.put("restraints", w.restraints())
	m.put("known_slips", w.knownSlips())
	m.put("situations", situations)
	m.put("limits", w.limits())
	m.put("side_force_function", sideForceNode(&c.Job.SideForce))
	m.put("slips", w.slips())
	root := m.block()
	root.HeadComment = c.header(o)
	return yaml.Dump(root, yaml.WithLineWidth(lineWidth))
}

// header returns the remark at the top of a written file.
func (c *Case) header(o *remedies.Option) string {
	plain := func(s string) string {
		return strings.Map(func(r rune) rune {
			if breaksLine(r) {
				return '?'
			}
			return r
		}, s)
	}
	return strings.Join([]string{
		"Proposed section, written by standfast. Option: " + plain(o.Title) + ".",
		"From the case " + plain(c.File) + ", SHA-256 " + c.SHA256 + ".",
		"`standfast assess` re-reads it. Units: m, kN/m3, kPa, degrees.",
		"",
		"A preliminary sizing aid for use by a competent engineer, and only as good as its ground and water model: it must be verified",
		"independently before anything is built. Temporary works, drains' upkeep and monitoring need their own design.",
	}, "\n")
}

// clipTitle shortens a title to what a case file may hold.
func clipTitle(s string) string {
	r := []rune(s)
	return string(r[:min(len(r), maxName)])
}

// writer makes the parts of a proposed section's file.
type writer struct {
	job     *remedies.Job
	option  *remedies.Option
	section *lem.Section
}

func (w *writer) slope() *yaml.Node {
	var m mapping
	m.put("crest", numbersNode(w.job.Crest.X, w.job.Crest.Y))
	m.put("toe", numbersNode(w.job.Toe.X, w.job.Toe.Y))
	return m.inline()
}

func (w *writer) soils() *yaml.Node {
	var m mapping
	for i, s := range w.section.Soils {
		m.put(s.Name, soilNode(s, i < len(w.job.Clay) && w.job.Clay[i]))
	}
	return m.block()
}

func soilNode(s lem.Soil, clay bool) *yaml.Node {
	var m mapping
	m.put("unit_weight", numberNode(s.UnitWeight))
	if s.SaturatedUnitWeight != 0 {
		m.put("saturated_unit_weight", numberNode(s.SaturatedUnitWeight))
	}
	if s.PowerLaw != nil {
		var p mapping
		p.put("a", numberNode(s.PowerLaw.A))
		p.put("b", numberNode(s.PowerLaw.B))
		m.put("power_law", p.inline())
	}
	if s.Cohesion != 0 || s.Friction != 0 {
		var d mapping
		d.put("cohesion", numberNode(s.Cohesion))
		d.put("friction", numberNode(round9(s.Friction*180/math.Pi)))
		m.put("drained", d.inline())
	}
	if s.Undrained != nil {
		m.put("undrained", undrainedNode(s.Undrained))
	}
	if s.HasRu {
		m.put("ru", numberNode(s.Ru))
	}
	if s.FreeDraining {
		m.put("free_draining", trueNode())
	}
	if clay == s.FreeDraining { // not what holds without the key
		m.put("clay", &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!bool", Value: fmt.Sprint(clay)})
	}
	return m.block()
}

func undrainedNode(u *lem.UndrainedStrength) *yaml.Node {
	var m mapping
	if len(u.Points) > 0 {
		m.put("points", rowNode(nodesOf(u.Points, func(p *lem.StrengthPoint) *yaml.Node { return numbersNode(p.X, p.Y, p.Strength) })...))
		return m.inline()
	}
	if u.Ratio != 0 {
		m.put("ratio", numberNode(u.Ratio))
		m.put("minimum", numberNode(u.Minimum))
		if len(u.WaterBefore) > 0 {
			m.put("water_before", pointsNode(u.WaterBefore))
		} else {
			m.put("water_before", textNode(wordNone))
		}
		return m.inline()
	}
	m.put("strength", numberNode(u.Strength))
	if u.Gradient != 0 {
		m.put("gradient", numberNode(u.Gradient))
		m.put("below", pointsNode(u.Datum))
	}
	return m.inline()
}

func (w *writer) strata() *yaml.Node {
	first := &w.section.Strata[0]
	return listNode(mappingsOf(w.section.Strata, func(m *mapping, s *lem.Stratum) {
		m.put("soil", textNode(w.section.Soils[s.Soil].Name))
		if s == first {
			m.put("top", textNode(wordGround))
		} else {
			m.put("top", pointsNode(s.Top))
		}
	})...)
}

func (w *writer) placed() *yaml.Node {
	return listNode(mappingsOf(w.section.Placed, func(m *mapping, p *lem.Body) {
		m.put("soil", textNode(w.section.Soils[p.Soil].Name))
		m.put("outline", pointsNode(p.Outline))
	})...)
}

func (w *writer) surcharges() *yaml.Node {
	return listNode(mappingsOf(w.section.Loads, func(m *mapping, s *lem.Surcharge) {
		m.put("name", textNode(s.Name))
		m.put("from", numberNode(s.FromX))
		m.put("to", numberNode(s.ToX))
		m.put("pressure", numberNode(s.Pressure))
		if s.Rise != 0 {
			m.put("pressure_to", numberNode(s.Pressure+s.Rise))
		}
		if s.Shear != 0 {
			m.put("horizontal", numberNode(s.Shear))
		}
		if s.Variable {
			m.put("variable", trueNode())
		}
	})...)
}

func (w *writer) lineLoads() *yaml.Node {
	return listNode(mappingsOf(w.section.LineLoads, func(m *mapping, l *lem.LineLoad) {
		m.put("name", textNode(l.Name))
		m.put("x", numberNode(l.X))
		m.put("vertical", numberNode(l.Vertical))
		m.put("horizontal", numberNode(l.Horizontal))
	})...)
}

func crackNode(k *lem.TensionCrack) *yaml.Node {
	var m mapping
	if len(k.Line) > 0 {
		m.put("line", pointsNode(k.Line))
	} else {
		m.put("depth", numberNode(k.Depth))
	}
	if k.HasWaterLevel {
		m.put("water_level", numberNode(k.WaterLevel))
	} else {
		m.put("filled", numberNode(k.WaterShare))
	}
	return m.inline()
}
