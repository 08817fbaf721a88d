package draw

// Temperatures through a section: lines for one or two conditions, their scale, and the figures of the
// surfaces.

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// MaxConditions is how many conditions a section tells apart.
const MaxConditions = 2

// Temperatures are what sections show as lines: conditions, and one scale for all sections. The zero
// value is none.
type Temperatures struct {
	Conditions []string // ids, at most MaxConditions, that of the lowest outdoor temperature first
	FromC, ToC float64  // of the scale
}

// TemperaturesOf returns what the sections of ratings of one make-up show of conditions.
func TemperaturesOf(ratings []*glazing.Rating, conditions []string) (t Temperatures) {
	outdoors := func(id string) float64 { return ratings[0].Balance(id).Condition.OutsideC }
	for _, id := range conditions {
		if ratings[0].Balance(id) != nil && !slices.Contains(t.Conditions, id) {
			t.Conditions = append(t.Conditions, id)
		}
	}
	slices.SortStableFunc(t.Conditions, func(a, b string) int { return cmp.Compare(outdoors(a), outdoors(b)) })
	t.FromC, t.ToC = math.Inf(1), math.Inf(-1)
	for _, r := range ratings {
		for _, id := range t.Conditions {
			b := r.Balance(id)
			if b == nil {
				continue
			}
			points := r.Profile(b)
			for _, p := range points {
				t.FromC, t.ToC = min(t.FromC, p.TemperatureC), max(t.ToC, p.TemperatureC)
			}
			if points != nil {
				t.FromC, t.ToC = min(t.FromC, b.Condition.OutsideC, b.Condition.InsideC), max(t.ToC, b.Condition.OutsideC, b.Condition.InsideC)
			}
		}
	}
	if t.FromC > t.ToC { // none is known
		t.FromC, t.ToC = 0, 0
	}
	const leastK = 10.0
	if short := (leastK - (t.ToC - t.FromC)) / 2; short > 0 {
		t.FromC, t.ToC = t.FromC-short, t.ToC+short
	}
	return t
}

// ColdAndHot returns the conditions that a section shows by itself: that of the lowest outdoor
// temperature, and that of the most sun, of equals that of the highest outdoor temperature.
func ColdAndHot(r *glazing.Rating) (ids []string) {
	var cold, hot *glazing.Condition
	for i := range r.Balances {
		c := r.Balances[i].Condition
		if cold == nil || cmp.Or(cmp.Compare(c.OutsideC, cold.OutsideC), cmp.Compare(c.SunWM2, cold.SunWM2)) < 0 {
			cold = c
		}
		if hot == nil || cmp.Or(cmp.Compare(c.SunWM2, hot.SunWM2), cmp.Compare(c.OutsideC, hot.OutsideC)) > 0 {
			hot = c
		}
	}
	if cold == nil {
		return nil
	}
	if ids = append(ids, cold.ID); hot != cold {
		ids = append(ids, hot.ID)
	}
	return ids
}

// The type of temperatures.
var (
	scaleType     = Type{Size: 5.8, Colour: Soft}
	conditionType = Type{Size: 6.5}
	surfaceType   = Type{Size: 6.2, Align: Centre}
)

// Lengths of temperatures on paper, in mm.
const (
	heatLeft    = 20.0 // room for the outside, with the names of lines
	heatRight   = 13.0 // and for the inside, with the scale
	airLeft     = 13.4 // of the column of the outdoor air
	airRight    = 6.4
	columnApart = 1.2
	sampleWide  = 4.6 // of a line before its figures
	scaleRight  = 5.8 // from the axis to the edge
	outsideFilm = 4.0 // on which the line leaves the temperature of the air
	insideFilm  = 3.0
	labelOff    = 1.0
	heatCasing  = 1.1
	headLeaders = 2.6  // from the figures to the glass
	tiltWide    = 15.0 // of the mark of the tilt
)

// heatStrokes are those of the lines.
var heatStrokes = [MaxConditions]Stroke{{Colour: Ink, Width: 0.42}, {Colour: Ink, Width: 0.42, Dash: []float64{1.5, 0.8}}}

// A heatLine is the line of one condition.
type heatLine struct {
	id      string
	stroke  Stroke
	points  []Point  // on paper, from the outdoor air to that of the room
	figures []string // of the outdoor air, the surfaces, the air of the room
	label   []string
	labelAt Point    // of the first line
	key     []string // what it is, in lines
}

// heat is the plan of the temperatures of a section.
type heat struct {
	Temperatures
	lines   []heatLine
	unknown []string // sentences
	turned  bool     // figures stand upright
	rowTall float64
	above   float64 // of the scale: room within the glass for names
	below   float64
	number  Type // of surfaces
}

// on reports whether there are lines.
func (h *heat) on() bool { return len(h.lines) > 0 }

// planHeat decides which lines there are, with their figures.
func (s *section) planHeat(t Temperatures) {
	h := &s.heat
	h.Temperatures = t
	for i, id := range t.Conditions {
		b := s.r.Balance(id)
		if b == nil {
			continue
		}
		if first := b.SurfaceC(0); !first.Known {
			h.unknown = append(h.unknown, "Temperatures in "+id+" are not known: "+first.Why+".")
			continue
		}
		l := heatLine{id: id, stroke: heatStrokes[i%len(heatStrokes)], figures: []string{degrees(b.Condition.OutsideC)}}
		l.figures = append(append(l.figures, surfaceFigures(s.r, id)...), degrees(b.Condition.InsideC))
		h.lines = append(h.lines, l)
	}
	if h.on() {
		s.sideLeft, s.sideRight = heatLeft, heatRight
	}
}

// surfaceFigures prints the temperatures of the surfaces by the list of figures.
func surfaceFigures(r *glazing.Rating, condition string) (printed []string) {
	for _, f := range glazing.BalanceFigures() {
		if f.Alias != "temperature" {
			continue
		}
		x := f.At(condition)
		for k := range x.Count(r) {
			printed = append(printed, minus(x.Print(r, k)))
		}
	}
	return printed
}

// degrees prints a temperature that the user typed.
func degrees(c float64) string { return minus(millimetres(c)) }

// minus writes a number with a true minus.
func minus(s string) string { return strings.Replace(s, "-", "−", 1) }

// conditionWords says what the condition of a balance is.
func conditionWords(r *glazing.Rating, b *glazing.Balance) string {
	c := b.Condition
	s := fmt.Sprintf("outside %s °C, inside %s °C, ", degrees(c.OutsideC), degrees(c.InsideC))
	if c.SunWM2 == 0 {
		s += "no sun"
	} else {
		s += "sun " + millimetres(c.SunWM2) + " W/m²"
	}
	if b.TiltDeg != r.Makeup.Tilt.Degrees() {
		s += ", tilt " + millimetres(b.TiltDeg) + "°"
	}
	return strings.ReplaceAll(strings.ReplaceAll(s, " °C", "\u00a0°C"), " W/m²", "\u00a0W/m²")
}

// placeFigures puts the numbers of surfaces and their figures into columns: figures lie where they find
// place, else they stand.
func (s *section) placeFigures() {
	h := &s.heat
	from, to := s.at.X+airLeft+columnApart, s.at.Right()-airRight-columnApart
	var wanted []float64
	for _, p := range s.parts {
		if !p.gap {
			wanted = append(wanted, p.x-numberOff, p.x+p.w+numberOff)
		}
	}
	for _, try := range []struct {
		number Type
		turned bool
		apart  float64
	}{{numberType, false, columnApart}, {numberType, true, columnApart}, {numberType.sized(6), true, 0.4}, {numberType.sized(4.6), true, 0.3}} {
		h.number, h.turned = try.number, try.turned
		h.rowTall = surfaceType.Leading()
		var widths []float64
		for k := range wanted {
			w := Width(strconv.Itoa(k+1), h.number)
			for _, l := range h.lines {
				if long := Width(l.figures[k+1], surfaceType); h.turned {
					w, h.rowTall = max(w, surfaceType.CapHeight()), max(h.rowTall, long+columnApart)
				} else {
					w = max(w, long)
				}
			}
			widths = append(widths, w)
		}
		if h.turned {
			for _, l := range h.lines {
				h.rowTall = max(h.rowTall, Width(l.figures[0], surfaceType)+columnApart, Width(l.figures[len(l.figures)-1], surfaceType)+columnApart)
			}
		}
		var fit bool
		if s.numbers, fit = spread(wanted, widths, try.apart, from, to); fit {
			break
		}
	}
	s.numbersTall = numberType.CapHeight() + 1.4 + float64(len(h.lines))*h.rowTall + headLeaders
}

// sized returns the type in another size.
func (t Type) sized(points float64) Type { t.Size = points; return t }

// placeLines puts the lines on paper, once the glass has its height.
func (s *section) placeLines() {
	h := &s.heat
	if !h.on() {
		return
	}
	first, last := s.parts[0], s.parts[len(s.parts)-1]
	room := first.x - outsideFilm - s.at.X
	for i := range h.lines {
		l := &h.lines[i]
		l.label = Wrap(l.id, room, conditionType)
		if len(l.label) > 2 {
			l.label = []string{l.label[0], Fit(l.label[1]+l.label[2], room, conditionType)}
		}
	}
	upper, lower := 0, len(h.lines)-1
	if len(h.lines) > 1 && s.warmerOutside(1, 0) {
		upper, lower = 1, 0
	}
	tall := func(i int) float64 {
		return labelOff + conditionType.CapHeight() + float64(len(h.lines[i].label)-1)*conditionType.Leading() + 1.6
	}
	h.above, h.below = tall(upper), 2.0
	if lower != upper {
		h.below = tall(lower)
	}
	for i := range h.lines {
		l := &h.lines[i]
		b := s.r.Balance(l.id)
		l.points = []Point{{s.at.X, s.heatY(b.Condition.OutsideC)}, {first.x - outsideFilm, s.heatY(b.Condition.OutsideC)}}
		for _, p := range s.r.Profile(b) {
			l.points = append(l.points, Point{s.paperX(p.DistanceMM), s.heatY(p.TemperatureC)})
		}
		l.points = append(l.points, Point{last.x + last.w + insideFilm, s.heatY(b.Condition.InsideC)}, Point{s.at.Right() - scaleRight, s.heatY(b.Condition.InsideC)})
		l.labelAt = l.points[0]
		if i == upper {
			l.labelAt.Y -= labelOff + float64(len(l.label)-1)*conditionType.Leading()
		} else {
			l.labelAt.Y += labelOff + conditionType.CapHeight()
		}
	}
}

// warmerOutside reports whether line i is above line k on the outdoor side.
func (s *section) warmerOutside(i, k int) bool {
	a, b := s.r.Balance(s.heat.lines[i].id), s.r.Balance(s.heat.lines[k].id)
	return cmp.Or(cmp.Compare(a.Condition.OutsideC, b.Condition.OutsideC), cmp.Compare(a.SurfaceC(0).Number, b.SurfaceC(0).Number)) > 0
}

// heatY places a temperature on paper.
func (s *section) heatY(c float64) float64 {
	h := &s.heat
	return s.body.Bottom() - h.below - (s.body.H-h.above-h.below)*(c-h.FromC)/(h.ToC-h.FromC)
}

// paperX places a distance from surface 1 on paper, where not all is to one scale.
func (s *section) paperX(mm float64) float64 {
	within := func(x, w, from, thick float64) (float64, bool) {
		return x + w*min(max((mm-from)/thick, 0), 1), mm <= from+thick
	}
	from := 0.0
	for _, p := range s.parts {
		widths, thick := p.plies, []float64{p.mm}
		if widths == nil {
			widths = []float64{p.w}
		} else {
			thick = s.pliesMM(p.pane)
		}
		x := p.x
		for i, w := range widths {
			if at, in := within(x, w, from, thick[i]); in {
				return at
			}
			x, from = x+w, from+thick[i]
		}
	}
	last := s.parts[len(s.parts)-1]
	return last.x + last.w
}

// pliesMM returns the thicknesses of the plies of a pane, from outside.
func (s *section) pliesMM(pane int) (list []float64) {
	placed := s.r.Makeup.Panes[pane]
	for _, y := range placed.Pane.Plies {
		list = append(list, y.ThicknessMM)
	}
	if placed.Turned {
		slices.Reverse(list)
	}
	return list
}

// openIn returns where a text of a size finds place off the lines, as near as can be to the middle of a
// span of the glass.
func (s *section) openIn(from, to, w, h float64) (Point, bool) {
	const off, step = 0.9, 0.4
	middle := s.body.Y + s.body.H/2
	best, nearest := Point{}, math.Inf(1)
	slack := max(to-from-w, 0)
	for _, share := range []float64{0.5, 0.25, 0.75, 0, 1} {
		left := from + share*slack
		type band struct{ top, bottom float64 }
		var bands []band
		for _, l := range s.heat.lines {
			if top, bottom, ok := l.reach(left-off, left+w+off); ok {
				bands = append(bands, band{top - off, bottom + off})
			}
		}
		for d := 0.0; d <= s.body.H/2-h/2-1.2; d += step {
			for _, y := range []float64{middle - d, middle + d} {
				clear := !slices.ContainsFunc(bands, func(b band) bool { return y-h/2 < b.bottom && y+h/2 > b.top })
				if away := d + 8*math.Abs(share-0.5); clear && away < nearest {
					best, nearest = Point{left + w/2, y}, away
				}
			}
		}
	}
	return best, !math.IsInf(nearest, 1)
}

// reach returns the highest and lowest place of a line between two places across.
func (l *heatLine) reach(from, to float64) (top, bottom float64, ok bool) {
	top, bottom = math.Inf(1), math.Inf(-1)
	for i := range len(l.points) - 1 {
		a, b := l.points[i], l.points[i+1]
		if b.X < from || a.X > to {
			continue
		}
		for _, x := range []float64{max(a.X, from), min(b.X, to)} {
			y := a.Y
			if b.X > a.X {
				y += (b.Y - a.Y) * (x - a.X) / (b.X - a.X)
			}
			top, bottom = min(top, y), max(bottom, y)
		}
	}
	return top, bottom, top <= bottom
}

// drawScale draws the scale of temperatures, behind the glass.
func (s *section) drawScale(c *Canvas) {
	h := &s.heat
	axis := s.at.Right() - scaleRight
	step := 1.0
	for _, v := range []float64{1, 2, 5, 10, 20, 50, 100, 200, 500, 1000} {
		if step = v; s.heatY(0)-s.heatY(step) >= 3.6 {
			break
		}
	}
	for v := math.Ceil(h.FromC/step-1e-9) * step; v <= h.ToC+1e-9*step; v += step {
		y := s.heatY(v)
		stroke := Stroke{Colour: Hair, Width: 0.12}
		if v == 0 {
			stroke.Colour = Faint
		}
		c.Line(s.at.X, y, axis+0.9, y, stroke)
		c.Text(axis+1.5, y+scaleType.CapHeight()/2, degrees(v+0), scaleType)
	}
	c.Text(axis+1.5, s.body.Y+0.4, "°C", scaleType)
}

// drawLines draws the lines over the glass, each in a casing of paper.
func (s *section) drawLines(c *Canvas) {
	for _, l := range s.heat.lines {
		c.Polyline(l.points, Stroke{Colour: Paper, Width: heatCasing})
	}
	for _, l := range s.heat.lines {
		c.Polyline(l.points, l.stroke)
		for i, text := range l.label {
			b := Box(l.labelAt.X, l.labelAt.Y+float64(i)*conditionType.Leading(), text, conditionType)
			c.Rectangle(Rect{b.X, b.Bottom() - conditionType.MM()*descender - conditionType.CapHeight() - 0.2, b.W + 0.4, conditionType.CapHeight() + 0.4}, Stroke{}, Paper)
		}
		c.Lines(l.labelAt.X, l.labelAt.Y, l.label, conditionType)
	}
}

// drawFigures draws what stands above the glass: the sides, the numbers of the surfaces, and below them
// the temperatures of the air and the surfaces.
func (s *section) drawFigures(c *Canvas) {
	h := &s.heat
	y := s.at.Y + numberType.CapHeight() + 0.4
	sun(c, s.at.X+2.3, s.at.Y+2.3)
	c.Text(s.at.X+airLeft, y, "outside", labelType.To(Right))
	c.Text(s.at.Right(), y, "inside", labelType.To(Right))
	for i, l := range h.lines {
		bottom := y + 1 + float64(i+1)*h.rowTall
		middle := bottom - surfaceType.CapHeight()/2
		if h.turned {
			middle = bottom - h.rowTall/2
		}
		c.Line(s.at.X, middle, s.at.X+sampleWide, middle, l.stroke)
		put := func(x float64, text string, t Type) {
			if !h.turned {
				c.Text(x, bottom, text, t)
				return
			}
			if t.Align == Right {
				x -= t.CapHeight()/2 + descender*t.MM()
			}
			t.Align, t.Turn = Left, 90
			c.Text(x+t.CapHeight()/2, bottom, text, t)
		}
		n := len(l.figures) - 1
		put(s.at.X+airLeft, l.figures[0], surfaceType.To(Right))
		for k, text := range l.figures[1:n] {
			put(s.numbers[k], text, surfaceType)
		}
		put(s.at.Right(), l.figures[n], surfaceType.To(Right))
	}
}

// The marks of keys, and the text after them.
const keyMark, keyIndent = 7.5, 9.0

// wrapKey breaks what is said of the lines, in a width.
func (s *section) wrapKey(w float64) {
	for i := range s.heat.lines {
		l := &s.heat.lines[i]
		l.key = Wrap(s.keyText(l.id), w-keyIndent, noteType)
	}
}

// keyText says what a line is.
func (s *section) keyText(id string) string {
	return id + ": " + conditionWords(s.r, s.r.Balance(id)) + "."
}

// drawKey says what the lines are, and returns where the line that would follow stands.
func (s *section) drawKey(c *Canvas, x, y float64) float64 {
	for _, l := range s.heat.lines {
		y = lineKey(c, x, y, l.stroke, l.key)
	}
	return y
}

// lineKey sets what a line is after its stroke, and returns where the line that would follow stands.
func lineKey(c *Canvas, x, y float64, stroke Stroke, lines []string) float64 {
	if lines != nil {
		c.Line(x, y-0.7, x+keyMark, y-0.7, stroke)
	}
	return c.Lines(x+keyIndent, y, lines, noteType)
}

// temperatureText tells the lines of a section in words.
func temperatureText(r *glazing.Rating, t Temperatures) (parts []string) {
	for _, id := range t.Conditions {
		b := r.Balance(id)
		if b == nil || !b.SurfaceC(0).Known {
			continue
		}
		list := surfaceFigures(r, id)
		parts = append(parts, fmt.Sprintf("Temperatures in %s, %s: surfaces 1 to %d %s °C.", id, conditionWords(r, b), len(list), strings.Join(list, ", ")))
	}
	return parts
}
