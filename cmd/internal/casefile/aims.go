package casefile

import (
	"math"
	"slices"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
	"standfast/remedies"
)

// readObjective fills what a sizing makes least. An objective that has no rates at all to go by is a fault.
func (b *builder) readObjective(v value) {
	name, ok := b.text(v)
	if !ok {
		return
	}
	b.job.Objective, _ = remedies.ParseObjective(name)
	e := &b.job.Economics
	switch {
	case b.job.Objective == remedies.LeastCost && e.Cost.Blank():
		b.addFault(v, "write `rates` under `economics`", "needs rates, and all of them are blank")
	case b.job.Objective == remedies.LeastCarbon && e.Carbon.Blank():
		b.addFault(v, "write `carbon` under `economics`", "needs carbon factors, and all of them are blank")
	}
}

// readSensitivity fills how far inputs may be off.
func (b *builder) readSensitivity(v value) {
	s := &b.job.Swings
	for key, to := range map[string]*float64{"cohesion": &s.Cohesion, "undrained": &s.Undrained, "unit_weight": &s.UnitWeight, "drains": &s.DrainsEffect} {
		if share := b.get(v, key); b.usable(share) {
			*to, _ = parseShare(share.node)
		}
	}
	degrees, _ := b.number(b.get(v, "friction"))
	s.Friction = degrees * math.Pi / 180
	s.Water, _ = b.number(b.get(v, "water"))
}

// readCombinations fills the remedies that are sized together, each of which must be asked for.
func (b *builder) readCombinations(v value) {
	var asked []string
	for _, q := range b.job.Requests {
		asked = append(asked, q.Kind)
	}
	for _, item := range b.items(v) {
		var names []string
		for _, n := range b.items(item) {
			name, ok := b.text(n)
			_, known := remedies.Find(name)
			switch {
			case !ok:
			case slices.Contains(names, name):
				b.addFault(n, "name each remedy once", "`%s` stands twice in the combination", clip(name))
			case slices.Contains(asked, name):
				names = append(names, name)
			case known:
				b.addFault(n, "write it under `remedies`", "the case does not ask for `%s`", clip(name))
			default:
				b.addFault(n, didYouMean(name, asked), "there is no remedy named `%s`", clip(name))
			}
		}
		if names != nil {
			b.job.Combinations = append(b.job.Combinations, names)
		}
	}
}

// tryCombinations makes the remedies of every combination together once.
func (b *builder) tryCombinations(v value) {
	items := b.items(v)
	for i, names := range b.job.Combinations {
		var group []remedies.Request
		for _, q := range b.job.Requests {
			if slices.Contains(names, q.Kind) {
				group = append(group, q)
			}
		}
		b.tryRemedies(group, items[i])
	}
}

// readKnownSlips fills the slip surfaces that exist already.
func (b *builder) readKnownSlips(v value) {
	for _, item := range b.items(v) {
		var k lem.KnownSlip
		k.Line, _ = b.slipLine(b.get(item, "line"))
		k.Cohesion, _ = b.number(b.get(item, "cohesion"))
		degrees, _ := b.number(b.get(item, "friction"))
		k.Friction = degrees * math.Pi / 180
		b.job.Section.Known = append(b.job.Section.Known, k)
	}
}

// knownSlips returns the known slip surfaces that the works have not dug away.
func (w *writer) knownSlips() *yaml.Node {
	left := slices.DeleteFunc(slices.Clone(w.section.Known), func(k lem.KnownSlip) bool { return !passesBelow(k.Line, w.section.Ground) })
	return listNode(mappingsOf(left, func(m *mapping, k *lem.KnownSlip) {
		m.put("line", pointsNode(k.Line))
		m.put("cohesion", numberNode(k.Cohesion))
		m.put("friction", numberNode(round9(k.Friction*180/math.Pi)))
	})...)
}

// passesBelow reports whether a line lies below the ground somewhere between its ends.
func passesBelow(line, ground lem.Profile) bool {
	for _, p := range line {
		if p.X >= ground.Left() && p.X <= ground.Right() && p.Y < ground.At(p.X) {
			return true
		}
	}
	for _, p := range ground {
		if p.X >= line.Left() && p.X <= line.Right() && line.At(p.X) < p.Y {
			return true
		}
	}
	return false
}
