package spectra

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"
	"testing"
)

// foreignRows are rows of a wavelength and values, as a format prints them, from first by step.
func foreignRows(n int, first, step float64, row func(nm float64) string) string {
	var s strings.Builder
	for i := range n {
		s.WriteString(row(first+float64(i)*step) + "\n")
	}
	return s.String()
}

// comma writes a number with a decimal comma.
func comma(v float64) string { return strings.ReplaceAll(fmt.Sprintf("%.2f", v), ".", ",") }

// A file as a spectrometer of nobody's writes it: prose, per cent, decimal commas, semicolons, from
// long to short wavelengths, and a closing line.
var heron = "Heron Mill test bench; sample 6 mm\nDate;1.2.2026\n\nnm;%T\n" +
	"400,00;91,20\n390,00;90,10\n380,00;88,00\n370,00;80,05\n360,00;70,00\n350,00;60,00\n340,00;33,30\n330,00;12,00\n320,00;1,00\n310,00;0,05\n300,00;-0,10\n" +
	"\nend of scan\n"

func tauAt(n int) map[string]int { return map[string]int{Wavelength: 1, headTau: n} }

func TestReadForeignHeron(t *testing.T) {
	c, understood, err := ReadForeign(strings.NewReader(heron), "scan.txt", Layout{Percent: true, DecimalComma: true, Columns: tauAt(2)})
	if err != nil {
		t.Fatal(err)
	}
	want := Curve{
		NM:    []float64{300, 310, 320, 330, 340, 350, 360, 370, 380, 390, 400},
		Value: []float64{-0.001, 0.0005, 0.01, 0.12, 0.333, 0.6, 0.7, 0.8005, 0.88, 0.901, 0.912}, // by hand, a hundredth of each
	}
	if !sameBits(c.Tau.Curve, want) || c.RhoFront.Len()+c.RhoBack.Len() > 0 {
		t.Errorf("got %v", c)
	}
	if want := []int{15, 14, 13, 12, 11, 10, 9, 8, 7, 6, 5}; !slices.Equal(c.Tau.Line, want) {
		t.Errorf("lines %v, want %v", c.Tau.Line, want)
	}
	said := []string{
		`skipped 4 lines before the first row of numbers; the last that is not blank reads "nm;%T"`,
		"cells are separated by semicolons, told from the rows",
		"numbers have decimal commas",
		"column 1 is the wavelength in nm, as no unit was given",
		"column 2 is tau, per cent, divided by 100",
		`left out 1 line after the last row of numbers, which is line 15; the first of them reads "end of scan"`,
		"rows run from long to short wavelengths and were turned",
		"11 rows of numbers, 300 to 400 nm",
	}
	if !slices.Equal(understood, said) {
		t.Errorf("understood\n%s\nwant\n%s", strings.Join(understood, "\n"), strings.Join(said, "\n"))
	}
}

// The same spectrum in many layouts is read alike.
func TestReadForeignLayouts(t *testing.T) {
	value := func(nm float64) float64 { return math.Round(nm/4) / 1000 }
	two := func(format string) string {
		return foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf(format, nm, value(nm)) })
	}
	want := Curve{}
	for nm := 400.0; nm <= 510; nm += 10 {
		want.NM, want.Value = append(want.NM, nm), append(want.Value, value(nm))
	}
	for _, tt := range []struct {
		name, text string
		layout     Layout
		say        string // something that must have been said
	}{
		{"tabs", two("%g\t%g"), Layout{Columns: tauAt(2)}, "separated by tabs, told"},
		{"blanks", two("  %g   %g "), Layout{Columns: tauAt(2)}, "separated by blanks, told"},
		{"blanks, asked for", two("  %g \t %g "), Layout{Columns: tauAt(2), Separator: ' '}, "separated by blanks"},
		{"commas", two("%g, %g"), Layout{Columns: tauAt(2)}, "separated by commas, told"},
		{"semicolons", two("%g ;%g"), Layout{Columns: tauAt(2)}, "separated by semicolons, told"},
		{"another separator", two("%g | %g"), Layout{Columns: tauAt(2), Separator: '|'}, "separated by '|'"},
		{"a separator at the end", two("%g;%g;"), Layout{Second: headTau}, "column 2 is tau"},
		{"quotes", two(`"%g";"%g"`), Layout{Columns: tauAt(2)}, "semicolons"},
		{"carriage returns", strings.ReplaceAll(two("%g;%g"), "\n", "\r"), Layout{Columns: tauAt(2)}, "semicolons"},
		{"byte order mark and CRLF", "\ufeff" + strings.ReplaceAll(two("%g;%g"), "\n", "\r\n"), Layout{Columns: tauAt(2)}, "semicolons"},
		{"blank lines", strings.ReplaceAll(two("%g;%g"), "\n", "\n\n"), Layout{Columns: tauAt(2)}, "semicolons"},
		{"the second of two columns", two("%g;%g"), Layout{Second: headTau}, "column 2 is tau, fractions of one"},
		{"our own heads", "Wavelength_nm;TAU\n" + two("%g;%g"), Layout{}, "the line before the first row has the heads"},
		{"a head of ours without a unit", "wavelength;tau\n" + two("%g;%g"), Layout{Unit: UnitNM}, "column 1 is the wavelength in nm"},
		{"other columns with words", two("x;%g;ok;%g"), Layout{Columns: map[string]int{Wavelength: 2, headTau: 4}}, "columns 1, 3 are left out"},
		{"a column more", two("%g;%g;7"), Layout{Columns: map[string]int{headTau: 2}}, "column 3 is left out"},
		{"a head of numbers in fewer cells", "2026 7\n12\n" + two("%g;%g"), Layout{Columns: tauAt(2)}, `reads "12"`},
		{"Latin-1 in the head", "\xb5m;\xb0\n" + two("%g;%g"), Layout{Columns: tauAt(2)}, "skipped 1 line"},
		{"a percent sign", foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("%g;%g %%", nm, 100*value(nm)) }), Layout{Percent: true, Columns: tauAt(2)}, "per cent"},
		{"µm", foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("0.%g;%g", nm, value(nm)) }), Layout{Unit: UnitUM, Columns: tauAt(2)}, "the wavelength in µm"},
		{"µm by the head", "wavelength_um;tau\n" + foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("0.%g;%g", nm, value(nm)) }), Layout{}, "the wavelength in µm, as its head says"},
		{"an exponent", foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("%e;%g", nm, value(nm)) }), Layout{Columns: tauAt(2)}, "semicolons"},
	} {
		t.Run(tt.name, func(t *testing.T) {
			c, understood, err := ReadForeign(strings.NewReader(tt.text), "scan.txt", tt.layout)
			if err != nil {
				t.Fatal(err)
			}
			if !sameBits(c.Tau.Curve, want) {
				t.Errorf("got %v, want %v", c.Tau.Curve, want)
			}
			if all := strings.Join(understood, "\n"); !strings.Contains(all, tt.say) {
				t.Errorf("%q is not said in\n%s", tt.say, all)
			}
		})
	}
}

// Wavenumbers: 25 000/cm is 400 nm and 20 000/cm is 500 nm, by hand; rows that ascend run from long
// to short wavelengths.
func TestReadForeignWavenumbers(t *testing.T) {
	text := "cm-1\tT\tR\n" + foreignRows(11, 20000, 500, func(v float64) string { return fmt.Sprintf("%g\t0.5\t%g", v, v/100000) })
	c, understood, err := ReadForeign(strings.NewReader(text), "scan.txt", Layout{Unit: UnitReciprocal, Columns: map[string]int{headTau: 2, headRhoFront: 3}})
	if err != nil {
		t.Fatal(err)
	}
	if n := c.Tau.Len(); n != 11 || c.Tau.NM[0] != 400 || c.Tau.NM[10] != 500 || c.RhoFront.Value[0] != 0.25 || c.RhoFront.Value[10] != 0.2 {
		t.Errorf("%d values from %v to %v nm, %v", n, c.Tau.First(), c.Tau.Last(), c.RhoFront.Value)
	}
	all := strings.Join(understood, "\n")
	for _, want := range []string{"column 1 is the wavenumber in 1/cm", "were turned", "column 3 is rho_front", "11 rows of numbers, 400 to 500 nm"} {
		if !strings.Contains(all, want) {
			t.Errorf("%q is not said in\n%s", want, all)
		}
	}
}

// Gaps and columns that stop, in rows that run either way.
func TestReadForeignGaps(t *testing.T) {
	lines := []string{"300;0,1;", "310;?;", "320;0,2;0,5", "330;0,3;0,5", "340;?;0,5", "350;?;?", "360;0,4;0,5", "370;0,5;", "380;0,6;", "390;0,7;", "400;?;"}
	want := []Span{{300, 320}, {330, 360}}
	for _, turned := range []bool{false, true} {
		if turned {
			slices.Reverse(lines)
		}
		c, _, err := ReadForeign(strings.NewReader(strings.Join(lines, "\n")), "scan.txt",
			Layout{DecimalComma: true, Columns: map[string]int{headTau: 2, headRhoBack: 3}})
		if err != nil {
			t.Fatal(err)
		}
		if !slices.Equal(c.Tau.Gaps, want) || c.Tau.Len() != 7 || !slices.Equal(c.RhoBack.Gaps, []Span{{340, 360}}) || c.RhoBack.First() != 320 {
			t.Errorf("turned %v: tau %+v, rho_back %+v", turned, c.Tau, c.RhoBack)
		}
	}
}

func TestReadForeignPercentOfDarkGlass(t *testing.T) {
	text := foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("%g 0.91", nm) })
	_, understood, err := ReadForeign(strings.NewReader(text), "scan.txt", Layout{Percent: true, Columns: tauAt(2)})
	if all := strings.Join(understood, "\n"); err != nil || !strings.Contains(all, "no value is above 1 per cent: if the file has fractions of one, leave --percent out") {
		t.Errorf("%v: %s", err, all)
	}
}

func TestReadForeignRefuses(t *testing.T) {
	rows := func(format string) string {
		return foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf(format, nm) })
	}
	commas := foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("%g;%s", nm, comma(nm/1000)) })
	change := func(number int, line string) string { // of rows that begin at 400 nm in line 1
		lines := strings.Split(strings.TrimSuffix(rows("%g;0.5"), "\n"), "\n")
		lines[number-1] = line
		return strings.Join(lines, "\n")
	}
	tau := Layout{Columns: tauAt(2)}
	for _, tt := range []struct {
		name, text string
		layout     Layout
		want       [][]string
	}{
		{"empty", " \n\n", tau, [][]string{{"scan.txt: is empty"}}},
		{"prose", "a\nb c\n1\n", tau, [][]string{{"scan.txt: no row of numbers"}}},
		{"binary", "\x01\x00\x08", tau, [][]string{{"scan.txt: is binary"}}},
		{"UTF-16", "\xff\xfe4\x000\x00", tau, [][]string{{"scan.txt: ", "UTF-16"}}},
		{"too many lines", strings.Repeat("\n", maxLines+1), tau, [][]string{{"scan.txt: 1048577 lines"}}},
		{"nine rows", foreignRows(9, 400, 10, func(nm float64) string { return fmt.Sprintf("%g;0.5", nm) }), tau, [][]string{{"scan.txt: 9 rows of numbers; a spectrum has at least 10"}}},
		{"decimal commas", commas, tau, [][]string{{"scan.txt: 0 rows of numbers, and 12 with decimal commas, the first in line 1: add --decimal-comma"}}},
		{"decimal commas and many whole numbers", strings.ReplaceAll(rows("%g;0"), "\n", "\n\n") + strings.ReplaceAll(foreignRows(15, 600, 10, func(nm float64) string { return fmt.Sprintf("%g;0,31", nm) }), "\n", "\n"), tau,
			[][]string{{"scan.txt: 12 rows of numbers, and 27 with decimal commas, the first in line 1: add --decimal-comma"}}},
		{"decimal points", rows("%g;0.51"), Layout{DecimalComma: true, Columns: tauAt(2)}, [][]string{{"scan.txt: 0 rows of numbers, and 12 with decimal points", "leave --decimal-comma out"}}},
		{"commas that may be either", foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf("%g,0,%g", nm, nm-390) }), tau,
			[][]string{{`scan.txt:1: "400,0,10": commas stand between digits`, "--decimal-comma", "--separator ,"}}},
		{"per cent", rows("%g;91.5"), tau, [][]string{{"scan.txt:1: at 400 nm: tau 91.5: not in 0..1; in per cent? add --percent"}}},
		{"more than per cent", change(3, "420;120"), tau, [][]string{{"scan.txt:3: at 420 nm: tau 120: not in 0..1"}}},
		{"above 100 per cent", change(3, "420;120"), Layout{Percent: true, Columns: tauAt(2)}, [][]string{{"scan.txt:3: at 420 nm: tau 120: above 100 per cent"}}},
		{"below 0", change(3, "420;-0.01"), tau, [][]string{{"scan.txt:3: at 420 nm: tau -0.01: not in 0..1"}}},
		{"not finite", change(3, "420;NaN"), tau, [][]string{{"scan.txt:3: at 420 nm: tau NaN: not a finite number"}}},
		{"not finite, at the end", change(12, "510;NaN"), tau, [][]string{{"scan.txt:12: at 510 nm: tau NaN: not a finite number"}}},
		{"a word, at the beginning", change(1, "400;over"), tau, [][]string{{"scan.txt:1: at 400 nm: tau over: not a number"}}},
		{"a decimal comma among points", change(3, "420;0,5"), tau, [][]string{{"scan.txt:3: at 420 nm: tau 0,5: not a number; decimal commas? add --decimal-comma"}}},
		{"a point among decimal commas", strings.Replace(commas, "0,42", "0.42", 1), Layout{DecimalComma: true, Columns: tauAt(2)}, [][]string{{"scan.txt:3: at 420 nm: tau 0.42: a point in it"}}},
		{"text between", change(3, "second scan"), tau, [][]string{{`scan.txt:3: "second scan" between rows of numbers, which begin in line 1`}}},
		{"a cell too many", change(3, "420;0.5;7"), tau, [][]string{{"scan.txt:3: 3 cells where the other rows have 2"}}},
		{"a blank cell between", change(3, "420;"), tau, [][]string{{"scan.txt:4: at 430 nm: tau 0.5: ", "blank cell at line 3", "write ?"}}},
		{"twice", change(3, "410;0.5"), tau, [][]string{{"scan.txt:3: at 410 nm: this wavelength stands twice, also in line 2"}}},
		{"to and fro", change(3, "405;0.5"), tau, [][]string{{"scan.txt:3: at 405 nm: wavelengths go to and fro; line 2 has 410 nm"}}},
		{"µm taken for nm", rows("0.%g;0.5"), tau, [][]string{{`scan.txt:1: wavelength "0.400": not from 100 nm to 1 mm`, "--unit"}}},
		{"nm taken for µm", rows("%g000;0.5"), Layout{Unit: UnitUM, Columns: tauAt(2)}, [][]string{{"scan.txt:1: wavelength \"400000\"", "--unit"}}},
		{"a wavelength of 0", change(1, "0;0.5"), tau, [][]string{{`scan.txt:1: wavelength "0"`}}},
		{"a wavelength below 0", change(12, "-5;0.5"), Layout{Unit: UnitReciprocal, Columns: tauAt(2)}, [][]string{{`scan.txt:12: wavelength "-5"`}}},
		{"two columns, and nothing said", rows("%g;0.5"), Layout{}, [][]string{{"scan.txt:1: column 2 may be tau, rho_front or rho_back", "--columns wavelength=1,tau=2"}}},
		{"four columns, and nothing said", "nm;T;R;R\n" + rows("%g;0.5;0.1;0.1"), Layout{Second: headTau}, [][]string{{"scan.txt:2: 4 columns, and nothing says which is which", "--columns"}}},
		{"a head that stands twice", "wavelength;tau;tau\n" + rows("%g;0.5;0.1"), Layout{}, [][]string{{"scan.txt:2: 3 columns"}}},
		{"a column that is not there", rows("%g;0.5"), Layout{Columns: tauAt(5)}, [][]string{{"scan.txt: no row has numbers in the columns that were named; line 1 has 2 columns"}}},
		{"another separator", rows("%g\t0.5"), Layout{Separator: ';', Columns: tauAt(2)}, [][]string{{"scan.txt: no row of numbers separated by semicolons; in line 1 they are by tabs"}}},
		{"more columns than are looked at", rows("%g" + strings.Repeat(";1", maxColumns)), tau, [][]string{{"scan.txt: no row of numbers"}}},
		{"comma for two things", "400,0,5\n", Layout{Separator: ',', DecimalComma: true}, [][]string{{"scan.txt: a comma cannot both separate cells and stand in numbers, unless such numbers are in quotes"}}},
		{"a digit separates", "", Layout{Separator: '1'}, [][]string{{"scan.txt: '1' cannot separate cells"}}},
		{"an unknown unit", "", Layout{Unit: "mm"}, [][]string{{`scan.txt: unit "mm"`, "nm, um, 1/cm"}}},
		{"an unknown quantity", "", Layout{Columns: map[string]int{"sigma": 2}}, [][]string{{`scan.txt: unknown quantity "sigma"`}}},
		{"a column for two", "", Layout{Columns: tauAt(1)}, [][]string{{"scan.txt: column 1 cannot be both wavelength and tau"}}},
		{"column 0", "", Layout{Columns: tauAt(0)}, [][]string{{"scan.txt: tau is column 0"}}},
		{"a wavelength alone", "", Layout{Columns: map[string]int{Wavelength: 1}}, [][]string{{"scan.txt: no column tau"}}},
		{"no such second column", "", Layout{Second: "sigma"}, [][]string{{"scan.txt: the second column cannot be"}}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			c, _, err := ReadForeign(strings.NewReader(tt.text), "scan.txt", tt.layout)
			checkFaults(t, err, tt.want)
			if !sameColumns(c, Columns{}) {
				t.Errorf("a fault, and yet %v", c)
			}
		})
	}
}

// Nothing that looks like a row is left out above or below the rows: rows with signs between their
// thousands, and rows of another number of cells.
func TestReadForeignLeavesNoRowOut(t *testing.T) {
	rows := func(n int, first, step float64, sign string, cells string) string {
		return foreignRows(n, first, step, func(nm float64) string {
			s := fmt.Sprintf("%g", nm)
			if len(s) > 3 {
				s = s[:len(s)-3] + sign + s[len(s)-3:]
			}
			return s + cells
		})
	}
	percent := Layout{Percent: true, DecimalComma: true, Columns: tauAt(2)}
	points := Layout{Columns: tauAt(2)}
	for _, tt := range []struct {
		name, text string
		layout     Layout
		want       [][]string
	}{
		{"a thousands point", "nm;T\n" + rows(151, 300, 10, ".", ";57,493"), percent, [][]string{
			{`scan.txt:72: "1.000;57,493" stands after the last row of numbers, which is line 71`, "a thousands point? write 1000", "81 faults like this, the last in line 152"}}},
		{"descending", "Date;1.2.2026\nnm;T\n" + rows(150, 1790, -10, ".", ";57,493"), percent, [][]string{
			{`scan.txt:3: "1.790;57,493" stands before the first row of numbers, which is line 83`, "a thousands point? write 1790", "80 faults like this, the last in line 82"}}},
		{"a thousands comma", rows(75, 300, 10, ",", ";0.5"), points, [][]string{{`scan.txt:71: "1,000;0.5" stands after`, "a thousands comma? write 1000", "5 faults like this"}}},
		{"a blank", rows(72, 300, 10, " ", ";0.5"), points, [][]string{{`scan.txt:71: "1 000;0.5" stands after`, "a blank between thousands? write 1000"}, {"scan.txt:72: "}}},
		{"an apostrophe", rows(71, 300, 10, "\u2019", ";0.5"), points, [][]string{{"scan.txt:71: ", "an apostrophe between thousands? write 1000"}}},
		{"decimals as well", rows(70, 300, 10, "", ";0,5") + "1.000,5;0,5\n", Layout{DecimalComma: true, Columns: tauAt(2)}, [][]string{{"scan.txt:71: ", "a thousands point? write 1000"}}},
		{"between rows", rows(20, 300, 10, "", ";0,5") + "1.000;0,5\n" + rows(20, 600, 10, "", ";0,5"), Layout{DecimalComma: true, Columns: tauAt(2)}, [][]string{
			{`scan.txt:21: "1.000;0,5" between rows of numbers, which begin in line 1; a thousands point? write 1000`}}},
		{"a thousands point among decimal points", rows(75, 300, 10, ".", ";0.5"), points, [][]string{{`scan.txt:71: wavelength "1.000": not from 100 nm to 1 mm`, "a thousands point? write 1000"}}},
		{"a thousands comma among commas", rows(100, 300, 10, ",", ",0.5"), points, [][]string{{`scan.txt:71: "1,000,0.5" has 3 cells, where the rows of lines 1 to 70 have 2`, "30 faults like this, the last in line 100"}}},
		{"a unit in the cell", rows(20, 300, 10, "", ";0.5") + "500 nm;0.5\n", points, [][]string{{`scan.txt:21: "500 nm;0.5" stands after the last row of numbers, which is line 20, and has digits where those have the wavelength; if it is no row, take it out`}}},
		{"a unit in the first cell", "nm;T\n290 nm;0.5\n" + rows(20, 300, 10, "", ";0.5"), points, [][]string{{`scan.txt:2: "290 nm;0.5" stands before`}}},
		{"rows of other cells before", rows(5, 300, 10, "", ";0.5") + rows(20, 400, 10, "", ";0.5;"), points, [][]string{{`scan.txt:1: "300;0.5" has 2 cells, where the rows of lines 6 to 25 have 3`, "5 faults like this, the last in line 5"}}},
		{"a row of other cells just after", rows(20, 300, 10, "", ";0.5") + "500;0.5;7\n", points, [][]string{{`scan.txt:21: "500;0.5;7" has 3 cells`}}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			c, _, err := ReadForeign(strings.NewReader(tt.text), "scan.txt", tt.layout)
			checkFaults(t, err, tt.want)
			if !sameColumns(c, Columns{}) {
				t.Errorf("a fault, and yet %v", c)
			}
		})
	}
	// what is no row may stand there
	for _, around := range [][2]string{{"Date;12.3.2026\n12.3.2026;10:45\n2026;7;31\nScan 7;T\n3 mm;clear\n", "\nend of scan\nmean;0.5\n"}, {"10 12 2025\n", "end 7 8\n"}} {
		for _, sign := range []string{";", "\t"} {
			text := around[0] + rows(20, 300, 10, "", sign+"0.5") + around[1]
			if c, _, err := ReadForeign(strings.NewReader(text), "scan.txt", points); err != nil || c.Tau.Len() != 20 {
				t.Errorf("%q: %v, %d values", around, err, c.Tau.Len())
			}
		}
	}
}

// Numbers with decimal commas in quotes may stand between commas.
func TestReadForeignQuoted(t *testing.T) {
	for name, row := range map[string]string{
		"all in quotes": "\"%g\",\"0,574\",\"0,2\"", "as needed": "%g,\"0,574\",\"0,2\"", "blanks": " \"%g\" , \"0,574\" ,\"0,2\" ", "quotes and semicolons": "\"%g\";\"0,574\";\"0,2\"",
	} {
		text := "\"wavelength_nm\",\"tau\",\"rho_front\"\n"
		if strings.Contains(row, ";") {
			text = strings.ReplaceAll(text, ",", ";")
		}
		text += foreignRows(12, 400, 10, func(nm float64) string { return fmt.Sprintf(row, nm) })
		c, _, err := ReadForeign(strings.NewReader(text), "scan.txt", Layout{DecimalComma: true})
		if err != nil || c.Tau.Len() != 12 || c.Tau.Value[11] != 0.574 || c.RhoFront.Value[0] != 0.2 || c.Tau.Last() != 510 {
			t.Errorf("%s: %v, %v", name, err, c.Tau)
		}
		if !strings.Contains(row, ";") {
			if c, _, err := ReadForeign(strings.NewReader(text), "scan.txt", Layout{DecimalComma: true, Separator: ','}); err != nil || c.Tau.Len() != 12 {
				t.Errorf("%s, with the separator: %v", name, err)
			}
		}
		_, _, err = ReadForeign(strings.NewReader(text), "scan.txt", Layout{})
		checkFaults(t, err, [][]string{{"scan.txt: 0 rows of numbers, and 12 with decimal commas, the first in line 2: add --decimal-comma"}})
	}
	for line, want := range map[string][]string{
		`a,"b,c", d `: {"a", "b,c", "d"}, `"a"b,c`: {`"a"b`, "c"}, `"a,b`: {`"a`, "b"}, `"",""`: {"", ""}, ``: {""}, `,`: {"", ""}, ` "a" `: {"a"}, `"a","b`: {"a", `"b`},
	} {
		if got := split(line, ','); !slices.Equal(got, want) {
			t.Errorf("%s is split into %q, want %q", line, got, want)
		}
	}
}

func TestUnitNamed(t *testing.T) {
	for name, want := range map[string]string{
		"nm": UnitNM, "NM": UnitNM, "um": UnitUM, "\u00b5m": UnitUM, "\u03bcm": UnitUM, "1/cm": UnitReciprocal, "cm-1": UnitReciprocal, "cm\u207b\u00b9": UnitReciprocal,
		"": "", "mm": "", "A": "", "\u00c5": "", "m": "",
	} {
		if got := UnitNamed(name); got != want {
			t.Errorf("%q is %q, want %q", name, got, want)
		}
	}
}

func TestReadForeignReaderFails(t *testing.T) {
	if _, _, err := ReadForeign(broken{}, "scan.txt", Layout{}); err == nil || err.Error() != "scan.txt: the disk is gone" {
		t.Errorf("got %v", err)
	}
	if _, _, err := ReadForeign(&endless{}, "scan.txt", Layout{}); err == nil || !strings.Contains(err.Error(), "larger than 64 MB") {
		t.Errorf("got %v", err)
	}
}

func FuzzReadForeign(f *testing.F) {
	add := func(text string, percent, comma bool, separator rune, columns, unit uint8) {
		f.Add([]byte(text), percent, comma, separator, columns, unit)
	}
	add(heron, true, true, 0, 2, 0)
	add(strings.ReplaceAll(heron, ";", "\t"), true, true, '\t', 2, 0)
	add(good(same), false, false, 0, 0, 0)
	add(good(same), false, false, ',', 0x42, 1)
	add(strings.ReplaceAll(good(same), ",", " "), true, false, ' ', 0x32, 2)
	add("400,0,10\n410,0,10\n", false, false, 0, 2, 0)
	add("400;?\n410;NaN\n", false, false, ';', 2, 2)
	f.Fuzz(func(t *testing.T, content []byte, percent, comma bool, separator rune, columns, unit uint8) {
		l := Layout{Percent: percent, DecimalComma: comma, Separator: separator, Unit: append(LayoutUnits(), "")[unit%4]}
		if tau, rho := int(columns&15), int(columns>>4); tau > 0 || rho > 0 {
			l.Columns = map[string]int{headTau: tau, headRhoBack: rho}
			maps.DeleteFunc(l.Columns, func(_ string, n int) bool { return n == 0 })
		} else {
			l.Second = headTau
		}
		c, understood, err := ReadForeign(strings.NewReader(string(content)), "scan.txt", l)
		for _, text := range understood {
			if len(text) > 500 || text == "" {
				t.Fatalf("%q is said", text)
			}
		}
		if err != nil {
			checkMessages(t, err)
			return
		}
		for _, x := range c.named() {
			if len(x.Line) != x.Len() {
				t.Fatalf("%s: %d values, %d lines", x.head, x.Len(), len(x.Line))
			}
			for i, nm := range x.NM {
				if !(nm >= 100 && nm <= 1e6) || i > 0 && !(nm > x.NM[i-1]) {
					t.Fatalf("%s: wavelengths %v", x.head, x.NM)
				}
				if v := x.Value[i]; !(v >= -Slack && v <= 1+Slack) {
					t.Fatalf("%s at %v nm is %v", x.head, nm, v)
				}
			}
		}
		Survey(c.Tau)
		Energy(c.Tau, c.RhoBack)
		checkRoundTrip(t, c)
	})
}
