package draw

// The plot of spectra: fractions of one over wavelength.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// A Curve is a curve of a plot. NaN stands for what is not known, and leaves a gap.
type Curve struct {
	Name  string // markup
	Tag   string // markup, a letter or two that stand on the curve and before its name; its number if blank
	NM    []float64
	Value []float64
	// Stroke is how the curve is drawn; the zero value stands for one of a row of strokes that
	// darkens from the first curve to the last and differs in dashes.
	Stroke Stroke
}

// MaxCurves is how many curves a plot tells apart.
const MaxCurves = 12

// The range of plots in nm, that of solar radiation, and the visible range in it.
const (
	plotFromNM, plotToNM       = 300.0, 2500.0
	visibleFromNM, visibleToNM = 380.0, 780.0
	plotStepNM                 = 5.0
)

// The type of plots.
var (
	axisType   = Type{Size: 6.5, Colour: Soft, Align: Centre}
	legendType = Type{Size: 7}
	tagType    = Type{Face: Semibold, Size: 6.8, Align: Centre, Markup: true}
)

// Lengths of a plot on paper, in mm.
const (
	axisLeft     = 9.6
	axisRight    = 3.0 // half of the last label
	axisTop      = 4.6
	axisBottom   = 7.6
	curveWide    = 0.42
	sampleLong   = 6.5 // of a curve in the legend
	legendApart  = 5.0
	legendLeast  = 22.0
	legendBeside = 86.0 // the narrowest plot with its legend beside it
	frameLeast   = 25.0
)

// dashes are those of curves, in turn.
var dashes = [][]float64{nil, {2.2, 0.8}, {0.45, 0.75}, {2.8, 0.7, 0.45, 0.7}}

// strokes returns those of curves of one kind.
func strokes(n int) (list []Stroke) {
	light := RGB(0x6d, 0x8a, 0xa1)
	for i := range n {
		share := 0.0
		if n > 1 {
			share = float64(i) / float64(n-1)
		}
		list = append(list, Stroke{Colour: mix(light, Ink, share), Width: curveWide, Dash: dashes[i%len(dashes)]})
	}
	return list
}

// plotNM are the wavelengths at which make-ups are plotted.
func plotNM() (nm []float64) {
	for x := plotFromNM; x <= plotToNM; x += plotStepNM {
		nm = append(nm, x)
	}
	return nm
}

// MakeupCurves returns the curves of a rating in its tint: the transmittance, and the reflectances
// on both sides.
func MakeupCurves(r *glazing.Rating) []Curve {
	s := r.Ready.Spectra(r.State, plotNM())
	return []Curve{
		{"transmittance", "τ", s.WavelengthNM, s.T, Stroke{Colour: Ink, Width: curveWide}},
		{"reflectance, outside", "ρ", s.WavelengthNM, s.RhoOutside, Stroke{Colour: Accent, Width: curveWide, Dash: dashes[1]}},
		{"reflectance, inside", "ρ′", s.WavelengthNM, s.RhoInside, Stroke{Colour: Soft, Width: curveWide, Dash: dashes[3]}},
	}
}

// TintCurves returns the transmittances of ratings, one for each tint.
func TintCurves(ratings []*glazing.Rating) (curves []Curve) {
	for _, r := range ratings {
		s := r.Ready.Spectra(r.State, plotNM())
		curves = append(curves, Curve{Name: Escape(r.Tint), NM: s.WavelengthNM, Value: s.T})
	}
	return curves
}

// A plot is the plan of one.
type plot struct {
	at, frame Rect
	curves    []Curve
	entries   []entry
	beside    bool // the legend stands at the right, else below
	columns   int  // of a legend below, which are filled one after the other
	rows      int
	column    float64
	tag       float64 // width of the widest
}

// An entry is one of the legend.
type entry struct {
	lines []string
	known bool
}

// Plot draws curves into a rectangle of at least PlotHeight, with their legend beside or below
// them. Of more than MaxCurves curves it is an error.
func Plot(c *Canvas, at Rect, curves []Curve) {
	if len(curves) > MaxCurves {
		c.fail(fmt.Errorf("a plot of %d curves; it tells %d apart", len(curves), MaxCurves))
		return
	}
	p := planPlot(at, curves)
	c.Group("Curves over wavelength", PlotText(curves), func() { p.draw(c) })
}

// PlotHeight returns the height in mm that a plot of curves in a width needs, with a frame of a
// height; 0 stands for the least.
func PlotHeight(curves []Curve, width, frame float64) float64 {
	p := planPlot(Rect{W: width}, curves)
	h := axisTop + max(frame, frameLeast) + axisBottom
	if p.beside {
		return max(h, p.besideTall()+axisTop)
	}
	return h + p.belowTall()
}

func planPlot(at Rect, curves []Curve) *plot {
	p := &plot{at: at, curves: slices.Clone(curves)}
	ramp := strokes(len(curves))
	markup := legendType
	markup.Markup = true
	widest := 0.0
	for i := range p.curves {
		v := &p.curves[i]
		if v.Stroke.Width == 0 {
			v.Stroke = ramp[i]
		}
		if v.Tag == "" {
			v.Tag = strconv.Itoa(i + 1)
		}
		p.tag = max(p.tag, Width(v.Tag, tagType))
		known := slices.ContainsFunc(v.Value, func(y float64) bool { return !math.IsNaN(y) })
		if !known {
			v.Name += " (not known)"
		}
		widest = max(widest, Width(v.Name, markup))
		p.entries = append(p.entries, entry{known: known})
	}
	before := sampleLong + p.tag + 3.2
	widest += before
	wrap := func(column float64) {
		for i := range p.entries {
			p.entries[i].lines = Wrap(p.curves[i].Name, column-before, markup)
		}
	}
	p.frame = Rect{at.X + axisLeft, at.Y + axisTop, at.W - axisLeft - axisRight, at.H - axisTop - axisBottom}
	if at.W >= legendBeside {
		column := min(max(widest, legendLeast), 0.34*at.W)
		if wrap(column); p.besideTall() <= max(at.H-axisTop, 40) {
			p.beside, p.column = true, column
			p.frame.W = at.W - axisLeft - legendApart - column
			return p
		}
	}
	p.columns = max(1, min(len(curves), int((at.W-axisLeft)/(widest+legendApart))))
	p.rows = (len(curves) + p.columns - 1) / max(1, p.columns)
	p.column = (at.W - axisLeft) / float64(p.columns)
	wrap(p.column - legendApart)
	p.frame.H -= p.belowTall()
	return p
}

const entryApart = 0.9

func (e entry) tall() float64 { return float64(len(e.lines))*legendType.Leading() + entryApart }

func (p *plot) besideTall() (h float64) {
	for _, e := range p.entries {
		h += e.tall()
	}
	return h
}

// rowTall returns the height of a row of a legend below the plot.
func (p *plot) rowTall(row int) (h float64) {
	for i := row; i < len(p.entries); i += p.rows {
		h = max(h, p.entries[i].tall())
	}
	return h
}

func (p *plot) belowTall() float64 {
	h := 1.5
	for row := range p.rows {
		h += p.rowTall(row)
	}
	return h
}

// x and y place a wavelength and a fraction.
func (p *plot) x(nm float64) float64 {
	return p.frame.X + p.frame.W*(nm-plotFromNM)/(plotToNM-plotFromNM)
}
func (p *plot) y(v float64) float64 { return p.frame.Bottom() - p.frame.H*v }

func (p *plot) draw(c *Canvas) {
	p.axes(c)
	c.Clip(p.frame.Inset(-0.4, -0.4), func() {
		for _, v := range p.curves {
			p.curve(c, v)
		}
	})
	p.tags(c)
	p.legend(c)
}

func (p *plot) axes(c *Canvas) {
	f := p.frame
	line := Stroke{Colour: Hair, Width: 0.12}
	left, right := p.x(visibleFromNM), p.x(visibleToNM)
	c.Rectangle(Rect{left, f.Y, right - left, f.H}, Stroke{}, Wash)
	for i := range 6 {
		v := float64(i) / 5
		c.Line(f.X, p.y(v), f.Right(), p.y(v), line)
		c.Text(f.X-1.4, p.y(v)+axisType.CapHeight()/2, strconv.FormatFloat(v, 'f', 1, 64), axisType.To(Right))
	}
	turned := axisType
	turned.Turn = 90
	c.Text(p.at.X+axisType.CapHeight()+0.3, f.Y+f.H/2, "fraction of one", turned)

	tick := Stroke{Colour: Faint, Width: 0.14}
	c.Line(f.X, f.Bottom(), f.Right(), f.Bottom(), Stroke{Colour: Soft, Width: 0.18})
	for nm := plotFromNM; nm <= plotToNM; nm += 100 {
		long := 0.8
		if nm == plotFromNM || math.Mod(nm, 500) == 0 {
			long = 1.5
			c.Text(p.x(nm), f.Bottom()+1.9+axisType.CapHeight(), strconv.FormatFloat(nm, 'f', 0, 64), axisType)
		}
		c.Line(p.x(nm), f.Bottom(), p.x(nm), f.Bottom()+long, tick)
	}
	c.Text(f.Right(), f.Bottom()+2.3+2*axisType.CapHeight()+1.1, "wavelength in nm", axisType.To(Right))

	y := f.Y - 1.1
	c.Polyline([]Point{{left, f.Y - 0.4}, {left, y}, {right, y}, {right, f.Y - 0.4}}, tick)
	c.Text((left+right)/2, y-0.9, "visible", axisType)
}

// curve draws what is known of a curve within the plot.
func (p *plot) curve(c *Canvas, v Curve) {
	var points []Point
	end := func() {
		switch {
		case len(points) == 1:
			c.Circle(points[0].X, points[0].Y, 0.3, Stroke{}, v.Stroke.Colour)
		case len(points) > 1:
			c.Polyline(thinned(points), v.Stroke)
		}
		points = nil
	}
	for i, nm := range v.NM {
		if y := v.Value[i]; math.IsNaN(y) || nm < plotFromNM || nm > plotToNM {
			end()
		} else {
			points = append(points, Point{p.x(nm), p.y(min(max(y, -0.05), 1.05))})
		}
	}
	end()
}

// thinned leaves out points that lie on the line between those that stay, but for what no eye sees.
func thinned(points []Point) []Point {
	const unseen = 0.008 // mm
	out := points[:1:1]
	for first := 0; first < len(points)-1; {
		last := first + 1
		for next := last + 1; next < len(points) && within(points[first:next+1], unseen); next++ {
			last = next
		}
		out = append(out, points[last])
		first = last
	}
	return out
}

// within reports whether the points between the first and the last lie so close to the line.
func within(points []Point, distance float64) bool {
	a, b := points[0], points[len(points)-1]
	dx, dy := b.X-a.X, b.Y-a.Y
	bound := distance * math.Hypot(dx, dy)
	for _, p := range points[1 : len(points)-1] {
		if math.Abs(dx*(p.Y-a.Y)-dy*(p.X-a.X)) > bound {
			return false
		}
	}
	return true
}

// at returns the value of a curve at a wavelength, NaN where it has none.
func (v Curve) at(nm float64) float64 {
	i, found := slices.BinarySearch(v.NM, nm)
	switch {
	case found:
		return v.Value[i]
	case i == 0 || i == len(v.NM):
		return math.NaN()
	}
	share := (nm - v.NM[i-1]) / (v.NM[i] - v.NM[i-1])
	return v.Value[i-1] + share*(v.Value[i]-v.Value[i-1])
}

func (p *plot) legend(c *Canvas) {
	t := legendType
	t.Markup = true
	put := func(x, y float64, i int) {
		base := y + t.CapHeight()
		if p.entries[i].known {
			c.Line(x, base-t.CapHeight()/2, x+sampleLong, base-t.CapHeight()/2, p.curves[i].Stroke)
		}
		c.Text(x+sampleLong+1.6, base, p.curves[i].Tag, tagType.To(Left))
		c.Lines(x+sampleLong+p.tag+3.2, base, p.entries[i].lines, t)
	}
	if p.beside {
		y := p.frame.Y
		for i, e := range p.entries {
			put(p.at.Right()-p.column, y, i)
			y += e.tall()
		}
		return
	}
	y := p.frame.Bottom() + axisBottom + 1.5
	for row := range p.rows {
		for i := row; i < len(p.entries); i += p.rows {
			put(p.at.X+axisLeft+float64(i/p.rows)*p.column, y, i)
		}
		y += p.rowTall(row)
	}
}

// PlotText tells curves in words, by their values at a few wavelengths.
func PlotText(curves []Curve) string {
	var all []string
	for _, v := range curves {
		var values []string
		for _, nm := range []float64{400, 550, 700, 1000, 2000} {
			text := "not known"
			if y := v.at(nm); !math.IsNaN(y) {
				text = strconv.FormatFloat(y, 'f', 3, 64)
			}
			values = append(values, fmt.Sprintf("%s at %.0f nm", text, nm))
		}
		t := Type{Markup: true}
		name := Type{}.text(plainLetters(t.letters(v.Name)))
		all = append(all, name+": "+strings.Join(values, ", "))
	}
	return "Curves from 300 to 2500 nm. " + strings.Join(all, ". ") + "."
}

// plainLetters puts all letters on the line.
func plainLetters(letters []letter) []letter {
	for i := range letters {
		letters[i].script = onLine
	}
	return letters
}
