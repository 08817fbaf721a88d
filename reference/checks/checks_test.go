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
		if c.Source == "" || c.Standing == "" || c.Unit == "" || c.What == "" || len(c.Inputs) == 0 {
			t.Errorf("%s is not complete: %+v", c.ID, c)
		}
	}
}

const (
	goodHead = "# title: t\n# inputs: i\n# tolerance: h\n# verified: v\n# source book: A Book\n" + heads + "\n"
	goodRow  = "a,kind,x=1; y=2/3,0.5,1,0.05,what,book,read\n"
)

func TestParse(t *testing.T) {
	list, err := parse(nil, "f", goodHead+goodRow)
	if err != nil {
		t.Fatal(err)
	}
	c := list[0]
	if c.ID != "a" || c.Kind != "kind" || c.Inputs["x"] != "1" || c.Inputs["y"] != "2/3" || c.Want != 0.5 ||
		c.Unit != "1" || c.Tolerance != 0.05 || c.What != "what" || c.Source != "A Book" || c.Standing != "read" {
		t.Errorf("parsed as %+v", c)
	}
}

// What a row or a head must not be, with a word that its error must hold.
func TestParseRefuses(t *testing.T) {
	for _, tt := range []struct{ why, old, new, word string }{
		{"no source cell", ",book,", ",,", "source is blank"},
		{"a source that the head does not name", ",book,", ",film,", "needs its source"},
		{"a source without text", "book: A Book", "book: ", "needs its source"},
		{"no source line", "# source book: A Book\n", "", "needs its source"},
		{"an unknown standing", ",read", ",sure", "standing"},
		{"a blank unit", "0.5,1,", "0.5,,", "unit is blank"},
		{"no number", "0.5", "half", "want"},
		{"not finite", "0.5", "NaN", "want"},
		{"a negative tolerance", "0.05", "-0.05", "below 0"},
		{"an input without value", "x=1", "x", "key=value"},
		{"an input twice", "y=2/3", "x=2", "twice"},
		{"an id twice", goodRow, goodRow + goodRow, "stands twice"},
		{"a column too few", ",read", "", "fields"},
		{"other columns", "id,kind", "kind,id", "columns"},
		{"no heading verified", "# verified: v\n", "", "verified"},
	} {
		text := strings.Replace(goodHead+goodRow, tt.old, tt.new, 1)
		if text == goodHead+goodRow {
			t.Fatalf("%s: nothing was changed", tt.why)
		}
		if _, err := parse(nil, "f", text); err == nil || !strings.Contains(err.Error(), tt.word) {
			t.Errorf("%s: error is %v, want one with %q", tt.why, err, tt.word)
		}
	}
}
