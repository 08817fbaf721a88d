package checks

import (
	"strings"
	"testing"
)

// Every embedded row parses, and none lost its source or its standing on the way.
func TestAll(t *testing.T) {
	list := All()
	if len(list) == 0 {
		t.Fatal("no checks")
	}
	for _, c := range list {
		if c.Source == "" || c.Standing == "" || c.Unit == "" || c.What == "" || c.Printed == "" || len(c.Inputs) == 0 {
			t.Errorf("%s is not complete: %+v", c.ID, c)
		}
		if len(c.ID) > longestID || strings.ContainsAny(c.ID, " ,|") {
			t.Errorf("id %q has blanks, or is longer than the %d letters that a page has room for", c.ID, longestID)
		}
	}
}

const longestID = 26

// Groups have what a page says of them, and titles by which they can be told apart.
func TestGroups(t *testing.T) {
	seen, n := map[string]bool{}, 0
	for _, g := range Groups() {
		if g.Title == "" || g.Inputs == "" || g.Tolerance == "" || g.Verified == "" || len(g.Checks) == 0 || seen[g.Title] {
			t.Errorf("group %q is not complete, or stands twice", g.Title)
		}
		seen[g.Title] = true
		n += len(g.Checks)
	}
	if n != len(All()) {
		t.Errorf("the groups have %d checks, All %d", n, len(All()))
	}
}

const (
	goodHead = "# title: t\n# inputs: i\n# tolerance: h\n# verified: v\n# source book: A Book\n" + heads + "\n"
	goodRow  = "a,kind,x=1; y=2/3,0.50,1,0.05,what,book,read\n"
	wideHead = "# title: t\n# inputs: i\n# tolerance: h\n# verified: v\n# source book: A Book\n" +
		"# pane soft: 4 mm\n# column u: Ug | W/(m²·K) | 0.05 | figure=u\n# column g: g | 1 | 0.01 | figure=g; basis=en\n" + wideHeads + ",u,g\n"
	wideRow = "d-1,makeup,makeup=soft | soft-4,of two panes,book,from memory,1.10,0.6\n"
)

func TestParse(t *testing.T) {
	const known = "# known a: 0.1 to 0.2: an edge\n"
	g, err := parse("f", known+goodHead+goodRow)
	if err != nil {
		t.Fatal(err)
	}
	c := g.Checks[0]
	if c.ID != "a" || c.Kind != "kind" || c.Inputs["x"] != "1" || c.Inputs["y"] != "2/3" || c.Want != 0.5 || c.Printed != "0.50" ||
		c.Unit != "1" || c.Tolerance != 0.05 || c.What != "what" || c.Source != "A Book" || c.Standing != "read" || c.Subject != "" ||
		c.Known != (Known{0.1, 0.2, "an edge"}) {
		t.Errorf("parsed as %+v", c)
	}
	if g.Title != "t" || g.Inputs != "i" || g.Tolerance != "h" || g.Verified != "v" {
		t.Errorf("parsed as %+v", g)
	}
}

// A row of the second layout is a check a cell; a blank cell is none.
func TestParseWide(t *testing.T) {
	g, err := parse("f", wideHead+wideRow+"d-2,makeup,makeup=soft-4,of one,book,read,,0.7\n")
	if err != nil {
		t.Fatal(err)
	}
	if len(g.Checks) != 3 || len(g.Panes) != 1 || g.Panes[0] != (Definition{"soft", "4 mm"}) {
		t.Fatalf("parsed as %+v", g)
	}
	u, gain, other := g.Checks[0], g.Checks[1], g.Checks[2]
	if u.ID != "d-1-u" || u.Kind != "makeup" || u.Want != 1.1 || u.Printed != "1.10" || u.Unit != "W/(m²·K)" || u.Tolerance != 0.05 || u.What != "Ug" ||
		u.Subject != "of two panes" || u.Source != "A Book" || u.Standing != "from memory" {
		t.Errorf("parsed as %+v", u)
	}
	if gain.ID != "d-1-g" || gain.Inputs["basis"] != "en" || gain.Inputs["figure"] != "g" || gain.Inputs["pane soft"] != "4 mm" || gain.Want != 0.6 {
		t.Errorf("parsed as %+v", gain)
	}
	if _, named := other.Inputs["pane soft"]; other.ID != "d-2-g" || named {
		t.Errorf("soft-4 was taken for soft: %+v", other)
	}
}

// What a row or a head must not be, with a word that its error must hold.
func TestParseRefuses(t *testing.T) {
	for _, tt := range []struct{ why, text, old, new, word string }{
		{"no source cell", goodHead + goodRow, ",book,", ",,", "source is blank"},
		{"a source that the head does not name", goodHead + goodRow, ",book,", ",film,", "needs its source"},
		{"a source without text", goodHead + goodRow, "book: A Book", "book: ", "needs its source"},
		{"no source line", goodHead + goodRow, "# source book: A Book\n", "", "needs its source"},
		{"a source that no row names", goodHead + goodRow, "# source", "# source film: A Film\n# source", "source film"},
		{"an unknown standing", goodHead + goodRow, ",read", ",sure", "standing"},
		{"a blank unit", goodHead + goodRow, "0.50,1,", "0.50,,", "unit is blank"},
		{"no number", goodHead + goodRow, "0.50", "half", "want"},
		{"not finite", goodHead + goodRow, "0.50", "NaN", "want"},
		{"a negative tolerance", goodHead + goodRow, "0.05", "-0.05", "below 0"},
		{"an input without value", goodHead + goodRow, "x=1", "x", "key=value"},
		{"an input twice", goodHead + goodRow, "y=2/3", "x=2", "twice"},
		{"an id twice", goodHead + goodRow, goodRow, goodRow + goodRow, "stands twice"},
		{"a column too few", goodHead + goodRow, ",read", "", "fields"},
		{"other columns", goodHead + goodRow, "id,kind", "kind,id", "columns"},
		{"no heading verified", goodHead + goodRow, "# verified: v\n", "", "verified"},
		{"no rows", goodHead + goodRow, heads + "\n" + goodRow, "", "no rows"},
		{"a known difference of no check", goodHead + goodRow, "# title", "# known b: 0 to 1: why\n# title", "known b"},
		{"a known difference without a reason", goodHead + goodRow, "# title", "# known a: 0 to 1\n# title", "known a"},
		{"a known difference without bounds", goodHead + goodRow, "# title", "# known a: much: why\n# title", "known a"},
		{"bounds the wrong way round", goodHead + goodRow, "# title", "# known a: 1 to 0: why\n# title", "known a"},
		{"a column without a heading", wideHead + wideRow, "# column g: ", "# column h: ", "column g"},
		{"a heading of no column", wideHead + wideRow, "# title", "# column h: g | 1 | 1 | x=1\n# title", "column h"},
		{"a column heading too short", wideHead + wideRow, " | 0.01 | ", " | ", "column g"},
		{"a pane of no row", wideHead + wideRow, "pane soft:", "pane hard:", "pane hard"},
		{"no figure", wideHead + wideRow, "1.10,0.6", ",", "no figure"},
		{"a blank subject", wideHead + wideRow, "of two panes", "", "what is blank"},
		{"no number in a column", wideHead + wideRow, "1.10", "x", "want"},
	} {
		text := strings.Replace(tt.text, tt.old, tt.new, 1)
		if text == tt.text {
			t.Fatalf("%s: nothing was changed", tt.why)
		}
		if _, err := parse("f", text); err == nil || !strings.Contains(err.Error(), tt.word) {
			t.Errorf("%s: error is %v, want one with %q", tt.why, err, tt.word)
		}
	}
	both := func(string) ([]byte, error) { return []byte(goodHead + goodRow), nil }
	if _, err := readAll([]string{"one", "two"}, both); err == nil || !strings.Contains(err.Error(), "two: id a stands twice") {
		t.Errorf("an id in two files: error is %v", err)
	}
}

// The lamps are whole: each has a power at every 5 nm from 380 to 780 nm.
func TestLamps(t *testing.T) {
	for _, name := range []string{"fl1", "fl2", "fl3", "fl4", "fl5", "fl6", "fl7", "fl8", "fl9", "fl10", "fl11", "fl12"} {
		nm, power, ok := Lamp(name)
		if !ok || len(nm) != 81 || len(power) != 81 || nm[0] != 380 || nm[80] != 780 {
			t.Fatalf("%s: %d wavelengths, %d powers", name, len(nm), len(power))
		}
		for i, p := range power {
			if !(p >= 0) || i > 0 && nm[i]-nm[i-1] != 5 {
				t.Errorf("%s: %g at %g nm", name, p, nm[i])
			}
		}
	}
	for _, name := range []string{"fl13", "wavelength_nm", ""} {
		if _, _, ok := Lamp(name); ok {
			t.Errorf("there is a lamp %q", name)
		}
	}
	if _, err := readColumns("a,b\n1,x\n"); err == nil {
		t.Error("a cell that is no number is read")
	}
}
