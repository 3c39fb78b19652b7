package lem

// Workspace is the memory of one evaluation: the slices of the part at hand. Make one per goroutine; the zero value is ready. It
// grows to the largest slip seen and then allocates no more.
type Workspace struct {
	n       int // Slices in use.
	parts   []part
	slice   []slice
	arc     bool      // The slip is a circle:
	centre  Point     // its centre
	radius  float64   // and radius;
	cuts    []float64 // where it crosses layers in the column at hand,
	reaches []reach   // and its stretches between the edges of columns and such cuts.
	wet     bool      // Free water loads some slice.
	trial   int       // Evaluations since the workspace was made.

	answer     float64      // F at which the equations of the last method close, admissible or not.
	sideForce  SideForce    // Of the setting in force, for MorgensternPrice.
	side       []float64    // The side-force function between slices, from the head down.
	sidePeak   float64      // Its greatest absolute value.
	loadMoment float64      // Moment of the horizontal loads about the middles of the bases, kNm.
	forces     []sliceForce // Of the last answer that closes forces, from the head down.
}

// part is an interval of x where a slip lies below the ground, with the columns that hold its ends.
type part struct {
	from, to    float64
	first, last int
}

// slice is one slice, left to right. Signs are those of a slip that moves to the right until orient turns them.
type slice struct {
	x, y     float64 // Middle of the base, m.
	b        float64 // Width, m.
	sin, cos float64 // Of the base's inclination, positive where it falls in the direction of movement.
	tan      float64 // Tangent of the friction angle on the base.
	cl       float64 // Cohesion times base length, kN.
	ul       float64 // Pore pressure times base length, kN.
	q        float64 // Vertical force: soil, surcharge, free water, kN.
	soilW    float64 // Part of q that an earthquake acts on, kN.
	h        float64 // Horizontal push of free water on the ground, positive in the direction of movement, kN.
	hy       float64 // Level at which h acts, m.
	ground   float64 // Level of the ground at x, m.
	k        float64 // Other horizontal force, positive in the direction of movement, kN: earthquake, horizontal part of loads, water in the crack.
	ky       float64 // Level at which k acts, m.
	variable uint64  // Variable surcharges over the slice.
	shear    float64 // Horizontal pressure on the ground to the right, kPa; set where some load has any.
	length   float64 // Of the base, m; this and curve are set where some soil has a curved envelope.
	curve    envelope
	frees    float64 // Shear resistance term of Bishop: c b + (q - u b) tan.
}

// add returns the next slice to fill in.
func (ws *Workspace) add() *slice {
	if ws.n == len(ws.slice) {
		ws.slice = append(ws.slice, make([]slice, 64)...)
	}
	ws.n++
	return &ws.slice[ws.n-1]
}

// sliceForce is what a solution does to one slice and to the interface on its downhill side.
type sliceForce struct {
	normal float64 // Total normal force on the base, kN.
	e, x   float64 // Horizontal and vertical interslice force, kN.
	moment float64 // Of e about the level datum, kNm.
}
