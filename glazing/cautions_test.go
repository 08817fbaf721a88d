package glazing

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// The list of codes has every code that the sources of the module give a caution, each once and
// with words, and no other.
func TestCautionCodesAreWhole(t *testing.T) {
	made := map[string]bool{}
	for _, r := range cautionRules {
		made[r.code] = true
	}
	constants := map[string]string{} // of text, by name
	var later []string               // names of constants that are codes
	at := func(x ast.Expr, where string) {
		switch x := x.(type) {
		case *ast.BasicLit:
			code, err := strconv.Unquote(x.Value)
			if err != nil {
				t.Fatal(err)
			}
			made[code] = true
		case *ast.Ident:
			if x.Name != "code" { // a parameter of reach's add, whose calls are looked at
				later = append(later, x.Name)
			}
		case *ast.SelectorExpr:
			if x.Sel.Name != "code" { // that of a rule
				later = append(later, x.Sel.Name)
			}
		default:
			t.Errorf("%s: the code of a caution is neither a text nor a constant", where)
		}
	}
	literal := func(list *ast.CompositeLit, where string) {
		for i, e := range list.Elts {
			if pair, ok := e.(*ast.KeyValueExpr); ok && pair.Key.(*ast.Ident).Name == "Code" {
				at(pair.Value, where)
			} else if !ok && i == 0 {
				at(e, where)
			}
		}
	}
	isCaution := func(x ast.Expr) bool {
		switch x := x.(type) {
		case *ast.Ident:
			return x.Name == "Caution"
		case *ast.SelectorExpr:
			return x.Sel.Name == "Caution"
		}
		return false
	}
	err := filepath.WalkDir("..", func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return err
		}
		file, err := parser.ParseFile(token.NewFileSet(), path, nil, 0)
		if err != nil {
			return err
		}
		ast.Inspect(file, func(n ast.Node) bool {
			switch n := n.(type) {
			case *ast.ValueSpec:
				for i, name := range n.Names {
					if i < len(n.Values) {
						if text, ok := n.Values[i].(*ast.BasicLit); ok && text.Kind == token.STRING {
							constants[name.Name], _ = strconv.Unquote(text.Value)
						}
					}
				}
			case *ast.CompositeLit:
				list, many := n.Type.(*ast.ArrayType)
				switch {
				case n.Type != nil && isCaution(n.Type):
					literal(n, path)
				case many && isCaution(list.Elt):
					for _, e := range n.Elts {
						if one, ok := e.(*ast.CompositeLit); ok {
							literal(one, path)
						}
					}
				}
			case *ast.CallExpr:
				if f, ok := n.Fun.(*ast.Ident); ok && f.Name == "add" && filepath.Base(path) == "method.go" {
					at(n.Args[0], path)
				}
			}
			return true
		})
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	for _, name := range later {
		if constants[name] == "" {
			t.Errorf("%s is no constant, and the code of a caution", name)
		}
		made[constants[name]] = true
	}
	listed := map[string]bool{}
	for _, c := range CautionCodes() {
		if listed[c[0]] || c[1] == "" {
			t.Errorf("%s stands twice, or without words", c[0])
		}
		if listed[c[0]] = true; !made[c[0]] {
			t.Errorf("%s is listed and made nowhere", c[0])
		}
	}
	for code := range made {
		if !listed[code] {
			t.Errorf("%s is not in the list of codes", code)
		}
	}
	if len(made) < 40 {
		t.Errorf("%d codes were found", len(made))
	}
}

// Each caution appears on one side of its threshold and not on the other. What is shown is
// varied from a make-up that has none but those that always apply.
func TestThresholds(t *testing.T) {
	quiet := func() *Makeup {
		p := pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
		p.HeatTreatment = HeatStrengthened
		p.Tints[0].Spectrum = flat(300, 2500, 0.04, 0.1, 0.1)
		return &Makeup{ID: "q", Panes: []Placed{{Pane: p}}}
	}
	// Those of temperatures are left to TestThresholdsOfTemperatures.
	always := []string{"not_certified", "centre_of_glass", "local_codes", "barrier_and_load", "edition", "bird", "hot_surface", "thermal_stress", "outside_condensation"}
	optics := func(m *Makeup, tau, rho float64) { m.Panes[0].Pane.Tints[0].Spectrum = flat(300, 2500, tau, rho, 0.1) }
	double := func(m *Makeup, mm float64) {
		m.Panes = append(m.Panes, m.Panes[0])
		m.Gaps = []Gap{gap(t, mm, map[string]float64{"air": 1})}
	}
	switching := func(m *Makeup) {
		p := m.Panes[0].Pane
		p.Tints = []Tint{p.Tints[0], p.Tints[0]}
		p.Tints[0].Name, p.Tints[1].Name = "clear", "full"
	}
	blue := func(m *Makeup, depth float64) { // transmits more below 500 nm than beyond
		s := &m.Panes[0].Pane.Tints[0].Spectrum
		for i, nm := range s.Tau.NM {
			if nm > 500 {
				s.Tau.Value[i] = 0.04 * (1 - depth)
			}
		}
	}
	for _, tt := range []struct {
		what string
		vary func(m *Makeup)
		want []string
	}{
		{"nothing", func(*Makeup) {}, nil},
		{"αe 0.502, annealed", func(m *Makeup) { optics(m, 0.04, 0.1); m.Panes[0].Pane.HeatTreatment = Annealed }, []string{"annealed_absorbing"}},
		{"αe 0.502, annealed, not too dark", func(m *Makeup) { optics(m, 0.398, 0.1); m.Panes[0].Pane.HeatTreatment = Annealed }, []string{"annealed_absorbing", "uv_visible_damage"}},
		{"αe 0.498, annealed", func(m *Makeup) { optics(m, 0.402, 0.1); m.Panes[0].Pane.HeatTreatment = Annealed }, []string{"uv_visible_damage"}},
		{"αe 0.502, unknown", func(m *Makeup) { optics(m, 0.398, 0.1); m.Panes[0].Pane.HeatTreatment = "" }, []string{"annealed_absorbing", "uv_visible_damage"}},
		{"ρ 0.1507 outside", func(m *Makeup) { optics(m, 0.04, 0.1507) }, []string{"reflected_sun"}},
		{"ρ 0.1493 outside", func(m *Makeup) { optics(m, 0.04, 0.1493) }, nil},
		{"damage 0.0502", func(m *Makeup) { optics(m, 0.0502, 0.1) }, []string{"uv_visible_damage"}},
		{"damage 0.0498", func(m *Makeup) { optics(m, 0.0498, 0.1) }, nil},
		{"ε 0.299", func(m *Makeup) { m.Panes[0].Pane.Tints[0].Back = GivenEmissivity(0.299) }, []string{"radio"}},
		{"ε 0.301", func(m *Makeup) { m.Panes[0].Pane.Tints[0].Back = GivenEmissivity(0.301) }, nil},
		{"tilt 74.7", func(m *Makeup) { m.Tilt = TiltDeg(74.7) }, []string{"overhead"}},
		{"tilt 75.3", func(m *Makeup) { m.Tilt = TiltDeg(75.3) }, nil},
		{"50.2 kg/m²", func(m *Makeup) { m.Panes[0].Pane.Plies[0].ThicknessMM = 20.08 }, []string{"mass"}},
		{"49.8 kg/m²", func(m *Makeup) { m.Panes[0].Pane.Plies[0].ThicknessMM = 19.92 }, nil},
		{"gap of 9.95 mm", func(m *Makeup) { double(m, 9.95) }, []string{"climate_load", "colour_of_dark"}},
		{"gap of 10.05 mm", func(m *Makeup) { double(m, 10.05) }, []string{"colour_of_dark"}},
		{"three panes", func(m *Makeup) {
			double(m, 12)
			m.Panes, m.Gaps = append(m.Panes, m.Panes[0]), append(m.Gaps, m.Gaps[0])
		}, []string{"climate_load", "colour_of_dark"}},
		{"toughened", func(m *Makeup) { m.Panes[0].Pane.HeatTreatment = Toughened }, []string{"heat_soak"}},
		{"toughened and soaked", func(m *Makeup) { m.Panes[0].Pane.HeatTreatment, m.Panes[0].Pane.HeatSoaked = Toughened, true }, nil},
		{"invented", func(m *Makeup) { m.Panes[0].Pane.Origin = InventedOrigin }, []string{"invented"}},
		{"modelled", func(m *Makeup) { m.Panes[0].Pane.Origin = ModelledOrigin }, []string{"modelled"}},
		{"switching, τv 0.00603", func(m *Makeup) { optics(m, 0.00603, 0.1); switching(m) }, []string{"power_failure", "electrical", "glare_remains", "colour_of_dark"}},
		{"switching, τv 0.00597", func(m *Makeup) { optics(m, 0.00597, 0.1); switching(m) }, []string{"power_failure", "electrical", "colour_of_dark"}},
		{"τv 0.00995", func(m *Makeup) { optics(m, 0.00995, 0.1) }, []string{"colour_of_dark"}},
		{"τv 0.01005", func(m *Makeup) { optics(m, 0.01005, 0.1) }, nil},
		{"εn 0.0299 below the table", func(m *Makeup) { m.Panes[0].Pane.Tints[0].Front = GivenNormalEmissivity(0.0299) }, []string{"emissivity_below_table", "radio"}},
		{"εn 0.0301 within the table", func(m *Makeup) { m.Panes[0].Pane.Tints[0].Front = GivenNormalEmissivity(0.0301) }, []string{"radio"}},
		{"no emissivity", func(m *Makeup) { m.Panes[0].Pane.Tints[0].Back = NoEmissivity() }, []string{"missing_data", "missing_data"}},
		{"tilted double at 45°", func(m *Makeup) { double(m, 16); m.Tilt = TiltDeg(45) }, []string{"overhead", "tilt_vertical_g", "colour_of_dark"}},
		{"tilted double at 60°", func(m *Makeup) { double(m, 16); m.Tilt = TiltDeg(60) }, []string{"overhead", "tilt_vertical_g", "tilt_interpolated", "colour_of_dark"}},
		{"double at 100°", func(m *Makeup) { double(m, 16); m.Tilt = TiltDeg(100) }, []string{"tilt_vertical_g", "tilt_interpolated", "colour_of_dark"}},
	} {
		m := quiet()
		tt.vary(m)
		r := rateOne(t, m, EN, Options{})
		var got []string
		for _, c := range r.Cautions {
			if c.Text == "" {
				t.Errorf("%s: caution %s says nothing", tt.what, c.Code)
			}
			if !slices.Contains(always, c.Code) {
				got = append(got, c.Code)
			}
		}
		slices.Sort(got)
		slices.Sort(tt.want)
		if !slices.Equal(got, tt.want) {
			t.Errorf("%s: cautions %v, want %v", tt.what, got, tt.want)
		}
	}
	// Colour cautions, where the figure itself tells the side.
	method := NewMethod(EN, Options{})
	for depth := 0.05; depth < 0.95; depth += 0.001 {
		m := quiet()
		blue(m, depth)
		ready, err := method.Ready(m)
		if err != nil {
			t.Fatal(err)
		}
		ratings, err := ready.RateAll()
		if err != nil {
			t.Fatal(err)
		}
		r := &ratings[0]
		has := func(code string) bool {
			return slices.ContainsFunc(r.Cautions, func(c Caution) bool { return c.Code == code })
		}
		if want := r.Ra.Number < 80; has("colour_signals") != want {
			t.Errorf("Ra %.2f: caution %t, want %t", r.Ra.Number, !want, want)
		}
		if want := r.Transmitted.TwoDegree.B < -10; has("blue_daylight") != want {
			t.Errorf("b* %.2f: caution %t, want %t", r.Transmitted.TwoDegree.B, !want, want)
		}
	}
}

func TestTiltBeyondVertical(t *testing.T) {
	p := pane("p", flat(300, 2500, 0.6, 0.1, 0.1), 0.837, 0.837)
	m := &Makeup{ID: "m", Tilt: TiltDeg(90.5), Panes: []Placed{{Pane: p}, {Pane: p}}, Gaps: []Gap{gap(t, 16, map[string]float64{"air": 1})}}
	for _, c := range rateOne(t, m, EN, Options{}).Cautions {
		if c.Code == "tilt_interpolated" && !strings.Contains(c.Text, "as at 89.5°") {
			t.Errorf("caution says %q, want the gap taken as at 89.5°", c.Text)
		}
	}
}

// The share of the weight that may be missing at an end is 0.1 %.
func TestShareThatIsHeld(t *testing.T) {
	for _, tt := range []struct {
		share float64
		known bool
	}{{0.000995, true}, {0.001005, false}} {
		sun := &Options{Sun: fineSun()}
		sun.Sun.NM, sun.Sun.Weight = []float64{300, 1000, 2500}, []float64{0, 1 - tt.share, tt.share}
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: pane("p", flat(300, 2495, 0.6, 0.1, 0.1), 0.837, 0.837)}}}, EN, *sun)
		if r.Solar.Transmittance.Known != tt.known {
			t.Errorf("a share of %g beyond the end: known %t, want %t", tt.share, r.Solar.Transmittance.Known, tt.known)
		}
	}
}

// A fraction below 0.05 is printed with a third decimal.
func TestSmallFractions(t *testing.T) {
	for _, tt := range []struct {
		tau  float64
		want string
	}{{0.0502, "0.05"}, {0.0498, "0.050"}, {0.0123, "0.012"}, {0.556, "0.56"}} {
		r := rateOne(t, &Makeup{Panes: []Placed{{Pane: pane("p", flat(300, 2500, tt.tau, 0.1, 0.1), 0.837, 0.837)}}}, EN, Options{})
		for _, f := range Figures() {
			if f.Alias == "light" {
				if got := f.Print(r, 0); got != tt.want {
					t.Errorf("%g is printed %s, want %s", tt.tau, got, tt.want)
				}
			}
		}
	}
}
