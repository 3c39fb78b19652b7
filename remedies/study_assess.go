package remedies

import (
	"context"
	"fmt"
	"math"

	"standfast/lem"
)

// Assess analyses the slope as it is in every situation, with search and audit, by every method. The required FS given as ratios are
// resolved. The error is that of the context, or a section that the engine cannot take.
func Assess(ctx context.Context, job *Job, s Settings) (*Option, error) {
	s = s.resolved()
	_, o, err := assess(ctx, job, &s)
	return o, err
}

// assess also returns the job with its required FS resolved.
func assess(ctx context.Context, job *Job, s *Settings) (*Job, *Option, error) {
	j := *job
	w := &works{name: "existing", title: "existing slope"}
	z := newSizing(&j, w, s)
	d := z.openProposal(Start(&j))
	defer d.Close()
	for i := range d.checks { // The user's section: its faults are errors, not our panics.
		c := &d.checks[i]
		if err := new(lem.Model).Compile(c.Section, &c.Situation); err != nil {
			return nil, nil, fmt.Errorf("situation %q: %w", c.Name, err)
		}
	}
	found, err := d.searchBoth(ctx)
	if err != nil {
		return nil, nil, err
	}
	o := &Option{Name: w.name, Title: w.title, Status: Existing, Proposal: d.proposal}
	all := d.outcomes(found)
	j.Situations = append([]Situation(nil), job.Situations...)
	for i := range all {
		c := &all[i].Check
		if c.SituationI < 0 {
			continue
		}
		if sit := &j.Situations[c.SituationI]; sit.RatioToExisting > 0 {
			sit.RequiredFS = sit.RatioToExisting * all[i].FS
			c.Required = sit.RequiredFS
		}
	}
	o.Situations, o.Stages = split(all)
	o.Reason = existingReason(o, s)
	o.Proposal.Notes = append(o.Proposal.Notes, j.remarks(o)...)
	return &j, o, nil
}

// adequate reports whether the slope as it is meets every requirement with the allowance of the search.
func adequate(o *Option, s *Settings) bool {
	g := o.Governing()
	return g != nil && g.Margin() >= s.Allowance && allResolved(o)
}

// allResolved reports whether the engine could judge every check.
func allResolved(o *Option) bool {
	for _, list := range [][]Outcome{o.Situations, o.Stages} {
		for i := range list {
			if !list[i].Resolved {
				return false
			}
		}
	}
	return true
}

func existingReason(o *Option, s *Settings) string {
	g := o.Governing()
	switch {
	case g == nil || math.IsNaN(g.FS):
		return "no slip deep enough to be of interest was found"
	case adequate(o, s):
		return "meets every required FS as it is"
	}
	return fmt.Sprintf("%s: FS %s, required %s", g.Check.Label(), floorFS(g.FS), fsText(g.Check.Required))
}
