package film_test

// How fast films are: ns per film, wavelength, polarisation and angle beside the time of the whole.

import (
	"testing"

	"panewright/glazing/film"
)

// sampledPane is glass with films of which some absorb, at wavelengths of the solar range.
func sampledPane(wavelengths int, index ...complex128) *film.Sampled {
	nm, glass := make([]float64, wavelengths), make([]complex128, wavelengths)
	for i := range nm {
		nm[i] = 300 + 2200*float64(i)/float64(wavelengths-1)
		glass[i] = complex(1.52, 1e-7)
	}
	var films []film.SampledLayer
	for j, x := range index {
		f := film.SampledLayer{Index: make([]complex128, wavelengths), ThicknessNM: 20 + 7*float64(j)}
		for i := range nm {
			f.Index[i] = x + complex(1e-4*float64(i), 0)
		}
		films = append(films, f)
	}
	return film.NewSampled(nm, glass, 6, nil, films)
}

var (
	dielectrics = []complex128{2, 1.46, 2.1, 1.46, 2.3, 1.46, 2}
	twoSilvers  = []complex128{2, 0.1 + 4i, 2.1, 2, 0.1 + 4i, 2.1, 1.46}
	conductors  = []complex128{1.9 + 0.01i, 0.1 + 4i, 2 + 0.02i, 2.1 + 0.03i, 0.2 + 5i, 1.9 + 0.1i, 1.5 + 0.001i}
)

// Seven films at 441 wavelengths, 10 angles, both polarisations: T and the reflectance of both sides.
func BenchmarkSampled(b *testing.B) {
	const wavelengths, angles = 441, 10
	for _, x := range []struct {
		name  string
		index []complex128
	}{{"dielectrics", dielectrics}, {"two_silvers", twoSilvers}, {"all_absorb", conductors}} {
		b.Run(x.name, func(b *testing.B) {
			pane := sampledPane(wavelengths, x.index...)
			var s, p film.Shares
			pane.At(&s, &p, 0)
			b.ReportAllocs()
			for b.Loop() {
				for a := range angles {
					pane.At(&s, &p, 9*float64(a))
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/(7*wavelengths*angles*2), "ns/film·λ·pol·angle")
		})
	}
}

// One film's thickness changed at normal incidence, 441 wavelengths; and at 60°, both polarisations.
func BenchmarkVariation(b *testing.B) {
	for _, x := range []struct {
		name string
		deg  float64
	}{{"normal", 0}, {"oblique", 60}} {
		b.Run(x.name, func(b *testing.B) {
			varied := sampledPane(441, twoSilvers...).Vary(film.Back, 1, x.deg)
			var s, p film.Shares
			d := 8.0
			b.ReportAllocs()
			for b.Loop() {
				varied.At(&s, &p, d)
				d += 0.001
			}
		})
	}
}

// One plate at one wavelength and angle, with what each film absorbs.
func BenchmarkPlate(b *testing.B) {
	var films []film.Layer
	for j, x := range twoSilvers {
		films = append(films, film.Layer{Index: x, ThicknessNM: 20 + 7*float64(j)})
	}
	plate := film.Plate{Index: 1.52 + 1e-7i, ThicknessMM: 6, Back: films}
	for b.Loop() {
		plate.At(550, 45)
	}
}
