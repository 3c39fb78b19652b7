package cli

import "math"

// rigorous is the method of Morgenstern and Price (1965, Geotechnique 15) on any slip, with X = lambda shape(s) E between slices, s from 0 at
// the head to 1 at the exit; a constant shape is Spencer's method (1967, Geotechnique 17). For each of many lambdas, F is halved until the
// horizontal forces close near want: further off, a slice whose denominator vanishes can feign closure. Between lambdas where the
// moment of all forces about the origin changes its sign, lambda is halved until it vanishes. Of several answers it returns the one nearest to
// want.
func rigorous(shape func(s float64) float64, want float64) solution {
	return func(ss []theirSlice) float64 {
		best := math.NaN()
		const least, most, steps = -0.4, 1.6, 40
		previous, atPrevious := math.NaN(), math.NaN()
		for i := range steps + 1 {
			lambda := least + (most-least)*float64(i)/steps
			moment, _ := closed(ss, shape, lambda, want)
			if moment*atPrevious < 0 {
				a, b := previous, lambda
				for range 25 {
					mid := (a + b) / 2
					if m, _ := closed(ss, shape, mid, want); m*atPrevious > 0 {
						a = mid
					} else {
						b = mid
					}
				}
				if m, f := closed(ss, shape, a, want); math.Abs(m) < 1e-3*math.Abs(atPrevious) && !(math.Abs(best-want) <= math.Abs(f-want)) {
					best = f
				}
			}
			previous, atPrevious = lambda, moment
		}
		return best
	}
}

// sideForce is the side-force function that the settings name.
func (f *theirFile) sideForce(s float64) float64 {
	switch side := &f.Settings.SideForce; side.Function {
	case "half-sine":
		return math.Sin(math.Pi * s)
	case "constant":
		return 1
	case "given":
		last := len(side.Ordinates) - 1
		i := min(int(s*float64(last)), last-1)
		return side.Ordinates[i] + (side.Ordinates[i+1]-side.Ordinates[i])*(s*float64(last)-float64(i))
	}
	return math.NaN()
}

// asides are the factors of want within which F is looked for, one after the other.
var asides = []float64{1.01, 1.03, 1.1, 1.3, 1.8}

// closed returns the F at which horizontal forces close at this lambda, and the moment about the origin that is left; NaN if they close
// nowhere near want.
func closed(ss []theirSlice, shape func(s float64) float64, lambda, want float64) (moment, f float64) {
	low, high, least, most := 0.0, 0.0, 0.0, 0.0
	for _, aside := range asides {
		low, high = want/aside, want*aside
		least, _ = forces(ss, shape, lambda, low)
		if most, _ = forces(ss, shape, lambda, high); least < 0 && most > 0 {
			break
		}
	}
	if !(least < 0 && most > 0) {
		return math.NaN(), math.NaN()
	}
	left := 0.0
	for range 30 {
		f = (low + high) / 2
		if left, moment = forces(ss, shape, lambda, f); left > 0 { // Too little resistance: the last slice still pushes.
			high = f
		} else {
			low = f
		}
	}
	if !(math.Abs(left) < 1e-6*(most-least)) { // A jump and no closure.
		return math.NaN(), math.NaN()
	}
	return moment, f
}

// forces goes through the slices from the head, each in equilibrium of horizontal and vertical forces, and returns the force that is left
// at the exit and the moment, clockwise, of all outer forces about the origin: loads, and normal and shear forces at the middles of bases.
func forces(ss []theirSlice, shape func(s float64) float64, lambda, f float64) (left, moment float64) {
	var e float64 // Thrust on the uphill side.
	for i, s := range ss {
		up, down := lambda*shape(float64(i)/float64(len(ss))), lambda*shape(float64(i+1)/float64(len(ss)))
		cos := math.Sqrt(1 - s.sin*s.sin)
		t := s.tan / f
		grip := (s.c - s.u*s.tan) * s.b / cos / f // Shear force is grip + normal force x t.
		load := s.push + s.shake
		// Normal force n = (q + up e - down e2 - grip sin)/(cos + sin t); thrust e2 = e + load + n sin - (grip + n t) cos.
		g := (s.sin - t*cos) / (cos + s.sin*t)
		e2 := (e*(1+g*up) + load + g*(s.q-grip*s.sin) - grip*cos) / (1 + g*down)
		n := (s.q + up*e - down*e2 - grip*s.sin) / (cos + s.sin*t)
		shear := grip + n*t
		moment += s.q*s.x + s.push*s.pushY + s.shake*s.shakeY
		moment += n*(s.sin*s.y-cos*s.x) - shear*(cos*s.y+s.sin*s.x)
		e = e2
	}
	return e, moment
}
