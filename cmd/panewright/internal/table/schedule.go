package table

// The schedule: 80 columns of text that could stand in a report.

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
	if r.InchPound {
		b.WriteByte('\n')
		writeWrapped(&b, siRemains, "")
	}
	for _, x := range r.editions() {
		b.WriteByte('\n')
		writeWrapped(&b, "Basis "+x.basis+": "+x.editions, "  ")
		r.block(&b, x.basis)
		r.balances(x.basis).print(&b)
	}
	r.basesDiffer(&b)
	r.buildUps(&b)
	r.origins(&b)
	r.StressTable().print(&b)
	r.MoistureTable().print(&b)
	r.conditionList(&b)
	r.symbols(&b, r.Columns())
	r.underSymbols(&b)
	r.cautionList(&b)
	r.trace(&b)
	return b.Bytes()
}

// trace prints what makes a page traceable.
func (r Report) trace(b *bytes.Buffer) {
	fmt.Fprintf(b, "\nPanewright %s, input sha256\n%s\n", r.Version, r.Project.Digest)
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

// column is one column of a table, already printed.
type column struct {
	head  string
	cells []string
	width int
	right bool // aligned to the right even where it names the rows
}

func newColumn(head string, cells []string) column {
	c := column{head: head, cells: cells}
	for _, cell := range append([]string{head}, cells...) {
		for line := range strings.SplitSeq(cell, "\n") {
			c.width = max(c.width, width(line))
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
	for _, c := range r.Columns() {
		var cells []string
		for _, row := range rows {
			cells = append(cells, c.Printed(row))
		}
		figures = append(figures, newColumn(c.Head(), cells))
	}
	fold(b, names, figures)
}

// fold prints columns beside those that name the rows, in several tables where one is wider than
// the page.
func fold(b *bytes.Buffer, names, figures []column) {
	total := -gutter
	for _, c := range append(slices.Clone(names), figures...) {
		total += c.width + gutter
	}
	space := gutter
	if total > Width && total-len(figures)-len(names)+1 <= Width {
		space = 1 // then it fits without a fold
	}
	for len(figures) > 0 {
		n, width := 0, 0
		for _, c := range names {
			width += c.width + space
		}
		for n < len(figures) && (n == 0 || width+figures[n].width <= Width) {
			width += figures[n].width + space
			n++
		}
		b.WriteByte('\n')
		render(b, append(slices.Clone(names), figures[:n]...), len(names), space)
		figures = figures[n:]
	}
}

// gutter is the space between columns; where a table fits only so, it is 1.
const gutter = 2

// render prints columns side by side; those after the names are right-aligned.
func render(b *bytes.Buffer, columns []column, names, space int) {
	t := pretty.NewWriter()
	t.SetOutputMirror(nil)
	style := pretty.StyleDefault
	style.Options = pretty.OptionsNoBordersAndSeparators
	style.Box = pretty.BoxStyle{PaddingRight: strings.Repeat(" ", space)}
	style.Format.Header = text.FormatDefault
	t.SetStyle(style)
	var head pretty.Row
	var configs []pretty.ColumnConfig
	for i, c := range columns {
		head = append(head, c.head)
		align := text.AlignRight
		if i < names && !c.right {
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

// buildUp returns the sequence of a make-up in the units of the page.
func (r Report) buildUp(m *glazing.Makeup) string {
	if r.InchPound {
		return m.BuildUpInches()
	}
	return m.BuildUp()
}

// makeups returns each make-up once.
func (r Report) makeups() (list []*glazing.Makeup) {
	for i := range r.Ratings {
		if m := r.Ratings[i].Makeup; !slices.Contains(list, m) {
			list = append(list, m)
		}
	}
	return list
}

// called returns id and title of a make-up, and its tilt where it is not vertical.
func called(m *glazing.Makeup) string {
	s := m.ID
	if m.Title != "" {
		s += " " + m.Title
	}
	if !m.Tilt.Vertical() {
		s += fmt.Sprintf(" (tilt %.6g°)", m.Tilt.Degrees())
	}
	return s
}

// buildUps prints each make-up once: title, sequence, what the user typed.
func (r Report) buildUps(b *bytes.Buffer) {
	for i, m := range r.makeups() {
		if i == 0 {
			b.WriteString("\nMake-ups, from outside to inside\n")
		}
		writeWrapped(b, called(m), "    ")
		writeWrapped(b, "    "+r.buildUp(m), "    ")
		for _, t := range m.Typed {
			writeWrapped(b, "    typed by the user: "+t.Name+": "+t.Text, "    ")
		}
	}
}

// originNames are the origins of spectra, in the order in which they are printed.
var originNames = []glazing.Origin{glazing.MeasuredOrigin, glazing.ModelledOrigin, glazing.InventedOrigin}

// SpectraBy returns where the spectra come from, with the panes of each origin.
func (r Report) SpectraBy() string {
	var parts []string
	for _, o := range originNames {
		var ids []string
		for _, m := range r.makeups() {
			for _, p := range m.Panes {
				if p.Pane.Origin == o {
					ids = add(ids, p.Pane.ID)
				}
			}
		}
		if ids != nil {
			parts = append(parts, string(o)+": "+strings.Join(ids, ", "))
		}
	}
	return strings.Join(parts, "; ")
}

// origins prints where the spectra come from.
func (r Report) origins(b *bytes.Buffer) {
	if s := r.SpectraBy(); s != "" {
		b.WriteString("\nSpectra\n")
		writeWrapped(b, s, "  ")
	}
}

// legend returns what the symbols of columns mean; places that follow each other stand together.
func legend(columns []Choice, ratings []glazing.Rating) []string {
	var parts []string
	blank, conditions, never := false, false, ""
	for len(columns) > 0 {
		n := 1
		for n < len(columns) && columns[n].Key == columns[0].Key && columns[n].Index == columns[0].Index+n {
			n++
		}
		first, last := columns[0], columns[n-1]
		s := first.Head() + " " + first.About()
		if n > 1 {
			heads, places := " to ", " to "
			if n == 2 {
				heads, places = ", ", " and "
			}
			s = fmt.Sprintf("%s%s%s %s, %ss %d%s%d%s", first.Head(), heads, last.Head(), first.Meaning, placeNames[first.Per], first.Index+1, places, last.Index+1, first.underCondition())
		}
		conditions = conditions || first.Condition != ""
		if first.Unit != "" {
			s += ", " + first.Unit
		}
		parts = append(parts, s)
		for i := range ratings {
			blank = blank || !last.in(&ratings[i])
			if s := first.Above1; s != "" && first.Printed(&ratings[i]) == s {
				never = Above1(first.Figure)
			}
		}
		columns = columns[n:]
	}
	if never != "" {
		parts = append(parts, never)
	}
	parts = append(parts, "– not known")
	if blank {
		s := "blank: there is no such pane, gap or surface"
		if conditions {
			s += ", or no such condition"
		}
		parts = append(parts, s)
	}
	return parts
}

// symbols prints what the columns mean.
func (r Report) symbols(b *bytes.Buffer, columns []Choice) {
	if len(r.Ratings) == 0 {
		return
	}
	b.WriteString("\nSymbols\n")
	writeWrapped(b, strings.Join(legend(columns, r.Ratings), "; ")+".", "")
}

// CautionsOnce returns the text of each caution once, with the ratings it belongs to where these
// are not all; what holds for all comes first. The editions stand elsewhere.
func (r Report) CautionsOnce() []string {
	type entry struct {
		glazing.Caution
		of []int
	}
	var list []*entry
	for i := range r.Ratings {
		for _, c := range r.cautions(i) {
			if c.Code == "edition" {
				continue
			}
			at := slices.IndexFunc(list, func(e *entry) bool { return e.Caution == c })
			if at < 0 {
				list = append(list, &entry{Caution: c})
				at = len(list) - 1
			}
			list[at].of = append(list[at].of, i)
		}
	}
	var ofAll, ofSome []string
	for _, e := range list {
		if len(e.of) == len(r.Ratings) {
			ofAll = append(ofAll, e.Text)
		} else {
			ofSome = append(ofSome, e.Text+" ["+r.names(e.of)+"]")
		}
	}
	return append(ofAll, ofSome...)
}

// cautionList prints the cautions.
func (r Report) cautionList(b *bytes.Buffer) {
	for i, text := range r.CautionsOnce() {
		if i == 0 {
			b.WriteString("\nCautions\n")
		}
		writeWrapped(b, "- "+text, "  ")
	}
}

// add appends a text to a list that does not hold it.
func add(list []string, s string) []string {
	if slices.Contains(list, s) {
		return list
	}
	return append(list, s)
}

// names lists ratings by make-up, and by tint and basis where not all of a make-up are meant.
func (r Report) names(of []int) string {
	var parts []string
	for k, i := range of {
		rating := &r.Ratings[i]
		same := func(j int) bool { return r.Ratings[j].Makeup == rating.Makeup }
		if k > 0 && same(of[k-1]) {
			continue
		}
		var tints, bases, every []string
		for j := range r.Ratings {
			if !same(j) {
				continue
			}
			every = add(every, r.Ratings[j].Tint)
			if slices.Contains(of, j) {
				tints = add(tints, r.Ratings[j].Tint)
				bases = add(bases, r.Ratings[j].Method.Basis.Name)
			}
		}
		states := len(every)
		name := rating.Makeup.ID
		if len(tints) < states {
			name += " " + strings.Join(tints, " + ")
		}
		if len(bases) < len(r.bases()) {
			name += " under " + strings.Join(bases, " + ")
		}
		parts = add(parts, name)
	}
	return strings.Join(parts, ", ")
}

// writeWrapped writes text folded at the page's width, with an indent for the lines after the
// first. A no-break space holds its neighbours together.
func writeWrapped(b *bytes.Buffer, s, indent string) {
	lead := s[:len(s)-len(strings.TrimLeft(s, " "))]
	room := Width - max(len(lead), len(indent))
	b.WriteString(lead)
	at, empty := len(lead), true // the column, and whether the line holds no word yet
	for _, word := range strings.FieldsFunc(s, func(c rune) bool { return c == ' ' || c == '\n' || c == '\t' }) {
		if width(word) > room { // too long to hold together
			word = text.WrapHard(strings.ReplaceAll(word, "\u00a0", " "), room)
		}
		for piece := range strings.SplitSeq(word, "\n") {
			w := width(piece)
			if !empty && at+1+w > Width {
				b.WriteString("\n" + indent)
				at, empty = len(indent), true
			}
			if !empty {
				b.WriteByte(' ')
				at++
			}
			b.WriteString(strings.ReplaceAll(piece, "\u00a0", " "))
			at, empty = at+w, false
		}
	}
	b.WriteByte('\n')
}

// width is how many columns a text takes.
func width(s string) int {
	for i := range len(s) {
		if s[i] < ' ' || s[i] > '~' {
			return text.StringWidth(s)
		}
	}
	return len(s)
}

// Legend returns what the symbols of the schedule's columns mean.
func (r Report) Legend() string { return strings.Join(legend(r.Columns(), r.Ratings), "; ") }
