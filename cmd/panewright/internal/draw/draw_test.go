package draw

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"io"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"
)

// drawn has one of everything, with text that somebody may have chosen with care.
func drawn(text string) *Canvas {
	c := New(120, 100)
	thin := Stroke{Colour: Ink, Width: 0.2}
	c.Group(text, text, func() {
		c.Line(5, 5, 115, 5, thin)
		c.Polyline([]Point{{5, 10}, {20, 15.25}, {40, 9}}, Stroke{Colour: Accent, Width: 0.3, Dash: []float64{2, 1}})
		c.Polygon([]Point{{50, 10}, {60, 10}, {55, 18}}, thin, Accent.Over(0.4))
		c.Rectangle(Rect{70, 8, 10, 10}, Stroke{Colour: Soft.Over(0.5), Width: 0.4}, Wash)
		c.Circle(95, 13, 4, thin, Hair)
		c.Hatch(Rect{5, 20, 20, 10}, 1.5, 45, thin)
	})
	c.Clip(Rect{30, 20, 20, 10}, func() {
		c.Circle(30, 20, 9, thin, Accent)
		c.Text(25, 26, text, Type{Size: 9})
	})
	for i, f := range []Face{Regular, Semibold, Italic} {
		c.Text(5, 40+5*float64(i), text, Type{Face: f, Size: 9})
	}
	c.Text(60, 60, text, Type{Size: 9, Align: Centre, Markup: true, Colour: Accent})
	c.Text(115, 65, "W/(m^{2}·K), τ_{v} − 0.5", Type{Size: 9, Align: Right, Markup: true})
	c.Text(100, 95, "turned τ_{v}", Type{Size: 9, Turn: 90, Markup: true, Colour: Soft.Over(0.8)})
	return c
}

// hostile are texts that have broken writers of files.
var hostile = []string{
	"", " ", "plain", `<script>alert("1")</script>`, "]]>", "<!-- -- -->", `&amp; & &#0; "quoted" 'so'`, `back\slash (and) brackets) \`,
	"line\nfeed\r\n and\ttab", "\x00\x01\x1f\x7f", "bad \xff\xc0\x80 bytes", "turn \u202e\u2066 back", "\ufeff\ufffe\uffff", "😀 漢字 \U0010ffff",
	"ὑαλος Ткацкий-зал ŁŻ", "%PDF-1.4 endstream endobj >> stream", "_{^{_{}}", `\`, strings.Repeat("W", 3000), "{{.}} ${x} `", "e\u0301 \u0301",
}

// Both back ends write every text, valid and the same at each time.
func TestHostileText(t *testing.T) {
	for _, text := range hostile {
		c := drawn(text)
		if c.Err() != nil {
			t.Fatalf("%q: %v", text, c.Err())
		}
		svg, err := SVG(c, text, text)
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		wellFormed(t, svg)
		document := Document{Title: text, Author: text, Subject: text, Keywords: text, Producer: text, Pages: []*Canvas{c, c},
			Attachments: []Attachment{{text, text, []byte(text)}}}
		pdf, err := PDF(document)
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		again, _ := SVG(drawn(text), text, text)
		document.Pages = []*Canvas{drawn(text), c}
		pdfAgain, _ := PDF(document)
		if !bytes.Equal(svg, again) || !bytes.Equal(pdf, pdfAgain) {
			t.Errorf("%q gives different bytes each time", text)
		}
	}
}

// wellFormed reads SVG with a strict reader: one root, no element that runs, titles that the root
// names.
func wellFormed(t *testing.T, svg []byte) {
	t.Helper()
	d := xml.NewDecoder(bytes.NewReader(svg))
	d.Strict = true
	known := map[string]bool{"svg": true, "title": true, "desc": true, "g": true, "path": true, "circle": true, "rect": true, "text": true, "tspan": true}
	ids := map[string]string{}
	var labelled, described string
	depth := 0
	for {
		token, err := d.Token()
		if err == io.EOF {
			break
		}
		if err != nil {
			t.Fatalf("SVG is not well-formed: %v", err)
		}
		switch e := token.(type) {
		case xml.StartElement:
			if !known[e.Name.Local] {
				t.Errorf("SVG has the element %s", e.Name.Local)
			}
			for _, a := range e.Attr {
				switch {
				case a.Name.Local == "id":
					ids[a.Value] = e.Name.Local
				case a.Name.Local == "aria-labelledby":
					labelled = a.Value
				case a.Name.Local == "aria-describedby":
					described = a.Value
				case strings.HasPrefix(a.Name.Local, "on") || a.Name.Local == "href":
					t.Errorf("SVG has the attribute %s", a.Name.Local)
				case strings.Contains(a.Value, "NaN") || strings.Contains(a.Value, "Inf"):
					t.Errorf("SVG has the number %s", a.Value)
				}
			}
			if depth++; depth == 1 && (e.Name.Local != "svg" || e.Name.Space != "http://www.w3.org/2000/svg") {
				t.Errorf("the root is %v", e.Name)
			}
		case xml.EndElement:
			depth--
		case xml.Directive, xml.ProcInst, xml.Comment:
			t.Errorf("SVG holds %v", e)
		}
	}
	if ids[labelled] != "title" || ids[described] != "desc" {
		t.Errorf("the root is labelled by %q and described by %q; there are %v", labelled, described, ids)
	}
}

// Text in SVG is the text that was set, and stays so in pieces with scripts.
func TestSVGTextStays(t *testing.T) {
	c := New(100, 20)
	c.Text(10, 10, `τ_{v} < ρ & "U_{g}" x^{2} end`, Type{Size: 10, Markup: true})
	svg, err := SVG(c, "t", "d")
	if err != nil {
		t.Fatal(err)
	}
	d := xml.NewDecoder(bytes.NewReader(svg))
	var b strings.Builder
	in := false
	for {
		token, err := d.Token()
		if err != nil {
			break
		}
		switch e := token.(type) {
		case xml.StartElement:
			in = in || e.Name.Local == "text"
		case xml.EndElement:
			in = in && e.Name.Local != "text"
		case xml.CharData:
			if in {
				b.Write(e)
			}
		}
	}
	if want := `τv < ρ & "Ug" x2 end`; b.String() != want {
		t.Errorf("text is %q, want %q", b.String(), want)
	}
}

// Turned by a quarter, text runs upwards, and what stands lower stands to the right.
func TestTurnedText(t *testing.T) {
	const k = 72 / 25.4
	c := New(100, 80)
	c.Text(20, 50, "a_{b}", Type{Size: 20, Markup: true, Turn: 90})
	pdf, err := PDF(Document{Pages: []*Canvas{c}, Plain: true})
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{
		fmt.Sprintf("BT 0 1 -1 0 %s %s Tm (a) Tj ET", appendShort(nil, 20*k, 2), appendShort(nil, 30*k, 2)),
		fmt.Sprintf("BT 0 1 -1 0 %s %s Tm (b) Tj ET", appendShort(nil, 20*k+0.16*20, 2), appendShort(nil, (30+Width("a", Type{Size: 20}))*k, 2)),
	} {
		if !bytes.Contains(pdf, []byte(want)) {
			t.Errorf("PDF lacks %s", want)
		}
	}
}

// A coordinate that is no number stops the drawing and reaches no file.
func TestNotFinite(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, draw := range map[string]func(c *Canvas){
		"line":      func(c *Canvas) { c.Line(1, nan, 2, 3, Stroke{Colour: Ink, Width: 1}) },
		"width":     func(c *Canvas) { c.Line(1, 1, 2, 3, Stroke{Colour: Ink, Width: inf}) },
		"dash":      func(c *Canvas) { c.Line(1, 1, 2, 3, Stroke{Colour: Ink, Width: 1, Dash: []float64{nan}}) },
		"polygon":   func(c *Canvas) { c.Polygon([]Point{{1, 1}, {2, 2}, {-inf, 2}}, Stroke{}, Ink) },
		"rectangle": func(c *Canvas) { c.Rectangle(Rect{1, 1, inf, 2}, Stroke{}, Ink) },
		"circle":    func(c *Canvas) { c.Circle(1, 1, nan, Stroke{}, Ink) },
		"text":      func(c *Canvas) { c.Text(nan, 1, "x", Type{Size: 9}) },
		"size":      func(c *Canvas) { c.Text(1, 1, "x", Type{Size: inf}) },
		"turn":      func(c *Canvas) { c.Text(1, 1, "x", Type{Size: 9, Turn: nan}) },
		"hatch":     func(c *Canvas) { c.Hatch(Rect{1, 1, 2, 2}, 1, nan, Stroke{Colour: Ink, Width: 1}) },
		"clip":      func(c *Canvas) { c.Clip(Rect{1, nan, 2, 2}, func() {}) },
		"far":       func(c *Canvas) { c.Line(1, 1, 1e300, 1, Stroke{Colour: Ink, Width: 1}) },
	} {
		c := New(100, 100)
		draw(c)
		first := c.Err()
		c.Line(0, 0, 1, 1, Stroke{Colour: Ink, Width: 1})
		c.Circle(nan, nan, nan, Stroke{}, Ink)
		if first == nil || c.Err() != first {
			t.Errorf("%s: error %v, later %v", name, first, c.Err())
			continue
		}
		if b, err := SVG(c, "", ""); err == nil || b != nil {
			t.Errorf("%s: SVG is written", name)
		}
		if b, err := PDF(Document{Pages: []*Canvas{New(10, 10), c}}); err == nil || b != nil {
			t.Errorf("%s: PDF is written", name)
		} else if !strings.Contains(err.Error(), "page 2") {
			t.Errorf("%s: %v does not name the page", name, err)
		}
	}
	if New(nan, 100).Err() == nil {
		t.Error("a canvas may be of any size")
	}
	if _, err := PDF(Document{}); err == nil {
		t.Error("a document without pages is written")
	}
}

// Letters that the fonts lack are replaced, and said to be.
func TestReplaced(t *testing.T) {
	c := New(100, 100)
	c.Text(5, 5, "漢 a 😀 漢 \xff", Type{Size: 9})
	c.Text(5, 15, "字", Type{Size: 9, Face: Italic})
	if got, want := string(c.Replaced()), "字漢\ufffd😀"; got != want {
		t.Errorf("replaced are %q, want %q", got, want)
	}
	if got, want := c.ops[0].runs[0].s, "□ a □ □ □"; got != want {
		t.Errorf("text is set as %q, want %q", got, want)
	}
}

// Documents are written at the same time without disturbing each other.
func TestDocumentsAtOnce(t *testing.T) {
	write := func() []byte {
		b, err := PDF(Document{Title: "t", Pages: []*Canvas{drawn("Ткацкий-зал"), drawn("ὑαλος")}})
		if err != nil {
			t.Error(err)
		}
		return b
	}
	want := write()
	var wait sync.WaitGroup
	for range 8 {
		wait.Go(func() {
			if !bytes.Equal(write(), want) {
				t.Error("a document differs from the same one written alone")
			}
		})
	}
	wait.Wait()
}

// What is said of a document is in it: dates are the given or fixed ones, never now.
func TestPDFSaysOfItself(t *testing.T) {
	c := New(210, 297)
	c.Text(20, 20, "x", Type{Size: 9})
	b, err := PDF(Document{Title: "Schedule", Pages: []*Canvas{c}, Plain: true})
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{"/CreationDate (D:20000101000000)", "/ModDate (D:20000101000000)", "/MediaBox [0 0 595.28 841.89]", "+SourceSans3-Regular"} {
		if !bytes.Contains(b, []byte(want)) {
			t.Errorf("the document lacks %s", want)
		}
	}
	if bytes.Contains(b, []byte("Semibold")) {
		t.Error("a font is embedded that is not used")
	}
	b, _ = PDF(Document{Date: time.Date(2026, 3, 4, 5, 6, 7, 0, time.FixedZone("", 3600)), Pages: []*Canvas{c}})
	if !bytes.Contains(b, []byte("(D:20260304040607)")) {
		t.Error("the given date is not in the document")
	}
}

// More letters beyond ASCII than one font of a document has codes are shared out among several.
func TestManyLetters(t *testing.T) {
	c := New(210, 297)
	var letters []rune
	for r := rune(0xc0); r < 0x500; r++ {
		if Regular.font().glyph(r) != 0 && clean(string(r)) != "" {
			letters = append(letters, r)
		}
	}
	if len(letters) < 400 {
		t.Fatalf("the font has %d letters", len(letters))
	}
	y := 20.0
	for _, line := range Wrap(string(letters)+" ab"+string(letters[200])+"cd", 170, Type{Size: 9}) {
		c.Text(20, y, line, Type{Size: 9})
		y += 4
	}
	b, err := PDF(Document{Pages: []*Canvas{c}, Plain: true})
	if err != nil {
		t.Fatal(err)
	}
	if n := len(regexp.MustCompile(`/BaseFont /[A-Z]{6}\+SourceSans3-Regular\b`).FindAll(b, -1)); n != (len(letters)+127)/128 {
		t.Errorf("there are %d fonts for %d letters", n, len(letters))
	}
	text := strings.Join(strings.Fields(extracted(t, b)), "")
	if want := string(letters) + "ab" + string(letters[200]) + "cd"; text != want {
		t.Errorf("a reader finds\n%s\nwant\n%s", text, want)
	}
}

// extracted returns the text that an independent reader finds in a document.
func extracted(t *testing.T, pdf []byte) string {
	t.Helper()
	tool, err := exec.LookPath("pdftotext")
	if err != nil {
		t.Skip("there is no pdftotext")
	}
	path := filepath.Join(t.TempDir(), "a.pdf")
	if err := os.WriteFile(path, pdf, 0o644); err != nil {
		t.Fatal(err)
	}
	out, err := exec.Command(tool, "-layout", "-enc", "UTF-8", path, "-").Output()
	if err != nil {
		t.Fatalf("pdftotext: %v", err)
	}
	return string(out)
}

// A reader finds the text of a page.
func TestPDFTextIsFound(t *testing.T) {
	b, err := PDF(Document{Pages: []*Canvas{drawn("Ткацкий-зал (ὑαλος) \\ <&>")}})
	if err != nil {
		t.Fatal(err)
	}
	text := extracted(t, b)
	for want, times := range map[string]int{"Ткацкий-зал (ὑαλος) \\ <&>": 4, "W/(m2·K), τv − 0.5": 1, "turned τv": 1} { // one is clipped
		if n := strings.Count(text, want); n != times {
			t.Errorf("a reader finds %q %d times, want %d, in\n%s", want, n, times, text)
		}
	}
}

// Both back ends put text where it was set: worked by hand from its width, with y upwards and points
// of 25.4/72 mm in PDF, and an index lowered by 0.16 of the size.
func TestTextStandsWhereSet(t *testing.T) {
	const k = 72 / 25.4
	typ := Type{Size: 20, Markup: true}
	w := Width("ab", typ)
	for _, tt := range []struct {
		align  Align
		left   float64 // of the point
		anchor string
	}{{Left, 0, ""}, {Centre, w / 2, ` text-anchor="middle"`}, {Right, w, ` text-anchor="end"`}} {
		c := New(100, 80)
		c.Text(40, 30, "ab", typ.To(tt.align))
		c.Text(10, 60, "a_{b}", typ)
		pdf, err := PDF(Document{Pages: []*Canvas{c}, Plain: true})
		if err != nil {
			t.Fatal(err)
		}
		var got [][2]float64
		for _, m := range regexp.MustCompile(`BT ([\d.]+) ([\d.]+) Td \((\w+)\) Tj`).FindAllStringSubmatch(string(pdf), -1) {
			x, _ := strconv.ParseFloat(m[1], 64)
			y, _ := strconv.ParseFloat(m[2], 64)
			got = append(got, [2]float64{x, y})
		}
		want := [][2]float64{{(40 - tt.left) * k, 50 * k}, {10 * k, 20 * k}, {(10 + Width("a", typ)) * k, 20*k - 0.16*20}}
		if len(got) != len(want) {
			t.Fatalf("PDF has texts at %v, want %v", got, want)
		}
		for i := range want {
			if math.Abs(got[i][0]-want[i][0]) > 0.006 || math.Abs(got[i][1]-want[i][1]) > 0.006 {
				t.Errorf("align %d: PDF has text %d at %v, want %v", tt.align, i, got[i], want[i])
			}
		}
		svg, err := SVG(c, "", "")
		if err != nil {
			t.Fatal(err)
		}
		for _, line := range []string{
			fmt.Sprintf(`<text font-size="7.056" fill="#1d2126" x="40" y="30"%s textLength="%.2f" lengthAdjust="spacingAndGlyphs">ab</text>`, tt.anchor, w),
			fmt.Sprintf(`x="10" y="60" textLength="%.2f" lengthAdjust="spacingAndGlyphs">a<tspan dy="1.129" font-size="5.08">b</tspan></text>`, Width("a_{b}", typ)),
		} {
			if !bytes.Contains(svg, []byte(line)) {
				t.Errorf("align %d: SVG lacks %s in\n%s", tt.align, line, svg)
			}
		}
	}
}

// Lines of a hatch lie in their rectangle, at their distance, and as many as fit: at 45° a square
// of side a has a diagonal of a·√2.
func TestHatch(t *testing.T) {
	r := Rect{10, 20, 30, 30}
	for _, angle := range []float64{0, 30, 45, 52, 90, 135} {
		lines := hatch(r, 2, angle)
		sin, cos := math.Sincos(angle * math.Pi / 180)
		last := math.Inf(-1)
		for _, l := range lines {
			a, b := l[0].X*sin+l[0].Y*cos, l[1].X*sin+l[1].Y*cos
			if math.Abs(a-b) > 1e-6 {
				t.Errorf("at %g° the line %v is at another angle", angle, l)
			}
			if !math.IsInf(last, -1) && math.Abs(a-last-2) > 1e-6 {
				t.Errorf("at %g° lines are %g apart", angle, a-last)
			}
			last = a
			for _, p := range l {
				if p.X < r.X-1e-6 || p.X > r.Right()+1e-6 || p.Y < r.Y-1e-6 || p.Y > r.Bottom()+1e-6 {
					t.Errorf("at %g° the line %v leaves the rectangle", angle, l)
				}
			}
		}
		breadth := 30 * (math.Abs(sin) + math.Abs(cos))
		if n := float64(len(lines)); n < breadth/2-2 || n > breadth/2+1 {
			t.Errorf("at %g° there are %g lines across %g mm", angle, n, breadth)
		}
	}
}

func TestAppendShort(t *testing.T) {
	for _, tt := range []struct {
		v      float64
		places int
		want   string
	}{{0, 2, "0"}, {-0.001, 2, "0"}, {1.5, 2, "1.5"}, {-1.255, 3, "-1.255"}, {0.05, 2, "0.05"}, {12, 3, "12"}, {100.1, 2, "100.1"},
		{99.999, 2, "100"}, {-0.1, 3, "-0.1"}, {1.005, 1, "1"}, {595.28, 2, "595.28"}} {
		if got := string(appendShort(nil, tt.v, tt.places)); got != tt.want {
			t.Errorf("%g to %d places is %q, want %q", tt.v, tt.places, got, tt.want)
		}
	}
}
