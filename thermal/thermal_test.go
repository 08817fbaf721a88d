package thermal

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// randomGaps returns gaps of random width, gas and emissivities.
func randomGaps(t *testing.T, r *rand.Rand, n int) []Gap {
	t.Helper()
	gaps := make([]Gap, n)
	for i := range gaps {
		f := r.Float64()
		names := GasNames()
		m, err := Mix(map[string]float64{names[r.IntN(2)]: f, names[2+r.IntN(3)]: 1 - f})
		if err != nil {
			t.Fatal(err)
		}
		gaps[i] = Gap{WidthM: 0.004 + 0.03*r.Float64(), Gas: m.Properties(), Emissivity: [2]float64{0.02 + 0.97*r.Float64(), 0.02 + 0.97*r.Float64()}}
	}
	return gaps
}

// The network of the second evaluation has a node for the sun of each pane and solves the heat
// balance of all nodes at once, outside and inside held at 0; the first goes by resistances.
func TestSecondaryHeatAgainstNetwork(t *testing.T) {
	r := rand.New(rand.NewPCG(29, 31))
	for range 1000 {
		n := 2 + r.IntN(7)
		gaps := randomGaps(t, r, n-1)
		states := make([]GapState, n-1)
		if err := SolveGaps(states, gaps, ConvectionAt(90, Up)); err != nil {
			t.Fatal(err)
		}
		absorbed, glass := make([]float64, n), make([]float64, n)
		for k := range n {
			absorbed[k], glass[k] = r.Float64()/float64(n), 0.001+0.02*r.Float64()
		}
		he, hi := 10+30*r.Float64(), 3+10*r.Float64()

		// Nodes are the two faces and the middle of each pane.
		a, b := mat.NewDense(3*n, 3*n, nil), mat.NewVecDense(3*n, nil)
		link := func(i, j int, h float64) {
			a.Set(i, i, a.At(i, i)+h)
			a.Set(j, j, a.At(j, j)+h)
			a.Set(i, j, a.At(i, j)-h)
			a.Set(j, i, a.At(j, i)-h)
		}
		for k := range n {
			link(3*k, 3*k+1, 2/glass[k])
			link(3*k+1, 3*k+2, 2/glass[k])
			if k > 0 {
				link(3*k-1, 3*k, states[k-1].Total)
			}
			node := 3*k + 1
			if k == 0 {
				node = 0
			} else if k == n-1 {
				node = 3*k + 2
			}
			b.SetVec(node, absorbed[k])
		}
		a.Set(0, 0, a.At(0, 0)+he)
		a.Set(3*n-1, 3*n-1, a.At(3*n-1, 3*n-1)+hi)
		var x mat.VecDense
		if err := x.SolveVec(a, b); err != nil {
			t.Fatal(err)
		}
		want := hi * x.AtVec(3*n-1)
		var s SecondaryHeat
		s.Solve(he, hi, absorbed, glass, states)
		if math.Abs(s.Inward-want) > 1e-12 {
			t.Fatalf("%d panes: qi %.15f, by the network %.15f", n, s.Inward, want)
		}
		// U by the same network: a source at the outer surface that the outside holds.
		total := 0.0
		for _, g := range glass {
			total += g
		}
		b.Zero()
		b.SetVec(0, he) // outside at 1 K above inside
		if err := x.SolveVec(a, b); err != nil {
			t.Fatal(err)
		}
		if got, want := U(he, hi, total, states), hi*x.AtVec(3*n-1); math.Abs(got-want) > 1e-12 {
			t.Fatalf("%d panes: U %.15f, by the network %.15f", n, got, want)
		}
	}
}

// EN 410:2011, 5.4.6 (from memory) prints qi of one, two and three panes in full.
func TestExplicitSecondaryHeat(t *testing.T) {
	r := rand.New(rand.NewPCG(37, 41))
	var s SecondaryHeat
	for range 1000 {
		he, hi := 10+30*r.Float64(), 3+10*r.Float64()
		a1, a2, a3 := r.Float64()/3, r.Float64()/3, r.Float64()/3
		s.Solve(he, hi, []float64{a1}, []float64{0.006}, nil)
		same(t, "single qi", s.Inward, a1*hi/(he+hi))

		states := make([]GapState, 2)
		if err := SolveGaps(states, randomGaps(t, r, 2), ConvectionAt(90, Up)); err != nil {
			t.Fatal(err)
		}
		glass := []float64{0.004, 0.006, 0.010}
		s.Solve(he, hi, []float64{a1, a2}, glass[:2], states[:1])
		l := 1 / (glass[0] + 1/states[0].Total + glass[1])
		same(t, "double Λ", s.Conductances[0], l)
		same(t, "double qi", s.Inward, ((a1+a2)/he+a2/l)/(1/hi+1/he+1/l))

		s.Solve(he, hi, []float64{a1, a2, a3}, glass, states)
		l12, l23 := 1/(glass[0]+1/states[0].Total+glass[1]/2), 1/(glass[1]/2+1/states[1].Total+glass[2])
		same(t, "triple Λ12", s.Conductances[0], l12)
		same(t, "triple Λ23", s.Conductances[1], l23)
		same(t, "triple qi", s.Inward, (a3/l23+(a3+a2)/l12+(a1+a2+a3)/he)/(1/hi+1/he+1/l12+1/l23))
	}
}

func same(t *testing.T, name string, got, want float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-12 {
		t.Errorf("%s: %.15f, want %.15f (EN 410:2011)", name, got, want)
	}
}

// The shares of the temperature drop are those of the resistances, and add to 15 K.
func TestDropsAreShared(t *testing.T) {
	r := rand.New(rand.NewPCG(43, 47))
	for range 1000 {
		n := 2 + r.IntN(6)
		states := make([]GapState, n)
		tilt := []float64{0, 30, 45, 60, 90}[r.IntN(5)]
		if err := SolveGaps(states, randomGaps(t, r, n), ConvectionAt(tilt, Up)); err != nil {
			t.Fatal(err)
		}
		var drop, resistance float64
		for _, s := range states {
			drop += float64(s.Drop)
			resistance += 1 / s.Total
		}
		if math.Abs(drop-15) > 1e-8 {
			t.Errorf("drops add to %.12f K, want 15", drop)
		}
		for i, s := range states {
			if want := 15 / s.Total / resistance; math.Abs(float64(s.Drop)-want) > 2e-9 {
				t.Errorf("gap %d of %d: drop %.12f K, want its share %.12f", i+1, n, s.Drop, want)
			}
		}
	}
}

// The correlations are those of EN 673:2011, 5.3 (read in several textbooks' renderings, from
// memory here): A and n by position, linear between, Nu at least 1, no convection downwards.
func TestConvection(t *testing.T) {
	for _, tt := range []struct {
		tilt  float64
		flow  Flow
		ra    float64
		want  float64
		about string
	}{
		{90, Up, 1e4, 0.035 * math.Pow(1e4, 0.38), "vertical"},
		{45, Up, 1e4, 0.10 * math.Pow(1e4, 0.31), "45°"},
		{0, Up, 1e4, 0.16 * math.Pow(1e4, 0.28), "horizontal"},
		{67.5, Up, 1e4, 0.0675 * math.Pow(1e4, 0.345), "half-way between 45 and 90°: both constants at their mean"},
		{22.5, Up, 1e4, 0.13 * math.Pow(1e4, 0.295), "half-way between 0 and 45°"},
		{90.5, Up, 1e4, (0.035 + 0.065/90) * math.Pow(1e4, 0.38-0.07/90), "just beyond vertical, as 89.5°"},
		{180, Up, 1e4, 0.16 * math.Pow(1e4, 0.28), "beyond 90° as 180 − tilt"},
		{90, Up, 10, 1, "at least 1"},
		{90, Down, 1e4, 0.035 * math.Pow(1e4, 0.38), "vertical has no down"},
		{0, Down, 1e4, 1, "down"},
		{60, Down, 1e4, 1, "down, sloped"},
	} {
		if got := ConvectionAt(tt.tilt, tt.flow).Nusselt(tt.ra); math.Abs(got-tt.want) > 1e-12*tt.want {
			t.Errorf("%s: Nu %.9f, want %.9f (EN 673:2011)", tt.about, got, tt.want)
		}
	}
	if got := ConvectionBetween(67.5, Up).Nusselt(4000); got != (0.10*math.Exp(0.31*math.Log(4000))+1)/2 {
		t.Errorf("the other reading, where the vertical one does not convect: Nu %.9f, want the mean of it and 1", got)
	}
	between := ConvectionBetween(67.5, Up).Nusselt(1e4)
	want := (0.10*math.Pow(1e4, 0.31) + 0.035*math.Pow(1e4, 0.38)) / 2
	if math.Abs(between-want) > 1e-12 {
		t.Errorf("the other reading: Nu %.9f, want the mean %.9f", between, want)
	}
}

func TestMix(t *testing.T) {
	for _, tt := range []struct {
		fractions map[string]float64
		want      string // of the error; "" for none
	}{
		{map[string]float64{"air": 1}, ""},
		{map[string]float64{"argon": 0.9, "air": 0.1}, ""},
		{map[string]float64{"argon": 0.9, "air": 0.1 + 0.9e-6}, ""},
		{map[string]float64{"argon": 0.9, "air": 0.1 + 0.995e-6}, ""},
		{map[string]float64{"argon": 0.9, "air": 0.1 + 1.005e-6}, "must add to 1 within 0.000001"},
		{map[string]float64{"argon": 0.9, "air": 0.1 + 2e-6}, "must add to 1"},
		{map[string]float64{"argon": 1.2, "air": -0.2}, "0..1"},
		{map[string]float64{"argon": math.NaN(), "air": 1}, "0..1"},
		{map[string]float64{"helium": 1}, `unknown gas "helium"`},
		{map[string]float64{}, "must add to 1"},
	} {
		_, err := Mix(tt.fractions)
		switch {
		case tt.want == "" && err != nil:
			t.Errorf("%v: %v", tt.fractions, err)
		case tt.want != "" && (err == nil || !strings.Contains(err.Error(), tt.want)):
			t.Errorf("%v: error %v, want one with %q", tt.fractions, err, tt.want)
		}
	}
	m, err := Mix(map[string]float64{"air": 0.1, "krypton": 0.5, "argon": 0.4})
	if err != nil {
		t.Fatal(err)
	}
	// By hand from the rows of EN 673:2011: 0.1·1.232 + 0.4·1.699 + 0.5·3.560 and so on.
	p := m.Properties()
	for _, x := range []struct {
		name      string
		got, want float64
	}{
		{"density", p.DensityKGM3, 2.5828}, {"viscosity", p.ViscosityPaS, 2.2417e-5},
		{"conductivity", p.ConductivityWMK, 0.013732}, {"heat capacity", p.HeatCapacityJKGK, 430.9},
	} {
		if math.Abs(x.got-x.want) > 1e-9*x.want {
			t.Errorf("%s %.9g, want %.9g (EN 673:2011, linear in the fraction)", x.name, x.got, x.want)
		}
	}
	if got := m.String(); got != "krypton 50 / argon 40 / air 10" {
		t.Errorf("mixture is printed %q", got)
	}
}

func TestConstants(t *testing.T) {
	// EN 673:2011 prints these (from memory); the standard's hi of an uncoated face is 7.7.
	for _, x := range []struct {
		name      string
		got, want float64
	}{
		{"hi uncoated", InsideEN673(0.837), 7.7},
		{"hi of ε 0.15", InsideEN673(0.15), 3.6 + 4.1*0.15/0.837},
		{"hr between uncoated faces", RadiativeConductance(0.837, 0.837), 4 * 5.67e-8 * 283 * 283 * 283 / (2/0.837 - 1)},
	} {
		if math.Abs(x.got-x.want) > 1e-12 {
			t.Errorf("%s: %.12f, want %.12f (EN 673:2011)", x.name, x.got, x.want)
		}
	}
}

func ExampleU() {
	// One 4 mm pane by hand: 1/U = 1/25 + 1/7.7 + 0.004/1.0.
	fmt.Printf("U = %.2f W/(m²·K)\n", U(25, 7.7, 0.004/GlassConductivity, nil))
	// Output: U = 5.75 W/(m²·K)
}

func ExampleSolveGaps() {
	// 4-12-4, air, uncoated: hr = 3.70, no convection (Nu = 1), hg = 0.02496/0.012 = 2.08;
	// 1/U = 1/25 + 1/7.7 + 0.008 + 1/5.78. EN ISO 10077-1 prints 2.8.
	air, err := Mix(map[string]float64{"air": 1})
	if err != nil {
		panic(err)
	}
	gaps := []Gap{{WidthM: 0.012, Gas: air.Properties(), Emissivity: [2]float64{GlassEmissivity, GlassEmissivity}}}
	states := make([]GapState, 1)
	if err := SolveGaps(states, gaps, ConvectionAt(90, Up)); err != nil {
		panic(err)
	}
	fmt.Printf("hr %.2f, hg %.2f, U %.4f W/(m²·K)\n", states[0].Radiative, states[0].Convective, U(25, 7.7, 0.008, states))
	// Output: hr 3.70, hg 2.08, U 2.8499 W/(m²·K)
}

func ExampleCorrectedEmissivity() {
	corrected, _ := CorrectedEmissivity(0.05)
	fmt.Printf("%.3f\n", corrected)
	// Output: 0.059
}

func BenchmarkSolveGaps(b *testing.B) {
	m, err := Mix(map[string]float64{"argon": 0.9, "air": 0.1})
	if err != nil {
		b.Fatal(err)
	}
	gaps := []Gap{
		{WidthM: 0.016, Gas: m.Properties(), Emissivity: [2]float64{0.03, 0.837}},
		{WidthM: 0.012, Gas: m.Properties(), Emissivity: [2]float64{0.837, 0.05}},
	}
	states := make([]GapState, 2)
	c := ConvectionAt(90, Up)
	b.ReportAllocs()
	for b.Loop() {
		if err := SolveGaps(states, gaps, c); err != nil {
			b.Fatal(err)
		}
	}
}
