package casefile

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

func sketch() *Sketch {
	return &Sketch{
		Title: "north bank", Source: "north bank.csv", Ground: lem.Profile{{X: 0, Y: 56.2}, {X: 20, Y: 56}, {X: 32, Y: 50}, {X: 55, Y: 49.8}},
		Strata: []NamedLine{{"stiff clay", lem.Profile{{X: 0, Y: 50.5}, {X: 55, Y: 46.8}}}},
		Waters: []NamedLine{{"high", lem.Profile{{X: 0, Y: 54.8}, {X: 55, Y: 49.5}}}, {"", lem.Profile{{X: 0, Y: 53}, {X: 55, Y: 49}}}},
	}
}

// fill fills in every empty key of a skeleton.
func fill(src string) string {
	for _, c := range [][2]string{{"length:", "40"}, {"unit_weight:", "19"}, {"cohesion:", "3"}, {"friction:", "24"}, {"required_fs:", "1.3"}} {
		lines := strings.Split(src, "\n")
		for i, l := range lines {
			if key := strings.TrimSpace(l); strings.HasPrefix(key, c[0]) {
				indent, _, _ := strings.Cut(l, c[0])
				lines[i] = indent + c[0] + " " + c[1]
			}
		}
		src = strings.Join(lines, "\n")
	}
	return src
}

// A skeleton is refused for what is left empty, each with its line, and for nothing else; filled in it is the surveyed section.
func TestSkeleton(t *testing.T) {
	src := string(Skeleton(sketch()))
	_, err := Parse("north bank.yaml", []byte(src))
	var got []string
	for _, f := range Faults(err) {
		if f.Line == 0 || !strings.Contains(f.Message, "is empty") || !strings.HasPrefix(f.Suggestion, "write a") {
			t.Errorf("not a fault of something left empty: %v", f)
		}
		got = append(got, f.Path)
	}
	want := []string{
		"length", "soils.surface soil.unit_weight", "soils.surface soil.drained.cohesion", "soils.surface soil.drained.friction",
		"soils.stiff clay.unit_weight", "soils.stiff clay.drained.cohesion", "soils.stiff clay.drained.friction",
		"situations[1].required_fs", "situations[2].required_fs",
	}
	if !slices.Equal(got, want) {
		t.Errorf("faults at %q, want %q\n%s", got, want, src)
	}
	checkFilled(t, sketch(), src)
}

// checkFilled checks that a skeleton that was filled in is read as the section of its sketch.
func checkFilled(t interface {
	Fatalf(string, ...any)
	Errorf(string, ...any)
}, s *Sketch, src string,
) {
	c, err := Parse("filled.yaml", []byte(fill(src)))
	if err != nil {
		t.Fatalf("filled in it is refused: %v\n%s", err, fill(src))
	}
	if !slices.Equal(c.Job.Section.Ground, s.Ground) {
		t.Errorf("the ground is %v, want %v", c.Job.Section.Ground, s.Ground)
	}
	if len(c.Job.Section.Strata) != len(s.Strata)+1 || len(c.Job.Waters) != len(s.Waters) {
		t.Fatalf("%d strata and %d waters", len(c.Job.Section.Strata), len(c.Job.Waters))
	}
	for i, l := range s.Strata {
		if !slices.Equal(c.Job.Section.Strata[i+1].Top, l.Line) {
			t.Errorf("the top of %s is %v", l.Name, c.Job.Section.Strata[i+1].Top)
		}
	}
	for i, l := range s.Waters {
		if !slices.Equal(c.Job.Waters[i].Line, l.Line) {
			t.Errorf("the water %s is %v", l.Name, c.Job.Waters[i].Line)
		}
	}
}

// Whatever lines are called, and however many points they have, the skeleton holds them.
func TestSkeletonOfAny(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := sketch()
		name := rapid.OneOf(rapid.String(), rapid.SampledFrom([]string{
			"ground", "none", "surface soil", "yes", "1.5", "a: b", "x #y", "- z", "[q]", "", " ", "high", "é", strings.Repeat("w", 200), "'", "\"\\", "~",
		}))
		s.Title, s.Source = name.Draw(t, "title"), name.Draw(t, "source")
		points := rapid.IntRange(2, 60).Draw(t, "points")
		line := func(top float64) lem.Profile {
			var l lem.Profile
			for i := range points {
				l = append(l, lem.Point{X: 20 + float64(i)*1.37, Y: top - 0.5*float64(i)})
			}
			return l
		}
		s.Ground = append(lem.Profile{{X: 0, Y: 60}}, append(line(60), lem.Point{X: 200, Y: 60 - 0.5*float64(points-1)})...)
		s.Strata, s.Waters = nil, nil
		for i := range rapid.IntRange(0, 3).Draw(t, "strata") {
			s.Strata = append(s.Strata, NamedLine{name.Draw(t, "stratum"), line(55 - float64(i))})
		}
		for range rapid.IntRange(0, 3).Draw(t, "waters") {
			s.Waters = append(s.Waters, NamedLine{name.Draw(t, "water"), line(58)})
		}
		checkFilled(t, s, string(Skeleton(s)))
	})
}

// A line of a file is never so long that nobody reads it.
func TestSkeletonLines(t *testing.T) {
	s := sketch()
	for i := range 300 {
		s.Ground = append(s.Ground, lem.Point{X: 56 + float64(i)/7, Y: 49.7})
	}
	for i, l := range strings.Split(string(Skeleton(s)), "\n") {
		if len(l) > lineWidth {
			t.Error(fmt.Sprint("line ", i+1, " has ", len(l), " characters"))
		}
	}
}
