package remedies

import (
	"standfast/lem"
	"standfast/optimize"
)

// Parameter is one number of a remedy, as data that the case-file reader, its schema and the starter case all use.
type Parameter struct {
	Name     string  // Key in the case file, such as "top_width".
	Unit     string  // "m", "1" for a ratio, "1V:nH" for a batter.
	Meaning  string  // One sentence for people.
	Min, Max float64 // Values outside make no sense and are refused.
	Default  optimize.Axis
	Optional bool // May be absent; Apply then sees NaN and Default is not used.
}

// Choice is a setting of a remedy that is a name and not a number.
type Choice struct {
	Name     string   // Key in the case file, such as "fill".
	Soil     bool     // The value names a soil; otherwise it is one of Values.
	Values   []string // Allowed words when Soil is false; the first is the default.
	Meaning  string
	Optional bool // A soil that may be absent.
}

// Kind is an entry of the catalogue: a remedy before anybody chose its settings.
type Kind struct {
	Name       string // Key in the case file: "berm".
	Title      string // For people: "toe berm".
	Summary    string // One sentence.
	Parameters []Parameter
	Choices    []Choice
	WhatIf     bool   // Shows what could be; listed last and never the answer.
	Place      string // Where it works: "face", "head", "toe", "slip", "water", "toe water", "crest water"; two remedies of one place do not make a pair.
	order      order
	// New makes the remedy for a job and settings. Its errors are faults of the request, in words for the user.
	New func(j *Job, r *Request) (Remedy, error)
}

// order is the place of a remedy when several are folded: cuts before fills, so that fill lies on the ground that it will lie on, exchanged
// ground between them, and drains last, since their effect depends on the water line that they find.
type order uint8

const (
	orderCut order = iota
	orderExchange
	orderFill
	orderWater
	orderDrains
	orderElements
)

// Request is a remedy that the user wants sized.
type Request struct {
	Kind  string
	Axes  []optimize.Axis   // One for each parameter of the kind, in its order; an absent optional parameter has an empty Name.
	Soils map[string]int    // Choice name to soil index.
	Words map[string]string // Choice name to word.
}

// Trial is the user's own proposal: works of fixed dimensions that are only checked.
type Trial struct {
	Name     string
	Requests []Request // Applied in order; every axis is a single value.
}

// Remedy is a remedy with its settings chosen, ready to be applied at any parameter vector.
type Remedy interface {
	// Apply adds the works with parameters x (in the order of the kind's Parameters, NaN for an absent one) to a proposal. It always
	// adds the same checks in the same order, whatever x. The proposal passed in is not changed.
	Apply(j *Job, on *Proposal, x []float64) *Proposal
}

// Proposal is a section after works, with what they need.
type Proposal struct {
	Section    lem.Section
	Waters     []lem.Water // After works, by situation of the job.
	Stages     []Check     // Stage checks that the works add; use Checks for the whole list.
	Quantities Quantities
	Violations []Violation
	Dimensions []Dimension // What a drawing should dimension.
	NotChecked []string    // Checks that could not be made, each with the reason; an option that has any cannot meet the target.
	HandChecks []HandCheck // Closed forms told beside the checks.
	Notes      []string    // What the works changed silently, such as a water line clipped to the new ground.

	variants   []variant       // Further states of the water in which situations must be met.
	stageWater lem.Water       // Of the job's stages, after works.
	mayCut     bool            // Some size of the works applied can cut.
	mayFill    bool            // Some size of the works applied can place fill.
	exchanges  bool            // Some size of the works applied digs ground out and replaces it.
	fillFirst  bool            // Fill is among the works applied that has to come before any cut.
	drained    *lem.Drawdown   // Of the drains applied, on the stage's water; nil if no drains are applied or they lower nothing there.
	mayDrain   bool            // Drains are among the works applied.
	plant      []lem.Surcharge // Where plant works: on the level parts of the works.
	exchanged  []lem.Range     // Where ground is dug out and replaced up to the ground as it was.
	loaded     []float64       // By soil: area of it that fill loads, m2.
}

// Check is a state that the works must stand in: a design situation or a construction stage.
type Check struct {
	Name       string
	Stage      bool
	Note       string // Which variant of a situation this is, such as "midspan between drains"; "" for the situation itself.
	Section    *lem.Section
	Situation  lem.Situation
	Required   float64 // FS required.
	SituationI int     // Index into Job.Situations that the check belongs to; -1 for a stage.
	// Advisory: nothing is asked of it. Required is 0, so that it never governs; its FS is told beside the check that does.
	Advisory bool
	// Panels, when not nil, says that the section is the mean over open and intact lengths of a hole dug in panels.
	Panels *Panels
}

// Violation is a limit of the works that a design breaks.
type Violation struct {
	Limit  string  // Name of the limit.
	Detail string  // In words, such as "toe of berm at x = 59.3 m, limit 58.5 m".
	By     float64 // How far beyond, m; m3 for the limit on imported fill.
	// Geometry says that the works cannot be drawn at all, whatever the limits of the site.
	Geometry bool
}

// Dimension is one dimension of the works to be drawn: a measured length between two points, with its label.
type Dimension struct {
	From, To lem.Point
	Label    string // Such as "top width 5.50 m" or "1V:2.0H".
	Batter   bool   // The label describes the slope of the line From-To, which is not itself measured.
}

// Label returns the name of the check with its variant.
func (c *Check) Label() string {
	if c.Note == "" {
		return c.Name
	}
	return c.Name + ", " + c.Note
}
