package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// TestPolylineMeetsGround checks how a polyline is cut at the ground and run on to daylight (by construction of the geometry).
func TestPolylineMeetsGround(t *testing.T) {
	// A slope of 1:2, 10 m high, and further right a hill.
	hill := Profile{{-40, 10}, {0, 10}, {20, 0}, {40, 0}, {50, 5}, {60, 0}, {90, 3}}
	tests := []struct {
		name   string
		ground Profile
		nodes  []Point
		parts  [][2]float64
		open   bool
	}{
		{"ends on the ground", hill, []Point{{-2, 10}, {5, 2}, {20, 0}}, [][2]float64{{-2, 20}}, false},
		{"ends in the air are cut off", hill, []Point{{-5, 14}, {5, 4}, {25, 4}}, [][2]float64{{-1, 12}}, false},
		{"ends below run on to the first daylight, not through the hill", hill, []Point{{0, 6}, {8, 2}, {16, 1}, {20, -0.5}, {21, -0.4}}, [][2]float64{{-8, 25}}, false},
		{"cut in two by a valley", hill, []Point{{-4, 10}, {2, 6}, {58, 1}}, nil, false},
		{"never daylights", hill, []Point{{0, 5}, {10, 0}, {20, -4}}, nil, true},
		{"never daylights on the left", hill, []Point{{0, -4}, {10, 0}, {18, 2}}, nil, true},
		{"wholly in the air", hill, []Point{{0, 12}, {10, 11}, {20, 12}}, nil, false},
		{"through a vertex of the ground", hill, []Point{{0, 10}, {10, 1}, {20, 0}}, [][2]float64{{0, 20}}, false},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			m := compiled(t, uniform(tt.ground, Soil{UnitWeight: 18, Cohesion: 5, Friction: 0.4}), &Situation{})
			if tt.name == "cut in two by a valley" { // y = 6 - 5/56 (x - 2); the face 10 - x/2; the hill's sides 5 (x - 40)/10 and 5 - 5 (x - 50)/10.
				k := -5.0 / 56
				face := (10 - 6 + 2*k) / (0.5 + k)
				up := (6 - 2*k + 20) / (0.5 - k)
				down := (30 - 6 + 2*k) / (0.5 + k)
				tt.parts = [][2]float64{{-4, face}, {up, min(down, 58)}}
			}
			var ws Workspace
			open := m.polylineParts(&ws, &Slip{Kind: Polyline, Nodes: tt.nodes})
			if open != tt.open || len(ws.parts) != len(tt.parts) {
				t.Fatalf("parts %v, open %v; want %v, %v", ws.parts, open, tt.parts, tt.open)
			}
			for i, p := range ws.parts {
				if math.Abs(p.from-tt.parts[i][0]) > 1e-6 || math.Abs(p.to-tt.parts[i][1]) > 1e-6 {
					t.Errorf("part %d from %v to %v, want %v", i, p.from, p.to, tt.parts[i])
				}
			}
		})
	}
}

// TestPolylineOnNewGround cuts a slip found on one ground at another: a fill makes it run on, a cut shortens it. Its shape does not change.
func TestPolylineOnNewGround(t *testing.T) {
	before := Profile{{-30, 8}, {0, 8}, {16, 0}, {50, 0}}
	slip := Slip{Kind: Polyline, Nodes: []Point{{-3, 8}, {2, 2}, {12, 0.5}, {14, 1}}}
	soil := Soil{UnitWeight: 19, Cohesion: 6, Friction: 0.4}
	tests := []struct {
		name     string
		ground   Profile
		from, to float64
	}{
		{"as found", before, -3, 14},
		{"fill at the toe", Profile{{-30, 8}, {0, 8}, {12, 2}, {30, 2}, {34, 0}, {50, 0}}, -3, 18},
		{"crest cut down by 3 m", Profile{{-30, 5}, {6, 5}, {16, 0}, {50, 0}}, -0.5, 14},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			m := compiled(t, uniform(tt.ground, soil), &Situation{})
			r := evaluate(t, m, slip, Setting{Method: Spencer})
			if math.Abs(r.From.X-tt.from) > 1e-6 || math.Abs(r.To.X-tt.to) > 1e-6 {
				t.Errorf("from %v to %v, want %v and %v", r.From, r.To, tt.from, tt.to)
			}
		})
	}
}

// TestPolylinePartsTwin holds the parts against the plainest way to find them: looking at very many x.
func TestPolylinePartsTwin(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		coordinate := rapid.Float64Range(0.5, 8)
		ground := Profile{{-30, 3}}
		for x := -20.0; x < 40; {
			ground = append(ground, Point{x, coordinate.Draw(t, "ground")})
			x += coordinate.Draw(t, "step")
		}
		ground = append(ground, Point{60, 3})
		var nodes []Point
		for x := rapid.Float64Range(-15, 0).Draw(t, "start"); len(nodes) < 5; x += coordinate.Draw(t, "dx") {
			nodes = append(nodes, Point{x, coordinate.Draw(t, "y") - 1})
		}
		var m Model
		if err := m.Compile(uniform(ground, Soil{UnitWeight: 18, Cohesion: 5}), &Situation{}); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		m.polylineParts(&ws, &Slip{Kind: Polyline, Nodes: nodes})
		inParts := func(x float64) bool {
			for _, p := range ws.parts {
				if p.from < x && x < p.to {
					return true
				}
			}
			return false
		}
		const n = 1000
		first, last := nodes[0].X, nodes[len(nodes)-1].X
		openLeft := nodes[0].Y < ground.At(first) // Parts at the ends may be open, and are then none.
		openRight := nodes[len(nodes)-1].Y < ground.At(last)
		for i := 1; i < n; i++ {
			x := first + (last-first)*float64(i)/n
			depth := ground.At(x) - polylineAt(nodes, x)
			if math.Abs(depth) < 1e-6 {
				continue
			}
			if in := inParts(x); in != (depth > 0) && !(depth > 0 && (openLeft || openRight)) {
				t.Fatalf("x = %v lies %v m below the ground of %v, parts %v of %v", x, depth, ground, ws.parts, nodes)
			}
		}
	})
}
