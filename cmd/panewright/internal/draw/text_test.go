package draw

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"strconv"
	"strings"
	"testing"
	"unicode"

	"github.com/jung-kurt/gofpdf"
	"pgregory.net/rapid"

	"panewright/glazing"
)

// Every letter of every string in the program's own source is in every font: symbols, units, words.
func TestFontsHaveWhatIsPrinted(t *testing.T) {
	root := "."
	for {
		if _, err := os.Stat(filepath.Join(root, "go.mod")); err == nil {
			break
		}
		root = filepath.Join(root, "..")
	}
	seen := map[rune]string{}
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			if d != nil && strings.HasPrefix(d.Name(), ".") && len(d.Name()) > 2 {
				return fs.SkipDir
			}
			return err
		}
		if !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return nil
		}
		file, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.SkipObjectResolution)
		if err != nil {
			t.Logf("%s is left out: %v", path, err)
			return nil
		}
		ast.Inspect(file, func(n ast.Node) bool {
			if lit, ok := n.(*ast.BasicLit); ok && (lit.Kind == token.STRING || lit.Kind == token.CHAR) {
				s, err := strconv.Unquote(lit.Value)
				if err == nil {
					for _, r := range clean(s) {
						seen[r] = path + ": " + lit.Value
					}
				}
			}
			return true
		})
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	for _, list := range [][]glazing.Figure{glazing.Figures(), glazing.InchPound(glazing.Figures())} {
		for _, f := range list {
			for _, r := range f.Symbol + f.Mark + f.Unit + f.Clause + f.Meaning {
				seen[r] = "the figure " + f.Key
			}
		}
	}
	for _, r := range "−′ετρα λΣΔ₂→≤°·×√□…–—’“”‑ ⁻¹²³½µΩ±≥≠≈" {
		seen[r] = "the list in this test"
	}
	for _, r := range "＝＋－＠\u212b" { // signs that are read and never printed
		delete(seen, r)
	}
	if len(seen) < 100 {
		t.Fatalf("%d letters were found", len(seen))
	}
	for r, where := range seen {
		for f := range faces {
			if f.font().glyph(r) == 0 && r != unicode.ReplacementChar && r != 0xffff {
				t.Errorf("face %d lacks %q (%U) of %.80s", f, r, r, where)
			}
		}
	}
}

// Widths agree with those that the PDF library reads from the same files, to its rounding.
func TestWidthsAsTheLibraryReadsThem(t *testing.T) {
	f := gofpdf.New("P", "mm", "A4", "")
	f.AddPage()
	for face, name := range fontNames {
		b, err := fontFiles.ReadFile("fonts/" + name)
		if err != nil {
			t.Fatal(err)
		}
		f.AddUTF8FontFromBytes(name, "", append([]byte(nil), b...))
		f.SetFont(name, "", 10)
		for _, s := range []string{"Light transmittance", "0123456789", "τρεα λΣΔ₂→≤°·×√−′", "Ткацкий зал", "WAVE – “ff” ŁŻ", "mill-soft-6 (turned)"} {
			got, want := Width(s, Type{Face: Face(face), Size: 10}), f.GetStringWidth(s)
			if math.Abs(got-want) > 0.0005*10*mmPerPoint*float64(len([]rune(s))) {
				t.Errorf("%s: %q is %.4f mm wide, the library reads %.4f", name, s, got, want)
			}
		}
	}
	if err := f.Error(); err != nil {
		t.Fatal(err)
	}
}

// All digits of a face have one width, so that columns of numbers line up.
func TestDigitsHaveOneWidth(t *testing.T) {
	for f := range faces {
		for d := '1'; d <= '9'; d++ {
			if f.font().width(d) != f.font().width('0') {
				t.Errorf("face %d: %c is not as wide as 0", f, d)
			}
		}
	}
}

func TestSymbol(t *testing.T) {
	for in, want := range map[string]string{
		"τv": "τ_{v}", "ρv′": "ρ_{v}′", "αe": "α_{e}", "qi": "q_{i}", "g": "g", "Ug": "U_{g}", "hi": "h_{i}", "Ra": "R_{a}", "SC": "SC",
		"τv/g": "τ_{v}/g", "τdf,700": "τ_{df,700}", "Nu": "Nu", "Gr·Pr": "Gr·Pr", "ΔT": "ΔT", "L*": "L*", "εn": "ε_{n}", "θsi": "θ_{si}", "θmax": "θ_{max}", "φedge": "φ_{edge}", "ΔTs": "ΔT_{s}", "Δtpr": "Δt_{pr}",
		"PDpr": "PD_{pr}", "fRsi": "f_{Rsi}", "vf": "v_{f}", "ERF": "ERF", "qin": "q_{in}", "E·τe": "E·τ_{e}", "Δq": "Δq", "pane": "pane", "tilt": "tilt", "steps": "steps", "Λ": "Λ", "d": "d", "": "", "τ": "τ",
	} {
		if got := Symbol(in); got != want {
			t.Errorf("Symbol(%q) = %q, want %q", in, got, want)
		}
	}
}

// Worked by hand: three letters on the line, one below it at 0.72 of the size, one above.
func TestMarkup(t *testing.T) {
	c := New(100, 100)
	typ := Type{Size: 10, Markup: true}
	c.Text(0, 10, `a_{b}c^{2}\_{x}_`, typ)
	var got []string
	for _, r := range c.ops[0].runs {
		got = append(got, strconv.Itoa(int(r.script))+r.s)
	}
	if want := []string{"0a", "1b", "0c", "22", "0_{x}_"}; !reflect.DeepEqual(got, want) {
		t.Errorf("runs %q, want %q", got, want)
	}
	plain := Type{Size: 10}
	sum := Width("ac_{x}_", plain) + 0.72*(Width("b2", plain))
	if w := Width(`a_{b}c^{2}\_{x}_`, typ); math.Abs(w-sum) > 1e-9 {
		t.Errorf("width %g, want %g", w, sum)
	}
}

// Without markup, and after Escape with it, text stands as it is.
func TestEscape(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.StringOf(rapid.SampledFrom([]rune(`ab_^{}\ τ`))).Draw(t, "s")
		a, b := Type{}.letters(s), Type{Markup: true}.letters(Escape(s))
		if !reflect.DeepEqual(a, b) {
			t.Fatalf("%q escaped is read as %v, want %v", s, b, a)
		}
	})
}

// Lines are no wider than asked, but for single letters; letters other than blanks at the ends of
// lines are kept in their order and on their level.
func TestWrap(t *testing.T) {
	alphabet := []rune("abcdeWWm     -/._\\^{}τ\u00a0漢")
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.StringOfN(rapid.SampledFrom(alphabet), 0, 60, -1).Draw(t, "s")
		width := rapid.Float64Range(1, 30).Draw(t, "width")
		typ := Type{Size: 9, Markup: rapid.Bool().Draw(t, "markup")}
		var kept []letter
		for _, line := range Wrap(s, width, typ) {
			letters := typ.letters(line)
			if Width(line, typ) > width+1e-6 && len(letters) > 1 {
				t.Fatalf("line %q is %g mm wide, over %g", line, Width(line, typ), width)
			}
			if len(letters) == 0 || letters[0].r == ' ' || letters[len(letters)-1].r == ' ' {
				t.Fatalf("line %q begins or ends with a blank, or is none", line)
			}
			kept = append(kept, letters...)
		}
		drop := func(list []letter) (out []letter) {
			for _, l := range list {
				if l.r != ' ' {
					out = append(out, l)
				}
			}
			return out
		}
		if !reflect.DeepEqual(drop(kept), drop(typ.letters(s))) {
			t.Fatalf("%q is broken into lines with %v", s, kept)
		}
	})
}

func TestWrapAtJoints(t *testing.T) {
	typ := Type{Size: 9}
	for _, tt := range []struct {
		s    string
		wide string // text of the width of lines
		want []string
	}{
		{"one two three", "one two", []string{"one two", "three"}},
		{"one  two", "two", []string{"one", "two"}},
		{"hall-low-e-6", "hall-low", []string{"hall-", "low-e-6"}},
		{"a hall-low-e-6", "hall-low-e-6", []string{"a", "hall-low-e-6"}},
		{"mmmmmm", "mmmm", []string{"mmmm", "mm"}},
		{"16\u00a0mm argon", "16 mm", []string{"16\u00a0mm", "argon"}},
		{"", "m", nil},
		{"   ", "m", nil},
	} {
		if got := Wrap(tt.s, Width(tt.wide, typ)+0.01, typ); !reflect.DeepEqual(got, tt.want) {
			t.Errorf("Wrap(%q, width of %q) = %q, want %q", tt.s, tt.wide, got, tt.want)
		}
	}
}

func TestFit(t *testing.T) {
	typ := Type{Size: 9}
	if got := Fit("short", 50, typ); got != "short" {
		t.Errorf("what fits comes back as %q", got)
	}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.StringOfN(rapid.SampledFrom([]rune("abW m_τ")), 1, 40, -1).Draw(t, "s")
		width := rapid.Float64Range(4, 30).Draw(t, "width")
		if got := Fit(s, width, typ); Width(got, typ) > width+1e-6 {
			t.Fatalf("Fit(%q, %g) = %q, %g mm wide", s, width, got, Width(got, typ))
		}
	})
}

// A box turned by a right angle is the box, turned.
func TestBox(t *testing.T) {
	typ := Type{Size: 10}
	w := Width("abc", typ)
	up, down := ascender*typ.MM(), descender*typ.MM()
	for _, tt := range []struct {
		align Align
		turn  float64
		want  Rect
	}{
		{Left, 0, Rect{50, 50 - up, w, up + down}},
		{Centre, 0, Rect{50 - w/2, 50 - up, w, up + down}},
		{Right, 0, Rect{50 - w, 50 - up, w, up + down}},
		{Left, 90, Rect{50 - up, 50 - w, up + down, w}},
		{Right, 90, Rect{50 - up, 50, up + down, w}},
		{Left, -90, Rect{50 - down, 50, up + down, w}},
		{Left, 180, Rect{50 - w, 50 - down, w, up + down}},
	} {
		typ.Align, typ.Turn = tt.align, tt.turn
		got := Box(50, 50, "abc", typ)
		for i, d := range []float64{got.X - tt.want.X, got.Y - tt.want.Y, got.W - tt.want.W, got.H - tt.want.H} {
			if math.Abs(d) > 1e-9 {
				t.Errorf("align %d, turned %g°: %v, want %v (%d)", tt.align, tt.turn, got, tt.want, i)
			}
		}
	}
}

func TestClean(t *testing.T) {
	for in, want := range map[string]string{
		"a\nb\tc":                  "a b c",
		"\x00a\x1b[31mb\x7f\u009b": "a[31mb",
		"a\u202eb\u2066c\u200f\u200bd\u00ade\ufeff": "abcde",
		"bad \xff\xfe utf-8":                        "bad \ufffd\ufffd utf-8",
		"é ὑ Ж 漢":                                   "é ὑ Ж 漢",
		"a\u2028b":                                  "a b",
		"text\ufe0f":                                "text",
		"\ufffe\uffff":                              "",
	} {
		if got := clean(in); got != want {
			t.Errorf("clean(%q) = %q, want %q", in, got, want)
		}
	}
}
