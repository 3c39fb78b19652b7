package remedies

import "math"

// BasicParabola returns the ordinate y0 at the focus, m, of the parabola that Casagrande (1937) takes for the water line in a dam that ends in a
// drain, the focus: the parabola passes through a point h above the focus and d behind it, m, so that y0 = sqrt(h^2 + d^2) - d. The flow is
// K y0. In ground with kx along and ky across the layers, lengths along are first multiplied by sqrt(ky/kx), and K is sqrt(kx ky).
func BasicParabola(h, d float64) float64 { return math.Hypot(h, d) - d }
