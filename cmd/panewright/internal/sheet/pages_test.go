package sheet

// Projects that sheets are tried on, and what stands on a page.

import (
	"bytes"
	"encoding/json"
	"encoding/xml"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/demo"
	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/limits"
	"panewright/glazing/project"
)

// A keys is an object of a project file, which may be JSON.
type keys map[string]any

// testVersion is the version of the program on tested pages.
const testVersion = "9.9.9"

// loaded reads a project and rates it, as the command does.
func loaded(t testing.TB, path string) (table.Report, *table.Check) {
	t.Helper()
	p, err := project.Load(path, project.Access{})
	if err != nil {
		t.Fatal(err)
	}
	r := table.Report{Version: testVersion, Project: p, Figures: glazing.Figures()}
	for _, b := range p.Bases {
		method := p.Method(b)
		for _, m := range p.Makeups {
			ratings, err := p.RateBy(method, m)
			if err != nil {
				t.Fatal(err)
			}
			r.Ratings = append(r.Ratings, ratings...)
		}
	}
	list, _ := p.AllLimits()
	if len(list) == 0 {
		return r, nil
	}
	c := &table.Check{Report: r, Limits: list}
	c.Results = limits.Judge(c.Limits, p.Makeups, p.Bases, c.Ratings)
	return r, c
}

// made writes a project and its spectra into a folder, and reads it.
func made(t testing.TB, dir string, file keys, spectra map[string]string) (table.Report, *table.Check) {
	t.Helper()
	text, err := json.Marshal(file)
	if err != nil {
		t.Fatal(err)
	}
	path := filepath.Join(dir, "project.json")
	if err := os.WriteFile(path, text, 0o644); err != nil {
		t.Fatal(err)
	}
	for name, text := range spectra {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return loaded(t, path)
}

// demoReport is the demo project, rated.
func demoReport(t testing.TB) (table.Report, *table.Check) {
	t.Helper()
	path, err := demo.Write(filepath.Join(t.TempDir(), "mill"))
	if err != nil {
		t.Fatal(err)
	}
	return loaded(t, path)
}

// flat is a spectrum that is the same from 300 to 2500 nm.
func flat(tau, rho float64) string {
	var b strings.Builder
	b.WriteString("wavelength_nm,tau,rho_front,rho_back\n")
	for nm := 300; nm <= 2500; nm += 20 {
		fmt.Fprintf(&b, "%d,%g,%g,%g\n", nm, tau, rho, rho)
	}
	return b.String()
}

// visible is a spectrum of the visible range alone.
func visible(tau float64) string {
	var b strings.Builder
	b.WriteString("wavelength_nm,tau,rho_front,rho_back\n")
	for nm := 380; nm <= 780; nm += 10 {
		fmt.Fprintf(&b, "%d,%g,0.1,0.1\n", nm, tau)
	}
	return b.String()
}

// tints are states of a switching pane, each darker than the one before.
func tints(names ...string) (list []keys, spectra map[string]string) {
	spectra = map[string]string{}
	for i, name := range names {
		file := fmt.Sprintf("tint-%d.csv", i)
		spectra[file] = flat(0.7*math.Pow(0.8, float64(i)), 0.1)
		list = append(list, keys{"tint": name, "spectrum": file})
	}
	return list, spectra
}

func gap(mm float64) keys { return keys{"gap_mm": mm, "gas": keys{"argon": 0.9, "air": 0.1}} }

func vacuum() keys {
	return keys{"gap_mm": 0.2, "vacuum": keys{"pressure_pa": 0.1, "pillar_radius_mm": 0.25, "pillar_pitch_mm": 20}}
}

func pane(id string) keys { return keys{"pane": id} }

func turned(id string) keys { return keys{"pane": id, "turned": true} }

// long is a text of so many letters in words.
func long(letters int) string {
	s := strings.Repeat("elevation of the south-eastern stair, ", letters/38+1)
	return s[:letters-1] + "."
}

// hostile is a project whose make-ups have what is hard to set: many panes, many tints, long names,
// letters of many scripts and of none, figures that are not known.
func hostile(t testing.TB) (table.Report, *table.Check) {
	t.Helper()
	var names []string
	for i := range 30 {
		names = append(names, fmt.Sprintf("step-%d", i+1))
	}
	names[8] = "night-at-the-museum"
	thirty, spectra := tints(names...)
	spectra["foil.csv"], spectra["visible.csv"] = flat(0.85, 0.1), visible(0.6)
	var eight []keys
	typed := keys{"acoustic": "Rw 52 dB", "fire": "EI 30, " + long(300)}
	for k, mm := range []int{4, 6, 8, 10, 12, 15, 19, 3} {
		if k > 0 {
			eight = append(eight, gap(float64(5+k*3)))
		}
		eight = append(eight, pane(fmt.Sprintf("soda-lime-%d", mm)))
	}
	wide := strings.Repeat("W", 64)
	mixture := keys{"gap_mm": 0.5, "gas": keys{"argon": 0.333333, "krypton": 0.222222, "xenon": 0.111111, "air": 0.333334}}
	return made(t, t.TempDir(), keys{
		"project": "Hostile " + strings.Repeat("w", 300) + " " + long(10000), "author": "A\tB \u202e reversed ﷺ 🏠 " + long(10000),
		"client": "Ζωή & Сыновья <b>\"quoted\"</b> (a) \\ {b} _{c}", "date": "2026-12-01, " + long(400), "notes": long(6000) + "\n\nlast line",
		"basis": []string{"en", "iso", "na"},
		"conditions": []keys{
			{"id": "january-night", "outside_c": -12, "inside_c": 20, "inside_rh": 0.45, "wind_m_s": 4},
			{"id": strings.Repeat("W", 64), "outside_c": 34.25, "inside_c": 25, "inside_rh": 0.5, "sun_w_m2": 750, "tilt_deg": 45, "sky_c": -20, "height_m": 3},
			{"id": "отель-полдень-в-сентябре", "outside_c": 20, "inside_c": 20, "outside_convection_w_m2k": 8, "inside_convection_w_m2k": 3, "sun_w_m2": 1000},
			{"id": "x", "outside_c": -40, "inside_c": 30, "inside_rh": 0.99},
			{"id": "fifth", "outside_c": 5, "inside_c": 21, "outside_radiant_c": -5, "inside_radiant_c": 22, "sun_w_m2": 1},
		},
		"panes": []keys{
			{"id": "foil", "thickness_mm": 0.3, "spectrum": "foil.csv", "emissivity_front": 0.2, "emissivity_back": 0.76},
			{"id": "blank", "thickness_mm": 6, "spectrum": "foil.csv"},
			{"id": "visible", "thickness_mm": 6, "spectrum": "visible.csv", "origin": "modelled"},
			{"id": wide, "spectrum": "foil.csv", "emissivity_front": 0.837, "emissivity_back": 0.837, "heat_treatment": "toughened", "heat_soaked": true,
				"plies": []keys{{"glass_mm": 4}, {"interlayer_mm": 0.38}, {"glass_mm": 4}, {"interlayer_mm": 1.52}, {"glass_mm": 6}}},
			{"id": "thirty", "thickness_mm": 9, "emissivity_front": 0.837, "emissivity_back": 0.16, "tints": thirty},
		},
		"makeups": []keys{
			{"id": "Ω-Музей-Ελλάδα_и.ё", "title": "Музей, читальный зал · Αναγνωστήριο, νότια όψη", "outside_to_inside": []keys{pane("soda-grey-6"), gap(16), turned("invented-low-e-6")}},
			{"id": "D" + wide[1:], "title": strings.Repeat("x", 50) + " " + long(10000), "outside_to_inside": []keys{pane(wide), gap(12), turned(wide), gap(12), pane(wide), gap(9), pane(wide), gap(8), pane(wide)}},
			{"id": "eight", "title": "Eight panes\nand a line feed", "outside_to_inside": eight, "typed": typed},
			{"id": "thirty", "title": "Thirty tints", "outside_to_inside": []keys{pane("thirty"), gap(16), turned("invented-low-e-6")}},
			{"id": "foil", "title": "0.3 mm beside 19 mm, emoji \U0001F600 שלום عربى 北東", "outside_to_inside": []keys{pane("soda-lime-19"), mixture, pane("foil"), gap(100), pane("soda-lime-19")}},
			{"id": "sloped", "tilt_deg": 30, "outside_to_inside": []keys{pane("invented-sun-6"), gap(16), pane(wide)}},
			{"id": "combination", "title": "Two switching panes", "outside_to_inside": []keys{pane("invented-dimming-7"), gap(16), turned("invented-warming-6")}},
			{"id": "fixed", "outside_to_inside": []keys{{"pane": "thirty", "tint": "night-at-the-museum"}, gap(16), pane("foil")}},
			{"id": "unknown", "outside_to_inside": []keys{pane("blank"), gap(16), pane("visible")}},
			{"id": "1", "outside_to_inside": []keys{pane("soda-lime-4")}},
			{"id": "vacuum", "edge": keys{"temperature_factor": 0.6}, "outside_to_inside": []keys{pane("invented-low-e-6"), vacuum(), pane("soda-lime-6"), gap(16), pane("soda-lime-4")}},
		},
		"limits": []keys{
			{"figure": "u", "at_most": 1.2, "source": "invented, " + long(300), "date": "2026"},
			{"figure": "emissivity", "at_most": 0.5, "at_least": 0.1, "tint": "worst", "basis": "en", "scope": "centre"},
			{"figure": "light", "at_least": 0.6, "scope": "window"},
		},
	}, spectra)
}

// projects are those that pages are read back from: the demo, and in full tests the hostile one.
func projects() map[string]func(testing.TB) (table.Report, *table.Check) {
	if testing.Short() {
		return map[string]func(testing.TB) (table.Report, *table.Check){"demo": demoReport}
	}
	return map[string]func(testing.TB) (table.Report, *table.Check){"demo": demoReport, "hostile": hostile}
}

// many is a project of so many make-ups, each with so many tints.
func many(t testing.TB, makeups, states int) (table.Report, *table.Check) {
	t.Helper()
	var names []string
	for i := range states {
		names = append(names, fmt.Sprintf("t%d", i+1))
	}
	list, spectra := tints(names...)
	var all []keys
	for i := range makeups {
		all = append(all, keys{"id": fmt.Sprintf("M%03d", i+1), "title": fmt.Sprintf("Bay %d, west", i+1),
			"outside_to_inside": []keys{pane("dim"), gap(12 + float64(i%9)), turned("invented-low-e-6")}})
	}
	return made(t, t.TempDir(), keys{"project": "Many bays", "author": "A. Tester", "makeups": all,
		"panes": []keys{{"id": "dim", "thickness_mm": 8, "emissivity_front": 0.837, "emissivity_back": 0.16, "tints": list}}}, spectra)
}

// A placed is a line of text on a page, and the rectangle that it covers.
type placed struct {
	text string
	box  draw.Rect
	base float64 // of its baseline
	size float64 // of the type, in mm
	bold bool
}

// A stroked is a straight line on a page.
type stroked struct {
	from, to draw.Point
	wide     float64
}

// onPage returns the texts and the straight lines of a canvas, read from it as SVG.
func onPage(t testing.TB, c *draw.Canvas) (texts []placed, lines []stroked) {
	t.Helper()
	svg, err := draw.SVG(c, "", "")
	if err != nil {
		t.Fatal(err)
	}
	d := xml.NewDecoder(bytes.NewReader(svg))
	var open *placed
	var shift float64 // of right and centred text, in widths
	for {
		token, err := d.Token()
		if err == io.EOF {
			return texts, lines
		}
		if err != nil {
			t.Fatal(err)
		}
		switch e := token.(type) {
		case xml.StartElement:
			a := map[string]string{}
			for _, x := range e.Attr {
				a[x.Name.Local] = x.Value
			}
			number := func(name string) float64 {
				v, err := strconv.ParseFloat(a[name], 64)
				if err != nil {
					t.Fatalf("%s of %s: %v", name, e.Name.Local, err)
				}
				return v
			}
			switch e.Name.Local {
			case "path":
				if points := numbers(t, a["d"]); len(points) == 4 && a["stroke"] != "" {
					lines = append(lines, stroked{draw.Point{X: points[0], Y: points[1]}, draw.Point{X: points[2], Y: points[3]}, number("stroke-width")})
				}
			case "text":
				size, w := number("font-size"), number("textLength")
				shift = map[string]float64{"middle": 0.5, "end": 1}[a["text-anchor"]]
				const ascent, descent = 0.66, 0.2 // of capitals, and below the line
				x, y := number("x"), number("y")
				open = &placed{base: y, size: size, bold: a["font-weight"] == "600"}
				open.box = draw.Rect{X: x - shift*w, Y: y - ascent*size, W: w, H: (ascent + descent) * size}
				if strings.HasPrefix(a["transform"], "rotate(-90 ") {
					open.box = draw.Rect{X: x - ascent*size, Y: y - w + shift*w, W: (ascent + descent) * size, H: w}
				}
			}
		case xml.CharData:
			if open != nil {
				open.text += string(e)
			}
		case xml.EndElement:
			if e.Name.Local == "text" {
				open.text = strings.ReplaceAll(open.text, "\u00a0", " ")
				texts = append(texts, *open)
				open = nil
			}
		}
	}
}

func numbers(t testing.TB, path string) (list []float64) {
	t.Helper()
	for word := range strings.FieldsSeq(strings.Trim(path, "Mz")) {
		v, err := strconv.ParseFloat(word, 64)
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, v)
	}
	return list
}
