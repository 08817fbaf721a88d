package table

// The pages of check: how the figures of a project stand to the limits that the user typed in.

import (
	"bytes"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
	"panewright/glazing/limits"
	"panewright/glazing/project"
)

// A Check is what check prints.
type Check struct {
	Report  // the ratings are those that were held against limits
	Limits  []glazing.Limit
	Results []limits.Result // their limits are elements of Limits
	Files   []*project.LimitsFile
	Remarks []glazing.Caution // on limits and make-ups that do not answer to each other
}

// The sentences that stand on every output of a check.
var checkNotice = []string{
	"Limits are the user's: they were typed in, with their sources, and nothing here vouches for them.",
	"The local authority and licensed practice decide. Results compare calculated figures, not a certified rating, with the entered numbers.",
}

const (
	limitsTitle  = "Limits, typed by the user"
	reasonsTitle = "Too close to call, or not judged"
	filesTitle   = "Files of limits"
	RoundedText  = "Values are rounded as outputs round; the margin is the distance of the unrounded figure to the limit, above 0 where it is met."
)

// used returns the limits that have results, in order.
func (c Check) used() (list []*glazing.Limit) {
	for i := range c.Limits {
		if slices.ContainsFunc(c.Results, func(x limits.Result) bool { return x.Limit == &c.Limits[i] }) {
			list = append(list, &c.Limits[i])
		}
	}
	return list
}

// counts returns how many results have each verdict, those that none has left out.
func (c Check) counts() (lines []string) {
	for _, v := range limits.Verdicts() {
		if n := limits.Count(c.Results, v); n > 0 {
			lines = append(lines, fmt.Sprintf("%s: %d of %d", v, n, len(c.Results)))
		}
	}
	return lines
}

// choiceOf returns the figure of a result at its place.
func choiceOf(x *limits.Result) Choice { return Choice{x.Judged, x.Index} }

// symbolOf returns the symbol of a result's figure, with the place if that is settled, and the
// condition.
func symbolOf(x *limits.Result) string {
	switch {
	case strings.Contains(x.Figure, "#"):
		return Choice{Figure: x.Judged}.symbol()
	case x.Limit.Place > 0:
		return Choice{x.Judged, x.Limit.Place - 1}.Head() // also where there is no such place
	}
	return choiceOf(x).Head()
}

// judged returns the figures of the results, each once.
func (c Check) judged() (list []Choice) {
	for i := range c.Results {
		x := choiceOf(&c.Results[i])
		if c.Results[i].Rating != nil && x.in(c.Results[i].Rating) &&
			!slices.ContainsFunc(list, func(y Choice) bool { return y.Path() == x.Path() }) {
			list = append(list, x)
		}
	}
	return list
}

// ConditionsUsed returns in words the conditions that limits are for, those for which thermal stress was
// screened among them where a limit is for that, and then how it was screened.
func (c Check) ConditionsUsed() (lines []string) {
	stress := false
	for _, x := range c.conditions() {
		if slices.ContainsFunc(c.Results, func(r limits.Result) bool {
			if r.Rating == nil {
				return false
			}
			if ofStress(r.Judged) {
				stress = true
				return slices.Contains(r.Rating.Method.Screened(), x.Condition)
			}
			b := r.Rating.Balance(r.Judged.Condition)
			return b != nil && *b.Condition == x.Condition
		}) {
			lines = append(lines, c.conditionLine(x))
		}
	}
	if s := c.ScreeningSaid(); stress && s != "" {
		lines = append(lines, s)
	}
	return lines
}

// bounds returns those of a limit, one a line.
func bounds(l *glazing.Limit) string {
	var lines []string
	if l.AtLeast.Known {
		lines = append(lines, "≥ "+glazing.PrintShort(l.AtLeast.Number))
	}
	if l.AtMost.Known {
		lines = append(lines, "≤ "+glazing.PrintShort(l.AtMost.Number))
	}
	return strings.Join(lines, "\n")
}

// printedMargin prints a margin with one decimal more than its figure, and more where that says
// nothing.
func printedMargin(x *limits.Result) string {
	if !x.Margin.Known {
		return "–"
	}
	s := glazing.PrintRounded(x.Margin.Number, x.Places+1)
	if x.Margin.Number != 0 && strings.Trim(s, "-0.") == "" {
		s = strconv.FormatFloat(x.Margin.Number, 'g', 2, 64)
	}
	if x.Margin.Number > 0 {
		s = "+" + s
	}
	return s
}

// unrounded prints the figure of a result with so many decimals that its side of the limit shows.
func unrounded(x *limits.Result) string {
	const most = 12
	for places := x.Places + 2; places <= most; places++ {
		s := glazing.PrintRounded(x.Value.Number, places)
		v, err := strconv.ParseFloat(s, 64)
		if err == nil && (limits.MarginOf(x.Limit, v) >= 0) == (x.Margin.Number >= 0) {
			return s
		}
	}
	return figure(x.Value.Number)
}

// reasons returns why results are too close to call or cannot be judged, each with the limit and
// what it is said of.
func (c Check) reasons() (lines []string) {
	for k, l := range c.used() {
		var whys []string
		of := map[string][]string{} // by reason
		for i := range c.Results {
			x := &c.Results[i]
			if x.Limit != l || x.Why == "" {
				continue
			}
			why := x.Why
			if x.Verdict == limits.TooClose {
				why = fmt.Sprintf("%s is %s rounded and %s unrounded: %s", symbolOf(x), glazing.PrintRounded(x.Value.Number, x.Places), unrounded(x), why)
			}
			whys = add(whys, why)
			name := x.Makeup.ID
			if x.Tint != "" {
				name += " " + x.Tint
			}
			of[why] = add(of[why], name)
		}
		for _, why := range whys {
			lines = append(lines, fmt.Sprintf("Limit %d, %s: %s.", k+1, strings.Join(of[why], ", "), why))
		}
	}
	return lines
}

// remarks returns the cautions on the limits: what was left out and what was taken for granted.
func (c Check) remarks() (list []glazing.Caution) {
	list = slices.Clone(c.Remarks)
	for _, x := range c.Results {
		for _, caution := range x.Assumed {
			if !slices.Contains(list, caution) {
				list = append(list, caution)
			}
		}
	}
	return list
}

// cautionTexts returns the texts of the cautions on the limits, and of those of the figures.
func (c Check) cautionTexts() (lines []string) {
	for _, x := range c.remarks() {
		lines = append(lines, x.Text)
	}
	return append(lines, c.CautionsOnce()...)
}

// files returns the files of limits with their digests.
func (c Check) files() (lines []string) {
	for _, f := range c.Files {
		s := f.File
		if f.Name != "" {
			s += ", " + f.Name
		}
		lines = append(lines, s+", sha256 "+f.Digest)
	}
	return lines
}

// checkHeads are the headings of the columns of results.
var checkHeads = []string{"limit", "figure", "tint", "value", "entered", "margin", "result"}

// enteredCell is the place of the bounds among the cells of a result.
const enteredCell = 4

// cells returns those of a result, below checkHeads.
func (c Check) cells(x *limits.Result, number int) []string {
	return []string{strconv.Itoa(number), symbolOf(x), x.Tint, printedValue(x.Rounded, x.Places), bounds(x.Limit), printedMargin(x), string(x.Verdict)}
}

// groups returns the rows of results by make-up.
func (c Check) groups() (groups []checkGroup) {
	used := c.used()
	several := slices.ContainsFunc(c.Results, func(x limits.Result) bool { return x.Basis != c.Results[0].Basis })
	for i := range c.Results {
		x := &c.Results[i]
		if n := len(groups); n == 0 || groups[n-1].makeup != x.Makeup {
			groups = append(groups, checkGroup{makeup: x.Makeup})
		}
		g := &groups[len(groups)-1]
		row := c.cells(x, slices.Index(used, x.Limit)+1)
		if several && x.Basis != "" {
			row[enteredCell] += " (" + x.Basis + ")"
		}
		g.rows = append(g.rows, row)
	}
	return groups
}

type checkGroup struct {
	makeup *glazing.Makeup
	rows   [][]string
}

// checkRight are the columns that are aligned to the right.
var checkRight = []bool{true, false, false, true, false, true, false}

// writeGroups prints the groups as tables whose columns stand below each other. Where a line would
// be wider than the page, figures under conditions, tints and bounds are folded.
func writeGroups(b *bytes.Buffer, groups []checkGroup) {
	const indent, figure, tint, entered = 2, 1, 2, 4 // the indent, and columns
	widths := make([]int, len(checkHeads))
	measure := func() int {
		total := indent - gutter
		clear(widths)
		for k := range widths {
			widths[k] = width(checkHeads[k])
			for _, g := range groups {
				for _, row := range g.rows {
					for line := range strings.SplitSeq(row[k], "\n") {
						widths[k] = max(widths[k], width(line))
					}
				}
			}
			total += widths[k] + gutter
		}
		return total
	}
	for _, x := range []struct{ column, least int }{{figure, 10}, {tint, 8}, {entered, 8}, {tint, 4}} {
		over := measure() - Width
		if over <= 0 {
			break
		}
		room := max(x.least, widths[x.column]-over)
		for _, g := range groups {
			for _, row := range g.rows {
				if x.column == figure { // the condition first goes below
					row[figure] = strings.Replace(row[figure], "@", "\n@", 1)
				}
				lines := strings.Split(row[x.column], "\n") // which WrapHard would join
				for i := range lines {
					lines[i] = text.WrapHard(lines[i], room)
				}
				row[x.column] = strings.Join(lines, "\n")
			}
		}
	}
	measure()
	line := func(row []string) {
		lines := 1
		for _, cell := range row {
			lines = max(lines, strings.Count(cell, "\n")+1)
		}
		for i := range lines {
			s := strings.Repeat(" ", indent)
			for k, cell := range row {
				part := ""
				if parts := strings.Split(cell, "\n"); i < len(parts) {
					part = parts[i]
				}
				blank := strings.Repeat(" ", max(0, widths[k]-width(part)))
				if checkRight[k] {
					part = blank + part
				} else {
					part += blank
				}
				s += part + strings.Repeat(" ", gutter)
			}
			b.WriteString(strings.TrimRight(s, " ") + "\n")
		}
	}
	for _, g := range groups {
		b.WriteByte('\n')
		writeWrapped(b, called(g.makeup), "    ")
		line(checkHeads)
		for _, row := range g.rows {
			line(row)
		}
	}
}

// checkList prints a list under a title; nothing where it is empty.
func checkList(b *bytes.Buffer, title string, lines []string) {
	if len(lines) == 0 {
		return
	}
	b.WriteString("\n" + title + "\n")
	for _, s := range lines {
		writeWrapped(b, "- "+s, "  ")
	}
}

// CheckText returns the check as text of 80 columns.
func CheckText(c Check) []byte {
	var b bytes.Buffer
	heading(&b, c.Report)
	checkList(&b, "Figures against entered limits", c.counts())
	writeGroups(&b, c.groups())
	b.WriteByte('\n')
	writeWrapped(&b, RoundedText, "")
	b.WriteString("\n" + limitsTitle + "\n")
	for k, l := range c.used() {
		number := text.AlignRight.Apply(strconv.Itoa(k+1), 3) + " "
		writeWrapped(&b, number+l.String()+"; "+l.Terms(), "    ")
		writeWrapped(&b, "    "+l.Origin(), "    ")
	}
	checkList(&b, filesTitle, c.files())
	checkList(&b, reasonsTitle, c.reasons())
	for _, x := range c.editions() {
		b.WriteByte('\n')
		writeWrapped(&b, "Basis "+x.basis+": "+x.editions, "  ")
	}
	c.basesDiffer(&b)
	for i, s := range c.ConditionsUsed() {
		if i == 0 {
			b.WriteString("\n" + conditionsTitle + "\n")
		}
		writeWrapped(&b, s, "  ")
	}
	if list := c.judged(); len(list) > 0 {
		b.WriteString("\nSymbols\n")
		writeWrapped(&b, strings.Join(legend(list, nil), "; ")+".", "")
	}
	c.buildUps(&b)
	c.origins(&b)
	checkList(&b, "Cautions", c.cautionTexts())
	b.WriteByte('\n')
	for _, s := range checkNotice {
		writeWrapped(&b, s, "")
	}
	c.trace(&b)
	return b.Bytes()
}

// CheckMarkdown returns the check as Markdown.
func CheckMarkdown(c Check) []byte {
	var b bytes.Buffer
	c.markdownHead(&b)
	markdownList(&b, "Figures against entered limits", c.counts())
	for _, g := range c.groups() {
		fmt.Fprintf(&b, "\n## %s\n\n", escaped(called(g.makeup)))
		markdownTable{head: checkHeads, names: 3, rows: g.rows}.print(&b)
	}
	fmt.Fprintf(&b, "\n%s\n\n## %s\n\n", escaped(RoundedText), limitsTitle)
	for k, l := range c.used() {
		fmt.Fprintf(&b, "%d. %s\n", k+1, escaped(l.String()+"; "+l.Terms()+"; "+l.Origin()))
	}
	markdownList(&b, filesTitle, c.files())
	markdownList(&b, reasonsTitle, c.reasons())
	for _, x := range c.editions() {
		fmt.Fprintf(&b, "\n## Basis %s\n\n%s\n", escaped(x.basis), escaped(x.editions))
	}
	c.markdownDiffer(&b)
	markdownList(&b, conditionsTitle, c.ConditionsUsed())
	if list := c.judged(); len(list) > 0 {
		markdownList(&b, "Symbols", legend(list, nil))
	}
	c.markdownBuildUps(&b)
	markdownList(&b, "Cautions", c.cautionTexts())
	fmt.Fprintf(&b, "\n%s\n", escaped(strings.Join(checkNotice, " ")))
	c.markdownTrace(&b)
	return b.Bytes()
}
