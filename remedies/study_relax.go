package remedies

import (
	"context"
	"fmt"
	"math"

	"standfast/optimize"
)

// How far a limit is moved to see what that saves, m.
const (
	fenceMoves = 1.0
	levelMoves = 0.5
)

// Relaxation says what moving one limit of the site would save.
type Relaxation struct {
	Limit      string  // Its name.
	Change     string  // "moved 1.00 m outwards".
	Saves      float64 // Of the objective, in its unit (m3/m for earthworks).
	Objective  float64 // With the limit moved.
	Parameters []Value // Of the works then.
}

// relaxed is a job with one limit moved.
type relaxed struct {
	limit, change string
	job           *Job
}

// relaxations sizes the works again with each limit that forbids a cheaper design moved a little.
func (z *sizing) relaxations(ctx context.Context, res *optimize.Result[Cut]) ([]Relaxation, error) {
	binding := z.bindingLimits(res)
	var out []Relaxation
	for _, r := range z.j.relaxed() {
		if !binding[r.limit] {
			continue
		}
		c := newSizing(r.job, z.w, z.s)
		again, err := c.minimize(ctx, c.cost, res.Pool, nil)
		if err != nil {
			return nil, err
		}
		if again.X == nil || !(again.Cost < res.Cost) {
			continue
		}
		out = append(out, Relaxation{
			Limit: r.limit, Change: r.change, Saves: res.Cost - again.Cost, Objective: again.Cost, Parameters: z.w.values(again.X),
		})
	}
	return out, nil
}

// bindingLimits returns the limits that alone forbid some design cheaper than the answer.
func (z *sizing) bindingLimits(res *optimize.Result[Cut]) map[string]bool {
	out := map[string]bool{}
	designs := 1
	for _, a := range res.Axes {
		designs *= a.Len()
	}
	for i := range designs {
		x := optimize.Point(res.Axes, i)
		p := z.w.apply(z.j, x)
		if len(p.Violations) == 0 || p.Violations[0].Geometry {
			continue
		}
		if cost, _ := z.price(p, x); cost >= res.Cost {
			continue
		}
		name := p.Violations[0].Limit
		for _, v := range p.Violations {
			if v.Limit != name || v.Geometry {
				name = ""
			}
		}
		if name != "" {
			out[name] = true
		}
	}
	return out
}

// relaxed returns the job with each limit moved in turn.
func (j *Job) relaxed() []relaxed {
	var out []relaxed
	add := func(name, otherwise string, by float64, how string, change func(*Job)) {
		c := *j
		c.Limits.KeepClear = append([]KeepClear(nil), j.Limits.KeepClear...)
		c.Limits.MaxLevels = append([]MaxLevel(nil), j.Limits.MaxLevels...)
		c.Limits.Overhead = append([]Overhead(nil), j.Limits.Overhead...)
		change(&c)
		out = append(out, relaxed{named(name, otherwise), fmt.Sprintf("moved %s m %s", metres(by), how), &c})
	}
	if f := j.Limits.Left; f != nil {
		add(f.Name, "left limit", fenceMoves, "outwards", func(c *Job) { c.Limits.Left = &Fence{f.Name, f.X - fenceMoves} })
	}
	if f := j.Limits.Right; f != nil {
		add(f.Name, "right limit", fenceMoves, "outwards", func(c *Job) { c.Limits.Right = &Fence{f.Name, f.X + fenceMoves} })
	}
	for i, k := range j.Limits.KeepClear {
		side := math.Copysign(fenceMoves, (k.FromX+k.ToX)/2-(j.Crest.X+j.Toe.X)/2)
		add(k.Name, "keep-clear zone", fenceMoves, "away from the slope", func(c *Job) {
			c.Limits.KeepClear[i].FromX += side
			c.Limits.KeepClear[i].ToX += side
		})
	}
	for i, l := range j.Limits.MaxLevels {
		add(l.Name, "maximum level", levelMoves, "up", func(c *Job) { c.Limits.MaxLevels[i].Level += levelMoves })
	}
	for i, l := range j.Limits.Overhead {
		add(l.Name, "overhead line", levelMoves, "up", func(c *Job) { c.Limits.Overhead[i].Level += levelMoves })
	}
	if o := j.Limits.Outfall; o != nil {
		add("outfall", "outfall", levelMoves, "down", func(c *Job) {
			lower := *o - levelMoves
			c.Limits.Outfall = &lower
		})
	}
	return out
}
