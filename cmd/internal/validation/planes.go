package validation

import (
	"errors"
	"math"

	"standfast/lem"
)

// endless is a slope without ends: its FS is what that of a long slip parallel to it tends to.
type endless struct {
	beta, depth float64 // rad, m.
	soil        lem.Soil
	undrained   bool
	// head is the height of the piezometric line above the slip, m, vertically; negative: dry.
	head float64
	kh   float64
}

// fs extrapolates from two lengths, since the share of the two ends falls with the length.
func (e endless) fs(method lem.Method) answer {
	return func() (float64, error) {
		short, err := e.finite(method, 200*e.depth)
		if err != nil {
			return 0, err
		}
		long, err := e.finite(method, 400*e.depth)
		return 2*long - short, err
	}
}

func (e endless) finite(method lem.Method, length float64) (float64, error) {
	fall := func(x float64) float64 { return -x * math.Tan(e.beta) }
	ground := lem.Profile{{X: -length, Y: fall(-length)}, {X: 2 * length, Y: fall(2 * length)}}
	s := uniform(ground, e.soil)
	sit := lem.Situation{Kh: e.kh, Undrained: []bool{e.undrained}}
	if e.undrained {
		u := *e.soil.Undrained
		u.Datum = ground
		s.Soils[0].Undrained = &u
	}
	if e.head >= 0 {
		lift := e.head - e.depth
		sit.Water.Line = lem.Profile{{X: -length, Y: fall(-length) + lift}, {X: 2 * length, Y: fall(2*length) + lift}}
	}
	d := e.depth
	slip := lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: -1.2 * d, Y: fall(-1.2*d) + 0.3*d}, {X: 0, Y: -d}, {X: length, Y: fall(length) - d}, {X: length + 5*d, Y: fall(length+5*d) + 0.3*d}}}
	return evaluate(s, &sit, &slip, lem.Setting{Method: method, Slices: fineSlices})
}

// seeping is the head above a slip whose seepage is parallel to the slope, the water reaching h above the slip: u = gamma_w h cos^2(beta).
func seeping(h, beta float64) float64 { return h * math.Pow(math.Cos(beta), 2) }

func soilOf(gamma, cohesion, friction float64) lem.Soil {
	return lem.Soil{UnitWeight: gamma, Cohesion: cohesion, Friction: friction * degree}
}

func infiniteChecks() []Check {
	const d20 = 20 * degree
	tan := func(deg float64) float64 { return math.Tan(deg * degree) }
	cos2 := math.Pow(math.Cos(d20), 2)
	ruSoil := soilOf(19, 0, 30)
	ruSoil.HasRu, ruSoil.Ru = true, 0.3
	growing := lem.Soil{UnitWeight: 18, Undrained: &lem.UndrainedStrength{Gradient: 6}}
	curved := lem.Soil{UnitWeight: 20, PowerLaw: &lem.PowerLaw{A: 0.9, B: 0.8}}
	normal := 20 * 5 * cos2 // Normal stress on a plane 5 m deep.
	ratio := lem.Soil{UnitWeight: 18, Undrained: &lem.UndrainedStrength{Ratio: 0.25}}
	rows := []struct {
		name       string
		e          endless
		want, tol  float64
		work       *Work
		place      string
		confidence Confidence
		why        string
	}{
		{"dry sand", endless{d20, 3, soilOf(20, 0, 30), false, -1, 0}, tan(30) / tan(20), 0.001, algebra, "F = tan(phi)/tan(beta)", Exact, "ends of the slip"},
		{"sand, seepage parallel to the slope, to the surface", endless{d20, 3, soilOf(20, 0, 30), false, seeping(3, d20), 0}, (1 - lem.GammaW/20) * tan(30) / tan(20), 0.001, skempton, "F = (gamma'/gamma) tan(phi)/tan(beta)", Exact, "ends of the slip"},
		{"seepage parallel to the slope, half depth, c' 5", endless{d20, 2, soilOf(19, 5, 25), false, seeping(1, d20), 0}, (5 + (19*2-lem.GammaW)*cos2*tan(25)) / (19 * 2 * math.Sin(d20) * math.Cos(d20)), 0.001, skempton, "F = [c' + (gamma z - gamma_w h) cos^2 b tan phi']/(gamma z sin b cos b)", Exact, "ends of the slip"},
		{"sand, horizontal seepage to the surface", endless{d20, 3, soilOf(20, 0, 35), false, 3, 0}, (1 - lem.GammaW/(20*cos2)) * tan(35) / tan(20), 0.001, haefeli, "u = gamma_w z: F = [1 - gamma_w/(gamma cos^2 b)] tan phi/tan b", Exact, "ends of the slip"},
		{"sand, ru 0.3", endless{d20, 3, ruSoil, false, -1, 0}, (1 - 0.3/cos2) * tan(30) / tan(20), 0.001, bishopM, "F = (1 - ru sec^2 b) tan phi/tan b", Exact, "ends of the slip"},
		{"sand at its critical acceleration, kh = tan(phi - beta)", endless{d20, 3, soilOf(20, 0, 30), false, -1, tan(10)}, 1, 0.001, seed, "sliding begins at kh = tan(phi - beta)", Exact, "ends of the slip"},
		{"undrained strength growing 6 kPa/m", endless{d20, 3, growing, true, -1, 0}, 2 * 6 / (18 * math.Sin(2*d20)), 0.001, algebra, "F = 2 k/(gamma sin 2b)", Exact, "ends of the slip"},
		{"undrained strength 0.25 of the effective stress", endless{d20, 3, ratio, true, -1, 0}, 2 * 0.25 / math.Sin(2*d20), 0.001, algebra, "F = 2 r/sin 2b, dry before works", Exact, "ends of the slip"},
		{"curved envelope tau = 0.9 pa (sigma/pa)^0.8", endless{d20, 5, curved, false, -1, 0}, 0.9 * math.Pow(normal/lem.AtmosphericPressure, 0.8) * lem.AtmosphericPressure / (normal * tan(20)), 0.002, algebra, "F = tau(gamma z cos^2 b)/(gamma z sin b cos b)", Exact, "ends of the slip, where the curve is steeper"},
		{"water to the surface, peak strength", endless{12 * degree, 5, soilOf(20, 10, 26), false, seeping(5, 12*degree), 0}, 1.66, 0.004, craig, "infinite slope, peak", High, "printed to 0.01 with gamma_w 9.8"},
		{"water to the surface, residual strength", endless{12 * degree, 5, soilOf(20, 0, 18), false, seeping(5, 12*degree), 0}, 0.78, 0.004, craig, "infinite slope, residual", High, "printed to 0.01 with gamma_w 9.8"},
		{"c' 52, phi' 26, 6 m, 22 degrees, water to the surface", endless{22 * degree, 6, soilOf(20.8, 52, 26), false, seeping(6, 22*degree), 0}, 1.837, 0.001, das, "answer worked out from the formula of infinite slopes", High, "ends of the slip"},
	}
	var out []Check
	for _, r := range rows {
		methods := []lem.Method{lem.Ordinary, lem.Spencer}
		if r.e.kh > 0 { // Spencer's line of thrust leaves the body here.
			methods = []lem.Method{lem.Ordinary, lem.JanbuPlain}
		}
		for _, method := range methods {
			c := Check{Case: "infinite slope: " + r.name, What: fsBy(method), Work: r.work, Place: r.place, Confidence: r.confidence, Want: r.want, Run: r.e.fs(method)}
			out = append(out, c.within(r.tol, r.why))
		}
	}
	return out
}

// wedge is the ground behind a face of inclination beta over its toe at (0, 0), and the plane slip at theta through the toe.
func wedge(height, beta, theta float64, soil lem.Soil) (*lem.Section, lem.Slip) {
	back := height / math.Tan(beta)
	if beta == math.Pi/2 {
		back = 0
	}
	run := height / math.Tan(theta)
	const lift = 1e-5 // Share of the height by which the plane comes out above the foot of a vertical face, so that it daylights.
	ground := lem.Profile{{X: -4 * height, Y: height}, {X: -back, Y: height}, {X: 0, Y: 0}, {X: 2 * height, Y: 0}}
	return uniform(ground, soil), lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: -run, Y: height}, {X: 0, Y: lift * height}}}
}

// lowestPlane is the lowest FS of a wall of ground held by a thrust, over planes through its toe; the thrust acts on the top of the wedge, which for
// a plane is as good as anywhere.
func lowestPlane(soil lem.Soil, height, along, up, kh float64) answer {
	return func() (float64, error) {
		lowest := math.Inf(1)
		for theta := 30 * degree; theta < 85*degree; theta += 0.05 * degree {
			s, slip := wedge(height, math.Pi/2, theta, soil)
			s.LineLoads = []lem.LineLoad{{X: slip.Nodes[0].X / 2, Vertical: -up, Horizontal: -along}}
			// The load counts towards the weight that an earthquake shakes, which a thrust is not: its share is taken off.
			s.LineLoads[0].Horizontal += kh * up
			f, err := evaluate(s, &lem.Situation{Kh: kh}, &slip, lem.Setting{Method: lem.Ordinary})
			switch {
			case errors.Is(err, errNoAnswer):
			case err != nil:
				return 0, err
			default:
				lowest = min(lowest, f)
			}
		}
		return lowest, nil
	}
}

// activeThrust is Coulomb's coefficient for a vertical wall and level ground, with the inclination psi = atan(kh) of gravity by Mononobe and Okabe:
//
//	K = cos^2(phi - psi)/{cos(psi) cos(delta + psi) [1 + sqrt(sin(phi + delta) sin(phi - psi)/cos(delta + psi))]^2}.
func activeThrust(phi, delta, psi float64) float64 {
	root := 1 + math.Sqrt(math.Sin(phi+delta)*math.Sin(phi-psi)/math.Cos(delta+psi))
	return math.Pow(math.Cos(phi-psi), 2) / (math.Cos(psi) * math.Cos(delta+psi) * root * root)
}

func thrustChecks() []Check {
	const height, gamma, kh = 6.0, 18.0, 0.15
	phi, delta := 32*degree, 20*degree
	sand := soilOf(gamma, 0, 32)
	half := gamma * height * height / 2
	ka := math.Pow(math.Tan(45*degree-phi/2), 2)
	rough, shaken := activeThrust(phi, delta, 0)*half, activeThrust(phi, delta, math.Atan(kh))*half
	clay := soilOf(gamma, 9, 20)
	kc := math.Tan(35 * degree)
	cohesive := kc*kc*half - 2*9*kc*height
	check := func(name string, soil lem.Soil, along, up, kh float64, work *Work, place string) Check {
		c := Check{Case: name, What: "FS, ordinary, lowest of all planes", Work: work, Place: place, Confidence: Exact, Want: 1, Run: lowestPlane(soil, height, along, up, kh)}
		return c.within(0.0005, "planes 0.05 degrees apart")
	}
	return []Check{
		check("vertical face of sand held by the active thrust on a smooth wall", sand, ka*half, 0, 0, rankine, "P = tan^2(45 - phi/2) gamma H^2/2"),
		check("the same in clay without crack", clay, cohesive, 0, 0, rankine, "P = K gamma H^2/2 - 2 c sqrt(K) H (Bell 1915)"),
		check("vertical face of sand held by the active thrust on a rough wall, delta 20", sand, rough*math.Cos(delta), rough*math.Sin(delta), 0, coulomb, "Ka as in the package"),
		check("the same in an earthquake, kh 0.15", sand, shaken*math.Cos(delta), shaken*math.Sin(delta), kh, okabe, "K as in the package"),
	}
}

func bankChecks() []Check {
	const gamma, cohesion = 18.0, 12.0
	beta, phi := 70*degree, 20*degree
	height := 4 * cohesion / gamma * math.Sin(beta) * math.Cos(phi) / (1 - math.Cos(beta-phi))
	s, slip := wedge(height, beta, (beta+phi)/2, soilOf(gamma, cohesion, 20))
	var out []Check
	for _, method := range []lem.Method{lem.Ordinary, lem.Spencer} {
		c := Check{Case: "plane slip in a bank of 70 degrees at its critical height", What: fsBy(method), Work: culmann, Place: "H = 4 c sin b cos phi/{gamma [1 - cos(b - phi)]}", Confidence: Exact, Want: 1, Run: fs(s, lem.Situation{}, slip, lem.Setting{Method: method})}
		out = append(out, c.within(0.0005, "finite slices"))
	}
	const crack, tall = 3.0, 6.0
	for _, share := range []float64{0, 1} {
		// Half of the height cracked: H = 2.67 c/gamma; water in the crack adds its thrust.
		v, u := lem.GammaW*share*share*crack*crack/2, math.Sqrt2*(tall-crack)
		weight := gamma * (tall*tall - crack*crack) / 2
		drive := (weight + v) / math.Sqrt2
		cracked, plane := wedge(tall, math.Pi/2, 45*degree, soilOf(gamma, drive/u, 0))
		cracked.Crack = &lem.TensionCrack{Depth: crack, WaterShare: share}
		name, place, work := "vertical bank, phi = 0, cracked to half its height: H = 2.67 c/gamma", "Hc = 2.67 c/gamma", terzaghi
		if share > 0 {
			name, place, work = "the same with the crack full of water", "block on a plane, thrust of the water added", algebra
		}
		c := Check{Case: name, What: fsBy(lem.Ordinary), Work: work, Place: place, Confidence: Exact, Want: 1, Run: fs(cracked, lem.Situation{}, plane, lem.Setting{Method: lem.Ordinary})}
		out = append(out, c.within(0.0005, "finite slices"))
	}
	return out
}

func planeChecks() []Check {
	return append(append(infiniteChecks(), bankChecks()...), thrustChecks()...)
}
