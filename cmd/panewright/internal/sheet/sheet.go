// Package sheet sets ratings on paper: a schedule of the project, a data sheet for each make-up, the
// limits, the published checks. All figures come from the list of figures, all drawings from
// package draw. The same report gives the same bytes.
package sheet

import (
	"fmt"
	"slices"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// A4, and the margins of a page, in mm. A page has two columns: equal ones, or a narrow one of
// drawings and a wide one of tables.
const (
	pageW, pageH = 210.0, 297.0
	left, right  = 17.0, 193.0
	top          = 15.0
	bottom       = 269.0 // below stand the names of who signs, and the foot
	width        = right - left
	gutter       = 6.0
	half         = (width - gutter) / 2
	drawn        = 76.0
	written      = width - gutter - drawn
)

// The type of pages.
var (
	titleType  = draw.Type{Face: draw.Semibold, Size: 19}
	kindType   = draw.Type{Face: draw.Semibold, Size: 15}
	nameType   = draw.Type{Size: 11}
	headType   = draw.Type{Face: draw.Semibold, Size: 8.6}
	numberType = draw.Type{Face: draw.Semibold, Size: 17}
	textType   = draw.Type{Size: 7.6}
	strongType = draw.Type{Face: draw.Semibold, Size: 7.6}
	symbolType = draw.Type{Size: 7.6, Markup: true}
	smallType  = draw.Type{Size: 6.8}
	listType   = draw.Type{Size: 6.8}
	softType   = draw.Type{Size: 6.5, Colour: draw.Soft}
	remarkType = draw.Type{Size: 6.5, Colour: draw.Soft}
	noteType   = draw.Type{Size: 6.2, Colour: draw.Soft}
	hair       = draw.Stroke{Colour: draw.Hair, Width: 0.2}
	faint      = draw.Stroke{Colour: draw.Faint, Width: 0.2}
	rule       = draw.Stroke{Colour: draw.Ink, Width: 0.35}
)

const notRating = "Calculated figures, not a certified rating."

// paper gathers the pages of a document.
type paper struct {
	r     table.Report
	pages []*draw.Canvas
	c     *draw.Canvas // the page that is being set
	y     float64      // where the next block begins
	fresh float64      // where the first block of the page began
	// head sets the head of a page that goes on from the one before, and returns where it ends.
	head func() float64

	cut  []fact          // what was too long for its place and is to stand in full
	full map[string]bool // texts that stand in full

	symbols map[string]bool // of figures, once they were asked for
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

// sign leaves space for names below the last page of a part.
func (p *paper) sign() {
	const y, w = bottom + 7, (width - 2*gutter) / 3
	for i, s := range []string{"prepared by", "checked by", "date"} {
		x := left + float64(i)*(w+gutter)
		p.c.Line(x, y, x+w, y, faint)
		p.c.Text(x, y+2.8, s, softType)
	}
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
	p := projectPages(r, limits)
	attached := []draw.Attachment{figuresFile(r)}
	if limits != nil {
		attached = append(attached, draw.Attachment{Name: "limits.json", Description: "How the figures stand to the entered limits", Content: table.CheckJSON(*limits)})
	}
	return p.write("", r.Project.Title+": data sheets", attached...)
}

func projectPages(r table.Report, limits *table.Check) *paper {
	p := &paper{r: r, full: map[string]bool{}}
	p.schedule()
	if limits != nil {
		p.limits(*limits)
	}
	for _, group := range groups(r) {
		p.makeup(group, false)
	}
	p.foot(r.Project.Digest)
	return p
}

// Makeups returns a PDF for each make-up.
func Makeups(r table.Report) ([]File, error) {
	var files []File
	for _, part := range byMakeup(r) {
		m := part.Ratings[0].Makeup
		f, err := makeupPages(part).write(m.ID, m.ID+": data sheet", figuresFile(part))
		if err != nil {
			return nil, err
		}
		files = append(files, f)
	}
	return files, nil
}

// makeupPages sets the pages of a report that has one make-up.
func makeupPages(r table.Report) *paper {
	p := &paper{r: r, full: map[string]bool{}}
	list := groups(r)
	for i, group := range list {
		p.makeup(group, i == len(list)-1)
	}
	p.foot(r.Project.Digest)
	return p
}

// byMakeup returns a report for each make-up.
func byMakeup(r table.Report) (list []table.Report) {
	at := map[*glazing.Makeup]int{}
	for _, rating := range r.Ratings {
		k, ok := at[rating.Makeup]
		if !ok {
			k = len(list)
			at[rating.Makeup] = k
			part := r
			part.Ratings, part.Spectra = nil, nil
			list = append(list, part)
		}
		list[k].Ratings = append(list[k].Ratings, rating)
	}
	return list
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

// attachedName is the file in a document that has its figures with all their digits.
const attachedName = "figures.json"

func figuresFile(r table.Report) draw.Attachment {
	return draw.Attachment{Name: attachedName, Description: "The figures of this document with all their digits", Content: table.JSON(r)}
}

// write writes the pages with attachments.
func (p *paper) write(makeup, title string, attached ...draw.Attachment) (File, error) {
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
		Pages: p.pages, Attachments: attached,
	})
	return f, err
}
