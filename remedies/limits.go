package remedies

import (
	"math"

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
		limit := lem.Profile{{X: m.FromX, Y: m.Level}, {X: m.ToX, Y: m.Level}}
		h, x := highest(up, limit, math.Max(from, m.FromX), math.Min(to, m.ToX))
		if h > limitSlack {
			p.violate(named(m.Name, "maximum level"), h, "%s rises to level %s m at x = %s m, limit %s is %s m",
				noun, metres(m.Level+h), metres(x), named(m.Name, "maximum level"), metres(m.Level))
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
