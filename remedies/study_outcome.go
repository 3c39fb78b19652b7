package remedies

import (
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// outcomes turns what a search and its audit found into one answer for each check: the lowest FS, with the FS of every method on that
// slip.
func (d *design) outcomes(found []optimize.Found[Cut]) []Outcome {
	out := make([]Outcome, len(d.checks))
	for i := range out {
		out[i] = Outcome{Check: d.checks[i], FS: math.NaN(), Resolved: true}
	}
	for k := range found {
		f := &found[k]
		if math.IsInf(f.Margin, 1) {
			continue
		}
		o := &out[f.Cut.Check]
		if f.Unresolved {
			o.Resolved = false
			continue
		}
		if fs := f.Margin + d.required(int(f.Cut.Check)); !(fs >= o.FS) {
			d.fillOutcome(o, &f.Cut, fs)
		}
	}
	for i := range out {
		d.addMethods(&out[i], i)
	}
	return out
}

func (d *design) fillOutcome(o *Outcome, c *Cut, fs float64) {
	o.FS, o.Method, o.Slip, o.setting = fs, c.Setting.Method, c.Slip, c.Setting
}

// addMethods evaluates the governing slip by every method.
func (d *design) addMethods(o *Outcome, check int) {
	o.ByMethod = map[lem.Method]float64{}
	if math.IsNaN(o.FS) {
		return
	}
	for _, method := range lem.Methods() {
		s := o.setting
		s.Method = method
		r := d.model(check).FS(&d.ws, &o.Slip, s)
		if r.Status == lem.Converged {
			o.ByMethod[method] = r.F
		}
		if method == o.Method {
			o.From, o.To, o.Depth, o.Crack = r.From, r.To, r.Depth, r.Crack
		}
	}
}

// split parts outcomes into those of situations and those of stages.
func split(all []Outcome) (situations, stages []Outcome) {
	for _, o := range all {
		if o.Check.Stage {
			stages = append(stages, o)
		} else {
			situations = append(situations, o)
		}
	}
	return situations, stages
}
