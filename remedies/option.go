package remedies

import (
	"standfast/lem"
	"standfast/optimize"
)

// OptionStatus says what a sizing came to.
type OptionStatus uint8

// The statuses of an option.
const (
	MeetsTarget OptionStatus = iota // Every check stands at or above its required FS.
	Infeasible                      // No design of the lattice within the limits meets every check.
	Unresolved                      // The engine could not judge the design, or a check could not be made.
	Existing                        // The slope as it is.
	Fails                           // A trial of the user's own that does not meet every check.
)

// String returns the status in the words of the result file.
func (s OptionStatus) String() string {
	return [...]string{"meets target", "infeasible", "unresolved", "existing", "fails"}[s]
}

// Value is a parameter of an option with the size found for it.
type Value struct {
	Name, Unit string
	Value      float64
}

// Outcome is the answer to one check: the lowest converged, admissible FS over the governing methods.
type Outcome struct {
	Check    Check
	FS       float64 // NaN if nothing converged.
	Method   lem.Method
	ByMethod map[lem.Method]float64 // FS of every method on the governing slip; a method that did not converge is absent.
	Slip     lem.Slip
	From, To lem.Point // Where the slip leaves the ground.
	Depth    float64   // Greatest vertical depth of the slip below the ground, m.
	Crack    float64   // Depth of the tension crack that the slip ends in at its head, m; 0: none.
	Resolved bool      // False: a trial that no governing method could solve had a screen below the required FS.

	setting lem.Setting // With what the slip was found.
}

// Margin returns FS less the required FS.
func (o *Outcome) Margin() float64 { return o.FS - o.Check.Required }

// Option is a remedy (or a trial, or the existing slope) with its answer.
type Option struct {
	Name     string   // Kind name, or the trial's name, or "existing".
	Title    string   // For people.
	Remedies []string // Kinds applied, in order.
	Status   OptionStatus
	Reason   string // One sentence why the status is what it is; for Infeasible with the best FS reached and what binds.
	Binding  string // The limit or check that binds; "" when none does.
	WhatIf   bool
	Trial    bool

	Parameters []Value
	Proposal   *Proposal
	Situations []Outcome // In the order of the job's situations, variants behind their situation.
	Stages     []Outcome
	StepLess   []StepLess // Why one step less of each parameter fails.

	Relaxations []Relaxation // What moving a limit that binds would save.
	Sensitivity []Bar        // How the least FS swings with the inputs.

	Certificate *Certificate // nil for the existing slope and for trials.
	Tradeoff    []TradeoffPoint
	Front       *Front // Of several remedies that meet the target, drains whose metres are sized among them; nil if none was asked for.
}

// Governing returns the outcome with the least margin; nil if there is none.
func (o *Option) Governing() *Outcome {
	var g *Outcome
	for _, list := range [][]Outcome{o.Situations, o.Stages} {
		for i := range list {
			if c := &list[i]; g == nil || !(c.Margin() >= g.Margin()) {
				g = c
			}
		}
	}
	return g
}

// StepLess tells why the design with one parameter a step cheaper is not the answer.
type StepLess struct {
	Parameter string
	Value     float64
	Check     string  // The check that fails; "" when a limit forbids the design.
	FS        float64 // Of the witness slip; NaN when a limit forbids the design.
	Required  float64
	Limit     string // The limit that forbids it.
}

// Cut is a slip with the check and setting it was found in; it is always evaluated as it was found.
type Cut struct {
	Check   uint16
	Setting lem.Setting
	Slip    lem.Slip
}

// Certificate says what an answer rests on: a witness for every cheaper design of the lattice, and the audit that the answer passed.
type Certificate struct {
	Axes               []optimize.Axis
	Coarsened          bool
	Steps              []float64 // By axis: the step asked for; nil unless the lattice was coarsened.
	CheaperDesigns     int       // Designs on the lattice, within the limits, cheaper than the answer (all of them when infeasible).
	Witnessed          int
	Forbidden          int // Designs that a limit or geometry forbids.
	UnresolvedDesigns  int
	ContinuousEstimate float64 // Earthworks of the continuous estimate, m3/m; NaN when there is none, or when something else is made least.
	Allowance          float64 // FS that the answer had to exceed the requirement by.
	Searches           int     // One search is one check of one design.
	AuditSearches      int
	DesignsSearched    int // In full, by exchange and walk together.
	ExchangeDesigns    int // Those of them that the exchange searched.
	SlipEvaluations    int
	AuditLowest        []AuditLow
	Pool               []Cut
	Witnesses          []Witness
}

// AuditLow is the lowest FS that the audit found in one check.
type AuditLow struct {
	Check    string
	FS       float64
	Method   lem.Method
	Required float64
}

// Witness shows that one cheaper design fails: the cut of the pool that rejects it.
type Witness struct {
	X          []float64
	Earthworks float64
	Cut        int32 // Index into Certificate.Pool.
	FS         float64
}

// TradeoffPoint is one point of the curve of earthworks against what is asked.
type TradeoffPoint struct {
	Shift      float64 // Added to the required FS of every check.
	RequiredFS float64 // Required FS of the situation that governs the sized option, shifted.
	Reached    float64 // FS of that situation at this point's design.
	Earthworks float64 // m3/m.
	Drain      float64 // m per m run.
	Parameters []Value
	Proposal   *Proposal // The works of this point.
	Situations []Outcome // Answers to the design situations, searched and not audited; Required is as specified, without the shift.
	Stages     []Outcome // Answers to the stages, likewise.
}

// Result is the whole answer to a job.
type Result struct {
	Job      *Job
	Settings Settings
	Existing Option
	Options  []Option // In ascending order of what is made least; what-ifs behind them, those that fail last.
	Least    string   // Name of the option with the least of what is made least, "existing" if nothing is needed, "" if nothing meets the target.
	Points   *Points  // Everything sized again at the points of a back-analysis; nil: not asked for, or no slip observed.
}
