package thermal

// Gases by ISO 15099:2003, annex B: properties linear in temperature, mixtures by kinetic theory.

import (
	"fmt"
	"math"
	"slices"
	"sync"

	"panewright/reference"
)

// The constants of ISO 15099:2003; it prints them so.
const (
	GasConstant      = 8314.51   // R, J/(kmol·K)
	Pressure         = 101300.0  // Pa, in every gap with gas and in the room
	StefanBoltzmann4 = 5.6697e-8 // σ of ISO 15099, W/(m²·K⁴)
)

// Properties are those of a gas at one temperature and at Pressure.
type Properties struct {
	ConductivityWMK  float64 // λ
	ViscosityPaS     float64 // µ
	HeatCapacityJKGK float64 // cp
	DensityKGM3      float64 // ρ, of an ideal gas
	MolarMass        float64 // kg/kmol
}

// slopes are the derivatives of the logarithms of λ, and of Ra at a given temperature drop, with
// temperature, 1/K. They leave out how the heat capacity and the coupling of the gases of a mixture
// change: they steer Newton's steps and enter no result.
type slopes struct{ conductivity, rayleigh float64 }

// line is a property that is linear in temperature.
type line struct{ a, b float64 }

func (l line) at(t float64) float64 { return l.a + float64(l.b*t) }

// component is one gas of a Fluid.
type component struct {
	name                              string
	mass                              float64
	conductivity, viscosity, capacity line
}

// Fluid is a gas filling made ready for a balance. It holds no more gases than the table.
type Fluid struct {
	n        int
	gas      [maxComponents]component
	fraction [maxComponents]float64
	// by pair i, j: (Mj/Mi)^¼; 1/(2√2·(1 + Mi/Mj)^½), times the ratio xj/xi of their fractions; and
	// 1 + 2.41…
	quarter, divisor, factor [maxComponents][maxComponents]float64
	translational            [maxComponents]float64 // 15/4·R/M, λ′ over µ
	mass                     float64                // of the mixture, kg/kmol
	nominal                  float64                // λ at MeanTemperature, from which a balance starts
}

const maxComponents = 4

var components = sync.OnceValue(func() []component {
	t := reference.GasesISO15099()
	column := func(name string) func(i int) line {
		a, b := t.Column(name+"_a"), t.Column(name+"_b")
		return func(i int) line { return line{a[i], b[i]} }
	}
	mass := t.Column("molar_mass")
	k, mu, c := column("conductivity"), column("viscosity"), column("heat_capacity")
	out := make([]component, len(t.Labels))
	for i, name := range t.Labels {
		out[i] = component{name, mass[i], k(i), mu(i), c(i)}
	}
	return out
})

// Fluid makes the mixture ready for a detailed balance. It is an error if it holds a gas, such as
// sf6, for which ISO 15099 gives no properties.
func (m Mixture) Fluid() (Fluid, error) {
	var f Fluid
	for _, s := range m {
		if s.Fraction == 0 {
			continue
		}
		i := slices.IndexFunc(components(), func(c component) bool { return c.name == s.Gas })
		if i < 0 {
			return Fluid{}, fmt.Errorf("%s: ISO 15099 gives no properties of this gas, which a detailed heat balance needs", s.Gas)
		}
		f.gas[f.n], f.fraction[f.n] = components()[i], s.Fraction
		f.mass += float64(s.Fraction * f.gas[f.n].mass)
		f.n++
	}
	for i := range f.n {
		f.translational[i] = 15.0 / 4 * GasConstant / f.gas[i].mass
		for j := range f.n {
			mi, mj := f.gas[i].mass, f.gas[j].mass
			f.quarter[i][j] = math.Sqrt(math.Sqrt(mj / mi))
			f.divisor[i][j] = f.fraction[j] / f.fraction[i] / (2 * math.Sqrt2 * math.Sqrt(1+mi/mj))
			f.factor[i][j] = 1 + 2.41*(mi-mj)*(mi-0.142*mj)/((mi+mj)*(mi+mj))
		}
	}
	f.nominal = f.At(MeanTemperature).ConductivityWMK
	return f, nil
}

// roomAir is the air of the room.
var roomAir = sync.OnceValue(func() *Fluid {
	f, err := Mixture{{Gas: "air", Fraction: 1}}.Fluid()
	if err != nil {
		panic("thermal: " + err.Error()) // the table has air
	}
	return &f
})

// At returns the properties at a temperature in K: linear in temperature for each gas, density by
// the ideal gas law; of a mixture viscosity by Wilke, conductivity as the sum of its translational
// and its internal part, heat capacity by mole (ISO 15099:2003, annex B, from memory).
func (f *Fluid) At(temperatureK float64) Properties {
	p, _ := f.at(temperatureK)
	return p
}

func (f *Fluid) at(t float64) (p Properties, d slopes) {
	p.MolarMass, p.DensityKGM3 = f.mass, Pressure*f.mass/(GasConstant*t)
	var muSlope, kSlope float64
	if f.n == 1 {
		g := &f.gas[0]
		p.ConductivityWMK, p.ViscosityPaS, p.HeatCapacityJKGK = g.conductivity.at(t), g.viscosity.at(t), g.capacity.at(t)
		muSlope, kSlope = g.viscosity.b, g.conductivity.b
	} else {
		var mu [maxComponents]float64
		var root [maxComponents][maxComponents]float64 // (µi/µj)^½
		var molar float64
		for i := range f.n {
			g := &f.gas[i]
			mu[i] = g.viscosity.at(t)
			for j := range i {
				root[i][j] = math.Sqrt(mu[i] / mu[j])
				root[j][i] = 1 / root[i][j]
			}
			molar += float64(f.fraction[i] * g.capacity.at(t) * g.mass)
		}
		for i := range f.n {
			g := &f.gas[i]
			plain, heavy := 1.0, 1.0
			for j := range f.n {
				if j == i {
					continue
				}
				// Of viscosity and of conductivity, for λ′i/λ′j = (µi/µj)·(Mj/Mi).
				s := 1 + float64(root[i][j]*f.quarter[i][j])
				phi := s * s * f.divisor[i][j]
				plain += phi
				heavy += float64(phi * f.factor[i][j])
			}
			both := 1 / (plain * heavy)
			plain, heavy = both*heavy, both*plain // their reciprocals
			part := f.translational[i] * mu[i]    // λ′, of λ = λ′ + λ″
			p.ViscosityPaS += float64(mu[i] * plain)
			p.ConductivityWMK += float64(part*heavy) + float64((g.conductivity.at(t)-part)*plain)
			slope := f.translational[i] * g.viscosity.b
			muSlope += float64(g.viscosity.b * plain)
			kSlope += float64(slope*heavy) + float64((g.conductivity.b-slope)*plain)
		}
		p.HeatCapacityJKGK = molar / f.mass
	}
	d.conductivity = kSlope / p.ConductivityWMK
	d.rayleigh = -3/t - muSlope/p.ViscosityPaS - d.conductivity
	return p, d
}

// Rayleigh returns Ra of a gap of a width in m and a temperature drop in K (ISO 15099:2003 (38), from memory).
func (p Properties) Rayleigh(widthM, dropK, meanK float64) float64 {
	return p.DensityKGM3 * p.DensityKGM3 * widthM * widthM * widthM * Gravity * p.HeatCapacityJKGK * dropK /
		(meanK * p.ViscosityPaS * p.ConductivityWMK)
}
