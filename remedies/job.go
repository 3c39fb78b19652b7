package remedies

import "standfast/lem"

// Job is what is asked: the slope as it is, the situations it must stand in, the limits of the site and the remedies to size.
type Job struct {
	Title  string
	Length float64 // Run of the works along the slope, m.

	Section    lem.Section // As it is: Section.Ground equals its GroundBefore.
	Crest, Toe lem.Point   // Of the slope to be remedied, before works.
	Clay       []bool      // By soil: slow-draining; fill on it gets an end-of-construction check.

	Waters     []WaterLine
	Situations []Situation
	Stage      StageSettings

	Limits    Limits
	OnSite    []OnSiteFill  // Material of the site that may serve as fill; none: all fill is brought, all cut is taken away.
	Economics Economics     // Rates and factors of the user's own.
	Objective Objective     // What is made least.
	Swings    Swings        // How far inputs may be off, for the sensitivity of the answer.
	MinDepth  float64       // Depth of interest: slips nowhere deeper below ground than this are left out, m.
	Head      lem.Range     // Daylight range of slips at the head; zero: everywhere.
	Exit      lem.Range     // Daylight range of slips at the toe; zero: everywhere.
	Direction lem.Direction // Movement that searches look at.
	SideForce lem.SideForce // Side-force function of Morgenstern-Price; zero: half sine.

	Observed *Observed // A slip that has happened; nil: none.

	Requests []Request // Remedies to size.
	Trials   []Trial   // The user's own works, only checked.
	// Combinations are sized together beyond the pairs: each lists names of kinds in Requests.
	Combinations [][]string
}

// Facing returns +1 if the slope descends to the right, -1 if it descends to the left.
func (j *Job) Facing() float64 {
	if j.Toe.X < j.Crest.X {
		return -1
	}
	return 1
}

// Height returns the height of the slope from toe to crest, m.
func (j *Job) Height() float64 { return j.Crest.Y - j.Toe.Y }

// WaterLine is a state of the pore water under its name: a piezometric line, with what differs from it. A line is clipped to the ground where
// works cut below it, unless it is artesian.
type WaterLine struct {
	Name     string
	Line     lem.Profile // nil: dry but for what follows.
	Artesian bool
	BySoil   []SoilLine          // Lines of single soils, in place of Line.
	Points   []lem.PressurePoint // Known pore pressures, in place of all lines. Works do not change them.
	Inclined bool                // Pressure below every line is reduced by the square of the cosine of its inclination.
}

// SoilLine is the piezometric line of one soil: perched or artesian water.
type SoilLine struct {
	Soil     int
	Line     lem.Profile
	Artesian bool
}

// Situation is a design situation: a state of the ground with the factor of safety required in it.
type Situation struct {
	Name      string
	Water     int // Index into Job.Waters; -1: dry.
	Free      []lem.FreeWater
	Undrained []bool  // By soil; nil: all drained.
	Kh        float64 // Outward pseudo-static coefficient.
	Kv        float64 // Vertical pseudo-static coefficient, positive downward.
	// RequiredFS is the factor of safety required. When RatioToExisting is not 0 it is resolved by Study as that ratio times the
	// FS of the existing slope in this situation.
	RequiredFS      float64
	RatioToExisting float64
	// Drains lower the pore pressure already, as in a proposed section; nil: none.
	Drains        *lem.Drawdown
	DrainsWorking float64 // Share of the drains' effect that counts in this situation, 0 to 1.
}

// StageSettings hold for construction stages.
type StageSettings struct {
	Given      bool    // False: the case has no stage settings and stages are not checked, which the output says.
	Water      int     // Index into Job.Waters; -1: dry.
	RequiredFS float64 // FS required in every stage.
	Plant      float64 // Pressure of construction plant, kPa; 0: none is counted. Usual: 10 to 20 kPa (common practice, no source).
}

// Limits are the limits of the works.
type Limits struct {
	Left, Right *Fence // The works stay between; nil: no limit on that side.
	KeepClear   []KeepClear
	MaxLevels   []MaxLevel
	Overhead    []Overhead
	Outfall     *float64 // Lowest level at which a drain can discharge, m; nil: none given.
	Batters     Batters
	MinBench    float64  // Least width of a bench, m; 0: no limit.
	MinHaul     float64  // Least width of a berm, buttress or platform that plant travels on, m; 0: no limit.
	MaxImport   *float64 // Most fill brought to the site, compacted m3 for the whole length; nil: no limit.
}

// Batters are the steepest faces allowed, as n of 1V:nH; 0: no limit.
type Batters struct {
	Permanent float64 // Faces that stay, such as for mowing; a face of free-draining rockfill is not held to it.
	Temporary float64 // Faces that stand open during construction.
}

// Overhead is a line or a structure above the ground: the ground after works must stay clear of it by the clearance.
type Overhead struct {
	Name       string
	FromX, ToX float64
	Level      float64 // Of its lowest part, m.
	Clearance  float64 // m.
}

// Fence is a side limit of the works.
type Fence struct {
	Name string // As the user calls it; "left limit" or "right limit" if not named.
	X    float64
}

// KeepClear is a zone that no dig or no load may enter.
type KeepClear struct {
	Name       string
	FromX, ToX float64
	NoDig      bool
	NoLoad     bool
	// DigBelow, when not nil, is the depth below ground before works down to which digging is still allowed, m.
	DigBelow *float64
}

// MaxLevel is the greatest level of the ground after works between FromX and ToX, m.
type MaxLevel struct {
	Name       string
	FromX, ToX float64
	Level      float64
}
