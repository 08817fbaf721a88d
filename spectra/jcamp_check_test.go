package spectra

import (
	"bytes"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"
	"time"
)

func TestJCAMPRefuses(t *testing.T) {
	afterDIF := "400a5K3J12J114%\n440A234%L787K882j3%\n490G89"
	for _, tt := range []struct {
		name, text string
		want       [][]string
	}{
		// what the file says twice
		{"NPOINTS", tenPoints(tenAFFN, "= 10", "= 11"), [][]string{
			{"pane.jdx:14: 10 points up to here, ##NPOINTS= at line 10 says 11", "lost or damaged"}, {"pane.jdx:14: the line begins with x 450, ", "445"}}},
		{"NPOINTS, large", tenPoints(tenAFFN, "= 10", "= 1E7"), [][]string{
			{"pane.jdx:14: 10 points up to here, ##NPOINTS= at line 10 says 10000000; "}}},
		{"NPOINTS is no number", tenPoints(tenAFFN, "= 10", "= ten"), [][]string{{"pane.jdx:10: ##NPOINTS= \"ten\": not a finite number"}}},
		{"a line lost", tenPoints("400 -15 8\n420 120 1234\n460 5021 7903\n480 7890 7890"), [][]string{
			{"pane.jdx:16: 8 points up to here, ##NPOINTS= at line 10 says 10"}, {"pane.jdx:15: the line begins with x 460, ", " it is 440"}}},
		{"a line lost, no NPOINTS", tenPoints("400 -15 8\n420 120 1234\n460 5021 7903\n480 7890 7890", "##NPOINTS= 10", "##DELTAX= 10"), [][]string{
			{"pane.jdx:9: ##LASTX= is 90 from the first x; 8 points in steps of ##DELTAX= reach 70"}, {"pane.jdx:15: the line begins with x 460, ", "451.429"}}},
		{"a line lost, no LASTX", tenPoints("400 -15 8\n420 120 1234\n460 5021 7903\n480 7890 7890", "##LASTX= 490", "##DELTAX= 10"), [][]string{
			{"pane.jdx:16: 8 points"}, {"pane.jdx:15: the line begins with x 460, ", " it is 440"}}},
		{"a line twice", tenPoints("400 -15 8\n400 -15 8\n420 120 1234\n440 1234 1234\n460 5021 7903"), [][]string{{"pane.jdx:14: the line begins with x 400, ", " it is 420"}}},
		{"FIRSTX", tenPoints(tenAFFN, "FIRSTX= 400", "FIRSTX= 390"), [][]string{{"pane.jdx:13: the line begins with x 400, ", " it is 390"}}},
		{"LASTX by the lines", tenPoints(tenAFFN, "490", "510"), [][]string{{"pane.jdx:14: the line begins with x 450, ", " it is 461.111"}}},
		{"LASTX by DELTAX", tenPoints("400 -15 8 120 1234 1234 1234 5021 7903 7890 7890", "##LASTX= 490", "##LASTX= 500\n##DELTAX= 10"), [][]string{
			{"pane.jdx:9: ##LASTX= is 100 from the first x; 10 points in steps of ##DELTAX= reach 90"}}},
		{"x of a line", tenPoints(tenAFFN, "450 1234", "455 1234"), [][]string{{"pane.jdx:14: the line begins with x 455, ", " it is 450"}}},
		{"XFACTOR", tenPoints(tenAFFN, "XFACTOR= 1", "XFACTOR= 10"), [][]string{{"pane.jdx:13: the line begins with x 4000, ", " it is 400"}}},
		{"FIRSTY", tenPoints(tenAFFN, "FIRSTY= -0.0015", "FIRSTY= -0.0016"), [][]string{{"pane.jdx:13: the first ordinate, times ##YFACTOR=, is -0.0015; ##FIRSTY= at line 11 says -0.0016"}}},
		{"YFACTOR", tenPoints(tenAFFN, "YFACTOR= 0.0001", "YFACTOR= 0.00001"), [][]string{{"pane.jdx:13: the first ordinate, times ##YFACTOR=, is -0.00015; ##FIRSTY= at line 11"}}},
		{"a factor of 0", tenPoints(tenAFFN, "YFACTOR= 0.0001", "YFACTOR= 0"), [][]string{{"pane.jdx:7: ##YFACTOR= is 0"}}},
		{"check ordinate", tenPoints(strings.Replace(tenDIF, "A234%", "A235%", 1)), [][]string{
			{"pane.jdx:14: the line begins with the ordinate 1235, the differences (DIF) of the line before led to 1234", "lost or damaged"},
			{"pane.jdx:15: the line begins with the ordinate 7890, ", " 7891"}}},
		{"last check ordinate", tenPoints(afterDIF + "1"), [][]string{{"pane.jdx:15: the line begins with the ordinate 7891, ", " 7890"}}},
		{"no check ordinate", tenPoints("400a5K3J12J114%\n440%L787K882j3%"), [][]string{{"pane.jdx:14: the line begins without the ordinate 1234"}}},
		{"missing check ordinate", tenPoints("400a5K3J12J114%\n440?L787K882j3%"), [][]string{{"pane.jdx:14: the line begins without the ordinate 1234"}}},
		{"a label twice", tenPoints(tenAFFN, "##FIRSTY", "##LASTX= 491\n##FIRSTY"), [][]string{{"pane.jdx:11: ##LASTX= stands at line 9 as well"}}},

		// what is no table
		{"difference after nothing", tenPoints("400K5"), [][]string{{"pane.jdx:13: a difference (DIF) without an ordinate"}}},
		{"difference after missing", tenPoints("400 12?K5"), [][]string{{"pane.jdx:13: a difference (DIF) without an ordinate"}}},
		{"repetition of nothing", tenPoints("400T"), [][]string{{"pane.jdx:13: a repetition (DUP) without an ordinate"}}},
		{"repetition of the line before", tenPoints("400A\n410T"), [][]string{{"pane.jdx:14: a repetition (DUP) without an ordinate"}}},
		{"repetition of a repetition", tenPoints("400ATT"), [][]string{{"pane.jdx:13: a repetition (DUP) without an ordinate"}}},
		{"a letter that means nothing", tenPoints("400 12 13x14"), [][]string{{"pane.jdx:13: \"x14\": not an ordinate in AFFN, PAC, SQZ, DIF or DUP form"}}},
		{"a sign alone", tenPoints("400 12 +"), [][]string{{"pane.jdx:13: \"+\": not an ordinate"}}},
		{"two points", tenPoints("400 12 1.2.3"), [][]string{{"pane.jdx:13: \".3\": not an ordinate"}}},
		{"a number after a packed one", tenPoints("400A12.5"), [][]string{{"pane.jdx:13: \".5\": not an ordinate"}}},
		{"two commas", tenPoints("400 12,,13"), [][]string{{"pane.jdx:13: nothing between two commas", "?"}}},
		{"no x", tenPoints("A12A13"), [][]string{{"pane.jdx:13: \"A12A13\": a line of the table begins with x"}}},
		{"x alone", tenPoints(tenAFFN + "\n490"), [][]string{{"pane.jdx:15: x 490 without an ordinate"}}},
		{"a label without equals sign", tenPoints(tenAFFN + "\n##PAGE"), [][]string{{"pane.jdx:15: \"##PAGE\": a line of the table begins with x"}}},
		{"an ordinate too large", tenPoints("400A999999999999999K"), [][]string{{"pane.jdx:13: an ordinate of 2e+15"}}},
		{"digits without end", tenPoints("400A" + strings.Repeat("9", 1000)), [][]string{{"pane.jdx:13: an ordinate of +Inf"}}},
		{"differences without end", tenPoints("400A%R99999999999999s9999"), [][]string{{"pane.jdx:13: an ordinate of 1e+20"}}},
		{"another form", tenPoints(tenAFFN, "(X++(Y..Y))", "(Y..Y)"), [][]string{{"pane.jdx:12: ##XYDATA= \"(Y..Y)\": a table is (X++(Y..Y)) or (XY..XY)"}}},
		{"no form", tenPoints("", "(X++(Y..Y))", ""), [][]string{{"pane.jdx:12: ##XYDATA= without (X++(Y..Y))"}}},
		{"no points", tenPoints(""), [][]string{{"pane.jdx:12: ##XYDATA= holds no points"}}},
		{"two tables", tenPoints(tenAFFN + "\n##XYPOINTS= (XY..XY)\n400 1"), [][]string{{"pane.jdx:15: a second table of points", "line 12"}}},
		{"pairs: no ordinate", tenPoints(tenPairs+" 500", "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:16: the last x has no ordinate"}}},
		{"pairs: missing x", tenPoints("? 400", "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:13: \"? 400\": not a number"}}},
		{"pairs: packed", tenPoints("400-15", "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:13: \"-15\": not a number"}}},
		{"pairs: two semicolons", tenPoints("400 15;; 410 8", "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:13: nothing between"}}},
		{"pairs: to and fro", tenPoints(strings.Replace(tenPairs, "460 5021", "445 5021", 1), "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:14: at 445 nm: x must ascend or descend throughout", "450"}}},
		{"pairs: twice", tenPoints(strings.Replace(tenPairs, "460 5021", "450 5021", 1), "(X++(Y..Y))", "(XY..XY)"), [][]string{{"pane.jdx:14: at 450 nm: this wavelength stands twice"}}},
		{"pairs: LASTX", tenPoints(tenPairs, "(X++(Y..Y))", "(XY..XY)", "LASTX= 490", "LASTX= 500"), [][]string{{"pane.jdx:16: x 490, ##LASTX= at line 9 says 500"}}},
		{"pairs: FIRSTX", tenPoints(tenPairs, "(X++(Y..Y))", "(XY..XY)", "FIRSTX= 400", "FIRSTX= 401"), [][]string{{"pane.jdx:13: x 400, ##FIRSTX= at line 8 says 401"}}},
		{"pairs: NPOINTS", tenPoints(tenPairs, "(X++(Y..Y))", "(XY..XY)", "= 10", "= 9"), [][]string{{"pane.jdx:16: 10 points up to here, ##NPOINTS= at line 10 says 9"}}},

		// what is no spectrum of a pane
		{"no XUNITS", tenPoints(tenAFFN, "##XUNITS= NANOMETERS", ""), [][]string{{"pane.jdx:1: the block has no ##XUNITS="}}},
		{"no YUNITS", tenPoints(tenAFFN, "##YUNITS= TRANSMITTANCE", "##YUNITS="), [][]string{{"pane.jdx:1: the block has no ##YUNITS="}}},
		{"neither NPOINTS nor LASTX", tenPoints(tenAFFN, "##LASTX= 490", "##DELTAX= 10", "##NPOINTS= 10", ""), [][]string{{"pane.jdx:12: ##NPOINTS= and ##LASTX= must be there", "##DELTAX="}}},
		{"no step", tenPoints(tenAFFN, "##LASTX= 490", ""), [][]string{{"pane.jdx:12: ##NPOINTS= and ##LASTX= must be there"}}},
		{"x stands still", tenPoints("400 1 2 3 4 5 6 7 8 9 10", "LASTX= 490", "LASTX= 400", "-0.0015", "0.0001"), [][]string{{"pane.jdx:12: x goes from 400 to 400"}}},
		{"hertz", tenPoints(tenAFFN, "NANOMETERS", "HZ"), [][]string{{"pane.jdx:4: has x in \"HZ\"; an optical spectrum has nm, µm or 1/cm"}}},
		{"Kubelka-Munk", tenPoints(tenAFFN, "TRANSMITTANCE", "KUBELKA-MUNK"), [][]string{{"pane.jdx:5: has ordinates in \"KUBELKA-MUNK\"", "TRANSMITTANCE or REFLECTANCE", "ABSORBANCE"}}},
		{"NMR", tenPoints(tenAFFN, "UV/VIS SPECTRUM", "NMR SPECTRUM", "##XUNITS= NANOMETERS", ""), [][]string{{"pane.jdx:3: holds \"NMR SPECTRUM\"", "transmittance, reflectance or absorbance over wavelength"}}},
		{"Raman", tenPoints(tenAFFN, "UV/VIS SPECTRUM", "RAMAN SPECTRUM"), [][]string{{"pane.jdx:3: holds \"RAMAN SPECTRUM\""}}},
		{"mass spectrum", tenPoints(tenPairs, "UV/VIS SPECTRUM", "MASS SPECTRUM", "##XYDATA= (X++(Y..Y))", "##PEAK TABLE= (XY..XY)"), [][]string{{"pane.jdx:3: holds \"MASS SPECTRUM\""}}},
		{"peak table", tenPoints(tenPairs, "##XYDATA= (X++(Y..Y))", "##PEAK TABLE= (XY..XY)"), [][]string{{"pane.jdx:1: holds a peak table and no curve", "##XYDATA="}}},
		{"peak table by its class", tenPoints("", "##XYDATA= (X++(Y..Y))", "##DATA CLASS= PEAK TABLE"), [][]string{{"pane.jdx:1: holds peaks and no curve"}}},
		{"peak assignments", tenPoints("(400, 1, <line>)", "##XYDATA= (X++(Y..Y))", "##PEAK ASSIGNMENTS= (XYA)"), [][]string{{"pane.jdx:1: holds peak assignments and no curve"}}},
		{"peaks of width", tenPoints("400 1 2", "(X++(Y..Y))", "(XYW..XYW)"), [][]string{{"pane.jdx:1: holds peaks and no curve"}}},
		{"NTUPLES", tenPoints("##PAGE= T=0\n##DATA TABLE= (X++(Y..Y)), XYDATA\n"+tenAFFN+"\n##END NTUPLES= A", "##XYDATA= (X++(Y..Y))", "##NTUPLES= A\n##SYMBOL= X, Y, T"), [][]string{{"pane.jdx:1: holds NTUPLES, tables of several variables in pages", "##XYDATA="}}},
		{"NTUPLES by the class", tenPoints(tenAFFN, "##XFACTOR= 1", "##DATA CLASS= NTUPLES"), [][]string{{"pane.jdx:1: holds NTUPLES"}}},
		{"complex data", tenPoints(tenAFFN, "(X++(Y..Y))", "(X++(R..R))"), [][]string{{"pane.jdx:1: holds complex data"}}},
		{"interferogram", tenPoints(tenAFFN, "##XYDATA= (X++(Y..Y))", "##RADATA= (R++(A..A))"), [][]string{{"pane.jdx:1: holds an interferogram"}}},
		{"structure", "##TITLE= a\n##JCAMP-CS= 3.7\n##MOLFORM= SiO2\n##END=\n", [][]string{{"pane.jdx:1: holds a chemical structure"}}},
		{"words alone", "##TITLE= a\n##NAMES= soda-lime glass\n##END=\n", [][]string{{"pane.jdx:1: holds no table of points", "##XYDATA="}}},
		{"a link without blocks", "##TITLE= a\n##DATA TYPE= LINK\n##BLOCKS= 0\n##END=\n", [][]string{{"pane.jdx: no block with a spectrum in it"}}},
		{"two blocks of no use", tenPoints(tenAFFN, "NANOMETERS", "HZ") + tenPoints(tenAFFN, "UV/VIS", "MASS"), [][]string{{"pane.jdx:4: has x in \"HZ\""}, {"pane.jdx:18: holds \"MASS SPECTRUM\""}}},

		// values
		{"per cent", tenPoints(tenAFFN, "0.0001", "0.01", "-0.0015", "-0.15"), [][]string{
			{"pane.jdx:13: at 400 nm: transmittance -0.15: not in 0..1"}, {"pane.jdx:13: at 420 nm: transmittance 1.2: not in 0..1; per cent?", "##YUNITS= must say so, as % TRANSMITTANCE; 8 faults like this, the last in line 14 at 490 nm"}}},
		{"0.0021 below", tenPoints(strings.Replace(tenAFFN, "-15", "-21", 1), "-0.0015", "-0.0021"), [][]string{{"pane.jdx:13: at 400 nm: transmittance -0.0021: not in 0..1"}}},
		{"0.0021 above", tenPoints(strings.Replace(tenAFFN, "5021", "10021", 1)), [][]string{{"pane.jdx:14: at 460 nm: transmittance 1.0021: not in 0..1"}}},
		{"per cent above 100", tenPoints(strings.Replace(tenAFFN, "5021", "10021", 1), "TRANSMITTANCE", "% REFLECTANCE", "0.0001", "0.01", "-0.0015", "-0.15"), [][]string{{"pane.jdx:14: at 460 nm: reflectance 100.21 %: not in 0..100"}}},
		// 10^0.15 = 1.41254 (tables of logarithms)
		{"absorbance below 0", tenPoints(strings.Replace(tenAFFN, "-15", "-1500", 1), "TRANSMITTANCE", "ABSORBANCE", "-0.0015", "-0.15"), [][]string{{"pane.jdx:13: at 400 nm: absorbance -0.15: a transmittance of 1.41254, not in 0..1"}}},
		{"nine points", tenPoints("400 -15 8 120 1234 1234 1234 5021 7903 7890", "= 10", "= 9", "490", "480"), [][]string{{"pane.jdx:12: 9 points; a spectrum has at least 10"}}},
		{"nine known points", tenPoints("400 -15 8 120 1234 1234 1234 5021 ? 7890 7890"), [][]string{{"pane.jdx:12: 9 points; a spectrum has at least 10"}}},
		{"wavenumber 0", tenPoints("-40 -15 8 120 1234 1234\n10 1234 5021 7903 7890 7890", "NANOMETERS", "1/CM", "X= 400", "X= -40", "X= 490", "X= 50"), [][]string{{"pane.jdx:13: x is -40 1/cm; it must be above 0"}}},
		{"µm called nm", tenPoints("0.400 -15 8 120 1234 1234\n0.450 1234 5021 7903 7890 7890", "X= 400", "X= 0.4", "X= 490", "X= 0.49"), [][]string{{"pane.jdx:12: the last wavelength is 0.49 nm; µm?", "MICROMETERS"}}},
		{"nm called µm", tenPoints(tenAFFN, "NANOMETERS", "MICROMETERS"), [][]string{{"pane.jdx:12: the first wavelength is 400 µm; nm?", "NANOMETERS"}}},
		{"two blocks at fault, both said", tenPoints(tenAFFN, "= 10", "= ten") + tenPoints(tenAFFN, "= 10", "= 9.5e"), [][]string{{"pane.jdx:10: ##NPOINTS="}, {"pane.jdx:25: ##NPOINTS="}}},

		// files
		{"empty", "", [][]string{{"pane.jdx: empty; JCAMP-DX begins with ##TITLE="}}},
		{"comments alone", "$$ nothing\n\n", [][]string{{"pane.jdx: empty"}}},
		{"CSV", "wavelength_nm,tau\n300,0.1\n", [][]string{{"pane.jdx:1: not JCAMP-DX, which begins with ##TITLE="}}},
		{"UTF-16", "\xff\xfe#\x00#\x00", [][]string{{"pane.jdx: is UTF-16; save it as UTF-8"}}},
		{"binary", "PK\x03\x04\x00\x00\x08", [][]string{{"pane.jdx:1: is binary, or UTF-16"}}},
		{"END alone", "##END=\n", [][]string{{"pane.jdx:1: ##END= of a block that did not begin"}}},
		{"a block not ended before the next", strings.Replace(tenPoints(tenAFFN), "##END=\n", "", 1) + tenPoints(tenAFFN), [][]string{{"pane.jdx:15: ##TITLE= of another block before ##END= of the one begun at line 1", "cut?"}}},
		{"text after the end", tenPoints(tenAFFN) + "450A234E021\n", [][]string{{"pane.jdx:16: \"450A234E021\" after the end of the last block"}}},
		{"control characters", tenPoints("400 12 \x1b[31m"), [][]string{{"pane.jdx:13: ", "[31m", "not an ordinate"}}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			blocks, err := ReadJCAMP(strings.NewReader(tt.text), "pane.jdx")
			checkFaults(t, err, tt.want)
			if blocks != nil {
				t.Errorf("%d blocks beside an error", len(blocks))
			}
		})
	}
}

func TestJCAMPAcceptsWithout(t *testing.T) {
	plain, err := ReadJCAMP(strings.NewReader(tenPoints(tenAFFN)), "pane.jdx")
	if err != nil {
		t.Fatal(err)
	}
	for name, changes := range map[string][]string{
		"FIRSTX":                     {"##FIRSTX= 400", ""},
		"LASTX, with DELTAX":         {"##LASTX= 490", "##DELTAX= 10"},
		"NPOINTS, with DELTAX":       {"##NPOINTS= 10", "##DELTAX= 10"},
		"FIRSTY":                     {"##FIRSTY= -0.0015", ""},
		"factor of x":                {"##XFACTOR= 1", ""},
		"a sign of DELTAX":           {"##XFACTOR= 1", "##DELTAX= -10"},
		"labels in capitals":         {"##LASTX", "##last x", "##XYDATA", "##xy_data"},
		"values on the label's line": {"= 490", "=\n\n 490"},
		"exact x of lines":           {"450 1234", "450.4 1234"},
		"labels before the table":    {"##XYDATA", "##$OWN= 1\n##COMMENTS= of several\n ## lines\n##END OF RUN= 5\n##XYDATA"},
	} {
		blocks, err := ReadJCAMP(strings.NewReader(tenPoints(tenAFFN, changes...)), "pane.jdx")
		if err != nil {
			t.Errorf("%s: %v", name, err)
		} else if !reflect.DeepEqual(blocks[0].Curve, plain[0].Curve) {
			t.Errorf("%s: %v, want %v", name, blocks[0].Curve, plain[0].Curve)
		}
	}
}

func TestJCAMPNotes(t *testing.T) {
	for _, tt := range []struct {
		changes []string
		want    string
	}{
		{[]string{"##FIRSTY= -0.0015", "##FIRSTY= -15"}, "##FIRSTY= is the first ordinate without ##YFACTOR="},
		{[]string{"##FIRSTY", "##MAXY= 0.79\n##MINY= -0.0015\n##MAXX= 490\n##MINX= 400\n##FIRSTY"}, ""},
		{[]string{"##FIRSTY", "##MAXY= 0.85\n##FIRSTY"}, "##MAXY= says 0.85, the points have 0.7903"},
		{[]string{"##FIRSTY", "##MINX= 300\n##FIRSTY"}, "##MINX= says 300, the points have 400"},
		{[]string{"##FIRSTY", "##DELTAX= 10\n##FIRSTY"}, ""},
		{[]string{"##FIRSTY", "##DELTAX= -10\n##FIRSTY"}, "##DELTAX= says -10, but x goes from 400 to 490; its sign was passed over"},
	} {
		blocks, err := ReadJCAMP(strings.NewReader(tenPoints(tenAFFN, tt.changes...)), "pane.jdx")
		if err != nil {
			t.Error(err)
		} else if got := strings.Join(blocks[0].Notes[1:], "; "); got != tt.want {
			t.Errorf("notes %q, want %q", got, tt.want)
		}
	}
	blocks, err := ReadJCAMP(strings.NewReader(tenPoints(tenPairs, "(X++(Y..Y))", "(XY..XY)", "##NPOINTS= 10", "")), "pane.jdx")
	if err != nil || !strings.HasPrefix(blocks[0].Notes[1], "no ##NPOINTS=") {
		t.Errorf("%v, %v", blocks, err)
	}
	blocks, err = ReadJCAMP(strings.NewReader(tenPoints(tenAFFN, "ten points (invented)", "Gr\xfcnes\x1b Glas \n 6 mm"+strings.Repeat("m", 500))), "pane.jdx")
	if err != nil || !strings.HasPrefix(blocks[0].Title, "Grünes� Glas 6 mmm") || len([]rune(blocks[0].Title)) > maxTitle+1 {
		t.Errorf("%v, %v", blocks, err)
	}
}

func TestJCAMPBlocks(t *testing.T) {
	tau, rho := tenPoints(tenDIF, "ten points", "tau"), tenPoints(tenPAC, "ten points", "rho", "TRANSMITTANCE", "REFLECTANCE")
	link := func(count int, blocks ...string) string {
		return fmt.Sprintf("##TITLE= both\n##DATA TYPE= LINK\n##BLOCKS= %d\n", count) + strings.Join(blocks, "") + "##END=\n"
	}
	structure := "##TITLE= a molecule\n##JCAMP-CS= 3.7\n##MOLFORM= SiO2\n##END=\n"
	nmr := tenPoints("400 x y z", "UV/VIS SPECTRUM", "NMR SPECTRUM", "NANOMETERS", "HZ")
	for _, tt := range []struct {
		name, text string
		want       []string // titles, and notes of the first beyond the form of its table
	}{
		{"one after another", tau + "\n$$ and\n" + rho, []string{"tau", "rho"}},
		{"linked", link(2, tau, rho), []string{"tau", "rho"}},
		{"linked, the outer one counted", link(3, tau, rho), []string{"tau", "rho"}},
		{"linked in a link", link(3, structure, link(2, tau, nmr), rho), []string{"tau", "rho",
			"the block at line 4 was passed over: it holds a chemical structure; a spectrum of a pane is transmittance, reflectance or absorbance over wavelength",
			"the block at line 27 was passed over: it holds \"NMR SPECTRUM\"; a spectrum of a pane is transmittance, reflectance or absorbance over wavelength"}},
		{"linked without a type", strings.Replace(link(2, tau, rho), "##DATA TYPE= LINK\n", "", 1), []string{"tau", "rho"}},
		{"a block less", link(4, tau, rho), []string{"tau", "rho", "##BLOCKS= at line 3 says 4, there are 2"}},
		{"without titles", strings.ReplaceAll(tau+rho, "##TITLE", "##ORIGIN"), []string{"", ""}},
		{"old end of file", tau + "\x1a", []string{"tau"}},
		{"one END more", tau + "##END=\n" + rho, []string{"tau", "rho"}},
		{"a peak table beside the curve", strings.Replace(tau, "##END=", "##PEAK TABLE= (XY..XY)\n460, 0.5\n##END=", 1), []string{"tau"}},
	} {
		blocks, err := ReadJCAMP(strings.NewReader(tt.text), "pane.jdx")
		if err != nil {
			t.Errorf("%s: %v", tt.name, err)
			continue
		}
		var got []string
		for _, b := range blocks {
			if b.Len() != 10 || b.Value[6] != 0.5021 {
				t.Errorf("%s: read as %+v", tt.name, b)
			}
			got = append(got, strings.TrimSuffix(b.Title, " (invented)"))
		}
		if got = append(got, blocks[0].Notes[1:]...); !slices.Equal(got, tt.want) {
			t.Errorf("%s:\n got %q\nwant %q", tt.name, got, tt.want)
		}
	}
	many := strings.Repeat(structure, 8) + tau
	if blocks, err := ReadJCAMP(strings.NewReader(many), "pane.jdx"); err != nil || len(blocks[0].Notes) != 7 || blocks[0].Notes[6] != "3 more blocks were passed over" {
		t.Errorf("%v, %v", blocks, err)
	}
}

// A file that is cut anywhere is an error, or nothing of it is lost.
func TestJCAMPCut(t *testing.T) {
	samples, err := filepath.Glob("testdata/jcamp/*.jdx")
	if err != nil || len(samples) < 10 {
		t.Fatalf("%d samples, %v", len(samples), err)
	}
	for _, path := range samples {
		content, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		whole, err := ReadJCAMP(bytes.NewReader(content), "pane.jdx")
		if err != nil {
			t.Fatal(err)
		}
		for n := range content {
			blocks, err := ReadJCAMP(bytes.NewReader(content[:n]), "pane.jdx")
			switch {
			case err == nil && !reflect.DeepEqual(blocks, whole):
				t.Errorf("%s: the first %d bytes of %d are read as %d spectra without an error", path, n, len(content), len(blocks))
			case err == nil && n < len(content)-1:
				t.Errorf("%s: the first %d bytes of %d are read in full", path, n, len(content))
			case err != nil && n > 8 && !strings.Contains(err.Error(), "cut"):
				t.Errorf("%s: the first %d bytes: %v", path, n, err)
			}
		}
		// A line that is lost from a table is an error as well.
		lines := strings.SplitAfter(string(content), "\n")
		for i, line := range lines {
			if line == "" || !strings.Contains("0123456789", line[:1]) || strings.Contains(line, ", 0.2\n") || strings.Contains(line, ", 0.4\n") {
				continue
			}
			rest := strings.Join(slices.Delete(slices.Clone(lines), i, i+1), "")
			blocks, err := ReadJCAMP(strings.NewReader(rest), "pane.jdx")
			if err == nil && (len(blocks) != len(whole) || !slices.Equal(blocks[0].Value, whole[0].Value)) {
				t.Errorf("%s: without line %d there is no error", path, i+1)
			}
		}
	}
}

// In DIF form any one letter that is lost or changed is an error, unless it changes nothing: the
// number of points, ##FIRSTY= and the check ordinates see it.
func TestJCAMPDamaged(t *testing.T) {
	for _, table := range []string{tenDIF, tenDIFDUP} {
		whole, err := ReadJCAMP(strings.NewReader(tenPoints(table)), "pane.jdx")
		if err != nil {
			t.Fatal(err)
		}
		for i := range table {
			damaged := []string{table[:i] + table[i+1:]}
			for c := byte(' '); c < 0x7f; c++ {
				damaged = append(damaged, table[:i]+string(c)+table[i+1:])
			}
			for _, d := range damaged {
				blocks, err := ReadJCAMP(strings.NewReader(tenPoints(d)), "pane.jdx")
				if err == nil && !reflect.DeepEqual(blocks[0].Curve, whole[0].Curve) {
					t.Errorf("read as %v without an error:\n%s", blocks[0].Curve, d)
				}
			}
		}
	}
}

func TestJCAMPBounds(t *testing.T) {
	line := func(n int) string { return "400" + strings.Repeat("A", n) + "\n" }
	for _, tt := range []struct {
		name string
		in   io.Reader
		want []string
	}{
		{"a repetition without end", strings.NewReader(tenPoints("400AS999999999")), []string{"pane.jdx:13: an ordinate 1999999999 times in all; a table has at most 1000000 points"}},
		{"of more digits than fit", strings.NewReader(tenPoints("400AS" + strings.Repeat("9", 400))), []string{"pane.jdx:13: an ordinate +Inf times"}},
		{"many repetitions", strings.NewReader(tenPoints("400" + strings.Repeat("As", 200_000))), []string{"pane.jdx:13: an ordinate 9 times in all"}},
		{"ten million points", strings.NewReader(tenPoints(strings.Repeat(line(1000), 10_000))), []string{"pane.jdx:1013: more than 1000000 points; a spectrum of a pane needs some hundred: export it in wider steps"}},
		{"ten million lines of checks", strings.NewReader(tenPoints("400AJ\n" + strings.Repeat("400B%\n", 2_000_000))), []string{"pane.jdx:1000012: more than 1000000 points"}},
		{"ten million pairs", strings.NewReader(tenPoints(strings.Repeat("400 1\n", 2_000_000), "(X++(Y..Y))", "(XY..XY)")), []string{"pane.jdx:1000013: more than 1000000 points"}},
		{"three blocks", strings.NewReader(strings.Repeat(tenPoints("400A00s00000", "= 10", "= 900000", "-0.0015", "0.01"), 3)), []string{"pane.jdx:41: an ordinate 900000 times in all; a table has at most 200000 points"}},
		{"a thousand blocks and more", strings.NewReader(strings.Repeat("##TITLE=\n##END=\n", 1001)), []string{"pane.jdx:2001: more than 1000 blocks"}},
		{"blocks in blocks", strings.NewReader(strings.Repeat("##TITLE=\n##DATA TYPE=LINK\n", 100)), []string{"pane.jdx:17: more than 1000 blocks, or more than 8 in one another"}},
		{"a long line", strings.NewReader(tenPoints(line(2_000_000))), []string{"pane.jdx:13: a line of more than 1048576 bytes"}},
		{"text without end", io.MultiReader(strings.NewReader("##TITLE= a\n"), &endless{}), []string{"pane.jdx: larger than 64 MB"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			start := time.Now()
			_, err := ReadJCAMP(tt.in, "pane.jdx")
			checkFaults(t, err, [][]string{tt.want})
			if d := time.Since(start); d > 5*time.Second {
				t.Errorf("took %v", d)
			}
		})
	}
	if _, err := ReadJCAMP(broken{}, "pane.jdx"); err == nil || err.Error() != "pane.jdx: the disk is gone" {
		t.Errorf("got %v", err)
	}
	// Faults of one kind are counted.
	_, err := ReadJCAMP(strings.NewReader(tenPoints(strings.Repeat("400 30000\n", 100), "= 10", "= 100", "490", "400.5", "##FIRSTY= -0.0015", "")), "pane.jdx")
	checkFaults(t, err, [][]string{{"pane.jdx:13: at 400 nm: transmittance 3: not in 0..1; per cent?", "100 faults like this, the last in line 112 at 400.5 nm"}})
	// Blocks at fault are told up to a bound.
	_, err = ReadJCAMP(strings.NewReader(strings.Repeat(tenPoints(tenAFFN, "= 10", "= ten"), 100)), "pane.jdx")
	if faults, ok := err.(Errors); !ok || len(faults) != maxBlockFaults {
		t.Errorf("%v", err)
	}
}

// A table that lacks every other ordinate is refused, and quickly.
func TestJCAMPOfGaps(t *testing.T) {
	var b strings.Builder
	n := 4 * maxGaps
	for i := range n {
		fmt.Fprintf(&b, "%d, %s\n", 300+i, []string{"0.5", "?"}[i%2])
	}
	text := "##TITLE= holes\n##DATA TYPE= UV/VIS SPECTRUM\n##XUNITS= NM\n##YUNITS= TRANSMITTANCE\n##XYPOINTS= (XY..XY)\n" + b.String() + "##END=\n"
	_, err := ReadJCAMP(strings.NewReader(text), "holes.jdx")
	if err == nil || !strings.Contains(err.Error(), "missing (?) in more than 1000 places") {
		t.Errorf("%v", err)
	}
}
