package thermal_test

// Gaps about the steps of the published correlation of vertical gaps, at Ra 1e4 and 5e4.

import (
	"math"
	"math/rand/v2"
	"testing"

	"panewright/thermal"
)

// follows checks that Nu of every gap is that of the correlation at its own Ra; where a step up is
// held, that it lies between both of its ends.
func (c *secondCase) follows(t *testing.T, what string, b *thermal.Balance) {
	t.Helper()
	own := c.state(b)
	for k := range b.Sheets - 1 {
		e := &b.Gaps[k]
		if c.cavities[k].Vacuum != nil {
			continue
		}
		ra, gamma, a := own.gapRa[k], own.gapGamma[k], c.at.HeightM/c.cavities[k].WidthM
		least, most := secondNusselt(ra, a, gamma), secondNusselt(ra, a, gamma)
		if secondNearStep(ra, gamma, 1e-6) && ra > 2e4 {
			least, most = secondNusselt(5e4, a, gamma), secondNusselt(math.Nextafter(5e4, 1e5), a, gamma)
		}
		if e.Nusselt < least*(1-1e-6) || e.Nusselt > most*(1+1e-6) {
			t.Errorf("%s: gap %d at Ra %.9g, γ %g°, H/s %.4g has Nu %.9g, the correlation has %.9g…%.9g\n%v",
				what, k+1, ra, gamma, a, e.Nusselt, least, most, c)
		}
	}
}

// secondAboutSteps returns a glazing of which one gap stands near a step: its width is what
// brings the Ra of a first balance there.
func secondAboutSteps(t *testing.T, r *rand.Rand) *secondCase {
	t.Helper()
	c := secondAny(r)
	for len(c.sheets) < 2 {
		c = secondAny(r)
	}
	c.at.TiltDeg = oneOf(r, 90, 90, 60.1, 65, 75, 110, 160)
	for k := range c.cavities {
		c.cavities[k], c.blends[k] = secondGas(0.01+0.03*r.Float64(), c.blends[k])
	}
	k := r.IntN(len(c.cavities))
	for range 3 {
		b := c.first(t)
		if ra := b.Gaps[k].Rayleigh; ra > 0 {
			c.cavities[k].WidthM *= math.Cbrt(oneOf(r, 1e4, 5e4, 5e4) * (0.85 + 0.3*r.Float64()) / ra)
		}
		c.cavities[k].WidthM = math.Min(math.Max(c.cavities[k].WidthM, 0.002), 1)
	}
	return c
}

// About the steps, cold and from a far state, the state that is found is one of the correlation.
func TestBalanceAboutSteps(t *testing.T) {
	cases := 6000
	if testing.Short() {
		cases = 500
	}
	r := rand.New(rand.NewPCG(199, 211))
	var held int
	for range cases {
		c := secondAboutSteps(t, r)
		system := c.system(t)
		var b, followed thermal.Balance
		if err := system.Solve(&b, c.at, c.absorbed); err != nil {
			t.Fatalf("%v\n%v", err, c)
		}
		c.follows(t, "solved", &b)
		c.closes(t, &b, 2e-6)
		for range 3 {
			far := secondAny(r)
			sun := make([]float64, len(c.sheets))
			if r.IntN(2) == 0 {
				sun[r.IntN(len(sun))] = 1000 * r.Float64()
			}
			if err := system.Solve(&followed, far.at, sun); err != nil {
				t.Fatalf("%v\n%v\n%+v", err, c, far.at)
			}
			if err := system.Follow(&followed, c.at, c.absorbed); err != nil {
				t.Fatalf("%v\n%v\nfrom %+v", err, c, far.at)
			}
			c.follows(t, "followed", &followed)
			c.closes(t, &followed, 2e-6)
			if t.Failed() {
				t.Fatalf("from %+v, sun %g", far.at, sun)
			}
		}
		if c.state(&b).nearStep(1e-6) {
			held++
		}
	}
	t.Logf("held %d of %d", held, cases)
}

// Single cases that are awkward to a solver: the state is the one that shooting finds.
func TestBalanceAwkwardSteps(t *testing.T) {
	xenon := secondBlend{0.013860704986250897, 0, 0, 0.9861392950137491}
	solved := &secondCase{sheets: []thermal.Sheet{secondPane(0.016273817097514003, 0.8763426654192067, 0.6172371163436653)}, absorbed: []float64{0},
		at: thermal.Surroundings{OutsideK: 325.30346201535633, OutsideRadiantK: 225.94308123181344, InsideK: 325.1524901280017, InsideRadiantK: 225.62345757124245,
			OutsideConvection: 12.370733201215794, TiltDeg: 90, HeightM: 1.5483784879946145}}
	solved.add(0.0181818683, secondBlend{0, 0, 0.3072740193377596, 0.6927259806622404}, secondPane(0.005922941386571278, 0.3403774672436981, 0.837))
	solved.add(0.0387334486, xenon, secondPane(0.014414796921986946, 0.00011214430860370809, 0.13712606365496258))

	from := &secondCase{sheets: []thermal.Sheet{secondPane(0.01000486823578399, 1, 0.0003092089198646853)}, absorbed: []float64{0},
		at: thermal.Surroundings{OutsideK: 218.7929872522624, OutsideRadiantK: 218.97915408749463, InsideK: 326.9306257208499, InsideRadiantK: 252.21843057489127,
			OutsideConvection: 67.23932393366022, TiltDeg: 110, HeightM: 1.2770867876409069}}
	from.add(0.0229575507, secondBlend{0.1, 0.9}, secondPane(0.020181408386599747, 1, 0.837))
	from.absorbed[1] = 274.8467518225675
	to := *from
	to.absorbed = []float64{19.1256474, 10.3339627}
	to.at = thermal.Surroundings{OutsideK: 234.5197020694688, OutsideRadiantK: 320.0955917986708, InsideK: 260.3210402133673, InsideRadiantK: 226.4852901105137,
		OutsideConvection: 8.24007406804618, TiltDeg: 110, HeightM: 1.4189746647536299}

	followed := from.first(t)
	if err := to.system(t).Follow(followed, to.at, to.absorbed); err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		what string
		c    *secondCase
		b    *thermal.Balance
	}{{"solved", solved, solved.first(t)}, {"followed", &to, followed}} {
		tt.c.follows(t, tt.what, tt.b)
		s, err := tt.c.solve()
		if err != nil {
			t.Fatal(err)
		}
		tt.c.compare(t, tt.what, tt.b, s)
	}
}
