package table

import (
	"strings"
	"testing"

	"panewright/glazing"
)

// cellsOf returns the cells of each row of the Markdown tables, split as a reader splits them.
func cellsOf(out string) (rows [][]string) {
	for line := range strings.SplitSeq(out, "\n") {
		if !strings.HasPrefix(line, "|") {
			continue
		}
		var cells []string
		line = strings.ReplaceAll(strings.Trim(line, "|"), `\|`, "\x00")
		for cell := range strings.SplitSeq(line, "|") {
			cells = append(cells, strings.ReplaceAll(strings.TrimSpace(cell), "\x00", `\|`))
		}
		rows = append(rows, cells)
	}
	return rows
}

// The tables of Markdown have the words of the schedule, row for row.
func TestMarkdownEqualsSchedule(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.NA)
	rows := cellsOf(string(Markdown(r)))
	columns := r.Columns()
	schedule := map[string]bool{}
	for line := range strings.SplitSeq(string(Schedule(r)), "\n") {
		schedule[strings.Join(strings.Fields(line), " ")] = true
	}
	// Seven ratings of five make-ups, of which one has three tints. Under a condition without sun that one
	// has one row. There are one with and one without sun, of known humidity, and those of na beside.
	want := 2*(2+7) + (2 + 5 + 7) + (2 + 2*5 + 2*7) + (2 + 5) + (2 + 5)
	if len(rows) != want { // each table has a heading and a line below it
		t.Fatalf("%d rows, want %d", len(rows), want)
	}
	for _, row := range rows[:2+7] {
		if len(row) != 2+len(columns) {
			t.Errorf("%d cells, want %d: %q", len(row), 2+len(columns), row)
		}
	}
	for _, row := range rows {
		if row[0] == "---" {
			continue
		}
		if line := strings.Join(strings.Fields(strings.Join(row, " ")), " "); !schedule[line] {
			t.Errorf("the schedule lacks %q", line)
		}
	}
	out := string(Markdown(r))
	for _, want := range append(legend(columns, r.Ratings), "typed by the user: acoustic: Rw 36 dB", "EN 410:2011, EN 673:2011", r.Project.Digest, "## Cautions", "**T1 Lantern rooms, east**") {
		if !strings.Contains(out, want) {
			t.Errorf("Markdown lacks %q", want)
		}
	}
}

// Under several bases a caution names a rating once.
func TestCautionNamesOnce(t *testing.T) {
	r := demoReport(t, glazing.EN, glazing.ISO)
	if want := "inclined. [D1, T1, E1 clear, L1, V1]"; !strings.Contains(strings.Join(strings.Fields(string(Schedule(r))), " "), want) {
		t.Errorf("the schedule lacks %q", want)
	}
}

// What the user typed is shown to the letter: no text makes a cell, a line, a mark or HTML.
func TestMarkdownEscapes(t *testing.T) {
	for in, want := range map[string]string{
		"a|b":             `a\|b`,
		`a\|b`:            `a\\\|b`,
		"two\r\nlines":    "two lines",
		"<script> & <b>":  "&lt;script&gt; &amp; &lt;b&gt;",
		"*a* _b_ `c` ~d~": "\\*a\\* \\_b\\_ \\`c\\` \\~d\\~",
		"[x](y) # $z$":    `\[x\](y) \# \$z\$`,
		"plain – τv ≤ 1":  "plain – τv ≤ 1",
	} {
		if got := escaped(in); got != want {
			t.Errorf("%q is written %q, want %q", in, got, want)
		}
	}
	r := hostile(t)
	r.Ratings[0].Tint = "a|b\n| c |"
	out := string(Markdown(r))
	for _, row := range cellsOf(out)[:2+len(r.Ratings)] {
		if len(row) != 2+len(r.Columns()) {
			t.Errorf("%d cells: %q", len(row), row)
		}
	}
	if strings.Contains(out, "<b>") {
		t.Error("HTML of the user's stands in Markdown")
	}
}
