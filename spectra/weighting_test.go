package spectra

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"panewright/reference"
)

// weightings are all that the package has.
func weightings() []Weighting {
	return []Weighting{LightEN410(), LightCIE(), SolarEN410(), SolarG173(), UV(), Damage(), Damage700(), Skin()}
}

func TestConstantSpectrum(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(0, 1).Draw(t, "value")
		c := Curve{NM: []float64{300, 555, 2500}, Value: []float64{v, v, v}}
		for _, w := range weightings() {
			if got := w.Mean(c); math.Abs(got-v) > 1e-12 {
				t.Fatalf("%s (%s): mean of the constant %v is %v", w.Name, w.Source, v, got)
			}
		}
	})
}

func TestMissing(t *testing.T) {
	w := Weighting{NM: []float64{400, 500, 600, 700}, Weight: []float64{1, 2, 4, 1}}
	for _, tt := range []struct{ first, last, below, above float64 }{
		{400, 700, 0, 0},
		{300, 900, 0, 0},
		{400.1, 700, 0.125, 0},
		{500, 600, 0.125, 0.125},
		{501, 599, 0.375, 0.625},
		{800, 900, 1, 0},
		{0, 0, 0, 1},
	} {
		if below, above := w.Missing(tt.first, tt.last); below != tt.below || above != tt.above {
			t.Errorf("a spectrum from %v to %v nm misses %v and %v, want %v and %v", tt.first, tt.last, below, above, tt.below, tt.above)
		}
	}
}

func TestTrapezoid(t *testing.T) {
	c := Curve{NM: []float64{300, 400, 500}, Value: []float64{1, 3, 5}}
	for _, tt := range []struct {
		name       string
		lo, hi     float64
		nm, weight []float64
	}{
		{"whole, half bins at the ends", 300, 500, []float64{300, 400, 500}, []float64{50, 300, 250}},
		{"ends interpolated", 350, 450, []float64{350, 400, 450}, []float64{2 * 25, 3 * 50, 4 * 25}},
		{"one end interpolated", 350, 500, []float64{350, 400, 500}, []float64{2 * 25, 3 * 75, 5 * 50}},
		{"within one step", 425, 475, []float64{425, 475}, []float64{3.5 * 25, 4.5 * 25}},
		{"no further than the spectrum", 200, 700, []float64{300, 400, 500}, []float64{50, 300, 250}},
		{"beyond the spectrum", 600, 700, nil, nil},
	} {
		if w := Trapezoid(c, tt.lo, tt.hi); !slices.Equal(w.NM, tt.nm) || !slices.Equal(w.Weight, tt.weight) {
			t.Errorf("%s: got %v with %v, want %v with %v", tt.name, w.NM, w.Weight, tt.nm, tt.weight)
		}
	}
}

// The weights add to the integral of the polyline, which trapezia measure exactly.
func TestTrapezoidIsTheIntegral(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawCurve(t, 2)
		lo := rapid.Float64Range(200, 2000).Draw(t, "lo")
		hi := lo + rapid.Float64Range(1, 2000).Draw(t, "width")
		a, b := max(lo, c.First()), min(hi, c.Last())
		var want, got, size float64
		if a < b {
			knots := []float64{a}
			for _, nm := range c.NM {
				if nm > a && nm < b {
					knots = append(knots, nm)
				}
			}
			knots = append(knots, b)
			for i := 1; i < len(knots); i++ {
				want += (knots[i] - knots[i-1]) * (c.At(knots[i]) + c.At(knots[i-1])) / 2
				size += (knots[i] - knots[i-1])
			}
		}
		for _, w := range Trapezoid(c, lo, hi).Weight {
			got += w
		}
		if math.Abs(got-want) > 1e-12*(1+size) {
			t.Fatalf("%v from %v to %v: weights add to %v, the integral is %v", c, lo, hi, got, want)
		}
	})
}

// The action spectra at wavelengths where their definitions can be worked out by hand.
func TestActionSpectra(t *testing.T) {
	for _, tt := range []struct {
		name      string
		got, want float64
		source    string
	}{
		{"damage at 300 nm", DamageWeight(300), 1, "exp(0), CIE 89/3"},
		{"damage halved", DamageWeight(300 + math.Ln2/0.012), 0.5, "exp(-ln 2), CIE 89/3"},
		{"damage at 400 nm", DamageWeight(400), 0.301194, "exp(-1.2), table of exponentials"},
		{"damage at 600 nm", DamageWeight(600), 0.0273237, "exp(-3.6), table of exponentials"},
		{"skin at 280 nm", ErythemaWeight(280), 1, "McKinlay and Diffey 1987"},
		{"skin at 298 nm", ErythemaWeight(298), 1, "McKinlay and Diffey 1987"},
		{"skin at 308 nm", ErythemaWeight(308), 0.114815, "10^-0.94, table of logarithms"},
		{"skin at 328 nm", ErythemaWeight(328), 0.00151356, "10^-2.82, table of logarithms"},
		{"skin at 330 nm", ErythemaWeight(330), 0.00136458, "10^-2.865, table of logarithms"},
		{"skin at 339 nm", ErythemaWeight(339), 0.001, "10^-3, McKinlay and Diffey 1987"},
		{"skin at 400 nm", ErythemaWeight(400), 0.000121619, "10^-3.915, table of logarithms"},
		{"skin beyond", ErythemaWeight(400.001), 0, "McKinlay and Diffey 1987"},
	} {
		if tt.source == "" {
			t.Fatalf("%s: a value needs its source", tt.name)
		}
		if math.Abs(tt.got-tt.want) > 5e-6*tt.want { // six digits
			t.Errorf("%s: got %.9g, want %.6g (%s)", tt.name, tt.got, tt.want, tt.source)
		}
	}
}

// Damage and skin weights are the sun's bins of EN 410 times the action, divided by their sum, as
// far as the six decimals of both tables reach. Of the bin at the limit, which reaches from
// mid-point to mid-point, only the part below it counts.
func TestDamageAndSkinWeights(t *testing.T) {
	nm, sun := reference.EN410Weights().Series("solar")
	damage := func(x float64) float64 { return math.Exp(3.6 - 0.012*x) }
	for _, tt := range []struct {
		name   string
		w      Weighting
		limit  float64
		action func(nm float64) float64
	}{
		{"damage to 600 nm", Damage(), 600, damage},
		{"damage to 700 nm", Damage700(), 700, damage},
		{"skin to 400 nm", Skin(), 400, func(x float64) float64 {
			switch {
			case x <= 298:
				return 1
			case x <= 328:
				return math.Exp(math.Ln10 * (28.012 - 0.094*x))
			}
			return math.Exp(math.Ln10 * (2.085 - 0.015*x))
		}},
	} {
		last := slices.Index(nm, tt.limit)
		if last < 0 || !slices.Equal(tt.w.NM, nm[:last+1]) {
			t.Fatalf("%s: wavelengths %v", tt.name, tt.w.NM)
		}
		products := make([]float64, last+1)
		var total, weights float64
		for i, x := range tt.w.NM {
			products[i] = sun[i] * tt.action(x)
			if i == last {
				lower, upper := (x-nm[i-1])/2, (nm[i+1]-x)/2
				products[i] *= lower / (lower + upper)
			}
			total += products[i]
			weights += tt.w.Weight[i]
		}
		if math.Abs(weights-1) > 1e-5 /* the halves of some forty last digits */ {
			t.Errorf("%s: weights add to %.7f, want 1", tt.name, weights)
		}
		for i, x := range tt.w.NM {
			want := products[i] / total
			// half a digit of the sun and of the weight, and what the others' halves do to the sum
			tolerance := 0.5e-6*tt.action(x)/total + 0.6e-6 + 1e-3*want
			if i == last {
				tolerance += 0.06 * want // the spectrum is not flat within the bin
			}
			if math.Abs(tt.w.Weight[i]-want) > tolerance {
				t.Errorf("%s: weight at %v nm is %.6f, want %.6f (EN 410 and the action)", tt.name, x, tt.w.Weight[i], want)
			}
		}
	}
}

// lanes adds products in four lanes, lane j taking those of i ≡ j mod 4.
func lanes(w, v []float64) float64 {
	var s [4]float64
	for i := range w {
		s[i%4] += float64(w[i] * v[i])
	}
	return (s[0] + s[1]) + (s[2] + s[3])
}

func drawFloats(t *rapid.T, n int, label string) []float64 {
	return rapid.SliceOfN(rapid.Float64Range(0, 1), n, n).Draw(t, label)
}

func TestFourLanes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		grid := Grid{drawCurve(t, 1).NM}
		values := append(drawFloats(t, grid.Len(), "values"), make([]float64, grid.Padded()-grid.Len())...)
		first := rapid.IntRange(0, grid.Len()-1).Draw(t, "first")
		span := grid.NM[first : first+rapid.IntRange(1, grid.Len()-first).Draw(t, "points")]
		var placed [3]Placed
		for k := range placed {
			w := Weighting{NM: span, Weight: drawFloats(t, len(span), "weights")}
			placed[k] = w.On(grid)
			// the weights once more, on the whole padded grid
			whole := make([]float64, grid.Padded())
			copy(whole[first:], w.Weight)
			if got, want := placed[k].Sum(values), lanes(whole, values); got != want {
				t.Fatalf("sum %v, in four lanes %v", got, want)
			}
			ones := slices.Repeat([]float64{1}, len(whole))
			if got, want := placed[k].Total, lanes(whole, ones); got != want {
				t.Fatalf("total %v, in four lanes %v", got, want)
			}
			if placed[k].From%4 != 0 || len(placed[k].Weight)%4 != 0 {
				t.Fatalf("from %d, %d weights: not multiples of four", placed[k].From, len(placed[k].Weight))
			}
		}
		x, y, z := NewTriple(placed[0], placed[1], placed[2]).Sums(values)
		if x != placed[0].Sum(values) || y != placed[1].Sum(values) || z != placed[2].Sum(values) {
			t.Fatalf("a Triple's %v %v %v differ from %v %v %v", x, y, z, placed[0].Sum(values), placed[1].Sum(values), placed[2].Sum(values))
		}
	})
}

// The order of the sum shows where numbers cancel: 1e16 + 1 and 1e16 - 1 are 1e16 to a float64,
// so that 1 is lost twice if lanes 0 and 1 are joined, then 2 and 3. Added one by one the result
// would be 1, by lanes 0 and 2 first it would be 2.
func TestFourLanesOrder(t *testing.T) {
	if got := dot([]float64{1, 1, 1, 1}, []float64{1e16, 1, -1e16, 1}); got != 0 {
		t.Errorf("got %v, want 0", got)
	}
}

func drawCurve(t *rapid.T, least int) Curve {
	steps := rapid.SliceOfN(rapid.Float64Range(0.01, 80), least, 60).Draw(t, "steps")
	c := Curve{Value: drawFloats(t, len(steps), "curve")}
	nm := 250.0
	for _, s := range steps {
		nm += s
		c.NM = append(c.NM, nm)
	}
	return c
}

func TestAtAndSampleAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawCurve(t, 0)
		grid := NewGrid(rapid.SliceOf(rapid.Float64Range(200, 2600)).Draw(t, "grid"), c.NM).NM
		values := make([]float64, len(grid))
		c.Sample(values, grid)
		for i, nm := range grid {
			if at := c.At(nm); at != values[i] {
				t.Fatalf("at %v nm: At %v, Sample %v", nm, at, values[i])
			}
			if at := slices.Index(c.NM, nm); at >= 0 && values[i] != c.Value[at] {
				t.Fatalf("at its own point %v nm: %v, want %v", nm, values[i], c.Value[at])
			}
		}
	})
}

func TestCurveAt(t *testing.T) {
	c := Curve{NM: []float64{400, 500, 600}, Value: []float64{0.25, 0.75, 0.5}}
	for nm, want := range map[float64]float64{300: 0.25, 400: 0.25, 450: 0.5, 500: 0.75, 540: 0.65, 600: 0.5, 900: 0.5} {
		if got := c.At(nm); math.Abs(got-want) > 1e-15 {
			t.Errorf("at %v nm: %v, want %v", nm, got, want)
		}
	}
	if (Curve{}).At(500) != 0 {
		t.Error("an empty curve is not 0")
	}
}

func TestGridLacksWavelength(t *testing.T) {
	defer func() {
		if text := fmt.Sprint(recover()); !strings.HasPrefix(text, "spectra: ") {
			t.Errorf("recovered %q, want the package's own words", text)
		}
	}()
	Weighting{NM: []float64{400, 450}, Weight: []float64{1, 1}}.On(NewGrid([]float64{400, 500}))
}

// The faults of Join are found by errors.As as those of ReadCSV are.
func TestJoinErrorsUnwrap(t *testing.T) {
	_, err := readAndJoin(strings.NewReader(withLine(9, "370,0.8,0.3,0.1")))
	if row, ok := errors.AsType[*RowError](err); !ok || row.Line != 9 || row.NM != 370 {
		t.Errorf("%v", err)
	}
}
