// Package draw draws on paper: lines, shapes and text in millimetres, recorded on a Canvas and
// written as PDF or as SVG. On it stand the two drawings of the program, the section through a
// make-up and the plot of its spectra.
//
// The origin of a canvas is its top left corner, x runs to the right and y down. Lengths are in
// mm, sizes of type in points. Text stands on its baseline. One canvas may be written to both back
// ends; widths of text are those of the embedded fonts in either.
//
//	c := draw.New(210, 297)
//	c.Line(20, 30, 190, 30, draw.Stroke{Colour: draw.Ink, Width: 0.2})
//	c.Text(20, 28, "Light transmittance τ_{v}", draw.Type{Size: 9, Markup: true})
//	svg, err := draw.SVG(c, "A title", "A description")
//	pdf, err := draw.PDF(draw.Document{Title: "A title", Pages: []*draw.Canvas{c}})
//
// Nothing here knows a clock or a file: the same drawing gives the same bytes.
package draw

import (
	"fmt"
	"math"
	"slices"
)

// A Colour is red, green, blue and opacity, of 255 each. The zero value is no colour: nothing is
// painted.
type Colour struct{ R, G, B, A uint8 }

// RGB returns an opaque colour.
func RGB(r, g, b uint8) Colour { return Colour{r, g, b, 255} }

// Over returns the colour with another opacity, 0 to 1.
func (c Colour) Over(opacity float64) Colour {
	c.A = uint8(math.Round(255 * min(max(opacity, 0), 1)))
	return c
}

// The colours of all drawings and pages: ink in four strengths and one accent, which is for what
// carries the argument: coated faces, the curve that matters, a limit that is not met. It keeps its
// distance from ink to colour-blind eyes, and in grey lies between Ink and Soft.
var (
	Ink    = RGB(0x1d, 0x21, 0x26) // text, outlines
	Soft   = RGB(0x5c, 0x64, 0x6c) // second text, dimensions
	Faint  = RGB(0x9a, 0xa2, 0xa9) // guide lines, ticks
	Hair   = RGB(0xd3, 0xd8, 0xdc) // rules of tables, grids
	Wash   = RGB(0xf3, 0xf5, 0xf6) // grounds
	Paper  = RGB(0xff, 0xff, 0xff)
	Accent = RGB(0xb5, 0x45, 0x1b)
)

// A Stroke is how a line is drawn. Ends and corners are round where it is not dashed.
type Stroke struct {
	Colour Colour
	Width  float64   // mm
	Dash   []float64 // lengths of strokes and spaces in mm; none for a whole line
}

// A Face is one of the embedded fonts.
type Face int

// The faces: Source Sans 3.
const (
	Regular Face = iota
	Semibold
	Italic
	faces
)

// An Align says which point of a line of text stands at its x.
type Align int

// The alignments.
const (
	Left Align = iota
	Centre
	Right
)

// A Type is how text is set. With Markup, _{…} is a subscript and ^{…} a superscript, and a
// backslash takes the meaning from what follows it; Escape keeps a user's text as it is. Without,
// everything stands as it is.
type Type struct {
	Face   Face
	Size   float64 // points
	Colour Colour  // Ink if none
	Align  Align
	Turn   float64 // degrees, counter-clockwise, about the point where the text stands
	Markup bool
}

// mmPerPoint is the length of a point.
const mmPerPoint = 25.4 / 72

// MM returns the size in mm.
func (t Type) MM() float64 { return t.Size * mmPerPoint }

// In returns the type in another colour.
func (t Type) In(c Colour) Type { t.Colour = c; return t }

// To returns the type aligned otherwise.
func (t Type) To(a Align) Type { t.Align = a; return t }

// A Rect is a rectangle: its top left corner, width and height.
type Rect struct{ X, Y, W, H float64 }

// Right and Bottom are the far edges.
func (r Rect) Right() float64  { return r.X + r.W }
func (r Rect) Bottom() float64 { return r.Y + r.H }

// Inset returns the rectangle within margins.
func (r Rect) Inset(dx, dy float64) Rect { return Rect{r.X + dx, r.Y + dy, r.W - 2*dx, r.H - 2*dy} }

// Overlaps reports whether two rectangles share area.
func (r Rect) Overlaps(o Rect) bool {
	return r.X < o.Right() && o.X < r.Right() && r.Y < o.Bottom() && o.Y < r.Bottom()
}

// Holds reports whether another rectangle lies in this one, but for a slack.
func (r Rect) Holds(o Rect, slack float64) bool {
	return o.X >= r.X-slack && o.Y >= r.Y-slack && o.Right() <= r.Right()+slack && o.Bottom() <= r.Bottom()+slack
}

// A Point is a place on a canvas.
type Point struct{ X, Y float64 }

// A Canvas records a drawing. A coordinate that is not finite makes its drawing call, and all
// that follow, do nothing: Err says so and no back end writes the canvas.
type Canvas struct {
	W, H float64 // mm

	ops      []op
	err      error
	replaced []rune
}

// New returns an empty canvas.
func New(w, h float64) *Canvas {
	c := &Canvas{W: w, H: h}
	c.finite("size", w, h)
	return c
}

// Err returns the first thing that went wrong.
func (c *Canvas) Err() error { return c.err }

// Replaced returns the letters that no font has and that a mark stands for, ascending; U+FFFD
// stands for bytes that were not UTF-8.
func (c *Canvas) Replaced() []rune { return slices.Clone(c.replaced) }

// fail remembers the first thing that goes wrong.
func (c *Canvas) fail(err error) {
	if c.err == nil {
		c.err = err
	}
}

// finite reports whether numbers are such, and remembers the first that is not.
func (c *Canvas) finite(what string, values ...float64) bool {
	for _, v := range values {
		if math.IsNaN(v) || math.Abs(v) > farthest {
			c.fail(fmt.Errorf("drawing of a %s has a coordinate %g", what, v))
		}
	}
	return c.err == nil
}

// farthest is a bound in mm of every coordinate, far beyond any paper: what lies there is a slip.
const farthest = 1e5

// Line draws a line.
func (c *Canvas) Line(x1, y1, x2, y2 float64, s Stroke) {
	c.Polyline([]Point{{x1, y1}, {x2, y2}}, s)
}

// Polyline draws lines from point to point.
func (c *Canvas) Polyline(points []Point, s Stroke) { c.shape("line", points, false, s, Colour{}) }

// Polygon draws a closed outline and fills it; none of either where its colour is the zero value.
func (c *Canvas) Polygon(points []Point, s Stroke, fill Colour) {
	c.shape("polygon", points, true, s, fill)
}

// Rectangle draws and fills a rectangle.
func (c *Canvas) Rectangle(r Rect, s Stroke, fill Colour) {
	c.Polygon([]Point{{r.X, r.Y}, {r.Right(), r.Y}, {r.Right(), r.Bottom()}, {r.X, r.Bottom()}}, s, fill)
}

// Circle draws and fills a circle.
func (c *Canvas) Circle(x, y, radius float64, s Stroke, fill Colour) {
	if c.finite("circle", x, y, radius, s.Width) {
		c.ops = append(c.ops, op{kind: circleOp, points: []Point{{x, y}}, size: radius, stroke: s.clone(), fill: fill})
	}
}

// Hatch fills a rectangle with parallel lines, each so far from the next, at an angle in degrees
// from the horizontal, rising to the right. A cross-hatch is two of them.
func (c *Canvas) Hatch(r Rect, spacing, angle float64, s Stroke) {
	if !c.finite("hatch", r.X, r.Y, r.W, r.H, spacing, angle) || !(spacing > 0 && r.W > 0 && r.H > 0) {
		return
	}
	for _, l := range hatch(r, spacing, angle) {
		c.Line(l[0].X, l[0].Y, l[1].X, l[1].Y, s)
	}
}

// Clip keeps what a function draws within a rectangle.
func (c *Canvas) Clip(r Rect, draw func()) {
	if c.finite("clip", r.X, r.Y, r.W, r.H) {
		c.ops = append(c.ops, op{kind: clipOp, points: []Point{{r.X, r.Y}, {r.W, r.H}}})
		draw()
		c.ops = append(c.ops, op{kind: endOp})
	}
}

// Group gives what a function draws a title and a description, which SVG tells those who cannot
// see it and PDF leaves out.
func (c *Canvas) Group(title, description string, draw func()) {
	c.ops = append(c.ops, op{kind: groupOp, title: clean(title), description: clean(description)})
	draw()
	c.ops = append(c.ops, op{kind: endOp})
}

// Text sets one line of text, and returns its width in mm. Line feeds and tabs are blanks, control
// characters and those that turn the direction of writing are left out, and a letter that the font
// does not have becomes a mark; see Replaced.
func (c *Canvas) Text(x, y float64, s string, t Type) float64 {
	if t.Colour == (Colour{}) {
		t.Colour = Ink
	}
	if t.Face < 0 || t.Face >= faces {
		t.Face = Regular
	}
	if !c.finite("text", x, y, t.Size, t.Turn) {
		return 0
	}
	runs, width := c.set(s, t)
	if len(runs) > 0 {
		c.ops = append(c.ops, op{kind: textOp, points: []Point{{x, y}}, size: width, text: t, runs: runs})
	}
	return width
}

// Lines sets lines below each other, the first at y, and returns the y of the line that would
// follow.
func (c *Canvas) Lines(x, y float64, lines []string, t Type) float64 {
	for _, line := range lines {
		c.Text(x, y, line, t)
		y += t.Leading()
	}
	return y
}
