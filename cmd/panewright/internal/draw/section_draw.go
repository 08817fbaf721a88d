package draw

// The section through a make-up, put on paper as it was planned.

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"panewright/glazing"
)

// draw puts the section on a canvas.
func (s *section) draw(c *Canvas) {
	if s.heat.on() {
		s.drawScale(c)
	} else {
		s.sides(c)
	}
	for _, p := range s.parts {
		if p.gap {
			s.gap(c, p)
		} else {
			s.pane(c, p)
		}
	}
	for i, film := range s.films {
		if film {
			s.film(c, i)
		}
	}
	if s.heat.on() {
		s.drawLines(c)
		s.drawFigures(c)
	}
	s.drawNumbers(c)
	y := s.drawWidths(c)
	y += noteType.Leading() + 0.6
	if s.key {
		filmKey(c, s.at.X, y)
		y += noteType.Leading()
	}
	y = s.drawKey(c, s.at.X, y)
	c.Lines(s.at.X, y, s.notes, noteType)
}

// edge returns the height of the line at which the glass is broken off, at a place of the paper.
func (s *section) edge(x, y float64) Point {
	return Point{x, y + breakDepth*math.Sin(2*math.Pi*(x-s.at.X)/breakLength)}
}

// outline returns the body of a pane, broken off above and below.
func (s *section) outline(x, w float64) (points []Point, upper int) {
	steps := max(2, int(w/0.4))
	for i := range steps + 1 {
		points = append(points, s.edge(x+w*float64(i)/float64(steps), s.body.Y))
	}
	for i := range steps + 1 {
		points = append(points, s.edge(x+w*float64(steps-i)/float64(steps), s.body.Bottom()))
	}
	return points, steps + 1
}

func (s *section) pane(c *Canvas, p slice) {
	look := s.looks[p.pane]
	points, upper := s.outline(p.x, p.w)
	c.Polygon(points, Stroke{}, look.fill)
	if p.w > 1 && look.known {
		c.Hatch(Rect{p.x, s.body.Y + breakDepth, p.w, s.body.H - 2*breakDepth}, look.hatchSpacing(), 52, Stroke{Colour: look.hatchColour(), Width: 0.12})
	}
	x := p.x
	placed := s.r.Makeup.Panes[p.pane]
	for i, w := range p.plies {
		ply := i
		if placed.Turned {
			ply = len(p.plies) - 1 - i
		}
		if placed.Pane.Plies[ply].Interlayer {
			inner, _ := s.outline(x, w)
			c.Polygon(inner, Stroke{}, mix(look.fill, Soft, 0.45))
		}
		if i > 0 {
			c.Line(x, s.edge(x, s.body.Y).Y, x, s.edge(x, s.body.Bottom()).Y, Stroke{Colour: Ink, Width: 0.14})
		}
		x += w
	}
	thin := Stroke{Colour: Soft, Width: 0.14}
	c.Polyline(points[:upper], thin)
	c.Polyline(points[upper:], thin)
	for _, x := range []float64{p.x, p.x + p.w} {
		c.Line(x, s.edge(x, s.body.Y).Y, x, s.edge(x, s.body.Bottom()).Y, Stroke{Colour: Ink, Width: 0.24})
	}
}

// comb draws the mark of a film along a line: an edge, and ticks that stand off to one side of it.
func comb(c *Canvas, x1, y1, x2, y2, tick float64) {
	length := math.Hypot(x2-x1, y2-y1)
	ux, uy := (x2-x1)/length, (y2-y1)/length
	c.Line(x1, y1, x2, y2, Stroke{Colour: Accent, Width: filmWide})
	n := int((length - 0.4) / filmSpacing)
	start := (length - float64(n)*filmSpacing) / 2
	for i := range n + 1 {
		d := start + float64(i)*filmSpacing
		x, y := x1+ux*d, y1+uy*d
		c.Line(x, y, x-uy*tick, y+ux*tick, Stroke{Colour: Accent, Width: 0.24})
	}
}

// filmKey says what the mark of films is.
func filmKey(c *Canvas, x, y float64) {
	comb(c, x+filmWide/2, y-0.2, x+keyMark, y-0.2, -filmTick)
	c.Text(x+keyIndent, y, filmText, noteType)
}

var filmText = "face of low emissivity, below " + millimetres(lowEmissivity)

// film marks a face, from 0, on the side of it that is not glass.
func (s *section) film(c *Canvas, face int) {
	p := s.parts[face/2*2]
	x, tick := p.x-filmWide/2, -filmTick // ticks to the left
	neighbour := face/2*2 - 1
	if face%2 == 1 {
		x, tick = p.x+p.w+filmWide/2, filmTick
		neighbour += 2
	}
	if neighbour >= 0 && neighbour < len(s.parts) {
		tick = math.Copysign(s.tick(s.parts[neighbour])+filmWide/2, tick)
		if w := s.parts[neighbour].w; w < 2*filmWide {
			x = p.x - filmWide/4
			if face%2 == 1 {
				x = p.x + p.w + filmWide/4
			}
		}
	}
	comb(c, x, s.body.Bottom()-0.6, x, s.body.Y+0.6, tick)
}

func (s *section) gap(c *Canvas, p slice) {
	if p.shortened {
		for _, d := range []float64{-breakApart, breakApart} {
			var points []Point
			for i := range 25 {
				y := s.body.Y + s.body.H*float64(i)/24
				points = append(points, Point{p.x + p.w/2 + d + 0.5*math.Sin(float64(i)*math.Pi/2), y})
			}
			c.Polyline(points, Stroke{Colour: Faint, Width: 0.14})
		}
	}
	if s.r.Makeup.Gaps[p.pane].Vacuum != nil {
		s.pillars(c, p)
	}
	lines := s.gasLines[p.pane]
	t := gasType
	n, at := float64(len(lines)), s.gasAt[p.pane]
	if w, h := s.gasSize(p.pane); s.heat.on() && n > 0 { // on the lines of the scale
		c.Rectangle(Rect{at.X - w/2 - 0.4, at.Y - h/2 - 0.4, w + 0.8, h + 0.8}, Stroke{}, Paper)
	}
	if s.gasTurned {
		t.Turn = 90
		x := at.X - (n-1)*t.Leading()/2 + t.CapHeight()/2
		for _, line := range lines {
			c.Text(x, at.Y, line, t)
			x += t.Leading()
		}
		return
	}
	c.Lines(at.X, at.Y-(n-1)*t.Leading()/2+t.CapHeight()/2, lines, t)
}

// pillars indicates those of an evacuated gap; neither their height nor their distance is to scale.
func (s *section) pillars(c *Canvas, gap slice) {
	const tall, apart = 0.55, 3.4
	n := int((s.body.H - 2) / apart)
	y := s.body.Y + (s.body.H-float64(n-1)*apart)/2
	for range n {
		c.Rectangle(Rect{gap.x, y - tall/2, gap.w, tall}, Stroke{}, Soft)
		y += apart
	}
}

// sides draws what stands beside the glass: the outside with the sun, the inside, the tilt.
func (s *section) sides(c *Canvas) {
	first, last := s.parts[0], s.parts[len(s.parts)-1]
	y := s.body.Y + s.body.H/2
	left := labelType.To(Right)
	x := first.x - 3.4
	c.Text(x, y+labelType.CapHeight()/2, "outside", left)
	c.Text(last.x+last.w+3.4, y+labelType.CapHeight()/2, "inside", labelType.To(Left))
	sun(c, x-Width("outside", left)/2, y-5.2)
	if !s.r.Makeup.Tilt.Vertical() {
		tilt(c, x-Width("outside", left)/2, s.body.Bottom()-1.5, s.r.Makeup.Tilt.Degrees())
	}
}

// sun draws the mark of the side that the sun is on.
func sun(c *Canvas, x, y float64) {
	line := Stroke{Colour: Soft, Width: 0.18}
	c.Circle(x, y, 1.05, line, Colour{})
	for i := range 8 {
		sin, cos := math.Sincos(float64(i) * math.Pi / 4)
		c.Line(x+1.6*cos, y+1.6*sin, x+2.3*cos, y+2.3*sin, line)
	}
}

// tilt draws how the glazing stands, with the angle below.
func tilt(c *Canvas, x, y, deg float64) {
	const long = 7.0
	tiltMark(c, x-long/2-tiltOver, y-3.4, long, deg)
	c.Text(x, y, millimetres(deg)+"°", labelType)
}

// tiltOver is by how much the horizontal is longer at either end than the glazing over it.
const tiltOver = 0.8

// tiltMark draws a line, so long, over the horizontal from x, the outside above or at the left.
func tiltMark(c *Canvas, x, y, long, deg float64) {
	sin, cos := math.Sincos(deg * math.Pi / 180)
	foot := x + tiltOver
	if cos < 0 {
		foot += long
	}
	c.Line(x, y, x+long+2*tiltOver, y, Stroke{Colour: Faint, Width: 0.14})
	c.Line(foot, y, foot+long*cos, y-long*sin, Stroke{Colour: Ink, Width: 0.5})
}

func (s *section) drawNumbers(c *Canvas) {
	y := s.at.Y + numberType.CapHeight() + 0.4
	line, number, from := Stroke{Colour: Faint, Width: 0.12}, numberType, y+0.7
	if h := &s.heat; h.on() {
		number, from = h.number, y+1+float64(len(h.lines))*h.rowTall+0.6
	}
	i := 0
	for _, p := range s.parts {
		if p.gap {
			continue
		}
		for _, face := range []float64{p.x, p.x + p.w} {
			t := number
			if s.films[i] {
				t.Colour = Accent
			}
			c.Text(s.numbers[i], y, strconv.Itoa(i+1), t)
			c.Polyline([]Point{{s.numbers[i], from}, {face, s.body.Y - 0.9}, s.edge(face, s.body.Y)}, line)
			i++
		}
	}
}

// drawWidths draws the dimensions, and returns where they end.
func (s *section) drawWidths(c *Canvas) float64 {
	first, last := s.parts[0], s.parts[len(s.parts)-1]
	left, right := first.x, last.x+last.w
	line := Stroke{Colour: Faint, Width: 0.14}
	y := s.body.Bottom() + 2
	if s.heat.on() && !s.r.Makeup.Tilt.Vertical() {
		const long = 5.0
		deg := s.r.Makeup.Tilt.Degrees()
		tiltMark(c, s.at.X, y+3.2, long, deg)
		c.Text(s.at.X+long+2*tiltOver+1, y+3.3, millimetres(deg)+"°", labelType.To(Left))
	}
	c.Line(left, y, right, y, line)
	total := 0.0
	for _, p := range s.parts {
		total += p.mm
		c.Line(p.x, y-0.8, p.x, y+0.8, line)
		if p.shortened {
			for _, d := range []float64{-0.5, 0.5} {
				c.Line(p.x+p.w/2+d-0.4, y+0.8, p.x+p.w/2+d+0.4, y-0.8, line)
			}
		}
	}
	c.Line(right, y-0.8, right, y+0.8, line)
	t := s.widthsType
	base := y + 1 + t.CapHeight() + 0.4
	if s.beside {
		base += leadersTall
	}
	for i, x := range s.widths {
		p := s.parts[i]
		text := millimetres(p.mm)
		if Width(text, t) > p.w-0.4 || math.Abs(x-p.x-p.w/2) > p.w/2 {
			c.Line(p.x+p.w/2, y, x, base-t.CapHeight()-0.5, line)
		}
		if len(s.parts) == 1 {
			text += " mm"
		}
		c.Text(x, base, text, t)
	}
	if len(s.parts) == 1 {
		return base
	}
	y = base + 2.6
	text := millimetres(total) + " mm"
	t = dimType
	w := Width(text, t)/2 + 1
	middle := (left + right) / 2
	if right-left > 2*w {
		c.Line(left, y, middle-w, y, line)
		c.Line(middle+w, y, right, y, line)
		c.Line(left, y-0.8, left, y+0.8, line)
		c.Line(right, y-0.8, right, y+0.8, line)
	}
	c.Text(middle, y+t.CapHeight()/2, text, t)
	return y + 1
}

// SectionText tells the section of a rating in words, from outside to inside.
func SectionText(r *glazing.Rating, t Temperatures) string {
	var parts []string
	for k, p := range r.Makeup.Panes {
		parts = append(parts, fmt.Sprintf("surfaces %d and %d: pane %s, %s mm", 2*k+1, 2*k+2, p.Pane.ID, millimetres(p.Pane.ThicknessMM())))
		for i, e := range r.Surfaces[2*k : 2*k+2] {
			if e.Corrected.Known && e.Corrected.Number < lowEmissivity {
				parts = append(parts, fmt.Sprintf("low emissivity on surface %d", 2*k+i+1))
			}
		}
		if k < len(r.Makeup.Gaps) {
			g := r.Makeup.Gaps[k]
			parts = append(parts, strings.TrimSpace("gap of "+millimetres(g.WidthMM)+" mm "+strings.Join(gasOf(g), ", ")))
		}
	}
	return strings.Join(append([]string{"From outside to inside: " + strings.Join(parts, "; ") + "."}, temperatureText(r, t)...), " ")
}
