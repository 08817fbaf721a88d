package glazing

// The list of figures, from which every output is made.

import (
	"math"
	"slices"
	"strconv"
	"strings"
)

// Per says how often a figure occurs in a rating.
type Per int

// The occurrences of a figure.
const (
	PerMakeup  Per = iota
	PerPane        // from outside
	PerGap         // from outside
	PerSurface     // 1, 2, 3 … from outside
)

// A Figure is one row of the list that every output is made from: table, JSON and explain print
// what stands here and nothing else, so that a figure added here appears everywhere.
type Figure struct {
	Key    string // JSON path; "#" stands for the number of the pane, gap or surface
	Alias  string // short name, accepted wherever a figure is typed, as are symbol and key
	Symbol string // the trade's symbol
	Mark   string // follows the symbol in a heading where other figures have the same
	Unit   string
	Places int  // decimals as printed
	Small  bool // three decimals below 0.05
	BasisU bool // decimals of a U-value, which depend on the basis
	Column int  // place among the columns of the schedule, from 1; 0 for none
	Beside bool // compare shows it too, beside the columns of the schedule
	// Numbering marks the number of the place itself: lists in JSON need it, columns that bear it in
	// their heads do not.
	Numbering bool
	Per       Per
	// Above1 is printed in the place of a number above 1: of a humidity that no air can have.
	Above1 string
	// Condition is the id of the condition under whose balance the figure stands; "" of those of the
	// rating itself.
	Condition string
	Clause    string // where the standard defines it; numbers of clauses are from memory
	Meaning   string
	Value     func(r *Rating, i int) Value  // i counts panes, gaps or surfaces from 0
	Text      func(r *Rating, i int) string // instead of Value, a fact that is no number
}

// whole makes the accessor of a figure that occurs once.
func whole(f func(r *Rating) Value) func(*Rating, int) Value {
	return func(r *Rating, _ int) Value { return f(r) }
}

// Figures returns the list of figures, in the order in which outputs show them.
func Figures() []Figure {
	var list []Figure
	list = append(list, opticalFigures()...)
	list = append(list, colourFigures()...)
	list = append(list, thermalFigures()...)
	return append(list, stressFigures()...)
}

func opticalFigures() []Figure {
	const (
		light410 = "EN 410, 5.2; ISO 9050, 3.3"
		lightRho = "EN 410, 5.3; ISO 9050, 3.4"
		solar410 = "EN 410, 5.4.3; ISO 9050, 3.5"
		solarRho = "EN 410, 5.4.4; ISO 9050, 3.5"
	)
	return []Figure{
		{Key: "thickness_mm", Alias: "thickness", Symbol: "d", Unit: "mm", Places: 1, Column: 10,
			Meaning: "thickness of panes and gaps", Value: whole(func(r *Rating) Value { return known(r.ThicknessMM) })},
		{Key: "mass_kg_m2", Alias: "mass", Symbol: "m", Unit: "kg/m²", Places: 1, Column: 11, Clause: "EN 572-1",
			Meaning: "mass per area", Value: whole(func(r *Rating) Value { return known(r.MassKGM2) })},

		{Key: "light.transmittance", Alias: "light", Symbol: "τv", Places: 2, Small: true, Column: 1, Clause: light410,
			Meaning: "light transmittance", Value: whole(func(r *Rating) Value { return r.Light.Transmittance })},
		{Key: "light.reflectance_outside", Alias: "light_outside", Symbol: "ρv", Places: 2, Small: true, Column: 2, Clause: lightRho,
			Meaning: "light reflectance, outside", Value: whole(func(r *Rating) Value { return r.Light.ReflectanceOutside })},
		{Key: "light.reflectance_inside", Alias: "light_inside", Symbol: "ρv′", Places: 2, Small: true, Column: 3, Clause: lightRho,
			Meaning: "light reflectance, inside", Value: whole(func(r *Rating) Value { return r.Light.ReflectanceInside })},

		{Key: "solar.transmittance", Alias: "solar", Symbol: "τe", Places: 2, Small: true, Column: 4, Clause: solar410,
			Meaning: "solar direct transmittance", Value: whole(func(r *Rating) Value { return r.Solar.Transmittance })},
		{Key: "solar.reflectance_outside", Alias: "solar_outside", Symbol: "ρe", Places: 2, Small: true, Column: 5, Clause: solarRho,
			Meaning: "solar direct reflectance, outside", Value: whole(func(r *Rating) Value { return r.Solar.ReflectanceOutside })},
		{Key: "solar.reflectance_inside", Alias: "solar_inside", Symbol: "ρe′", Places: 2, Small: true, Clause: solarRho,
			Meaning: "solar direct reflectance, inside", Value: whole(func(r *Rating) Value { return r.Solar.ReflectanceInside })},
		{Key: "solar.absorptance.#", Alias: "absorptance", Symbol: "αe", Places: 2, Small: true, Per: PerPane, Clause: "EN 410, 5.4.5",
			Meaning: "solar absorptance", Value: func(r *Rating, i int) Value { return r.Absorptance[i] }},
		{Key: "solar.conductances_w_m2k.#", Alias: "conductance", Symbol: "Λ", Unit: "W/(m²·K)", Places: 3, Per: PerGap, Clause: "EN 410, 5.4.6",
			Meaning: "conductance between two panes, as g uses it", Value: func(r *Rating, i int) Value {
				switch {
				case i < len(r.Heat.Conductances):
					return known(r.Heat.Conductances[i])
				case r.Method.Basis.Balances() && r.U.Known:
					return unknown("the g of a balance uses none")
				}
				return unknown(r.U.Why)
			}},
		{Key: "solar.secondary_heat_inward", Alias: "qi", Symbol: "qi", Places: 2, Small: true, Beside: true, Clause: "EN 410, 5.4.6; ISO 9050, 3.5",
			Meaning: "secondary heat towards the inside", Value: whole(func(r *Rating) Value { return r.SecondaryHeat })},
		{Key: "solar.g", Alias: "g", Symbol: "g", Places: 2, Small: true, Column: 6, Clause: "EN 410, 5.4.1; ISO 9050, 3.5",
			Meaning: "total solar energy transmittance τe + qi", Value: whole(func(r *Rating) Value { return r.G })},
		{Key: "solar.shading_coefficient", Alias: "shading", Symbol: "SC", Places: 2, Small: true, Beside: true, Clause: "EN 410, 5.7",
			Meaning: "shading coefficient g/0.87", Value: whole(func(r *Rating) Value { return r.ShadingCoefficient })},
		{Key: "solar.light_to_solar_gain", Alias: "light_to_solar", Symbol: "τv/g", Places: 2, Clause: "common practice, no source",
			Meaning: "light to solar gain", Value: whole(func(r *Rating) Value { return r.LightToSolarGain })},

		{Key: "uv.transmittance", Alias: "uv", Symbol: "τuv", Places: 2, Small: true, Column: 9, Clause: "EN 410, 5.5; ISO 9050, 3.6",
			Meaning: "ultraviolet transmittance, 300-380 nm", Value: whole(func(r *Rating) Value { return r.UV })},
		{Key: "uv.damage_weighted", Alias: "damage", Symbol: "τdf", Places: 2, Small: true, Beside: true, Clause: "ISO 9050, 3.7; CIE 89/3",
			Meaning: "damage-weighted transmittance, 300-600 nm", Value: whole(func(r *Rating) Value { return r.Damage })},
		{Key: "uv.damage_weighted_700", Alias: "damage_700", Symbol: "τdf,700", Places: 2, Small: true, Clause: "CIE 89/3",
			Meaning: "damage-weighted transmittance, 300-700 nm", Value: whole(func(r *Rating) Value { return r.Damage700 })},
		{Key: "uv.skin_weighted", Alias: "skin", Symbol: "τsk", Places: 2, Small: true, Beside: true, Clause: "ISO 9050, 3.8",
			Meaning: "skin-weighted transmittance, 300-400 nm", Value: whole(func(r *Rating) Value { return r.Skin })},
	}
}

func colourFigures() []Figure {
	list := []Figure{{Key: "colour.ra", Alias: "ra", Symbol: "Ra", Places: 0, Column: 8, Clause: "EN 410, 5.6; ISO 9050; CIE 13.3",
		Meaning: "general colour rendering index", Value: whole(func(r *Rating) Value { return r.Ra })}}
	for _, c := range []struct {
		key, alias, mark, of string
		ten                  bool
		get                  func(r *Rating) Colours
	}{
		{"transmitted", "transmitted", "τ", "transmitted", false, func(r *Rating) Colours { return r.Transmitted }},
		{"reflected_outside", "outside", "ρ", "reflected outside", false, func(r *Rating) Colours { return r.Outside }},
		{"reflected_inside", "inside", "ρ′", "reflected inside", false, func(r *Rating) Colours { return r.Inside }},
		{"transmitted_10deg", "transmitted10", "τ,10", "transmitted, 10° observer", true, func(r *Rating) Colours { return r.Transmitted }},
		{"reflected_outside_10deg", "outside10", "ρ,10", "reflected outside, 10° observer", true, func(r *Rating) Colours { return r.Outside }},
		{"reflected_inside_10deg", "inside10", "ρ′,10", "reflected inside, 10° observer", true, func(r *Rating) Colours { return r.Inside }},
	} {
		for axis, a := range []struct{ name, symbol, meaning string }{
			{"l", "L*", "lightness, "}, {"a", "a*", "green to red, "}, {"b", "b*", "blue to yellow, "},
		} {
			list = append(list, Figure{
				Key: "colour." + c.key + "." + a.name, Alias: a.name + "_" + c.alias, Symbol: a.symbol, Mark: c.mark, Places: 1, Beside: !c.ten,
				Clause: "EN 410, 5.6; CIE 15", Meaning: a.meaning + c.of,
				Value: whole(func(r *Rating) Value {
					k := c.get(r)
					lab := k.TwoDegree
					if c.ten {
						lab = k.TenDegree
					}
					return known([]float64{lab.L, lab.A, lab.B}[axis]).orNot(k.Why)
				}),
			})
		}
	}
	return list
}

func thermalFigures() []Figure {
	surface := func(f func(Emissivity) Value) func(*Rating, int) Value {
		return func(r *Rating, i int) Value { return f(r.Surfaces[i]) }
	}
	list := []Figure{
		{Key: "surfaces.#.number", Per: PerSurface, Numbering: true, Meaning: "number of a surface, from outside",
			Value: func(_ *Rating, i int) Value { return known(float64(i + 1)) }},
		{Key: "surfaces.#.emissivity_normal", Alias: "emissivity_normal", Symbol: "εn", Places: 3, Per: PerSurface, Clause: "EN 12898",
			Meaning: "normal emissivity at 283 K", Value: surface(func(e Emissivity) Value { return e.Normal })},
		{Key: "surfaces.#.emissivity", Alias: "emissivity", Symbol: "ε", Places: 3, Beside: true, Per: PerSurface, Clause: "EN 12898",
			Meaning: "corrected emissivity", Value: surface(func(e Emissivity) Value { return e.Corrected })},
		{Key: "surfaces.#.emissivity_hemispherical", Alias: "emissivity_hemispherical", Symbol: "εh", Places: 3, Per: PerSurface,
			Clause: "integral over angle", Meaning: "exact hemispherical emissivity", Value: surface(func(e Emissivity) Value { return e.Hemispherical })},
		{Key: "surfaces.#.source", Per: PerSurface, Meaning: "where the emissivity comes from",
			Text: func(r *Rating, i int) string { return r.Surfaces[i].Source }},
	}
	for _, g := range []struct {
		key, alias, symbol, unit, meaning, clause string
		places                                    int
		get                                       func(r *Rating, i int) float64
	}{
		{"conductance_w_m2k", "gap_conductance", "hs", "W/(m²·K)", "conductance", "EN 673, 5.1", 3, func(r *Rating, i int) float64 { return r.Gaps[i].Total }},
		{"radiative_w_m2k", "gap_radiative", "hr", "W/(m²·K)", "radiative conductance", "EN 673, 5.2", 3, func(r *Rating, i int) float64 { return r.Gaps[i].Radiative }},
		{"convective_w_m2k", "gap_convective", "hg", "W/(m²·K)", "gas conductance", "EN 673, 5.3", 3, func(r *Rating, i int) float64 { return r.Gaps[i].Convective }},
		{"nusselt", "nusselt", "Nu", "", "Nusselt number", "EN 673, 5.3", 3, func(r *Rating, i int) float64 { return r.Gaps[i].Nusselt }},
		{"rayleigh", "rayleigh", "Gr·Pr", "", "Rayleigh number", "EN 673, 5.3", 0, func(r *Rating, i int) float64 { return r.Gaps[i].Rayleigh }},
		{"temperature_drop_k", "drop", "ΔT", "K", "temperature drop", "EN 673, 5.3", 2, func(r *Rating, i int) float64 { return float64(r.Gaps[i].Drop) }},
	} {
		list = append(list, Figure{Key: "gaps.#." + g.key, Alias: g.alias, Symbol: g.symbol, Unit: g.unit, Places: g.places, Per: PerGap,
			Clause: g.clause, Meaning: g.meaning, Value: func(r *Rating, i int) Value {
				switch v := g.get(r, i); {
				case math.IsNaN(v):
					return unknown(passed)
				case v > 0:
					return known(v)
				case r.Makeup.Gaps[i].Vacuum != nil && r.U.Known:
					return unknown(noConvection)
				default:
					return unknown(r.U.Why)
				}
			}})
	}
	return append(list,
		Figure{Key: "outside.coefficient_w_m2k", Alias: "he", Symbol: "he", Unit: "W/(m²·K)", Places: 1, Clause: "EN 673, 7; ISO 10292",
			Meaning: "outside surface coefficient", Value: whole(func(r *Rating) Value { return r.OutsideWM2K })},
		Figure{Key: "inside.coefficient_w_m2k", Alias: "hi", Symbol: "hi", Unit: "W/(m²·K)", Places: 1, Clause: "EN 673, 7; ISO 10292",
			Meaning: "inside surface coefficient", Value: whole(func(r *Rating) Value { return r.InsideWM2K })},
		Figure{Key: "u_w_m2k", Alias: "u", Symbol: "Ug", Unit: "W/(m²·K)", BasisU: true, Column: 7, Clause: "EN 673, 5.1; ISO 10292",
			Meaning: "U-value of the centre of the glass", Value: whole(func(r *Rating) Value { return r.U })},
	)
}

// ClauseUnder returns where a figure is defined under a basis: that of the list, but of U and g, and
// what goes with them, under a basis of balances.
func (f Figure) ClauseUnder(b Basis) string {
	if b.Balances() && f.Condition == "" {
		switch {
		case slices.Contains([]string{"u", "he", "hi"}, f.Alias), f.Per == PerGap && strings.HasPrefix(f.Key, "gaps."):
			return "ISO 15099, winter"
		case slices.Contains([]string{"g", "qi"}, f.Alias):
			return "ISO 15099, summer"
		}
	}
	return f.Clause
}

// Named reports whether a name that somebody typed is the figure's.
func (f Figure) Named(name string) bool {
	_, ok := f.Place(name)
	return ok
}

// Place returns the number of the pane, gap or surface, from 1, that a name of the figure holds; 0
// where it stands for every one. A name is the alias, the key with any number in the place of "#",
// or the symbol with its mark, as headings show it, and perhaps a number; where the figure stands
// under a condition, "@" and that follow.
func (f Figure) Place(name string) (place int, ok bool) {
	if f.Condition != "" && !strings.HasPrefix(name, balancesKey) {
		if name, ok = strings.CutSuffix(name, "@"+f.Condition); !ok {
			return 0, false
		}
	}
	symbol := f.Symbol + f.Mark
	if name != "" && (name == f.Alias || name == symbol) {
		return 0, true
	}
	if number, begins := strings.CutPrefix(name, symbol); begins && symbol != "" && f.Per != PerMakeup {
		if place, ok = placeOf(number); ok {
			return place, true
		}
	}
	have, want := strings.Split(name, "."), strings.Split(f.Key, ".")
	if len(have) != len(want) {
		return 0, false
	}
	for i, part := range want {
		if have[i] == part {
			continue
		}
		if place, ok = placeOf(have[i]); part != "#" || !ok {
			return 0, false
		}
	}
	return place, true
}

// placeOf reads the number of a pane, gap or surface.
func placeOf(s string) (int, bool) {
	n, err := strconv.Atoi(s)
	if err != nil || n < 1 {
		return 0, false
	}
	return n, true
}

// Count returns how many times the figure occurs in a rating.
func (f Figure) Count(r *Rating) int {
	switch f.Per {
	case PerPane:
		return len(r.Makeup.Panes)
	case PerGap:
		return len(r.Makeup.Gaps)
	case PerSurface:
		return 2 * len(r.Makeup.Panes)
	}
	return 1
}

// Print returns occurrence i of the figure as outputs round it; "–" where it is unknown.
func (f Figure) Print(r *Rating, i int) string {
	if f.Text != nil {
		return f.Text(r, i)
	}
	v := f.Value(r, i)
	switch {
	case !v.Known:
		return "–"
	case f.Above1 != "" && v.Number > 1:
		return f.Above1
	}
	return PrintRounded(v.Number, f.Decimals(r, v.Number))
}

// smallBelow is the bound below which a fraction shows a third decimal.
const smallBelow = 0.05

// Decimals returns how many decimals outputs print of a value of the figure in a rating.
func (f Figure) Decimals(r *Rating, v float64) int {
	switch {
	case f.BasisU:
		return r.Method.Basis.uPlaces
	case f.Small && math.Abs(v) < smallBelow:
		return 3
	}
	return f.Places
}

// Round rounds half away from zero, after adding 1e-9 of the step so that a half that binary
// numbers put just below itself still counts as one.
func Round(v float64, places int) float64 {
	scale := math.Pow10(places)
	return math.Copysign(math.Floor(float64(math.Abs(v)*scale)+0.5+1e-9), v) / scale
}

// PrintRounded prints a number rounded to a number of decimals; a rounded zero has no sign.
func PrintRounded(v float64, places int) string {
	s := strconv.FormatFloat(Round(v, places), 'f', places, 64)
	if strings.Trim(s, "-0.") == "" {
		s = strings.TrimPrefix(s, "-")
	}
	return s
}
