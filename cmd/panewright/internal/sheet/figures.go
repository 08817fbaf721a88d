package sheet

// The table of figures of a make-up, and its colours.

import (
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
	"panewright/spectra/colour"
)

// tableTints is how many tints stand in one table.
const tableTints = 12

// onPaper reports whether a figure stands in the table of a sheet: colours, surfaces, gaps, thermal
// stress and what is under a condition have their own places, and an emissivity has one here where it differs between tints.
func onPaper(f glazing.Figure, k int, varying []bool) bool {
	switch {
	case f.Alias == "emissivity":
		return varying[k]
	case f.Symbol == "" || f.Value == nil || f.Condition != "" || f.Per == glazing.PerGap || f.Per == glazing.PerSurface:
		return false
	case strings.HasPrefix(f.Key, "colour.") && f.Alias != "ra", strings.HasPrefix(f.Key, "thermal_stress."), f.Alias == "thickness", f.Alias == "mass":
		return false
	}
	return true
}

// varyingSurfaces says of each surface whether its emissivity differs between tints.
func varyingSurfaces(ratings []*glazing.Rating) []bool {
	list := make([]bool, len(ratings[0].Surfaces))
	for k := range list {
		first := ratings[0].Surfaces[k].Corrected
		list[k] = slices.ContainsFunc(ratings, func(r *glazing.Rating) bool { return r.Surfaces[k].Corrected != first })
	}
	return list
}

// figureTables lists the figures of a make-up, a column a tint, in tables that hold so many tints.
func (p *paper) figureTables(ratings []*glazing.Rating, w float64) (tables []*grid) {
	varying := varyingSurfaces(ratings)
	for first := 0; first < len(ratings); first += tableTints {
		part := ratings[first:min(first+tableTints, len(ratings))]
		tables = append(tables, p.figureTable(part, first, len(ratings) > tableTints, varying, w))
	}
	return tables
}

// figureTable is the table of the tints whose numbers begin after first.
func (p *paper) figureTable(ratings []*glazing.Rating, first int, numbered bool, varying []bool, w float64) *grid {
	const symbolW, meaningW, clauseW = 8.6, 50.7, 25.4
	n := float64(len(ratings))
	valueW := min(20, (w-symbolW-meaningW-clauseW)/n)
	value, strong, clause := textType, textType, draw.Type{Size: 6, Colour: draw.Soft}
	if valueW < 9 {
		value.Size = 6.8
	}
	strong.Face = draw.Semibold
	for _, r := range ratings {
		for _, alias := range headlines {
			if f, ok := named(p.r.Figures, alias); ok {
				strong = fitted(f.Print(r, 0), valueW-gridGap, strong, 5)
			}
		}
	}
	value.Size = min(value.Size, strong.Size)
	g := &grid{height: 3.6, strong: map[int]bool{}, types: map[[2]int]draw.Type{}, bare: len(ratings) == 1}
	meaning := symbolType
	meaning.Size = 7.2
	g.cols = []col{{w: symbolW, t: symbolType}, {w: w - symbolW - clauseW - valueW*n, t: meaning}}
	heads, key := tintHeads(ratings, first, numbered, valueW-gridGap)
	for i := range ratings {
		g.cols = append(g.cols, col{w: valueW, align: draw.Right, t: value, head: heads[i]})
	}
	g.cols = append(g.cols, col{w: clauseW, t: clause, head: "defined in"})
	if key != nil {
		g.note = "Tints: " + strings.Join(key, ", ") + ". "
	}
	unsaid := false
	for _, f := range p.r.Figures {
		for k := range f.Count(ratings[0]) {
			if !onPaper(f, k, varying) {
				continue
			}
			what := p.worded(f.Meaning)
			switch f.Per {
			case glazing.PerPane:
				what += ", pane " + strconv.Itoa(k+1)
			case glazing.PerSurface:
				what += ", surface " + strconv.Itoa(k+1)
			}
			if f.Unit != "" {
				what += ", " + f.Unit
			}
			row := []string{draw.Symbol(f.Symbol), what}
			for _, r := range ratings {
				row = append(row, f.Print(r, k))
			}
			if slices.Contains(headlines, f.Alias) {
				g.strong[len(g.rows)] = true
				g.types[[2]int{len(g.rows), len(row)}] = clause
			}
			unsaid = unsaid || slices.Contains(row, unknown)
			g.rows = append(g.rows, append(row, clauseOf(f.ClauseUnder(ratings[0].Method.Basis), ratings[0].Method.Basis)))
		}
	}
	if unsaid {
		g.note += unknown + " is not known; a caution says why. "
	}
	if name := ratings[0].Method.Basis.Name; name != glazing.EN.Name && name != glazing.ISO.Name {
		g.note += "Clauses say where a quantity is defined; its weights are those of the basis. "
	}
	g.note += "Rounded as the standards round; " + attachedName + " in this file has all digits."
	return g
}

// tintHeads are the names of tints, or their numbers where a name is too long for its column or one
// table does not hold all; then the key to them is returned too, tint by tint.
func tintHeads(ratings []*glazing.Rating, first int, numbered bool, w float64) (heads, key []string) {
	var numbers []string
	long := false
	for i, r := range ratings {
		number := strconv.Itoa(first + i + 1)
		heads, numbers = append(heads, r.Tint), append(numbers, number)
		key = append(key, number+"\u00a0"+r.Tint)
		long = long || draw.Width(r.Tint, softType) > w
	}
	if numbered || long && len(ratings) > 1 {
		return numbers, key
	}
	return heads, nil
}

// clauseOf returns the clause of a figure that belongs to a basis, where it names one for each.
func clauseOf(s string, b glazing.Basis) string {
	want := "EN"
	if b.Name == glazing.ISO.Name || b.Name == glazing.ISO15099.Name {
		want = "ISO"
	}
	for part := range strings.SplitSeq(s, "; ") {
		if strings.HasPrefix(part, want+" ") {
			return part
		}
	}
	return s
}

// appearances are the three colours of a make-up, with the ends of the names of their figures.
var appearances = []struct {
	name, alias string
	of          func(*glazing.Rating) glazing.Colours
}{
	{"seen through", "transmitted", func(r *glazing.Rating) glazing.Colours { return r.Transmitted }},
	{"from outside", "outside", func(r *glazing.Rating) glazing.Colours { return r.Outside }},
	{"from inside", "inside", func(r *glazing.Rating) glazing.Colours { return r.Inside }},
}

// labFigures returns L*, a* and b* of an appearance, as they are printed.
func (p *paper) labFigures(r *glazing.Rating, alias string) (list []string) {
	for _, axis := range []string{"l_", "a_", "b_"} {
		if f, ok := named(p.r.Figures, axis+alias); ok {
			list = append(list, strings.Replace(f.Print(r, 0), "-", "−", 1))
		}
	}
	return list
}

func (p *paper) rendering(r *glazing.Rating) string {
	f, _ := named(p.r.Figures, "ra")
	return f.Print(r, 0)
}

// patch sets the colour of an appearance, and reports whether a screen can show it.
func (p *paper) patch(box draw.Rect, k glazing.Colours) (inside bool) {
	if k.Why != "" {
		p.c.Rectangle(box, hair, draw.Paper)
		p.c.Text(box.X+box.W/2, box.Y+(box.H+noteType.CapHeight())/2, "not known", noteType.To(draw.Centre))
		return true
	}
	c, inside := draw.Swatch(k.TwoDegree)
	p.c.Rectangle(box, draw.Stroke{Colour: draw.Faint, Width: 0.15}, c)
	return inside
}

// labHeads are the heads of the columns of colours; markup.
var labHeads = []string{"L*", "a*", "b*"}

const patchesNote = "Patches are sRGB of the computed colour under daylight D65, 2° observer: an indication only."

// clippedNote returns what is said of colours beyond what screens show.
func clippedNote(ratings []*glazing.Rating) string {
	for _, r := range ratings {
		for _, a := range appearances {
			if k := a.of(r); k.Why == "" && !shown(k.TwoDegree) {
				return patchesNote + " Some lie beyond what sRGB holds; the nearest is shown."
			}
		}
	}
	return patchesNote
}

func shown(l colour.Lab) bool {
	_, inside := draw.Swatch(l)
	return inside
}

// colour sets the colours of one rating in a column, a row an appearance.
func (p *paper) colour(r *glazing.Rating, x, w float64) block {
	const nameW, figureW, rowTall = 17.0, 9.0, 5.4
	note := draw.Wrap(clippedNote([]*glazing.Rating{r}), w, noteType)
	patchW := w - nameW - 4*figureW - 2
	symbol := softType.To(draw.Right)
	symbol.Markup = true
	figure := textType.To(draw.Right)
	b := block{tall: headTall + 3.4 + rowTall*float64(len(appearances)) + 1 + float64(len(note))*noteType.Leading()}
	b.set = func(y float64) {
		y = heading(p.c, x, y, w, "Colour") + 3.4
		columns := x + nameW + patchW + 2
		for i, s := range append(labHeads, draw.Symbol("Ra")) {
			p.c.Text(columns+float64(i+1)*figureW, y-1.4, s, symbol)
		}
		for i, a := range appearances {
			base := y + (rowTall+textType.CapHeight())/2
			p.c.Line(x, y, x+w, y, hair)
			p.c.Text(x, base, a.name, smallType)
			p.patch(draw.Rect{X: x + nameW, Y: y + 0.6, W: patchW, H: rowTall - 1.2}, a.of(r))
			list := p.labFigures(r, a.alias)
			if i == 0 {
				list = append(list, p.rendering(r))
			}
			for k, s := range list {
				p.c.Text(columns+float64(k+1)*figureW, base, s, figure)
			}
			y += rowTall
		}
		p.c.Line(x, y, x+w, y, hair)
		p.c.Lines(x, y+1+noteType.CapHeight()+0.4, note, noteType)
	}
	return b
}

// colourTable sets the colours of several tints, a row a tint, over pages if need be.
func (p *paper) colourTable(ratings []*glazing.Rating) {
	const nameW, figureW, groupGap, rowLeast = 31.0, 8.2, 4.6, 4.9
	const patchW = (width - nameW - 10*figureW - 2*groupGap) / 3
	symbol := softType.To(draw.Right)
	symbol.Markup = true
	figure := smallType.To(draw.Right)
	starts := []float64{left + nameW}
	for i := range appearances[1:] {
		x := starts[i] + patchW + 3*figureW + groupGap
		if i == 0 {
			x += figureW
		}
		starts = append(starts, x)
	}
	heads := func() {
		base := p.y + softType.CapHeight() + 0.6
		p.c.Text(left, base, "tint", softType)
		for i, a := range appearances {
			p.c.Text(starts[i], base, a.name, softType)
			list := labHeads
			if i == 0 {
				list = append(slices.Clip(list), draw.Symbol("Ra"))
			}
			for k, s := range list {
				p.c.Text(starts[i]+patchW+float64(k+1)*figureW, base, s, symbol)
			}
		}
		p.y += 3.8
		p.c.Line(left, p.y, right, p.y, faint)
	}
	note := draw.Wrap(clippedNote(ratings), width, noteType)
	p.room(headTall + 3.8 + rowLeast*float64(min(len(ratings), 6)) + 4)
	p.y = heading(p.c, left, p.y, width, "Colour in each tint")
	heads()
	for number, r := range ratings {
		lines := draw.Wrap(r.Tint, nameW-7, smallType)
		h := max(rowLeast, float64(len(lines)-1)*smallType.Leading()+rowLeast)
		if p.y+h+4 > bottom {
			p.next()
			heads()
		}
		base := p.y + (rowLeast+smallType.CapHeight())/2
		p.c.Text(left, base, strconv.Itoa(number+1), smallType)
		p.c.Lines(left+5.5, base, lines, smallType)
		for i, a := range appearances {
			p.patch(draw.Rect{X: starts[i], Y: p.y + 0.55, W: patchW, H: rowLeast - 1.1}, a.of(r))
			list := p.labFigures(r, a.alias)
			if i == 0 {
				list = append(list, p.rendering(r))
			}
			for k, s := range list {
				p.c.Text(starts[i]+patchW+float64(k+1)*figureW, base, s, figure)
			}
		}
		p.y += h
		p.c.Line(left, p.y, right, p.y, hair)
	}
	p.c.Lines(left, p.y+1+noteType.CapHeight()+0.4, note, noteType)
	p.y += 1 + float64(len(note))*noteType.Leading() + apart
}
