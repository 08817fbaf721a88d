package spectra

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// written returns the file that WriteCSV makes of columns.
func written(c Columns, comments ...string) (string, error) {
	var s strings.Builder
	err := WriteCSV(&s, c, comments)
	return s.String(), err
}

// sameBits reports whether two curves hold the same points and gaps, bit for bit.
func sameBits(a, b Curve) bool {
	bits := func(x, y float64) bool { return math.Float64bits(x) == math.Float64bits(y) }
	return slices.EqualFunc(a.NM, b.NM, bits) && slices.EqualFunc(a.Value, b.Value, bits) && slices.Equal(a.Gaps, b.Gaps)
}

func sameColumns(a, b Columns) bool {
	return sameBits(a.Tau.Curve, b.Tau.Curve) && sameBits(a.RhoFront.Curve, b.RhoFront.Curve) && sameBits(a.RhoBack.Curve, b.RhoBack.Curve)
}

// drawFile draws a spectrum file as its reader takes it: columns that begin late, stop early, go on
// in the infrared and lack values between.
func drawFile(t *rapid.T) string {
	n := rapid.IntRange(minimumRows, 60).Draw(t, "rows")
	nm, last := make([]string, n), 150.0
	solar := n // rows up to 2500 nm
	for i := range nm {
		last += rapid.Float64Range(0.001, 200).Draw(t, "step")
		nm[i] = short(last)
		if last <= SolarLastNM {
			solar = i + 1
		}
	}
	cells := make([][]string, n)
	heads := []string{headNM}
	for i := range cells {
		cells[i] = []string{nm[i]}
	}
	for _, head := range []string{headTau, headRhoFront, headRhoBack} {
		if !rapid.Bool().Draw(t, "with "+head) && !(head == headRhoBack && len(heads) == 1) {
			continue
		}
		heads = append(heads, head)
		first, end := rapid.IntRange(0, n-1).Draw(t, "first"), rapid.IntRange(1, n).Draw(t, "end")
		resumes := rapid.IntRange(0, n).Draw(t, "resumes")
		for i := range cells {
			cell := ""
			if i >= first && i < end || i >= resumes && i >= solar {
				cell = "?"
				if rapid.IntRange(0, 3).Draw(t, "missing") > 0 {
					cell = short(rapid.Float64Range(-Slack, 1+Slack).Draw(t, "value"))
				}
			}
			cells[i] = append(cells[i], cell)
		}
	}
	text := strings.Join(heads, ",") + "\n"
	for _, row := range cells {
		text += strings.Join(row, ",") + "\n"
	}
	return text
}

// What was read is written and read again bit for bit, gaps with it.
func TestWriteCSVRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := drawFile(t)
		c, err := ReadCSV(strings.NewReader(text), "pane.csv")
		if err != nil && strings.Contains(err.Error(), "no column") {
			t.Skip("no values")
		}
		if err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
		out, err := written(c, "a comment")
		if err != nil {
			if len(unionOf(c.named())) >= minimumRows {
				t.Fatalf("%v\n%s", err, text)
			}
			t.Skip("hardly any values")
		}
		again, err := ReadCSV(strings.NewReader(out), "pane.csv")
		if err != nil {
			t.Fatalf("%v\n%s\nwas written as\n%s", err, text, out)
		}
		if !sameColumns(c, again) {
			t.Fatalf("%s\nwas written as\n%s", text, out)
		}
		if one, notes := c.OnOneGrid(); len(notes) == 0 && !sameColumns(c, one) {
			t.Fatalf("OnOneGrid says nothing and changes\n%s", text)
		}
	})
}

func TestWriteCSVLayout(t *testing.T) {
	text := "wavelength_nm,tau,rho_back\n300,,0.1\n310,,0.1\n320,0.5,0.1\n330,?,0.25\n340,0.5,?\n350,0.5,?\n360,0.5,0.1\n370,0.5,?\n380,0.5,\n6000,,0.9\n"
	c, err := ReadCSV(strings.NewReader(text), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	if want := []Span{{320, 340}}; !slices.Equal(c.Tau.Gaps, want) {
		t.Errorf("gaps of tau %v, want %v", c.Tau.Gaps, want)
	}
	// the blank cell at 380 nm stops the column, and the ? before it marks what lacks up to 6 µm
	if want := []Span{{330, 360}, {360, 6000}}; !slices.Equal(c.RhoBack.Gaps, want) {
		t.Errorf("gaps of rho_back %v, want %v", c.RhoBack.Gaps, want)
	}
	got, err := written(c, "from a.jdx\nand \x1b[31mb.csv", "  ")
	if err != nil {
		t.Fatal(err)
	}
	want := "# from a.jdx\ufffdand \ufffd[31mb.csv\n# \nwavelength_nm,tau,rho_back\n300,,0.1\n310,,0.1\n320,0.5,0.1\n330,?,0.25\n" +
		"340,0.5,?\n350,0.5,?\n360,0.5,0.1\n370,0.5,?\n380,0.5,?\n6000,,0.9\n"
	if got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

// A gap in which no column has a wavelength gets a row of its own.
func TestWriteCSVRowForAGap(t *testing.T) {
	c := constant(300, 400, 10, 0.5)
	c.NM, c.Value = slices.Delete(c.NM, 4, 6), slices.Delete(c.Value, 4, 6)
	c.Gaps = []Span{{330, 360}, {360, math.Nextafter(360, 370)}} // the second holds no wavelength
	text, err := written(Columns{Tau: c})
	if err != nil || !strings.Contains(text, "\n330,0.5\n345,?\n360,0.5\n370,0.5\n") {
		t.Errorf("%v\n%s", err, text)
	}
}

// constant returns a column of one value from first to last nm.
func constant(first, last, step, value float64) (c Column) {
	for nm := first; nm <= last; nm += step {
		c.NM, c.Value = append(c.NM, nm), append(c.Value, value)
	}
	return c
}

func TestWriteCSVRefuses(t *testing.T) {
	nan := constant(300, 400, 10, 0.5)
	nan.Value[3] = math.NaN()
	holed := constant(300, 5300, 1, 0.5)
	for i := range maxGaps + 1 {
		holed.Gaps = append(holed.Gaps, Span{float64(300 + 2*i), float64(301 + 2*i)})
	}
	for _, tt := range []struct {
		name string
		c    Columns
		want string
	}{
		{"holes everywhere", Columns{RhoFront: holed}, "rho_front lacks values in 1001 places"},
		{"nothing", Columns{}, "no column"},
		{"too little", Columns{Tau: constant(300, 350, 10, 0.5)}, "6 rows"},
		{"not a number", Columns{Tau: nan}, "tau at 330 nm is not a finite number"},
		{"far below", Columns{Tau: constant(1, 20, 1, 0.5)}, "the last wavelength is 20 nm"},
		{"a value would have to be made up", Columns{Tau: constant(300, 400, 10, 0.5), RhoBack: constant(300, 400, 20, 0.1)}, "rho_back has no value at 310 nm"},
	} {
		if text, err := written(tt.c); err == nil || !strings.Contains(err.Error(), tt.want) || text != "" {
			t.Errorf("%s: got %v and %q, want %q and nothing", tt.name, err, text, tt.want)
		}
	}
}

func TestOnOneGrid(t *testing.T) {
	tau := constant(300, 2500, 50, 0)
	for i, nm := range tau.NM {
		tau.Value[i] = nm / 5000
	}
	far := constant(5000, 50000, 5000, 0.8)
	front := constant(280, 2000, 20, 0.1)
	front.NM, front.Value = append(front.NM, far.NM...), append(front.Value, far.Value...)
	front.Gaps = []Span{{400, 420}}
	back := constant(5000, 50000, 1000, 0.9)
	c := Columns{Tau: tau, RhoFront: front, RhoBack: back}
	one, notes := c.OnOneGrid()

	// The straight line of tau, by hand: 0.2·nm/1000 at any wavelength from 300 to 2500 nm.
	for i, nm := range one.Tau.NM {
		if nm < 300 || nm > 2500 || math.Abs(one.Tau.Value[i]-nm/5000) > 1e-15 {
			t.Errorf("tau at %g nm is %v", nm, one.Tau.Value[i])
		}
	}
	// 45 points by 50 nm; those of rho_front by 20 nm from 320 to 2000 are 85, of which those at
	// multiples of 100, 18 from 300, stand in both but for 300 itself; and one inside the gap.
	if n := one.Tau.Len(); n != 45+85-17+1 {
		t.Errorf("tau has %d points", n)
	}
	for i, nm := range one.RhoFront.NM {
		switch {
		case nm > 400 && nm < 420:
			t.Errorf("rho_front has a value in its gap, at %g nm", nm)
		case nm > 2000 && nm < 5000:
			t.Errorf("rho_front has a value at %g nm, between the solar range and the infrared", nm)
		case nm < 5000 && math.Abs(one.RhoFront.Value[i]-0.1) > 1e-15, nm >= 5000 && math.Abs(one.RhoFront.Value[i]-0.8) > 1e-15:
			t.Errorf("rho_front at %g nm is %v", nm, one.RhoFront.Value[i])
		}
	}
	if !sameBits(one.RhoBack.Curve, back.Curve) {
		t.Error("rho_back has all that it needs and was changed")
	}
	if len(notes) != 2 || !strings.HasPrefix(notes[0], "tau: 69 of 114 values") || !strings.Contains(notes[0], "50 nm") || !strings.HasPrefix(notes[1], "rho_front: ") {
		t.Errorf("notes %q", notes)
	}
	text, err := written(one)
	if err != nil {
		t.Fatal(err)
	}
	again, err := ReadCSV(strings.NewReader(text), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	if !sameColumns(one, again) {
		t.Error("what was put on one grid is not read back")
	}
}

// Points added on the line between two points change no value of the curve.
func TestOnOneGridKeepsTheCurve(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		draw := func(name string) (c Column) {
			nm := rapid.Float64Range(200, 400).Draw(t, name+" begins")
			for range rapid.IntRange(2, 30).Draw(t, name+" has") {
				c.NM = append(c.NM, nm)
				c.Value = append(c.Value, rapid.Float64Range(0, 1).Draw(t, "value"))
				nm += rapid.Float64Range(0.1, 70).Draw(t, "step")
			}
			return c
		}
		c := Columns{Tau: draw("tau"), RhoFront: draw("rho_front")}
		one, _ := c.OnOneGrid()
		for range 20 {
			nm := rapid.Float64Range(200, 2500).Draw(t, "nm")
			if a, b := c.Tau.At(nm), one.Tau.At(nm); math.Abs(a-b) > 1e-12 {
				t.Fatalf("tau at %v nm: %v, was %v", nm, b, a)
			}
		}
		if first := one.Tau.First(); first != c.Tau.First() || one.Tau.Last() != c.Tau.Last() {
			t.Fatal("tau has other ends")
		}
		if _, err := written(one); err != nil && len(unionOf(one.named())) >= minimumRows {
			t.Fatal(err)
		}
	})
}

func TestWithInfrared(t *testing.T) {
	c := Columns{Tau: constant(300, 2500, 50, 0.5), RhoFront: constant(300, 6000, 50, 0.1), RhoBack: constant(300, 2500, 50, 0.2)}
	front := constant(4000, 30000, 500, 0.9)
	got := c.WithInfrared(front, Column{})
	want := constant(300, 4950, 50, 0.1)
	far := constant(5000, 30000, 500, 0.9)
	want.NM, want.Value = append(want.NM, far.NM...), append(want.Value, far.Value...)
	if !sameBits(got.RhoFront.Curve, want.Curve) || !sameBits(got.RhoBack.Curve, c.RhoBack.Curve) {
		t.Errorf("got %v", got.RhoFront.Curve)
	}
	m, err := Join(c.lined(), front.lined(), Column{})
	if err != nil {
		t.Fatal(err)
	}
	joined, err := Join(got.lined(), Column{}, Column{})
	if err != nil {
		t.Fatal(err)
	}
	if !sameBits(m.InfraredFront, joined.InfraredFront) || !sameBits(m.RhoFront, joined.RhoFront) {
		t.Error("Join sees another reflectance in a single file than in two")
	}
}

// lined gives columns that no file stands behind a line for each point.
func (c Columns) lined() Columns {
	return Columns{Tau: c.Tau.lined(), RhoFront: c.RhoFront.lined(), RhoBack: c.RhoBack.lined()}
}

func (c Column) lined() Column {
	c.Line = make([]int, c.Len())
	return c
}

func ExampleWriteCSV() {
	nm := []float64{380, 430, 480, 530, 580, 630, 680, 730, 760, 780}
	tau := []float64{0.41, 0.52, 0.6, 0.63, 0.64, 0.61, 0.58, 0.55, 0.5, 0.48}
	var s strings.Builder
	err := WriteCSV(&s, Columns{Tau: Column{Curve: Curve{NM: nm, Value: tau}}}, []string{"invented"})
	fmt.Println(strings.Join(strings.Split(s.String(), "\n")[:4], "\n"), err)
	// Output:
	// # invented
	// wavelength_nm,tau
	// 380,0.41
	// 430,0.52 <nil>
}
