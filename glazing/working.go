package glazing

// The working: U, g and the light transmittance of a rating as a hand calculation, for explain.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/thermal"
)

// A Step is one line of a hand calculation: what is computed, by which formula, the formula with
// the numbers put in, and what comes out. Numbers can be evaluated as it stands: + − · / ^ and
// brackets, and max(a, b).
type Step struct {
	Symbol, Meaning string
	Formula         string
	Numbers         string
	Value           float64
	Unit            string
	Clause          string
}

// Printed returns the value with the six digits that outputs show.
func (s Step) Printed() string { return strconv.FormatFloat(s.Value, 'g', 6, 64) }

// A Chapter is a part of a hand calculation: steps, or the rows of a sum.
type Chapter struct {
	Title string
	Note  string // "" or a remark
	Steps []Step
	Sum   *WeightedSum
}

// WeightedSum is a weighted figure written out: Σ f W over the wavelengths of the table.
type WeightedSum struct {
	Symbol     string
	Source     string
	NM         []float64
	Value      []float64 // f
	Weight     []float64 // W
	Sum, Total float64   // Σ f W and Σ W
}

// put writes a number as it enters a formula: enough digits for six in the result.
func put(v float64) string { return strconv.FormatFloat(v, 'g', 9, 64) }

// Working returns the calculation of U, g and the light transmittance of a rating in the order
// of a hand calculation, from the intermediates that the rating keeps.
func Working(r *Rating) []Chapter {
	var out []Chapter
	out = append(out, workLight(r), workStack(r), workSolar(r))
	if r.U.Known {
		out = append(out, workHeat(r)...)
	} else {
		out = append(out, Chapter{Title: "U-value and g-value", Note: "not known: " + r.U.Why})
	}
	if n := r.Method.Basis.Name; n == ISO.Name || n == ISO15099.Name {
		toISO(out)
	}
	return out
}

// toISO names the ISO standards in the place of the EN ones, whose formulas they share.
func toISO(chapters []Chapter) {
	for _, c := range chapters {
		for i := range c.Steps {
			switch s := &c.Steps[i]; {
			case strings.HasPrefix(s.Clause, "EN 673"):
				s.Clause = "ISO 10292"
			case strings.HasPrefix(s.Clause, "EN 410, 5.2"):
				s.Clause = "ISO 9050, 3.3"
			case strings.HasPrefix(s.Clause, "EN 410, 5.3"):
				s.Clause = "ISO 9050, 3.4"
			case strings.HasPrefix(s.Clause, "EN 410"):
				s.Clause = "ISO 9050, 3.5"
			}
		}
	}
}

// workHeat writes out U and g.
func workHeat(r *Rating) []Chapter {
	var out []Chapter
	out = append(out, workEmissivity(r))
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

func workLight(r *Rating) Chapter {
	b := r.Method.bands[light]
	s := &WeightedSum{Symbol: "τv", Source: b.weighting.Source, NM: b.weighting.NM, Weight: b.weighting.Weight,
		Sum: b.Sum(r.stack.T), Total: b.Total}
	for _, nm := range s.NM {
		at, _ := slices.BinarySearch(r.Method.grid.NM, nm)
		s.Value = append(s.Value, r.stack.T[at])
	}
	c := Chapter{Title: "Light transmittance, one weighted sum written out", Sum: s}
	if !r.Light.Transmittance.Known {
		return Chapter{Title: c.Title, Note: "not known: " + r.Light.Transmittance.Why}
	}
	c.Steps = []Step{{Symbol: "τv", Meaning: "light transmittance", Formula: "Σ τ·W / Σ W",
		Numbers: put(s.Sum) + "/" + put(s.Total), Value: r.Light.Transmittance.Number, Clause: "EN 410, 5.2"}}
	return c
}

// atNM is the wavelength at which the combination of panes is written out.
const atNM = 550

func workStack(r *Rating) Chapter {
	c := Chapter{Title: fmt.Sprintf("The panes combined, at %d nm", atNM)}
	type pane struct{ t, ro, ri float64 }
	var panes []pane
	for k, p := range r.Makeup.Panes {
		tint := &p.Pane.Tints[r.Ready.States[r.State].Tints[k]].Spectrum
		x := pane{tint.Tau.At(atNM), tint.RhoFront.At(atNM), tint.RhoBack.At(atNM)}
		if p.Turned {
			x.ro, x.ri = x.ri, x.ro
		}
		panes = append(panes, x)
	}
	s := r.Ready.Spectra(r.State, []float64{atNM})
	if math.IsNaN(s.T[0]) {
		c.Note = "not known: a spectrum does not reach this wavelength"
		return c
	}
	outer := panes[0]
	if len(panes) == 1 {
		c.Steps = append(c.Steps, Step{Symbol: "τ", Formula: "τ1", Numbers: put(outer.t), Value: s.T[0], Clause: "EN 410, 5.2"})
		return c
	}
	for k, p := range panes[1:] {
		part, next := fmt.Sprintf("1…%d", k+1), strconv.Itoa(k+2)
		if k == 0 {
			part = "1"
		}
		d := 1 - outer.ri*p.ro
		whole := pane{outer.t * p.t / d, outer.ro + outer.t*outer.t*p.ro/d, p.ri + p.t*p.t*outer.ri/d}
		c.Steps = append(c.Steps,
			Step{Symbol: "D", Meaning: "multiple reflection in gap " + strconv.Itoa(k+1), Formula: "1 − ρ′" + part + "·ρ" + next,
				Numbers: "1 − " + put(outer.ri) + "·" + put(p.ro), Value: d, Clause: "EN 410, 5.2"},
			Step{Symbol: "τ1…" + next, Formula: "τ" + part + "·τ" + next + "/D",
				Numbers: put(outer.t) + "·" + put(p.t) + "/" + put(d), Value: whole.t, Clause: "EN 410, 5.2"},
			Step{Symbol: "ρ1…" + next, Formula: "ρ" + part + " + τ" + part + "^2·ρ" + next + "/D",
				Numbers: put(outer.ro) + " + " + put(outer.t) + "^2·" + put(p.ro) + "/" + put(d), Value: whole.ro, Clause: "EN 410, 5.3"},
			Step{Symbol: "ρ′1…" + next, Formula: "ρ′" + next + " + τ" + next + "^2·ρ′" + part + "/D",
				Numbers: put(p.ri) + " + " + put(p.t) + "^2·" + put(outer.ri) + "/" + put(d), Value: whole.ri, Clause: "EN 410, 5.3"})
		outer = whole
	}
	return c
}

func workSolar(r *Rating) Chapter {
	b := r.Method.bands[solar]
	c := Chapter{Title: "Solar figures, each a sum over " + strconv.Itoa(len(b.weighting.NM)) + " wavelengths", Note: b.weighting.Source}
	add := func(symbol, meaning, formula string, values []float64, v Value, clause string) {
		if !v.Known {
			return
		}
		c.Steps = append(c.Steps, Step{Symbol: symbol, Meaning: meaning, Formula: formula,
			Numbers: put(b.Sum(values)) + "/" + put(b.Total), Value: v.Number, Clause: clause})
	}
	add("τe", "solar direct transmittance", "Σ τ·S / Σ S", r.stack.T, r.Solar.Transmittance, "EN 410, 5.4.3")
	add("ρe", "solar direct reflectance, outside", "Σ ρ·S / Σ S", r.stack.Ro, r.Solar.ReflectanceOutside, "EN 410, 5.4.4")
	for k, a := range r.Absorptance {
		add(fmt.Sprintf("αe%d", k+1), "absorptance of pane "+strconv.Itoa(k+1), "Σ α·S / Σ S", r.stack.A[k], a, "EN 410, 5.4.5")
	}
	return c
}

func workEmissivity(r *Rating) Chapter {
	c := Chapter{Title: "Corrected emissivities"}
	for i, e := range r.Surfaces {
		if !e.Corrected.Known {
			continue
		}
		s := Step{Symbol: fmt.Sprintf("ε%d", i+1), Meaning: r.Makeup.faceName(i/2, i%2 == 1), Value: e.Corrected.Number, Clause: "EN 12898"}
		if e.Normal.Known {
			s.Formula = "(ratio of the table)·εn, εn from infrared rows"
			if e.Source == EmissivityGivenNormal {
				s.Formula = "(ratio of the table)·εn, εn typed by the user"
			}
			s.Numbers = put(e.Corrected.Number/e.Normal.Number) + "·" + put(e.Normal.Number)
		} else {
			s.Formula, s.Numbers = "typed by the user", put(e.Corrected.Number)
		}
		c.Steps = append(c.Steps, s)
	}
	return c
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
		c.Note = "not known: " + r.G.Why
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
