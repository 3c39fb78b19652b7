package lem

import "testing"

// cutting is an invented slope of three strata with a water line, and a circle through all of them.
func cutting() (*Section, *Situation, Slip) {
	ground := Profile{{0, 12}, {20, 12}, {45, 2}, {70, 2}}
	s := &Section{Ground: ground, Soils: []Soil{
		{UnitWeight: 18.5, Cohesion: 2, Friction: 28 * degree},
		{UnitWeight: 19.5, Cohesion: 6, Friction: 24 * degree},
		{UnitWeight: 20, Cohesion: 10, Friction: 22 * degree},
	}, Strata: []Stratum{{0, ground}, {1, Profile{{0, 8}, {70, 5}}}, {2, Profile{{0, 4}, {70, 1}}}}}
	sit := &Situation{Water: Water{Line: Profile{{0, 9}, {20, 8}, {45, 2}, {70, 2}}}}
	return s, sit, Slip{Centre: Point{36, 24}, Radius: 23.5}
}

func BenchmarkMethods(b *testing.B) {
	s, sit, slip := cutting()
	m := compiled(b, s, sit)
	poly := Slip{Kind: Polyline, Nodes: []Point{{14, 12}, {20, 5}, {30, 1}, {42, 0.5}, {47, 2}}}
	for _, c := range []struct {
		name string
		slip Slip
	}{{"circle", slip}, {"polyline", poly}} {
		for method := range numMethods {
			if method == Bishop && c.slip.Kind == Polyline {
				continue
			}
			b.Run(c.name+"/"+method.String(), func(b *testing.B) {
				var ws Workspace
				o := Setting{Method: method}
				r := m.FS(&ws, &c.slip, o)
				if r.Status != Converged {
					b.Fatal(r)
				}
				b.Logf("F %.4f lambda %.3f slices %d", r.F, r.Lambda, r.Slices)
				b.ReportAllocs()
				for b.Loop() {
					m.FS(&ws, &c.slip, o)
				}
			})
		}
	}
}
