package thermal

// Evacuated gaps: pillars and residual gas.

import "math"

// A Vacuum is an evacuated gap with a square array of pillars.
type Vacuum struct {
	PressurePa    float64
	PillarRadiusM float64
	PillarPitchM  float64
	PillarWMK     float64    // conductivity of the pillars; 0 leaves their own resistance out
	PillarHeightM float64    // the width of the gap
	GlassWMK      [2]float64 // conductivity of the glass on either side
}

// PillarConductance returns that of the pillars in W/(m²·K): the heat narrows towards each pillar in
// both panes, 1/(4ka) a side, and passes the pillar itself, whose resistance stands in series
// (Collins and Simko, Solar Energy 62 (1998) 189, from memory).
func (v *Vacuum) PillarConductance() float64 {
	a := v.PillarRadiusM
	narrowing := 1/(4*v.GlassWMK[0]*a) + 1/(4*v.GlassWMK[1]*a)
	pillar := 0.0
	if v.PillarWMK > 0 {
		pillar = v.PillarHeightM / (v.PillarWMK * math.Pi * a * a)
	}
	return 1 / (narrowing + pillar) / (v.PillarPitchM * v.PillarPitchM)
}

// ResidualGas is the conductance of residual air per pressure, in W/(m²·K·Pa), for an effective
// accommodation of the faces (Collins and co-workers, from memory); at full accommodation kinetic
// theory has 1.18.
const ResidualGas = 0.8

// GasConductance returns that of the residual gas in W/(m²·K).
func (v *Vacuum) GasConductance() float64 { return ResidualGas * v.PressurePa }

// Conductance returns that of pillars and residual gas together, without radiation, in W/(m²·K).
func (v *Vacuum) Conductance() float64 { return v.PillarConductance() + v.GasConductance() }
