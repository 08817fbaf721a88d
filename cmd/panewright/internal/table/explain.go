package table

// The text of explain: the working of each rating, then all its figures.

import (
	"bytes"
	"fmt"
	"strconv"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// Explain returns the calculation of each rating of the report in the order of a hand
// calculation, then all its figures and cautions.
func Explain(r Report) []byte {
	var b bytes.Buffer
	heading(&b, r)
	for i := range r.Ratings {
		rating := &r.Ratings[i]
		m := rating.Makeup
		title := "Make-up " + m.ID
		if m.Title != "" {
			title += ", " + m.Title
		}
		if rating.Tint != "" {
			title += ", tint " + rating.Tint
		}
		b.WriteByte('\n')
		writeWrapped(&b, title, "  ")
		writeWrapped(&b, m.BuildUp(), "  ")
		writeWrapped(&b, fmt.Sprintf("tilt %.6g°; basis %s: %s", m.Tilt.Degrees(), rating.Method.Basis.Name, rating.Method.Editions()), "  ")
		for _, c := range glazing.Working(rating) {
			chapter(&b, c)
		}
		allFigures(&b, r.Figures, rating)
		r.balanceFigures(&b, rating)
		b.WriteString("\nCautions\n")
		for _, c := range r.cautions(i) {
			writeWrapped(&b, "- "+c.Text, "  ")
		}
	}
	r.trace(&b)
	return b.Bytes()
}

// chapter prints a part of the calculation. A step takes two or three lines:
//
//	hr  radiative conductance                                            EN 673 (4)
//	    = 4·σ·Tm^3/(1/ε2 + 1/ε3 − 1)
//	    = 4·5.67e-08·283^3/(1/0.837 + 1/0.837 − 1) = 3.69954 W/(m²·K)
func chapter(b *bytes.Buffer, c glazing.Chapter) {
	b.WriteByte('\n')
	writeWrapped(b, c.Title, "  ")
	if c.Note != "" {
		writeWrapped(b, "  "+c.Note, "  ")
	}
	if c.Sum != nil {
		weightedSum(b, c.Sum)
	}
	if c.Rows != nil {
		smallTable(b, c.Rows)
	}
	for _, s := range c.Steps {
		head := "  " + text.Pad(s.Symbol, 6, ' ') + " " + s.Meaning
		if gap := Width - width(head) - width(s.Clause); gap > 1 {
			b.WriteString(strings.TrimRight(head+strings.Repeat(" ", gap)+s.Clause, " ") + "\n")
		} else {
			writeWrapped(b, head+"  "+s.Clause, "         ")
		}
		writeWrapped(b, "         = "+s.Formula, "           ")
		result := s.Numbers + " = " + s.Printed()
		if s.Numbers == s.Printed() {
			result = s.Numbers
		}
		writeWrapped(b, strings.TrimRight("         = "+result+" "+s.Unit, " "), "           ")
	}
}

// smallTable prints rows under their heads.
func smallTable(b *bytes.Buffer, r *glazing.Rows) {
	var columns []column
	for i, head := range r.Head {
		var cells []string
		for _, row := range r.Cells {
			cells = append(cells, row[i])
		}
		columns = append(columns, newColumn(head, cells))
	}
	render(b, columns, 1, gutter)
}

// weightedSum prints the rows of a sum, two beside each other.
func weightedSum(b *bytes.Buffer, s *glazing.WeightedSum) {
	writeWrapped(b, "  W: "+s.Source, "  ")
	half := (len(s.NM) + 1) / 2
	const head = " nm           τ           W         τ·W"
	fmt.Fprintf(b, "%s  %s\n", head, head)
	row := func(i int) string {
		digits := func(v float64, n int) string { return strconv.FormatFloat(v, 'g', n, 64) }
		return fmt.Sprintf("%3s%12s%12s%12s", digits(s.NM[i], -1), digits(s.Value[i], 6), digits(s.Weight[i], 6), digits(s.Value[i]*s.Weight[i], 5))
	}
	for i := range half {
		line := row(i)
		if i+half < len(s.NM) {
			line += "  " + row(i+half)
		}
		b.WriteString(line + "\n")
	}
}

// allFigures prints every figure of a rating with symbol, value, unit and clause.
func allFigures(b *bytes.Buffer, figures []glazing.Figure, r *glazing.Rating) {
	b.WriteString("\nAll figures\n")
	for _, f := range figures {
		if f.Symbol == "" && (f.Text == nil || f.Alias == "") {
			continue
		}
		for k := range f.Count(r) {
			figureLine(b, Choice{f, k}, r)
		}
	}
}

// balanceFigures prints the figures of the balances of a rating, under their conditions.
func (r Report) balanceFigures(b *bytes.Buffer, rating *glazing.Rating) {
	for i := range rating.Balances {
		c := rating.Balances[i].Condition
		b.WriteByte('\n')
		writeWrapped(b, "Condition "+c.ID+": "+r.ConditionText(c), "  ")
		var here []Choice
		for _, f := range glazing.BalanceFigures() {
			x := r.under(f, c.ID)
			for x.Index = range f.Count(rating) {
				figureLine(b, x, rating)
				here = append(here, Choice{f.At(c.ID), x.Index})
			}
		}
		if s := r.NotKnown(here, func(x *glazing.Rating) bool { return x == rating }); s != "" {
			writeWrapped(b, "  "+s, "    ")
		}
	}
}

// figureLine prints one figure: symbol, meaning, value, unit. A long meaning is folded.
func figureLine(b *bytes.Buffer, c Choice, r *glazing.Rating) {
	const symbolWidth, meaningWidth, valueWidth = 8, 54, 7
	symbol := ""
	if c.Symbol != "" {
		symbol = c.Head()
	}
	value, unit := c.Printed(r), c.Unit
	room := meaningWidth - max(0, width(value)-valueWidth)
	for i, part := range strings.Split(text.WrapSoft(c.About(), room-1), "\n") {
		line := "  " + text.Pad(symbol, symbolWidth, ' ') + part
		if i == 0 {
			line = "  " + text.Pad(symbol, symbolWidth, ' ') + text.Pad(part, room, ' ') + text.AlignRight.Apply(value, valueWidth) + " " + unit
		}
		b.WriteString(strings.TrimRight(line, " ") + "\n")
		symbol = ""
	}
}
