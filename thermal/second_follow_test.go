package thermal_test

// Balances that begin from other balances.

import (
	"math"
	"math/rand/v2"
	"sync"
	"testing"

	"panewright/thermal"
)

func differ(a, b *thermal.Balance) float64 {
	var worst float64
	for f := range 2 * a.Sheets {
		worst = math.Max(worst, math.Abs(a.SurfaceK[f]-b.SurfaceK[f]))
	}
	return worst
}

// From a far state the same steady state is found.
func TestFollowFromFar(t *testing.T) {
	r := rand.New(rand.NewPCG(163, 167))
	var worst float64
	for range 1500 {
		c := secondAny(r)
		far := secondAny(r)
		system := c.system(t)
		sun := make([]float64, len(c.sheets))
		for i := range sun {
			sun[i] = 1500 * r.Float64() / float64(len(sun))
		}
		var b thermal.Balance
		if err := system.Solve(&b, far.at, sun); err != nil {
			t.Fatalf("%v\n%v", err, c)
		}
		if err := system.Follow(&b, c.at, c.absorbed); err != nil {
			t.Fatalf("%v\n%v\nfrom %+v, sun %g", err, c, far.at, sun)
		}
		if !(b.ResidualWM2 < 1e-6) {
			t.Fatalf("residual %g W/m²\n%v", b.ResidualWM2, c)
		}
		solved := c.first(t)
		if c.state(&b).twoStates() || c.state(solved).twoStates() {
			continue
		}
		d := differ(&b, solved)
		worst = math.Max(worst, d)
		if !(d < 1e-9) {
			t.Errorf("followed and solved differ by %.3g K\n%v\nfrom %+v, sun %g", d, c, far.at, sun)
			return
		}
	}
	t.Logf("at most %.2g K", worst)
}

// secondHour is the weather of an invented year.
func secondHour(c *secondCase, r *rand.Rand, hour int, share []float64) {
	year, day := 2*math.Pi*float64(hour)/8760, 2*math.Pi*float64(hour%24)/24
	c.at.OutsideK = 283 - 11*math.Cos(year) - 5*math.Cos(day) + 3*r.NormFloat64()
	c.at.OutsideRadiantK = c.at.OutsideK - 10*r.Float64()
	c.at.InsideK = 294 + 2*r.Float64()
	c.at.InsideRadiantK = c.at.InsideK - 1 + 2*r.Float64()
	c.at.OutsideConvection = 4 + 20*r.Float64()
	sun := math.Max(0, -math.Cos(day)) * 800 * r.Float64()
	for i := range c.absorbed {
		c.absorbed[i] = share[i] * sun
	}
}

// Hour by hour through a year, each balance follows the last.
func TestFollowThroughYear(t *testing.T) {
	triple := &secondCase{sheets: []thermal.Sheet{secondPane(0.006, 0.837, 0.04)}, absorbed: []float64{0}, at: thermal.Surroundings{TiltDeg: 90, HeightM: 1}}
	triple.add(0.014, secondBlend{0.1, 0.9}, secondPane(0.004, 0.837, 0.837))
	triple.add(0.014, secondBlend{0.1, 0.9}, secondPane(0.004, 0.04, 0.837))
	foil := secondPane(5e-5/0.2, 0.1, 0.76)
	foil.Transmittance = 0.1
	roof := &secondCase{sheets: []thermal.Sheet{secondPane(0.008, 0.837, 0.1)}, absorbed: []float64{0}, at: thermal.Surroundings{TiltDeg: 30, HeightM: 2}}
	roof.add(0.02, secondBlend{1}, foil)
	roof.add(0.02, secondBlend{1}, secondPane(0.01, 0.837, 0.837))
	hours := 8760
	if testing.Short() {
		hours = 1000
	}
	for _, c := range []*secondCase{triple, roof} {
		r := rand.New(rand.NewPCG(173, 179))
		system := c.system(t)
		var followed, solved thermal.Balance
		var left, steps int
		for hour := range hours {
			secondHour(c, r, hour, []float64{0.3, 0.05, 0.1})
			if err := system.Solve(&solved, c.at, c.absorbed); err != nil {
				t.Fatalf("hour %d: %v\n%v", hour, err, c)
			}
			if hour == 0 {
				followed = solved
			}
			if err := system.Follow(&followed, c.at, c.absorbed); err != nil {
				t.Fatalf("hour %d: %v\n%v", hour, err, c)
			}
			steps += followed.Iterations
			if c.state(&solved).twoStates() || c.state(&followed).twoStates() {
				left++
				continue
			}
			if d := differ(&followed, &solved); !(d < 1e-9) {
				t.Fatalf("hour %d: followed and solved differ by %.3g K\n%v", hour, d, c)
			}
			if hour%200 == 0 {
				s, err := c.solve()
				if err != nil {
					t.Fatal(err)
				}
				c.compare(t, "through a year", &followed, s)
			}
		}
		t.Logf("%d hours, %.2f iterations each, %d near the step at Ra 1e4", hours, float64(steps)/float64(hours), left)
		if left > hours/10 {
			t.Errorf("%d of %d hours were left out", left, hours)
		}
	}
}

// Solve takes nothing from the state that it overwrites, and a System may be shared.
func TestSolveForgets(t *testing.T) {
	r := rand.New(rand.NewPCG(181, 191))
	var used thermal.Balance
	for range 200 {
		c := secondAny(r)
		system := c.system(t)
		fresh := *c.first(t)
		if err := system.Solve(&used, c.at, c.absorbed); err != nil {
			t.Fatalf("%v\n%v", err, c)
		}
		if used.SurfaceK != fresh.SurfaceK && differ(&used, &fresh) != 0 {
			t.Fatalf("a used balance gives other digits\n%v", c)
		}
		var group sync.WaitGroup
		for range 2 {
			group.Go(func() {
				var b thermal.Balance
				if err := system.Solve(&b, c.at, c.absorbed); err != nil || differ(&b, &fresh) != 0 {
					t.Errorf("a shared system gives other digits (%v)\n%v", err, c)
				}
			})
		}
		group.Wait()
		if t.Failed() {
			return
		}
	}
}
