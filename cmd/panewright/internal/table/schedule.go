package table

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	pretty "github.com/jedib0t/go-pretty/v6/table"
	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// Width is how wide printed text may be.
const Width = 80

// nameWidth is where long ids are folded in the schedule.
const nameWidth = 22

// Schedule returns the report as text: a table for each basis, the build-up of each make-up, the
// symbols, the cautions and what makes the page traceable.
func Schedule(r Report) []byte {
	var b bytes.Buffer
	heading(&b, r)
	if len(r.Ratings) == 0 {
		b.WriteString("\nNo make-up to rate.\n")
	}
	for _, name := range r.bases() {
		r.block(&b, name)
	}
	r.buildUps(&b)
	r.symbols(&b)
	r.cautionList(&b)
	fmt.Fprintf(&b, "\nPanewright %s, input sha256\n%s\n", r.Version, r.Project.Digest)
	return b.Bytes()
}

// heading prints what the user says of the project.
func heading(b *bytes.Buffer, r Report) {
	p := r.Project
	writeWrapped(b, p.Title, "")
	var line []string
	for _, s := range []string{p.Client, p.Author, p.Date} {
		if s != "" {
			line = append(line, s)
		}
	}
	if line != nil {
		writeWrapped(b, strings.Join(line, " · "), "")
	}
	if p.Notes != "" {
		writeWrapped(b, p.Notes, "")
	}
}

// column is one column of the schedule, already printed.
type column struct {
	head  string
	cells []string
	width int
}

func newColumn(head string, cells []string) column {
	c := column{head, cells, text.StringWidth(head)}
	for _, cell := range cells {
		for line := range strings.SplitSeq(cell, "\n") {
			c.width = max(c.width, text.StringWidth(line))
		}
	}
	return c
}

// block prints the table of one basis, folded into several where it is wider than the page.
func (r Report) block(b *bytes.Buffer, basis string) {
	var rows []*glazing.Rating
	for i := range r.Ratings {
		if r.Ratings[i].Method.Basis.Name == basis {
			rows = append(rows, &r.Ratings[i])
		}
	}
	b.WriteByte('\n')
	writeWrapped(b, "Basis "+basis+": "+rows[0].Method.Editions(), "  ")
	var ids, tints []string
	tinted := false
	for _, row := range rows {
		ids = append(ids, text.WrapHard(row.Makeup.ID, nameWidth))
		tints = append(tints, text.WrapHard(row.Tint, nameWidth))
		tinted = tinted || row.Tint != ""
	}
	names := []column{newColumn("make-up", ids)}
	if tinted {
		names = append(names, newColumn("tint", tints))
	}
	var figures []column
	for _, f := range r.Figures {
		if !f.Column || f.Per != glazing.PerMakeup {
			continue
		}
		var cells []string
		for _, row := range rows {
			cells = append(cells, f.Print(row, 0))
		}
		figures = append(figures, newColumn(f.Symbol, cells))
	}
	for len(figures) > 0 {
		n, width := 0, 0
		for _, c := range names {
			width += c.width + gutter
		}
		for n < len(figures) && (n == 0 || width+figures[n].width <= Width) {
			width += figures[n].width + gutter
			n++
		}
		b.WriteByte('\n')
		render(b, append(slices.Clone(names), figures[:n]...), len(names))
		figures = figures[n:]
	}
}

const gutter = 2

// render prints columns side by side; those after the names are right-aligned.
func render(b *bytes.Buffer, columns []column, names int) {
	t := pretty.NewWriter()
	t.SetOutputMirror(nil)
	style := pretty.StyleDefault
	style.Options = pretty.OptionsNoBordersAndSeparators
	style.Box = pretty.BoxStyle{PaddingRight: strings.Repeat(" ", gutter)}
	style.Format.Header = text.FormatDefault
	t.SetStyle(style)
	var head pretty.Row
	var configs []pretty.ColumnConfig
	for i, c := range columns {
		head = append(head, c.head)
		align := text.AlignRight
		if i < names {
			align = text.AlignLeft
		}
		configs = append(configs, pretty.ColumnConfig{Number: i + 1, Align: align, AlignHeader: align})
	}
	t.SetColumnConfigs(configs)
	t.AppendHeader(head)
	for k := range columns[0].cells {
		var row pretty.Row
		for _, c := range columns {
			row = append(row, c.cells[k])
		}
		t.AppendRow(row)
	}
	for line := range strings.SplitSeq(t.Render(), "\n") {
		b.WriteString(strings.TrimRight(line, " ") + "\n")
	}
}

// buildUps prints each make-up once: title, sequence, what the user typed.
func (r Report) buildUps(b *bytes.Buffer) {
	var done []*glazing.Makeup
	for i := range r.Ratings {
		m := r.Ratings[i].Makeup
		if slices.Contains(done, m) {
			continue
		}
		if done == nil {
			b.WriteString("\nMake-ups, from outside to inside\n")
		}
		done = append(done, m)
		title := m.ID
		if m.Title != "" {
			title += "  " + m.Title
		}
		if !m.Tilt.Vertical() {
			title += fmt.Sprintf(" (tilt %.6g°)", m.Tilt.Degrees())
		}
		writeWrapped(b, title, "    ")
		writeWrapped(b, "    "+m.BuildUp(), "    ")
		for _, t := range m.Typed {
			writeWrapped(b, "    typed by the user: "+t.Name+": "+t.Text, "    ")
		}
	}
}

// symbols prints what the columns mean.
func (r Report) symbols(b *bytes.Buffer) {
	if len(r.Ratings) == 0 {
		return
	}
	var parts []string
	for _, f := range r.Figures {
		if f.Column && f.Per == glazing.PerMakeup {
			s := f.Symbol + " " + f.Meaning
			if f.Unit != "" {
				s += ", " + f.Unit
			}
			parts = append(parts, s)
		}
	}
	b.WriteString("\nSymbols\n")
	writeWrapped(b, strings.Join(parts, "; ")+"; – not known.", "")
}

// cautionList prints each caution once, with the ratings it belongs to where these are not all.
func (r Report) cautionList(b *bytes.Buffer) {
	type entry struct {
		glazing.Caution
		of []string
	}
	var list []*entry
	for i := range r.Ratings {
		name := r.Ratings[i].Makeup.ID
		if r.Ratings[i].Tint != "" {
			name += " " + r.Ratings[i].Tint
		}
		for _, c := range r.cautions(i) {
			at := slices.IndexFunc(list, func(e *entry) bool { return e.Caution == c })
			if at < 0 {
				list = append(list, &entry{Caution: c})
				at = len(list) - 1
			}
			list[at].of = append(list[at].of, name)
		}
	}
	if list == nil {
		return
	}
	b.WriteString("\nCautions\n")
	slices.SortStableFunc(list, func(x, y *entry) int { // what holds for all comes first
		return b2i(len(x.of) < len(r.Ratings)) - b2i(len(y.of) < len(r.Ratings))
	})
	for _, e := range list {
		if e.Code == "edition" {
			continue // stands above each table
		}
		s := "- " + e.Text
		if len(e.of) < len(r.Ratings) {
			s += " [" + strings.Join(slices.Compact(e.of), ", ") + "]"
		}
		writeWrapped(b, s, "  ")
	}
}

func b2i(b bool) int {
	if b {
		return 1
	}
	return 0
}

// writeWrapped writes text folded at the page's width, with an indent for the lines after the
// first.
func writeWrapped(b *bytes.Buffer, s, indent string) {
	lead := s[:len(s)-len(strings.TrimLeft(s, " "))]
	width, line := 0, lead
	width = text.StringWidth(lead)
	empty := true
	flush := func() {
		b.WriteString(strings.TrimRight(line, " ") + "\n")
		line, width, empty = indent, text.StringWidth(indent), true
	}
	for _, word := range strings.Fields(s) {
		for _, piece := range strings.Split(text.WrapHard(word, Width-len(indent)-len(lead)), "\n") {
			w := text.StringWidth(piece)
			if !empty && width+1+w > Width {
				flush()
			}
			if !empty {
				line, width = line+" ", width+1
			}
			line, width, empty = line+piece, width+w, false
		}
	}
	if !empty {
		flush()
	}
}
