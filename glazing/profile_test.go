package glazing

import (
	"math"
	"testing"

	"panewright/thermal"
)

// laminated returns an invented grey pane of glass plies of thicknesses in mm, of 1 W/(m·K).
func laminated(mm ...float64) *Pane {
	p := pane("grey", flat(300, 2500, 0.3, 0.1, 0.1), 0.837, 0.837)
	p.Plies = nil
	for _, d := range mm {
		p.Plies = append(p.Plies, Ply{ThicknessMM: d, ConductivityWMK: 1, DensityKGM3: 2500})
	}
	return p
}

// A profile runs from surface 1 to the last, meets every surface at its place with its temperature, and
// has every bound of plies, from outside also where a pane is turned.
func TestProfile(t *testing.T) {
	c := Condition{ID: "noon", OutsideC: 30, InsideC: 24, SunWM2: 600}
	plies := laminated(3, 1.52, 8)
	for _, x := range []struct {
		name   string
		panes  []Placed
		bounds []float64 // mm from surface 1, worked by hand
	}{
		{"single", []Placed{{Pane: laminated(6)}}, []float64{0, 6}},
		{"laminate", []Placed{{Pane: plies}}, []float64{0, 3, 4.52, 12.52}},
		{"turned", []Placed{{Pane: plies, Turned: true}}, []float64{0, 8, 9.52, 12.52}},
		{"double", []Placed{{Pane: laminated(6)}, {Pane: plies, Turned: true}}, []float64{0, 6, 22, 30, 31.52, 34.52}},
	} {
		m := &Makeup{ID: x.name, Panes: x.panes}
		for range len(x.panes) - 1 {
			m.Gaps = append(m.Gaps, gap(t, 16, map[string]float64{"argon": 1}))
		}
		r := rateOne(t, m, EN, Options{Conditions: []Condition{c}})
		b := r.Balance("noon")
		points := r.Profile(b)
		surface := 0
		bound := 0
		from := 0.0
		for i, p := range points {
			if i > 0 && p.DistanceMM <= points[i-1].DistanceMM {
				t.Errorf("%s: the profile stands still at %g mm", x.name, p.DistanceMM)
			}
			if bound < len(x.bounds) && math.Abs(p.DistanceMM-x.bounds[bound]) < 1e-9 {
				bound++
			}
			placed := x.panes[surface/2]
			at := from
			if surface%2 == 1 {
				at += placed.Pane.ThicknessMM()
			}
			if math.Abs(p.DistanceMM-at) > 1e-9 {
				continue
			}
			if want := b.SurfaceC(surface).Number; math.Abs(p.TemperatureC-want) > 1e-9 {
				t.Errorf("%s: %.12g °C on surface %d, want %.12g", x.name, p.TemperatureC, surface+1, want)
			}
			if surface++; surface%2 == 0 {
				if from = at + 16; surface == 2*len(x.panes) {
					break
				}
			}
		}
		if surface != 2*len(x.panes) || bound != len(x.bounds) {
			t.Errorf("%s: the profile meets %d surfaces and %d bounds, want %d and %d: %v", x.name, surface, bound, 2*len(x.panes), len(x.bounds), points)
		}
		if last := points[len(points)-1].DistanceMM; math.Abs(last-r.ThicknessMM) > 1e-9 {
			t.Errorf("%s: the profile ends at %g mm of %g", x.name, last, r.ThicknessMM)
		}
	}
}

// Between equal surroundings a pane that absorbs a W/m² evenly is warmest in its middle, there by a r/8
// warmer than on its faces, r being its resistance (heat conduction with an even source, closed form).
// Two plies of half the thickness show the same at the bound between them.
func TestProfileOfEvenSource(t *testing.T) {
	c := Condition{ID: "equal", OutsideC: 20, InsideC: 20, OutsideConvectionWM2K: known(8), InsideConvectionWM2K: known(8), SunWM2: 800}
	for _, p := range []*Pane{laminated(10), laminated(5, 5)} {
		r := rateOne(t, &Makeup{ID: "slab", Panes: []Placed{{Pane: p}}}, EN, Options{Conditions: []Condition{c}})
		b := r.Balance("equal")
		points := r.Profile(b)
		if len(points) != 3 {
			t.Fatalf("%d plies: the profile has %d points", len(p.Plies), len(points))
		}
		middle := points[1]
		rise := b.AbsorbedWM2[0] * 0.010 / 8
		if math.Abs(middle.DistanceMM-5) > 1e-6 || math.Abs(middle.TemperatureC-points[0].TemperatureC-rise) > 1e-9 || math.Abs(points[2].TemperatureC-points[0].TemperatureC) > 1e-9 {
			t.Errorf("%d plies: %v, want %g K more in the middle", len(p.Plies), points, rise)
		}
	}
	// without sun there is no crest
	c.SunWM2, c.OutsideC = 0, -10
	r := rateOne(t, &Makeup{ID: "slab", Panes: []Placed{{Pane: laminated(10)}}}, EN, Options{Conditions: []Condition{c}})
	if points := r.Profile(r.Balance("equal")); len(points) != 2 {
		t.Errorf("without sun: %v", points)
	}
}

// The crest of a parabola that falls from its middle, from an end, and by unequal parts.
func TestCrest(t *testing.T) {
	for _, x := range []struct {
		outer, inner, peak, want float64
	}{
		{300, 300, 301, 0.5},
		{299, 296, 300, 1.0 / 3}, // falls 1 over one part and 4 over two: by the square
		{300, 290, 300, 0},
		{290, 300, 300, 1},
	} {
		if got := crest(thermal.Ply{OuterK: x.outer, InnerK: x.inner, PeakK: x.peak}); math.Abs(got-x.want) > 1e-12 {
			t.Errorf("crest of %g, %g, %g at %g, want %g", x.outer, x.peak, x.inner, got, x.want)
		}
	}
}

// There is no profile where the balance is not known.
func TestProfileUnknown(t *testing.T) {
	p := laminated(6)
	p.Tints[0].Front = Emissivity{}
	r := rateOne(t, &Makeup{ID: "blank", Panes: []Placed{{Pane: p}}}, EN, Options{Conditions: []Condition{{ID: "night", OutsideC: -5, InsideC: 20}}})
	if b := r.Balance("night"); b.SurfaceC(0).Known || r.Profile(b) != nil {
		t.Errorf("surface 1 %v, profile %v", b.SurfaceC(0), r.Profile(b))
	}
}
