package film_test

import (
	"math"
	"math/cmplx"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"pgregory.net/rapid"

	"panewright/glazing/film"
	"panewright/spectra"
)

// coherent returns the shares of a plate in air in which light interferes, by the formula of Airy,
// with a phase added to each crossing.
func coherent(n, k, wavelengthNM, thicknessMM, angleDeg, phase float64, p bool) film.Share {
	theta := angleDeg * math.Pi / 180
	index := complex(n, k)
	q := cmplx.Sqrt(index*index - complex(math.Pow(math.Sin(theta), 2), 0))
	if imag(q) < 0 {
		q = -q
	}
	cos := complex(math.Cos(theta), 0)
	r := (cos - q) / (cos + q)
	if p {
		r = (index*index*cos - q) / (index*index*cos + q)
	}
	crossing := cmplx.Exp(complex(0, 1) * (complex(0, 2*math.Pi*imag(q)*thicknessMM*1e6/wavelengthNM) + complex(phase, 0)))
	d := 1 - r*r*crossing*crossing
	t := (1 - r*r) * crossing / d
	back := r * (1 - crossing*crossing) / d
	return film.Share{T: math.Pow(cmplx.Abs(t), 2), R: math.Pow(cmplx.Abs(back), 2)}
}

// A sheet too thick to interfere is the mean, over the phase, of one in which light interferes: at any
// angle, and for any absorption that a thick sheet is not opaque with.
func TestSlabIsTheMeanOverPhase(t *testing.T) {
	for _, x := range []struct{ n, k, nm, mm, deg float64 }{
		{1.52, 0, 550, 6, 0}, {1.52, 1e-6, 550, 6, 0}, {1.53, 5e-5, 310, 4, 60},
		{1.526, 2e-7, 550, 10, 75}, {1.4, 3e-5, 5000, 4, 30}, {1.5, 1e-5, 800, 1, 89}, {0.7, 0.8, 9300, 4, 60},
	} {
		got := film.Slab(x.n, x.k, x.nm, x.mm, x.deg)
		for _, p := range []bool{false, true} {
			const steps = 20000
			var mean film.Share
			for i := range steps {
				f := coherent(x.n, x.k, x.nm, x.mm, x.deg, math.Pi*float64(i)/steps, p)
				mean.T += f.T / steps
				mean.R += f.R / steps
			}
			f := got.S
			if p {
				f = got.P
			}
			if math.Abs(f.T-mean.T) > 1e-9 || math.Abs(f.R-mean.R) > 1e-9 {
				t.Errorf("%+v, p %v: %+v, mean over phase %+v", x, p, f, mean)
			}
		}
	}
}

// The slab neither makes nor loses light: without absorption all of it leaves, by the sum of the
// series in closed form (2n/(n² + 1) is let through); an opaque sheet reflects as one face does.
func TestSlabInClosedForm(t *testing.T) {
	for _, n := range []float64{1, 1.3, 1.52, 2.4} {
		f := film.Slab(n, 0, 550, 6, 0).S
		if want := 2 * n / (n*n + 1); math.Abs(f.T-want) > 1e-14 || math.Abs(f.T+f.R-1) > 1e-14 {
			t.Errorf("n = %g: %+v, want τ %.17g and a sum of 1", n, f, want)
		}
		const k = 0.1
		f = film.Slab(n, k, 550, 6, 0).S
		if face := ((n-1)*(n-1) + k*k) / ((n+1)*(n+1) + k*k); f.T != 0 || math.Abs(f.R-face) > 1e-15 {
			t.Errorf("n = %g, opaque: %+v, want 0 and that of a face, %g", n, f, face)
		}
	}
}

// At normal incidence and without absorption the closed forms can be put in by hand: n = 1.5 has
// r = 0.04, T = 0.96/1.04; at Brewster's angle, atan 1.5, P reflects nothing.
func TestSlabByHand(t *testing.T) {
	if f := film.Slab(1.5, 0, 550, 4, 0).S; math.Abs(f.T-0.96/1.04) > 1e-15 || math.Abs(f.R-0.08/1.04) > 1e-15 {
		t.Errorf("n 1.5 at normal incidence: %+v", f)
	}
	if f := film.Slab(1.5, 0, 550, 4, math.Atan(1.5)*180/math.Pi).P; f.R > 1e-15 || math.Abs(f.T-1) > 1e-15 {
		t.Errorf("n 1.5 at Brewster's angle: %+v", f)
	}
	if f := film.Slab(1.5, 0, 550, 4, 90).Unpolarised(); f.R < 1-1e-9 {
		t.Errorf("grazing incidence: %+v", f)
	}
	// k 1e-9 across 19 mm: exp(-4π·1e-9·19e6/550), 1.3e-2 of absorption that must keep its digits.
	near, at := film.Slab(1.5, 1e-9, 550, 19, 1e-4).S, film.Slab(1.5, 1e-9, 550, 19, 0).S
	if math.Abs(near.T-at.T) > 1e-12 {
		t.Errorf("absorption jumps between 0° (%.15f) and almost 0° (%.15f)", at.T, near.T)
	}
}

func TestSharesAddToOneAtMost(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n, k := rapid.Float64Range(0.1, 6).Draw(t, "n"), math.Pow(10, rapid.Float64Range(-12, 1.5).Draw(t, "log k"))
		f := film.Slab(n, k, rapid.Float64Range(250, 50000).Draw(t, "nm"), rapid.Float64Range(0, 25).Draw(t, "mm"), rapid.Float64Range(0, 90).Draw(t, "deg"))
		for _, x := range []film.Share{f.S, f.P, f.Unpolarised()} {
			if !(x.T >= 0 && x.R >= 0 && x.T+x.R <= 1+1e-12) {
				t.Fatalf("shares %+v", x)
			}
		}
	})
}

// The mean over the half space agrees with one of many more nodes.
func TestHemisphericalConverges(t *testing.T) {
	for _, glass := range film.Glasses() {
		c, _ := film.Glass(glass)
		s := film.Sheet{Constants: c, ThicknessMM: 6}
		for _, nm := range []float64{310, 550, 1000, 2200, 9200, 20000} {
			got := s.Hemispherical(nm)
			want := quad.Fixed(func(x float64) float64 {
				return s.At(nm, x*180/math.Pi).Unpolarised().T * math.Sin(2*x)
			}, 0, math.Pi/2, 400, nil, 0)
			if math.Abs(got.T-want) > 2e-6 {
				t.Errorf("%s at %g nm: %.8f, with 400 nodes %.8f", glass, nm, got.T, want)
			}
		}
	}
}

// The emissivity over the half space agrees with plain sums over many more wavelengths and angles.
func TestHemisphericalEmissivityConverges(t *testing.T) {
	c, _ := film.Glass("soda-lime")
	s := film.Sheet{Constants: c, ThicknessMM: 4}
	const wavelengths, angles = 1500, 400
	var sum, weights float64
	for i := range wavelengths {
		nm := 5000 + 45000*(float64(i)+0.5)/wavelengths
		x := 1.438776877e7 / (nm * 283)
		w := math.Pow(x, 5) / math.Expm1(x)
		for k := range angles {
			deg := 90 * (float64(k) + 0.5) / angles
			f := s.At(nm, deg).Unpolarised()
			v := w * math.Sin(2*deg*math.Pi/180)
			sum += v * (1 - f.R - f.T)
			weights += v
		}
	}
	if got, ok := s.HemisphericalEmissivity(); !ok || math.Abs(got-sum/weights) > 5e-6 {
		t.Errorf("%.6f, by plain sums %.6f", got, sum/weights)
	}
	// Constants that stop at 30 µm are held; at 20 µm they do not suffice.
	short := func(last float64) film.Sheet {
		n := len(c.N.NM)
		for c.N.NM[n-1] > last {
			n--
		}
		part := c
		part.N, part.K = spectra.Curve{NM: c.N.NM[:n], Value: c.N.Value[:n]}, spectra.Curve{NM: c.K.NM[:n], Value: c.K.Value[:n]}
		return film.Sheet{Constants: part, ThicknessMM: 4}
	}
	if got, ok := short(30000).HemisphericalEmissivity(); !ok || math.Abs(got-sum/weights) > 0.02 {
		t.Errorf("constants to 30 µm: %.4f, %v", got, ok)
	}
	if m := short(30000).Spectrum(0); m.InfraredFront.Last() != 30000 || len(m.Cautions) != 2 || m.Cautions[1].Code != "extended" {
		t.Errorf("constants to 30 µm: infrared to %g nm, %v", m.InfraredFront.Last(), m.Cautions)
	}
	if _, ok := short(20000).HemisphericalEmissivity(); ok {
		t.Error("an emissivity from constants that end at 20 µm")
	}
}

// A sheet's spectrum stands at every wavelength of the weightings, so that a weighted mean of it is
// that of the formula itself.
func TestSpectrumInterpolatesNowhere(t *testing.T) {
	c, _ := film.Glass("soda-green")
	s := film.Sheet{Constants: c, ThicknessMM: 7.5}
	m := s.Spectrum(0)
	for _, w := range []spectra.Weighting{spectra.LightEN410(), spectra.LightCIE(), spectra.SolarEN410(), spectra.SolarG173(), spectra.UV(), spectra.Damage(), spectra.Skin()} {
		var sum, weights float64
		for i, nm := range w.NM {
			sum += w.Weight[i] * s.At(nm, 0).S.T
			weights += w.Weight[i]
		}
		if got := w.Mean(m.Tau); math.Abs(got-sum/weights) > 1e-14 {
			t.Errorf("%s: %.16f, by the formula %.16f", w.Source, got, sum/weights)
		}
	}
	if len(m.Cautions) != 1 || m.Cautions[0].Code != "extended" {
		t.Errorf("cautions %v; the constants begin at 320 nm", m.Cautions)
	}
}

// Constants that stop short leave a spectrum that stops short.
func TestSpectrumEndsWithTheConstants(t *testing.T) {
	s := film.Sheet{Constants: film.Constants{N: spectra.Curve{NM: []float64{400, 900}, Value: []float64{1.5, 1.5}},
		K: spectra.Curve{NM: []float64{400, 900}, Value: []float64{0, 0}}}, ThicknessMM: 6}
	m := s.Spectrum(0)
	if m.Tau.First() != 400 || m.Tau.Last() != 900 || m.InfraredFront.Len() != 0 || len(m.Cautions) != 1 || m.Cautions[0].Code != "coarse_steps" {
		t.Errorf("from %g to %g nm, infrared %d, cautions %v", m.Tau.First(), m.Tau.Last(), m.InfraredFront.Len(), m.Cautions)
	}
	if _, ok := s.HemisphericalEmissivity(); ok {
		t.Error("an emissivity from constants that end at 900 nm")
	}
}

func BenchmarkSpectrum(b *testing.B) {
	c, _ := film.Glass("soda-lime")
	s := film.Sheet{Constants: c, ThicknessMM: 6}
	for b.Loop() {
		s.Spectrum(0)
	}
}
