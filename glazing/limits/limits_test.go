package limits

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/spectra"
)

// flat is a spectrum of constant values, 300 to 2500 nm.
func flat(tau, front, back float64) spectra.Measured {
	var m spectra.Measured
	for nm := 300.0; nm <= 2500; nm += 5 {
		for _, x := range []struct {
			into  *spectra.Curve
			value float64
		}{{&m.Tau, tau}, {&m.RhoFront, front}, {&m.RhoBack, back}} {
			x.into.NM, x.into.Value = append(x.into.NM, nm), append(x.into.Value, x.value)
		}
	}
	return m
}

func pane(id string, s spectra.Measured, front, back float64) *glazing.Pane {
	return &glazing.Pane{ID: id, Plies: []glazing.Ply{{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}},
		Tints: []glazing.Tint{{Spectrum: s, Front: glazing.GivenEmissivity(front), Back: glazing.GivenEmissivity(back)}}}
}

// switching is a pane that reflects nothing, of tints with light transmittances.
func switching(id string, tints ...glazing.Tint) *glazing.Pane {
	p := pane(id, spectra.Measured{}, 0.8, 0.8)
	front, back := p.Tints[0].Front, p.Tints[0].Back
	p.Tints = nil
	for _, t := range tints {
		t.Front, t.Back = front, back
		p.Tints = append(p.Tints, t)
	}
	return p
}

func tint(name string, tau float64) glazing.Tint {
	return glazing.Tint{Name: name, Spectrum: flat(tau, 0, 0)}
}

func makeup(t testing.TB, id string, panes ...glazing.Placed) *glazing.Makeup {
	t.Helper()
	air, err := glazing.Filling(map[string]float64{"air": 1})
	if err != nil {
		t.Fatal(err)
	}
	m := &glazing.Makeup{ID: id, Panes: panes}
	for range panes[1:] {
		m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: 12, Gas: air})
	}
	return m
}

func rated(t testing.TB, m *glazing.Makeup, bases ...glazing.Basis) (all []glazing.Rating) {
	t.Helper()
	for _, b := range bases {
		ratings, err := glazing.Rate(m, b)
		if err != nil {
			t.Fatal(err)
		}
		all = append(all, ratings...)
	}
	return all
}

// limit returns one of a figure of the list; NaN stands for a bound that is not given.
func limit(t testing.TB, figure string, atLeast, atMost float64) glazing.Limit {
	t.Helper()
	f, place, ok := glazing.FigureNamed(figure)
	if !ok {
		t.Fatalf("no figure %s", figure)
	}
	return glazing.Limit{Figure: f, Place: place, AtLeast: bound(atLeast), AtMost: bound(atMost), Scope: glazing.CentreScope, Basis: "en", From: "p.yaml:7"}
}

func figureOf(t testing.TB, name string) glazing.Figure { return limit(t, name, none, 1).Figure }

func bound(v float64) glazing.Value { return glazing.Value{Number: v, Known: !math.IsNaN(v)} }

var none = math.NaN()

// Both the rounded and the unrounded figure are held against the limit. Rounding and margins are
// worked by hand.
func TestVerdicts(t *testing.T) {
	m := makeup(t, "S1", glazing.Placed{Pane: pane("p", flat(0.5, 0.1, 0.1), 0.8, 0.8)})
	ratings := rated(t, m, glazing.EN)
	for _, tt := range []struct {
		value           float64
		places          int
		atLeast, atMost float64
		rounded, margin float64
		want            Verdict
	}{
		{2.8499, 1, none, 2.8, 2.8, -0.0499, TooClose}, // unrounded above, rounded on the limit
		{2.8499, 1, none, 2.9, 2.8, 0.0501, Meets},
		{2.8499, 1, none, 2.7, 2.8, -0.1499, DoesNotMeet},
		{2.85, 1, none, 2.8, 2.9, -0.05, DoesNotMeet}, // half away from zero
		{2.8501, 1, none, 2.85, 2.9, -0.0001, DoesNotMeet},
		{2.75, 1, none, 2.79, 2.8, 0.04, TooClose}, // the other way about
		{2.8, 1, none, 2.8, 2.8, 0, Meets},
		{2.8, 1, 2.8, none, 2.8, 0, Meets},
		{2.7501, 1, 2.8, none, 2.8, -0.0499, TooClose},
		{2.8499, 1, 2.82, none, 2.8, 0.0299, TooClose},
		{2.7499, 1, 2.8, none, 2.7, -0.0501, DoesNotMeet},
		{0.5008, 2, none, 0.5, 0.5, -0.0008, TooClose},
		{0.125, 2, none, 0.125, 0.13, 0, TooClose},
		{0.0496, 2, 0.05, none, 0.05, -0.0004, TooClose}, // three decimals below 0.05
		{0.0494, 2, 0.05, none, 0.049, -0.0006, DoesNotMeet},
		{0.55, 2, 0.5, 0.6, 0.55, 0.05, Meets},
		{0.52, 2, 0.5, 0.6, 0.52, 0.02, Meets},
		{0.604, 2, 0.5, 0.6, 0.6, -0.004, TooClose},
		{0.606, 2, 0.5, 0.6, 0.61, -0.006, DoesNotMeet},
		{0.494, 2, 0.5, 0.6, 0.49, -0.006, DoesNotMeet},
		{0.496, 2, 0.5, 0.6, 0.5, -0.004, TooClose},
		{0.5, 2, 0.5, 0.5, 0.5, 0, Meets},
		{-10.04, 1, -10, none, -10, -0.04, TooClose},
		{-9.96, 1, -10, none, -10, 0.04, Meets},
		{-9.5, 0, none, -9.6, -10, -0.1, TooClose},
		{86.4, 0, 90, none, 86, -3.6, DoesNotMeet},
	} {
		l := limit(t, "u", tt.atLeast, tt.atMost)
		l.Figure.BasisU, l.Figure.Places, l.Figure.Small = false, tt.places, tt.places == 2
		l.Figure.Value = func(*glazing.Rating, int) glazing.Value { return glazing.Value{Number: tt.value, Known: true} }
		results := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, []glazing.Basis{glazing.EN}, ratings)
		if len(results) != 1 {
			t.Fatalf("%d results, want 1", len(results))
		}
		r := results[0]
		if r.Verdict != tt.want || r.Rounded.Number != tt.rounded || r.Value.Number != tt.value || math.Abs(r.Margin.Number-tt.margin) > 1e-12 || !r.Margin.Known {
			t.Errorf("%g (%d places) within %g and %g: %s, rounded %g, margin %g; want %s, %g, %g",
				tt.value, tt.places, tt.atLeast, tt.atMost, r.Verdict, r.Rounded.Number, r.Margin.Number, tt.want, tt.rounded, tt.margin)
		}
		if (r.Why == "") != (tt.want == Meets || tt.want == DoesNotMeet) {
			t.Errorf("%g: reason %q", tt.value, r.Why)
		}
		if AllMet(results) != (tt.want == Meets) || Count(results, tt.want) != 1 {
			t.Errorf("%g: all met %t", tt.value, AllMet(results))
		}
	}
	if AllMet(nil) {
		t.Error("no result at all counts as met")
	}
}

// Verdicts of numbers of four decimals, against the same in whole numbers of ten-thousandths.
func TestVerdictsInWholeNumbers(t *testing.T) {
	m := makeup(t, "S1", glazing.Placed{Pane: pane("p", flat(0.5, 0.1, 0.1), 0.8, 0.8)})
	ratings := rated(t, m, glazing.EN)
	random := rand.New(rand.NewPCG(1, 2))
	seen := map[Verdict]int{}
	for range 20000 {
		n, low, high := random.IntN(4000)+1000, random.IntN(4000)+1000, random.IntN(4000)+1000
		if random.IntN(2) == 0 { // near the limit
			high = n + random.IntN(1001) - 500
		}
		given := random.IntN(3) // at least, at most, both
		if given == 2 && low > high {
			low, high = high, low
		}
		rounded := (n + 500) / 1000 * 1000 // half up, of what is above 0
		within := func(x int) bool { return (given == 1 || x >= low) && (given == 0 || x <= high) }
		want := TooClose
		switch {
		case within(n) && within(rounded):
			want = Meets
		case !within(n) && !within(rounded):
			want = DoesNotMeet
		}
		of := func(x int, is bool) float64 {
			if !is {
				return none
			}
			return float64(x) / 10000
		}
		l := limit(t, "u", of(low, given != 1), of(high, given != 0))
		l.Figure.Value = func(*glazing.Rating, int) glazing.Value { return bound(of(n, true)) }
		got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, ratings)[0]
		if seen[want]++; got.Verdict != want {
			t.Fatalf("%d within %d and %d (%d): %s, want %s", n, low, high, given, got.Verdict, want)
		}
	}
	for _, v := range []Verdict{Meets, DoesNotMeet, TooClose} {
		if seen[v] < 1000 {
			t.Errorf("%s: %d times only", v, seen[v])
		}
	}
}

// One result is written "tint figure verdict margin".
func written(results []Result) string {
	var parts []string
	for _, r := range results {
		margin := "–"
		if r.Margin.Known {
			margin = fmt.Sprintf("%+.3f", r.Margin.Number)
		}
		parts = append(parts, strings.TrimSpace(r.Tint+" "+r.Figure+" "+string(r.Verdict)+" "+margin))
	}
	return strings.Join(parts, "; ")
}

// The light transmittance of panes that reflect nothing is the product of theirs.
func TestTintRules(t *testing.T) {
	three := switching("three", tint("t1", 0.3), tint("t2", 0.6), tint("t3", 0.05))
	x, y := switching("x", tint("clear", 0.8), tint("full", 0.4)), switching("y", tint("clear", 0.5), tint("full", 0.1))
	plain := pane("plain", flat(0.5, 0, 0), 0.8, 0.8)
	placed := func(p *glazing.Pane, tint string) glazing.Placed { return glazing.Placed{Pane: p, Tint: tint} }
	single := []glazing.Placed{{Pane: three}}
	combined := []glazing.Placed{{Pane: x}, {Pane: y}}
	const light = " light.transmittance "
	for _, tt := range []struct {
		name            string
		panes           []glazing.Placed
		rule            string
		atLeast, atMost float64
		want, why       string
	}{
		{"absent", single, "", 0.2, none, "t1 light.transmittance meets the entered limit +0.100; t2 light.transmittance meets the entered limit +0.400; t3 light.transmittance does not meet -0.150", ""},
		{"each", single, "each", 0.2, none, "t1 light.transmittance meets the entered limit +0.100; t2 light.transmittance meets the entered limit +0.400; t3 light.transmittance does not meet -0.150", ""},
		{"clear", single, "clear", 0.2, none, "t2" + light + "meets the entered limit +0.400", ""},
		{"full", single, "full", 0.2, none, "t3" + light + "does not meet -0.150", ""},
		{"by name", single, "t1", 0.2, none, "t1" + light + "meets the entered limit +0.100", ""},
		{"worst of at least", single, "worst", 0.2, none, "t3" + light + "does not meet -0.150", ""},
		{"worst of at least, met", single, "worst", 0.01, none, "t3" + light + "meets the entered limit +0.040", ""},
		{"worst of at most", single, "worst", none, 0.5, "t2" + light + "does not meet -0.100", ""},
		{"worst of both", single, "worst", 0.1, 0.5, "t2" + light + "does not meet -0.100", ""},
		{"worst of both, the other", single, "worst", 0.2, 0.5, "t3" + light + "does not meet -0.150", ""},
		{"no such tint", single, "dim", 0.2, none, "dim" + light + "cannot be judged –", `it has no tint "dim"; its tints are t1, t2, t3`},
		{"combined, each", combined, "each", 0.1, none, "clear/clear light.transmittance meets the entered limit +0.300; clear/full light.transmittance does not meet -0.020; full/clear light.transmittance meets the entered limit +0.100; full/full light.transmittance does not meet -0.060", ""},
		{"combined, clear", combined, "clear", 0.1, none, "clear/clear" + light + "meets the entered limit +0.300", ""},
		{"combined, full", combined, "full", 0.1, none, "full/full" + light + "does not meet -0.060", ""},
		{"combined, worst", combined, "worst", 0.1, none, "full/full" + light + "does not meet -0.060", ""},
		{"combined, by name", combined, "clear/full", 0.1, none, "clear/full" + light + "does not meet -0.020", ""},
		{"combined, no such tint", combined, "half", 0.1, none, "half" + light + "cannot be judged –", "its tints are clear/clear, clear/full, full/clear, full/full"},
		{"one follows", []glazing.Placed{{Pane: x}, placed(y, "same")}, "each", 0.1, none, "clear light.transmittance meets the entered limit +0.300; full light.transmittance does not meet -0.060", ""},
		{"one follows, clear", []glazing.Placed{{Pane: x}, placed(y, "same")}, "clear", 0.1, none, "clear" + light + "meets the entered limit +0.300", ""},
		{"one fixed", []glazing.Placed{placed(x, "full"), {Pane: y}}, "full", 0.1, none, "full/full" + light + "does not meet -0.060", ""},
		{"one fixed otherwise", []glazing.Placed{placed(x, "full"), {Pane: y}}, "clear", 0.1, none, "full/clear" + light + "meets the entered limit +0.100", ""},
		{"fixed", []glazing.Placed{placed(three, "t1")}, "full", 0.1, none, "t1" + light + "meets the entered limit +0.200", ""},
		{"fixed, another name", []glazing.Placed{placed(three, "t1")}, "t2", 0.1, none, "t2" + light + "cannot be judged –", "its tints are t1"},
		{"does not switch", []glazing.Placed{{Pane: plain}}, "", 0.1, none, "light.transmittance meets the entered limit +0.400", ""},
		{"does not switch, clear", []glazing.Placed{{Pane: plain}}, "clear", 0.1, none, "light.transmittance meets the entered limit +0.400", ""},
		{"does not switch, full", []glazing.Placed{{Pane: plain}}, "full", 0.6, none, "light.transmittance does not meet -0.100", ""},
		{"does not switch, worst", []glazing.Placed{{Pane: plain}}, "worst", 0.1, none, "light.transmittance meets the entered limit +0.400", ""},
		{"does not switch, by name", []glazing.Placed{{Pane: plain}}, "half", 0.1, none, "half" + light + "cannot be judged –", `it does not switch and has no tint "half"`},
	} {
		t.Run(tt.name, func(t *testing.T) {
			m := makeup(t, "M", tt.panes...)
			l := limit(t, "light", tt.atLeast, tt.atMost)
			l.Tint = tt.rule
			results := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, rated(t, m, glazing.EN))
			if got := written(results); got != tt.want {
				t.Errorf("got  %s\nwant %s", got, tt.want)
			}
			if why := results[0].Why; !strings.Contains(why, tt.why) || (tt.why == "") != (why == "") {
				t.Errorf("reason %q, want %q", why, tt.why)
			}
		})
	}
}

// Of several tints the one that is past the limit is the worst, whatever else is not known.
func TestWorstAmongUnknown(t *testing.T) {
	m := makeup(t, "M", glazing.Placed{Pane: switching("s", tint("a", 0.6), tint("b", 0.5), tint("c", 0.4))})
	ratings := rated(t, m, glazing.EN)
	for _, tt := range []struct {
		a, b, c float64 // NaN is not known
		want    string
	}{
		{1.0, none, 1.1, "b cannot be judged"}, {1.0, none, 1.3, "c does not meet"}, {1.5, none, 1.3, "a does not meet"},
		{1.0, 1.22, 1.1, "b too close to call"}, {1.0, 1.22, none, "c cannot be judged"}, {1.19, 1.0, 1.1, "a meets the entered limit"},
		{1.1, 1.1, 1.1, "a meets the entered limit"},
	} {
		l := limit(t, "u", none, 1.2)
		l.Tint = glazing.WorstTint
		l.Figure.Value = func(r *glazing.Rating, _ int) glazing.Value {
			v := bound(map[string]float64{"a": tt.a, "b": tt.b, "c": tt.c}[r.Tint])
			if v.Why = ""; !v.Known {
				v.Why = "a test"
			}
			return v
		}
		got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, ratings)
		if len(got) != 1 || got[0].Tint+" "+string(got[0].Verdict) != tt.want {
			t.Errorf("%g, %g, %g: %s, want %s", tt.a, tt.b, tt.c, written(got), tt.want)
		}
	}
}

// With both bounds a tint that is past one is worse than one whose margin is less, but which is
// saved by rounding: 0.3004 is 0.30, and 0.0490 is 0.049 of three decimals.
func TestWorstIsTheGravest(t *testing.T) {
	m := makeup(t, "M", glazing.Placed{Pane: switching("s", tint("a", 0.6), tint("b", 0.5))})
	l := limit(t, "light", 0.0493, 0.3)
	l.Tint = glazing.WorstTint
	l.Figure.Value = func(r *glazing.Rating, _ int) glazing.Value {
		return bound(map[string]float64{"a": 0.3004, "b": 0.0490}[r.Tint])
	}
	got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, rated(t, m, glazing.EN))
	if got[0].Tint != "b" || got[0].Verdict != DoesNotMeet {
		t.Errorf("%s, want b, which does not meet", written(got))
	}
}

// Figures of panes, gaps and surfaces: a number names one, without it the worst counts and is
// named. By hand, with 1 - 0.2·0.15 = 0.97: αe1 = 0.2 + 0.7·0.15·0.1/0.97 = 0.2108247,
// αe2 = 0.25·0.7/0.97 = 0.1804124.
func TestPlaces(t *testing.T) {
	double := makeup(t, "D", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.7)}, glazing.Placed{Pane: pane("b", flat(0.6, 0.15, 0.3), 0.04, 0.9)})
	blank := makeup(t, "B", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.7)}, glazing.Placed{Pane: pane("b", flat(0.6, 0.15, 0.3), 0.04, 0.9)})
	blank.Panes[1].Pane.Tints[0].Back = glazing.NoEmissivity()
	single := makeup(t, "S", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.7)})
	for _, tt := range []struct {
		m               *glazing.Makeup
		figure          string
		atLeast, atMost float64
		want, why       string
	}{
		{double, "surfaces.3.emissivity", none, 0.05, "surfaces.3.emissivity meets the entered limit +0.010", ""},
		{double, "emissivity", none, 0.85, "surfaces.4.emissivity does not meet -0.050", ""},
		{double, "surfaces.#.emissivity", none, 0.95, "surfaces.4.emissivity meets the entered limit +0.050", ""},
		{double, "emissivity", 0.02, none, "surfaces.3.emissivity meets the entered limit +0.020", ""},
		{double, "surfaces.5.emissivity", none, 0.05, "surfaces.5.emissivity cannot be judged –", "it has no surface 5"},
		{double, "absorptance", none, 0.2, "solar.absorptance.1 does not meet -0.011", ""},
		{double, "solar.absorptance.2", none, 0.2, "solar.absorptance.2 meets the entered limit +0.020", ""},
		{double, "solar.absorptance.3", none, 0.2, "solar.absorptance.3 cannot be judged –", "it has no pane 3"},
		{double, "gap_conductance", 0.5, none, "gaps.1.conductance_w_m2k meets", ""},
		{single, "gap_conductance", none, 3, "gaps.#.conductance_w_m2k cannot be judged –", "it has no gap"},
		{single, "gaps.1.nusselt", none, 3, "gaps.1.nusselt cannot be judged –", "it has no gap 1"},
		{blank, "emissivity", none, 0.95, "surfaces.4.emissivity cannot be judged –", "no emissivity and no infrared rows"},
		{blank, "emissivity", none, 0.75, "surfaces.1.emissivity does not meet -0.050", ""},
		{double, "emissivity_normal", none, 0.95, "surfaces.1.emissivity_normal cannot be judged –", "a corrected emissivity was given"},
		{blank, "u", none, 3, "u_w_m2k cannot be judged –", "the emissivity of surface 4 (pane b, back) is not known"},
	} {
		got := Judge([]glazing.Limit{limit(t, tt.figure, tt.atLeast, tt.atMost)}, []*glazing.Makeup{tt.m}, nil, rated(t, tt.m, glazing.EN))
		if len(got) != 1 || !strings.HasPrefix(written(got), tt.want) || !strings.Contains(got[0].Why, tt.why) || (tt.why == "") != (got[0].Why == "") {
			t.Errorf("%s of %s: %s (%s); want %s (%s)", tt.figure, tt.m.ID, written(got), got[0].Why, tt.want, tt.why)
		}
	}
}

// U of a single pane of 4 mm by hand: under en, with hi = 3.6 + 4.1·0.8/0.837 = 7.518757, it is
// 1/(1/25 + 0.004 + 0.133001) = 5.6497; under iso, with hi = 3.6 + 4.4·0.8/0.837 = 7.805496, it is
// 1/(1/23 + 0.004 + 0.128115) = 5.6950.
func TestBases(t *testing.T) {
	m := makeup(t, "S", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.8)})
	en, iso := []glazing.Basis{glazing.EN}, []glazing.Basis{glazing.EN, glazing.ISO}
	for _, tt := range []struct {
		name    string
		basis   string
		scope   glazing.Scope
		of      []glazing.Basis // the project's
		ratings []glazing.Basis
		verdict Verdict
		value   float64
		under   string
		why     string
		assumed []string
	}{
		{"its own", "en", glazing.CentreScope, en, en, Meets, 5.6497, "en", "", nil},
		{"its own of two", "iso", glazing.CentreScope, iso, iso, Meets, 5.6950, "iso", "", nil},
		{"the project's", "", glazing.CentreScope, en, en, Meets, 5.6497, "en", "", []string{"limit_basis"}},
		{"the project's, though another was rated too", "", glazing.CentreScope, en, iso, Meets, 5.6497, "en", "", []string{"limit_basis"}},
		{"the project has two", "", glazing.CentreScope, iso, iso, CannotBeJudged, 0, "", "the limit names no basis, and the project has en, iso", nil},
		{"another than was rated", "iso", glazing.CentreScope, en, en, CannotBeJudged, 0, "iso", "the limit is for basis iso, the figures are under en", nil},
		{"nothing was rated", "iso", glazing.CentreScope, en, nil, CannotBeJudged, 0, "iso", "no rating of it is at hand", nil},
		{"scope absent", "en", "", en, en, Meets, 5.6497, "en", "", []string{"limit_scope"}},
		{"both absent", "", "", en, en, Meets, 5.6497, "en", "", []string{"limit_basis", "limit_scope"}},
		{"whole window", "en", glazing.WindowScope, en, en, CannotBeJudged, 0, "en", "for the whole window, the figures are of the centre of the glass", nil},
	} {
		l := limit(t, "u", none, 5.8)
		l.Basis, l.Scope = tt.basis, tt.scope
		var ratings []glazing.Rating
		if tt.ratings != nil {
			ratings = rated(t, m, tt.ratings...)
		}
		got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, tt.of, ratings)
		if len(got) != 1 {
			t.Fatalf("%s: %d results", tt.name, len(got))
		}
		r := got[0]
		var codes []string
		for _, c := range r.Assumed {
			codes = append(codes, c.Code)
			if !strings.Contains(c.Text, "Ug at most 5.8 W/(m²·K)") || !strings.Contains(c.Text, "p.yaml:7") {
				t.Errorf("%s: the caution %q does not name the limit", tt.name, c.Text)
			}
		}
		if r.Verdict != tt.verdict || r.Basis != tt.under || !strings.Contains(r.Why, tt.why) || (tt.why == "") != (r.Why == "") || !slices.Equal(codes, tt.assumed) {
			t.Errorf("%s: %s under %q (%s), assumed %v", tt.name, r.Verdict, r.Basis, r.Why, codes)
		}
		if r.Value.Known != (tt.value > 0) || math.Abs(r.Value.Number-tt.value) > 0.00006 {
			t.Errorf("%s: value %v, want %.4f", tt.name, r.Value, tt.value)
		}
		if (r.Rating == nil) != (tt.verdict == CannotBeJudged) {
			t.Errorf("%s: rating %v", tt.name, r.Rating != nil)
		}
	}
}

// What cannot be is never met: figures and bounds that are no numbers, bounds that exclude each
// other, none at all. Reasons stand together.
func TestImpossible(t *testing.T) {
	m := makeup(t, "S", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.8)})
	ratings := rated(t, m, glazing.EN)
	of := func(v float64) func(l *glazing.Limit) {
		return func(l *glazing.Limit) {
			l.Figure.Value = func(*glazing.Rating, int) glazing.Value { return glazing.Value{Number: v, Known: true} }
		}
	}
	for _, tt := range []struct {
		name   string
		change func(l *glazing.Limit)
		why    string
	}{
		{"NaN", of(math.NaN()), "the figure is no number"},
		{"infinite", of(math.Inf(1)), "the figure is no number"},
		{"below all", of(math.Inf(-1)), "the figure is no number"},
		{"NaN as a bound", func(l *glazing.Limit) { l.AtMost = glazing.Value{Number: math.NaN(), Known: true} }, "a bound of the limit is no number"},
		{"infinite bound", func(l *glazing.Limit) { l.AtLeast = glazing.Value{Number: math.Inf(-1), Known: true} }, "a bound of the limit is no number"},
		{"bounds crossed", func(l *glazing.Limit) { l.AtLeast = bound(9) }, "no figure can meet both"},
		{"no bound", func(l *glazing.Limit) { l.AtMost = bound(none) }, "has no bound"},
		{"a text", func(l *glazing.Limit) { l.Figure.Value = nil }, "the figure is no number"},
		{"a condition", func(l *glazing.Limit) { l.Condition = "january" }, "there is no condition january; the project has none"},
		{"a condition of other bases", func(l *glazing.Limit) { l.Condition = "winter" }, "winter is a condition of the bases na and iso15099, and basis en has none"},
		{"a condition that is screened", func(l *glazing.Limit) { l.Condition = "cold-sun" }, "cold-sun is screened for thermal stress alone"},
		{"a condition for a window", func(l *glazing.Limit) { l.Condition, l.Scope = "january", glazing.WindowScope }, "the figures are of the centre of the glass"},
		{"no figure of a condition", func(l *glazing.Limit) { l.Figure, l.Condition = figureOf(t, "he"), "january" }, "he is none of the figures of a condition; a limit for it names no condition"},
		{"of each pane, and not of a condition", func(l *glazing.Limit) { l.Figure, l.Condition = figureOf(t, "absorptance"), "january" }, "αe is none of the figures"},
	} {
		l := limit(t, "u", none, 5.8)
		tt.change(&l)
		for _, rule := range []string{"", "clear", "worst"} {
			l.Tint = rule
			got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, ratings)
			if len(got) != 1 || got[0].Verdict != CannotBeJudged || !strings.Contains(got[0].Why, tt.why) || got[0].Margin.Known || got[0].Value.Known || got[0].Value.Why == "" {
				t.Errorf("%s: %s (%s), want a reason with %q", tt.name, written(got), got[0].Why, tt.why)
			}
		}
	}
}

// Results stand by make-up and then by limit; a limit is for the make-ups that it names.
func TestOrder(t *testing.T) {
	a := makeup(t, "A", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.8)})
	b := makeup(t, "B", glazing.Placed{Pane: switching("s", tint("clear", 0.6), tint("full", 0.1))})
	list := []glazing.Limit{limit(t, "u", none, 5.8), limit(t, "light", 0.5, none), limit(t, "g", none, 0.9)}
	list[1].Makeups = []string{"B", "C"}
	list[2].Makeups = []string{"A"}
	ratings := append(rated(t, b, glazing.ISO, glazing.EN), rated(t, a, glazing.EN)...)
	var got []string
	for _, r := range Judge(list, []*glazing.Makeup{a, b}, nil, ratings) {
		at := slices.IndexFunc(list, func(l glazing.Limit) bool { return l.Figure.Key == r.Limit.Figure.Key })
		if r.Limit != &list[at] {
			t.Errorf("the limit of %s is a copy", r.Figure)
		}
		got = append(got, r.Makeup.ID+" "+r.Tint+" "+r.Figure)
	}
	want := []string{"A  u_w_m2k", "A  solar.g", "B clear u_w_m2k", "B full u_w_m2k", "B clear light.transmittance", "B full light.transmittance"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// Binary arithmetic alone keeps no figure off a bound: 3.6 + 4.1 is 7.7 (EN 673), of which it makes
// 7.699999999999999. A bound of the whole is said.
func TestBoundsMetBut(t *testing.T) {
	l := limit(t, "hi", 7.7, none)
	if m := MarginOf(&l, 7.699999999999999); m != 0 {
		t.Errorf("margin %g, want 0", m)
	}
	if m := MarginOf(&l, 7.69999); m >= 0 {
		t.Errorf("margin %g, want it below 0", m)
	}
	whole := glazing.Limit{Figure: limit(t, "uv", 0, 1).Figure, AtMost: glazing.Value{Number: 1, Known: true}, Basis: "en", Scope: glazing.CentreScope}
	if list := assumed(&whole, nil); len(list) != 1 || list[0].Code != "limit_of_one" {
		t.Errorf("cautions %v, want one that the bound is the whole", list)
	}
}
