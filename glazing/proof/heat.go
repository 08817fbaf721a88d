package proof

// Checks of U, of secondary heat and g, of emissivities and of weights.

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/spectra"
	"panewright/thermal"
)

// flat is a quantity that is the same at every wavelength of the sun.
func flat(v float64) spectra.Curve {
	return spectra.Curve{NM: []float64{spectra.SolarFirstNM, spectra.SolarLastNM}, Value: []float64{v, v}}
}

// grey returns a pane whose spectrum is the same at every wavelength.
func grey(thicknessMM, tau, rho, front, back float64) *glazing.Pane {
	return &glazing.Pane{
		ID:    "grey",
		Plies: sheet(thicknessMM),
		Tints: []glazing.Tint{{
			Spectrum: spectra.Measured{Tau: flat(tau), RhoFront: flat(rho), RhoBack: flat(rho)},
			Front:    glazing.GivenEmissivity(front), Back: glazing.GivenEmissivity(back),
		}},
	}
}

// sheet is one ply of soda-lime glass.
func sheet(thicknessMM float64) []glazing.Ply {
	return []glazing.Ply{{ThicknessMM: thicknessMM,
		ConductivityWMK: thermal.GlassConductivity, DensityKGM3: glazing.GlassKGM3}}
}

// Optical figures of a pane where a check asks for none that depends on them.
const anyTau, anyRho = 0.8, 0.1

// makeup reads panes_mm, gaps_mm, gas, emissivity, and where given tilt_deg with heat_flow; it
// is vertical otherwise.
func makeup(in *inputs) *glazing.Makeup {
	panes, faces := in.numbers("panes_mm"), in.numbers("emissivity")
	if len(faces) != 2*len(panes) {
		in.fail("%d emissivities for %d panes; there are two faces to a pane", len(faces), len(panes))
		return nil
	}
	m := &glazing.Makeup{ID: "check"}
	for k, mm := range panes {
		m.Panes = append(m.Panes, glazing.Placed{Pane: grey(mm, anyTau, anyRho, faces[2*k], faces[2*k+1])})
	}
	if len(panes) > 1 {
		gas := in.gas("gas")
		for _, mm := range in.numbers("gaps_mm") {
			m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: mm, Gas: gas})
		}
	}
	if in.has("tilt_deg") {
		m.Tilt = glazing.TiltDeg(in.number("tilt_deg"))
		switch flow := in.text("heat_flow"); flow {
		case "up":
			m.HeatFlow = thermal.Up
		case "down":
			m.HeatFlow = thermal.Down
		default:
			in.fail("input heat_flow: %q is neither up nor down", flow)
		}
	}
	return m
}

// rate rates a make-up under the basis that the check names.
func rate(in *inputs, m *glazing.Makeup) (*glazing.Rating, error) {
	basis := in.text("basis")
	if in.err != nil {
		return nil, in.err
	}
	return in.rated(basis, m)
}

// rated rates a make-up under a basis.
func (in *inputs) rated(basis string, m *glazing.Makeup) (*glazing.Rating, error) {
	method, err := in.memo.method(basis)
	if err != nil {
		return nil, err
	}
	ready, err := method.Ready(m)
	if err != nil {
		return nil, err
	}
	r := new(glazing.Rating)
	return r, ready.RateInto(r, 0)
}

// number returns a known figure.
func number(v glazing.Value) (float64, error) {
	if !v.Known {
		return 0, fmt.Errorf("no figure: %s", v.Why)
	}
	return v.Number, nil
}

// figure returns a figure of a rating by its key in the list of figures, or in that of its balances,
// with panes, gaps and surfaces counted from 1.
func figure(r *glazing.Rating, key string) (float64, error) {
	for _, f := range slices.Concat(glazing.Figures(), glazing.ConditionFigures([]glazing.Rating{*r})) {
		if f.Value == nil || !f.Named(key) {
			continue
		}
		for i := range f.Count(r) {
			if strings.ReplaceAll(f.Key, "#", strconv.Itoa(i+1)) == key {
				return number(f.Value(r, i))
			}
		}
	}
	return 0, fmt.Errorf("the list of figures has no %q for this make-up", key)
}

// uValue is the rating's own U.
func uValue(in *inputs) (float64, error) {
	r, err := rate(in, makeup(in))
	if err != nil {
		return 0, err
	}
	return figure(r, "u_w_m2k")
}

// uRounded is U as it is printed.
func uRounded(in *inputs) (float64, error) {
	u, err := uValue(in)
	return glazing.Round(u, int(in.number("places"))), err
}

// uSensitivity is the derivative of U for the corrected emissivity of a surface or the fill of a
// gap, counted from 1: per unit of either.
func uSensitivity(in *inputs) (float64, error) {
	r, err := rate(in, makeup(in))
	if err != nil {
		return 0, err
	}
	list, err := glazing.Sensitivities(r)
	if err != nil {
		return 0, err
	}
	of, at := in.text("of"), int(in.number("number"))
	for _, s := range list {
		if string(s.Input) == of && s.Number == at {
			u, err := number(s.U)
			return u / s.Change, err
		}
	}
	return 0, errors.New("there is no such sensitivity")
}

// uNusseltBetween is U with the Nusselt number interpolated between the tilts of the standard's
// table. A rating interpolates the constants instead; this one goes through thermal alone.
func uNusseltBetween(in *inputs) (float64, error) {
	he, m := in.number("he_w_m2k"), makeup(in)
	if in.err != nil {
		return 0, in.err
	}
	var glass, room float64
	gaps := make([]thermal.Gap, len(m.Gaps))
	for k, p := range m.Panes {
		glass += p.Pane.Resistance()
		room = p.Pane.Tints[0].Back.Corrected.Number
		if k < len(gaps) {
			next := m.Panes[k+1].Pane.Tints[0].Front.Corrected.Number
			gaps[k] = thermal.Gap{WidthM: m.Gaps[k].WidthMM / 1000, Gas: m.Gaps[k].Gas.Properties(), Emissivity: [2]float64{room, next}}
		}
	}
	states := make([]thermal.GapState, len(gaps))
	if err := thermal.SolveGaps(states, gaps, thermal.ConvectionBetween(m.Tilt.Degrees(), m.HeatFlow)); err != nil {
		return 0, err
	}
	return thermal.U(he, thermal.InsideEN673(room), glass, states), nil
}

// The pane of a check that names no thickness: uncoated float glass of a usual thickness. With a
// single pane the standards leave its resistance out of the secondary heat.
const usualMM = 4

// greyPane is any figure of one uncoated pane of given tau_e and rho_e.
func greyPane(in *inputs) (float64, error) {
	pane := grey(usualMM, in.number("tau_e"), in.number("rho_e"), thermal.GlassEmissivity, thermal.GlassEmissivity)
	r, err := rate(in, &glazing.Makeup{ID: "check", Panes: []glazing.Placed{{Pane: pane}}})
	if err != nil {
		return 0, err
	}
	return figure(r, in.text("figure"))
}

// qiDouble is the secondary heat of a double of which the conductance Λ between the outer faces
// is given. How Λ divides into glass and gap must not matter; the panes are given a thickness,
// and the gap the rest, so that the sum is put to the test as well.
func qiDouble(in *inputs) (float64, error) {
	const glass = usualMM / 1000. / thermal.GlassConductivity // m²·K/W
	gap := thermal.GapState{Total: 1 / (1/in.number("lambda_w_m2k") - 2*glass)}
	var s thermal.SecondaryHeat
	s.Solve(in.number("he_w_m2k"), in.number("hi_w_m2k"),
		[]float64{in.number("alpha_e1"), in.number("alpha_e2")}, []float64{glass, glass}, []thermal.GapState{gap})
	return s.Inward, nil
}

// gDouble is g = τe + qi of the same.
func gDouble(in *inputs) (float64, error) {
	qi, err := qiDouble(in)
	return in.number("tau_e") + qi, err
}

// emissivityRatio is the ratio of corrected to normal emissivity.
func emissivityRatio(in *inputs) (float64, error) {
	normal := in.number("normal")
	corrected, err := number(glazing.GivenNormalEmissivity(normal).Corrected)
	return corrected / normal, err
}

// emissivityCorrected is the corrected emissivity of a normal one.
func emissivityCorrected(in *inputs) (float64, error) {
	return number(glazing.GivenNormalEmissivity(in.number("normal")).Corrected)
}

// mass is the mass per area of panes of soda-lime glass.
func mass(in *inputs) (float64, error) {
	var sum float64
	for _, mm := range in.numbers("panes_mm") {
		sum += (&glazing.Pane{Plies: sheet(mm)}).MassKGM2()
	}
	return sum, nil
}

func damageWeight(in *inputs) (float64, error) {
	return spectra.DamageWeight(in.number("wavelength_nm")), nil
}

func erythemaWeight(in *inputs) (float64, error) {
	return spectra.ErythemaWeight(in.number("wavelength_nm")), nil
}
