package sheet

// Nothing on a page overlaps, leaves it or is lost, whatever the project.

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"unicode"

	"pgregory.net/rapid"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// A failing says what is wrong.
type failing interface {
	Errorf(format string, args ...any)
}

// checkPages checks the geometry of pages: texts keep off each other, off rules and within the
// margins, and only the foot and the names of who signs stand below the bottom.
func checkPages(t testing.TB, f failing, name string, pages []*draw.Canvas) {
	t.Helper()
	const touch = 0.12 // mm by which letters of neighbouring texts may touch
	margins := draw.Rect{X: left, Y: top - 3, W: width, H: pageH - 6 - top + 3}
	for i, c := range pages {
		texts, lines := onPage(t, c)
		if len(texts) < 4 {
			f.Errorf("%s, page %d has %d texts", name, i+1, len(texts))
		}
		slices.SortStableFunc(texts, func(a, b placed) int { return int(math.Copysign(1, a.box.Y-b.box.Y)) })
		for k, x := range texts {
			if !margins.Holds(x.box, 0.1) {
				f.Errorf("%s, page %d: %.60q leaves the margins: %.2f", name, i+1, x.text, x.box)
			}
			if x.base > bottom+0.5 && x.base < bottom+7 {
				f.Errorf("%s, page %d: %.60q stands in the room of who signs", name, i+1, x.text)
			}
			for _, y := range texts[k+1:] {
				if y.box.Y > x.box.Bottom() {
					break
				}
				if x.box.Inset(touch, touch).Overlaps(y.box.Inset(touch, touch)) {
					f.Errorf("%s, page %d: %.60q %.2f and %.60q %.2f overlap", name, i+1, x.text, x.box, y.text, y.box)
				}
			}
			for _, l := range lines {
				if l.wide != hair.Width && l.wide != rule.Width || l.from.Y != l.to.Y {
					continue // of a drawing
				}
				if l.from.Y > x.box.Y+0.2 && l.from.Y < x.base-0.1 && l.from.X < x.box.Right() && l.to.X > x.box.X {
					f.Errorf("%s, page %d: a rule strikes through %.60q", name, i+1, x.text)
				}
			}
		}
		checkBottom(f, fmt.Sprintf("%s, page %d", name, i+1), texts)
	}
}

// checkBottom checks that no heading stands alone above the bottom: below it stands what it heads.
func checkBottom(f failing, name string, texts []placed) {
	headMM := headType.MM()
	for _, x := range texts {
		if !x.bold || math.Abs(x.size-headMM) > 0.001 || x.base > bottom {
			continue
		}
		if !slices.ContainsFunc(texts, func(y placed) bool {
			return y.base > x.base && y.base < bottom+0.5 && y.box.Right() > x.box.X && y.box.X < x.box.Right()+half
		}) {
			f.Errorf("%s: nothing stands below the heading %q", name, x.text)
		}
	}
}

// body returns the texts of pages between heads and feet, one after the other without blanks.
func body(t testing.TB, pages []*draw.Canvas) string {
	t.Helper()
	var b strings.Builder
	for _, c := range pages {
		texts, _ := onPage(t, c)
		from := 0.0
		if slices.ContainsFunc(texts, func(x placed) bool { return x.base < top+1 && strings.HasSuffix(x.text, ", continued") }) {
			from = top + 1
		}
		for _, x := range texts {
			if x.base > from && x.base < bottom+1 {
				b.WriteString(x.text)
			}
		}
	}
	return tight(b.String())
}

// tight leaves out blanks and what is never drawn, and puts the mark of a missing letter for those
// beyond the font.
func tight(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case unicode.IsSpace(r), unicode.Is(unicode.Cc, r), unicode.Is(unicode.Cf, r):
			return -1
		case unicode.In(r, unicode.Hebrew, unicode.Arabic, unicode.Han), r > 0xffff:
			return '□'
		}
		return r
	}, s)
}

// checkFull checks that what the user said stands in full somewhere.
func checkFull(t testing.TB, f failing, name string, pages []*draw.Canvas, said ...string) {
	t.Helper()
	all := body(t, pages)
	for _, s := range said {
		if !strings.Contains(all, tight(s)) {
			f.Errorf("%s: does not stand in full: %.80q", name, s)
		}
	}
}

// saidOf is what a user says of a project and of its make-ups.
func saidOf(r table.Report) (said []string) {
	for _, m := range makeupsOf(r) {
		said = append(said, m.ID, m.Title)
		for _, x := range m.Typed {
			said = append(said, x.Name+": "+x.Text)
		}
	}
	return said
}

func makeupsOf(r table.Report) (list []*glazing.Makeup) {
	for i := range r.Ratings {
		list = add(list, r.Ratings[i].Makeup)
	}
	return list
}

func checkProject(t testing.TB, f failing, name string, r table.Report, c *table.Check) {
	t.Helper()
	pages := projectPages(r, c).pages
	p := r.Project
	checkPages(t, f, name, pages)
	checkFull(t, f, name, pages, append(saidOf(r), p.Title, p.Author, p.Client, p.Date, p.Notes)...)
	for _, part := range byMakeup(r) {
		name := name + ", " + part.Ratings[0].Makeup.ID
		pages := makeupPages(part).pages
		checkPages(t, f, name, pages)
		checkFull(t, f, name, pages, append(saidOf(part), p.Title, p.Author, p.Client, p.Date, p.Notes)...)
	}
}

// The pages of the demo, of a project that is hard to set, of one with many make-ups, and of one with
// none.
func TestPages(t *testing.T) {
	all := projects()
	all["many"] = func(t testing.TB) (table.Report, *table.Check) { return many(t, 20, 2) }
	all["empty"] = func(t testing.TB) (table.Report, *table.Check) {
		return made(t, t.TempDir(), keys{"project": "-"}, nil)
	}
	for name, read := range all {
		r, c := read(t)
		checkProject(t, t, name, r, c)
	}
}

// The published checks.
func TestVerificationPages(t *testing.T) {
	checkPages(t, t, "verification", verificationPages(verified(t)).pages)
}

// Random projects: of any of the built-in panes, with names and texts of any letters.
func TestRandomPages(t *testing.T) {
	if testing.Short() {
		t.Skip("many projects")
	}
	texts := []string{"", "Bay 4, west", long(90), long(700), strings.Repeat("ш", 300), "שלום\nعربى\t北東 \u0301\u200f", strings.Repeat("word ", 60), "a" + strings.Repeat("/b", 200)}
	ids := []string{"A1", "ш", strings.Repeat("W", 64), strings.Repeat("i", 64), "Ω.2_", "north-east-stair-of-the-old-mill", "1"}
	panes := []string{"soda-lime-4", "low-iron-10", "soda-grey-6", "soda-lime-19", "invented-low-e-6", "invented-sun-6", "invented-dimming-7", "invented-warming-6", "given", "wide"}
	dir := t.TempDir()
	rapid.Check(t, func(rt *rapid.T) {
		text := func(what string) string { return rapid.SampledFrom(texts).Draw(rt, what) }
		var makeups []keys
		for _, id := range rapid.SliceOfNDistinct(rapid.SampledFrom(ids), 1, 3, rapid.ID[string]).Draw(rt, "ids") {
			var sequence []keys
			switching := 0
			for k := range rapid.IntRange(1, 8).Draw(rt, "panes") {
				if k > 0 {
					gas := rapid.SampledFrom([]keys{{"argon": 1}, {"air": 0.1, "argon": 0.9}, {"krypton": 0.295, "air": 0.1, "argon": 0.605}}).Draw(rt, "gas")
					g := keys{"gap_mm": rapid.SampledFrom([]float64{0.2, 6, 12.5, 16, 150}).Draw(rt, "gap"), "gas": gas}
					if rapid.IntRange(0, 5).Draw(rt, "evacuated") == 0 {
						g = vacuum()
					}
					sequence = append(sequence, g)
				}
				x := pane(rapid.SampledFrom(panes).Draw(rt, "pane"))
				if x["pane"] == "invented-dimming-7" || x["pane"] == "invented-warming-6" {
					if switching++; switching > 2 {
						x["pane"] = "soda-lime-8"
					}
				}
				x["turned"] = rapid.Bool().Draw(rt, "turned")
				sequence = append(sequence, x)
			}
			m := keys{"id": id, "outside_to_inside": sequence, "tilt_deg": rapid.SampledFrom([]float64{90, 90, 30, 0, 120}).Draw(rt, "tilt")}
			if s := text("title"); s != "" {
				m["title"] = s
			}
			if s := text("typed"); s != "" {
				m["typed"] = keys{"acoustic": s, "fire": "EI 30"}
			}
			makeups = append(makeups, m)
		}
		file := keys{"project": "P" + text("project"), "makeups": makeups,
			"basis": rapid.SampledFrom([][]string{{"en"}, {"iso"}, {"na", "en"}}).Draw(rt, "basis"),
			"panes": []keys{{"id": "given", "thickness_mm": 0.5, "spectrum": "flat.csv", "emissivity_front": 0.2, "emissivity_normal_back": 0.03},
				{"id": "wide", "thickness_mm": 150, "spectrum": "flat.csv", "heat_treatment": "heat-strengthened"}},
		}
		for _, key := range []string{"author", "client", "date", "notes"} {
			if s := text(key); s != "" {
				file[key] = s
			}
		}
		var conditions []keys
		for _, id := range rapid.SliceOfNDistinct(rapid.SampledFrom(ids), 0, 5, rapid.ID[string]).Draw(rt, "conditions") {
			c := keys{"id": id, "outside_c": rapid.IntRange(-40, 45).Draw(rt, "outside"), "inside_c": rapid.IntRange(10, 30).Draw(rt, "inside"),
				"sun_w_m2": rapid.SampledFrom([]float64{0, 0, 300, 783}).Draw(rt, "sun")}
			if rapid.Bool().Draw(rt, "humid") {
				c["inside_rh"] = 0.5
			}
			conditions = append(conditions, c)
		}
		if conditions != nil {
			file["conditions"] = conditions
		}
		if rapid.Bool().Draw(rt, "limited") {
			file["limits"] = []keys{{"figure": "u", "at_most": 1.2, "source": "S" + text("source")}, {"figure": "absorptance", "at_most": 0.4}}
		}
		r, c := made(t, dir, file, map[string]string{"flat.csv": flat(0.6, 0.1)})
		checkProject(t, rt, "random", r, c)
	})
}
