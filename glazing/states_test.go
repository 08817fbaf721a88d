package glazing

import (
	"fmt"
	"reflect"
	"strings"
	"testing"
)

func TestStates(t *testing.T) {
	tints := func(id string, names ...string) *Pane {
		p := pane(id, flat(300, 2500, 0.5, 0.1, 0.1), 0.837, 0.837)
		one := p.Tints[0]
		p.Tints = nil
		for _, n := range names {
			one.Name = n
			p.Tints = append(p.Tints, one)
		}
		return p
	}
	x, y, plain := tints("x", "clear", "full"), tints("y", "clear", "mid", "full"), tints("z", "")
	for _, tt := range []struct {
		panes []Placed
		want  string
	}{
		{[]Placed{{Pane: plain}}, `[""]`},
		{[]Placed{{Pane: x}, {Pane: plain}}, `["clear" "full"]`},
		{[]Placed{{Pane: plain}, {Pane: x, Tint: "full"}}, `["full"]`},
		{[]Placed{{Pane: x}, {Pane: y}}, `["clear/clear" "clear/mid" "clear/full" "full/clear" "full/mid" "full/full"]`},
		{[]Placed{{Pane: x}, {Pane: y, Tint: SameTint}}, `["clear" "full"]`},
		{[]Placed{{Pane: x}, {Pane: y, Tint: "mid"}}, `["clear/mid" "full/mid"]`},
		{[]Placed{{Pane: x, Tint: "full"}, {Pane: y, Tint: SameTint}}, `["full"]`},
		{[]Placed{{Pane: y}, {Pane: x, Tint: SameTint}}, "no tint \"mid\""},
		{[]Placed{{Pane: x, Tint: SameTint}}, "no pane outside it can switch"},
		{[]Placed{{Pane: x, Tint: "dim"}}, "no tint \"dim\""},
	} {
		states, err := (&Makeup{Panes: tt.panes}).States()
		if err != nil {
			if !strings.Contains(err.Error(), tt.want) {
				t.Errorf("error %v, want %q", err, tt.want)
			}
			continue
		}
		var names []string
		for _, s := range states {
			names = append(names, s.Name)
		}
		if got := fmt.Sprintf("%q", names); got != tt.want {
			t.Errorf("states %s, want %s", got, tt.want)
		}
	}
	// A pane that follows takes the tint of the same name, not of the same place.
	states, err := (&Makeup{Panes: []Placed{{Pane: x}, {Pane: y, Tint: SameTint}}}).States()
	if err != nil || !reflect.DeepEqual(states[1].Tints, []int{1, 2}) {
		t.Errorf("following: %v %v, want tints 1 and 2", states, err)
	}
}

// clear and full name the tints of the highest and lowest light transmittance, unless tints are
// called so.
func TestClearAndFull(t *testing.T) {
	p := pane("p", flat(300, 2500, 0.3, 0.1, 0.1), 0.837, 0.837)
	tint := func(name string, tau float64) Tint {
		x := p.Tints[0]
		x.Name, x.Spectrum = name, flat(300, 2500, tau, 0.1, 0.1)
		return x
	}
	p.Tints = []Tint{tint("t1", 0.2), tint("t2", 0.5), tint("t3", 0.05)}
	if a, b, c := p.TintNamed("clear"), p.TintNamed("full"), p.TintNamed("t1"); a != 1 || b != 2 || c != 0 {
		t.Errorf("clear %d, full %d, t1 %d, want 1, 2, 0", a, b, c)
	}
	p.Tints[0].Name = "full" // somebody calls the middle tint so
	if got := p.TintNamed("full"); got != 0 {
		t.Errorf("full is %d, want the tint of that name", got)
	}
	ratings, err := Rate(&Makeup{Panes: []Placed{{Pane: p, Tint: "clear"}}}, EN)
	if err != nil || len(ratings) != 1 || ratings[0].Tint != "t2" || !ratings[0].InTint("clear") || ratings[0].InTint("t1") {
		t.Errorf("fixed to clear: %d ratings, %v", len(ratings), err)
	}
}
