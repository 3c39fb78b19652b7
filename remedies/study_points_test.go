package remedies

import (
	"context"
	"fmt"
	"reflect"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// slippedBank returns the test cutting after a slip, with a berm and trench drains to size in one situation.
func slippedBank() *Job {
	j := fencedBerm(66)
	j.Situations[0].RequiredFS, j.Situations[0].RatioToExisting, j.Situations[0].DrainsWorking = 0, 1.2, 1
	j.Requests[0].Axes[0] = optimize.Axis{Name: "height", Min: 1, Max: 4, Step: 0.5}
	j.Requests[0].Axes[1] = optimize.Axis{Name: "top_width", Min: 2, Max: 8, Step: 1}
	drains := request("trench_drains", nil, 3, 8, 0.6, 0.8)
	drains.Axes[0] = optimize.Axis{Name: "depth", Min: 2, Max: 5, Step: 0.5}
	j.Requests = append(j.Requests, drains)
	j.Observed = &Observed{Slip: lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: 47, Y: 122}, Radius: 23}}
	return j
}

// fewSlices make a study quick where it is only held against another.
const fewSlices = 14

// summaryOf is what a study came to: what is compared between studies that must agree.
func summaryOf(options []Option) []string {
	var out []string
	for i := range options {
		o := &options[i]
		s := o.Name + " " + o.Status.String()
		for _, v := range o.Parameters {
			s += " " + v.String()
		}
		if g := o.Governing(); g != nil {
			s += " " + g.Check.Label()
		}
		out = append(out, s)
	}
	return out
}

// TestPointIsTheStudyOfThatStrength: the slips that a point starts with from sizings before change nothing but the time that it takes, and a required
// FS given as a ratio is one to the slope with the strength of the point.
func TestPointIsTheStudyOfThatStrength(t *testing.T) {
	j := slippedBank()
	res, err := Study(context.Background(), j, Settings{Points: true, Slices: fewSlices})
	if err != nil {
		t.Fatal(err)
	}
	if res.Points == nil || len(res.Points.Sized) != len(pointNames) {
		t.Fatalf("points %+v", res.Points)
	}
	meets := 0
	for i := range res.Points.Sized {
		p := &res.Points.Sized[i]
		alone := slippedBank()
		s := &alone.Section.Soils[res.Points.Back.Soil]
		s.Cohesion, s.Friction = p.Strength.Cohesion, p.Strength.Friction
		cold, err := Study(context.Background(), alone, Settings{Slices: fewSlices})
		if err != nil {
			t.Fatal(err)
		}
		if got, want := summaryOf(p.Options), summaryOf(cold.Options); !reflect.DeepEqual(got, want) || p.Least != cold.Least {
			t.Errorf("%s point: %q, least %s; alone: %q, least %s", p.Name, got, p.Least, want, cold.Least)
		}
		chosen := res.least()
		if c := p.Chosen; c == nil || c.Name != res.Least || !reflect.DeepEqual(c.Parameters, chosen.Parameters) ||
			(c.Status == MeetsTarget) != (c.Governing().Margin() >= DefaultAllowance) {
			t.Errorf("%s point: chosen %+v, want %s as found before", p.Name, c, res.Least)
		}
		for k := range p.Options { // What costs less than the least that meets the target does not meet it.
			o, c := &p.Options[k], p.Chosen
			if o.Name == c.Name && c.Proposal.Quantities.Earthworks() < o.Proposal.Quantities.Earthworks() && c.Status == MeetsTarget && o.Status == MeetsTarget {
				t.Errorf("%s point: %s of the size found before meets the target and takes less than the least", p.Name, c.Name)
			}
		}
		if c := &p.Existing.Situations[0]; c.Check.Required != 1.2*c.FS {
			t.Errorf("%s point: required FS %g, of a slope at %g", p.Name, c.Check.Required, c.FS)
		}
		// The observed slip, at FS 1, is one of those that a search may find.
		if fs := p.Existing.Situations[0].FS; !(fs <= 1+DefaultAllowance) {
			t.Errorf("%s point: lowest FS of the slope as it is %g, and the observed slip has 1", p.Name, fs)
		}
		for k := range p.Options {
			if o := &p.Options[k]; o.Status == MeetsTarget {
				meets++
				if o.Certificate.AuditSearches == 0 || o.Certificate.Witnessed+o.Certificate.UnresolvedDesigns != o.Certificate.CheaperDesigns {
					t.Errorf("%s point, %s: certificate %+v", p.Name, o.Name, o.Certificate)
				}
			}
		}
	}
	if meets == 0 {
		t.Error("nothing meets the target at any point: the case no longer shows what it should")
	}
	if j.Section.Soils[stiffClay].Cohesion != 4 || j.Section.Soils[clay].Cohesion != 3 {
		t.Error("the job given was changed")
	}
}

// TestPointsDoNotDependOnWorkers: one goroutine and three come to the same points, slip by slip.
func TestPointsDoNotDependOnWorkers(t *testing.T) {
	j := slippedBank()
	j.Requests = j.Requests[1:]
	var want *Points
	for _, workers := range []int{1, 3} {
		last := 0.0
		res, err := Study(context.Background(), j, Settings{Points: true, Slices: fewSlices, Workers: workers, Progress: func(p Progress) {
			at := float64(p.Done) + p.Share
			if at < last || at > float64(p.Total) {
				t.Errorf("progress %g after %g, of %d", at, last, p.Total)
			}
			last = at
		}})
		if err != nil {
			t.Fatal(err)
		}
		if want == nil {
			want = res.Points
			continue
		}
		for i := range want.Sized {
			a, b := &want.Sized[i], &res.Points.Sized[i]
			for k := range a.Options {
				x, y := &a.Options[k], &b.Options[k]
				if g, h := x.Governing(), y.Governing(); g.FS != h.FS || fmt.Sprint(g.Slip) != fmt.Sprint(h.Slip) || fmt.Sprint(*x.Certificate) != fmt.Sprint(*y.Certificate) {
					t.Errorf("%s point, %s: not the same with %d workers", a.Name, x.Name, workers)
				}
			}
		}
	}
}

// TestStudyGoesOnWithoutBackAnalysis: a slip that no strength explains is told, and the study is that of the case without it.
func TestStudyGoesOnWithoutBackAnalysis(t *testing.T) {
	undrained := slippedBank()
	undrained.Situations[0].Undrained = []bool{true, true, false, false, false}
	held := slippedBank() // Most of the slip runs in the stiff clay, and rock would hold the rest.
	held.Section.Soils[clay].Cohesion = 500
	beyond := slippedBank()
	beyond.Observed.Slip = lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: 47, Y: 300}, Radius: 10}
	for _, c := range []struct {
		name string
		job  *Job
		want string // Part of the reason.
	}{
		{"undrained at failure", undrained, "is undrained in high water"},
		{"held by another soil", held, "even if stiff clay had no strength at all"},
		{"above the ground", beyond, "does not pass below the ground"},
	} {
		if _, err := backPair(c.job); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want a reason with %q", c.name, err, c.want)
		}
	}
	undrained.Requests = undrained.Requests[1:]
	res, err := Study(context.Background(), undrained, Settings{Points: true, Slices: fewSlices})
	if err != nil {
		t.Fatal(err)
	}
	if p := res.Points; p == nil || p.Back != nil || len(p.Sized) > 0 || !strings.Contains(p.Reason, "is undrained in high water") {
		t.Errorf("points %+v, want the reason only", p)
	}
	undrained.Observed = nil
	without, err := Study(context.Background(), undrained, Settings{Points: true, Slices: fewSlices})
	if err != nil {
		t.Fatal(err)
	}
	if got, want := summaryOf(res.Options), summaryOf(without.Options); !reflect.DeepEqual(got, want) || without.Points != nil {
		t.Errorf("%q; without the slip %q and points %v", got, want, without.Points)
	}
}
