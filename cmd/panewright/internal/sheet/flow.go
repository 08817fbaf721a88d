package sheet

// What pages are made of: headings, blocks, text in columns, and how they go on over pages.

import (
	"slices"

	"panewright/cmd/panewright/internal/draw"
)

// add appends what a list does not hold.
func add[T comparable](list []T, x T) []T {
	if slices.Contains(list, x) {
		return list
	}
	return append(list, x)
}

// headTall is how far below the rule of a heading its block begins, and apart how far blocks stand
// from each other, in mm.
const (
	headTall = 5.8
	apart    = 4.0
)

// heading sets the title of a block, and returns where the block begins.
func heading(c *draw.Canvas, x, y, w float64, s string) float64 {
	c.Line(x, y, x+w, y, rule)
	c.Text(x, y+4, draw.Fit(s, w, headType), headType)
	return y + headTall
}

// paragraph sets wrapped text below y, and returns where it ends.
func paragraph(c *draw.Canvas, x, y, w float64, s string, t draw.Type) float64 {
	lines := draw.Wrap(s, w, t)
	c.Lines(x, y+t.CapHeight()+0.6, lines, t)
	return y + float64(len(lines))*t.Leading()
}

// next begins a page.
func (p *paper) next() {
	p.c = draw.New(pageW, pageH)
	p.pages = append(p.pages, p.c)
	p.y = top
	if p.head != nil {
		p.y = p.head()
	}
	p.fresh = p.y
}

// room makes sure that a block of a height finds place, on another page if need be.
func (p *paper) room(h float64) {
	if p.y+h > bottom && p.y > p.fresh {
		p.next()
	}
}

// A block is a part of a page whose height is known before it is set.
type block struct {
	tall float64
	set  func(y float64)
}

// tall returns the height of blocks below each other.
func tall(blocks []block) float64 {
	sum := -apart
	for _, b := range blocks {
		sum += b.tall + apart
	}
	return max(sum, 0)
}

// pile sets blocks below each other.
func pile(blocks []block, y float64) {
	for _, b := range blocks {
		b.set(y)
		y += b.tall + apart
	}
}

// beside sets two piles of blocks beside each other.
func (p *paper) beside(drawings, tables []block) {
	h := max(tall(drawings), tall(tables))
	p.room(h)
	pile(drawings, p.y)
	pile(tables, p.y)
	p.y += h + apart
}

// block sets a block across both columns.
func (p *paper) block(b block) {
	p.room(b.tall)
	b.set(p.y)
	p.y += b.tall + apart
}

// paired sets pieces across both columns, two beside each other where both find place so.
func (p *paper) paired(pieces []piece) {
	for len(pieces) > 0 {
		if len(pieces) > 1 {
			a, fitsLeft := pieces[0].in(left, half)
			b, fitsRight := pieces[1].in(left+half+gutter, half)
			if h := max(a.tall, b.tall); fitsLeft && fitsRight && h < (bottom-top)/2 && h < pieces[0].tall()+pieces[1].tall() {
				p.beside([]block{a}, []block{b})
				pieces = pieces[2:]
				continue
			}
		}
		pieces[0].across()
		pieces = pieces[1:]
	}
}

// A piece is a part of a page that finds its own place.
type piece struct {
	in     func(x, w float64) (b block, fits bool) // in a column, unless that is too narrow
	across func()                                  // across both columns, on as many pages as it needs
	tall   func() float64                          // across both columns
}

// listed returns a list as a piece.
func (p *paper) listed(l list) piece {
	return piece{func(x, w float64) (block, bool) { return l.block(p, x, w), true }, func() { p.columns(l) }, l.tall}
}

// tabled returns a table as a piece. It is made for a width; where that is too narrow, it is nil.
func (p *paper) tabled(title string, made func(w float64) *grid) piece {
	return piece{func(x, w float64) (block, bool) {
		g := made(w)
		if g == nil {
			return block{}, false
		}
		return g.block(p, x, title), true
	}, func() { p.table(title, made(width)) }, func() float64 { return made(width).block(p, left, title).tall }}
}

// A list is short paragraphs under a title.
type list struct {
	title string
	items []string
	mark  string // before each
}

// indent is how far the text of a marked paragraph stands from its mark.
const indent = 2.4

func (l list) indent() float64 {
	if l.mark == "" {
		return 0
	}
	return indent
}

// wrapped returns the lines of each paragraph in a column. Those that columns may break are each cut
// into its lines, and any that is very long.
func (l list) wrapped(w float64) (paragraphs [][]string) {
	const long, most = 6, 40
	for _, s := range l.items {
		lines, n := draw.Wrap(s, w-l.indent(), listType), most
		if l.mark == "" && len(lines) > long {
			n = 1
		}
		paragraphs = slices.AppendSeq(paragraphs, slices.Chunk(lines, n))
	}
	return paragraphs
}

// set sets paragraphs and returns where they end.
func (l list) set(c *draw.Canvas, x, y float64, paragraphs [][]string) float64 {
	base := y + listType.CapHeight() + 0.6
	for _, lines := range paragraphs {
		c.Text(x, base, l.mark, listType)
		base = c.Lines(x+l.indent(), base, lines, listType)
	}
	return base - listType.CapHeight() - 0.6
}

// block returns the list in one column.
func (l list) block(p *paper, x, w float64) block {
	paragraphs := l.wrapped(w)
	lines := 0
	for _, x := range paragraphs {
		lines += len(x)
	}
	return block{headTall + float64(lines)*listType.Leading(), func(y float64) {
		l.set(p.c, x, heading(p.c, x, y, w, l.title), paragraphs)
	}}
}

// columns sets a list in two columns, on as many pages as it needs.
func (p *paper) columns(l list) {
	paragraphs := l.wrapped(half)
	if len(paragraphs) == 0 {
		return
	}
	leading := listType.Leading()
	lines := func(h float64) int { return int(h / leading) }
	var sizes []int
	total := 0
	for _, x := range paragraphs {
		sizes, total = append(sizes, len(x)), total+len(x)
	}
	// What does not fit goes on over the page if a good part stands on either, else as a whole.
	const part = 8
	here := lines(bottom - p.y - headTall)
	if _, both := divided(sizes, here); both < len(sizes) && (here < part || total < 2*here+part) && total < lines(bottom-top) {
		p.room(bottom)
	}
	p.room(headTall + leading*float64(max(sizes[0], 3)))
	y := heading(p.c, left, p.y, width, l.title)
	for {
		first, both := divided(sizes, lines(bottom-y))
		p.y = max(l.set(p.c, left, y, paragraphs[:first]), l.set(p.c, left+half+gutter, y, paragraphs[first:both])) + apart
		if paragraphs, sizes = paragraphs[both:], sizes[both:]; len(sizes) == 0 {
			return
		}
		p.next()
		y = p.y
	}
}

// tall returns the height of the list in two columns.
func (l list) tall() float64 {
	var sizes []int
	total := 0
	for _, x := range l.wrapped(half) {
		sizes, total = append(sizes, len(x)), total+len(x)
	}
	first, _ := divided(sizes, total)
	lines := 0
	for _, n := range sizes[:first] {
		lines += n
	}
	return headTall + listType.Leading()*float64(max(lines, total-lines))
}

// divided returns how many of some paragraphs of so many lines stand in the first column, and how
// many in both, of at most so many lines each: as short as can be, if all find place.
func divided(sizes []int, most int) (first, both int) {
	take := func(from, lines int) int {
		for from < len(sizes) && sizes[from] <= lines {
			lines -= sizes[from]
			from++
		}
		return from
	}
	total := 0
	for _, n := range sizes {
		total += n
	}
	for h := min((total+1)/2, most); ; h++ {
		first = take(0, h)
		if both = take(first, h); both == len(sizes) || h >= most {
			return first, both
		}
	}
}
