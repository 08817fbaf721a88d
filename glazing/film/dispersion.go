package film

// Terms of the permittivity. Energies are photon energies in eV.

import "math"

// Drude are free carriers, −Ep²/(E² + iγE) (P. Drude 1900; conducting oxides: physical constants by
// Carriers).
type Drude struct {
	PlasmaEV  float64 // ħωp, not screened
	DampingEV float64 // ħγ
}

// Epsilon returns the term at a photon energy.
func (d Drude) Epsilon(eV float64) complex128 {
	return complex(-d.PlasmaEV*d.PlasmaEV, 0) / complex(float64(eV*eV), d.DampingEV*eV)
}

// FallingDrude are free carriers that ionised impurities scatter: above the plasma energy their
// damping falls as E^(−3/2) (I. Hamberg and C. G. Granqvist, Journal of Applied Physics 60 (1986)
// R123, from memory). Below it, and so in the infrared, they are those of Drude. A damping that
// depends on the energy breaks the relation of Kramers and Kronig by the order of (γ/E)², which is
// 1e-3 in light.
type FallingDrude struct {
	Drude
	OnsetEV float64 // the screened plasma energy
}

// Epsilon returns the term at a photon energy.
func (d FallingDrude) Epsilon(eV float64) complex128 {
	if eV > d.OnsetEV {
		d.DampingEV *= math.Pow(eV/d.OnsetEV, -1.5) // Hamberg and Granqvist 1986
	}
	return d.Drude.Epsilon(eV)
}

// DrudeSmith are free carriers of which part is scattered back, as in grainy films and polymers: the
// conductivity of Drude times 1 + c γ/(γ − iE) (N. V. Smith, Physical Review B 64 (2001) 155106,
// from memory). The resistance to direct current is that of Drude divided by 1 + c.
type DrudeSmith struct {
	Drude
	Persistence float64 // c, from −1 (all turn back) to 0 (Drude)
}

// Epsilon returns the term at a photon energy.
func (d DrudeSmith) Epsilon(eV float64) complex128 {
	back := complex(d.Persistence*d.DampingEV, 0) / complex(d.DampingEV, -eV)
	return d.Drude.Epsilon(eV) * (1 + back)
}

// Lorentz is a damped oscillator, f E0²/(E0² − E² − iΓE).
type Lorentz struct {
	Strength     float64 // f, what it adds to the permittivity far below its energy
	EnergyEV     float64 // E0
	BroadeningEV float64 // Γ
}

// Epsilon returns the term at a photon energy.
func (l Lorentz) Epsilon(eV float64) complex128 {
	square := float64(l.EnergyEV * l.EnergyEV)
	return complex(l.Strength*square, 0) / complex(square-float64(eV*eV), -l.BroadeningEV*eV)
}

// Sellmeier is a resonance without loss, B λ²/(λ² − λ0²) (W. Sellmeier 1871).
type Sellmeier struct {
	Strength    float64 // B
	ResonanceNM float64 // λ0, outside the range of use
}

// Epsilon returns the term at a photon energy.
func (s Sellmeier) Epsilon(eV float64) complex128 {
	x := s.ResonanceNM / hcEVNM * eV // λ0/λ
	return complex(s.Strength/(1-float64(x*x)), 0)
}

// Graphene is a stack of layers of carbon, one atom thick each, as the permittivity of a layer of the
// stack's thickness: a sheet of the conductivity σ that light crosses (L. A. Falkovsky, Journal of
// Physics: Conference Series 129 (2008) 012004, from memory). Light loses π α = 2.3 % to each layer
// (R. R. Nair and others, Science 320 (2008) 1308); carriers add the infrared, and stop what absorbs below
// twice the Fermi energy.
type Graphene struct {
	FermiEV   float64 // of the carriers, by doping; 0 for none but those of warmth
	DampingEV float64 // ħγ of the carriers
}

// Graphite's distance of layers in nm, and room temperature times k in eV.
const (
	grapheneLayerNM = 0.335 // common practice
	roomEV          = boltzmann * 300 / elementaryCharge
)

// conductance is that of one layer in S.
func (g Graphene) conductance(eV float64) complex128 {
	const universal = math.Pi * elementaryCharge * elementaryCharge / (2 * planckConstant) // e²/4ħ
	carriers := complex(0, g.weightEV()) / complex(eV, g.DampingEV)
	over, under := eV+2*g.FermiEV, eV-2*g.FermiEV
	between := complex(
		(math.Tanh(over/(4*roomEV))+math.Tanh(under/(4*roomEV)))/2,
		-math.Log(float64(over*over)/(float64(under*under)+4*roomEV*roomEV))/(2*math.Pi))
	return universal * (carriers + between)
}

// weightEV is the strength of the carriers in units of e²/4ħ: 4 E_F/π where that is far above kT.
func (g Graphene) weightEV() float64 {
	x := math.Abs(g.FermiEV) / (2 * roomEV)
	return 8 * roomEV / math.Pi * (x + math.Log1p(math.Exp(-2*x))) // ln(2 cosh x)
}

// Epsilon returns the permittivity of a layer, less 1, at a photon energy; it is the same for any number of layers.
func (g Graphene) Epsilon(eV float64) complex128 {
	return sheetEpsilon(g.conductance(eV), eV, grapheneLayerNM)
}

// LayersNM returns the thickness of a film of so many layers.
func (Graphene) LayersNM(layers int) float64 { return float64(layers) * grapheneLayerNM }

// SheetResistance returns that of one layer to direct current, in Ω.
func (g Graphene) SheetResistance() float64 {
	const quantumOhm = 2 * planckConstant / (math.Pi * elementaryCharge * elementaryCharge) // 4ħ/e²
	return quantumOhm * g.DampingEV / g.weightEV()
}
