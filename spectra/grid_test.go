package spectra

import (
	"testing"

	"pgregory.net/rapid"
)

// Three means formed at once have the bits of each formed alone.
func TestMeansAtOnce(t *testing.T) {
	w := SolarEN410()
	g := NewGrid(w.NM, LightEN410().NM)
	p := w.On(g)
	rapid.Check(t, func(t *rapid.T) {
		values := rapid.SliceOfN(rapid.Float64Range(0, 1), g.Padded(), g.Padded())
		a, b, c := values.Draw(t, "a"), values.Draw(t, "b"), values.Draw(t, "c")
		x, y, z := p.Means(a, b, c)
		if x != p.Mean(a) || y != p.Mean(b) || z != p.Mean(c) {
			t.Fatalf("at once %v %v %v, alone %v %v %v", x, y, z, p.Mean(a), p.Mean(b), p.Mean(c))
		}
	})
}
