package sheet

// The table of figures of a make-up with plot and colours beside it, or above and below where tints
// are many.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

// tableTints is how many tints stand in one table.
const tableTints = 12

// figures sets the table, the plots of spectra and the colours.
func (p *paper) figures(ratings []*glazing.Rating) {
	if len(ratings) == 1 {
		const gap = 6.0
		curves := draw.MakeupCurves(ratings[0])
		g := p.figureTable(ratings, 102)
		x := left + gridWidth(g) + gap
		rest := right - x
		h := draw.PlotHeight(curves, rest, 36)
		p.room(max(g.tall()+9, h+40))
		y := heading(p.c, left, p.y, gridWidth(g)-gridGap, "Figures at normal incidence")
		lowest := g.all(p.c, left, y-3.5)
		y = heading(p.c, x, p.y, rest, "Spectra") - 2
		draw.Plot(p.c, draw.Rect{X: x, Y: y, W: rest, H: h}, curves)
		y = heading(p.c, x, y+h+3, rest, "Colour")
		p.y = max(lowest, p.colours(ratings, x, y-2, rest)) + 4
		return
	}
	p.plots(ratings)
	p.room(22)
	y := heading(p.c, left, p.y, width, "Colour")
	p.y = p.colours(ratings, left, y-2, width) + 4
	for part := range slices.Chunk(ratings, tableTints) {
		g := p.figureTable(part, width)
		p.room(min(g.tall()+9, bottom-top-20))
		heading(p.c, left, p.y, width, "Figures at normal incidence")
		p.y += 4.5
		p.flow(g)
		p.y += 5
	}
}

// plots sets the transmittances of all tints, and the reflectances of the lightest and the darkest
// beside them.
func (p *paper) plots(ratings []*glazing.Rating) {
	const gap = 6.0
	w := (width - gap) / 2
	lightest, darkest := extremes(ratings)
	var mirrored []draw.Curve
	for _, r := range []*glazing.Rating{lightest, darkest} {
		for _, c := range draw.MakeupCurves(r)[1:] {
			c.Name, c.Stroke, c.Tag = c.Name+", "+draw.Escape(r.Tint), draw.Stroke{}, ""
			mirrored = append(mirrored, c)
		}
	}
	for part := range slices.Chunk(draw.TintCurves(ratings), draw.MaxCurves) {
		h := max(draw.PlotHeight(part, w, 38), draw.PlotHeight(mirrored, w, 38))
		p.room(h + 10)
		y := heading(p.c, left, p.y, w, "Transmittance in each tint") - 2
		draw.Plot(p.c, draw.Rect{X: left, Y: y, W: w, H: h}, part)
		if mirrored != nil {
			heading(p.c, left+w+gap, p.y, w, "Reflectance, lightest and darkest tint")
			draw.Plot(p.c, draw.Rect{X: left + w + gap, Y: y, W: w, H: h}, mirrored)
			mirrored = nil
		}
		p.y = y + h + 5
	}
}

func gridWidth(g *grid) (sum float64) {
	for _, c := range g.cols {
		sum += c.w
	}
	return sum
}

// onPaper reports whether a figure stands in the table of a sheet: colours, surfaces and gaps have
// their own places.
func onPaper(f glazing.Figure) bool {
	switch {
	case f.Symbol == "" || f.Value == nil || f.Per == glazing.PerGap || f.Per == glazing.PerSurface:
		return false
	case strings.HasPrefix(f.Key, "colour.") && f.Alias != "ra", f.Alias == "thickness", f.Alias == "mass":
		return false
	}
	return true
}

// figureTable lists the figures of ratings, a column a tint.
func (p *paper) figureTable(ratings []*glazing.Rating, w float64) *grid {
	const symbolW, clauseW, meaningW = 10.0, 27.0, 52.0
	valueW := min(14, (w-symbolW-clauseW-meaningW)/float64(len(ratings)))
	valueType := textType
	if valueW < 9 {
		valueType.Size = 6.4
	}
	g := &grid{height: 3.6, strong: map[int]bool{}}
	g.cols = []col{{w: symbolW, t: symbolType, head: ""}, {w: w - symbolW - clauseW - valueW*float64(len(ratings)), t: textType}}
	g.cols[1].t.Size = 7.2
	for _, r := range ratings {
		g.cols = append(g.cols, col{w: valueW, align: draw.Right, t: valueType, head: r.Tint})
	}
	g.cols = append(g.cols, col{w: clauseW, t: softType, head: "defined in"})
	g.cols[len(g.cols)-1].t.Size = 5.9
	for _, f := range p.r.Figures {
		if !onPaper(f) {
			continue
		}
		for k := range f.Count(ratings[0]) {
			what := f.Meaning
			symbol := draw.Symbol(f.Symbol)
			if f.Per == glazing.PerPane {
				what += ", pane " + strconv.Itoa(k+1)
			}
			if f.Unit != "" {
				what += ", " + f.Unit
			}
			row := []string{symbol, what}
			for _, r := range ratings {
				row = append(row, f.Print(r, k))
			}
			if slices.Contains(headlines, f.Alias) {
				g.strong[len(g.rows)] = true
			}
			g.rows = append(g.rows, append(row, clauseOf(f.Clause, ratings[0].Method.Basis)))
		}
	}
	return g
}

// clauseOf returns the clause of a figure that belongs to a basis, where it names one for each.
func clauseOf(s string, b glazing.Basis) string {
	want := "EN"
	if b.Name == glazing.ISO.Name || b.Name == glazing.ISO15099.Name {
		want = "ISO"
	}
	parts := strings.Split(s, "; ")
	for _, x := range parts {
		if strings.HasPrefix(x, want+" ") {
			return x
		}
	}
	return strings.Join(parts, "; ")
}

// appearances are the three colours of a make-up.
var appearances = []struct {
	name string
	of   func(*glazing.Rating) glazing.Colours
}{
	{"seen through", func(r *glazing.Rating) glazing.Colours { return r.Transmitted }},
	{"from outside", func(r *glazing.Rating) glazing.Colours { return r.Outside }},
	{"from inside", func(r *glazing.Rating) glazing.Colours { return r.Inside }},
}

// colours sets patches with L*a*b* and returns the y below them: of one rating the figures stand
// below the patches, of several beside them, a row a tint.
func (p *paper) colours(ratings []*glazing.Rating, x, y, w float64) float64 {
	patch, label, beside := 6.0, 0.0, 0.0
	if len(ratings) > 1 {
		patch, label, beside = 4.2, 20, 22
	}
	cell := (w - label) / 3
	y += 2
	for i, a := range appearances {
		p.c.Text(x+label+float64(i)*cell, y, a.name, softType)
	}
	y += 1.5
	clipped := false
	for _, r := range ratings {
		lines := draw.Wrap(r.Tint, label-1.5, smallType)
		if len(ratings) == 1 {
			lines = nil
		}
		h := max(patch+1, float64(len(lines))*smallType.Leading()+0.6)
		if y+h > bottom {
			p.next()
			y = p.y
		}
		p.c.Lines(x, y+(patch+smallType.CapHeight())/2, lines, smallType)
		for i, a := range appearances {
			at := x + label + float64(i)*cell
			box := draw.Rect{X: at, Y: y, W: cell - 2 - beside, H: patch}
			k := a.of(r)
			if k.Why != "" {
				p.c.Rectangle(box, hair, draw.Paper)
				p.c.Text(at+1, y+(patch+softType.CapHeight())/2, "not known", softType)
				continue
			}
			c, inside := draw.Swatch(k.TwoDegree)
			clipped = clipped || !inside
			p.c.Rectangle(box, draw.Stroke{Colour: draw.Faint, Width: 0.15}, c)
			text := fmt.Sprintf("%s  %s  %s", glazing.PrintRounded(k.TwoDegree.L, 1), minus(k.TwoDegree.A), minus(k.TwoDegree.B))
			if beside > 0 {
				p.c.Text(box.Right()+1.5, y+(patch+smallType.CapHeight())/2, text, fitted(text, beside-1, smallType, 4.5))
			} else {
				p.c.Text(at, y+patch+2.7, text, fitted(text, cell-2, smallType, 4.5))
			}
		}
		y += h
	}
	if beside == 0 {
		y += 3.6
	}
	note := "The figures are L*, a*, b*. " + patchesNote
	if clipped {
		note += " Some lie outside what sRGB holds; the nearest is shown."
	}
	return paragraph(p.c, x, y+1.8, w, note, draw.Type{Size: 5.8, Colour: draw.Soft})
}

// minus prints a number with one decimal and a true minus.
func minus(v float64) string {
	return strings.Replace(glazing.PrintRounded(v, 1), "-", "−", 1)
}
