package lem

// SlipKind tells how a slip surface is described.
type SlipKind uint8

// The kinds of slip surface.
const (
	Circle   SlipKind = iota // Centre and Radius; the lower arc.
	Polyline                 // Nodes from left to right.
)

// Slip is a slip surface as geometry alone: it can be evaluated on any section. A circle stands for every part of its lower arc
// that lies below the ground; each part is a slip of its own. A polyline is cut at the ground, and its end segments run
// on to daylight.
type Slip struct {
	Kind   SlipKind
	Centre Point   // Circle only.
	Radius float64 // Circle only, m.
	Nodes  []Point // Polyline only, X strictly increasing.
}

// Setting says how a slip is evaluated, and which parts of it count.
type Setting struct {
	Method Method
	Slices int // Target number of slices; a slip always has at least MinSlices. 0: DefaultSlices.
	// MinDepth is the depth of interest, m: parts of the slip whose greatest vertical depth is less are left out.
	MinDepth float64
	Window   Window
	// SideForce is the side-force function of MorgensternPrice; the other methods do not look at it.
	SideForce SideForce
}

// Window limits the slips that count by their movement and by where they leave the ground. The zero value lets all count.
type Window struct {
	Direction Direction
	Head      Range // Where a slip may leave the ground at its head.
	Toe       Range // Where a slip may leave the ground at its toe.
}

// Direction limits the movement that is looked at.
type Direction uint8

// The directions of movement.
const (
	EitherWay Direction = iota
	LeftwardOnly
	RightwardOnly
)

// Range is an interval of x, m. The zero value means everywhere.
type Range struct{ From, To float64 }

func (r Range) holds(x float64) bool { return r == Range{} || r.From <= x && x <= r.To }

// admits reports whether a slip with this result counts.
func (w *Window) admits(r *Result) bool {
	if w.Direction == LeftwardOnly && !r.Leftward || w.Direction == RightwardOnly && r.Leftward {
		return false
	}
	head, exit := r.ends()
	return w.Head.holds(head) && w.Toe.holds(exit)
}

// MinSlices is the least number of slices of any slip (common practice, no source).
const MinSlices = 5

// DefaultSlices is the default target number of slices; docs/theory.md has the convergence study behind it.
const DefaultSlices = 30

// Status says what an evaluation came to.
type Status uint8

// The statuses of an evaluation.
const (
	Missed       Status = iota // No part of the slip lies below the ground, is deep enough and moves downhill.
	Converged                  // F is the factor of safety of the slip.
	Inadmissible               // Every part breaks a rule of admissibility (m-alpha too small, arc not daylighting, exit steeper than passive).
	NotConverged               // The equations have no answer that the method can reach; F is NaN.
)

// String returns the status in words.
func (s Status) String() string {
	return [...]string{"missed", "converged", "inadmissible", "not converged"}[s]
}

// Result is the outcome of evaluating one slip: that of its part with the lowest F.
type Result struct {
	F        float64 // Factor of safety; NaN unless Status is Converged.
	Status   Status
	Reason   Reason  // Why the status is Inadmissible.
	Lambda   float64 // Spencer and Morgenstern-Price: ratio of vertical to horizontal interslice force where f is 1.
	From, To Point   // Ends of the part on the ground, left and right.
	Depth    float64 // Greatest vertical depth of the part below the ground, m.
	Leftward bool    // True if the part moves to the left.
	Crack    float64 // Depth of the tension crack that the slip ends in at its head, m; From or To is then the mouth of the crack. 0: none.
	Slices   int     // Number of slices used.
	Screen   float64 // When NotConverged: FS of the Ordinary method on the same part, as a screen; else NaN.
}

// ends returns x of the head and of the exit of a slip.
func (r *Result) ends() (head, exit float64) {
	if r.Leftward {
		return r.To.X, r.From.X
	}
	return r.From.X, r.To.X
}
