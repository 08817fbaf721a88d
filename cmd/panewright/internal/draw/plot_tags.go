package draw

// The tags of curves: a letter or a number on each, so that none is known by its colour alone.

import (
	"cmp"
	"math"
	"slices"
)

// tagMargin is the paper around a tag.
const tagMargin = 0.45

// tagTall is the height of a tag.
var tagTall = tagType.CapHeight() + 2*tagMargin

// A tag is where the tag of a curve stands, and from where a line leads to it, if one does.
type tag struct {
	box  Rect
	from Point
	led  bool
}

// tags puts the tag of each curve on it, where it is farthest from the others. The tags of curves
// that are close to others everywhere stand in the open, in the order of the curves, and lines lead
// to them from where these curves are farthest apart.
func (p *plot) tags(c *Canvas) {
	if len(p.curves) < 2 {
		return
	}
	tags := make([]tag, len(p.curves))
	var taken []Rect
	var close []int
	for i, v := range p.curves {
		size := Rect{W: Width(v.Tag, tagType) + 2*tagMargin, H: tagTall}
		box, room := p.onCurve(i, size, taken)
		if room < 0.1 && box.W > 0 {
			close = append(close, i)
			continue
		}
		tags[i].box = box
		taken = append(taken, box)
	}
	if !p.fan(tags, close, taken) {
		for _, i := range close {
			tags[i].box, _ = p.onCurve(i, Rect{W: Width(p.curves[i].Tag, tagType) + 2*tagMargin, H: tagTall}, taken)
			taken = append(taken, tags[i].box)
		}
	}
	for i, t := range tags {
		if colour := p.curves[i].Stroke.Colour; t.led {
			c.Line(t.from.X, t.from.Y, t.box.X+tagMargin/2, t.box.Y+t.box.H/2, Stroke{Colour: colour, Width: 0.12})
			c.Circle(t.from.X, t.from.Y, 0.38, Stroke{}, colour)
		}
	}
	for i, v := range p.curves {
		if box := tags[i].box; box.W > 0 { // else nothing of the curve is known
			p.ground(c, box)
			c.Text(box.X+box.W/2, box.Bottom()-tagMargin, v.Tag, tagType.In(v.Stroke.Colour))
		}
	}
}

// fan puts the tags of some curves into a column in the open, the first curve from above first. It
// reports false where these curves are nowhere apart, or no place is open.
func (p *plot) fan(tags []tag, curves []int, taken []Rect) bool {
	if len(curves) == 0 {
		return true
	}
	at, apart := 0.0, 0.25
	for x := p.frame.X + 2; x < p.frame.Right()-2; x += 0.5 {
		least := math.Inf(1)
		for _, i := range curves {
			y := p.y(p.curves[i].at(p.nm(x)))
			if math.IsNaN(y) {
				least = 0
				break
			}
			least = min(least, p.clear(i, Rect{x - 0.1, y, 0.2, 0}))
		}
		if least > apart {
			at, apart = x, least
		}
	}
	if at == 0 {
		return false
	}
	height := func(i int) float64 { return p.y(p.curves[i].at(p.nm(at))) }
	slices.SortStableFunc(curves, func(a, b int) int { return cmp.Compare(height(a), height(b)) })
	column := Rect{H: tagTall * float64(len(curves))}
	middle := 0.0
	for _, i := range curves {
		column.W = max(column.W, Width(p.curves[i].Tag, tagType)+2*tagMargin)
		middle += height(i) / float64(len(curves))
	}
	box, ok := p.open(Point{at, middle}, column, taken)
	if !ok {
		return false
	}
	for row, i := range curves {
		w := Width(p.curves[i].Tag, tagType) + 2*tagMargin
		tags[i] = tag{Rect{box.X, box.Y + float64(row)*tagTall, w, tagTall}, Point{at, height(i)}, true}
	}
	return true
}

// ground clears a box to the colours of the paper below the curves.
func (p *plot) ground(c *Canvas, box Rect) {
	c.Rectangle(box, Stroke{}, Paper)
	from, to := max(box.X, p.x(visibleFromNM)), min(box.Right(), p.x(visibleToNM))
	if from < to {
		c.Rectangle(Rect{from, box.Y, to - from, box.H}, Stroke{}, Wash)
	}
}

// nm is the inverse of x.
func (p *plot) nm(x float64) float64 {
	return plotFromNM + (x-p.frame.X)/p.frame.W*(plotToNM-plotFromNM)
}

// free reports whether a box keeps off those that are taken.
func free(box Rect, taken []Rect) bool {
	for _, o := range taken {
		if box.Inset(-0.6, -0.6).Overlaps(o) {
			return false
		}
	}
	return true
}

// onCurve returns the best box for a tag on a curve, and how far in mm the other curves stay from
// it. The box is empty where there is none.
func (p *plot) onCurve(own int, size Rect, taken []Rect) (best Rect, room float64) {
	v, highest := p.curves[own], math.Inf(-1)
	for x := p.frame.X + size.W/2 + 1; x <= p.frame.Right()-size.W/2-1; x += 1.2 {
		value := v.at(p.nm(x))
		if math.IsNaN(value) {
			continue
		}
		y := min(max(p.y(value), p.frame.Y+size.H/2), p.frame.Bottom()-size.H/2-0.2)
		box := Rect{x - size.W/2, y - size.H/2, size.W, size.H}
		clear := p.clear(own, box)
		score := min(clear, 4) - 0.6*p.steep(v, box) - 2*math.Abs(y-p.y(value))
		if !free(box, taken) {
			score -= 1000
			clear = -1
		}
		if score > highest {
			highest, best, room = score, box, clear
		}
	}
	return best, room
}

// clear returns how far in mm the curves, but for one, stay from a box.
func (p *plot) clear(own int, box Rect) float64 {
	least := p.frame.H
	for k, v := range p.curves {
		if k == own {
			continue
		}
		low, high := math.Inf(1), math.Inf(-1)
		for x := box.X; x <= box.Right()+0.1; x += box.W / 4 {
			if value := v.at(p.nm(x)); !math.IsNaN(value) {
				low, high = min(low, p.y(value)), max(high, p.y(value))
			}
		}
		if low <= high {
			least = min(least, max(low-box.Bottom(), box.Y-high))
		}
	}
	return least
}

// steep returns how far in mm a curve rises or falls across a box.
func (p *plot) steep(v Curve, box Rect) float64 {
	if d := p.frame.H * math.Abs(v.at(p.nm(box.Right()))-v.at(p.nm(box.X))); !math.IsNaN(d) {
		return d
	}
	return 2
}

// open returns the box nearest to a point that no curve and no tag touches.
func (p *plot) open(from Point, size Rect, taken []Rect) (best Rect, ok bool) {
	nearest := math.Inf(1)
	for x := p.frame.X + 1; x+size.W <= p.frame.Right()-1; x += 0.8 {
		for y := p.frame.Y + 0.5; y+size.H <= p.frame.Bottom()-0.5; y += 0.8 {
			box := Rect{x, y, size.W, size.H}
			d := math.Hypot(x-from.X, y+size.H/2-from.Y)
			if x < from.X+2 {
				continue // lines lead to the right
			}
			if d < nearest && free(box, taken) && p.clear(-1, box) > 0.7 {
				nearest, best, ok = d, box, true
			}
		}
	}
	return best, ok
}
