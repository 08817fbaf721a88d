package spectra

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"reflect"
	"slices"
	"strings"
	"testing"
	"unicode"

	"pgregory.net/rapid"
)

// goodLines are a spectrum file of eleven rows: a head in line 1, 300 nm in line 2, and so on by
// 10 nm to 400 nm in line 12.
func goodLines() []string {
	lines := []string{"wavelength_nm,tau,rho_front,rho_back"}
	for nm := 300; nm <= 400; nm += 10 {
		lines = append(lines, fmt.Sprintf("%d,0.8,0.1,0.15", nm))
	}
	return lines
}

// withLine returns the good file with one line, counted from 1, replaced.
func withLine(number int, text string) string {
	lines := goodLines()
	lines[number-1] = text
	return strings.Join(lines, "\n") + "\n"
}

// good returns the good file, its lines changed one by one.
func good(change func(i int, line string) string) string {
	lines := goodLines()
	for i := range lines {
		lines[i] = change(i, lines[i])
	}
	return strings.Join(lines, "\n") + "\n"
}

func same(_ int, line string) string { return line }

// readAndJoin reads a spectrum as a project does.
func readAndJoin(r io.Reader) (Measured, error) {
	c, err := ReadCSV(r, "pane.csv")
	if err != nil {
		return Measured{}, err
	}
	return Join(c, Column{}, Column{})
}

// checkFaults fails the test unless the error has exactly the wanted faults; each is given as
// words that occur in one message, the first of them at its beginning.
func checkFaults(t *testing.T, err error, want [][]string) {
	t.Helper()
	var faults Errors
	if !errors.As(err, &faults) {
		t.Fatalf("got error %v, want Errors with %q", err, want)
	}
	if len(faults) != len(want) {
		t.Errorf("got %d faults, want %d:\n%v", len(faults), len(want), errors.Join(faults.Unwrap()...))
	}
	for i, words := range want {
		if i >= len(faults) {
			break
		}
		message := faults[i].Error()
		if strings.ContainsFunc(message, unicode.IsControl) {
			t.Errorf("message %q would send control characters to a terminal", message)
		}
		if !strings.HasPrefix(message, words[0]) {
			t.Errorf("message %q does not begin with %q", message, words[0])
		}
		for _, word := range words[1:] {
			if !strings.Contains(message, word) {
				t.Errorf("message %q lacks %q", message, word)
			}
		}
	}
}

func TestReadCSVAccepts(t *testing.T) {
	plain, err := ReadCSV(strings.NewReader(good(same)), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	if n := plain.Tau.Len(); n != 11 || plain.Tau.NM[10] != 400 || plain.RhoBack.Value[3] != 0.15 || plain.RhoFront.Line[0] != 2 {
		t.Fatalf("the good file is read as %+v", plain)
	}
	for _, tt := range []struct {
		name, text string
		sameLines  bool
	}{
		{"byte order mark", "\ufeff" + good(same), true},
		{"CRLF", strings.ReplaceAll(good(same), "\n", "\r\n"), true},
		{"CR alone", strings.ReplaceAll(good(same), "\n", "\r"), true},
		{"byte order mark and CRLF", "\ufeff" + strings.ReplaceAll(good(same), "\n", "\r\n"), true},
		{"no line end at the end", strings.TrimSuffix(good(same), "\n"), true},
		{"blanks around cells", good(func(_ int, line string) string { return " " + strings.ReplaceAll(line, ",", " ,\t") + " " }), true},
		{"quoted cells", good(func(_ int, line string) string { return `"` + strings.ReplaceAll(line, ",", `","`) + `"` }), true},
		{"exponents and plus signs", withLine(3, "3.1e2,+8e-1,.1,15e-2"), true},
		{"columns in another order", good(func(_ int, line string) string {
			c := strings.Split(line, ",")
			return strings.Join([]string{c[3], c[1], c[0], c[2]}, ",")
		}), true},
		{"comments and blank lines anywhere", "# head, of \"two\n\n" + good(func(i int, line string) string { return fmt.Sprintf("%s\n# after line %d\n", line, i) }) + ",,,\n#", false},
	} {
		t.Run(tt.name, func(t *testing.T) {
			got, err := ReadCSV(strings.NewReader(tt.text), "pane.csv")
			if err != nil {
				t.Fatal(err)
			}
			for _, c := range [][2]Column{{got.Tau, plain.Tau}, {got.RhoFront, plain.RhoFront}, {got.RhoBack, plain.RhoBack}} {
				if !reflect.DeepEqual(c[0].Curve, c[1].Curve) {
					t.Errorf("got %v, want %v", c[0].Curve, c[1].Curve)
				}
				if tt.sameLines && !slices.Equal(c[0].Line, c[1].Line) {
					t.Errorf("got lines %v, want %v", c[0].Line, c[1].Line)
				}
			}
			if m, err := Join(got, Column{}, Column{}); err != nil || len(m.Cautions) > 0 {
				t.Errorf("Join: %v, cautions %v", err, m.Cautions)
			}
		})
	}
}

// A question mark between values leaves a gap from the last before to the first after; at an end it
// is like a blank.
func TestReadCSVGaps(t *testing.T) {
	tau := []string{"?", "", "0.1", "?", "0.2", "0.3", "?", "?", "?", "0.4", "?"}
	text := goodLines()
	for i, cell := range tau {
		text[i+1] = fmt.Sprintf("%d,%s,0.1,?", 300+10*i, cell)
	}
	c, err := ReadCSV(strings.NewReader(strings.Join(text, "\n")), "pane.csv")
	if err != nil {
		t.Fatal(err)
	}
	want := Curve{NM: []float64{320, 340, 350, 390}, Value: []float64{0.1, 0.2, 0.3, 0.4}, Gaps: []Span{{320, 340}, {350, 390}}}
	if !reflect.DeepEqual(c.Tau.Curve, want) || !slices.Equal(c.Tau.Line, []int{4, 6, 7, 11}) {
		t.Errorf("got %+v, want %+v", c.Tau, want)
	}
	if c.RhoFront.Gaps != nil || c.RhoFront.Len() != 11 || c.RhoBack.Len() != 0 {
		t.Errorf("rho_front %+v, rho_back %+v", c.RhoFront, c.RhoBack)
	}
}

func TestReadCSVRefuses(t *testing.T) {
	utf16 := func(order ...byte) string {
		out := order
		for _, c := range []byte(good(same)) {
			out = append(out, c, 0)
		}
		return string(out)
	}
	nine := strings.Join(goodLines()[:10], "\n")
	for _, tt := range []struct {
		name, text string
		want       [][]string
	}{
		{"UTF-16, little end first", utf16(0xff, 0xfe), [][]string{{"pane.csv: ", "UTF-16", "save it as UTF-8"}}},
		{"UTF-16, big end first", "\xfe\xff\x00w\x00a", [][]string{{"pane.csv: ", "UTF-16", "save it as UTF-8"}}},
		{"UTF-16 without a mark", utf16(), [][]string{{"pane.csv: ", "binary, or UTF-16"}}},
		{"binary", "\x01\x02\x00\x08", [][]string{{"pane.csv: is binary", "CSV text in UTF-8"}}},
		{"a spreadsheet", "PK\x03\x04\x14\x00[Content_Types].xml\x00xl/workbook.xml\x00", [][]string{{"pane.csv: is a spreadsheet (XLSX); save the sheet as CSV"}}},
		{"an open spreadsheet", "PK\x03\x04\x14\x00mimetypeapplication/vnd.oasis.opendocument.spreadsheet", [][]string{{"pane.csv: is a spreadsheet (ODS); save the sheet as CSV"}}},
		{"an old spreadsheet", "\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1\x00", [][]string{{"pane.csv: is a spreadsheet or a document in an old binary format (XLS)"}}},
		{"an archive", "PK\x03\x04\x00\x00\x08", [][]string{{"pane.csv: is a ZIP archive", "CSV text in UTF-8"}}},
		{"a PDF", "%PDF-1.7\n", [][]string{{"pane.csv: is a PDF"}}},
		{"compressed", "\x1f\x8b\x08\x00", [][]string{{"pane.csv: is compressed (gzip); unpack it"}}},
		{"empty", "", [][]string{{"pane.csv: empty", "wavelength_nm,tau,rho_front,rho_back"}}},
		{"comments alone", "# nothing\n\n", [][]string{{"pane.csv: empty"}}},
		{"head alone", goodLines()[0] + "\n", [][]string{{"pane.csv: 0 rows", "at least 10"}}},
		{"nine rows", nine, [][]string{{"pane.csv: 9 rows", "at least 10"}}},
		{"no head", strings.Join(goodLines()[1:], "\n"), [][]string{{"pane.csv:1: the first row must hold the column heads", "column heads"}}},
		{"semicolons", strings.ReplaceAll(good(same), ",", ";"), [][]string{{"pane.csv:1: columns are separated by semicolons; use commas, and points in numbers", "panewright spectrum FILE --separator semicolon -o NEW.csv"}}},
		{"tabs", strings.ReplaceAll(good(same), ",", "\t"), [][]string{{"pane.csv:1: columns are separated by tabs", "panewright spectrum FILE --separator tab -o NEW.csv"}}},
		{"semicolons and decimal commas", "nm;%T\n300;12,5\n", [][]string{{"pane.csv:1: columns are separated by semicolons", "--separator semicolon --decimal-comma --columns wavelength=1,tau=2 -o NEW.csv"}}},
		{"both wavelengths", good(func(i int, line string) string {
			if i == 0 {
				return line + ",wavelength_um"
			}
			return line + ",0.3"
		}), [][]string{{"pane.csv:1: both wavelength_nm and wavelength_um", "give one"}}},
		{"no quantity", good(func(_ int, line string) string { return strings.Split(line, ",")[0] }), [][]string{{"pane.csv:1: no column tau, rho_front or rho_back"}}},
		{"unknown column", withLine(1, "wavelength_nm,tau,rho_front,rho_bak"), [][]string{{"pane.csv:1: unknown column \"rho_bak\"", "tau, rho_front, rho_back"}}},
		{"column twice", withLine(1, "wavelength_nm,tau,rho_front,tau"), [][]string{{"pane.csv:1: column \"tau\" stands twice"}}},
		{"wavelength twice", withLine(1, "wavelength_nm,wavelength_nm,rho_front,tau"), [][]string{{"pane.csv:1: column \"wavelength_nm\" stands twice"}}},
		{"blank head", good(func(_ int, line string) string { return line + "," }), [][]string{{"pane.csv:1: column 5 has no head"}}},
		{"unclosed quote", withLine(4, `320,"0.8,0.1,0.15`), [][]string{{"pane.csv:", "not readable as CSV"}}},
		{"quote within a cell", withLine(4, `320,0.8",0.1,0.15`), [][]string{{"pane.csv:4: not readable as CSV"}}},

		{"decimal comma, quoted", withLine(3, `310,"0,8",0.1,0.15`), [][]string{{"pane.csv:3: at 310 nm: tau 0,8: ", "decimal comma", "write a point"}}},
		{"decimal comma, not quoted", withLine(3, `310,0,8,0,1,0,15`), [][]string{{"pane.csv:3: 7 cells under 4 column heads", "decimal comma", "points"}}},
		{"decimal comma in a wavelength", withLine(3, `"310,5",0.8,0.1,0.15`), [][]string{{"pane.csv:3: wavelength \"310,5\": ", "decimal comma"}}},
		{"a cell too few", withLine(3, "310,0.8,0.1"), [][]string{{"pane.csv:3: 3 cells under 4 column heads"}}},
		{"percent", withLine(6, "340,80,0.1,0.15"), [][]string{{"pane.csv:6: at 340 nm: tau 80: ", "0..1", "fractions of one, not percent"}}},
		{"minus", withLine(6, "340,0.8,-0.1,0.15"), [][]string{{"pane.csv:6: at 340 nm: rho_front -0.1: not in 0..1"}}},
		{"beyond percent", withLine(6, "340,0.8,0.1,640"), [][]string{{"pane.csv:6: at 340 nm: rho_back 640: not in 0..1"}}},
		{"0.0021 below", withLine(5, "330,-0.0021,0.1,0.15"), [][]string{{"pane.csv:5: at 330 nm: tau -0.0021: not in 0..1"}}},
		{"0.0021 above", withLine(5, "330,1.0021,0,0"), [][]string{{"pane.csv:5: at 330 nm: tau 1.0021: not in 0..1"}}},
		{"sum 1.003 with the front", withLine(9, "370,0.8,0.203,0.1"), [][]string{{"pane.csv:9: at 370 nm: tau + rho_front is 1.0030", "at most 1"}}},
		{"sum 1.003 with the back", withLine(9, "370,0.8,0.1,0.203"), [][]string{{"pane.csv:9: at 370 nm: tau + rho_back is 1.0030", "at most 1"}}},
		{"NaN", withLine(2, "300,NaN,0.1,0.15"), [][]string{{"pane.csv:2: at 300 nm: tau NaN: not a finite number"}}},
		{"Inf", withLine(2, "300,0.8,-Inf,0.15"), [][]string{{"pane.csv:2: at 300 nm: rho_front -Inf: not a finite number"}}},
		{"too large to be held", withLine(2, "300,0.8,1e999,0.15"), [][]string{{"pane.csv:2: at 300 nm: rho_front 1e999: not a finite number"}}},
		{"hexadecimal", withLine(2, "300,0x1p-1,0.1,0.15"), [][]string{{"pane.csv:2: at 300 nm: tau 0x1p-1: not a number"}}},
		{"underscore", withLine(2, "300,0.8,0.1,0_1"), [][]string{{"pane.csv:2: at 300 nm: rho_back 0_1: not a number"}}},
		{"a word", withLine(2, "300,high,0.1,0.15"), [][]string{{"pane.csv:2: at 300 nm: tau high: not a number"}}},
		{"a long word is clipped", withLine(2, "300,"+strings.Repeat("é", 5000)+",0.1,0.15"), [][]string{{"pane.csv:2: at 300 nm: tau é", "…: not a number"}}},
		{"control characters", withLine(2, "300,\x1b[31mred,0.1,0.15"), [][]string{{"pane.csv:2: at 300 nm: tau ", "[31mred: not a number"}}},
		{"control characters in a head", withLine(1, "wavelength_nm,tau,rho_front,\x1b[31m"), [][]string{{"pane.csv:1: unknown column", "[31m"}}},
		{"blank cell in the middle", withLine(7, "350,,0.1,0.15"), [][]string{{"pane.csv:8: at 360 nm: tau 0.8: ", "blank cell at line 7", "only where a column stops", "write ? for a value that is missing"}}},
		{"a blank cell among missing ones", strings.Replace(withLine(7, "350,,0.1,0.15"), "340,0.8", "340,?", 1), [][]string{{"pane.csv:8: at 360 nm: tau 0.8: ", "blank cell at line 7"}}},
		{"a missing wavelength", withLine(7, "?,0.8,0.1,0.15"), [][]string{{"pane.csv:7: wavelength \"?\": not a number"}}},
		{"holes everywhere", "wavelength_nm,tau\n" + func() string {
			var s strings.Builder
			for nm := 300; nm < 300+2*maxGaps+10; nm += 2 {
				fmt.Fprintf(&s, "%d,0.5\n%d,?\n", nm, nm+1)
			}
			return s.String()
		}(), [][]string{{"pane.csv:2004: at 2302 nm: tau lacks values (?) in more than 1000 places"}}},
		{"a missing value in words", withLine(7, "350,??,0.1,0.15"), [][]string{{"pane.csv:7: at 350 nm: tau ??: not a number"}}},

		{"not sorted", withLine(4, "305,0.8,0.1,0.15"), [][]string{{"pane.csv:4: at 305 nm: wavelengths must ascend", "310 nm"}}},
		{"wavelength twice in rows", withLine(4, "310.0,0.8,0.1,0.15"), [][]string{{"pane.csv:4: at 310 nm: this wavelength stands twice"}}},
		{"zero wavelength", withLine(2, "0,0.8,0.1,0.15"), [][]string{{"pane.csv:2: wavelength \"0\": ", "above 0"}}},
		{"negative wavelength", withLine(2, "-300,0.8,0.1,0.15"), [][]string{{"pane.csv:2: wavelength \"-300\": ", "above 0"}}},
		{"blank wavelength", withLine(2, ",0.8,0.1,0.15"), [][]string{{"pane.csv:2: wavelength \"\": blank"}}},
		{"micrometres in a column of nm", good(func(i int, line string) string {
			if i == 0 {
				return line
			}
			return fmt.Sprintf("0.%d,%s", 30+i, line[4:])
		}), [][]string{{"pane.csv:12: the last wavelength is 0.41 nm", "name it wavelength_um"}}},
		{"nm in a column of micrometres", "wavelength_um,tau,rho_front,rho_back\n" + func() string {
			var s strings.Builder
			for nm := 300; nm <= 2500; nm += 200 {
				fmt.Fprintf(&s, "%d,0.8,0.1,0.15\n", nm)
			}
			return s.String()
		}(), [][]string{{"pane.csv:2: the first wavelength is 300 µm", "name it wavelength_nm"}}},
		{"two faults, both said", strings.Replace(withLine(3, "310,80,0.1,0.15"), "400,0.8", "400,NaN", 1),
			[][]string{{"pane.csv:3: ", "percent"}, {"pane.csv:12: ", "finite"}}},
		{"the line counts comments", "# one\n# two\n" + withLine(3, "310,80,0.1,0.15"), [][]string{{"pane.csv:5: at 310 nm"}}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			_, err := readAndJoin(strings.NewReader(tt.text))
			checkFaults(t, err, tt.want)
			for _, f := range tt.want {
				if len(err.Error()) > 1500 || !strings.Contains(err.Error(), "pane.csv") {
					t.Errorf("%q: the message is %d bytes long or does not name the file", f, len(err.Error()))
				}
			}
		})
	}
}

// A file with decimal commas is told so once, with the first row, the last and how many there are, and
// nothing else is made of its rows.
func TestReadCSVDecimalCommaThroughout(t *testing.T) {
	text := good(func(i int, line string) string {
		if i == 0 {
			return line
		}
		return strings.ReplaceAll(line, ".", ",")
	})
	_, err := readAndJoin(strings.NewReader(text))
	checkFaults(t, err, [][]string{{"pane.csv:2: 7 cells under 4 column heads; a decimal comma? write points; 11 faults like this, the last in line 12"}})
}

// endless yields rows for ever, so that only a reader that stops by itself comes to an end.
type endless struct{ rest []byte }

func (e *endless) Read(p []byte) (int, error) {
	if len(e.rest) == 0 {
		e.rest = bytes.Repeat([]byte("300,0.8,0.1,0.15\n"), 4096)
	}
	n := copy(p, e.rest)
	e.rest = e.rest[n:]
	return n, nil
}

func TestReadCSVTooLarge(t *testing.T) {
	_, err := readAndJoin(&endless{})
	checkFaults(t, err, [][]string{{"pane.csv: larger than 64 MB", "some hundred rows"}})
}

type broken struct{}

func (broken) Read([]byte) (int, error) { return 0, errors.New("the disk is gone") }

func TestReadCSVReaderFails(t *testing.T) {
	if _, err := ReadCSV(broken{}, "pane.csv"); err == nil || err.Error() != "pane.csv: the disk is gone" {
		t.Errorf("got %v", err)
	}
}

func TestErrorsUnwrap(t *testing.T) {
	_, err := readAndJoin(strings.NewReader(strings.ReplaceAll(good(same), ",0.8,", ",80,")))
	row, ok := errors.AsType[*RowError](err)
	if !ok || row.File != "pane.csv" || row.Line != 2 || row.NM != 300 {
		t.Errorf("first fault is %+v, want pane.csv, line 2, 300 nm", row)
	}
	_, err = readAndJoin(strings.NewReader(strings.Replace(withLine(3, "310,0.8,0.1,high"), "400,0.8", "400,low", 1)))
	if text := err.Error(); !strings.HasSuffix(text, "(and 1 more)") {
		t.Errorf("%q does not count the other fault", text)
	}
}

// Wavelengths in µm are those in nm bit for bit, however the decimals fall.
func TestMicrometresEqualNanometres(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		steps := rapid.SliceOfN(rapid.IntRange(1, 3_000_000), 10, 30).Draw(t, "steps in pm")
		nm, um := "wavelength_nm,tau\n", "wavelength_um,tau\n"
		pm := 200_000
		for _, s := range steps {
			pm += s
			nm += fmt.Sprintf("%d.%03d,0.5\n", pm/1000, pm%1000)
			um += fmt.Sprintf("%d.%06d,0.5\n", pm/1_000_000, pm%1_000_000)
		}
		a, err := ReadCSV(strings.NewReader(nm), "pane.csv")
		if err != nil {
			t.Fatal(err)
		}
		b, err := ReadCSV(strings.NewReader(um), "pane.csv")
		if err != nil {
			t.Fatal(err)
		}
		if !slices.Equal(a.Tau.NM, b.Tau.NM) {
			t.Fatalf("nm: %v\nµm: %v", a.Tau.NM, b.Tau.NM)
		}
	})
}

func TestReadSunCSV(t *testing.T) {
	sun := func(head string, value func(nm int) string) string {
		s := head + "\n"
		for nm := 280; nm <= 2520; nm += 20 {
			s += fmt.Sprintf("%d,%s\n", nm, value(nm))
		}
		return s
	}
	one := func(int) string { return "1.5" }
	for _, tt := range []struct {
		name, text string
		want       [][]string // empty: accepted
	}{
		{"plain", sun("wavelength_nm,irradiance", one), nil},
		{"with its unit", sun("wavelength_nm,irradiance_w_m2_nm", one), nil},
		{"unknown column", sun("wavelength_nm,sun", one), [][]string{{"sun.csv:1: unknown column \"sun\"", "irradiance"}}},
		{"negative", sun("wavelength_nm,irradiance", func(nm int) string { return fmt.Sprint(500 - nm/5) }), [][]string{{"sun.csv:114: at 2520 nm: irradiance -4: below 0"}}},
		{"nothing", sun("wavelength_nm,irradiance", func(int) string { return "0" }), [][]string{{"sun.csv:1: ", "adds to nothing", "300", "2500"}}},
		{"missing", sun("wavelength_nm,irradiance", func(nm int) string { return map[bool]string{true: "?", false: "1"}[nm == 500] }), [][]string{{"sun.csv: at 480 nm: values are missing", "to 520 nm"}}},
		{"blank", sun("wavelength_nm,irradiance", func(int) string { return "" }), [][]string{{"sun.csv:1: ", "adds to nothing"}}},
		{"NaN", sun("wavelength_nm,irradiance", func(nm int) string { return map[bool]string{true: "NaN", false: "1"}[nm == 500] }), [][]string{{"sun.csv:13: at 500 nm: irradiance NaN: not a finite number"}}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			w, err := ReadSunCSV(strings.NewReader(tt.text), "sun.csv")
			if tt.want != nil {
				checkFaults(t, err, tt.want)
				return
			}
			if err != nil {
				t.Fatal(err)
			}
			var total float64
			for _, v := range w.Weight {
				total += v
			}
			// a constant irradiance of 1.5 over 300 to 2500 nm
			if w.NM[0] != 300 || w.NM[len(w.NM)-1] != 2500 || total != 1.5*2200 || w.Name != "solar" || !strings.Contains(w.Source, "sun.csv") {
				t.Errorf("from %v to %v nm, total %v, name %q, source %q", w.NM[0], w.NM[len(w.NM)-1], total, w.Name, w.Source)
			}
		})
	}
}
