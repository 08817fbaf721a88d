package glazing

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/thermal"
)

// clearGlass is an uncoated pane of a thickness whose spectrum is flat.
func clearGlass(mm, tau, rho float64) *Pane {
	p := pane("clear", flat(300, 2500, tau, rho, rho), 0.837, 0.837)
	p.Plies[0].ThicknessMM = mm
	p.HeatTreatment = HeatStrengthened
	return p
}

// Under a basis of balances U is that of winter and g that of summer, and what goes with them too;
// under the others only the conditions of the user have balances, in their order.
func TestFiguresOfBalances(t *testing.T) {
	own := []Condition{
		{ID: "january-night", OutsideC: -12, InsideC: 20, WindMS: known(4)},
		{ID: "july", OutsideC: 33, InsideC: 25, OutsideConvectionWM2K: known(12), InsideConvectionWM2K: known(3), SunWM2: 600},
	}
	low := clearGlass(4, 0.5, 0.2)
	low.Tints[0].Front = GivenEmissivity(0.03)
	m := &Makeup{ID: "D", Panes: []Placed{{Pane: clearGlass(6, 0.8, 0.08)}, {Pane: low}}, Gaps: []Gap{gap(t, 16, map[string]float64{"argon": 0.9, "air": 0.1})}}
	for _, tt := range []struct {
		basis Basis
		ids   []string
	}{
		{EN, []string{"january-night", "july"}},
		{ISO, []string{"january-night", "july"}},
		{NA, []string{"winter", "summer", "january-night", "july"}},
		{ISO15099, []string{"winter", "summer", "january-night", "july"}},
	} {
		r := rateOne(t, m, tt.basis, Options{Conditions: own})
		var ids []string
		for _, b := range r.Balances {
			ids = append(ids, b.Condition.ID)
		}
		if !slices.Equal(ids, tt.ids) {
			t.Errorf("%s: conditions %v, want %v", tt.basis.Name, ids, tt.ids)
		}
		plain := rateOne(t, m, tt.basis, Options{})
		if r.U != plain.U || r.G != plain.G {
			t.Errorf("%s: the user's conditions move U or g", tt.basis.Name)
		}
		for i := range r.Balances {
			closes(t, fmt.Sprintf("%s, %s", tt.basis.Name, r.Balances[i].Condition.ID), r, &r.Balances[i])
		}
		if !tt.basis.Balances() {
			continue
		}
		winter, summer := r.Balance(Winter), r.Balance(Summer)
		gap := &winter.Dark.Gaps[0]
		if r.U != winter.U || r.G != summer.G || r.Gaps[0].Nusselt != gap.Nusselt || r.Gaps[0].Total != gap.Total() ||
			math.Abs(r.SecondaryHeat.Number-(r.G.Number-r.Solar.Transmittance.Number)) > 0 ||
			r.OutsideWM2K.Number != winter.Dark.Outside.Total() || r.InsideWM2K.Number != winter.Dark.Room.Total() {
			t.Errorf("%s: the rating does not have the figures of its winter and summer", tt.basis.Name)
		}
	}
}

// closes holds a balance against what must be true of it: U by flux is U by resistances, g is what
// passes and what the room gains, energy closes over the whole.
func closes(t *testing.T, name string, r *Rating, b *Balance) {
	t.Helper()
	near := func(what string, got, want, tolerance float64) {
		if math.Abs(got-want) > tolerance {
			t.Errorf("%s: %s %.12g, want %.12g", name, what, got, want)
		}
	}
	sum := 1/b.Dark.Outside.Total() + 1/b.Dark.Room.Total() + r.Ready.glassResistance()
	for k := range r.Makeup.Gaps {
		sum += 1 / b.Dark.Gaps[k].Total()
	}
	near("U", b.U.Number, 1/sum, 1e-9)
	absorbed := 0.0
	for k, a := range b.AbsorbedWM2 {
		near("absorbed", a, r.Absorptance[k].Number*b.Condition.SunWM2, 1e-9)
		absorbed += a
	}
	near("energy", b.Lit.Outside.FluxWM2()+absorbed, b.Lit.InwardWM2(), 1e-6)
	if sun := b.Condition.SunWM2; sun > 0 {
		near("g", b.G.Number, r.Solar.Transmittance.Number+(b.Lit.InwardWM2()-b.Dark.InwardWM2())/sun, 1e-12)
	} else if b.G.Known || b.G.Why == "" || b.Lit != b.Dark {
		t.Errorf("%s: g without sun: %+v", name, b.G)
	}
}

// The sky is seen by (1 + cos tilt)/2 of the half space, and counts by the fourth power of its
// temperature (ISO 15099, 8.4, from memory); worked by hand for −20 °C over 0 °C.
func TestSurroundings(t *testing.T) {
	fourth := func(t float64) float64 { return t * t * t * t }
	for _, tt := range []struct {
		what string
		c    Condition
		tilt float64
		want float64 // outdoor radiant temperature, K
	}{
		{"nothing given", Condition{OutsideC: 5}, 30, 278.15},
		{"surroundings", Condition{OutsideC: 5, OutsideRadiantC: known(-3)}, 30, 270.15},
		{"sky, level", Condition{SkyC: known(-20)}, 0, 253.15},
		{"sky, upright", Condition{SkyC: known(-20)}, 90, math.Pow((fourth(253.15)+fourth(273.15))/2, 0.25)},
		{"sky, 60°", Condition{SkyC: known(-20)}, 60, math.Pow(0.75*fourth(253.15)+0.25*fourth(273.15), 0.25)},
		{"sky, facing down", Condition{SkyC: known(-20)}, 180, 273.15},
		{"sky and surroundings", Condition{SkyC: known(-20), OutsideRadiantC: known(-8)}, 90, math.Pow((fourth(253.15)+fourth(265.15))/2, 0.25)},
	} {
		if got := tt.c.Surroundings(tt.tilt).OutsideRadiantK; math.Abs(got-tt.want) > 1e-9 {
			t.Errorf("%s: %.6f K, want %.6f", tt.what, got, tt.want)
		}
	}
	wind := Condition{WindMS: known(5.5)}
	if h, assumed := wind.OutsideConvection(); h != 26 || assumed { // the winter of na, 5.5 m/s
		t.Errorf("5.5 m/s: %g W/(m²·K), assumed %t", h, assumed)
	}
	none := Condition{}
	if h, assumed := none.OutsideConvection(); h != 20 || !assumed {
		t.Errorf("no wind: %g W/(m²·K), assumed %t", h, assumed)
	}
	if at := none.Surroundings(90); at.HeightM != 1 || at.InsideConvection != 0 || at.InsideRadiantK != 273.15 {
		t.Errorf("defaults: %+v", at)
	}
}

// The absorbed sun of a laminate acts where its plies lie: by hand, for plies of resistances 4, 7 and 4
// (in 1e-3 m²·K/W) with a half, a quarter and a quarter of the thickness, turned and not.
func TestLaminateIsTurned(t *testing.T) {
	p := clearGlass(4, 0.2, 0.1)
	p.Plies = []Ply{{ThicknessMM: 8, ConductivityWMK: 2}, {ThicknessMM: 4, ConductivityWMK: 4. / 7, Interlayer: true}, {ThicknessMM: 4, ConductivityWMK: 1}}
	inner := 0.5*2/15 + 0.25*7.5/15 + 0.25*13/15
	for _, turned := range []bool{false, true} {
		m := &Makeup{ID: "L", Panes: []Placed{{Pane: p, Turned: turned}}}
		b := rateOne(t, m, NA, Options{}).Balance(Summer)
		want := inner
		if turned {
			want = 1 - inner
		}
		if got := b.Lit.SunWM2[1] / (b.Lit.SunWM2[0] + b.Lit.SunWM2[1]); math.Abs(got-want) > 1e-12 {
			t.Errorf("turned %t: %.6f of the sun acts inside, want %.6f", turned, got, want)
		}
	}
}

// A sheet that passes infrared has U under balances alone; its emissivities bound what it may pass.
func TestInfraredSheet(t *testing.T) {
	foil := clearGlass(0.05, 0.9, 0.08)
	foil.TauInfrared = 0.3
	foil.Tints[0].Front, foil.Tints[0].Back = GivenEmissivity(0.1), GivenEmissivity(0.6)
	air := gap(t, 12, map[string]float64{"air": 1})
	m := &Makeup{ID: "F", Panes: []Placed{{Pane: clearGlass(4, 0.8, 0.08)}, {Pane: foil}, {Pane: clearGlass(4, 0.8, 0.08)}}, Gaps: []Gap{air, air}}
	if r := rateOne(t, m, EN, Options{}); r.U.Known || !strings.Contains(r.U.Why, "lets infrared through") {
		t.Errorf("U under en: %+v", r.U)
	}
	passes := rateOne(t, m, NA, Options{}).U.Number
	foil.TauInfrared = 0
	if blocks := rateOne(t, m, NA, Options{}).U.Number; !(blocks < passes) {
		t.Errorf("U %.3f where infrared passes, %.3f where it does not", passes, blocks)
	}
}

// A vacuum under en is the sum of its three conductances at 283 K: by hand, pillars of 0.125 mm 20 mm
// apart 2·1·0.000125/0.0004, gas 0.8·0.1, radiation of two faces of 0.03 (VAC-12 of the checks).
func TestVacuum(t *testing.T) {
	low := clearGlass(4, 0.7, 0.1)
	low.Tints[0].Back = GivenEmissivity(0.03)
	m := &Makeup{ID: "V", Panes: []Placed{{Pane: low}, {Pane: low, Turned: true}},
		Gaps: []Gap{{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.125, PillarPitchMM: 20}}}}
	r := rateOne(t, m, EN, Options{})
	gap := 0.625 + 0.08 + 4*5.67e-8*283*283*283/(2/0.03-1)
	if want := 1 / (1.0/25 + 1/7.7 + 0.008 + 1/gap); math.Abs(r.U.Number-want) > 1e-9 || math.Abs(want-0.6875) > 0.001 {
		t.Errorf("U %.6f, want %.6f and 0.6875", r.U.Number, want)
	}
	if !strings.Contains(m.BuildUp(), "vacuum") {
		t.Errorf("build-up %s", m.BuildUp())
	}
	for _, basis := range []Basis{NA, ISO15099} {
		x := rateOne(t, m, basis, Options{})
		closes(t, basis.Name, x, x.Balance(Summer))
	}
	// Pillars that resist too make U smaller.
	m.Gaps[0].Vacuum.PillarWMK = known(20)
	if x := rateOne(t, m, EN, Options{}); !(x.U.Number < r.U.Number) {
		t.Errorf("U %.4f with pillars of 20 W/(m·K), %.4f with ideal ones", x.U.Number, r.U.Number)
	}
	m.Gaps[0].Vacuum.PillarPitchMM = 0.25
	if _, err := NewMethod(EN, Options{}).Ready(m); err == nil || !strings.Contains(err.Error(), "pitch") {
		t.Errorf("pillars that touch: %v", err)
	}
}

// SF6 has no properties in ISO 15099: a balance is refused, U of EN 673 is not.
func TestSF6(t *testing.T) {
	m := &Makeup{ID: "S", Panes: []Placed{{Pane: clearGlass(4, 0.8, 0.08)}, {Pane: clearGlass(4, 0.8, 0.08)}}, Gaps: []Gap{gap(t, 12, map[string]float64{"sf6": 0.1, "air": 0.9})}}
	if r := rateOne(t, m, EN, Options{}); !r.U.Known {
		t.Errorf("en: %+v", r.U)
	}
	for _, o := range []Options{{}, {Conditions: []Condition{{ID: "c", InsideC: 20, WindMS: known(2)}}}} {
		basis := NA
		if o.Conditions != nil {
			basis = EN
		}
		if _, err := NewMethod(basis, o).Ready(m); err == nil || !strings.Contains(err.Error(), "sf6") {
			t.Errorf("%s: %v", basis.Name, err)
		}
	}
}

// Each caution of temperatures appears on one side of its threshold. Where all is equally warm, so is
// the glass; a typed factor of the edge fixes its temperature; a dew point of 9.27 °C belongs to 20 °C
// and 0.5 (EN ISO 13788, from memory).
func TestThresholdsOfTemperatures(t *testing.T) {
	isothermal := func(c float64) Condition {
		return Condition{ID: "x", OutsideC: c, InsideC: c, WindMS: known(2), SunWM2: 1e-9}
	}
	damp := Condition{ID: "x", OutsideC: -10, InsideC: 20, OutsideConvectionWM2K: known(0.1), OutsideRadiantC: known(20), InsideConvectionWM2K: known(1000),
		InsideHumidity: known(0.5), TiltDeg: known(90)}
	cold := func(outside float64) Condition { // the surface has all but the temperature of the outdoor air
		return Condition{ID: "x", OutsideC: outside, InsideC: 20, OutsideConvectionWM2K: known(1e6), InsideConvectionWM2K: known(0.001)}
	}
	// The asymmetry of 5 % is (6.61 − ln 19)/0.345 = 10.62 K (ISO 7730:2005). In front of an endless
	// wall it is the difference to the glass, in fourth powers all but linear over so little.
	endless := AnyPerson()
	endless.GlassWidthM, endless.GlassHeightM, endless.DistanceM = 1e5, 1e5, 1000
	endless.GlassHeightM = 1e5
	for _, tt := range []struct {
		what  string
		c     Condition
		edge  Edge
		o     Options
		code  string
		there bool
	}{
		{"45.1 °C", isothermal(45.1), Edge{}, Options{}, "hot_surface", true},
		{"59.9 °C within", isothermal(59.9), Edge{}, Options{}, "at a seal", false},
		{"60.1 °C within", isothermal(60.1), Edge{}, Options{}, "at a seal", true},
		{"factor 0.642, 9.26 °C", damp, Edge{TemperatureFactor: known(0.642)}, Options{}, "condensation", true},
		{"factor 0.643, 9.29 °C", damp, Edge{TemperatureFactor: known(0.643)}, Options{}, "condensation", false},
		{"margin of 100 K", isothermal(20), Edge{}, Options{Stress: &StressScreening{FrameMarginK: 100, Factor: 1}}, "above the guide", true},
		{"no margin", isothermal(20), Edge{}, Options{}, "thermal_stress", false},
		{"asymmetry beyond 10.62 K", cold(9), Edge{}, Options{Person: &endless}, "cold_glass", true},
		{"no wind", Condition{ID: "x", InsideC: 20}, Edge{}, Options{}, "wind_assumed", true},
		{"wind", Condition{ID: "x", InsideC: 20, WindMS: known(3)}, Edge{}, Options{}, "wind_assumed", false},
		{"radiant apart", Condition{ID: "x", InsideC: 20, WindMS: known(3), InsideRadiantC: known(19)}, Edge{}, Options{}, "radiant_apart", true},
		{"radiant as the air", Condition{ID: "x", InsideC: 20, WindMS: known(3), InsideRadiantC: known(20)}, Edge{}, Options{}, "radiant_apart", false},
		{"151 °C", isothermal(151), Edge{}, Options{}, "beyond_gas_data", false}, // no gap
		{"asymmetry beyond 15 K", cold(-5), Edge{}, Options{Person: &endless}, "beyond what ISO 7730 judges", true},
		{"edge by ψ", isothermal(20), Edge{PsiWMK: known(0.05)}, Options{}, "edge_estimate", true},
	} {
		p := clearGlass(4, 0.95, 0.04)
		m := &Makeup{ID: "q", Panes: []Placed{{Pane: p}}, Edge: tt.edge}
		if strings.Contains(tt.what, "within") {
			m.Panes, m.Gaps = append(m.Panes, m.Panes[0]), []Gap{gap(t, 12, map[string]float64{"air": 1})}
		}
		tt.o.Conditions = []Condition{tt.c}
		r := rateOne(t, m, EN, tt.o)
		there := slices.ContainsFunc(r.Cautions, func(c Caution) bool {
			return c.Code == tt.code || strings.Contains(c.Text, tt.code)
		})
		if there != tt.there {
			t.Errorf("%s: caution %s there %t, want %t", tt.what, tt.code, there, tt.there)
		}
	}
}

// Stress is the worst of the summer and the cold sunny condition and of the user's with sun; a project
// may put its own in the place of the cold sunny one.
func TestStressOfTheWorstCondition(t *testing.T) {
	dark := clearGlass(6, 0.2, 0.05)
	m := &Makeup{ID: "S", Panes: []Placed{{Pane: dark}, {Pane: clearGlass(6, 0.8, 0.08)}}, Gaps: []Gap{gap(t, 16, map[string]float64{"argon": 1})}}
	by := func(o Options) *Stress { return &rateOne(t, m, EN, o).Stress[0] }
	plain := by(Options{})
	// All its sun, 0.762·783 W/m², would warm the outer pane by 30 K against 15 + about 5 W/(m²·K)
	// outside alone, and by 20 K against another 10 W/(m²·K) towards the room.
	if plain.Condition != SummerNA || plain.DropK < 20 || plain.DropK > 30 || math.Abs(plain.CentreC-plain.EdgeC-plain.DropK) > 1e-9 {
		t.Errorf("summer: %+v", plain)
	}
	if want := 70e3 * 9e-6 * plain.DropK; math.Abs(plain.StressMPa-want) > 1e-9 {
		t.Errorf("stress %.3f MPa, want %.3f", plain.StressMPa, want)
	}
	own := Condition{ID: ColdSun, OutsideC: -20, InsideC: 20, OutsideConvectionWM2K: known(4), SunWM2: 1000}
	if got := by(Options{Conditions: []Condition{own}}); got.Condition != ColdSun || got.DropK <= plain.DropK {
		t.Errorf("a cold sunny day of the user: %+v", got)
	}
	margin := by(Options{Stress: &StressScreening{FrameMarginK: 5, Factor: 0.5}})
	if math.Abs(margin.DropK-plain.DropK-5) > 1e-9 || math.Abs(margin.StressMPa-0.5*70e3*9e-6*margin.DropK) > 1e-9 {
		t.Errorf("with a margin of 5 K and a factor of 0.5: %+v", margin)
	}
	if margin.GuideK != 100 || margin.Word != thermal.BelowGuide {
		t.Errorf("heat-strengthened: %+v", margin)
	}
}

// Balances serve each tint: the darker pane is the hotter.
func TestBalancesOfTints(t *testing.T) {
	p := clearGlass(6, 0.6, 0.1)
	p.Tints = []Tint{p.Tints[0], p.Tints[0]}
	p.Tints[0].Name, p.Tints[1].Name = "clear", "full"
	p.Tints[1].Spectrum = flat(300, 2500, 0.05, 0.1, 0.1)
	m := &Makeup{ID: "E", Panes: []Placed{{Pane: p}, {Pane: clearGlass(6, 0.8, 0.08)}}, Gaps: []Gap{gap(t, 16, map[string]float64{"argon": 1})}}
	r := ratedAll(t, m, NA, Options{})
	a, b := r[0].Balance(Summer), r[1].Balance(Summer)
	if !(b.SurfaceC(0).Number > a.SurfaceC(0).Number+5) || !(b.G.Number < a.G.Number) || a.U != b.U {
		t.Errorf("clear %+v, full %+v", a.Lit.SurfaceK[:4], b.Lit.SurfaceK[:4])
	}
}

// The emissivity of a balance is the integral over the half space where that follows from what the
// face is made of, else the corrected one; uncoated glass keeps its convention.
func TestBalancedEmissivity(t *testing.T) {
	computed := Emissivity{Corrected: known(0.05), Hemispherical: known(0.06), Source: EmissivityComputed}
	if computed.Balanced() != known(0.06) || GivenEmissivity(0.2).Balanced() != known(0.2) ||
		ConventionalEmissivity(0.893, 0.834).Balanced() != known(0.837) {
		t.Error("balances take another emissivity")
	}
}

// Where a face or the sun is unknown, every figure of a condition that needs it says why, and none
// fails.
func TestUnknownBalances(t *testing.T) {
	bare := clearGlass(4, 0.8, 0.08)
	bare.Tints[0].Back = NoEmissivity()
	short := clearGlass(4, 0.8, 0.08)
	short.Tints[0].Spectrum = flat(400, 900, 0.8, 0.08, 0.08)
	sunny := Condition{ID: "c", OutsideC: 30, InsideC: 25, WindMS: known(2), SunWM2: 500, InsideHumidity: known(0.5)}
	for _, tt := range []struct {
		pane *Pane
		why  string
		dark bool // whether what needs no sun is known
	}{{bare, "emissivity", false}, {short, "spectrum", true}} {
		for _, b := range Bases() {
			r := rateOne(t, &Makeup{ID: "U", Panes: []Placed{{Pane: tt.pane}}}, b, Options{Conditions: []Condition{sunny}})
			balance := r.Balance("c")
			for _, f := range BalanceFigures() {
				if f.Per == PerGap || strings.HasPrefix(f.Key, "moisture.edge") {
					continue
				}
				v := f.Of(r, balance, 0)
				needsSun := f.Alias != "u" && f.Alias != "tilt" && !strings.HasPrefix(f.Key, "moisture.")
				switch {
				case f.Alias == "tilt" || f.Alias == "dew_point" || f.Alias == "absorptance": // no balance is needed
				case v.Known != (tt.dark && !needsSun):
					t.Errorf("%s, %s: %+v", b.Name, f.Key, v)
				case !v.Known && !strings.Contains(v.Why, tt.why):
					t.Errorf("%s, %s: unknown for %q", b.Name, f.Key, v.Why)
				}
			}
		}
	}
}

// The direct sun on a person: by hand, 600 W/m² on an upright glazing at an altitude of 30° is
// 600/(0.866 + 0.1); none where the glazing looks away from the sun or the sun would be too strong.
func TestBeam(t *testing.T) {
	for _, tt := range []struct{ tilt, altitude, sun, want float64 }{
		{90, 30, 600, 600 / (math.Sqrt(3)/2 + 0.1)},
		{0, 30, 600, 600 / (0.5 + 0.2)},
		{30, 60, 600, 600 / (1 + 0.1*(1+math.Sqrt(3)/2))},
		{135, 45, 600, 0}, {180, 10, 600, 0},
		{90, 60, 0.6 * 1360, 1360}, {90, 60, 0.6 * 1362, 0},
	} {
		b := Balance{TiltDeg: tt.tilt, Condition: &Condition{SunWM2: tt.sun}}
		got := b.beam(tt.altitude)
		if got.Known != (tt.want > 0) || (got.Known && math.Abs(got.Number-tt.want) > 1e-9) || (!got.Known && got.Why == "") {
			t.Errorf("%+v: %+v", tt, got)
		}
	}
}

// Off upright the glass is a ceiling or nothing that ISO 7730 knows: by hand, 100/(1 + exp(2.84 −
// 0.174·Δ)) − 5.5 of a warm ceiling, and no air falls along it.
func TestComfortByTilt(t *testing.T) {
	figure := func(b *Balance, r *Rating, key string) Value { return r.balanceFigure(b, key) }
	for _, tt := range []struct {
		tilt     float64
		a, bb, c float64 // of the formula; 0 where there is none
	}{{90, 3.72, 0.052, 3.5}, {60, 3.72, 0.052, 3.5}, {59.8, 0, 0, 0}, {45.2, 0, 0, 0}, {45, 2.84, 0.174, 5.5}, {0, 2.84, 0.174, 5.5}, {120, 3.72, 0.052, 3.5}, {120.2, 0, 0, 0}} {
		c := Condition{ID: "x", OutsideC: 45, InsideC: 25, WindMS: known(1), SunWM2: 300, TiltDeg: known(tt.tilt)}
		r := rateOne(t, &Makeup{ID: "R", Panes: []Placed{{Pane: clearGlass(6, 0.6, 0.08)}}}, EN, Options{Conditions: []Condition{c}})
		b := r.Balance("x")
		warm := -figure(b, r, "comfort.asymmetry_k").Number
		pd := figure(b, r, "comfort.asymmetry_dissatisfied_pct")
		want := max(0, 100/(1+math.Exp(tt.a-tt.bb*warm))-tt.c)
		if !(warm > 5) || pd.Known != (tt.a > 0) || (pd.Known && math.Abs(pd.Number-want) > 1e-9) {
			t.Errorf("tilt %g: asymmetry %g K, %+v, want %g", tt.tilt, warm, pd, want)
		}
		if v := figure(b, r, "comfort.downdraught_m_s"); v.Known != (tt.tilt >= 60 && tt.tilt <= 120) {
			t.Errorf("tilt %g: downdraught %+v", tt.tilt, v)
		}
	}
}

// Every basis screens the summer of na, and no sheet that is not glass.
func TestWhatIsScreened(t *testing.T) {
	for _, b := range Bases() {
		var ids []string
		for _, c := range NewMethod(b, Options{}).Screened() {
			if c.SunWM2 == 783 {
				ids = append(ids, c.ID)
			}
		}
		want := []string{SummerNA, ColdSun}
		if b.Name == NA.Name {
			want[0] = Summer
		}
		if !slices.Equal(ids, want) {
			t.Errorf("%s: 783 W/m² in %v, want %v", b.Name, ids, want)
		}
	}
	foil := clearGlass(0.05, 0.5, 0.08)
	foil.TauInfrared = 0.3
	foil.Tints[0].Front, foil.Tints[0].Back = GivenEmissivity(0.1), GivenEmissivity(0.6)
	air := gap(t, 12, map[string]float64{"air": 1})
	r := rateOne(t, &Makeup{ID: "F", Panes: []Placed{{Pane: clearGlass(4, 0.8, 0.08)}, {Pane: foil}, {Pane: clearGlass(4, 0.8, 0.08)}}, Gaps: []Gap{air, air}}, NA, Options{})
	for k, s := range r.Stress {
		if (s.Why != "") != (k == 1) {
			t.Errorf("pane %d: %+v", k+1, s)
		}
	}
	for _, v := range []Value{r.OutsideWM2K, r.InsideWM2K} {
		if !v.Known || math.IsNaN(v.Number) {
			t.Errorf("coefficients beside opaque panes: %+v", v)
		}
	}
	for _, f := range Figures() {
		if f.Alias == "gap_radiative" {
			if v := f.Value(r, 0); v.Known || v.Why == "" {
				t.Errorf("radiation beside the foil: %+v", v)
			}
		}
	}
}

// A vacuum is no sealed gas; a humidity above 1 is never reached; clauses are those of the basis.
func TestSmallPrint(t *testing.T) {
	glass := clearGlass(4, 0.8, 0.08)
	vacuum := Gap{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20}}
	for _, tt := range []struct {
		gaps []Gap
		want bool
	}{{[]Gap{vacuum}, false}, {[]Gap{vacuum, gap(t, 12, map[string]float64{"air": 1})}, false}, {[]Gap{vacuum, gap(t, 9.9, map[string]float64{"air": 1})}, true}} {
		m := &Makeup{ID: "V", Gaps: tt.gaps}
		for range len(tt.gaps) + 1 {
			m.Panes = append(m.Panes, Placed{Pane: glass})
		}
		r := rateOne(t, m, EN, Options{})
		if got := slices.ContainsFunc(r.Cautions, func(c Caution) bool { return c.Code == "climate_load" }); got != tt.want {
			t.Errorf("%d gaps: caution %t", len(tt.gaps), got)
		}
	}
	// A clear sky over 10 °C is at 0.0552·283.15^1.5 = 263.0 K (Swinbank 1963, from memory).
	low := clearGlass(4, 0.7, 0.1)
	low.Tints[0].Back = GivenEmissivity(0.03)
	night := rateOne(t, &Makeup{ID: "N", Panes: []Placed{{Pane: low}, {Pane: glass}}, Gaps: []Gap{gap(t, 16, map[string]float64{"argon": 1})}}, EN, Options{})
	if !slices.ContainsFunc(night.Cautions, func(c Caution) bool {
		return strings.Contains(c.Text, "(outdoors 10 °C, indoors 20 °C, 1 m/s, sky -10 °C by Swinbank)")
	}) {
		t.Error("no clear calm night")
	}
	f := Figure{Above1: "never", Places: 2, Value: func(*Rating, int) Value { return known(1.004) }}
	if got := f.Print(rateOne(t, &Makeup{ID: "V", Panes: []Placed{{Pane: glass}}}, EN, Options{}), 0); got != "never" {
		t.Errorf("1.004 is printed %q", got)
	}
	for _, f := range Figures() {
		if under := f.ClauseUnder(NA); (f.Alias == "u" || f.Alias == "g" || f.Alias == "nusselt") == strings.Contains(under, "EN") || f.ClauseUnder(EN) != f.Clause {
			if f.Alias == "u" || f.Alias == "g" || f.Alias == "nusselt" {
				t.Errorf("%s under na: %s", f.Alias, under)
			}
		}
	}
}
