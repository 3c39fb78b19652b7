package report

import (
	"bytes"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

// frontSample is the sample with an invented front of its drains: three spacings, for a berm that is not drawn.
func frontSample() (*remedies.Result, Source) {
	r, src := sample()
	priceSample(r.Job)
	o := &r.Options[1]
	o.Parameters = []remedies.Value{{Name: "depth", Unit: "m", Value: 4}, {Name: "spacing", Unit: "m", Value: 6}}
	o.Front = &remedies.Front{Searches: 12, Unresolved: 1}
	for i, spacing := range []float64{6, 8, 12} {
		p := works(r.Job, "trench_drains", nil, 4, spacing, 0.6, 0.7)
		point := remedies.FrontPoint{
			Drain: p.Quantities.Drain, Earthworks: 5 + float64(i)/3, Answer: i == 0, Proposal: p,
			Parameters: []remedies.Value{{Name: "depth", Unit: "m", Value: 4}, {Name: "spacing", Unit: "m", Value: spacing}},
			Situations: []remedies.Outcome{
				{Check: remedies.Check{Name: "normal water", Required: 1.3}, FS: 1.3159, Method: lem.Bishop},
				{Check: remedies.Check{Name: "wet spring", Required: 1.2}, FS: 1.2068, Method: lem.Bishop},
			},
		}
		o.Front.Points = append(o.Front.Points, point)
	}
	return r, src
}

// TestFront checks what a front says on the screen and in the file, and that it comes back from the file.
func TestFront(t *testing.T) {
	r, src := frontSample()
	f := New(r, src)
	front := f.Options[1].Front
	want := &r.Options[1].Front.Points[1]
	if p := front.Points[1]; len(front.Points) != 3 || front.Searches != 12 || front.Whole || front.Unresolved != 1 || p.Check != "wet spring" || p.FS != 1.2068 ||
		p.RequiredFS != 1.2 || p.Drain != Number(want.Drain) || p.Quantities.Drain != want.Drain || p.Answer || !front.Points[0].Answer {
		t.Errorf("front %+v", front)
	}
	if bill := remedies.BillOf(r.Job, &want.Proposal.Quantities); front.Points[1].Cost != nil != (bill.Cost == bill.Cost) {
		t.Errorf("cost %v, bill %v", front.Points[1].Cost, bill.Cost)
	}
	var b bytes.Buffer
	if err := WriteComparison(&b, f, Look{}); err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{
		"Trench drains: earthworks against metres of drain", " answer ", " 5.34 ", " 1.206 ", "spacing 12 m", "there may be more such designs between them",
		"might come in: 1.",
	} {
		if !strings.Contains(unwrapped(b.String()), strings.TrimSpace(want)) {
			t.Errorf("missing: %s\nin:\n%s", want, b.String())
		}
	}
	if strings.Contains(f.Options[1].FrontDimensions(&front.Points[0]), "depth") {
		t.Error("a dimension that all points share is told of each")
	}
	if text := f.Options[1].FrontText(); strings.Contains(text, "made least by something else") {
		t.Errorf("the answer is among the points: %s", text)
	}
	f.Options[1].Front.Points = f.Options[1].Front.Points[1:2]
	if text := f.Options[1].FrontText(); !strings.Contains(text, "More drain than this saves no earthworks.") || !strings.Contains(text, "made least by something else") {
		t.Errorf("one point that is not the answer: %s", text)
	}
	f = New(r, src)
	back, err := Rebuild(f)
	if err != nil {
		t.Fatal(err)
	}
	again := back.Options[1].Front
	if again == nil || len(again.Points) != 3 || again.Points[1].Drain != want.Drain || again.Points[1].Earthworks != want.Earthworks || !again.Points[0].Answer ||
		len(again.Points[1].Parameters) != 2 || back.Options[0].Front != nil {
		t.Errorf("the front comes back as %+v", again)
	}
}
