package draw

// The time that a data sheet takes.

import (
	"fmt"
	"testing"

	"panewright/glazing"
)

// sheetLike returns four pages with a section, a plot and tables, as a data sheet has them.
func sheetLike(b testing.TB) (pages []*Canvas) {
	m := gallery(b)["switch"]
	ratings := ratingsOf(b, m)
	var list []*glazing.Rating
	for i := range ratings {
		list = append(list, &ratings[i])
	}
	for page := range 4 {
		c := New(210, 297)
		c.Text(20, 20, m.ID, Type{Face: Semibold, Size: 14})
		if page < 2 {
			Section(c, Rect{20, 30, 84, 60}, list[page], Temperatures{})
			Plot(c, Rect{20, 95, 170, 60}, [][]Curve{MakeupCurves(list[0]), TintCurves(list)}[page])
		}
		for row := range 40 {
			y := 160 + 3*float64(row)
			c.Text(20, y, "Light transmittance τ_{v}", Type{Size: 8, Markup: true})
			for column := range 4 {
				c.Text(100+20*float64(column), y, fmt.Sprintf("%.3f", float64(row*column)/100), Type{Size: 8, Align: Right})
			}
			c.Text(180, y, "EN 410, 5.2", Type{Size: 7, Face: Italic, Colour: Soft})
			c.Line(20, y+1, 190, y+1, Stroke{Colour: Hair, Width: 0.1})
		}
		pages = append(pages, c)
	}
	return pages
}

// BenchmarkPDF writes four pages with three fonts; aim 3 ms, at most 10 ms.
func BenchmarkPDF(b *testing.B) {
	pages := sheetLike(b)
	b.ReportAllocs()
	for b.Loop() {
		pdf, err := PDF(Document{Title: "A sheet", Pages: pages, Attachments: []Attachment{{Name: "a.json", Content: []byte("{}")}}})
		if err != nil {
			b.Fatal(err)
		}
		b.ReportMetric(float64(len(pdf)), "bytes")
	}
}

// BenchmarkDrawing draws the four pages, without writing them.
func BenchmarkDrawing(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		sheetLike(b)
	}
}

func BenchmarkSection(b *testing.B) {
	r := ratingsOf(b, gallery(b)["switch"])[0]
	for b.Loop() {
		Section(New(210, 297), Rect{20, 30, 84, 60}, &r, Temperatures{})
	}
}

func BenchmarkPlot(b *testing.B) {
	r := ratingsOf(b, gallery(b)["switch"])[0]
	curves := MakeupCurves(&r)
	for b.Loop() {
		Plot(New(210, 297), Rect{20, 30, 170, 60}, curves)
	}
}

func BenchmarkCut(b *testing.B) {
	f := Regular.font()
	var set letterSet
	for _, r := range "Light transmittance τv 0123456789 abcdefghijklmnopqrstuvwxyz ABCDEFGHIJKLMNOPQRSTUVWXYZ ε ρ α ° · ² –" {
		set.add(r)
	}
	for b.Loop() {
		f.cut(set.list())
	}
}

func BenchmarkFonts(b *testing.B) {
	for b.Loop() {
		mustReadFont(Regular)
	}
}

func BenchmarkSVG(b *testing.B) {
	c := sheetLike(b)[0]
	for b.Loop() {
		if _, err := SVG(c, "", ""); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkSectionTemperatures(b *testing.B) {
	r := ratingsUnder(b, gallery(b)["switch"], coldNight, hotNoon)[0]
	t := TemperaturesOf([]*glazing.Rating{r}, ColdAndHot(r))
	for b.Loop() {
		Section(New(210, 297), Rect{20, 30, 84, 70}, r, t)
	}
}
