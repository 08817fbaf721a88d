package sheet

// The data sheet of one make-up under one basis, in all its tints. The sheet of one tint has drawings
// at the left and tables at the right; that of several begins with the lightest and the darkest.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

// makeup sets the sheet of a make-up from its ratings, one a tint; last says that nothing of the
// document follows.
func (p *paper) makeup(ratings []*glazing.Rating, last bool) {
	m := ratings[0].Makeup
	p.heads(m, ratings[0])
	p.headline(ratings)
	var rest []piece
	if len(ratings) == 1 {
		rest = p.single(ratings[0])
	} else {
		p.switching(ratings)
		rest = p.told(ratings)
	}
	for _, x := range rest {
		x.across()
	}
	if last { // where no schedule says it
		p.columns(list{title: differTitle, items: p.differ()})
	}
	if last && p.r.Project.Notes != "" {
		p.columns(list{title: "Notes of the project", items: []string{p.r.Project.Notes}})
	}
	p.inFull()
	p.sign()
}

// headlines are the figures that stand large.
var headlines = []string{"u", "g", "light", "light_outside", "ra"}

// headline sets the large figures: of a make-up that switches, from its lightest to its darkest
// tint.
func (p *paper) headline(ratings []*glazing.Rating) {
	lightest, darkest := extremes(ratings)
	cell := (width + gutter) / float64(len(headlines))
	label := draw.Type{Size: 6.5, Colour: draw.Soft, Markup: true}
	if lightest != darkest {
		s := "From the lightest tint, " + lightest.Tint + ", to the darkest, " + darkest.Tint
		p.c.Text(left, p.y+softType.CapHeight(), draw.Fit(s, width, softType), softType)
		p.y += 3.6
	}
	lowest := p.y
	for i, alias := range headlines {
		f, ok := named(p.r.Figures, alias)
		if !ok {
			continue
		}
		x := left + float64(i)*cell
		value, unit := f.Print(lightest, 0), f.Unit
		if other := f.Print(darkest, 0); other != value {
			value += " → " + other
		} else if value == unknown {
			unit = ""
		}
		beside := 0.0
		if unit != "" {
			beside = draw.Width(unit, softType) + 1
		}
		t := fitted(value, cell-gutter-beside, numberType, 8)
		p.c.Text(x, p.y+6, value, t)
		p.c.Text(x+draw.Width(value, t)+1, p.y+6, unit, softType)
		lines := draw.Wrap(draw.Symbol(f.Symbol)+"  "+p.worded(f.Meaning), cell-gutter, label)
		lowest = max(lowest, p.c.Lines(x, p.y+10, lines, label))
	}
	p.y = lowest + 0.5
}

// unknown is how a figure is printed that is not known.
const unknown = "–"

// extremes returns the ratings of the highest and the lowest light transmittance.
func extremes(ratings []*glazing.Rating) (lightest, darkest *glazing.Rating) {
	lightest, darkest = ratings[0], ratings[0]
	for _, r := range ratings {
		switch v := r.Light.Transmittance; {
		case !v.Known:
			return ratings[0], ratings[len(ratings)-1]
		case v.Number > lightest.Light.Transmittance.Number:
			lightest = r
		case v.Number < darkest.Light.Transmittance.Number:
			darkest = r
		}
	}
	return lightest, darkest
}

// named returns the figure of a rating that has a short name.
func named(list []glazing.Figure, alias string) (glazing.Figure, bool) {
	i := slices.IndexFunc(list, func(f glazing.Figure) bool { return f.Alias == alias && f.Condition == "" })
	if i < 0 {
		return glazing.Figure{}, false
	}
	return list[i], true
}

// The height of glass in a section, in mm, and how much less it is where room is short, and more where
// there is plenty; so is that of the frame of a plot.
const (
	glassTall, frameTall = 33.0, 36.0
	less, most           = -5.0, 11.0
)

// single sets the sheet of one tint, and returns the pieces that found no place on it.
func (p *paper) single(r *glazing.Rating) (rest []piece) {
	const at = left + drawn + gutter
	ratings := []*glazing.Rating{r}
	tables := []block{p.buildUp(r, written).block(p, at, panesTitle), p.figureTables(ratings, written)[0].block(p, at, figuresTitle)}

	t := draw.TemperaturesOf(ratings, draw.ColdAndHot(r))
	curves := draw.MakeupCurves(r)
	colours := p.colour(r, left, drawn)
	with := func(glass, frame float64) []block {
		section, plot := draw.SectionHeight(r, t, drawn, glass), draw.PlotHeight(curves, drawn, frame)
		return []block{{headTall + section, func(y float64) {
			y = heading(p.c, left, y, drawn, sectionTitle(r))
			draw.Section(p.c, draw.Rect{X: left, Y: y, W: drawn, H: section}, r, t)
		}}, {headTall + plot - 2, func(y float64) {
			y = heading(p.c, left, y, drawn, "Spectra")
			draw.Plot(p.c, draw.Rect{X: left, Y: y - 1, W: drawn, H: plot}, curves)
		}}, colours}
	}
	drawings := with(glassTall+less, frameTall+less)
	space := bottom - p.y
	pieces := append(p.underConditions(ratings), p.told(ratings)...)
	if max(tall(drawings), tall(tables)) > space {
		// the section stands beside the list of panes, the other drawings beside the figures
		drawings = with(glassTall, frameTall)
		p.beside(drawings[:1], tables[:1])
		p.beside(drawings[1:], tables[1:])
		return pieces
	}
	// Each piece stands in the column that ends higher, or in the other; from the first that has no
	// place in either they follow below, across both.
	ends := [2]float64{tall(drawings), tall(tables)}
	var lists [2][]block
	for _, x := range pieces {
		narrow, fits := x.in(left, drawn)
		wide, fitsWide := x.in(at, written)
		blocks := [2]block{narrow, wide}
		column := 0
		if !fits || ends[1] <= ends[0] || ends[0]+apart+blocks[0].tall > space {
			column = 1
		}
		if rest != nil || column == 1 && !fitsWide || ends[column]+apart+blocks[column].tall > space {
			rest = append(rest, x)
			space -= apart + x.tall()
			continue
		}
		ends[column] += apart + blocks[column].tall
		lists[column] = append(lists[column], blocks[column])
	}
	if max(ends[0], ends[1]) > space { // what follows goes over the page
		space = bottom - p.y
	}
	// The drawings are as tall as the tables, within bounds.
	more := (min(ends[1], space)-ends[0])/2 + less
	more = min(max(more, less), most)
	p.beside(append(with(glassTall+more, frameTall+more), lists[0]...), append(tables, lists[1]...))
	return rest
}

const (
	panesTitle   = "Panes and gaps, from outside"
	figuresTitle = "Figures at normal incidence"
)

func sectionTitle(r *glazing.Rating) string {
	if r.Tint == "" {
		return "Section, outside at the left"
	}
	return "Section in tint " + r.Tint
}

// switching sets the sheet of several tints.
func (p *paper) switching(ratings []*glazing.Rating) {
	lightest, darkest := extremes(ratings)
	parts := p.buildUp(lightest, width)
	figures := p.figureTables(ratings, width)
	tables := tall([]block{parts.block(p, left, panesTitle), figures[0].block(p, left, figuresTitle)})
	pair := []*glazing.Rating{lightest, darkest}
	t := draw.TemperaturesOf(pair, draw.ColdAndHot(lightest))
	sections := func(glass float64) block {
		return block{headTall + draw.SectionsHeight(width, gutter, glass, pair, t), func(y float64) {
			for i, r := range pair {
				heading(p.c, left+float64(i)*(half+gutter), y, half, sectionTitle(r))
			}
			draw.Sections(p.c, draw.Rect{X: left, Y: y + headTall, W: width}, gutter, glass, pair, t)
		}}
	}
	more := bottom - p.y - sections(glassTall).tall - apart - tables
	p.block(sections(glassTall + min(max(more, less), most)))
	p.table(panesTitle, parts)
	for i, g := range figures {
		title := figuresTitle
		if i > 0 {
			title += ", further tints"
		}
		p.table(title, g)
	}
	p.paired(p.underConditions(ratings))
	p.plots(ratings, lightest, darkest)
	p.colourTable(ratings)
}

// plots sets the transmittances of all tints, and the reflectances of the lightest and the darkest.
func (p *paper) plots(ratings []*glazing.Rating, lightest, darkest *glazing.Rating) {
	type plot struct {
		title  string
		curves []draw.Curve
	}
	var plots []plot
	curves := draw.TintCurves(ratings)
	for i := range curves {
		curves[i].Tag = strconv.Itoa(i + 1)
	}
	for part := range slices.Chunk(curves, draw.MaxCurves) {
		title := "Transmittance in each tint"
		if len(curves) > len(part) {
			title = "Transmittance in tints " + part[0].Tag + " to " + part[len(part)-1].Tag
		}
		plots = append(plots, plot{title, part})
	}
	mirrored := plot{title: "Reflectance in the lightest and the darkest tint"}
	for _, r := range []*glazing.Rating{lightest, darkest} {
		for _, c := range draw.MakeupCurves(r)[1:] {
			c.Name, c.Tag, c.Stroke = c.Name+", "+draw.Escape(r.Tint), c.Tag+"_{"+strconv.Itoa(slices.Index(ratings, r)+1)+"}", draw.Stroke{}
			mirrored.curves = append(mirrored.curves, c)
		}
	}
	for pair := range slices.Chunk(append(plots, mirrored), 2) {
		var blocks [2][]block
		for i, x := range pair {
			at, h := left+float64(i)*(half+gutter), draw.PlotHeight(x.curves, half, frameTall)
			blocks[i] = []block{{headTall + h - 2, func(y float64) {
				y = heading(p.c, at, y, half, x.title)
				draw.Plot(p.c, draw.Rect{X: at, Y: y - 1, W: half, H: h}, x.curves)
			}}}
		}
		p.beside(blocks[0], blocks[1])
	}
}

// buildUp lists panes and gaps with what is known of them.
func (p *paper) buildUp(r *glazing.Rating, w float64) *grid {
	const surfaceW, mmW, epsilonW = 10.0, 11.0, 10.5
	m := r.Makeup
	g := &grid{height: 4.2, strong: map[int]bool{}, cols: []col{
		{w: surfaceW, t: strongType, head: "surface"},
		{w: w - surfaceW - mmW - 2*epsilonW, t: textType, head: "pane or gap"},
		{w: mmW, align: draw.Right, t: textType, head: "mm"},
		{w: epsilonW, align: draw.Right, t: textType, head: "ε outer"},
		{w: epsilonW, align: draw.Right, t: textType, head: "ε inner"},
	}}
	if len(m.Panes) > 4 {
		g.height = 3.7
		for k := range g.cols {
			g.cols[k].t.Size = 6.6
		}
	}
	typed := false
	for k, placed := range m.Panes {
		row := []string{fmt.Sprintf("%d  %d", 2*k+1, 2*k+2), placed.Pane.ID + "\n" + strings.Join(paneFacts(r, k), ", "), millimetres(placed.Pane.ThicknessMM())}
		for _, e := range r.Surfaces[2*k : 2*k+2] {
			s := unknown
			if e.Corrected.Known {
				s = glazing.PrintRounded(e.Corrected.Number, 3)
			}
			if isTyped(e) {
				s, typed = typedMark+" "+s, true
			}
			row = append(row, s)
		}
		g.rows = append(g.rows, row)
		if k < len(m.Gaps) {
			gap := m.Gaps[k]
			g.rows = append(g.rows, []string{"", gapFacts(gap), millimetres(gap.WidthMM), "", ""})
		}
	}
	g.rows = append(g.rows, []string{"", "together, " + glazing.PrintRounded(r.MassKGM2, 1) + " kg/m²", glazing.PrintRounded(r.ThicknessMM, 1), "", ""})
	g.strong[len(g.rows)-1] = true
	g.note = "ε is the corrected emissivity"
	if r.Tint != "" {
		g.note += " in tint " + r.Tint
	}
	if g.note += ", EN 12898."; typed {
		g.note += " " + typedMark + " typed by the user."
	}
	return g
}

// typedMark stands before figures that the user typed in.
const typedMark = "†"

func isTyped(e glazing.Emissivity) bool {
	return e.Source == glazing.EmissivityGiven || e.Source == glazing.EmissivityGivenNormal
}

// paneFacts says what a pane is, beside its name and thickness.
func paneFacts(r *glazing.Rating, k int) (facts []string) {
	placed := r.Makeup.Panes[k]
	pane := placed.Pane
	if placed.Turned {
		facts = append(facts, "turned")
	}
	if pane.Tintable() {
		switch tint := pane.Tints[r.Ready.States[r.State].Tints[k]].Name; placed.Tint {
		case "":
			facts = append(facts, fmt.Sprintf("switches, %d tints", len(pane.Tints)))
		case glazing.SameTint:
			facts = append(facts, "in the tint of the outermost that switches")
		default:
			facts = append(facts, "in tint "+tint)
		}
	}
	if len(pane.Plies) > 1 {
		var plies []string
		for _, y := range pane.Plies {
			plies = append(plies, millimetres(y.ThicknessMM))
		}
		if placed.Turned {
			slices.Reverse(plies)
		}
		facts = append(facts, "laminate "+strings.Join(plies, "\u00a0+\u00a0")+"\u00a0mm")
	}
	switch {
	case pane.HeatTreatment == glazing.UnknownTreatment || pane.HeatTreatment == "":
		facts = append(facts, "heat treatment not stated")
	case pane.HeatSoaked:
		facts = append(facts, string(pane.HeatTreatment), "heat soaked")
	default:
		facts = append(facts, string(pane.HeatTreatment))
	}
	return append(facts, string(pane.Origin)+" spectrum")
}

// millimetres prints a width without zeros at its end.
func millimetres(mm float64) string { return fmt.Sprintf("%.6g", mm) }

// gapFacts says what is in a gap; of a vacuum, its pressure and pillars are a remark.
func gapFacts(g glazing.Gap) string {
	if v := g.Vacuum; v != nil {
		return fmt.Sprintf("%s\n%.6g Pa, pillars of radius %s mm every %s mm", g.Content(), v.PressurePa, millimetres(v.PillarRadiusMM), millimetres(v.PillarPitchMM))
	}
	return percent(g.Content())
}

// percent writes the shares of a filling as such.
func percent(gas string) string {
	if !strings.Contains(gas, " / ") {
		return gas
	}
	return strings.ReplaceAll(gas, " / ", "\u00a0%, ") + "\u00a0%"
}
