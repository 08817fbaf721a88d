package glazing

import (
	"math"
	"strings"
	"testing"

	"panewright/thermal"
)

// binary is what rounding adds to a difference: 1e-16 of U over the shortest step, times the change.
const binary = 1e-13

// doubleOf is a double of panes of 4 mm with given emissivities of surfaces 2, 3 and 4.
func doubleOf(t *testing.T, mm float64, gas map[string]float64, e2, e3, e4 float64) *Makeup {
	t.Helper()
	return &Makeup{ID: "D", Gaps: []Gap{gap(t, mm, gas)},
		Panes: []Placed{{Pane: pane("a", flat(300, 2500, 0.6, 0.1, 0.2), 0.837, e2)}, {Pane: pane("b", flat(300, 2500, 0.7, 0.15, 0.1), e4, e3), Turned: true}}}
}

// slopes are the derivatives of U and g of a double by hand, from the formulas of EN 673 and EN 410:
// U = 1/R with R = 1/he + 1/hi + Rg + 1/hs, so dU/dhs = U²/hs² and dU/dhi = U²/hi²; g = τe + qi with
// qi = (a0 + b/hs)/R, so dg/dhs = (qi − b)/(R·hs²) and dg/dhi = qi/(R·hi²).
type slopes struct{ u, g float64 }

func byHand(r *Rating) (hs, hi slopes) {
	u, h, i := r.U.Number, r.Gaps[0].Total, r.InsideWM2K.Number
	q, b, resistance := r.SecondaryHeat.Number, r.Absorptance[1].Number, 1/r.U.Number
	return slopes{u * u / (h * h), (q - b) / (resistance * h * h)}, slopes{u * u / (i * i), q / (resistance * i * i)}
}

// handSlopes returns the derivative of hs with respect to the emissivities of both faces of the
// gap, the fill of argon and the width in mm.
//
// hr = K/(1/ε2 + 1/ε3 − 1), so dhr/dε = hr²/(K·ε²) with K = 4·σ·Tm³. hg = Nu·λ/s with Nu = A·Ra^n
// and Ra ~ s³·ρ²·c/(µ·λ): dhg/ds = (3·n − 1)·hg/s, or −hg/s at Nu = 1; properties are linear in the
// fill, so dhg/df = hg·(λ′/λ + n·(2·ρ′/ρ + c′/c − µ′/µ − λ′/λ)), n being 0 at Nu = 1.
func handSlopes(r *Rating) (e2, e3, fill, width float64) {
	g, s := r.Ready.prepared[r.State].gaps[0], r.Gaps[0]
	k := 4 * thermal.StefanBoltzmann * math.Pow(thermal.MeanTemperature, 3)
	radiation := func(e float64) float64 { return s.Radiative * s.Radiative / (k * e * e) }
	n := 0.38
	if s.Nusselt == 1 {
		n = 0
	}
	var argon, plain thermal.Gas
	for _, x := range thermal.Gases() {
		switch x.Name {
		case "argon":
			argon = x
		case "air":
			plain = x
		}
	}
	of := func(get func(thermal.Gas) float64) float64 { return (get(argon) - get(plain)) / get(g.Gas) }
	density, viscosity := of(func(x thermal.Gas) float64 { return x.DensityKGM3 }), of(func(x thermal.Gas) float64 { return x.ViscosityPaS })
	conductivity, capacity := of(func(x thermal.Gas) float64 { return x.ConductivityWMK }), of(func(x thermal.Gas) float64 { return x.HeatCapacityJKGK })
	moving := conductivity + n*(2*density+capacity-viscosity-conductivity)
	return radiation(g.Emissivity[0]), radiation(g.Emissivity[1]), s.Convective * moving, s.Convective * (3*n - 1) / (g.WidthM * 1000)
}

// Central and one-sided differences meet the derivatives worked out by hand, to the truncation of
// second order; steps that are 1 % longer change nothing that matters.
func TestSensitivityOfADouble(t *testing.T) {
	for _, tt := range []struct {
		name       string
		mm, argon  float64
		e2, e3, e4 float64
		sides      [5]Side // ε2, ε3, ε4, fill, width
		moves      bool
		truncation float64 // relative
	}{
		{name: "low-e, moving gas", mm: 18, argon: 0.9, e2: 0.837, e3: 0.04, e4: 0.837, moves: true,
			sides: [5]Side{BothSides, BothSides, BothSides, BothSides, BothSides}, truncation: 1e-6},
		{name: "two films, still gas", mm: 8, argon: 0.5, e2: 0.15, e3: 0.03, e4: 0.2,
			sides: [5]Side{BothSides, BothSides, BothSides, BothSides, BothSides}, truncation: 2e-5},
		{name: "at the bounds", mm: 12, argon: 1, e2: 1, e3: 0.1, e4: 0.99995,
			sides: [5]Side{Below, BothSides, Below, Below, BothSides}, truncation: 1e-5},
		{name: "nearly air", mm: 12, argon: 0.0004, e2: 0.837, e3: 0.00005, e4: 0.837,
			sides: [5]Side{BothSides, Above, BothSides, Above, BothSides}, truncation: 1e-5},
	} {
		m := doubleOf(t, tt.mm, map[string]float64{"argon": tt.argon, "air": 1 - tt.argon}, tt.e2, tt.e3, tt.e4)
		r := rateOne(t, m, EN, Options{})
		if (r.Gaps[0].Nusselt > 1) != tt.moves {
			t.Fatalf("%s: Nu %v", tt.name, r.Gaps[0].Nusselt)
		}
		got, err := Sensitivities(r)
		if err != nil {
			t.Fatal(err)
		}
		hs, hi := byHand(r)
		e2, e3, fill, width := handSlopes(r)
		want := []struct {
			Sensitivity
			u, g float64 // derivatives
		}{
			{Sensitivity{Input: EmissivityInput, Number: 2, Value: tt.e2, Change: 0.01}, hs.u * e2, hs.g * e2},
			{Sensitivity{Input: EmissivityInput, Number: 3, Value: tt.e3, Change: 0.01}, hs.u * e3, hs.g * e3},
			// hi = 3.6 + 4.1·ε/0.837 under en (EN 673, 7)
			{Sensitivity{Input: EmissivityInput, Number: 4, Value: tt.e4, Change: 0.01}, hi.u * 4.1 / 0.837, hi.g * 4.1 / 0.837},
			{Sensitivity{Input: FillInput, Number: 1, Value: tt.argon, Change: 0.01}, hs.u * fill, hs.g * fill},
			{Sensitivity{Input: WidthInput, Number: 1, Value: tt.mm, Change: 1}, hs.u * width, hs.g * width},
		}
		if len(got) != len(want) {
			t.Fatalf("%s: %d sensitivities, want %d", tt.name, len(got), len(want))
		}
		for i, w := range want {
			g := got[i]
			name := tt.name + ", " + string(w.Input)
			if g.Input != w.Input || g.Number != w.Number || math.Abs(g.Value-w.Value) > 1e-15 || g.Change != w.Change || g.Side != tt.sides[i] || g.Corner {
				t.Errorf("%s: %+v, want %+v on side %s", name, g, w.Sensitivity, tt.sides[i])
			}
			near(t, name+", U", g.U, w.u*w.Change, tt.truncation*math.Abs(w.u*w.Change)+binary)
			near(t, name+", g", g.G, w.g*w.Change, tt.truncation*math.Abs(w.g*w.Change)+binary)
		}
		longer := variations
		for i := range longer {
			longer[i].step *= 1.01
		}
		other, err := sensitivities(r, longer[:])
		if err != nil {
			t.Fatal(err)
		}
		for i := range got {
			near(t, tt.name+", a longer step, U", other[i].U, got[i].U.Number, tt.truncation*math.Abs(got[i].U.Number)+binary)
			near(t, tt.name+", a longer step, g", other[i].G, got[i].G.Number, tt.truncation*math.Abs(got[i].G.Number)+binary)
		}
	}
}

// A triple: what its gaps share hangs on each of them, so the sum of the parts by symmetry is all
// that hand work gives. A make-up that is its own mirror image has the same dU for either gap.
func TestSensitivityOfASymmetricTriple(t *testing.T) {
	argon := gap(t, 14, map[string]float64{"argon": 0.9, "air": 0.1})
	out, mid := pane("out", flat(300, 2500, 0.6, 0.1, 0.2), 0.837, 0.03), pane("mid", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	m := &Makeup{Panes: []Placed{{Pane: out}, {Pane: mid}, {Pane: out, Turned: true}}, Gaps: []Gap{argon, argon}}
	got, err := Sensitivities(rateOne(t, m, EN, Options{InsideWM2K: 7.7}))
	if err != nil {
		t.Fatal(err)
	}
	if len(got) != 8 { // hi is typed: surface 6 enters nothing
		t.Fatalf("%d sensitivities, want those of surfaces 2 to 5, two fills and two widths", len(got))
	}
	for _, pair := range [][2]int{{0, 3}, {1, 2}, {4, 5}, {6, 7}} {
		a, b := got[pair[0]], got[pair[1]]
		near(t, string(a.Input), a.U, b.U.Number, 1e-6*math.Abs(b.U.Number))
	}
	// The pane that is placed twice was varied in one place at a time: both places together move U
	// by the sum.
	both := variation{EmissivityInput, 0.01, 0.0001, 0, false, 1}
	r := rateOne(t, m, EN, Options{InsideWM2K: 7.7})
	var u [2]float64
	for k, sign := range []float64{-1, 1} {
		x := r.inState()
		both.input.set(x, 1, 0.03+sign*both.step)
		both.input.set(x, 4, 0.03+sign*both.step)
		var rated Rating
		if err := rated.again(r, x); err != nil {
			t.Fatal(err)
		}
		u[k] = rated.U.Number
	}
	near(t, "both films", got[0].U, (u[1]-u[0])/(2*both.step)*both.change/2, 1e-6)
	if e := m.Panes[0].Pane.Tints[0].Back.Corrected.Number; e != 0.03 {
		t.Errorf("the rated pane's emissivity became %v", e)
	}
}

// Where the gas begins to move within the step, the sensitivity says so: 16 mm of argon 90 moves,
// and the width at which it just does is (Ra of Nu 1)/(Ra at 16 mm) to the third.
func TestSensitivityAtTheCorner(t *testing.T) {
	gas := map[string]float64{"argon": 0.9, "air": 0.1}
	at := func(mm float64) *Rating { return rateOne(t, doubleOf(t, mm, gas, 0.837, 0.04, 0.837), EN, Options{}) }
	edge := 16 * math.Cbrt(math.Pow(1/0.035, 1/0.38)/at(16).Gaps[0].Rayleigh)
	for _, tt := range []struct {
		mm   float64
		want bool
	}{{edge, true}, {edge + 0.008, true}, {edge + 0.02, false}, {edge - 0.02, false}} {
		got, err := Sensitivities(at(tt.mm))
		if err != nil {
			t.Fatal(err)
		}
		if width := got[4]; width.Corner != tt.want {
			t.Errorf("%.6f mm, the edge being %.6f: corner is %t", tt.mm, edge, width.Corner)
		}
	}
}

// Where there is nothing to vary, or U is not known, that is said.
func TestSensitivitiesUnknown(t *testing.T) {
	clear := pane("clear", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	bare := pane("bare", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	bare.Tints[0].Back = NoEmissivity()
	short := pane("short", flat(380, 780, 0.8, 0.08, 0.08), 0.837, 0.837)
	laminate := pane("laminate", flat(300, 2500, 0.7, 0.08, 0.08), 0.837, 0.837)
	laminate.Plies = []Ply{{ThicknessMM: 4, ConductivityWMK: 1}, {Interlayer: true, ThicknessMM: 0.76, ConductivityWMK: 0.2}, {ThicknessMM: 4, ConductivityWMK: 1}}
	argon, still := gap(t, 16, map[string]float64{"argon": 0.9, "air": 0.1}), gap(t, 12, map[string]float64{"air": 1})
	for _, tt := range []struct {
		name         string
		basis        Basis
		m            *Makeup
		o            Options
		sensitivity  int    // how many there are
		why, fillWhy string // parts of the reasons for which there are none
		g            bool
	}{
		{"laminate", EN, &Makeup{Panes: []Placed{{Pane: laminate}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 5, "", "", true},
		{"single pane", EN, &Makeup{Panes: []Placed{{Pane: clear}}}, Options{}, 1, "", "there is no gap", true},
		{"single pane, hi typed", EN, &Makeup{Panes: []Placed{{Pane: clear}}}, Options{InsideWM2K: 8}, 0, "", "there is no gap", true},
		{"all air", ISO, &Makeup{Panes: []Placed{{Pane: clear}, {Pane: clear}}, Gaps: []Gap{still}}, Options{}, 5, "", "a gas other than air", true},
		{"no emissivity", EN, &Makeup{Panes: []Placed{{Pane: bare}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 0, "surface 2", "surface 2", false},
		{"outside face unknown", EN, &Makeup{Panes: []Placed{{Pane: bare, Turned: true}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 5, "", "", true},
		{"by balances, surface 1 too", NA, &Makeup{Panes: []Placed{{Pane: clear}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 6, "", "", true},
		{"by balances, a face unknown", NA, &Makeup{Panes: []Placed{{Pane: bare}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 0, "surface 2", "surface 2", false},
		{"vacuum", EN, &Makeup{Panes: []Placed{{Pane: clear}, {Pane: clear}}, Gaps: []Gap{{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20}}}}, Options{}, 3, "", "a gas other than air", true},
		{"no g", EN, &Makeup{Panes: []Placed{{Pane: short}, {Pane: clear}}, Gaps: []Gap{argon}}, Options{}, 5, "", "", false},
	} {
		r := rateOne(t, tt.m, tt.basis, tt.o)
		got, err := Sensitivities(r)
		if len(got) != tt.sensitivity || (err != nil) != (tt.why != "") || (err != nil && !strings.Contains(err.Error(), tt.why)) {
			t.Errorf("%s: %d sensitivities, %v", tt.name, len(got), err)
		}
		for _, s := range got {
			air := tt.name == "all air" && s.Input == FillInput
			if s.U.Known == air || s.G.Known != (tt.g && !air) || (!s.U.Known && s.U.Why == "") || (!s.G.Known && s.G.Why == "") {
				t.Errorf("%s: %+v", tt.name, s)
			}
		}
		fills, err := Fills(r)
		if (err != nil) != (tt.fillWhy != "") || (err != nil && !strings.Contains(err.Error(), tt.fillWhy)) || (err == nil && len(fills) != 3) {
			t.Errorf("%s: fills %v, %v", tt.name, fills, err)
		}
		said := ""
		for _, c := range Working(r) {
			said += c.Title + " " + c.Note + "\n"
		}
		for _, want := range []string{tt.why, tt.fillWhy} {
			if !strings.Contains(said, want) {
				t.Errorf("%s: the working does not say %q:\n%s", tt.name, want, said)
			}
		}
	}
}

// U of other fills is that of make-ups filled so; gases other than air keep their proportion, and
// a gap of air stays one.
func TestFills(t *testing.T) {
	out, mid := pane("out", flat(300, 2500, 0.6, 0.1, 0.2), 0.837, 0.03), pane("mid", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	with := func(mixed map[string]float64) *Makeup {
		return &Makeup{Panes: []Placed{{Pane: out}, {Pane: mid}, {Pane: out, Turned: true}},
			Gaps: []Gap{gap(t, 14, mixed), gap(t, 12, map[string]float64{"air": 1})}}
	}
	got, err := Fills(rateOne(t, with(map[string]float64{"argon": 0.3, "krypton": 0.6, "air": 0.1}), ISO, Options{}))
	if err != nil || len(got) != 3 {
		t.Fatalf("%v, %v", got, err)
	}
	for i, want := range []struct{ share, argon, krypton float64 }{ // a third and two thirds of the fill
		{0.90, 0.30, 0.60}, {0.85, 0.85 / 3, 1.7 / 3}, {0.80, 0.80 / 3, 1.6 / 3},
	} {
		r := rateOne(t, with(map[string]float64{"argon": want.argon, "krypton": want.krypton, "air": 1 - want.share}), ISO, Options{})
		if got[i].Share != want.share || math.Abs(got[i].UWM2K-r.U.Number) > 1e-12 {
			t.Errorf("fill of %g: U %.12g, want %.12g", got[i].Share, got[i].UWM2K, r.U.Number)
		}
	}
}

// What is varied is the tint that was rated.
func TestSensitivityOfATint(t *testing.T) {
	film := pane("tintable", flat(300, 2500, 0.6, 0.1, 0.2), 0.837, 0.15)
	film.Tints[0].Name = "clear"
	dark := film.Tints[0]
	dark.Name, dark.Spectrum, dark.Back = "full", flat(300, 2500, 0.05, 0.1, 0.2), GivenEmissivity(0.25)
	film.Tints = append(film.Tints, dark)
	clear := pane("clear", flat(300, 2500, 0.8, 0.08, 0.08), 0.837, 0.837)
	m := &Makeup{Panes: []Placed{{Pane: film}, {Pane: clear}}, Gaps: []Gap{gap(t, 12, map[string]float64{"argon": 0.9, "air": 0.1})}}
	ready, err := NewMethod(EN, Options{}).Ready(m)
	if err != nil {
		t.Fatal(err)
	}
	all, err := ready.RateAll()
	if err != nil {
		t.Fatal(err)
	}
	for i, e := range []float64{0.15, 0.25} {
		got, err := Sensitivities(&all[i])
		if err != nil {
			t.Fatal(err)
		}
		hs, _ := byHand(&all[i])
		slope, _, _, _ := handSlopes(&all[i])
		if got[0].Value != e {
			t.Errorf("tint %s: ε2 %v, want %v", all[i].Tint, got[0].Value, e)
		}
		near(t, "ε2, U", got[0].U, hs.u*slope*0.01, 1e-6)
		near(t, "ε2, g", got[0].G, hs.g*slope*0.01, 1e-6)
	}
}
