package draw

// Cuts of fonts: TrueType fonts that hold the letters of one document, to be embedded in it.

import (
	"encoding/binary"
	"slices"
)

// cut returns a font that holds given characters of the basic plane, in ascending order, and those
// parts of the tables that their outlines need. It is much smaller than the whole, which a document
// takes long to read. Each character has an outline of its own.
func (f *font) cut(characters []rune) []byte {
	u16, put16, put32 := binary.BigEndian.Uint16, binary.BigEndian.AppendUint16, binary.BigEndian.AppendUint32

	glyphs := []int{0} // of the whole font, by the number in the cut
	for _, r := range characters {
		glyphs = append(glyphs, f.glyph(r))
	}
	parts := map[int]int{} // outlines that others are made of, by number in the whole font
	var glyf, loca, hmtx []byte
	for i := 0; i < len(glyphs); i++ { // grows
		loca = put32(loca, uint32(len(glyf)))
		outline := slices.Clone(f.outline(glyphs[i]))
		for _, at := range components(outline) {
			part := int(u16(outline[at:]))
			if _, ok := parts[part]; !ok {
				parts[part] = len(glyphs)
				glyphs = append(glyphs, part)
			}
			binary.BigEndian.PutUint16(outline[at:], uint16(parts[part]))
		}
		glyf = padded(append(glyf, outline...))
		hmtx = append(hmtx, f.metric(glyphs[i])...)
	}
	loca = put32(loca, uint32(len(glyf)))

	head := slices.Clone(f.tables["head"])
	binary.BigEndian.PutUint16(head[50:], 1) // long offsets
	hhea := slices.Clone(f.tables["hhea"])
	binary.BigEndian.PutUint16(hhea[34:], uint16(len(glyphs)))
	maxp := slices.Clone(f.tables["maxp"])
	binary.BigEndian.PutUint16(maxp[4:], uint16(len(glyphs)))
	post := glyphNames(f.tables["post"][4:32], characters, len(glyphs))
	name := []byte{0, 0, 0, 0, 0, 6} // no names

	tables := []struct {
		name string
		data []byte
	}{
		{"OS/2", f.tables["OS/2"]}, {"cmap", characterMap(characters)}, {"glyf", glyf}, {"head", head}, {"hhea", hhea},
		{"hmtx", hmtx}, {"loca", loca}, {"maxp", maxp}, {"name", name}, {"post", post},
	}
	size := 12 + 16*len(tables)
	for _, t := range tables {
		size += len(t.data) + 3
	}
	out := put32(make([]byte, 0, size), 0x00010000)
	for _, v := range []uint16{uint16(len(tables)), 128, 3, uint16(16*len(tables) - 128)} { // 8 is the greatest power of two below 10
		out = put16(out, v)
	}
	at := 12 + 16*len(tables)
	for _, t := range tables {
		out = append(out, t.name...)
		out = put32(out, 0) // a sum that no reader of embedded fonts looks at
		out = put32(out, uint32(at))
		out = put32(out, uint32(len(t.data)))
		at += len(t.data) + (4-len(t.data)%4)%4
	}
	for _, t := range tables {
		out = padded(append(out, t.data...))
	}
	return out
}

func padded(b []byte) []byte {
	for len(b)%4 != 0 {
		b = append(b, 0)
	}
	return b
}

// glyphNames returns the table that names glyphs, in format 2, with a head: that of no character,
// then the characters, then parts of them, which have no name.
func glyphNames(head []byte, characters []rune, glyphs int) []byte {
	const standard = 258 // names that need no spelling; the first is .notdef
	put := binary.BigEndian.AppendUint16
	b := append(binary.BigEndian.AppendUint32(nil, 0x00020000), head...)
	b = put(put(b, uint16(glyphs)), 0)
	var spelled []byte
	for i := range glyphs - 1 {
		if i >= len(characters) {
			b = put(b, 0)
			continue
		}
		name := glyphName(characters[i])
		b = put(b, uint16(standard+i))
		spelled = append(append(spelled, byte(len(name))), name...)
	}
	return append(b, spelled...)
}

// metric returns the width and left bearing of a glyph as the font stores them.
func (f *font) metric(glyph int) []byte {
	hmtx := f.tables["hmtx"]
	if glyph < f.metrics {
		return hmtx[4*glyph : 4*glyph+4]
	}
	bearing := 4*f.metrics + 2*(glyph-f.metrics)
	return append(slices.Clone(hmtx[4*f.metrics-4:4*f.metrics-2]), hmtx[bearing:bearing+2]...)
}

// characterMap maps ascending characters to the glyphs 1, 2, 3 … in format 4.
func characterMap(characters []rune) []byte {
	put := binary.BigEndian.AppendUint16
	var starts, ends, deltas []uint16
	for i, r := range characters {
		if n := len(ends); n > 0 && ends[n-1]+1 == uint16(r) {
			ends[n-1] = uint16(r)
			continue
		}
		starts, ends, deltas = append(starts, uint16(r)), append(ends, uint16(r)), append(deltas, uint16(i+1)-uint16(r))
	}
	starts, ends, deltas = append(starts, 0xffff), append(ends, 0xffff), append(deltas, 1)
	n := len(ends)
	search, power := 2, 0
	for 2*search <= 2*n {
		search, power = 2*search, power+1
	}
	b := []byte{0, 0, 0, 1, 0, 3, 0, 1, 0, 0, 0, 12} // one map: Microsoft, Unicode
	for _, v := range []int{4, 16 + 8*n, 0, 2 * n, search, power, 2*n - search} {
		b = put(b, uint16(v))
	}
	for _, list := range [][]uint16{ends, {0}, starts, deltas, make([]uint16, n)} {
		for _, v := range list {
			b = put(b, v)
		}
	}
	return b
}
