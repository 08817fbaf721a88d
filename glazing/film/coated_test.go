package film_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"pgregory.net/rapid"

	"panewright/glazing/film"
)

// Without films, and with films that have no thickness, a plate is a slab.
func TestPlateWithoutFilmsIsASlab(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n, k := rapid.Float64Range(0.3, 4).Draw(t, "n"), math.Pow(10, rapid.Float64Range(-12, 1).Draw(t, "log k"))
		nm, mm := rapid.Float64Range(300, 50000).Draw(t, "nm"), rapid.Float64Range(0.5, 25).Draw(t, "mm")
		deg := rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(0, 89.9)).Draw(t, "deg")
		none := []film.Layer{{2.3, 0}, {0.05 + 3i, 0}}
		want := film.Slab(n, k, nm, mm, deg)
		for _, plate := range []film.Plate{
			{complex(n, k), mm, nil, nil}, {complex(n, k), mm, none, nil}, {complex(n, k), mm, none, none},
		} {
			s, p := plate.At(nm, deg)
			for _, x := range []struct {
				got  film.Light
				want film.Share
			}{{s, want.S}, {p, want.P}} {
				if d := max(math.Abs(x.got.T-x.want.T), math.Abs(x.got.RFront-x.want.R), math.Abs(x.got.RBack-x.want.R)); !(d <= 1e-14) {
					t.Fatalf("%d films: %+v, a slab has %+v", len(plate.Front), x.got, x.want)
				}
			}
		}
	})
}

// Uncoated panes: unpolarised T and R, over the half space, and two panes behind each other in each
// polarisation. αd is what the glass absorbs along the normal.
func TestUncoatedPane(t *testing.T) {
	const source = "Fresnel and absorption inside, from memory"
	const nm, mm = 550.0, 4.0
	plate := func(n, ad float64) film.Plate {
		return film.Plate{Index: complex(n, ad*nm/(4*math.Pi*mm*1e6)), ThicknessMM: mm}
	}
	mean := func(n, ad, deg float64) film.Light { return film.Unpolarised(plate(n, ad).At(nm, deg)) }
	for _, x := range []struct{ n, ad, deg, t, r float64 }{
		{1.526, 0, 0, 0.916881, 0.083119}, {1.52, 0, 70, 0.724713, 0.275287},
		{1.526, 0.08, 0, 0.846152, 0.077231}, {1.5, 0.1, 70, 0.635631, 0.247231},
	} {
		if l := mean(x.n, x.ad, x.deg); math.Abs(l.T-x.t) > 2e-6 || math.Abs(l.RFront-x.r) > 2e-6 {
			t.Errorf("n %g, αd %g at %g°: T %.6f, R %.6f, want %.6f, %.6f (%s)", x.n, x.ad, x.deg, l.T, l.RFront, x.t, x.r, source)
		}
	}
	half := func(f func(film.Light) float64) float64 {
		return quad.Fixed(func(x float64) float64 { return f(mean(1.526, 0, x*180/math.Pi)) * math.Sin(2*x) }, 0, math.Pi/2, 60, nil, 0)
	}
	tau, rho := half(func(l film.Light) float64 { return l.T }), half(func(l film.Light) float64 { return l.RFront })
	if math.Abs(tau-0.84508) > 5e-5 || math.Abs(rho-0.15492) > 5e-5 {
		t.Errorf("over the half space %.5f, %.5f, want 0.84508, 0.15492 (%s, integrated)", tau, rho, source)
	}
	for _, x := range []struct{ deg, want float64 }{{0, 0.846519}, {75, 0.472216}} {
		s, p := plate(1.526, 0).At(nm, x.deg)
		two := func(l film.Light) float64 { return l.T * l.T / (1 - l.RFront*l.RFront) }
		if got := (two(s) + two(p)) / 2; math.Abs(got-x.want) > 2e-6 {
			t.Errorf("two panes at %g°: %.6f, want %.6f ((1 − ρ)/(1 + 3ρ) in each polarisation, from memory)", x.deg, got, x.want)
		}
	}
}

// sum is all of the light from one side.
func sum(t, r float64, a film.Absorbed) float64 {
	all := t + r + a.Glass
	for _, x := range a.Front {
		all += x
	}
	for _, x := range a.Back {
		all += x
	}
	return all
}

// randomPlate draws a coated pane, of glass that is clear, absorbs or is opaque.
func randomPlate(t *rapid.T, most int, thickest float64) (plate film.Plate, nm, deg float64) {
	k := 0.0
	if rapid.Bool().Draw(t, "absorbs") {
		k = math.Pow(10, rapid.Float64Range(-9, 0.5).Draw(t, "log k"))
	}
	n := rapid.Float64Range(1.05, 3).Draw(t, "n")
	if k > 0.01 { // opaque, as in the infrared
		n = rapid.Float64Range(0.2, 3).Draw(t, "n")
	}
	plate = film.Plate{Index: complex(n, k), ThicknessMM: rapid.Float64Range(1, 19).Draw(t, "mm"),
		Front: randomFilms(t, most, thickest), Back: randomFilms(t, most, thickest)}
	return plate, rapid.Float64Range(300, 50000).Draw(t, "nm"), rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(0, 89.9)).Draw(t, "deg")
}

// Nothing is lost or made: what each film and the glass absorb is counted on its own. A turned plate is
// the plate seen from its back.
func TestPlateKeepsItsEnergy(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		plate, nm, deg := randomPlate(t, 100, 10000)
		s, p := plate.At(nm, deg)
		turned := plate
		turned.Front, turned.Back = plate.Back, plate.Front
		ts, tp := turned.At(nm, deg)
		for i, l := range []film.Light{s, p} {
			f, b := sum(l.T, l.RFront, l.FromFront), sum(l.T, l.RBack, l.FromBack)
			if !(math.Abs(f-1) <= 1e-12) || !(math.Abs(b-1) <= 1e-12) {
				t.Fatalf("p %v: light from the front adds up to %.15g, from the back to %.15g", i == 1, f, b)
			}
			for _, list := range [][]float64{{l.T, l.RFront, l.RBack, l.FromFront.Glass, l.FromBack.Glass}, l.FromFront.Front, l.FromFront.Back, l.FromBack.Front, l.FromBack.Back} {
				for _, x := range list {
					if !(x >= -1e-13) {
						t.Fatalf("p %v: a share of %g in %+v", i == 1, x, l)
					}
				}
			}
			other := []film.Light{ts, tp}[i]
			if math.Abs(other.T-l.T) > 1e-15 || math.Abs(other.RFront-l.RBack) > 1e-15 || math.Abs(other.FromBack.Glass-l.FromFront.Glass) > 1e-14 {
				t.Fatalf("p %v: %+v, turned %+v", i == 1, l, other)
			}
		}
	})
}

// What the films absorb is the heat of the fields inside of them.
func TestAbsorptanceIsTheHeatOfTheFields(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		films := randomFilms(t, 6, 150)
		nm, deg := rapid.Float64Range(300, 3000).Draw(t, "nm"), rapid.Float64Range(0, 89).Draw(t, "deg")
		const glass = 1.52 + 1i // opaque: what enters it stays in it
		plate := film.Plate{Index: glass, ThicknessMM: 4, Back: films}
		s, p := plate.At(nm, deg)
		var fromAir []film.Layer
		for i := range films {
			fromAir = append(fromAir, films[len(films)-1-i])
		}
		for i, l := range []film.Light{s, p} {
			heat := newSecond(1, fromAir, glass, nm, complex(math.Sin(deg*math.Pi/180), 0), i == 1).heat()
			for j, want := range heat {
				if got := l.FromBack.Back[len(films)-1-j]; math.Abs(got-want) > 1e-9 {
					t.Fatalf("p %v, film %d of %v: %.12f, heat %.12f", i == 1, j, fromAir, got, want)
				}
			}
		}
	})
}

// A plate is the mean, over the phase of a crossing of the glass, of one in which all light interferes:
// T, the reflectance and what each film absorbs.
func TestPlateIsTheMeanOverPhase(t *testing.T) {
	front := []film.Layer{{2.1, 40}, {0.2 + 3i, 9}, {1.9 + 0.05i, 60}}
	back := []film.Layer{{1.46 + 0.001i, 90}, {1.8 + 0.3i, 200}}
	for _, x := range []struct {
		k, nm, mm, deg float64
	}{
		{0, 550, 4, 0}, {0, 550, 4, 65}, {3e-7, 800, 6, 30}, {5e-6, 1000, 6, 75},
		{4e-4, 5000, 1, 45}, {2e-4, 5000, 4, 20}, {0.016, 50000, 0.5, 60}, {0.016, 50000, 0.5, 0},
	} {
		const n = 1.5
		glass := complex(n, x.k)
		tolerance := 1e-10 + math.Pow(x.nm/(2*math.Pi*x.mm*1e6*n)/math.E, 2) // the bound that At names
		plate := film.Plate{Index: glass, ThicknessMM: x.mm, Front: front, Back: back}
		s, p := plate.At(x.nm, x.deg)
		for i, l := range []film.Light{s, p} {
			all := []film.Layer{front[2], front[1], front[0], {glass, x.mm * 1e6}, back[0], back[1]}
			const steps = 4000
			var tau, rho float64
			heat := make([]float64, 6)
			for k := range steps {
				c := newSecond(1, all, 1, x.nm, complex(math.Sin(x.deg*math.Pi/180), 0), i == 1)
				c.delta[4] += complex(math.Pi*float64(k)/steps, 0)
				r, tr, forward, backward := c.solve()
				tau += sq(tr) / steps
				rho += sq(r) / steps
				for j := range heat {
					heat[j] += c.lost(j+1, forward, backward) / steps
				}
			}
			got := []float64{l.T, l.RFront, l.FromFront.Front[2], l.FromFront.Front[1], l.FromFront.Front[0], l.FromFront.Glass, l.FromFront.Back[0], l.FromFront.Back[1]}
			for j, want := range append([]float64{tau, rho}, heat...) {
				if math.Abs(got[j]-want) > tolerance {
					t.Errorf("%+v, p %v, share %d: %.12f, mean over phase %.12f", x, i == 1, j, got[j], want)
				}
			}
		}
	}
}

// lost is the difference of the power that crosses both faces of medium i, by the fields there.
func (s second) lost(i int, forward, backward []complex128) float64 {
	flux := func(f, b complex128) float64 {
		if s.p { // along the film E = q/N (f − b), H = N (f + b)
			return real(s.q[i] / s.index[i] * (f - b) * conj(s.index[i]*(f+b)))
		}
		return real(conj(f+b) * s.q[i] * (f - b))
	}
	e := exp1i(s.delta[i])
	return (flux(forward[i], backward[i]) - flux(forward[i]*e, backward[i]/e)) / s.flux(0)
}

// Silver of 10 µm at 50 µm and other opaque films: as a half space of theirs, and dark behind.
func TestOpaqueFilms(t *testing.T) {
	for _, x := range []struct {
		nm    float64
		index complex128
	}{{50000, silver(50000)}, {300, 1.5 + 0.96i}, {10000, 13 + 54i}} {
		for _, deg := range []float64{0, 60, 89.9} {
			films := []film.Layer{{1.46, 100}, {x.index, 10000}}
			plate := film.Plate{Index: 2.5 + 0.4i, ThicknessMM: 4, Front: films, Back: films}
			s, p := plate.At(x.nm, deg)
			for i, l := range []film.Light{s, p} {
				r, _ := newSecond(1, nil, x.index, x.nm, complex(math.Sin(deg*math.Pi/180), 0), i == 1).fresnel(0, 1)
				if math.Abs(l.RFront-sq(r)) > 1e-12 || math.Abs(l.RBack-sq(r)) > 1e-12 || l.T != 0 {
					t.Errorf("at %g nm, %g°: %+v, the bare metal reflects %.15g", x.nm, deg, l, sq(r))
				}
				if a := l.FromFront.Front[1]; math.Abs(a+l.RFront-1) > 1e-12 {
					t.Errorf("at %g nm, %g°: the metal absorbs %.15g of %.15g", x.nm, deg, a, 1-l.RFront)
				}
			}
		}
	}
	// 200 films, metals and dielectrics in turn, do not overflow.
	var films []film.Layer
	for range 100 {
		films = append(films, film.Layer{1.2, 10000}, film.Layer{400 + 600i, 10000})
	}
	for _, deg := range []float64{0, 89.9} {
		s, p := film.Plate{Index: 1.5, ThicknessMM: 4, Front: films, Back: films}.At(50000, deg)
		for _, l := range []film.Light{s, p} {
			if f := sum(l.T, l.RFront, l.FromFront); !(math.Abs(f-1) < 1e-12) || l.T != 0 {
				t.Errorf("200 films at %g°: %g of light, T %g", deg, f, l.T)
			}
		}
		var layers []film.SampledLayer
		for _, f := range films {
			layers = append(layers, film.SampledLayer{Index: []complex128{f.Index}, ThicknessNM: f.ThicknessNM})
		}
		var ss, sp film.Shares
		film.NewSampled([]float64{50000}, []complex128{1.5}, 4, layers, layers).At(&ss, &sp, deg)
		if ss.RFront[0] != s.RFront || sp.RFront[0] != p.RFront || ss.T[0] != 0 || sp.T[0] != 0 {
			t.Errorf("200 films at %g°, sampled: %+v %+v, alone %+v %+v", deg, ss, sp, s, p)
		}
	}
}

// At 90° nothing gets in, and nothing overflows.
func TestGrazingIncidence(t *testing.T) {
	plate := film.Plate{Index: 1.52, ThicknessMM: 4, Front: []film.Layer{{2.1, 40}}, Back: []film.Layer{{2.1, 40}, {0.1 + 3i, 10}}}
	s, p := plate.At(550, 90)
	for _, l := range []film.Light{s, p} {
		if !(l.T >= 0 && l.T < 1e-12 && math.Abs(l.RFront-1) < 1e-12 && math.Abs(l.RBack-1) < 1e-12) {
			t.Errorf("%+v", l)
		}
	}
	s, p = film.Plate{Index: 1.52, ThicknessMM: 4}.At(550, 90)
	for _, l := range []film.Light{s, p} {
		if !(l.T >= 0 && l.T < 1e-12 && math.Abs(l.RFront-1) < 1e-12 && l.FromFront.Glass == 0) {
			t.Errorf("bare glass: %+v", l)
		}
	}
}

// Opaque glass hides what is behind it.
func TestOpaqueGlass(t *testing.T) {
	front := []film.Layer{{1.9 + 0.6i, 120}}
	a := film.Plate{Index: 0.7 + 0.8i, ThicknessMM: 4, Front: front, Back: []film.Layer{{10 + 60i, 20}}}
	b := film.Plate{Index: 0.7 + 0.8i, ThicknessMM: 4, Front: front}
	for _, deg := range []float64{0, 60} {
		s, p := a.At(9300, deg)
		s1, p1 := b.At(9300, deg)
		if s.T != 0 || p.T != 0 || s.RFront != s1.RFront || p.RFront != p1.RFront || s.FromFront.Back[0] != 0 {
			t.Errorf("at %g°: %+v, without the film behind %+v", deg, s, s1)
		}
	}
}

// One list of wavelengths gives the bits of each alone.
func TestSampledIsThePlate(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		plate, nm, deg := randomPlate(t, 20, 1000)
		layers := func(films []film.Layer) (list []film.SampledLayer) {
			for _, f := range films {
				list = append(list, film.SampledLayer{Index: []complex128{2, f.Index}, ThicknessNM: f.ThicknessNM})
			}
			return list
		}
		pane := film.NewSampled([]float64{500, nm}, []complex128{1.5, plate.Index}, plate.ThicknessMM, layers(plate.Front), layers(plate.Back))
		var s, p film.Shares
		pane.At(&s, &p, deg)
		ls, lp := plate.At(nm, deg)
		for i, l := range []film.Light{ls, lp} {
			got := []*film.Shares{&s, &p}[i]
			if got.T[1] != l.T || got.RFront[1] != l.RFront || got.RBack[1] != l.RBack {
				t.Fatalf("p %v: %g %g %g, alone %g %g %g", i == 1, got.T[1], got.RFront[1], got.RBack[1], l.T, l.RFront, l.RBack)
			}
		}
	})
}

// A film's thickness changed in a variation is the pane with that film.
func TestVariation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		plate, nm, deg := randomPlate(t, 20, 1000)
		face, films := film.Front, plate.Front
		if rapid.Bool().Draw(t, "back") {
			face, films = film.Back, plate.Back
		}
		if len(films) == 0 {
			return
		}
		i := rapid.IntRange(0, len(films)-1).Draw(t, "film")
		layers := func(films []film.Layer) (list []film.SampledLayer) {
			for _, f := range films {
				list = append(list, film.SampledLayer{Index: []complex128{f.Index}, ThicknessNM: f.ThicknessNM})
			}
			return list
		}
		pane := film.NewSampled([]float64{nm}, []complex128{plate.Index}, plate.ThicknessMM, layers(plate.Front), layers(plate.Back))
		varied := pane.Vary(face, i, deg)
		thickness := rapid.Float64Range(0, 10000).Draw(t, "new thickness")
		var got, want [2]film.Shares
		varied.At(&got[0], &got[1], thickness)
		pane.SetThickness(face, i, thickness)
		pane.At(&want[0], &want[1], deg)
		for p, g := range got {
			w := want[p]
			if d := max(math.Abs(g.T[0]-w.T[0]), math.Abs(g.RFront[0]-w.RFront[0]), math.Abs(g.RBack[0]-w.RBack[0])); !(d <= 1e-12) {
				t.Fatalf("p %v: %+v, the pane made anew %+v", p == 1, g, w)
			}
		}
		// A film replaced by one of another index.
		pane.SetIndex(face, i, []complex128{1.7 + 0.2i})
		pane.At(&got[0], &got[1], deg)
		films[i] = film.Layer{Index: 1.7 + 0.2i, ThicknessNM: thickness}
		s, p := plate.At(nm, deg)
		if got[0].T[0] != s.T || got[1].RBack[0] != p.RBack {
			t.Fatalf("another index: %+v, alone %+v %+v", got, s, p)
		}
		got[0].Mean(&got[0], &got[1])
		if l := film.Unpolarised(s, p); got[0].T[0] != l.T || got[0].RFront[0] != l.RFront || got[0].RBack[0] != l.RBack {
			t.Fatalf("mean %+v, alone %+v", got[0], l)
		}
	})
}

// A coated pane of materials is the plate of their indices.
func TestCoated(t *testing.T) {
	glass, _ := film.Glass("soda-lime")
	oxide, metal := &film.Material{Model: film.Constant(2.1)}, &film.Material{Model: film.Constant(0.2 + 3i)}
	c := film.Coated{Glass: glass, ThicknessMM: 6, Front: []film.Film{{oxide, 30}}, Back: []film.Film{{oxide, 40}, {metal, 10}, {oxide, 45}}}
	nm := []float64{400, 550, 1000}
	var s, p film.Shares
	c.Sample(nm).At(&s, &p, 40)
	for i, x := range nm {
		n, k := glass.At(x)
		plate := film.Plate{Index: complex(n, k), ThicknessMM: 6, Front: []film.Layer{{2.1, 30}}, Back: []film.Layer{{2.1, 40}, {0.2 + 3i, 10}, {2.1, 45}}}
		ws, wp := plate.At(x, 40)
		gs, gp := c.At(x, 40)
		if gs.T != ws.T || gp.RBack != wp.RBack || s.T[i] != ws.T || s.RFront[i] != ws.RFront || p.T[i] != wp.T || p.RBack[i] != wp.RBack {
			t.Errorf("at %g nm: %+v %+v, sampled %g %g, as a plate %+v %+v", x, gs, gp, s.T[i], p.T[i], ws, wp)
		}
	}
}
