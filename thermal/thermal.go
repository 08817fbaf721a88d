// Package thermal computes the heat transfer through the centre of a glazing, in two ways.
//
// By EN 673:2011 and ISO 10292, and EN 410:2011 and ISO 9050:2003: gases at 283 K, gap conductances,
// surface coefficients, U-value, and the heat that absorbed sun sends inwards (thermal.go, gas.go).
// A double pane in a few lines:
//
//	gas, _ := thermal.Mix(map[string]float64{"argon": 0.9, "air": 0.1})
//	gaps := []thermal.Gap{{WidthM: 0.016, Gas: gas.Properties(), Emissivity: [2]float64{0.837, 0.03}}}
//	states := make([]thermal.GapState, len(gaps))
//	err := thermal.SolveGaps(states, gaps, thermal.ConvectionAt(90, thermal.Up))
//	hi := thermal.InsideEN673(0.837)
//	u := thermal.U(25, hi, 0.008, states) // glass 4 + 4 mm of 1.0 W/(m·K)
//
// By the detailed balance of ISO 15099:2003, for any temperatures, wind, sun and tilt: gases by
// kinetic theory (fluid.go), convection (convection.go), temperatures of all faces by Newton's method
// (balance.go), with evacuated gaps (vacuum.go) and sheets that pass infrared (exchange.go). The same
// double in a winter night:
//
//	fluid, _ := gas.Fluid()
//	sheets := []thermal.Sheet{
//		{Plies: []thermal.Layer{{ResistanceM2KW: 0.004, Share: 1}}, Emissivity: [2]float64{0.837, 0.837}},
//		{Plies: []thermal.Layer{{ResistanceM2KW: 0.004, Share: 1}}, Emissivity: [2]float64{0.03, 0.837}},
//	}
//	system, err := thermal.NewSystem(sheets, []thermal.Cavity{{WidthM: 0.016, Gas: fluid}})
//	at := thermal.Surroundings{OutsideK: 263, OutsideRadiantK: 263, InsideK: 293, InsideRadiantK: 293,
//		OutsideConvection: thermal.WindConvection(4), TiltDeg: 90, HeightM: 1}
//	var b thermal.Balance
//	err = system.Solve(&b, at, []float64{0, 0})
//	u = -b.InwardWM2() / 30
//
// What follows from temperatures: moisture (moisture.go), thermal stress (stress.go), comfort
// (comfort.go, person.go).
//
// SI throughout; emissivities are corrected (hemispherical) ones. Clause and equation numbers are from
// memory. Left out: edges and frames, vented gaps, blinds, the change of gap widths with pressure.
package thermal

import (
	"errors"
	"math"
)

// Delta is a difference of two temperatures, in K.
type Delta float64

// The reference values of EN 673:2011, 5 to 7; ISO 10292 shares them.
const (
	StefanBoltzmann       = 5.67e-8 // W/(m²·K⁴), as EN 673 prints it; CODATA 2018 has 5.670374e-8
	MeanTemperature       = 283.0   // K, of every gap
	TotalDrop             = 15.0    // K, over all gaps together
	Gravity               = 9.81    // m/s²
	GlassConductivity     = 1.0     // W/(m·K), of soda-lime glass
	GlassEmissivity       = 0.837   // corrected, of an uncoated soda-lime face
	GlassEmissivityNormal = 0.89    // normal, of the same
)

// A Gap is the space between two panes.
type Gap struct {
	WidthM     float64
	Gas        Gas
	Emissivity [2]float64 // corrected, of the outer and inner bounding face
	// Evacuated gaps are outside EN 673: pillars and residual gas stand in the place of the gas, with
	// ConductanceWM2K, and radiation as in any gap.
	Evacuated       bool
	ConductanceWM2K float64
}

// GapState is the heat transfer in one gap with all its intermediates, in the order in which a
// hand calculation meets them.
type GapState struct {
	Drop       Delta   // ΔT over the gap
	Grashof    float64 // Gr
	Prandtl    float64 // Pr
	Rayleigh   float64 // Gr·Pr
	Nusselt    float64 // Nu
	Convective float64 // hg = Nu·λ/s, W/(m²·K): conduction and convection
	Radiative  float64 // hr, W/(m²·K)
	Total      float64 // hs = hr + hg, W/(m²·K)
}

// Flow is the direction of heat through glazing that is not vertical.
type Flow int

// The directions of heat flow.
const (
	Up   Flow = iota // the cold side above, as under a roof in winter
	Down             // the cold side below
)

// Correlation is Nu = A·Ra^N, and at least 1.
type Correlation struct{ A, N float64 }

// Convection is the correlation of a tilt: that of First, or, where Weight is not 0, the mean of
// both in the proportion 1 − Weight to Weight. Still means Nu = 1.
type Convection struct {
	First, Second Correlation
	Weight        float64
	Still         bool
}

// The correlations of EN 673:2011, 5.3.
var positions = [...]struct {
	tiltDeg float64
	Correlation
}{
	{0, Correlation{0.16, 0.28}},
	{45, Correlation{0.10, 0.31}},
	{90, Correlation{0.035, 0.38}},
}

// ConvectionAt returns the correlation for a tilt in degrees, 90 vertical, 0 and 180 horizontal;
// beyond 90 it is that of 180 − tilt. Between 0, 45 and 90° both constants are interpolated
// linearly, the literal reading of EN 673:2011, 5.3. Heat that flows down through glazing that
// is not vertical does not convect.
func ConvectionAt(tiltDeg float64, flow Flow) Convection {
	c := ConvectionBetween(tiltDeg, flow)
	mix := func(a, b float64) float64 { return float64((1-c.Weight)*a) + float64(c.Weight*b) }
	return Convection{First: Correlation{mix(c.First.A, c.Second.A), mix(c.First.N, c.Second.N)}, Still: c.Still}
}

// ConvectionBetween is the other reading of EN 673: between 0, 45 and 90° it interpolates the
// Nusselt number and not its constants. At those three tilts both readings are the same.
func ConvectionBetween(tiltDeg float64, flow Flow) Convection {
	if tiltDeg > 90 {
		tiltDeg = 180 - tiltDeg
	}
	c := Convection{Still: flow == Down && tiltDeg < 90}
	for i, p := range positions {
		if tiltDeg == p.tiltDeg {
			c.First = p.Correlation
			return c
		}
		if tiltDeg < p.tiltDeg {
			below := positions[i-1]
			c.First, c.Second = below.Correlation, p.Correlation
			c.Weight = (tiltDeg - below.tiltDeg) / (p.tiltDeg - below.tiltDeg)
			return c
		}
	}
	return c
}

// Nusselt returns Nu for a Rayleigh number (EN 673:2011 (6)).
func (c Convection) Nusselt(rayleigh float64) float64 {
	if c.Still || rayleigh <= 0 {
		return 1
	}
	logRa := math.Log(rayleigh)
	nu := max(1, c.First.A*math.Exp(c.First.N*logRa))
	if c.Weight == 0 {
		return nu
	}
	second := max(1, c.Second.A*math.Exp(c.Second.N*logRa))
	return float64((1-c.Weight)*nu) + float64(c.Weight*second)
}

// RadiativeConductance returns hr of a gap between faces of the given corrected emissivities at
// the mean temperature, in W/(m²·K) (EN 673:2011 (4)).
func RadiativeConductance(e1, e2 float64) float64 {
	return 4 * StefanBoltzmann * MeanTemperature * MeanTemperature * MeanTemperature / (1/e1 + 1/e2 - 1)
}

// ErrNoConvergence is returned when the temperature drop cannot be shared among the gaps.
var ErrNoConvergence = errors.New("thermal: the temperature drops of the gaps did not converge")

const (
	dropTolerance = 1e-9 // K
	dropRounds    = 1000
)

// SolveGaps writes the state of each gap into states, of the same length: the total drop of 15 K
// is shared in proportion to the resistances, iterated from equal shares until no drop changes
// by more than 1e-9 K (EN 673:2011, 5.3).
func SolveGaps(states []GapState, gaps []Gap, c Convection) error {
	for i, g := range gaps {
		s := &states[i]
		s.Drop = TotalDrop / Delta(len(gaps))
		s.Radiative = RadiativeConductance(g.Emissivity[0], g.Emissivity[1])
		s.Grashof, s.Prandtl, s.Rayleigh, s.Nusselt = 0, 0, 0, 0
		if g.Evacuated {
			s.Convective = g.ConductanceWM2K
			s.Total = s.Radiative + s.Convective
			continue
		}
		s.Prandtl = g.Gas.ViscosityPaS * g.Gas.HeatCapacityJKGK / g.Gas.ConductivityWMK // EN 673:2011 (8)
	}
	for range dropRounds {
		var resistance float64
		for i, g := range gaps {
			s := &states[i]
			if g.Evacuated {
				resistance += 1 / s.Total
				continue
			}
			s.Grashof = Gravity * g.WidthM * g.WidthM * g.WidthM * float64(s.Drop) * g.Gas.DensityKGM3 * g.Gas.DensityKGM3 /
				(MeanTemperature * g.Gas.ViscosityPaS * g.Gas.ViscosityPaS) // EN 673:2011 (7)
			s.Rayleigh = s.Grashof * s.Prandtl
			s.Nusselt = c.Nusselt(s.Rayleigh)
			s.Convective = s.Nusselt * g.Gas.ConductivityWMK / g.WidthM // EN 673:2011 (5)
			s.Total = s.Radiative + s.Convective                        // EN 673:2011 (3)
			resistance += 1 / s.Total
		}
		if len(gaps) < 2 {
			return nil
		}
		settled := true
		for i := range states {
			drop := TotalDrop * (1 / states[i].Total) / resistance
			settled = settled && math.Abs(drop-float64(states[i].Drop)) < dropTolerance
			if !settled {
				break
			}
		}
		if settled {
			return nil
		}
		for i := range states {
			states[i].Drop = Delta(TotalDrop * (1 / states[i].Total) / resistance)
		}
	}
	return ErrNoConvergence
}

// U returns the thermal transmittance in W/(m²·K) of outside coefficient he, inside coefficient
// hi (W/(m²·K)), glass resistance (m²·K/W) and gaps, outside first (EN 673:2011 (1), (2)).
func U(he, hi, glass float64, gaps []GapState) float64 {
	return 1 / Resistance(he, hi, glass, gaps)
}

// Resistance returns 1/he + 1/hi + glass + Σ 1/hs in m²·K/W, added from left to right.
func Resistance(he, hi, glass float64, gaps []GapState) float64 {
	sum := 1/he + 1/hi + glass
	for i := range gaps {
		sum += 1 / gaps[i].Total
	}
	return sum
}

// InsideEN673 returns the inside surface coefficient hi in W/(m²·K) for a room-side corrected
// emissivity (EN 673:2011, 7; EN 410:2011, 5.4.6).
func InsideEN673(emissivity float64) float64 { return Inside(3.6, 4.1, emissivity) }

// Inside returns convection + radiation·ε/0.837: radiation is that of an uncoated face.
func Inside(convection, radiation, emissivity float64) float64 {
	return convection + float64(radiation*(emissivity/GlassEmissivity))
}

// SecondaryHeat is the heat that panes warmed by the sun give to the room, with what leads to
// it: Inward = (A0 + Σ r_k·B[k]) / Resistance, where r_k is the resistance of gap k.
type SecondaryHeat struct {
	A0           float64   // heat of each pane times the resistance of glass and surface outside it, m²·K/W
	B            []float64 // absorptance of all panes inside gap k
	Resistance   float64   // 1/he + 1/hi + glass + Σ r, m²·K/W
	Conductances []float64 // Λ_k between panes k and k+1, W/(m²·K)
	Inward       float64   // qi, the fraction of the incident sun
}

// Solve writes the secondary heat for the absorptance of each pane, the resistance of the glass
// of each (m²·K/W), and the gaps (EN 410:2011, 5.4.6; ISO 9050:2003, 3.5). The absorbed sun of
// the outermost pane enters at its outer face, that of the innermost at its inner face, that of
// the others at mid-glass; for a single pane the standards leave the glass out. The memory of s
// is kept from call to call.
func (s *SecondaryHeat) Solve(he, hi float64, absorbed, glass []float64, gaps []GapState) {
	n := len(absorbed)
	s.B, s.Conductances = s.B[:0], s.Conductances[:0]
	if n == 1 {
		s.A0 = absorbed[0] / he
		s.Resistance = 1/he + 1/hi
		s.Inward = s.A0 / s.Resistance
		return
	}
	var total, outside float64 // glass of all panes; glass outside the node of pane k
	for _, r := range glass {
		total += r
	}
	s.A0 = absorbed[0] / he
	for k := 1; k < n; k++ {
		before, after := glass[k-1]/2, glass[k]/2
		if k == 1 {
			before = glass[0]
		}
		if k == n-1 {
			after = glass[k]
		}
		outside += before + after
		s.A0 += float64(absorbed[k] * (1/he + outside))
		s.Conductances = append(s.Conductances, 1/(before+1/gaps[k-1].Total+after))
		inside := 0.0
		for _, a := range absorbed[k:] {
			inside += a
		}
		s.B = append(s.B, inside)
	}
	s.Resistance = Resistance(he, hi, total, gaps)
	sum := s.A0
	for k := range s.B {
		sum += float64(1 / gaps[k].Total * s.B[k])
	}
	s.Inward = sum / s.Resistance
}
