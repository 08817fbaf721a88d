package draw

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"math"
	"math/rand/v2"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/glazing"
)

// paths returns the corners of the paths of an SVG that have certain attributes.
func paths(t *testing.T, svg []byte, want map[string]string) (list [][]Point) {
	t.Helper()
	d := xml.NewDecoder(bytes.NewReader(svg))
	for {
		token, err := d.Token()
		if err != nil {
			return list
		}
		e, ok := token.(xml.StartElement)
		if !ok || e.Name.Local != "path" {
			continue
		}
		attributes := map[string]string{}
		for _, a := range e.Attr {
			attributes[a.Name.Local] = a.Value
		}
		fits := true
		for name, value := range want {
			fits = fits && attributes[name] == value
		}
		if !fits {
			continue
		}
		var numbers []float64
		for _, word := range strings.Fields(strings.Trim(attributes["d"], "Mz")) {
			v, err := strconv.ParseFloat(word, 64)
			if err != nil {
				t.Fatal(err)
			}
			numbers = append(numbers, v)
		}
		var points []Point
		for i := 0; i+1 < len(numbers); i += 2 {
			points = append(points, Point{numbers[i], numbers[i+1]})
		}
		list = append(list, points)
	}
}

// texts returns the texts of a canvas, a line each.
func texts(c *Canvas) (list []string) {
	for _, o := range c.ops {
		if o.kind == textOp {
			var b strings.Builder
			for _, r := range o.runs {
				b.WriteString(r.s)
			}
			list = append(list, strings.ReplaceAll(b.String(), "\u00a0", " "))
		}
	}
	return list
}

var scaleNote = regexp.MustCompile(`Scale (\d+) : (\d+) across`)

// The faces of panes stand in the SVG at distances that are their thicknesses and the widths of
// gaps, in the scale that the drawing names, but for parts that it says to be drawn otherwise.
func TestSectionToScale(t *testing.T) {
	face := map[string]string{"stroke": hexOf(Ink), "stroke-width": "0.24"}
	check := func(name string, m *glazing.Makeup, width float64) {
		r := ratingsOf(t, m)[0]
		c := New(300, 200)
		Section(c, Rect{20, 20, width, SectionHeight(&r, Temperatures{}, width, 0)}, &r, Temperatures{})
		svg, err := SVG(c, "", "")
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		said := strings.Join(texts(c), " ")
		match := scaleNote.FindStringSubmatch(said)
		if match == nil {
			t.Fatalf("%s names no scale: %s", name, said)
		}
		paper, _ := strconv.ParseFloat(match[1], 64)
		glass, _ := strconv.ParseFloat(match[2], 64)
		var x []float64
		for _, line := range paths(t, svg, face) {
			x = append(x, line[0].X)
		}
		var mm []float64
		for k, p := range m.Panes {
			mm = append(mm, p.Pane.ThicknessMM())
			if k < len(m.Gaps) {
				mm = append(mm, m.Gaps[k].WidthMM)
			}
		}
		if len(x) != 2*len(m.Panes) {
			t.Fatalf("%s has %d faces in the drawing", name, len(x))
		}
		slices.Sort(x)
		for i, want := range mm {
			want *= paper / glass
			got := x[i+1] - x[i]
			laminate := i%2 == 0 && len(m.Panes[i/2].Pane.Plies) > 1
			shortened := i%2 == 1 && strings.Contains(said, fmt.Sprintf("%d–%d", i+1, i+2)) && strings.Contains(said, "drawn shortened")
			switch {
			case math.Abs(got-want) < 0.0025:
			case got > want && got <= gapLeast+0.001 && strings.Contains(said, "thinner parts"):
			case laminate && got > want && got < want+0.8 && strings.Contains(said, "thinner parts"):
			case shortened && got < want && mm[i] > gapShortened:
			default:
				t.Errorf("%s, %g mm wide: part %d of %g mm is %g mm on paper, want %g", name, width, i+1, mm[i], got, want)
			}
		}
	}
	for name, m := range gallery(t) {
		check(name, m, 84)
		check(name, m, 150)
	}
	r := rand.New(rand.NewPCG(1, 2))
	for i := range 150 {
		check(fmt.Sprintf("random %d", i), random(t, r), 60+100*r.Float64())
	}
}

// A laminate shows its plies from outside, in reverse where it is turned.
func TestSectionOfLaminate(t *testing.T) {
	for _, tt := range []struct {
		turned bool
		want   []float64 // mm from its outer face
	}{{false, []float64{4, 5.52}}, {true, []float64{10, 11.52}}} {
		p := glazing.Placed{Pane: laminate("soda-lime-8", "lam", 4, 1.52, 10), Turned: tt.turned}
		r := ratingsOf(t, &glazing.Makeup{ID: "lam", Panes: []glazing.Placed{p}})[0]
		c := New(200, 100)
		Section(c, Rect{10, 10, 90, 60}, &r, Temperatures{}) // 15.52 mm at 4 : 1 fit into 66
		svg, err := SVG(c, "", "")
		if err != nil {
			t.Fatal(err)
		}
		face := paths(t, svg, map[string]string{"stroke": hexOf(Ink), "stroke-width": "0.24"})[0][0].X
		for i, line := range paths(t, svg, map[string]string{"stroke": hexOf(Ink), "stroke-width": "0.14"}) {
			if got := (line[0].X - face) / 4; math.Abs(got-tt.want[i]) > 0.001 {
				t.Errorf("turned %v: line %d at %g mm, want %g", tt.turned, i, got, tt.want[i])
			}
		}
	}
}

// No label of a section lies outside its rectangle, or on another.
func TestSectionLabels(t *testing.T) {
	check := func(name string, m *glazing.Makeup, width, glass float64) {
		for _, r := range ratingsOf(t, m) {
			c := New(300, 300)
			at := Rect{20, 20, width, SectionHeight(&r, Temperatures{}, width, glass)}
			Section(c, at, &r, Temperatures{})
			if c.Err() != nil {
				t.Fatalf("%s: %v", name, c.Err())
			}
			labelsApart(t, fmt.Sprintf("%s, %g × %g mm", name, width, glass), c, at)
			labelsOffLines(t, fmt.Sprintf("%s, %g × %g mm", name, width, glass), c)
		}
	}
	for name, m := range gallery(t) {
		for _, width := range []float64{60, 84, 120} {
			check(name, m, width, 0)
			check(name, m, width, 50)
		}
	}
	r := rand.New(rand.NewPCG(3, 4))
	for i := range 150 {
		check(fmt.Sprintf("random %d", i), random(t, r), 60+100*r.Float64(), 60*r.Float64())
	}
}

// labelsApart fails where texts of a canvas overlap or leave a rectangle.
func labelsApart(t *testing.T, name string, c *Canvas, at Rect) {
	t.Helper()
	var ops []*op
	for i := range c.ops {
		if c.ops[i].kind == textOp {
			ops = append(ops, &c.ops[i])
		}
	}
	for i, a := range ops {
		// the height of capitals is what meets the eye; ascenders and descenders may interlock
		box := inked(a)
		if !at.Holds(box, 0.05) {
			t.Errorf("%s: %q at %v leaves %v", name, a.runs[0].s, box, at)
		}
		for _, b := range ops[:i] {
			if box.Overlaps(inked(b)) {
				t.Errorf("%s: %q lies on %q", name, a.runs[0].s, b.runs[0].s)
			}
		}
	}
}

// labelsOffLines fails where a text lies on a face of a pane or on the mark of a film.
func labelsOffLines(t *testing.T, name string, c *Canvas) {
	t.Helper()
	for i := range c.ops {
		line := &c.ops[i]
		if line.kind != shapeOp || len(line.points) != 2 || (line.stroke.Colour != Ink && line.stroke.Colour != Accent) {
			continue
		}
		a, b := line.points[0], line.points[1]
		box := Rect{min(a.X, b.X) - 0.05, min(a.Y, b.Y) - 0.05, math.Abs(a.X-b.X) + 0.1, math.Abs(a.Y-b.Y) + 0.1}
		for k := range c.ops {
			if o := &c.ops[k]; o.kind == textOp && inked(o).Overlaps(box) {
				t.Errorf("%s: %q lies on a line from %v to %v", name, o.runs[0].s, a, b)
			}
		}
	}
}

// inked returns the rectangle of a text from its baseline to the height of capitals.
func inked(o *op) Rect {
	b := o.bounds()
	up, down := (ascender-0.66)*o.text.MM(), descender*o.text.MM()
	if o.text.Turn == 0 {
		return Rect{b.X, b.Y + up, b.W, b.H - up - down}
	}
	return Rect{b.X + up, b.Y, b.W - up - down, b.H}
}

// What stands in a gap stands between its faces, off the marks of films.
func TestSectionGasesInTheirGaps(t *testing.T) {
	check := func(name string, m *glazing.Makeup, width float64) {
		r := ratingsOf(t, m)[0]
		c := New(300, 300)
		Section(c, Rect{20, 20, width, SectionHeight(&r, Temperatures{}, width, 30)}, &r, Temperatures{})
		s := plan(&r, Rect{20, 20, width, SectionHeight(&r, Temperatures{}, width, 30)}, Temperatures{}, 0, true)
		for i := range c.ops {
			o := &c.ops[i]
			if o.kind != textOp || o.text.Size != gasType.Size {
				continue
			}
			inside := false
			for _, p := range s.parts {
				if p.gap {
					from, to := s.free(p)
					inside = inside || o.bounds().X > from-0.3 && o.bounds().Right() < to+0.3
				}
			}
			if b := o.bounds(); !inside || b.Y < s.body.Y || b.Bottom() > s.body.Bottom() {
				t.Errorf("%s: %q leaves its gap", name, o.runs[0].s)
			}
		}
		said := strings.Join(texts(c), " ")
		for _, g := range m.Gaps {
			for _, gas := range gasOf(g) {
				if !strings.Contains(said, strings.ReplaceAll(gas, "\u00a0", " ")) {
					t.Errorf("%s does not name %s", name, gas)
				}
			}
		}
	}
	for name, m := range gallery(t) {
		check(name, m, 84)
	}
	r := rand.New(rand.NewPCG(5, 6))
	for i := range 100 {
		check(fmt.Sprintf("random %d", i), random(t, r), 60+100*r.Float64())
	}
}

// Exactly the faces of low emissivity are marked, on the side that is not glass, and their numbers
// have the accent.
func TestSectionMarksFilms(t *testing.T) {
	for name, want := range map[string][]int{"single": nil, "double": {3}, "triple": {2, 5}, "laminate": {2}, "eight": {16}, "switch": {2, 3}} {
		r := ratingsOf(t, gallery(t)[name])[0]
		c := New(200, 100)
		Section(c, Rect{10, 10, 84, 60}, &r, Temperatures{})
		svg, err := SVG(c, "", "")
		if err != nil {
			t.Fatal(err)
		}
		var x []float64
		for _, line := range paths(t, svg, map[string]string{"stroke": hexOf(Ink), "stroke-width": "0.24"}) {
			x = append(x, line[0].X)
		}
		slices.Sort(x)
		var got []int
		for _, line := range paths(t, svg, map[string]string{"stroke": hexOf(Accent), "stroke-width": short(filmWide)}) {
			if line[0].Y == line[1].Y {
				continue // of the key
			}
			for i, face := range x {
				side := 1.0 // a face that looks outside has its film to the left
				if i%2 == 0 {
					side = -1
				}
				if d := side * (line[0].X - face); d > 0 && d <= filmWide {
					got = append(got, i+1)
				}
			}
		}
		slices.Sort(got)
		if !slices.Equal(got, want) {
			t.Errorf("%s: faces %v are marked, want %v", name, got, want)
		}
		var numbers []int
		for _, o := range c.ops {
			if o.kind == textOp && o.text.Colour == Accent {
				n, _ := strconv.Atoi(o.runs[0].s)
				numbers = append(numbers, n)
			}
		}
		if !slices.Equal(numbers, want) {
			t.Errorf("%s: numbers %v have the accent, want %v", name, numbers, want)
		}
		if key := strings.Contains(strings.Join(texts(c), " "), "face of low emissivity"); key != (want != nil) {
			t.Errorf("%s: the mark is explained: %v", name, key)
		}
	}
}

// Darker glass is darker on paper, and hatched closer, so that a grey printer shows it.
func TestGlassDarkens(t *testing.T) {
	last, spacing := 2.0, math.Inf(1)
	for _, mm := range []string{"2", "4", "6", "10", "19"} {
		look := lookOf(lib("soda-grey-"+mm, ""), 0)
		if !look.known || look.fill.lightness() >= last || look.hatchSpacing() >= spacing {
			t.Errorf("grey glass of %s mm is drawn with %v, lines %g mm apart", mm, look, look.hatchSpacing())
		}
		last, spacing = look.fill.lightness(), look.hatchSpacing()
		contrast := math.Abs(look.hatchColour().lightness() - look.fill.lightness())
		if contrast < 0.08 {
			t.Errorf("lines on grey glass of %s mm differ by %g from it", mm, contrast)
		}
	}
	// green glass is green, bronze glass red
	if c := lookOf(lib("soda-green-10", ""), 0).fill; c.G <= c.R || c.G < c.B {
		t.Errorf("green glass is drawn %v", c)
	}
	if c := lookOf(lib("soda-bronze-10", ""), 0).fill; c.R <= c.G || c.G <= c.B {
		t.Errorf("bronze glass is drawn %v", c)
	}
}

// A spectrum that does not reach through the visible leaves the colour unknown, and that is said.
func TestGlassOfUnknownColour(t *testing.T) {
	p := lib("soda-lime-6", "")
	tint := p.Tints[0]
	tau := tint.Spectrum.Tau
	n, _ := slices.BinarySearch(tau.NM, 600)
	tau.NM, tau.Value = tau.NM[n:], tau.Value[n:]
	tint.Spectrum.Tau = tau
	p.Tints = []glazing.Tint{tint}
	r := ratingsOf(t, &glazing.Makeup{ID: "short", Panes: []glazing.Placed{{Pane: p}}})[0]
	c := New(200, 100)
	Section(c, Rect{10, 10, 84, 60}, &r, Temperatures{})
	if said := strings.Join(texts(c), " "); !strings.Contains(said, "colour of pane 1 is not known") {
		t.Errorf("it says %s", said)
	}
}

// Labels that want one place share it evenly; bounds hold; where there is no room, that is said.
func TestSpread(t *testing.T) {
	for _, tt := range []struct {
		wanted, widths []float64
		distance       float64
		from, to       float64
		want           []float64
		fit            bool
	}{
		{nil, nil, 1, 0, 10, nil, true},
		{[]float64{5, 5}, []float64{2, 2}, 1, 0, 10, []float64{3.5, 6.5}, true},
		{[]float64{1, 8}, []float64{2, 2}, 1, 0, 10, []float64{1, 8}, true},
		{[]float64{0, 0}, []float64{2, 2}, 0, 0, 10, []float64{1, 3}, true},
		{[]float64{9, 10}, []float64{2, 2}, 0, 0, 10, []float64{7, 9}, true},
		{[]float64{2, 2, 8}, []float64{2, 2, 2}, 0, 0, 10, []float64{1, 3, 8}, true},
		{[]float64{5, 5, 5}, []float64{4, 4, 4}, 0, 0, 10, nil, false},
	} {
		got, fit := spread(tt.wanted, tt.widths, tt.distance, tt.from, tt.to)
		if fit != tt.fit {
			t.Errorf("%v fit: %v", tt.wanted, fit)
		}
		for i := range tt.want {
			if math.Abs(got[i]-tt.want[i]) > 1e-9 {
				t.Errorf("%v come to %v, want %v", tt.wanted, got, tt.want)
				break
			}
		}
	}
}

// Pictures hold all that they draw, whatever the names; every pane and gap is listed.
func TestSectionPicture(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	makeups := gallery(t)
	for i := range 40 {
		makeups[fmt.Sprintf("random %d", i)] = random(t, r)
	}
	makeups["twelve"] = &glazing.Makeup{ID: "twelve", Panes: []glazing.Placed{{Pane: switching(12)}}}
	for name, m := range makeups {
		all := ratingsOf(t, m)
		var ratings []*glazing.Rating
		for i := range min(len(all), MaxCurves) {
			ratings = append(ratings, &all[i])
		}
		for _, some := range [][]*glazing.Rating{ratings, ratings[:1]} {
			c := SectionPicture(some, nil, Heading{Title: strings.Repeat(m.ID+" ", 5), About: long64 + long64, Foot: strings.Repeat("foot ", 60)})
			if c.Err() != nil {
				t.Fatalf("%s: %v", name, c.Err())
			}
			labelsApart(t, name, c, Rect{0, 0, c.W, c.H})
			said := strings.Join(texts(c), "")
			for _, p := range m.Panes {
				if !strings.Contains(said, p.Pane.ID) {
					t.Errorf("%s: the picture does not name %s", name, p.Pane.ID)
				}
			}
			for _, rating := range some {
				if !strings.Contains(said, rating.Tint) {
					t.Errorf("%s: the picture does not name the tint %s", name, rating.Tint)
				}
			}
		}
	}
}

// The words for those who cannot see a section name what is drawn.
func TestSectionText(t *testing.T) {
	r := ratingsOf(t, gallery(t)["double"])[0]
	want := "From outside to inside: surfaces 1 and 2: pane soda-lime-6, 6 mm; gap of 16 mm argon 90 %, air 10 %; surfaces 3 and 4: pane invented-low-e-6, 6 mm; low emissivity on surface 3."
	if got := strings.ReplaceAll(SectionText(&r, Temperatures{}), "\u00a0", " "); got != want {
		t.Errorf("it says\n%s\nwant\n%s", got, want)
	}
}
