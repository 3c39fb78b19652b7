package validation

import (
	"math"
	"math/rand/v2"

	"standfast/lem"
)

// rockSlide is one state of the Sau Mau Ping slope: a plane at 35 degrees under a face of 60 m at 50 degrees, ending in a tension crack.
type rockSlide struct {
	friction, cohesion float64 // rad, kPa.
	crack, water       float64 // Depth of the crack, m, and share of it that holds water.
	kh                 float64
}

const (
	rockHeight = 60.0
	rockFace   = 50 * degree
	rockPlane  = 35 * degree
	rockWeight = 2.6 * lem.GammaW // Density 2.6 t/m3, in the unit in which water weighs 1.
)

// meanSlide has the mean of every variable.
func meanSlide() rockSlide { return rockSlide{35 * degree, 10 * lem.GammaW, 14, 0.5, 0.08} }

// fs is FS by the engine. The water pressure falls from its value at the foot of the crack straight to nothing at the toe.
func (r rockSlide) fs() (float64, error) {
	s, slip := wedge(rockHeight, rockFace, rockPlane, lem.Soil{UnitWeight: rockWeight, Cohesion: r.cohesion, Friction: r.friction})
	s.Crack = &lem.TensionCrack{Depth: r.crack, WaterShare: r.water}
	foot := lem.Point{X: -(rockHeight - r.crack) / math.Tan(rockPlane), Y: rockHeight - r.crack}
	line := lem.Profile{{X: foot.X, Y: foot.Y + r.water*r.crack}, {X: 0, Y: 0}}
	return evaluate(s, &lem.Situation{Kh: r.kh, Water: lem.Water{Line: line}}, &slip, lem.Setting{Method: lem.Ordinary, Slices: lem.MinSlices})
}

// exact is Hoek's equation: F = {c A + [W (cos p - k sin p) - U - V sin p] tan phi}/[W (sin p + k cos p) + V cos p].
func (r rockSlide) exact() float64 {
	sin, cos := math.Sincos(rockPlane)
	zw := r.water * r.crack
	area := (rockHeight - r.crack) / sin
	share := r.crack / rockHeight
	weight := rockWeight / 2 * rockHeight * rockHeight * ((1-share*share)/math.Tan(rockPlane) - 1/math.Tan(rockFace))
	u, v := lem.GammaW*zw*area/2, lem.GammaW*zw*zw/2
	return (r.cohesion*area + (weight*(cos-r.kh*sin)-u-v*sin)*math.Tan(r.friction)) / (weight*(sin+r.kh*cos) + v*cos)
}

// drawn returns a slide with every variable drawn from its distribution, all cut off at both ends.
func drawn(rnd *rand.Rand) rockSlide {
	normal := func(mean, deviation, low, high float64) float64 {
		for {
			if v := mean + deviation*rnd.NormFloat64(); v >= low && v <= high {
				return v
			}
		}
	}
	exponential := func(mean, high float64) float64 {
		for {
			if v := mean * rnd.ExpFloat64(); v <= high {
				return v
			}
		}
	}
	return rockSlide{
		friction: normal(35, 5, 15, 60) * degree, cohesion: normal(10, 2, 0, 25) * lem.GammaW,
		crack: normal(14, 3, 0.1, 24), water: exponential(0.5, 1), kh: exponential(0.08, 0.16),
	}
}

// rockSamples is the number of slides drawn: the probability of failure then has a standard error of 0.25 %, the mean of 0.0024.
const rockSamples = 10_000

// sampled is the mean of what is measured on many slides.
func sampled(measure func(f float64) float64) answer {
	return func() (float64, error) {
		rnd := rand.New(rand.NewPCG(1, 2)) // The same every time.
		var sum float64
		for range rockSamples {
			f, err := drawn(rnd).fs()
			if err != nil {
				return 0, err
			}
			sum += measure(f)
		}
		return sum / rockSamples, nil
	}
}

func rockChecks() []Check {
	failed := func(f float64) float64 {
		if f < 1 {
			return 100
		}
		return 0
	}
	mean := Check{Case: "planar slide with crack, water and earthquake: every variable at its mean", What: fsBy(lem.Ordinary), Work: hoek, Place: "equation of the slide", Confidence: Exact, Want: meanSlide().exact(), Run: meanSlide().fs}
	average := Check{Case: "the same, variables drawn at random", What: "mean FS, ordinary", Work: hoek, Place: "1.34 to 1.36", Confidence: High, Want: 1.34, Run: sampled(func(f float64) float64 { return f })}
	failure := Check{Case: "the same", What: "share with FS below 1", Unit: "%", Work: hoek, Place: "probability of failure 6.4 %", Confidence: High, Want: 6.4, Run: sampled(failed)}
	return []Check{
		mean.within(0.0005, "finite slices"),
		average.between(1.33, 1.36, "standard error 0.0024"),
		failure.between(5.6, 7.2, "three standard errors"),
	}
}
