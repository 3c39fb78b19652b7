package lem

import "math"

// Reason says why a slip is inadmissible: its FS would be a number without sense and does not count. The rules err towards letting a slip
// count, since a slip that is left out cannot govern.
type Reason uint8

// The reasons, in the order in which they are looked for.
const (
	Admissible     Reason = iota
	NotDaylighting        // The slip does not come up to the ground at both ends.
	BelowFirmBase         // The slip passes below the firm base.
	CirclesOnly           // The method is for circles, the slip is none.
	// SmallMAlpha: where the base rises towards the exit, m-alpha = cos(alpha) + sin(alpha) tan(phi)/F is below 0.2 (Whitman and Bailey 1967
	// warn below 0.2; recalled from memory), so that the normal force on the base grows without sense. It also bars exits much steeper than passive.
	SmallMAlpha
	// InclinedForce: the force between slices is so inclined that 1 + lambda f tan(alpha - phi_m) is not positive: it stands in line with the
	// reaction of the base, and the slice cannot be in equilibrium. Spencer and Morgenstern-Price only, like those that follow.
	InclinedForce
	// ThrustOutside: where the interslice force is at least a fifth of its greatest value, the line of thrust lies more than half the height
	// of the interface below the slip or above the ground (common practice wants it inside; the margin is ours, since a thrust line somewhat
	// outside changes F little).
	ThrustOutside
	// BaseTension: the total normal forces on the base that pull outweigh those that press: the body would hang on its base. Some tension near
	// the head, as cohesion brings with it, is no reason (common practice, no source).
	BaseTension
	numReasons
)

var reasonWords = [numReasons]string{
	"admissible", "slip does not daylight at both ends", "slip passes below the firm base", "method is for circles only",
	"m-alpha too small at the exit", "interslice force too inclined", "line of thrust far outside", "tension over the base",
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
	minMAlpha    = 0.2
	thrustBelow  = 0.5 // Thrust may run this share of the interface's height below its base
	thrustAbove  = 0.5 // or above the ground,
	thrustCounts = 0.2 // looked at where the interslice force is at least this share of its greatest value.
)

// admitted returns F with the verdict of the m-alpha rule.
func (ws *Workspace) admitted(f float64) (float64, Status) {
	ss := ws.slice[:ws.n]
	for i := range ss {
		s := &ss[i]
		if s.sin < 0 && s.cos*f+s.sin*s.tan < minMAlpha*f {
			return f, Inadmissible
		}
	}
	return f, Converged
}

// verdict judges an answer that closes forces and moments.
func (ws *Workspace) verdict(f, lambda float64, leftward bool) Reason {
	if _, st := ws.admitted(f); st != Converged {
		return SmallMAlpha
	}
	if !ws.trace(f, lambda, leftward) {
		return InclinedForce
	}
	var greatest, press, pull float64
	fs := ws.forces[:ws.n]
	for j := range fs {
		greatest = max(greatest, fs[j].e, -fs[j].e)
		press += max(fs[j].normal, 0)
		pull -= min(fs[j].normal, 0)
	}
	for j := range ws.n - 1 {
		if math.Abs(fs[j].e) < thrustCounts*greatest {
			continue
		}
		base, height := ws.interfaceAt(j, leftward)
		level := fs[j].moment/fs[j].e + ws.slice[0].y
		if above := level - base; height > 0 && (above < -thrustBelow*height || above > (1+thrustAbove)*height) {
			return ThrustOutside
		}
	}
	if pull > press {
		return BaseTension
	}
	return Admissible
}

// trace runs through the slices at an answer and keeps the forces in ws.forces. It reports whether every 1 + g lambda f is positive.
func (ws *Workspace) trace(f, lambda float64, leftward bool) bool {
	ss := ws.slice[:ws.n]
	if len(ws.forces) < len(ss) {
		ws.forces = make([]sliceForce, 2*len(ss))
	}
	datum := ss[0].y
	var was sliceForce
	ok := true
	for j := range ss {
		s := &ss[ws.fromHead(j, leftward)]
		t := s.tan / f
		m := 1 / (s.cos + s.sin*t)
		g := (s.sin - s.cos*t) * m
		c := (s.cl - s.ul*s.tan) / f
		right := 1 + g*lambda*ws.side[j+1]
		ok = ok && right > 0
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
	return ok
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
