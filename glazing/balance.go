package glazing

// Detailed heat balances of a make-up: what of it is made ready for them, and their solution under a
// condition (ISO 15099:2003).

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"panewright/spectra"
	"panewright/thermal"
)

// systemOf makes a state of the make-up ready for balances, or says why it cannot be.
func (r *Ready) systemOf(s State) (system *thermal.System, why string) {
	m := r.Makeup
	var blank []string
	var sheets []thermal.Sheet
	for k, p := range m.Panes {
		var sheet thermal.Sheet
		mm := p.Pane.ThicknessMM()
		for _, y := range p.Pane.Plies {
			sheet.Plies = append(sheet.Plies, thermal.Layer{ResistanceM2KW: y.resistance(), Share: y.ThicknessMM / mm})
		}
		if p.Turned {
			slices.Reverse(sheet.Plies)
		}
		outer, inner := p.faces(s.Tints[k])
		for i, e := range [...]Emissivity{outer, inner} {
			v := e.Balanced()
			if !v.Known {
				blank = append(blank, m.faceName(k, i == 1))
			}
			sheet.Emissivity[i] = v.Number
		}
		sheet.Transmittance = max(0, min(p.Pane.infraredTau(s.Tints[k]), 1-sheet.Emissivity[0], 1-sheet.Emissivity[1]))
		sheets = append(sheets, sheet)
	}
	if blank != nil {
		return nil, "the emissivity of " + strings.Join(blank, ", ") + " is not known"
	}
	var cavities []thermal.Cavity
	for k, g := range m.Gaps {
		c := thermal.Cavity{WidthM: g.WidthMM / 1000}
		if g.Vacuum != nil {
			v := m.vacuum(k)
			c.Vacuum = &v
		} else {
			gas, err := g.Gas.Fluid()
			if err != nil {
				return nil, fmt.Sprintf("gap %d holds %v", k+1, err)
			}
			c.Gas = gas
		}
		cavities = append(cavities, c)
	}
	system, err := thermal.NewSystem(sheets, cavities)
	if err != nil {
		return nil, err.Error()
	}
	return system, ""
}

// Balanced returns the emissivity that enters a balance: the integral over the half space where it
// follows from what the face is made of, else the corrected one.
func (e Emissivity) Balanced() Value {
	if e.Source == EmissivityComputed && e.Hemispherical.Known {
		return e.Hemispherical
	}
	return e.Corrected
}

// infraredTau returns the transmittance of a tint in the thermal infrared; 0 where it is opaque.
func (p *Pane) infraredTau(tint int) float64 {
	if p.TauInfrared > 0 {
		return p.TauInfrared
	}
	if tau := spectra.InfraredMean(p.Tints[tint].Spectrum.InfraredTau); tau > opaque {
		return tau
	}
	return 0
}

// vacuum returns evacuated gap k with the conductivity of the glass that its pillars stand on.
func (m *Makeup) vacuum(k int) thermal.Vacuum {
	g := &m.Gaps[k]
	ply := func(p Placed, last bool) float64 { // the ply next to the gap
		if last != p.Turned {
			return p.Pane.Plies[len(p.Pane.Plies)-1].ConductivityWMK
		}
		return p.Pane.Plies[0].ConductivityWMK
	}
	v := thermal.Vacuum{PressurePa: g.Vacuum.PressurePa, PillarRadiusM: g.Vacuum.PillarRadiusMM / 1000,
		PillarPitchM: g.Vacuum.PillarPitchMM / 1000, PillarHeightM: g.WidthMM / 1000,
		GlassWMK: [2]float64{ply(m.Panes[k], true), ply(m.Panes[k+1], false)}}
	if g.Vacuum.PillarWMK.Known {
		v.PillarWMK = g.Vacuum.PillarWMK.Number
	}
	return v
}

// assumedWindMS is the wind of a condition that names neither wind nor coefficient: with it the
// outdoor coefficient is 20 W/(m²·K); common practice, no source.
const assumedWindMS = 4

// usualHeightM is the height of the glazing where a condition names none (ISO 15099:2003, from memory).
const usualHeightM = 1.0

// Tilt returns the tilt in degrees that a condition puts a make-up to.
func (c *Condition) Tilt(m *Makeup) float64 {
	if c.TiltDeg.Known {
		return c.TiltDeg.Number
	}
	return m.Tilt.Degrees()
}

// OutsideConvection returns the outdoor convective coefficient in W/(m²·K), and whether a wind had to
// be assumed for it.
func (c *Condition) OutsideConvection() (coefficient float64, assumed bool) {
	switch {
	case c.OutsideConvectionWM2K.Known:
		return c.OutsideConvectionWM2K.Number, false
	case c.WindMS.Known:
		return thermal.WindConvection(c.WindMS.Number), false
	}
	return thermal.WindConvection(assumedWindMS), true
}

// Height returns the height of the glazing in m.
func (c *Condition) Height() float64 { return c.HeightM.or(usualHeightM) }

// Surroundings returns what a condition puts a glazing of a tilt between. Where the sky has a
// temperature of its own, the outside face sees it with (1 + cos tilt)/2, and the rest at the outdoor
// radiant temperature; both count by the fourth powers of their temperatures.
func (c *Condition) Surroundings(tiltDeg float64) thermal.Surroundings {
	kelvin := func(celsius float64) float64 { return celsius + thermal.ZeroCelsius }
	at := thermal.Surroundings{OutsideK: kelvin(c.OutsideC), InsideK: kelvin(c.InsideC), TiltDeg: tiltDeg, HeightM: c.Height(),
		InsideConvection: c.InsideConvectionWM2K.or(0)}
	at.OutsideConvection, _ = c.OutsideConvection()
	at.InsideRadiantK = kelvin(c.InsideRadiantC.or(c.InsideC))
	at.OutsideRadiantK = kelvin(c.OutsideRadiantC.or(c.OutsideC))
	if c.SkyC.Known {
		sky := (1 + math.Cos(tiltDeg*math.Pi/180)) / 2
		fourth := func(t float64) float64 { return t * t * t * t }
		at.OutsideRadiantK = math.Sqrt(math.Sqrt(float64(sky*fourth(kelvin(c.SkyC.Number))) + float64((1-sky)*fourth(at.OutsideRadiantK))))
	}
	return at
}

// inWords returns temperatures, convection and sun of a condition as a sentence has them.
func (c *Condition) inWords() string {
	outside, _ := c.OutsideConvection()
	inside := "natural convection"
	if c.InsideConvectionWM2K.Known {
		inside = fmt.Sprintf("convection %.6g\u00a0W/(m²·K)", c.InsideConvectionWM2K.Number)
	}
	s := fmt.Sprintf("%.6g\u00a0°C with convection %.6g\u00a0W/(m²·K) outdoors, %.6g\u00a0°C with %s indoors", c.OutsideC, outside, c.InsideC, inside)
	if c.SunWM2 > 0 {
		s += fmt.Sprintf(", sun %.6g\u00a0W/m²", c.SunWM2)
	}
	return s
}

// or returns the number, or another where it is not known.
func (v Value) or(other float64) float64 {
	if v.Known {
		return v.Number
	}
	return other
}

// A Balance is the steady state of a make-up in one tint under one condition.
type Balance struct {
	Condition *Condition
	TiltDeg   float64
	Why       string          // why there is none; "" where there is
	LitWhy    string          // why there is none with the sun; "" where there is
	Lit       thermal.Balance // with the condition's sun
	Dark      thermal.Balance // without
	U         Value           // of Dark, W/(m²·K): its flux over the difference of the air temperatures
	G         Value           // (transmitted + inward flux with sun − inward flux without)/sun
	// TransmittedWM2 is the sun that passes, AbsorbedWM2 what each pane absorbs; both 0 without sun.
	TransmittedWM2 Value
	AbsorbedWM2    []float64
}

// balance solves a state under a condition into dst, whose memory it reuses. The optics of the state
// stand in rating.
func (r *Ready) balance(dst *Balance, rating *Rating, c *Condition) error {
	p := &r.prepared[rating.State]
	dst.Condition, dst.TiltDeg = c, c.Tilt(r.Makeup)
	dst.Why, dst.LitWhy = p.systemWhy, ""
	dst.AbsorbedWM2 = dst.AbsorbedWM2[:0]
	if dst.Why != "" {
		none := unknown(dst.Why)
		dst.U, dst.G, dst.TransmittedWM2 = none, none, none
		return nil
	}
	failed := func(err error) error {
		return fmt.Errorf("make-up %s, condition %s: %w", r.Makeup.ID, c.ID, err)
	}
	at := c.Surroundings(dst.TiltDeg)
	var none [MaxPanes]float64
	if err := p.system.Solve(&dst.Dark, at, none[:len(r.Makeup.Panes)]); err != nil {
		return failed(err)
	}
	dst.U = unknown("indoor and outdoor air have one temperature")
	if c.OutsideC != c.InsideC {
		dst.U = known(dst.Dark.InwardWM2() / (c.OutsideC - c.InsideC))
	}
	dst.TransmittedWM2, dst.G = known(0), unknown("the condition has no sun")
	if c.SunWM2 == 0 {
		dst.AbsorbedWM2 = append(dst.AbsorbedWM2, none[:len(r.Makeup.Panes)]...)
		dst.Lit = dst.Dark
		return nil
	}
	if dst.LitWhy = rating.sunWhy(); dst.LitWhy != "" {
		dst.TransmittedWM2, dst.G = unknown(dst.LitWhy), unknown(dst.LitWhy)
		return nil
	}
	for _, a := range rating.absorbed {
		dst.AbsorbedWM2 = append(dst.AbsorbedWM2, a*c.SunWM2)
	}
	if err := p.system.Solve(&dst.Lit, at, dst.AbsorbedWM2); err != nil {
		return failed(err)
	}
	dst.TransmittedWM2 = known(rating.Solar.Transmittance.Number * c.SunWM2)
	dst.G = known((dst.TransmittedWM2.Number + dst.Lit.InwardWM2() - dst.Dark.InwardWM2()) / c.SunWM2)
	return nil
}

// sunWhy says why the sun that panes absorb and pass is not known, or returns "".
func (r *Rating) sunWhy() string {
	if !r.Solar.Transmittance.Known {
		return r.Solar.Transmittance.Why
	}
	for _, v := range r.Absorptance {
		if !v.Known {
			return v.Why
		}
	}
	return ""
}

// SurfaceC returns the temperature of surface i, from 0, with the sun, in °C.
func (b *Balance) SurfaceC(i int) Value {
	if why := b.why(); why != "" {
		return unknown(why)
	}
	return known(celsius(b.Lit.SurfaceK[i]))
}

// why says why there is no state with the sun.
func (b *Balance) why() string {
	if b.Why != "" {
		return b.Why
	}
	return b.LitWhy
}

// Balance returns the balance under the condition of an id, or nil.
func (r *Rating) Balance(condition string) *Balance {
	for i := range r.Balances {
		if r.Balances[i].Condition.ID == condition {
			return &r.Balances[i]
		}
	}
	return nil
}

// rateBalances rates a state under the conditions of the basis and of the user.
func (r *Ready) rateBalances(dst *Rating) error {
	conditions := r.Method.conditions
	if cap(dst.Balances) < len(conditions) {
		dst.Balances = make([]Balance, len(conditions))
	}
	dst.Balances = dst.Balances[:len(conditions)]
	for i := range conditions {
		if err := r.balance(&dst.Balances[i], dst, &conditions[i]); err != nil {
			return err
		}
	}
	return nil
}

// heatOfBalances takes U and what goes with it from the winter condition of the basis, and g from its
// summer condition.
func (r *Ready) heatOfBalances(dst *Rating) {
	winter, summer := dst.Balance(Winter), dst.Balance(Summer)
	dst.Heat = thermal.SecondaryHeat{B: dst.Heat.B[:0], Conductances: dst.Heat.Conductances[:0]}
	if winter.Why != "" {
		none := unknown(winter.Why)
		clear(dst.Gaps)
		dst.OutsideWM2K, dst.InsideWM2K, dst.OutsideGWM2K, dst.InsideGWM2K = none, none, none, none
		dst.noHeat(winter.Why)
		return
	}
	for k := range dst.Gaps {
		dst.Gaps[k] = winter.Dark.Gaps[k].GapState()
	}
	dst.OutsideWM2K, dst.InsideWM2K = known(winter.Dark.Outside.Total()).finite(), known(winter.Dark.Room.Total()).finite()
	dst.OutsideGWM2K, dst.InsideGWM2K = known(summer.Lit.Outside.Total()).orNot(summer.why()).finite(), known(summer.Lit.Room.Total()).orNot(summer.why()).finite()
	dst.U, dst.G = winter.U, summer.G
	dst.SecondaryHeat = unknown(dst.G.Why)
	if dst.G.Known {
		dst.SecondaryHeat = known(dst.G.Number - dst.Solar.Transmittance.Number)
	}
	dst.shade()
}

// The conditions that a basis brings, and that which thermal stress is screened for beside them.
const (
	Winter   = "winter"
	Summer   = "summer"
	SummerNA = "summer-na" // that of na, where it is screened under another basis
	ColdSun  = "cold-sun"
)

// standard returns a built-in condition.
func standard(id string, insideC, outsideC float64, outsideConvection, sunWM2 float64) Condition {
	return Condition{ID: id, InsideC: insideC, OutsideC: outsideC, OutsideConvectionWM2K: known(outsideConvection), SunWM2: sunWM2, Standard: true}
}

// conditionsNA are those of ANSI/NFRC 100 and 200, from memory: winds of 5.5 and 2.75 m/s.
func conditionsNA() []Condition {
	return []Condition{standard(Winter, 21, -18, 26, 0), standard(Summer, 24, 32, 15, 783)}
}

// conditionsISO15099 are the reference conditions of ISO 15099:2003, 8.3, from memory. The standard has
// 300 W/m² of sun in winter; here winter is that of U, which has none.
func conditionsISO15099() []Condition {
	winter, summer := standard(Winter, 20, 0, 20, 0), standard(Summer, 25, 30, 8, 500)
	winter.InsideConvectionWM2K, summer.InsideConvectionWM2K = known(3.6), known(2.5)
	return []Condition{winter, summer}
}

// coldSun is a cold sunny day, for thermal stress; common practice, no source.
func coldSun() Condition {
	c := standard(ColdSun, 20, -10, 0, 783)
	c.OutsideConvectionWM2K, c.WindMS = unknown(""), known(assumedWindMS)
	return c
}
