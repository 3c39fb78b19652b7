package remedies

import (
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// unloadKind is the removal of weight at the head of the slope.
func unloadKind() Kind {
	return Kind{
		Name:    "unload",
		Title:   "unload the head",
		Summary: "A level platform cut below crest level from the face inward, with a back batter up to the ground.",
		Parameters: []Parameter{
			{
				// Usual range 1 m to 4 m (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the platform below the level of the crest.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "depth", Min: 0.5, Max: 4, Step: 0.25},
			},
			{
				Name: "width", Unit: "m", Meaning: "Width of the platform from where it comes out on the face, measured inward.",
				Min: 0, Max: 200, Default: optimize.Axis{Name: "width", Min: 1, Max: 15, Step: 0.25},
			},
			{
				// 1V:2H is usual (common practice, no source).
				Name: "back_batter", Unit: "1V:nH", Meaning: "Batter behind the platform: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "back_batter", Min: 2, Max: 2},
			},
		},
		Place: "head",
		New:   newUnload,
	}
}

func newUnload(*Job, *Request) (Remedy, error) {
	return &earthworks{noun: "unloading", soil: noSoil, cuts: true, shape: unloadShape}, nil
}

// unloadShape is a level platform at depth x[0] below the crest, of width x[1] from where it comes out on the face, and a back
// batter at x[2] up to the ground. A back batter that comes out on the face itself, short of the crest, would leave the face above
// it over a steeper cut: that undercuts the slope instead of unloading its head and is a violation.
func unloadShape(s *slope, x []float64) shape {
	depth, width, n := x[0], x[1], x[2]
	const limit = "shape of the platform"
	if depth > s.height()+sameLevel {
		return noShape(limit, depth-s.height(), "platform %s m below the crest lies below the toe, %s m below the crest", metres(depth), metres(s.height()))
	}
	floor := s.crest.Y - depth
	front, ok := meet(ray(s.before, lem.Point{X: s.crest.X, Y: floor}, math.Inf(1)), s.before, s.crest.X, s.toe.X, upper)
	if !ok {
		return noShape(limit, 0, "platform %s m below the crest does not come out on the face", metres(depth))
	}
	back := lem.Point{X: front.X - width, Y: floor}
	if back.X < s.before.Left() {
		return noShape("ground within the section", s.before.Left()-back.X, "back of platform at x = %s m lies outside the section", metres(s.x(back.X)))
	}
	batter := ray(s.before, back, n)
	top, ok := meet(batter, s.before, back.X, s.before.Left(), upper)
	if !ok {
		return noShape("ground within the section", s.before[0].Y-batter[0].Y, "back batter at %s meets no ground in the section", batterText(n))
	}
	if top.X > s.crest.X+sameLevel {
		return noShape(limit, top.X-s.crest.X, "back batter comes out on the face at x = %s m, short of the crest at x = %s m, and would undercut the face above it",
			metres(s.x(top.X)), metres(s.x(s.crest.X)))
	}
	dims := []Dimension{
		lengthDim("platform width", back, front),
		lengthDim("depth", back, lem.Point{X: back.X, Y: s.crest.Y}),
	}
	var line path
	line.add(top.X, top.Y)
	line.add(back.X, back.Y)
	line.add(front.X, front.Y)
	var faces []face
	if top.X < back.X { // else the platform comes out at its back as well
		dims = append(dims, batterDim(top, back, n))
		faces = append(faces, face{batter: n})
	}
	return shape{
		line: lem.Profile(line), cut: true, uphill: "top of back batter", foot: "front of platform", dims: dims,
		faces: faces, levels: []level{{what: "platform", width: width, haul: true}},
	}
}
