// Package proof runs the published check values of reference/checks through the calculations
// that every rating uses and sets the computed figure beside the expected one. panewright verify
// prints the outcomes; the test of this package fails on each that is missed.
//
//	for _, g := range proof.Run(checks.Groups()) {
//		fmt.Println(g.Title, len(g.Outcomes))
//	}
//
// A check names its kind; the table of kinds says which function computes it. A further figure
// of a known kind is one more row in reference/checks/tables, a new kind one more row here. A
// kind must use every input of its check, so that no input is taken for granted and ignored.
package proof

import (
	"fmt"
	"math"

	"panewright/reference/checks"
)

// A Result is what became of a check.
type Result string

// The results.
const (
	Met    Result = "met"    // the figures agree within the tolerance
	Known  Result = "known"  // they differ, and by what the check says that they are known to
	Missed Result = "missed" // they differ, or nothing could be computed
)

// Results returns all results, in the order in which they are counted.
func Results() []Result { return []Result{Met, Known, Missed} }

// An Outcome is a check with what the program makes of it.
type Outcome struct {
	checks.Check
	Got       float64
	Deviation float64 // Got − Want, in the check's unit
	Result    Result
	Err       error // why nothing could be computed; then Result is Missed, and Got means nothing
}

// A Group is the outcomes of the checks of one file, in their order.
type Group struct {
	checks.Group
	Outcomes []Outcome
}

// Run evaluates the checks of groups.
func Run(groups []checks.Group) []Group {
	list := make([]Group, len(groups))
	var m memo
	for i, g := range groups {
		list[i] = Group{Group: g, Outcomes: make([]Outcome, len(g.Checks))}
		for k, c := range g.Checks {
			list[i].Outcomes[k] = m.evaluate(c)
		}
	}
	return list
}

// A Source is a publication as a group names it, with the standing of its figures.
type Source struct {
	Text, Standing string
	Checks         int
}

// Sources returns those of the group, each once with each standing, in the order of the checks.
func (g Group) Sources() []Source {
	var list []Source
	at := map[[2]string]int{}
	for _, o := range g.Outcomes {
		key := [2]string{o.Source, o.Standing}
		i, ok := at[key]
		if !ok {
			i = len(list)
			at[key], list = i, append(list, Source{Text: o.Source, Standing: o.Standing})
		}
		list[i].Checks++
	}
	return list
}

// Count returns how many outcomes of groups have a standing and a result; a blank one stands for
// any.
func Count(groups []Group, standing string, result Result) int {
	n := 0
	for _, g := range groups {
		for _, o := range g.Outcomes {
			if (standing == "" || o.Standing == standing) && (result == "" || o.Result == result) {
				n++
			}
		}
	}
	return n
}

// A kind computes the figure of a check from its inputs.
type kind struct {
	name  string
	value func(*inputs) (float64, error)
}

// kinds returns the table of kinds.
func kinds() []kind {
	return []kind{
		{"makeup", makeupFigure},
		{"u", uValue},
		{"u_rounded", uRounded},
		{"u_nusselt_between", uNusseltBetween},
		{"u_sensitivity", uSensitivity},
		{"grey_pane", greyPane},
		{"qi_double", qiDouble},
		{"g_double", gDouble},
		{"emissivity_ratio", emissivityRatio},
		{"emissivity_corrected", emissivityCorrected},
		{"glass_emissivity", glassEmissivity},
		{"glass_emissivity_hemispherical", glassHemispherical},
		{"slab", slabShare},
		{"slab_hemispherical", slabHemispherical},
		{"slab_pair", slabPair},
		{"glass", glassFigure},
		{"mass", mass},
		{"damage_weight", damageWeight},
		{"erythema_weight", erythemaWeight},
		{"white_chromaticity", whiteChromaticity},
		{"daylight_chromaticity", daylightChromaticity},
		{"lab", labOf},
		{"lamp_rendering", lampRendering},
		{"lamp_temperature", lampTemperature},
		{"lamp_chromaticity", lampChromaticity},
		{"colour_difference", colourDifference},
		{"gas_property", gasProperty},
		{"gas_deviation", gasDeviation},
		{"nusselt_cavity", nusseltCavity},
		{"nusselt_room", nusseltRoom},
		{"radiative_conductance", radiativeConductance},
		{"infrared_films", infraredFilms},
		{"pane_temperature", paneTemperature},
		{"pillar_conductance", pillarConductance},
		{"residual_gas_conductance", residualGasConductance},
		{"vacuum_u", vacuumU},
		{"saturation_pressure", saturationPressure},
		{"dew_point", dewPoint},
		{"temperature_factor", temperatureFactor},
		{"inside_surface", insideSurface},
		{"condensing_humidity", condensingHumidity},
		{"clear_sky", clearSky},
		{"asymmetry_dissatisfied", asymmetryDissatisfied},
		{"draught_rating", draughtRating},
		{"downdraught", downdraught},
		{"floor_cooling", floorCooling},
		{"view_factor", rectangleViewFactor},
		{"radiant_asymmetry", radiantAsymmetry},
		{"sun_on_person", sunOnPerson},
		{"thermal_stress", thermalStress},
		{"stress_guide", stressGuide},
		{"carriers", carrierFigure},
		{"drude_fit", drudeFit},
		{"burstein_moss", bursteinMoss},
		{"tauc_lorentz", taucLorentz},
		{"thin_sheet_emissivity", thinSheetEmissivity},
		{"linear_emissivity", linearEmissivity},
		{"hagen_rubens", hagenRubens},
		{"haacke", haacke},
		{"gordon", gordon},
		{"radio_attenuation", radioAttenuation},
		{"element_fraction", elementFraction},
		{"metal_mass", metalMass},
		{"metal_film", metalFilm},
		{"fuchs_sondheimer", fuchsSondheimer},
		{"thin_damping", thinDamping},
		{"graphene", grapheneTransmittance},
		{"stack_share", stackShare},
		{"film_emissivity", filmEmissivity},
	}
}

// evaluate computes one check.
func (m *memo) evaluate(c checks.Check) Outcome {
	out := Outcome{Check: c, Result: Missed}
	out.Got, out.Err = m.compute(c)
	if out.Err != nil {
		out.Err = fmt.Errorf("check %s: %w", c.ID, out.Err)
		return out
	}
	out.Deviation = out.Got - c.Want
	switch d := out.Deviation; {
	case math.Abs(d) <= c.Tolerance: // false for NaN
		out.Result = Met
	case c.Known.Why != "" && d >= c.Known.From && d <= c.Known.To:
		out.Result = Known
	}
	return out
}

func (m *memo) compute(c checks.Check) (float64, error) {
	for _, k := range kinds() {
		if k.name != c.Kind {
			continue
		}
		in := &inputs{values: c.Inputs, used: map[string]bool{}, memo: m}
		got, err := k.value(in)
		if in.err != nil { // comes first: a figure made from a misread input means nothing
			return 0, in.err
		}
		if err != nil {
			return 0, err
		}
		return got, in.unused()
	}
	return 0, fmt.Errorf("unknown kind %q", c.Kind)
}
