package casefile

import (
	"go.yaml.in/yaml/v4"

	"standfast/lem"
)

// restraintShape returns the keys of one row of structural elements.
func restraintShape() *shape {
	return object(
		field{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "sheet piles"},
		field{key: "x", shape: levelNumber(), required: true, meaning: "Where the row stands.", example: "40"},
		field{key: "top", shape: levelNumber(), required: true, meaning: "Level of its top.", example: "104"},
		field{key: "bottom", shape: levelNumber(), required: true, meaning: "Level of its bottom; slips that pass below are not held.", example: "95"},
		field{key: "force", shape: number("kN/m", above(0)), required: true, meaning: "Horizontal force against the movement for a metre run, as the design of the row gives it; it lessens what drives, whatever FS is.", example: "48"},
	)
}

// readRestraints fills the rows of structural elements that stand in the slope.
func (b *builder) readRestraints(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		var r lem.Restraint
		r.Name, _ = b.text(b.get(item, "name"))
		var okTop, okBottom bool
		x, bottom := b.get(item, "x"), b.get(item, "bottom")
		r.X, _ = b.number(x)
		r.Top, okTop = b.number(b.get(item, "top"))
		r.Bottom, okBottom = b.number(bottom)
		r.Force, _ = b.number(b.get(item, "force"))
		if okTop && okBottom && r.Bottom >= r.Top {
			b.addFault(bottom, "y grows upwards: write the lower level as `bottom`", "the bottom %s is not below the top %s", figure(r.Bottom), figure(r.Top))
		}
		if g := b.job.Section.Ground; b.usable(x) && g != nil && (r.X < g.Left() || r.X > g.Right()) {
			b.addFault(x, "", "the row lies beyond the ground, which runs from x = %s to %s", figure(g.Left()), figure(g.Right()))
		}
		b.job.Section.Restraints = append(b.job.Section.Restraints, r)
	}
}

func (w *writer) restraints() *yaml.Node {
	return listNode(mappingsOf(w.section.Restraints, func(m *mapping, r *lem.Restraint) {
		m.put("name", textNode(r.Name))
		m.put("x", numberNode(r.X))
		m.put("top", numberNode(r.Top))
		m.put("bottom", numberNode(r.Bottom))
		m.put("force", numberNode(r.Force))
	})...)
}
