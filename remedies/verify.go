package remedies

import (
	"context"
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// Effort and seed of a verification's searches, as multiples of and apart from those of a study.
const (
	verifyEffort = 4.0 // Times the trials of the search and of the audit.
	verifySeed   = 0x5eed
)

// reportedTol is the share by which the FS of a reported slip may differ when it is evaluated again with the same number of slices: its ends
// are then those on the ground, and slices fall otherwise.
const reportedTol = 0.003

// Contradict evaluates the reported slip of every check of an option again, by the reported method and with as many slices as a search and
// as an audit has, and returns the outcomes whose FS is neither time what the option says, with the FS found now.
func Contradict(j *Job, o *Option, s Settings) []Outcome {
	s = s.resolved()
	var out []Outcome
	var ws lem.Workspace
	for _, list := range [][]Outcome{o.Situations, o.Stages} {
		for i := range list {
			c := list[i]
			if math.IsNaN(c.FS) {
				continue
			}
			var m lem.Model
			got := math.NaN()
			if err := m.Compile(c.Check.Section, &c.Check.Situation); err == nil {
				for _, n := range []int{s.Slices, auditSlices * s.Slices} {
					f := m.FS(&ws, &c.Slip, lem.Setting{Method: c.Method, Slices: n, Window: j.window(), SideForce: j.SideForce}).F
					if math.IsNaN(got) || math.Abs(f-c.FS) < math.Abs(got-c.FS) {
						got = f
					}
				}
			}
			if !(math.Abs(got-c.FS) <= reportedTol*c.FS) {
				c.FS = got
				out = append(out, c)
			}
		}
	}
	return out
}

// Refute searches an option anew, from its checks alone: by both parametrisations of slips, with other seeds, four times the trials of a
// study and finer slices. It returns the outcomes whose FS is below the required FS, and how many searches were made. The option is not
// changed.
func Refute(ctx context.Context, j *Job, o *Option, s Settings) (refuting []Outcome, searches int, err error) {
	s = s.resolved()
	z := newSizing(j, &works{name: o.Name, title: o.Title}, &s)
	d := &design{z: z, proposal: o.Proposal}
	for _, list := range [][]Outcome{o.Situations, o.Stages} {
		for i := range list {
			d.checks = append(d.checks, list[i].Check)
		}
	}
	d.models = make([]*lem.Model, len(d.checks))
	defer d.Close()
	var found []optimize.Found[Cut]
	for i := range d.checks {
		m := d.model(i)
		for _, sampler := range []lem.Sampler{lem.ByDaylight, lem.ByCentre} {
			effort := verifyEffort
			if sampler == lem.ByCentre {
				effort *= auditEffort
			}
			minima, err := m.Search(ctx, lem.SearchOptions{
				Slices: auditSlices * s.Slices, MinDepth: j.MinDepth, Window: j.window(), Below: d.required(i), Polylines: true,
				Sampler: sampler, Effort: effort, Seed: s.Seed + verifySeed + uint64(i), SideForce: j.SideForce,
			})
			if err != nil {
				return nil, searches, err
			}
			searches++
			for _, b := range minima.Basins {
				found = append(found, optimize.Found[Cut]{Cut: Cut{uint16(i), b.Setting, b.Slip}, Margin: b.Result.F - d.required(i)})
			}
		}
	}
	for _, o := range d.outcomes(found) {
		if o.Margin() < 0 {
			refuting = append(refuting, o)
		}
	}
	return refuting, searches, nil
}

// CutOf is a slip of a certificate's pool under the name of its check.
type CutOf struct {
	Check   string // Label of the check.
	Setting lem.Setting
	Slip    lem.Slip
}

// Mismatch is a witness that does not show what it is said to show.
type Mismatch struct {
	X    []float64
	Said float64 // FS in the certificate.
	Got  float64 // FS found; NaN if the slip has none on that design.
	Why  string
}

// replayTol is the difference of FS up to which a replayed witness agrees with the certificate: rounding only.
const replayTol = 1e-6

// Replay evaluates every witness of an option again: the works named by kinds at x, the slip of the pool, and whether its FS is what was said
// and below the required FS plus the allowance. It returns those that do not hold. The error is a fault of the request.
func Replay(ctx context.Context, j *Job, kinds []string, pool []CutOf, witnesses []Witness, s Settings) ([]Mismatch, error) {
	s = s.resolved()
	var group []Request
	for _, k := range kinds {
		for _, r := range j.Requests {
			if r.Kind == k {
				group = append(group, r)
			}
		}
	}
	if len(group) != len(kinds) {
		return nil, fmt.Errorf("%w: the case does not ask for all of %q", ErrRequest, kinds)
	}
	w, err := newWorks(j, groupName(group), group)
	if err != nil {
		return nil, err
	}
	z := newSizing(j, w, &s)
	var out []Mismatch
	for i := range witnesses {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		if m, ok := z.replay(&witnesses[i], pool); !ok {
			out = append(out, m)
		}
	}
	return out, nil
}

// replay evaluates one witness and reports whether it holds.
func (z *sizing) replay(w *Witness, pool []CutOf) (Mismatch, bool) {
	m := Mismatch{X: w.X, Said: w.FS, Got: math.NaN()}
	if int(w.Cut) < 0 || int(w.Cut) >= len(pool) || len(w.X) != len(z.w.axes) {
		m.Why = "it names no slip of the pool, or not every parameter"
		return m, false
	}
	p := z.w.apply(z.j, w.X)
	if got := p.Quantities.Earthworks(); math.Abs(got-w.Earthworks) > replayTol*math.Max(1, math.Abs(got)) {
		m.Why = fmt.Sprintf("the works measure %.6g, not %.6g", got, w.Earthworks)
		return m, false
	}
	d := z.openProposal(p)
	defer d.Close()
	cut := &pool[w.Cut]
	for i := range d.checks {
		if d.checks[i].Label() != cut.Check {
			continue
		}
		required := d.required(i) + z.s.Allowance
		m.Got = d.Margin(&Cut{uint16(i), cut.Setting, cut.Slip}) + d.required(i)
		switch {
		case !(math.Abs(m.Got-w.FS) <= replayTol):
			m.Why = "the slip has another FS on this design"
		case !(m.Got < required):
			m.Why = "the slip is not below the required FS"
		default:
			return m, true
		}
		return m, false
	}
	m.Why = fmt.Sprintf("there is no check %q", cut.Check)
	return m, false
}
