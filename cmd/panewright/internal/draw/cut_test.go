package draw

import (
	"bytes"
	"slices"
	"testing"
)

// A cut reads like the font it is cut from: the same widths and outlines for its letters, none for
// others.
func TestCut(t *testing.T) {
	for f := range faces {
		whole := f.font()
		letters := []rune(" 0AaWz¼Å°²×éČτω′−→□Жя")
		slices.Sort(letters)
		part, err := readFont(whole.cut(letters))
		if err != nil {
			t.Fatal(err)
		}
		for i, r := range letters {
			if g := part.glyph(r); g != i+1 {
				t.Errorf("face %d: %q is glyph %d of the cut, want %d", f, r, g, i+1)
			}
			if part.width(r) != whole.width(r) {
				t.Errorf("face %d: %q is %g wide in the cut, want %g", f, r, part.width(r), whole.width(r))
			}
			sameOutline(t, whole, part, whole.glyph(r), part.glyph(r))
		}
		for _, r := range "BЯσ\u2264" {
			if part.glyph(r) != 0 {
				t.Errorf("face %d: the cut has %q", f, r)
			}
		}
		if part.capHeight != whole.capHeight || part.em != whole.em {
			t.Errorf("face %d: the cut is of another size", f)
		}
	}
}

// sameOutline compares outlines, and those that they are made of.
func sameOutline(t *testing.T, a, b *font, ga, gb int) {
	t.Helper()
	oa, ob := bytes.Clone(a.outline(ga)), bytes.Clone(b.outline(gb))
	pa, pb := components(oa), components(ob)
	if len(pa) != len(pb) {
		t.Fatalf("glyph %d is made of %d parts, its copy of %d", ga, len(pa), len(pb))
	}
	for i, at := range pa {
		ia, ib := int(oa[at])<<8|int(oa[at+1]), int(ob[at])<<8|int(ob[at+1])
		sameOutline(t, a, b, ia, ib)
		oa[at], oa[at+1], ob[pb[i]], ob[pb[i]+1] = 0, 0, 0, 0
	}
	if !bytes.Equal(oa, bytes.TrimRight(ob, "\x00")) && !bytes.Equal(oa, ob[:min(len(oa), len(ob))]) {
		t.Errorf("the outline of glyph %d differs", ga)
	}
}

// Damaged fonts are refused, not read beyond their end.
func TestReadFontDamaged(t *testing.T) {
	for _, b := range [][]byte{nil, []byte("OTTO and more bytes"), make([]byte, 40), {0, 1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0}} {
		if _, err := readFont(b); err == nil {
			t.Errorf("%d bytes are read as a font", len(b))
		}
	}
}

func FuzzMarkup(f *testing.F) {
	for _, s := range []string{"τ_{v}", `a\_{b}^{2`, "}{_^", "\xff\\"} {
		f.Add(s, true, 20.0)
	}
	f.Fuzz(func(t *testing.T, s string, markup bool, width float64) {
		typ := Type{Size: 8, Markup: markup}
		if !(width > 0 && width < 200) {
			width = 10
		}
		c := New(100, 100)
		for _, line := range Wrap(s, width, typ) {
			c.Text(10, 10, line, typ)
		}
		c.Text(10, 20, Fit(s, width, typ), typ)
		if _, err := SVG(c, s, s); err != nil {
			t.Fatal(err)
		}
		if _, err := PDF(Document{Title: s, Pages: []*Canvas{c}, Plain: true}); err != nil {
			t.Fatal(err)
		}
	})
}
