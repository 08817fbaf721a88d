package table

// The pages of compare: the first rating of the report is the reference, to which the others are
// compared.

import (
	"bytes"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// differencesText stands under tables of differences of figures.
func (r Report) differencesText(rows []Choice) string {
	s := "A change is the option less the reference, of unrounded figures"
	for _, id := range r.comparedConditions() {
		rows = append(rows[:len(rows):len(rows)], r.comparedUnder(id)...)
	}
	for _, c := range rows {
		if unit := glazing.DifferenceUnit(c.Unit); unit != c.Unit {
			return s + "; of temperatures it is in " + unit + "."
		}
	}
	return s + "."
}

// colourRows are the colours whose differences are shown.
var colourRows = []struct {
	key, name string
	of        func(c glazing.Comparison) glazing.Value
}{
	{"transmitted", "transmitted", func(c glazing.Comparison) glazing.Value { return c.Transmitted }},
	{"reflected_outside", "reflected outside", func(c glazing.Comparison) glazing.Value { return c.ReflectedOutside }},
	{"reflected_inside", "reflected inside", func(c glazing.Comparison) glazing.Value { return c.ReflectedInside }},
}

const (
	colourTitle  = "Colour differences to the reference (CIEDE2000, 2° observer)"
	colourPlaces = 1
	inputsTitle  = "What differs in what was put in"
	nothing      = "Nothing that the figures depend on."
)

// comparisons returns the comparison of each rating with the first, which is its own too.
func (r Report) comparisons() []glazing.Comparison {
	list := make([]glazing.Comparison, len(r.Ratings))
	for i := range list {
		list[i] = glazing.Compare(&r.Ratings[0], &r.Ratings[i])
	}
	return list
}

// compared returns the figures that a comparison shows: those chosen, or the columns of the
// schedule and what stands beside them; emissivities of faces towards a gap alone.
func (r Report) compared() []Choice {
	if r.Choices != nil {
		return r.Choices
	}
	list := r.Columns()
	for _, c := range r.everything() {
		towardsGap := func(rating glazing.Rating) bool { return c.Index >= 1 && c.Index < c.Count(&rating)-1 }
		if c.Beside && (c.Per != glazing.PerSurface || slices.ContainsFunc(r.Ratings, towardsGap)) {
			list = append(list, c)
		}
	}
	return list
}

// change prints by how much a figure of the option is above that of the reference.
func change(c glazing.Comparison, f Choice) string {
	if f.Value == nil || !f.in(c.Reference) || !f.in(c.Option) {
		return ""
	}
	d := c.Difference(f.Figure, f.Index)
	if !d.Known {
		return "–"
	}
	places := 0
	for _, r := range []*glazing.Rating{c.Reference, c.Option} {
		places = max(places, f.Decimals(r, f.Value(r, f.Index).Number))
	}
	s := glazing.PrintRounded(d.Number, places)
	if !strings.HasPrefix(s, "-") && strings.Trim(s, "0.") != "" {
		s = "+" + s
	}
	return s
}

// label returns make-up and tint of a rating.
func label(r *glazing.Rating) string { return strings.TrimSpace(r.Makeup.ID + " " + r.Tint) }

// optionWidth is where the heading of an option is folded.
const optionWidth = 16

// heads returns the headings of ratings, of equally many lines.
func heads(ratings []glazing.Rating) []string {
	heads := make([]string, len(ratings))
	lines := 0
	for i := range heads {
		rating := &ratings[i]
		heads[i] = text.WrapHard(rating.Makeup.ID, optionWidth)
		if rating.Tint != "" {
			heads[i] += "\n" + text.WrapHard(rating.Tint, optionWidth)
		}
		lines = max(lines, strings.Count(heads[i], "\n"))
	}
	for i := range heads {
		heads[i] = strings.Repeat("\n", lines-strings.Count(heads[i], "\n")) + heads[i]
	}
	return heads
}

// beside prints two lists as one column, each aligned to the right.
func beside(one, two []string) []string {
	first, second := newColumn("", one).width, newColumn("", two).width
	out := make([]string, len(one))
	for i := range out {
		out[i] = text.AlignRight.Apply(one[i], first) + " " + text.AlignRight.Apply(two[i], second)
	}
	return out
}

// Compare returns the comparison as text of 80 columns: figures and their changes, colour
// differences, what differs in what was put in, cautions, what makes the page traceable.
func Compare(r Report) []byte {
	var b bytes.Buffer
	heading(&b, r)
	if r.InchPound {
		b.WriteByte('\n')
		writeWrapped(&b, siRemains, "")
	}
	for _, x := range r.editions() {
		b.WriteByte('\n')
		writeWrapped(&b, "Basis "+x.basis+": "+x.editions, "  ")
	}
	r.basesDiffer(&b)
	comparisons, rows := r.comparisons(), r.compared()
	r.comparedTable(&b, comparisons, rows)
	for _, id := range r.comparedConditions() {
		b.WriteByte('\n')
		writeWrapped(&b, "Condition "+id, "  ")
		r.comparedTable(&b, comparisons, r.comparedUnder(id))
		if s := r.notKnownUnder(id); s != "" {
			writeWrapped(&b, s, "")
		}
	}
	b.WriteByte('\n')
	writeWrapped(&b, "The reference is "+label(&r.Ratings[0])+". "+r.differencesText(rows), "")

	b.WriteString("\n" + colourTitle + "\n")
	var colours []string
	for _, row := range colourRows {
		colours = append(colours, row.name)
	}
	tops := heads(r.Ratings[1:])
	var options []column
	for i := 1; i < len(r.Ratings); i++ {
		var cells []string
		for _, row := range colourRows {
			cells = append(cells, printedValue(row.of(comparisons[i]), colourPlaces))
		}
		options = append(options, newColumn(tops[i-1], cells))
	}
	fold(&b, []column{newColumn("", colours)}, options)

	b.WriteString("\n" + inputsTitle + "\n")
	for i, c := range comparisons[1:] {
		writeWrapped(&b, label(&r.Ratings[i+1]), "  ")
		for _, s := range sentences(c) {
			writeWrapped(&b, "  - "+s, "    ")
		}
	}
	r.buildUps(&b)
	r.origins(&b)
	r.conditionList(&b)
	r.symbols(&b, rows)
	r.underSymbols(&b)
	r.cautionList(&b)
	r.trace(&b)
	return b.Bytes()
}

// comparedTable prints figures of the ratings beside each other, with their changes.
func (r Report) comparedTable(b *bytes.Buffer, comparisons []glazing.Comparison, rows []Choice) {
	tops := heads(r.Ratings)
	symbols, units, reference := []string{""}, []string{""}, []string{"figure"}
	for _, c := range rows {
		symbols = append(symbols, c.Head())
		units = append(units, c.Unit)
		reference = append(reference, c.Printed(&r.Ratings[0]))
	}
	names := []column{newColumn("", symbols), newColumn("", units), newColumn(tops[0], reference)}
	names[2].right = true
	var options []column
	for i := 1; i < len(r.Ratings); i++ {
		values, changes := []string{"figure"}, []string{"change"}
		for _, c := range rows {
			values = append(values, c.Printed(&r.Ratings[i]))
			changes = append(changes, change(comparisons[i], c))
		}
		options = append(options, newColumn(tops[i], beside(values, changes)))
	}
	fold(b, names, options)
}

// comparedConditions returns the conditions that all ratings have; none where figures were chosen.
func (r Report) comparedConditions() []string {
	if r.Choices != nil {
		return nil
	}
	return slices.DeleteFunc(glazing.ConditionIDs(r.Ratings), func(id string) bool {
		return slices.ContainsFunc(r.Ratings, func(x glazing.Rating) bool { return x.Balance(id) == nil })
	})
}

// comparedUnder returns the figures under a condition that a comparison shows: those of the schedule of
// conditions that say something there, but for the number of the hottest pane, of which a change means
// nothing.
func (r Report) comparedUnder(id string) (list []Choice) {
	for _, f := range BalanceColumns() {
		noSun := r.Ratings[0].Balance(id).Condition.SunWM2 == 0
		if f.Alias != "hottest_pane" && !(noSun && OfSun(f)) {
			list = append(list, r.under(f, id))
		}
	}
	return list
}

// notKnownUnder says why figures that a comparison shows under a condition are not known.
func (r Report) notKnownUnder(id string) string {
	list := r.comparedUnder(id)
	for i := range list {
		list[i].Condition = id
	}
	return r.NotKnown(list, nil)
}

// sentences returns what differs in what was put in, in words in any case.
func sentences(c glazing.Comparison) []string {
	if len(c.Inputs) == 0 {
		return []string{nothing}
	}
	return c.Inputs
}

func printedValue(v glazing.Value, places int) string {
	if !v.Known {
		return "–"
	}
	return glazing.PrintRounded(v.Number, places)
}

// CompareMarkdown returns the comparison as Markdown.
func CompareMarkdown(r Report) []byte {
	var b bytes.Buffer
	r.markdownHead(&b)
	for _, x := range r.editions() {
		fmt.Fprintf(&b, "\n## Basis %s\n\n%s\n\n", escaped(x.basis), escaped(x.editions))
	}
	r.markdownDiffer(&b)
	comparisons, rows := r.comparisons(), r.compared()
	figures := func(rows []Choice) {
		t := markdownTable{head: []string{"figure", "unit", label(&r.Ratings[0])}, names: 2}
		for i := 1; i < len(r.Ratings); i++ {
			t.head = append(t.head, label(&r.Ratings[i]), "change")
		}
		for _, c := range rows {
			row := []string{c.Head(), c.Unit, c.Printed(&r.Ratings[0])}
			for i := 1; i < len(r.Ratings); i++ {
				row = append(row, c.Printed(&r.Ratings[i]), change(comparisons[i], c))
			}
			t.rows = append(t.rows, row)
		}
		t.print(&b)
	}
	colours := markdownTable{head: []string{"colour"}, names: 1}
	for i := 1; i < len(r.Ratings); i++ {
		colours.head = append(colours.head, label(&r.Ratings[i]))
	}
	for _, x := range colourRows {
		row := []string{x.name}
		for _, c := range comparisons[1:] {
			row = append(row, printedValue(x.of(c), colourPlaces))
		}
		colours.rows = append(colours.rows, row)
	}
	figures(rows)
	for _, id := range r.comparedConditions() {
		fmt.Fprintf(&b, "\n### Condition %s\n\n", escaped(id))
		figures(r.comparedUnder(id))
		if s := r.notKnownUnder(id); s != "" {
			fmt.Fprintf(&b, "\n%s\n", escaped(s))
		}
	}
	fmt.Fprintf(&b, "\nThe reference is %s. %s\n\n## %s\n\n", escaped(label(&r.Ratings[0])), r.differencesText(rows), colourTitle)
	colours.print(&b)
	fmt.Fprintf(&b, "\n## %s\n\n", inputsTitle)
	for i, c := range comparisons[1:] {
		fmt.Fprintf(&b, "- **%s**\n", escaped(label(&r.Ratings[i+1])))
		for _, s := range sentences(c) {
			fmt.Fprintf(&b, "  - %s\n", escaped(s))
		}
	}
	r.markdownBuildUps(&b)
	r.markdownConditions(&b)
	markdownList(&b, "Symbols", legend(rows, r.Ratings))
	markdownList(&b, UnderSymbolsTitle, r.BalanceLegend())
	markdownList(&b, "Cautions", r.CautionsOnce())
	r.markdownTrace(&b)
	return b.Bytes()
}

// CompareCSV returns the comparison as CSV: the columns of rate, the reference in the first row,
// followed by the change of each figure, colour differences and what differs in what was put in.
func CompareCSV(r Report, form CSVForm) ([]byte, error) {
	comparisons, fields := r.comparisons(), r.fields()
	value := func(key, unit string, places int, of func(c glazing.Comparison) glazing.Value) {
		fields = append(fields, field{key, unit, func(i int) cell {
			if v := of(comparisons[i]); i > 0 && v.Known {
				return number(v.Number, places)
			}
			return cell{}
		}})
	}
	for _, c := range r.inSheets() {
		if c.Value != nil {
			value("difference."+c.Path(), glazing.DifferenceUnit(c.Unit), -1, func(x glazing.Comparison) glazing.Value { return x.Difference(c.Figure, c.Index) })
		}
	}
	for _, row := range colourRows {
		value("colour_difference."+row.key, "", colourPlaces, row.of)
	}
	fields = append(fields, field{key: "input_differences", cell: func(i int) cell { return word(strings.Join(comparisons[i].Inputs, " ")) }})
	return form.write(fields, len(r.Ratings))
}

// CompareJSON returns the comparison as JSON: figures under their keys with panes, gaps and
// surfaces counted from 1, with all their digits, null where they are not known.
func CompareJSON(r Report) []byte {
	top := newNode()
	r.said(top)
	top.set(quoted(r.Ratings[0].Method.Basis.Name), "basis")
	top.set(quoted(r.Ratings[0].Method.Editions()), "editions")
	r.option(top.at("reference"), 0)
	r.person(top)
	options := top.at("options")
	options.list = true
	for i, c := range r.comparisons()[1:] {
		n := options.at(strconv.Itoa(i))
		r.option(n, i+1)
		for _, f := range r.everything() {
			if f.Value != nil {
				n.at("differences").set(jsonValue(c.Difference(f.Figure, f.Index)), f.Path())
			}
		}
		for _, row := range colourRows {
			n.at("colour_difference").set(jsonValue(row.of(c)), row.key)
		}
		inputs := n.at("input_differences")
		inputs.list = true
		for k, s := range c.Inputs {
			inputs.set(quoted(s), strconv.Itoa(k))
		}
	}
	return top.bytes()
}

// option writes one rating of a comparison.
func (r Report) option(n *node, i int) {
	rating := &r.Ratings[i]
	n.set(quoted(rating.Makeup.ID), "makeup")
	n.set(quoted(rating.Tint), "tint")
	for _, c := range r.everything() {
		value := "null"
		if c.in(rating) {
			value = leaf(c.Figure, rating, c.Index)
		}
		n.at("figures").set(value, c.Path())
	}
	r.screening(n, rating)
	r.remarks(n, i)
}
