package glazing

// The working of detailed heat balances: what they share, and of each condition its surroundings, the
// state of the surfaces, U and g. Files working_balance_*.go write gaps, gases and the two sides.
//
// The solver finds the temperatures. Here they are put into each formula, and the heat that arrives at
// every surface is added up.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/thermal"
)

const clauseBalance = "ISO 15099"

// workBalances writes out every balance of a rating.
func workBalances(r *Rating) []Chapter {
	if len(r.Balances) == 0 {
		return nil
	}
	if why := r.Balances[0].Why; why != "" { // one reason for all conditions
		c := Chapter{Title: "Detailed balances"}
		for i := range r.Balances {
			c.lack("U, g and temperatures under "+r.Balances[i].Condition.ID, why)
		}
		return []Chapter{c}
	}
	out := []Chapter{workSheets(r)}
	for i := range r.Balances {
		out = append(out, newBalanceWork(r, &r.Balances[i]).chapters()...)
		if r.Method.Basis.Balances() && r.Balances[i].Condition.ID == Summer { // the last of the basis
			out = append(out, workBasisHeat(r))
		}
	}
	return out
}

// balanceWork is the working of one balance: of the state with the condition's sun where there is one,
// else of that without.
type balanceWork struct {
	r      *Rating
	b      *Balance
	state  *thermal.Balance
	sunny  bool // the state is that with the sun
	opaque bool // no sheet passes infrared
}

func newBalanceWork(r *Rating, b *Balance) *balanceWork {
	w := &balanceWork{r: r, b: b, state: &b.Dark, opaque: r.opaque()}
	if b.Condition.SunWM2 > 0 && b.LitWhy == "" {
		w.state, w.sunny = &b.Lit, true
	}
	return w
}

// infraredTau returns the transmittance of pane k in the thermal infrared.
func (r *Rating) infraredTau(k int) float64 {
	return r.Makeup.Panes[k].Pane.infraredTau(r.Ready.States[r.State].Tints[k])
}

func (r *Rating) opaque() bool {
	for k := range r.Makeup.Panes {
		if r.infraredTau(k) > 0 {
			return false
		}
	}
	return true
}

func (w *balanceWork) chapters() []Chapter {
	out := []Chapter{w.surroundings(), w.surfaces()}
	if !w.opaque {
		out = append(out, w.radiosities())
	}
	out = append(out, w.outside())
	for k := range w.r.Makeup.Gaps {
		out = append(out, w.gap(k)...)
	}
	out = append(out, w.room())
	if w.sunny {
		out = append(out, w.dark())
	}
	return append(out, w.figures(), workMoisture(w.r, w.b), workComfort(w.r, w.b))
}

// chapter begins a chapter of the condition.
func (w *balanceWork) chapter(title string) Chapter { return w.b.chapter(title) }

func (b *Balance) chapter(title string) Chapter {
	return Chapter{Title: "Condition " + b.Condition.ID + ": " + title}
}

// An end is a temperature of an exchange, with its symbol.
type end struct {
	symbol string
	k      float64
}

// face returns surface i, from 0.
func (w *balanceWork) face(i int) end { return end{fmt.Sprintf("T%d", i+1), w.state.SurfaceK[i]} }

// differs writes a − b of two temperatures in formula and numbers.
func differs(a, b end) (formula, numbers string) {
	return a.symbol + " − " + b.symbol, minus(a.k, b.k)
}

// emissivitySymbol names the emissivity of surface i, from 0, that enters balances.
func (r *Rating) emissivitySymbol(i int) string {
	if e := &r.Surfaces[i]; e.Balanced() != e.Corrected {
		return fmt.Sprintf("εh%d", i+1)
	}
	return fmt.Sprintf("ε%d", i+1)
}

// workSheets shows what all balances of a rating share: emissivities, resistances, constants.
func workSheets(r *Rating) Chapter {
	c := Chapter{Title: "Detailed balances: panes and constants",
		Note: fmt.Sprintf("By ISO 15099 every surface takes up as much heat as it gives; the temperatures for which it does are solved for, in K. Fluxes count from outside to inside, angles are in degrees. σ is %s W/(m²·K^4), R %s J/(kmol·K), p %s Pa, g %s m/s^2.",
			put(thermal.StefanBoltzmann4), put(thermal.GasConstant), put(thermal.Pressure), put(thermal.Gravity)),
		Rows: &Rows{Head: []string{"surface", "emissivity", "value", "which"}}}
	opaque := r.opaque()
	if !opaque {
		c.Rows.Head = append(c.Rows.Head, "infrared τ")
	}
	for i := range r.Surfaces {
		which := "corrected"
		if e := &r.Surfaces[i]; e.Balanced() != e.Corrected {
			which = "exact integral over angle"
		}
		cells := []string{strconv.Itoa(i + 1), r.emissivitySymbol(i), put(r.Surfaces[i].Balanced().Number), which}
		if !opaque {
			cells = append(cells, put(r.infraredTau(i/2)))
		}
		c.Rows.add(cells...)
	}
	if r.Method.Basis.Balances() || !r.U.Known { // else they stand with U
		c.Steps = workGlass(r, clauseBalance)
	}
	return c
}

// surroundings shows what the glazing stands between.
func (w *balanceWork) surroundings() Chapter {
	x, at := w.b.Condition, &w.state.Surroundings
	c := w.chapter("surroundings")
	switch {
	case w.sunny:
		c.remark(fmt.Sprintf("Written out with %s W/m² of sun.", put(x.SunWM2)))
	case x.SunWM2 > 0:
		c.remark("Written out without sun, of which it is not known what panes absorb and pass.")
	default:
		c.remark("There is no sun.")
	}
	c.remark(fmt.Sprintf("Tilt %s°, where 90 is upright and 0 level with the outside above; height %s m.", put(at.TiltDeg), put(at.HeightM)))
	kelvin := func(symbol, meaning string, celsius, k float64) {
		c.step(symbol, meaning, "θ + 273.15", put(celsius)+" + "+put(thermal.ZeroCelsius), k, "K", "definition")
	}
	kelvin("Te", "air outside", x.OutsideC, at.OutsideK)
	kelvin("Ti", "air inside", x.InsideC, at.InsideK)
	var same []string
	switch {
	case x.SkyC.Known:
		rest := x.OutsideRadiantC.or(x.OutsideC)
		sky := (1 + math.Cos(at.TiltDeg*math.Pi/180)) / 2
		skyK, restK := x.SkyC.Number+thermal.ZeroCelsius, rest+thermal.ZeroCelsius
		kelvin("Tsky", "radiant temperature of the sky", x.SkyC.Number, skyK)
		kelvin("Tgr", "radiant temperature of ground and buildings", rest, restK)
		c.step("Fsky", "share of the sky in what surface 1 sees", "(1 + cos(tilt))/2", "(1 + cos("+put(at.TiltDeg)+"))/2", sky, "", "geometry")
		c.step("Tre", "radiant temperature outside", "(Fsky·Tsky^4 + (1 − Fsky)·Tgr^4)^(1/4)",
			fmt.Sprintf("(%s·%s^4 + (1 − %s)·%s^4)^(1/4)", put(sky), put(skyK), put(sky), put(restK)), at.OutsideRadiantK, "K", clauseBalance)
	case x.OutsideRadiantC.Known:
		kelvin("Tre", "radiant temperature outside", x.OutsideRadiantC.Number, at.OutsideRadiantK)
	default:
		same = append(same, "Tre is Te")
	}
	if x.InsideRadiantC.Known {
		kelvin("Tri", "radiant temperature inside", x.InsideRadiantC.Number, at.InsideRadiantK)
	} else {
		same = append(same, "Tri is Ti")
	}
	if same != nil {
		c.remark("What radiates is as warm as the air: " + strings.Join(same, ", ") + ".")
	}
	return c
}

// heatAt is the heat in W/m² that arrives at a surface.
type heatAt struct{ convected, radiated, sun, conducted float64 }

func (h heatAt) sum() float64 { return h.convected + h.radiated + h.sun + h.conducted }

// heat returns what arrives at surface i, from 0.
func (w *balanceWork) heat(i int) heatAt {
	s, k := w.state, i/2
	h := heatAt{radiated: s.AbsorbedWM2[i], sun: s.SunWM2[i], convected: w.exchange(k).ConvectedWM2, conducted: -s.ConductedWM2[k]}
	if i%2 == 1 {
		h.convected, h.conducted = -w.exchange(k+1).ConvectedWM2, s.ConductedWM2[k]
	}
	return h
}

// exchange returns that outside pane k, from 0; of as many as there are panes that with the room.
func (w *balanceWork) exchange(k int) *thermal.Exchange {
	switch k {
	case 0:
		return &w.state.Outside
	case w.state.Sheets:
		return &w.state.Room
	}
	return &w.state.Gaps[k-1]
}

// Decimals of the tables.
const (
	celsiusPlaces = 6
	fluxPlaces    = 4
)

// surfaces shows the temperature of every surface and the heat that arrives there.
func (w *balanceWork) surfaces() Chapter {
	s := w.state
	c := w.chapter("surfaces")
	c.remark(fmt.Sprintf("Heat that arrives at each surface, in W/m²: from its gap or its surroundings by convection and by radiation, and through its pane. The sum is what the solver left: at most %s W/m² after %d steps.",
		strconv.FormatFloat(s.ResidualWM2, 'g', 2, 64), s.Iterations))
	c.Rows = &Rows{Head: []string{"surface", "θ, °C", "convection", "radiation", "pane", "sum"}}
	if w.sunny {
		c.Rows.Head = slices.Insert(c.Rows.Head, 4, "sun")
		c.remark("Sun that a pane absorbs is spread evenly through it and acts at its two surfaces: by half, or as worked out below where plies differ.")
	}
	for i := range 2 * s.Sheets {
		h := w.heat(i)
		flux := func(v float64) string { return PrintRounded(v, fluxPlaces) }
		cells := []string{strconv.Itoa(i + 1), PrintRounded(celsius(s.SurfaceK[i]), celsiusPlaces), flux(h.convected), flux(h.radiated), flux(h.conducted),
			strconv.FormatFloat(h.sum(), 'g', 2, 64)}
		if w.sunny {
			cells = slices.Insert(cells, 4, flux(h.sun))
		}
		c.Rows.add(cells...)
	}
	for k := range s.Sheets {
		if w.sunny {
			w.absorbed(&c, k)
		}
		o := 2*k + 1
		c.step(fmt.Sprintf("qp%d", k+1), fmt.Sprintf("heat conducted in pane %d", k+1), fmt.Sprintf("(T%d − T%d)/Rg%d", o, o+1, k+1),
			put(s.DropK[k])+"/"+put(w.r.Ready.glass[k]), s.ConductedWM2[k], "W/m²", clauseBalance)
	}
	if w.sunny || w.b.Condition.SunWM2 == 0 {
		w.hottest(&c)
	}
	return c
}

// placedPlies returns the plies of pane k from outside.
func (w *balanceWork) placedPlies(k int) []Ply {
	p := w.r.Makeup.Panes[k]
	plies := slices.Clone(p.Pane.Plies)
	if p.Turned {
		slices.Reverse(plies)
	}
	return plies
}

// hottest writes out the highest temperature in any pane.
func (w *balanceWork) hottest(c *Chapter) {
	s, system := w.state, w.r.Ready.prepared[w.r.State].system
	k, peak := system.Hottest(s)
	sun := s.SunWM2[2*k] + s.SunWM2[2*k+1]
	flux := s.ConductedWM2[k] - s.SunWM2[2*k] // towards the inside, at the outer bound of a ply
	plies := w.placedPlies(k)
	for i, p := range system.Plies(nil, s, k) {
		absorbed := sun * plies[i].ThicknessMM / w.r.Makeup.Panes[k].Pane.ThicknessMM()
		if p.PeakK == peak {
			formula, numbers := fmt.Sprintf("at surface %d", 2*k+2), put(celsius(peak))
			switch {
			case peak > max(p.OuterK, p.InnerK):
				formula = fmt.Sprintf("θ + R·f^2/(2·a) in ply %d: θ and heat f at its outer bound, a absorbed in it", i+1)
				numbers = fmt.Sprintf("%s + %s·%s^2/(2·%s)", put(celsius(p.OuterK)), put(plies[i].resistance()), put(flux), put(absorbed))
			case i == 0 && peak == p.OuterK:
				formula = fmt.Sprintf("at surface %d", 2*k+1)
			case i < len(plies)-1:
				formula = "between two plies"
			}
			c.step("θmax", fmt.Sprintf("highest temperature, in pane %d", k+1), formula, numbers, celsius(peak), "°C", "conduction")
			return
		}
		flux += absorbed
	}
}

// absorbed writes out the sun that pane k, from 0, absorbs, and where in it that acts.
func (w *balanceWork) absorbed(c *Chapter, k int) {
	p, sun := w.r.Makeup.Panes[k], w.b.AbsorbedWM2[k]
	number := strconv.Itoa(k + 1)
	c.step("A"+number, "sun absorbed in pane "+number, "E·αe"+number, put(w.b.Condition.SunWM2)+"·"+put(w.r.Absorptance[k].Number), sun, "W/m²", clauseBalance)
	if len(p.Pane.Plies) == 1 || sun == 0 {
		return
	}
	var parts []string
	before := ""
	for _, y := range w.placedPlies(k) {
		r := put(y.ThicknessMM/1000) + "/" + put(y.ConductivityWMK)
		parts = append(parts, fmt.Sprintf("%s·(%s%s/2)", put(y.ThicknessMM), before, r))
		before += r + " + "
	}
	inner := w.state.SunWM2[2*k+1]
	c.step("f"+number, "part of it that acts at surface "+strconv.Itoa(2*k+2), "Σ d·(R of plies outside + R/2)/(Σ d·Rg"+number+")",
		fmt.Sprintf("(%s)/(%s·%s)", strings.Join(parts, " + "), put(p.Pane.ThicknessMM()), put(w.r.Ready.glass[k])), inner/sun, "", "conduction")
}

// radiosities shows the radiation of all faces where sheets pass infrared.
func (w *balanceWork) radiosities() Chapter {
	c := w.chapter("radiation of all faces")
	c.Note = "A sheet passes infrared, so that faces see one another through it. What leaves each face, J = ε·σ·T^4 + τ·H of the sheet's other face + (1 − ε − τ)·H, is solved for all faces together. H is what falls on the face: J of the one that it looks at, or σ·T^4 of the surroundings. The face takes up ε·(H − σ·T^4). All in W/m²."
	c.Rows = &Rows{Head: []string{"surface", "ε", "infrared τ", "σ·T^4", "H", "J", "takes up"}}
	flux := func(v float64) string { return PrintRounded(v, fluxPlaces) }
	for i := range 2 * w.state.Sheets {
		falls, leaves := w.radiation(i)
		c.Rows.add(strconv.Itoa(i+1), put(w.r.Surfaces[i].Balanced().Number), put(w.r.infraredTau(i/2)),
			flux(blackWM2(w.state.SurfaceK[i])), flux(falls), flux(leaves), flux(w.state.AbsorbedWM2[i]))
	}
	return c
}

// radiation returns what falls on surface i, from 0, and what leaves it, in W/m².
func (w *balanceWork) radiation(i int) (falls, leaves float64) {
	falls = blackWM2(w.state.SurfaceK[i]) + w.state.AbsorbedWM2[i]/w.r.Surfaces[i].Balanced().Number
	net := w.exchange((i + 1) / 2).RadiatedWM2 // towards the inside
	if i%2 == 0 {
		return falls, falls - net
	}
	return falls, falls + net
}

// blackWM2 is the emission of a black face.
func blackWM2(k float64) float64 { return thermal.StefanBoltzmann4 * (k * k) * (k * k) }

// dark shows the state without sun, of a condition with sun, in short.
func (w *balanceWork) dark() Chapter {
	c := w.chapter("without sun")
	d := &w.b.Dark
	c.Note = fmt.Sprintf("By the same formulas, for U and g: coefficients h in W/(m²·K), fluxes q in W/m². %d steps, largest residual %s W/m².",
		d.Iterations, strconv.FormatFloat(d.ResidualWM2, 'g', 2, 64))
	c.Rows = &Rows{Head: []string{"", "from, °C", "to, °C", "hc or hg", "hr", "qc", "qr"}}
	row := func(label string, from, to float64, e *thermal.Exchange) {
		hr := "–"
		if !math.IsNaN(e.Radiative) {
			hr = PrintRounded(e.Radiative, celsiusPlaces)
		}
		c.Rows.add(label, PrintRounded(celsius(from), fluxPlaces), PrintRounded(celsius(to), fluxPlaces), PrintRounded(e.Convective, celsiusPlaces), hr,
			PrintRounded(e.ConvectedWM2, celsiusPlaces), PrintRounded(e.RadiatedWM2, celsiusPlaces))
	}
	at := &d.Surroundings
	row("outside", at.OutsideK, d.SurfaceK[0], &d.Outside)
	for k, g := range w.r.Makeup.Gaps {
		row(fmt.Sprintf("gap %d", k+1), d.SurfaceK[2*k+1], d.SurfaceK[2*k+2], &d.Gaps[k])
		if g.Vacuum == nil && heldOnStep(&d.Gaps[k], at.HeightM/(g.WidthMM/1000)) {
			c.remark(fmt.Sprintf("Nu of gap %d was held between the two values that it has at Ra 50000.", k+1))
		}
	}
	row("room", d.SurfaceK[2*d.Sheets-1], at.InsideK, &d.Room)
	if at.OutsideRadiantK != at.OutsideK || at.InsideRadiantK != at.InsideK {
		c.remark("Outside and room exchange radiation with Tre and Tri.")
	}
	return c
}

// figures writes out U and g of the condition.
func (w *balanceWork) figures() Chapter {
	b, x, d := w.b, w.b.Condition, &w.b.Dark
	title := "U"
	if x.SunWM2 > 0 {
		title = "U and g"
	}
	c := w.chapter(title)
	dark := d.InwardWM2()
	if w.sunny {
		c.step("q0", "heat into the room without sun", "qc + qr, room", put(d.Room.ConvectedWM2)+" + "+put(d.Room.RadiatedWM2), dark, "W/m²", clauseBalance)
	}
	if b.U.Known {
		symbol := "qin"
		if w.sunny {
			symbol = "q0"
		}
		c.step("U", "thermal transmittance, without sun", symbol+"/(θe − θi)", put(dark)+"/("+minus(x.OutsideC, x.InsideC)+")", b.U.Number, "W/(m²·K)", clauseBalance)
		w.resistances(&c)
	} else {
		c.lack("U", b.U.Why)
	}
	if x.SunWM2 == 0 {
		return c
	}
	if !b.G.Known {
		c.lack("g", b.G.Why)
		return c
	}
	passed, lit := b.TransmittedWM2.Number, b.Lit.InwardWM2()
	c.step("E·τe", "sun that passes", "E·τe", put(x.SunWM2)+"·"+put(w.r.Solar.Transmittance.Number), passed, "W/m²", clauseBalance)
	c.step("g", "solar heat gain", "(E·τe + qin − q0)/E",
		fmt.Sprintf("(%s + %s − %s)/%s", putFor(passed, b.G.Number*x.SunWM2), putFor(lit, b.G.Number*x.SunWM2), putFor(dark, b.G.Number*x.SunWM2), put(x.SunWM2)), b.G.Number, "", clauseBalance)
	c.step("qi", "secondary heat towards the inside", "g − τe", minus(b.G.Number, w.r.Solar.Transmittance.Number),
		w.r.balanceFigure(b, "secondary_heat_inward").Number, "", clauseBalance)
	return c
}

// resistances writes out U again, as a series of resistances, where all heat passes one after the other.
func (w *balanceWork) resistances(c *Chapter) {
	d := &w.b.Dark
	at := &d.Surroundings
	switch {
	case !w.opaque:
		c.remark("No series of resistances has this U, for sheets pass infrared.")
		return
	case at.OutsideRadiantK != at.OutsideK || at.InsideRadiantK != at.InsideK:
		c.remark("No series of resistances has this U, for air and what radiates differ in temperature.")
		return
	}
	one := func(e *thermal.Exchange) string { return "1/(" + put(e.Convective) + " + " + put(e.Radiative) + ")" }
	formula, numbers, total := "1/(hce + hre)", one(&d.Outside), 1/d.Outside.Total()
	for k := range d.Sheets {
		formula, numbers, total = formula+fmt.Sprintf(" + Rg%d", k+1), numbers+" + "+put(w.r.Ready.glass[k]), total+w.r.Ready.glass[k]
		if k < d.Sheets-1 {
			formula, numbers, total = formula+fmt.Sprintf(" + 1/(hg + hr) of gap %d", k+1), numbers+" + "+one(&d.Gaps[k]), total+1/d.Gaps[k].Total()
		}
	}
	c.step("Rt", "resistance from air to air", formula+" + 1/(hci + hri)", numbers+" + "+one(&d.Room), total+1/d.Room.Total(), "m²·K/W", clauseBalance)
	c.step("U", "the same by resistances", "1/Rt", "1/"+put(total+1/d.Room.Total()), w.b.U.Number, "W/(m²·K)", clauseBalance)
}

// workBasisHeat takes U and g of the rating from the conditions of the basis.
func workBasisHeat(r *Rating) Chapter {
	c := Chapter{Title: "U-value and g-value of basis " + r.Method.Basis.Name}
	c.Note = "rounded: U " + PrintRounded(r.U.Number, r.Method.Basis.uPlaces) + " W/(m²·K)"
	c.step("U", "thermal transmittance", "of condition "+Winter, put(r.U.Number), r.U.Number, "W/(m²·K)", clauseBalance)
	if !r.G.Known {
		c.lack("g", r.G.Why)
		return c
	}
	g := r.G.Number
	c.step("g", "total solar energy transmittance", "of condition "+Summer, put(g), g, "", clauseBalance)
	c.step("qi", "secondary heat towards the inside", "g − τe", minus(g, r.Solar.Transmittance.Number), r.SecondaryHeat.Number, "", clauseBalance)
	c.Steps = append(c.Steps, workShading(r)...)
	return c
}
