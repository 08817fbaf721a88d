package glazing

import (
	"math"
	"testing"

	"panewright/spectra"
	"panewright/thermal"
)

// syntheticPane is a pane with a smooth spectrum of its own at 5 nm, 300–2500 nm.
func syntheticPane(id string, phase float64) *Pane {
	var m spectra.Measured
	for nm := 300.0; nm <= 2500; nm += 5 {
		x := (nm - 300) / 2200
		tau := 0.75 + 0.1*math.Sin(6*x+phase)
		m.Tau.NM, m.Tau.Value = append(m.Tau.NM, nm), append(m.Tau.Value, tau)
		m.RhoFront.NM, m.RhoFront.Value = append(m.RhoFront.NM, nm), append(m.RhoFront.Value, 0.08+0.03*math.Cos(5*x+phase))
		m.RhoBack.NM, m.RhoBack.Value = append(m.RhoBack.NM, nm), append(m.RhoBack.Value, 0.09+0.04*math.Cos(4*x+phase))
	}
	return &Pane{ID: id, Plies: []Ply{{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}},
		Tints: []Tint{{Spectrum: m, Front: GivenEmissivity(0.837), Back: GivenEmissivity(0.05)}}}
}

// syntheticTriple is a triple of three different panes and two different gaps.
func syntheticTriple(tb testing.TB) *Makeup {
	tb.Helper()
	gas, err := thermal.Mix(map[string]float64{"argon": 0.9, "air": 0.1})
	if err != nil {
		tb.Fatal(err)
	}
	return &Makeup{ID: "T",
		Panes: []Placed{{Pane: syntheticPane("a", 0)}, {Pane: syntheticPane("b", 1)}, {Pane: syntheticPane("c", 2), Turned: true}},
		Gaps:  []Gap{{WidthMM: 16, Gas: gas}, {WidthMM: 12, Gas: gas}},
	}
}

// fineSun is a flat sun at 5 nm, which makes a method of 441 wavelengths.
func fineSun() *spectra.Weighting {
	var c spectra.Curve
	for nm := 300.0; nm <= 2500; nm += 5 {
		c.NM, c.Value = append(c.NM, nm), append(c.Value, 1)
	}
	w := spectra.Trapezoid(c, 300, 2500)
	w.Name = "solar"
	return &w
}

// BenchmarkRateInto is the full rating of one triple: all figures, U and g. "plain" is the
// yardstick: the same stack and as many sums by the shortest loops, without colour, U and g.
func BenchmarkRateInto(b *testing.B) {
	for _, bb := range []struct {
		name string
		o    Options
	}{{"en", Options{}}, {"441", Options{Sun: fineSun()}}} {
		ready, err := NewMethod(EN, bb.o).Ready(syntheticTriple(b))
		if err != nil {
			b.Fatal(err)
		}
		b.Run(bb.name, func(b *testing.B) {
			var dst Rating
			b.ReportAllocs()
			for b.Loop() {
				if err := ready.RateInto(&dst, 0); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(len(ready.Method.grid.NM)), "wavelengths")
		})
		b.Run(bb.name+"-plain", func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				plainRating(ready)
			}
		})
	}
}

// plainRating combines the triple and forms 45 sums over 81 wavelengths and 10 over all.
func plainRating(r *Ready) float64 {
	n := r.Method.grid.Padded()
	t, ro, ri := make([]float64, n), make([]float64, n), make([]float64, n)
	copy(t, r.sampled[0][0].T)
	copy(ro, r.sampled[0][0].Ro)
	copy(ri, r.sampled[0][0].Ri)
	for _, p := range r.sampled[1:] {
		for i := range n {
			d := 1 - ri[i]*p[0].Ro[i]
			ro[i] += t[i] * t[i] * p[0].Ro[i] / d
			ri[i] = p[0].Ri[i] + p[0].T[i]*p[0].T[i]*ri[i]/d
			t[i] = t[i] * p[0].T[i] / d
		}
	}
	var sum float64
	w := r.Method.bands[solar].Weight
	for range 10 {
		for i := range w {
			sum += w[i] * t[i]
		}
	}
	for range 45 {
		for i := range 81 {
			sum += w[i] * t[i]
		}
	}
	return sum
}
