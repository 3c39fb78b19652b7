package report

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"standfast/lem"
	"standfast/remedies"
)

// ErrIncomplete says that a result file cannot be drawn: it was written by an earlier version, or changed since.
var ErrIncomplete = errors.New("report: the result file does not hold what drawings need; run compare again")

// Rebuild turns a result file back into the result that it was made from, as far as drawings show it: sections, waters, limits, answers with
// their slips, quantities and trade-offs. Searches, certificates and requests are left out. Its error joins an error that wraps
// [ErrIncomplete] for each thing that is missing or does not fit.
func Rebuild(f *File) (*remedies.Result, error) {
	b := &rebuilder{file: f, soils: map[string]int{}}
	r := b.result()
	if len(b.errs) > 0 {
		return nil, errors.Join(b.errs...)
	}
	return r, nil
}

// rebuilder collects what does not fit.
type rebuilder struct {
	file  *File
	soils map[string]int
	errs  []error
}

func (b *rebuilder) wrong(format string, args ...any) {
	b.errs = append(b.errs, fmt.Errorf("%w: %s", ErrIncomplete, fmt.Sprintf(format, args...)))
}

func (b *rebuilder) result() *remedies.Result {
	f := b.file
	if len(f.SoilOrder) != len(f.Soils) || f.Existing.Section == nil {
		b.wrong("soils or section")
		return nil
	}
	for i, name := range f.SoilOrder {
		b.soils[name] = i
	}
	j := b.job()
	r := &remedies.Result{Job: j, Existing: b.option(j, &f.Existing)}
	j.Section = r.Existing.Proposal.Section
	for i := range f.Options {
		r.Options = append(r.Options, b.option(j, &f.Options[i]))
	}
	if f.LeastEarthworks != nil {
		r.Least = *f.LeastEarthworks
	}
	return r
}

func (b *rebuilder) job() *remedies.Job {
	f := b.file
	j := &remedies.Job{
		Title: f.Case.Title, Length: f.Case.Length, Crest: b.point(f.Case.Crest), Toe: b.point(f.Case.Toe),
		Limits: b.limits(), OnSite: b.onSite(), Economics: b.economics(), MinDepth: f.Settings.DepthOfInterest,
	}
	j.Objective, _ = remedies.ParseObjective(f.Settings.Objective)
	if r := f.Settings.SearchRanges.Head; r != nil {
		j.Head = lem.Range{From: r[0], To: r[1]}
	}
	if r := f.Settings.SearchRanges.Exit; r != nil {
		j.Exit = lem.Range{From: r[0], To: r[1]}
	}
	if i := slices.Index(directions[:], f.Settings.Direction); i >= 0 {
		j.Direction = lem.Direction(i)
	} else {
		b.wrong("there is no direction %q", f.Settings.Direction)
	}
	var err error
	if j.SideForce, err = f.Settings.SideForce.Engine(); err != nil {
		b.wrong("%v", err)
	}
	for _, name := range f.SoilOrder {
		j.Clay = append(j.Clay, f.Soils[name].SlowDraining)
	}
	for _, w := range f.WaterLines {
		j.Waters = append(j.Waters, b.waterLine(w))
	}
	for i := range f.Situations {
		s := &f.Situations[i]
		if s.VariantOf != "" {
			continue
		}
		free := b.water(f.Existing.Section.Water[s.Name]).Free
		j.Situations = append(j.Situations, remedies.Situation{
			Name: s.Name, RequiredFS: s.RequiredFS, Water: b.waterIndex(s.WaterLine), Free: free, Kh: s.Kh, Kv: s.Kv, Undrained: b.undrained(s.Strength),
		})
	}
	if s := f.StageSettings; s != nil {
		j.Stage = remedies.StageSettings{Given: true, Water: b.waterIndex(s.WaterLine), RequiredFS: s.RequiredFS, Plant: s.Plant}
	}
	return j
}

func (b *rebuilder) waterLine(w WaterLine) remedies.WaterLine {
	out := remedies.WaterLine{Name: w.Name, Line: b.line(w.Line), Artesian: w.Artesian, Inclined: w.Inclined, Points: b.pressures(w.Points)}
	for _, own := range w.BySoil {
		out.BySoil = append(out.BySoil, remedies.SoilLine{Soil: b.soilIndex(own.Soil), Line: b.line(own.Line), Artesian: own.Artesian})
	}
	return out
}

func (b *rebuilder) pressures(ps [][3]float64) []lem.PressurePoint {
	var out []lem.PressurePoint
	for _, p := range ps {
		at := b.point(Point{p[0], p[1]})
		out = append(out, lem.PressurePoint{X: at.X, Y: at.Y, Pressure: p[2]})
	}
	return out
}

// waterIndex returns the index of a water line by its name; -1 for dry ground.
func (b *rebuilder) waterIndex(name string) int {
	i := slices.IndexFunc(b.file.WaterLines, func(w WaterLine) bool { return w.Name == name })
	if i < 0 && name != "" {
		b.wrong("there is no water line %q", name)
	}
	return i
}

func (b *rebuilder) undrained(s Strength) []bool {
	out := make([]bool, len(b.file.SoilOrder))
	for i, name := range b.file.SoilOrder {
		out[i] = s.Of(name) == undrained
	}
	return out
}

func (b *rebuilder) limits() remedies.Limits {
	l := &b.file.Limits
	out := remedies.Limits{
		Outfall: l.Outfall, Batters: remedies.Batters{Permanent: orZero(l.Permanent), Temporary: orZero(l.Temporary)},
		MinBench: orZero(l.MinBench), MinHaul: orZero(l.MinHaul), MaxImport: l.MaxImport,
	}
	for _, o := range l.Overhead {
		out.Overhead = append(out.Overhead, remedies.Overhead(o))
	}
	if l.Left != nil {
		out.Left = &remedies.Fence{Name: l.Left.Name, X: l.Left.X}
	}
	if l.Right != nil {
		out.Right = &remedies.Fence{Name: l.Right.Name, X: l.Right.X}
	}
	for _, k := range l.KeepClear {
		out.KeepClear = append(out.KeepClear, remedies.KeepClear{
			Name: k.Name, FromX: k.FromX, ToX: k.ToX, NoDig: k.NoDig, NoLoad: k.NoLoad, DigBelow: k.DigBelow,
		})
	}
	for _, m := range l.MaxLevels {
		out.MaxLevels = append(out.MaxLevels, remedies.MaxLevel{Name: m.Name, FromX: m.FromX, ToX: m.ToX, Level: m.Level})
	}
	return out
}

// farthest is the greatest coordinate of a case file, m; one beyond it was not written by this program.
const farthest = 2e6

func (b *rebuilder) point(p Point) lem.Point {
	for _, v := range p {
		if !(math.Abs(v) <= farthest) {
			b.wrong("the coordinate %g is out of bounds", v)
		}
	}
	return lem.Point{X: p[0], Y: p[1]}
}

func (b *rebuilder) points(list []Point) []lem.Point {
	if list == nil {
		return nil
	}
	out := make([]lem.Point, len(list))
	for i, p := range list {
		out[i] = b.point(p)
	}
	return out
}

// line returns points that run from left to right; nil for none.
func (b *rebuilder) line(list []Point) lem.Profile {
	out := b.points(list)
	for i := 1; i < len(out); i++ {
		if out[i].X < out[i-1].X {
			b.wrong("a line runs back at x = %g", out[i].X)
			break
		}
	}
	if len(out) == 0 {
		return nil
	}
	if len(out) < 2 || out[0].X == out[len(out)-1].X {
		b.wrong("a line has no length at x = %g", out[0].X)
	}
	return out
}
