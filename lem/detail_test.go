package lem

import (
	"errors"
	"math"
	"testing"
)

// detailed returns the working of a slip and fails the test unless it has one.
func detailed(t testing.TB, m *Model, slip Slip, o Setting) Detail {
	t.Helper()
	d, err := m.Detail(&slip, o)
	if err != nil {
		t.Fatalf("%v on %+v: %v", o.Method, slip, err)
	}
	return d
}

// eachDetail calls check with the working of every method on every case.
func eachDetail(t *testing.T, check func(t *testing.T, c methodCase, d Detail)) {
	t.Helper()
	for _, c := range methodCases() {
		m := compiled(t, c.s, c.sit)
		for _, o := range settings(c.slip.Kind) {
			t.Run(c.name+"/"+o.Method.String(), func(t *testing.T) { check(t, c, detailed(t, m, c.slip, o)) })
		}
	}
}

// TestDetailGivesF follows F by hand from the printed columns alone.
func TestDetailGivesF(t *testing.T) {
	eachDetail(t, func(t *testing.T, c methodCase, d Detail) {
		f := d.F
		forces := d.Setting.Method != Ordinary && d.Setting.Method != Bishop
		var resisting, driving float64
		for i, s := range d.Slices {
			sin, cos := math.Sincos(s.Inclination)
			if q := s.Weight + s.Surcharge + s.Water + s.QuakeVertical; !within(q, s.Vertical, 1e-12) {
				t.Errorf("slice %d: Q = %g, parts add to %g", i, s.Vertical, q)
			}
			shear := (s.Cohesion*s.Length + s.Normal*s.TanFriction) / f
			if m := cos + sin*s.TanFriction/f; !within(s.MAlpha, m, 1e-12) || !within(s.Shear, shear, 1e-12) {
				t.Errorf("slice %d: m-alpha %g and S %g, want %g and %g", i, s.MAlpha, s.Shear, m, shear)
			}
			lift := s.Pore * s.Length
			var x float64 // From the uphill side less to the downhill side.
			if forces {
				x = d.Interfaces[i].Shear - d.Interfaces[i+1].Shear
				if d.Result.Leftward {
					x = -x
				}
			}
			normal := (s.Vertical+x-(s.Cohesion*s.Length-lift*s.TanFriction)*sin/f)/s.MAlpha - lift
			r, drive := shear*f, (normal+lift)*sin+s.Push+s.Quake
			switch {
			case d.Setting.Method == Ordinary:
				normal = s.Vertical*cos - s.Quake*sin - lift
				if c.sit.Water.Free != nil {
					normal = (s.Vertical-lift*cos)*cos - s.Quake*sin
				}
				fallthrough
			case !forces:
				drive = s.Vertical*sin + (s.Push+s.Quake)*cos
				if c.slip.Kind == Circle {
					arm := c.slip.Centre.X - s.X
					if d.Result.Leftward {
						arm = -arm
					}
					drive = (s.Vertical*arm + s.Push*(c.slip.Centre.Y-s.PushLevel) + s.Quake*(c.slip.Centre.Y-s.QuakeLevel)) / c.slip.Radius
				}
			default:
				r *= cos
			}
			if !within(s.Normal, normal, 1e-9) && math.Abs(s.Normal-normal) > 1e-9 {
				t.Errorf("slice %d: N' = %g, want %g", i, s.Normal, normal)
			}
			resisting += r
			driving += drive
		}
		if got := d.Correction * resisting / driving; !within(got, d.Result.F, 1e-6) {
			t.Errorf("F = %.8f from the table, %.8f from the method", got, d.Result.F)
		}
		if !within(d.Resisting, resisting, 1e-9) || !within(d.Driving, driving, 1e-9) {
			t.Errorf("sums %g and %g, want %g and %g", d.Resisting, d.Driving, resisting, driving)
		}
		if (d.Setting.Method == Janbu) != (d.Correction != 1) {
			t.Errorf("correction %g", d.Correction)
		}
	})
}

// TestDetailForces follows the interslice forces and the line of thrust through the table: they begin and must end at 0.
func TestDetailForces(t *testing.T) {
	eachDetail(t, func(t *testing.T, _ methodCase, d Detail) {
		if d.Setting.Method == Ordinary || d.Setting.Method == Bishop {
			if d.Interfaces != nil {
				t.Error("interslice forces in a method that leaves them open")
			}
			return
		}
		rigorous := d.Setting.Method == Spencer || d.Setting.Method == MorgensternPrice
		n := len(d.Slices)
		at := func(j int) (SliceRow, Interface, Interface) { // The j-th slice from the head, with its uphill and downhill sides.
			if d.Result.Leftward {
				return d.Slices[n-1-j], d.Interfaces[n-j], d.Interfaces[n-1-j]
			}
			return d.Slices[j], d.Interfaces[j], d.Interfaces[j+1]
		}
		var e, x, moment, greatest float64
		for j := range n {
			s, up, down := at(j)
			sin, cos := math.Sincos(s.Inclination)
			before, above := e, x
			e += (s.Normal+s.Pore*s.Length)*sin - s.Shear*cos + s.Push + s.Quake
			x = 0
			if rigorous {
				x = d.Result.Lambda * down.Side * e
			}
			moment += (e-before)*s.Base - (above+x)*s.Width/2 + s.Push*(s.PushLevel-s.Base) + s.Quake*(s.QuakeLevel-s.Base)
			greatest = max(greatest, math.Abs(e))
			if math.Abs(down.X-up.X)-s.Width > 1e-9 {
				t.Errorf("slice %d: sides at %g and %g, width %g", j, up.X, down.X, s.Width)
			}
			if j == n-1 {
				break
			}
			if math.Abs(down.E-e) > 1e-6*greatest || math.Abs(down.Shear-x) > 1e-6*greatest {
				t.Errorf("side %d: E %g X %g, want %g and %g", j, down.E, down.Shear, e, x)
			}
			if rigorous != !math.IsNaN(down.Thrust) || rigorous && math.Abs(down.Thrust*e-moment) > 1e-5*greatest {
				t.Errorf("side %d: thrust at %g, want %g", j, down.Thrust, moment/e)
			}
		}
		if math.Abs(e) > 1e-5*greatest || rigorous && math.Abs(moment) > 1e-4*greatest {
			t.Errorf("left over at the exit: E %g, moment %g (greatest E %g)", e, moment, greatest)
		}
		if rigorous && d.Verdict.Reason != Admissible || d.Verdict.Reason != d.Result.Reason {
			t.Errorf("verdict %+v", d.Verdict)
		}
	})
}

// TestMorgensternPriceTwin solves both equations on the printed loads by halving intervals of F within lambda, each slice's N and E from its two
// equations of equilibrium.
func TestMorgensternPriceTwin(t *testing.T) {
	for _, c := range methodCases() {
		m := compiled(t, c.s, c.sit)
		for _, o := range settings(c.slip.Kind) {
			if o.Method != Spencer && o.Method != MorgensternPrice {
				continue
			}
			d := detailed(t, m, c.slip, o)
			f, lambda := twinMorgensternPrice(d)
			if !within(d.Result.F, f, 1e-7) || math.Abs(d.Result.Lambda-lambda) > 1e-6 {
				t.Errorf("%s %v %v: F %.8f lambda %.7f, twin %.8f and %.7f", c.name, o.Method, o.SideForce.Shape, d.Result.F, d.Result.Lambda, f, lambda)
			}
		}
	}
}

func twinMorgensternPrice(d Detail) (f, lambda float64) {
	n := len(d.Slices)
	end := func(f, lambda float64) (e, moment float64) {
		x, run := 0.0, 0.0
		length := d.Result.To.X - d.Result.From.X
		for j := range n {
			i := j
			if d.Result.Leftward {
				i = n - 1 - j
			}
			s := d.Slices[i]
			run += s.Width
			side := 1.0
			if d.Setting.Method == MorgensternPrice {
				side = d.Setting.SideForce.At(run / length)
			}
			sin, cos := math.Sincos(s.Inclination)
			// S = a + b N' with N = N' + u l:
			//   N cos + S sin + lambda side E' = Q + X        (vertical)
			//   E' = E + N sin - S cos + H + K                (horizontal)
			a, b := s.Cohesion*s.Length/f, s.TanFriction/f
			a -= b * s.Pore * s.Length // S = a + b N.
			p, q := cos+b*sin, lambda*side
			u, v := -(sin - b*cos), 1.0
			r1, r2 := s.Vertical+x-a*sin, e-a*cos+s.Push+s.Quake
			det := p*v - q*u
			next := (p*r2 - u*r1) / det
			moment += (next-e)*s.Base - (x+q*next)*s.Width/2 + s.Push*(s.PushLevel-s.Base) + s.Quake*(s.QuakeLevel-s.Base)
			e, x = next, q*next
		}
		return e, moment
	}
	force := func(lambda float64) float64 {
		return halved(func(f float64) float64 { e, _ := end(f, lambda); return e }, 0.5, 10)
	}
	lambda = halved(func(l float64) float64 { _, m := end(force(l), l); return m }, 0, 1)
	return force(lambda), lambda
}

// halved returns where g changes its sign between a and b.
func halved(g func(float64) float64, a, b float64) float64 {
	rising := g(b) > 0
	for range 60 {
		if mid := (a + b) / 2; g(mid) > 0 == rising {
			b = mid
		} else {
			a = mid
		}
	}
	return (a + b) / 2
}

// TestReasons has a slip for every rule of admissibility.
func TestReasons(t *testing.T) {
	sand := uniform(face(8, 25*degree, 40), Soil{UnitWeight: 19, Friction: 35 * degree})
	firm := uniform(face(8, 25*degree, 40), Soil{UnitWeight: 19, Cohesion: 5, Friction: 30 * degree})
	firm.FirmBase = Profile{{-60, -1}, {40, -1}}
	deep := Slip{Centre: Point{-4, 9}, Radius: 16}
	long := uniform(Profile{{-400, 400 * math.Tan(20*degree)}, {400, -400 * math.Tan(20*degree)}}, Soil{UnitWeight: 19, Cohesion: 5, Friction: 25 * degree})
	fall := func(x, y float64) Point { return Point{x, -x*math.Tan(20*degree) + y} }
	sheet := Slip{Kind: Polyline, Nodes: []Point{fall(-102.4, 0.6), fall(-100, -2), fall(100, -2), fall(110, 0.6)}}
	clay := uniform(face(8, 45*degree, 40), Soil{UnitWeight: 19, Cohesion: 65})
	wall := uniform(face(8, 85*degree, 40), Soil{UnitWeight: 19, Cohesion: 20})
	bent := Slip{Kind: Polyline, Nodes: []Point{{-26, 8}, {-12, -10}, {2, 0}}}
	tests := []struct {
		name   string
		s      *Section
		slip   Slip
		o      Setting
		want   Reason
		tabled bool
	}{
		{"does not daylight", sand, Slip{Centre: Point{-8, 1}, Radius: 6}, Setting{Method: Bishop}, NotDaylighting, false},
		{"below firm base", firm, deep, Setting{Method: Bishop}, BelowFirmBase, false},
		{"Bishop on a polyline", long, sheet, Setting{Method: Bishop}, CirclesOnly, false},
		{"steep exit", sand, Slip{Kind: Polyline, Nodes: []Point{{-25, 8}, {-10, -2}, {-0.6, -2}, {0.2, 0}}}, Setting{Method: JanbuPlain}, SmallMAlpha, true},
		{"sharp bend in clay", clay, bent, Setting{Method: Spencer}, ReversedDrag, true},
		{"earthquake pulls a wall off", wall, Slip{Kind: Polyline, Nodes: []Point{{-1.7, 8}, {-0.9, 4}, {0.7, 0}}}, Setting{Method: Spencer}, BaseTension, true},
		{"half sine on a sheet slide", long, sheet, Setting{Method: MorgensternPrice}, ThrustOutside, true},
		{"Spencer on a sheet slide", long, sheet, Setting{Method: Spencer}, Admissible, true},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			sit := &Situation{}
			if tt.s == wall {
				sit.Kh = 0.3
			}
			m := compiled(t, tt.s, sit)
			d, err := m.Detail(&tt.slip, tt.o)
			if d.Result.Reason != tt.want || d.Verdict.Reason != tt.want {
				t.Errorf("%v, verdict %+v, want %v", d.Result, d.Verdict, tt.want)
			}
			if (d.Result.Status == Converged) != (tt.want == Admissible) || math.IsNaN(d.Result.F) != (tt.want != Admissible) {
				t.Errorf("status %v, F %g", d.Result.Status, d.Result.F)
			}
			if (err == nil) != tt.tabled || err != nil && !errors.Is(err, ErrNoWorking) {
				t.Errorf("error %v", err)
			}
			if tt.tabled && !(d.F > 0 && within(d.Resisting/d.Driving, d.F, 1e-6)) {
				t.Errorf("table of %d slices closes at %g, F %g", len(d.Slices), d.Resisting/d.Driving, d.F)
			}
		})
	}
	for r := range numReasons {
		if r.String() == "unknown" || r.String() == "" {
			t.Errorf("reason %d has no words", r)
		}
	}
}

// TestDetailOfNothing checks that a slip without an answer has no table.
func TestDetailOfNothing(t *testing.T) {
	s, sit := cutting()
	m := compiled(t, s, sit)
	tests := []struct {
		name string
		slip Slip
		o    Setting
		want Status
	}{
		{"in the air", Slip{Centre: Point{36, 60}, Radius: 5}, Setting{}, Missed},
		{"too shallow", cuttingCircle, Setting{MinDepth: 50}, Missed},
		{"no side force", cuttingCircle, Setting{Method: MorgensternPrice, SideForce: SideForce{Shape: Given}}, NotConverged},
	}
	for _, tt := range tests {
		d, err := m.Detail(&tt.slip, tt.o)
		if !errors.Is(err, ErrNoWorking) || d.Result.Status != tt.want || d.Slices != nil {
			t.Errorf("%s: %v, %v", tt.name, d.Result.Status, err)
		}
	}
}
