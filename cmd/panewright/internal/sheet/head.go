package sheet

// The heads of pages: what they are of, who made them, by which basis; and what was too long for
// them.

import (
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

// A fact is something that the user says, with its name.
type fact struct{ name, text string }

// titleLines is how many lines of a title stand in a head.
const titleLines = 2

// atMost breaks a text into lines, at most so many: what is longer ends in "…" and is set in full
// later.
func (p *paper) atMost(n int, f fact, w float64, t draw.Type) []string {
	lines := draw.Wrap(f.text, w, t)
	if len(lines) <= n {
		p.full[f.text] = true
		return lines
	}
	lines[n-1] = draw.Fit(lines[n-1]+" "+lines[n], w, t)
	if !p.full[f.text] {
		p.cut = add(p.cut, f)
	}
	return lines[:n]
}

// inFull sets what was cut.
func (p *paper) inFull() {
	l := list{title: "In full"}
	for _, f := range p.cut {
		if !p.full[f.text] {
			l.items = append(l.items, f.name+": "+f.text)
			p.full[f.text] = true
		}
	}
	p.cut = nil
	p.columns(l)
}

// saidBy is what the user says of the project beside its title.
func (p *paper) saidBy() []fact {
	x := p.r.Project
	return []fact{{"client", x.Client}, {"author", x.Author}, {"date", x.Date}}
}

// title sets the head of a part, below a line with what it belongs to and its kind.
func (p *paper) title(above fact, kind string) {
	p.head = nil
	p.next()
	p.c.Text(right, top, kind, softType.To(draw.Right))
	p.c.Lines(left, top, p.atMost(1, above, width-40, softType), softType)
	p.y = top
}

// accent sets the mark below a title.
func (p *paper) accent() {
	p.c.Rectangle(draw.Rect{X: left, Y: p.y, W: 24, H: 0.8}, draw.Stroke{}, draw.Accent)
	p.y += 0.8
}

// facts sets facts after each other, each after its name, and those that are long on lines of
// their own.
func (p *paper) facts(facts []fact) {
	t := smallType
	x, y := left, p.y+t.CapHeight()
	line := func() { x, y = left, y+t.Leading()+0.5 }
	for _, f := range facts {
		if strings.TrimSpace(f.text) == "" {
			continue
		}
		label := draw.Width(f.name, softType) + 1.5
		if x > left && x+label+draw.Width(f.text, t) > right {
			line()
		}
		p.c.Text(x, y, f.name, softType)
		lines := p.atMost(titleLines, f, right-x-label, t)
		p.c.Lines(x+label, y, lines, t)
		if x += label + draw.Width(f.text, t) + gutter; len(lines) > 1 {
			y += float64(len(lines)-1) * t.Leading()
			line()
		}
	}
	if x > left {
		line()
	}
	p.y = y - t.CapHeight()
}

// begin begins a part of the document that has a kind and a title.
func (p *paper) begin(kind, title string, above fact) {
	p.title(above, kind)
	p.y += 9
	for _, line := range p.atMost(titleLines, fact{"project", title}, width, kindType) {
		p.c.Text(left, p.y, line, kindType)
		p.y += kindType.Leading()
	}
	p.y += 2.6 - kindType.Leading()
	p.accent()
	p.y += 3.2
	p.head = func() float64 { return p.again(title, kind) }
}

// again sets the head of a page that goes on.
func (p *paper) again(title, kind string) float64 {
	p.c.Text(left, top, draw.Fit(title, width-50, strongType), strongType)
	p.c.Text(right, top, kind+", continued", softType.To(draw.Right))
	p.c.Line(left, top+2.2, right, top+2.2, hair)
	return top + 6.5
}

// heads sets the head of the sheet of a make-up.
func (p *paper) heads(m *glazing.Makeup, r *glazing.Rating) {
	kind := "Data sheet, basis " + r.Method.Basis.Name
	p.title(fact{"project", p.r.Project.Title}, kind)
	t := fitted(m.ID, width, titleType, 9)
	p.y += 9.5
	for i, line := range draw.Wrap(m.ID, width, t) {
		if i > 0 {
			p.y += t.Leading()
		}
		p.c.Text(left, p.y, line, t)
	}
	for i, line := range p.atMost(titleLines, fact{"title", m.Title}, width, nameType) {
		if p.y += nameType.Leading(); i == 0 {
			p.y += 1
		}
		p.c.Text(left, p.y, line, nameType)
	}
	p.y += 2.6
	p.accent()
	p.y += 2.2
	p.facts(p.saidBy())
	p.y = paragraphAfter(p.c, p.y, fact{"basis " + r.Method.Basis.Name, r.Method.Editions()})
	p.y += 2.4
	name := strings.TrimSpace(m.ID + "  " + m.Title)
	p.head = func() float64 { return p.again(name, kind) }
}

// paragraphAfter sets a fact whose text may be long.
func paragraphAfter(c *draw.Canvas, y float64, f fact) float64 {
	t := smallType
	label := draw.Width(f.name, softType) + 1.5
	c.Text(left, y+t.CapHeight(), f.name, softType)
	lines := draw.Wrap(f.text, width-label, t)
	return c.Lines(left+label, y+t.CapHeight(), lines, t) - t.CapHeight()
}

// fitted returns a type made smaller, but not below a size, so that text fits a width.
func fitted(s string, w float64, t draw.Type, least float64) draw.Type {
	for t.Size > least && draw.Width(s, t) > w {
		t.Size = max(least, t.Size-0.5)
	}
	return t
}

// worded returns a sentence as markup: in words that are symbols of figures, indices stand below the
// line.
func (p *paper) worded(s string) string {
	words := strings.Split(s, " ")
	for i, w := range words {
		word := strings.TrimRight(w, ",;:.")
		symbol, _, _ := strings.Cut(word, "@")
		if p.isSymbol(strings.TrimRight(symbol, "0123456789")) {
			words[i] = symbolAt(word) + w[len(word):]
		} else {
			words[i] = draw.Escape(w)
		}
	}
	return strings.Join(words, " ")
}

// isSymbol reports whether a word is the symbol of a figure.
func (p *paper) isSymbol(w string) bool {
	if p.symbols == nil {
		p.symbols = map[string]bool{}
		for _, f := range p.r.Figures {
			p.symbols[f.Symbol] = true
		}
		for _, f := range glazing.BalanceFigures() {
			p.symbols[f.Symbol] = true
		}
	}
	return w != "" && p.symbols[w]
}

// symbolAt writes the head of a figure as markup: its symbol, and the condition after @ as it is.
func symbolAt(head string) string {
	symbol, id, at := strings.Cut(head, "@")
	if !at {
		return draw.Symbol(symbol)
	}
	return draw.Symbol(symbol) + draw.Escape("@"+id)
}
