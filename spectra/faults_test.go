package spectra

import (
	"fmt"
	"slices"
	"strings"
	"testing"
)

// withRows returns the good file with the rows from line 3 on, one for each text, replaced.
func withRows(texts ...string) string {
	lines := goodLines()
	for i, text := range texts {
		lines[i+2] = fmt.Sprintf("%d,%s,0.1,0.15", 310+10*i, text)
	}
	return strings.Join(lines, "\n") + "\n"
}

// Up to three faults that are alike stand by themselves; of more, the first speaks for all. Others
// among them keep their places.
func TestFaultsAlike(t *testing.T) {
	for _, tt := range []struct {
		cells []string
		want  [][]string
	}{
		{[]string{"80", "81", "82"}, [][]string{{"pane.csv:3: "}, {"pane.csv:4: "}, {"pane.csv:5: at 330 nm: tau 82: not in 0..1; fractions of one, not percent"}}},
		{[]string{"80", "-1", "81", "82", "high", "83"}, [][]string{
			{"pane.csv:3: at 310 nm: tau 80: not in 0..1; fractions of one, not percent; 4 faults like this, the last in line 8 at 360 nm"},
			{"pane.csv:4: at 320 nm: tau -1: not in 0..1"},
			{"pane.csv:7: at 350 nm: tau high: not a number"}}},
		{[]string{"8e1", "+81.5", "82", "83"}, [][]string{{"pane.csv:3: at 310 nm: tau 8e1: ", "4 faults like this, the last in line 6 at 340 nm"}}},
	} {
		_, err := readAndJoin(strings.NewReader(withRows(tt.cells...)))
		checkFaults(t, err, tt.want)
	}
	// transmittance and reflectance together as well
	_, err := readAndJoin(strings.NewReader(strings.ReplaceAll(good(same), ",0.1,", ",0.3,")))
	checkFaults(t, err, [][]string{{"pane.csv:2: at 300 nm: tau + rho_front is 1.1000; ", "at most 1; 11 faults like this, the last in line 12 at 400 nm"}})
}

// The rows of a file that runs from long to short wavelengths are told in the order of its lines.
func TestFaultsAlikeByLine(t *testing.T) {
	text := foreignRows(12, 510, -10, func(nm float64) string { return fmt.Sprintf("%g;91", nm) })
	text = strings.ReplaceAll(text, ";91", ";-0.5")
	_, _, err := ReadForeign(strings.NewReader(text), "scan.txt", Layout{Columns: tauAt(2)})
	checkFaults(t, err, [][]string{{"scan.txt:1: at 510 nm: tau -0.5: not in 0..1; 12 faults like this, the last in line 12 at 400 nm"}})
}

func TestFaultsOfManyKinds(t *testing.T) {
	l := faultList{most: 5}
	for i := range 40 {
		l.add(&RowError{"a", i, 0, strings.Repeat("x", i%8+1)})
	}
	var got []string
	for _, e := range l.errors() {
		got = append(got, e.Error())
	}
	// of eight kinds five are kept, each of which stands five times, as by hand
	want := []string{"a: x; 5 faults like this, the last in line 32", "a:1: xx; 5 faults like this, the last in line 33", "a:2: xxx; 5 faults like this, the last in line 34",
		"a:3: xxxx; 5 faults like this, the last in line 35", "a:4: xxxxx; 5 faults like this, the last in line 36"}
	if !slices.Equal(got, want) {
		t.Errorf("got\n%s", strings.Join(got, "\n"))
	}
}

func TestNumberless(t *testing.T) {
	for text, want := range map[string]string{
		"tau 0.5: not in 0..1": "tau 0: not in 0..0", "a-1e-05b": "a0b", "1.000;57,493": "0;0", "x - y": "x - y", "3e": "0e", "-": "-", "": "", "12E+3.": "0.", "é7é": "é0é",
	} {
		if got := numberless(text); got != want {
			t.Errorf("%q is %q, want %q", text, got, want)
		}
	}
}

func TestNumbersInMessages(t *testing.T) {
	for _, tt := range []struct {
		v                    float64
		short, brief, length string
	}{
		{300, "300", "300", "300"}, {1e7, "10000000", "10000000", "10000000"}, {1e7 / 224, "44642.857142857145", "44642.9", "44642.9"},
		{1e7 / 2200, "4545.454545454545", "4545.45", "4545.45"}, {310.25, "310.25", "310.25", "310.25"}, {0.1, "0.1", "0.1", "0.1"}, {1e20, "1e+20", "1e+20", "1e+20"},
		{123456.789, "123456.789", "123457", "123457"}, {-1e6, "-1000000", "-1000000", "-1000000"}, {0, "0", "0", "0"}, {1e-7, "1e-07", "1e-07", "1e-07"},
	} {
		if a, b, c := short(tt.v), Brief(tt.v), shortNM(tt.v); a != tt.short || b != tt.brief || c != tt.length {
			t.Errorf("%v is printed %s, %s and %s", tt.v, a, b, c)
		}
	}
	if got := (&RowError{Text: "no column tau"}).Error(); got != "no column tau" {
		t.Errorf("a fault of no file is %q", got)
	}
	if got := Clip("lambda\tT\x1b", 40); got != "lambda T\ufffd" {
		t.Errorf("got %q", got)
	}
}

// Comments are kept, the first twenty, clipped, wherever they stand.
func TestCommentsOfFiles(t *testing.T) {
	text := "\ufeff# a bench, invented\n#\n \"# in quotes, as spreadsheets write it\",,\n" + good(same) + "#last\t" + strings.Repeat("m", 500) + "\n"
	c, err := ReadCSV(strings.NewReader(text), "pane.csv")
	want := []string{"a bench, invented", "in quotes, as spreadsheets write it", "last " + strings.Repeat("m", commentLetters-5) + "…"}
	if err != nil || !slices.Equal(c.Comments, want) {
		t.Errorf("%v, %q", err, c.Comments)
	}
	c, err = ReadCSV(strings.NewReader(strings.Repeat("# again\n", 30)+good(same)), "pane.csv")
	if err != nil || len(c.Comments) != commentsKept {
		t.Errorf("%v, %d comments", err, len(c.Comments))
	}
	c, _, err = ReadForeign(strings.NewReader("# of nobody's\n\xb5\n"+good(same)), "scan.txt", Layout{Separator: ','})
	if err != nil || !slices.Equal(c.Comments, []string{"of nobody's"}) {
		t.Errorf("%v, %q", err, c.Comments)
	}
	tau := strings.Replace(tenPoints(tenAFFN), "##XUNITS", "##ORIGIN= a bench\n of nobody's\n##OWNER= nobody\n##ORIGIN= again\n##XUNITS", 1)
	blocks, err := ReadJCAMP(strings.NewReader("##TITLE= both\n##DATA TYPE= LINK\n##OWNER= public domain\n"+tau+tenPoints(tenAFFN)+"##END=\n"), "pane.jdx")
	if err != nil {
		t.Fatal(err)
	}
	if want := []string{"TITLE= both", "OWNER= public domain", "TITLE= ten points (invented)", "ORIGIN= a bench of nobody's", "OWNER= nobody"}; !slices.Equal(blocks[0].Comments, want) {
		t.Errorf("got %q, want %q", blocks[0].Comments, want)
	}
	if want := []string{"TITLE= both", "OWNER= public domain", "TITLE= ten points (invented)"}; !slices.Equal(blocks[1].Comments, want) {
		t.Errorf("got %q, want %q", blocks[1].Comments, want)
	}
}
