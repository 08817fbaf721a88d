// Package sheet sets ratings on paper: a schedule of the project, a data sheet for each make-up, the
// limits, the published checks. All figures come from the list of figures, all drawings from
// package draw. The same report gives the same bytes.
package sheet

import (
	"fmt"
	"slices"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// A4, and the margins of a page, in mm.
const (
	pageW, pageH = 210.0, 297.0
	left, right  = 17.0, 193.0
	top          = 15.0
	bottom       = 267.0 // below stand the names of who signs, and the foot
	width        = right - left
)

// The type of pages.
var (
	titleType   = draw.Type{Face: draw.Semibold, Size: 19}
	headType    = draw.Type{Face: draw.Semibold, Size: 8.6}
	nameType    = draw.Type{Face: draw.Regular, Size: 11}
	textType    = draw.Type{Face: draw.Regular, Size: 7.6}
	strongType  = draw.Type{Face: draw.Semibold, Size: 7.6}
	smallType   = draw.Type{Face: draw.Regular, Size: 6.5}
	softType    = draw.Type{Face: draw.Regular, Size: 6.5, Colour: draw.Soft}
	numberType  = draw.Type{Face: draw.Semibold, Size: 17}
	symbolType  = draw.Type{Face: draw.Regular, Size: 7.6, Markup: true}
	hair        = draw.Stroke{Colour: draw.Hair, Width: 0.2}
	rule        = draw.Stroke{Colour: draw.Ink, Width: 0.35}
	accentRule  = draw.Stroke{Colour: draw.Accent, Width: 0.9}
	notRating   = "Calculated figures, not a certified rating."
	patchesNote = "Patches are sRGB of the computed colour under daylight D65, 2° observer: indicative only."
)

// paper gathers the pages of a document.
type paper struct {
	r     table.Report
	pages []*draw.Canvas
	c     *draw.Canvas // the page that is being set
	y     float64      // where the next block begins
	// single says that the document has one make-up and no schedule.
	single bool
	long   string // a title that was too long for the head
	// head sets the head of a page that goes on from the one before, and returns where it ends.
	head func() float64
}

// next begins a page.
func (p *paper) next() {
	p.c = draw.New(pageW, pageH)
	p.pages = append(p.pages, p.c)
	p.y = top
	if p.head != nil {
		p.y = p.head()
	}
}

// room makes sure that a block of a height finds place, on another page if need be.
func (p *paper) room(h float64) {
	if p.y+h > bottom && p.y > top+30 {
		p.next()
	}
}

// foot sets the foot of every page, once all are there.
func (p *paper) foot(digest string) {
	if digest != "" {
		digest = " · input sha256 " + digest
	}
	for i, c := range p.pages {
		y := pageH - 10.5
		c.Line(left, y-4, right, y-4, hair)
		c.Text(left, y, "Panewright "+p.r.Version+digest, softType)
		c.Text(right, y, fmt.Sprintf("%d / %d", i+1, len(p.pages)), softType.To(draw.Right))
		c.Text(left, y+3.2, notRating+" The local authority's rules and licensed practitioners decide what may be built.", softType)
	}
}

// about are the lines of what the user says of the project.
func (p *paper) about() string {
	var parts []string
	for _, x := range []struct{ name, text string }{{"client", p.r.Project.Client}, {"author", p.r.Project.Author}, {"date", p.r.Project.Date}} {
		if x.text != "" {
			parts = append(parts, x.name+" "+x.text)
		}
	}
	return strings.Join(parts, " · ")
}

// A File is one PDF: its make-up, or "" for all of them, and the letters that no font has and that
// a mark stands for.
type File struct {
	Makeup   string
	PDF      []byte
	Replaced []rune
}

// Project returns one PDF with the schedule, the limits if there are any, and a sheet for every
// make-up and basis.
func Project(r table.Report, limits *table.Check) (File, error) {
	p := &paper{r: r}
	p.schedule()
	if limits != nil {
		p.limits(*limits)
	}
	for _, group := range groups(r) {
		p.makeup(group)
	}
	return p.file("", r.Project.Title+": data sheets")
}

// Makeups returns a PDF for each make-up.
func Makeups(r table.Report) ([]File, error) {
	var files []File
	var order []*glazing.Makeup
	of := map[*glazing.Makeup][][]*glazing.Rating{}
	for _, group := range groups(r) {
		m := group[0].Makeup
		if of[m] == nil {
			order = append(order, m)
		}
		of[m] = append(of[m], group)
	}
	for _, m := range order {
		part := r
		part.Ratings, part.Spectra = nil, nil
		p := &paper{single: true}
		for _, group := range of[m] {
			for _, rating := range group {
				part.Ratings = append(part.Ratings, *rating)
			}
		}
		p.r = part
		for _, group := range of[m] {
			p.makeup(group)
		}
		f, err := p.file(m.ID, m.ID+": data sheet")
		if err != nil {
			return nil, err
		}
		files = append(files, f)
	}
	return files, nil
}

// groups returns the ratings of each make-up under each basis.
func groups(r table.Report) (list [][]*glazing.Rating) {
	for i := range r.Ratings {
		rating := &r.Ratings[i]
		if n := len(list); n > 0 && list[n-1][0].Makeup == rating.Makeup && list[n-1][0].Method == rating.Method {
			list[n-1] = append(list[n-1], rating)
			continue
		}
		list = append(list, []*glazing.Rating{rating})
	}
	return list
}

// file writes the pages, with the figures in JSON.
func (p *paper) file(makeup, title string) (File, error) {
	p.foot(p.r.Project.Digest)
	return p.write(makeup, title, table.JSON(p.r), "figures.json")
}

// write writes the pages with an attachment.
func (p *paper) write(makeup, title string, attached []byte, name string) (File, error) {
	f := File{Makeup: makeup}
	for _, c := range p.pages {
		for _, r := range c.Replaced() {
			f.Replaced = add(f.Replaced, r)
		}
	}
	slices.Sort(f.Replaced)
	var err error
	f.PDF, err = draw.PDF(draw.Document{
		Title: title, Author: p.r.Project.Author, Subject: notRating, Keywords: "glazing, calculated figures", Producer: "Panewright " + p.r.Version,
		Pages:       p.pages,
		Attachments: []draw.Attachment{{Name: name, Description: "The figures of this document with all their digits", Content: attached}},
	})
	return f, err
}
