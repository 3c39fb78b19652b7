package validation

import (
	"fmt"
	"math"
)

// Work is a source of values.
type Work struct {
	Name     string // Author and year.
	Title    string // What it is, and where it appeared.
	Recalled bool   // Its values are recalled from memory.
}

// Confidence says how sure it is that the inputs and the value of a check belong together as the source has them.
type Confidence uint8

// The confidences.
const (
	Exact  Confidence = iota // A closed form, worked out from its formula.
	High                     // Inputs and value of a publication, complete.
	Medium                   // Something is inferred, read from a chart, or left out by the source.
)

// String returns the confidence in a word.
func (c Confidence) String() string { return [...]string{"exact", "high", "medium"}[c] }

// Check is one value that the program must reproduce.
type Check struct {
	Case       string // What is calculated.
	What       string // The quantity, such as "FS, Bishop".
	Unit       string // "" for a ratio.
	Work       *Work
	Place      string // Where in the work; "" for all of it.
	Confidence Confidence
	Want       float64 // As published.
	Low, High  float64 // Accepted, both ends included.
	Why        string  // Why the accepted range is what it is.
	// Explained says why the check fails, if it does: it must then read low.
	Explained string
	Run       func() (float64, error)
}

// Outcome is a check with the program's answer.
type Outcome struct {
	Check
	Got  float64
	Pass bool
}

// run answers a check.
func (c *Check) run() (Outcome, error) {
	got, err := c.Run()
	if err != nil {
		return Outcome{}, fmt.Errorf("%s, %s: %w", c.Case, c.What, err)
	}
	return Outcome{*c, got, got >= c.Low && got <= c.High}, nil
}

// Difference returns the relative difference of the answer from the published value.
func (o *Outcome) Difference() float64 { return (o.Got - o.Want) / math.Abs(o.Want) }

// Group is a table of checks of one kind.
type Group struct {
	Title  string
	Checks []Check
}

// Groups returns every check.
func Groups() []Group {
	return []Group{
		{"Calculations by slices, number for number", tableChecks()},
		{"Slips that a source specifies", slipChecks()},
		{"Critical slips, searched for", searchChecks()},
		{"Stability charts", chartChecks()},
		{"Planes: infinite slopes, wedges and thrusts", planeChecks()},
		{"Rock slide in probabilities", rockChecks()},
		{"Loads", loadChecks()},
		{"Neutral points", neutralChecks()},
		{"Water", waterChecks()},
		{"Quantities", volumeChecks()},
	}
}

// within accepts a relative difference either way.
func (c Check) within(rel float64, why string) Check {
	d := rel * math.Abs(c.Want)
	c.Low, c.High, c.Why = c.Want-d, c.Want+d, why
	return c
}

// between accepts a range.
func (c Check) between(low, high float64, why string) Check {
	c.Low, c.High, c.Why = low, high, why
	return c
}
