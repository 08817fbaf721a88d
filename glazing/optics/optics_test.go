package optics

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// randomPanes returns panes of n wavelengths with arbitrary coatings: different reflectances of
// the two faces, and absorption from none to all.
func randomPanes(r *rand.Rand, count, n int) []Pane {
	panes := make([]Pane, count)
	for k := range panes {
		p := Pane{make([]float64, n), make([]float64, n), make([]float64, n)}
		for i := range n {
			p.T[i] = r.Float64()
			p.Ro[i] = r.Float64() * (1 - p.T[i])
			p.Ri[i] = r.Float64() * (1 - p.T[i])
			switch r.IntN(20) {
			case 0: // opaque
				p.T[i] = 0
			case 1: // lossless
				p.Ro[i], p.Ri[i] = 1-p.T[i], 1-p.T[i]
			case 2: // perfect mirrors
				p.T[i], p.Ro[i], p.Ri[i] = 0, 1, 1
			}
		}
		panes[k] = p
	}
	return panes
}

func reversed(panes []Pane) []Pane {
	out := make([]Pane, len(panes))
	for k, p := range panes {
		out[len(panes)-1-k] = Pane{p.T, p.Ri, p.Ro}
	}
	return out
}

// What holds for any stack: shares add to one, the reversed stack transmits the same and swaps
// its reflectances, nothing is negative.
func TestAnyStack(t *testing.T) {
	const stacks, n = 1200, 8
	r := rand.New(rand.NewPCG(7, 11))
	var s, back Stack
	for range stacks {
		panes := randomPanes(r, 1+r.IntN(8), n)
		s.Combine(panes)
		back.Combine(reversed(panes))
		for i := range n {
			sum := s.T[i] + s.Ro[i]
			for k := range panes {
				sum += s.A[k][i]
				if s.A[k][i] < -1e-15 {
					t.Fatalf("pane %d of %d absorbs %g", k+1, len(panes), s.A[k][i])
				}
			}
			if !(math.Abs(sum-1) <= 1e-12) {
				t.Fatalf("%d panes: shares add to %.17g, want 1", len(panes), sum)
			}
			if !(math.Abs(s.T[i]-back.T[i]) <= 1e-12 && math.Abs(s.Ro[i]-back.Ri[i]) <= 1e-12 && math.Abs(s.Ri[i]-back.Ro[i]) <= 1e-12) {
				t.Fatalf("%d panes: T %g, Ro %g, Ri %g; reversed T %g, Ri %g, Ro %g", len(panes),
					s.T[i], s.Ro[i], s.Ri[i], back.T[i], back.Ri[i], back.Ro[i])
			}
		}
	}
}

// The second evaluation follows the radiation: unknown are the fluxes in both directions in
// every gap, found by letting light bounce until nothing is left.
func TestAgainstBounces(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 5))
	for count := 1; count <= 8; count++ {
		panes := randomPanes(r, count, 1)
		for k := range panes { // keep it lossy, so that the bounces die out
			panes[k].Ro[0] *= 0.7
			panes[k].Ri[0] *= 0.7
		}
		var s Stack
		s.Combine(panes)
		in, out := make([]float64, count+1), make([]float64, count+1)
		absorbed := make([]float64, count)
		in[0] = 1
		var through, reflected float64
		for range 20000 {
			nextIn, nextOut := make([]float64, count+1), make([]float64, count+1)
			for k, p := range panes {
				nextIn[k+1] += p.T[0]*in[k] + p.Ri[0]*out[k+1]
				nextOut[k] += p.T[0]*out[k+1] + p.Ro[0]*in[k]
				absorbed[k] += (1-p.T[0]-p.Ro[0])*in[k] + (1-p.T[0]-p.Ri[0])*out[k+1]
			}
			through += nextIn[count]
			reflected += nextOut[0]
			nextIn[count], nextOut[0] = 0, 0
			in, out = nextIn, nextOut
		}
		if math.Abs(through-s.T[0]) > 1e-12 || math.Abs(reflected-s.Ro[0]) > 1e-12 {
			t.Errorf("%d panes: T %.15f R %.15f, by bounces %.15f %.15f", count, s.T[0], s.Ro[0], through, reflected)
		}
		for k := range absorbed {
			if math.Abs(absorbed[k]-s.A[k][0]) > 1e-12 {
				t.Errorf("%d panes: pane %d absorbs %.15f, by bounces %.15f", count, k+1, s.A[k][0], absorbed[k])
			}
		}
	}
}

// EN 410:2011, 5.2 to 5.4 (from memory) print the formulas of two and three panes in full.
func TestExplicitFormulas(t *testing.T) {
	r := rand.New(rand.NewPCG(13, 17))
	for range 1000 {
		p := randomPanes(r, 3, 1)
		t1, r1, r1i := 0.98*p[0].T[0], 0.98*p[0].Ro[0], 0.98*p[0].Ri[0]
		t2, r2, r2i := 0.98*p[1].T[0], 0.98*p[1].Ro[0], 0.98*p[1].Ri[0]
		t3, r3, r3i := 0.98*p[2].T[0], 0.98*p[2].Ro[0], 0.98*p[2].Ri[0]
		panes := []Pane{{[]float64{t1}, []float64{r1}, []float64{r1i}}, {[]float64{t2}, []float64{r2}, []float64{r2i}}, {[]float64{t3}, []float64{r3}, []float64{r3i}}}

		var two Stack
		two.Combine(panes[:2])
		d := 1 - r1i*r2
		close := func(name string, got, want float64) {
			t.Helper()
			if math.Abs(got-want) > 1e-12 {
				t.Errorf("%s: %.15f, want %.15f (EN 410:2011)", name, got, want)
			}
		}
		close("double τ", two.T[0], t1*t2/d)
		close("double ρ", two.Ro[0], r1+t1*t1*r2/d)
		close("double α1", two.A[0][0], (1-t1-r1)+(1-t1-r1i)*t1*r2/d)
		close("double α2", two.A[1][0], (1-t2-r2)*t1/d)

		var three Stack
		three.Combine(panes)
		d = (1-r1i*r2)*(1-r2i*r3) - t2*t2*r1i*r3
		close("triple τ", three.T[0], t1*t2*t3/d)
		close("triple ρ", three.Ro[0], r1+(t1*t1*r2*(1-r2i*r3)+t1*t1*t2*t2*r3)/d)
		close("triple α1", three.A[0][0], (1-t1-r1)+(t1*(1-t1-r1i)*r2*(1-r2i*r3)+t1*t2*t2*(1-t1-r1i)*r3)/d)
		close("triple α2", three.A[1][0], (t1*(1-t2-r2)*(1-r2i*r3)+t1*t2*(1-t2-r2i)*r3)/d)
		close("triple α3", three.A[2][0], t1*t2*(1-t3-r3)/d)
	}
}

// A stack in reused memory gives the same bits as one in fresh memory, whatever stood there.
func TestReusedMemory(t *testing.T) {
	r := rand.New(rand.NewPCG(19, 23))
	var reused Stack
	for range 200 {
		panes := randomPanes(r, 1+r.IntN(8), 1+r.IntN(40))
		var fresh Stack
		fresh.Combine(panes)
		reused.Combine(panes)
		if got, want := fmt.Sprint(reused.T, reused.Ro, reused.Ri, reused.A), fmt.Sprint(fresh.T, fresh.Ro, fresh.Ri, fresh.A); got != want {
			t.Fatalf("%d panes: reused memory gives other figures", len(panes))
		}
	}
}

func BenchmarkCombine(b *testing.B) {
	for _, count := range []int{2, 3, 8} {
		panes := randomPanes(rand.New(rand.NewPCG(1, 2)), count, 444)
		b.Run(fmt.Sprint(count), func(b *testing.B) {
			var s Stack
			b.ReportAllocs()
			for b.Loop() {
				s.Combine(panes)
			}
		})
	}
}
