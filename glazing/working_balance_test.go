package glazing

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/spectra"
	"panewright/thermal"
)

// workedMakeups are make-ups that lead through every branch of the working of balances.
func workedMakeups(t *testing.T) map[string]*Makeup {
	t.Helper()
	clear, low := pane("clear", flat(300, 2500, 0.7, 0.08, 0.08), 0.837, 0.837), pane("low", flat(300, 2500, 0.5, 0.2, 0.25), 0.837, 0.04)
	dark := pane("dark", flat(300, 2500, 0.1, 0.06, 0.06), 0.837, 0.837)
	laminate := pane("laminate", flat(300, 2500, 0.4, 0.08, 0.08), 0.837, 0.837)
	laminate.Plies = []Ply{{ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}, {ThicknessMM: 1.52, ConductivityWMK: 0.2, DensityKGM3: 1070, Interlayer: true},
		{ThicknessMM: 4, ConductivityWMK: 1, DensityKGM3: 2500}}
	film := pane("film", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
	film.Tints[0].Back = ComputedEmissivity(infraredRows(0.8), spectra.Curve{}, 0.22)
	foil := pane("foil", flat(300, 2500, 0.8, 0.1, 0.1), 0.1, 0.5)
	foil.Plies[0].ThicknessMM, foil.TauInfrared = 0.05, 0.3
	air, mixed := map[string]float64{"air": 1}, map[string]float64{"argon": 0.9, "air": 0.1}
	vacuum := func(pillars Value) Gap {
		return Gap{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20, PillarWMK: pillars}}
	}
	of := func(gaps []Gap, panes ...Placed) *Makeup {
		return &Makeup{ID: "M", Panes: panes, Gaps: gaps, Edge: Edge{PsiWMK: known(0.06)}}
	}
	edged := of([]Gap{gap(t, 16, air)}, Placed{Pane: clear}, Placed{Pane: low, Turned: true})
	edged.Edge = Edge{TemperatureFactor: known(0.6)}
	sloped := of([]Gap{gap(t, 14, mixed)}, Placed{Pane: low}, Placed{Pane: laminate})
	sloped.Tilt = TiltDeg(35)
	return map[string]*Makeup{
		"single":        of(nil, Placed{Pane: clear}),
		"double of air": edged,
		"double, argon": of([]Gap{gap(t, 16, mixed)}, Placed{Pane: clear}, Placed{Pane: low, Turned: true}),
		"wide":          of([]Gap{gap(t, 60, air)}, Placed{Pane: clear}, Placed{Pane: clear}),
		"very wide":     of([]Gap{gap(t, 400, air)}, Placed{Pane: clear}, Placed{Pane: clear}),
		"triple": of([]Gap{gap(t, 12, map[string]float64{"krypton": 1}), gap(t, 10, map[string]float64{"xenon": 0.5, "krypton": 0.3, "air": 0.2})},
			Placed{Pane: dark}, Placed{Pane: clear}, Placed{Pane: low, Turned: true}),
		"sloped":                 sloped,
		"laminate":               of([]Gap{gap(t, 12, air)}, Placed{Pane: laminate, Turned: true}, Placed{Pane: laminate}),
		"laminate in the middle": of([]Gap{gap(t, 12, air), gap(t, 12, air)}, Placed{Pane: low}, Placed{Pane: laminate}, Placed{Pane: clear}),
		"films":                  of([]Gap{gap(t, 12, air)}, Placed{Pane: film}, Placed{Pane: clear}),
		"vacuum":                 of([]Gap{vacuum(unknown(""))}, Placed{Pane: film}, Placed{Pane: clear}),
		"vacuum beside argon": of([]Gap{vacuum(known(20)), gap(t, 12, mixed)}, Placed{Pane: clear}, Placed{Pane: low, Turned: true},
			Placed{Pane: clear}),
		"foil":         of([]Gap{gap(t, 12, air), gap(t, 12, mixed)}, Placed{Pane: clear}, Placed{Pane: foil}, Placed{Pane: clear}),
		"foil outside": of([]Gap{gap(t, 12, air)}, Placed{Pane: foil}, Placed{Pane: clear}),
	}
}

// workedConditions do so too.
func workedConditions() []Condition {
	list := []Condition{
		{ID: "assumed-wind", OutsideC: -5, InsideC: 20, InsideHumidity: known(0.5)},
		{ID: "windy", OutsideC: -12, InsideC: 20, WindMS: known(6), OutsideRadiantC: known(-15), InsideRadiantC: known(18), InsideHumidity: known(0.15), HeightM: known(2)},
		{ID: "hot", OutsideC: 35, InsideC: 25, OutsideConvectionWM2K: known(8), SunWM2: 900, InsideHumidity: known(0.6), SkyC: known(10), InsideRadiantC: known(27)},
		{ID: "given", OutsideC: 5, InsideC: 22, WindMS: known(2), InsideConvectionWM2K: known(3), SunWM2: 300},
		{ID: "same", OutsideC: 21, InsideC: 21, WindMS: known(2)},
		{ID: "same-sun", OutsideC: 21, InsideC: 21, WindMS: known(2), SunWM2: 500},
	}
	for _, deg := range []float64{0, 10, 40, 60, 75, 88, 105, 150, 180} {
		list = append(list,
			Condition{ID: fmt.Sprintf("cold-%g", deg), OutsideC: 0, InsideC: 20, WindMS: known(3), SkyC: known(-20), TiltDeg: known(deg)},
			Condition{ID: fmt.Sprintf("sun-%g", deg), OutsideC: 30, InsideC: 24, WindMS: known(1), SunWM2: 600, TiltDeg: known(deg), HeightM: known(0.6)})
	}
	return list
}

// Every right-hand side can be worked out as it stands, through every branch, and tables of surfaces
// close; figures that the list of figures has stand in the working with the same value.
func TestWorkingOfBalances(t *testing.T) {
	conditions := workedConditions()
	people := []*Person{nil, {DistanceM: 0.3, GlassWidthM: 2, GlassHeightM: 2.4, Standing: true, SunAltitudeDeg: 20, SunFromFrontDeg: 130, SkyShare: 0.1, BodyShare: 0.4, Absorptivity: 0.6, FloorReflectance: 0.3},
		{DistanceM: 2.5, GlassWidthM: 4, GlassHeightM: 3, SunAltitudeDeg: 60, SkyShare: 0.3, BodyShare: 1, Absorptivity: 0.7, FloorReflectance: 0.2}}
	steps, seen := 0, map[string]bool{}
	var notes strings.Builder
	for name, m := range workedMakeups(t) {
		for i, basis := range Bases() {
			o := Options{Conditions: conditions, Person: people[i%len(people)]}
			if i == 1 {
				o.Stress = &StressScreening{FrameMarginK: 3, Factor: 1.2}
			}
			r := rateOne(t, m, basis, o)
			chapters := Working(r)
			for _, c := range chapters {
				notes.WriteString(c.Note + "\n")
				if strings.Contains(c.Title, "NaN") || strings.Contains(c.Note, "NaN") {
					t.Errorf("%s, %s: %s: %s", name, basis.Name, c.Title, c.Note)
				}
				for _, s := range c.Steps {
					got, err := evaluated(s.Numbers)
					if err != nil {
						t.Fatalf("%s, %s: %s, %s: %q: %v", name, basis.Name, c.Title, s.Symbol, s.Numbers, err)
					}
					if !(math.Abs(got-s.Value) <= printedAs(s.Value)) {
						t.Errorf("%s, %s: %s, %s: %s is %.9g, want %.9g", name, basis.Name, c.Title, s.Symbol, s.Numbers, got, s.Value)
					}
					if s.Clause == "" || s.Meaning == "" && strings.HasPrefix(c.Title, "Condition") {
						t.Errorf("%s, %s: %s of %q bears no clause or meaning", name, basis.Name, s.Symbol, c.Title)
					}
					seen[s.Formula] = true
					steps++
				}
				if c.Rows != nil {
					fits(t, name+", "+c.Title, c.Rows)
				}
			}
			for k := range r.Balances {
				b := &r.Balances[k]
				surfacesClose(t, name, r, b, chapters)
				holdsFigures(t, name, r, b, chapters)
			}
		}
	}
	for _, formula := range []string{
		"1 + 1.7596678e-10·Ra^2.2984755", "0.028154·Ra^0.4134", "0.0673838·Ra^(1/3)", "0.242·(Ra/(H/s))^0.272",
		"1 + 1.44·max(0, 1 − 1708/Rac)·(1 − 1708·sin(1.8·γ)^1.6/Rac) + max(0, (Rac/5830)^(1/3) − 1)",
		"0.5/(1 + (Ra/3160)^20.6)^0.1", "Nu60 + (Nu90 − Nu60)·(γ − 60)/30", "1 + (Nu90 − 1)·sin(γ)",
		"0.13·Ra^(1/3)", "0.58·Ra^0.2", "0.56·(Ra·sin(γ))^(1/4)", "0.13·(Ra^(1/3) − Racv^(1/3)) + 0.56·(Racv·sin(γ))^(1/4)",
		"of the condition", "4 + 4·v, v in m/s", "4 + 4·v, v assumed, for there is neither wind nor coefficient",
		"180 − tilt, for the outer face is the warmer", "180 − tilt, for the glass is warmer than the air", "(Fsky·Tsky^4 + (1 − Fsky)·Tgr^4)^(1/4)",
		"1/(1/(4·λ1·a) + 1/(4·λ2·a))/p^2", "1/(1/(4·λ1·a) + 1/(4·λ2·a) + s/(λp·π·a^2))/p^2", "H1 − J1 of the table above", "J2 − H2 of the table above",
		"610.5·exp(21.875·θ/(265.5 + θ))", "237.3·L/(17.269 − L)", "265.5·L/(21.875 − L)", "typed by the user", "1 − (U + ψ/0.05)·0.13",
		"max(0, 100/(1 + exp(3.72 − 0.052·(−Δtpr))) − 3.5)", "max(0, 100/(1 + exp(6.61 − 0.345·(Δtpr))))", "max(0, 100/(1 + exp(9.93 − 0.5·(Δtpr))))", "max(0, 100/(1 + exp(2.84 − 0.174·(−Δtpr))) − 5.5)", "0.083·(h·(θi − θsi))^(1/2)", "0.043·(h·(θi − θsi))^(1/2)", "(0.3 − 0.034·2)·(θi − θsi)",
		"0.725·fp·fbody·τe·Eb", "(θ1 + θ2)/2 − margin of the frame", "of condition winter", "at surface 1", "at surface 2",
	} {
		if !seen[formula] {
			t.Errorf("no step is by %q", formula)
		}
	}
	for _, want := range []string{"for sheets pass infrared", "for air and what radiates differ", "not colder than the air", "beyond the range of the formula"} {
		if !strings.Contains(notes.String(), want) {
			t.Errorf("no note says %q", want)
		}
	}
	if steps < 40000 {
		t.Errorf("%d steps: too few", steps)
	}
}

// fits holds a table against the 80 columns of a page.
func fits(t *testing.T, what string, rows *Rows) {
	t.Helper()
	width := 0
	for i := range rows.Head {
		most := len([]rune(rows.Head[i]))
		for _, cells := range rows.Cells {
			if len(cells) != len(rows.Head) {
				t.Fatalf("%s: a row of %d cells under %d heads", what, len(cells), len(rows.Head))
			}
			most = max(most, len([]rune(cells[i])))
			if strings.Contains(cells[i], "NaN") || strings.Contains(cells[i], "Inf") {
				t.Errorf("%s: a cell %q", what, cells[i])
			}
		}
		width += most + 2
	}
	if width-2 > 80 {
		t.Errorf("%s: a table of %d columns", what, width-2)
	}
}

// rowsOf returns the numbers of the table of a chapter of a condition, a row a slice.
func rowsOf(t *testing.T, chapters []Chapter, title string) [][]float64 {
	t.Helper()
	at := slices.IndexFunc(chapters, func(c Chapter) bool { return c.Title == title })
	if at < 0 {
		t.Fatalf("no chapter %q", title)
	}
	var out [][]float64
	for _, cells := range chapters[at].Rows.Cells {
		var row []float64
		for _, cell := range cells {
			v, err := strconv.ParseFloat(cell, 64)
			if err != nil {
				t.Fatalf("%s: %v", title, err)
			}
			row = append(row, v)
		}
		out = append(out, row)
	}
	return out
}

// surfacesClose holds the table of surfaces against what must be true of it: as printed each row adds
// to nothing, what one face gives over a gap or through a pane the other takes up, and the whole
// takes up the sun that it absorbs. Where sheets pass infrared each radiosity is made of its parts
// (net radiation method, in textbooks).
func surfacesClose(t *testing.T, name string, r *Rating, b *Balance, chapters []Chapter) {
	t.Helper()
	title := "Condition " + b.Condition.ID + ": "
	rows := rowsOf(t, chapters, title+"surfaces")
	const surface, theta, convection, radiation, last = 0, 1, 2, 3, 1
	within := 2.5e-4 // four numbers of four decimals
	sunny := b.Condition.SunWM2 > 0
	absorbed := 0.0
	for i, row := range rows {
		pane := len(row) - 1 - last
		sum := 0.0
		for _, v := range row[convection : pane+1] {
			sum += v
		}
		if math.Abs(sum) > within || math.Abs(row[len(row)-1]) > 1e-6 || row[surface] != float64(i+1) {
			t.Errorf("%s, %s: surface %v: the heat adds to %g", name, b.Condition.ID, row, sum)
		}
		if sunny {
			absorbed += row[radiation+1]
		}
		if want := b.SurfaceC(i).Number; math.Abs(row[theta]-want) > 1e-6 {
			t.Errorf("%s, %s: surface %d at %g °C, want %g", name, b.Condition.ID, i+1, row[theta], want)
		}
		if i%2 == 0 && math.Abs(row[pane]+rows[i+1][pane]) > within {
			t.Errorf("%s, %s: pane %d conducts %g and %g", name, b.Condition.ID, i/2+1, row[pane], rows[i+1][pane])
		}
		if i%2 == 1 && i < len(rows)-1 && math.Abs(row[convection]+rows[i+1][convection]) > within {
			t.Errorf("%s, %s: gap %d convects %g and %g", name, b.Condition.ID, i/2+1, row[convection], rows[i+1][convection])
		}
	}
	want := 0.0
	for _, a := range r.Absorptance {
		want += a.Number * b.Condition.SunWM2
	}
	if math.Abs(absorbed-want) > float64(len(rows))*within {
		t.Errorf("%s, %s: the table has %g W/m² of sun, want %g", name, b.Condition.ID, absorbed, want)
	}
	if r.opaque() {
		return
	}
	const e, tau, black, falls, leaves, takes = 1, 2, 3, 4, 5, 6
	rows = rowsOf(t, chapters, title+"radiation of all faces")
	for i, row := range rows {
		other := rows[i^1]
		j := row[e]*row[black] + row[tau]*other[falls] + (1-row[e]-row[tau])*row[falls]
		if math.Abs(j-row[leaves]) > within || math.Abs(row[e]*(row[falls]-row[black])-row[takes]) > within {
			t.Errorf("%s, %s: surface %d: J %g, of its parts %g; takes up %g, want %g", name, b.Condition.ID, i+1, row[leaves], j, row[takes], row[e]*(row[falls]-row[black]))
		}
		if i%2 == 1 && i < len(rows)-1 && math.Abs(row[leaves]-rows[i+1][falls]) > within {
			t.Errorf("%s, %s: surface %d sends %g, surface %d meets %g", name, b.Condition.ID, i+1, row[leaves], i+2, rows[i+1][falls])
		}
	}
}

// holdsFigures holds the steps of a condition against the list of figures: each bears the value that the
// figure of its symbol has, and there is none of a figure that is not known.
func holdsFigures(t *testing.T, name string, r *Rating, b *Balance, chapters []Chapter) {
	t.Helper()
	title, found := "Condition "+b.Condition.ID+": ", map[string]bool{}
	chapters = slices.DeleteFunc(slices.Clone(chapters), func(c Chapter) bool { return !strings.HasPrefix(c.Title, title) })
	for _, f := range BalanceFigures() {
		for i := range f.Figure.Count(r) {
			symbol, under := f.Symbol, title
			switch f.Per {
			case PerPane, PerSurface:
				continue
			case PerGap:
				under = fmt.Sprintf("%sgap %d, heat", title, i+1)
			default:
				if f.Symbol == "αe" || f.Symbol == "pane" || f.Symbol == "tilt" { // no step
					continue
				}
			}
			want := f.Of(r, b, i)
			for _, s := range stepsOf(chapters, under)[symbol] {
				if f.Per == PerMakeup && symbol != "U" && symbol != "g" && len(stepsOf(chapters, under)[symbol]) > 1 {
					continue
				}
				found[symbol] = true
				if !want.Known || math.Abs(s.Value-want.Number) > 1e-9*(1+math.Abs(want.Number)) {
					t.Errorf("%s, %s: step %s is %.9g, figure %v", name, b.Condition.ID, symbol, s.Value, want)
				}
			}
		}
	}
	for symbol, known := range map[string]bool{"U": b.U.Known, "g": b.G.Known, "qi": b.G.Known, "qin": true, "hce": true, "hci": true, "φsi": true, "φse": true, "Δtpr": true, "PDpr": r.balanceFigure(b, "comfort.asymmetry_dissatisfied_pct").Known,
		"θmax": true, "fRsi": b.U.Known, "θd": b.Condition.InsideHumidity.Known, "ERF": r.balanceFigure(b, "comfort.sun_field_w_m2").Known, "hg": len(r.Gaps) > 0, "E·τe": b.Condition.SunWM2 > 0} {
		if found[symbol] != known {
			t.Errorf("%s, %s: %s is written out %t, known %t", name, b.Condition.ID, symbol, found[symbol], known)
		}
	}
}

// A gap is held on the step of the upright correlation somewhere between two widths, of which one
// has Ra below it and one above; then the working says so, at each angle with a part of it.
func TestWorkingOfAGapOnTheStep(t *testing.T) {
	for _, deg := range []float64{90, 80, 100} {
		low, high := 20.0, 60.0
		held := false
		for range 60 {
			mm := (low + high) / 2
			m := &Makeup{ID: "S", Panes: []Placed{{Pane: pane("a", flat(300, 2500, 0.7, 0.1, 0.1), 0.837, 0.837)}, {Pane: pane("b", flat(300, 2500, 0.7, 0.1, 0.1), 0.837, 0.837)}},
				Gaps: []Gap{gap(t, mm, map[string]float64{"air": 1})}}
			step := Condition{ID: "step", OutsideC: -20, InsideC: 20, WindMS: known(3), TiltDeg: known(deg)}
			lit := step
			lit.ID, lit.SunWM2 = "lit", 500
			r := rateOne(t, m, EN, Options{Conditions: []Condition{step, lit}})
			ra := r.Balances[0].Dark.Gaps[0].Rayleigh
			if math.Abs(ra/5e4-1) > 1e-6 {
				if ra < 5e4 {
					low = mm
				} else {
					high = mm
				}
				continue
			}
			chapters := Working(r)
			steps := stepsOf(chapters, "Condition step: gap 1, heat")
			below, above := steps["Nu−"], steps["Nu+"]
			if len(below) != 1 || len(above) != 1 {
				t.Errorf("%g°: Ra %v, and the working does not say that Nu was held", deg, ra)
				break
			}
			symbol := "Nu90"
			if deg == 90 {
				symbol = "Nu"
			}
			if !slices.ContainsFunc(chapters, func(c Chapter) bool {
				return c.Title == "Condition lit: without sun" && strings.Contains(c.Note, "Nu of gap 1 was held")
			}) {
				t.Errorf("%g°: the state without sun does not say that Nu was held", deg)
			}
			nu := steps[symbol][0]
			if !(nu.Value > below[0].Value && nu.Value < above[0].Value) || !strings.Contains(nu.Formula, "between") {
				t.Errorf("%g°: Nu %v between %v and %v: %s", deg, nu.Value, below[0].Value, above[0].Value, nu.Formula)
			}
			for _, c := range chapters {
				for _, s := range c.Steps {
					if got, err := evaluated(s.Numbers); err != nil || math.Abs(got-s.Value) > printedAs(s.Value) {
						t.Errorf("%g°, %s, %s: %s is %v (%v), want %v", deg, c.Title, s.Symbol, s.Numbers, got, err, s.Value)
					}
				}
			}
			held = true
			break
		}
		if !held {
			t.Errorf("%g°: no width between 20 and 60 mm has a gap on the step", deg)
		}
	}
}

// What is not known has no number anywhere, and its reason stands there.
func TestWorkingOfUnknownBalances(t *testing.T) {
	conditions := []Condition{{ID: "night", OutsideC: -5, InsideC: 20}, {ID: "day", OutsideC: 30, InsideC: 24, SunWM2: 600}, {ID: "even", OutsideC: 20, InsideC: 20, InsideRadiantC: known(25)}}
	bare := pane("bare", flat(300, 2500, 0.7, 0.1, 0.1), 0.837, 0.837)
	bare.Tints[0].Back = NoEmissivity()
	short := pane("short", flat(380, 780, 0.7, 0.1, 0.1), 0.837, 0.837)
	told := func(chapters []Chapter) (s string) {
		for _, c := range chapters {
			s += c.Title + ". " + c.Note + "\n"
		}
		return s
	}
	for _, basis := range Bases() {
		chapters := Working(rateOne(t, &Makeup{ID: "U", Panes: []Placed{{Pane: bare}}}, basis, Options{Conditions: conditions}))
		for _, c := range chapters {
			if strings.HasPrefix(c.Title, "Condition") || (strings.HasPrefix(c.Title, "Thermal stress") && (c.Rows != nil || c.Steps != nil)) {
				t.Errorf("%s: chapter %q of temperatures that are not known", basis.Name, c.Title)
			}
		}
		for _, want := range []string{"temperatures under night, ", "pane 1: the emissivity of surface 2 (pane bare, back) is not known"} {
			if !strings.Contains(told(chapters), want) {
				t.Errorf("%s: nothing says %q:\n%s", basis.Name, want, told(chapters))
			}
		}
		chapters = Working(rateOne(t, &Makeup{ID: "V", Panes: []Placed{{Pane: short}}}, basis, Options{Conditions: conditions}))
		day := stepsOf(chapters, "Condition day: ")
		for _, symbol := range []string{"g", "qi", "E·τe", "θmax", "A1", "ERF", "Δtpr", "vf"} {
			if len(day[symbol]) > 0 {
				t.Errorf("%s: %s is written out of sun that is not known", basis.Name, symbol)
			}
		}
		if len(day["U"]) == 0 || len(day["fRsi"]) != 1 || len(stepsOf(chapters, "Condition night: ")["U"]) != 2 {
			t.Errorf("%s: what needs no sun is not written out", basis.Name)
		}
		if !strings.Contains(told(chapters), "Not known: g: the spectrum of pane short") || !strings.Contains(told(chapters), "Written out without sun, of which") {
			t.Errorf("%s: nothing says why g is not known:\n%s", basis.Name, told(chapters))
		}
		even := stepsOf(chapters, "Condition even: ")
		if len(even["U"])+len(even["fRsi"])+len(even["Rt"])+len(even["θedge"]) > 0 || !strings.Contains(told(chapters), "Not known: U: indoor and outdoor air have one temperature") {
			t.Errorf("%s: U at one temperature: %+v", basis.Name, even["U"])
		}
	}
}

// A vacuum under en by hand: pillars of radius 0.25 mm, 20 mm apart, on glass of 1 W/(m·K) conduct
// 2·1·0.00025/0.02² = 1.25 W/(m²·K), residual gas of 0.1 Pa 0.08 (Collins and Simko 1998, from memory).
func TestWorkingOfAVacuum(t *testing.T) {
	clear := pane("clear", flat(300, 2500, 0.7, 0.08, 0.08), 0.837, 0.837)
	m := &Makeup{ID: "V", Panes: []Placed{{Pane: clear}, {Pane: clear}}, Gaps: []Gap{{WidthMM: 0.2, Vacuum: &Vacuum{PressurePa: 0.1, PillarRadiusMM: 0.25, PillarPitchMM: 20}}}}
	for _, basis := range []Basis{EN, ISO, NA} {
		r := rateOne(t, m, basis, Options{})
		chapters := Working(r)
		title := "Gap 1: 0.2 mm vacuum"
		if basis.Balances() {
			title = "Condition winter: gap 1, heat: 0.2 mm"
		}
		got := stepsOf(chapters, title)
		for symbol, want := range map[string]float64{"hp": 1.25, "hv": 0.08, "hg": 1.33} {
			if len(got[symbol]) != 1 || math.Abs(got[symbol][0].Value-want) > 1e-12 {
				t.Errorf("%s: %s is %+v, want %v", basis.Name, symbol, got[symbol], want)
			}
		}
		for _, symbol := range []string{"Ra", "Nu", "Gr", "Pr", "ρ", "µ"} {
			if len(got[symbol]) > 0 {
				t.Errorf("%s: a vacuum has %s", basis.Name, symbol)
			}
		}
		said := ""
		for _, c := range chapters {
			said += c.Note + "\n"
		}
		if strings.Contains(said, "which is outside "+basis.rounding+": pillars") == basis.Balances() || !strings.Contains(said, "no pillar_conductivity_w_mk is given") {
			t.Errorf("%s: notes of a vacuum: %s", basis.Name, said)
		}
	}
}

// A gas mixed with itself is that gas: φ and ψ are then 1, and the steps of a mixture come to those of
// the pure one (kinetic theory; mixing rules of ISO 15099, annex B, from memory).
func TestWorkingOfMixtures(t *testing.T) {
	pure := gap(t, 16, map[string]float64{"argon": 1})
	fluid, err := pure.Gas.Fluid()
	if err != nil {
		t.Fatal(err)
	}
	const tm = 280
	var one, two Chapter
	one.gas(pure.Gas, tm, fluid.At(tm))
	half := thermal.Mixture{{Gas: "argon", Fraction: 0.5}, {Gas: "argon", Fraction: 0.5}}
	two.gas(half, tm, fluid.At(tm))
	for _, symbol := range []string{"µ", "λ", "cp", "ρ"} {
		a, b := stepsOf([]Chapter{one}, "")[symbol], stepsOf([]Chapter{two}, "")[symbol]
		if len(a) != 1 || len(b) != 1 {
			t.Fatalf("%s stands %d and %d times", symbol, len(a), len(b))
		}
		x, errX := evaluated(a[0].Numbers)
		y, errY := evaluated(b[0].Numbers)
		if errX != nil || errY != nil || math.Abs(x/y-1) > 1e-8 {
			t.Errorf("%s of argon is %s = %v, of argon with argon %s = %v", symbol, a[0].Numbers, x, b[0].Numbers, y)
		}
	}
}

// The sensitivities and other fills stand under every basis, and with conditions.
func TestWorkingOfInputsUnderBalances(t *testing.T) {
	for name, m := range workedMakeups(t) {
		for _, basis := range Bases() {
			r := rateOne(t, m, basis, Options{Conditions: workedConditions()[:1]})
			fills, list := workFills(r), workSensitivities(r)
			if r.U.Known && list.Rows == nil {
				t.Errorf("%s, %s: no sensitivities: %s %v", name, basis.Name, list.Note, list.lacking)
			}
			gas := slices.ContainsFunc(m.Gaps, func(g Gap) bool { return fill(g.Gas) > 0 })
			if (fills.Rows != nil) != (r.U.Known && gas) {
				t.Errorf("%s, %s: fills: %s %v", name, basis.Name, fills.Note, fills.lacking)
			}
			for _, c := range []Chapter{fills, list} {
				if c.Rows != nil {
					fits(t, name+", "+c.Title, c.Rows)
				}
			}
		}
	}
}
