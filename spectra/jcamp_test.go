package spectra

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

// tenPoints returns a file with the labels of a spectrum of ten points in lines 1 to 12 and the
// lines of its table from line 13 on. Each change replaces a text by the next.
func tenPoints(table string, changes ...string) string {
	head := `##TITLE= ten points (invented)
##JCAMP-DX= 4.24
##DATA TYPE= UV/VIS SPECTRUM
##XUNITS= NANOMETERS
##YUNITS= TRANSMITTANCE
##XFACTOR= 1
##YFACTOR= 0.0001
##FIRSTX= 400
##LASTX= 490
##NPOINTS= 10
##FIRSTY= -0.0015
##XYDATA= (X++(Y..Y))
`
	return strings.NewReplacer(changes...).Replace(head + table + "\n##END=\n")
}

// The tables of testdata/jcamp, coded by hand from these ordinates and decoded by hand below.
var tenOrdinates = []float64{-15, 8, 120, 1234, 1234, 1234, 5021, 7903, 7890, 7890}

const (
	tenAFFN = "400 -15 8 120 1234 1234\n450 1234, 5021, 7903, 7890, 7890"
	// A sign parts an ordinate from the one before.
	tenPAC = "400-15+8+120+1234+1234\n450+1234+5021+7903+7890+7890"
	// a5 = -15, H = 8, A20 = 120, A234 = 1234, E021 = 5021, G903 = 7903, G890 = 7890
	tenSQZ = "400a5HA20A234A234\n450A234E021G903G890G890"
	// A234 and U: 1234 stands 3 times in all; G890 and T: 7890 stands twice. The second line begins
	// with x 460 and the digit 5 of SQZ form, not with 460 times a power of ten.
	tenSQZDUP = "400a5HA20A234U\n460E021G903G890T"
	// a5 = -15, K3 = +23: 8, J12 = +112: 120, J114 = +1114: 1234, % = 0: 1234.
	// A234 = 1234 is the check, at x of the last point. % = 0: 1234, L787 = +3787: 5021,
	// K882 = +2882: 7903, j3 = -13: 7890, % = 0: 7890. The last line is a check alone.
	tenDIF = "400a5K3J12J114%\n440A234%L787K882j3%\n490G890"
	// As before, but % and T: the difference 0 stands twice, 1234, 1234.
	tenDIFDUP = "400a5K3J12J114%T\n450A234L787K882j3%\n490G890"
	tenPairs  = "400,-15;410,8;420,120;430,1234;440,1234\n450 1234 460 5021\n470\t7903, 480 7890 490\n7890"
)

func TestJCAMPForms(t *testing.T) {
	for _, tt := range []struct{ name, table, shape string }{
		{"AFFN", tenAFFN, "(X++(Y..Y)) in AFFN form"},
		{"AFFN, other numbers", "4.0E+02 -1.5E1 +8. 120.0 .1234E+04 1234e+0\n450.0 12340E-01 5021 7903 7890 7890", "(X++(Y..Y)) in AFFN form"},
		{"AFFN, an ordinate a line", "400 -15\n410 8\n420 120\n430 1234\n440 1234\n450 1234\n460 5021\n470 7903\n480 7890\n490 7890", "(X++(Y..Y)) in AFFN form"},
		{"PAC", tenPAC, "(X++(Y..Y)) in PAC form"},
		{"SQZ", tenSQZ, "(X++(Y..Y)) in SQZ form"},
		{"SQZ and DUP", tenSQZDUP, "(X++(Y..Y)) in SQZ with DUP form"},
		{"AFFN and DUP", "400 -15 8 120 1234 U\n460 5021 7903 7890T", "(X++(Y..Y)) in AFFN with DUP form"},
		{"DIF", tenDIF, "(X++(Y..Y)) in DIF form"},
		{"DIF without the last check", strings.TrimSuffix(tenDIF, "\n490G890"), "(X++(Y..Y)) in DIF form"},
		{"DIF, x of the first new ordinate", strings.NewReplacer("\n440", "\n450").Replace(tenDIF), "(X++(Y..Y)) in DIF form"},
		{"DIF and DUP", tenDIFDUP, "(X++(Y..Y)) in DIF with DUP form"},
		// A234T: the check stands twice in all, so once more.
		{"a check that is repeated", "400a5K3J12J114\n430A234U\n460E021K882j3%", "(X++(Y..Y)) in DIF with DUP form"},
		{"mixed", "400-15HA20J114%T\n450A234 5021G903j3S\n480G890T", "(X++(Y..Y)) in DIF with DUP form"},
		{"comments, blanks, blank lines", "400a5 HA20  A234U $$ four\n\n$$ 450A\n 460\tE021G903G890T\t\n", "(X++(Y..Y)) in SQZ with DUP form"},
		{"pairs", tenPairs, "(XY..XY)"},
	} {
		changes := []string{}
		if tt.shape == "(XY..XY)" {
			changes = []string{"##XYDATA= (X++(Y..Y))", "##XYPOINTS=(XY..XY)"}
		}
		blocks, err := ReadJCAMP(strings.NewReader(tenPoints(tt.table, changes...)), "pane.jdx")
		if err != nil {
			t.Errorf("%s: %v", tt.name, err)
			continue
		}
		b := blocks[0]
		if len(blocks) != 1 || b.Title != "ten points (invented)" || b.Quantity != Transmittance || b.File != "pane.jdx" || len(b.Gaps) > 0 {
			t.Errorf("%s: read as %+v", tt.name, blocks)
		}
		if want := []string{"table " + tt.shape}; !slices.Equal(b.Notes, want) {
			t.Errorf("%s: notes %q, want %q", tt.name, b.Notes, want)
		}
		if b.Len() != 10 || len(b.Value) != 10 || len(b.Line) != 10 {
			t.Errorf("%s: %d wavelengths, %d values, %d lines", tt.name, b.Len(), len(b.Value), len(b.Line))
			continue
		}
		for i, y := range tenOrdinates {
			if b.NM[i] != float64(400+10*i) || b.Value[i] != y/10000 {
				t.Errorf("%s: point %d is %v at %v nm, want %v at %d", tt.name, i, b.Value[i], b.NM[i], y/10000, 400+10*i)
			}
		}
	}
}

func TestJCAMPLines(t *testing.T) {
	blocks, err := ReadJCAMP(strings.NewReader(tenPoints(tenDIF)), "pane.jdx")
	if err != nil {
		t.Fatal(err)
	}
	if want := []int{13, 13, 13, 13, 13, 14, 14, 14, 14, 14}; !slices.Equal(blocks[0].Line, want) {
		t.Errorf("lines %v, want %v", blocks[0].Line, want)
	}
	for name, ends := range map[string]string{"CR": "\r", "CRLF": "\r\n"} {
		again, err := ReadJCAMP(strings.NewReader("\ufeff"+strings.ReplaceAll(tenPoints(tenDIF), "\n", ends)), "pane.jdx")
		if err != nil || !slices.Equal(again[0].Line, blocks[0].Line) || !slices.Equal(again[0].Value, blocks[0].Value) {
			t.Errorf("%s: %v, %v", name, again, err)
		}
	}
}

// A repetition after a difference repeats the difference. By hand: A00 = 100, K5 = +25 and Z: 8
// times in all, so 125 to 300 in steps of 25; j0 = -10: 290.
func TestJCAMPRepeatedDifference(t *testing.T) {
	blocks, err := ReadJCAMP(strings.NewReader(tenPoints("400A00K5Zj0\n490B90", "-0.0015", "0.01")), "pane.jdx")
	if err != nil {
		t.Fatal(err)
	}
	for i, want := range []float64{0.01, 0.0125, 0.015, 0.0175, 0.02, 0.0225, 0.025, 0.0275, 0.03, 0.029} {
		if got := blocks[0].Value[i]; got != want {
			t.Errorf("point %d is %v, want %v", i, got, want)
		}
	}
}

// The example of McDonald and Wilks, Appl. Spectrosc. 42 (1988) 151 (from memory): 53 ordinates,
// in AFFN and as they pack them. The factor is ours, to make fractions of them.
func TestJCAMPPublishedExample(t *testing.T) {
	want := []float64{0, 0, 0, 0, 2, 4, 4, 4, 7, 5, 4, 4, 5, 5, 7, 10, 11, 11, 6, 5, 7, 6, 9, 9, 7, 10, 10, 9, 10, 11, 12,
		15, 16, 16, 14, 17, 38, 38, 35, 38, 42, 47, 54, 59, 66, 75, 78, 88, 96, 104, 110, 121, 128}
	for name, table := range map[string]string{
		"SQZ":    "599.860@@@@BDDDGEDDEEGA0A1A1FEGFIIGA0A0IA0A1A2A5A6A6A4A7C8C8C5C8D2D7E4E9F6G5G8H8I6A04A10A21A28",
		"DIFDUP": "599.860@VKT%TLkj%J%KLJ%njKjL%kL%jJULJ%kLK1%lLMNPNPRLJ0QTOJ1P\n700.158A28",
	} {
		blocks, err := ReadJCAMP(strings.NewReader(tenPoints(table, "NANOMETERS", "1/CM", "-0.0015", "0", "0.0001", "0.001",
			"400", "599.860", "490", "700.158", "NPOINTS= 10", "NPOINTS= 53")), "pane.jdx")
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		b := blocks[0]
		if b.Len() != 53 || b.First() != 1e7/700.158 || b.Last() != 1e7/599.86 {
			t.Fatalf("%s: %d points from %v to %v nm", name, b.Len(), b.First(), b.Last())
		}
		for i, y := range want {
			if got := b.Value[52-i]; got != y/1000 {
				t.Errorf("%s: point %d is %v, want %v", name, i, got, y/1000)
			}
		}
	}
}

// Each sample of testdata/jcamp against what jcampconverter made of it; see the README there.
func TestJCAMPAgainstConverter(t *testing.T) {
	content, err := os.ReadFile("testdata/jcamp/jcampconverter.json")
	if err != nil {
		t.Fatal(err)
	}
	var want map[string][]struct {
		Title string
		X, Y  []float64
	}
	if err := json.Unmarshal(content, &want); err != nil {
		t.Fatal(err)
	}
	samples, err := filepath.Glob("testdata/jcamp/*.jdx")
	if err != nil || len(samples) < 10 {
		t.Fatalf("%d samples, %v", len(samples), err)
	}
	same := func(t float64) float64 { return t }
	for _, path := range samples {
		name := filepath.Base(path)
		if name == "points.jdx" { // jcampconverter does not read ##XYPOINTS=; pairs.jdx has the same points
			continue
		}
		// From the numbers of the file to nm and fractions.
		nm, fraction := same, same
		switch name {
		case "infrared.jdx":
			nm, fraction = func(x float64) float64 { return 1e7 / x }, func(y float64) float64 { return y / 100 }
		case "absorbance.jdx":
			fraction = func(y float64) float64 { return math.Exp(-y * math.Ln10) }
		case "pairs.jdx":
			nm = func(x float64) float64 { return 1000 * x }
		}
		for _, b := range readSample(t, name) {
			found := false
			for _, w := range want[name] {
				if w.Title != b.Title {
					continue
				}
				found = true
				if len(w.X) != b.Len() {
					t.Errorf("%s: %q has %d points, want %d", name, b.Title, b.Len(), len(w.X))
					continue
				}
				for i := range w.X {
					at := i
					if nm(w.X[0]) > nm(w.X[1]) {
						at = len(w.X) - 1 - i
					}
					if x, y := nm(w.X[i]), fraction(w.Y[i]); math.Abs(b.NM[at]-x) > 1e-12*x || math.Abs(b.Value[at]-y) > 1e-12 {
						t.Errorf("%s: %q has %v at %v nm, want %v at %v", name, b.Title, b.Value[at], b.NM[at], y, x)
					}
				}
			}
			if !found {
				t.Errorf("%s: jcampconverter has no %q", name, b.Title)
			}
		}
	}
}

func readSample(t *testing.T, name string) []Block {
	t.Helper()
	f, err := os.Open(filepath.Join("testdata/jcamp", name))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	blocks, err := ReadJCAMP(f, name)
	if err != nil {
		t.Fatalf("%v", err)
	}
	return blocks
}

func TestJCAMPSamples(t *testing.T) {
	for name, want := range map[string][]string{
		"affn.jdx":       {"transmittance, 10 points from 400 to 490 nm: table (X++(Y..Y)) in AFFN form"},
		"infrared.jdx":   {"reflectance, 361 points from 5000 to 50000 nm: table (X++(Y..Y)) in DIF with DUP form; x in 1/cm, turned to nm; ordinates in per cent, divided by 100"},
		"absorbance.jdx": {"transmittance, 101 points from 300 to 800 nm: table (X++(Y..Y)) in AFFN form; wavelengths descending, turned; absorbance A read as transmittance 10^-A"},
		"points.jdx":     {"transmittance, 18 points from 300 to 2500 nm: table (XY..XY); x in µm, turned to nm"},
		"link.jdx": {"transmittance, 221 points from 300 to 2500 nm: table (X++(Y..Y)) in DIF with DUP form; " +
			"the block at line 28 was passed over: it holds \"INFRARED PEAK TABLE\"; a spectrum of a pane is transmittance, reflectance or absorbance over wavelength",
			"reflectance, 221 points from 300 to 2500 nm: table (X++(Y..Y)) in PAC form"},
	} {
		blocks := readSample(t, name)
		if len(blocks) != len(want) {
			t.Errorf("%s: %d spectra, want %d", name, len(blocks), len(want))
			continue
		}
		for i, b := range blocks {
			got := fmt.Sprintf("%s, %d points from %v to %v nm: %s", b.Quantity, b.Len(), b.First(), b.Last(), strings.Join(b.Notes, "; "))
			if got != want[i] {
				t.Errorf("%s:\n got %s\nwant %s", name, got, want[i])
			}
		}
	}
	points, pairs := readSample(t, "points.jdx")[0], readSample(t, "pairs.jdx")[0]
	if !slices.Equal(points.NM, pairs.NM) || !slices.Equal(points.Value, pairs.Value) || points.NM[8] != 550 || points.Value[8] != 0.874 {
		t.Errorf("points.jdx and pairs.jdx differ:\n%v\n%v", points, pairs)
	}
}

// Missing ordinates: ? and ? repeated, within, at the beginning and at the end; the differences
// begin anew after them.
func TestJCAMPMissing(t *testing.T) {
	for _, tt := range []struct {
		name, text string
		nm, value  []float64
		gaps       []Span
		notes      []string
	}{
		// 100 ? 300 ? ? ? 700, +10: 710, 720; check 720, +10: 730, 740, 750; check 750, +0: 750, 750
		{"within", tenPoints("400A00?C00?UG00J0T\n480G20J0U\n510G50%T\n", "490", "530", "= 10", "= 14", "-0.0015", "0.01"),
			[]float64{400, 420, 460, 470, 480, 490, 500, 510, 520, 530},
			[]float64{0.01, 0.03, 0.07, 0.071, 0.072, 0.073, 0.074, 0.075, 0.075, 0.075},
			[]Span{{400, 420}, {420, 460}}, []string{"4 missing ordinates kept as gaps"}},
		{"at the ends, descending", tenPoints("400 ? ? 1 2 3 4 5\n470 6 ? 8 9 10 11 ?", "400", "530", "490", "400", "= 10", "= 14", "470", "460", "-0.0015", "0.01"),
			[]float64{410, 420, 430, 440, 460, 470, 480, 490, 500, 510},
			[]float64{0.0011, 0.001, 0.0009, 0.0008, 0.0006, 0.0005, 0.0004, 0.0003, 0.0002, 0.0001},
			[]Span{{440, 460}}, []string{"wavelengths descending, turned", "1 missing ordinate kept as gaps", "3 missing ordinates at an end left out"}},
		{"in pairs, wavenumbers", strings.NewReplacer("##XYDATA= (X++(Y..Y))", "##XYPOINTS= (XY..XY)").Replace(tenPoints(
			"25000 ?; 20000 1; 16000 2; 12500 ?; 10000 ?; 8000 3; 6250 4; 5000 5; 4000 6\n3125 7 2500 8 2000 9 1250 10",
			"NANOMETERS", "cm-1", "FIRSTX= 400", "FIRSTX= 25000", "LASTX= 490", "LASTX= 1250", "= 10", "= 13", "##FIRSTY= -0.0015", "")),
			[]float64{500, 625, 1250, 1600, 2000, 2500, 3200, 4000, 5000, 8000},
			[]float64{0.0001, 0.0002, 0.0003, 0.0004, 0.0005, 0.0006, 0.0007, 0.0008, 0.0009, 0.001},
			[]Span{{625, 1250}}, []string{"x in 1/cm, turned to nm", "2 missing ordinates kept as gaps", "1 missing ordinate at an end left out"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			blocks, err := ReadJCAMP(strings.NewReader(tt.text), "pane.jdx")
			if err != nil {
				t.Fatal(err)
			}
			b := blocks[0]
			if !slices.Equal(b.NM, tt.nm) || !slices.Equal(b.Value, tt.value) || !slices.Equal(b.Gaps, tt.gaps) || !slices.Equal(b.Notes[1:], tt.notes) {
				t.Errorf("got %v\n%v\n%v\n%q\nwant %v\n%v\n%v\n%q", b.NM, b.Value, b.Gaps, b.Notes[1:], tt.nm, tt.value, tt.gaps, tt.notes)
			}
		})
	}
}

func TestJCAMPUnits(t *testing.T) {
	for name, want := range map[string]string{
		"NANOMETERS": "nm", "nm": "nm", "Nanometres": "nm", "WAVELENGTH (NM)": "nm", "Wavelength/nm": "nm", "wavelength in nm": "nm",
		"Nanometers (nm)": "nm", "NANOMETRES [nm]": "nm", "Micrometers (µm)": "µm", "Wavenumbers (1/cm)": "1/cm", "Nanometers (µm)": "", "Time (nm)": "",
		"MICROMETERS": "µm", "MICRONS": "µm", "UM": "µm", "µm": "µm", "μm": "µm", "\xb5m": "µm", "Wavelength [µm]": "µm",
		"1/CM": "1/cm", "CM-1": "1/cm", "cm^-1": "1/cm", "cm**-1": "1/cm", "cm⁻¹": "1/cm", "cm\xaf\xb9": "1/cm", "WAVENUMBERS": "1/cm",
		"Wavenumber (cm-1)": "1/cm", "wavenumbers, 1/cm": "1/cm", "Wavenumber/cm-1": "1/cm", "wavenumber 1/cm": "1/cm", "RECIPROCAL CENTIMETERS": "1/cm", "/CM": "1/cm",
		"ANGSTROMS": "ångström", "Ångström": "ångström", "Å": "ångström", "A": "", "a": "",
		"HZ": "", "PPM": "", "M/Z": "", "SECONDS": "", "TIME": "", "WAVELENGTH": "", "M": "", "CM": "", "EV": "", "RAMAN SHIFT (CM-1)": "",
	} {
		if got := unitOfX(latin([]byte(name))).name; got != want {
			t.Errorf("##XUNITS= %s is read as %q, want %q", name, got, want)
		}
	}
	for name, want := range map[string]unitY{
		"TRANSMITTANCE": {Transmittance, false, false}, "Transmission": {Transmittance, false, false}, "T": {Transmittance, false, false},
		"%T": {Transmittance, true, false}, "% TRANSMITTANCE": {Transmittance, true, false}, "PERCENT TRANSMISSION": {Transmittance, true, false},
		"Transmittance (%)": {Transmittance, true, false}, "TRANSMITTANCE/%": {Transmittance, true, false}, "TRANSMITTANCE IN PERCENT": {Transmittance, true, false},
		"REFLECTANCE": {Reflectance, false, false}, "%R": {Reflectance, true, false}, "PERCENT REFLECTANCE": {Reflectance, true, false},
		"Per cent reflectance": {Reflectance, true, false}, "REFLECTANCE [%]": {Reflectance, true, false},
		"ABSORBANCE": {Transmittance, false, true}, "Abs.": {Transmittance, false, true}, "A": {Transmittance, false, true},
		"ABSORBANCE UNITS": {Transmittance, false, true}, "OPTICAL DENSITY": {Transmittance, false, true},
		"% ABSORBANCE": {}, "ABSORPTANCE": {}, "KUBELKA-MUNK": {}, "ARBITRARY UNITS": {}, "COUNTS": {}, "RAMAN INTENSITY": {}, "RELATIVE INTENSITY": {}, "LOG(1/R)": {}, "%": {},
	} {
		if got := unitOfY(name); got != want {
			t.Errorf("##YUNITS= %s is read as %+v, want %+v", name, got, want)
		}
	}
}

// The same ten points, in other units. Wavelengths by hand: 25000, 24000 ... 16000 1/cm.
func TestJCAMPConversions(t *testing.T) {
	decade := tenPoints("400 0 0.1 0.2 0.3 0.5 1 2 3 4 5", "0.0001", "1", "-0.0015", "0", "TRANSMITTANCE", "ABSORBANCE")
	for _, tt := range []struct {
		name, text       string
		first, next, end float64 // nm
		value            float64 // of the first in the file
	}{
		{"nm", tenPoints(tenAFFN), 400, 410, 490, -0.0015},
		{"µm", tenPoints(tenAFFN, "NANOMETERS", "µm", "400", "0.400", "450", "0.45", "490", "0.49"), 400, 410, 490, -0.0015},
		{"µm, thousandths", tenPoints(tenAFFN, "NANOMETERS", "MICROMETERS", "XFACTOR= 1", "XFACTOR= 0.001", "FIRSTX= 400", "FIRSTX= 0.4", "LASTX= 490", "LASTX= 0.49"), 400, 410, 490, -0.0015},
		{"tenths of nm", tenPoints(tenAFFN, "FIRSTX= 400", "FIRSTX= 300.1", "400", "300.1", "450", "300.6", "490", "301"), 300.1, 300.2, 301, -0.0015},
		{"ångström", tenPoints(tenAFFN, "NANOMETERS", "ANGSTROMS", "400", "4000", "450", "4500", "490", "4900"), 400, 410, 490, -0.0015},
		{"1/cm", tenPoints(tenAFFN, "NANOMETERS", "1/CM", "400", "25000", "450", "20000", "490", "16000"), 400, 1e7 / 24000, 625, -0.0015},
		{"1/cm, ascending", tenPoints(tenAFFN, "NANOMETERS", "1/CM", "400", "16000", "450", "21000", "490", "25000"), 625, 1e7 / 17000, 400, -0.0015},
		{"descending", tenPoints(tenAFFN, "400", "490", "450", "440", "490", "400"), 490, 480, 400, -0.0015},
		{"per cent", tenPoints(tenAFFN, "TRANSMITTANCE", "%T", "0.0001", "0.01", "-0.0015", "-0.15"), 400, 410, 490, -0.0015},
		{"absorbance", decade, 400, 410, 490, 1},
		// 0.3 is not 0.30103: 10^-0.3 = 0.501187 (tables of logarithms)
		{"absorbance 0.3", strings.NewReplacer("400 0 ", "400 0.3 ", "FIRSTY= 0", "FIRSTY= 0.3").Replace(decade), 400, 410, 490, 0.501187},
	} {
		blocks, err := ReadJCAMP(strings.NewReader(tt.text), "pane.jdx")
		if err != nil {
			t.Errorf("%s: %v", tt.name, err)
			continue
		}
		b := blocks[0]
		if tt.first > tt.end {
			slices.Reverse(b.NM)
			slices.Reverse(b.Value)
		}
		if b.NM[0] != tt.first || b.NM[1] != tt.next || b.NM[9] != tt.end || math.Abs(b.Value[0]-tt.value) > 5e-7 {
			t.Errorf("%s: %v at %v, %v … %v, want %v at %v, %v … %v", tt.name, b.Value[0], b.NM[0], b.NM[1], b.NM[9], tt.value, tt.first, tt.next, tt.end)
		}
	}
}

func TestIsJCAMP(t *testing.T) {
	for text, want := range map[string]bool{
		"##TITLE= a\n": true, "\ufeff##title=a": true, "\r\n  $$ comment\n$$ more\n##TITLE": true, "##JCAMP-DX= 4.24": true, "##$OWN= 1": true,
		"##DATA TYPE=LINK": true, "": false, "#": false, "##": false, "##=": false, "$$ comment alone": false, "# a comment\nwavelength_nm,tau\n": false,
		"## made with gain = 3\nwavelength_nm,tau\n": false, "##a,b=c": false, "wavelength_nm,tau": false, "##\n##TITLE=": false, "##ABC\n=": false,
	} {
		if got := IsJCAMP([]byte(text)); got != want {
			t.Errorf("IsJCAMP(%q) is %v", text, got)
		}
	}
}
