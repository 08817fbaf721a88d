package sheet

// The files: the same bytes each time, what is attached, and what never gets into one.

import (
	"bytes"
	"math"
	"slices"
	"strings"
	"sync"
	"testing"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// The same report gives the same bytes, again and again and from several goroutines at once.
func TestSameBytes(t *testing.T) {
	for _, read := range projects() {
		r, c := read(t)
		first, err := Project(r, c)
		if err != nil {
			t.Fatal(err)
		}
		var w sync.WaitGroup
		for range 4 {
			w.Go(func() {
				f, err := Project(r, c)
				if err != nil || !bytes.Equal(f.PDF, first.PDF) {
					t.Errorf("another run: error %v, %d bytes, first %d", err, len(f.PDF), len(first.PDF))
				}
			})
		}
		w.Wait()
	}
}

// The sheet of one make-up has the JSON of its own ratings attached, that of the project all of them.
func TestAttachedFigures(t *testing.T) {
	r, _ := demoReport(t)
	if got := figuresFile(r).Content; !bytes.Equal(got, table.JSON(r)) {
		t.Error("the project's figures are not its JSON")
	}
	parts := byMakeup(r)
	if len(parts) != 5 {
		t.Fatalf("%d make-ups, want 5", len(parts))
	}
	n := 0
	for _, part := range parts {
		n += len(part.Ratings)
		for i := range part.Ratings {
			if part.Ratings[i].Makeup != part.Ratings[0].Makeup {
				t.Errorf("%s: a rating of another make-up", part.Ratings[0].Makeup.ID)
			}
		}
	}
	if n != len(r.Ratings) {
		t.Errorf("%d ratings on the sheets of make-ups, want %d", n, len(r.Ratings))
	}
}

// Letters that the font lacks are reported, each once, ascending.
func TestReplacedLetters(t *testing.T) {
	r, c := hostile(t)
	f, err := Project(r, c)
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []rune{'ש', 'ع', '北', 0x1f3e0, 0x1f600} {
		if !slices.Contains(f.Replaced, want) {
			t.Errorf("%q is not reported", want)
		}
	}
	if !slices.IsSorted(f.Replaced) || len(slices.Compact(slices.Clone(f.Replaced))) != len(f.Replaced) {
		t.Errorf("reported are %q", f.Replaced)
	}
	for _, have := range "ΩЖжΣ°·′→−†ε" {
		if slices.Contains(f.Replaced, have) {
			t.Errorf("%q is reported to be missing", have)
		}
	}
}

// A length that is no number makes no file, and the error says so.
func TestNoNumbers(t *testing.T) {
	for name, v := range map[string]float64{"NaN": math.NaN(), "infinity": math.Inf(1)} {
		r, c := demoReport(t)
		m := *r.Ratings[0].Makeup
		m.Panes = slices.Clone(m.Panes)
		p := *m.Panes[0].Pane
		p.Plies = []glazing.Ply{{ThicknessMM: v, ConductivityWMK: 1}}
		m.Panes[0].Pane = &p
		r.Ratings = slices.Clone(r.Ratings)
		r.Ratings[0].Makeup = &m
		if f, err := Project(r, c); err == nil || f.PDF != nil {
			t.Errorf("a pane of thickness %s: error %v, %d bytes", name, err, len(f.PDF))
		}
	}
}

// Figures that are no numbers, and what is not known, do not stop a sheet.
func TestNothingKnown(t *testing.T) {
	r, _ := made(t, t.TempDir(), keys{"project": "Nothing known", "makeups": []keys{{"id": "A", "outside_to_inside": []keys{pane("bare"), gap(12), pane("bare")}}},
		"panes": []keys{{"id": "bare", "thickness_mm": 6, "spectrum": "infrared.csv"}}},
		map[string]string{"infrared.csv": strings.TrimSuffix(strings.ReplaceAll(visible(0.5), "\n", "\n1"), "1")}) // from 1380 nm
	checkProject(t, t, "nothing known", r, nil)
	if _, err := Project(r, nil); err != nil {
		t.Error(err)
	}
}
