package colour

import (
	"math"
	"testing"

	"panewright/spectra"
)

func grid() spectra.Grid { return spectra.NewGrid(Wavelengths()) }

// D65 itself is white for both observers and renders as itself.
func TestWhite(t *testing.T) {
	m := NewMeter(grid())
	ones := make([]float64, grid().Padded())
	for i := range ones {
		ones[i] = 1
	}
	for _, o := range []Observer{TwoDegree, TenDegree} {
		if lab := m.Lab(o, ones); math.Abs(lab.L-100)+math.Abs(lab.A)+math.Abs(lab.B) > 1e-9 {
			t.Errorf("observer %d: white is %v, want 100 0 0", o, lab)
		}
	}
	if ra := m.RenderingIndex(ones); math.Abs(ra-100) > 1e-9 {
		t.Errorf("Ra of D65 is %v, want 100", ra)
	}
}

// What leads to a colour gives the colour: the sums over that of the white, and the roots.
func TestWorking(t *testing.T) {
	m := NewMeter(grid())
	values := make([]float64, grid().Padded())
	for i := range grid().Len() {
		values[i] = 0.3 + 0.2*math.Sin(float64(i)/9)
	}
	for _, o := range []Observer{TwoDegree, TenDegree} {
		w := m.Working(o, values)
		if w.XYZ != m.XYZ(o, values) || w.Lab != m.Lab(o, values) {
			t.Errorf("observer %d: %v and %v, want %v and %v", o, w.XYZ, w.Lab, m.XYZ(o, values), m.Lab(o, values))
		}
		for _, x := range [][3]float64{
			{w.XYZ.X, w.Sums.X, w.WhiteSums.Y}, {w.XYZ.Y, w.Sums.Y, w.WhiteSums.Y}, {w.XYZ.Z, w.Sums.Z, w.WhiteSums.Y},
			{w.White.X, w.WhiteSums.X, w.WhiteSums.Y}, {w.White.Z, w.WhiteSums.Z, w.WhiteSums.Y},
		} {
			if math.Abs(x[0]-100*x[1]/x[2]) > 1e-11 {
				t.Errorf("observer %d: %v of the sums %v and %v", o, x[0], x[1], x[2])
			}
		}
		if got := w.Roots.Lab(); got != w.Lab || math.Abs(w.Roots.Y-math.Cbrt(w.XYZ.Y/100)) > 1e-15 {
			t.Errorf("observer %d: roots %v give %v, want %v", o, w.Roots, got, w.Lab)
		}
	}
	r := m.Rendering(values)
	if r.Ra != m.RenderingIndex(values) || r.Test.XYZ != m.XYZ(TwoDegree, values) {
		t.Errorf("Ra %v of %v, want %v of %v", r.Ra, r.Test.XYZ, m.RenderingIndex(values), m.XYZ(TwoDegree, values))
	}
	var mean float64
	for _, s := range r.Samples {
		mean += s.R / Samples
		if math.Abs(s.R-(100-4.6*s.DeltaE)) > 1e-12 {
			t.Errorf("R %v of ΔE %v", s.R, s.DeltaE)
		}
	}
	if math.Abs(mean-r.Ra) > 1e-12 {
		t.Errorf("Ra %v is not the mean %v", r.Ra, mean)
	}
	if n := testing.AllocsPerRun(100, func() { m.RenderingIndex(values) }); n != 0 {
		t.Errorf("RenderingIndex allocates %v times", n)
	}
}
