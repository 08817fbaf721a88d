package film

// What a film is made of, and its complex index from a model of its permittivity.

import (
	"fmt"
	"math"
)

// A Material is what a film is made of. What it points to is shared and must not be written to.
type Material struct {
	ID, Name     string
	Source       string  // the paper or file, with its standing: read, from memory, typical
	FromNM, ToNM float64 // the range in which it may be used
	Model        Dispersion
	Carriers     *Carriers // of a conductor whose free carriers are known, else nil
	Edge         *Edge     // of an oxide whose band edge follows its carriers, else nil
	FallingLoss  bool      // the free carriers of the model lose less above the plasma energy (FallingDrude)
	DensityKGM3  float64   // 0 unknown
	Indium       float64   // mass fraction of the element, NaN where the composition is unknown
	Silver       float64   // likewise
	ThicknessNM  float64   // of the film that the model was made for, 0 for any (Conductor)
	Remarks      []string  // such as: an end was extended, an effective model, typical values
}

// Index returns n + ik at a vacuum wavelength in nm, k ≥ 0 for loss. It means something from FromNM to
// ToNM.
func (m *Material) Index(nm float64) complex128 { return m.Model.Index(nm) }

// Check returns an error if the material cannot be used at a wavelength in nm.
func (m *Material) Check(nm float64) error {
	if nm >= m.FromNM && nm <= m.ToNM {
		return nil
	}
	return fmt.Errorf("material %s may be used from %.6g to %.6g nm, not at %.6g nm", m.ID, m.FromNM, m.ToNM, nm)
}

// A Dispersion gives the complex index n + ik at a vacuum wavelength in nm, k ≥ 0 for loss.
type Dispersion interface{ Index(nm float64) complex128 }

// A Term is what one kind of excitation adds to the relative permittivity at a photon energy above 0, in
// eV. Its imaginary part is not negative: the time factor is exp(−iωt).
type Term interface{ Epsilon(eV float64) complex128 }

// hcEVNM is h c in eV·nm.
const hcEVNM = planckConstant * speedOfLight / elementaryCharge * 1e9

// PhotonEV returns the energy in eV of a photon of a vacuum wavelength in nm, E = hc/λ.
func PhotonEV(nm float64) float64 { return hcEVNM / nm }

// Constant is an index without dispersion.
type Constant complex128

// Index returns the constant.
func (c Constant) Index(float64) complex128 { return complex128(c) }

// Tabulated is an index by measured n and k, linear between their points.
type Tabulated struct{ Constants Constants }

// Index returns n + ik. Beyond the points the first or last value is held.
func (t Tabulated) Index(nm float64) complex128 {
	n, k := t.Constants.At(nm)
	return complex(n, k)
}

// Oscillators is a permittivity made of terms, ε = ε∞ + Σ terms.
type Oscillators struct {
	EpsInf float64
	Terms  []Term
}

// Epsilon returns the relative permittivity at a photon energy in eV.
func (o Oscillators) Epsilon(eV float64) complex128 {
	sum := complex(o.EpsInf, 0)
	for _, t := range o.Terms {
		sum += t.Epsilon(eV)
	}
	return sum
}

// Index returns n + ik = √ε.
func (o Oscillators) Index(nm float64) complex128 { return root(o.Epsilon(PhotonEV(nm))) }

// Adjusted is a known index from whose permittivity one model is taken away and to which another is
// added, ε = N² − Less + More: such as measured constants with the free carriers of another film. Where
// less loss would be left than none, there is none.
type Adjusted struct {
	Base       Dispersion
	Less, More Oscillators
}

// Index returns n + ik = √ε.
func (a Adjusted) Index(nm float64) complex128 {
	n, eV := a.Base.Index(nm), PhotonEV(nm)
	eps := n*n - a.Less.Epsilon(eV) + a.More.Epsilon(eV)
	return root(complex(real(eps), max(imag(eps), 0)))
}

// Cauchy is the index of a material that is clear throughout, n = A + B/λ² + C/λ⁴ with λ in µm, k = 0.
type Cauchy struct{ A, BUM2, CUM4 float64 }

// Index returns n.
func (c Cauchy) Index(nm float64) complex128 {
	x := 1e6 / (nm * nm) // 1/µm²
	return complex(c.A+float64(c.BUM2*x)+float64(c.CUM4*float64(x*x)), 0)
}

// Mesh is a mesh of wires far narrower than their pitch, such as silver nanowires, as a layer that acts
// like it. It is an effective model. In waves longer than the pitch the wires are an inductive grid,
// a sheet of the impedance R□ − i Z₀ (g/λ) ln csc(π w/2g), g being the pitch and w the width of a wire
// (N. Marcuvitz, Waveguide Handbook, 1951; R. Ulrich, Infrared Physics 7 (1967) 37, from memory). In
// shorter waves they cast a shadow and let pass the open area F = (1 − w/g)². The shadow fades as
// 1/(1 + (λ/g)²), which has no source.
type Mesh struct {
	OpenArea           float64 // F, above 0 and below 1
	SheetResistanceOhm float64
	PitchNM            float64
	HostIndex          float64 // of what fills the mesh, such as 1 for air
	ThicknessNM        float64 // of the layer; a film of this material must have it
}

// Index returns n + ik of the layer.
func (m Mesh) Index(nm float64) complex128 {
	wire := 1 - math.Sqrt(m.OpenArea) // w/g
	reactance := freeSpaceOhm * m.PitchNM / nm * -math.Log(math.Sin(math.Pi*wire/2))
	ratio := nm / m.PitchNM
	shadow := -math.Log(m.OpenArea) / (1 + float64(ratio*ratio))
	host := complex(m.HostIndex, shadow*nm/(4*math.Pi*m.ThicknessNM))
	return root(host*host + sheetEpsilon(1/complex(m.SheetResistanceOhm, -reactance), PhotonEV(nm), m.ThicknessNM))
}

// sheetEpsilon is what a sheet conductance in S adds to the permittivity of a layer that is thin against
// the wavelength, iσ/(ε₀ω d).
func sheetEpsilon(siemens complex128, eV, thicknessNM float64) complex128 {
	return complex(0, freeSpaceOhm/(wavenumber(eV)*thicknessNM)) * siemens // 1/(ε₀ω) = Z₀ c/ω
}

// wavenumber is ω/c in 1/nm.
func wavenumber(eV float64) float64 { return 2 * math.Pi * eV / hcEVNM }
