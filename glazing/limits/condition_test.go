package limits

import (
	"math"
	"strings"
	"testing"

	"panewright/glazing"
)

// balancedFigure returns a figure that only balances have.
func balancedFigure(t *testing.T, alias, condition string) glazing.Figure {
	t.Helper()
	for _, f := range glazing.BalanceFigures() {
		if f.Alias == alias {
			return f.At(condition)
		}
	}
	t.Fatalf("no figure %s of a balance", alias)
	return glazing.Figure{}
}

// A limit for a condition is held against the balance under it, whether it names a figure that a
// rating has too or one that only balances have. Closed form: where everything has one temperature
// and there is no sun, every surface has that temperature and nothing flows.
func TestConditions(t *testing.T) {
	m := makeup(t, "D", glazing.Placed{Pane: pane("a", flat(0.7, 0.1, 0.2), 0.8, 0.8)}, glazing.Placed{Pane: pane("b", flat(0.6, 0.1, 0.2), 0.8, 0.8)})
	still := glazing.Condition{ID: "still", OutsideC: 10, InsideC: 10, SunWM2: 0}
	cold := glazing.Condition{ID: "cold", OutsideC: -10, InsideC: 20, WindMS: bound(4), SunWM2: 300}
	var ratings []glazing.Rating
	for _, b := range []glazing.Basis{glazing.EN, glazing.NA} {
		ready, err := glazing.NewMethod(b, glazing.Options{Conditions: []glazing.Condition{still, cold}}).Ready(m)
		if err != nil {
			t.Fatal(err)
		}
		all, err := ready.RateAll()
		if err != nil {
			t.Fatal(err)
		}
		ratings = append(ratings, all...)
	}
	en, na := &ratings[0], &ratings[1]
	drop := func(of *glazing.Balance) float64 { return of.Dark.InwardWM2() / -30 }
	for _, tt := range []struct {
		name, figure, basis, condition string
		atLeast, atMost                float64
		key                            string
		value                          float64
		verdict                        Verdict
		why                            string
	}{
		{"every surface is as warm as the air", "temperature", "en", "still", 10, none, "balances.still.surface_temperatures_c.", 10, Meets, ""},
		{"the room side", "inside_surface", "en", "still", 10.5, none, "balances.still.inside_surface_c", 10, DoesNotMeet, ""},
		{"nothing flows", "inward_flux", "na", "still", none, 0, "balances.still.inward_flux_w_m2", 0, Meets, ""},
		{"U of no difference", "u", "en", "still", none, 3, "balances.still.u_w_m2k", 0, CannotBeJudged, "one temperature"},
		{"g of no sun", "g", "en", "still", none, 0.5, "balances.still.g", 0, CannotBeJudged, "no sun"},
		{"U of a rating's name", "u", "en", "cold", none, 9, "balances.cold.u_w_m2k", drop(en.Balance("cold")), Meets, ""},
		{"and of another basis", "u", "na", "cold", none, 9, "balances.cold.u_w_m2k", drop(na.Balance("cold")), Meets, ""},
		{"of the basis", "u", "na", "winter", none, 9, "balances.winter.u_w_m2k", na.U.Number, Meets, ""},
		{"g of the basis", "solar.g", "na", "summer", none, 1, "balances.summer.g", na.G.Number, Meets, ""},
		{"of a gap", "gaps.1.nusselt", "en", "cold", 0.9, none, "balances.cold.gaps.1.nusselt", en.Balance("cold").Lit.Gaps[0].Nusselt, Meets, ""},
		{"of no gap", "gaps.2.nusselt", "en", "cold", 0.9, none, "balances.cold.gaps.2.nusselt", 0, CannotBeJudged, "it has no gap 2"},
		{"of no balance", "u", "en", "winter", none, 9, "balances.winter.u_w_m2k", 0, CannotBeJudged, "basis en has none"},
		{"of no condition", "u", "na", "januar", none, 9, "balances.januar.u_w_m2k", 0, CannotBeJudged, "there is no condition januar under basis na; there are winter, summer, still, cold"},
	} {
		f, place, ok := glazing.FigureNamed(tt.figure)
		if !ok {
			f = balancedFigure(t, tt.figure, tt.condition)
		}
		l := glazing.Limit{Figure: f, Place: place, AtLeast: bound(tt.atLeast), AtMost: bound(tt.atMost), Scope: glazing.CentreScope, Basis: tt.basis, Condition: tt.condition}
		got := Judge([]glazing.Limit{l}, []*glazing.Makeup{m}, nil, ratings)
		if len(got) != 1 {
			t.Fatalf("%s: %d results", tt.name, len(got))
		}
		r := got[0]
		if r.Verdict != tt.verdict || !strings.HasPrefix(r.Figure, tt.key) || !strings.Contains(r.Why, tt.why) || (tt.why == "") != (r.Why == "") {
			t.Errorf("%s: %s %s (%s); want %s %s (%s)", tt.name, r.Figure, r.Verdict, r.Why, tt.key, tt.verdict, tt.why)
		}
		if r.Value.Known != (tt.why == "") || math.Abs(r.Value.Number-tt.value) > 1e-6 {
			t.Errorf("%s: %v, want %g", tt.name, r.Value, tt.value)
		}
	}
}

// The words of a limit for a condition are those of the balance's figure.
func TestConditionInWords(t *testing.T) {
	l := limit(t, "u", none, 1.4)
	l.Condition, l.Basis = "cold", ""
	if got := l.String() + "; " + l.Terms(); got != "U at most 1.4 W/(m²·K); all make-ups; each tint; centre of the glass; condition cold" {
		t.Errorf("%q", got)
	}
	l = glazing.Limit{Figure: balancedFigure(t, "temperature", "cold"), Place: 4, AtLeast: bound(15), Condition: "cold"}
	if got := l.String(); got != "θ4 at least 15 °C" || l.Key() != "balances.cold.surface_temperatures_c.4" {
		t.Errorf("%q, %s", got, l.Key())
	}
}
