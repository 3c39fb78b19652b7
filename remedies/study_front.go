package remedies

import (
	"fmt"
	"slices"
	"sync"

	"standfast/optimize"
)

// Front is earthworks against metres of drain: designs that meet every check, of which none has less of one and no more of the other than
// another (Pareto 1906). Each is the least earthworks with no more than so much drain (the constraint method: Haimes, Lasdon and Wismer 1971),
// searched and audited as an answer is.
type Front struct {
	Points     []FrontPoint // In descending metres of drain, hence ascending earthworks; with less drain than the last has, nothing was found to do.
	Whole      bool         // Every design of the front is a point; else there may be more between them.
	Unresolved int          // Designs that could be neither passed nor rejected, and might be points.
	Searches   int          // One search is one check of one design, audits included.
}

// FrontPoint is one point of a front.
type FrontPoint struct {
	Drain      float64 // m per m run.
	Earthworks float64 // m3/m.
	Answer     bool    // It is the design of the option itself.
	Parameters []Value
	Proposal   *Proposal
	Situations []Outcome
	Stages     []Outcome
}

// Governing returns the outcome with the least margin; nil if there is none.
func (p *FrontPoint) Governing() *Outcome {
	return (&Option{Situations: p.Situations, Stages: p.Stages}).Governing()
}

// metresOfDrain are the parameters of drains that set how many metres there are. Others, such as the depth of a trench, change them a little.
var metresOfDrain = []string{"length", "spacing", "from", "to"}

// hasFront reports whether requests sized together have a front: one of several is for drains with water between them, whose metres are sized.
func hasFront(group []Request) bool {
	return len(group) > 1 && slices.ContainsFunc(group, func(r Request) bool {
		return isDrains(r) && slices.ContainsFunc(r.Axes, func(a optimize.Axis) bool {
			return a.Len() > 1 && slices.Contains(metresOfDrain, a.Name)
		})
	})
}

// fronted sizes the works of a group from some slips, and finds their front where they have one. Should a slip met on the way reject the answer,
// they are sized anew, and that slip with them.
func (st *study) fronted(z *sizing, group []Request, start []Cut) (optimize.Result[Cut], *Front, error) {
	for {
		res, err := z.minimize(st.ctx, z.cost, start, st.tell)
		if err != nil || !st.s.Fronts || res.X == nil || z.w.whatIf || !hasFront(group) {
			return res, nil, err
		}
		own := newSizing(z.j, z.w, z.s) // Its searches are counted apart.
		f := own.frontier(&res, st.tell)
		stands, whole, err := f.front(st.ctx)
		switch {
		case err != nil:
			return res, nil, fmt.Errorf("%s: front: %w", z.w.name, err)
		case f.rejected(f.answer.index):
			start = f.pool
		case len(stands) == 0:
			return res, nil, nil
		default:
			return res, own.layOutFront(f, stands, whole), nil
		}
	}
}

// frontier prices the lattice of an answer, ready to look for its front.
func (z *sizing) frontier(res *optimize.Result[Cut], tell func(string, float64)) *frontier[Cut] {
	designs := 1
	for _, a := range res.Axes {
		designs *= a.Len()
	}
	f := newFrontier[Cut](res.Axes, designs)
	f.open, f.byCost = z.open, z.j.Objective != LeastEarthworks
	f.settings = optimize.Settings[Cut]{Workers: z.s.Workers, Seed: z.s.Seed, Allowance: z.s.Allowance}
	f.progress = func(done int) { tell(z.w.name+", front", float64(done)/float64(designs)) }
	workers := max(z.workers, 1)
	var wg sync.WaitGroup
	for w := range workers {
		wg.Go(func() {
			for i := w; i < designs; i += workers {
				p := z.w.apply(z.j, optimize.Point(f.axes, i))
				f.earthworks[i], f.drain[i], f.out[i] = p.Quantities.Earthworks(), p.Quantities.Drain, len(p.Violations) > 0
			}
		})
	}
	wg.Wait()
	f.leaveOut(res)
	f.answer = stand[Cut]{f.index(res.X), res.Lowest}
	return f
}

// layOutFront puts the designs of a front into points.
func (z *sizing) layOutFront(f *frontier[Cut], stands []stand[Cut], whole bool) *Front {
	out := &Front{Whole: whole, Unresolved: f.unresolved, Searches: int(z.searches.Load() + z.audits.Load())}
	for _, s := range stands {
		x := optimize.Point(f.axes, s.index)
		d := z.openProposal(z.w.apply(z.j, x))
		p := FrontPoint{
			Drain: f.drain[s.index], Earthworks: f.earthworks[s.index], Answer: s.index == f.answer.index, Parameters: z.w.values(x), Proposal: d.proposal,
		}
		p.Situations, p.Stages = split(d.outcomes(s.found))
		d.Close()
		out.Points = append(out.Points, p)
	}
	return out
}
