package spectra

import (
	"errors"
	"fmt"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"
)

// a part of a spectrum file: the same cells from first to last nm by step.
type part struct {
	first, last, step float64
	cells             string
}

// visible covers the solar range as finely as is usual.
var visible = []part{{300, 780, 10, "0.6,0.2,0.15"}, {830, 2480, 50, "0.6,0.2,0.15"}}

// columnsOf reads a spectrum made of parts.
func columnsOf(t *testing.T, parts ...part) Columns {
	t.Helper()
	text := "wavelength_nm,tau,rho_front,rho_back\n"
	for _, p := range parts {
		for nm := p.first; nm <= p.last; nm += p.step {
			text += fmt.Sprintf("%g,%s\n", nm, p.cells)
		}
	}
	c, err := ReadCSV(strings.NewReader(text), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// lineOf returns the line of the first row at or beyond a wavelength.
func lineOf(c Column, nm float64) int {
	return c.Line[slices.IndexFunc(c.NM, func(x float64) bool { return x >= nm })]
}

func cautionsOf(m Measured, code string) []string {
	var texts []string
	for _, c := range m.Cautions {
		if c.Code == code {
			texts = append(texts, c.Text)
		}
	}
	return texts
}

func TestJoinSetsToBound(t *testing.T) {
	for _, tt := range []struct {
		name           string
		line           int
		row            string // of 310 nm
		tau, rho, back float64
	}{
		{"above 1 by 0.001", 3, "310,1.001,0,0", 1, 0, 0},
		{"above 1 by 0.002", 3, "310,1.002,0,0", 1, 0, 0},
		{"below 0 by 0.001", 3, "310,0.5,-0.001,0.1", 0.5, 0, 0.1},
		{"below 0 by 0.002", 3, "310,-0.002,0.1,0.1", 0, 0.1, 0.1},
		{"sum 1.001", 3, "310,0.75,0.251,0.1", 0.75, 0.25, 0.1},
		{"sum 1.002", 3, "310,0.75,0.1,0.252", 0.75, 0.1, 0.25},
		{"sum 1.002 once each is in bounds", 3, "310,1.002,0.002,0", 1, 0, 0},
	} {
		t.Run(tt.name, func(t *testing.T) {
			m, err := readAndJoin(strings.NewReader(withLine(tt.line, tt.row)))
			if err != nil {
				t.Fatal(err)
			}
			if a, b, c := m.Tau.Value[1], m.RhoFront.Value[1], m.RhoBack.Value[1]; a != tt.tau || b != tt.rho || c != tt.back {
				t.Errorf("got %v %v %v, want %v %v %v", a, b, c, tt.tau, tt.rho, tt.back)
			}
			texts := cautionsOf(m, "set_to_bound")
			if len(texts) != 1 || !strings.HasPrefix(texts[0], "pane.csv: ") || !strings.Contains(texts[0], "in line 3.") {
				t.Errorf("cautions %q do not name pane.csv and line 3", m.Cautions)
			}
		})
	}
	m, err := readAndJoin(strings.NewReader(good(same)))
	if err != nil || len(m.Cautions) > 0 {
		t.Errorf("good file: %v, cautions %q", err, m.Cautions)
	}
}

// However many quantities of a row were changed, it is one row.
func TestJoinCountsRowsOnce(t *testing.T) {
	m, err := readAndJoin(strings.NewReader(good(func(i int, line string) string {
		if i == 0 {
			return line
		}
		return line[:3] + ",-0.001,-0.001,-0.001"
	})))
	if err != nil {
		t.Fatal(err)
	}
	const want = "in lines 2, 3, 4, 5, 6, 7, 8, 9 and 3 more."
	if texts := cautionsOf(m, "set_to_bound"); len(texts) != 1 || !strings.HasSuffix(texts[0], want) {
		t.Errorf("cautions %q, want one that ends in %q", texts, want)
	}
}

// Where a quantity has a file of its own, a caution about its rows names that file.
func TestJoinNamesTheFileOfTheRows(t *testing.T) {
	read := func(file, text string) Columns {
		c, err := ReadCSV(strings.NewReader(text), file)
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
	c := Columns{
		Tau:      read("tau.csv", good(same)).Tau,
		RhoFront: read("front.csv", withLine(3, "310,0.8,-0.001,0.15")).RhoFront,
		RhoBack:  read("back.csv", good(same)).RhoBack,
	}
	m, err := Join(c, Column{}, Column{})
	if err != nil {
		t.Fatal(err)
	}
	if texts := cautionsOf(m, "set_to_bound"); len(texts) != 1 || !strings.Contains(texts[0], "front.csv") || strings.Contains(texts[0], "tau.csv") {
		t.Errorf("cautions %q, want one about line 3 of front.csv", texts)
	}
}

// Where quantities come from files of their own, a peak of one may lie between two points of
// another: the sum is checked there as well.
func TestJoinSumBetweenPoints(t *testing.T) {
	apart := func(file string, first, step int, peak int, low, high string) Columns {
		text := "wavelength_nm,tau,rho_front,rho_back\n"
		for nm := first; nm <= 500; nm += step {
			v := low
			if nm == peak {
				v = high
			}
			text += fmt.Sprintf("%d,%s,%s,%s\n", nm, v, v, v)
		}
		c, err := ReadCSV(strings.NewReader(text), file)
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
	c := Columns{
		Tau:      apart("tau.csv", 300, 5, 405, "0.6", "0.9").Tau,
		RhoFront: apart("rho.csv", 300, 10, 0, "0.3", "").RhoFront,
		RhoBack:  apart("rho.csv", 300, 10, 0, "0.05", "").RhoBack,
	}
	_, err := Join(c, Column{}, Column{})
	if row, ok := errors.AsType[*RowError](err); !ok || row.NM != 405 || !strings.Contains(row.Text, "add to at most 1") {
		t.Errorf("tau 0.9 and rho_front 0.3 at 405 nm: got %v", err)
	}
}

func TestJoinBlankEnds(t *testing.T) {
	text := good(func(i int, line string) string {
		switch i {
		case 11:
			return "400,,0.1,"
		case 1:
			return "300,0.8,,0.15"
		}
		return line
	})
	m, err := readAndJoin(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	if m.Tau.Last() != 390 || m.RhoFront.First() != 310 || m.RhoFront.Last() != 400 || m.RhoBack.Last() != 390 || m.Tau.Len() != 10 {
		t.Errorf("tau to %v, front %v to %v, back to %v nm", m.Tau.Last(), m.RhoFront.First(), m.RhoFront.Last(), m.RhoBack.Last())
	}
}

func TestJoinNeedsEachQuantity(t *testing.T) {
	without := func(column int) string {
		return good(func(_ int, line string) string {
			return strings.Join(slices.Delete(strings.Split(line, ","), column, column+1), ",")
		})
	}
	for column, name := range []string{1: "tau", 2: "rho_front", 3: "rho_back"} {
		if name == "" {
			continue
		}
		_, err := readAndJoin(strings.NewReader(without(column)))
		checkFaults(t, err, [][]string{{"pane.csv: no column " + name}})
	}
	_, err := readAndJoin(strings.NewReader(good(func(i int, line string) string {
		if i < 10 {
			return line
		}
		return strings.Replace(line, ",0.8,", ",,", 1)
	})))
	checkFaults(t, err, [][]string{{"pane.csv: 9 values of tau", "at least 10"}})
}

func TestJoinCoarseSteps(t *testing.T) {
	const cells = "0.6,0.2,0.15"
	for _, tt := range []struct {
		name  string
		parts []part
		want  []string // words of the caution; empty for none
	}{
		{"at both limits", visible, nil},
		{"10.5 nm below 780", []part{{300, 700, 10, cells}, {710.5, 710.5, 1, cells}, {720.5, 780.5, 10, cells}, {830, 2500, 50, cells}}, []string{"10.5 nm below 780 nm", "at most 10"}},
		{"55 nm beyond", []part{{300, 780, 10, cells}, {830, 1000, 50, cells}, {1035, 1035, 1, cells}, {1085, 2500, 50, cells}}, []string{"55 nm beyond 780 nm", "at most 50"}},
		{"both", []part{{300, 720, 20, cells}, {740, 2540, 60, cells}}, []string{"60 nm below 780 nm", "60 nm beyond 780 nm"}},
		{"a step that begins below 780", []part{{300, 770, 10, cells}, {790, 2500, 45, cells}}, []string{"20 nm below 780 nm"}},
		{"beyond the sun any step will do", append(slices.Clone(visible), part{2520, 2520, 1, cells}, part{3500, 4900, 700, cells}), nil},
	} {
		t.Run(tt.name, func(t *testing.T) {
			m, err := Join(columnsOf(t, tt.parts...), Column{}, Column{})
			if err != nil {
				t.Fatal(err)
			}
			texts := cautionsOf(m, "coarse_steps")
			if (len(texts) > 0) != (tt.want != nil) {
				t.Fatalf("cautions %q, want words %q", m.Cautions, tt.want)
			}
			for _, word := range tt.want {
				if !strings.Contains(texts[0], word) || !strings.HasPrefix(texts[0], "pane.csv: ") {
					t.Errorf("%q lacks %q", texts[0], word)
				}
			}
			if len(tt.want) > 0 && strings.Contains(texts[0], "beyond") != slices.ContainsFunc(tt.want, func(w string) bool { return strings.Contains(w, "beyond") }) {
				t.Errorf("%q names a range that is fine", texts[0])
			}
		})
	}
}

func TestJoinInfrared(t *testing.T) {
	rows := func(first, last float64) []part {
		return append(slices.Clone(visible), part{first, last, 1000, ",0.95,0.3"})
	}
	t.Run("to 50 µm", func(t *testing.T) {
		m, err := Join(columnsOf(t, rows(5000, 50000)...), Column{}, Column{})
		if err != nil || len(m.Cautions) > 0 {
			t.Fatalf("%v, cautions %q", err, m.Cautions)
		}
		if m.InfraredFront.First() != 5000 || m.InfraredFront.Last() != 50000 || m.InfraredBack.Len() != 46 {
			t.Errorf("infrared from %v to %v nm, %d points", m.InfraredFront.First(), m.InfraredFront.Last(), m.InfraredBack.Len())
		}
		// The mean of a constant is that constant.
		if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); math.Abs(e-0.05) > 1e-12 {
			t.Errorf("normal emissivity of a reflectance of 0.95 is %v, want 0.05", e)
		}
		if e := NormalEmissivity(m.InfraredBack, m.InfraredTau); math.Abs(e-0.7) > 1e-12 {
			t.Errorf("normal emissivity of a reflectance of 0.3 is %v, want 0.7", e)
		}
	})
	t.Run("to 30 µm", func(t *testing.T) {
		m, err := Join(columnsOf(t, rows(5000, 30000)...), Column{}, Column{})
		if err != nil {
			t.Fatal(err)
		}
		texts := cautionsOf(m, "extended")
		if len(texts) != 2 || !strings.Contains(texts[0], "front stop at 30 µm") || !strings.Contains(texts[1], "back stop at 30 µm") || !strings.Contains(texts[0], "held to 50 µm") {
			t.Errorf("cautions %q", m.Cautions)
		}
		if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); math.Abs(e-0.05) > 1e-12 {
			t.Errorf("normal emissivity is %v, want 0.05 with the last value held", e)
		}
	})
	t.Run("to 25 µm", func(t *testing.T) {
		if m, err := Join(columnsOf(t, rows(5000, 25000)...), Column{}, Column{}); err != nil || len(cautionsOf(m, "extended")) != 2 {
			t.Errorf("%v, cautions %q", err, m.Cautions)
		}
	})
	t.Run("to 20 µm", func(t *testing.T) {
		c := columnsOf(t, rows(5000, 20000)...)
		_, err := Join(c, Column{}, Column{})
		place := fmt.Sprintf("pane.csv:%d: at 20000 nm: ", lineOf(c.RhoFront, 20000))
		checkFaults(t, err, [][]string{{place, "front must reach 25 µm"}, {place, "back must reach 25 µm"}})
	})
	t.Run("from 5.5 µm", func(t *testing.T) {
		if _, err := Join(columnsOf(t, rows(5500, 50500)...), Column{}, Column{}); err != nil {
			t.Error(err)
		}
	})
	t.Run("from 7 µm", func(t *testing.T) {
		c := columnsOf(t, rows(7000, 50000)...)
		_, err := Join(c, Column{}, Column{})
		place := fmt.Sprintf("pane.csv:%d: at 7000 nm: ", lineOf(c.RhoFront, 7000))
		checkFaults(t, err, [][]string{{place, "front must begin at 5.5 µm"}, {place, "back must begin at 5.5 µm"}})
	})
	t.Run("of one face", func(t *testing.T) {
		m, err := Join(columnsOf(t, append(slices.Clone(visible), part{5000, 50000, 1000, ",,0.95"})...), Column{}, Column{})
		if err != nil || m.InfraredFront.Len() != 0 || m.InfraredBack.Len() != 46 || len(m.Cautions) > 0 {
			t.Errorf("%v, %d points of the front, %d of the back, cautions %q", err, m.InfraredFront.Len(), m.InfraredBack.Len(), m.Cautions)
		}
	})
	t.Run("between 2.5 and 5 µm nothing is used", func(t *testing.T) {
		solar := append(slices.Clone(visible), part{2500, 2500, 1, "0.6,0.2,0.15"})
		ir := part{5000, 50000, 1000, ",0.95,0.3"}
		plain, err := Join(columnsOf(t, append(slices.Clone(solar), ir)...), Column{}, Column{})
		if err != nil {
			t.Fatal(err)
		}
		filled, err := Join(columnsOf(t, append(slices.Clone(solar), part{2600, 4900, 100, "0.01,0.99,0.98"}, ir)...), Column{}, Column{})
		if err != nil || len(filled.Cautions) > 0 {
			t.Fatalf("%v, cautions %q", err, filled.Cautions)
		}
		if !reflect.DeepEqual(filled.InfraredFront, plain.InfraredFront) || !reflect.DeepEqual(filled.InfraredBack, plain.InfraredBack) {
			t.Error("rows below 5 µm change the infrared")
		}
		for _, w := range weightings() {
			if a, b := w.Mean(filled.Tau), w.Mean(plain.Tau); a != b {
				t.Errorf("%s: rows beyond 2.5 µm change the mean from %v to %v", w.Name, b, a)
			}
		}
	})
	t.Run("from files of its own", func(t *testing.T) {
		own := columnsOf(t, part{5000, 50000, 1000, "0,0.9,0.8"})
		m, err := Join(columnsOf(t, visible...), own.RhoFront, own.RhoBack)
		if err != nil {
			t.Fatal(err)
		}
		if a, b := NormalEmissivity(m.InfraredFront, m.InfraredTau), NormalEmissivity(m.InfraredBack, m.InfraredTau); math.Abs(a-0.1) > 1e-12 || math.Abs(b-0.2) > 1e-12 {
			t.Errorf("normal emissivities %v and %v, want 0.1 and 0.2", a, b)
		}
		_, err = Join(columnsOf(t, visible...), columnsOf(t, visible...).RhoFront, Column{})
		checkFaults(t, err, [][]string{{"pane.csv: no rows beyond 5 µm", "front"}})
	})
}

// What is impossible shows in the columns that are there; what is missing is not.
func TestImpossible(t *testing.T) {
	tau, rho := constant(300, 400, 10, 0.9), constant(300, 400, 20, 0.25)
	tau.File, rho.File = "t.csv", "r.csv"
	for _, tt := range []struct {
		name string
		c    Columns
		want [][]string
	}{
		{"with the front", Columns{Tau: tau, RhoFront: rho}, [][]string{
			{"r.csv: at 300 nm: tau + rho_front is 1.1500", "6 faults like this"}, {"t.csv: at 300 nm: tau + rho_front is 1.1500", "11 faults like this"}}},
		{"with the back", Columns{Tau: tau, RhoBack: rho}, [][]string{{"r.csv: at 300 nm: tau + rho_back"}, {"t.csv: at 300 nm: tau + rho_back"}}},
		{"a transmittance alone", Columns{Tau: tau}, nil},
		{"reflectances alone", Columns{RhoFront: tau, RhoBack: tau}, nil},
		{"nothing", Columns{}, nil},
		{"within the slack", Columns{Tau: tau, RhoBack: constant(300, 400, 10, 0.1+Slack)}, nil},
		{"side by side", Columns{Tau: tau, RhoFront: constant(500, 600, 10, 0.9)}, nil},
	} {
		faults := Impossible(tt.c)
		if tt.want == nil {
			if faults != nil {
				t.Errorf("%s: %v", tt.name, faults)
			}
			continue
		}
		checkFaults(t, faults, tt.want)
	}
	if tau.Value[0] != 0.9 {
		t.Error("the columns were changed")
	}
}
