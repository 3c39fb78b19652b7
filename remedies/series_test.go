package remedies

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestMeanHead(t *testing.T) {
	tests := []struct {
		name   string
		r      float64
		want   float64
		tol    float64
		source string
	}{
		{"S/H = 1", 1, 0.270, 0.0005, "closed form: the series to three decimals"},
		{"S/H = 2", 2, 0.5, 1e-12, "closed form: f(r) + f(4/r) = 1 at r = 2"},
		{"S/H = 3", 3, 0.644, 0.0005, "closed form: the series to three decimals"},
		{"drains far apart", 1e6, 1, 1e-5, "limit: no drain, no fall"},
		{"drains close", 1e-6, 8 * 1.0517997902646449 / (math.Pi * math.Pi * math.Pi) * 1e-6, 1e-18, "limit: tanh is 1"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) { near(t, "mean head", meanHead(tt.r), tt.want, tt.tol) })
	}
}

// TestHeadTwins sums the series as they stand, slowly.
func TestHeadTwins(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := rapid.Float64Range(0.05, 60).Draw(t, "r")
		var mean, mid float64
		sign := 1.0
		for n := 1.0; n < 20000; n += 2 {
			mean += math.Tanh(n*math.Pi/r) / (n * n * n)
			mid += sign * math.Tanh(n*math.Pi/r) / (n * n)
			sign = -sign
		}
		mean *= 8 / (math.Pi * math.Pi * math.Pi) * r
		mid *= 4 / (math.Pi * math.Pi) * r
		if math.Abs(meanHead(r)-mean) > 1e-7 || math.Abs(midspanHead(r)-mid) > 1e-7 {
			t.Fatalf("r = %g: %g and %g, want %g and %g", r, meanHead(r), midspanHead(r), mean, mid)
		}
	})
}

// TestHeadProperties checks that the mean of both ends of the scale adds up, that heads lie between 0 and 1 and midspan is above the
// mean by at most what is taken where only the mean is known.
func TestHeadProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := math.Exp(rapid.Float64Range(-7, 7).Draw(t, "log r"))
		mean, mid := meanHead(r), midspanHead(r)
		if math.Abs(mean+meanHead(4/r)-1) > 1e-12 {
			t.Errorf("f(%g) + f(4/r) = %g", r, mean+meanHead(4/r))
		}
		if !(mean > 0 && mean <= mid && mid <= 1 && mid <= midspanOverMean*mean) {
			t.Errorf("r = %g: mean %g, midspan %g", r, mean, mid)
		}
	})
}

// TestHeadSolvesLaplace compares the series with finite differences of the same seepage problem, and checks on them that the head
// left falls at least linearly from the invert up to the line, which is what the drawdown takes.
func TestHeadSolvesLaplace(t *testing.T) {
	for _, r := range []float64{1, 2, 3, 6} {
		meanC, midC := seepage(r, 16)
		meanF, midF := seepage(r, 32)
		// Halving the grid quarters the error.
		near(t, "mean", meanHead(r), meanF[0]+(meanF[0]-meanC[0])/3, 5e-4)
		near(t, "midspan", midspanHead(r), midF[0]+(midF[0]-midC[0])/3, 5e-4)
		for k := range meanF {
			share := 1 - float64(k)/32
			if meanF[k] > meanF[0]*share+1e-6 || midF[k] > midF[0]*share+1e-6 {
				t.Errorf("S/H = %g: head at %g H is %g and %g, more than linear", r, 1-share, meanF[k], midF[k])
			}
		}
	}
}

// seepage returns the pressure head over H = 1 between drains at spacing s, by level from the base up in n steps: the mean and the
// midspan. Successive over-relaxation on a square grid.
func seepage(s float64, n int) (mean, mid []float64) {
	w, h := int(math.Round(s*float64(n))), 1/float64(n)
	p := make([][]float64, n+1)
	for k := range p {
		p[k] = make([]float64, w+1)
	}
	for change := 1.0; change > 1e-10; {
		change = 0
		for k := range n { // the top row stays 0
			for i := 1; i < w; i++ {
				under := 2.0 * h // no flow through the base: total head level, so dp/dy = -1
				if k == 0 {
					under += p[1][i]
				} else {
					under = p[k-1][i]
				}
				d := 1.8 * ((p[k][i-1]+p[k][i+1]+p[k+1][i]+under)/4 - p[k][i])
				p[k][i] += d
				change = math.Max(change, math.Abs(d))
			}
		}
	}
	for k := range n {
		var sum float64
		for _, v := range p[k] {
			sum += v
		}
		mean = append(mean, sum/float64(w))
		mid = append(mid, p[k][w/2])
	}
	return mean, mid
}

// TestRatioBetweenStations checks that the straight line between stations nowhere overstates the ratio.
func TestRatioBetweenStations(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		clear := rapid.Float64Range(0.5, 20).Draw(t, "clear")
		h0 := rapid.Float64Range(0, 8).Draw(t, "h0")
		h1 := rapid.Float64Range(0, 8).Draw(t, "h1")
		w := rapid.Float64Range(0, 1).Draw(t, "share")
		for name, f := range map[string]fall{"mean": meanFall(nan), "midspan": midspanFall(nan), "given": meanFall(0.7)} {
			r0, r1 := f.between(clear, h0, h1)
			h := h0*(1-w) + h1*w
			if want := f.ratio(clear, h); h > 0 && r0*(1-w)+r1*w > want+1e-12 {
				t.Errorf("%s ratio %g, at most %g", name, r0*(1-w)+r1*w, want)
			}
		}
	})
}
