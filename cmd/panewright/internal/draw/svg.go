package draw

// The back end that writes SVG: one file that needs no other, whose text stays text.

import (
	"bytes"
	"encoding/hex"
	"fmt"
	"hash/fnv"
	"strconv"
	"strings"
)

// svgFamilies are the fonts that a viewer may have; text keeps its width in all of them.
const svgFamilies = "'Source Sans 3','Source Sans Pro','Segoe UI','Helvetica Neue',Arial,sans-serif"

// SVG writes a canvas, in mm, with a title and a description for those who cannot see it. The same
// canvas gives the same bytes. It is an error if a drawing on it went wrong.
func SVG(c *Canvas, title, description string) ([]byte, error) {
	if c.err != nil {
		return nil, c.err
	}
	var body svgBody
	body.play(c.ops)

	// ids that no other drawing on the same page has
	sum := fnv.New64a()
	sum.Write(body.Bytes())
	sum.Write([]byte(title + "\n" + description))
	id := "d" + hex.EncodeToString(sum.Sum(nil))

	var b svgBody
	w, h := short(c.W), short(c.H)
	fmt.Fprintf(&b, `<svg xmlns="http://www.w3.org/2000/svg" width="%smm" height="%smm" viewBox="0 0 %s %s" role="img" aria-labelledby="%s-title" aria-describedby="%s-description" fill="none" stroke-linecap="round" stroke-linejoin="round" font-family="%s" style="font-kerning:none;font-variant-ligatures:none" xml:space="preserve">`+"\n",
		w, h, w, h, id, id, svgFamilies)
	fmt.Fprintf(&b, `<title id="%s-title">%s</title>`+"\n", id, escapeXML(clean(title)))
	fmt.Fprintf(&b, `<desc id="%s-description">%s</desc>`+"\n", id, escapeXML(clean(description)))
	fmt.Fprintf(&b, `<rect width="%s" height="%s" fill="%s"/>`+"\n", w, h, hexOf(Paper))
	b.Write(body.Bytes())
	b.WriteString("</svg>\n")
	return b.Bytes(), nil
}

var escapeXML = strings.NewReplacer("&", "&amp;", "<", "&lt;", ">", "&gt;", `"`, "&quot;", "'", "&#39;").Replace

func short(v float64) string { return string(appendShort(nil, v, 3)) }

func hexOf(c Colour) string { return fmt.Sprintf("#%02x%02x%02x", c.R, c.G, c.B) }

type svgBody struct{ bytes.Buffer }

func (b *svgBody) play(ops []op) {
	var open []string
	for i := range ops {
		o := &ops[i]
		switch o.kind {
		case shapeOp, circleOp:
			b.shape(o)
		case textOp:
			b.text(o)
		case clipOp:
			// a picture in the picture clips, and needs no id
			x, y, w, h := short(o.points[0].X), short(o.points[0].Y), short(o.points[1].X), short(o.points[1].Y)
			fmt.Fprintf(b, `<svg x="%s" y="%s" width="%s" height="%s" viewBox="%s %s %s %s" overflow="hidden">`+"\n", x, y, w, h, x, y, w, h)
			open = append(open, "</svg>\n")
		case groupOp:
			b.WriteString("<g>")
			if o.title != "" {
				b.WriteString("<title>" + escapeXML(o.title) + "</title>")
			}
			if o.description != "" {
				b.WriteString("<desc>" + escapeXML(o.description) + "</desc>")
			}
			b.WriteByte('\n')
			open = append(open, "</g>\n")
		case endOp:
			b.WriteString(open[len(open)-1])
			open = open[:len(open)-1]
		}
	}
}

// attribute writes one.
func (b *svgBody) attribute(name, value string) {
	b.WriteString(` ` + name + `="` + value + `"`)
}

func (b *svgBody) opacity(name string, c Colour) {
	if c.A < 255 {
		b.attribute(name, short(float64(c.A)/255))
	}
}

func (b *svgBody) shape(o *op) {
	if o.kind == circleOp {
		b.WriteString("<circle")
		b.attribute("cx", short(o.points[0].X))
		b.attribute("cy", short(o.points[0].Y))
		b.attribute("r", short(o.size))
	} else {
		b.WriteString(`<path d="`)
		d := []byte("M")
		for i, p := range o.points {
			if i > 0 {
				d = append(d, ' ')
			}
			d = appendShort(append(appendShort(d, p.X, 3), ' '), p.Y, 3)
		}
		if o.closed {
			d = append(d, 'z')
		}
		b.Write(append(d, '"'))
	}
	if o.fill.A > 0 {
		b.attribute("fill", hexOf(o.fill))
		b.opacity("fill-opacity", o.fill)
	}
	if s := o.stroke; s.visible() {
		b.attribute("stroke", hexOf(s.Colour))
		b.attribute("stroke-width", short(s.Width))
		b.opacity("stroke-opacity", s.Colour)
		if len(s.Dash) > 0 {
			var dash []string
			for _, v := range s.Dash {
				dash = append(dash, short(v))
			}
			b.attribute("stroke-dasharray", strings.Join(dash, " "))
			b.attribute("stroke-linecap", "butt")
		}
	}
	b.WriteString("/>\n")
}

func (b *svgBody) text(o *op) {
	t, at := o.text, o.points[0]
	b.WriteString("<text")
	b.attribute("font-size", short(t.MM()))
	b.attribute("fill", hexOf(t.Colour))
	b.opacity("fill-opacity", t.Colour)
	switch t.Face {
	case Semibold:
		b.attribute("font-weight", "600")
	case Italic:
		b.attribute("font-style", "italic")
	}
	if t.Turn != 0 {
		b.attribute("transform", fmt.Sprintf("rotate(%s %s %s)", short(-t.Turn), short(at.X), short(at.Y)))
	}
	b.attribute("x", short(at.X))
	b.attribute("y", short(at.Y))
	switch t.Align {
	case Centre:
		b.attribute("text-anchor", "middle")
	case Right:
		b.attribute("text-anchor", "end")
	}
	if o.size > 0 { // holds text to its width in a viewer that takes another font
		b.attribute("textLength", strconv.FormatFloat(o.size, 'f', 2, 64))
		b.attribute("lengthAdjust", "spacingAndGlyphs")
	}
	b.WriteByte('>')
	level := onLine
	for _, r := range o.runs {
		s := escapeXML(r.s)
		if r.script == level && level == onLine {
			b.WriteString(s)
			continue
		}
		b.WriteString("<tspan")
		b.attribute("dy", short((r.shift()-level.shift())*t.MM()))
		if level = r.script; level != onLine {
			b.attribute("font-size", short(t.MM()*scriptSize))
		}
		b.WriteString(">" + s + "</tspan>")
	}
	b.WriteString("</text>\n")
}
