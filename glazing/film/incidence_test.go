package film_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"

	"panewright/glazing/film"
)

// The polynomial gives the figures that are published with it (Karlsson and Roos 2000; Roos and others
// 2001; read), at angles and over the half space.
func TestEstimatedAngles(t *testing.T) {
	for _, tt := range []struct{ panes, category, deg, want float64 }{
		{2, 4, 60, 0.87439}, {2, 2, 60, 0.81079}, {3, 4, 60, 0.85610}, {1, 4, 45, 0.97403},
	} {
		if got, _ := film.Estimated(tt.panes, tt.category, tt.deg); math.Abs(got-tt.want) > 1e-5 {
			t.Errorf("%+v: %.6f", tt, got)
		}
	}
	for _, tt := range []struct{ panes, category, want float64 }{{2, 4, 0.89313}, {3, 4, 0.88037}} {
		got := quad.Fixed(func(x float64) float64 {
			f, _ := film.Estimated(tt.panes, tt.category, x*180/math.Pi)
			return f * math.Sin(2*x)
		}, 0, math.Pi/2, 200, nil, 0)
		if math.Abs(got-tt.want) > 2e-5 {
			t.Errorf("half space, %+v: %.6f", tt, got)
		}
	}
	if f, r := film.Estimated(1, 3, 0); f != 1 || r != 0 {
		t.Errorf("at the normal: %g, %g", f, r)
	}
	if f, r := film.Estimated(1, 3, 90); math.Abs(f) > 1e-12 || r != 1 {
		t.Errorf("grazing: %g, %g", f, r)
	}
}

// A sheet whose shares are known at the normal is the sheet itself at every angle.
func TestUncoatedIsTheSheet(t *testing.T) {
	for _, x := range []struct{ n, k, mm float64 }{{1.526, 0, 4}, {1.52, 1e-6, 6}, {1.6, 3e-6, 10}, {1.45, 2e-8, 3}} {
		normal := film.Slab(x.n, x.k, 550, x.mm, 0).S
		u, ok := film.UncoatedOf(normal.T, normal.R)
		if !ok || math.Abs(u.Index-x.n) > 1e-9 {
			t.Fatalf("%+v: %+v, %t", x, u, ok)
		}
		for _, deg := range []float64{0, 20, 45, 60, 75, 85} {
			got, want := u.At(deg), film.Slab(x.n, x.k, 550, x.mm, deg)
			for _, d := range []float64{got.S.T - want.S.T, got.S.R - want.S.R, got.P.T - want.P.T, got.P.R - want.P.R} {
				if math.Abs(d) > 1e-9 {
					t.Errorf("%+v at %g°: %+v, want %+v", x, deg, got, want)
				}
			}
		}
	}
	for _, bad := range [][2]float64{{0, 0.1}, {0.8, 0}, {0.9, 0.2}, {0.5, math.NaN()}} {
		if _, ok := film.UncoatedOf(bad[0], bad[1]); ok {
			t.Errorf("%v is a sheet", bad)
		}
	}
}
