package spectra

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
)

// span is a range of wavelengths with constant values; a blank value leaves the cell blank.
type span struct {
	from, to, step  int
	tau, rhoF, rhoB string
}

func fileOf(spans ...span) string {
	var s strings.Builder
	s.WriteString("wavelength_nm,tau,rho_front,rho_back\n")
	for _, x := range spans {
		for nm := x.from; nm <= x.to; nm += x.step {
			fmt.Fprintf(&s, "%d,%s,%s,%s\n", nm, x.tau, x.rhoF, x.rhoB)
		}
	}
	return s.String()
}

// Rows beyond 2500 nm serve no solar figure: a spectrum that stops early still stops there,
// whatever stands in the infrared.
func TestSolarPartEndsBefore2500(t *testing.T) {
	infrared := span{5000, 50000, 1000, "0", "0.1", "0.9"}
	for _, tt := range []struct {
		what string
		rows []span
		last float64
	}{
		{"infrared from exactly 5 µm", []span{{300, 780, 5, "0.5", "0.1", "0.3"}, infrared}, 780},
		{"rows between 2.5 and 5 µm", []span{{300, 770, 5, "0.5", "0.1", "0.3"}, {2600, 4200, 200, "0.4", "0.1", "0.3"}}, 770},
		{"to 2500 nm", []span{{300, 2500, 10, "0.5", "0.1", "0.3"}, {2550, 4000, 50, "0.4", "0.1", "0.3"}}, 2500},
		{"2500 nm lies between two rows", []span{{303, 2493, 10, "0.5", "0.1", "0.3"}, {2513, 4000, 50, "0.4", "0.1", "0.3"}}, 2513},
		{"the next row is too far", []span{{303, 2493, 10, "0.5", "0.1", "0.3"}, {2551, 4000, 50, "0.4", "0.1", "0.3"}}, 2493},
	} {
		m, err := readAndJoin(strings.NewReader(fileOf(tt.rows...)))
		if err != nil {
			t.Errorf("%s: %v", tt.what, err)
			continue
		}
		for _, c := range []Curve{m.Tau, m.RhoFront, m.RhoBack} {
			if c.Last() != tt.last {
				t.Errorf("%s: the solar part ends at %g nm, want %g", tt.what, c.Last(), tt.last)
			}
		}
	}
}

// A column may stop in the solar range and go on in the infrared.
func TestColumnResumesInInfrared(t *testing.T) {
	m, err := readAndJoin(strings.NewReader(fileOf(
		span{300, 2000, 10, "0.5", "0.1", "0.3"}, span{2010, 2500, 10, "0.5", "0.1", ""},
		span{2600, 3000, 100, "0.4", "", ""}, span{5000, 50000, 1000, "", "0.12", "0.95"})))
	if err != nil {
		t.Fatal(err)
	}
	if m.Tau.Last() != 2500 || m.RhoFront.Last() != 2500 || m.RhoBack.Last() != 2000 {
		t.Errorf("solar parts end at %g, %g, %g nm, want 2500, 2500, 2000", m.Tau.Last(), m.RhoFront.Last(), m.RhoBack.Last())
	}
	if e := NormalEmissivity(m.InfraredBack, m.InfraredTau); math.Abs(e-0.05) > 1e-12 {
		t.Errorf("normal emissivity of the back %g, want 1 − 0.95", e)
	}
}

// Of a sheet that lets infrared through, what passes is not absorbed and not emitted.
func TestInfraredThatPasses(t *testing.T) {
	m, err := readAndJoin(strings.NewReader(fileOf(span{300, 2500, 10, "0.5", "0.1", "0.3"}, span{5000, 50000, 1000, "0.3", "0.1", "0.2"})))
	if err != nil {
		t.Fatal(err)
	}
	if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); math.Abs(e-0.6) > 1e-12 {
		t.Errorf("normal emissivity of the front %g, want 1 − 0.1 − 0.3", e)
	}
}

// Steps are looked at in every column.
func TestCoarseReflectance(t *testing.T) {
	read := func(file string, step int) Columns {
		c, err := ReadCSV(strings.NewReader(fileOf(span{300, 2500, step, "0.5", "0.1", "0.3"})), file)
		if err != nil {
			t.Fatal(err)
		}
		return c
	}
	fine, coarse := read("fine.csv", 10), read("coarse.csv", 100)
	for _, tt := range []struct {
		c    Columns
		want string
	}{
		{Columns{Tau: fine.Tau, RhoFront: fine.RhoFront, RhoBack: fine.RhoBack}, ""},
		{Columns{Tau: coarse.Tau, RhoFront: fine.RhoFront, RhoBack: fine.RhoBack}, "coarse.csv"},
		{Columns{Tau: fine.Tau, RhoFront: coarse.RhoFront, RhoBack: fine.RhoBack}, "coarse.csv"},
		{Columns{Tau: fine.Tau, RhoFront: fine.RhoFront, RhoBack: coarse.RhoBack}, "coarse.csv"},
	} {
		m, err := Join(tt.c, Column{}, Column{})
		if err != nil {
			t.Fatal(err)
		}
		if got := strings.Join(cautionsOf(m, "coarse_steps"), " "); (got == "") != (tt.want == "") || !strings.Contains(got, tt.want) {
			t.Errorf("cautions %q, want them about %q", got, tt.want)
		}
	}
}

// What no reader should be fed, and what it says.
func TestFilesThatAreNoSpectra(t *testing.T) {
	for _, tt := range []struct{ what, text, want string }{
		{"semicolons and decimal commas", "wavelength_nm;tau;rho_front;rho_back\n300;0,5;0,1;0,1\n310;0,5;0,1;0,1\n", "p.csv:1: columns are separated by semicolons"},
		{"tabs", "wavelength_nm\ttau\n300\t0.5\n", "p.csv:1: columns are separated by tabs"},
		{"JCAMP-DX", "##TITLE=glass\n##JCAMP-DX=4.24\n##XYDATA=(X++(Y..Y))\n300 1 2 3\n", "p.csv: is JCAMP-DX"},
		{"no heads", "300,0.5,0.1,0.1\n310,0.5,0.1,0.1\n", "p.csv:1: the first row must hold the column heads"},
		{"a head of 100 000 columns", strings.Repeat("x,", 100000) + "x\n" + strings.Repeat("\n", 100000), "p.csv:1: 100001 columns; a spectrum has four"},
		{"below 0 by more than 0.002", "wavelength_nm,tau,rho_front,rho_back\n300,-0.00201,0.1,0.1\n", "p.csv:2: at 300 nm: tau -0.00201: not in 0..1"},
		{"above 1 by more than 0.002", "wavelength_nm,tau,rho_front,rho_back\n300,0.1,1.00201,0.1\n", "p.csv:2: at 300 nm: rho_front 1.00201: not in 0..1"},
		{"percent signs", "wavelength_nm,tau,rho_front,rho_back\n300,50%,0.1,0.1\n", "p.csv:2: at 300 nm: tau 50%: not a number; fractions of one, not percent"},
	} {
		_, err := ReadCSV(strings.NewReader(tt.text), "p.csv")
		faults, _ := errors.AsType[Errors](err)
		if !slices.ContainsFunc(faults, func(e *RowError) bool { return strings.HasPrefix(e.Error(), tt.want) }) {
			t.Errorf("%s: error %.200v, want %q", tt.what, err, tt.want)
		}
	}
}

// Comments may follow a blank, or stand in quotes as spreadsheets write them.
func TestCommentsOfSpreadsheets(t *testing.T) {
	text := "\"# a comment, in quotes\",,,\n  # another\n" + fileOf(span{300, 400, 10, "0.5", "0.1", "0.3"}) + "\"# the end\",,,\n"
	if _, err := readAndJoin(strings.NewReader(text)); err != nil {
		t.Error(err)
	}
}
