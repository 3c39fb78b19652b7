package lem

// Sampler names the parametrisation of trial circles. The two share no code but the engine, so that one can audit the other.
type Sampler uint8

// The samplers.
const (
	ByDaylight Sampler = iota // Daylight points at head and exit, and the angle of the arc.
	ByCentre                  // Centre and radius.
)

// SearchOptions says what a search looks at and with what effort. The zero value is the default search.
type SearchOptions struct {
	Slices   int      // Target slices; 0: DefaultSlices.
	MinDepth float64  // Depth of interest, m.
	Sampler  Sampler  // Parametrisation of trial circles.
	Effort   float64  // Multiple of the default number of trials; 0 means 1.
	Seed     uint64   // Shifts the low-discrepancy sequence.
	Window   Window   // Slips to look at.
	Methods  []Method // Governing methods; nil: those of GoverningMethods.
	// Polylines: look at non-circular slips too: grown from the circles, and along boundaries between soils, the firm base and known slip
	// surfaces. They are evaluated with the methods but for Bishop; with those that govern polylines if there is no other.
	Polylines bool
	SideForce SideForce // Side-force function where Morgenstern-Price is among the methods.
	// Below: basins with F at or below this are all polished with every governing method; 0 polishes the lowest few only.
	Below float64
}

// Minimum is one basin of the search: the lowest slip found in it.
type Minimum struct {
	Slip    Slip
	Setting Setting // With what the slip was evaluated.
	Result  Result
}

// Minima is the outcome of a search.
type Minima struct {
	Basins []Minimum // Every distinct basin, ascending in F.
	// Unresolved holds trials that no governing method could solve and whose screen (Ordinary, on polylines Janbu without f0 where that is higher)
	// is lower than the lowest F found, lowest screen first, at most MaxUnresolved of them.
	Unresolved      []Minimum
	Trials          int // Slip evaluations spent.
	NotConverged    int // Trials that no governing method could solve; of polylines, that the first of them could not.
	InadmissibleCut int // Trials left out by the rules of admissibility.
}

// MaxUnresolved bounds the list of unresolved trials that a search keeps.
const MaxUnresolved = 16
