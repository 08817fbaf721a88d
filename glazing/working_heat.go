package glazing

// The working of gaps, U and g.

import (
	"fmt"
	"strconv"
	"strings"

	"panewright/thermal"
)

// workHeat writes out U and g.
func workHeat(r *Rating) []Chapter {
	var out []Chapter
	for k := range r.Gaps {
		out = append(out, workGap(r, k, r.Gaps, r.Ready.tilted, ""))
	}
	out = append(out, workU(r))
	if len(r.Gaps) > 0 && r.Ready.tilted != r.Ready.vertical {
		for k := range r.GapsG {
			out = append(out, workGap(r, k, r.GapsG, r.Ready.vertical, " as g has it: upright"))
		}
	}
	return append(out, workG(r))
}

// workGap writes out the conductance of gap k of the given states.
func workGap(r *Rating, k int, states []thermal.GapState, convection thermal.Convection, suffix string) Chapter {
	g, s := r.Ready.prepared[r.State].gaps[k], states[k]
	c := Chapter{Title: fmt.Sprintf("Gap %d%s: %.6g mm %s, surfaces %d and %d", k+1, suffix, r.Makeup.Gaps[k].WidthMM, g.Gas.Name, 2*k+2, 2*k+3)}
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
	drop := Step{Symbol: "ΔT", Meaning: "temperature drop", Formula: "of the standard", Numbers: put(thermal.TotalDrop), Value: float64(s.Drop), Unit: "K", Clause: "EN 673, 5.3"}
	if len(states) > 1 {
		var all []string
		for i := range states {
			all = append(all, "1/"+put(states[i].Total))
		}
		drop.Formula = "15·(1/hs)/Σ(1/hs), iterated from equal shares"
		drop.Numbers = put(thermal.TotalDrop) + "·(1/" + put(s.Total) + ")/(" + strings.Join(all, " + ") + ")"
	}
	steps = append(steps, drop,
		Step{Symbol: "Gr", Meaning: "Grashof number", Formula: "9.81·s^3·ΔT·ρ^2/(Tm·µ^2)",
			Numbers: fmt.Sprintf("%s·%s^3·%s·%s^2/(%s·%s^2)", put(thermal.Gravity), put(g.WidthM), put(float64(s.Drop)), put(g.Gas.DensityKGM3), put(thermal.MeanTemperature), put(g.Gas.ViscosityPaS)),
			Value:   s.Grashof, Clause: "EN 673 (7)"},
		Step{Symbol: "Pr", Meaning: "Prandtl number", Formula: "µ·c/λ",
			Numbers: put(g.Gas.ViscosityPaS) + "·" + put(g.Gas.HeatCapacityJKGK) + "/" + put(g.Gas.ConductivityWMK), Value: s.Prandtl, Clause: "EN 673 (8)"},
		Step{Symbol: "Gr·Pr", Meaning: "Rayleigh number", Formula: "Gr·Pr", Numbers: put(s.Grashof) + "·" + put(s.Prandtl), Value: s.Rayleigh, Clause: "EN 673 (6)"},
	)
	nu := Step{Symbol: "Nu", Meaning: "Nusselt number", Formula: "max(1, A·(Gr·Pr)^n)", Value: s.Nusselt, Clause: "EN 673 (6)",
		Numbers: fmt.Sprintf("max(1, %s·%s^%s)", put(convection.First.A), put(s.Rayleigh), put(convection.First.N))}
	if convection.Still {
		nu.Formula, nu.Numbers = "1, as heat flows down", "1"
	}
	hg := fmt.Sprintf("%s·%s/%s", put(s.Nusselt), put(g.Gas.ConductivityWMK), put(g.WidthM))
	c.Steps = append(steps, nu,
		Step{Symbol: "hg", Meaning: "gas conductance", Formula: "Nu·λ/s", Numbers: hg, Value: s.Convective, Unit: "W/(m²·K)", Clause: "EN 673 (5)"},
		Step{Symbol: "hr", Meaning: "radiative conductance", Formula: fmt.Sprintf("4·σ·Tm^3/(1/ε%d + 1/ε%d − 1)", 2*k+2, 2*k+3),
			Numbers: fmt.Sprintf("4·%s·%s^3/(1/%s + 1/%s − 1)", put(thermal.StefanBoltzmann), put(thermal.MeanTemperature), put(g.Emissivity[0]), put(g.Emissivity[1])),
			Value:   s.Radiative, Unit: "W/(m²·K)", Clause: "EN 673 (4)"},
		Step{Symbol: "hs", Meaning: "conductance of the gap", Formula: "hr + hg", Numbers: put(s.Radiative) + " + " + put(s.Convective), Value: s.Total, Unit: "W/(m²·K)", Clause: "EN 673 (3)"},
	)
	return c
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

// workGlass writes out the resistance of all panes.
func workGlass(r *Rating) Step {
	var parts []string
	for _, p := range r.Makeup.Panes {
		for _, y := range p.Pane.Plies {
			parts = append(parts, put(y.ThicknessMM/1000)+"/"+put(y.ConductivityWMK))
		}
	}
	return Step{Symbol: "Rg", Meaning: "resistance of the panes", Formula: "Σ d/λ", Numbers: strings.Join(parts, " + "), Value: r.Ready.glassResistance(), Unit: "m²·K/W", Clause: "EN 673 (2)"}
}

// resistance writes out 1/he + 1/hi + Rg + Σ 1/hs.
func resistance(he, hi float64, glass *Step, gaps []thermal.GapState, value float64, clause string) Step {
	s := Step{Symbol: "R", Meaning: "resistance from air to air", Formula: "1/he + 1/hi", Numbers: "1/" + put(he) + " + 1/" + put(hi), Value: value, Unit: "m²·K/W", Clause: clause}
	if glass != nil {
		s.Formula, s.Numbers = s.Formula+" + Rg", s.Numbers+" + "+put(glass.Value)
	}
	for k := range gaps {
		s.Formula, s.Numbers = s.Formula+fmt.Sprintf(" + 1/hs%d", k+1), s.Numbers+" + 1/"+put(gaps[k].Total)
	}
	return s
}

func workU(r *Rating) Chapter {
	he, hi := r.OutsideWM2K.Number, r.InsideWM2K.Number
	glass := workGlass(r)
	total := resistance(he, hi, &glass, r.Gaps, 1/r.U.Number, "EN 673 (1), (2)")
	return Chapter{Title: "U-value of the centre of the glass",
		Note: "rounded as " + r.Method.Basis.rounding + " rounds: " + PrintRounded(r.U.Number, r.Method.Basis.uPlaces) + " W/(m²·K)",
		Steps: []Step{outer(r, he, "EN 673, 7"), inner(r, r.Method.Basis.u, hi, "EN 673, 7"), glass, total,
			{Symbol: "U", Meaning: "thermal transmittance", Formula: "1/R", Numbers: "1/" + put(total.Value), Value: r.U.Number, Unit: "W/(m²·K)", Clause: "EN 673 (1)"}}}
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
	glass := workGlass(r)
	of := &glass
	if n == 1 {
		of = nil // the standards leave the glass of a single pane out
	}
	// Panes are nodes: the outermost at its outer face, the innermost at its inner face, the
	// others at mid-glass. outside is the glass between surface 1 and the node of pane k+1.
	a0, outside := put(r.absorbed[0])+"/"+put(he), 0.0
	for k := 1; k < n; k++ {
		before, after := r.Ready.glass[k-1]/2, r.Ready.glass[k]/2
		formula := fmt.Sprintf("1/(R%d/2 + 1/hs%d + R%d/2)", k, k, k+1)
		if k == 1 {
			before *= 2
			formula = strings.Replace(formula, "R1/2", "R1", 1)
		}
		if k == n-1 {
			after *= 2
			formula = strings.Replace(formula, fmt.Sprintf("R%d/2)", k+1), fmt.Sprintf("R%d)", k+1), 1)
		}
		outside += before + after
		a0 += fmt.Sprintf(" + %s·(1/%s + %s)", put(r.absorbed[k]), put(he), put(outside))
		c.Steps = append(c.Steps, Step{Symbol: fmt.Sprintf("Λ%d", k), Meaning: "conductance between two panes", Formula: formula,
			Numbers: fmt.Sprintf("1/(%s + 1/%s + %s)", put(before), put(gaps[k-1].Total), put(after)), Value: r.Heat.Conductances[k-1], Unit: "W/(m²·K)", Clause: clause})
	}
	c.Steps = append(c.Steps, Step{Symbol: "a0", Meaning: "absorbed sun times resistance outside it",
		Formula: "Σ αe·(1/he + glass outside the pane)", Numbers: a0, Value: r.Heat.A0, Unit: "m²·K/W", Clause: clause})
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
	total := resistance(he, hi, of, gaps, r.Heat.Resistance, clause)
	g := r.G.Number
	c.Steps = append(c.Steps, total,
		Step{Symbol: "qi", Meaning: "secondary heat towards the inside", Formula: "(a0 + Σ b/hs)/R", Numbers: "(" + numerator + ")/" + put(total.Value), Value: r.SecondaryHeat.Number, Clause: clause},
		Step{Symbol: "g", Meaning: "total solar energy transmittance", Formula: "τe + qi", Numbers: put(r.Solar.Transmittance.Number) + " + " + put(r.SecondaryHeat.Number), Value: g, Clause: "EN 410, 5.4.1"},
		Step{Symbol: "SC", Meaning: "shading coefficient", Formula: "g/0.87", Numbers: put(g) + "/" + put(shadingReference), Value: r.ShadingCoefficient.Number, Clause: "EN 410, 5.7"})
	if r.LightToSolarGain.Known {
		c.Steps = append(c.Steps, Step{Symbol: "τv/g", Meaning: "light to solar gain", Formula: "τv/g",
			Numbers: put(r.Light.Transmittance.Number) + "/" + put(g), Value: r.LightToSolarGain.Number, Clause: "common practice, no source"})
	}
	return c
}
