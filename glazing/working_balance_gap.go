package glazing

// The working of gaps in detailed balances: convection by angle, radiation, pillars and residual gas.

import (
	"fmt"
	"math"

	"panewright/thermal"
)

// Where the correlations of gaps change (ISO 15099:2003, 5.3.3, from memory), as package thermal has it.
const (
	gapTiltedDeg  = 60.0
	gapFirstStep  = 1e4
	gapSecondStep = 5e4
)

const (
	clauseGap       = "ISO 15099, 5.3.3"
	clauseRadiation = "ISO 15099, 5.3.2"
	unitCoefficient = "W/(m²·K)"
)

// gap writes out gap k, from 0, in two chapters, gas and heat; a vacuum has but the second.
func (w *balanceWork) gap(k int) []Chapter {
	g, e := &w.r.Makeup.Gaps[k], &w.state.Gaps[k]
	outer, inner := w.face(2*k+1), w.face(2*k+2)
	heat := w.chapter(fmt.Sprintf("gap %d, heat: %.6g mm, surfaces %d and %d", k+1, g.WidthMM, 2*k+2, 2*k+3))
	var out []Chapter
	if g.Vacuum != nil {
		heat.vacuum(w.r.Makeup.vacuum(k))
	} else {
		gas := w.chapter(fmt.Sprintf("gap %d, gas: %s", k+1, g.Content()))
		gas.step("Tm", "mean temperature of the gap", fmt.Sprintf("(%s + %s)/2", outer.symbol, inner.symbol), "("+put(outer.k)+" + "+put(inner.k)+")/2", e.MeanK, "K", clauseGap)
		gas.gas(g.Gas, e.MeanK, e.Gas)
		out = append(out, gas)
		w.convection(&heat, e, outer, inner, g.WidthMM/1000)
	}
	heat.flux("qc", "by the gap", "hg", e.Convective, e.ConvectedWM2, outer, inner, clauseGap)
	w.radiated(&heat, "hr", e, outer, inner, 2*k+1, 2*k+2)
	if !math.IsNaN(e.Radiative) {
		heat.step("hs", "conductance of the gap", "hg + hr", put(e.Convective)+" + "+put(e.Radiative), e.Total(), unitCoefficient, clauseGap)
	}
	return append(out, heat)
}

// flux writes out a flux of a coefficient between two temperatures.
func (c *Chapter) flux(symbol, meaning, h string, coefficient, value float64, outer, inner end, clause string) {
	formula, numbers := differs(outer, inner)
	c.step(symbol, "heat towards the inside, "+meaning, h+"·("+formula+")", put(coefficient)+"·("+numbers+")", value, "W/m²", clause)
}

// radiated writes out the radiation between two ends, of which the given surfaces, from 0, are one or
// both; hr names its coefficient.
func (w *balanceWork) radiated(c *Chapter, hr string, e *thermal.Exchange, outer, inner end, surfaces ...int) {
	if math.IsNaN(e.Radiative) { // a sheet beside it passes infrared
		formula := fmt.Sprintf("J%d − H%d of the table above", surfaces[0]+1, surfaces[0]+1)
		if surfaces[0] == 0 {
			formula = "H1 − J1 of the table above"
		}
		c.step("qr", "heat towards the inside, by radiation", formula, put(e.RadiatedWM2), e.RadiatedWM2, "W/m²", clauseRadiation)
		return
	}
	symbol := func(i int) string { return w.r.emissivitySymbol(surfaces[i]) }
	value := func(i int) string { return put(w.r.Surfaces[surfaces[i]].Balanced().Number) }
	formula := fmt.Sprintf("σ·(%s^2 + %s^2)·(%s + %s)", outer.symbol, inner.symbol, outer.symbol, inner.symbol)
	numbers := fmt.Sprintf("%s·(%s^2 + %s^2)·(%s + %s)", put(thermal.StefanBoltzmann4), put(outer.k), put(inner.k), put(outer.k), put(inner.k))
	if len(surfaces) == 1 {
		formula, numbers = symbol(0)+"·"+formula, value(0)+"·"+numbers
	} else {
		formula, numbers = formula+fmt.Sprintf(" / (1/%s + 1/%s − 1)", symbol(0), symbol(1)), numbers+fmt.Sprintf(" / (1/%s + 1/%s − 1)", value(0), value(1))
	}
	c.step(hr, "radiative coefficient", formula, numbers, e.Radiative, unitCoefficient, clauseRadiation)
	c.flux("qr", "by radiation", hr, e.Radiative, e.RadiatedWM2, outer, inner, clauseRadiation)
}

// convection writes out Ra, Nu and hg of a gap with gas.
func (w *balanceWork) convection(c *Chapter, e *thermal.Exchange, outer, inner end, widthM float64) {
	at := &w.state.Surroundings
	c.angle(clauseGap, at.TiltDeg, outer.k > inner.k, "the outer face is the warmer", "the inner face is the warmer")
	aspect := at.HeightM / widthM
	c.step("H/s", "height to width", "H/s", put(at.HeightM)+"/"+put(widthM), aspect, "", clauseGap)
	c.rayleigh(e, outer, inner, "s", widthM, clauseGap)
	c.nusselt(e, aspect)
	c.step("hg", "coefficient of the gas", "Nu·λ/s", put(e.Nusselt)+"·"+put(e.Gas.ConductivityWMK)+"/"+put(widthM), e.Convective, unitCoefficient, clauseGap)
}

// angle writes out γ: the tilt, or what it lacks of 180° where heat turns the other way.
func (c *Chapter) angle(clause string, tiltDeg float64, turned bool, whyTurned, whyNot string) {
	step := Step{Symbol: "γ", Meaning: "angle, below 90 heated from below", Formula: "tilt, for " + whyNot, Numbers: put(tiltDeg), Value: tiltDeg, Unit: "°", Clause: clause}
	switch {
	case tiltDeg == uprightDeg:
		step.Formula = "tilt"
	case turned:
		step.Formula, step.Numbers, step.Value = "180 − tilt, for "+whyTurned, "180 − "+put(tiltDeg), 180-tiltDeg
	}
	c.Steps = append(c.Steps, step)
}

// rayleigh writes out ΔT and Ra over a length, such as the width of a gap.
func (c *Chapter) rayleigh(e *thermal.Exchange, outer, inner end, length string, lengthM float64, clause string) {
	if outer.k < inner.k {
		outer, inner = inner, outer
	}
	formula, numbers := differs(outer, inner)
	c.step("ΔT", "temperature difference", formula, numbers, e.DropK, "K", clause)
	p := &e.Gas
	c.step("Ra", "Rayleigh number", "ρ^2·"+length+"^3·g·cp·ΔT / (Tm·µ·λ)",
		fmt.Sprintf("%s^2·%s^3·%s·%s·%s / (%s·%s·%s)", put(p.DensityKGM3), put(lengthM), put(thermal.Gravity), put(p.HeatCapacityJKGK), put(e.DropK),
			put(e.MeanK), put(p.ViscosityPaS), put(p.ConductivityWMK)), e.Rayleigh, "", "ISO 15099 (38)")
}

// nusselt writes out Nu of a gap by the correlation of its angle. Aspect is its height to its width.
func (c *Chapter) nusselt(e *thermal.Exchange, aspect float64) {
	ra, deg := e.Rayleigh, e.AngleDeg
	const meaning = "Nusselt number"
	switch {
	case ra <= 0:
		c.step("Nu", meaning, "1, as both faces are equally warm", "1", e.Nusselt, "", clauseGap)
	case deg < gapTiltedDeg:
		rc := ra * math.Cos(deg*math.Pi/180)
		c.step("Rac", "Ra·cos γ", "Ra·cos(γ)", put(ra)+"·cos("+put(deg)+")", rc, "", clauseGap)
		c.step("Nu", meaning+", below 60°", "1 + 1.44·max(0, 1 − 1708/Rac)·(1 − 1708·sin(1.8·γ)^1.6/Rac) + max(0, (Rac/5830)^(1/3) − 1)",
			fmt.Sprintf("1 + 1.44·max(0, 1 − 1708/%s)·(1 − 1708·sin(1.8·%s)^1.6/%s) + max(0, (%s/5830)^(1/3) − 1)", put(rc), put(deg), put(rc), put(rc)), e.Nusselt, "", "ISO 15099 (42)")
	case deg == gapTiltedDeg:
		c.nusseltTilted("Nu", ra, aspect, e.Nusselt)
	case deg < uprightDeg:
		tilted := thermal.CavityNusselt(ra, aspect, gapTiltedDeg)
		share := (deg - gapTiltedDeg) / (uprightDeg - gapTiltedDeg)
		c.nusseltTilted("Nu60", ra, aspect, tilted)
		upright := c.nusseltUpright("Nu90", e, aspect, func(nu float64) float64 { return (nu - float64((1-share)*tilted)) / share })
		c.step("Nu", meaning+", between 60 and 90°", "Nu60 + (Nu90 − Nu60)·(γ − 60)/30",
			fmt.Sprintf("%s + (%s)·(%s − 60)/30", put(tilted), minus(upright, tilted), put(deg)), e.Nusselt, "", clauseGap)
	case deg == uprightDeg:
		c.nusseltUpright("Nu", e, aspect, func(nu float64) float64 { return nu })
	default:
		sine := math.Sin(deg * math.Pi / 180)
		upright := c.nusseltUpright("Nu90", e, aspect, func(nu float64) float64 { return 1 + (nu-1)/sine })
		c.step("Nu", meaning+", heated from above", "1 + (Nu90 − 1)·sin(γ)", "1 + ("+put(upright)+" − 1)·sin("+put(deg)+")", e.Nusselt, "", "ISO 15099 (52)")
	}
}

// nusseltTilted writes out the correlation of 60°.
func (c *Chapter) nusseltTilted(symbol string, ra, aspect, value float64) {
	grown := math.Pow(ra/3160, 20.6)
	g := 0.5 / math.Pow(1+grown, 0.1)
	one := math.Pow(1+math.Pow(0.0936*math.Pow(ra, 0.314)/(1+g), 7), 1.0/7)
	two := (0.104 + 0.175/aspect) * math.Pow(ra, 0.283)
	c.step("G", "of the correlation of 60°", "0.5/(1 + (Ra/3160)^20.6)^0.1", "0.5/(1 + ("+put(ra)+"/3160)^20.6)^0.1", g, "", "ISO 15099 (47)")
	c.step("Nu1", "first branch, at 60°", "(1 + (0.0936·Ra^0.314/(1 + G))^7)^(1/7)", "(1 + (0.0936·"+put(ra)+"^0.314/(1 + "+put(g)+"))^7)^(1/7)", one, "", "ISO 15099 (45)")
	c.step("Nu2", "second branch, at 60°", "(0.104 + 0.175/(H/s))·Ra^0.283", "(0.104 + 0.175/"+put(aspect)+")·"+put(ra)+"^0.283", two, "", "ISO 15099 (46)")
	c.step(symbol, "Nusselt number, at 60°", "max(Nu1, Nu2)", "max("+put(one)+", "+put(two)+")", value, "", "ISO 15099 (44)")
}

// nusseltUpright writes out the correlation of upright gaps and returns its Nu. Where that was held on
// the second step of the correlation it is found back from the Nu of the gap.
func (c *Chapter) nusseltUpright(symbol string, e *thermal.Exchange, aspect float64, back func(nu float64) float64) float64 {
	ra, n := e.Rayleigh, put(e.Rayleigh)
	const first, second, last = "1 + 1.7596678e-10·Ra^2.2984755", "0.028154·Ra^0.4134", "0.0673838·Ra^(1/3)"
	if heldOnStep(e, aspect) {
		c.remark("Ra lies on the step of the upright correlation at 50000: neither value of Nu there has temperatures that close the balance, one between them has. It was held so.")
		c.step("Nu−", "just below the step", second, "0.028154·50000^0.4134", 0.028154*math.Pow(gapSecondStep, 0.4134), "", "ISO 15099 (49)")
		c.step("Nu+", "just above the step", last, "0.0673838·50000^(1/3)", 0.0673838*math.Cbrt(gapSecondStep), "", "ISO 15099 (48)")
		nu := back(e.Nusselt)
		c.step(symbol, "Nusselt number, upright", "between Nu− and Nu+, so that the balance closes", put(nu), nu, "", clauseGap)
		return nu
	}
	one := Step{Symbol: "Nu1", Meaning: "first branch, Ra up to 10000", Formula: first, Numbers: "1 + 1.7596678e-10·" + n + "^2.2984755", Clause: "ISO 15099 (50)",
		Value: 1 + 1.7596678e-10*math.Pow(ra, 2.2984755)}
	switch {
	case ra > gapSecondStep:
		one.Meaning, one.Formula, one.Numbers, one.Clause = "first branch, Ra above 50000", last, "0.0673838·"+n+"^(1/3)", "ISO 15099 (48)"
		one.Value = 0.0673838 * math.Cbrt(ra)
	case ra > gapFirstStep:
		one.Meaning, one.Formula, one.Numbers, one.Clause = "first branch, Ra of 10000 to 50000", second, "0.028154·"+n+"^0.4134", "ISO 15099 (49)"
		one.Value = 0.028154 * math.Pow(ra, 0.4134)
	}
	two := 0.242 * math.Pow(ra/aspect, 0.272)
	nu := thermal.CavityNusselt(ra, aspect, uprightDeg)
	c.Steps = append(c.Steps, one)
	c.step("Nu2", "second branch, upright", "0.242·(Ra/(H/s))^0.272", "0.242·("+n+"/"+put(aspect)+")^0.272", two, "", "ISO 15099 (51)")
	c.step(symbol, "Nusselt number, upright", "max(Nu1, Nu2)", "max("+put(one.Value)+", "+put(two)+")", nu, "", clauseGap)
	return nu
}

// heldOnStep reports whether the solver held Nu of a gap between the two values that the upright
// correlation has at its second step.
func heldOnStep(e *thermal.Exchange, aspect float64) bool {
	const onStep, rounding = 1e-6, 1e-12
	return math.Abs(e.Rayleigh/gapSecondStep-1) < onStep &&
		math.Abs(thermal.CavityNusselt(e.Rayleigh, aspect, e.AngleDeg)/e.Nusselt-1) > rounding
}

// vacuum writes out the conductance of pillars and residual gas.
func (c *Chapter) vacuum(v thermal.Vacuum) {
	const clause = "Collins and Simko 1998"
	formula := "1/(1/(4·λ1·a) + 1/(4·λ2·a)"
	numbers := fmt.Sprintf("1/(1/(4·%s·%s) + 1/(4·%s·%s)", put(v.GlassWMK[0]), put(v.PillarRadiusM), put(v.GlassWMK[1]), put(v.PillarRadiusM))
	if v.PillarWMK > 0 {
		formula += " + s/(λp·π·a^2)"
		numbers += fmt.Sprintf(" + %s/(%s·%s·%s^2)", put(v.PillarHeightM), put(v.PillarWMK), put(math.Pi), put(v.PillarRadiusM))
		c.remark("Pillars of radius a, on a square of side p, in series with the heat that narrows towards them in the glass on both sides.")
	} else {
		c.remark("Pillars of radius a, on a square of side p: the heat narrows towards them in the glass on both sides; their own resistance is left out, for no pillar_conductivity_w_mk is given.")
	}
	pillars, gas := v.PillarConductance(), v.GasConductance()
	c.step("hp", "of the pillars", formula+")/p^2", numbers+")/"+put(v.PillarPitchM)+"^2", pillars, unitCoefficient, clause)
	c.step("hv", "of the residual gas, effective accommodation", "0.8·P, P in Pa", put(thermal.ResidualGas)+"·"+put(v.PressurePa), gas, unitCoefficient, clause)
	c.step("hg", "of pillars and gas", "hp + hv", put(pillars)+" + "+put(gas), v.Conductance(), unitCoefficient, clause)
}
