package draw

// The embedded fonts: which letters they have, how wide these are, and cuts of the fonts that hold
// the letters of one document.

import (
	"embed"
	"encoding/binary"
	"fmt"
	"slices"
	"sync"
)

// Source Sans 3 as its makers give it out, unedited; its licence lies beside it.
//
//go:embed fonts/*.ttf
var fontFiles embed.FS

// fontNames are the files of the faces.
var fontNames = [faces]string{Regular: "SourceSans3-Regular.ttf", Semibold: "SourceSans3-Semibold.ttf", Italic: "SourceSans3-It.ttf"}

// A font is a TrueType font: its tables as they are, and what the layout of text needs of them.
type font struct {
	tables     map[string][]byte
	em         float64 // units of an em
	glyphs     int
	longLoca   bool
	metrics    int // glyphs with a width of their own
	segments   []segment
	glyphIDs   []byte // of the segments that list theirs
	capHeight  float64
	ascent     float64 // of an em, as the descent below the baseline
	descent    float64
	asciiWidth [128]float64 // of an em
	italic     int          // degrees, negative to the right
	stem       int          // width of upright stems, of a thousandth of an em
}

// A segment is a range of characters of the table that maps them to glyphs (format 4).
type segment struct {
	first, last uint16
	delta       uint16
	at          int // in the list of glyphs, or -1
}

// theFonts reads each face once.
var theFonts = [faces]func() *font{
	Regular:  sync.OnceValue(func() *font { return mustReadFont(Regular) }),
	Semibold: sync.OnceValue(func() *font { return mustReadFont(Semibold) }),
	Italic:   sync.OnceValue(func() *font { return mustReadFont(Italic) }),
}

func (f Face) font() *font {
	if f < 0 || f >= faces {
		f = Regular
	}
	return theFonts[f]()
}

func mustReadFont(f Face) *font {
	b, err := fontFiles.ReadFile("fonts/" + fontNames[f])
	if err != nil {
		panic("draw: " + err.Error())
	}
	out, err := readFont(b)
	if err != nil {
		panic("draw: " + fontNames[f] + ": " + err.Error())
	}
	return out
}

// readFont reads a TrueType font; numbers are big-endian (ISO/IEC 14496-22).
func readFont(b []byte) (*font, error) {
	u16 := binary.BigEndian.Uint16
	f := &font{tables: map[string][]byte{}}
	if len(b) < 12 || binary.BigEndian.Uint32(b) != 0x00010000 {
		return nil, fmt.Errorf("no TrueType font")
	}
	for i := range int(u16(b[4:])) {
		row := b[12+16*i:]
		from, size := binary.BigEndian.Uint32(row[8:]), binary.BigEndian.Uint32(row[12:])
		f.tables[string(row[:4])] = b[from : from+size : from+size] // appending copies
	}
	for _, name := range []string{"head", "hhea", "hmtx", "maxp", "cmap", "loca", "glyf", "OS/2", "post", "name"} {
		if f.tables[name] == nil {
			return nil, fmt.Errorf("table %s is missing", name)
		}
	}
	head, hhea := f.tables["head"], f.tables["hhea"]
	f.em = float64(u16(head[18:]))
	f.longLoca = u16(head[50:]) == 1
	f.glyphs = int(u16(f.tables["maxp"][4:]))
	f.metrics = int(u16(hhea[34:]))
	f.ascent = float64(int16(u16(hhea[4:]))) / f.em
	f.descent = -float64(int16(u16(hhea[6:]))) / f.em
	f.capHeight = float64(int16(u16(f.tables["OS/2"][88:]))) / f.em
	f.italic = int(int16(u16(f.tables["post"][4:])))
	f.stem = stems[u16(f.tables["OS/2"][4:])]
	if err := f.readCharacters(); err != nil {
		return nil, err
	}
	for r := range f.asciiWidth {
		f.asciiWidth[r] = f.advance(f.glyph(rune(r)))
	}
	return f, nil
}

// stems are the widths of stems by weight, measured on the letter l.
var stems = map[uint16]int{400: 84, 600: 124}

// readCharacters reads the map of the basic plane, of format 4.
func (f *font) readCharacters() error {
	u16 := binary.BigEndian.Uint16
	cmap := f.tables["cmap"]
	for i := range int(u16(cmap[2:])) {
		row := cmap[4+8*i:]
		sub := cmap[binary.BigEndian.Uint32(row[4:]):]
		if u16(row) != 3 || u16(row[2:]) != 1 || u16(sub) != 4 {
			continue
		}
		n := int(u16(sub[6:])) / 2
		ends, starts := sub[14:], sub[16+2*n:]
		deltas, offsets := starts[2*n:], starts[4*n:]
		f.glyphIDs = offsets
		for s := range n {
			x := segment{u16(starts[2*s:]), u16(ends[2*s:]), u16(deltas[2*s:]), -1}
			if o := int(u16(offsets[2*s:])); o != 0 {
				x.at = 2*s + o
			}
			f.segments = append(f.segments, x)
		}
		return nil
	}
	return fmt.Errorf("no map of characters in format 4")
}

// glyph returns the glyph of a character, or 0 where the font has none.
func (f *font) glyph(r rune) int {
	if r < 0 || r >= 0xffff {
		return 0
	}
	i, _ := slices.BinarySearchFunc(f.segments, uint16(r), func(s segment, r uint16) int { return int(s.last) - int(r) })
	if i == len(f.segments) || f.segments[i].first > uint16(r) {
		return 0
	}
	s := f.segments[i]
	if s.at < 0 {
		return int(uint16(r) + s.delta)
	}
	g := binary.BigEndian.Uint16(f.glyphIDs[s.at+2*int(uint16(r)-s.first):])
	if g == 0 {
		return 0
	}
	return int(g + s.delta)
}

// advance returns the width of a glyph, of an em.
func (f *font) advance(glyph int) float64 {
	return float64(binary.BigEndian.Uint16(f.tables["hmtx"][4*min(glyph, f.metrics-1):])) / f.em
}

// width returns the width of a character, of an em.
func (f *font) width(r rune) float64 {
	if r >= 0 && r < 128 {
		return f.asciiWidth[r]
	}
	return f.advance(f.glyph(r))
}

// outline returns the outline of a glyph as the font stores it.
func (f *font) outline(glyph int) []byte {
	loca := f.tables["loca"]
	if f.longLoca {
		return f.tables["glyf"][binary.BigEndian.Uint32(loca[4*glyph:]):binary.BigEndian.Uint32(loca[4*glyph+4:])]
	}
	return f.tables["glyf"][2*int(binary.BigEndian.Uint16(loca[2*glyph:])) : 2*int(binary.BigEndian.Uint16(loca[2*glyph+2:]))]
}

// The flags of a component of a glyph that is made of others.
const (
	componentWords    = 0x0001
	componentScale    = 0x0008
	componentMore     = 0x0020
	componentXYScale  = 0x0040
	componentTwoByTwo = 0x0080
)

// components returns where in an outline the numbers of the glyphs stand that it is made of.
func components(outline []byte) (at []int) {
	if len(outline) < 10 || int16(binary.BigEndian.Uint16(outline)) >= 0 {
		return nil
	}
	for i := 10; ; {
		flags := binary.BigEndian.Uint16(outline[i:])
		at = append(at, i+2)
		i += 6
		if flags&componentWords != 0 {
			i += 2
		}
		switch {
		case flags&componentScale != 0:
			i += 2
		case flags&componentXYScale != 0:
			i += 4
		case flags&componentTwoByTwo != 0:
			i += 8
		}
		if flags&componentMore == 0 {
			return at
		}
	}
}
