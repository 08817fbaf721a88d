package spectra

import (
	"errors"
	"fmt"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"panewright/reference"
)

// a part of a spectrum file: the same cells from first to last nm by step.
type part struct {
	first, last, step float64
	cells             string
}

// visible covers the solar range as finely as is usual.
var visible = []part{{300, 780, 10, "0.6,0.2,0.15"}, {830, 2480, 50, "0.6,0.2,0.15"}}

// columnsOf reads a spectrum made of parts.
func columnsOf(t *testing.T, parts ...part) Columns {
	t.Helper()
	text := "wavelength_nm,tau,rho_front,rho_back\n"
	for _, p := range parts {
		for nm := p.first; nm <= p.last; nm += p.step {
			text += fmt.Sprintf("%g,%s\n", nm, p.cells)
		}
	}
	c, err := ReadCSV(strings.NewReader(text), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// lineOf returns the line of the first row at or beyond a wavelength.
func lineOf(c Column, nm float64) int {
	return c.Line[slices.IndexFunc(c.NM, func(x float64) bool { return x >= nm })]
}

func cautionsOf(m Measured, code string) []string {
	var texts []string
	for _, c := range m.Cautions {
		if c.Code == code {
			texts = append(texts, c.Text)
		}
	}
	return texts
}

func TestJoinSetsToBound(t *testing.T) {
	for _, tt := range []struct {
		name           string
		line           int
		row            string // of 310 nm
		tau, rho, back float64
	}{
		{"above 1 by 0.001", 3, "310,1.001,0,0", 1, 0, 0},
		{"above 1 by 0.002", 3, "310,1.002,0,0", 1, 0, 0},
		{"below 0 by 0.001", 3, "310,0.5,-0.001,0.1", 0.5, 0, 0.1},
		{"below 0 by 0.002", 3, "310,-0.002,0.1,0.1", 0, 0.1, 0.1},
		{"sum 1.001", 3, "310,0.75,0.251,0.1", 0.75, 0.25, 0.1},
		{"sum 1.002", 3, "310,0.75,0.1,0.252", 0.75, 0.1, 0.25},
		{"sum 1.002 once each is in bounds", 3, "310,1.002,0.002,0", 1, 0, 0},
	} {
		t.Run(tt.name, func(t *testing.T) {
			m, err := readAndJoin(strings.NewReader(withLine(tt.line, tt.row)))
			if err != nil {
				t.Fatal(err)
			}
			if a, b, c := m.Tau.Value[1], m.RhoFront.Value[1], m.RhoBack.Value[1]; a != tt.tau || b != tt.rho || c != tt.back {
				t.Errorf("got %v %v %v, want %v %v %v", a, b, c, tt.tau, tt.rho, tt.back)
			}
			texts := cautionsOf(m, "set_to_bound")
			if len(texts) != 1 || !strings.HasPrefix(texts[0], "pane.csv: ") || !strings.Contains(texts[0], "in line 3.") {
				t.Errorf("cautions %q do not name pane.csv and line 3", m.Cautions)
			}
		})
	}
	m, err := readAndJoin(strings.NewReader(good(same)))
	if err != nil || len(m.Cautions) > 0 {
		t.Errorf("good file: %v, cautions %q", err, m.Cautions)
	}
}

// However many quantities of a row were changed, it is one row.
func TestJoinCountsRowsOnce(t *testing.T) {
	m, err := readAndJoin(strings.NewReader(good(func(i int, line string) string {
		if i == 0 {
			return line
		}
		return line[:3] + ",-0.001,-0.001,-0.001"
	})))
	if err != nil {
		t.Fatal(err)
	}
	const want = "in lines 2, 3, 4, 5, 6, 7, 8, 9 and 3 more."
	if texts := cautionsOf(m, "set_to_bound"); len(texts) != 1 || !strings.HasSuffix(texts[0], want) {
		t.Errorf("cautions %q, want one that ends in %q", texts, want)
	}
}

// Where a quantity has a file of its own, a caution about its rows names that file.
func TestJoinNamesTheFileOfTheRows(t *testing.T) {
	read := func(file, text string) Columns {
		c, err := ReadCSV(strings.NewReader(text), file)
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
	c := Columns{
		Tau:      read("tau.csv", good(same)).Tau,
		RhoFront: read("front.csv", withLine(3, "310,0.8,-0.001,0.15")).RhoFront,
		RhoBack:  read("back.csv", good(same)).RhoBack,
	}
	m, err := Join(c, Column{}, Column{})
	if err != nil {
		t.Fatal(err)
	}
	if texts := cautionsOf(m, "set_to_bound"); len(texts) != 1 || !strings.Contains(texts[0], "front.csv") || strings.Contains(texts[0], "tau.csv") {
		t.Errorf("cautions %q, want one about line 3 of front.csv", texts)
	}
}

// Where quantities come from files of their own, a peak of one may lie between two points of
// another: the sum is checked there as well.
func TestJoinSumBetweenPoints(t *testing.T) {
	apart := func(file string, first, step int, peak int, low, high string) Columns {
		text := "wavelength_nm,tau,rho_front,rho_back\n"
		for nm := first; nm <= 500; nm += step {
			v := low
			if nm == peak {
				v = high
			}
			text += fmt.Sprintf("%d,%s,%s,%s\n", nm, v, v, v)
		}
		c, err := ReadCSV(strings.NewReader(text), file)
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
	c := Columns{
		Tau:      apart("tau.csv", 300, 5, 405, "0.6", "0.9").Tau,
		RhoFront: apart("rho.csv", 300, 10, 0, "0.3", "").RhoFront,
		RhoBack:  apart("rho.csv", 300, 10, 0, "0.05", "").RhoBack,
	}
	_, err := Join(c, Column{}, Column{})
	if row, ok := errors.AsType[*RowError](err); !ok || row.NM != 405 || !strings.Contains(row.Text, "add to at most 1") {
		t.Errorf("tau 0.9 and rho_front 0.3 at 405 nm: got %v", err)
	}
}

func TestJoinBlankEnds(t *testing.T) {
	text := good(func(i int, line string) string {
		switch i {
		case 11:
			return "400,,0.1,"
		case 1:
			return "300,0.8,,0.15"
		}
		return line
	})
	m, err := readAndJoin(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	if m.Tau.Last() != 390 || m.RhoFront.First() != 310 || m.RhoFront.Last() != 400 || m.RhoBack.Last() != 390 || m.Tau.Len() != 10 {
		t.Errorf("tau to %v, front %v to %v, back to %v nm", m.Tau.Last(), m.RhoFront.First(), m.RhoFront.Last(), m.RhoBack.Last())
	}
}

func TestJoinNeedsEachQuantity(t *testing.T) {
	without := func(column int) string {
		return good(func(_ int, line string) string {
			return strings.Join(slices.Delete(strings.Split(line, ","), column, column+1), ",")
		})
	}
	for column, name := range []string{1: "tau", 2: "rho_front", 3: "rho_back"} {
		if name == "" {
			continue
		}
		_, err := readAndJoin(strings.NewReader(without(column)))
		checkFaults(t, err, [][]string{{"pane.csv: no column " + name}})
	}
	_, err := readAndJoin(strings.NewReader(good(func(i int, line string) string {
		if i < 10 {
			return line
		}
		return strings.Replace(line, ",0.8,", ",,", 1)
	})))
	checkFaults(t, err, [][]string{{"pane.csv: 9 values of tau", "at least 10"}})
}

func TestJoinCoarseSteps(t *testing.T) {
	const cells = "0.6,0.2,0.15"
	for _, tt := range []struct {
		name  string
		parts []part
		want  []string // words of the caution; empty for none
	}{
		{"at both limits", visible, nil},
		{"10.5 nm below 780", []part{{300, 700, 10, cells}, {710.5, 710.5, 1, cells}, {720.5, 780.5, 10, cells}, {830, 2500, 50, cells}}, []string{"10.5 nm below 780 nm", "at most 10"}},
		{"55 nm beyond", []part{{300, 780, 10, cells}, {830, 1000, 50, cells}, {1035, 1035, 1, cells}, {1085, 2500, 50, cells}}, []string{"55 nm beyond 780 nm", "at most 50"}},
		{"both", []part{{300, 720, 20, cells}, {740, 2540, 60, cells}}, []string{"60 nm below 780 nm", "60 nm beyond 780 nm"}},
		{"a step that begins below 780", []part{{300, 770, 10, cells}, {790, 2500, 45, cells}}, []string{"20 nm below 780 nm"}},
		{"beyond the sun any step will do", append(slices.Clone(visible), part{2520, 2520, 1, cells}, part{3500, 4900, 700, cells}), nil},
	} {
		t.Run(tt.name, func(t *testing.T) {
			m, err := Join(columnsOf(t, tt.parts...), Column{}, Column{})
			if err != nil {
				t.Fatal(err)
			}
			texts := cautionsOf(m, "coarse_steps")
			if (len(texts) > 0) != (tt.want != nil) {
				t.Fatalf("cautions %q, want words %q", m.Cautions, tt.want)
			}
			for _, word := range tt.want {
				if !strings.Contains(texts[0], word) || !strings.HasPrefix(texts[0], "pane.csv: ") {
					t.Errorf("%q lacks %q", texts[0], word)
				}
			}
			if len(tt.want) > 0 && strings.Contains(texts[0], "beyond") != slices.ContainsFunc(tt.want, func(w string) bool { return strings.Contains(w, "beyond") }) {
				t.Errorf("%q names a range that is fine", texts[0])
			}
		})
	}
}

func TestJoinInfrared(t *testing.T) {
	rows := func(first, last float64) []part {
		return append(slices.Clone(visible), part{first, last, 1000, ",0.95,0.3"})
	}
	t.Run("to 50 µm", func(t *testing.T) {
		m, err := Join(columnsOf(t, rows(5000, 50000)...), Column{}, Column{})
		if err != nil || len(m.Cautions) > 0 {
			t.Fatalf("%v, cautions %q", err, m.Cautions)
		}
		if m.InfraredFront.First() != 5000 || m.InfraredFront.Last() != 50000 || m.InfraredBack.Len() != 46 {
			t.Errorf("infrared from %v to %v nm, %d points", m.InfraredFront.First(), m.InfraredFront.Last(), m.InfraredBack.Len())
		}
		// The mean of a constant is that constant.
		if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); math.Abs(e-0.05) > 1e-12 {
			t.Errorf("normal emissivity of a reflectance of 0.95 is %v, want 0.05", e)
		}
		if e := NormalEmissivity(m.InfraredBack, m.InfraredTau); math.Abs(e-0.7) > 1e-12 {
			t.Errorf("normal emissivity of a reflectance of 0.3 is %v, want 0.7", e)
		}
	})
	t.Run("to 30 µm", func(t *testing.T) {
		m, err := Join(columnsOf(t, rows(5000, 30000)...), Column{}, Column{})
		if err != nil {
			t.Fatal(err)
		}
		texts := cautionsOf(m, "extended")
		if len(texts) != 2 || !strings.Contains(texts[0], "front stop at 30 µm") || !strings.Contains(texts[1], "back stop at 30 µm") || !strings.Contains(texts[0], "held to 50 µm") {
			t.Errorf("cautions %q", m.Cautions)
		}
		if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); math.Abs(e-0.05) > 1e-12 {
			t.Errorf("normal emissivity is %v, want 0.05 with the last value held", e)
		}
	})
	t.Run("to 25 µm", func(t *testing.T) {
		if m, err := Join(columnsOf(t, rows(5000, 25000)...), Column{}, Column{}); err != nil || len(cautionsOf(m, "extended")) != 2 {
			t.Errorf("%v, cautions %q", err, m.Cautions)
		}
	})
	t.Run("to 20 µm", func(t *testing.T) {
		c := columnsOf(t, rows(5000, 20000)...)
		_, err := Join(c, Column{}, Column{})
		place := fmt.Sprintf("pane.csv:%d: at 20000 nm: ", lineOf(c.RhoFront, 20000))
		checkFaults(t, err, [][]string{{place, "front must reach 25 µm"}, {place, "back must reach 25 µm"}})
	})
	t.Run("from 5.5 µm", func(t *testing.T) {
		if _, err := Join(columnsOf(t, rows(5500, 50500)...), Column{}, Column{}); err != nil {
			t.Error(err)
		}
	})
	t.Run("from 7 µm", func(t *testing.T) {
		c := columnsOf(t, rows(7000, 50000)...)
		_, err := Join(c, Column{}, Column{})
		place := fmt.Sprintf("pane.csv:%d: at 7000 nm: ", lineOf(c.RhoFront, 7000))
		checkFaults(t, err, [][]string{{place, "front must begin at 5.5 µm"}, {place, "back must begin at 5.5 µm"}})
	})
	t.Run("of one face", func(t *testing.T) {
		m, err := Join(columnsOf(t, append(slices.Clone(visible), part{5000, 50000, 1000, ",,0.95"})...), Column{}, Column{})
		if err != nil || m.InfraredFront.Len() != 0 || m.InfraredBack.Len() != 46 || len(m.Cautions) > 0 {
			t.Errorf("%v, %d points of the front, %d of the back, cautions %q", err, m.InfraredFront.Len(), m.InfraredBack.Len(), m.Cautions)
		}
	})
	t.Run("between 2.5 and 5 µm nothing is used", func(t *testing.T) {
		solar := append(slices.Clone(visible), part{2500, 2500, 1, "0.6,0.2,0.15"})
		ir := part{5000, 50000, 1000, ",0.95,0.3"}
		plain, err := Join(columnsOf(t, append(slices.Clone(solar), ir)...), Column{}, Column{})
		if err != nil {
			t.Fatal(err)
		}
		filled, err := Join(columnsOf(t, append(slices.Clone(solar), part{2600, 4900, 100, "0.01,0.99,0.98"}, ir)...), Column{}, Column{})
		if err != nil || len(filled.Cautions) > 0 {
			t.Fatalf("%v, cautions %q", err, filled.Cautions)
		}
		if !reflect.DeepEqual(filled.InfraredFront, plain.InfraredFront) || !reflect.DeepEqual(filled.InfraredBack, plain.InfraredBack) {
			t.Error("rows below 5 µm change the infrared")
		}
		for _, w := range weightings() {
			if a, b := w.Mean(filled.Tau), w.Mean(plain.Tau); a != b {
				t.Errorf("%s: rows beyond 2.5 µm change the mean from %v to %v", w.Name, b, a)
			}
		}
	})
	t.Run("from files of its own", func(t *testing.T) {
		own := columnsOf(t, part{5000, 50000, 1000, "0,0.9,0.8"})
		m, err := Join(columnsOf(t, visible...), own.RhoFront, own.RhoBack)
		if err != nil {
			t.Fatal(err)
		}
		if a, b := NormalEmissivity(m.InfraredFront, m.InfraredTau), NormalEmissivity(m.InfraredBack, m.InfraredTau); math.Abs(a-0.1) > 1e-12 || math.Abs(b-0.2) > 1e-12 {
			t.Errorf("normal emissivities %v and %v, want 0.1 and 0.2", a, b)
		}
		_, err = Join(columnsOf(t, visible...), columnsOf(t, visible...).RhoFront, Column{})
		checkFaults(t, err, [][]string{{"pane.csv: no rows beyond 5 µm", "front"}})
	})
}

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
