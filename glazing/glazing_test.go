package glazing

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"panewright/spectra"
	"panewright/thermal"
)

// flat is a spectrum of constant values from first to last nm, every 5 nm.
func flat(first, last, tau, front, back float64) spectra.Measured {
	var m spectra.Measured
	add := func(c *spectra.Curve, nm, v float64) { c.NM, c.Value = append(c.NM, nm), append(c.Value, v) }
	for nm := first; nm <= last; nm += 5 {
		add(&m.Tau, nm, tau)
		add(&m.RhoFront, nm, front)
		add(&m.RhoBack, nm, back)
	}
	return m
}

func pane(id string, s spectra.Measured, front, back float64) *Pane {
	return &Pane{ID: id, Plies: []Ply{{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}},
		Tints: []Tint{{Spectrum: s, Front: GivenEmissivity(front), Back: GivenEmissivity(back)}}}
}

func gap(t testing.TB, mm float64, fractions map[string]float64) Gap {
	t.Helper()
	m, err := thermal.Mix(fractions)
	if err != nil {
		t.Fatal(err)
	}
	return Gap{WidthMM: mm, Gas: m}
}

func ratedAll(t testing.TB, m *Makeup, b Basis, o Options) []Rating {
	t.Helper()
	ready, err := NewMethod(b, o).Ready(m)
	if err != nil {
		t.Fatal(err)
	}
	ratings, err := ready.RateAll()
	if err != nil {
		t.Fatal(err)
	}
	return ratings
}

func rateOne(t testing.TB, m *Makeup, b Basis, o Options) *Rating {
	t.Helper()
	return &ratedAll(t, m, b, o)[0]
}

func near(t *testing.T, what string, got Value, want, tolerance float64) {
	t.Helper()
	if !got.Known || !(math.Abs(got.Number-want) <= tolerance) {
		t.Errorf("%s: %v (known %t, %s), want %.12g", what, got.Number, got.Known, got.Why, want)
	}
}

// A stack of flat spectra has the flat figures of the two-pane formula, in every band.
func TestFlatDouble(t *testing.T) {
	m := &Makeup{ID: "m", Gaps: []Gap{gap(t, 16, map[string]float64{"air": 1})},
		Panes: []Placed{{Pane: pane("a", flat(300, 2500, 0.7, 0.1, 0.2), 0.837, 0.837)}, {Pane: pane("b", flat(300, 2500, 0.6, 0.15, 0.3), 0.837, 0.837)}}}
	r := rateOne(t, m, EN, Options{})
	d := 1 - 0.2*0.15
	tau, out, in := 0.7*0.6/d, 0.1+0.7*0.7*0.15/d, 0.3+0.6*0.6*0.2/d
	for _, x := range []struct {
		what string
		got  Value
		want float64
	}{
		{"τv", r.Light.Transmittance, tau}, {"ρv", r.Light.ReflectanceOutside, out}, {"ρv′", r.Light.ReflectanceInside, in},
		{"τe", r.Solar.Transmittance, tau}, {"ρe", r.Solar.ReflectanceOutside, out}, {"ρe′", r.Solar.ReflectanceInside, in},
		{"τuv", r.UV, tau}, {"damage", r.Damage, tau}, {"damage to 700", r.Damage700, tau}, {"skin", r.Skin, tau},
		{"Ra", r.Ra, 100},
		{"αe1", r.Absorptance[0], 0.2 + 0.7*0.15*0.1/d}, {"αe2", r.Absorptance[1], 0.25 * 0.7 / d},
	} {
		near(t, x.what, x.got, x.want, 1e-12*100)
	}
	// L* of a grey of Y = τ (CIE 15:2004): 116·τ^⅓ − 16; a* and b* are 0.
	l := 116*math.Cbrt(tau) - 16
	if c := r.Transmitted.TwoDegree; math.Abs(c.L-l) > 1e-9 || math.Abs(c.A) > 1e-9 || math.Abs(c.B) > 1e-9 {
		t.Errorf("colour of a grey is %v, want L* %.9f", c, l)
	}
}

// Turning every pane and the order of all reverses the make-up: transmission, U and the
// reflections of light swap sides.
func TestReversedMakeup(t *testing.T) {
	a, b := pane("a", flat(300, 2500, 0.7, 0.1, 0.2), 0.837, 0.1), pane("b", flat(300, 2500, 0.6, 0.15, 0.3), 0.5, 0.837)
	g := gap(t, 12, map[string]float64{"krypton": 0.5, "air": 0.5})
	one := rateOne(t, &Makeup{Panes: []Placed{{Pane: a}, {Pane: b}}, Gaps: []Gap{g}}, EN, Options{InsideWM2K: 7.7})
	two := rateOne(t, &Makeup{Panes: []Placed{{Pane: b, Turned: true}, {Pane: a, Turned: true}}, Gaps: []Gap{g}}, EN, Options{InsideWM2K: 7.7})
	near(t, "τv", two.Light.Transmittance, one.Light.Transmittance.Number, 1e-12)
	near(t, "ρv outside", two.Light.ReflectanceOutside, one.Light.ReflectanceInside.Number, 1e-12)
	near(t, "ρe inside", two.Solar.ReflectanceInside, one.Solar.ReflectanceOutside.Number, 1e-12)
	near(t, "U", two.U, one.U.Number, 1e-12)
}

// RateInto in reused memory, in any order of make-ups, gives the bits of Rate, and allocates
// nothing.
func TestRateIntoReusesMemory(t *testing.T) {
	method := NewMethod(EN, Options{})
	r := rand.New(rand.NewPCG(53, 59))
	var makeups []*Ready
	for n := 1; n <= 8; n++ {
		m := &Makeup{ID: fmt.Sprint(n), Tilt: TiltDeg(float64(90 - 10*n))}
		for k := range n {
			m.Panes = append(m.Panes, Placed{Pane: syntheticPane("p", r.Float64()*6), Turned: r.IntN(2) == 0})
			if k > 0 {
				m.Gaps = append(m.Gaps, gap(t, 6+10*r.Float64(), map[string]float64{"argon": 0.5, "xenon": 0.5}))
			}
		}
		ready, err := method.Ready(m)
		if err != nil {
			t.Fatal(err)
		}
		makeups = append(makeups, ready)
	}
	var reused Rating
	for range 40 {
		ready := makeups[r.IntN(len(makeups))]
		if err := ready.RateInto(&reused, 0); err != nil {
			t.Fatal(err)
		}
		var fresh Rating
		if err := ready.RateInto(&fresh, 0); err != nil {
			t.Fatal(err)
		}
		for _, f := range Figures() {
			if f.Value == nil {
				continue
			}
			for k := range f.Count(&fresh) {
				if got, want := f.Value(&reused, k), f.Value(&fresh, k); got != want {
					t.Fatalf("%s %d of %s panes: %v in reused memory, %v in fresh", f.Key, k, ready.Makeup.ID, got, want)
				}
			}
		}
	}
	if n := testing.AllocsPerRun(100, func() {
		if err := makeups[2].RateInto(&reused, 0); err != nil {
			t.Fatal(err)
		}
	}); n != 0 {
		t.Errorf("RateInto allocates %v times", n)
	}
}

// A spectrum that stops early leaves its figures unknown, with a reason and a caution, and a
// share below 0.1 % of the weight is held, with a caution.
func TestEndsOfSpectra(t *testing.T) {
	codes := func(r *Rating) (list []string) {
		for _, c := range r.Cautions {
			list = append(list, c.Code)
		}
		return list
	}
	for _, tt := range []struct {
		what        string
		first, last float64
		unknown     []string // keys
		cautions    []string
	}{
		{"whole range", 300, 2500, nil, nil},
		// EN 410 table 2: S Δλ is 0.000475 at 2500 nm and 0.001202 at 2450 nm.
		{"to 2495 nm", 300, 2495, nil, []string{"extended"}},
		{"to 2445 nm", 300, 2445, []string{"solar.transmittance", "solar.g", "solar.secondary_heat_inward", "solar.absorptance.#"}, []string{"missing_band"}},
		{"from 380 nm", 380, 2500, []string{"uv.transmittance", "uv.damage_weighted", "uv.skin_weighted", "solar.g"}, []string{"missing_band"}},
		{"from 420 nm", 420, 2500, []string{"colour.ra", "colour.transmitted.l"}, []string{"missing_band", "extended"}},
		{"from 600 nm", 600, 2500, []string{"light.transmittance", "solar.light_to_solar_gain"}, []string{"missing_band"}},
	} {
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: pane("p", flat(tt.first, tt.last, 0.5, 0.1, 0.1), 0.837, 0.837)}}}, EN, Options{})
		for _, f := range Figures() {
			if f.Value == nil {
				continue
			}
			if slices.Contains(tt.unknown, f.Key) {
				if v := f.Value(r, 0); v.Known || v.Why == "" {
					t.Errorf("%s: %s is %v, want unknown with a reason", tt.what, f.Key, v)
				}
			}
		}
		if !r.U.Known {
			t.Errorf("%s: U is unknown: %s", tt.what, r.U.Why)
		}
		for _, code := range []string{"extended", "missing_band"} {
			if got, want := slices.Contains(codes(r), code), slices.Contains(tt.cautions, code); got != want {
				t.Errorf("%s: caution %s is %t, want %t: %v", tt.what, code, got, want, r.Cautions)
			}
		}
	}
}

// Without the emissivity of a face that matters, U and g are unknown and name the face; without
// one that does not, they are known.
func TestUnknownEmissivity(t *testing.T) {
	spectrum := flat(300, 2500, 0.7, 0.1, 0.1)
	for _, tt := range []struct {
		face int // 1…4; 0 none
		want string
	}{
		{0, ""}, {1, ""}, {2, "surface 2 (pane a, back)"}, {3, "surface 3 (pane b, back)"}, {4, "surface 4 (pane b, front)"},
	} {
		a, b := pane("a", spectrum, 0.837, 0.837), pane("b", spectrum, 0.837, 0.837)
		faces := []*Emissivity{nil, &a.Tints[0].Front, &a.Tints[0].Back, &b.Tints[0].Back, &b.Tints[0].Front}
		if tt.face > 0 {
			*faces[tt.face] = NoEmissivity()
		}
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: a}, {Pane: b, Turned: true}}, Gaps: []Gap{gap(t, 12, map[string]float64{"air": 1})}}, EN, Options{})
		if tt.want == "" {
			if !r.U.Known || !r.G.Known {
				t.Errorf("face %d: U %v, g %v", tt.face, r.U, r.G)
			}
			continue
		}
		if r.U.Known || r.G.Known || !strings.Contains(r.U.Why, tt.want) {
			t.Errorf("face %d: U %v, want unknown for %q", tt.face, r.U, tt.want)
		}
		if !r.Light.Transmittance.Known {
			t.Errorf("face %d: τv is unknown", tt.face)
		}
	}
}

// The coefficients of the bases are those of their standards (EN 673:2011, EN 410:2011,
// ISO 9050:2003, ISO 10292, from memory), checked on a single pane that the formulas fit on one
// line: U = 1/(1/he + 0.004 + 1/hi), qi = αe·hi/(he + hi).
func TestCoefficients(t *testing.T) {
	for _, tt := range []struct {
		basis      Basis
		o          Options
		emissivity float64
		he, hi     float64
	}{
		{EN, Options{}, 0.837, 25, 7.7},
		{EN, Options{}, 0.1, 25, 3.6 + 4.1*0.1/0.837},
		{ISO, Options{}, 0.837, 23, 8.0},
		{ISO, Options{}, 0.1, 23, 3.6 + 4.4*0.1/0.837},
		{EN, Options{OutsideWM2K: 20}, 0.837, 20, 7.7},
		{EN, Options{InsideWM2K: 6}, 0.1, 25, 6},
		{ISO, Options{OutsideWM2K: 20, InsideWM2K: 6}, 0.1, 20, 6},
	} {
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, tt.emissivity)}}}, tt.basis, tt.o)
		near(t, tt.basis.Name+" U", r.U, 1/(1/tt.he+0.004+1/tt.hi), 1e-12)
		near(t, tt.basis.Name+" qi", r.SecondaryHeat, 0.3*tt.hi/(tt.he+tt.hi), 1e-12)
		near(t, tt.basis.Name+" g", r.G, 0.6+0.3*tt.hi/(tt.he+tt.hi), 1e-12)
		near(t, tt.basis.Name+" SC", r.ShadingCoefficient, r.G.Number/0.87, 1e-15)
		near(t, tt.basis.Name+" τv/g", r.LightToSolarGain, 0.6/r.G.Number, 1e-12)
	}
}

// g is computed with vertical gaps at every tilt; U follows the tilt. Both readings of EN 673
// between its tilts are said.
func TestTilt(t *testing.T) {
	m := func(deg float64) *Makeup {
		return &Makeup{ID: "m", Tilt: TiltDeg(deg), Gaps: []Gap{gap(t, 16, map[string]float64{"argon": 0.9, "air": 0.1})},
			Panes: []Placed{{Pane: pane("a", flat(300, 2500, 0.4, 0.1, 0.1), 0.837, 0.837)}, {Pane: pane("b", flat(300, 2500, 0.4, 0.1, 0.1), 0.037, 0.837)}}}
	}
	upright, sloped := rateOne(t, m(90), EN, Options{}), rateOne(t, m(67.5), EN, Options{})
	if upright.G != sloped.G {
		t.Errorf("g %v upright, %v sloped", upright.G.Number, sloped.G.Number)
	}
	// The two readings at 67.5° are 1.419 and 1.317 (EN 673:2011, literal reading, from memory).
	near(t, "U at 67.5° (A, n interpolated)", sloped.U, 1.419, 0.0005)
	text := ""
	for _, c := range sloped.Cautions {
		if c.Code == "tilt_interpolated" || c.Code == "tilt_vertical_g" {
			text += c.Text
		}
	}
	for _, want := range []string{"U 1.32 and not 1.42", fmt.Sprintf("upright it is %.2f", upright.U.Number)} {
		if !strings.Contains(text, want) {
			t.Errorf("cautions of the tilt say %q, want %q", text, want)
		}
	}
}

// A laminate conducts through its plies in series and weighs what they weigh.
func TestLaminate(t *testing.T) {
	p := pane("lam", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
	p.Plies = []Ply{{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}, {Interlayer: true, ThicknessMM: 1.52, ConductivityWMK: 0.22, DensityKGM3: 1070}, {ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}}
	r := rateOne(t, &Makeup{Panes: []Placed{{Pane: p}}}, EN, Options{})
	near(t, "U", r.U, 1/(1/25.0+1/7.7+0.010+0.00152/0.22), 1e-12)
	near(t, "thickness", Value{Number: r.ThicknessMM, Known: true}, 11.52, 1e-12)
	near(t, "mass", Value{Number: r.MassKGM2, Known: true}, 25+1.52*1.07, 1e-12)
}

func TestRound(t *testing.T) {
	for _, tt := range []struct {
		v      float64
		places int
		want   string
	}{
		{0.125, 2, "0.13"}, {0.135, 2, "0.14"}, {1.005, 2, "1.01"}, {-0.125, 2, "-0.13"}, {2.8499, 1, "2.8"}, {2.85, 1, "2.9"},
		{1.15, 1, "1.2"}, {1.25, 1, "1.3"}, {0.0004, 3, "0.000"}, {-0.0004, 3, "0.000"}, {97.5, 0, "98"}, {-4.5, 0, "-5"},
	} {
		if got := PrintRounded(tt.v, tt.places); got != tt.want {
			t.Errorf("%v to %d decimals: %s, want %s", tt.v, tt.places, got, tt.want)
		}
	}
}

func TestRefused(t *testing.T) {
	p := pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
	air := gap(t, 12, map[string]float64{"air": 1})
	nine := &Makeup{}
	for range 9 {
		nine.Panes, nine.Gaps = append(nine.Panes, Placed{Pane: p}), append(nine.Gaps, air)
	}
	nine.Gaps = nine.Gaps[1:]
	for _, tt := range []struct {
		m    *Makeup
		want string
	}{
		{&Makeup{}, "no pane"},
		{nine, "at most 8"},
		{&Makeup{Panes: []Placed{{Pane: p}}, Gaps: []Gap{air}}, "1 panes and 1 gaps"},
		{&Makeup{Panes: []Placed{{Pane: p}, {Pane: p}}, Gaps: []Gap{{WidthMM: 0, Gas: air.Gas}}}, "a width is above 0"},
		{&Makeup{Panes: []Placed{{Pane: &Pane{ID: "q"}}}}, "no spectrum"},
	} {
		if _, err := Rate(tt.m, EN); err == nil || !strings.Contains(err.Error(), tt.want) {
			t.Errorf("error %v, want %q", err, tt.want)
		}
	}
}

// A figure needs the spectra that its radiation meets, and no others.
func TestWhatAFigureNeeds(t *testing.T) {
	short := func(c spectra.Curve) spectra.Curve { // from 400 nm on
		return spectra.Curve{NM: c.NM[20:], Value: c.Value[20:]}
	}
	for _, tt := range []struct {
		what           string
		cut            func(outer, inner *spectra.Measured)
		uv, light, rho string // whether τuv, τe, ρe outside, ρe inside are known
	}{
		{"outer front", func(o, _ *spectra.Measured) { o.RhoFront = short(o.RhoFront) }, "known", "known", "-+"},
		{"outer back", func(o, _ *spectra.Measured) { o.RhoBack = short(o.RhoBack) }, "unknown", "unknown", "--"},
		{"inner front", func(_, i *spectra.Measured) { i.RhoFront = short(i.RhoFront) }, "unknown", "unknown", "--"},
		{"inner back", func(_, i *spectra.Measured) { i.RhoBack = short(i.RhoBack) }, "known", "known", "+-"},
		{"outer tau", func(o, _ *spectra.Measured) { o.Tau = short(o.Tau) }, "unknown", "unknown", "-+"},
		{"inner tau", func(_, i *spectra.Measured) { i.Tau = short(i.Tau) }, "unknown", "unknown", "+-"},
	} {
		a, b := pane("a", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837), pane("b", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
		tt.cut(&a.Tints[0].Spectrum, &b.Tints[0].Spectrum)
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: a}, {Pane: b}}, Gaps: []Gap{gap(t, 12, map[string]float64{"air": 1})}}, EN, Options{})
		for _, x := range []struct {
			name string
			v    Value
			want bool
		}{
			{"τuv", r.UV, tt.uv == "known"}, {"τe", r.Solar.Transmittance, tt.light == "known"},
			{"ρe", r.Solar.ReflectanceOutside, tt.rho[0] == '+'}, {"ρe′", r.Solar.ReflectanceInside, tt.rho[1] == '+'},
		} {
			if x.v.Known != x.want {
				t.Errorf("%s short: %s known %t, want %t (%s)", tt.what, x.name, x.v.Known, x.want, x.v.Why)
			}
		}
		if r.G.Known != (r.Solar.Transmittance.Known && r.Solar.ReflectanceOutside.Known) {
			t.Errorf("%s short: g known %t, but τe %t and ρe %t", tt.what, r.G.Known, r.Solar.Transmittance.Known, r.Solar.ReflectanceOutside.Known)
		}
	}
}

// Memory that is used again keeps nothing of a make-up whose figures were known.
func TestUnknownInReusedMemory(t *testing.T) {
	method := NewMethod(EN, Options{})
	double := func(e Emissivity, face int) *Ready {
		a, b := pane("a", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837), pane("b", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
		*[]*Emissivity{&a.Tints[0].Back, &b.Tints[0].Back}[face] = e
		ready, err := method.Ready(&Makeup{Panes: []Placed{{Pane: a}, {Pane: b}}, Gaps: []Gap{gap(t, 12, map[string]float64{"air": 1})}})
		if err != nil {
			t.Fatal(err)
		}
		return ready
	}
	for face := range 2 {
		var reused, fresh Rating
		for _, r := range []*Ready{double(GivenEmissivity(0.05), face), double(NoEmissivity(), face)} {
			if err := r.RateInto(&reused, 0); err != nil {
				t.Fatal(err)
			}
		}
		if err := double(NoEmissivity(), face).RateInto(&fresh, 0); err != nil {
			t.Fatal(err)
		}
		if got, want := fmt.Sprint(reused.Gaps, reused.GapsG, reused.Heat), fmt.Sprint(fresh.Gaps, fresh.GapsG, fresh.Heat); got != want {
			t.Errorf("unknown face %d: %s in reused memory, %s in fresh", face, got, want)
		}
	}
	// The conductances between panes do not need the room-side face.
	var r Rating
	if err := double(NoEmissivity(), 1).RateInto(&r, 0); err != nil {
		t.Fatal(err)
	}
	if r.U.Known || len(r.Heat.Conductances) != 1 || !(r.Gaps[0].Total > 0) {
		t.Errorf("room-side face unknown: U %v, Λ %v, gap %v", r.U, r.Heat.Conductances, r.Gaps[0])
	}
	// Of a single gap with a face unknown, convection is known: 12 mm of air do not convect, so
	// that hg is λ/s; radiation and conductance are not.
	if err := double(NoEmissivity(), 0).RateInto(&r, 0); err != nil {
		t.Fatal(err)
	}
	for _, f := range Figures() {
		if f.Per != PerGap || f.Alias == "conductance" {
			continue
		}
		want := f.Alias != "gap_radiative" && f.Alias != "gap_conductance"
		if v := f.Value(&r, 0); v.Known != want || (f.Alias == "gap_convective" && math.Abs(v.Number-0.02496/0.012) > 1e-12) {
			t.Errorf("face of the gap unknown: %s %v, want it known %t", f.Alias, v, want)
		}
	}
}

// A sheet that lets infrared through has no U by EN 673, whether that was typed or measured.
func TestInfraredTransparent(t *testing.T) {
	measured := func(tau float64) func(p *Pane) {
		return func(p *Pane) {
			p.Tints[0].Spectrum.InfraredTau = spectra.Curve{NM: []float64{5000, 50000}, Value: []float64{tau, tau}}
		}
	}
	for _, tt := range []struct {
		what  string
		vary  func(p *Pane)
		known bool
	}{
		{"typed", func(p *Pane) { p.TauInfrared = 0.02 }, false},
		{"measured", measured(0.02), false},
		{"just not opaque", measured(0.00502), false},
		{"opaque but for stray light", measured(0.00498), true},
	} {
		p := pane("foil", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
		tt.vary(p)
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: p}}}, EN, Options{})
		if r.U.Known != tt.known || (!tt.known && !strings.Contains(r.U.Why, "lets infrared through")) {
			t.Errorf("%s: U %v, want it known %t", tt.what, r.U, tt.known)
		}
	}
}

// Where an end is held, the working shows the held value, as the sum has it.
func TestWorkingOfAHeldEnd(t *testing.T) {
	r := rateOne(t, &Makeup{Panes: []Placed{{Pane: pane("p", flat(390, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)}}}, EN, Options{})
	for _, c := range Working(r) {
		if c.Sum != nil && (c.Sum.NM[0] != 380 || c.Sum.Value[0] != 0.6) {
			t.Errorf("row of %g nm shows %g, want the held 0.6", c.Sum.NM[0], c.Sum.Value[0])
		}
	}
}
