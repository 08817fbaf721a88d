package glazing

// From a basis to a Method, and from a make-up to a Ready: weights and spectra on one grid, what the
// spectra reach far enough for, the gaps of each state.

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"panewright/glazing/optics"
	"panewright/spectra"
	"panewright/spectra/colour"
	"panewright/thermal"
)

// Options are what a user may put in the place of a basis's own choices.
type Options struct {
	Sun         *spectra.Weighting // replaces the solar weighting
	OutsideWM2K float64            // he of U and g; 0 means the basis's own
	InsideWM2K  float64            // hi of U and g; 0 means that it follows the room-side emissivity
	Conditions  []Condition        // of the user, for which balances are made
	Person      *Person            // who feels the glazing; nil means AnyPerson
	Stress      *StressScreening   // nil means no margin and a factor of 1
	AngleDeg    float64            // of incidence, up to LargestAngleDeg; 0 is normal
}

// A Method is a basis made ready to calculate: its wavelengths, weights and coefficients. It is
// made once and may be shared.
type Method struct {
	Basis   Basis
	Options Options

	grid  spectra.Grid
	bands [bandCount]band
	meter *colour.Meter
	// conditions are those of the basis, own in number, and then those of the user; screened are those
	// for which thermal stress is screened.
	conditions, screened []Condition
	own                  int
}

// band is one weighting on the method's grid.
type band struct {
	weighting spectra.Weighting
	spectra.Placed
}

const (
	light = iota
	solar
	uv
	damage
	damage700
	skin
	bandCount
	// colours are weighed by the meter; this index serves their coverage alone
	colours = bandCount
)

// NewMethod makes a basis ready.
func NewMethod(b Basis, o Options) *Method {
	m := &Method{Basis: b, Options: o}
	weightings := [bandCount]spectra.Weighting{
		light: b.light(), solar: b.solar(), uv: spectra.UV(),
		damage: spectra.Damage(), damage700: spectra.Damage700(), skin: spectra.Skin(),
	}
	if o.Sun != nil {
		weightings[solar] = *o.Sun
	}
	lists := [][]float64{colour.Wavelengths()}
	for _, w := range weightings {
		lists = append(lists, w.NM)
	}
	m.grid = spectra.NewGrid(lists...)
	for i, w := range weightings {
		m.bands[i] = band{w, w.On(m.grid)}
	}
	m.meter = colour.NewMeter(m.grid)
	if b.Balances() {
		m.conditions = b.conditions()
		m.own = len(m.conditions)
	}
	m.conditions = append(m.conditions, o.Conditions...)
	m.screened = screenedBy(b, m.conditions)
	return m
}

// AtAngle returns the method for light and sun at an angle of incidence in degrees, up to
// LargestAngleDeg; make-ups are refused beyond.
func (m *Method) AtAngle(deg float64) *Method {
	other := *m
	other.Options.AngleDeg = deg
	return &other
}

// WavelengthsNM returns the wavelengths on which the method combines panes; it must not be
// written to.
func (m *Method) WavelengthsNM() []float64 { return m.grid.NM }

// outside returns he of one of the basis's two sets of surfaces.
func (m *Method) outside(s surfaces) float64 {
	if m.Options.OutsideWM2K > 0 {
		return m.Options.OutsideWM2K
	}
	return s.outside
}

// inside returns hi for a room-side emissivity, or unknown where that is needed and unknown.
func (m *Method) inside(s surfaces, emissivity Value) Value {
	if m.Options.InsideWM2K > 0 {
		return known(m.Options.InsideWM2K)
	}
	if !emissivity.Known {
		return unknown(emissivity.Why)
	}
	return known(s.inside(emissivity.Number))
}

// Ready is a make-up made ready to be rated by a method: the spectra of its panes on the
// method's wavelengths, its tints and gaps. It may be shared by goroutines.
type Ready struct {
	Makeup *Makeup
	Method *Method
	States []State

	sampled  [][]optics.Pane // by pane and tint, as placed; off the normal those of S
	crossed  [][]optics.Pane // off the normal those of P, else nil
	glass    []float64       // resistance of each pane, m²·K/W
	prepared []prepared      // by state
	tilted   thermal.Convection
	vertical thermal.Convection
	mm, kg   float64
}

// prepared is what is ready of one state.
type prepared struct {
	gaps []thermal.Gap
	room Emissivity // of the room-side face
	why  string     // why U and g of EN 673 and EN 410 are unknown, or ""
	open bool       // whether that is for unknown emissivities alone
	// system is the state ready for balances; nil for the reason systemWhy.
	system    *thermal.System
	systemWhy string
	coverage  coverage
	cautions  []Caution // what the spectra lack
}

// glassResistance returns that of all panes together, m²·K/W.
func (r *Ready) glassResistance() float64 {
	var sum float64
	for _, x := range r.glass {
		sum += x
	}
	return sum
}

// coverage says for each band, by quantity, why a figure is unknown: "" where it is known.
type coverage [bandCount + 1]struct{ t, ro, ri string }

// Ready makes a make-up ready. It is an error if the make-up is impossible; spectra that do not
// reach far enough and faces of unknown emissivity are none: their figures come out unknown.
func (m *Method) Ready(mk *Makeup) (*Ready, error) {
	if err := mk.check(); err != nil {
		return nil, err
	}
	if a := m.Options.AngleDeg; !(a >= 0 && a <= LargestAngleDeg) {
		return nil, fmt.Errorf("an angle of incidence of %g°; it lies in 0..%d", a, LargestAngleDeg)
	}
	states, err := mk.States()
	if err != nil {
		return nil, fmt.Errorf("make-up %s: %w", mk.ID, err)
	}
	r := &Ready{Makeup: mk, Method: m, States: states,
		tilted:   thermal.ConvectionAt(mk.Tilt.Degrees(), mk.HeatFlow),
		vertical: thermal.ConvectionAt(90, thermal.Up),
	}
	for _, p := range mk.Panes {
		var tints, crossed []optics.Pane
		for i := range p.Pane.Tints {
			if m.Options.AngleDeg == 0 {
				tints = append(tints, p.sample(i, m.grid))
				continue
			}
			s, other := p.sampleAt(i, m.grid, m.Options.AngleDeg)
			tints, crossed = append(tints, s), append(crossed, other)
		}
		r.sampled = append(r.sampled, tints)
		if crossed != nil {
			r.crossed = append(r.crossed, crossed)
		}
		r.glass = append(r.glass, p.Pane.Resistance())
		r.mm += p.Pane.ThicknessMM()
		r.kg += p.Pane.MassKGM2()
	}
	var gases []thermal.Gas
	for _, g := range mk.Gaps {
		r.mm += g.WidthMM
		if g.Vacuum != nil {
			gases = append(gases, thermal.Gas{Name: g.Content()})
			continue
		}
		if _, err := g.Gas.Fluid(); err != nil && len(m.conditions) > 0 {
			return nil, fmt.Errorf("make-up %s: %w", mk.ID, err)
		}
		gases = append(gases, g.Gas.Properties())
	}
	for _, s := range states {
		r.addState(s, gases)
	}
	return r, nil
}

// sample returns one tint of a placed pane on a grid, seen from outside.
func (p Placed) sample(tint int, g spectra.Grid) optics.Pane {
	s := &p.Pane.Tints[tint].Spectrum
	on := func(c spectra.Curve) []float64 {
		values := make([]float64, g.Padded())
		c.Sample(values[:g.Len()], g.NM)
		return values
	}
	pane := optics.Pane{T: on(s.Tau), Ro: on(s.RhoFront), Ri: on(s.RhoBack)}
	if p.Turned {
		pane.Ro, pane.Ri = pane.Ri, pane.Ro
	}
	return pane
}

// faces returns the emissivities of a placed pane's outer and inner face.
func (p Placed) faces(tint int) (outer, inner Emissivity) {
	t := &p.Pane.Tints[tint]
	if p.Turned {
		return t.Back, t.Front
	}
	return t.Front, t.Back
}

// faceName names a face for a message: "surface 2 (pane hall-6, back)".
func (m *Makeup) faceName(pane int, inner bool) string {
	p, number, side := m.Panes[pane], 2*pane+1, "front"
	if inner {
		number++
	}
	if inner != p.Turned {
		side = "back"
	}
	return fmt.Sprintf("surface %d (pane %s, %s)", number, p.Pane.ID, side)
}

func (r *Ready) addState(s State, gases []thermal.Gas) {
	m := r.Makeup
	n := len(m.Panes)
	gaps := make([]thermal.Gap, n-1)
	var blank []string // faces of unknown emissivity
	need := func(e Emissivity, pane int, inner bool) float64 {
		if !e.Corrected.Known {
			blank = append(blank, m.faceName(pane, inner))
		}
		return e.Corrected.Number
	}
	for k := range gaps {
		_, outer := m.Panes[k].faces(s.Tints[k])
		inner, _ := m.Panes[k+1].faces(s.Tints[k+1])
		gaps[k] = thermal.Gap{WidthM: m.Gaps[k].WidthMM / 1000, Gas: gases[k],
			Emissivity: [2]float64{need(outer, k, true), need(inner, k+1, false)}}
		if m.Gaps[k].Vacuum != nil {
			v := m.vacuum(k)
			gaps[k].Evacuated, gaps[k].ConductanceWM2K = true, v.Conductance()
		}
	}
	_, room := m.Panes[n-1].faces(s.Tints[n-1])
	why := ""
	if blank != nil {
		if !room.Corrected.Known && r.Method.Options.InsideWM2K == 0 {
			blank = append(blank, m.faceName(n-1, true))
		}
		why = "the emissivity of " + strings.Join(blank, ", ") + " is not known"
	}
	if !room.Corrected.Known {
		room.Corrected.Why = "the emissivity of " + m.faceName(n-1, true) + " is not known"
	}
	open := why != ""
	for k, p := range m.Panes {
		if p.Pane.infraredTau(s.Tints[k]) > 0 {
			why, open = "pane "+p.Pane.ID+" lets infrared through, which only the balances of na, iso15099 and of conditions can take in", false
			break
		}
	}
	p := prepared{gaps: gaps, room: room, why: why, open: open}
	p.system, p.systemWhy = r.systemOf(s)
	p.coverage = r.cover(s, &p.cautions)
	r.prepared = append(r.prepared, p)
}

// opaque is the infrared transmittance up to which a sheet counts as opaque; common practice, no
// source.
const opaque = 0.005

// endTolerance is the share of a band's weight that may lie beyond an end of a spectrum, whose
// last value is then held, or in a gap of it, which is then interpolated.
const endTolerance = 0.001

// cover says which figures the spectra of a state reach far enough for, and adds cautions where
// an end is held or a figure stays unknown.
func (r *Ready) cover(s State, cautions *[]Caution) coverage {
	var c coverage
	last := len(r.Makeup.Panes) - 1
	for i := range c {
		w := r.Method.coverageOf(i)
		for k, p := range r.Makeup.Panes {
			t, ro, ri := p.needed(s.Tints[k], k == 0, k == last)
			name := p.Pane.nameOf(s.Tints[k])
			first(&c[i].t, reach(name, w, t, cautions))
			if i == light || i == solar || i == colours { // of the others only transmission is a figure
				first(&c[i].ro, reach(name, w, ro, cautions))
				first(&c[i].ri, reach(name, w, ri, cautions))
			}
		}
	}
	return c
}

// needed returns the spectra of a tint that the transmittance, and the reflectances outside and
// inside, of a stack depend on: the transmittance of panes that radiation passes, and the
// reflectances of faces that it meets.
func (p Placed) needed(tint int, outermost, innermost bool) (t, ro, ri []spectra.Curve) {
	spectrum := &p.Pane.Tints[tint].Spectrum
	outer, inner := spectrum.RhoFront, spectrum.RhoBack
	if p.Turned {
		outer, inner = inner, outer
	}
	t = []spectra.Curve{spectrum.Tau}
	if !outermost {
		t = append(t, outer)
		ri = append(ri, spectrum.Tau, outer)
	}
	if !innermost {
		t = append(t, inner)
		ro = append(ro, spectrum.Tau, inner)
	}
	return t, append(ro, outer), append(ri, inner)
}

// reachOf returns the range in nm that all curves cover.
func reachOf(curves []spectra.Curve) (from, to float64) {
	to = math.Inf(1)
	for _, c := range curves {
		from, to = max(from, c.First()), min(to, c.Last())
	}
	return from, to
}

// first keeps the first text that is not blank.
func first(text *string, more string) {
	if *text == "" {
		*text = more
	}
}

// coverageOf returns the weighting of a band, or of colour.
func (m *Method) coverageOf(i int) spectra.Weighting {
	if i == colours {
		return colour.Weighting()
	}
	return m.bands[i].weighting
}

// nameOf returns the pane's id, with its tint if it has one.
func (p *Pane) nameOf(tint int) string {
	if name := p.Tints[tint].Name; name != "" {
		return p.ID + " (" + name + ")"
	}
	return p.ID
}

// reach says why curves of a pane do not reach far enough for a weighting, or have a gap in it, or
// returns "". Where an end is held or a gap is small enough to be interpolated, it adds a caution.
func reach(pane string, w spectra.Weighting, curves []spectra.Curve, cautions *[]Caution) string {
	from, to := reachOf(curves)
	start, end := w.NM[0], w.NM[len(w.NM)-1]
	below, above := w.Missing(from, to)
	text := ""
	add := func(code, text string) { // once
		if c := (Caution{Code: code, Text: text}); !slices.Contains(*cautions, c) {
			*cautions = append(*cautions, c)
		}
	}
	for _, x := range []struct {
		at, table, share float64
		verb, which      string
	}{{from, start, below, "begins", "first"}, {to, end, above, "ends", "last"}} {
		switch {
		case x.share >= endTolerance:
			text = fmt.Sprintf("the spectrum of pane %s %s at %.6g nm; %s needs %.6g to %.6g nm", pane, x.verb, x.at, w.Name, start, end)
			add("missing_band", fmt.Sprintf("No figure for %s: %s.", w.Name, text))
		case x.share > 0:
			add("extended", fmt.Sprintf("The spectrum of pane %s %s at %.6g nm; its %s value was held to %.6g nm for %s (%.2g %% of the weight).",
				pane, x.verb, x.at, x.which, x.table, w.Name, 100*x.share))
		}
	}
	for _, c := range curves {
		enough := w.Within(c.Gaps) < endTolerance
		for _, g := range c.Gaps {
			switch share := w.Within([]spectra.Span{g}); {
			case share == 0:
			case enough:
				add("interpolated", fmt.Sprintf("The spectrum of pane %s has no values between %.6g and %.6g nm; it was interpolated there for %s (%.2g %% of the weight).",
					pane, g.FromNM, g.ToNM, w.Name, 100*share))
			default:
				why := fmt.Sprintf("the spectrum of pane %s has no values between %.6g and %.6g nm, which %s needs", pane, g.FromNM, g.ToNM, w.Name)
				first(&text, why)
				add("missing_band", fmt.Sprintf("No figure for %s: %s.", w.Name, why))
			}
		}
	}
	return text
}

// gapsOf returns the gaps of all curves, each once.
func gapsOf(curves []spectra.Curve) (gaps []spectra.Span) {
	for _, c := range curves {
		for _, g := range c.Gaps {
			if !slices.Contains(gaps, g) {
				gaps = append(gaps, g)
			}
		}
	}
	return gaps
}

// Spectra are those of a make-up in one state: fractions of one at wavelengths in nm; NaN where
// a pane's spectrum does not reach, or has a gap.
type Spectra struct {
	WavelengthNM          []float64
	T                     []float64
	RhoOutside, RhoInside []float64
	Absorptance           [][]float64 // by pane
}

// Spectra returns the spectra of a state at the given wavelengths, ascending, in nm.
func (r *Ready) Spectra(state int, nm []float64) Spectra {
	grid := spectra.Grid{NM: nm}
	var panes, crossed []optics.Pane
	var t, ro, ri []spectra.Curve // what each quantity depends on
	last := len(r.Makeup.Panes) - 1
	for k, p := range r.Makeup.Panes {
		tint := r.States[state].Tints[k]
		if angle := r.Method.Options.AngleDeg; angle == 0 {
			panes = append(panes, p.sample(tint, grid))
		} else {
			s, m := p.sampleAt(tint, grid, angle)
			panes, crossed = append(panes, s), append(crossed, m)
		}
		a, b, c := p.needed(tint, k == 0, k == last)
		t, ro, ri = append(t, a...), append(ro, b...), append(ri, c...)
	}
	var stack, other optics.Stack
	stack.Combine(panes)
	if crossed != nil {
		other.Combine(crossed)
		meanOf(&stack, &other)
	}
	within := func(values []float64, curves ...spectra.Curve) []float64 {
		values = values[:grid.Len()]
		from, to := reachOf(curves)
		holes := spectra.Curve{Gaps: gapsOf(curves)}
		for i, x := range nm {
			if x < from || x > to || holes.InGap(x) {
				values[i] = math.NaN()
			}
		}
		return values
	}
	out := Spectra{WavelengthNM: nm, T: within(stack.T, t...), RhoOutside: within(stack.Ro, ro...), RhoInside: within(stack.Ri, ri...)}
	for _, a := range stack.A {
		out.Absorptance = append(out.Absorptance, within(a, slices.Concat(t, ro)...))
	}
	return out
}

// Editions returns the editions and coefficients of the method, as printed on every output.
func (m *Method) Editions() string {
	s := m.Basis.Editions
	if m.Options.AngleDeg > 0 {
		s += fmt.Sprintf("; light, sun and colour at %.6g° of incidence", m.Options.AngleDeg)
	}
	if m.Options.Sun != nil {
		s += "; solar weighting: " + m.Options.Sun.Source + "; UV, damage and skin keep the sun of EN 410:2011"
	}
	var c []string
	if !m.Basis.Balances() {
		c = append(c, fmt.Sprintf("he %.6g", m.outside(m.Basis.u)))
		if m.Options.InsideWM2K > 0 {
			c = append(c, fmt.Sprintf("hi %.6g", m.Options.InsideWM2K))
		} else {
			c = append(c, fmt.Sprintf("hi %.6g + %.6g ε/0.837", m.Basis.u.insideConvection, m.Basis.u.insideRadiation))
		}
		s += "; " + strings.Join(c, ", ") + " W/(m²·K)"
	}
	return s
}
