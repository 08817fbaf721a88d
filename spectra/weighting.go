package spectra

// The weightings: tables of weighted means, and what they mean of a curve.

import (
	"math"
	"slices"

	"panewright/reference"
)

// A Weighting is the table of a weighted mean: wavelengths in nm, ascending, and weights ≥ 0 in
// any unit, for their sum is divided out.
type Weighting struct {
	Name   string // of the band, as cautions name it: "light", "solar", …
	Source string // the publication and what was done with it
	NM     []float64
	Weight []float64
}

// Mean returns Σ f(λ) W(λ) / Σ W(λ), with the curve interpolated to the weighting's wavelengths.
func (w Weighting) Mean(c Curve) float64 {
	p := w.On(NewGrid(w.NM))
	values := make([]float64, len(p.Weight))
	c.Sample(values[:len(w.NM)], w.NM)
	return p.Mean(values)
}

// Missing returns the shares of the weight, from 0 to 1, that lie below first and above last nm.
func (w Weighting) Missing(first, last float64) (below, above float64) {
	from, _ := slices.BinarySearch(w.NM, first)
	to := from
	for to < len(w.NM) && w.NM[to] <= last {
		to++
	}
	all := total(w.Weight)
	return total(w.Weight[:from]) / all, total(w.Weight[to:]) / all
}

// Within returns the share of the weight, from 0 to 1, that lies inside gaps.
func (w Weighting) Within(gaps []Span) float64 {
	var inside float64
	c := Curve{Gaps: gaps}
	for i, nm := range w.NM {
		if c.InGap(nm) {
			inside += w.Weight[i]
		}
	}
	return inside / total(w.Weight)
}

// times returns the weighting with each weight multiplied by f(nm).
func (w Weighting) times(f func(nm float64) float64) Weighting {
	out := Weighting{Name: w.Name, Source: w.Source, NM: w.NM, Weight: make([]float64, len(w.NM))}
	for i, nm := range w.NM {
		out.Weight[i] = float64(w.Weight[i] * f(nm))
	}
	return out
}

// Trapezoid returns the weighting of a spectrum by the trapezoid rule from lo to hi nm: each
// point carries the bin from mid-point to mid-point, the ends half bins. Where the spectrum has
// no point at lo or hi, one is interpolated if the spectrum reaches that far.
func Trapezoid(c Curve, lo, hi float64) Weighting {
	inner := c.cut(lo, hi)
	nm, value := slices.Clone(inner.NM), slices.Clone(inner.Value)
	if c.First() < lo && c.Last() > lo && (len(nm) == 0 || nm[0] > lo) {
		nm, value = slices.Insert(nm, 0, lo), slices.Insert(value, 0, c.At(lo))
	}
	if c.Last() > hi && c.First() < hi && (len(nm) == 0 || nm[len(nm)-1] < hi) {
		nm, value = append(nm, hi), append(value, c.At(hi))
	}
	w := Weighting{NM: nm, Weight: make([]float64, len(nm))}
	for i := range nm {
		left, right := nm[max(i-1, 0)], nm[min(i+1, len(nm)-1)]
		w.Weight[i] = float64(value[i] * ((right - left) / 2))
	}
	return w
}

// LightEN410 returns the weights D65·V·Δλ of light transmittance and reflectance, 380–780 nm at
// 10 nm (EN 410:2011 and ISO 9050:2003, table 1).
func LightEN410() Weighting {
	return table(reference.EN410Weights(), "light_pct", "light", "EN 410:2011 table 1 = ISO 9050:2003 table 1")
}

// LightCIE returns D65·V at 5 nm, 380–780 nm, from the CIE's own tables (CIE 15:2004).
func LightCIE() Weighting {
	nm, d65 := reference.Daylight().Series("d65")
	d := Curve{NM: nm, Value: d65}
	w := table(reference.Observers(), "y2", "light", "CIE 15:2004, D65 times V at 5 nm")
	return w.times(d.At)
}

// SolarEN410 returns the weights S·Δλ of solar direct transmittance and reflectance, 300–2500 nm
// (EN 410:2011 and ISO 9050:2003, table 2).
func SolarEN410() Weighting {
	return table(reference.EN410Weights(), "solar", "solar", "EN 410:2011 table 2 = ISO 9050:2003 table 2")
}

// SolarG173 returns the weights of the hemispherical spectrum on the 37° tilt of ASTM G173-03 on
// its own wavelengths, 300–2500 nm, by the trapezoid rule.
func SolarG173() Weighting {
	nm, global := reference.SolarG173().Series("global")
	w := Trapezoid(Curve{NM: nm, Value: global}, SolarFirstNM, SolarLastNM)
	w.Name, w.Source = "solar", "ASTM G173-03 global tilt, 300-2500 nm, trapezoid rule"
	return w
}

// The solar range of EN 410 and ISO 9050, in nm.
const (
	SolarFirstNM = 300
	SolarLastNM  = 2500
)

// UV returns the weights S·Δλ of ultraviolet transmittance, 300–380 nm (EN 410:2011 and
// ISO 9050:2003).
func UV() Weighting {
	return table(reference.EN410Weights(), "uv", "uv", "EN 410:2011 table 3 = ISO 9050:2003 table 3")
}

// Damage returns the weights of damage-weighted transmittance, S·Δλ·exp(−0.012 λ) from 300 to
// 600 nm (ISO 9050:2003).
func Damage() Weighting {
	return table(reference.DamageWeights(), "damage", "damage", "CIE 89/3 action with the sun of EN 410:2011, 300-600 nm")
}

// Damage700 returns the same from 300 to 700 nm (CIE 89/3:1990).
func Damage700() Weighting {
	return table(reference.DamageWeights(), "damage_700", "damage to 700 nm", "CIE 89/3 action with the sun of EN 410:2011, 300-700 nm")
}

// DamageWeight returns the relative power of radiation of the given wavelength in nm to fade and
// age materials, exp(−0.012 (λ − 300)), 1 at 300 nm (J. Krochmann, CIE 89/3:1990).
func DamageWeight(nm float64) float64 { return math.Exp(-0.012 * (nm - 300)) }

// Skin returns the weights of skin-weighted transmittance, S·Δλ times the erythema action, from
// 300 to 400 nm (ISO 9050:2003).
func Skin() Weighting {
	return table(reference.DamageWeights(), "skin", "skin", "erythema action of McKinlay and Diffey 1987 with the sun of EN 410:2011")
}

// ErythemaWeight returns the relative power of radiation of the given wavelength in nm to redden
// skin: 1 up to 298 nm, 10^(0.094 (298 − λ)) to 328 nm, 10^(0.015 (139 − λ)) to 400 nm, 0 beyond
// (McKinlay and Diffey 1987; ISO/CIE 17166 prints 140 in the last branch, which makes the curve
// continuous and moves a normalised solar weight by at most 0.0021).
func ErythemaWeight(nm float64) float64 {
	switch {
	case nm <= 298:
		return 1
	case nm <= 328:
		return math.Pow(10, 0.094*(298-nm))
	case nm <= 400:
		return math.Pow(10, 0.015*(139-nm))
	}
	return 0
}

func table(t *reference.Table, column, name, source string) Weighting {
	nm, weight := t.Series(column)
	return Weighting{Name: name, Source: source, NM: nm, Weight: weight}
}

// NormalEmissivity returns the normal emissivity at 283 K of a face from its infrared reflectance,
// 5 to 50 µm: one less the mean of the reflectance at the thirty wavelengths of EN 12898. The
// standard's faces are opaque; of a sheet that is not, the transmittance is taken off as well.
func NormalEmissivity(reflectance, transmittance Curve) float64 {
	return 1 - InfraredMean(reflectance) - InfraredMean(transmittance)
}

// InfraredMean returns the mean of a curve at the thirty wavelengths of EN 12898.
func InfraredMean(c Curve) float64 {
	um := reference.EmissivityWavelengths().Column("wavelength_um")
	values := make([]float64, len(um))
	for i, x := range um {
		values[i] = c.At(toNM(x, 1000))
	}
	return total(values) / float64(len(um))
}
