package film

import (
	"math"
	"testing"
)

// The exponential integral on both sides of each branch (M. Abramowitz and I. A. Stegun, Handbook of
// Mathematical Functions, chapter 5, with more digits of general-purpose programs, from memory).
func TestScaledEi(t *testing.T) {
	for _, v := range []struct{ x, ei float64 }{
		{0.5, 0.4542199048631736}, {1, 1.8951178163559368}, {10, 2492.228976241877}, {40, 6.039718263611242e15}, {50, 1.0585636897131691e20},
		{-0.5, -0.5597735947761608}, {-1, -0.21938393439552029}, {-5, -0.001148295591275326}, {-20, -9.835525290649882e-11},
	} {
		if got, want := scaledEi(v.x), math.Exp(-v.x)*v.ei; math.Abs(got/want-1) > 2e-13 {
			t.Errorf("e^-x Ei(x) at %g is %.15g, want %.15g", v.x, got, want)
		}
	}
	for _, x := range []float64{40, -1.5} { // where one branch takes over from another
		if a, b := scaledEi(math.Nextafter(x, -100)), scaledEi(math.Nextafter(x, 100)); math.Abs(a/b-1) > 1e-12 {
			t.Errorf("at %g it goes from %.15g to %.15g", x, a, b)
		}
	}
}
