package report

import "standfast/remedies"

// Relaxation says what moving one limit of the site would save.
type Relaxation struct {
	Limit      string               `json:"limit"`      // Name of the limit.
	Change     string               `json:"change"`     // How it is moved, such as "moved 1.00 m outwards".
	Saves      float64              `json:"saves"`      // Of the objective: m3/m for earthworks, else for the whole length.
	Objective  float64              `json:"objective"`  // What it is with the limit moved.
	Parameters map[string]Parameter `json:"parameters"` // Dimensions of the works then; searched, not audited.
}

// Bar says how the FS of the check with the least margin swings with one input, critical slips searched anew; not audited.
type Bar struct {
	Input string `json:"input"` // What is swung.
	Base  Swung  `json:"base"`  // With the inputs as given, by the same search.
	Low   Swung  `json:"low"`   // With the input low.
	High  Swung  `json:"high"`  // With the input high.
}

// Swung is the least margin found at one value of an input.
type Swung struct {
	FS         Number `json:"fs"`          // Null if nothing was found.
	Check      string `json:"check"`       // Situation or stage with the least margin; empty if nothing was found.
	RequiredFS Number `json:"required_fs"` // FS required there; null if nothing was found.
}

// HandCheck is a closed form told beside the checks.
type HandCheck struct {
	Name       string `json:"name"`        // What is checked.
	FS         Number `json:"fs"`          // By the closed form.
	RequiredFS Number `json:"required_fs"` // What it is held against; null: nothing.
	Working    string `json:"working"`     // The numbers that went in.
	Source     string `json:"source"`      // Of the formula.
}

func relaxationsOf(list []remedies.Relaxation) []Relaxation {
	out := make([]Relaxation, len(list))
	for i, r := range list {
		out[i] = Relaxation{Limit: r.Limit, Change: r.Change, Saves: r.Saves, Objective: r.Objective, Parameters: parametersOf(r.Parameters)}
	}
	return out
}

func barsOf(list []remedies.Bar) []Bar {
	out := make([]Bar, len(list))
	for i, b := range list {
		out[i] = Bar{
			Input: b.Input, Base: Swung{Number(b.Base), b.BaseCheck, known(b.BaseRequired)},
			Low: Swung{Number(b.Low), b.CheckL, known(b.RequiredL)}, High: Swung{Number(b.High), b.CheckH, known(b.RequiredH)},
		}
	}
	return out
}

func handChecksOf(list []remedies.HandCheck) []HandCheck {
	out := make([]HandCheck, len(list))
	for i, h := range list {
		out[i] = HandCheck{Name: h.Name, FS: Number(h.FS), RequiredFS: known(h.Required), Working: h.Working, Source: h.Source}
	}
	return out
}

// orNothing returns a number, and 0 if it is not known.
func orNothing(n Number) float64 {
	if !n.Known() {
		return 0
	}
	return float64(n)
}

// addRobustness turns back what is asked of an option besides its size.
func addRobustness(out *remedies.Option, o *Option) {
	for _, r := range o.Relaxations {
		out.Relaxations = append(out.Relaxations, remedies.Relaxation{
			Limit: r.Limit, Change: r.Change, Saves: r.Saves, Objective: r.Objective, Parameters: valuesOf(o.Order, r.Parameters),
		})
	}
	for _, b := range o.Sensitivity {
		out.Sensitivity = append(out.Sensitivity, remedies.Bar{
			Input: b.Input, Base: float64(b.Base.FS), BaseCheck: b.Base.Check, BaseRequired: orNothing(b.Base.RequiredFS),
			Low: float64(b.Low.FS), CheckL: b.Low.Check, RequiredL: orNothing(b.Low.RequiredFS),
			High: float64(b.High.FS), CheckH: b.High.Check, RequiredH: orNothing(b.High.RequiredFS),
		})
	}
	for _, h := range o.HandChecks {
		out.Proposal.HandChecks = append(out.Proposal.HandChecks, remedies.HandCheck{
			Name: h.Name, FS: float64(h.FS), Required: orNothing(h.RequiredFS), Working: h.Working, Source: h.Source,
		})
	}
}
