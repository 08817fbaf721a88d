package table

import (
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/spectra"
)

// Every right-hand side can be worked out as it stands, whatever the make-up: make-ups drawn at
// random, from clear to nearly black, from grey to strongly coloured, of every source of emissivity.
func TestEveryStepEvaluates(t *testing.T) {
	r := rand.New(rand.NewPCG(17, 19))
	const draws = 120
	steps, samples, dark, negative := 0, 0, 0, 0
	for range draws {
		ready, err := glazing.NewMethod(glazing.Bases()[r.IntN(2)], glazing.Options{}).Ready(drawn(t, r))
		if err != nil {
			t.Fatal(err)
		}
		ratings, err := ready.RateAll()
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range glazing.Working(&ratings[0]) {
			for _, s := range c.Steps {
				got, err := evaluate(s.Numbers)
				if err != nil {
					t.Fatalf("%s, %s: %q: %v", c.Title, s.Symbol, s.Numbers, err)
				}
				if math.Abs(got-s.Value) > lastDigit(s.Value) {
					t.Errorf("%s, %s: %s is %.9g, want %.9g", c.Title, s.Symbol, s.Numbers, got, s.Value)
				}
				steps++
				if s.Symbol == "Ra" && s.Value < 0 {
					negative++
				}
				if s.Formula == "841/108·Y/Yn + 16/116" {
					dark++
				}
			}
		}
		samples += checkSamples(t, glazing.Working(&ratings[0]))
	}
	if steps < 5000 || samples < 400 || dark == 0 || negative == 0 {
		t.Errorf("%d steps, %d samples, %d dark colours, %d negative Ra: the draw is too narrow", steps, samples, dark, negative)
	}
}

// drawn is a make-up at random.
func drawn(t *testing.T, r *rand.Rand) *glazing.Makeup {
	t.Helper()
	m := &glazing.Makeup{ID: "drawn", Tilt: glazing.TiltDeg([]float64{90, 90, 60, 0}[r.IntN(4)])}
	for k := range 1 + r.IntN(4) {
		m.Panes = append(m.Panes, glazing.Placed{Pane: drawnPane(r), Turned: r.IntN(2) == 0})
		if k > 0 {
			share := []float64{0, 0.5, 0.9, 1}[r.IntN(4)]
			gas, err := glazing.Filling(map[string]float64{"krypton": share, "air": 1 - share})
			if err != nil {
				t.Fatal(err)
			}
			m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: 4 + 20*r.Float64(), Gas: gas})
		}
	}
	return m
}

// drawnPane has a band of transmission somewhere in the visible, above a floor.
func drawnPane(r *rand.Rand) *glazing.Pane {
	var m spectra.Measured
	centre, width := 350+400*r.Float64(), 15+200*r.Float64()
	top, floor := 0.8*math.Pow(r.Float64(), 3), 0.1*math.Pow(r.Float64(), 4)+1e-6
	add := func(c *spectra.Curve, nm, v float64) { c.NM, c.Value = append(c.NM, nm), append(c.Value, v) }
	for nm := 300.0; nm <= 2500; nm += 10 {
		x := (nm - centre) / width
		add(&m.Tau, nm, floor+top*math.Exp(-x*x))
		add(&m.RhoFront, nm, 0.05+0.04*math.Sin(nm/centre))
		add(&m.RhoBack, nm, 0.05+0.04*math.Cos(nm/width))
	}
	level := []float64{0.11, 0.06, 0.5, 0.8, 0.95, 0.99}[r.IntN(6)]
	for nm := 5000.0; nm <= 50000; nm += 5000 {
		v := level + 0.01*r.Float64()
		add(&m.InfraredFront, nm, min(v, 0.995))
		add(&m.InfraredBack, nm, level)
	}
	faces := []glazing.Emissivity{
		glazing.GivenEmissivity(0.837), glazing.GivenNormalEmissivity(0.3), glazing.ConventionalEmissivity(0.893, 0.834),
		glazing.InfraredEmissivity(m.InfraredFront, m.InfraredTau), glazing.ComputedEmissivity(m.InfraredFront, m.InfraredTau, 0.05),
	}
	return &glazing.Pane{ID: "drawn", Plies: []glazing.Ply{{ThicknessMM: 3 + r.Float64(), ConductivityWMK: 1, DensityKGM3: 2500}},
		Tints: []glazing.Tint{{Spectrum: m, Front: faces[r.IntN(len(faces))], Back: glazing.InfraredEmissivity(m.InfraredBack, m.InfraredTau)}}}
}

// checkSamples works out U*, V*, W*, ΔE and R of all eight samples from their printed X, Y, Z and
// the chromaticities of the sources (CIE 13.3-1995, from memory), and returns how many there were.
func checkSamples(t *testing.T, chapters []glazing.Chapter) (count int) {
	t.Helper()
	of := map[string]float64{}
	var rows [][]float64
	for _, c := range chapters {
		if !strings.HasPrefix(c.Title, "Colour rendering index") {
			continue
		}
		for _, s := range c.Steps {
			of[s.Symbol] = s.Value
		}
		if c.Rows == nil {
			continue
		}
		for _, cells := range c.Rows.Cells {
			var row []float64
			for _, cell := range cells[1:] {
				v, err := strconv.ParseFloat(cell, 64)
				if err != nil {
					t.Fatal(err)
				}
				row = append(row, v)
			}
			rows = append(rows, row)
		}
	}
	if of["cr"] == 0 {
		return 0 // no light is transmitted, or none is known of
	}
	if len(rows) != 16 {
		t.Fatalf("%d rows of samples, want twice eight", len(rows))
	}
	for i := range 8 {
		x, y, z := rows[i][0], rows[i][1], rows[i][2]
		sum := x + 15*y + 3*z
		u, v := 4*x/sum, 6*y/sum
		c, d := (4-u-10*v)/v, (1.708*v+0.404-1.481*u)/v
		c, d = of["cr"]/of["c"]*c, of["dr"]/of["d"]*d
		below := 16.518 + 1.481*c - d
		w := 25*math.Cbrt(y) - 17
		want := []float64{13 * w * ((10.872+0.404*c-4*d)/below - of["ur"]), 13 * w * (5.52/below - of["vr"]), w}
		difference := math.Sqrt(math.Pow(want[0]-rows[8+i][0], 2) + math.Pow(want[1]-rows[8+i][1], 2) + math.Pow(want[2]-rows[8+i][2], 2))
		got := append(rows[i][3:6:6], rows[8+i][3:5]...)
		for k, x := range append(want, difference, 100-4.6*difference) {
			if math.Abs(got[k]-x) > 0.01 { // X, Y, Z are printed to six decimals
				t.Errorf("sample %d, column %d: %.5f, worked out anew %.5f", i+1, k, got[k], x)
			}
		}
		count++
	}
	return count
}
