package spectra

import (
	"bytes"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func FuzzReadJCAMP(f *testing.F) {
	samples, err := filepath.Glob("testdata/jcamp/*.jdx")
	if err != nil {
		f.Fatal(err)
	}
	for _, path := range samples {
		content, err := os.ReadFile(path)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(content)
	}
	for _, text := range []string{
		"",
		"\ufeff$$ comment\r\n##TITLE",
		"##TITLE=\n##DATA TYPE=LINK\n##BLOCKS=1\n##END=\n",
		"##TITLE=\n##NTUPLES= A\n##PAGE= N=1\n##DATA TABLE= (X++(R..R)), XYDATA\n1A\n##END NTUPLES=\n##END=\n",
		tenPoints("400 ? -15 8 120 1234? 1234?T5021 7903 7890 7890 ?", "490", "530", "= 10", "= 14", "##FIRSTY", "##MAXY"),
		tenPoints("400A00K5Zj0\n490B90", "-0.0015", "0.01"),
		tenPoints(tenPairs, "(X++(Y..Y))", "(XY..XY)"),
		tenPoints(tenSQZDUP, "NANOMETERS", "\xb5m", "400", "0.4E+00", "460", "0.46", "490", "49e-2", "\n", "\r"),
		tenPoints(tenDIFDUP, "TRANSMITTANCE", "Absorbance", "NANOMETERS", "1/CM", "##LASTX= 490", "##DELTAX= 10"),
		tenPoints("400AS999999999"),
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, content []byte) {
		blocks, err := ReadJCAMP(bytes.NewReader(content), "pane.jdx")
		if err != nil {
			checkMessages(t, err)
			if len(blocks) > 0 {
				t.Fatal("spectra beside an error")
			}
			return
		}
		if len(blocks) == 0 {
			t.Fatal("neither spectra nor an error")
		}
		for _, b := range blocks {
			if b.Quantity != Transmittance && b.Quantity != Reflectance || b.File != "pane.jdx" || len(b.Notes) == 0 {
				t.Fatalf("%+v", b)
			}
			if n := b.Len(); n < minimumRows || n > maxBlockPoints || len(b.Value) != n || len(b.Line) != n {
				t.Fatalf("%d wavelengths, %d values, %d lines", n, len(b.Value), len(b.Line))
			}
			for i, nm := range b.NM {
				if !(nm > 0) || math.IsInf(nm, 0) || i > 0 && nm <= b.NM[i-1] {
					t.Fatalf("wavelengths do not ascend: %v", b.NM)
				}
				if v := b.Value[i]; !(v >= -Slack && v <= 1+Slack) {
					t.Fatalf("%v at %v nm", v, nm)
				}
				if b.Line[i] < 1 || b.Line[i] > len(content)+1 {
					t.Fatalf("line %d", b.Line[i])
				}
			}
			for i, g := range b.Gaps {
				at, known := slices.BinarySearch(b.NM, g.FromNM)
				if !known || at+1 == b.Len() || b.NM[at+1] != g.ToNM || i > 0 && g.FromNM < b.Gaps[i-1].ToNM {
					t.Fatalf("gaps %v", b.Gaps)
				}
			}
		}
	})
}

// absent stands for a missing ordinate in a list of whole numbers.
const absent = math.MinInt

// tableOf writes ordinates as the lines of a table (X++(Y..Y)) in the form AFFN, PAC, SQZ or DIF,
// with DUP where wanted; perLine says how many items come in the next line.
func tableOf(y []int, form string, dup bool, x func(i int) string, perLine func() int) string {
	// letter replaces the first digit of a number and its sign by a letter.
	letter := func(v int, zero, plus, minus string) string {
		digits := strconv.Itoa(max(v, -v))
		switch d := digits[0] - '0'; {
		case v == 0:
			return zero
		case v > 0:
			return plus[d-1:d] + digits[1:]
		default:
			return minus[d-1:d] + digits[1:]
		}
	}
	squeeze := func(v int) string { return letter(v, "@", "ABCDEFGHI", "abcdefghi") }
	var s strings.Builder
	differs := false // the last item was a difference
	for i := 0; i < len(y); {
		begun := differs // there is an ordinate in this line already
		if differs {
			s.WriteString(x(i-1) + squeeze(y[i-1]))
		} else {
			s.WriteString(x(i))
		}
		for n := perLine(); n > 0 && i < len(y); n-- {
			same := func(k int) bool { return y[k] == y[i] }
			switch {
			case y[i] == absent:
				s.WriteString("?")
				differs = false
			case form == "DIF" && begun:
				step := y[i] - y[i-1]
				s.WriteString(letter(step, "%", "JKLMNOPQR", "jklmnopqr"))
				same = func(k int) bool { return y[k] != absent && y[k]-y[k-1] == step }
				differs = true
			case form == "AFFN":
				fmt.Fprintf(&s, " %d", y[i])
			case form == "PAC":
				fmt.Fprintf(&s, "%+d", y[i])
			default:
				s.WriteString(squeeze(y[i]))
				differs = false
			}
			begun = y[i] != absent
			k := i + 1
			for dup && k < len(y) && same(k) {
				k++
			}
			if k > i+1 {
				s.WriteString(letter(k-i, "", "STUVWXYZs", ""))
			}
			i = k
		}
		s.WriteString("\n")
	}
	if differs {
		s.WriteString(x(len(y)-1) + squeeze(y[len(y)-1]) + "\n")
	}
	return s.String()
}

func jcampOf(table string, firstX, lastX, points, places int) string {
	return fmt.Sprintf("##TITLE= encoded\n##XUNITS= NANOMETERS\n##YUNITS= REFLECTANCE\n##YFACTOR= 1E-%02d\n"+
		"##FIRSTX= %d\n##LASTX= %d\n##NPOINTS= %d\n##XYDATA= (X++(Y..Y))\n%s##END=\n", places, firstX, lastX, points, table)
}

// Ordinates that are encoded in any form are read back digit for digit.
func TestJCAMPDecodesWhatIsEncoded(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		places := rapid.IntRange(3, 9).Draw(t, "decimal places")
		one := int(math.Pow10(places))
		ordinate := rapid.OneOf(rapid.IntRange(-one/1000, one), rapid.IntRange(0, 12), rapid.Just(7), rapid.Just(absent))
		y := rapid.SliceOfN(ordinate, 0, 60).Draw(t, "ordinates")
		for range rapid.IntRange(10, 20).Draw(t, "sure") { // enough that are there, in even steps
			y = append(y, 3*len(y))
		}
		first, step := rapid.IntRange(200, 3000).Draw(t, "first"), rapid.IntRange(1, 20).Draw(t, "step")
		x := func(i int) string { return strconv.Itoa(first + i*step) }
		form := rapid.SampledFrom([]string{"AFFN", "PAC", "SQZ", "DIF"}).Draw(t, "form")
		table := tableOf(y, form, rapid.Bool().Draw(t, "dup"), x, func() int { return rapid.IntRange(1, 15).Draw(t, "items") })
		blocks, err := ReadJCAMP(strings.NewReader(jcampOf(table, first, first+(len(y)-1)*step, len(y), places)), "pane.jdx")
		if err != nil {
			t.Fatalf("%v\n%s", err, table)
		}
		var want Curve
		last := -1
		for i, v := range y {
			if v == absent {
				continue
			}
			nm := float64(first + i*step)
			if last >= 0 && i > last+1 {
				want.Gaps = append(want.Gaps, Span{want.Last(), nm})
			}
			want.NM, want.Value, last = append(want.NM, nm), append(want.Value, float64(v)/float64(one)), i
		}
		if got := blocks[0]; !slices.Equal(got.NM, want.NM) || !slices.Equal(got.Value, want.Value) || !slices.Equal(got.Gaps, want.Gaps) {
			t.Fatalf("got %v\n%v\n%v\nwant %v\n%v\n%v\n%s", got.NM, got.Value, got.Gaps, want.NM, want.Value, want.Gaps, table)
		}
	})
}

// Numbers are those of strconv, the second evaluation here, and their last digit is where it is.
func TestJCAMPNumbers(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringMatching(`[+-]?([0-9]{1,25}(\.[0-9]{0,25})?|\.[0-9]{1,25})([Ee][+-]?[0-9]{1,3})?`).Draw(t, "number")
		want, _ := strconv.ParseFloat(text, 64)
		if got, _, n := affn([]byte(text), exponentAlways); n != len(text) || got != want {
			t.Fatalf("%s is read as %v, %d bytes; want %v", text, got, n, want)
		}
	})
	for text, want := range map[string]float64{"400": 1, "400.0": 0.1, "0.0105": 1e-4, "1.05E-02": 1e-4, "12E+03": 1000, "-.5": 0.1} {
		if _, unit, _ := affn([]byte(text), exponentAlways); unit != want {
			t.Errorf("the last digit of %s is at %v, want %v", text, unit, want)
		}
	}
}

// BenchmarkReadJCAMP reads 4401 points, a spectrum from 300 to 2500 nm by half a nm.
func BenchmarkReadJCAMP(b *testing.B) {
	const points = 4401
	y := make([]int, points)
	for i := range y {
		y[i] = int(5000 + 4000*math.Sin(float64(i)/200))
	}
	x := func(i int) string { return strconv.Itoa(600 + i) }
	for _, tt := range []struct {
		name, form string
		dup        bool
		items      int
	}{{"AFFN", "AFFN", false, 12}, {"DIFDUP", "DIF", true, 30}} {
		text := []byte(jcampOf(tableOf(y, tt.form, tt.dup, x, func() int { return tt.items }), 600, 600+points-1, points, 4))
		b.Run(tt.name, func(b *testing.B) {
			b.SetBytes(int64(len(text)))
			b.ReportAllocs()
			for b.Loop() {
				if _, err := ReadJCAMP(bytes.NewReader(text), "pane.jdx"); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(points*float64(b.N)/b.Elapsed().Seconds(), "points/s")
		})
	}
}
