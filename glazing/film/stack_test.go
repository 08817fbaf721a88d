package film_test

import (
	"math"
	"math/cmplx"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"panewright/glazing/film"
)

// shareOf returns R, T of the power from an amplitude between half spaces, from the first.
func shareOf(a film.Amplitude, first, last complex128, deg float64, p bool) film.Share {
	kappa := complex(real(first)*math.Sin(deg*math.Pi/180), 0)
	s := newSecond(first, nil, last, 1, kappa, p)
	return film.Share{R: sq(a.R), T: sq(a.T) * s.flux(1) / s.flux(0)}
}

// between returns the shares of a stack in air on a half space, in both polarisations.
func between(films []film.Layer, last complex128, nm, deg float64) (s, p film.Share) {
	as, ap := film.Amplitudes(1, films, last, nm, deg)
	return shareOf(as, 1, last, deg, false), shareOf(ap, 1, last, deg, true)
}

// drude is the index of free carriers over a constant background, ε = ε∞ − ωp²/(ω² + iγω), by closed form
// and CODATA 2018: N in cm⁻³, µ in cm²/(V s), m* in electron masses.
func drude(carriers, mobility, mass, epsInf, nm float64) complex128 {
	const e, m0, eps0, c = 1.602176634e-19, 9.1093837015e-31, 8.8541878128e-12, 299792458.0
	w := 2 * math.Pi * c / (nm * 1e-9)
	wp2 := carriers * 1e6 * e * e / (eps0 * mass * m0)
	gamma := e / (mass * m0 * mobility * 1e-4)
	return cmplx.Sqrt(complex(epsInf, 0) - complex(wp2, 0)/complex(w*w, gamma*w))
}

// silver is a Drude metal of ωp 9.17 eV, γ 0.05 eV and ε∞ 4.0, as the checks of silver stacks have it.
func silver(nm float64) complex128 {
	w := 1239.8419843320026 / nm
	return cmplx.Sqrt(4 - complex(9.17*9.17, 0)/complex(w*w, 0.05*w))
}

// One film of free carriers on a lossless half space of n 1.5.
func TestDrudeFilm(t *testing.T) {
	const source = "characteristic matrix, computed independently, from memory"
	for _, x := range []struct {
		n, mu, m, eps, nm, thickness, deg float64
		rs, ts, rp, tp                    float64
		source                            string
	}{
		{1e21, 40, 0.35, 3.9, 550, 150, 0, 0.041782, 0.932016, 0.041782, 0.932016, source},
		{4e20, 35, 0.35, 3.9, 550, 200, 60, 0.298797, 0.687871, 0.005523, 0.976763, source},
		{8e20, 30, 0.35, 3.9, 1500, 120, 45, 0.309677, 0.533894, 0.204128, 0.439042, source},
		{6e20, 25, 0.33, 3.7, 1500, 500, 45, 0.379966, 0.078416, 0.125822, 0.036907, source},
	} {
		s, p := between([]film.Layer{{Index: drude(x.n, x.mu, x.m, x.eps, x.nm), ThicknessNM: x.thickness}}, 1.5, x.nm, x.deg)
		for _, pair := range [][2]float64{{s.R, x.rs}, {s.T, x.ts}, {p.R, x.rp}, {p.T, x.tp}} {
			if math.Abs(pair[0]-pair[1]) > 2e-6 {
				t.Errorf("%g nm of %g cm⁻³ at %g nm, %g°: %.7f, want %.6f (%s)", x.thickness, x.n, x.nm, x.deg, pair[0], pair[1], x.source)
			}
		}
	}
}

// Silver between dielectrics of n 2.0 on a half space of n 1.52.
func TestSilverStack(t *testing.T) {
	for _, x := range []struct {
		nm, r, t float64
		source   string
	}{
		{550, 0.000311, 0.979632, "characteristic matrix, computed independently, from memory"},
		{1000, 0.361931, 0.587552, "characteristic matrix, computed independently, from memory"},
		{2500, 0.872816, 0.079824, "characteristic matrix, computed independently, from memory"},
	} {
		s, p := between([]film.Layer{{2, 40}, {silver(x.nm), 10}, {2, 40}}, 1.52, x.nm, 0)
		for _, got := range []film.Share{s, p} {
			if math.Abs(got.R-x.r) > 2e-6 || math.Abs(got.T-x.t) > 2e-6 {
				t.Errorf("at %g nm: %+v, want R %.6f, T %.6f (%s)", x.nm, got, x.r, x.t, x.source)
			}
		}
	}
}

// The emissivity of a film of free carriers: 1 − R weighted by Planck's law at 283 K from 5 to 50 µm,
// normal and over the half space.
func TestEmissivityOfDrudeFilm(t *testing.T) {
	for _, x := range []struct {
		n, mu, m, eps, thickness float64
		normal, hemispherical    float64
		source                   string
	}{
		{1e21, 40, 0.35, 3.9, 150, 0.10965, 0.12962, "fine wavelength grid, Gauss angles, from memory"},
		{8e20, 30, 0.35, 3.9, 120, 0.20340, 0.22921, "fine wavelength grid, Gauss angles, from memory"},
		{6e20, 25, 0.33, 3.7, 500, 0.13620, 0.15776, "fine wavelength grid, Gauss angles, from memory"},
	} {
		const wavelengths, angles = 600, 90
		var normal, half, weights float64
		for i := range wavelengths {
			nm := 5000 + 45000*(float64(i)+0.5)/wavelengths
			u := 1.438776877e7 / (nm * 283)
			w := math.Pow(u, 5) / math.Expm1(u)
			films := []film.Layer{{drude(x.n, x.mu, x.m, x.eps, nm), x.thickness}}
			s, _ := between(films, 1.5, nm, 0)
			var sum float64
			for k := range angles {
				deg := 90 * (float64(k) + 0.5) / angles
				s, p := between(films, 1.5, nm, deg)
				sum += math.Pi / 2 / angles * math.Sin(2*deg*math.Pi/180) * (1 - (s.R+p.R)/2)
			}
			weights += w
			normal += w * (1 - s.R)
			half += w * sum
		}
		if a, b := normal/weights, half/weights; math.Abs(a-x.normal) > 3e-4 || math.Abs(b-x.hemispherical) > 3e-4 {
			t.Errorf("%g nm of %g cm⁻³: %.5f and %.5f, want %.5f and %.5f (%s)", x.thickness, x.n, a, b, x.normal, x.hemispherical, x.source)
		}
	}
}

// What textbooks give in closed form for one film (Macleod, Thin-Film Optical Filters, chapter 3, from
// memory): a quarter wave of √n kills the reflection, a quarter wave of n1 gives ((n − n1²)/(n + n1²))²,
// a half wave is absent; 10 pairs of quarter waves reflect as the power of their indices.
func TestQuarterAndHalfWave(t *testing.T) {
	const n, nm = 1.52, 550.0
	for _, n1 := range []float64{math.Sqrt(n), 1.38, 2.3, 4} {
		s, p := between([]film.Layer{{complex(n1, 0), nm / 4 / n1}}, n, nm, 0)
		want := math.Pow((n-n1*n1)/(n+n1*n1), 2)
		if math.Abs(s.R-want) > 1e-15 || math.Abs(p.R-want) > 1e-15 || math.Abs(s.T+want-1) > 1e-14 {
			t.Errorf("a quarter wave of %g: %+v %+v, want R %g", n1, s, p, want)
		}
		s, p = between([]film.Layer{{complex(n1, 0), nm / 2 / n1}}, n, nm, 0)
		if bare := math.Pow((n-1)/(n+1), 2); math.Abs(s.R-bare) > 1e-15 || math.Abs(p.R-bare) > 1e-15 {
			t.Errorf("a half wave of %g: %+v %+v, want R %g", n1, s, p, bare)
		}
		// At an angle the quarter wave counts q in place of n.
		const deg = 50
		sin := math.Sin(deg * math.Pi / 180)
		q1 := math.Sqrt(n1*n1 - sin*sin)
		s, p = between([]film.Layer{{complex(n1, 0), nm / 4 / q1}}, n, nm, deg)
		q0, q2 := math.Cos(deg*math.Pi/180), math.Sqrt(n*n-sin*sin)
		wantS := math.Pow((q0*q2-q1*q1)/(q0*q2+q1*q1), 2)
		y1, y2 := q1/n1/n1, q2/n/n
		wantP := math.Pow((q0*y2-y1*y1)/(q0*y2+y1*y1), 2)
		if math.Abs(s.R-wantS) > 1e-14 || math.Abs(p.R-wantP) > 1e-14 {
			t.Errorf("a quarter wave of %g at %d°: %g %g, want %g %g", n1, deg, s.R, p.R, wantS, wantP)
		}
	}
	for _, pairs := range []int{1, 10, 100} {
		var films []film.Layer
		for range pairs {
			films = append(films, film.Layer{2.3, nm / 4 / 2.3}, film.Layer{1.38, nm / 4 / 1.38})
		}
		y := n * math.Pow(2.3/1.38, 2*float64(pairs))
		s, _ := between(films, n, nm, 0)
		if want := math.Pow((1-y)/(1+y), 2); math.Abs(s.R-want) > 1e-14 || math.Abs(s.T-4*y/((1+y)*(1+y))) > 1e-14 {
			t.Errorf("%d pairs of quarter waves: %+v, want R %g", pairs, s, want)
		}
	}
}

// At Brewster's angle of a film, atan n1, P does not see it from air, and through a film that
// has no thickness or the index of its glass it sees the glass alone.
func TestBrewster(t *testing.T) {
	const n1 = 1.7
	deg := math.Atan(n1) * 180 / math.Pi
	if _, p := between([]film.Layer{{n1, 321}}, n1, 550, deg); p.R > 1e-15 || math.Abs(p.T-1) > 1e-14 {
		t.Errorf("at Brewster's angle: %+v", p)
	}
	// A film between air and air: its two faces are both at Brewster's angle, whatever its thickness.
	if _, p := between([]film.Layer{{n1, 321}}, 1, 550, deg); p.R > 1e-15 || math.Abs(p.T-1) > 1e-14 {
		t.Errorf("a plate at Brewster's angle: %+v", p)
	}
	// A film of other index on glass: S still sees it, P sees the inner face only, by Fresnel.
	_, p := between([]film.Layer{{n1, 321}}, 1.52, 550, deg)
	inner := newSecond(n1, nil, 1.52, 550, complex(math.Sin(deg*math.Pi/180), 0), true)
	r, _ := inner.fresnel(0, 1)
	if math.Abs(p.R-sq(r)) > 1e-14 {
		t.Errorf("P at Brewster's angle of the film: %g, the inner face reflects %g", p.R, sq(r))
	}
}

// Light in glass that meets an air gap beyond the critical angle is reflected in total by a wide gap, with the
// phase of Fresnel, and passes a narrow one by 1/(1 + (κ²+q²)²/(4κ²q²) sinh²(κkd)) (S; frustrated total
// reflection, Born and Wolf, Principles of Optics, from memory).
func TestTotalInternalReflection(t *testing.T) {
	const n, nm, deg = 1.5, 600.0, 60.0
	sin, cos := math.Sincos(deg * math.Pi / 180)
	q, kappa := n*cos, math.Sqrt(n*n*sin*sin-1)
	for _, d := range []float64{0, 10, 100, 300, 1000, 4000} {
		as, ap := film.Amplitudes(n, []film.Layer{{1, d}}, n, nm, deg)
		s, p := shareOf(as, n, n, deg, false), shareOf(ap, n, n, deg, true)
		sinh := math.Sinh(2 * math.Pi / nm * kappa * d)
		wantS := 1 / (1 + math.Pow(kappa*kappa+q*q, 2)/(4*kappa*kappa*q*q)*sinh*sinh)
		yp, xp := q/n/n, kappa
		wantP := 1 / (1 + math.Pow(xp*xp+yp*yp, 2)/(4*xp*xp*yp*yp)*sinh*sinh)
		if math.Abs(s.T/wantS-1) > 1e-12 || math.Abs(p.T/wantP-1) > 1e-12 || math.Abs(s.R+s.T-1) > 1e-14 || math.Abs(p.R+p.T-1) > 1e-14 {
			t.Errorf("a gap of %g nm: %+v %+v, want T %g %g", d, s, p, wantS, wantP)
		}
	}
	as, ap := film.Amplitudes(n, []film.Layer{{1, 1e5}}, n, nm, deg)
	if r := complex(q, -kappa) / complex(q, kappa); cmplx.Abs(as.R-r) > 1e-14 || as.T != 0 {
		t.Errorf("an opaque gap: %v, Fresnel %v", as, r)
	}
	if r := complex(q/n/n, -kappa) / complex(q/n/n, kappa); cmplx.Abs(ap.R-r) > 1e-14 || ap.T != 0 {
		t.Errorf("an opaque gap in P: %v, Fresnel %v", ap, r)
	}
	// At the critical angle q of the gap is almost 0, or 0 to the last digit, and the limit of the formula
	// holds: sinh(κkd)/κ → kd.
	critical := math.Asin(1/n) * 180 / math.Pi
	for _, beyond := range []float64{0, 1e-13, 1e-11, -1e-11} {
		as, _ = film.Amplitudes(n, []film.Layer{{1, 100}}, n, nm, critical+beyond)
		q := n * math.Cos(critical*math.Pi/180)
		if got, want := sq(as.T), 1/(1+q*q/4*math.Pow(2*math.Pi/nm*100, 2)); math.Abs(got-want) > 1e-12 {
			t.Errorf("%g° beyond the critical angle: %.15f, want %.15f", beyond, got, want)
		}
	}
	index := math.Sin(40 * math.Pi / 180)
	as, _ = film.Amplitudes(1, []film.Layer{{complex(index, 0), 100}}, 1, nm, 40)
	q = math.Cos(40 * math.Pi / 180)
	if got, want := sq(as.T), 1/(1+q*q/4*math.Pow(2*math.Pi/nm*100, 2)); math.Abs(got-want) > 1e-14 {
		t.Errorf("q of a film is 0: %.15f, want %.15f", got, want)
	}
	ls, lp := film.Plate{Index: 1.5 + 1e-7i, ThicknessMM: 4, Back: []film.Layer{{complex(index, 0), 100}}}.At(nm, 40)
	for _, l := range []film.Light{ls, lp} {
		if f := sum(l.T, l.RBack, l.FromBack); !(math.Abs(f-1) < 1e-14) {
			t.Errorf("q of a film is 0: %+v adds up to %.15g", l, f)
		}
	}
}

// One absorbing film by the formula of Airy, with its phase.
func TestAiry(t *testing.T) {
	for _, deg := range []float64{0, 30, 75} {
		for _, p := range []bool{false, true} {
			const nm = 700.0
			n1, d := 0.3+2i, 25.0
			s := newSecond(1, []film.Layer{{n1, d}}, 1.5, nm, complex(math.Sin(deg*math.Pi/180), 0), p)
			r01, t01 := s.fresnel(0, 1)
			r12, t12 := s.fresnel(1, 2)
			e := cmplx.Exp(1i * s.delta[1])
			r, tr := (r01+r12*e*e)/(1+r01*r12*e*e), t01*t12*e/(1+r01*r12*e*e)
			as, ap := film.Amplitudes(1, []film.Layer{{n1, d}}, 1.5, nm, deg)
			if p {
				as = ap
			}
			if cmplx.Abs(as.R-r) > 1e-15 || cmplx.Abs(as.T-tr) > 1e-15 {
				t.Errorf("%g°, p %v: %v %v, Airy %v %v", deg, p, as.R, as.T, r, tr)
			}
		}
	}
}

// A thick film, averaged over its phase, is a layer whose two faces add by power.
func TestThickFilmIsIncoherent(t *testing.T) {
	const n1, n2, nm = 2.2, 1.52, 550.0
	for _, deg := range []float64{0, 40, 80} {
		for _, p := range []bool{false, true} {
			kappa := complex(math.Sin(deg*math.Pi/180), 0)
			s := newSecond(1, []film.Layer{{n1, 0}}, n2, nm, kappa, p)
			a, _ := s.fresnel(0, 1)
			b, _ := s.fresnel(1, 2)
			r, q := sq(a), sq(b)
			want := (1 - r) * (1 - q) / (1 - r*q)
			period := nm / 2 / real(s.q[1])
			var mean float64
			const steps = 64
			for i := range steps {
				f, g := between([]film.Layer{{n1, 9000 + period*float64(i)/steps}}, n2, nm, deg)
				if p {
					f = g
				}
				mean += f.T / steps
			}
			if math.Abs(mean-want) > 1e-12 {
				t.Errorf("%g°, p %v: mean %.14f, by power %.14f", deg, p, mean, want)
			}
		}
	}
}

// randomFilms draws films of any kind: clear, weakly absorbing, metals of up to 50 µm.
func randomFilms(t *rapid.T, most int, thickest float64) []film.Layer {
	films := make([]film.Layer, rapid.IntRange(0, most).Draw(t, "films"))
	for i := range films {
		n := rapid.Float64Range(1.2, 4).Draw(t, "n")
		k := 0.0
		switch rapid.IntRange(0, 3).Draw(t, "kind") {
		case 1:
			k = math.Pow(10, rapid.Float64Range(-9, 0).Draw(t, "log k"))
		case 2: // a metal
			n, k = rapid.Float64Range(0.03, 2).Draw(t, "n of a metal"), rapid.Float64Range(1, 10).Draw(t, "k")
		case 3: // a metal in the infrared
			n, k = rapid.Float64Range(5, 400).Draw(t, "n of a metal"), rapid.Float64Range(20, 600).Draw(t, "k")
		}
		films[i] = film.Layer{Index: complex(n, k), ThicknessNM: rapid.Float64Range(0, thickest).Draw(t, "thickness")}
	}
	return films
}

// The amplitudes are those of two other evaluations, with the heat of the fields; and of the reversed
// stack from the other side.
func TestAgainstSecondEvaluation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		films := randomFilms(t, 12, 300)
		nm, deg := rapid.Float64Range(300, 3000).Draw(t, "nm"), rapid.Float64Range(0, 89.9).Draw(t, "deg")
		last := complex(rapid.Float64Range(1.3, 3).Draw(t, "last"), 0)
		s, p := film.Amplitudes(1, films, last, nm, deg)
		backwards := slices.Clone(films)
		slices.Reverse(backwards)
		for i, a := range []film.Amplitude{s, p} {
			kappa := complex(math.Sin(deg*math.Pi/180), 0)
			forth := newSecond(1, films, last, nm, kappa, i == 1)
			r, tr, _, _ := forth.solve()
			if cmplx.Abs(a.R-r) > 1e-11 || cmplx.Abs(a.T-tr) > 1e-11 {
				t.Fatalf("p %v: %v %v, by Airy %v %v", i == 1, a.R, a.T, r, tr)
			}
			r, tr, _, _ = newSecond(last, backwards, 1, nm, kappa, i == 1).solve()
			if cmplx.Abs(a.RBack-r) > 1e-11 || cmplx.Abs(a.TBack-tr) > 1e-11 {
				t.Fatalf("p %v: from the back %v %v, by Airy %v %v", i == 1, a.RBack, a.TBack, r, tr)
			}
			r, tr = forth.matrix()
			if i == 1 { // from the magnetic field to the electric
				tr /= last
			}
			if cmplx.Abs(a.R-r) > 1e-11 || cmplx.Abs(a.T-tr) > 1e-11 {
				t.Fatalf("p %v: %v %v, by matrices %v %v", i == 1, a.R, a.T, r, tr)
			}
		}
	})
}

// Stokes' relations of a lossless stack, and reciprocity of any: t' = t y'/y of the tangential field.
func TestReciprocity(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		films := randomFilms(t, 200, 10000)
		nm, deg := rapid.Float64Range(300, 50000).Draw(t, "nm"), rapid.Float64Range(0, 89.9).Draw(t, "deg")
		const first, last = 1.0, 1.5
		s, p := film.Amplitudes(first, films, last, nm, deg)
		for i, a := range []film.Amplitude{s, p} {
			x := newSecond(first, nil, last, nm, complex(math.Sin(deg*math.Pi/180), 0), i == 1)
			x.q[0] = complex(first*math.Cos(deg*math.Pi/180), 0) // no difference of squares
			forth, back := sq(a.T)*x.flux(1)/x.flux(0), sq(a.TBack)*x.flux(0)/x.flux(1)
			if !(math.Abs(forth-back) <= 1e-13*forth+1e-300) || !(sq(a.R)+forth <= 1+1e-12) || !(sq(a.RBack)+back <= 1+1e-12) {
				t.Fatalf("p %v: T %g from the front and %g from the back, R %g and %g", i == 1, forth, back, sq(a.R), sq(a.RBack))
			}
		}
		for _, f := range films {
			if imag(f.Index) > 0 {
				return
			}
		}
		if r := s.R * cmplx.Conj(s.R); math.Abs(real(r)-sq(s.RBack)) > 1e-12 {
			t.Fatalf("a lossless stack reflects %g from the front and %g from the back", sq(s.R), sq(s.RBack))
		}
	})
}
