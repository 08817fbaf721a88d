package table

// Markdown: the schedule with a table a basis, as GitHub and most wikis read it.

import (
	"bytes"
	"fmt"
	"strings"
)

// Markdown returns the report as Markdown: what Schedule prints, rounded as there, with one table
// for each basis that is not folded.
func Markdown(r Report) []byte {
	var b bytes.Buffer
	r.markdownHead(&b)
	if len(r.Ratings) == 0 {
		b.WriteString("\nNo make-up to rate.\n")
	}
	columns := r.Columns()
	for _, x := range r.editions() {
		fmt.Fprintf(&b, "\n## Basis %s\n\n%s\n\n", escaped(x.basis), escaped(x.editions))
		table := markdownTable{head: []string{"make-up", "tint"}, names: 2}
		for _, c := range columns {
			table.head = append(table.head, c.Head())
		}
		for i := range r.Ratings {
			rating := &r.Ratings[i]
			if rating.Method.Basis.Name != x.basis {
				continue
			}
			row := []string{rating.Makeup.ID, rating.Tint}
			for _, c := range columns {
				row = append(row, c.Printed(rating))
			}
			table.rows = append(table.rows, row)
		}
		table.print(&b)
		r.balances(x.basis).markdown(&b, "###")
	}
	r.markdownDiffer(&b)
	r.markdownBuildUps(&b)
	r.StressTable().markdown(&b, "##")
	r.MoistureTable().markdown(&b, "##")
	r.markdownConditions(&b)
	if len(r.Ratings) > 0 {
		markdownList(&b, "Symbols", legend(columns, r.Ratings))
	}
	markdownList(&b, UnderSymbolsTitle, r.BalanceLegend())
	markdownList(&b, "Cautions", r.CautionsOnce())
	r.markdownTrace(&b)
	return b.Bytes()
}

// markdownHead writes what the user says of the project.
func (r Report) markdownHead(b *bytes.Buffer) {
	p := r.Project
	fmt.Fprintf(b, "# %s\n", escaped(p.Title))
	var lines []string
	for _, x := range []struct{ name, text string }{{"Client", p.Client}, {"Author", p.Author}, {"Date", p.Date}, {"Notes", p.Notes}} {
		if x.text != "" {
			lines = append(lines, x.name+": "+x.text)
		}
	}
	if lines != nil {
		b.WriteByte('\n')
		markdownItems(b, lines)
	}
	if r.InchPound {
		fmt.Fprintf(b, "\n%s\n", siRemains)
	}
}

// markdownBuildUps writes each make-up once, and where the spectra come from.
func (r Report) markdownBuildUps(b *bytes.Buffer) {
	for i, m := range r.makeups() {
		if i == 0 {
			b.WriteString("\n## Make-ups, from outside to inside\n\n")
		}
		fmt.Fprintf(b, "- **%s**: %s\n", escaped(called(m)), escaped(r.buildUp(m)))
		for _, t := range m.Typed {
			fmt.Fprintf(b, "  - typed by the user: %s\n", escaped(t.Name+": "+t.Text))
		}
	}
	if s := r.SpectraBy(); s != "" {
		fmt.Fprintf(b, "\n## Spectra\n\n%s\n", escaped(s))
	}
}

// markdownConditions lists the conditions.
func (r Report) markdownConditions(b *bytes.Buffer) {
	markdownList(b, conditionsTitle, append(r.ConditionsListed(), r.further()...))
}

// markdownDiffer writes why bases differ.
func (r Report) markdownDiffer(b *bytes.Buffer) {
	if s := r.BasesDiffer(); s != "" {
		fmt.Fprintf(b, "\n%s\n", escaped(s))
	}
}

// markdownTrace writes what makes the page traceable.
func (r Report) markdownTrace(b *bytes.Buffer) {
	fmt.Fprintf(b, "\nPanewright %s, input sha256 `%s`\n", escaped(r.Version), r.Project.Digest)
}

// markdownTable is a table whose first columns are names, which are aligned to the left.
type markdownTable struct {
	head  []string
	names int
	rows  [][]string
}

func (t markdownTable) print(b *bytes.Buffer) {
	line := func(cells []string) {
		for _, c := range cells {
			b.WriteString("| " + escaped(c) + " ")
		}
		b.WriteString("|\n")
	}
	line(t.head)
	for i := range t.head {
		if i < t.names {
			b.WriteString("| --- ")
		} else {
			b.WriteString("| ---: ")
		}
	}
	b.WriteString("|\n")
	for _, row := range t.rows {
		line(row)
	}
}

// markdownList writes a chapter that is a list; nothing where that is empty.
func markdownList(b *bytes.Buffer, title string, items []string) {
	if len(items) == 0 {
		return
	}
	fmt.Fprintf(b, "\n## %s\n\n", title)
	markdownItems(b, items)
}

func markdownItems(b *bytes.Buffer, items []string) {
	for _, s := range items {
		fmt.Fprintf(b, "- %s\n", escaped(s))
	}
}

// escaped returns a text as Markdown shows it to the letter within a line: what Markdown or HTML
// would take for a mark is escaped, a line break is a blank.
func escaped(s string) string {
	var b strings.Builder
	for _, c := range strings.Join(strings.Fields(s), " ") {
		switch {
		case strings.ContainsRune("\\`*_[]|~$#", c):
			b.WriteByte('\\')
			b.WriteRune(c)
		case c == '<':
			b.WriteString("&lt;")
		case c == '>':
			b.WriteString("&gt;")
		case c == '&':
			b.WriteString("&amp;")
		default:
			b.WriteRune(c)
		}
	}
	return b.String()
}
