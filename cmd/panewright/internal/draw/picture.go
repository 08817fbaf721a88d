package draw

// Pictures that stand for themselves: a section or a plot with a title, what is drawn, and whence.

import (
	"fmt"
	"strings"

	"panewright/glazing"
)

// A Heading is what stands above and below a picture.
type Heading struct {
	Title string // the make-up
	About string // the project
	Foot  string // the program, the digest of what it read
}

// The type of pictures.
var (
	pictureTitle   = Type{Face: Semibold, Size: 11}
	pictureCaption = Type{Face: Semibold, Size: 8}
	pictureText    = Type{Size: 7.5, Colour: Soft}
	keyNumber      = Type{Face: Semibold, Size: 7.5}
	keyText        = Type{Size: 7.5}
	keyDetail      = Type{Size: 6.8, Colour: Soft}
)

// Lengths of pictures, in mm.
const (
	pictureWide   = 190.0
	pictureMargin = 10.0
	sectionWide   = 84.0
	sectionApart  = 8.0  // from the list of panes
	sectionPair   = 83.0 // each of two beside each other
	plotTall      = 70.0
)

// head sets the heading of a picture, and returns where it ends.
func (h Heading) head(c *Canvas) float64 {
	w := c.W - 2*pictureMargin
	y := pictureMargin + pictureTitle.CapHeight()
	y = c.Lines(pictureMargin, y, Wrap(h.Title, w, pictureTitle), pictureTitle)
	y = c.Lines(pictureMargin, y, Wrap(h.About, w, pictureText), pictureText)
	return y + 1.5
}

// foot sets what stands below, and makes the canvas end there.
func (h Heading) foot(c *Canvas, y float64) {
	c.Line(pictureMargin, y, c.W-pictureMargin, y, Stroke{Colour: Hair, Width: 0.14})
	y = c.Lines(pictureMargin, y+noteType.Leading()+0.6, Wrap(h.Foot, c.W-2*pictureMargin, noteType), noteType)
	c.H = y - noteType.Leading() + pictureMargin*0.8
}

// SectionPicture draws the sections of ratings of one make-up, one for each tint, with the
// temperatures of conditions, and a list of the panes and gaps.
func SectionPicture(ratings []*glazing.Rating, conditions []string, h Heading) *Canvas {
	c := New(pictureWide, pictureWide)
	first := ratings[0]
	t := TemperaturesOf(ratings, conditions)
	y := h.head(c)
	right := pictureMargin + sectionWide + sectionApart
	if len(ratings) == 1 {
		tall := SectionHeight(first, t, sectionWide, 42)
		if first.Tint != "" {
			c.Text(pictureMargin, y+3, "tint "+first.Tint, pictureCaption)
			y += 5
		}
		Section(c, Rect{pictureMargin, y, sectionWide, tall}, first, t)
		end := sectionKey(c, Rect{X: right, Y: y, W: c.W - pictureMargin - right}, first, true)
		h.foot(c, max(y+tall, end)+3)
		return c
	}
	var said below
	pairTall := 56.0
	if len(t.Conditions) > 0 {
		pairTall += 10
	}
	for i := 0; i < len(ratings); i += 2 {
		row := ratings[i:min(i+2, len(ratings))]
		tall, captions := 0.0, 0
		for _, r := range row {
			captions = max(captions, len(Wrap("tint "+r.Tint, sectionPair, pictureCaption)))
		}
		for k, r := range row {
			x := pictureMargin + float64(k)*(c.W-2*pictureMargin-sectionPair)
			c.Lines(x, y+3, Wrap("tint "+r.Tint, sectionPair, pictureCaption), pictureCaption)
			s := plan(r, Rect{x, y + 2.4 + float64(captions)*pictureCaption.Leading(), sectionPair, pairTall}, t, 0, false)
			tall = s.at.Y + s.at.H - y
			said.add(s)
			c.Group("Section in tint "+r.Tint+", outside at the left", SectionText(r, t), func() { s.draw(c) })
		}
		y += tall + 3
	}
	w := c.W - 2*pictureMargin
	y = said.draw(c, pictureMargin, y, w)
	h.foot(c, sectionKey(c, Rect{X: pictureMargin, Y: y + 1, W: w}, first, false)+3)
	return c
}

// sectionKey lists the panes and gaps of a make-up, with or without what its tint settles, and
// returns where the list ends.
func sectionKey(c *Canvas, at Rect, r *glazing.Rating, tint bool) float64 {
	const numbers, mm = 12.0, 13.0
	m := r.Makeup
	y := at.Y
	row := func(number, name, width string, details []string) {
		c.Line(at.X, y, at.Right(), y, Stroke{Colour: Hair, Width: 0.12})
		base := y + keyText.CapHeight() + 1.5
		c.Text(at.X, base, number, keyNumber)
		c.Text(at.Right(), base, width, keyText.To(Right))
		t := keyText
		if number == "" {
			t = keyText.In(Soft)
		}
		base = c.Lines(at.X+numbers, base, Wrap(name, at.W-numbers-mm, t), t)
		base = c.Lines(at.X+numbers, base, Wrap(strings.Join(details, "; "), at.W-numbers-mm, keyDetail), keyDetail)
		y = base - keyDetail.Leading() + 1.5
	}
	for k, p := range m.Panes {
		row(fmt.Sprintf("%d  %d", 2*k+1, 2*k+2), p.Pane.ID, millimetres(p.Pane.ThicknessMM())+" mm", paneDetails(r, k, tint))
		if k < len(m.Gaps) {
			row("", strings.Join(gasOf(m.Gaps[k]), ", "), millimetres(m.Gaps[k].WidthMM)+" mm", nil)
		}
	}
	c.Line(at.X, y, at.Right(), y, Stroke{Colour: Hair, Width: 0.12})
	return y
}

// paneDetails says what a pane is, beside its name and thickness.
func paneDetails(r *glazing.Rating, k int, tint bool) (list []string) {
	p := r.Makeup.Panes[k]
	if p.Turned {
		list = append(list, "turned")
	}
	if p.Pane.Tintable() {
		if tint {
			list = append(list, "tint "+p.Pane.Tints[r.Ready.States[r.State].Tints[k]].Name)
		}
		list = append(list, "switches")
	}
	if len(p.Pane.Plies) > 1 {
		var plies []string
		for i := range p.Pane.Plies {
			if p.Turned {
				i = len(p.Pane.Plies) - 1 - i
			}
			plies = append(plies, millimetres(p.Pane.Plies[i].ThicknessMM))
		}
		list = append(list, "laminate, from outside "+strings.Join(plies, "\u00a0+\u00a0")+"\u00a0mm")
	}
	if p.Pane.HeatTreatment != "" && p.Pane.HeatTreatment != glazing.UnknownTreatment {
		list = append(list, string(p.Pane.HeatTreatment))
	}
	for i, e := range r.Surfaces[2*k : 2*k+2] {
		if e.Corrected.Known && e.Corrected.Number < lowEmissivity && tint {
			list = append(list, fmt.Sprintf("ε\u00a0%s on surface\u00a0%d", glazing.PrintRounded(e.Corrected.Number, 3), 2*k+i+1))
		}
	}
	if p.Pane.Origin != "" {
		list = append(list, string(p.Pane.Origin)+" spectrum")
	}
	return list
}

// PlotPicture draws curves with a heading.
func PlotPicture(curves []Curve, h Heading) *Canvas {
	c := New(pictureWide, pictureWide)
	y := h.head(c) + 1
	tall := PlotHeight(curves, c.W-2*pictureMargin, plotTall)
	Plot(c, Rect{pictureMargin, y, c.W - 2*pictureMargin, tall}, curves)
	h.foot(c, y+tall+3)
	return c
}
