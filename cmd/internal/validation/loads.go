package validation

import (
	"math"

	"standfast/lem"
)

// stripOnArc is a strip load on weightless undrained ground, which an arc through one edge with its centre above the other just carries.
func stripOnArc(rise, ratio float64, method lem.Method) answer {
	const width, cu = 10.0, 20.0
	s := uniform(lem.Profile{{X: -30, Y: 0}, {X: 30, Y: 0}}, lem.Soil{Cohesion: cu})
	s.Loads = []lem.Surcharge{{FromX: -width, ToX: 0, Pressure: ratio * cu}}
	slip := lem.Slip{Centre: lem.Point{X: 0, Y: rise}, Radius: math.Hypot(width, rise)}
	return fs(s, lem.Situation{}, slip, lem.Setting{Method: method, Slices: fineSlices})
}

// loadedBlock is a block on a plane at 30 degrees with loads whose sums are given, and its exact FS.
func loadedBlock(loads []lem.Surcharge, lines []lem.LineLoad, vertical, horizontal float64) (run answer, want float64) {
	const height, gamma, cohesion = 6.0, 18.0, 15.0
	phi, theta := 22*degree, 30*degree
	s, slip := wedge(height, 60*degree, theta, soilOf(gamma, cohesion, 22))
	s.Loads, s.LineLoads = loads, lines
	sin, cos := math.Sincos(theta)
	q := gamma*height*height/2*(1/math.Tan(theta)-1/math.Tan(60*degree)) + vertical
	want = (cohesion*height/sin + (q*cos-horizontal*sin)*math.Tan(phi)) / (q*sin + horizontal*cos)
	return fs(s, lem.Situation{}, slip, lem.Setting{Method: lem.JanbuPlain}), want
}

func loadChecks() []Check {
	const width = 10.0
	least := math.Tan(66.78 * degree)
	var out []Check
	for _, method := range []lem.Method{lem.Ordinary, lem.Bishop} {
		c := Check{Case: "strip load of 5.52 cu on its worst arc", What: fsBy(method), Work: wilson, Place: "q = 5.52 cu at tan(theta) = 2 theta", Confidence: High, Want: 1, Run: stripOnArc(width/least, 5.520, method)}
		out = append(out, c.within(0.0005, "finite slices"))
	}
	half := Check{Case: "strip load of 2 pi cu on a half circle", What: fsBy(lem.Ordinary), Work: wilson, Place: "q = 2 pi cu", Confidence: Exact, Want: 1, Run: stripOnArc(0.001, 2*math.Pi, lem.Ordinary)}
	out = append(out, half.within(0.0005, "finite slices"))
	block := func(name string, loads []lem.Surcharge, lines []lem.LineLoad, vertical, horizontal float64) {
		run, want := loadedBlock(loads, lines, vertical, horizontal)
		c := Check{Case: "block on a plane under " + name, What: fsBy(lem.JanbuPlain), Work: algebra, Place: "F = [c A + (Q cos t - H sin t) tan phi]/(Q sin t + H cos t)", Confidence: Exact, Want: want, Run: run}
		out = append(out, c.within(0.0005, "finite slices"))
	}
	block("a uniform strip", []lem.Surcharge{{FromX: -8, ToX: -5, Pressure: 20}}, nil, 60, 0)
	block("a strip that grows from 0 to 30 kPa", []lem.Surcharge{{FromX: -9, ToX: -5, Rise: 30}}, nil, 60, 0)
	block("a strip with a shear of 5 kPa", []lem.Surcharge{{FromX: -9, ToX: -5, Pressure: 10, Shear: 5}}, nil, 40, 20)
	block("a line load, inclined", nil, []lem.LineLoad{{X: -6, Vertical: 40, Horizontal: 12}}, 40, 12)
	return out
}
