package thermal

import (
	"math"
	"math/rand/v2"
	"testing"
)

// At the asymmetries that ASHRAE 55 allows for 5 % dissatisfied (from memory) the formulas give 5 %
// within 2: the figures of the table are rounded readings of the same curves.
func TestAsymmetryDissatisfied(t *testing.T) {
	for _, tt := range []struct {
		name   string
		source RadiantSource
		k      float64
	}{{"warm ceiling", WarmCeiling, 5}, {"cool wall", CoolWall, 10}, {"cool ceiling", CoolCeiling, 14}, {"warm wall", WarmWall, 23}} {
		percent, within := AsymmetryDissatisfied(tt.source, tt.k)
		near(t, tt.name, percent, 5, 2, "ASHRAE 55, allowable asymmetry, from memory")
		if !within {
			t.Errorf("%s: %g K is said to be outside the range", tt.name, tt.k)
		}
	}
	// The limits of ISO 7730:2005, 6.5 (from memory): 15, 35, 15 and 23 K.
	for _, tt := range []struct {
		source RadiantSource
		limit  float64
	}{{CoolWall, 15}, {WarmWall, 35}, {CoolCeiling, 15}, {WarmCeiling, 23}} {
		for _, x := range []struct {
			k      float64
			within bool
		}{{-0.1, false}, {0, true}, {tt.limit - 0.01, true}, {tt.limit, false}} {
			if _, within := AsymmetryDissatisfied(tt.source, x.k); within != x.within {
				t.Errorf("source %d, %g K: within is %v", tt.source, x.k, within)
			}
		}
	}
	if percent, _ := AsymmetryDissatisfied(WarmWall, 0); percent != 0 {
		t.Errorf("a warm wall without asymmetry leaves %g %% dissatisfied", percent)
	}
}

func TestDraughtRating(t *testing.T) {
	for _, tt := range []struct {
		c, v, turbulence float64
		within           bool
	}{
		{20, 0.2, 40, true}, {26, 0.499, 10, true}, {23, 0.02, 60, true},
		{19.9, 0.2, 40, false}, {26.1, 0.2, 40, false}, {23, 0.5, 40, false}, {23, 0.2, 9.95, false}, {23, 0.2, 60.3, false},
	} {
		percent, within := DraughtRating(ZeroCelsius+tt.c, tt.v, tt.turbulence)
		if within != tt.within {
			t.Errorf("%+v: within is %v (ISO 7730:2005, 6.2, from memory)", tt, within)
		}
		if tt.v <= 0.05 && percent != 0 || percent < 0 || percent > 100 {
			t.Errorf("%+v: %g %%", tt, percent)
		}
	}
	for _, x := range []struct{ c, v, want float64 }{{35, 0.3, 0}, {-40, 3, 100}} {
		if percent, _ := DraughtRating(ZeroCelsius+x.c, x.v, 40); percent != x.want {
			t.Errorf("air of %g °C and %g m/s: %g %%, want %g", x.c, x.v, percent, x.want)
		}
	}
}

// The three formulas of each author meet where they change, as streams do: within 4 %, for their
// coefficients are rounded. By hand: √(2·8) = 4.
func TestDowndraught(t *testing.T) {
	for _, tt := range []struct {
		author  Downdraught
		x, want float64
	}{
		{Heiselberg, 0.399, 4 * 0.055}, {Heiselberg, 0.402, 4 * 0.095 / 1.722}, {Heiselberg, 2, 4 * 0.095 / 3.32}, {Heiselberg, 2.01, 4 * 0.028},
		{ManzFrank, 0.399, 4 * 0.083}, {ManzFrank, 0.402, 4 * 0.143 / 1.722}, {ManzFrank, 2, 4 * 0.143 / 3.32}, {ManzFrank, 2.01, 4 * 0.043},
	} {
		near(t, "velocity at the floor", tt.author.Velocity(2, 8, tt.x), tt.want, 1e-12, "Heiselberg 1994; Manz and Frank 2003; by hand")
	}
	for _, author := range []Downdraught{Heiselberg, ManzFrank} {
		for _, x := range []float64{0.4, 2} {
			a, b := author.Velocity(2.5, 8, x-1e-9), author.Velocity(2.5, 8, x+1e-9)
			near(t, "velocity where the formula changes", a/b, 1, 0.04, "own reasoning")
		}
		if v := author.Velocity(2.5, -3, 0.5); v != 0 {
			t.Errorf("air runs out at %g m/s under a wall that is warmer than the room", v)
		}
	}
	// By hand: (0.3 − 0.034·2)·10.
	near(t, "cooling at 2 m", FloorCooling(10, 2), 2.32, 1e-12, "by hand")
	near(t, "cooling beyond", FloorCooling(10, 5), 2.32, 1e-12, "by hand")
	if c := FloorCooling(-1, 1); c != 0 {
		t.Errorf("the floor is cooled by %g K by a wall that is warmer than the room", c)
	}
}

// The view factor is the integral of cos²θ/(π r²) over the rectangle; here by the midpoint rule.
func TestRectangleViewFactor(t *testing.T) {
	r := rand.New(rand.NewPCG(13, 17))
	for range 50 {
		w, h, d := 0.2+4*r.Float64(), 0.2+4*r.Float64(), 0.5+3*r.Float64()
		const n = 200
		var want float64
		for i := range n {
			for k := range n {
				x, y := w*((float64(i)+0.5)/n-0.5), h*((float64(k)+0.5)/n-0.5)
				r2 := x*x + y*y + d*d
				want += d * d / (math.Pi * r2 * r2) * w * h / (n * n)
			}
		}
		near(t, "view factor", RectangleViewFactor(w, h, d), want, 2e-4, "integral")
	}
	near(t, "view factor from near by", RectangleViewFactor(3, 2.5, 1e-6), 1, 1e-9, "limit")
	near(t, "view factor from far", RectangleViewFactor(3, 2.5, 1e4)*1e8, 7.5/math.Pi, 1e-6, "limit")
}

// Black surfaces: all glass is the temperature of the glass; none, that of the rest; in between the
// flux σT⁴ is the mean.
func TestRadiantAsymmetry(t *testing.T) {
	if got := PlaneRadiant(1, 280, 294); math.Abs(got-280) > 1e-9 {
		t.Errorf("glass alone: %g K", got)
	}
	if got := PlaneRadiant(0, 280, 294); math.Abs(got-294) > 1e-9 {
		t.Errorf("no glass: %g K", got)
	}
	got := PlaneRadiant(0.25, 270, 300)
	near(t, "flux", math.Pow(got, 4), 0.25*math.Pow(270, 4)+0.75*math.Pow(300, 4), 1e-2, "definition")
	if a, b := RadiantAsymmetry(0.7, 285, 294), RadiantAsymmetry(0.7, 303, 294); !(a > 0 && b < 0) {
		t.Errorf("asymmetry %g K before cool glass and %g K before warm glass; want above and below 0", a, b)
	}
}
