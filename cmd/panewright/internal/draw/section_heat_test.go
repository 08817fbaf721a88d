package draw

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/glazing"
)

// invented conditions: a cold night and a hot noon.
var (
	coldNight = glazing.Condition{ID: "cold-night", OutsideC: -12, InsideC: 20, WindMS: glazing.Value{Number: 4, Known: true}}
	hotNoon   = glazing.Condition{ID: "hot-noon", OutsideC: 34, InsideC: 25.5, WindMS: glazing.Value{Number: 2, Known: true}, SunWM2: 750}
)

// ratingsUnder rates a make-up under EN and conditions.
func ratingsUnder(t testing.TB, m *glazing.Makeup, conditions ...glazing.Condition) (list []*glazing.Rating) {
	t.Helper()
	ready, err := glazing.NewMethod(glazing.EN, glazing.Options{Conditions: conditions}).Ready(m)
	if err != nil {
		t.Fatalf("%s: %v", m.ID, err)
	}
	ratings, err := ready.RateAll()
	if err != nil {
		t.Fatalf("%s: %v", m.ID, err)
	}
	for i := range ratings {
		list = append(list, &ratings[i])
	}
	return list
}

// evacuated returns a gap without gas.
func evacuated() glazing.Gap {
	return glazing.Gap{WidthMM: 0.2, Vacuum: &glazing.Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20}}
}

// heated returns the gallery with vacuum gaps and a foil that passes infrared.
func heated(t testing.TB) map[string]*glazing.Makeup {
	all := gallery(t)
	all["vacuum"] = &glazing.Makeup{ID: "vacuum", Panes: []glazing.Placed{{Pane: lib("invented-low-e-4", "")}, {Pane: lib("soda-lime-4", "")}}, Gaps: []glazing.Gap{evacuated()}}
	hybrid := *all["double"]
	hybrid.ID, hybrid.Panes = "hybrid", append(slices.Clone(hybrid.Panes), glazing.Placed{Pane: lib("soda-lime-4", "")})
	hybrid.Gaps = append(slices.Clone(hybrid.Gaps), evacuated())
	all["hybrid"] = &hybrid
	steep := *all["sloped"]
	steep.ID, steep.Tilt = "steep", glazing.TiltDeg(80)
	all["steep"] = &steep
	return all
}

// drawnSection draws a section with the temperatures of conditions.
func drawnSection(t *testing.T, r *glazing.Rating, width, glass float64, ids ...string) (c *Canvas, at Rect) {
	t.Helper()
	temperatures := TemperaturesOf([]*glazing.Rating{r}, ids)
	c = New(300, 300)
	at = Rect{20, 20, width, SectionHeight(r, temperatures, width, glass)}
	Section(c, at, r, temperatures)
	if c.Err() != nil {
		t.Fatalf("%s: %v", r.Makeup.ID, c.Err())
	}
	return c, at
}

// heatLines returns the lines of temperatures of a canvas.
func heatLines(c *Canvas) (list []*op) {
	for i := range c.ops {
		if o := &c.ops[i]; o.kind == shapeOp && len(o.points) > 2 && o.stroke.Width == heatStrokes[0].Width && !o.closed {
			list = append(list, o)
		}
	}
	return list
}

// readScale reads the scale of a section as a person does, from its lines and their labels: it returns
// what turns a height on paper into °C.
func readScale(t *testing.T, c *Canvas) func(y float64) float64 {
	t.Helper()
	var y, celsius []float64
	for _, o := range c.ops {
		switch {
		case o.kind == shapeOp && len(o.points) == 2 && o.stroke.Width == 0.12 && o.points[0].Y == o.points[1].Y && math.Abs(o.points[1].X-o.points[0].X) > 40:
			y = append(y, o.points[0].Y)
		case o.kind == textOp && o.text.Size == scaleType.Size && o.text.Colour == Soft:
			if v, err := strconv.ParseFloat(strings.Replace(o.runs[0].s, "−", "-", 1), 64); err == nil {
				celsius = append(celsius, v)
			}
		}
	}
	if len(y) != len(celsius) || len(y) < 2 {
		t.Fatalf("a scale of %d lines and %d labels", len(y), len(celsius))
	}
	n := len(y) - 1
	return func(at float64) float64 { return celsius[0] + (celsius[n]-celsius[0])*(at-y[0])/(y[n]-y[0]) }
}

// Read off the drawing with its own scale, the lines have the temperatures of the balance at every
// surface, and end in those of the air.
func TestSectionTemperatures(t *testing.T) {
	check := func(name string, m *glazing.Makeup, width, glass float64, conditions ...glazing.Condition) {
		for _, r := range ratingsUnder(t, m, conditions...) {
			ids := []string{conditions[0].ID, conditions[1].ID}
			c, _ := drawnSection(t, r, width, glass, ids...)
			celsius := readScale(t, c)
			lines := heatLines(c)
			if len(lines) != 2 {
				t.Fatalf("%s: %d lines", name, len(lines))
			}
			svg, err := SVG(c, "", "")
			if err != nil {
				t.Fatal(err)
			}
			var faces []float64
			for _, line := range paths(t, svg, map[string]string{"stroke": hexOf(Ink), "stroke-width": "0.24"}) {
				faces = append(faces, line[0].X)
			}
			slices.Sort(faces)
			for i, o := range lines {
				b := r.Balance(conditions[i].ID)
				first, last := o.points[0], o.points[len(o.points)-1]
				if got := celsius(first.Y); math.Abs(got-conditions[i].OutsideC) > 0.001 {
					t.Errorf("%s: %s begins at %g °C, want %g", name, conditions[i].ID, got, conditions[i].OutsideC)
				}
				if got := celsius(last.Y); math.Abs(got-conditions[i].InsideC) > 0.001 {
					t.Errorf("%s: %s ends at %g °C, want %g", name, conditions[i].ID, got, conditions[i].InsideC)
				}
				for k, x := range faces {
					at := slices.IndexFunc(o.points, func(p Point) bool { return math.Abs(p.X-x) < 0.002 })
					if at < 0 {
						t.Errorf("%s: the line has no point on surface %d", name, k+1)
						continue
					}
					if got, want := celsius(o.points[at].Y), b.Lit.SurfaceK[k]-273.15; math.Abs(got-want) > 0.001 {
						t.Errorf("%s: %s is at %g °C on surface %d, want %g", name, conditions[i].ID, got, k+1, want)
					}
				}
				for k := 1; k < len(o.points); k++ {
					if o.points[k].X < o.points[k-1].X {
						t.Errorf("%s: the line turns back at %v", name, o.points[k])
					}
				}
			}
		}
	}
	for name, m := range heated(t) {
		check(name, m, 76, 33, coldNight, hotNoon)
		check(name, m, 140, 58, coldNight, hotNoon)
	}
	r := rand.New(rand.NewPCG(9, 10))
	for i := range 40 {
		check(fmt.Sprintf("random %d", i), random(t, r), 60+100*r.Float64(), 60*r.Float64(), randomConditions(r)...)
	}
}

// randomConditions are two, the colder first.
func randomConditions(r *rand.Rand) (list []glazing.Condition) {
	ids := []string{"winter-1", "a", "Ткацкий-зал", "north-elevation-at-noon-in-september-with-blinds-open", long64, "_"}
	for i := range 2 {
		c := glazing.Condition{ID: ids[r.IntN(len(ids)/2)+i*len(ids)/2], OutsideC: math.Round(-40 + 80*r.Float64()), InsideC: 15 + math.Round(150*r.Float64())/10}
		if r.IntN(3) > 0 {
			c.SunWM2 = math.Round(900 * r.Float64())
		}
		list = append(list, c)
	}
	if r.IntN(4) == 0 {
		list[1].OutsideC = list[0].OutsideC
	}
	slices.SortStableFunc(list, func(a, b glazing.Condition) int { return int(a.OutsideC - b.OutsideC) })
	return list
}

// The figures above the glass are those of the list, one below the other, each row after the stroke of
// its line; the air of both sides stands beside them.
func TestSectionFigures(t *testing.T) {
	for name, m := range heated(t) {
		r := ratingsUnder(t, m, coldNight, hotNoon)[0]
		c, at := drawnSection(t, r, 90, 0, coldNight.ID, hotNoon.ID)
		for i, condition := range []glazing.Condition{coldNight, hotNoon} {
			want := []string{minus(millimetres(condition.OutsideC))}
			for _, f := range glazing.BalanceFigures() {
				if f.Key != "surface_temperatures_c.#" {
					continue
				}
				for k := range 2 * len(m.Panes) {
					want = append(want, minus(f.At(condition.ID).Print(r, k)))
				}
			}
			want = append(want, minus(millimetres(condition.InsideC)))
			var sample *op
			for k := range c.ops {
				o := &c.ops[k]
				if o.kind == shapeOp && len(o.points) == 2 && o.stroke.Width == heatStrokes[i].Width && o.points[0].X == at.X && len(o.stroke.Dash) == len(heatStrokes[i].Dash) && sample == nil {
					sample = o
				}
			}
			if sample == nil {
				t.Fatalf("%s: no stroke before the figures of %s", name, condition.ID)
			}
			rows := map[float64][]*op{} // by baseline
			var below []float64
			for k := range c.ops {
				if o := &c.ops[k]; o.kind == textOp && o.text.Size == surfaceType.Size && o.text.Colour == Ink {
					y := o.points[0].Y
					if rows[y] == nil && y > sample.points[0].Y {
						below = append(below, y)
					}
					rows[y] = append(rows[y], o)
				}
			}
			row := rows[slices.Min(below)]
			slices.SortFunc(row, func(a, b *op) int { return int(math.Copysign(1, inked(a).X-inked(b).X)) })
			var got []string
			for _, o := range row {
				got = append(got, o.runs[0].s)
			}
			if !slices.Equal(got, want) {
				t.Errorf("%s, %s: figures %q, want %q", name, condition.ID, got, want)
			}
		}
	}
}

// With temperatures too, no label lies outside the rectangle, on another, on a face, or on a line of
// temperatures.
func TestSectionTemperatureLabels(t *testing.T) {
	check := func(name string, m *glazing.Makeup, width, glass float64, conditions ...glazing.Condition) {
		var ids []string
		for _, c := range conditions {
			ids = append(ids, c.ID)
		}
		for _, r := range ratingsUnder(t, m, conditions...) {
			name := fmt.Sprintf("%s, %g × %g mm", name, width, glass)
			c, at := drawnSection(t, r, width, glass, ids...)
			labelsApart(t, name, c, at)
			labelsOffLines(t, name, c)
			for _, line := range heatLines(c) {
				for k := range len(line.points) - 1 {
					for i := range c.ops {
						if o := &c.ops[i]; o.kind == textOp && crosses(line.points[k], line.points[k+1], inked(o)) {
							t.Errorf("%s: a line runs through %q", name, o.runs[0].s)
						}
					}
				}
			}
			said := strings.ReplaceAll(strings.Join(texts(c), ""), " ", "")
			for _, id := range ids {
				if !strings.Contains(said, id+":outside") {
					t.Errorf("%s: it does not say what %s is", name, id)
				}
			}
		}
	}
	for name, m := range heated(t) {
		for _, width := range []float64{60, 76, 84, 120} {
			check(name, m, width, 0, coldNight, hotNoon)
			check(name, m, width, 50, coldNight, hotNoon)
			check(name, m, width, 40, hotNoon)
		}
	}
	r := rand.New(rand.NewPCG(11, 12))
	for i := range 150 {
		check(fmt.Sprintf("random %d", i), random(t, r), 60+100*r.Float64(), 60*r.Float64(), randomConditions(r)...)
	}
}

// crosses reports whether the line between two points enters a box.
func crosses(a, b Point, box Rect) bool {
	from, to := 0.0, 1.0
	for _, x := range [][4]float64{{a.X, b.X - a.X, box.X, box.Right()}, {a.Y, b.Y - a.Y, box.Y, box.Bottom()}} {
		start, step, low, high := x[0], x[1], x[2], x[3]
		if step == 0 {
			if start <= low || start >= high {
				return false
			}
			continue
		}
		enter, leave := (low-start)/step, (high-start)/step
		from, to = max(from, min(enter, leave)), min(to, max(enter, leave))
	}
	return from < to
}

// Lines differ without colour, and on dark glass there is paper around them.
func TestTemperatureLinesInGrey(t *testing.T) {
	r := ratingsUnder(t, gallery(t)["switch"], coldNight, hotNoon)
	c, _ := drawnSection(t, r[len(r)-1], 84, 40, coldNight.ID, hotNoon.ID)
	lines := heatLines(c)
	if len(lines) != 2 || (len(lines[0].stroke.Dash) == 0) == (len(lines[1].stroke.Dash) == 0) {
		t.Fatalf("%d lines", len(lines))
	}
	for _, line := range lines {
		cased := slices.ContainsFunc(c.ops, func(o op) bool {
			return o.kind == shapeOp && slices.Equal(o.points, line.points) && o.stroke.Colour == Paper && o.stroke.Width >= line.stroke.Width+0.5
		})
		if contrast := Paper.lightness() - line.stroke.Colour.lightness(); !cased || contrast < 0.7 {
			t.Errorf("a line in %v, cased in paper: %v", line.stroke.Colour, cased)
		}
	}
	if lit := lookOf(gallery(t)["switch"].Panes[0].Pane, 2); !lit.known || lit.fill.lightness() > 0.3 {
		t.Errorf("the glass is not dark: %v", lit)
	}
}

// By itself a section shows the coldest condition and the sunniest; one that is both, once; none
// without balances, and then it is drawn as if there were no conditions.
func TestConditionsShown(t *testing.T) {
	m := gallery(t)["double"]
	mild := glazing.Condition{ID: "mild", OutsideC: 10, InsideC: 20, SunWM2: 300}
	glare := glazing.Condition{ID: "glare", OutsideC: -20, InsideC: 20, SunWM2: 900}
	for _, x := range []struct {
		conditions []glazing.Condition
		want       []string
	}{
		{[]glazing.Condition{mild, hotNoon, coldNight}, []string{"cold-night", "hot-noon"}},
		{[]glazing.Condition{glare, mild}, []string{"glare"}},
		{[]glazing.Condition{mild}, []string{"mild"}},
		{nil, nil},
	} {
		r := ratingsUnder(t, m, x.conditions...)[0]
		if got := ColdAndHot(r); !slices.Equal(got, x.want) {
			t.Errorf("shown are %q, want %q", got, x.want)
		}
	}
	with, without := ratingsUnder(t, m, coldNight, hotNoon)[0], ratingsOf(t, m)[0]
	var svgs []string
	for _, r := range []*glazing.Rating{with, &without} {
		c := New(200, 100)
		Section(c, Rect{10, 10, 84, 70}, r, Temperatures{})
		svg, err := SVG(c, "", "")
		if err != nil {
			t.Fatal(err)
		}
		svgs = append(svgs, string(svg))
	}
	if svgs[0] != svgs[1] {
		t.Error("conditions that are not shown change the section")
	}
	// what is asked for is shown, the colder first
	if got := TemperaturesOf([]*glazing.Rating{with}, []string{"hot-noon", "none-such", "cold-night", "hot-noon"}).Conditions; !slices.Equal(got, []string{"cold-night", "hot-noon"}) {
		t.Errorf("shown are %q", got)
	}
}

// One scale serves all tints.
func TestTemperatureScaleOfTints(t *testing.T) {
	ratings := ratingsUnder(t, gallery(t)["switch"], coldNight, hotNoon)
	all := TemperaturesOf(ratings, ColdAndHot(ratings[0]))
	for _, r := range ratings {
		for i := range r.Balances {
			for k := range r.Surfaces {
				if v := r.Balances[i].SurfaceC(k).Number; v < all.FromC || v > all.ToC {
					t.Errorf("%s: surface %d has %g °C; the scale goes from %g to %g", r.Tint, k+1, v, all.FromC, all.ToC)
				}
			}
		}
	}
	if all.FromC > coldNight.OutsideC || all.ToC < hotNoon.OutsideC {
		t.Errorf("the scale goes from %g to %g", all.FromC, all.ToC)
	}
}

// Temperatures that are not known leave no line, and that is said.
func TestTemperaturesUnknown(t *testing.T) {
	p := lib("soda-lime-6", "")
	tint := p.Tints[0]
	n, _ := slices.BinarySearch(tint.Spectrum.Tau.NM, 1200)
	tint.Spectrum.Tau.NM, tint.Spectrum.Tau.Value = tint.Spectrum.Tau.NM[:n], tint.Spectrum.Tau.Value[:n]
	p.Tints = []glazing.Tint{tint}
	r := ratingsUnder(t, &glazing.Makeup{ID: "short", Panes: []glazing.Placed{{Pane: p}}}, coldNight, hotNoon)[0]
	c, at := drawnSection(t, r, 84, 0, coldNight.ID, hotNoon.ID)
	labelsApart(t, "short", c, at)
	if n := len(heatLines(c)); n != 1 {
		t.Errorf("%d lines, want that of the night alone", n)
	}
	if said := strings.Join(texts(c), " "); !strings.Contains(said, "Temperatures in hot-noon are not known") {
		t.Errorf("it says %s", said)
	}
}

// A vacuum is named, drawn wide enough to be seen, and has its pillars; the other gaps keep their gases.
func TestSectionOfVacuum(t *testing.T) {
	for _, name := range []string{"vacuum", "hybrid"} {
		m := heated(t)[name]
		for _, ids := range [][]string{nil, {coldNight.ID}} {
			r := ratingsUnder(t, m, coldNight)[0]
			c, _ := drawnSection(t, r, 84, 0, ids...)
			said := strings.Join(texts(c), " ")
			gap := len(m.Gaps)
			if want := fmt.Sprintf("Gap %d–%d: vacuum", 2*gap, 2*gap+1); !strings.Contains(said, want) {
				t.Errorf("%s does not say %q: %s", name, want, said)
			}
			if name == "hybrid" && !strings.Contains(said, "argon 90 %") {
				t.Errorf("%s does not name its gas: %s", name, said)
			}
			pillars := 0
			for _, o := range c.ops {
				if o.kind == shapeOp && o.closed && o.fill == Soft {
					if w := o.points[1].X - o.points[0].X; math.Abs(w-vacuumLeast) > 1e-9 {
						t.Errorf("%s: a pillar is %g mm wide on paper", name, w)
					}
					pillars++
				}
			}
			if pillars < 5 {
				t.Errorf("%s: %d pillars", name, pillars)
			}
		}
	}
	if got := gasOf(evacuated()); !slices.Equal(got, []string{"vacuum"}) {
		t.Errorf("a vacuum is called %q", got)
	}
}

// The words for those who cannot see it have the temperatures too.
func TestSectionTextOfTemperatures(t *testing.T) {
	r := ratingsUnder(t, gallery(t)["single"], coldNight)[0]
	got := strings.ReplaceAll(SectionText(r, TemperaturesOf([]*glazing.Rating{r}, []string{coldNight.ID})), "\u00a0", " ")
	b := r.Balance(coldNight.ID)
	want := fmt.Sprintf(" Temperatures in cold-night, outside −12 °C, inside 20 °C, no sun: surfaces 1 to 2 %s, %s °C.",
		minus(glazing.PrintRounded(b.SurfaceC(0).Number, 1)), minus(glazing.PrintRounded(b.SurfaceC(1).Number, 1)))
	if !strings.HasSuffix(got, want) {
		t.Errorf("it says\n%s\nwant at its end\n%s", got, want)
	}
}

// Pictures of all tints with temperatures hold what they draw.
func TestSectionPictureOfTemperatures(t *testing.T) {
	for name, m := range heated(t) {
		ratings := ratingsUnder(t, m, coldNight, hotNoon)
		for _, some := range [][]*glazing.Rating{ratings, ratings[:1]} {
			c := SectionPicture(some, ColdAndHot(some[0]), Heading{Title: m.ID, About: "invented", Foot: "foot"})
			if c.Err() != nil {
				t.Fatalf("%s: %v", name, c.Err())
			}
			labelsApart(t, name, c, Rect{0, 0, c.W, c.H})
			if n := len(heatLines(c)); n != 2*len(some) {
				t.Errorf("%s: %d lines in %d tints", name, n, len(some))
			}
		}
	}
}
