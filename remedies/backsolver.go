package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
)

// backSolver evaluates the observed slip with a soil's strength or pore pressure replaced.
type backSolver struct {
	section   lem.Section
	situation lem.Situation
	given     lem.Soil // The soil as in the case.
	slip      lem.Slip
	setting   lem.Setting
	soils     []lem.Soil
	model     lem.Model
	ws        lem.Workspace
	last      lem.Result // Of the last evaluation.
	out       BackAnalysis
}

func newBackSolver(j *Job, o *Observed, s *BackSettings) (*backSolver, error) {
	p := Start(j)
	c := situationCheck(p, o.Situation, &j.Situations[o.Situation], "", p.Waters[o.Situation])
	b := &backSolver{
		section: *c.Section, situation: c.Situation, slip: o.Slip,
		setting: lem.Setting{Method: s.Method, Slices: s.Slices, SideForce: j.SideForce},
	}
	switch {
	case s.Method == lem.Ordinary && o.Slip.Kind == lem.Circle:
		b.setting.Method = lem.Bishop
	case s.Method == lem.Ordinary:
		b.setting.Method = lem.Spencer
	case s.Method == lem.Bishop && o.Slip.Kind != lem.Circle:
		return nil, fmt.Errorf("%w: Bishop's method is for circles, and the observed slip is none: use Spencer's or Morgenstern-Price's", ErrRequest)
	}
	b.section.Known = nil // What is looked for is the strength along the slip itself.
	b.soils = append([]lem.Soil(nil), b.section.Soils...)
	b.section.Soils = b.soils
	b.situation.Undrained = append(make([]bool, 0, len(b.soils)), b.situation.Undrained...)
	for len(b.situation.Undrained) < len(b.soils) {
		b.situation.Undrained = append(b.situation.Undrained, false)
	}
	b.out = BackAnalysis{Unknown: s.Unknown, Soil: s.Soil, Situation: o.Situation, Method: b.setting.Method, Bend: math.NaN()}
	return b, b.chooseSoil(s.HasSoil)
}

// chooseSoil finds the soil that most of the slip runs in, unless one is given, and its share. Shares are those of the slices, which every method has
// alike.
func (b *backSolver) chooseSoil(given bool) error {
	if err := b.model.Compile(&b.section, &b.situation); err != nil {
		return fmt.Errorf("back-analysis: %w", err)
	}
	d, err := b.model.Detail(&b.slip, lem.Setting{Method: lem.Ordinary, Slices: b.setting.Slices})
	if err != nil {
		return fmt.Errorf("%w: the observed slip does not pass below the ground, or does not move downhill", ErrNoBackAnalysis)
	}
	lengths := make([]float64, len(b.soils))
	var total float64
	for _, s := range d.Slices {
		lengths[s.Soil] += s.Length
		total += s.Length
	}
	if !given {
		for i, l := range lengths {
			if l > lengths[b.out.Soil] {
				b.out.Soil = i
			}
		}
	}
	b.given = b.soils[b.out.Soil]
	b.out.Share = lengths[b.out.Soil] / total
	b.out.From, b.out.To, b.out.Depth = d.Result.From, d.Result.To, d.Result.Depth
	if b.out.Share == 0 {
		return fmt.Errorf("%w: the observed slip does not pass through %s", ErrRequest, b.name())
	}
	return nil
}

// describe evaluates the slip as the case has it.
func (b *backSolver) describe() error {
	b.out.AsGiven = b.evaluate()
	u := b.out.Unknown
	b.situation.Undrained[b.out.Soil] = u == UndrainedCu
	if u == PressureRatio && b.given.FreeDraining {
		return fmt.Errorf("%w: %s drains freely and has no ru", ErrRequest, b.name())
	}
	return nil
}

// evaluate returns FS of the slip; NaN without an answer.
func (b *backSolver) evaluate() float64 {
	if err := b.model.Compile(&b.section, &b.situation); err != nil {
		panic("remedies: back-analysis: " + err.Error()) // It compiled with the case's own strengths.
	}
	b.last = b.model.FS(&b.ws, &b.slip, b.setting)
	return b.last.F
}

// pair returns FS with a cohesion, kPa, and the tangent of an angle of friction.
func (b *backSolver) pair(c, tan float64) float64 {
	s := &b.soils[b.out.Soil]
	s.Cohesion, s.Friction, s.PowerLaw = c, math.Atan(tan), nil
	return b.evaluate()
}

// alone returns FS with the single unknown: tan(phi') with c' = 0, cu, or ru.
func (b *backSolver) alone(v float64) BackPoint {
	p := BackPoint{Cohesion: b.given.Cohesion, Friction: b.given.Friction}
	s := &b.soils[b.out.Soil]
	switch b.out.Unknown {
	case FrictionAlone, StrengthPair:
		p.Cohesion, p.Friction = 0, math.Atan(v)
		p.FS = b.pair(0, v)
	case UndrainedCu:
		p.Strength = v
		s.Undrained = &lem.UndrainedStrength{Strength: v}
		p.FS = b.evaluate()
	case PressureRatio:
		p.Ru = v
		s.HasRu, s.Ru = true, v
		p.FS = b.evaluate()
	}
	return p
}

// valueOf returns the single unknown of a point.
func (b *backSolver) valueOf(p *BackPoint) float64 {
	switch b.out.Unknown {
	case UndrainedCu:
		return p.Strength
	case PressureRatio:
		return p.Ru
	case StrengthPair, FrictionAlone:
	}
	return math.Tan(p.Friction)
}

func (b *backSolver) name() string { return b.soils[b.out.Soil].Name }

// unknown names the single unknown with its soil.
func (b *backSolver) unknown() string {
	return map[Unknown]string{FrictionAlone: "the angle of friction (c' = 0)", UndrainedCu: "cu", PressureRatio: "ru"}[b.out.Unknown] + " of " + b.name()
}

// limit is the greatest value tried, in words.
func (b *backSolver) limit(most float64) string {
	switch b.out.Unknown {
	case FrictionAlone:
		return fmt.Sprintf("%.0f degrees", math.Atan(most)*180/math.Pi)
	case UndrainedCu:
		return fmt.Sprintf("%g kPa", most)
	case PressureRatio, StrengthPair:
	}
	return fmt.Sprintf("%g", most)
}

// why says what the method made of the last evaluation.
func (b *backSolver) why() string {
	if b.last.Status == lem.Converged {
		return "what else holds the slip, or its weight, does not let it"
	}
	text := fmt.Sprintf("%s gives no answer on it (%s", b.setting.Method, b.last.Status)
	if b.last.Reason != lem.Admissible {
		text += ": " + b.last.Reason.String()
	}
	return text + ")"
}

func fsOrNone(fs float64) string {
	if math.IsNaN(fs) {
		return "no answer"
	}
	return floorFS(fs)
}
