package glazing

// The cautions: each a row with code, condition and text.

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"panewright/thermal"
)

// A cautionRule is one caution: its code, when it applies in words, and a function that returns
// its text for rating i of all ratings of a make-up, or "" where it does not apply. To add a
// caution, add a row. One that is made elsewhere has a row in otherCodes.
type cautionRule struct {
	code string
	when string
	text func(all []Rating, i int) string
}

// Thresholds of cautions. Where no source is named they are common practice, no source.
const (
	absorbingAlpha     = 0.5  // αe from which annealed glass is discussed
	reflectedSun       = 0.15 // ρ outside from which reflected sun is discussed
	conductingFilm     = 0.3  // corrected emissivity below which a face bears a conducting film
	overheadTiltDeg    = 75
	heavyKGM2          = 50
	narrowGapMM        = 10
	colourSignalsRa    = 80
	blueDaylightB      = -10 // b* of transmission
	glareTransmittance = 0.006
	damageWorthSaying  = 0.05
)

func always(text string) func([]Rating, int) string {
	return func([]Rating, int) string { return text }
}

// when returns text for the ratings that a condition holds for.
func when(condition func(r *Rating) bool, text string) func([]Rating, int) string {
	return func(all []Rating, i int) string {
		if condition(&all[i]) {
			return text
		}
		return ""
	}
}

var cautionRules = []cautionRule{
	{"not_certified", "always",
		always("Calculated figures: neither a certified rating nor a maker's declaration.")},
	{"centre_of_glass", "always",
		always("Centre of the glass: edge seal, spacer, frame and fixings are not included.")},
	{"local_codes", "always",
		always("The local authority's rules and licensed practitioners decide what may be built.")},
	{"barrier_and_load", "always",
		always("Wind, snow, barrier load, impact, fire and security are not assessed.")},
	{"edition", "always", func(all []Rating, i int) string {
		return "Editions and coefficients used: " + all[i].Method.Editions() + ". Which editions a contract names is for the user to check."
	}},
	{"invented", "a pane's spectrum is marked invented", fromPanes(InventedOrigin,
		"Invented spectra stand behind these figures: they describe no product and must not be specified.")},
	{"modelled", "a pane's spectrum is marked modelled, or the index of a film's material comes from a model or has something else to be known", fromPanes(ModelledOrigin,
		"Modelled spectra stand behind these figures: they were computed, not measured.")},
	{"emissivity_below_table", "a normal emissivity lies below the table of EN 12898", func(all []Rating, i int) string {
		return facesWhere(&all[i], func(e Emissivity) bool {
			if !e.Normal.Known {
				return false
			}
			_, held := thermal.CorrectedEmissivity(e.Normal.Number)
			return held
		}, "The normal emissivity of %s lies below the table of EN 12898; the ratio of its end, 1.22, was held.")
	}},
	{"tilt_interpolated", "a tilt between 0, 45 and 90 degrees, heat flow up", tiltInterpolated},
	{"tilt_vertical_g", "tilted, with a gap", func(all []Rating, i int) string {
		r := &all[i]
		if r.Method.Basis.Balances() || r.Makeup.Tilt.Vertical() || !r.U.Known || len(r.Gaps) == 0 {
			return ""
		}
		return fmt.Sprintf("U is that of the tilt of %.6g°; upright it is %s W/(m²·K). g is computed with the conductance of vertical gaps at every tilt, as EN 410 and ISO 9050 have it.",
			r.Makeup.Tilt.Degrees(), PrintRounded(r.uOf(r.GapsG), 2))
	}},
	{"annealed_absorbing", "αe above 0.5 in any tint, annealed or treatment unknown", func(all []Rating, i int) string {
		return panesWhere(all, func(r *Rating, k int) bool {
			t := r.Makeup.Panes[k].Pane.HeatTreatment
			return r.Absorptance[k].Known && r.Absorptance[k].Number > absorbingAlpha && (t == Annealed || t == UnknownTreatment || t == "")
		}, "More than half of the sun is absorbed, in at least one tint, in %s, annealed or of unknown heat treatment: discuss thermal stress with a licensed engineer (common practice).")
	}},
	{"thermal_stress", "the difference within a pane is near or above its guide value in any tint", stressCaution},
	{"hot_surface", "the room-side surface above 45 °C, or glass above 60 °C at a seal or an interlayer, in a condition rated or screened", hotSurface},
	{"condensation", "the room-side surface, or its edge, is below the dew point of a condition", condensation},
	{"outside_condensation", "outside, dew forms below a humidity of 0.95 in a clear calm night", outsideCondensation},
	{"cold_glass", "a condition's radiant asymmetry leaves more than 5 % dissatisfied, or its downdraught is above 0.2 m/s", coldGlass},
	{"wind_assumed", "a condition names neither wind nor coefficient", conditionsWhere(func(b *Balance) bool {
		_, assumed := b.Condition.OutsideConvection()
		return assumed
	}, "No wind was given for %s: 4 m/s, 20 W/(m²·K), were assumed (common practice).")},
	{"radiant_apart", "a radiant temperature of a condition is not that of its air", conditionsWhere(func(b *Balance) bool {
		at := b.Condition.Surroundings(b.TiltDeg)
		return at.OutsideRadiantK != at.OutsideK || at.InsideRadiantK != at.InsideK
	}, "Radiant temperatures differ from those of the air in %s: U there is the flux over the difference of the air temperatures, and must not be compared with one where they are the same.")},
	{"correlation_step", "the Rayleigh number of an upright gap is within 1 % of 1e4 in a condition", conditionsWhere(func(b *Balance) bool {
		for k := range b.Lit.Sheets - 1 {
			for _, e := range [...]*thermal.Exchange{&b.Lit.Gaps[k], &b.Dark.Gaps[k]} {
				if e.AngleDeg > 60 && math.Abs(e.Rayleigh/1e4-1) < 0.01 {
					return true
				}
			}
		}
		return false
	}, "The Rayleigh number of a gap stands at 10 000 in %s, where the correlation of upright gaps has a step of 0.5 %%: two states are possible, of which one is shown, and g of little sun may be of both.")},
	{"beyond_correlation", "a gap is beyond what its convection correlation was made for, in a condition", beyondCorrelation},
	{"beyond_gas_data", "a gap is colder than -60 °C or hotter than 150 °C in a condition", conditionsWhere(func(b *Balance) bool {
		for k := range b.Lit.Sheets - 1 {
			if e := &b.Lit.Gaps[k]; e.Rayleigh > 0 && math.Abs(celsius(e.MeanK)-45) > 105 {
				return true
			}
		}
		return false
	}, "A gap is colder than −60 °C or hotter than 150 °C in %s: the linear gas properties of ISO 15099 were carried beyond what they were made for.")},
	{"vacuum", "a gap is evacuated", func(all []Rating, i int) string {
		r := &all[i]
		text := "Vacuum: heat that runs round through a tight edge seal is not included and can be large; pressure and pillars are the user's, the residual gas counts with 0.8 W/(m²·K) a pascal, an effective accommodation."
		switch at := slices.IndexFunc(r.Makeup.Gaps, func(g Gap) bool { return g.Vacuum != nil }); {
		case at < 0:
			return ""
		case !r.Method.Basis.Balances():
			text += " A vacuum is outside EN 673 and ISO 10292: its conductances at 283 K stand in the place of theirs."
		}
		if slices.ContainsFunc(r.Makeup.Gaps, func(g Gap) bool { return g.Vacuum != nil && g.Vacuum.PressurePa > 1 }) {
			text += " Above 1 Pa the residual gas is taken too high."
		}
		return text
	}},
	{"edge_estimate", "the make-up has an edge by ψ", when(func(r *Rating) bool { return r.Makeup.Edge.PsiWMK.Known },
		"The temperature at the edge is an estimate from ψ: its heat spread over 50 mm along the edge. A factor by calculation in two dimensions is better.")},
	{"at_angle", "an angle of incidence, for panes that are known there", angleRule("at_angle")},
	{"angle_estimate", "an angle of incidence, with a measured coated pane", angleRule("angle_estimate")},
	{"reflected_sun", "ρe or ρv outside above 0.15", when(func(r *Rating) bool {
		return above(r.Solar.ReflectanceOutside, reflectedSun) || above(r.Light.ReflectanceOutside, reflectedSun)
	}, "Reflects more than 0.15 of sun or light outwards: consider neighbours and traffic, above all where the facade is curved or inclined.")},
	{"overhead", "more than 15 degrees off vertical, either way", when(func(r *Rating) bool {
		return math.Abs(90-r.Makeup.Tilt.Degrees()) > 90-overheadTiltDeg
	}, "Overhead or sloped: a laminated inner pane and retention of fragments are usually required.")},
	{"heat_soak", "toughened and not heat soaked", func(all []Rating, i int) string {
		return panesWhere(all[i:i+1], func(r *Rating, k int) bool {
			p := r.Makeup.Panes[k].Pane
			return p.HeatTreatment == Toughened && !p.HeatSoaked
		}, "Toughened glass may break from nickel sulphide inclusions: %s is not stated to be heat soaked (EN 14179).")
	}},
	{"climate_load", "two gaps with gas or more, or one below 10 mm", when(func(r *Rating) bool {
		return gasGaps(r.Makeup) > 1 || slices.ContainsFunc(r.Makeup.Gaps, func(g Gap) bool { return g.Vacuum == nil && g.WidthMM < narrowGapMM })
	}, "Sealed gaps load their panes when temperature, weather and altitude change; not assessed here.")},
	{"power_failure", "a pane switches", when(func(r *Rating) bool { return r.Makeup.Tintable() },
		"Switchable: settle which tint is held without power, and view for escape and rescue.")},
	{"electrical", "a pane switches", when(func(r *Rating) bool { return r.Makeup.Tintable() },
		"Wiring, isolation, control and durability of switching panes (ISO 18543, ASTM E2141) are not covered.")},
	{"glare_remains", "a pane switches, light transmittance above 0.006", when(func(r *Rating) bool {
		return r.Makeup.Tintable() && r.Light.Transmittance.Known && r.Light.Transmittance.Number > glareTransmittance
	}, "The sun's disc may still glare through this tint (above 0.006 light transmittance).")},
	{"colour_signals", "Ra below 80 in this tint", when(func(r *Rating) bool {
		return r.Ra.Known && r.Ra.Number < colourSignalsRa
	}, "Ra below 80: colours, safety signs and signals may be misjudged.")},
	{"colour_of_dark", "Ra of a light transmittance below 0.01", when(func(r *Rating) bool {
		return r.Ra.Known && r.Light.Transmittance.Known && r.Light.Transmittance.Number < 0.01
	}, "Ra at less than 0.01 light transmittance: computed, of little meaning.")},
	{"blue_daylight", "b* of transmission below -10", when(func(r *Rating) bool {
		return r.Transmitted.Why == "" && r.Transmitted.TwoDegree.B < blueDaylightB
	}, "Daylight indoors turns blue in this tint.")},
	{"uv_visible_damage", "damage-weighted transmittance above 0.05", when(func(r *Rating) bool {
		return above(r.Damage, damageWorthSaying)
	}, "Light damages too: a low UV transmittance does not protect museum objects by itself.")},
	{"radio", "a face of emissivity below 0.3", when(func(r *Rating) bool {
		return slices.ContainsFunc(r.Surfaces, func(e Emissivity) bool {
			return e.Corrected.Known && e.Corrected.Number < conductingFilm
		})
	}, "A conducting film weakens radio and mobile reception indoors.")},
	{"mass", "above 50 kg/m²", when(func(r *Rating) bool { return r.MassKGM2 > heavyKGM2 },
		"One square metre weighs more than 50 kg: handling and replacement need planning.")},
	{"bird", "always", always("Clear and mirroring glass kills birds: consider visible markings.")},
}

// stressCaution names the panes whose difference is near or above the guide value in any tint, each with
// the worst.
func stressCaution(all []Rating, _ int) string {
	var parts []string
	for k, p := range all[0].Makeup.Panes {
		var worst *Stress
		for i := range all {
			if len(all[i].Stress) > k {
				if s := &all[i].Stress[k]; s.Why == "" && s.Word != thermal.BelowGuide && (worst == nil || s.DropK > worst.DropK) {
					worst = s
				}
			}
		}
		if worst != nil {
			parts = append(parts, fmt.Sprintf("%s the guide value in pane %d (%s): %s K of %s K, %s MPa, condition %s", worst.Word, k+1, p.Pane.ID,
				PrintRounded(worst.DropK, 0), PrintRounded(worst.GuideK, 0), PrintRounded(worst.StressMPa, 0), worst.Condition))
		}
	}
	if parts == nil {
		return ""
	}
	edge := "the pane without sun"
	if margin := all[0].Method.Stress().FrameMarginK; margin > 0 {
		edge += fmt.Sprintf(" less %.6g K", margin)
	}
	return "Thermal stress, a screening: the sunlit middle against the shaded edge, which is taken as " + edge + ", is " + strings.Join(parts, "; ") +
		". Discuss heat treatment, edge work, shadows and frame with a licensed engineer."
}

// Temperatures from which surfaces are called hot, °C; common practice, no source.
const (
	hotToTouchC = 45
	hotToSealC  = 60
)

// hotSurface says which condition makes the room side or what holds the unit together hottest.
func hotSurface(all []Rating, i int) string {
	h := &all[i].hot
	var parts []string
	if h.touchCondition != "" && h.touchC > hotToTouchC {
		parts = append(parts, fmt.Sprintf("the room-side surface reaches %s °C in condition %s (above 45 °C, in reach)", PrintRounded(h.touchC, 1), h.touchCondition))
	}
	if h.sealCondition != "" && h.sealC > hotToSealC {
		parts = append(parts, fmt.Sprintf("pane %d reaches %s °C at a seal or an interlayer in condition %s (above 60 °C)", h.sealPane+1, PrintRounded(h.sealC, 1), h.sealCondition))
	}
	if parts == nil {
		return ""
	}
	return "Hot glass: " + strings.Join(parts, "; ") + " (common practice)."
}

// condensation names the conditions in which water condenses on the room side.
func condensation(all []Rating, i int) string {
	r := &all[i]
	var parts []string
	for k := range r.Balances {
		b := &r.Balances[k]
		dew := b.dewPoint()
		if !dew.Known || b.Why != "" {
			continue
		}
		say := func(where string, atK float64) {
			parts = append(parts, fmt.Sprintf("%s at %s °C in condition %s, dew point %s °C", where, PrintRounded(celsius(atK), 1), b.Condition.ID, PrintRounded(celsius(dew.Number), 1)))
		}
		if at := b.roomSideK(); at < dew.Number {
			say("the room-side surface", at)
		}
		if f := r.edgeFactor(b.U); f.Known {
			at := &b.Dark.Surroundings
			if k := thermal.FactorTemperature(f.Number, at.OutsideK, at.InsideK); k < dew.Number {
				say("the edge", k)
			}
		}
	}
	if parts == nil {
		return ""
	}
	return "Water condenses, without sun, on " + strings.Join(parts, "; ") + "."
}

// outsideCondensation says from which humidity dew forms outside in a clear calm night.
func outsideCondensation(all []Rating, i int) string {
	r := &all[i]
	const worthSaying, humidityStep = 0.95, 0.05 // rounded, so that make-ups that are alike share the caution
	if !(r.clearNight.humidity > 0 && r.clearNight.humidity < worthSaying) {
		return ""
	}
	c := clearNight()
	return fmt.Sprintf("In a clear calm night (outdoors %.6g °C, indoors %.6g °C, %.6g m/s, sky %s °C by Swinbank) surface 1 cools to about %s °C: outside, dew forms from a humidity of about %s.",
		c.OutsideC, c.InsideC, c.WindMS.Number, PrintRounded(c.SkyC.Number, 0), PrintRounded(r.clearNight.surfaceC, 0), PrintRounded(math.Floor(r.clearNight.humidity/humidityStep)*humidityStep, 2))
}

// What makes cold glass worth a word; common practice, no source.
const (
	dissatisfiedPct = 5
	draughtMS       = 0.2
)

// coldGlass names the conditions in which a person in front of the glass is likely to feel it cold.
func coldGlass(all []Rating, i int) string {
	r := &all[i]
	var parts []string
	for k := range r.Balances {
		b := &r.Balances[k]
		asymmetry := r.asymmetry(b).or(0)
		if asymmetry <= 0 || b.Condition.Standard { // nobody sits in a basis's own conditions
			continue
		}
		pd, v := r.dissatisfied(b), r.balanceFigure(b, "comfort.downdraught_m_s").or(0)
		who := "beyond what ISO 7730 judges"
		switch {
		case pd.Known && pd.Number < dissatisfiedPct:
			who = "fewer than 5 % dissatisfied"
		case pd.Known:
			who = PrintRounded(pd.Number, 0) + " % dissatisfied"
		}
		if !pd.Known || pd.Number > dissatisfiedPct || v > draughtMS {
			part := fmt.Sprintf("in condition %s radiant asymmetry about %s K (%s)", b.Condition.ID, PrintRounded(asymmetry, 0), who)
			if v > 0 {
				part += fmt.Sprintf(", air of about %s m/s near the floor", PrintRounded(v, 1))
			}
			parts = append(parts, part)
		}
	}
	if parts == nil {
		return ""
	}
	p := r.Method.Person()
	return fmt.Sprintf("Cold glass, for a person %.6g m in front of %.6g × %.6g m of it: %s.", p.DistanceM, p.GlassWidthM, p.GlassHeightM, strings.Join(parts, "; "))
}

// beyondCorrelation names the conditions in which a gap is beyond what its correlation was made for
// (ISO 15099:2003, 5.3.3, from memory): Ra 2e7 and a height of 5 widths from 60° on, Ra 1e5 and 20
// widths below.
func beyondCorrelation(all []Rating, i int) string {
	gaps := all[i].Makeup.Gaps
	return conditionsWhere(func(b *Balance) bool {
		for k, g := range gaps {
			e := &b.Lit.Gaps[k]
			aspect := 1000 * b.Lit.Surroundings.HeightM / g.WidthMM
			steep := e.AngleDeg >= 60
			if e.Rayleigh > 0 && (steep && (e.Rayleigh > 2e7 || aspect < 5) || !steep && (e.Rayleigh > 1e5 || aspect < 20)) {
				return true
			}
		}
		return false
	}, "A gap is wider, or its gas moves more, than its convection correlation was made for in %s (Ra to 2e7 and heights from 5 widths at 60° and more, Ra to 1e5 and heights from 20 widths below; from memory): its conductance was carried beyond.")(all, i)
}

// conditionsWhere names the conditions of the user for whose balance something holds.
func conditionsWhere(holds func(b *Balance) bool, format string) func([]Rating, int) string {
	return func(all []Rating, i int) string {
		var names []string
		for k := range all[i].Balances {
			if b := &all[i].Balances[k]; b.why() == "" && holds(b) {
				names = append(names, b.Condition.ID)
			}
		}
		if names == nil {
			return ""
		}
		return fmt.Sprintf(format, strings.Join(names, ", "))
	}
}

// gasGaps counts the gaps with gas.
func gasGaps(m *Makeup) (n int) {
	for _, g := range m.Gaps {
		if g.Vacuum == nil {
			n++
		}
	}
	return n
}

func above(v Value, limit float64) bool { return v.Known && v.Number > limit }

// cautionsOf returns the cautions of rating i of all ratings of one make-up under one basis.
func cautionsOf(all []Rating, i int, figures []Figure) []Caution {
	r := &all[i]
	out := []Caution{}
	for _, rule := range cautionRules {
		if text := rule.text(all, i); text != "" {
			out = append(out, Caution{Code: rule.code, Text: text})
		}
	}
	out = append(out, r.Ready.prepared[r.State].cautions...)
	out = append(out, reasons(r, out, figures)...)
	for k, p := range r.Makeup.Panes {
		for _, c := range p.Pane.Tints[r.Ready.States[r.State].Tints[k]].Spectrum.Cautions {
			if !slices.Contains(out, c) {
				out = append(out, c)
			}
		}
	}
	return out
}

// reasons returns why figures are unknown, where no caution says so already. The emissivities that
// a given one leaves open are none.
func reasons(r *Rating, said []Caution, figures []Figure) (out []Caution) {
	symbols := map[string][]string{} // by reason
	var order []string
	for _, f := range figures {
		if f.Value == nil || f.Symbol == "εn" || f.Symbol == "εh" {
			continue
		}
		for k := range f.Count(r) {
			v := f.Value(r, k)
			if v.Known || slices.ContainsFunc(said, func(c Caution) bool { return strings.Contains(c.Text, v.Why) }) {
				continue
			}
			if symbols[v.Why] == nil {
				order = append(order, v.Why)
			}
			if !slices.Contains(symbols[v.Why], f.Symbol) {
				symbols[v.Why] = append(symbols[v.Why], f.Symbol)
			}
		}
	}
	for _, why := range order {
		out = append(out, Caution{Code: "missing_data", Text: "No figure for " + strings.Join(symbols[why], ", ") + ": " + why + "."})
	}
	return out
}

// otherCodes are the codes of cautions that come from elsewhere: from spectra, optical constants, the
// project and its limits, and from what stands on one page.
var otherCodes = [][2]string{
	{"missing_data", "a figure is not known, for a reason that no other caution names"},
	{"missing_band", "a spectrum does not reach, or has no values in, a part of a band with 0.1 % of its weight or more: its figures are not known"},
	{"extended", "an end was held. Of a pane's spectrum: its first or last value, for less than 0.1 % of the weight of a band, or its infrared rows to 50 µm. Of optical constants: their first value (that of built-in glass at 310 nm) down to 300 nm, or their reflectance to 50 µm. Of a film's material: published constants, which a model carries on"},
	{"typical", "a film material of typical figures, not of a measured film, stands behind a pane"},
	{"interpolated", "a spectrum has no values in a part of a band with less than 0.1 % of its weight; those beside it were joined"},
	{"set_to_bound", "values just outside 0 to 1, or shares that add to just more than 1, were set to the bound"},
	{"coarse_steps", "a spectrum or optical constants in steps too wide for the tables of the standards"},
	{"emissivity_differs", "an emissivity was typed, and infrared rows give another by more than 0.02"},
	{"sun_range", "the project's own sun does not reach from 300 to 2500 nm"},
	{"coefficients_not_used", "coefficients were given for na or iso15099, whose U and g come from balances"},
	{"limits_not_checked", "the project has limits, against which the page does not hold its figures"},
	{"limit_basis", "check: a limit names no basis, and that of the project was taken"},
	{"limit_scope", "check: a limit names no scope, and the centre of the glass was taken"},
	{"limit_of_one", "check: a limit of a share of one has a bound of 1, the whole"},
	{"limit_makeup_absent", "check: a file of limits names a make-up that the project does not have"},
	{"no_limit", "check: no limit is for a make-up"},
	{MixedBasis.Code, "figures under more than one basis stand on one page"},
}

// CautionCodes returns every code that a caution of any output can have, and when it applies.
func CautionCodes() [][2]string {
	var out [][2]string
	for _, r := range cautionRules {
		out = append(out, [2]string{r.code, r.when})
	}
	return append(out, otherCodes...)
}

// MixedBasis is the caution of a page that shows more than one basis.
var MixedBasis = Caution{Code: "mixed_basis", Text: "Figures under different bases stand here side by side: they follow different standards and must not be compared with a limit of another."}

// fromPanes returns text where the spectrum of a pane has an origin.
func fromPanes(o Origin, text string) func([]Rating, int) string {
	return when(func(r *Rating) bool {
		return slices.ContainsFunc(r.Makeup.Panes, func(p Placed) bool { return p.Pane.Origin == o })
	}, text)
}

// panesWhere names the panes for which a condition holds in any of the ratings, or returns "".
func panesWhere(ratings []Rating, condition func(r *Rating, pane int) bool, format string) string {
	var names []string
	for k, p := range ratings[0].Makeup.Panes {
		for i := range ratings {
			if condition(&ratings[i], k) && !slices.Contains(names, p.Pane.ID) {
				names = append(names, p.Pane.ID)
			}
		}
	}
	if names == nil {
		return ""
	}
	return fmt.Sprintf(format, strings.Join(names, ", "))
}

// facesWhere names the faces for which a condition holds, or returns "".
func facesWhere(r *Rating, condition func(Emissivity) bool, format string) string {
	var names []string
	for i, e := range r.Surfaces {
		if condition(e) {
			names = append(names, r.Makeup.faceName(i/2, i%2 == 1))
		}
	}
	if names == nil {
		return ""
	}
	return fmt.Sprintf(format, strings.Join(names, ", "))
}

// uOf returns what U would be with the gaps in other states, where U is known.
func (r *Rating) uOf(gaps []thermal.GapState) float64 {
	return thermal.U(r.OutsideWM2K.Number, r.InsideWM2K.Number, r.Ready.glassResistance(), gaps)
}

func tiltInterpolated(all []Rating, i int) string {
	r := &all[i]
	deg := r.Makeup.Tilt.Degrees()
	between := thermal.ConvectionBetween(deg, r.Makeup.HeatFlow)
	if r.Method.Basis.Balances() || !r.U.Known || len(r.Gaps) == 0 || (between.Weight == 0 && deg <= 90) {
		return ""
	}
	var text string
	if between.Weight != 0 && !between.Still {
		other := make([]thermal.GapState, len(r.Gaps))
		if thermal.SolveGaps(other, r.Ready.prepared[r.State].gaps, between) != nil {
			return ""
		}
		text = fmt.Sprintf("EN 673 gives its constants for 0, 45 and 90°; at %.6g° A and n were interpolated. Interpolating the Nusselt number instead gives U %s and not %s W/(m²·K).",
			deg, PrintRounded(r.uOf(other), 2), PrintRounded(r.U.Number, 2))
	}
	if deg > 90 {
		text += fmt.Sprintf(" EN 673 knows no tilt beyond 90°; the gap was taken as at %.6g°, with the direction of heat that was given.", 180-deg)
	}
	return strings.TrimSpace(text)
}
