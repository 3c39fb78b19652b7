package casefile

import "standfast/remedies"

// readLimits fills the limits of the works.
func (b *builder) readLimits(v value) {
	l := &b.job.Limits
	between := b.get(v, "works_between")
	left, right := b.get(between, "left"), b.get(between, "right")
	l.Left, l.Right = b.fence(left, "left limit"), b.fence(right, "right limit")
	if l.Left != nil && l.Right != nil && l.Left.X >= l.Right.X {
		b.addFault(right, "x grows to the right: write the smaller x as `left`", "the right limit x = %s is not right of the left limit x = %s", figure(l.Right.X), figure(l.Left.X))
	}
	if level, ok := b.number(b.get(v, "drain_outfall")); ok {
		l.Outfall = &level
	}
	b.readFormLimits(v)
	b.readKeepClear(b.get(v, "keep_clear"))
	b.readMaximumLevels(b.get(v, "maximum_levels"))
}

// fence returns a side limit: x alone or x with a name; nil if there is none.
func (b *builder) fence(v value, name string) *remedies.Fence {
	if !b.usable(v) {
		return nil
	}
	x, ok := b.number(v)
	if !ok {
		if x, ok = b.number(b.get(v, "x")); !ok {
			return nil
		}
		if given, ok := b.text(b.get(v, "name")); ok {
			name = given
		}
	}
	return &remedies.Fence{Name: name, X: x}
}

func (b *builder) readKeepClear(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		var z remedies.KeepClear
		z.Name, _ = b.text(b.get(item, "name"))
		z.FromX, z.ToX, _ = b.fromTo(item)
		for _, f := range b.items(b.get(item, "forbid")) {
			word, _ := b.text(f)
			z.NoDig = z.NoDig || word == "dig"
			z.NoLoad = z.NoLoad || word == "load"
		}
		depth := b.get(item, "dig_allowed_to_depth")
		if d, ok := b.number(depth); ok {
			z.DigBelow = &d
			if !z.NoDig && b.usable(b.get(item, "forbid")) {
				b.addFault(depth, "write `forbid: [dig]` with it", "means nothing where digging is not forbidden")
			}
		}
		b.job.Limits.KeepClear = append(b.job.Limits.KeepClear, z)
	}
}

func (b *builder) readMaximumLevels(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		var m remedies.MaxLevel
		m.Name, _ = b.text(b.get(item, "name"))
		m.FromX, m.ToX, _ = b.fromTo(item)
		m.Level, _ = b.number(b.get(item, "level"))
		b.job.Limits.MaxLevels = append(b.job.Limits.MaxLevels, m)
	}
}
