package casefile

import (
	"fmt"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
	"standfast/remedies"
)

// lineName returns what the water line of a situation after works is called: as the situation.
func (w *writer) lineName(i int) string {
	switch name := w.job.Situations[i].Name; {
	case !wet(&w.option.Proposal.Waters[i]):
		return wordNone
	case name == wordNone:
		return wordNone + " (water line)"
	default:
		return name
	}
}

// waters returns the water lines after works, one for each situation.
func (w *writer) waters() *yaml.Node {
	var m mapping
	for i, s := range w.job.Situations {
		var before remedies.WaterLine
		if s.Water >= 0 {
			before = w.job.Waters[s.Water]
		}
		if after := &w.option.Proposal.Waters[i]; wet(after) {
			m.put(w.lineName(i), w.water(after, &before))
		}
	}
	return m.block()
}

// wet reports whether there is any pore water but that under free water.
func wet(w *lem.Water) bool { return w.Line != nil || len(w.BySoil) > 0 || len(w.Points) > 0 }

// water returns a state of the water after works, which is artesian where that before works is.
func (w *writer) water(after *lem.Water, before *remedies.WaterLine) *yaml.Node {
	if len(after.BySoil) == 0 && len(after.Points) == 0 && !after.InclinedLine {
		return waterLineNode(after.Line, before.Artesian)
	}
	var m mapping
	if after.Line != nil {
		m.put("line", pointsNode(after.Line))
		if before.Artesian {
			m.put("artesian", trueNode())
		}
	}
	if len(after.BySoil) > 0 {
		var own mapping
		for i, l := range after.BySoil {
			own.put(w.section.Soils[l.Soil].Name, waterLineNode(l.Line, before.BySoil[i].Artesian))
		}
		m.put("by_soil", own.block())
	}
	if len(after.Points) > 0 {
		m.put("points", rowNode(nodesOf(after.Points, func(p *lem.PressurePoint) *yaml.Node { return numbersNode(p.X, p.Y, p.Pressure) })...))
	}
	if after.InclinedLine {
		m.put("inclined", trueNode())
	}
	return m.block()
}

func waterLineNode(line lem.Profile, artesian bool) *yaml.Node {
	if !artesian {
		return pointsNode(line)
	}
	var m mapping
	m.put("line", pointsNode(line))
	m.put("artesian", trueNode())
	return m.inline()
}

func (w *writer) situations() (*yaml.Node, error) {
	list := listNode()
	for i := range w.job.Situations {
		s := &w.job.Situations[i]
		fs := w.requiredFS(i)
		if fs == 0 {
			return nil, fmt.Errorf("%w: the required FS of the situation %q is not known yet", ErrNotWritable, s.Name)
		}
		var m mapping
		m.put("name", textNode(s.Name))
		m.put("water", textNode(w.lineName(i)))
		m.put("required_fs", numberNode(fs))
		if s.Undrained != nil {
			m.put("strength", w.strength(s.Undrained))
		}
		if s.Kh != 0 {
			m.put("kh", numberNode(s.Kh))
		}
		if s.Kv != 0 {
			m.put("kv", numberNode(s.Kv))
		}
		water := &w.option.Proposal.Waters[i]
		if len(water.Free) > 0 {
			m.put("free_water", freeWaterNode(water.Free))
		}
		if water.Drains != nil {
			m.put("drains", drainsNode(water.Drains))
		}
		list.Content = append(list.Content, m.block())
	}
	return list, nil
}

// requiredFS returns the FS required in a situation, as resolved when the option or the slope as it is was checked; 0 if a ratio is not resolved.
func (w *writer) requiredFS(i int) float64 {
	for _, o := range w.option.Situations {
		if o.Check.SituationI == i && o.Check.Note == "" && o.Check.Required > 0 {
			return o.Check.Required
		}
	}
	return w.job.Situations[i].RequiredFS
}

func (w *writer) strength(undrained []bool) *yaml.Node {
	var m mapping
	for i, u := range undrained {
		if u {
			m.put(w.section.Soils[i].Name, textNode(wordUndrained))
		}
	}
	if len(m.node.Content) == 0 {
		return textNode(wordDrained)
	}
	return m.inline()
}

func freeWaterNode(free []lem.FreeWater) *yaml.Node {
	return rowNode(mappingsOf(free, func(m *mapping, f *lem.FreeWater) {
		m.put("level", numberNode(f.Level))
		m.put("from", numberNode(f.FromX))
		m.put("to", numberNode(f.ToX))
	})...)
}

func drainsNode(d *lem.Drawdown) *yaml.Node {
	var m mapping
	m.put("invert", pointsNode(d.Invert))
	m.put("ratio", numbersNode(d.Ratio...))
	m.put("fade", numberNode(d.Fade))
	return m.inline()
}

func (w *writer) limits() *yaml.Node {
	l := &w.job.Limits
	var m, between mapping
	if l.Left != nil {
		between.put("left", fenceNode(l.Left))
	}
	if l.Right != nil {
		between.put("right", fenceNode(l.Right))
	}
	m.put("works_between", between.inline())
	m.put("keep_clear", listNode(mappingsOf(l.KeepClear, keepClear)...))
	m.put("maximum_levels", listNode(mappingsOf(l.MaxLevels, func(z *mapping, t *remedies.MaxLevel) {
		z.put("name", textNode(t.Name))
		z.put("from", numberNode(t.FromX))
		z.put("to", numberNode(t.ToX))
		z.put("level", numberNode(t.Level))
	})...))
	if l.Outfall != nil {
		m.put("drain_outfall", numberNode(*l.Outfall))
	}
	formLimitNodes(&m, l)
	return m.block()
}

// formLimitNodes writes the limits on faces, widths and import.
func formLimitNodes(m *mapping, l *remedies.Limits) {
	m.put("overhead", listNode(mappingsOf(l.Overhead, func(z *mapping, o *remedies.Overhead) {
		z.put("name", textNode(o.Name))
		z.put("from", numberNode(o.FromX))
		z.put("to", numberNode(o.ToX))
		z.put("level", numberNode(o.Level))
		z.put("clearance", numberNode(o.Clearance))
	})...))
	var batters mapping
	batters.putAbove0("permanent", l.Batters.Permanent)
	batters.putAbove0("temporary", l.Batters.Temporary)
	m.put("steepest_batters", batters.inline())
	m.putAbove0("minimum_bench_width", l.MinBench)
	m.putAbove0("minimum_haul_width", l.MinHaul)
	if l.MaxImport != nil {
		m.put("maximum_import", numberNode(*l.MaxImport))
	}
}

// putAbove0 writes a number that stands for something only above 0.
func (m *mapping) putAbove0(key string, x float64) {
	if x > 0 {
		m.put(key, numberNode(x))
	}
}

func fenceNode(f *remedies.Fence) *yaml.Node {
	var m mapping
	m.put("x", numberNode(f.X))
	m.put("name", textNode(f.Name))
	return m.inline()
}

func keepClear(m *mapping, z *remedies.KeepClear) {
	m.put("name", textNode(z.Name))
	m.put("from", numberNode(z.FromX))
	m.put("to", numberNode(z.ToX))
	forbid := rowNode()
	if z.NoDig {
		forbid.Content = append(forbid.Content, textNode("dig"))
	}
	if z.NoLoad {
		forbid.Content = append(forbid.Content, textNode("load"))
	}
	m.put("forbid", forbid)
	if z.DigBelow != nil {
		m.put("dig_allowed_to_depth", numberNode(*z.DigBelow))
	}
}

func (w *writer) slips() *yaml.Node {
	var m mapping
	if w.job.Head != (lem.Range{}) {
		m.put("head", numbersNode(w.job.Head.From, w.job.Head.To))
	}
	if w.job.Exit != (lem.Range{}) {
		m.put("toe", numbersNode(w.job.Exit.From, w.job.Exit.To))
	}
	switch w.job.Direction {
	case lem.LeftwardOnly:
		m.put("direction", textNode("leftward"))
	case lem.RightwardOnly:
		m.put("direction", textNode("rightward"))
	case lem.EitherWay:
		m.put("direction", textNode("either"))
	}
	return m.inline()
}
