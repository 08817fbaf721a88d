package draw

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"panewright/glazing"
)

// smooth returns curves of random height, some with gaps, some that run close to each other.
func smooth(r *rand.Rand, n int) (curves []Curve) {
	for i := range n {
		a, b, c := r.Float64(), r.Float64(), 500+500*r.Float64()
		if i > 0 && r.IntN(3) == 0 {
			a, b, c = 0.3, 0.2, 700
		}
		v := Curve{Name: Escape(long64[:1+r.IntN(64)]), NM: plotNM()}
		from, to := 0, 0
		if r.IntN(3) == 0 {
			from = r.IntN(len(v.NM))
			to = from + r.IntN(200)
		}
		for k, nm := range v.NM {
			y := a*math.Exp(-math.Pow((nm-c)/400, 2)) + b*math.Pow(math.Sin(nm/900), 2)/2
			if k >= from && k < to {
				y = math.NaN()
			}
			v.Value = append(v.Value, y)
		}
		curves = append(curves, v)
	}
	return curves
}

// axes returns how the labels of a plot place wavelengths and fractions.
func axes(t *testing.T, c *Canvas) (x, y func(float64) float64) {
	t.Helper()
	at := map[string]Point{}
	for _, o := range c.ops {
		if o.kind == textOp && o.text.Size == axisType.Size {
			at[o.runs[0].s] = o.points[0]
		}
	}
	left, right, low, high := at["500"], at["2500"], at["0.0"], at["1.0"]
	if left.X >= right.X || low.Y <= high.Y {
		t.Fatalf("axes run from %v to %v and from %v to %v", left, right, low, high)
	}
	half := axisType.CapHeight() / 2
	return func(nm float64) float64 { return left.X + (nm-500)/2000*(right.X-left.X) },
		func(v float64) float64 { return low.Y - half - v*(low.Y-high.Y) }
}

// Curves stand in the SVG where the labels of the axes say: every value of a make-up lies on them, to
// a hundredth of a millimetre.
func TestPlotPlacesValues(t *testing.T) {
	r := ratingsOf(t, gallery(t)["double"])[0]
	s := r.Ready.Spectra(0, plotNM())
	c := New(200, 100)
	Plot(c, Rect{10, 10, 170, 70}, MakeupCurves(&r))
	svg, err := SVG(c, "", "")
	if err != nil {
		t.Fatal(err)
	}
	x, y := axes(t, c)
	for _, tt := range []struct {
		name   string
		colour Colour
		values []float64
	}{{"τ", Ink, s.T}, {"ρ", Accent, s.RhoOutside}, {"ρ′", Soft, s.RhoInside}} {
		var curve []Point
		for _, line := range paths(t, svg, map[string]string{"stroke": hexOf(tt.colour), "stroke-width": "0.42"}) {
			if len(line) > 2 {
				curve = line
			}
		}
		if curve == nil {
			t.Fatalf("there is no curve of %s", tt.name)
		}
		for i, nm := range s.WavelengthNM {
			px, py := x(nm), y(tt.values[i])
			nearest := math.Inf(1)
			for k := 1; k < len(curve); k++ {
				nearest = min(nearest, fromSegment(Point{px, py}, curve[k-1], curve[k]))
			}
			if nearest > 0.015 {
				t.Errorf("%s at %g nm lies %g mm off its curve", tt.name, nm, nearest)
			}
		}
		if d := math.Abs(curve[0].X - x(300)); d > 0.01 {
			t.Errorf("%s begins %g mm off 300 nm", tt.name, d)
		}
	}
}

// fromSegment returns the distance of a point from a line between two others.
func fromSegment(p, a, b Point) float64 {
	dx, dy := b.X-a.X, b.Y-a.Y
	share := 0.0
	if l := dx*dx + dy*dy; l > 0 {
		share = min(max(((p.X-a.X)*dx+(p.Y-a.Y)*dy)/l, 0), 1)
	}
	return math.Hypot(p.X-a.X-share*dx, p.Y-a.Y-share*dy)
}

// A gap in a curve is a gap in the drawing; a value alone is a dot.
func TestPlotLeavesGaps(t *testing.T) {
	nan := math.NaN()
	v := Curve{Name: "a", NM: []float64{300, 400, 500, 600, 700, 800, 900, 1000}, Value: []float64{0.1, 0.2, nan, 0.3, nan, 0.5, 0.4, nan}}
	c := New(200, 100)
	Plot(c, Rect{10, 10, 170, 70}, []Curve{v})
	x, _ := axes(t, c)
	var lines [][]Point
	dots := 0
	for _, o := range c.ops {
		switch {
		case o.kind == shapeOp && o.stroke.Width == curveWide && len(o.points) == 2 && o.points[0].Y != o.points[1].Y:
			lines = append(lines, o.points)
		case o.kind == circleOp:
			dots++
			if math.Abs(o.points[0].X-x(600)) > 0.01 {
				t.Errorf("the dot stands at %g", o.points[0].X)
			}
		}
	}
	if len(lines) != 2 || dots != 1 {
		t.Fatalf("there are %d pieces and %d dots, want 2 and 1", len(lines), dots)
	}
	for i, want := range [][2]float64{{300, 400}, {800, 900}} {
		if math.Abs(lines[i][0].X-x(want[0])) > 0.01 || math.Abs(lines[i][1].X-x(want[1])) > 0.01 {
			t.Errorf("piece %d runs from %g to %g", i+1, lines[i][0].X, lines[i][1].X)
		}
	}
	v.Value = []float64{nan, nan, nan, nan, nan, nan, nan, nan}
	c = New(200, 100)
	Plot(c, Rect{10, 10, 170, 70}, []Curve{v, v})
	if said := strings.Join(texts(c), " "); !strings.Contains(said, "a (not known)") || c.Err() != nil {
		t.Errorf("it says %s (%v)", said, c.Err())
	}
}

// No label of a plot lies on another or outside its rectangle, the legend stands off the curves, and
// each curve bears a tag of its own.
func TestPlotLabels(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	for n := range MaxCurves + 1 {
		for _, width := range []float64{60, 80, 110, 170} {
			curves := smooth(r, n)
			at := Rect{10, 10, width, PlotHeight(curves, width, 30+40*r.Float64())}
			c := New(300, 500)
			Plot(c, at, curves)
			if c.Err() != nil {
				t.Fatal(c.Err())
			}
			name := fmt.Sprintf("%d curves, %g mm", n, width)
			labelsApart(t, name, c, at)
			p := planPlot(at, curves)
			if p.frame.W < 25 || p.frame.H < frameLeast-1e-6 {
				t.Errorf("%s: the frame is %v", name, p.frame)
			}
			tags := map[string]int{}
			for _, o := range c.ops {
				if o.kind != textOp {
					continue
				}
				if o.text.Size == legendType.Size && o.bounds().Overlaps(p.frame) {
					t.Errorf("%s: the legend's %q lies in the frame", name, o.runs[0].s)
				}
				if o.text.Size == tagType.Size && o.text.Face == Semibold && p.frame.Holds(o.bounds(), 0.5) {
					tags[o.runs[0].s]++
				}
			}
			if n > 1 && len(tags) != n {
				t.Errorf("%s: tags %v", name, tags)
			}
		}
	}
	c := New(300, 300)
	Plot(c, Rect{10, 10, 170, 70}, smooth(r, MaxCurves+1))
	if c.Err() == nil {
		t.Error("more curves than can be told apart are drawn")
	}
}

// Strokes of neighbouring curves differ in their dashes as well as in their colour, and in grey.
func TestStrokesDiffer(t *testing.T) {
	for n := 2; n <= MaxCurves; n++ {
		list := strokes(n)
		for i := 1; i < n; i++ {
			if fmt.Sprint(list[i].Dash) == fmt.Sprint(list[i-1].Dash) || list[i].Colour.lightness() >= list[i-1].Colour.lightness() {
				t.Errorf("curves %d and %d of %d are drawn %v and %v", i, i+1, n, list[i-1], list[i])
			}
		}
	}
	r := ratingsOf(t, gallery(t)["double"])[0]
	seen := map[string]bool{}
	for _, v := range MakeupCurves(&r) {
		seen[fmt.Sprint(v.Stroke.Dash)] = true
	}
	if len(seen) != 3 {
		t.Error("the curves of a make-up share dashes")
	}
}

func TestPlotPictureAndText(t *testing.T) {
	ratings := ratingsOf(t, gallery(t)["switch"])
	var list []*glazing.Rating
	for i := range ratings {
		list = append(list, &ratings[i])
	}
	curves := TintCurves(list)
	c := PlotPicture(curves, Heading{Title: long64 + long64, About: "about", Foot: strings.Repeat("foot ", 60)})
	labelsApart(t, "picture", c, Rect{0, 0, c.W, c.H})
	if _, err := SVG(c, "", ""); err != nil {
		t.Fatal(err)
	}
	text := PlotText([]Curve{{Name: "τ_{v} of a\\_b", NM: []float64{300, 1000}, Value: []float64{0, 0.7}}})
	if want := "Curves from 300 to 2500 nm. τv of a_b: 0.100 at 400 nm, 0.250 at 550 nm, 0.400 at 700 nm, 0.700 at 1000 nm, not known at 2000 nm."; text != want {
		t.Errorf("it says\n%s\nwant\n%s", text, want)
	}
}
