package report

import (
	"encoding/json"
	"fmt"
	"io"

	"standfast/lem"
	"standfast/remedies"
)

// WitnessFormat names the layout of witnesses.json.
const WitnessFormat = "standfast-witnesses/1"

// Witnesses is witnesses.json: for every option that was sized, the pool of slips and, for every cheaper design of the lattice, the slip
// that rejects it.
type Witnesses struct {
	Format    string                   `json:"format"`              // Name of this layout, "standfast-witnesses/1".
	Case      WitnessCase              `json:"case"`                // The case, as in result.json.
	SideForce SideForce                `json:"side_force_function"` // Of Morgenstern-Price's method in all that follows.
	Options   map[string]WitnessOption `json:"options"`             // By name of the option.
}

// WitnessCase says to which result the witnesses belong.
type WitnessCase struct {
	File   string `json:"file"`   // Name of the case file, without its folder.
	SHA256 string `json:"sha256"` // SHA-256 of the case file's bytes, in hexadecimal.
}

// WitnessOption holds the witnesses of one option.
type WitnessOption struct {
	Parameters []string        `json:"parameters"` // Names of the numbers in x, in order.
	Pool       []WitnessCut    `json:"pool"`       // Slips that reject designs.
	Designs    []WitnessDesign `json:"designs"`    // The cheaper designs, each with its witness.
}

// WitnessCut is a slip with the check and the setting it was found in; it is evaluated as it was found.
type WitnessCut struct {
	Check    string       `json:"check"`       // Situation, variant or stage.
	Method   string       `json:"method"`      // Method of slices.
	Slices   int          `json:"slices"`      // Target number of slices.
	MinDepth float64      `json:"min_depth_m"` // Parts of the slip nowhere deeper than this do not count, m.
	Slip     WitnessShape `json:"slip"`        // Geometry alone: it is cut by the ground of each design.
}

// WitnessShape is a slip surface that no ground has cut yet.
type WitnessShape struct {
	Kind   string  `json:"kind"`             // "circle" or "polyline".
	Centre *Point  `json:"centre,omitempty"` // Of a circle.
	Radius float64 `json:"radius,omitempty"` // Of a circle, m.
	Points []Point `json:"points,omitempty"` // Of a polyline, from left to right.
}

// WitnessDesign is a cheaper design with the slip that rejects it.
type WitnessDesign struct {
	X          []Number `json:"x"`                   // Its parameters; null where an optional one is absent.
	Earthworks float64  `json:"earthworks_m3_per_m"` // Cut plus fill, m3/m.
	Cut        int32    `json:"cut"`                 // Index into the pool.
	FS         Number   `json:"fs"`                  // FS of that slip on this design.
}

// NewWitnesses lays out the certificates of a result as the contents of witnesses.json.
func NewWitnesses(r *remedies.Result, src Source) *Witnesses {
	w := &Witnesses{
		Format: WitnessFormat, Case: WitnessCase{File: src.File, SHA256: src.SHA256}, SideForce: sideForceOf(&r.Job.SideForce),
		Options: map[string]WitnessOption{},
	}
	for i := range r.Options {
		o := &r.Options[i]
		if o.Certificate != nil && o.Proposal != nil {
			w.Options[o.Name] = witnessOption(o, remedies.Checks(r.Job, o.Proposal))
		}
	}
	return w
}

// Encode writes the witnesses as JSON, a design a line.
func (w *Witnesses) Encode(to io.Writer) error { return encode(to, w) }

// DecodeWitnesses reads witnesses.json. Its error is ErrFormat for another layout, or that of the JSON.
func DecodeWitnesses(from io.Reader) (*Witnesses, error) {
	w := &Witnesses{}
	if err := json.NewDecoder(from).Decode(w); err != nil {
		return nil, fmt.Errorf("report: witnesses: %w", err)
	}
	if w.Format != WitnessFormat {
		return nil, fmt.Errorf("%w: %q, not %q", ErrFormat, w.Format, WitnessFormat)
	}
	return w, nil
}

// Certificate returns the pool and the witnesses of an option as package remedies replays them, with the window and the side-force function of
// common. Its error names a method that there is not.
func (o *WitnessOption) Certificate(common lem.Setting) (pool []remedies.CutOf, witnesses []remedies.Witness, err error) {
	for i := range o.Pool {
		c := &o.Pool[i]
		method, ok := lem.MethodNamed(c.Method)
		if !ok {
			return nil, nil, fmt.Errorf("%w: there is no method %q", ErrFormat, c.Method)
		}
		setting := common
		setting.Method, setting.Slices, setting.MinDepth = method, c.Slices, c.MinDepth
		slip := lem.Slip{Kind: lem.Polyline, Radius: c.Slip.Radius}
		if c.Slip.Centre != nil {
			slip.Kind, slip.Centre = lem.Circle, lem.Point{X: c.Slip.Centre[0], Y: c.Slip.Centre[1]}
		}
		for _, p := range c.Slip.Points {
			slip.Nodes = append(slip.Nodes, lem.Point{X: p[0], Y: p[1]})
		}
		pool = append(pool, remedies.CutOf{Check: c.Check, Setting: setting, Slip: slip})
	}
	for _, d := range o.Designs {
		x := make([]float64, len(d.X))
		for k, v := range d.X {
			x[k] = float64(v)
		}
		witnesses = append(witnesses, remedies.Witness{X: x, Earthworks: d.Earthworks, Cut: d.Cut, FS: float64(d.FS)})
	}
	return pool, witnesses, nil
}

func witnessOption(o *remedies.Option, checks []remedies.Check) WitnessOption {
	c := o.Certificate
	out := WitnessOption{
		Parameters: make([]string, len(c.Axes)), Pool: make([]WitnessCut, len(c.Pool)), Designs: make([]WitnessDesign, len(c.Witnesses)),
	}
	for i, a := range c.Axes {
		out.Parameters[i] = a.Name
	}
	for i := range c.Pool {
		cut := &c.Pool[i]
		shape := slipOf(&cut.Slip, cut.Slip.Centre, cut.Slip.Centre)
		out.Pool[i] = WitnessCut{
			Check: checks[cut.Check].Label(), Method: cut.Setting.Method.String(), Slices: cut.Setting.Slices,
			MinDepth: cut.Setting.MinDepth,
			Slip:     WitnessShape{Kind: shape.Kind, Centre: shape.Centre, Radius: shape.Radius, Points: shape.Points},
		}
	}
	for i, d := range c.Witnesses {
		x := make([]Number, len(d.X))
		for k, v := range d.X {
			x[k] = Number(v)
		}
		out.Designs[i] = WitnessDesign{X: x, Earthworks: d.Earthworks, Cut: d.Cut, FS: Number(d.FS)}
	}
	return out
}
