package glazing

import (
	"slices"

	"panewright/glazing/optics"
	"panewright/spectra/colour"
	"panewright/thermal"
)

// A Rating is all figures of one make-up, in one state, under one basis, with the intermediates
// that lead to them. Transmittances, reflectances and absorptances are fractions of one, at
// normal incidence, for radiation from outside unless said. The figures are calculated; they are
// not a certified rating.
type Rating struct {
	Makeup *Makeup
	Method *Method
	Ready  *Ready
	State  int    // index into Ready.States
	Tint   string // its name

	ThicknessMM, MassKGM2 float64 // of panes and gaps; of panes, kg/m²

	Light              Band    // τv, ρv, ρv′ (EN 410, 5.2 and 5.3)
	Solar              Band    // τe, ρe, ρe′ (EN 410, 5.4.3 and 5.4.4)
	Absorptance        []Value // αe of each pane, from outside (EN 410, 5.4.5)
	SecondaryHeat      Value   // qi (EN 410, 5.4.6)
	G                  Value   // g = τe + qi (EN 410, 5.4.1)
	ShadingCoefficient Value   // g/0.87 (EN 410, 5.7)
	LightToSolarGain   Value   // τv/g

	UV                Value // τuv, 300–380 nm (EN 410, 5.5)
	Damage, Damage700 Value // damage-weighted transmittance to 600 and to 700 nm (CIE 89/3)
	Skin              Value // skin-weighted transmittance (ISO 9050)

	Ra                           Value   // of transmission (CIE 13.3)
	Transmitted, Outside, Inside Colours // of transmission, and of the reflections on both sides

	Surfaces                  []Emissivity          // of the 2 n faces, from outside
	OutsideWM2K, InsideWM2K   Value                 // he and hi of U, W/(m²·K)
	OutsideGWM2K, InsideGWM2K Value                 // he and hi of g, W/(m²·K)
	U                         Value                 // of the centre of the glass, W/(m²·K) (EN 673)
	Gaps                      []thermal.GapState    // at the make-up's tilt, as U has them; 0 where unknown, see U.Why
	GapsG                     []thermal.GapState    // of vertical gaps, as g has them
	Heat                      thermal.SecondaryHeat // what leads to qi; not of balances
	Balances                  []Balance             // under the conditions of the basis and of the user
	Stress                    []Stress              // of each pane; filled by Rate and RateAll, not by RateInto

	Cautions []Caution // filled by Rate and RateAll, not by RateInto

	panes    []optics.Pane
	stack    optics.Stack
	other    optics.Stack // of P, off the normal
	absorbed []float64

	// Filled with Stress: the hottest room-side surface and the hottest glass at a seal or interlayer,
	// and what a clear calm night does outside.
	hot struct {
		touchC, sealC                 float64
		touchCondition, sealCondition string
		sealPane                      int
	}
	clearNight struct{ surfaceC, humidity float64 }
}

// Band is a weighted transmittance and both reflectances.
type Band struct{ Transmittance, ReflectanceOutside, ReflectanceInside Value }

// Colours are a colour for the 2° and the 10° observer; unknown for the reason Why.
type Colours struct {
	TwoDegree, TenDegree colour.Lab
	Why                  string
}

// Rate rates every state of a make-up under a basis, with cautions.
func Rate(m *Makeup, b Basis) ([]Rating, error) {
	ready, err := NewMethod(b, Options{}).Ready(m)
	if err != nil {
		return nil, err
	}
	return ready.RateAll()
}

// RateAll rates every state, with cautions.
func (r *Ready) RateAll() ([]Rating, error) {
	ratings := make([]Rating, len(r.States))
	for i := range ratings {
		if err := r.RateInto(&ratings[i], i); err != nil {
			return nil, err
		}
	}
	figures := Figures()
	for i := range ratings {
		if err := r.screen(&ratings[i]); err != nil {
			return nil, err
		}
	}
	for i := range ratings {
		ratings[i].Cautions = cautionsOf(ratings, i, figures)
	}
	return ratings, nil
}

// RateInto rates one state into dst, whose memory it reuses: once dst has served a make-up of as
// many panes, nothing is allocated. Cautions are left empty.
func (r *Ready) RateInto(dst *Rating, state int) error {
	m, s := r.Method, r.States[state]
	n := len(r.Makeup.Panes)
	dst.Makeup, dst.Method, dst.Ready, dst.State, dst.Tint = r.Makeup, m, r, state, s.Name
	dst.ThicknessMM, dst.MassKGM2 = r.mm, r.kg
	dst.Cautions = nil

	dst.panes = dst.panes[:0]
	for k := range n {
		dst.panes = append(dst.panes, r.sampled[k][s.Tints[k]])
	}
	dst.stack.Combine(dst.panes)
	if r.crossed != nil {
		for k := range n {
			dst.panes[k] = r.crossed[k][s.Tints[k]]
		}
		dst.other.Combine(dst.panes)
		meanOf(&dst.stack, &dst.other)
	}
	r.rateOptics(dst, &r.prepared[state].coverage)
	return r.rateHeat(dst, state)
}

func (r *Ready) rateOptics(dst *Rating, c *coverage) {
	m, k := r.Method, &dst.stack
	bandOf := func(i int) Band {
		t, ro, ri := m.bands[i].Means(k.T, k.Ro, k.Ri)
		return Band{known(t).orNot(c[i].t), known(ro).orNot(c[i].ro), known(ri).orNot(c[i].ri)}
	}
	dst.Light, dst.Solar = bandOf(light), bandOf(solar)
	dst.UV = known(m.bands[uv].Mean(k.T)).orNot(c[uv].t)
	dst.Damage = known(m.bands[damage].Mean(k.T)).orNot(c[damage].t)
	dst.Damage700 = known(m.bands[damage700].Mean(k.T)).orNot(c[damage700].t)
	dst.Skin = known(m.bands[skin].Mean(k.T)).orNot(c[skin].t)

	dst.Absorptance, dst.absorbed = dst.Absorptance[:0], dst.absorbed[:0]
	why := c[solar].t
	if why == "" {
		why = c[solar].ro
	}
	for _, a := range k.A {
		alpha := m.bands[solar].Mean(a)
		dst.absorbed = append(dst.absorbed, alpha)
		dst.Absorptance = append(dst.Absorptance, known(alpha).orNot(why))
	}

	see := func(values []float64, why string) Colours {
		if why != "" {
			return Colours{Why: why}
		}
		return Colours{TwoDegree: m.meter.Lab(colour.TwoDegree, values), TenDegree: m.meter.Lab(colour.TenDegree, values)}
	}
	dst.Transmitted = see(k.T, c[colours].t)
	dst.Outside = see(k.Ro, c[colours].ro)
	dst.Inside = see(k.Ri, c[colours].ri)
	switch {
	case c[colours].t != "":
		dst.Ra = unknown(c[colours].t)
	case !(m.meter.XYZ(colour.TwoDegree, k.T).Y > 0):
		dst.Ra = unknown("no light is transmitted")
	default:
		dst.Ra = known(m.meter.RenderingIndex(k.T))
	}
}

func (r *Ready) rateHeat(dst *Rating, state int) error {
	m, n := r.Method, len(r.Makeup.Panes)
	dst.Surfaces = dst.Surfaces[:0]
	for k, p := range r.Makeup.Panes {
		outer, inner := p.faces(r.States[state].Tints[k])
		dst.Surfaces = append(dst.Surfaces, outer, inner)
	}
	p := &r.prepared[state]
	gaps, why, room := p.gaps, p.why, p.room.Corrected
	dst.Gaps, dst.GapsG = resized(dst.Gaps, n-1), resized(dst.GapsG, n-1)
	if err := r.rateBalances(dst); err != nil {
		return err
	}
	if m.Basis.Balances() {
		r.heatOfBalances(dst)
		return nil
	}
	dst.OutsideWM2K, dst.InsideWM2K = known(m.outside(m.Basis.u)), m.inside(m.Basis.u, room)
	dst.OutsideGWM2K, dst.InsideGWM2K = known(m.outside(m.Basis.g)), m.inside(m.Basis.g, room)
	if why != "" {
		clear(dst.Gaps)
		clear(dst.GapsG)
		if p.open {
			if err := r.rateOpenGaps(dst.Gaps, gaps); err != nil {
				return err
			}
		}
		dst.Heat = thermal.SecondaryHeat{B: dst.Heat.B[:0], Conductances: dst.Heat.Conductances[:0]}
		dst.noHeat(why)
		return nil
	}
	if err := thermal.SolveGaps(dst.Gaps, gaps, r.tilted); err != nil {
		return err
	}
	if r.tilted == r.vertical {
		copy(dst.GapsG, dst.Gaps)
	} else if err := thermal.SolveGaps(dst.GapsG, gaps, r.vertical); err != nil {
		return err
	}
	dst.Heat.Solve(dst.OutsideGWM2K.Number, dst.InsideGWM2K.Number, dst.absorbed, r.glass, dst.GapsG)
	if !dst.InsideWM2K.Known { // conductances do not need it
		dst.Heat = thermal.SecondaryHeat{B: dst.Heat.B[:0], Conductances: dst.Heat.Conductances}
		dst.noHeat(dst.InsideWM2K.Why)
		return nil
	}
	dst.U = known(thermal.U(dst.OutsideWM2K.Number, dst.InsideWM2K.Number, r.glassResistance(), dst.Gaps))

	missing := dst.sunWhy()
	dst.SecondaryHeat = known(dst.Heat.Inward).orNot(missing)
	dst.G = known(dst.Solar.Transmittance.Number + dst.Heat.Inward).orNot(missing)
	dst.shade()
	return nil
}

// shade takes from g what follows from it.
func (r *Rating) shade() {
	r.ShadingCoefficient = known(r.G.Number / shadingReference).orNot(r.G.Why)
	switch light := r.Light.Transmittance; {
	case !light.Known:
		r.LightToSolarGain = unknown(light.Why)
	case !r.G.Known:
		r.LightToSolarGain = unknown(r.G.Why)
	case r.G.Number <= 0:
		r.LightToSolarGain = unknown("g is 0")
	default:
		r.LightToSolarGain = known(light.Number / r.G.Number)
	}
}

// InTint reports whether the rating is of a tint that somebody named: by its whole name, or by
// that of each pane whose tint is left open, or where none is, of each that is fixed. Clear and full
// are understood as TintNamed does.
func (r *Rating) InTint(name string) bool {
	if name == r.Tint {
		return true
	}
	is := func(k int) bool {
		return r.Makeup.Panes[k].Pane.TintNamed(name) == r.Ready.States[r.State].Tints[k]
	}
	var open, fixed []int
	for k, p := range r.Makeup.Panes {
		switch {
		case !p.Pane.Tintable() || p.Tint == SameTint:
		case p.Tint == "":
			open = append(open, k)
		default:
			fixed = append(fixed, k)
		}
	}
	if len(open) == 0 {
		open = fixed
	}
	return len(open) > 0 && !slices.ContainsFunc(open, func(k int) bool { return !is(k) })
}

// rateOpenGaps writes what is known of gaps some of whose faces are of unknown emissivity, which
// stands as 0: radiation between known faces, and in a single gap, which has the whole
// temperature drop, convection.
func (r *Ready) rateOpenGaps(states []thermal.GapState, gaps []thermal.Gap) error {
	if len(gaps) == 1 {
		black := gaps[0]
		black.Emissivity = [2]float64{1, 1}
		if err := thermal.SolveGaps(states, []thermal.Gap{black}, r.tilted); err != nil {
			return err
		}
		states[0].Radiative, states[0].Total = 0, 0
	}
	for k, g := range gaps {
		if g.Emissivity[0] > 0 && g.Emissivity[1] > 0 {
			states[k].Radiative = thermal.RadiativeConductance(g.Emissivity[0], g.Emissivity[1])
		}
	}
	return nil
}

// noHeat leaves U, and what follows from heat, unknown.
func (r *Rating) noHeat(why string) {
	none := unknown(why)
	r.U, r.SecondaryHeat, r.G, r.ShadingCoefficient, r.LightToSolarGain = none, none, none, none, none
}

// shadingReference is g of the 3 to 4 mm clear float glass that shading coefficients refer to
// (EN 410:2011, 5.7).
const shadingReference = 0.87

func resized(s []thermal.GapState, n int) []thermal.GapState {
	if cap(s) < n {
		return make([]thermal.GapState, n)
	}
	return s[:n]
}
