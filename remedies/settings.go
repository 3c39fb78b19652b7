package remedies

// Settings are the settings of a study. The zero value is the default.
type Settings struct {
	Workers     int     // Goroutines; 0: all cores. The answer does not depend on it.
	Seed        uint64  // Of the searches.
	Slices      int     // Slices of a slip in a search; 0: the engine's default.
	Allowance   float64 // FS by which an answer must exceed the requirement; 0: DefaultAllowance.
	Curves      bool    // Also size each single remedy for a range of required FS.
	Pairs       bool    // Also size every compatible pair of remedies.
	Fronts      bool    // Also find the front of earthworks against metres of drain of remedies sized together with drains.
	Relaxations bool    // Also size each answer with the limits that bind moved a little.
	Sensitivity bool    // Also swing the inputs by Job.Swings: of the slope as it is, single remedies and pairs that meet the target.
	Points      bool    // Also size everything at the low, the middle and the high point of the back-analysis of Job.Observed, if there is one.
	Progress    func(Progress)
	Finished    func(*Option) // Told of each option as soon as it is sized, single remedies first; what Curves, Relaxations and Sensitivity ask comes after all.
}

// DefaultAllowance is the allowance for the search being finite: a design is accepted when every FS is at least the required FS
// plus this, unrounded.
const DefaultAllowance = 0.005

// Progress is told to the caller while a study runs.
type Progress struct {
	Option string  // Being sized.
	Done   int     // Options finished.
	Total  int     // Options in all.
	Share  float64 // Of this option, 0 to 1, an estimate.
}
