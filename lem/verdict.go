package lem

import "math"

// Reason says why a slip is inadmissible: its FS would be a number without sense and does not count. The rules err towards letting a slip
// count, since a slip that is left out cannot govern.
type Reason uint8

// The reasons, in the order in which they are looked for.
const (
	Admissible     Reason = iota
	NotDaylighting        // The slip does not come up to the ground of the section at both ends.
	BelowFirmBase         // The slip passes below the firm base.
	CirclesOnly           // The method is for circles, the slip is none.
	// SmallMAlpha: where the base rises towards the exit, m-alpha = cos(alpha) + sin(alpha) tan(phi)/F is below 0.2 (Whitman and Bailey 1967
	// warn below 0.2; recalled from memory), so that the normal force on the base grows without sense. It also bars exits much steeper than passive.
	SmallMAlpha
	// ReversedDrag, of Spencer and Morgenstern-Price like those that follow: lambda f is below 0 where f is greatest: the downhill side of a slice would hold up the uphill side, which sinks. On sharply
	// bent slips the two equations have such roots, with an F too low, alone or beside the true one.
	ReversedDrag
	// BaseTension: the total normal forces on the base that pull outweigh those that press: the body would hang on its base. Some tension near the
	// head, as cohesion brings with it, is no reason (the margin is ours).
	BaseTension
	// ThrustOutside: |E| times the distance of the line of thrust from the body, below the slip or above the ground, exceeds 0.3 of the greatest
	// |E| times the greatest height of an interface. Common practice wants the line inside; the margin is ours: a line somewhat outside, or far
	// outside where E passes through zero below a head in tension, changes F little.
	ThrustOutside
	numReasons
)

var reasonWords = [numReasons]string{
	"admissible", "slip does not daylight in the section at both ends", "slip passes below the firm base", "method is for circles only",
	"m-alpha too small at the exit", "interslice drag reversed", "tension over the base", "line of thrust far outside",
}

// String returns the reason in words.
func (r Reason) String() string {
	if r < numReasons {
		return reasonWords[r]
	}
	return "unknown"
}

// Limits of the rules of admissibility.
const (
	// minMAlpha is the least m-alpha of an admissible slip.
	minMAlpha   = 0.2
	leastDrag   = -1e-6 // Of Verdict.Drag: rounding. With a margin of -0.1 lines that bend sharply far down in undrained clay had half of the F of the worst circle.
	mostThrust  = 0.3   // Of Verdict.Thrust.
	mostTension = 1.0   // Of Verdict.Tension.
)

// admitted returns F with the verdict of the m-alpha rule, for methods that have no other.
func (ws *Workspace) admitted(f float64) (float64, Status) {
	ss := ws.rising()
	for i := range ss {
		s := &ss[i]
		if s.sin < 0 && s.cos*f+s.sin*s.tan < minMAlpha*f {
			return f, Inadmissible
		}
	}
	return f, Converged
}

// Verdict is what the rules of admissibility found on an answer, with the numbers behind it.
type Verdict struct {
	Reason      Reason
	LeastMAlpha float64 // The least m-alpha of the bases that rise towards the exit; 1 if none is below.
	Drag        float64 // lambda f where f is greatest: the vertical over the horizontal force between slices.
	// Thrust is the greatest |E| times distance of the line of thrust from the body over the greatest |E| times the greatest height of an
	// interface; 0 if the line runs inside.
	Thrust  float64
	Tension float64 // Sum of the total normal forces that pull over the sum of those that press.
}

// judge applies the rules to an answer that closes forces and moments.
func (ws *Workspace) judge(f, lambda float64, leftward bool) Verdict {
	v := Verdict{LeastMAlpha: ws.leastMAlpha(f), Drag: lambda * ws.sidePeak}
	ws.trace(f, lambda, leftward)
	var greatest, highest, outside, press, pull float64
	for j := range ws.forces[:ws.n] {
		now := &ws.forces[j]
		press += max(now.normal, 0)
		pull -= min(now.normal, 0)
		if j == ws.n-1 {
			break
		}
		base, height := ws.interfaceAt(j, leftward)
		arm := now.moment - now.e*(base-ws.slice[0].y) // E times the height of the thrust above the slip.
		if now.e < 0 {
			arm = -arm
		}
		e := math.Abs(now.e)
		outside = max(outside, -arm, arm-e*height)
		greatest, highest = max(greatest, e), max(highest, height)
	}
	if outside > 0 {
		v.Thrust = outside / (greatest * highest)
	}
	v.Tension = pull / press
	switch {
	case v.LeastMAlpha < minMAlpha:
		v.Reason = SmallMAlpha
	case v.Drag < leastDrag:
		v.Reason = ReversedDrag
	case !(v.Tension <= mostTension):
		v.Reason = BaseTension
	case v.Thrust > mostThrust:
		v.Reason = ThrustOutside
	}
	return v
}

// leastMAlpha returns the least m-alpha of the bases that rise towards the exit.
func (ws *Workspace) leastMAlpha(f float64) float64 {
	least := 1.0
	ss := ws.rising()
	for i := range ss {
		if s := &ss[i]; s.sin < 0 {
			least = min(least, s.cos+s.sin*s.tan/f)
		}
	}
	return least
}

// trace runs through the slices at an answer and keeps the forces in ws.forces.
func (ws *Workspace) trace(f, lambda float64, leftward bool) {
	ss := ws.slice[:ws.n]
	if len(ws.forces) < len(ss) {
		ws.forces = make([]sliceForce, 2*len(ss))
	}
	datum := ss[0].y
	var was sliceForce
	for j := range ss {
		s := &ss[ws.fromHead(j, leftward)]
		t := s.tan / f
		m := 1 / (s.cos + s.sin*t)
		g := (s.sin - s.cos*t) * m
		c := (s.cl - s.ul*s.tan) / f
		right := 1 + g*lambda*ws.side[j+1]
		var now sliceForce
		now.e = (was.e + g*was.x + s.h + s.k + g*s.q - c*m) / right
		now.x = lambda * ws.side[j+1] * now.e
		now.normal = (s.q + was.x - now.x - c*s.sin) * m
		now.moment = was.moment + (now.e-was.e)*(s.y-datum) - (was.x+now.x)*s.b/2
		if s.h != 0 || s.k != 0 {
			now.moment += s.h*(s.hy-s.y) + s.k*(s.ky-s.y)
		}
		ws.forces[j], was = now, now
	}
}

// thrust returns the level of the line of thrust at the downhill side of the j-th slice from the head.
func (ws *Workspace) thrust(j int) float64 {
	return ws.forces[j].moment/ws.forces[j].e + ws.slice[0].y
}

// interfaceAt returns the level of the slip at the downhill side of the j-th slice from the head, and the height of the ground above it,
// interpolated between the middles of the slices.
func (ws *Workspace) interfaceAt(j int, leftward bool) (base, height float64) {
	i := ws.fromHead(j, leftward)
	side := 1.0
	other := i + 1
	if leftward {
		side, other = -1, i-1
	}
	a, b := &ws.slice[i], &ws.slice[other]
	base = ws.edge(i, side, leftward).Y
	return base, a.ground + (b.ground-a.ground)*a.b/(a.b+b.b) - base
}
