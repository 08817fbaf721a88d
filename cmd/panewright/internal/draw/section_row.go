package draw

// Sections of one make-up in several tints, with what is said of all of them said once.

import (
	"slices"
	"strings"

	"panewright/glazing"
)

// below is what stands below sections, each thing once.
type below struct {
	film      bool
	lines     *section // one that has lines of temperatures
	sentences []string
}

// add adds what is said below a section.
func (b *below) add(s *section) {
	b.film = b.film || slices.Contains(s.films, true)
	if s.heat.on() && (b.lines == nil || len(s.heat.lines) > len(b.lines.heat.lines)) {
		b.lines = s
	}
	for _, sentence := range s.sentences {
		if !slices.Contains(b.sentences, sentence) {
			b.sentences = append(b.sentences, sentence)
		}
	}
}

// keyApart is the least distance of keys in one line.
const keyApart = 6.0

// keys puts the keys of films and lines of temperatures one after the other, each in the line of the one
// before where it finds place, and returns where the line that would follow stands.
func (b *below) keys(x, y, w float64, put func(x, y float64, k int, lines []string)) float64 {
	at, line := x, y // where the next key stands, and the first line below those before
	for k, text := range b.keyTexts() {
		lines := Wrap(text, w-keyIndent, noteType)
		long := keyIndent + Width(lines[0], noteType)
		if at > x && (len(lines) > 1 || at+long > x+w) {
			at, y = x, line
		}
		put(at, y, k, lines)
		at, line = at+long+keyApart, max(line, y+float64(len(lines))*noteType.Leading())
	}
	return line
}

// keyTexts are the texts of the keys, that of films first.
func (b *below) keyTexts() (texts []string) {
	if b.film {
		texts = append(texts, filmText)
	}
	if b.lines != nil {
		for _, l := range b.lines.heat.lines {
			texts = append(texts, b.lines.keyText(l.id))
		}
	}
	return texts
}

// tall returns the height that it takes in a width.
func (b *below) tall(w float64) float64 {
	keys := b.keys(0, 0, w, func(float64, float64, int, []string) {})
	return keys + float64(len(Wrap(strings.Join(b.sentences, " "), w, noteType)))*noteType.Leading()
}

// draw sets it, its first line at y, and returns where the line that would follow stands.
func (b *below) draw(c *Canvas, x, y, w float64) float64 {
	y = b.keys(x, y, w, func(x, y float64, k int, lines []string) {
		if b.film {
			if k--; k < 0 {
				filmKey(c, x, y)
				return
			}
		}
		lineKey(c, x, y, b.lines.heat.lines[k].stroke, lines)
	})
	return c.Lines(x, y, Wrap(strings.Join(b.sentences, " "), w, noteType), noteType)
}

// planRow lays out sections beside each other, with glass of a height.
func planRow(at Rect, gutter, glass float64, ratings []*glazing.Rating, t Temperatures) (row []*section, said below, tall float64) {
	n := float64(len(ratings))
	w := (at.W - gutter*(n-1)) / n
	for i, r := range ratings {
		s := plan(r, Rect{at.X + float64(i)*(w+gutter), at.Y, w, 0}, t, max(glass, bodyLeast), false)
		said.add(s)
		row = append(row, s)
		tall = max(tall, s.around()+s.body.H)
	}
	return row, said, tall
}

// SectionsHeight returns the height in mm of Sections.
func SectionsHeight(width, gutter, glass float64, ratings []*glazing.Rating, t Temperatures) float64 {
	_, said, tall := planRow(Rect{W: width}, gutter, glass, ratings, t)
	return tall + said.tall(width)
}

// Sections draws the sections of ratings of one make-up beside each other, from the top left corner of a
// rectangle across its width, each as Section does, with glass of a height; 0 stands for the least. What
// is said below is said once.
func Sections(c *Canvas, at Rect, gutter, glass float64, ratings []*glazing.Rating, t Temperatures) {
	row, said, tall := planRow(at, gutter, glass, ratings, t)
	for _, s := range row {
		c.Group("Section in tint "+s.r.Tint+", outside at the left", SectionText(s.r, t), func() { s.draw(c) })
	}
	said.draw(c, at.X, at.Y+tall+noteType.Leading()-1, at.W)
}
