package glazing

import (
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/spectra"
)

// stepsOf returns the steps of a working by symbol, in order, of the chapters whose titles begin so.
func stepsOf(chapters []Chapter, title string) map[string][]Step {
	out := map[string][]Step{}
	for _, c := range chapters {
		if !strings.HasPrefix(c.Title, title) {
			continue
		}
		for _, s := range c.Steps {
			out[s.Symbol] = append(out[s.Symbol], s)
		}
	}
	return out
}

// infraredRows are rows of one value from 5 to 50 µm.
func infraredRows(value float64) spectra.Curve {
	return spectra.Curve{NM: []float64{5000, 50000}, Value: []float64{value, value}}
}

// The working of each source of emissivity by hand. Thirty reflectances of 0.95 add to 28.5.
func TestWorkingOfEmissivities(t *testing.T) {
	pane := pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
	tint := &pane.Tints[0]
	m := &Makeup{Panes: []Placed{{Pane: pane}}}
	for _, tt := range []struct {
		name                      string
		back                      Emissivity
		rho, tau                  float64 // infrared rows of the back
		normal, ratio, corrected  string  // formulas with the numbers put in, "" where there is none
		formula, ratioFrom, extra string  // parts of the formulas
	}{
		{"corrected, typed", GivenEmissivity(0.042), 0, 0, "", "", "0.042", "typed by the user", "", ""},
		{"normal, typed", GivenNormalEmissivity(0.15), 0, 0, "0.15", "1.14 + (1.1 − 1.14)·(0.15 − 0.1)/(0.2 − 0.1)", "1.12·0.15", "ratio·εn", "rows of εn 0.1 and 0.2", ""},
		{"a row of the table", InfraredEmissivity(infraredRows(0.95), spectra.Curve{}), 0.95, 0, "1 − 28.5/30", "1.18", "1.18·0.05", "ratio·εn", "row of εn 0.05", ""},
		{"below the table", InfraredEmissivity(infraredRows(0.98), spectra.Curve{}), 0.98, 0, "1 − 29.4/30", "1.22", "1.22·0.02", "ratio·εn", "end, εn 0.03", ""},
		{"above the table", InfraredEmissivity(infraredRows(0.05), spectra.Curve{}), 0.05, 0, "1 − 1.5/30", "0.94", "0.94·0.95", "ratio·εn", "end, εn 0.89", ""},
		{"the last row", GivenNormalEmissivity(0.89), 0, 0, "0.89", "0.94", "0.94·0.89", "ratio·εn", "row of εn 0.89", ""},
		{"lets infrared through", InfraredEmissivity(infraredRows(0.6), infraredRows(0.1)), 0.6, 0.1, "1 − 18/30 − 3/30", "1.06", "1.06·0.3", "ratio·εn", "row of εn 0.3", ""},
		{"optical constants, by rows", ComputedEmissivity(infraredRows(0.8), spectra.Curve{}, 0.22), 0.8, 0, "1 − 24/30", "1.1", "1.1·0.2", "ratio·εn", "row of εn 0.2", "0.22"},
		{"optical constants, rows gone", ComputedEmissivity(infraredRows(0.8), spectra.Curve{}, 0.22), 0, 0, "0.2", "1.1", "1.1·0.2", "ratio·εn", "row of εn 0.2", "0.22"},
		{"convention", ConventionalEmissivity(0.8931, 0.8342), 0, 0, "", "", "0.837", "0.89 normal; its optical constants give 0.8931 normal and 0.8342 hemispherical", "", ""},
	} {
		for _, turned := range []bool{false, true} {
			tint.Front, tint.Back = GivenEmissivity(0.5), tt.back
			tint.Spectrum.InfraredFront, tint.Spectrum.InfraredBack, tint.Spectrum.InfraredTau = infraredRows(0.3), spectra.Curve{}, spectra.Curve{}
			if tt.rho > 0 {
				tint.Spectrum.InfraredBack = infraredRows(tt.rho)
			}
			if tt.tau > 0 {
				tint.Spectrum.InfraredTau = infraredRows(tt.tau)
			}
			m.Panes[0].Turned = turned
			number := map[bool]string{false: "2", true: "1"}[turned]
			got := stepsOf(Working(rateOne(t, m, EN, Options{})), "Emissivities")
			check := func(symbol, numbers string, value float64, formula string) {
				t.Helper()
				if numbers == "" {
					if len(got[symbol]) > 0 {
						t.Errorf("%s: %s is written out: %+v", tt.name, symbol, got[symbol])
					}
					return
				}
				if len(got[symbol]) != 1 {
					t.Errorf("%s: %s stands %d times", tt.name, symbol, len(got[symbol]))
					return
				}
				s := got[symbol][0]
				if s.Numbers != numbers || math.Abs(s.Value-value) > 1e-12 || !strings.Contains(s.Formula, formula) {
					t.Errorf("%s: %s is %q (%s) = %v, want %q (… %s …) = %v", tt.name, symbol, s.Numbers, s.Formula, s.Value, numbers, formula, value)
				}
			}
			check("εn"+number, tt.normal, tt.back.Normal.Number, "")
			check("ratio", tt.ratio, tt.back.Corrected.Number/tt.back.Normal.Number, tt.ratioFrom)
			check("ε"+number, tt.corrected, tt.back.Corrected.Number, tt.formula)
			check("εh"+number, tt.extra, tt.back.Hemispherical.Number, "exact integral")
		}
	}
	tint.Back = NoEmissivity()
	said := ""
	for _, c := range Working(rateOne(t, m, EN, Options{})) {
		said += c.Note
	}
	if !strings.Contains(said, "Not known: ε1: no emissivity") {
		t.Errorf("nothing is said of a face of unknown emissivity: %s", said)
	}
}

// A grey of τ 0.005 lies on the straight part of L*a*b*, one of 0.5 on the cube root: by hand
// f = 841/108·0.005 + 16/116 and L* = 903.296·0.005, f = ∛0.5 (CIE 15:2004).
func TestWorkingOfColours(t *testing.T) {
	for _, tt := range []struct {
		tau     float64
		formula string
		numbers string
		f, l    float64
	}{
		{0.005, "841/108·Y/Yn + 16/116", "841/108·0.5/100 + 16/116", 841.0/108*0.005 + 16.0/116, 24389.0 / 27 * 0.005},
		{0.5, "(Y/Yn)^(1/3)", "(50/100)^(1/3)", math.Cbrt(0.5), 116*math.Cbrt(0.5) - 16},
	} {
		m := &Makeup{Panes: []Placed{{Pane: pane("grey", flat(300, 2500, tt.tau, 0.1, 0.2), 0.837, 0.837)}}}
		chapters := Working(rateOne(t, m, EN, Options{}))
		got := stepsOf(chapters, "Colour of transmitted light")
		f, l := got["fY"][0], got["L*"][0]
		if f.Formula != tt.formula || f.Numbers != tt.numbers || math.Abs(f.Value-tt.f) > 1e-12 || math.Abs(l.Value-tt.l) > 1e-9 {
			t.Errorf("τ %g: fY = %s = %s = %v, L* %v, want %s = %s = %v, %v", tt.tau, f.Formula, f.Numbers, f.Value, l.Value, tt.formula, tt.numbers, tt.f, tt.l)
		}
		// The sum of a grey is τ times that of the white (CIE 15:2004).
		white := stepsOf(chapters, "White")["Zn"][0]
		if z := got["Z"][0]; math.Abs(z.Value-tt.tau*white.Value) > 1e-9 {
			t.Errorf("τ %g: Z %v of a white of %v", tt.tau, z.Value, white.Value)
		}
		for title, rho := range map[string]float64{"Colour of light reflected outside": 0.1, "Colour of light reflected inside": 0.2} {
			if y := stepsOf(chapters, title)["Y"][0]; math.Abs(y.Value-100*rho) > 1e-9 {
				t.Errorf("%s: Y %v, want %v", title, y.Value, 100*rho)
			}
		}
		if ra := stepsOf(chapters, "Colour rendering")["Ra"][0]; math.Abs(ra.Value-100) > 1e-9 { // a grey
			t.Errorf("τ %g: Ra %v, want 100", tt.tau, ra.Value)
		}
	}
}

// Each weighted figure of the list is written out, and of a flat spectrum each is its level.
func TestWorkingOfWeightedFigures(t *testing.T) {
	m := &Makeup{Panes: []Placed{{Pane: pane("flat", flat(300, 2500, 0.6, 0.1, 0.2), 0.837, 0.837)}}}
	got := stepsOf(Working(rateOne(t, m, EN, Options{})), "")
	for symbol, want := range map[string]float64{"τv": 0.6, "ρv": 0.1, "ρv′": 0.2, "τe": 0.6, "ρe": 0.1, "ρe′": 0.2, "αe1": 0.3,
		"τuv": 0.6, "τdf": 0.6, "τdf,700": 0.6, "τsk": 0.6} {
		if len(got[symbol]) != 1 || math.Abs(got[symbol][0].Value-want) > 1e-12 {
			t.Errorf("%s: %+v, want %v once", symbol, got[symbol], want)
		}
	}
	// What the spectrum does not reach is named with the reason, what it does is there.
	m.Panes[0].Pane = pane("short", flat(380, 780, 0.6, 0.1, 0.2), 0.837, 0.837)
	chapters := Working(rateOne(t, m, EN, Options{}))
	got = stepsOf(chapters, "")
	said := ""
	for _, c := range chapters {
		said += c.Note + "\n"
	}
	for _, symbol := range []string{"τe", "τuv", "τsk", "g"} {
		if len(got[symbol]) > 0 {
			t.Errorf("%s is written out of a spectrum that does not reach", symbol)
		}
	}
	for _, want := range []string{"Not known: τe, ρe, ρe′, αe1: the spectrum of pane short", "Not known: g: the spectrum"} {
		if !strings.Contains(said, want) {
			t.Errorf("the working does not say %q:\n%s", want, said)
		}
	}
	for _, symbol := range []string{"τv", "ρv′", "U", "Ra"} {
		if len(got[symbol]) != 1 {
			t.Errorf("%s is not written out", symbol)
		}
	}
}

// Steps bear the clauses of their basis (numbers from memory): the sections of ISO 9050 are light
// 3.3 and 3.4, solar 3.5, ultraviolet 3.6, damage 3.7, skin 3.8, colour 3.9.
func TestClausesOfBases(t *testing.T) {
	m := doubleOf(t, 16, map[string]float64{"argon": 0.9, "air": 0.1}, 0.837, 0.04, 0.837)
	m.Panes[0].Pane.Tints[0].Front = ConventionalEmissivity(0.89, 0.83)
	for _, tt := range []struct {
		basis Basis
		want  map[string]string
	}{
		{EN, map[string]string{"τv": "EN 410, 5.2", "τe": "EN 410, 5.4.3", "τuv": "EN 410, 5.5", "Ra": "EN 410, 5.6", "U": "EN 673 (1)", "g": "EN 410, 5.4.1", "SC": "EN 410, 5.7", "ε1": "EN 673"}},
		{ISO, map[string]string{"τv": "ISO 9050, 3.3", "ρv": "ISO 9050, 3.4", "ρv′": "ISO 9050, 3.4", "τe": "ISO 9050, 3.5", "αe1": "ISO 9050, 3.5",
			"τuv": "ISO 9050, 3.6", "τdf": "ISO 9050, 3.7; CIE 89/3", "τdf,700": "CIE 89/3", "τsk": "ISO 9050, 3.8", "Ra": "ISO 9050, 3.9",
			"L*": "CIE 15, 8.2.1", "ε2": "EN 12898", "ε1": "ISO 10292", "hs": "ISO 10292", "U": "ISO 10292", "qi": "ISO 9050, 3.5", "g": "ISO 9050, 3.5",
			"SC": "EN 410, 5.7"}}, // ISO 9050 has no shading coefficient
		{NA, map[string]string{"τv": "as EN 410, 5.2", "τe": "as EN 410, 5.4.3", "τuv": "EN 410, 5.5", "Ra": "EN 410, 5.6"}},
	} {
		chapters := Working(rateOne(t, m, tt.basis, Options{}))
		got := stepsOf(chapters, "")
		for symbol, want := range tt.want {
			if len(got[symbol]) == 0 || got[symbol][0].Clause != want {
				t.Errorf("%s, %s: %+v, want clause %q", tt.basis.Name, symbol, got[symbol], want)
			}
		}
		for _, c := range chapters {
			for _, s := range c.Steps {
				if tt.basis.Name == ISO.Name && s.Symbol != "SC" && (strings.HasPrefix(s.Clause, "EN 410") || strings.HasPrefix(s.Clause, "EN 673")) {
					t.Errorf("under iso, %s of %q bears %q", s.Symbol, c.Title, s.Clause)
				}
				if s.Clause == "" {
					t.Errorf("%s: %s of %q bears no clause", tt.basis.Name, s.Symbol, c.Title)
				}
			}
		}
	}
}

// The chapter of gas fills is named for argon where argon it is, and has one row; that of
// sensitivities has a row for each.
func TestWorkingOfFills(t *testing.T) {
	for _, tt := range []struct {
		gas   map[string]float64
		title string
		rated string // share in the head
		rows  int
	}{
		{map[string]float64{"argon": 0.9, "air": 0.1}, "Argon and time", "90", 1},
		{map[string]float64{"argon": 0.6, "air": 0.4}, "Argon and time", "60", 1},
		{map[string]float64{"argon": 0.5, "krypton": 0.5}, "Gas and time", "100", 1},
		{map[string]float64{"air": 1}, "Gas and time", "", 0},
		{map[string]float64{"argon": 0, "air": 1}, "Gas and time", "", 0},
	} {
		r := rateOne(t, doubleOf(t, 12, tt.gas, 0.837, 0.04, 0.837), EN, Options{})
		chapters := Working(r)
		at := slices.IndexFunc(chapters, func(c Chapter) bool { return c.Title == tt.title })
		if at < 0 {
			t.Errorf("%v: no chapter %q", tt.gas, tt.title)
			continue
		}
		rows := 0
		if c := chapters[at]; c.Rows != nil {
			rows = len(c.Rows.Cells)
			if got, want := strings.Join(c.Rows.Head, " "), "gas as rated "+tt.rated+" % 90 % 85 % 80 %"; got != want {
				t.Errorf("%v: heads %q, want %q", tt.gas, got, want)
			}
			if got, want := c.Rows.Cells[0][1], strconv.FormatFloat(r.U.Number, 'g', 6, 64); got != want {
				t.Errorf("%v: U as rated is %s, want %s", tt.gas, got, want)
			}
			if got, want := strings.Contains(c.Note, "a fuller gap would have"), tt.rated == "60"; got != want {
				t.Errorf("%v: note %q", tt.gas, c.Note)
			}
		} else if !strings.Contains(c.Note, "no gap holds a gas other than air") {
			t.Errorf("%v: note %q", tt.gas, c.Note)
		}
		if rows != tt.rows || len(chapters[at+1].Rows.Cells) != 5 {
			t.Errorf("%v: %d rows of fills, %d of sensitivities, want %d and 5", tt.gas, rows, len(chapters[at+1].Rows.Cells), tt.rows)
		}
	}
}

// Thickness and mass by hand: 4 + 12 + 4 mm, and 2·0.004 m of 2500 kg/m³; of a laminate, ply by ply.
func TestWorkingOfThicknessAndMass(t *testing.T) {
	m := doubleOf(t, 12, map[string]float64{"air": 1}, 0.837, 0.04, 0.837)
	got := stepsOf(Working(rateOne(t, m, EN, Options{})), "Thickness")
	if d := got["d"][0]; d.Numbers != "4 + 12 + 4" || math.Abs(d.Value-20) > 1e-12 {
		t.Errorf("d is %s = %v", d.Numbers, d.Value)
	}
	if kg := got["m"][0]; kg.Numbers != "0.004·2500 + 0.004·2500" || math.Abs(kg.Value-20) > 1e-12 {
		t.Errorf("m is %s = %v", kg.Numbers, kg.Value)
	}
	laminate := *m.Panes[1].Pane
	laminate.Plies = []Ply{{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}, {ThicknessMM: 0.8, ConductivityWMK: 0.2, DensityKGM3: 1000, Interlayer: true},
		{ThicknessMM: 3, ConductivityWMK: 1, DensityKGM3: 2500}}
	m.Panes[1].Pane = &laminate
	chapters := Working(rateOne(t, m, EN, Options{}))
	got = stepsOf(chapters, "Thickness")
	if d, kg := got["d"][0], got["m"][0]; d.Numbers != "4 + 12 + 4 + 0.8 + 3" || kg.Numbers != "0.004·2500 + 0.004·2500 + 0.0008·1000 + 0.003·2500" || math.Abs(kg.Value-28.3) > 1e-12 {
		t.Errorf("d is %s, m is %s = %v", d.Numbers, kg.Numbers, kg.Value)
	}
	// Each pane has its resistance: 0.004/1, and 0.004/1 + 0.0008/0.2 + 0.003/1 = 0.011.
	for _, title := range []string{"U-value", "g-value"} {
		got := stepsOf(chapters, title)
		for symbol, want := range map[string]float64{"Rg1": 0.004, "Rg2": 0.011, "Rg": 0.015} {
			if len(got[symbol]) != 1 || math.Abs(got[symbol][0].Value-want) > 1e-12 {
				t.Errorf("%s: %s is %+v, want %v", title, symbol, got[symbol], want)
			}
		}
		if len(got["Rt"]) != 1 || len(got["R"]) > 0 {
			t.Errorf("%s: the whole resistance is called %+v, %+v", title, got["Rt"], got["R"])
		}
	}
}

// The constants of a tilt by hand from those of EN 673:2011, 5.3 (from memory): A 0.16, 0.10, 0.035
// and n 0.28, 0.31, 0.38 at 0, 45 and 90°.
func TestWorkingOfTilts(t *testing.T) {
	for _, tt := range []struct {
		deg         float64
		a, n        string // numbers put in
		valueA, n30 float64
	}{
		{0, "0.16", "0.28", 0.16, 0.28},
		{30, "0.16 + (0.1 − 0.16)·(30 − 0)/45", "0.28 + (0.31 − 0.28)·(30 − 0)/45", 0.12, 0.30},
		{45, "0.1", "0.31", 0.10, 0.31},
		{60, "0.1 + (0.035 − 0.1)·(60 − 45)/45", "0.31 + (0.38 − 0.31)·(60 − 45)/45", 0.1 - 0.065/3, 0.31 + 0.07/3},
		{90, "0.035", "0.38", 0.035, 0.38},
		{120, "0.1 + (0.035 − 0.1)·((180 − 120) − 45)/45", "0.31 + (0.38 − 0.31)·((180 − 120) − 45)/45", 0.1 - 0.065/3, 0.31 + 0.07/3},
	} {
		m := doubleOf(t, 16, map[string]float64{"air": 1}, 0.837, 0.04, 0.837)
		m.Tilt = TiltDeg(tt.deg)
		got := stepsOf(Working(rateOne(t, m, EN, Options{})), "Gap 1: ")
		if a, n := got["A"][0], got["n"][0]; a.Numbers != tt.a || n.Numbers != tt.n || math.Abs(a.Value-tt.valueA) > 1e-12 || math.Abs(n.Value-tt.n30) > 1e-12 {
			t.Errorf("%g°: A %s = %v, n %s = %v, want %s = %v, %s = %v", tt.deg, a.Numbers, a.Value, n.Numbers, n.Value, tt.a, tt.valueA, tt.n, tt.n30)
		}
		if nu := got["Nu"][0]; nu.Value <= 1 || !strings.Contains(nu.Numbers, put(got["A"][0].Value)+"·") || !strings.HasSuffix(nu.Numbers, "^"+put(got["n"][0].Value)+")") {
			t.Errorf("%g°: Nu is %s", tt.deg, nu.Numbers)
		}
		m.HeatFlow = FlowDown
		if got := stepsOf(Working(rateOne(t, m, EN, Options{})), "Gap 1: "); (len(got["A"]) > 0) != (tt.deg == 90) {
			t.Errorf("%g°, heat down: A is %+v", tt.deg, got["A"])
		}
	}
}

// One-sided steps, corners and unknown rows show in the table of sensitivities.
func TestWorkingOfSensitivities(t *testing.T) {
	table := func(m *Makeup, o Options) Chapter { return workSensitivities(rateOne(t, m, EN, o)) }
	full := table(doubleOf(t, 12, map[string]float64{"argon": 1}, 1, 0.00005, 0.837), Options{})
	for row, step := range map[int]string{0: "−0.0001", 1: "+0.0001", 2: "±0.0001", 3: "−0.001", 4: "±0.01 mm"} {
		if cells := full.Rows.Cells[row]; cells[len(cells)-1] != step {
			t.Errorf("%s: step %q, want %q", cells[0], cells[len(cells)-1], step)
		}
	}
	if !strings.Contains(full.Note, "to one side") {
		t.Errorf("note %q says nothing of one side", full.Note)
	}
	air := workSensitivities(rateOne(t, doubleOf(t, 12, map[string]float64{"air": 1}, 0.837, 0.837, 0.837), EN, Options{}))
	if got := strings.Join(air.Rows.Cells[3], "|"); got != "gas in gap 1|0|+0.01|–|–|–" || air.lacking[0].why != "gap 1 is filled with air" {
		t.Errorf("row of a gap of air: %s, %v", got, air.lacking)
	}
	if strings.Contains(air.Note, "one side") || strings.Contains(air.Note, "*") {
		t.Errorf("note %q of central steps", air.Note)
	}
	single := table(&Makeup{Panes: []Placed{{Pane: pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)}}}, Options{InsideWM2K: 8})
	if single.Rows != nil || !strings.Contains(single.Note, "there is no gap") {
		t.Errorf("single pane with hi typed: %+v", single)
	}
}
