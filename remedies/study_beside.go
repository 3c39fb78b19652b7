package remedies

import (
	"standfast/optimize"
)

// sized is an option that was sized, with what its sizing left behind.
type sized struct {
	option int // Index into study.options.
	z      *sizing
	res    optimize.Result[Cut]
	alone  bool // One remedy by itself.
}

// beside finds what is asked beside the sizes: moved limits, swings of the inputs and trade-off curves. It comes last, so that every answer
// is known as soon as can be.
func (st *study) beside() error {
	if !st.s.Curves && !st.s.Relaxations && !st.s.Sensitivity {
		return nil
	}
	if st.s.Sensitivity && st.j.Swings.Any() {
		z := newSizing(st.j, &works{name: st.existing.Name, title: st.existing.Title}, st.s)
		var err error
		if st.existing.Sensitivity, err = z.sensitivity(st.ctx, st.existing.Proposal); err != nil {
			return err
		}
	}
	for i := range st.sized {
		if err := st.besideOne(&st.sized[i]); err != nil {
			return err
		}
		st.done++
	}
	return nil
}

func (st *study) besideOne(s *sized) (err error) {
	o := &st.options[s.option]
	st.tell(o.Name+", limits and curve", 0)
	if st.s.Relaxations && o.Status == MeetsTarget && s.alone {
		if o.Relaxations, err = s.z.relaxations(st.ctx, &s.res); err != nil {
			return err
		}
	}
	if st.s.Sensitivity && st.j.Swings.Any() && (s.alone || o.Status == MeetsTarget) && !o.WhatIf {
		if o.Sensitivity, err = s.z.sensitivity(st.ctx, o.Proposal); err != nil {
			return err
		}
	}
	if st.s.Curves && s.alone {
		o.Tradeoff, err = s.z.curve(st.ctx, o, &s.res)
	}
	return err
}
