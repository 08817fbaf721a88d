package draw

// Text: what may be set, sub- and superscripts, widths, lines.

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Sub- and superscripts are set smaller by a factor, and moved by parts of the size of the type.
const (
	scriptSize    = 0.72
	subscriptBy   = 0.16
	superscriptBy = -0.34
)

// A script is the level on which a letter stands.
type script int8

const (
	onLine script = iota
	sub
	super
)

// size and shift return the factor of the size, and the shift downwards as a part of it.
func (s script) size() float64 {
	if s == onLine {
		return 1
	}
	return scriptSize
}

func (s script) shift() float64 {
	switch s {
	case sub:
		return subscriptBy
	case super:
		return superscriptBy
	}
	return 0
}

// A letter is a character on its level.
type letter struct {
	r rune
	script
}

// A run is letters of one level that stand beside each other, x mm from the start of the text.
type run struct {
	s string
	script
	x, width float64
}

// missing stands for a letter that no font has.
const missing = '□'

// letters reads text as its type says, cleaned.
func (t Type) letters(s string) []letter {
	s = clean(s)
	out := make([]letter, 0, len(s))
	level := onLine
	for i := 0; i < len(s); {
		r, n := utf8.DecodeRuneInString(s[i:])
		if t.Markup {
			rest := s[i+n:]
			switch {
			case r == '\\' && rest != "":
				r, i = 0, i+n
				r, n = utf8.DecodeRuneInString(s[i:])
			case r == '_' && level == onLine && strings.HasPrefix(rest, "{"):
				level, i = sub, i+2
				continue
			case r == '^' && level == onLine && strings.HasPrefix(rest, "{"):
				level, i = super, i+2
				continue
			case r == '}' && level != onLine:
				level, i = onLine, i+1
				continue
			}
		}
		out = append(out, letter{r, level})
		i += n
	}
	return out
}

// Escape returns text that with Markup stands as it is without.
func Escape(s string) string { return escaper.Replace(s) }

var escaper = strings.NewReplacer(`\`, `\\`, "_", `\_`, "^", `\^`, "}", `\}`)

// text writes letters as text of a type.
func (t Type) text(letters []letter) string {
	var b strings.Builder
	level := onLine
	to := func(next script) {
		if next == level {
			return
		}
		if level != onLine {
			b.WriteByte('}')
		}
		switch next {
		case sub:
			b.WriteString("_{")
		case super:
			b.WriteString("^{")
		}
		level = next
	}
	for _, l := range letters {
		to(l.script)
		if t.Markup {
			b.WriteString(Escape(string(l.r)))
		} else {
			b.WriteRune(l.r)
		}
	}
	to(onLine)
	return b.String()
}

// clean returns text of one line that may be set: valid UTF-8 without control characters and
// without those that turn the direction of writing.
func clean(s string) string {
	plain := true
	for i := 0; i < len(s) && plain; i++ {
		plain = s[i] >= ' ' && s[i] < 0x7f
	}
	if plain {
		return s
	}
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\n' || r == '\t' || r == '\r' || r == '\v' || r == '\f' || r == '\u0085' || r == '\u2028' || r == '\u2029':
			return ' '
		case unicode.Is(unicode.Cc, r) || unicode.Is(unicode.Cf, r):
			return -1
		case r >= 0xfe00 && r <= 0xfe0f || r == 0xfffe || r == 0xffff: // variants of a letter; no letters
			return -1
		}
		return r // what is no UTF-8 comes as U+FFFD
	}, s)
}

// drawn returns the letter that stands for one that the font may not have.
func (f *font) drawn(r rune) rune {
	switch {
	case r >= ' ' && r < 0x7f && f.asciiWidth[r] > 0: // without a search
		return r
	case f.glyph(r) != 0:
		return r
	case unicode.Is(unicode.Zs, r):
		return ' '
	}
	return missing
}

// width returns the width of a letter in mm.
func (t Type) width(f *font, l letter) float64 {
	return f.width(f.drawn(l.r)) * l.size() * t.MM()
}

// set breaks text into runs, and remembers what letters are missing.
func (c *Canvas) set(s string, t Type) (runs []run, width float64) {
	f := t.Face.font()
	var b strings.Builder
	level, start := onLine, 0.0
	end := func() {
		if b.Len() > 0 {
			runs = append(runs, run{b.String(), level, start, width - start})
			b.Reset()
		}
		start = width
	}
	for _, l := range t.letters(s) {
		if l.script != level {
			end()
			level = l.script
		}
		r := f.drawn(l.r)
		if r == missing && l.r != missing {
			if at, found := slices.BinarySearch(c.replaced, l.r); !found {
				c.replaced = slices.Insert(c.replaced, at, l.r)
			}
		}
		b.WriteRune(r)
		width += f.width(r) * level.size() * t.MM()
	}
	end()
	return runs, width
}

// Width returns the width of a line of text in mm.
func Width(s string, t Type) float64 {
	f, sum := t.Face.font(), 0.0
	for _, l := range t.letters(s) {
		sum += t.width(f, l)
	}
	return sum
}

// CapHeight returns the height of capital letters in mm.
func (t Type) CapHeight() float64 { return t.Face.font().capHeight * t.MM() }

// Leading returns the distance of lines in mm.
func (t Type) Leading() float64 { return 1.28 * t.MM() }

// The reach of letters above and below the baseline, of the size: accents aside.
const (
	ascender  = 0.74
	descender = 0.21
)

// Box returns the rectangle that a line of text covers when it stands at a point; turned text
// may be turned by multiples of 90° only.
func Box(x, y float64, s string, t Type) Rect { return box(x, y, Width(s, t), t) }

func box(x, y, w float64, t Type) Rect {
	r := Rect{0, -ascender * t.MM(), w, (ascender + descender) * t.MM()}
	switch t.Align {
	case Centre:
		r.X = -w / 2
	case Right:
		r.X = -w
	}
	for turn := t.Turn; turn > 45; turn -= 90 {
		r = Rect{r.Y, -r.Right(), r.H, r.W}
	}
	for turn := t.Turn; turn < -45; turn += 90 {
		r = Rect{-r.Bottom(), r.X, r.H, r.W}
	}
	r.X, r.Y = r.X+x, r.Y+y
	return r
}

// Wrap breaks text into lines of at most a width in mm, at blanks; a word that is longer than a
// line is broken after a hyphen, a slash, a point or an underline in it, else wherever the line
// ends. No-break spaces hold. Of no text it makes no line.
func Wrap(s string, width float64, t Type) (lines []string) {
	f := t.Face.font()
	letters := t.letters(s)
	for start := 0; ; {
		for start < len(letters) && letters[start].r == ' ' {
			start++
		}
		if start == len(letters) {
			return lines
		}
		end := f.lineEnd(letters, start, width, t)
		last := end
		for last > start && letters[last-1].r == ' ' {
			last--
		}
		lines = append(lines, t.text(letters[start:last]))
		start = end
	}
}

// lineEnd returns where the line that begins with letter start ends.
func (f *font) lineEnd(letters []letter, start int, width float64, t Type) int {
	blank, joint, sum := 0, 0, 0.0
	for i := start; i < len(letters); i++ {
		l := letters[i]
		if l.r == ' ' {
			blank = i
		}
		sum += t.width(f, l)
		if sum > width+slack && l.r != ' ' {
			switch {
			case blank > 0:
				return blank
			case joint > 0:
				return joint
			}
			return max(i, start+1)
		}
		if strings.ContainsRune("-‐–/._|", l.r) && i > start {
			joint = i + 1
		}
	}
	return len(letters)
}

// slack forgives the last bits of sums of widths.
const slack = 1e-6

// Fit returns text cut to a width in mm, with an ellipsis where something was cut off.
func Fit(s string, width float64, t Type) string {
	if Width(s, t) <= width+slack {
		return s
	}
	f := t.Face.font()
	letters := t.letters(s)
	room := width - f.width('…')*t.MM()
	for i, l := range letters {
		if room -= t.width(f, l); room < 0 {
			letters = letters[:i]
			break
		}
	}
	for len(letters) > 0 && letters[len(letters)-1].r == ' ' {
		letters = letters[:len(letters)-1]
	}
	return t.text(append(letters, letter{r: '…'}))
}

// latinSymbol splits symbols that begin with letters which begin words too; others have no index.
func latinSymbol(s string) (base, index string) {
	switch s {
	case "fRsi":
		return "f", "Rsi"
	case "PDpr":
		return "PD", "pr"
	case "vf":
		return "v", "f"
	}
	return s, ""
}

// Symbol writes the symbol of a figure as markup, its index below the line: "ρv′" becomes
// "ρ_{v}′", "ΔTs" becomes "ΔT_{s}". Symbols without index stay.
func Symbol(s string) string {
	if base, index := latinSymbol(s); index != "" {
		return base + "_{" + index + "}"
	}
	var b strings.Builder
	letters := []rune(s)
	for i := 0; i < len(letters); i++ {
		r := letters[i]
		b.WriteString(Escape(string(r)))
		switch difference := i > 0 && letters[i-1] == 'Δ'; {
		case difference && (r == 'T' || r == 't'):
		case !strings.ContainsRune("ταρεθφUhqR", r) || (i > 0 && unicode.IsLetter(letters[i-1])):
			continue
		}
		from := i + 1
		for i+1 < len(letters) && (unicode.IsLower(letters[i+1]) || unicode.IsDigit(letters[i+1]) || (letters[i+1] == ',' && i+1 > from)) {
			i++
		}
		if i >= from {
			b.WriteString("_{" + Escape(string(letters[from:i+1])) + "}")
		}
	}
	return b.String()
}
