package table

// The pages of verify: every check with what was computed here, by standard, and a summary.

import (
	"bytes"
	"fmt"
	"maps"
	"slices"
	"strconv"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
	"panewright/glazing/proof"
	"panewright/reference/checks"
)

// A Verification is what verify prints: outcomes of checks, and which program computed them where.
type Verification struct {
	Version                  string // of the program
	Go, System, Architecture string // Go version, GOOS, GOARCH
	Groups                   []proof.Group
}

// machine is the line that tells which program computed the figures where.
func (v Verification) machine() string {
	return fmt.Sprintf("Panewright %s, %s, %s/%s", v.Version, v.Go, v.System, v.Architecture)
}

// What is said around the checks.
const (
	verifyTitle = "Figures of published sources, computed anew"
	verifyAbout = "Every figure under \"computed\" was computed now, on this machine, by the functions that ratings use; lamps and daylight, which no rating has, by some of their own. Under \"published\" stands what the source gives; where the source is said to be worked through apart from this program, its method is published and the case is not. met: they agree within the tolerance; known: they differ by what is known and explained; missed: they differ."
	verifyMeans = "A check that is met says that this copy of the program calculates as the source does, for that case. Ratings remain calculated figures, not certified ones."
	verifyScope = "The make-ups of the test matrix were chosen with the scope of EN 17871 in mind. Conformity with EN 17871, or with any other procedure by which calculations are validated, is not claimed."
)

// A part is outcomes that stand in one table: those of one subject, or those that stand alone.
type part struct {
	subject, makeup string
	outcomes        []proof.Outcome
}

// parts divides the outcomes of a group.
func parts(g proof.Group) (list []part) {
	for _, o := range g.Outcomes {
		makeup := ""
		if o.Subject != "" {
			makeup = o.Inputs["makeup"]
		}
		if n := len(list); n == 0 || list[n-1].subject != o.Subject || list[n-1].makeup != makeup {
			list = append(list, part{subject: o.Subject, makeup: makeup})
		}
		last := &list[len(list)-1]
		last.outcomes = append(last.outcomes, o)
	}
	return list
}

// unitNote returns what is said once of the units of a group: the unit that all have, or those of
// the figures of subjects, whose tables have no room for it. "" says that each row names its own.
func unitNote(g proof.Group) string {
	var units []string
	figures := map[string][]string{}
	for _, o := range g.Outcomes {
		units = add(units, o.Unit)
		if o.Subject != "" && o.Unit != "1" {
			figures[o.Unit] = add(figures[o.Unit], o.What)
		}
	}
	if len(units) == 1 && units[0] != "1" {
		return units[0]
	}
	var parts []string
	for _, u := range units {
		if figures[u] != nil {
			parts = append(parts, u+" of "+strings.Join(figures[u], "; "))
		}
	}
	return strings.Join(parts, "; ")
}

// figuresOf returns the figures of outcomes in words, with their units where no note of the group
// names them.
func figuresOf(outcomes []proof.Outcome, note string) []string {
	list := make([]string, len(outcomes))
	for i, o := range outcomes {
		list[i] = o.What
		if o.Unit != "1" && note == "" {
			list[i] += ", " + o.Unit
		}
	}
	return list
}

// numberHeads are the columns of a table of outcomes after those that name the check.
var numberHeads = []string{"computed", "published", "deviation", "tolerance", "result"}

// numbersOf returns what stands in them.
func numbersOf(o proof.Outcome) []string {
	got, deviation := "–", "–"
	if o.Err == nil {
		got, deviation = computed(o), signed(o.Deviation, o.Result)
	}
	return []string{got, o.Printed, deviation, strconv.FormatFloat(o.Tolerance, 'g', -1, 64), string(o.Result)}
}

// computed prints a figure to two digits more than its source, or to as many where both must be
// equal.
func computed(o proof.Outcome) string {
	_, decimals, _ := strings.Cut(o.Printed, ".")
	places := len(decimals)
	if o.Tolerance > 0 {
		places += 2
	}
	return glazing.PrintRounded(o.Got, places)
}

// signed prints a difference with two digits that count; one beyond the tolerance with four, so that
// it shows.
func signed(d float64, r proof.Result) string {
	digits := 2
	if r != proof.Met {
		digits = 4
	}
	s := strconv.FormatFloat(d, 'g', digits, 64)
	if d > 0 {
		s = "+" + s
	}
	return s
}

// notes returns what is said under the tables of a group: units and sources first, then what the head
// of the file says, then differences and faults by name.
func notes(g proof.Group) (list [][2]string) {
	if note := unitNote(g); note != "" {
		list = append(list, [2]string{"Unit", note})
	}
	for _, s := range g.Sources() {
		list = append(list, [2]string{"Source", fmt.Sprintf("%s (%s; %s)", s.Text, s.Standing, plural(s.Checks, "check"))})
	}
	list = append(list, [2]string{"Inputs", g.Inputs}, [2]string{"Tolerance", g.Tolerance}, [2]string{"Verified", g.Verified})
	for _, d := range g.Panes {
		list = append(list, [2]string{"Pane " + d.Name, strings.ReplaceAll(d.Text, "/", " / ")})
	}
	for _, o := range g.Outcomes {
		if o.Known.Why != "" {
			list = append(list, [2]string{"Known", o.ID + ": " + o.Known.Why})
		}
		if o.Err != nil {
			list = append(list, [2]string{"Missed", o.Err.Error()})
		}
	}
	return list
}

func plural(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}

// countHeads are the columns of the summary after the first; countsOf returns what stands in them
// for a standing, or for all if it is blank.
func countHeads() []string {
	list := []string{"checks"}
	for _, r := range proof.Results() {
		list = append(list, string(r))
	}
	return list
}

func (v Verification) countsOf(standing string) []string {
	list := []string{strconv.Itoa(proof.Count(v.Groups, standing, ""))}
	for _, r := range proof.Results() {
		list = append(list, strconv.Itoa(proof.Count(v.Groups, standing, r)))
	}
	return list
}

// summary returns the rows of the summary: those of each standing that occurs, then all.
func (v Verification) summary() (names []string, rows [][]string) {
	for _, s := range checks.Standings() {
		if proof.Count(v.Groups, s, "") > 0 {
			names, rows = append(names, s), append(rows, v.countsOf(s))
		}
	}
	return append(names, "all"), append(rows, v.countsOf(""))
}

// Missed returns the ids of the checks that are missed.
func (v Verification) Missed() (ids []string) {
	for _, g := range v.Groups {
		for _, o := range g.Outcomes {
			if o.Result == proof.Missed {
				ids = append(ids, o.ID)
			}
		}
	}
	return ids
}

// Verify returns the outcomes as text of 80 columns.
func Verify(v Verification) []byte {
	var b bytes.Buffer
	b.WriteString(verifyTitle + "\n")
	writeWrapped(&b, v.machine(), "")
	b.WriteByte('\n')
	writeWrapped(&b, verifyAbout, "")
	for _, g := range v.Groups {
		b.WriteString("\n\n")
		writeWrapped(&b, g.Title, "")
		for _, p := range parts(g) {
			if p.subject != "" {
				b.WriteByte('\n')
				writeWrapped(&b, p.subject, "  ")
				if p.makeup != "" {
					writeWrapped(&b, "  "+p.makeup, "    ")
				}
			}
			outcomesTable(&b, p.outcomes, figuresOf(p.outcomes, unitNote(g)))
		}
		b.WriteByte('\n')
		for _, n := range notes(g) {
			writeWrapped(&b, n[0]+": "+n[1], "  ")
		}
	}
	b.WriteString("\n\nSummary\n")
	names, rows := v.summary()
	var counts []column
	for i, head := range countHeads() {
		var cells []string
		for _, row := range rows {
			cells = append(cells, row[i])
		}
		counts = append(counts, newColumn(head, cells))
	}
	fold(&b, []column{newColumn("standing", names)}, counts)
	if ids := v.Missed(); ids != nil {
		b.WriteByte('\n')
		writeWrapped(&b, "Missed: "+strings.Join(ids, ", "), "  ")
	}
	b.WriteByte('\n')
	writeWrapped(&b, verifyMeans, "")
	b.WriteByte('\n')
	writeWrapped(&b, verifyScope, "")
	b.WriteString("\n" + v.machine() + "\n")
	return b.Bytes()
}

// outcomesTable prints one table: id and figure beside each other where there is room, else under
// each other.
func outcomesTable(b *bytes.Buffer, outcomes []proof.Outcome, figures []string) {
	var ids []string
	cells := make([][]string, len(numberHeads))
	for _, o := range outcomes {
		ids = append(ids, o.ID)
		for i, s := range numbersOf(o) {
			cells[i] = append(cells[i], s)
		}
	}
	room := Width
	var numbers []column
	for i, head := range numberHeads {
		c := newColumn(head, cells[i])
		numbers = append(numbers, c)
		room -= c.width + gutter
	}
	names := []column{newColumn("id", ids), newColumn("what", figures)}
	if names[0].width+gutter+names[1].width > room {
		const indent = "  "
		for i, what := range figures {
			ids[i] = text.WrapHard(ids[i], room) + "\n" + indent + strings.ReplaceAll(text.WrapSoft(what, room-len(indent)), "\n", "\n"+indent)
		}
		names = []column{newColumn("id, what", ids)}
	}
	fold(b, names, numbers)
}

// VerifyMarkdown returns the outcomes as Markdown.
func VerifyMarkdown(v Verification) []byte {
	var b bytes.Buffer
	fmt.Fprintf(&b, "# %s\n\n%s\n\n%s\n", escaped(verifyTitle), escaped(v.machine()), escaped(verifyAbout))
	for _, g := range v.Groups {
		fmt.Fprintf(&b, "\n## %s\n\n", escaped(g.Title))
		t := markdownTable{head: append([]string{"id", "what"}, numberHeads...), names: 2}
		for _, p := range parts(g) {
			figures := figuresOf(p.outcomes, unitNote(g))
			for i, o := range p.outcomes {
				what := figures[i]
				if i == 0 && p.subject != "" {
					what += " (" + p.subject + ": " + p.makeup + ")"
				}
				t.rows = append(t.rows, append([]string{o.ID, what}, numbersOf(o)...))
			}
		}
		t.print(&b)
		b.WriteByte('\n')
		for _, n := range notes(g) {
			fmt.Fprintf(&b, "- **%s**: %s\n", escaped(n[0]), escaped(n[1]))
		}
	}
	b.WriteString("\n## Summary\n\n")
	t := markdownTable{head: append([]string{"standing"}, countHeads()...), names: 1}
	names, rows := v.summary()
	for i, name := range names {
		t.rows = append(t.rows, append([]string{name}, rows[i]...))
	}
	t.print(&b)
	if ids := v.Missed(); ids != nil {
		fmt.Fprintf(&b, "\nMissed: %s\n", escaped(strings.Join(ids, ", ")))
	}
	fmt.Fprintf(&b, "\n%s\n\n%s\n", escaped(verifyMeans), escaped(verifyScope))
	return b.Bytes()
}

// said returns the words on a difference that is known, or on a figure that there is not.
func said(o proof.Outcome) string {
	if o.Err != nil {
		return o.Err.Error()
	}
	return o.Known.Why
}

// VerifyCSV returns the outcomes as CSV, one row a check. A figure that could not be computed is an
// empty cell.
func VerifyCSV(v Verification, form CSVForm) ([]byte, error) {
	var list []proof.Outcome
	var titles []string
	for _, g := range v.Groups {
		list = append(list, g.Outcomes...)
		titles = append(titles, slices.Repeat([]string{g.Title}, len(g.Outcomes))...)
	}
	of := func(key string, text func(o proof.Outcome) string) field {
		return field{key: key, cell: func(i int) cell { return word(text(list[i])) }}
	}
	value := func(key string, read func(o proof.Outcome) float64, always bool) field {
		return field{key: key, cell: func(i int) cell {
			if list[i].Err != nil && !always {
				return cell{}
			}
			return number(read(list[i]), -1)
		}}
	}
	machine := v.machine()
	return form.write([]field{
		{key: "group", cell: func(i int) cell { return word(titles[i]) }},
		of("id", func(o proof.Outcome) string { return o.ID }),
		of("subject", func(o proof.Outcome) string { return o.Subject }),
		of("what", func(o proof.Outcome) string { return o.What }),
		of("inputs", func(o proof.Outcome) string {
			var pairs []string
			for _, key := range slices.Sorted(maps.Keys(o.Inputs)) {
				pairs = append(pairs, key+"="+o.Inputs[key])
			}
			return strings.Join(pairs, "; ")
		}),
		value("computed", func(o proof.Outcome) float64 { return o.Got }, false),
		value("published", func(o proof.Outcome) float64 { return o.Want }, true),
		value("deviation", func(o proof.Outcome) float64 { return o.Deviation }, false),
		value("tolerance", func(o proof.Outcome) float64 { return o.Tolerance }, true),
		of("unit", func(o proof.Outcome) string { return o.Unit }),
		of("result", func(o proof.Outcome) string { return string(o.Result) }),
		of("source", func(o proof.Outcome) string { return o.Source }),
		of("standing", func(o proof.Outcome) string { return o.Standing }),
		of("remark", said),
		of("computed_by", func(proof.Outcome) string { return machine }),
	}, len(list))
}

// VerifyJSON returns the outcomes as JSON, with all digits; null where nothing could be computed.
func VerifyJSON(v Verification) []byte {
	top := newNode()
	for _, x := range [][2]string{{"panewright", v.Version}, {"go", v.Go}, {"system", v.System}, {"architecture", v.Architecture}, {"scope", verifyScope}} {
		top.set(quoted(x[1]), x[0])
	}
	groups := top.at("groups")
	groups.list = true
	for i, g := range v.Groups {
		n := groups.at(strconv.Itoa(i))
		for _, x := range [][2]string{{"title", g.Title}, {"inputs", g.Inputs}, {"tolerance", g.Tolerance}, {"verified", g.Verified}} {
			n.set(quoted(x[1]), x[0])
		}
		list := n.at("checks")
		list.list = true
		for k, o := range g.Outcomes {
			outcome(list.at(strconv.Itoa(k)), o)
		}
	}
	summary := top.at("summary")
	counts := func(n *node, standing string) {
		n.set(strconv.Itoa(proof.Count(v.Groups, standing, "")), "checks")
		for _, r := range proof.Results() {
			n.set(strconv.Itoa(proof.Count(v.Groups, standing, r)), string(r))
		}
	}
	counts(summary, "")
	for _, s := range checks.Standings() {
		counts(summary.at("by_standing").at(s), s)
	}
	return top.bytes()
}

// outcome writes one check.
func outcome(n *node, o proof.Outcome) {
	n.set(quoted(o.ID), "id")
	n.set(quoted(o.Subject), "subject")
	n.set(quoted(o.What), "what")
	for _, key := range slices.Sorted(maps.Keys(o.Inputs)) {
		n.at("inputs").set(quoted(o.Inputs[key]), key)
	}
	got, deviation := "null", "null"
	if o.Err == nil {
		got, deviation = figure(o.Got), figure(o.Deviation)
	}
	n.set(got, "computed")
	n.set(figure(o.Want), "published")
	n.set(deviation, "deviation")
	n.set(figure(o.Tolerance), "tolerance")
	n.set(quoted(o.Unit), "unit")
	n.set(quoted(string(o.Result)), "result")
	n.set(quoted(o.Source), "source")
	n.set(quoted(o.Standing), "standing")
	n.set(quoted(said(o)), "remark")
}
