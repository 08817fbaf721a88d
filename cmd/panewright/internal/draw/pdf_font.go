package draw

// How fonts are given to the PDF library: as simple TrueType fonts whose codes beyond ASCII are the
// letters of the document, by name, so that readers find the text again. The library's own way with
// Unicode writes tables of 65 536 characters for each font, which is most of the time of a document.

import (
	"bytes"
	"compress/zlib"
	"encoding/hex"
	"encoding/json"
	"fmt"
	"hash/fnv"
	"math/bits"
	"slices"
	"strconv"
	"strings"

	"github.com/jung-kurt/gofpdf"
)

// A letterSet is a set of characters of the basic plane.
type letterSet [0x10000 / 64]uint64

func (s *letterSet) add(r rune) { s[r>>6&(0x10000/64-1)] |= 1 << (r & 63) }

// list returns the characters in ascending order.
func (s *letterSet) list() (out []rune) {
	for i, word := range s {
		for ; word != 0; word &= word - 1 {
			out = append(out, rune(i<<6+bits.TrailingZeros64(word)))
		}
	}
	return out
}

// Codes below firstCode are ASCII; from there to lastCode they are what a font of the document makes
// them.
const (
	firstCode = 0x80
	lastCode  = 0xff
)

// A pdfFace is one face in a document: one font for each share of its letters beyond ASCII.
type pdfFace struct {
	fonts []string       // families in the library
	at    map[rune]uint8 // which font
	code  map[rune]byte
}

// embed gives the letters of a face to the library.
func (f *font) embed(pdf *gofpdf.Fpdf, name string, letters []rune, w *zlib.Writer) (p pdfFace, err error) {
	p.at, p.code = map[rune]uint8{}, map[rune]byte{}
	beyond, _ := slices.BinarySearch(letters, firstCode)
	ascii, beyondASCII := letters[:beyond], letters[beyond:]
	for len(p.fonts) == 0 || len(beyondASCII) > 0 {
		share := beyondASCII[:min(len(beyondASCII), lastCode-firstCode+1)]
		beyondASCII = beyondASCII[len(share):]
		held := share
		if len(p.fonts) == 0 {
			held = slices.Concat(ascii, share)
		}
		widths := make([]int, lastCode+1)
		for _, r := range ascii {
			widths[r] = f.perMille(f.width(r))
		}
		names := []string{strconv.Itoa(firstCode)}
		for i, r := range share {
			p.at[r], p.code[r] = uint8(len(p.fonts)), byte(firstCode+i)
			widths[firstCode+i] = f.perMille(f.width(r))
			names = append(names, "/"+glyphName(r))
		}
		cut := f.cut(held)
		packed, err := pack(cut, w)
		if err != nil {
			return p, err
		}
		family := name + strconv.Itoa(len(p.fonts))
		definition, err := json.Marshal(map[string]any{
			"Tp": "TrueType", "Name": subsetTag(held) + name, "Cw": widths, "Enc": "cp1252", "Diff": strings.Join(names, " "),
			"File": family + ".z", "OriginalSize": len(cut),
			"Desc": gofpdf.FontDescType{Ascent: f.perMille(f.ascent), Descent: -f.perMille(f.descent), CapHeight: f.perMille(f.capHeight),
				Flags: 32, ItalicAngle: f.italic, StemV: f.stem},
		})
		if err != nil {
			return p, err
		}
		pdf.AddFontFromBytes(family, "", definition, packed)
		p.fonts = append(p.fonts, family)
	}
	return p, nil
}

func (f *font) perMille(em float64) int { return int(em*1000 + 0.5) }

// glyphName names a character by the rules of the Adobe Glyph List.
func glyphName(r rune) string { return fmt.Sprintf("uni%04X", r) }

// subsetTag is six capitals that stand before the name of a font of which a document holds a part
// (ISO 32000-1, 9.6.4).
func subsetTag(letters []rune) string {
	h := fnv.New64a()
	h.Write([]byte(string(letters)))
	tag := []byte(strings.ToUpper(hex.EncodeToString(h.Sum(nil))[:6]))
	for i, c := range tag {
		if c <= '9' {
			tag[i] = c - '0' + 'G'
		}
	}
	return string(tag) + "+"
}

// pack compresses a font; the writer is used again and again, for it is large.
func pack(b []byte, w *zlib.Writer) ([]byte, error) {
	var out bytes.Buffer
	w.Reset(&out)
	_, err := w.Write(b)
	if closing := w.Close(); err == nil {
		err = closing
	}
	return out.Bytes(), err
}

// share returns the beginning of a text that one font of the face holds, in its codes, and how many
// bytes of the text that is.
func (p *pdfFace) share(s string) (family string, codes []byte, n int) {
	font := -1
	for i, r := range s {
		if r < firstCode {
			if font > 0 {
				break // the first font alone holds ASCII
			}
			font = 0
			codes = append(codes, byte(r))
		} else {
			at := int(p.at[r])
			if font >= 0 && at != font {
				break
			}
			font = at
			codes = append(codes, p.code[r])
		}
		n = i + len(string(r))
	}
	return p.fonts[max(font, 0)], codes, n
}
