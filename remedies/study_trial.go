package remedies

import (
	"context"
	"fmt"
	"strings"
)

// checkTrial checks works of the user's own with search and audit.
func checkTrial(ctx context.Context, j *Job, s *Settings, t *Trial) (*Option, error) {
	w, err := newWorks(j, t.Name, t.Requests)
	if err != nil {
		return nil, fmt.Errorf("trial %q: %w", t.Name, err)
	}
	x := w.smallest()
	z := newSizing(j, w, s)
	d := z.openProposal(w.apply(j, x))
	defer d.Close()
	o := &Option{
		Name: t.Name, Title: t.Name, Remedies: w.kinds, WhatIf: w.whatIf, Trial: true, Status: Fails,
		Parameters: w.values(x), Proposal: d.proposal,
	}
	found, err := d.searchBoth(ctx)
	if err != nil {
		return nil, err
	}
	o.Situations, o.Stages = split(d.outcomes(found))
	g := o.Governing()
	switch {
	case len(d.proposal.Violations) > 0:
		v := d.proposal.Violations[0]
		o.Binding, o.Reason = v.Limit, v.Detail
	case len(d.proposal.NotChecked) > 0:
		o.Status, o.Reason = Unresolved, strings.Join(d.proposal.NotChecked, "; ")
	case !allResolved(o):
		o.Status, o.Reason = Unresolved, "no governing method answered on some slips"
	case g == nil || g.Margin() >= s.Allowance:
		o.Status, o.Reason = MeetsTarget, "every check stands at or above its required FS"
	default:
		o.Binding = g.Check.Label()
		o.Reason = fmt.Sprintf("%s: FS %s, required %s", g.Check.Label(), floorFS(g.FS), fsText(g.Check.Required))
		if g.Margin() >= 0 {
			o.Reason = fmt.Sprintf("%s: FS %s is within the search allowance %g of the %s required", g.Check.Label(), floorFS(g.FS), s.Allowance,
				fsText(g.Check.Required))
		}
	}
	return o, nil
}
