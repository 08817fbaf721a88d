package glazing

// The working of gaps, U and g by EN 673 and EN 410.

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"panewright/thermal"
)

// workHeat writes out U and g.
func workHeat(r *Rating) []Chapter {
	var out []Chapter
	for k := range r.Gaps {
		out = append(out, workGap(r, k, r.Gaps, r.Makeup.Tilt.Degrees(), ""))
	}
	out = append(out, workU(r))
	if len(r.Gaps) > 0 && r.Ready.tilted != r.Ready.vertical {
		for k := range r.GapsG {
			if r.Makeup.Gaps[k].Vacuum == nil { // the same at every tilt
				out = append(out, workGap(r, k, r.GapsG, uprightDeg, " as g has it: upright"))
			}
		}
	}
	return append(out, workG(r))
}

// uprightDeg is the tilt for which g has its gaps (EN 410, 5.4.6).
const uprightDeg = 90

// workGap writes out the conductance of gap k of the given states, which are those at a tilt.
func workGap(r *Rating, k int, states []thermal.GapState, tiltDeg float64, suffix string) Chapter {
	g, s := r.Ready.prepared[r.State].gaps[k], states[k]
	c := Chapter{Title: fmt.Sprintf("Gap %d%s: %.6g mm %s, surfaces %d and %d", k+1, suffix, r.Makeup.Gaps[k].WidthMM, g.Gas.Name, 2*k+2, 2*k+3)}
	if g.Evacuated {
		c.remark("Evacuated, which is outside " + r.Method.Basis.rounding + ": pillars, residual gas and radiation at 283 K stand in its place.")
		c.Steps = append(c.Steps, workDrop(states, k))
		c.vacuum(r.Makeup.vacuum(k))
		c.radiationAt283K(g, s, k)
		return c
	}
	mixture := r.Makeup.Gaps[k].Gas
	mixed := func(get func(thermal.Gas) float64) string {
		var parts []string
		for _, share := range mixture {
			one, _ := thermal.Mix(map[string]float64{share.Gas: 1})
			parts = append(parts, put(share.Fraction)+"·"+put(get(one.Properties())))
		}
		return strings.Join(parts, " + ")
	}
	const table = "Σ fraction·value at 283 K"
	density, viscosity := func(g thermal.Gas) float64 { return g.DensityKGM3 }, func(g thermal.Gas) float64 { return g.ViscosityPaS }
	conductivity, capacity := func(g thermal.Gas) float64 { return g.ConductivityWMK }, func(g thermal.Gas) float64 { return g.HeatCapacityJKGK }
	steps := []Step{
		{Symbol: "ρ", Meaning: "density", Formula: table, Numbers: mixed(density), Value: g.Gas.DensityKGM3, Unit: "kg/m³", Clause: "EN 673, 6.2"},
		{Symbol: "µ", Meaning: "dynamic viscosity", Formula: table, Numbers: mixed(viscosity), Value: g.Gas.ViscosityPaS, Unit: "Pa·s", Clause: "EN 673, 6.2"},
		{Symbol: "λ", Meaning: "conductivity", Formula: table, Numbers: mixed(conductivity), Value: g.Gas.ConductivityWMK, Unit: "W/(m·K)", Clause: "EN 673, 6.2"},
		{Symbol: "c", Meaning: "heat capacity", Formula: table, Numbers: mixed(capacity), Value: g.Gas.HeatCapacityJKGK, Unit: "J/(kg·K)", Clause: "EN 673, 6.2"},
	}
	steps = append(steps, workDrop(states, k),
		Step{Symbol: "Gr", Meaning: "Grashof number", Formula: "9.81·s^3·ΔT·ρ^2/(Tm·µ^2)",
			Numbers: fmt.Sprintf("%s·%s^3·%s·%s^2/(%s·%s^2)", put(thermal.Gravity), put(g.WidthM), put(float64(s.Drop)), put(g.Gas.DensityKGM3), put(thermal.MeanTemperature), put(g.Gas.ViscosityPaS)),
			Value:   s.Grashof, Clause: "EN 673 (7)"},
		Step{Symbol: "Pr", Meaning: "Prandtl number", Formula: "µ·c/λ",
			Numbers: put(g.Gas.ViscosityPaS) + "·" + put(g.Gas.HeatCapacityJKGK) + "/" + put(g.Gas.ConductivityWMK), Value: s.Prandtl, Clause: "EN 673 (8)"},
		Step{Symbol: "Gr·Pr", Meaning: "Rayleigh number", Formula: "Gr·Pr", Numbers: put(s.Grashof) + "·" + put(s.Prandtl), Value: s.Rayleigh, Clause: "EN 673 (6)"},
	)
	hg := fmt.Sprintf("%s·%s/%s", put(s.Nusselt), put(g.Gas.ConductivityWMK), put(g.WidthM))
	c.Steps = append(append(steps, workNusselt(s, tiltDeg, r.Makeup.HeatFlow)...),
		Step{Symbol: "hg", Meaning: "gas conductance", Formula: "Nu·λ/s", Numbers: hg, Value: s.Convective, Unit: "W/(m²·K)", Clause: "EN 673 (5)"},
	)
	c.radiationAt283K(g, s, k)
	return c
}

// workDrop writes out the temperature drop over gap k.
func workDrop(states []thermal.GapState, k int) Step {
	s := states[k]
	drop := Step{Symbol: "ΔT", Meaning: "temperature drop", Formula: "of the standard", Numbers: put(thermal.TotalDrop), Value: float64(s.Drop), Unit: "K", Clause: "EN 673, 5.3"}
	if len(states) > 1 {
		var all []string
		for i := range states {
			all = append(all, "1/"+put(states[i].Total))
		}
		drop.Formula = "15·(1/hs)/Σ(1/hs), iterated from equal shares"
		drop.Numbers = put(thermal.TotalDrop) + "·(1/" + put(s.Total) + ")/(" + strings.Join(all, " + ") + ")"
	}
	return drop
}

// radiationAt283K writes out hr and hs of gap k.
func (c *Chapter) radiationAt283K(g thermal.Gap, s thermal.GapState, k int) {
	c.step("hr", "radiative conductance", fmt.Sprintf("4·σ·Tm^3/(1/ε%d + 1/ε%d − 1)", 2*k+2, 2*k+3),
		fmt.Sprintf("4·%s·%s^3/(1/%s + 1/%s − 1)", put(thermal.StefanBoltzmann), put(thermal.MeanTemperature), put(g.Emissivity[0]), put(g.Emissivity[1])),
		s.Radiative, "W/(m²·K)", "EN 673 (4)")
	c.step("hs", "conductance of the gap", "hr + hg", put(s.Radiative)+" + "+put(s.Convective), s.Total, "W/(m²·K)", "EN 673 (3)")
}

// tabulatedDeg is how far the tilts lie apart for which EN 673 gives A and n: 0, 45 and 90°.
const tabulatedDeg = 45

// workNusselt writes out the Nusselt number of a gap at a tilt, and its constants A and n, which
// between the tilts of the standard are interpolated.
func workNusselt(s thermal.GapState, tiltDeg float64, flow HeatFlow) []Step {
	const clause = "EN 673, 5.3"
	c, between := thermal.ConvectionAt(tiltDeg, flow), thermal.ConvectionBetween(tiltDeg, flow)
	nu := Step{Symbol: "Nu", Meaning: "Nusselt number", Formula: "max(1, A·(Gr·Pr)^n)", Value: s.Nusselt, Clause: "EN 673 (6)",
		Numbers: fmt.Sprintf("max(1, %s·%s^%s)", put(c.First.A), put(s.Rayleigh), put(c.First.N))}
	if c.Still {
		nu.Formula, nu.Numbers = "1, as heat flows down", "1"
		return []Step{nu}
	}
	tilt, numbers := "tilt", put(tiltDeg)
	if tiltDeg > uprightDeg {
		tilt, numbers = "(180 − tilt)", "(180 − "+put(tiltDeg)+")"
		tiltDeg = 180 - tiltDeg
	}
	lower := tabulatedDeg * math.Floor(tiltDeg/tabulatedDeg)
	constant := func(symbol string, value, first, second float64) Step {
		step := Step{Symbol: symbol, Meaning: "constant of the tilt", Formula: fmt.Sprintf("of the standard at %g°", tiltDeg), Numbers: put(value), Value: value, Clause: clause}
		if between.Weight != 0 {
			step.Formula = fmt.Sprintf("%s at %g° + (%s at %g° − %s at %g°)·(%s − %g)/%d",
				symbol, lower, symbol, lower+tabulatedDeg, symbol, lower, tilt, lower, tabulatedDeg)
			step.Numbers = fmt.Sprintf("%s + (%s)·(%s − %s)/%d", put(first), minus(second, first), numbers, put(lower), tabulatedDeg)
		}
		return step
	}
	return []Step{constant("A", c.First.A, between.First.A, between.Second.A), constant("n", c.First.N, between.First.N, between.Second.N), nu}
}

// inner writes out hi of one of the basis's two sets of surfaces.
func inner(r *Rating, s surfaces, value float64, clause string) Step {
	step := Step{Symbol: "hi", Meaning: "inside surface coefficient", Value: value, Unit: "W/(m²·K)", Clause: clause}
	if r.Method.Options.InsideWM2K > 0 {
		step.Formula, step.Numbers = "typed by the user", put(value)
		return step
	}
	last := 2 * len(r.Makeup.Panes)
	step.Formula = fmt.Sprintf("%s + %s·ε%d/0.837", put(s.insideConvection), put(s.insideRadiation), last)
	step.Numbers = fmt.Sprintf("%s + %s·%s/%s", put(s.insideConvection), put(s.insideRadiation), put(r.Ready.prepared[r.State].room.Corrected.Number), put(thermal.GlassEmissivity))
	return step
}

func outer(r *Rating, value float64, clause string) Step {
	step := Step{Symbol: "he", Meaning: "outside surface coefficient", Formula: "of the basis", Numbers: put(value), Value: value, Unit: "W/(m²·K)", Clause: clause}
	if r.Method.Options.OutsideWM2K > 0 {
		step.Formula = "typed by the user"
	}
	return step
}

const clauseGlass = "EN 673 (2)"

// workGlass writes out the resistance of each pane and of all.
func workGlass(r *Rating, clause string) []Step {
	const unit = "m²·K/W"
	var steps []Step
	var symbols, values []string
	for k, p := range r.Makeup.Panes {
		var parts []string
		for _, y := range p.Pane.Plies {
			parts = append(parts, put(y.ThicknessMM/1000)+"/"+put(y.ConductivityWMK))
		}
		symbols, values = append(symbols, fmt.Sprintf("Rg%d", k+1)), append(values, put(r.Ready.glass[k]))
		steps = append(steps, Step{Symbol: symbols[k], Meaning: fmt.Sprintf("resistance of pane %d", k+1), Formula: "Σ d/λ of its plies, d in m",
			Numbers: strings.Join(parts, " + "), Value: r.Ready.glass[k], Unit: unit, Clause: clause})
	}
	return append(steps, Step{Symbol: "Rg", Meaning: "resistance of the panes", Formula: strings.Join(symbols, " + "),
		Numbers: strings.Join(values, " + "), Value: r.Ready.glassResistance(), Unit: unit, Clause: clause})
}

// resistance writes out 1/he + 1/hi + Rg + Σ 1/hs; glass is that of Rg, 0 where it is left out.
func resistance(he, hi, glass float64, gaps []thermal.GapState, value float64, clause string) Step {
	s := Step{Symbol: "Rt", Meaning: "resistance from air to air", Formula: "1/he + 1/hi", Numbers: "1/" + put(he) + " + 1/" + put(hi), Value: value, Unit: "m²·K/W", Clause: clause}
	if glass > 0 {
		s.Formula, s.Numbers = s.Formula+" + Rg", s.Numbers+" + "+put(glass)
	}
	for k := range gaps {
		s.Formula, s.Numbers = s.Formula+fmt.Sprintf(" + 1/hs%d", k+1), s.Numbers+" + 1/"+put(gaps[k].Total)
	}
	return s
}

func workU(r *Rating) Chapter {
	he, hi := r.OutsideWM2K.Number, r.InsideWM2K.Number
	total := resistance(he, hi, r.Ready.glassResistance(), r.Gaps, 1/r.U.Number, "EN 673 (1), (2)")
	steps := append([]Step{outer(r, he, "EN 673, 7"), inner(r, r.Method.Basis.u, hi, "EN 673, 7")}, workGlass(r, clauseGlass)...)
	return Chapter{Title: "U-value of the centre of the glass",
		Note: "rounded as " + r.Method.Basis.rounding + " rounds: " + PrintRounded(r.U.Number, r.Method.Basis.uPlaces) + " W/(m²·K)",
		Steps: append(steps, total,
			Step{Symbol: "U", Meaning: "thermal transmittance", Formula: "1/Rt", Numbers: "1/" + put(total.Value), Value: r.U.Number, Unit: "W/(m²·K)", Clause: "EN 673 (1)"})}
}

func workG(r *Rating) Chapter {
	c := Chapter{Title: "g-value: transmitted sun and heat of the panes"}
	if !r.G.Known {
		c.lack("g", r.G.Why)
		return c
	}
	he, hi, n := r.OutsideGWM2K.Number, r.InsideGWM2K.Number, len(r.Makeup.Panes)
	gaps, clause := r.GapsG, "EN 410, 5.4.6"
	c.Steps = []Step{outer(r, he, clause), inner(r, r.Method.Basis.g, hi, clause)}
	glass := 0.0 // the standards leave the glass of a single pane out
	if n > 1 {
		glass = r.Ready.glassResistance()
		c.Steps = append(c.Steps, workGlass(r, clauseGlass)...)
	}
	// Panes are nodes: the outermost at its outer face, the innermost at its inner face, the
	// others at mid-glass. outside is the glass between surface 1 and the node of a pane.
	a0, a0Formula := put(r.absorbed[0])+"/"+put(he), "αe1/he"
	var outside, outsideFormula string
	part := func(k int, whole bool) (formula, number string) {
		formula, number = fmt.Sprintf("Rg%d", k+1), put(r.Ready.glass[k])
		if !whole {
			formula, number = formula+"/2", number+"/2"
		}
		return formula, number
	}
	for k := 1; k < n; k++ {
		beforeFormula, before := part(k-1, k == 1)
		afterFormula, after := part(k, k == n-1)
		outsideFormula += " + " + beforeFormula + " + " + afterFormula
		outside += " + " + before + " + " + after
		a0Formula += fmt.Sprintf(" + αe%d·(1/he%s)", k+1, outsideFormula)
		a0 += fmt.Sprintf(" + %s·(1/%s%s)", put(r.absorbed[k]), put(he), outside)
		c.Steps = append(c.Steps, Step{Symbol: fmt.Sprintf("Λ%d", k), Meaning: "conductance between two panes",
			Formula: fmt.Sprintf("1/(%s + 1/hs%d + %s)", beforeFormula, k, afterFormula),
			Numbers: fmt.Sprintf("1/(%s + 1/%s + %s)", before, put(gaps[k-1].Total), after), Value: r.Heat.Conductances[k-1], Unit: "W/(m²·K)", Clause: clause})
	}
	c.Steps = append(c.Steps, Step{Symbol: "a0", Meaning: "absorbed sun times resistance outside it",
		Formula: a0Formula, Numbers: a0, Value: r.Heat.A0, Unit: "m²·K/W", Clause: clause})
	numerator := put(r.Heat.A0)
	for k, b := range r.Heat.B {
		var parts []string
		for _, a := range r.absorbed[k+1:] {
			parts = append(parts, put(a))
		}
		c.Steps = append(c.Steps, Step{Symbol: fmt.Sprintf("b%d", k+1), Meaning: "absorbed sun inside gap " + strconv.Itoa(k+1), Formula: "Σ αe of the panes inside",
			Numbers: strings.Join(parts, " + "), Value: b, Clause: clause})
		numerator += " + " + put(b) + "/" + put(gaps[k].Total)
	}
	total := resistance(he, hi, glass, gaps, r.Heat.Resistance, clause)
	g := r.G.Number
	c.Steps = append(c.Steps, total,
		Step{Symbol: "qi", Meaning: "secondary heat towards the inside", Formula: "(a0 + Σ b/hs)/Rt", Numbers: "(" + numerator + ")/" + put(total.Value), Value: r.SecondaryHeat.Number, Clause: clause},
		Step{Symbol: "g", Meaning: "total solar energy transmittance", Formula: "τe + qi", Numbers: put(r.Solar.Transmittance.Number) + " + " + put(r.SecondaryHeat.Number), Value: g, Clause: "EN 410, 5.4.1"},
	)
	c.Steps = append(c.Steps, workShading(r)...)
	return c
}

// workShading writes out what follows from g.
func workShading(r *Rating) []Step {
	g := put(r.G.Number)
	steps := []Step{{Symbol: "SC", Meaning: "shading coefficient", Formula: "g/0.87", Numbers: g + "/" + put(shadingReference), Value: r.ShadingCoefficient.Number, Clause: "EN 410, 5.7"}}
	if r.LightToSolarGain.Known {
		steps = append(steps, Step{Symbol: "τv/g", Meaning: "light to solar gain", Formula: "τv/g",
			Numbers: put(r.Light.Transmittance.Number) + "/" + g, Value: r.LightToSolarGain.Number, Clause: "common practice, no source"})
	}
	return steps
}
