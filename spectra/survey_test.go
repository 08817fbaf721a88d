package spectra

import (
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"
)

// at returns a column with the given wavelengths and one value.
func at(value float64, nm ...float64) (c Column) {
	for _, x := range nm {
		c.NM, c.Value = append(c.NM, x), append(c.Value, value)
	}
	return c
}

// steps returns wavelengths from first by a step, n of them.
func steps(first, step float64, n int) (nm []float64) {
	for i := range n {
		nm = append(nm, first+float64(i)*step)
	}
	return nm
}

func TestSurvey(t *testing.T) {
	// 300 to 380 by 5, a value of its own at 382, 390 to 780 by 10, 830 to 2480 by 50, 6 to 30 µm by 2.
	nm := slices.Concat(steps(300, 5, 17), []float64{382}, steps(390, 10, 40), steps(830, 50, 34), steps(6000, 2000, 13))
	c := at(0.5, nm...)
	c.Value[3], c.Value[30], c.Value[80], c.Value[100] = -0.001, 1.001, 0.9, 0.95
	c.Value[60], c.Value[61] = 1.0005, 0.0001
	f := Survey(c)
	if f.Count != 105 || f.FirstNM != 300 || f.LastNM != 30000 {
		t.Errorf("%d points from %g to %g nm", f.Count, f.FirstNM, f.LastNM)
	}
	// below 780 nm: 16 steps of 5, one of 2, one of 8, 39 of 10; the one from 780 begins the next part
	want := []Steps{
		{Span{0, 780}, 2, 10, 10, Span{390, 400}},
		{Span{780, 2500}, 50, 50, 50, Span{780, 830}},
		{Span{5000, math.Inf(1)}, 2000, 2000, 2000, Span{6000, 8000}},
	}
	if !slices.Equal(f.Steps, want) {
		t.Errorf("steps %+v, want %+v", f.Steps, want)
	}
	if f.Gaps != nil {
		t.Errorf("gaps %v, want none", f.Gaps)
	}
	// nm[3] is 315, nm[30] 390 + 12·10 = 510 nm; of the infrared, which begins at nm[92], nm[100] is 22 µm
	if f.Least != (Extreme{315, -0.001}) || f.Greatest != (Extreme{510, 1.001}) || f.InfraredGreatest != (Extreme{22000, 0.95}) || f.InfraredLeast != (Extreme{6000, 0.5}) {
		t.Errorf("extremes %+v", f)
	}
	if f.Below != 1 || f.Above != 2 {
		t.Errorf("%d below 0 and %d above 1, want 1 and 2", f.Below, f.Above)
	}
}

func TestSurveyGaps(t *testing.T) {
	marked := at(0.5, steps(300, 10, 60)...)
	marked.NM, marked.Value = slices.Delete(marked.NM, 20, 30), slices.Delete(marked.Value, 20, 30)
	bare := marked
	marked.Gaps = []Span{{490, 600}, {600, 610}}
	for _, tt := range []struct {
		name string
		c    Column
		want []Gap
	}{
		{"even steps", at(0.5, steps(300, 10, 60)...), nil},
		{"a step of 110 nm among steps of 10", bare, []Gap{{Span{490, 600}, false}}},
		{"the same, marked, and a marked gap that is no wider than a step", marked, []Gap{{Span{490, 600}, true}, {Span{600, 610}, true}}},
		{"finer steps and then coarser ones", at(0.5, slices.Concat(steps(300, 1, 480), steps(790, 25, 60))...), nil},
		{"a last value far away", at(0.5, slices.Concat(steps(300, 10, 60), []float64{1000})...), []Gap{{Span{890, 1000}, false}}},
		{"three times as wide is none", at(0.5, slices.Concat(steps(300, 10, 20), steps(520, 10, 20))...), nil},
		{"just above is one", at(0.5, slices.Concat(steps(300, 10, 20), steps(520.5, 10, 20))...), []Gap{{Span{490, 520.5}, false}}},
		{"from the solar range to the infrared is none", at(0.5, slices.Concat(steps(300, 10, 220), steps(5000, 500, 60))...), nil},
		{"in the infrared", at(0.5, slices.Concat(steps(5000, 500, 20), steps(20000, 500, 20))...), []Gap{{Span{14500, 20000}, false}}},
	} {
		if got := Survey(tt.c).Gaps; !slices.Equal(got, tt.want) {
			t.Errorf("%s: %v, want %v", tt.name, got, tt.want)
		}
	}
}

func TestSurveyStepsWithoutGaps(t *testing.T) {
	c := at(0.5, 300, 310, 320, 350, 360)
	c.Gaps = []Span{{320, 350}}
	if got := Survey(c).Steps; len(got) != 1 || got[0].Least != 10 || got[0].GreatestNM != 10 || got[0].Usual != 10 {
		t.Errorf("%+v, want steps of 10 nm alone", got)
	}
}

// Normal noise of a known standard deviation on smooth curves: the mean of many estimates is that
// deviation, on even and on uneven steps. The simulation is the second evaluation.
func TestNoiseOfKnownDeviation(t *testing.T) {
	const sigma, runs = 0.002, 400
	smooth := func(nm float64) float64 { return 0.5 + 0.3*math.Sin(nm/400) }
	random := rand.New(rand.NewPCG(7, 11))
	for _, tt := range []struct {
		name string
		nm   func() []float64
	}{
		{"by 1 nm", func() []float64 { return steps(300, 1, 2201) }},
		{"by 2 nm", func() []float64 { return steps(300, 2, 1101) }},
		{"at random", func() []float64 {
			var nm []float64
			for x := 300.0; x < 2500; x += 0.2 + 2*random.Float64() {
				nm = append(nm, x)
			}
			return nm
		}},
	} {
		var sum, square [3]float64
		for range runs {
			c := Column{Curve: Curve{NM: tt.nm()}}
			for _, nm := range c.NM {
				c.Value = append(c.Value, smooth(nm)+sigma*random.NormFloat64())
			}
			noise := Survey(c).Noise
			if len(noise) != 3 {
				t.Fatalf("noise of %d parts", len(noise))
			}
			for k, n := range noise {
				if n.Why != "" {
					t.Fatalf("%s, %v: %s", tt.name, n.Part, n.Why)
				}
				sum[k] += n.Sigma
				square[k] += n.Sigma * n.Sigma
			}
		}
		for k := range sum {
			mean := sum[k] / runs
			spread := math.Sqrt(square[k]/runs-mean*mean) / math.Sqrt(runs) // of the mean
			// The median of few remainders is a little low of itself: 4 % is allowed of the 300-380
			// nm part at 2 nm, which has 39 of them.
			if math.Abs(mean-sigma) > 4*spread+0.04*sigma {
				t.Errorf("%s, part %d: estimates %.5f ± %.5f, noise %.5f", tt.name, k, mean, spread, sigma)
			}
		}
	}
}

func TestNoiseUnknownAndNone(t *testing.T) {
	smooth := at(0.5, steps(300, 10, 100)...)
	n := Survey(smooth).Noise
	if n[0].Why == "" || n[0].Points != 7 || !strings.HasPrefix(n[0].Why, "7 points") || n[0].Sigma != 0 {
		t.Errorf("9 points from 300 to 380 nm: %+v, want no estimate", n[0])
	}
	// by 5 nm there are 17 points from 300 to 380 nm, 15 of which have neighbours
	if n := Survey(at(0.5, steps(300, 5, 200)...)).Noise[0]; n.Why != "" || n.Points != 15 {
		t.Errorf("17 points from 300 to 380 nm: %+v, want an estimate", n)
	}
	if n[1].Why != "" || n[1].Points != 39 || n[1].Sigma != 0 {
		t.Errorf("a constant has %+v, want 0", n[1])
	}
	// a leap across a gap is no noise
	leap := smooth
	leap.Value = slices.Clone(smooth.Value)
	leap.Gaps = []Span{{500, 510}}
	for i := range leap.Value {
		leap.Value[i] = float64(i%2) * 0.001
		if leap.NM[i] > 500 {
			leap.Value[i] += 0.4
		}
	}
	// Values 0 and 0.001 in turn: of each the mean of its neighbours, the other value, is taken off,
	// which leaves 0.001 over √1.5; times 1.4826 by hand 0.00121054. Two points lie beside the gap.
	if n := Survey(leap).Noise[1]; n.Points != 37 || math.Abs(n.Sigma-0.00121054) > 1e-8 {
		t.Errorf("%+v, want 0.00121054 of 37 points", n)
	}
}

func TestEnergy(t *testing.T) {
	tau := at(0.6, steps(300, 100, 10)...)
	rho := at(0.3, steps(350, 50, 10)...)
	rho.Value[4] = 0.403  // 550 nm
	rho.Value[5] = 0.4015 // 600 nm
	tau.Value[4] = 0.75   // 700 nm
	e := Energy(tau, rho)
	// 700 nm: 0.75 + 0.3; 550 nm: 0.603 + … by hand 0.6 + 0.403; 600 nm: 1.0015 is within the slack;
	// 650 nm: 0.675 + 0.3; 750 nm: 0.675 + 0.3
	if e.Greatest.NM != 700 || math.Abs(e.Greatest.Value-1.05) > 1e-12 || e.Beyond != 2 {
		t.Errorf("%+v, want 1.05 at 700 nm and two points beyond", e)
	}
	// of rho all from 350 to 800 nm, of tau none that rho has not
	if e.Points != 10 {
		t.Errorf("%d points, want 10", e.Points)
	}
	peak := at(0.9, 425)
	peak.NM, peak.Value = append(peak.NM, 426), append(peak.Value, 0.9)
	if e := Energy(at(0.05, 400, 500), peak); math.Abs(e.Greatest.Value-0.95) > 1e-12 || e.Points != 2 {
		t.Errorf("%+v, want 0.95", e)
	}
	hollow := at(0.05, 400, 500)
	hollow.Gaps = []Span{{400, 500}}
	if e := Energy(hollow, peak); e.Points != 0 {
		t.Errorf("in a gap, and yet %+v", e)
	}
	if e := Energy(at(0.5, 300, 400), at(0.9, 500, 600)); e != (EnergyCheck{}) {
		t.Errorf("nothing in common, and yet %+v", e)
	}
	if e := Energy(Column{}, at(0.9, 500, 600)); e != (EnergyCheck{}) {
		t.Errorf("no tau, and yet %+v", e)
	}
	// values within the slack are set to the bound first, as a rating does
	if e := Energy(at(1.002, 300, 400), at(0.002, 300, 400)); e.Beyond != 0 {
		t.Errorf("%+v, want none beyond", e)
	}
}

func TestParts(t *testing.T) {
	c := at(0.5, slices.Concat(steps(300, 10, 221), steps(5000, 1000, 46))...)
	c.Value[0] = -0.001
	if s := c.SolarPart(); s.Len() != 221 || s.Value[0] != 0 {
		t.Errorf("solar part of %d points, the first %v", s.Len(), s.Value[0])
	}
	ir, err := c.InfraredPart("back")
	if err != nil || ir.First() != 5000 || ir.Last() != 50000 {
		t.Errorf("infrared from %v to %v nm, %v", ir.First(), ir.Last(), err)
	}
	if rows := c.InfraredRows(); rows.First() != 5000 || rows.Last() != 50000 {
		t.Errorf("infrared rows from %v to %v nm", rows.First(), rows.Last())
	}
	if rows := (Column{Curve: c.cut(300, 5000)}).InfraredRows(); rows.Len() != 0 {
		t.Errorf("a single row at 5 µm counts: %v", rows)
	}
	c.File = "pane.csv"
	if _, err := (Column{File: "pane.csv", Curve: c.cut(300, 9000)}).InfraredPart("back"); err == nil || !strings.Contains(err.Error(), "pane.csv: at 9000 nm: infrared rows of the back must reach 25 µm") {
		t.Errorf("infrared rows to 9 µm: %v", err)
	}
	if ir, err := (Column{Curve: c.cut(300, 2500)}).InfraredPart("back"); err != nil || ir.Len() > 0 {
		t.Errorf("no infrared rows: %v, %v", ir, err)
	}
}
