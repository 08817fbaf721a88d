package glazing

// The working of what follows from the temperatures of balances: moisture, comfort, thermal stress.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/thermal"
)

const (
	clauseMoisture = "EN ISO 13788"
	clauseComfort  = "ISO 7730"
)

// balanceFigure returns a figure of a balance by its key.
func (r *Rating) balanceFigure(b *Balance, key string) Value {
	for _, f := range BalanceFigures() {
		if f.Key == key {
			return f.Of(r, b, 0)
		}
	}
	return unknown("there is no figure " + key)
}

// workMoisture writes out condensation at the surfaces of a condition, without sun.
func workMoisture(r *Rating, b *Balance) Chapter {
	c := b.chapter("moisture, without sun")
	at := &b.Dark.Surroundings
	outC, inC := b.Condition.OutsideC, b.Condition.InsideC
	room, face := celsius(b.roomSideK()), celsius(b.Dark.SurfaceK[0])
	number := 2 * b.Dark.Sheets
	c.Note = fmt.Sprintf("θsi is that of surface %d, θse that of surface 1. A humidity above 1 is never reached.", number)
	if f := r.balanceFigure(b, "moisture.temperature_factor"); f.Known {
		c.step("fRsi", "temperature factor of the room-side surface", "(θsi − θe)/(θi − θe)", "("+minus(room, outC)+")/("+minus(inC, outC)+")", f.Number, "", clauseMoisture)
	} else {
		c.lack("fRsi", f.Why)
	}
	air := thermal.SaturationPressure(at.InsideK)
	c.saturation("pi", "saturation in the air of the room, θi", inC)
	if dew := r.balanceFigure(b, "moisture.dew_point_c"); dew.Known {
		c.dewPoint(b.Condition.InsideHumidity.Number, air, dew.Number)
	} else {
		c.lack("θd", dew.Why)
	}
	c.saturation("psi", "saturation at the room-side surface, θsi", room)
	c.step("φsi", "room humidity at which it begins to condense", "psi/pi", put(thermal.SaturationPressure(b.roomSideK()))+"/"+put(air),
		r.balanceFigure(b, "moisture.condensing_rh").Number, "", clauseMoisture)
	c.edge(r, b, air)
	c.saturation("pe", "saturation in the air outside, θe", outC)
	c.saturation("pse", "saturation at the outside surface, θse", face)
	c.step("φse", "outdoor humidity at which it begins to condense", "pse/pe", put(thermal.SaturationPressure(b.Dark.SurfaceK[0]))+"/"+put(thermal.SaturationPressure(at.OutsideK)),
		r.balanceFigure(b, "moisture.outside_condensing_rh").Number, "", clauseMoisture)
	return c
}

// saturation writes out the pressure of saturated vapour at a temperature in °C, over water or ice.
func (c *Chapter) saturation(symbol, meaning string, t float64) {
	a, b, over := "17.269", "237.3", ""
	if t < 0 {
		a, b, over = "21.875", "265.5", ", over ice"
	}
	c.step(symbol, meaning+over, "610.5·exp("+a+"·θ/("+b+" + θ))", "610.5·exp("+a+"·"+put(t)+"/("+b+" + "+put(t)+"))",
		thermal.SaturationPressure(t+thermal.ZeroCelsius), "Pa", clauseMoisture)
}

// dewPoint writes out the dew or frost point of air of a relative humidity and a pressure of
// saturation.
func (c *Chapter) dewPoint(humidity, saturated, dewC float64) {
	vapour := humidity * saturated
	c.step("pv", "vapour in the air of the room", "φ·pi", put(humidity)+"·"+put(saturated), vapour, "Pa", clauseMoisture)
	x := math.Log(vapour / 610.5)
	c.step("L", "its logarithm", "ln(pv/610.5)", "ln("+put(vapour)+"/610.5)", x, "", clauseMoisture)
	a, b, meaning := "17.269", "237.3", "dew point of the room's air"
	if x < 0 {
		a, b, meaning = "21.875", "265.5", "frost point of the room's air"
	}
	c.step("θd", meaning, b+"·L/("+a+" − L)", b+"·"+put(x)+"/("+a+" − "+put(x)+")", dewC, "°C", clauseMoisture)
}

// edge writes out the room-side surface at the edge, where the user says something of it.
func (c *Chapter) edge(r *Rating, b *Balance, air float64) {
	f, t := r.edgeFactor(b.U), r.balanceFigure(b, "moisture.edge_temperature_c")
	if !t.Known {
		c.lack("θedge, φedge", t.Why)
		return
	}
	const clause = "estimate"
	e := r.Makeup.Edge
	formula, numbers := "typed by the user", put(f.Number)
	if !e.TemperatureFactor.Known {
		band, inside := put(thermal.EdgeBandM), put(thermal.InsideResistanceM2KW)
		formula = "1 − (U + ψ/" + band + ")·" + inside
		numbers = fmt.Sprintf("1 − (%s + %s/%s)·%s", putFor(b.U.Number, f.Number), putFor(e.PsiWMK.Number, f.Number), band, inside)
		c.remark(fmt.Sprintf("The edge is an estimate of our own: ψ is spread over a band of %s m, with an inside resistance of %s m²·K/W.", band, inside))
	}
	c.step("fedge", "temperature factor of the edge", formula, numbers, f.Number, "", clause)
	x := b.Condition
	c.step("θedge", "room-side temperature at the edge", "θe + fedge·(θi − θe)",
		putFor(x.OutsideC, t.Number)+" + "+putFor(f.Number, t.Number)+"·("+minus(x.InsideC, x.OutsideC)+")", t.Number, "°C", clause)
	c.saturation("pedge", "saturation there", t.Number)
	c.step("φedge", "room humidity at which it begins to condense", "pedge/pi", put(thermal.SaturationPressure(t.Number+thermal.ZeroCelsius))+"/"+put(air),
		r.balanceFigure(b, "moisture.edge_condensing_rh").Number, "", clause)
}

// workComfort writes out what a person near the glass feels, with the sun of the condition.
func workComfort(r *Rating, b *Balance) Chapter {
	c := b.chapter("comfort near the glass")
	if why := b.why(); why != "" {
		c.lack("Δtpr, vf, ERF", why)
		return c
	}
	p := r.Method.Person()
	posture, from := "seated", "assumed, common practice, no source"
	if p.Standing {
		posture = "standing"
	}
	if r.Method.Options.Person != nil {
		from = "as the project has it"
	}
	c.Note = fmt.Sprintf("Who feels it (%s): %s %s m in front of the middle of a glazing %s m wide and %s m high; all else is at Tri.",
		from, posture, plain(p.DistanceM), plain(p.GlassWidthM), plain(p.GlassHeightM))
	c.asymmetry(r, b, p)
	c.downdraught(r, b, p)
	if b.Condition.SunWM2 > 0 {
		c.sunOn(r, b, p)
	}
	return c
}

// asymmetry writes out the radiant asymmetry in front of the glass.
func (c *Chapter) asymmetry(r *Rating, b *Balance, p Person) {
	x, y := p.GlassWidthM/2/p.DistanceM, p.GlassHeightM/2/p.DistanceM
	view := thermal.RectangleViewFactor(p.GlassWidthM, p.GlassHeightM, p.DistanceM)
	face, room := b.Lit.SurfaceK[2*b.Lit.Sheets-1], b.Lit.Surroundings.InsideRadiantK
	plane := thermal.PlaneRadiant(view, face, room)
	uneven := r.balanceFigure(b, "comfort.asymmetry_k").Number
	const viewed = "ISO 7726, C"
	c.step("x", "half width to distance", "w/2/d", put(p.GlassWidthM)+"/2/"+put(p.DistanceM), x, "", viewed)
	c.step("y", "half height to distance", "h/2/d", put(p.GlassHeightM)+"/2/"+put(p.DistanceM), y, "", viewed)
	half := func(x, y string) string {
		return fmt.Sprintf("%s/(1 + %s^2)^(1/2)·atan(%s/(1 + %s^2)^(1/2))", x, x, y, x)
	}
	c.step("F", "view factor of the glass, from the person", "("+half("x", "y")+" + "+half("y", "x")+")/90",
		"("+half(put(x), put(y))+" + "+half(put(y), put(x))+")/90", view, "", viewed)
	c.step("Tpr", "plane radiant temperature towards the glass", fmt.Sprintf("(F·T%d^4 + (1 − F)·Tri^4)^(1/4)", 2*b.Lit.Sheets),
		fmt.Sprintf("(%s·%s^4 + (1 − %s)·%s^4)^(1/4)", put(view), put(face), put(view), put(room)), plane, "K", viewed)
	c.step("Δtpr", "radiant asymmetry, below 0 where the glass is warm", "Tri − Tpr", minus(room, plane), uneven, "K", clauseComfort)

	dissatisfied := r.dissatisfied(b)
	if !dissatisfied.Known {
		c.lack("PDpr", dissatisfied.Why)
		return
	}
	source, _ := b.radiantSource(uneven)
	terms := map[thermal.RadiantSource]struct{ as, inner, less string }{
		thermal.CoolWall: {"a cool wall", "6.61 − 0.345·", ""}, thermal.WarmWall: {"a warm wall", "3.72 − 0.052·", " − 3.5"},
		thermal.CoolCeiling: {"a cool ceiling", "9.93 − 0.5·", ""}, thermal.WarmCeiling: {"a warm ceiling", "2.84 − 0.174·", " − 5.5"},
	}[source]
	by := func(size string) string { return "max(0, 100/(1 + exp(" + terms.inner + size + "))" + terms.less + ")" }
	sign := ""
	if uneven < 0 {
		sign = "−"
	}
	c.step("PDpr", "people dissatisfied by it, as by "+terms.as, by("("+sign+"Δtpr)"), by(put(math.Abs(uneven))), dissatisfied.Number, "%", clauseComfort)
}

// downdraught writes out the air that falls along cold glass.
func (c *Chapter) downdraught(r *Rating, b *Balance, p Person) {
	const clause = "Manz and Frank 2003"
	inC, face := b.Condition.InsideC, celsius(b.Lit.SurfaceK[2*b.Lit.Sheets-1])
	speed, cooling := r.balanceFigure(b, "comfort.downdraught_m_s").Number, r.balanceFigure(b, "comfort.downdraught_cooling_k").Number
	if !b.upright() {
		c.lack("vf, Δtf", notUpright)
		return
	}
	if face >= inC {
		c.remark("The glass is not colder than the air of the room: no air falls along it.")
		return
	}
	c.remark("Downdraught is that of a flat wall as high as the glazing, without sill or heater below it, near the floor at the person's distance.")
	drop := "(" + minus(inC, face) + ")"
	formula, numbers := "0.143/(d + 1.32)", "0.143/("+put(p.DistanceM)+" + 1.32)"
	switch {
	case p.DistanceM < 0.4:
		formula, numbers = "0.083", "0.083"
	case p.DistanceM > 2:
		formula, numbers = "0.043", "0.043"
	}
	c.step("vf", "largest mean air speed near the floor", formula+"·(h·(θi − θsi))^(1/2)", numbers+"·("+put(p.GlassHeightM)+"·"+drop+")^(1/2)", speed, "m/s", clause)
	formula, numbers = "d", put(p.DistanceM)
	if p.DistanceM > 2 {
		formula, numbers = "2", "2"
	}
	c.step("Δtf", "by how much that air is colder than the room", "(0.3 − 0.034·"+formula+")·(θi − θsi)", "(0.3 − 0.034·"+numbers+")·"+drop, cooling, "K", clause)
}

// sunOn writes out what transmitted sun does to a person.
func (c *Chapter) sunOn(r *Rating, b *Balance, p Person) {
	const clause, unit = "ASHRAE 55, C", "W/m²"
	load := func(get func(thermal.SolarLoad) float64) Value { return r.sunOn(b, get) }
	field := load(func(l thermal.SolarLoad) float64 { return l.EffectiveRadiantFieldWM2 })
	if !field.Known {
		c.lack("ERF, Δtmr", field.Why)
		return
	}
	area := "0.696" // effective radiating area, as a part of that of the body
	if p.Standing {
		area = "0.725"
	}
	c.remark(fmt.Sprintf("The sun of the condition is direct sun Eb, square before the glazing and %s° high, with the fifth of it that the whole sky gives; it stands %s° from where the person faces. fsky %s is the share of the sky seen through the glass, fbody %s that of the body struck, absorbed %s, floor %s reflected there. τe is that of normal incidence.",
		plain(p.SunAltitudeDeg), plain(p.SunFromFrontDeg), plain(p.SkyShare), plain(p.BodyShare), plain(p.Absorptivity), plain(p.FloorReflectance)))
	direct := b.beam(p.SunAltitudeDeg).Number
	beam, tau, altitude, tilt := put(direct), put(r.Solar.Transmittance.Number), put(p.SunAltitudeDeg), put(b.TiltDeg)
	projected := load(func(l thermal.SolarLoad) float64 { return l.ProjectedArea }).Number
	onBody := [...]float64{load(func(l thermal.SolarLoad) float64 { return l.Diffuse }).Number, load(func(l thermal.SolarLoad) float64 { return l.Direct }).Number,
		load(func(l thermal.SolarLoad) float64 { return l.Reflected }).Number}
	c.step("Eb", "direct sun, on a plane that faces it", "E/(sin(alt)·cos(tilt) + cos(alt)·sin(tilt) + 0.2·(1 + cos(tilt))/2)",
		fmt.Sprintf("%s/(sin(%s)·cos(%s) + cos(%s)·sin(%s) + 0.2·(1 + cos(%s))/2)", put(b.Condition.SunWM2), altitude, tilt, altitude, tilt, tilt), direct, unit, "our own assumption")
	c.step("fp", "projected area, of the appendix's table", "by altitude and direction", put(projected), projected, "", clause)
	c.step("Edif", "diffuse sun on the body", area+"·fsky/2·τe·0.2·Eb", area+"·"+put(p.SkyShare)+"/2·"+tau+"·0.2·"+beam, onBody[0], unit, clause)
	c.step("Edir", "direct sun on the body", area+"·fp·fbody·τe·Eb", area+"·"+put(projected)+"·"+put(p.BodyShare)+"·"+tau+"·"+beam, onBody[1], unit, clause)
	c.step("Eref", "sun from the floor on the body", area+"·fsky/2·τe·(Eb·sin(alt) + 0.2·Eb)·floor",
		fmt.Sprintf("%s·%s/2·%s·(%s·sin(%s) + 0.2·%s)·%s", area, put(p.SkyShare), tau, beam, altitude, beam, put(p.FloorReflectance)), onBody[2], unit, clause)
	c.step("ERF", "effective radiant field", "(Edif + Edir + Eref)·absorbed/0.95", fmt.Sprintf("(%s + %s + %s)·%s/0.95", put(onBody[0]), put(onBody[1]), put(onBody[2]), put(p.Absorptivity)), field.Number, unit, clause)
	c.step("Δtmr", "rise of the mean radiant temperature", "ERF/(6·"+area+")", put(field.Number)+"/(6·"+area+")",
		load(func(l thermal.SolarLoad) float64 { return l.RadiantRiseK }).Number, "K", clause)
}

// workStress writes out the screening of every pane for thermal stress.
func workStress(r *Rating) Chapter {
	c := Chapter{Title: "Thermal stress, a screening"}
	options := r.Method.Stress()
	var told []string // conditions
	for k := range r.Stress {
		s := &r.Stress[k]
		number := strconv.Itoa(k + 1)
		if s.Why != "" {
			c.lack("pane "+number, s.Why)
			continue
		}
		if c.Rows == nil {
			c.Rows = &Rows{Head: []string{"pane", "heat treatment", "worst condition", "ΔT, K", "guide, K", "is"}}
		}
		treatment := string(r.Makeup.Panes[k].Pane.HeatTreatment)
		if treatment == "" {
			treatment = string(UnknownTreatment)
		}
		c.Rows.add(number, treatment, s.Condition, PrintRounded(s.DropK, 1), put(s.GuideK), string(s.Word))
		b, err := r.stressBalance(s.Condition)
		if err != nil { // it was solved before
			c.lack("pane "+number, err.Error())
			continue
		}
		if text := b.Condition.ID + ", " + b.Condition.inWords(); !slices.Contains(told, text) {
			told = append(told, text)
		}
		mean := func(state *thermal.Balance) (formula, numbers string) {
			o := 2 * k
			return fmt.Sprintf("(θ%d + θ%d)/2", o+1, o+2), "(" + put(celsius(state.SurfaceK[o])) + " + " + put(celsius(state.SurfaceK[o+1])) + ")/2"
		}
		const clause = "screening"
		formula, numbers := mean(&b.Lit)
		c.step("θc"+number, "middle of pane "+number+", with sun", formula, numbers, s.CentreC, "°C", clause)
		formula, numbers = mean(&b.Dark)
		if options.FrameMarginK != 0 {
			formula, numbers = formula+" − margin of the frame", numbers+" − "+put(options.FrameMarginK)
		}
		c.step("θr"+number, "its edge, as the pane without sun", formula, numbers, s.EdgeC, "°C", clause)
		c.step("ΔTs"+number, "difference", "θc"+number+" − θr"+number, minus(s.CentreC, s.EdgeC), s.DropK, "K", clause)
		c.step("σ"+number, "tension at the edge", "k·E·α·ΔTs"+number, fmt.Sprintf("%s·%s·%s·%s", put(options.Factor), put(thermal.GlassModulusMPa), put(thermal.GlassExpansionPerK), put(s.DropK)),
			s.StressMPa, "MPa", "EN 572-1")
	}
	if c.Rows != nil {
		c.Note = fmt.Sprintf("The worst of the sunny conditions for each pane: %s. The shaded edge is taken as the same pane without sun. Guide values (from memory) are for worked edges; a pane of unknown treatment is held to that of annealed glass. From %s of the guide value on a pane is near it. No design: discuss what is near or above with a licensed engineer.",
			strings.Join(told, "; "), put(thermal.NearGuideFrom))
	} else if c.lacking == nil {
		c.remark("It was not screened for.")
	}
	return c
}

// stress returns how thermal stress is screened.
func (m *Method) Stress() StressScreening {
	if m.Options.Stress != nil {
		return *m.Options.Stress
	}
	return StressScreening{Factor: 1}
}

// stressBalance returns the balance of a condition that stress was screened for: solved anew where
// it is not among those of the rating.
func (r *Rating) stressBalance(condition string) (*Balance, error) {
	if b := r.Balance(condition); b != nil {
		return b, nil
	}
	var b Balance
	for i := range r.Method.screened {
		if c := &r.Method.screened[i]; c.ID == condition {
			return &b, r.Ready.balance(&b, r, c)
		}
	}
	return nil, fmt.Errorf("there is no condition %s", condition)
}
