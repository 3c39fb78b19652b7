package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
)

// shortShare is the share of the section's width from an edge within which a slip's end says that the section is too short.
const shortShare = 0.02

// gentlest is the inclination of ground below which a cohesionless face is not worth a note: tangent, 1V:6H.
const gentlest = 1.0 / 6

// remarks returns what an engineer must know of an option beside its checks: slips that end at an edge of the section, and the closed form
// for its cohesionless faces, which no depth of interest hides.
func (j *Job) remarks(o *Option) []string {
	var out []string
	ground := o.Proposal.Section.Ground
	near := shortShare * (ground.Right() - ground.Left())
	for _, list := range [][]Outcome{o.Situations, o.Stages} {
		for i := range list {
			c := &list[i]
			if !math.IsNaN(c.FS) && (c.From.X-ground.Left() < near || ground.Right()-c.To.X < near) {
				out = append(out, fmt.Sprintf("section too short: the slip that governs %s ends within %s m of its edge; carry ground and strata on",
					c.Check.Label(), metres(near)))
			}
		}
	}
	for i := range o.Proposal.Section.Placed {
		if i >= len(j.Section.Placed) {
			out = append(out, faceRemarks(&o.Proposal.Section, &o.Proposal.Section.Placed[i])...)
		}
	}
	return out
}

// faceRemarks returns the FS of shallow slips in the cohesionless faces of placed material: tan(phi')/tan(beta) for a dry face (infinite slope,
// closed form), whatever the depth of interest.
func faceRemarks(s *lem.Section, b *lem.Body) []string {
	soil := &s.Soils[b.Soil]
	if soil.Cohesion > 0 || soil.PowerLaw != nil {
		return nil
	}
	steepest := 0.0
	for i, p := range b.Outline {
		q := b.Outline[(i+1)%len(b.Outline)]
		mid := lem.Point{X: (p.X + q.X) / 2, Y: (p.Y + q.Y) / 2}
		if run := math.Abs(q.X - p.X); run > 0 && math.Abs(s.Ground.At(mid.X)-mid.Y) < sameLevel {
			steepest = math.Max(steepest, math.Abs(q.Y-p.Y)/run)
		}
	}
	if steepest < gentlest {
		return nil
	}
	return []string{fmt.Sprintf("dry face of %s at %s: FS %s for shallow slips, tan phi'/tan beta, whatever the depth of interest",
		soil.Name, batterText(1/steepest), floorFS(math.Tan(soil.Friction)/steepest))}
}
