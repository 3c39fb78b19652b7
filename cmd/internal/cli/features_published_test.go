package cli

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

const degree = math.Pi / 180

// TestFeaturesInSand: a search of every situation of a bank of sand comes to FS of an endless slope, and so does every method on the slip found, with
// and without Janbu's f0, which is next to 1 on so shallow a slip. Closed forms: tan(phi)/tan(beta) dry and under still water (Taylor 1948; the
// identity of submerged slopes), with u = gamma_w z cos^2(beta) along the face (Skempton and DeLory 1957), with level flow (Haefeli 1948), and in
// an earthquake by statics.
func TestFeaturesInSand(t *testing.T) {
	const n, kh, tolerance = 2.0, 0.1, 1.5e-3
	tan, uplift, cos2 := math.Tan(34*degree), 9.81/20, n*n/(1+n*n)
	want := map[string]float64{
		"dry": n * tan, "shaken upwards": n * tan, "under water": n * tan,
		"shaken outwards":     tan * (n - kh) / (1 + kh*n),
		"level flow":          n * tan * (1 - uplift/cos2),
		"flow along the face": n * tan * (1 - uplift),
	}
	_, f := assessed(t, "sand.yaml")
	for _, s := range f.Existing.Situations {
		w, ok := want[s.Name]
		if !ok {
			t.Fatalf("no closed form for %s", s.Name)
		}
		for method, fs := range s.FSByMethod {
			if !(math.Abs(float64(fs)-w) <= tolerance*w) {
				t.Errorf("%s: FS %.5f by %s, want %.5f", s.Name, float64(fs), method, w)
			}
		}
		if len(s.FSByMethod) < 4 || s.FSByMethod["janbu simplified"] <= s.FSByMethod["janbu simplified (uncorrected)"] {
			t.Errorf("%s: methods %v", s.Name, s.FSByMethod)
		}
	}
	placed, _ := assessed(t, "fill.yaml")
	if w := want["dry"]; !(math.Abs(placed["dry"]-w) <= tolerance*w) {
		t.Errorf("fill on its own face: FS %.5f, want %.5f", placed["dry"], w)
	}
}

// TestFeatureMethodsPublished: Fredlund and Krahn (1977) on their circle; Morgenstern-Price with the constant function that they had.
func TestFeatureMethodsPublished(t *testing.T) {
	const tolerance = 0.005 // Printed to 0.001; slices not given.
	for _, c := range []struct {
		method       string
		dry, pressed float64 // With ru 0 and 0.25.
	}{{"bishop", 2.080, 1.766}, {"spencer", 2.073, 1.761}, {"morgenstern-price", 2.076, 1.765}} {
		dry := backAnalysed(t, edited(t, "fredlund.yaml"), "--method", c.method)
		pressed := backAnalysed(t, edited(t, "fredlund.yaml", "friction: 20}", "friction: 20}, ru: 0.25"), "--method", c.method)
		for _, p := range [][2]float64{{float64(dry.AsGiven), c.dry}, {float64(pressed.AsGiven), c.pressed}} {
			if !(math.Abs(p[0]-p[1]) <= tolerance*p[1]) {
				t.Errorf("%s: FS %.4f, published %.3f", c.method, p[0], p[1])
			}
		}
	}
}

// TestFeatureCompositeSlip: the circle of Fredlund and Krahn (1977) cut off by a weak layer (their case 2), and a search of that section, which must
// find a slip along the layer that is no safer.
func TestFeatureCompositeSlip(t *testing.T) {
	const seam, tolerance = 4.25, 0.01 // Level of the flat part, m, inferred from their figure.
	weak := []string{
		"friction: 20}}\n", "friction: 20}}\n  weak: {unit_weight: 20, drained: {cohesion: 0, friction: 10}}\n",
		"soil: soil, top: ground}\n", "soil: soil, top: ground}\n  - {soil: weak, top: [[0, 4.2502], [50, 4.2502]]}\n  - {soil: soil, top: [[0, 4.125], [50, 4.125]]}\n",
		"{circle: {centre: [30, 22.5], radius: 20}}", "{line: [" + cutArc(30, 22.5, 20, 15, 5, seam) + "]}",
	}
	for method, want := range map[string]float64{"spencer": 1.373, "morgenstern-price": 1.378} {
		f := backAnalysed(t, edited(t, "fredlund.yaml", weak...), "--method", method, "--soil", "soil", "--find", "friction")
		if got := float64(f.AsGiven); !(math.Abs(got-want) <= tolerance*want) {
			t.Errorf("%s: FS %.4f, published %.3f", method, got, want)
		}
	}
	fs, f := assessed(t, "fredlund.yaml", weak...)
	if got, slip := fs["as published"], f.Existing.Situations[0].Slip; !(got <= 1.373*(1+tolerance) && slip.Kind == "polyline") {
		t.Errorf("the search finds FS %.4f on a %s, published 1.373 on the composite slip", got, slip.Kind)
	}
}

// cutArc returns the points of an arc from a level at its head to one at its exit, cut off flat at a third.
func cutArc(x, y, r, head, exit, seam float64) string {
	const pieces = 60
	half := func(level float64) float64 { return math.Sqrt(r*r - (y-level)*(y-level)) }
	var points []string
	between := func(from, to float64) {
		for i := range pieces + 1 {
			at := from + (to-from)*float64(i)/pieces
			points = append(points, fmt.Sprintf("[%.6f, %.6f]", x+at, y-math.Sqrt(r*r-at*at)))
		}
	}
	between(-half(head), -half(seam))
	between(half(seam), half(exit))
	return strings.Join(points, ", ")
}

// TestFeatureCrackPublished: the referees of Giam and Donald had 1.65 to 1.70 on circles; slips of other shapes go a little lower.
func TestFeatureCrackPublished(t *testing.T) {
	const lower = 0.02
	fs, f := assessed(t, "giam.yaml")
	if got := fs["as published"]; !(got >= 1.65*(1-lower) && got <= 1.70) {
		t.Errorf("FS %.4f, published 1.65 to 1.70", got)
	}
	if crack := f.Existing.Situations[0].Slip.Crack; math.Abs(crack-3.81) > 1e-6 {
		t.Errorf("the slip ends in a crack %.4f m deep", crack)
	}
}

// knownPlane makes the plane of plane.yaml a known slip in stronger ground, so that a search finds it.
var knownPlane = []string{
	planeClay, "{unit_weight: 19, drained: {cohesion: 60, friction: 30}",
	planeStrata, planeStrata + "known_slips: [{line: [[12, 30], [36, 18]], cohesion: 5, friction: 20}]\n",
	"slope:", "ignore_slips_shallower_than: 1\nslope:",
}

// TestFeatureSliceTable: the table that is written for a hand check adds up to the weight of the wedge and the length of its base, and R over D is FS by
// statics.
func TestFeatureSliceTable(t *testing.T) {
	const tolerance = 1e-3
	folder := t.TempDir()
	path := filepath.Join(folder, "case.yaml")
	if err := os.WriteFile(path, []byte(edited(t, "plane.yaml", knownPlane...)), 0o644); err != nil {
		t.Fatal(err)
	}
	var out, errs bytes.Buffer
	if code := run(t.Context(), []string{"assess", path, "--slices", "--out", folder}, nil, &out, &errs); code != exitOK {
		t.Fatalf("exit code %d: %s", code, &errs)
	}
	in, err := os.Open(filepath.Join(folder, "case-slices-failure.csv"))
	if err != nil {
		t.Fatal(err)
	}
	defer in.Close() //nolint:errcheck // only read from
	r := csv.NewReader(in)
	r.FieldsPerRecord = -1
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	sum := map[string]float64{}
	for _, row := range rows[1:] {
		if _, err := strconv.Atoi(row[0]); err != nil {
			break // The sums.
		}
		for i, head := range rows[0] {
			if v, err := strconv.ParseFloat(row[i], 64); err == nil {
				sum[head] += v
			}
		}
	}
	wedge := onPlane{v: wedgeWeight, cl: 5 * planeLength, tan: math.Tan(20 * degree)}
	for what, c := range map[string][2]float64{
		"weight": {sum["W (kN)"], wedgeWeight}, "length of the base": {sum["l (m)"], planeLength}, "width": {sum["b (m)"], planeRun},
		"FS": {sum["R (kN)"] / sum["D (kN)"], wedge.fs()}, "mobilised": {sum["S (kN)"], wedgeWeight * planeSin},
		"normal force": {sum["N' (kN)"], wedgeWeight * planeCos},
	} {
		if !(math.Abs(c[0]-c[1]) <= tolerance*c[1]) {
			t.Errorf("%s: %.4f, want %.4f", what, c[0], c[1])
		}
	}
}

// TestFeatureInfluence: on a plane the change of FS by a load, at once and in the long term, is that of statics, and it is the same everywhere; on
// other slips a load at once leaves FS as it is above the lowest point (Hutchinson 1977).
func TestFeatureInfluence(t *testing.T) {
	const load, tolerance = 10.0, 0.005
	_, f := assessed(t, "plane.yaml", knownPlane...)
	wedge := onPlane{v: wedgeWeight, cl: 5 * planeLength, tan: math.Tan(20 * degree)}
	loaded, pressed := wedge, wedge
	loaded.v += load
	pressed.v += load
	pressed.u = load / planeCos
	later, atOnce := loaded.fs()-wedge.fs(), pressed.fs()-wedge.fs()
	v := f.Existing.Situations[0].Influence
	if v == nil || len(v.Points) < 20 || len(v.Neutral) > 0 {
		t.Fatalf("influence %+v", v)
	}
	for _, p := range v.Points {
		for _, c := range []struct {
			name      string
			got, want float64
			tol       float64
		}{
			{"drained", float64(p.Drained.Placed), later, tolerance},
			{"undrained", float64(p.Undrained.Placed), atOnce, tolerance},
			{"drained by formula", float64(p.Drained.Formula), later, 0.02}, // Of a load that vanishes.
			{"undrained by formula", float64(p.Undrained.Formula), atOnce, 0.02},
		} {
			if !(math.Abs(c.got-c.want) <= c.tol*math.Abs(c.want)) {
				t.Errorf("%s, at x = %.2f: change %.6f, want %.6f", c.name, p.X, c.got, c.want)
			}
		}
	}
	_, f = assessed(t, "loads.yaml")
	s := f.Existing.Situations[0]
	lowest := s.Slip.Points[0]
	for _, p := range s.Slip.Points {
		if p[1] < lowest[1] {
			lowest = p
		}
	}
	slice := (s.Slip.To[0] - s.Slip.From[0]) / 30
	for _, n := range s.Influence.Neutral {
		if n.State == "undrained" && math.Abs(n.X-lowest[0]) > slice {
			t.Errorf("neutral by %s at x = %.2f, lowest point of the slip at %.2f", n.By, n.X, lowest[0])
		}
	}
}
