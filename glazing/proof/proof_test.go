package proof

import (
	"maps"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/reference/checks"
	"panewright/spectra/colour"
)

// The published figures, each within the tolerance that stands beside it, or as far from its source
// as it is known to be.
func TestRun(t *testing.T) {
	groups := Run(checks.Groups())
	n := 0
	for _, g := range groups {
		for _, o := range g.Outcomes {
			n++
			switch {
			case o.Err != nil:
				t.Error(o.Err)
			case o.Result == Missed:
				t.Errorf("%s: %s %s: got %.9g, want %.9g ± %.2g, unit %s (%s; %s)", o.ID, o.What, o.Subject, o.Got, o.Want, o.Tolerance, o.Unit, o.Source, o.Standing)
			case o.Result == Met && o.Known.Why != "":
				t.Errorf("%s is known to differ from its source and does not", o.ID)
			}
		}
	}
	if all := len(checks.All()); n != all || Count(groups, "", "") != all {
		t.Errorf("%d outcomes, counted as %d, of %d checks", n, Count(groups, "", ""), all)
	}
}

// Groups keep what the files say, and their sources add up.
func TestGroups(t *testing.T) {
	groups := Run(checks.Groups())
	byStanding := 0
	for _, s := range checks.Standings() {
		for _, r := range Results() {
			byStanding += Count(groups, s, r)
		}
	}
	if all := len(checks.All()); byStanding != all {
		t.Errorf("counted by standing and result %d checks, there are %d", byStanding, all)
	}
	for i, g := range groups {
		if want := checks.Groups()[i]; g.Title != want.Title || len(g.Outcomes) != len(want.Checks) || g.Outcomes[0].ID != want.Checks[0].ID {
			t.Errorf("group %d is %q with %d outcomes, want %q", i, g.Title, len(g.Outcomes), want.Title)
		}
		n := 0
		for _, s := range g.Sources() {
			n += s.Checks
		}
		if n != len(g.Outcomes) {
			t.Errorf("%s: sources of %d checks, there are %d", g.Title, n, len(g.Outcomes))
		}
	}
}

// Each kind of check is used, and no name stands twice in the table.
func TestKindsAreUsed(t *testing.T) {
	used := map[string]bool{}
	for _, c := range checks.All() {
		used[c.Kind] = true
	}
	seen := map[string]bool{}
	for _, k := range kinds() {
		if !used[k.name] {
			t.Errorf("no check is of kind %q", k.name)
		}
		if seen[k.name] {
			t.Errorf("kind %q stands twice", k.name)
		}
		seen[k.name] = true
	}
}

// A published figure that were another by a little more than its tolerance must not pass: a
// check that cannot fail proves nothing.
func TestMovedFigureFails(t *testing.T) {
	var m memo
	for _, c := range checks.All() {
		for _, sign := range []float64{-1, 1} {
			moved := c
			moved.Want += sign * max(2.01*c.Tolerance, 1e-9)
			if o := m.evaluate(moved); o.Result != Missed {
				t.Errorf("%s is %s with %.9g instead of %.9g, unit %s", c.ID, o.Result, moved.Want, c.Want, c.Unit)
			}
		}
	}
}

// A known difference holds for the check that it names and within its bounds alone.
func TestKnownDifference(t *testing.T) {
	c := checks.Check{ID: "x", Kind: "damage_weight", Inputs: map[string]string{"wavelength_nm": "300"}, Want: 0.9, Tolerance: 0.05}
	var m memo
	for _, tt := range []struct {
		known checks.Known
		want  Result
	}{
		{checks.Known{}, Missed},
		{checks.Known{From: 0.09, To: 0.11, Why: "why"}, Known},
		{checks.Known{From: 0.11, To: 0.12, Why: "why"}, Missed},
		{checks.Known{From: 0.08, To: 0.09, Why: "why"}, Missed},
		{checks.Known{From: -0.11, To: -0.09, Why: "why"}, Missed},
	} {
		c.Known = tt.known
		if o := m.evaluate(c); o.Result != tt.want {
			t.Errorf("known %+v: %s with a difference of %g, want %s", tt.known, o.Result, o.Deviation, tt.want)
		}
	}
}

// A check with one input more or one fewer has an error and does not pass: no kind ignores an
// input, and none assumes one.
func TestInputsAreNeeded(t *testing.T) {
	var m memo
	for _, c := range checks.All() {
		more := c
		more.Inputs = maps.Clone(c.Inputs)
		more.Inputs["colour_of_the_frame"] = "mauve"
		if o := m.evaluate(more); o.Err == nil || o.Result != Missed {
			t.Errorf("%s takes an input that means nothing", c.ID)
		}
		for gone := range c.Inputs {
			fewer := c
			fewer.Inputs = maps.Clone(c.Inputs)
			delete(fewer.Inputs, gone)
			if o := m.evaluate(fewer); o.Err == nil || o.Result != Missed {
				t.Errorf("%s does without its input %s", c.ID, gone)
			}
		}
	}
	if o := m.evaluate(checks.Check{ID: "x", Kind: "guess"}); o.Err == nil || o.Result != Missed {
		t.Error("an unknown kind was computed")
	}
}

// What a make-up of the matrix must not be, with a word that its error must hold.
func TestMakeupRefuses(t *testing.T) {
	const pane = "4 mm, emissivity 0.837/0.03, tau 300:0.1/2500:0.5, rho_front 0.1, rho_back 0.2"
	good := map[string]string{"makeup": "soft | 16 argon:0.9/air:0.1 | soda-lime-4", "basis": "en/iso", "figure": "solar.transmittance", "pane soft": pane}
	var m memo
	if _, err := m.compute(checks.Check{Kind: "makeup", Inputs: good}); err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct{ key, old, new, word string }{
		{"makeup", "soft |", "soft upside |", "neither a pane"},
		{"makeup", "soda-lime-4", "16 air:1", "neither a pane"},
		{"makeup", "16 argon:0.9/air:0.1", "soft", "nor, in its place, a gap"},
		{"makeup", "16", "wide", "not a number"},
		{"makeup", "air:0.1", "air:0.2", "add to"},
		{"makeup", "soda-lime-4", "soda-4", "soda-4"},
		{"makeup", " | soda-lime-4", "", "1 panes and 1 gaps"},
		{"figure", "transmittance", "transparency", "transparency"},
		{"figure", "transmittance", "absorptance.3", "absorptance.3"},
		{"figure", "solar.transmittance", "u_w_m2k", "under the first"},
		{"basis", "iso", "din", "din"},
		{"pane soft", ", rho_back 0.2", "", "each of"},
		{"pane soft", "rho_back", "tau", "each of"},
		{"pane soft", "rho_back", "rho_inside", "rho_inside"},
		{"pane soft", "4 mm", "four mm", "four mm"},
		{"pane soft", "0.837/0.03", "0.837", "emissivity"},
		{"pane soft", "2500:0.5", "250:0.5", "ascend"},
		{"pane soft", "2500:0.5", "2500", "2500"},
	} {
		bad := maps.Clone(good)
		bad[tt.key] = strings.Replace(good[tt.key], tt.old, tt.new, 1)
		if bad[tt.key] == good[tt.key] {
			t.Fatalf("%s: nothing was changed", tt.new)
		}
		if _, err := m.compute(checks.Check{Kind: "makeup", Inputs: bad}); err == nil || !strings.Contains(err.Error(), tt.word) {
			t.Errorf("%s %q: error is %v, want one with %q", tt.key, bad[tt.key], err, tt.word)
		}
	}
}

// The panes that the matrix defines absorb nothing below 0, whichever side the sun comes from.
func TestMatrixPanes(t *testing.T) {
	for _, g := range checks.Groups() {
		for _, d := range g.Panes {
			p, err := defined(d.Name, d.Text)
			if err != nil {
				t.Fatal(err)
			}
			s := p.Tints[0].Spectrum
			for nm := 300.0; nm <= 2500; nm++ {
				if tau := s.Tau.At(nm); tau < 0 || tau+s.RhoFront.At(nm) > 1 || tau+s.RhoBack.At(nm) > 1 {
					t.Errorf("pane %s at %g nm transmits %g, reflects %g and %g", d.Name, nm, tau, s.RhoFront.At(nm), s.RhoBack.At(nm))
				}
			}
		}
	}
}

// The matrix has what its frame asks for: singles, doubles and triples; each surface towards a gap
// coated, each gas, absorbing panes in each place; every figure of each.
func TestMatrixScope(t *testing.T) {
	sizes, gases := map[int]int{}, map[string]bool{}
	coated, absorbing := map[[2]int]bool{}, map[[2]int]bool{}
	figures := map[string]map[string]int{} // rows of each column
	groups := checks.Groups()
	matrix := groups[slices.IndexFunc(groups, func(g checks.Group) bool { return strings.HasPrefix(g.Title, "Test matrix") })]
	for _, c := range matrix.Checks {
		row, column := c.ID[:strings.LastIndex(c.ID, "-")], c.ID[strings.LastIndex(c.ID, "-")+1:]
		if figures[column] == nil {
			figures[column] = map[string]int{}
		}
		figures[column][row]++
		if column != "tau_v" {
			continue
		}
		in := &inputs{values: c.Inputs, used: map[string]bool{}, memo: new(memo)}
		m := in.sequence()
		if in.err != nil {
			t.Fatal(in.err)
		}
		n := len(m.Panes)
		sizes[n]++
		for _, g := range m.Gaps {
			for _, s := range g.Gas {
				gases[s.Gas] = true
			}
		}
		for k, p := range m.Panes {
			front, back := p.Pane.Tints[0].Front.Corrected.Number, p.Pane.Tints[0].Back.Corrected.Number
			if p.Turned {
				front, back = back, front
			}
			coated[[2]int{n, 2*k + 1}] = coated[[2]int{n, 2*k + 1}] || front < 0.5
			coated[[2]int{n, 2*k + 2}] = coated[[2]int{n, 2*k + 2}] || back < 0.5
			tint := strings.Contains(p.Pane.ID, "grey") || strings.Contains(p.Pane.ID, "bronze") || strings.Contains(p.Pane.ID, "green")
			absorbing[[2]int{n, k + 1}] = absorbing[[2]int{n, k + 1}] || tint
		}
	}
	for n, least := range map[int]int{1: 10, 2: 25, 3: 12} {
		if sizes[n] < least {
			t.Errorf("%d make-ups of %d panes, want %d at least", sizes[n], n, least)
		}
		for k := 1; k <= n; k++ {
			if !absorbing[[2]int{n, k}] {
				t.Errorf("no make-up of %d panes has an absorbing pane in place %d", n, k)
			}
		}
		for s := 1; s <= 2*n; s++ {
			if !coated[[2]int{n, s}] && !(n == 3 && s == 1) {
				t.Errorf("no make-up of %d panes has a coating on surface %d", n, s)
			}
		}
	}
	for _, g := range glazing.Gases() {
		if !gases[g] {
			t.Errorf("no make-up has %s in it", g)
		}
	}
	all := len(figures["tau_v"])
	for column, rows := range figures {
		want := all
		switch column {
		case "alpha_e2":
			want = sizes[2] + sizes[3]
		case "alpha_e3":
			want = sizes[3]
		}
		if len(rows) != want {
			t.Errorf("%d make-ups have %s, want %d", len(rows), column, want)
		}
	}
	if len(figures) != 15 {
		t.Errorf("the matrix has the figures %q", slices.Sorted(maps.Keys(figures)))
	}
}

// The lamps stand on the wavelengths that the observers have.
func TestLampsFitTheObservers(t *testing.T) {
	if nm, _, _ := checks.Lamp("fl1"); !slices.Equal(nm, colour.Wavelengths()) {
		t.Errorf("lamps are given at %v", nm)
	}
}
