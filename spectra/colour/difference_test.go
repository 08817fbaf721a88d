package colour

import (
	"math"
	"math/rand/v2"
	"testing"
)

// What holds for any two colours: none differs from itself, and the difference is the same both
// ways. Then simple pairs worked by hand.
func TestCIEDE2000Holds(t *testing.T) {
	r := rand.New(rand.NewPCG(11, 13))
	random := func() Lab {
		return Lab{100 * r.Float64(), 200*r.Float64() - 100, 200*r.Float64() - 100}
	}
	for range 2000 {
		a, b := random(), random()
		if d := a.CIEDE2000(a); d != 0 {
			t.Fatalf("%v differs by %v from itself", a, d)
		}
		one, two := a.CIEDE2000(b), b.CIEDE2000(a)
		if !(one > 0) || math.Abs(one-two) > 1e-11 {
			t.Fatalf("%v and %v: %v one way, %v the other", a, b, one, two)
		}
	}
	// Greys by hand: ΔE00 = ΔL*/SL with SL = 1 + 0.015 (L − 50)²/√(20 + (L − 50)²) at the mean L.
	// L 40 and 50: mean 45, SL = 1 + 0.375/√45 = 1.05590170; 10/SL = 9.47057.
	if d := (Lab{L: 40}).CIEDE2000(Lab{L: 50}); math.Abs(d-10/(1+0.375/math.Sqrt(45))) > 1e-12 {
		t.Errorf("greys of L* 40 and 50 differ by %.9f, by hand %.9f", d, 10/(1+0.375/math.Sqrt(45)))
	}
	// A grey beside a colour has no hue: the hue term is 0, chroma alone counts. a* = 0, b* = 5 and
	// grey: mean C 2.5, SC = 1 + 0.045·2.5; rotation only matters with a hue term.
	for _, x := range [][2]Lab{{{50, 0, 0}, {50, 0, 5}}, {{50, 0, 5}, {50, 0, 0}}} {
		if d := x[0].CIEDE2000(x[1]); math.Abs(d-5/(1+0.045*2.5)) > 1e-12 {
			t.Errorf("%v and %v differ by %.9f, by hand %.9f", x[0], x[1], d, 5/(1+0.045*2.5))
		}
	}
	// Hues of 359 and 1 degree are neighbours, around 0 and not around 180. Chroma 30: √(30⁷/(30⁷ +
	// 25⁷)) = 0.88420, so a* is stretched by 1.05790, C′ = √(31.73217² + 0.52357²) = 31.73649; T at 0 is
	// 1 − 0.147224 + 0.24 + 0.318247 − 0.090798 = 1.320225, SH = 1 + 0.015·C′·T = 1.628490; ΔH′ =
	// 2·30·sin 1° = 1.047144; the quotient is 0.64302.
	at := func(hue float64) Lab { return Lab{50, 30 * cos(hue), 30 * sin(hue)} }
	if d := at(359).CIEDE2000(at(1)); math.Abs(d-0.64302) > 1e-5 {
		t.Errorf("hues of 359 and 1 degree differ by %.6f, by hand 0.64302", d)
	}
	if n := testing.AllocsPerRun(100, func() { at(10).CIEDE2000(at(200)) }); n != 0 {
		t.Errorf("CIEDE2000 allocates %v times", n)
	}
}

// By hand: differences of 1, 2 and 2 are 3 apart.
func TestDifference(t *testing.T) {
	a, b := Lab{50, 10, -4}, Lab{51, 8, -2}
	if one, two := a.Difference(b), b.Difference(a); math.Abs(one-3) > 1e-12 || one != two {
		t.Errorf("ΔE*ab is %v and %v, by hand 3", one, two)
	}
}
