package glazing

import (
	"slices"
	"strings"
	"testing"

	"panewright/thermal"
)

// pairFor is two make-ups that differ in everything that a comparison names.
func pairFor(t *testing.T) (reference, option *Rating) {
	t.Helper()
	low := pane("low", flat(300, 2500, 0.5, 0.2, 0.3), 0.837, 0.04)
	plain := pane("plain", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	plain.Plies[0].ThicknessMM = 6
	switching := pane("dim", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.15)
	switching.Tints[0].Name = "clear"
	switching.Tints = append(switching.Tints, Tint{Name: "full", Spectrum: flat(300, 2500, 0.1, 0.1, 0.1),
		Front: GivenEmissivity(0.837), Back: GivenEmissivity(0.15)})
	argon := map[string]float64{"argon": 0.9, "air": 0.1}
	a := &Makeup{ID: "A", Panes: []Placed{{Pane: plain}, {Pane: low, Turned: true}}, Gaps: []Gap{gap(t, 16, argon)},
		Typed: []Typed{{"acoustic", "Rw 36 dB"}, {"fire", "E30"}}}
	b := &Makeup{ID: "B", Tilt: TiltDeg(45), HeatFlow: thermal.Down,
		Panes: []Placed{{Pane: switching, Tint: "full"}, {Pane: low}, {Pane: plain}},
		Gaps:  []Gap{gap(t, 12, map[string]float64{"krypton": 1}), gap(t, 14, argon)},
		Typed: []Typed{{"cost", "42"}, {"acoustic", "Rw 40 dB"}}}
	return rateOne(t, a, EN, Options{}), rateOne(t, b, EN, Options{OutsideWM2K: 23})
}

func TestInputDifferences(t *testing.T) {
	a, b := pairFor(t)
	want := []string{
		"Editions and coefficients: " + b.Method.Editions() + " instead of " + a.Method.Editions() + ".",
		"Pane 1: dim (4 mm) instead of plain (6 mm).",
		"Pane 1, tint: full instead of none.",
		"Pane 2: not turned instead of turned.",
		"Pane 3: plain (6 mm) instead of none.",
		"Gap 1: 12 mm instead of 16 mm.",
		"Gap 1: krypton instead of argon 90 / air 10.",
		"Gap 2: 14 mm argon 90 / air 10 instead of none.",
		"Tilt: 45° instead of 90°.",
		"Heat flow: down instead of up.",
		"Emissivity of surface 2: 0.15 instead of 0.837.",
		"Emissivity of surface 3: 0.837 instead of 0.04.",
		"Emissivity of surface 4: 0.04 instead of 0.837.",
		"Typed by the user, acoustic: Rw 40 dB instead of Rw 36 dB.",
		"Typed by the user, fire: none instead of E30.",
		"Typed by the user, cost: 42 instead of none.",
	}
	if got := Compare(a, b).Inputs; !slices.Equal(got, want) {
		t.Errorf("differences\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
	back := Compare(b, a).Inputs
	if len(back) != len(want) {
		t.Errorf("%d differences one way, %d the other", len(want), len(back))
	}
	if !slices.Contains(back, "Pane 3: none instead of plain (6 mm).") {
		t.Errorf("the other way round: %v", back)
	}
	iso := rateOne(t, a.Makeup, ISO, Options{})
	if got := Compare(a, iso).Inputs; !slices.Equal(got, []string{"Basis: iso instead of en."}) {
		t.Errorf("under another basis: %v", got)
	}
}

// Vacuums, edges, heat treatments and what lets infrared through are told apart as well.
func TestInputsOfBalances(t *testing.T) {
	make := func(change func(m *Makeup)) *Rating {
		a, b := pane("a", flat(300, 2500, 0.8, 0.08, 0.08), 0.8, 0.1), pane("b", flat(300, 2500, 0.8, 0.08, 0.08), 0.8, 0.8)
		m := &Makeup{ID: "V", Panes: []Placed{{Pane: a}, {Pane: b}}, Gaps: []Gap{{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20}}}}
		change(m)
		return rateOne(t, m, NA, Options{})
	}
	vacuum := func(change func(v *Vacuum)) func(m *Makeup) {
		return func(m *Makeup) { v := *m.Gaps[0].Vacuum; change(&v); m.Gaps[0].Vacuum = &v }
	}
	air := gap(t, 0.2, map[string]float64{"air": 1})
	reference := make(func(*Makeup) {})
	for _, tt := range []struct {
		change func(m *Makeup)
		want   string
	}{
		{func(m *Makeup) { m.Gaps[0] = air }, "Gap 1: air instead of vacuum."},
		{vacuum(func(v *Vacuum) { v.PressurePa = 0.01 }), "Gap 1, pressure: 0.01 Pa instead of 0.1 Pa."},
		{vacuum(func(v *Vacuum) { v.PillarRadiusMM = 0.3 }), "Gap 1, radius of pillars: 0.3 mm instead of 0.25 mm."},
		{vacuum(func(v *Vacuum) { v.PillarPitchMM = 25 }), "Gap 1, pitch of pillars: 25 mm instead of 20 mm."},
		{vacuum(func(v *Vacuum) { v.PillarWMK = known(16) }), "Gap 1, conductivity of pillars: 16 W/(m·K) instead of none."},
		{func(m *Makeup) { m.Edge.PsiWMK = known(0.05) }, "ψ of the edge: 0.05 W/(m·K) instead of none."},
		{func(m *Makeup) { m.Edge.TemperatureFactor = known(0.6) }, "Temperature factor of the edge: 0.6 instead of none."},
		{func(m *Makeup) { m.Panes[1].Pane.HeatTreatment = Toughened }, "Pane 2, heat treatment: toughened instead of unknown."},
		{func(m *Makeup) { m.Panes[1].Pane.HeatTreatment = UnknownTreatment }, ""},
		{func(m *Makeup) { m.Panes[1].Pane.TauInfrared = 0.1 }, "Pane 2, infrared transmittance: 0.1 instead of 0."},
	} {
		if got := strings.Join(Compare(reference, make(tt.change)).Inputs, " "); got != tt.want {
			t.Errorf("differences %q, want %q", got, tt.want)
		}
	}
}

// Inputs that look the same as they are printed are printed with the digits in which they differ;
// what differs by rounding alone does not.
func TestInputsThatLookTheSame(t *testing.T) {
	make := func(room, mm, argon, tilt float64) *Rating {
		m := doubleOf(t, mm, map[string]float64{"argon": argon, "air": 1 - argon}, 0.837, 0.04, room)
		m.Tilt = TiltDeg(tilt)
		return rateOne(t, m, EN, Options{})
	}
	a := make(0.82826, 16, 0.9, 60)
	for _, tt := range []struct {
		option *Rating
		want   string
	}{
		{make(0.82834, 16, 0.9, 60), "Emissivity of surface 4: 0.82834 instead of 0.82826."},
		{make(0.8282, 16, 0.9, 60), "Emissivity of surface 4: 0.8282 instead of 0.8283."},
		{make(0.82826, 16.00001, 0.9, 60), "Gap 1: 16.00001 mm instead of 16 mm."},
		{make(0.82826, 16, 0.9, 60.00004), "Tilt: 60.00004° instead of 60°."},
		{make(0.82826, 16, 0.90000004, 60), "Gap 1, share of air: 0.09999996 instead of 0.1. Gap 1, share of argon: 0.90000004 instead of 0.9."},
		{make(0.82826*(1+1e-14), 16*(1+1e-15), 0.9, 60), ""},
	} {
		if got := strings.Join(Compare(a, tt.option).Inputs, " "); got != tt.want {
			t.Errorf("differences %q, want %q", got, tt.want)
		}
	}
}

// A rating does not differ from itself; a difference changes its sign with the direction; the
// difference of two colours is that of package colour.
func TestCompare(t *testing.T) {
	a, b := pairFor(t)
	self, one, two := Compare(a, a), Compare(a, b), Compare(b, a)
	if self.Inputs == nil || len(self.Inputs) > 0 {
		t.Errorf("a rating differs from itself: %v", self.Inputs)
	}
	for _, f := range Figures() {
		for k := range max(f.Count(a), f.Count(b)) {
			d, back := one.Difference(f, k), two.Difference(f, k)
			if d.Known != back.Known || d.Number != -back.Number {
				t.Errorf("%s %d: %+v one way, %+v the other", f.Key, k, d, back)
			}
			inBoth := f.Value != nil && k < f.Count(a) && k < f.Count(b)
			if want := inBoth && f.Value(a, k).Known && f.Value(b, k).Known; d.Known != want {
				t.Errorf("%s %d: known is %t, want %t", f.Key, k, d.Known, want)
			}
			if !d.Known && d.Why == "" {
				t.Errorf("%s %d is unknown for no reason", f.Key, k)
			}
			if k >= f.Count(a) {
				continue
			}
			if s := self.Difference(f, k); s.Known && s.Number != 0 {
				t.Errorf("%s %d differs from itself by %g", f.Key, k, s.Number)
			}
		}
	}
	light := Figures()[slices.IndexFunc(Figures(), func(f Figure) bool { return f.Alias == "light" })]
	near(t, "Δτv", one.Difference(light, 0), b.Light.Transmittance.Number-a.Light.Transmittance.Number, 0)
	near(t, "ΔE00 transmitted", one.Transmitted, a.Transmitted.TwoDegree.CIEDE2000(b.Transmitted.TwoDegree), 0)
	near(t, "ΔE00 outside", one.ReflectedOutside, a.Outside.TwoDegree.CIEDE2000(b.Outside.TwoDegree), 0)
	near(t, "ΔE00 inside", one.ReflectedInside, a.Inside.TwoDegree.CIEDE2000(b.Inside.TwoDegree), 0)
	near(t, "ΔE00 to itself", self.Transmitted, 0, 0)

	// A colour that is not known has no difference.
	short := rateOne(t, &Makeup{ID: "s", Panes: []Placed{{Pane: pane("s", flat(500, 2500, 0.5, 0.1, 0.1), 0.837, 0.837)}}}, EN, Options{})
	for _, c := range []Comparison{Compare(short, a), Compare(a, short)} {
		for _, v := range []Value{c.Transmitted, c.ReflectedOutside, c.ReflectedInside} {
			if v.Known || v.Why == "" {
				t.Errorf("the difference to a colour that is not known is %+v", v)
			}
		}
	}
}
