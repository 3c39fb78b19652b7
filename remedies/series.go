package remedies

import "math"

// The mean and midspan pore pressures between trench drains that reach down to soil of low permeability, from the water line fed at
// the surface: with p the pressure head over a base at depth H, drains at x = 0 and x = S (clear) in which p = 0, p = 0 along the
// line and no flow through the base, the Laplace equation has the solution
//
//	p(x, y)/H = (4/pi^2)(S/H) sum over odd n of sin(n pi x/S) sinh(n pi (H-y)/S) / (n^2 cosh(n pi H/S)),
//
// y measured up from the base (separation of variables, a closed form). The series of tanh that it leaves at the base converge
// slowly where S/H is great; there the same solution expanded in y is used.

const (
	// seriesTerms is enough for full precision: at the change-over S/H = 2 the terms fall by exp(-pi) each.
	seriesTerms = 14
	// sumCubes is the sum of 1/n^3 over odd n, 7 zeta(3)/8.
	sumCubes = 1.0517997902646449
	// catalan is the sum of (-1)^((n-1)/2)/n^2 over odd n, Catalan's constant.
	catalan = 0.9159655941772190
	// changeOver is the S/H at which both forms converge equally fast.
	changeOver = 2
)

// meanHead returns the mean pressure head on the base between drains as a share of H, for r = S/H > 0:
// (8/pi^3) r sum over odd n of tanh(n pi/r)/n^3. Since meanHead(r) + meanHead(4/r) = 1, great r need no other series.
func meanHead(r float64) float64 {
	if r > changeOver {
		return 1 - meanHead(4/r)
	}
	rest := 0.0 // of the sum of 1/n^3
	for k := range seriesTerms {
		n := float64(2*k + 1)
		rest += (1 - math.Tanh(n*math.Pi/r)) / (n * n * n)
	}
	return 8 / (math.Pi * math.Pi * math.Pi) * r * (sumCubes - rest)
}

// midspanHead returns the pressure head on the base midway between drains as a share of H, for r = S/H > 0:
// (4/pi^2) r sum over odd n of (-1)^((n-1)/2) tanh(n pi/r)/n^2, which is 1 - (8/pi^2) sum over odd n of sech(n pi r/4)/n^2.
func midspanHead(r float64) float64 {
	var sum float64
	if r > changeOver {
		for k := range seriesTerms {
			n := float64(2*k + 1)
			sum += 1 / (n * n * math.Cosh(n*math.Pi*r/4))
		}
		return 1 - 8/(math.Pi*math.Pi)*sum
	}
	sign := 1.0
	for k := range seriesTerms {
		n := float64(2*k + 1)
		sum += sign * (1 - math.Tanh(n*math.Pi/r)) / (n * n)
		sign = -sign
	}
	return 4 / (math.Pi * math.Pi) * r * (catalan - sum)
}

// midspanOverMean is how much greater the head midway between drains is than the mean where only the mean is known: that of a
// parabola between drains (Dupuit; closed form). For full penetration the series gives at most 1.37.
const midspanOverMean = 1.5
