package glazing

// What follows from the temperatures of balances: thermal stress, moisture, comfort. Each is a screening
// with stated assumptions; the formulas stand in package thermal.

import (
	"math"
	"slices"
	"strings"

	"panewright/thermal"
)

// Stress is the screening of one pane for thermal stress: the condition in which its middle is
// warmest against its shaded edge.
type Stress struct {
	Why         string  // why there is none; "" where there is
	Condition   string  // the worst of those screened
	CentreC     float64 // mean of the two faces, with sun
	EdgeC       float64 // the same without sun, less the frame margin
	DropK       float64 // between them
	StressMPa   float64 // k E α ΔT
	GuideK      float64 // guide value of DropK for the heat treatment
	Word        thermal.GuideWord
	Absorptance float64
}

// screenedBy returns the conditions for which thermal stress is screened: those with sun, the summer of
// na under every basis, and the cold sunny one unless the user has one of that id.
func screenedBy(b Basis, conditions []Condition) []Condition {
	var list []Condition
	for _, c := range conditions {
		if c.SunWM2 > 0 {
			list = append(list, c)
		}
	}
	if summer := conditionsNA()[1]; b.Name != NA.Name {
		summer.ID = SummerNA
		list = append(list, summer)
	}
	if !slices.ContainsFunc(conditions, func(x Condition) bool { return x.ID == ColdSun }) {
		list = append(list, coldSun())
	}
	return list
}

// screen screens the panes of a rating for thermal stress. SF6, for which there are no balances, and
// what else leaves temperatures unknown leaves the stress unknown too.
func (r *Ready) screen(x *Rating) error {
	x.Stress = make([]Stress, len(r.Makeup.Panes))
	x.hot.touchCondition, x.hot.sealCondition, x.clearNight.humidity = "", "", 0
	options := r.Method.Stress()
	var b Balance
	for i := range r.Method.screened {
		if err := r.balance(&b, x, &r.Method.screened[i]); err != nil {
			return err
		}
		x.feelHeat(&b)
		for k := range x.Stress {
			s := &x.Stress[k]
			why := b.why()
			if why == "" && r.Makeup.Panes[k].Pane.infraredTau(r.States[x.State].Tints[k]) > 0 {
				why = "pane " + r.Makeup.Panes[k].Pane.ID + " lets infrared through: it is no glass"
			}
			if why != "" {
				s.Why = why
				continue
			}
			centre, edge := b.Lit.MeanK(k), b.Dark.MeanK(k)-options.FrameMarginK
			if drop := centre - edge; s.Condition == "" || drop > s.DropK {
				s.Condition, s.DropK = b.Condition.ID, drop
				s.CentreC, s.EdgeC = celsius(centre), celsius(edge)
			}
		}
	}
	night := clearNight()
	if err := r.balance(&b, x, &night); err != nil {
		return err
	}
	if b.Why == "" {
		x.clearNight.surfaceC = celsius(b.Dark.SurfaceK[0])
		x.clearNight.humidity = thermal.CondensingHumidity(b.Dark.SurfaceK[0], b.Dark.Surroundings.OutsideK)
	}
	for k := range x.Stress {
		s := &x.Stress[k]
		if s.Why != "" {
			continue
		}
		s.Absorptance = x.absorbed[k]
		s.StressMPa = thermal.ThermalStressMPa(options.Factor, s.DropK)
		s.GuideK = thermal.StressGuideK(string(r.Makeup.Panes[k].Pane.HeatTreatment))
		s.Word = thermal.AgainstGuide(s.DropK, s.GuideK)
	}
	return nil
}

// feelHeat notes where the state of a condition is hotter than all before.
func (x *Rating) feelHeat(b *Balance) {
	if b.why() != "" {
		return
	}
	h, last := &x.hot, b.Lit.Sheets-1
	if c := celsius(b.Lit.SurfaceK[2*last+1]); h.touchCondition == "" || c > h.touchC {
		h.touchC, h.touchCondition = c, b.Condition.ID
	}
	var plies []thermal.Ply
	for k := range b.Lit.Sheets {
		plies = x.Ready.prepared[x.State].system.Plies(plies[:0], &b.Lit, k)
		for i, p := range plies {
			at := []float64{}
			if i > 0 || k > 0 { // an interlayer or a seal outside the ply
				at = append(at, p.OuterK)
			}
			if i < len(plies)-1 || k < last {
				at = append(at, p.InnerK)
			}
			for _, t := range at {
				if c := celsius(t); h.sealCondition == "" || c > h.sealC {
					h.sealC, h.sealCondition, h.sealPane = c, b.Condition.ID, k
				}
			}
		}
	}
}

// clearNight is when dew forms outside: calm, with a clear sky by Swinbank; common practice, no source.
func clearNight() Condition {
	c := standard("clear-night", 20, 10, 0, 0)
	c.OutsideConvectionWM2K, c.WindMS = unknown(""), known(1)
	c.SkyC = known(celsius(thermal.ClearSky(c.OutsideC + thermal.ZeroCelsius)))
	return c
}

// edgeFactor returns the temperature factor of the edge: typed by the user, or estimated from its ψ.
func (r *Rating) edgeFactor(u Value) Value {
	e := r.Makeup.Edge
	switch {
	case e.TemperatureFactor.Known:
		return e.TemperatureFactor
	case !e.PsiWMK.Known:
		return unknown("neither a temperature factor nor a ψ of the edge was given")
	case !u.Known:
		return u
	}
	return known(thermal.EdgeFactor(u.Number, e.PsiWMK.Number, thermal.EdgeBandM, thermal.InsideResistanceM2KW))
}

// Person returns who feels the glazing: that of the project, or AnyPerson.
func (m *Method) Person() Person {
	if m.Options.Person != nil {
		return *m.Options.Person
	}
	return AnyPerson()
}

// dark makes the accessor of a number of the state without sun, in which water condenses first; whyNot
// says when it is none.
func dark(get func(r *Rating, b *Balance) float64, whyNot ...string) func(*Rating, *Balance, int) Value {
	return func(r *Rating, b *Balance, _ int) Value {
		if b.Why != "" {
			return unknown(b.Why)
		}
		v := get(r, b)
		if math.IsNaN(v) {
			return unknown(strings.Join(whyNot, "; "))
		}
		return known(v)
	}
}

func (b *Balance) roomSideK() float64 { return b.Dark.SurfaceK[2*b.Dark.Sheets-1] }

// edge makes the accessor of a number of the room-side surface at the edge, from its temperature in K.
func edge(get func(b *Balance, edgeK float64) float64) func(*Rating, *Balance, int) Value {
	return func(r *Rating, b *Balance, _ int) Value {
		f := r.edgeFactor(b.U)
		if !f.Known {
			return f
		}
		at := &b.Dark.Surroundings
		return known(get(b, thermal.FactorTemperature(f.Number, at.OutsideK, at.InsideK))).finite()
	}
}

// dewPoint returns the dew or frost point of the room's air in K.
func (b *Balance) dewPoint() Value {
	h := b.Condition.InsideHumidity
	if !h.Known {
		return unknown("the condition has no inside_rh")
	}
	k, _, err := thermal.DewPoint(b.Condition.InsideC+thermal.ZeroCelsius, h.Number)
	if err != nil {
		return unknown(err.Error())
	}
	return known(k)
}

// asymmetry returns by how many K the plane radiant temperature in front of the glass is below that of
// the room behind, without sun on the person; below 0 where the glass is the warmer.
func (r *Rating) asymmetry(b *Balance) Value {
	if why := b.why(); why != "" {
		return unknown(why)
	}
	p := r.Method.Person()
	view := thermal.RectangleViewFactor(p.GlassWidthM, p.GlassHeightM, p.DistanceM)
	return known(thermal.RadiantAsymmetry(view, b.Lit.SurfaceK[2*b.Lit.Sheets-1], b.Lit.Surroundings.InsideRadiantK))
}

// How far from upright glazing still counts as a wall, and how far from level as a ceiling, in degrees:
// our own choice, for ISO 7730 knows walls and ceilings only.
const (
	wallWithinDeg    = 30
	ceilingWithinDeg = 45
)

// upright reports whether a balance is of glazing that counts as a wall.
func (b *Balance) upright() bool { return math.Abs(b.TiltDeg-90) <= wallWithinDeg }

// radiantSource returns what a radiant asymmetry, above 0 where the glass is cool, is judged as, or why
// there is no formula.
func (b *Balance) radiantSource(asymmetryK float64) (source thermal.RadiantSource, why string) {
	cool := asymmetryK >= 0
	switch {
	case b.upright() && cool:
		return thermal.CoolWall, ""
	case b.upright():
		return thermal.WarmWall, ""
	case b.TiltDeg <= ceilingWithinDeg && cool:
		return thermal.CoolCeiling, ""
	case b.TiltDeg <= ceilingWithinDeg:
		return thermal.WarmCeiling, ""
	}
	return 0, "ISO 7730 has formulas for walls and ceilings, and this tilt is neither"
}

// draughts makes the accessor of a figure of the air that falls along upright glass.
func draughts(get func(p Person, dropK float64) float64) func(*Rating, *Balance, int) Value {
	return func(r *Rating, b *Balance, _ int) Value {
		switch why := b.why(); {
		case why != "":
			return unknown(why)
		case !b.upright():
			return unknown(notUpright)
		}
		return known(get(r.Method.Person(), b.Condition.InsideC-celsius(b.Lit.SurfaceK[2*b.Lit.Sheets-1])))
	}
}

const notUpright = "the formula is for air that falls along upright glass"

// dissatisfied returns the percentage whom that asymmetry disturbs, as by a wall or a ceiling.
func (r *Rating) dissatisfied(b *Balance) Value {
	v := r.asymmetry(b)
	if !v.Known {
		return v
	}
	source, why := b.radiantSource(v.Number)
	if why != "" {
		return unknown(why)
	}
	percent, within := thermal.AsymmetryDissatisfied(source, math.Abs(v.Number))
	if !within {
		return unknown("the radiant asymmetry is beyond the range of the formula of ISO 7730")
	}
	return known(percent)
}

// beam returns the direct sun in W/m², on a plane that faces it, that with its share of the sky makes
// up the condition's sun on the glazing: the sun stands square before the glazing at an altitude, and
// the sky gives the fifth of it that ASHRAE 55 reckons with. An assumption of our own. It is unknown
// where the sun cannot stand so, and where it would have to be stronger than beyond the air.
func (b *Balance) beam(altitudeDeg float64) Value {
	altitude, tilt := altitudeDeg*math.Pi/180, b.TiltDeg*math.Pi/180
	direct := float64(math.Sin(altitude)*math.Cos(tilt)) + float64(math.Cos(altitude)*math.Sin(tilt))
	if direct <= grazing {
		return unknown("sun of that altitude does not strike a glazing of this tilt")
	}
	beam := b.Condition.SunWM2 / (direct + float64(thermal.DiffuseShare*(1+math.Cos(tilt))/2))
	if beam > solarConstant {
		return unknown("the condition's sun on the glazing needs direct sun of more than 1361 W/m²")
	}
	return known(beam)
}

const (
	grazing       = 1e-6   // cosine of incidence up to which the sun does not strike
	solarConstant = 1361.0 // W/m², of the sun beyond the air (ISO 9845-1 and later; from memory)
)

// sunOn returns what the transmitted sun of a condition does to the person.
func (r *Rating) sunOn(b *Balance, get func(thermal.SolarLoad) float64) Value {
	switch why := b.why(); {
	case why != "":
		return unknown(why)
	case b.Condition.SunWM2 == 0:
		return unknown("the condition has no sun")
	}
	p := r.Method.Person()
	beam := b.beam(p.SunAltitudeDeg)
	if !beam.Known {
		return beam
	}
	load, err := thermal.SunOnPerson{AltitudeDeg: p.SunAltitudeDeg, FromFrontDeg: p.SunFromFrontDeg, BeamWM2: beam.Number,
		Transmittance: r.Solar.Transmittance.Number, SkyShare: p.SkyShare, BodyShare: p.BodyShare, Absorptivity: p.Absorptivity,
		FloorReflectance: p.FloorReflectance, Standing: p.Standing}.Load()
	if err != nil {
		return unknown(err.Error())
	}
	return known(get(load))
}

// consequenceFigures are those of moisture and comfort.
func consequenceFigures() []BalanceFigure {
	const moisture, comfort, sun = "EN ISO 13788", "ISO 7730", "ASHRAE 55, C"
	return []BalanceFigure{
		{Figure: Figure{Key: "moisture.temperature_factor", Alias: "temperature_factor", Symbol: "fRsi", Places: 3, Clause: moisture, Meaning: "temperature factor of the room-side surface, without sun"},
			Of: dark(func(_ *Rating, b *Balance) float64 {
				at := &b.Dark.Surroundings
				return thermal.TemperatureFactor(b.roomSideK(), at.OutsideK, at.InsideK)
			}, "indoor and outdoor air have one temperature")},
		{Figure: Figure{Key: "moisture.dew_point_c", Alias: "dew_point", Symbol: "θd", Unit: "°C", Places: 1, Clause: moisture, Meaning: "dew or frost point of the room's air"},
			Of: func(_ *Rating, b *Balance, _ int) Value {
				v := b.dewPoint()
				v.Number = celsius(v.Number)
				return v
			}},
		{Figure: Figure{Key: "moisture.condensing_rh", Above1: "never", Alias: "condensing_rh", Symbol: "φsi", Places: 2, Clause: moisture, Meaning: "room humidity at which the room-side surface begins to condense, without sun"},
			Of: dark(func(_ *Rating, b *Balance) float64 {
				return thermal.CondensingHumidity(b.roomSideK(), b.Dark.Surroundings.InsideK)
			})},
		{Figure: Figure{Key: "moisture.edge_temperature_c", Alias: "edge_temperature", Symbol: "θedge", Unit: "°C", Places: 1, Clause: "estimate", Meaning: "room-side temperature at the edge, by the factor or ψ that was typed"},
			Of: edge(func(_ *Balance, edgeK float64) float64 { return celsius(edgeK) })},
		{Figure: Figure{Key: "moisture.edge_condensing_rh", Above1: "never", Alias: "edge_condensing_rh", Symbol: "φedge", Places: 2, Clause: "estimate", Meaning: "room humidity at which the edge begins to condense"},
			Of: edge(func(b *Balance, edgeK float64) float64 {
				return thermal.CondensingHumidity(edgeK, b.Dark.Surroundings.InsideK)
			})},
		{Figure: Figure{Key: "moisture.outside_condensing_rh", Above1: "never", Alias: "outside_condensing_rh", Symbol: "φse", Places: 2, Clause: moisture, Meaning: "outdoor humidity at which the outside surface begins to condense, without sun"},
			Of: dark(func(_ *Rating, b *Balance) float64 {
				return thermal.CondensingHumidity(b.Dark.SurfaceK[0], b.Dark.Surroundings.OutsideK)
			})},
		{Figure: Figure{Key: "comfort.asymmetry_k", Alias: "asymmetry", Symbol: "Δtpr", Unit: "K", Places: 1, Clause: comfort, Meaning: "radiant asymmetry in front of the glass; below 0 where it is warm"},
			Of: func(r *Rating, b *Balance, _ int) Value { return r.asymmetry(b) }},
		{Figure: Figure{Key: "comfort.asymmetry_dissatisfied_pct", Alias: "asymmetry_dissatisfied", Symbol: "PDpr", Unit: "%", Places: 1, Clause: comfort, Meaning: "people dissatisfied by that asymmetry"},
			Of: func(r *Rating, b *Balance, _ int) Value {
				return r.dissatisfied(b)
			}},
		{Figure: Figure{Key: "comfort.downdraught_m_s", Alias: "downdraught", Symbol: "vf", Unit: "m/s", Places: 2, Clause: "Manz and Frank 2003", Meaning: "air speed near the floor by the cold glass"},
			Of: draughts(func(p Person, dropK float64) float64 {
				return thermal.ManzFrank.Velocity(p.GlassHeightM, dropK, p.DistanceM)
			})},
		{Figure: Figure{Key: "comfort.downdraught_cooling_k", Alias: "downdraught_cooling", Symbol: "Δtf", Unit: "K", Places: 1, Clause: "Manz and Frank 2003", Meaning: "by how much that air is colder than the room"},
			Of: draughts(func(p Person, dropK float64) float64 { return thermal.FloorCooling(dropK, p.DistanceM) })},
		{Figure: Figure{Key: "comfort.sun_field_w_m2", Alias: "sun_field", Symbol: "ERF", Unit: "W/m²", Places: 1, Clause: sun, Meaning: "effective radiant field of the sun on a person"},
			Of: func(r *Rating, b *Balance, _ int) Value {
				return r.sunOn(b, func(l thermal.SolarLoad) float64 { return l.EffectiveRadiantFieldWM2 })
			}},
		{Figure: Figure{Key: "comfort.sun_radiant_rise_k", Alias: "sun_radiant_rise", Symbol: "Δtmr", Unit: "K", Places: 1, Clause: sun, Meaning: "rise of the mean radiant temperature by the sun"},
			Of: func(r *Rating, b *Balance, _ int) Value {
				return r.sunOn(b, func(l thermal.SolarLoad) float64 { return l.RadiantRiseK })
			}},
	}
}

// stressFigures are those of the screening for thermal stress, by pane.
func stressFigures() (list []Figure) {
	value := func(get func(s *Stress) float64) func(*Rating, int) Value {
		return func(r *Rating, i int) Value {
			if i >= len(r.Stress) {
				return unknown("thermal stress was not screened")
			}
			return known(get(&r.Stress[i])).orNot(r.Stress[i].Why)
		}
	}
	text := func(get func(s *Stress) string) func(*Rating, int) string {
		return func(r *Rating, i int) string {
			if i >= len(r.Stress) || r.Stress[i].Why != "" {
				return ""
			}
			return get(&r.Stress[i])
		}
	}
	const clause = "screening; EN 572-1"
	return []Figure{
		{Key: "thermal_stress.#.drop_k", Alias: "stress_drop", Symbol: "ΔTs", Unit: "K", Places: 0, Per: PerPane, Clause: clause,
			Meaning: "difference of the sunlit middle to the shaded edge, worst condition", Value: value(func(s *Stress) float64 { return s.DropK })},
		{Key: "thermal_stress.#.stress_mpa", Alias: "stress", Symbol: "σ", Unit: "MPa", Places: 0, Per: PerPane, Clause: clause,
			Meaning: "tension at the edge by that difference", Value: value(func(s *Stress) float64 { return s.StressMPa })},
		{Key: "thermal_stress.#.centre_c", Alias: "stress_centre", Symbol: "θc", Unit: "°C", Places: 0, Per: PerPane, Clause: clause,
			Meaning: "temperature of the sunlit middle then", Value: value(func(s *Stress) float64 { return s.CentreC })},
		{Key: "thermal_stress.#.guide_k", Alias: "stress_guide", Symbol: "ΔTg", Unit: "K", Places: 0, Per: PerPane, Clause: clause,
			Meaning: "guide value of the difference for the heat treatment", Value: value(func(s *Stress) float64 { return s.GuideK })},
		{Key: "thermal_stress.#.against_guide", Alias: "stress_word", Per: PerPane, Clause: clause,
			Meaning: "below, near or above the guide value", Text: text(func(s *Stress) string { return string(s.Word) })},
		{Key: "thermal_stress.#.condition", Alias: "stress_condition", Per: PerPane, Clause: clause,
			Meaning: "the worst condition", Text: text(func(s *Stress) string { return s.Condition })},
	}
}
