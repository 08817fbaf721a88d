package table

import (
	"bytes"
	"fmt"
	"math"
	"strings"
	"testing"
	"unicode"

	"panewright/spectra"
)

// straight returns a line from one point to another, by a step in nm.
func straight(first, last, step, from, to float64) (c spectra.Curve) {
	for nm := first; nm <= last; nm += step {
		c.NM = append(c.NM, nm)
		c.Value = append(c.Value, from+(to-from)*(nm-first)/(last-first))
	}
	return c
}

// plotted returns the lines of a plot, checked for what holds of any.
func plotted(t *testing.T, curves ...PlotCurve) []string {
	t.Helper()
	var b bytes.Buffer
	Plot(&b, curves)
	lines := strings.Split(strings.TrimSuffix(b.String(), "\n"), "\n")
	for _, line := range lines {
		if n := len([]rune(line)); n > Width {
			t.Errorf("%d columns: %q", n, line)
		}
		if strings.ContainsFunc(line, unicode.IsControl) || strings.TrimRight(line, " ") != line {
			t.Errorf("%q has control characters or ends in blanks", line)
		}
	}
	return lines
}

// rowOf returns the cells of the row of a plot that is labelled with a value.
func rowOf(t *testing.T, lines []string, label string) string {
	t.Helper()
	for _, line := range lines {
		if cells, ok := strings.CutPrefix(line, label+" +"); ok {
			return cells
		}
	}
	t.Fatalf("no row %s in\n%s", label, strings.Join(lines, "\n"))
	return ""
}

func TestPlotOfConstants(t *testing.T) {
	lines := plotted(t, PlotCurve{"upper", 'u', straight(300, 2500, 10, 0.8, 0.8)}, PlotCurve{"lower", 'l', straight(300, 1400, 10, 0.2, 0.2)})
	if got, want := rowOf(t, lines, "0.8"), strings.Repeat("u", 75); got != want {
		t.Errorf("0.8 is drawn as %q", got)
	}
	// 1400 nm is half the range: column 37 of 0 to 74
	if got, want := rowOf(t, lines, "0.2"), strings.Repeat("l", 38); got != want {
		t.Errorf("0.2 is drawn as %q", got)
	}
	for _, label := range []string{"1.0", "0.6", "0.4", "0.0"} {
		if got := rowOf(t, lines[:len(lines)-3], label); got != "" {
			t.Errorf("%s is drawn as %q", label, got)
		}
	}
	// 21 rows, axis, its labels, legend; 400 nm lies 100/2200 of 74 columns from the first: 3
	if len(lines) != 24 || !strings.HasPrefix(lines[21], "    +---+---") || !strings.HasPrefix(lines[22], " nm    400    600") || lines[23] != "     u upper   l lower   # where curves meet" {
		t.Errorf("%d lines\n%s", len(lines), strings.Join(lines, "\n"))
	}
}

// Where curves of two marks meet stands #, in whatever order they come; curves of one mark do not
// meet.
func TestPlotWhereCurvesMeet(t *testing.T) {
	up, down := straight(400, 700, 1, 0, 1), straight(400, 700, 1, 1, 0)
	a := plotted(t, PlotCurve{"up", 'u', up}, PlotCurve{"down", 'd', down})
	b := plotted(t, PlotCurve{"down", 'd', down}, PlotCurve{"up", 'u', up})
	if x, y := strings.Join(a[:21], "\n"), strings.Join(b[:21], "\n"); x != y || strings.Count(x, "#") == 0 || strings.Count(x, "#") > 9 {
		t.Errorf("\n%s\nand\n%s", x, y)
	}
	// The row of 0.5 takes 0.475 to 0.525, 7.5 nm on either side of 550 nm in the middle of column 37.
	// A column is 300/74 nm wide: those whose middle lies within 9.5 nm have such values, 35 to 39.
	if row := a[10]; row != "    |"+strings.Repeat(" ", 35)+"#####" {
		t.Errorf("the row of 0.5 is %q", row)
	}
	if got := strings.Join(plotted(t, PlotCurve{"one", 'x', up}, PlotCurve{"same", 'x', up})[:21], ""); strings.Contains(got, "#") {
		t.Errorf("one mark meets itself: %s", got)
	}
}

// A column shows all that the curve has there, and a gap shows nothing.
func TestPlotPeaksAndGaps(t *testing.T) {
	c := straight(300, 1040, 1, 0.2, 0.2) // 10 nm a column
	c.Value[203] = 0.8                    // 503 nm, in the column of 500 nm
	lines := plotted(t, PlotCurve{"peak", 'p', c})
	if got := rowOf(t, lines, "0.8"); got != strings.Repeat(" ", 20)+"p" {
		t.Errorf("the peak is drawn as %q", got)
	}
	gap := straight(300, 1040, 1, 0.2, 0.2)
	gap.NM, gap.Value = append(gap.NM[:101:101], gap.NM[301:]...), append(gap.Value[:101:101], gap.Value[301:]...)
	gap.Gaps = []spectra.Span{{FromNM: 400, ToNM: 601}}
	if got, want := rowOf(t, plotted(t, PlotCurve{"gap", 'g', gap}), "0.2"), strings.Repeat("g", 11)+strings.Repeat(" ", 19)+strings.Repeat("g", 45); got != want {
		t.Errorf("the gap is drawn as\n%q, want\n%q", got, want)
	}
}

func TestPlotOfInfrared(t *testing.T) {
	c := straight(300, 2500, 10, 0.5, 0.5)
	far := straight(5000, 50000, 1000, 0.9, 0.9)
	c.NM, c.Value = append(c.NM, far.NM...), append(c.Value, far.Value...)
	lines := plotted(t, PlotCurve{"both", 'b', c}, PlotCurve{"near", 'n', straight(300, 2500, 10, 0.1, 0.1)})
	text := strings.Join(lines, "\n")
	if len(lines) != 23+1+13+1 || !strings.Contains(text, " µm") || strings.Count(text, "1.0 +") != 2 || strings.Count(text, "both") != 1 {
		t.Errorf("%d lines\n%s", len(lines), text)
	}
	if got := lines[25]; got != "    |"+strings.Repeat("b", 75) { // the row of 0.9 of the second plot
		t.Errorf("%q", got)
	}
	if got := plotted(t, PlotCurve{"far", 'f', far}); len(got) != 14 || !strings.HasPrefix(got[12], " µm") {
		t.Errorf("infrared alone has %d lines\n%s", len(got), strings.Join(got, "\n"))
	}
}

// Whatever the curves, the plot keeps its width and comes to an end.
func TestPlotOfAnything(t *testing.T) {
	if got := plotted(t); len(got) != 1 || got[0] != "" {
		t.Errorf("no curve is drawn as %q", got)
	}
	if got := plotted(t, PlotCurve{"empty", 'e', spectra.Curve{}}); len(got) != 1 || got[0] != "" {
		t.Errorf("an empty curve is drawn as %q", got)
	}
	point := spectra.Curve{NM: []float64{550}, Value: []float64{0.4}}
	if got := strings.TrimSpace(rowOf(t, plotted(t, PlotCurve{"point", 'p', point}), "0.4")); got != "p" {
		t.Errorf("a point is drawn as %q", got)
	}
	wild := spectra.Curve{NM: []float64{1e-3, 1, 2499, 1e9, 1e300}, Value: []float64{-5, 7, math.NaN(), 0.5, math.Inf(1)}}
	plotted(t, PlotCurve{"wild", 'w', wild})
	for _, last := range []float64{301, 302.5, 340, 777, 1100, 2500} {
		lines := plotted(t, PlotCurve{strings.Repeat("a long name ", 12), 'x', straight(300, last, 0.5, 0, 1)})
		labels := strings.Fields(lines[22])
		if len(labels) < 4 || len(labels) > 14 {
			t.Errorf("to %g nm: labels %q", last, lines[22])
		}
	}
	many := make([]PlotCurve, 20)
	for i := range many {
		many[i] = PlotCurve{fmt.Sprintf("curve number %d", i), rune('a' + i), straight(300, 2500, 7, float64(i)/20, 0.5)}
	}
	plotted(t, many...)
}
