package proof

// Checks of the detailed heat balance, and of what follows from its temperatures: moisture, comfort,
// stress.

import (
	"math"

	"panewright/glazing"
	"panewright/thermal"
)

// gasProperty is a property of a gas filling by ISO 15099.
func gasProperty(in *inputs) (float64, error) {
	mixture, temperature := in.gas("gas"), in.kelvin("temperature_c")
	f, err := mixture.Fluid()
	if err != nil {
		return 0, err
	}
	p := f.At(temperature)
	switch name := in.text("property"); name {
	case "conductivity_w_mk":
		return p.ConductivityWMK, nil
	case "viscosity_pa_s":
		return p.ViscosityPaS, nil
	case "heat_capacity_j_kgk":
		return p.HeatCapacityJKGK, nil
	case "density_kg_m3":
		return p.DensityKGM3, nil
	default:
		in.fail("input property: there is no %q", name)
		return 0, nil
	}
}

// gasDeviation is by how many per cent the same lies above a reference value.
func gasDeviation(in *inputs) (float64, error) {
	v, err := gasProperty(in)
	return 100 * (v/in.number("reference") - 1), err
}

// kelvin reads a temperature in °C.
func (in *inputs) kelvin(name string) float64 { return in.number(name) + thermal.ZeroCelsius }

func nusseltCavity(in *inputs) (float64, error) {
	return thermal.CavityNusselt(in.number("rayleigh"), in.number("aspect"), in.number("angle_deg")), nil
}

func nusseltRoom(in *inputs) (float64, error) {
	return thermal.RoomNusselt(in.number("rayleigh"), in.number("angle_deg")), nil
}

// pillars reads an array of pillars.
func pillars(in *inputs) *thermal.Vacuum {
	v := &thermal.Vacuum{PillarRadiusM: in.number("pillar_radius_mm") / mmPerM, PillarPitchM: in.number("pillar_pitch_mm") / mmPerM,
		PillarWMK: in.number("pillar_w_mk"), PillarHeightM: in.number("pillar_height_mm") / mmPerM}
	if glass := in.numbers("glass_w_mk"); len(glass) == 2 {
		v.GlassWMK = [2]float64(glass)
	} else {
		in.fail("input glass_w_mk: there are two panes")
	}
	return v
}

const mmPerM = 1000

func pillarConductance(in *inputs) (float64, error) { return pillars(in).PillarConductance(), nil }

func residualGasConductance(in *inputs) (float64, error) {
	v := thermal.Vacuum{PressurePa: in.number("pressure_pa")}
	return v.GasConductance(), nil
}

// vacuumU is U of two panes with an evacuated gap, as a rating has it: pillars, residual gas and
// radiation as a series with the rest.
func vacuumU(in *inputs) (float64, error) {
	panes, faces := in.numbers("panes_mm"), in.numbers("emissivity")
	if len(panes) != 2 || len(faces) != 4 {
		in.fail("%d panes with %d emissivities; there are two panes, with two faces each", len(panes), len(faces))
		return 0, nil
	}
	m := &glazing.Makeup{ID: "check"}
	for k, mm := range panes {
		m.Panes = append(m.Panes, glazing.Placed{Pane: grey(mm, anyTau, anyRho, faces[2*k], faces[2*k+1])})
	}
	v := &glazing.Vacuum{PressurePa: in.number("pressure_pa"), PillarRadiusMM: in.number("pillar_radius_mm"), PillarPitchMM: in.number("pillar_pitch_mm")}
	if conductivity := in.number("pillar_w_mk"); conductivity > 0 {
		v.PillarWMK = glazing.Value{Number: conductivity, Known: true}
	}
	m.Gaps = []glazing.Gap{{WidthMM: in.number("pillar_height_mm"), Vacuum: v}}
	r, err := rate(in, m)
	if err != nil {
		return 0, err
	}
	return figure(r, "u_w_m2k")
}

// Sheets, gaps and surfaces of the closed forms, which know neither glass nor pillars nor air.
const (
	noResistance = 1e-9 // m²·K/W
	noConvection = 1e-9 // W/(m²·K)
	noEmissivity = 1e-9
	noPillarM    = 1e-9
	anyWidthM    = 0.01
	anyHeightM   = 1
	upright      = 90 // degrees
)

// conducting is a gap that conducts so much, in W/(m²·K), whatever its temperatures.
func conducting(conductance float64) thermal.Cavity {
	return thermal.Cavity{WidthM: anyWidthM, Vacuum: &thermal.Vacuum{PressurePa: conductance / thermal.ResidualGas,
		PillarRadiusM: noPillarM, PillarPitchM: 1, GlassWMK: [2]float64{1, 1}}}
}

// thin is a sheet without resistance, from the emissivities of its faces and its infrared transmittance.
func thin(outer, inner, transmittance float64) thermal.Sheet {
	return thermal.Sheet{Plies: []thermal.Layer{{ResistanceM2KW: noResistance, Share: 1}},
		Emissivity: [2]float64{outer, inner}, Transmittance: transmittance}
}

// balanced is the steady state of sheets with equal cavities.
func balanced(sheets []thermal.Sheet, cavity thermal.Cavity, at thermal.Surroundings, absorbedWM2 []float64) (*thermal.Balance, error) {
	cavities := make([]thermal.Cavity, len(sheets)-1)
	for i := range cavities {
		cavities[i] = cavity
	}
	s, err := thermal.NewSystem(sheets, cavities)
	if err != nil {
		return nil, err
	}
	b := new(thermal.Balance)
	return b, s.Solve(b, at, absorbedWM2)
}

// radiativeConductance is that between two sheets a little warmer and a little colder than a
// temperature.
func radiativeConductance(in *inputs) (float64, error) {
	const apartK, strong = 0.5, 1000 // between the airs and the mean; W/(m²·K)
	t, faces := in.kelvin("temperature_c"), in.numbers("emissivity")
	if len(faces) != 2 {
		in.fail("input emissivity: there are two faces")
		return 0, nil
	}
	b, err := balanced([]thermal.Sheet{thin(noEmissivity, faces[0], 0), thin(faces[1], noEmissivity, 0)}, conducting(0), thermal.Surroundings{
		OutsideK: t - apartK, OutsideRadiantK: t - apartK, InsideK: t + apartK, InsideRadiantK: t + apartK,
		OutsideConvection: strong, InsideConvection: strong, TiltDeg: upright, HeightM: anyHeightM}, make([]float64, 2))
	if err != nil {
		return 0, err
	}
	return b.Gaps[0].RadiatedWM2 / (b.SurfaceK[1] - b.SurfaceK[2]), nil
}

// infraredFilms is the radiation that passes equal films between black surfaces in steady state, as a
// part of what would pass without them.
func infraredFilms(in *inputs) (float64, error) {
	const cold, warm = 273.15, 313.15 // K
	film := thin(in.number("emissivity"), in.number("emissivity"), in.number("transmittance"))
	sheets := make([]thermal.Sheet, int(in.number("films")))
	for i := range sheets {
		sheets[i] = film
	}
	if len(sheets) == 0 {
		in.fail("input films: there is one at least")
		return 0, nil
	}
	b, err := balanced(sheets, conducting(0), thermal.Surroundings{OutsideK: cold, OutsideRadiantK: cold, InsideK: warm, InsideRadiantK: warm,
		OutsideConvection: noConvection, InsideConvection: noConvection, TiltDeg: upright, HeightM: anyHeightM}, make([]float64, len(sheets)))
	if err != nil {
		return 0, err
	}
	return b.InwardWM2() / (thermal.StefanBoltzmann4 * (math.Pow(cold, 4) - math.Pow(warm, 4))), nil
}

// paneTemperature is that of a pane of a double in the sun, in °C, where every coefficient is given and
// the glass has no resistance.
func paneTemperature(in *inputs) (float64, error) {
	outside, inside, sun := in.kelvin("outside_c"), in.kelvin("inside_c"), in.number("sun_w_m2")
	bare := thin(noEmissivity, noEmissivity, 0)
	b, err := balanced([]thermal.Sheet{bare, bare}, conducting(in.number("lambda_w_m2k")), thermal.Surroundings{
		OutsideK: outside, OutsideRadiantK: outside, InsideK: inside, InsideRadiantK: inside,
		OutsideConvection: in.number("he_w_m2k"), InsideConvection: in.number("hi_w_m2k"), TiltDeg: upright, HeightM: anyHeightM},
		[]float64{sun * in.number("alpha_e1"), sun * in.number("alpha_e2")})
	if err != nil {
		return 0, err
	}
	switch pane := in.number("pane"); pane {
	case 1, 2:
		return b.SurfaceK[2*int(pane)-1] - thermal.ZeroCelsius, nil
	default:
		in.fail("input pane: %g is neither 1 nor 2", pane)
		return 0, nil
	}
}

func saturationPressure(in *inputs) (float64, error) {
	return thermal.SaturationPressure(in.kelvin("temperature_c")), nil
}

func dewPoint(in *inputs) (float64, error) {
	t, _, err := thermal.DewPoint(in.kelvin("air_c"), in.number("humidity"))
	return t - thermal.ZeroCelsius, err
}

func temperatureFactor(in *inputs) (float64, error) {
	return thermal.TemperatureFactorOfU(in.number("u_w_m2k"), in.number("rsi_m2k_w")), nil
}

// insideSurface is the temperature in °C of the room-side face of a glazing of a U. Its temperature
// factor by temperatures must be that by U again.
func insideSurface(in *inputs) (float64, error) {
	f, err := temperatureFactor(in)
	outside, inside := in.kelvin("outside_c"), in.kelvin("inside_c")
	t := thermal.FactorTemperature(f, outside, inside)
	if back := thermal.TemperatureFactor(t, outside, inside); math.Abs(back-f) > sameUnder {
		in.fail("temperature factor %.15g of U is %.15g by temperatures", f, back)
	}
	return t - thermal.ZeroCelsius, err
}

// condensingHumidity is the humidity of the room in per cent at which the same face begins to condense.
func condensingHumidity(in *inputs) (float64, error) {
	t, err := insideSurface(in)
	return 100 * thermal.CondensingHumidity(t+thermal.ZeroCelsius, in.kelvin("inside_c")), err
}

func clearSky(in *inputs) (float64, error) {
	return thermal.ClearSky(in.kelvin("air_c")) - thermal.ZeroCelsius, nil
}

func asymmetryDissatisfied(in *inputs) (float64, error) {
	percent, _ := thermal.AsymmetryDissatisfied(choice(in, "source", map[string]thermal.RadiantSource{"cool wall": thermal.CoolWall,
		"warm wall": thermal.WarmWall, "cool ceiling": thermal.CoolCeiling, "warm ceiling": thermal.WarmCeiling}), in.number("asymmetry_k"))
	return percent, nil
}

// choice reads an input that has one of a few values.
func choice[T any](in *inputs, name string, values map[string]T) T {
	v, ok := values[in.text(name)]
	if !ok {
		in.fail("input %s: there is no %q", name, in.text(name))
	}
	return v
}

func draughtRating(in *inputs) (float64, error) {
	percent, _ := thermal.DraughtRating(in.kelvin("air_c"), in.number("velocity_m_s"), in.number("turbulence_percent"))
	return percent, nil
}

func downdraught(in *inputs) (float64, error) {
	author := choice(in, "author", map[string]thermal.Downdraught{"heiselberg": thermal.Heiselberg, "manz-frank": thermal.ManzFrank})
	return author.Velocity(in.number("height_m"), in.number("drop_k"), in.number("distance_m")), nil
}

func floorCooling(in *inputs) (float64, error) {
	return thermal.FloorCooling(in.number("drop_k"), in.number("distance_m")), nil
}

func rectangleViewFactor(in *inputs) (float64, error) {
	return thermal.RectangleViewFactor(in.number("width_m"), in.number("height_m"), in.number("distance_m")), nil
}

func radiantAsymmetry(in *inputs) (float64, error) {
	f, err := rectangleViewFactor(in)
	return thermal.RadiantAsymmetry(f, in.kelvin("glass_c"), in.kelvin("rest_c")), err
}

// sunOnPerson is the effective radiant field or the rise of the mean radiant temperature.
func sunOnPerson(in *inputs) (float64, error) {
	l, err := thermal.SunOnPerson{
		AltitudeDeg: in.number("altitude_deg"), FromFrontDeg: in.number("from_front_deg"), BeamWM2: in.number("beam_w_m2"),
		Transmittance: in.number("tau_e"), SkyShare: in.number("sky_share"), BodyShare: in.number("body_share"),
		Absorptivity: in.number("absorptivity"), FloorReflectance: in.number("floor_reflectance"),
		Standing: choice(in, "posture", map[string]bool{"seated": false, "standing": true}),
	}.Load()
	return choice(in, "figure", map[string]float64{"field": l.EffectiveRadiantFieldWM2, "rise": l.RadiantRiseK}), err
}

func thermalStress(in *inputs) (float64, error) {
	return thermal.ThermalStressMPa(in.number("k"), in.number("drop_k")), nil
}

func stressGuide(in *inputs) (float64, error) {
	return thermal.StressGuideK(in.text("treatment")), nil
}
