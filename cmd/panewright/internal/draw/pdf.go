package draw

// The back end that writes PDF. Beside this file pdf_font.go alone names the PDF library.

import (
	"bytes"
	"compress/zlib"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"time"

	"github.com/jung-kurt/gofpdf"
)

// A Document is what is written as PDF: pages, and what is said of them.
type Document struct {
	Title, Author, Subject, Keywords, Producer string

	Date        time.Time // of creation, as the file says; 2000-01-01 where none is given
	Pages       []*Canvas
	Attachments []Attachment
	Plain       bool // pages are left uncompressed, to be looked at or compared
}

// An Attachment is a file that travels in the document.
type Attachment struct {
	Name, Description string
	Content           []byte
}

// undated is the date of a document that has none; a clock would make each document another.
var undated = time.Date(2000, 1, 1, 0, 0, 0, 0, time.UTC)

// pointsPerMM is the length of a mm in the unit of PDF.
const pointsPerMM = 72 / 25.4

// PDF writes a document. The same document gives the same bytes. It is an error if it has no page
// or if a drawing on one went wrong.
func PDF(d Document) ([]byte, error) {
	if len(d.Pages) == 0 {
		return nil, fmt.Errorf("the document has no page")
	}
	var letters [faces]letterSet
	for i, c := range d.Pages {
		if c.err != nil {
			return nil, fmt.Errorf("page %d: %w", i+1, c.err)
		}
		for _, o := range c.ops {
			for _, r := range o.runs {
				for _, l := range r.s {
					letters[o.text.Face].add(l)
				}
			}
		}
	}
	f := gofpdf.New("P", "mm", "A4", "")
	f.SetCatalogSort(true)
	f.SetCompression(!d.Plain)
	f.SetAutoPageBreak(false, 0)
	f.SetMargins(0, 0, 0)
	date := d.Date
	if date.IsZero() {
		date = undated
	}
	f.SetCreationDate(date.UTC())
	f.SetModificationDate(date.UTC())
	for _, x := range []struct {
		set func(string, bool)
		s   string
	}{{f.SetTitle, d.Title}, {f.SetAuthor, d.Author}, {f.SetSubject, d.Subject}, {f.SetKeywords, d.Keywords},
		{f.SetProducer, d.Producer}, {f.SetCreator, d.Producer}} {
		if s := clean(x.s); s != "" {
			x.set(basic(s), true)
		}
	}
	var embedded [faces]pdfFace
	packer, err := zlib.NewWriterLevel(io.Discard, zlib.BestSpeed)
	if err != nil {
		return nil, err
	}
	for face := range letters {
		if list := letters[face].list(); len(list) > 0 {
			if embedded[face], err = Face(face).font().embed(f, pdfNames[face], list, packer); err != nil {
				return nil, err
			}
		}
	}
	for _, c := range d.Pages {
		f.AddPageFormat("P", gofpdf.SizeType{Wd: c.W, Ht: c.H})
		p := pdfPage{f: f, faces: &embedded, height: c.H}
		p.play(c.ops)
	}
	var files []gofpdf.Attachment
	for _, a := range d.Attachments {
		files = append(files, gofpdf.Attachment{Filename: basic(clean(a.Name)), Description: basic(clean(a.Description)), Content: a.Content})
	}
	f.SetAttachments(files)
	var b bytes.Buffer
	if err := f.Output(&b); err != nil {
		return nil, fmt.Errorf("writing PDF: %w", err)
	}
	return b.Bytes(), nil
}

// pdfNames are the fonts' names in a document.
var pdfNames = [faces]string{Regular: "SourceSans3-Regular", Semibold: "SourceSans3-Semibold", Italic: "SourceSans3-It"}

// basic replaces characters beyond the basic plane, which the library cannot write.
func basic(s string) string {
	return string(slices.Collect(func(yield func(rune) bool) {
		for _, r := range s {
			if r > 0xffff {
				r = missing
			}
			if !yield(r) {
				return
			}
		}
	}))
}

// A pdfPage writes the steps of one page. Every shape stands between q and Q, so that none leaves
// a state behind; text leaves its font, which the library sets, and its ink.
type pdfPage struct {
	f      *gofpdf.Fpdf
	faces  *[faces]pdfFace
	height float64 // mm
	b      []byte  // operators that are not written yet
	font   struct {
		family string
		size   float64
	}
	ink  Colour // of the text that was written last
	lost bool   // the end of a clip took back font and ink
}

func (p *pdfPage) play(ops []op) {
	var open []opKind
	p.lost = true
	for i := range ops {
		o := &ops[i]
		switch o.kind {
		case shapeOp, circleOp:
			p.shape(o)
		case textOp:
			p.textOp(o)
		case clipOp:
			p.b = append(p.b, "q "...)
			at, size := o.points[0], o.points[1]
			p.point(at)
			p.number(size.X * pointsPerMM)
			p.number(-size.Y * pointsPerMM)
			p.b = append(p.b, "re W n\n"...)
			open = append(open, clipOp)
		case groupOp:
			open = append(open, groupOp)
		case endOp:
			if open[len(open)-1] == clipOp {
				p.b = append(p.b, "Q\n"...)
				p.lost = true
			}
			open = open[:len(open)-1]
		}
	}
	p.flush()
}

func (p *pdfPage) flush() {
	if len(p.b) > 0 {
		p.f.RawWriteStr(string(p.b[:len(p.b)-1]))
		p.b = p.b[:0]
	}
}

// number writes a number to a hundredth, of a point 0.0035 mm, and a blank.
func (p *pdfPage) number(v float64) {
	p.b = append(appendShort(p.b, v, 2), ' ')
}

func (p *pdfPage) point(at Point) {
	p.number(at.X * pointsPerMM)
	p.number((p.height - at.Y) * pointsPerMM)
}

func (p *pdfPage) colour(c Colour, operator string) {
	for _, v := range []uint8{c.R, c.G, c.B} {
		p.b = append(appendShort(p.b, float64(v)/255, 3), ' ')
	}
	p.b = append(p.b, operator...)
}

// opacity writes what follows with an opacity.
func (p *pdfPage) opacity(c Colour, draw func()) {
	if c.A == 255 {
		draw()
		return
	}
	p.flush()
	p.f.SetAlpha(float64(c.A)/255, "Normal")
	draw()
	p.flush()
	p.f.SetAlpha(1, "Normal")
}

func (p *pdfPage) shape(o *op) {
	fill, stroke := o.fill.A > 0, o.stroke.visible()
	if fill && stroke && o.fill.A == o.stroke.Colour.A {
		p.opacity(o.fill, func() { p.paint(o, true, true) })
		return
	}
	if fill {
		p.opacity(o.fill, func() { p.paint(o, true, false) })
	}
	if stroke {
		p.opacity(o.stroke.Colour, func() { p.paint(o, false, true) })
	}
}

func (p *pdfPage) paint(o *op, fill, stroke bool) {
	p.b = append(p.b, "q "...)
	if fill {
		p.colour(o.fill, "rg ")
	}
	if stroke {
		s := o.stroke
		p.colour(s.Colour, "RG ")
		p.number(s.Width * pointsPerMM)
		p.b = append(p.b, "w 1 j "...)
		if len(s.Dash) == 0 {
			p.b = append(p.b, "1 J "...)
		} else {
			p.b = append(p.b, '[')
			for _, v := range s.Dash {
				p.number(v * pointsPerMM)
			}
			p.b = append(p.b, "] 0 d "...)
		}
	}
	if o.kind == circleOp {
		p.circle(o.points[0], o.size)
	} else {
		for i, at := range o.points {
			p.point(at)
			if i == 0 {
				p.b = append(p.b, "m "...)
			} else {
				p.b = append(p.b, "l "...)
			}
		}
	}
	operator := "n"
	closed := o.closed || o.kind == circleOp
	switch {
	case fill && stroke && closed:
		operator = "b"
	case fill && stroke:
		operator = "B"
	case fill:
		operator = "f"
	case stroke && closed:
		operator = "s"
	case stroke:
		operator = "S"
	}
	p.b = append(append(p.b, operator...), " Q\n"...)
}

// circle writes four Bézier curves; 4/3·tan(π/8) is the length of their handles.
func (p *pdfPage) circle(at Point, r float64) {
	h := r * 4 / 3 * math.Tan(math.Pi/8)
	p.point(Point{at.X + r, at.Y})
	p.b = append(p.b, "m "...)
	for _, q := range [][3]Point{
		{{r, h}, {h, r}, {0, r}}, {{-h, r}, {-r, h}, {-r, 0}}, {{-r, -h}, {-h, -r}, {0, -r}}, {{h, -r}, {r, -h}, {r, 0}},
	} {
		for _, d := range q {
			p.point(Point{at.X + d.X, at.Y + d.Y})
		}
		p.b = append(p.b, "c "...)
	}
}

func (p *pdfPage) textOp(o *op) {
	t := o.text
	p.opacity(t.Colour, func() {
		at := o.points[0]
		left := at.X
		switch t.Align {
		case Centre:
			left -= o.size / 2
		case Right:
			left -= o.size
		}
		sin, cos := math.Sincos(t.Turn * math.Pi / 180)
		for _, r := range o.runs {
			face, size := &p.faces[t.Face], t.Size*r.script.size()
			x, y := left-at.X+r.x, r.shift()*t.MM()
			for s := r.s; s != ""; {
				family, codes, n := face.share(s)
				p.setFont(family, size)
				if p.ink != t.Colour {
					p.ink = t.Colour
					p.colour(t.Colour, "rg ")
				}
				if t.Turn == 0 {
					p.b = append(p.b, "BT "...)
					p.point(Point{at.X + x, at.Y + y})
					p.b = append(p.b, "Td "...)
				} else { // the text is turned about the point
					p.b = append(p.b, "BT "...)
					for _, v := range []float64{cos, sin, -sin, cos} {
						p.b = append(appendShort(p.b, v, 5), ' ')
					}
					p.point(Point{at.X + x*cos + y*sin, at.Y - x*sin + y*cos})
					p.b = append(p.b, "Tm "...)
				}
				p.literal(codes)
				p.b = append(p.b, " Tj ET\n"...)
				x += Width(s[:n], Type{Face: t.Face, Size: size})
				s = s[n:]
			}
		}
	})
}

// literal writes codes as a string.
func (p *pdfPage) literal(codes []byte) {
	p.b = append(p.b, '(')
	for _, code := range codes {
		switch code {
		case '(', ')', '\\':
			p.b = append(p.b, '\\')
		case '\r':
			p.b = append(p.b, `\r`...)
			continue
		}
		p.b = append(p.b, code)
	}
	p.b = append(p.b, ')')
}

func (p *pdfPage) setFont(family string, size float64) {
	if !p.lost && p.font.family == family && p.font.size == size {
		return
	}
	p.flush()
	p.f.SetFont(family, "", size)
	if p.lost {
		p.ink = Colour{} // of no text
	}
	p.lost, p.font.family, p.font.size = false, family, size
}

// appendShort writes a number with at most so many decimals and no more digits than needed.
func appendShort(b []byte, v float64, places int) []byte {
	scale := int64(1)
	for range places {
		scale *= 10
	}
	n := int64(math.Round(v * float64(scale)))
	if n < 0 {
		b, n = append(b, '-'), -n
	}
	b = strconv.AppendInt(b, n/scale, 10)
	if n %= scale; n != 0 {
		b = append(b, '.')
		for ; n != 0; n %= scale {
			scale /= 10
			b = append(b, byte('0'+n/scale))
		}
	}
	return b
}
