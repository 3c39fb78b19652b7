package remedies

import (
	"errors"
	"fmt"
)

// Objective is what a sizing makes least.
type Objective uint8

// The objectives.
const (
	LeastEarthworks Objective = iota // Bank cut plus compacted fill, m3 per metre run.
	LeastCost                        // By the user's rates, for the whole length.
	LeastCarbon                      // By the user's factors, kg CO2 equivalent for the whole length.
	numObjectives
)

var objectiveNames = [numObjectives]string{"earthworks", "cost", "carbon"}

// String returns the name of the objective as in case and result files.
func (o Objective) String() string {
	if o < numObjectives {
		return objectiveNames[o]
	}
	return "unknown"
}

// Objectives returns the names of all objectives.
func Objectives() []string { return append([]string(nil), objectiveNames[:]...) }

// ParseObjective returns the objective of that name and reports whether there is one.
func ParseObjective(name string) (Objective, bool) {
	for i, n := range objectiveNames {
		if n == name {
			return Objective(i), true
		}
	}
	return 0, false
}

// ErrBlankRate says that an objective needs a rate or factor that the case leaves blank.
var ErrBlankRate = errors.New("remedies: the objective needs a rate that is blank")

// value returns what is made least of a proposal; NaN where it needs a blank rate.
func (o Objective) value(j *Job, q *Quantities) float64 {
	switch o {
	case LeastCost:
		return Cost(j, q)
	case LeastCarbon:
		return Carbon(j, q)
	case LeastEarthworks, numObjectives:
	}
	return q.Earthworks()
}

// priced reports an error if works of the smallest size cannot be priced by the objective.
func (z *sizing) priced() error {
	p := z.w.apply(z.j, z.w.smallest())
	if v := z.j.Objective.value(z.j, &p.Quantities); v != v {
		return fmt.Errorf("%w: %s by %s", ErrBlankRate, z.w.title, z.j.Objective)
	}
	return nil
}
