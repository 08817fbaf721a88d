package draw

// The section through a make-up: panes and gaps to scale across, outside at the left.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// The type of the section.
var (
	numberType = Type{Face: Semibold, Size: 7.5, Align: Centre}
	labelType  = Type{Size: 7, Colour: Soft, Align: Centre}
	dimType    = Type{Size: 7, Align: Centre}
	gasType    = Type{Size: 6.8, Colour: Soft, Align: Centre}
	noteType   = Type{Size: 6.2, Colour: Soft}
)

// Lengths of the section on paper, in mm.
const (
	sideLeft     = 13.0 // room for the outside
	sideRight    = 11.0 // and the inside
	numbersTall  = 5.6  // the row of surface numbers
	widthsTall   = 9.4  // the dimensions
	leadersTall  = 1.6  // added where dimensions stand beside their place
	bodyLeast    = 28.0
	bodyMost     = 58.0
	bodyUsual    = 36.0
	breakDepth   = 0.5 // of the line at which the glass is broken off
	breakLength  = 7.0
	breakApart   = 0.7 // of the two lines of a gap drawn shortened, from its middle
	paneLeast    = 0.5 // the thinnest pane, gap and ply that is drawn
	gapLeast     = 0.8
	plyLeast     = 0.25
	vacuumLeast  = 1.8  // of an evacuated gap, whose pillars are indicated
	gapShortened = 30.0 // mm of a gap that is drawn shortened
	filmWide     = 0.5
	filmTick     = 1.0
	filmSpacing  = 1.5
)

// lowEmissivity is the corrected emissivity below which a face bears a conducting film, as
// cautions have it.
const lowEmissivity = 0.3

// A scale is one of drawings, paper to glass.
type scale struct{ paper, glass float64 }

// scales are those that are tried, greatest first.
var scales = []scale{
	{4, 1}, {3, 1}, {2, 1}, {3, 2}, {1, 1}, {1, 2}, {1, 3}, {1, 5}, {1, 10}, {1, 20}, {1, 50}, {1, 100}, {1, 1e3}, {1, 1e4}, {1, 1e5}, {1, 1e6},
}

func (s scale) factor() float64 { return s.paper / s.glass }
func (s scale) String() string  { return millimetres(s.paper) + " : " + millimetres(s.glass) }

// A slice is a pane or a gap in a section: where it stands on paper and how wide.
type slice struct {
	x, w      float64 // mm on paper
	mm        float64
	pane      int       // its number, or that of the pane before a gap
	gap       bool      // whether it is a gap
	shortened bool      // a gap that is not drawn whole
	plies     []float64 // widths on paper of the plies of a laminate
}

// section is the plan of a section.
type section struct {
	r     *glazing.Rating
	at    Rect
	scale scale
	least bool // some part is drawn wider than to scale
	parts []slice
	looks []glassLook // of the panes
	films []bool      // of the surfaces

	sideLeft, sideRight float64 // room beside the glass
	numbersTall         float64 // of what stands above it

	gasLines   [][]string // by gap: what stands in it
	gasAt      []Point    // its middle
	gasTurned  bool
	noted      []bool   // gaps whose gas finds no place in them
	gasNotes   []string // what does not fit into its gap
	numbers    []float64
	widths     []float64 // centres of the dimensions; nil where they stand in a note
	widthsType Type
	beside     bool // dimensions stand beside their place, on leaders
	sentences  []string
	notes      []string // the sentences in lines; none of a section without
	key        bool     // whether the mark of films is explained
	heat       heat
	body       Rect
}

// Section draws the section through the make-up of a rating, in its tint, into a rectangle that is at
// least 60 mm wide and SectionHeight(r, t, at.W, 0) high. It numbers the surfaces, marks faces of low
// emissivity, names the gases, gives the widths in mm, and says below what is drawn otherwise than it
// is. Glass has the colour of daylight that it transmits. Temperatures run through it as lines, with
// their figures above. The edge of the glazing is not shown.
func Section(c *Canvas, at Rect, r *glazing.Rating, t Temperatures) {
	s := plan(r, at, t, 0, true)
	c.Group("Section, outside at the left", SectionText(r, t), func() { s.draw(c) })
}

// SectionHeight returns the height in mm that a section of a width needs, with glass of a height;
// 0 stands for the least.
func SectionHeight(r *glazing.Rating, t Temperatures, width, glass float64) float64 {
	s := plan(r, Rect{W: width}, t, max(glass, bodyLeast), true)
	return s.around() + s.body.H
}

// around returns the height of all but the glass.
func (s *section) around() float64 {
	h := s.numbersTall + widthsTall + float64(len(s.notes))*noteType.Leading() + 1
	if s.beside {
		h += leadersTall
	}
	if s.key {
		h += noteType.Leading()
	}
	for _, l := range s.heat.lines {
		h += float64(len(l.key)) * noteType.Leading()
	}
	return h
}

// plan lays a section out, with notes or without, and with glass of a height, or where that is 0, of
// what the rectangle leaves.
func plan(r *glazing.Rating, at Rect, t Temperatures, glass float64, notes bool) *section {
	s := &section{r: r, at: at, sideLeft: sideLeft, sideRight: sideRight, numbersTall: numbersTall}
	m, tints := r.Makeup, r.Ready.States[r.State].Tints
	for k, p := range m.Panes {
		s.looks = append(s.looks, lookOf(p.Pane, tints[k]))
	}
	for _, e := range r.Surfaces {
		s.films = append(s.films, e.Corrected.Known && e.Corrected.Number < lowEmissivity)
	}
	s.planHeat(t)
	s.place()
	s.placeNumbers()
	s.placeWidths()
	s.noted = make([]bool, len(m.Gaps))
	for settled := false; !settled; {
		s.nameGases()
		s.say()
		if notes {
			s.key = slices.Contains(s.films, true)
			s.notes = Wrap(strings.Join(s.sentences, " "), at.W, noteType)
			s.wrapKey(at.W)
		}
		h := glass
		if h == 0 {
			h = at.H - s.around()
		}
		s.body = Rect{at.X, at.Y + s.numbersTall, at.W, min(max(h, bodyLeast), bodyMost)}
		s.placeLines()
		settled = s.placeGases()
	}
	return s
}

// place chooses the scale and puts panes and gaps side by side.
func (s *section) place() {
	m := s.r.Makeup
	room := s.at.W - s.sideLeft - s.sideRight
	try := func(factor float64, shorten bool) (parts []slice, w float64, least bool) {
		atLeast := func(w, bound float64) float64 {
			if w < bound {
				least = true
				return bound
			}
			return w
		}
		for k, p := range m.Panes {
			x := slice{mm: p.Pane.ThicknessMM(), pane: k}
			if len(p.Pane.Plies) > 1 {
				for i := range p.Pane.Plies {
					if p.Turned {
						i = len(p.Pane.Plies) - 1 - i
					}
					ply := atLeast(p.Pane.Plies[i].ThicknessMM*factor, plyLeast)
					x.plies = append(x.plies, ply)
					x.w += ply
				}
			} else {
				x.w = atLeast(x.mm*factor, paneLeast)
			}
			parts = append(parts, x)
			w += x.w
			if k < len(m.Gaps) {
				g := slice{mm: m.Gaps[k].WidthMM, pane: k, gap: true}
				if g.w = g.mm * factor; m.Gaps[k].Vacuum != nil {
					g.w = max(g.w, vacuumLeast)
				} else {
					g.w = atLeast(g.w, gapLeast)
				}
				if shorten && g.mm > gapShortened {
					g.w, g.shortened = gapShortened*factor, true
				}
				parts = append(parts, g)
				w += g.w
			}
		}
		return parts, w, least
	}
	for i, shorten := 0, false; i < len(scales); i++ {
		parts, w, least := try(scales[i].factor(), shorten)
		if scales[i].factor() < 1 && !shorten {
			shorten = true // wide gaps are shortened before all is drawn smaller than it is
			i = -1
			continue
		}
		s.parts, s.scale, s.least = parts, scales[i], least
		if w <= room {
			break
		}
	}
	total := 0.0
	for _, p := range s.parts {
		total += p.w
	}
	x := s.at.X + s.sideLeft + (room-total)/2
	for i := range s.parts {
		s.parts[i].x = x
		x += s.parts[i].w
	}
}

// millimetres prints a width without zeros at its end.
func millimetres(mm float64) string { return strconv.FormatFloat(mm, 'g', 6, 64) }

// gasOf returns the gases of a gap, each with its share, or that it is a vacuum.
func gasOf(g glazing.Gap) (names []string) {
	text := g.Content()
	if text == "" {
		return nil
	}
	if !strings.Contains(text, " / ") {
		return []string{text}
	}
	for name := range strings.SplitSeq(text, " / ") {
		names = append(names, strings.ReplaceAll(name+" %", " ", "\u00a0"))
	}
	return names
}

// nameGases decides where the names of gases stand: all across, or all along the gaps, or, where
// one does not fit, in a note.
func (s *section) nameGases() {
	m := s.r.Makeup
	across := true
	s.gasLines, s.gasNotes = nil, nil
	for _, p := range s.parts {
		if !p.gap || m.Gaps[p.pane].Vacuum != nil || s.noted[p.pane] {
			continue
		}
		for _, line := range gasOf(m.Gaps[p.pane]) {
			if from, to := s.free(p); Width(line, gasType)+1.6 > to-from {
				across = false
			}
		}
	}
	s.gasTurned = !across
	var order []string
	where := map[string][]string{}
	for _, p := range s.parts {
		if !p.gap {
			continue
		}
		lines := gasOf(m.Gaps[p.pane])
		from, to := s.free(p)
		room := to - from - 0.6
		joined := strings.Join(lines, ", ")
		stands := across && Width(joined, gasType) <= room // of a vacuum
		switch fits := func(s string) bool { return Width(s, gasType) <= bodyLeast-2 }; {
		case len(lines) == 0:
		case !s.noted[p.pane] && across && (m.Gaps[p.pane].Vacuum == nil || stands):
		case !s.noted[p.pane] && !across && fits(joined) && gasType.MM() <= room:
			lines = []string{joined}
		case !s.noted[p.pane] && !across && len(lines) > 1 && !slices.ContainsFunc(lines, func(s string) bool { return !fits(s) }) && float64(len(lines))*gasType.Leading() <= room:
		default:
			if m.Gaps[p.pane].Vacuum != nil {
				if p.w > p.mm*s.scale.factor() {
					joined += ", drawn wider"
				}
				joined += ", its pillars indicated"
			}
			if where[joined] == nil {
				order = append(order, joined)
			}
			where[joined] = append(where[joined], between(p))
			lines = nil
		}
		s.gasLines = append(s.gasLines, lines)
	}
	for _, gas := range order {
		s.gasNotes = append(s.gasNotes, gapWord(where[gas])+strings.Join(where[gas], ", ")+": "+gas+".")
	}
}

// between names a gap by the surfaces that it lies between.
func between(gap slice) string { return fmt.Sprintf("%d–%d", 2*gap.pane+2, 2*gap.pane+3) }

func gapWord(gaps []string) string {
	if len(gaps) > 1 {
		return "Gaps "
	}
	return "Gap "
}

// free returns the span of a gap that neither marks of films nor the lines of a break take.
func (s *section) free(gap slice) (from, to float64) {
	from, to = gap.x, gap.x+gap.w
	if gap.shortened {
		to -= gap.w/2 + breakApart + 0.8
	} else if s.films[2*gap.pane+2] {
		to -= filmWide + s.tick(gap)
	}
	if s.films[2*gap.pane+1] {
		from += filmWide + s.tick(gap)
	}
	return from, to
}

// tick returns the length of the ticks of a film in a gap.
func (s *section) tick(gap slice) float64 { return min(filmTick, 0.22*gap.w) }

// placeGases puts what stands in gaps into their middle, off the lines of temperatures, and reports
// whether there was place for all. What has none is noted for another plan.
func (s *section) placeGases() (settled bool) {
	settled = true
	s.gasAt = make([]Point, len(s.gasLines))
	for _, p := range s.parts {
		if !p.gap || s.gasLines[p.pane] == nil {
			continue
		}
		from, to := s.free(p)
		at := Point{(from + to) / 2, s.body.Y + s.body.H/2}
		if s.heat.on() {
			w, h := s.gasSize(p.pane)
			var ok bool
			if at, ok = s.openIn(from+0.4, to-0.4, w, h); !ok {
				s.noted[p.pane], settled = true, false
			}
		}
		s.gasAt[p.pane] = at
	}
	return settled
}

// gasSize returns width and height of what stands in a gap.
func (s *section) gasSize(gap int) (w, h float64) {
	h = float64(len(s.gasLines[gap])-1)*gasType.Leading() + gasType.CapHeight()
	for _, line := range s.gasLines[gap] {
		w = max(w, Width(line, gasType))
	}
	if s.gasTurned {
		return h, w
	}
	return w, h
}

// placeNumbers spreads the numbers of the surfaces, which stand off their panes.
func (s *section) placeNumbers() {
	if s.heat.on() {
		s.placeFigures()
		return
	}
	var wanted, widths []float64
	for _, p := range s.parts {
		if p.gap {
			continue
		}
		wanted = append(wanted, p.x-numberOff, p.x+p.w+numberOff)
		widths = append(widths, Width(strconv.Itoa(len(widths)+1), numberType), Width(strconv.Itoa(len(widths)+2), numberType))
	}
	s.numbers, _ = spread(wanted, widths, 1, s.at.X, s.at.Right())
}

// numberOff is how far from its face the number of a surface stands.
const numberOff = 1.5

// placeWidths spreads the dimensions below their parts, smaller if need be; where there are too many
// they stand in a note.
func (s *section) placeWidths() {
	for _, size := range []float64{dimType.Size, 5.8} {
		s.widthsType = dimType
		s.widthsType.Size = size
		var wanted, widths []float64
		s.beside = false
		for _, p := range s.parts {
			w := Width(millimetres(p.mm), s.widthsType)
			wanted, widths = append(wanted, p.x+p.w/2), append(widths, w)
			s.beside = s.beside || w > p.w-0.4
		}
		from := s.at.X
		if s.heat.on() && !s.r.Makeup.Tilt.Vertical() {
			from += tiltWide
		}
		centres, fit := spread(wanted, widths, 1.4, from, s.at.Right())
		if fit {
			s.widths = centres
			return
		}
	}
	s.beside = false
}

// say collects what is to be said below the drawing.
func (s *section) say() {
	m := s.r.Makeup
	var parts, shortened []string
	scale := "Scale " + s.scale.String() + " across"
	if s.least {
		scale += "; thinner parts are drawn " + millimetres(plyLeast) + " to " + millimetres(gapLeast) + " mm wide"
	}
	parts = append(parts, scale+".")
	for _, p := range s.parts {
		if p.shortened {
			shortened = append(shortened, between(p))
		}
	}
	if shortened != nil {
		parts = append(parts, gapWord(shortened)+strings.Join(shortened, ", ")+" drawn shortened.")
	}
	parts = append(parts, s.gasNotes...)
	parts = append(parts, s.heat.unknown...)
	if s.heat.on() {
		parts = append(parts, "Temperatures in °C; across gaps and to the air the lines are drawn straight.")
	}
	if s.widths == nil {
		var list []string
		for _, p := range s.parts {
			list = append(list, millimetres(p.mm))
		}
		parts = append(parts, "Widths from outside: "+strings.Join(list, " | ")+" mm.")
	}
	if !m.Tilt.Vertical() {
		parts = append(parts, "Tilted by "+millimetres(m.Tilt.Degrees())+"° from the horizontal; drawn upright.")
	}
	parts = append(parts, "Glass in the colour of daylight it transmits (indicative), hatched closer where it transmits less.")
	for k, look := range s.looks {
		pane := fmt.Sprintf("The colour of pane %d", k+1)
		if m.Panes[k].Pane.Tintable() {
			pane += " in tint " + m.Panes[k].Pane.Tints[s.r.Ready.States[s.r.State].Tints[k]].Name
		}
		switch {
		case !look.known:
			parts = append(parts, pane+" is not known.")
		case look.clipped:
			parts = append(parts, pane+" lies beyond what screens show.")
		}
	}
	s.sentences = append(parts, "Centre of the glass; edges are not shown.")
}
