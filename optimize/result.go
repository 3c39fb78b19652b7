package optimize

import "fmt"

// Status says how Minimize ended.
type Status int

// The zero Status is no answer, so that a Result that was never filled in claims nothing.
const (
	// Interrupted: the run stopped before it had an answer, because the context ended or a Search failed.
	Interrupted Status = iota
	// Optimal: Result.X passed a search and an audit, and no cheaper design of the lattice did.
	Optimal
	// Infeasible: every design that geometry allows has a witness against it.
	Infeasible
	// Unresolved: no design passed, but some could be neither passed nor rejected.
	Unresolved
	// NoDesign: geometry forbids every design of the lattice.
	NoDesign
)

// String returns the status as a lower-case phrase.
func (s Status) String() string {
	switch s {
	case Interrupted:
		return "interrupted"
	case Optimal:
		return "optimal"
	case Infeasible:
		return "infeasible"
	case Unresolved:
		return "unresolved"
	case NoDesign:
		return "no design"
	}
	return fmt.Sprintf("Status(%d)", int(s))
}

// NoCut is the Witness.Cut of a design that is unresolved.
const NoCut int32 = -1

// A Witness is the evidence against one design: a pool cut with a margin below the allowance.
type Witness struct {
	Index  int     // of the design: Point(Result.Axes, Index) gives its parameters
	Cost   float64 // of the design
	Cut    int32   // index into Result.Pool; NoCut when the design is unresolved
	Margin float64 // of the design at the cut; NaN when the design is unresolved
}

// An Attempt is a design that falls short, searched in full and, unless Settings.BestUnaudited, audited.
type Attempt[C any] struct {
	X          []float64
	Cost       float64
	Margin     float64    // the lowest known: of its search, its audit and the whole pool
	Binding    Found[C]   // the cut that has this margin
	Found      []Found[C] // what its search and audit found, ascending by margin
	Unresolved int        // cuts of its search and audit without a margin, any of which could lie lower
}

// Spent counts the work done; it does not depend on the number of workers unless the run is interrupted.
type Spent struct {
	Searches          int // searches that were no audits
	Audits            int
	FullySearched     int // distinct designs searched in full
	ExchangeSearched  int // those of them that the exchange searched
	DesignsOpened     int
	MarginEvaluations int // calls of Design.Margin; what goes on inside Search is not counted
}

// A Result is the answer with its certificate. See Status for what each field is worth.
type Result[C any] struct {
	Status Status
	X      []float64 // the answer; nil unless Optimal
	Cost   float64   // of the answer; NaN unless Optimal
	// Lowest holds all basins at the answer from its search and its audit, ascending by margin; nil unless Optimal.
	Lowest []Found[C]
	// Best is the design with the greatest margin when the status is Infeasible or Unresolved; X is nil when there is none, or when
	// Settings.NoBest is set.
	// Candidates are taken by their lowest margin on the pool, which bounds their margin from above, and searched and audited
	// until the best of them is at least as good as every bound left, or until Settings.BestSearches of them have been
	// taken: then it is the best of those. Unresolved designs are no candidates.
	Best Attempt[C]
	Pool []C // every cut known, Settings.Start first
	// Lattice has one entry for each design that geometry allows and that comes before the answer (all of them when there
	// is no answer; those dealt with when interrupted), in walk order: ascending cost, tie, index.
	Lattice            []Witness
	Forbidden          int     // designs of the lattice that geometry forbids
	Unresolved         int     // designs in Lattice that are neither passed nor rejected
	ContinuousEstimate float64 // least cost between lattice points on the exchange's pool; NaN when none. Not a bound.
	Spent              Spent
	Coarsened          bool    // the lattice asked for was too large: see Axes for the steps used
	Axes               []Axis  // as used
	Allowance          float64 // as used
	Seed               uint64  // as used
}
