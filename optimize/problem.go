package optimize

import (
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
)

// ErrInvalid is wrapped by the error of Minimize when the problem or the settings are at fault; all faults are joined.
var ErrInvalid = errors.New("optimize: invalid problem or settings")

// Defaults of Settings.
const (
	DefaultMaxDesigns   = 200_000
	DefaultFullSearches = 12
)

// Effort says how a Search is to look.
type Effort struct {
	Audit bool // the design has passed a search: use another sampler, finer
	// ToReject says that one cut with a margin below the allowance is enough: a search may begin with what is quick and end there if
	// that rejects the design. One that does not reject it must have looked at everything.
	ToReject bool
	Round    int    // how many searches and audits this Minimize has made before
	Seed     uint64 // for the sampler; differs from round to round
}

// Found is a cut met by a Search, the lowest of its basin.
type Found[C any] struct {
	Cut    C
	Margin float64 // what Design.Margin gives for Cut
	// Unresolved says that there is no trustworthy margin for this cut. The design may then neither pass, nor be rejected
	// by this cut. A NaN Margin counts as Unresolved.
	Unresolved bool
}

// A Design is one x made ready for many cuts. One goroutine at a time uses it, and it is closed exactly once.
type Design[C any] interface {
	// Margin returns the margin of the design at a cut, which it must neither change nor keep: +Inf when the cut misses
	// this design, NaN when there is no information.
	Margin(c *C) float64
	// Search returns the lowest cut of every distinct basin found, unsorted. A design that all cuts miss has a Found
	// with margin +Inf to say so: nothing found is taken as unresolved. It returns promptly when ctx ends.
	Search(ctx context.Context, e Effort) ([]Found[C], error)
	// Close releases the design.
	Close()
}

// A Problem is a least-cost design problem over a lattice. Its functions must depend on x alone.
type Problem[C any] struct {
	Axes []Axis
	// Cost returns the cost of a design, cheaply; tie breaks equal cost, the lower first. ok is false when geometry or
	// side limits forbid the design; otherwise both numbers must be finite. It is also asked between lattice points, from
	// several goroutines at once, and must neither change nor keep x.
	Cost func(x []float64) (cost, tie float64, ok bool)
	// Open makes a design ready. It is called from several goroutines at once, only for x that Cost allows, and may
	// keep x.
	Open func(x []float64) Design[C]
}

// Settings of Minimize. The zero value works.
type Settings[C any] struct {
	// Workers is how many goroutines screen designs; 0 means runtime.GOMAXPROCS(0). It never changes the result.
	Workers int
	// Seed drives the master's sampler and the seeds handed to Search.
	Seed uint64
	// Allowance is the margin that a design must reach: accepted when margin >= Allowance, in the unit of the margins.
	// 0, the default, asks for the bare margin >= 0.
	Allowance float64
	// MaxDesigns bounds the lattice: a larger one is coarsened by doubling steps, and Result.Coarsened says so.
	// 0 means DefaultMaxDesigns.
	MaxDesigns int
	// FullSearches is the aim for how many designs are searched in full. The exchange takes at most two thirds of it (none
	// when it is 1); the walk goes on past it until it has an answer. 0 means DefaultFullSearches.
	FullSearches int
	// BestSearches bounds how many designs are searched to find Result.Best when none passes. 0 means FullSearches.
	BestSearches int
	// BestUnaudited leaves the audit of Result.Best to the caller: its margin is then that of a search and the whole pool.
	BestUnaudited bool
	// NoBest leaves Result.Best empty: nobody asks for it.
	NoBest bool
	// Start is the initial pool.
	Start []C
	// Progress, when set, is called from the goroutine of Minimize after each piece of work.
	Progress func(Progress)
}

// Phase is a step of the method.
type Phase int

// The phases, in order.
const (
	Exchanging Phase = iota // filling the pool
	Walking                 // visiting designs in ascending cost
	Ranking                 // looking for the best of designs that all fall short
)

// String returns the phase as a lower-case word.
func (p Phase) String() string {
	return [...]string{"exchanging", "walking", "ranking"}[p]
}

// Progress is a report while Minimize runs.
type Progress struct {
	Phase    Phase
	Done     int     // designs of the lattice dealt with by the walk
	Designs  int     // designs that geometry allows
	Pool     int     // cuts known
	Searches int     // searches and audits made
	Cost     float64 // cost of the design reached; NaN before the walk
}

// resolved returns the settings with defaults filled in, and leaves the caller's alone.
func (s Settings[C]) resolved() Settings[C] {
	if s.Workers == 0 {
		s.Workers = runtime.GOMAXPROCS(0)
	}
	if s.MaxDesigns == 0 {
		s.MaxDesigns = DefaultMaxDesigns
	}
	if s.FullSearches == 0 {
		s.FullSearches = DefaultFullSearches
	}
	if s.BestSearches == 0 {
		s.BestSearches = s.FullSearches
	}
	return s
}

func validate[C any](p *Problem[C], s *Settings[C]) error {
	var faults []error
	if len(p.Axes) == 0 {
		faults = append(faults, errors.New("no axes"))
	}
	for i, a := range p.Axes {
		faults = append(faults, a.faults(i)...)
	}
	if p.Cost == nil {
		faults = append(faults, errors.New("no Cost"))
	}
	if p.Open == nil {
		faults = append(faults, errors.New("no Open"))
	}
	for _, n := range []struct {
		name  string
		value int
	}{{"Workers", s.Workers}, {"MaxDesigns", s.MaxDesigns}, {"FullSearches", s.FullSearches}, {"BestSearches", s.BestSearches}} {
		if n.value < 0 {
			faults = append(faults, fmt.Errorf("%s %d is negative", n.name, n.value))
		}
	}
	if !(s.Allowance >= 0 && s.Allowance <= math.MaxFloat64) {
		faults = append(faults, fmt.Errorf("allowance %g is not a finite number of at least 0", s.Allowance))
	}
	if len(faults) == 0 {
		return nil
	}
	return errors.Join(append([]error{ErrInvalid}, faults...)...)
}
