package glazing

// The list of figures of a balance: of temperatures and fluxes under a condition, and of what follows
// from them.

import (
	"math"
	"slices"
	"strings"

	"panewright/thermal"
)

// A BalanceFigure is one row of the list of figures that every balance has. Its key is the path
// within a balance; Value and Text of the Figure are empty.
type BalanceFigure struct {
	Figure
	Of func(r *Rating, b *Balance, i int) Value // i counts panes, gaps or surfaces from 0
	// Schedule is the place among the columns of the schedule of conditions, from 1; 0 for none.
	Schedule int
}

// balancesKey begins the keys of figures under conditions.
const balancesKey = "balances."

// At returns the figure under the condition of an id: its key is "balances.ID.…", and each of its
// short names ends with "@ID".
func (f BalanceFigure) At(condition string) Figure {
	x := f.Figure
	x.Condition = condition
	x.Key = balancesKey + condition + "." + x.Key
	x.Column, x.Beside = 0, false
	x.Value = func(r *Rating, i int) Value {
		b := r.Balance(condition)
		if b == nil {
			return unknown("there is no condition " + condition + " under basis " + r.Method.Basis.Name)
		}
		return f.Of(r, b, i)
	}
	return x
}

// WithinBalance returns the key within the balance that the figure stands in: the whole key of one under
// no condition.
func (f Figure) WithinBalance() string {
	if f.Condition == "" {
		return f.Key
	}
	return strings.TrimPrefix(f.Key, balancesKey+f.Condition+".")
}

// ConditionFigures returns the figures of the balances of ratings, condition by condition in the order in
// which they occur.
func ConditionFigures(ratings []Rating) []Figure {
	var list []Figure
	for _, id := range ConditionIDs(ratings) {
		for _, f := range BalanceFigures() {
			list = append(list, f.At(id))
		}
	}
	return list
}

// ConditionIDs returns the conditions of ratings in the order in which they occur.
func ConditionIDs(ratings []Rating) (ids []string) {
	for i := range ratings {
		for k := range ratings[i].Balances {
			if id := ratings[i].Balances[k].Condition.ID; !slices.Contains(ids, id) {
				ids = append(ids, id)
			}
		}
	}
	return ids
}

// Conditions returns those for which the method makes balances: those of the basis, if it has any, and then
// those of the user.
func (m *Method) Conditions() []Condition { return slices.Clone(m.conditions) }

// Screened returns the conditions for which the method screens thermal stress.
func (m *Method) Screened() []Condition { return slices.Clone(m.screened) }

// BalanceFigures returns the list of figures of a balance, in the order in which outputs show them.
func BalanceFigures() []BalanceFigure {
	var list []BalanceFigure
	list = append(list, stateFigures()...)
	list = append(list, gapFigures()...)
	return append(list, consequenceFigures()...)
}

// lit makes the accessor of a number of the state with the sun.
func lit(get func(b *Balance, i int) float64) func(*Rating, *Balance, int) Value {
	return func(_ *Rating, b *Balance, i int) Value {
		if why := b.why(); why != "" {
			return unknown(why)
		}
		return known(get(b, i)).finite()
	}
}

// hottest makes the accessor of a fact of the hottest pane, from 0, and its temperature.
func hottest(get func(pane int, peakK float64) float64) func(*Rating, *Balance, int) Value {
	return func(r *Rating, b *Balance, _ int) Value {
		if why := b.why(); why != "" {
			return unknown(why)
		}
		return known(get(r.Ready.prepared[r.State].system.Hottest(&b.Lit)))
	}
}

// passed says why coefficients of radiation are unknown.
const passed = "a sheet lets infrared through: radiation there is not of two faces alone"

// finite leaves a number that is none unknown.
func (v Value) finite() Value {
	if v.Known && (math.IsNaN(v.Number) || math.IsInf(v.Number, 0)) {
		return unknown(passed)
	}
	return v
}

// absorptance returns the solar absorptance of all panes together.
func (r *Rating) absorptance() Value {
	var sum float64
	for _, v := range r.Absorptance {
		if !v.Known {
			return v
		}
		sum += v.Number
	}
	return known(sum)
}

func celsius(k float64) float64 { return k - thermal.ZeroCelsius }

func stateFigures() []BalanceFigure {
	const balance = "ISO 15099"
	return []BalanceFigure{
		{Figure: Figure{Key: "tilt_deg", Alias: "tilt", Symbol: "tilt", Unit: "°", Places: 0, Meaning: "tilt, 90 upright, 0 level with the outside above"},
			Of: func(_ *Rating, b *Balance, _ int) Value { return known(b.TiltDeg) }},
		{Figure: Figure{Key: "u_w_m2k", Alias: "u", Symbol: "U", Unit: "W/(m²·K)", Places: 2, Clause: balance, Meaning: "U-value at the temperatures of the condition, without sun"},
			Schedule: 1, Of: func(_ *Rating, b *Balance, _ int) Value { return b.U }},
		{Figure: Figure{Key: "g", Alias: "g", Symbol: "g", Places: 2, Small: true, Clause: balance, Meaning: "solar heat gain: of the sun, what passes and what the room gains more than without"},
			Schedule: 2, Of: func(_ *Rating, b *Balance, _ int) Value { return b.G }},
		{Figure: Figure{Key: "absorptance", Alias: "total_absorptance", Symbol: "αe", Places: 2, Small: true, Clause: "EN 410, 5.4.5", Meaning: "solar absorptance of all panes together"},
			Schedule: 3, Of: func(r *Rating, b *Balance, _ int) Value {
				if b.Why != "" {
					return unknown(b.Why)
				}
				return r.absorptance()
			}},
		{Figure: Figure{Key: "secondary_heat_inward", Alias: "qi", Symbol: "qi", Places: 2, Small: true, Clause: balance, Meaning: "secondary heat towards the inside, g − τe"},
			Schedule: 4, Of: func(r *Rating, b *Balance, _ int) Value {
				return known(b.G.Number - r.Solar.Transmittance.Number).orNot(b.G.Why)
			}},
		{Figure: Figure{Key: "transmitted_w_m2", Alias: "transmitted_sun", Symbol: "E·τe", Unit: "W/m²", Places: 0, Clause: balance, Meaning: "transmitted sun"},
			Of: func(_ *Rating, b *Balance, _ int) Value { return b.TransmittedWM2 }},
		{Figure: Figure{Key: "inward_flux_w_m2", Alias: "inward_flux", Symbol: "qin", Unit: "W/m²", Places: 1, Clause: balance, Meaning: "heat from the room-side surface into the room by convection and radiation"},
			Schedule: 5, Of: lit(func(b *Balance, _ int) float64 { return b.Lit.InwardWM2() })},
		{Figure: Figure{Key: "surface_temperatures_c.#", Alias: "temperature", Symbol: "θ", Unit: "°C", Places: 1, Per: PerSurface, Clause: balance, Meaning: "temperature of a surface"},
			Of: func(_ *Rating, b *Balance, i int) Value { return b.SurfaceC(i) }},
		{Figure: Figure{Key: "inside_surface_c", Alias: "inside_surface", Symbol: "θsi", Unit: "°C", Places: 1, Clause: balance, Meaning: "temperature of the surface that faces the room"},
			Schedule: 6, Of: lit(func(b *Balance, _ int) float64 { return celsius(b.Lit.SurfaceK[2*b.Lit.Sheets-1]) })},
		{Figure: Figure{Key: "hottest_c", Alias: "hottest", Symbol: "θmax", Unit: "°C", Places: 1, Clause: balance, Meaning: "highest temperature in any pane"},
			Schedule: 7, Of: hottest(func(_ int, peakK float64) float64 { return celsius(peakK) })},
		{Figure: Figure{Key: "hottest_pane", Numbering: true, Alias: "hottest_pane", Symbol: "pane", Places: 0, Clause: balance, Meaning: "number of the hottest pane, from outside"},
			Schedule: 8, Of: hottest(func(pane int, _ float64) float64 { return float64(pane + 1) })},
		{Figure: Figure{Key: "absorbed_w_m2.#", Alias: "absorbed", Symbol: "E·αe", Unit: "W/m²", Places: 0, Per: PerPane, Clause: balance, Meaning: "sun that a pane absorbs"},
			Of: func(_ *Rating, b *Balance, i int) Value {
				if why := b.why(); why != "" {
					return unknown(why)
				}
				return known(b.AbsorbedWM2[i])
			}},
		{Figure: Figure{Key: "outside.convective_w_m2k", Alias: "outside_convective", Symbol: "hce", Unit: "W/(m²·K)", Places: 2, Clause: "ISO 15099, 8.3", Meaning: "outdoor convective coefficient"},
			Of: lit(func(b *Balance, _ int) float64 { return b.Lit.Outside.Convective })},
		{Figure: Figure{Key: "outside.radiative_w_m2k", Alias: "outside_radiative", Symbol: "hre", Unit: "W/(m²·K)", Places: 2, Clause: balance, Meaning: "outdoor radiative coefficient"},
			Of: lit(func(b *Balance, _ int) float64 { return b.Lit.Outside.Radiative })},
		{Figure: Figure{Key: "inside.convective_w_m2k", Alias: "inside_convective", Symbol: "hci", Unit: "W/(m²·K)", Places: 2, Clause: "ISO 15099, 8.3", Meaning: "room-side convective coefficient"},
			Of: lit(func(b *Balance, _ int) float64 { return b.Lit.Room.Convective })},
		{Figure: Figure{Key: "inside.radiative_w_m2k", Alias: "inside_radiative", Symbol: "hri", Unit: "W/(m²·K)", Places: 2, Clause: balance, Meaning: "room-side radiative coefficient"},
			Of: lit(func(b *Balance, _ int) float64 { return b.Lit.Room.Radiative })},
		{Figure: Figure{Key: "iterations", Alias: "iterations", Symbol: "steps", Places: 0, Meaning: "Newton steps to the steady state"},
			Of: lit(func(b *Balance, _ int) float64 { return float64(b.Lit.Iterations) })},
		{Figure: Figure{Key: "residual_w_m2", Alias: "residual", Symbol: "Δq", Unit: "W/m²", Places: 9, Meaning: "largest energy residual of any surface"},
			Of: lit(func(b *Balance, _ int) float64 { return b.Lit.ResidualWM2 })},
	}
}

// noConvection says why a vacuum has neither Nusselt nor Rayleigh number.
const noConvection = "a vacuum does not convect"

// gapFigures are those of the gaps, under the keys that gaps of a rating have, and more.
func gapFigures() (list []BalanceFigure) {
	for _, g := range []struct {
		key, alias, symbol, unit, meaning string
		places                            int
		get                               func(e *thermal.Exchange) float64
	}{
		{"conductance_w_m2k", "gap_conductance", "hs", "W/(m²·K)", "conductance of a gap", 3, func(e *thermal.Exchange) float64 { return e.Total() }},
		{"radiative_w_m2k", "gap_radiative", "hr", "W/(m²·K)", "radiative conductance of a gap", 3, func(e *thermal.Exchange) float64 { return e.Radiative }},
		{"convective_w_m2k", "gap_convective", "hg", "W/(m²·K)", "conductance of gas or pillars of a gap", 3, func(e *thermal.Exchange) float64 { return e.Convective }},
		{"nusselt", "nusselt", "Nu", "", "Nusselt number of a gap", 3, func(e *thermal.Exchange) float64 { return e.Nusselt }},
		{"rayleigh", "rayleigh", "Ra", "", "Rayleigh number of a gap", 0, func(e *thermal.Exchange) float64 { return e.Rayleigh }},
		{"temperature_drop_k", "drop", "ΔT", "K", "temperature drop in a gap", 2, func(e *thermal.Exchange) float64 { return e.DropK }},
		{"mean_temperature_c", "gap_mean", "θm", "°C", "mean temperature of a gap", 1, func(e *thermal.Exchange) float64 { return celsius(e.MeanK) }},
		{"convected_w_m2", "convected", "qc", "W/m²", "heat by gas or pillars through a gap, towards the room", 2, func(e *thermal.Exchange) float64 { return e.ConvectedWM2 }},
		{"radiated_w_m2", "radiated", "qr", "W/m²", "heat by radiation through a gap, towards the room", 2, func(e *thermal.Exchange) float64 { return e.RadiatedWM2 }},
	} {
		list = append(list, BalanceFigure{Figure: Figure{Key: "gaps.#." + g.key, Alias: g.alias, Symbol: g.symbol, Unit: g.unit, Places: g.places, Per: PerGap,
			Clause: "ISO 15099, 5.3", Meaning: g.meaning}, Of: func(r *Rating, b *Balance, i int) Value {
			if r.Makeup.Gaps[i].Vacuum != nil && (g.alias == "nusselt" || g.alias == "rayleigh") {
				return unknown(noConvection)
			}
			return lit(func(b *Balance, i int) float64 { return g.get(&b.Lit.Gaps[i]) })(r, b, i)
		}})
	}
	return list
}
