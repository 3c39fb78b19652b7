package remedies

import (
	"math"
	"slices"

	"standfast/lem"
)

// limitSlack is how far a design may pass a limit before it is a violation, m: rounding, not building tolerance.
const limitSlack = 1e-6

// highest returns the greatest height of a above b between x = from and x = to, and where; -Inf if the interval is empty.
func highest(a, b lem.Profile, from, to float64) (height, x float64) {
	height = math.Inf(-1)
	if from >= to {
		return height, from
	}
	for _, p := range pieces(a, b, from, to) {
		if d := p.a0 - p.b0; d > height {
			height, x = d, p.x0
		}
		if d := p.a1 - p.b1; d > height {
			height, x = d, p.x1
		}
	}
	return height, x
}

// checkFences checks that works done on some stretches stay between the side limits; left and right name their ends.
func (p *Proposal) checkFences(j *Job, done []run, left, right string) {
	if len(done) == 0 {
		return
	}
	from, to := math.Inf(1), math.Inf(-1)
	for _, r := range done {
		from, to = math.Min(from, r.from), math.Max(to, r.to)
	}
	p.checkSpan(j, from, to, left, right)
}

// checkSpan checks that works from x = from to x = to stay between the side limits.
func (p *Proposal) checkSpan(j *Job, from, to float64, left, right string) {
	if f := j.Limits.Left; f != nil && f.X-from > limitSlack {
		p.violate(named(f.Name, "left limit"), f.X-from, "%s at x = %s m, limit %s at x = %s m", left, metres(from), named(f.Name, "left limit"), metres(f.X))
	}
	if f := j.Limits.Right; f != nil && to-f.X > limitSlack {
		p.violate(named(f.Name, "right limit"), to-f.X, "%s at x = %s m, limit %s at x = %s m", right, metres(to), named(f.Name, "right limit"), metres(f.X))
	}
}

// checkDig checks the no-dig zones against a dig down to a level line between x = from and x = to. Depth counts from the ground
// before works.
func (p *Proposal) checkDig(j *Job, down lem.Profile, from, to float64, noun string) {
	for _, k := range j.Limits.KeepClear {
		if !k.NoDig {
			continue
		}
		allowed, rule := 0.0, "where no dig is allowed"
		if k.DigBelow != nil {
			allowed, rule = *k.DigBelow, "where "+metres(*k.DigBelow)+" m is the deepest dig allowed"
		}
		depth, x := highest(j.Section.Ground, down, math.Max(from, k.FromX), math.Min(to, k.ToX))
		if depth-allowed > limitSlack {
			p.violate(named(k.Name, "keep-clear zone"), depth-allowed, "%s digs %s m below ground at x = %s m, inside %s (x = %s to %s m), %s",
				noun, metres(depth), metres(x), named(k.Name, "keep-clear zone"), metres(k.FromX), metres(k.ToX), rule)
		}
	}
}

// checkLoad checks the no-load zones and the maximum levels against fill up to a level line between x = from and x = to. Load
// counts above the ground before works: filling what was cut is none.
func (p *Proposal) checkLoad(j *Job, up lem.Profile, from, to float64, noun string) {
	for _, k := range j.Limits.KeepClear {
		if !k.NoLoad {
			continue
		}
		h, x := highest(up, j.Section.Ground, math.Max(from, k.FromX), math.Min(to, k.ToX))
		if h > limitSlack {
			p.violate(named(k.Name, "keep-clear zone"), h, "%s puts %s m of fill at x = %s m, inside %s (x = %s to %s m), where no load is allowed",
				noun, metres(h), metres(x), named(k.Name, "keep-clear zone"), metres(k.FromX), metres(k.ToX))
		}
	}
	for _, m := range j.Limits.MaxLevels {
		if h, x := above(up, m.Level, math.Max(from, m.FromX), math.Min(to, m.ToX)); h > limitSlack {
			p.violate(named(m.Name, "maximum level"), h, "%s rises to level %s m at x = %s m, limit %s is %s m",
				noun, metres(m.Level+h), metres(x), named(m.Name, "maximum level"), metres(m.Level))
		}
	}
	for _, o := range j.Limits.Overhead {
		if h, x := above(up, o.Level-o.Clearance, math.Max(from, o.FromX), math.Min(to, o.ToX)); h > limitSlack {
			name := named(o.Name, "overhead line")
			p.violate(name, h, "%s rises %s m into the clearance of %s at x = %s m: %s m below level %s m", noun, metres(h), name, metres(x), metres(o.Clearance), metres(o.Level))
		}
	}
}

// above returns the greatest height of a line above a level between x = from and x = to, and where; -Inf if the interval is empty.
func above(line lem.Profile, level, from, to float64) (height, x float64) {
	return highest(line, lem.Profile{{X: from, Y: level}, {X: to, Y: level}}, from, to)
}

// Names of the limits that have none of the user's own.
const (
	limitBatter    = "steepest permanent batter"
	limitTemporary = "steepest temporary batter"
	limitBench     = "minimum bench width"
	limitHaul      = "minimum haul width"
)

// checkForm checks the batters and widths of a shape. Rockfill faces are not mown.
func (p *Proposal) checkForm(j *Job, sh *shape, rockfill bool, noun string) {
	l := &j.Limits
	for _, f := range sh.faces {
		least, name := l.Batters.Permanent, limitBatter
		if f.temporary {
			least, name = l.Batters.Temporary, limitTemporary
		} else if rockfill {
			continue
		}
		if least-f.batter > limitSlack {
			p.violate(name, least-f.batter, "face of %s at %s is steeper than the %s, %s", noun, batterText(f.batter), name, batterText(least))
		}
	}
	for _, v := range sh.levels {
		least, name := l.MinBench, limitBench
		if v.haul {
			least, name = l.MinHaul, limitHaul
		}
		if least-v.width > limitSlack {
			p.violate(name, least-v.width, "%s is %s m wide, %s is %s m", v.what, metres(v.width), name, metres(least))
		}
	}
}

// named returns a name, or a word for it if there is none.
func named(name, otherwise string) string {
	if name == "" {
		return otherwise
	}
	return name
}

// limitImport names the limit on imported fill.
const limitImport = "maximum import"

// checkImport checks the limit on imported fill against the works so far. Its violation is in m3 for the whole length.
func (p *Proposal) checkImport(j *Job) {
	if j.Limits.MaxImport == nil {
		return
	}
	p.Violations = slices.DeleteFunc(p.Violations, func(v Violation) bool { return v.Limit == limitImport })
	b := BalanceOf(j, &p.Quantities)
	brought := (sum(b.Import) + p.Quantities.Stone) * j.Length
	if over := brought - *j.Limits.MaxImport; over > limitSlack {
		p.violate(limitImport, over, "%.0f m3 of fill have to be brought, the %s is %g m3", math.Ceil(brought-limitSlack), limitImport, *j.Limits.MaxImport)
	}
}
