package drawing

import (
	"standfast/remedies"
)

// tradeoffs are invented curves.
func tradeoffs(differing bool) []remedies.Option {
	curve := func(name string, status remedies.OptionStatus, required, a, b float64, n int) remedies.Option {
		o := remedies.Option{Name: name, Title: name, Status: status}
		for i := range n {
			shift := 0.02 * float64(i-n/2)
			fs := required + shift + 0.004*float64(i%3)
			if status != remedies.MeetsTarget {
				fs -= 0.03
			}
			o.Tradeoff = append(o.Tradeoff, remedies.TradeoffPoint{Shift: shift, RequiredFS: required + shift, Reached: fs, Earthworks: a + b*float64(i)*(1+0.05*float64(i))})
		}
		return o
	}
	second := 1.25
	if differing {
		second = 1.2
	}
	return []remedies.Option{
		curve("toe berm", remedies.MeetsTarget, 1.25, 4, 1.6, 9), curve("toe buttress", remedies.MeetsTarget, second, 3.5, 1.5, 9),
		curve("regrade", remedies.Infeasible, 1.25, 6, 4, 4), curve("unloading of the head", remedies.Infeasible, second, 2, 2.5, 4),
		curve("trench drains", remedies.MeetsTarget, second, 0.8, 0.2, 9), curve("regrade with trench drains", remedies.MeetsTarget, second, 1.5, 1.2, 8),
	}
}
