package draw

// What a canvas records, and the geometry of what is not recorded as it is.

import (
	"math"
	"slices"
)

// An opKind is a kind of step of a drawing.
type opKind uint8

const (
	shapeOp opKind = iota
	circleOp
	textOp
	clipOp
	groupOp
	endOp // of a clip or a group
)

// An op is one step of a drawing.
type op struct {
	kind   opKind
	points []Point // corners; the centre; where text stands; top left corner and size of a clip
	closed bool
	size   float64 // the radius of a circle, the width of text
	stroke Stroke
	fill   Colour

	text Type
	runs []run

	title, description string
}

// bounds returns the rectangle that text covers.
func (o *op) bounds() Rect { return box(o.points[0].X, o.points[0].Y, o.size, o.text) }

func (s Stroke) clone() Stroke {
	s.Dash = slices.Clone(s.Dash)
	return s
}

func (s Stroke) visible() bool { return s.Colour.A > 0 && s.Width > 0 }

// shape records lines from point to point.
func (c *Canvas) shape(what string, points []Point, closed bool, s Stroke, fill Colour) {
	for _, p := range points {
		if !c.finite(what, p.X, p.Y) {
			return
		}
	}
	if !c.finite(what, s.Width) || !c.finite(what, s.Dash...) || len(points) < 2 {
		return
	}
	if s.visible() || fill.A > 0 {
		c.ops = append(c.ops, op{kind: shapeOp, points: slices.Clone(points), closed: closed, stroke: s.clone(), fill: fill})
	}
}

// hatch returns the lines of a hatch within a rectangle, through a grid that is fixed to the
// paper, so that neighbouring rectangles are hatched as one.
func hatch(r Rect, spacing, angle float64) (lines [][2]Point) {
	sin, cos := math.Sincos(angle * math.Pi / 180)
	// a point's distance from the line through the origin: x·sin + y·cos, y down
	least, greatest := math.Inf(1), math.Inf(-1)
	for _, p := range []Point{{r.X, r.Y}, {r.Right(), r.Y}, {r.X, r.Bottom()}, {r.Right(), r.Bottom()}} {
		d := p.X*sin + p.Y*cos
		least, greatest = min(least, d), max(greatest, d)
	}
	first, last := math.Ceil(least/spacing), math.Floor(greatest/spacing)
	if last-first > 1e4 {
		return nil
	}
	for k := first; k <= last; k++ {
		d := k * spacing
		var ends []Point
		add := func(p Point) {
			const near = 1e-9
			if p.X >= r.X-near && p.X <= r.Right()+near && p.Y >= r.Y-near && p.Y <= r.Bottom()+near &&
				(len(ends) == 0 || math.Hypot(ends[0].X-p.X, ends[0].Y-p.Y) > 1e-6) {
				ends = append(ends, p)
			}
		}
		if math.Abs(cos) > 1e-9 {
			add(Point{r.X, (d - r.X*sin) / cos})
			add(Point{r.Right(), (d - r.Right()*sin) / cos})
		}
		if math.Abs(sin) > 1e-9 {
			add(Point{(d - r.Y*cos) / sin, r.Y})
			add(Point{(d - r.Bottom()*cos) / sin, r.Bottom()})
		}
		if len(ends) >= 2 {
			lines = append(lines, [2]Point{ends[0], ends[1]})
		}
	}
	return lines
}
