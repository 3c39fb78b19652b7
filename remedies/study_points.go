package remedies

import (
	"fmt"
	"slices"
	"strings"
)

// Points is the robustness of a choice against what one failure leaves open: every option sized with each of the strengths with which the
// observed slip just fails (common practice: one failure is one equation for two strengths, and the gain by drains goes with tan phi').
type Points struct {
	Back   *BackAnalysis // nil if it has no answer.
	Reason string        // Why it has none; "" else.
	Sized  []SizedPoint  // At the low, the middle and the high point.
}

// SizedPoint is the study of a job with one strength of the back-analysis: searched and audited like any study, without curves, fronts,
// moved limits and swings.
type SizedPoint struct {
	Name     string // "low", "middle" or "high", by cohesion.
	Strength BackPoint
	Existing Option
	Options  []Option // Ranked as in Result.
	Least    string   // As in Result.
	// Chosen is the option that Result.Least names, of the size found with the strengths of the job, searched and audited with this strength: what if
	// that is built, and this is the strength? nil if there is none.
	Chosen *Option
}

// pointNames are the names of the points, by ascending cohesion.
var pointNames = [...]string{"low", "middle", "high"}

// points sizes everything again at each point of the back-analysis of the observed slip. A slip without an answer is told, not an error. job
// is the job as asked: a required FS given as a ratio to the existing slope's is that of the slope with the strength of the point.
func (st *study) points(job *Job, res *Result) (*Points, error) {
	back, err := backPair(job)
	if err != nil { // Not even a section that only the back-analysis cannot take keeps the study from its answer.
		return &Points{Reason: strings.TrimPrefix(err.Error(), ErrNoBackAnalysis.Error()+": ")}, nil
	}
	out := &Points{Back: back}
	s := *st.s
	s.Curves, s.Fronts, s.Relaxations, s.Sensitivity, s.Finished = false, false, false, false, nil
	for i, at := range []BackPoint{back.Low, back.Middle, back.High} {
		sub := &study{
			ctx: st.ctx, s: &s, pools: st.pools, plain: true, at: " at the " + pointNames[i] + " point",
			done: (i + 1) * st.total / (1 + len(pointNames)), total: st.total,
		}
		sized, err := sub.point(job.withStrength(back.Soil, &at), res.least())
		if err != nil {
			return nil, fmt.Errorf("%s point: %w", pointNames[i], err)
		}
		sized.Name, sized.Strength = pointNames[i], at
		out.Sized = append(out.Sized, *sized)
	}
	return out, nil
}

// backPair back-analyses the observed slip of a job for the cohesion and friction of the soil that most of it runs in.
func backPair(j *Job) (*BackAnalysis, error) {
	back, err := BackAnalyse(j, j.Observed, BackSettings{})
	if err != nil {
		return nil, err
	}
	failed := &j.Situations[back.Situation]
	if back.Soil < len(failed.Undrained) && failed.Undrained[back.Soil] {
		return nil, fmt.Errorf("%w: %s is undrained in %s, so that its c' and phi' do not come into it", ErrNoBackAnalysis,
			j.Section.Soils[back.Soil].Name, failed.Name)
	}
	return back, nil
}

// withStrength returns the job with the effective strength of a soil replaced.
func (j *Job) withStrength(soil int, p *BackPoint) *Job {
	out := *j
	out.Section.Soils = slices.Clone(j.Section.Soils)
	s := &out.Section.Soils[soil]
	s.Cohesion, s.Friction, s.PowerLaw = p.Cohesion, p.Friction, nil
	return &out
}

// point runs the study of a job with the strength of a point, and checks the works chosen without it; nil: none.
func (st *study) point(job *Job, chosen *Option) (*SizedPoint, error) {
	st.tell("existing slope", 0)
	var err error
	if st.j, st.existing, err = assess(st.ctx, job, st.s); err != nil {
		return nil, err
	}
	res, err := st.answer()
	if err != nil {
		return nil, err
	}
	out := &SizedPoint{Existing: res.Existing, Options: res.Options, Least: res.Least}
	if chosen != nil {
		out.Chosen, err = st.again(chosen)
	}
	return out, err
}

// again checks the works of an option on the slope of the study, unless they are what it came to there too.
func (st *study) again(o *Option) (*Option, error) {
	for i := range st.options {
		if same := &st.options[i]; same.Name == o.Name && (o.Trial || slices.Equal(same.Parameters, o.Parameters)) {
			return same, nil
		}
	}
	t := &Trial{Name: o.Name}
	next := 0
	for _, kind := range o.Remedies {
		i := slices.IndexFunc(st.j.Requests, func(r Request) bool { return r.Kind == kind })
		r := st.j.Requests[i]
		r.Axes = slices.Clone(r.Axes)
		for k := range r.Axes {
			if r.Axes[k].Name != "" {
				r.Axes[k].Min, r.Axes[k].Max = o.Parameters[next].Value, o.Parameters[next].Value
				next++
			}
		}
		t.Requests = append(t.Requests, r)
	}
	checked, err := checkTrial(st.ctx, st.j, st.s, t)
	if err != nil {
		return nil, err
	}
	checked.Title, checked.Trial = o.Title, false
	return checked, nil
}

// least returns the option that Least names; nil if nothing is needed or nothing meets the target.
func (r *Result) least() *Option {
	i := slices.IndexFunc(r.Options, func(o Option) bool { return o.Name == r.Least })
	if i < 0 {
		return nil
	}
	return &r.Options[i]
}
