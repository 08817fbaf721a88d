package draw

// Make-ups that drawings are tried on.

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"panewright/glazing"
	"panewright/glazing/library"
)

// lib returns a copy of a built-in pane under another id.
func lib(id, name string) *glazing.Pane {
	p := *library.Pane(id)
	if name != "" {
		p.ID = name
	}
	return &p
}

func filled(t testing.TB, mm float64, fractions map[string]float64) glazing.Gap {
	t.Helper()
	gas, err := glazing.Filling(fractions)
	if err != nil {
		t.Fatal(err)
	}
	return glazing.Gap{WidthMM: mm, Gas: gas}
}

var (
	argon90 = map[string]float64{"argon": 0.9, "air": 0.1}
	three   = map[string]float64{"argon": 0.605, "krypton": 0.295, "air": 0.1}
)

// ratingsOf rates a make-up under EN.
func ratingsOf(t testing.TB, m *glazing.Makeup) []glazing.Rating {
	t.Helper()
	ratings, err := glazing.Rate(m, glazing.EN)
	if err != nil {
		t.Fatalf("%s: %v", m.ID, err)
	}
	return ratings
}

// laminate returns a laminate that looks like a built-in pane.
func laminate(id, name string, plies ...float64) *glazing.Pane {
	p := lib(id, name)
	p.Plies = nil
	for i, mm := range plies {
		p.Plies = append(p.Plies, glazing.Ply{Interlayer: i%2 == 1, ThicknessMM: mm, ConductivityWMK: 1, DensityKGM3: 2500})
	}
	return p
}

// switching returns an invented switching pane with so many tints.
func switching(tints int) *glazing.Pane {
	p := lib("invented-dimming-7", "")
	from := p.Tints
	p.Tints = nil
	for i := range tints {
		tint := from[i*len(from)/tints]
		tint.Name = fmt.Sprintf("step-%d", i+1)
		p.Tints = append(p.Tints, tint)
	}
	return p
}

const long64 = "Weaving-Hall-North-Elevation-Replacement-Unit.2031_Variant-Q-007"

// gallery returns make-ups of many kinds by name.
func gallery(t testing.TB) map[string]*glazing.Makeup {
	place := func(panes ...*glazing.Pane) (out []glazing.Placed) {
		for _, p := range panes {
			out = append(out, glazing.Placed{Pane: p})
		}
		return out
	}
	turned := func(p *glazing.Pane) glazing.Placed { return glazing.Placed{Pane: p, Turned: true} }
	gap := func(mm float64) glazing.Gap { return filled(t, mm, argon90) }
	foil := lib("soda-lime-2", "suspended-foil")
	foil.Plies = []glazing.Ply{{ThicknessMM: 0.05, ConductivityWMK: 0.2, DensityKGM3: 1400}}
	clear6, low6 := lib("soda-lime-6", ""), lib("invented-low-e-6", "")
	eight := &glazing.Makeup{ID: "eight", Panes: place(clear6, lib("low-iron-4", ""), clear6, lib("soda-grey-4", ""), clear6, lib("soda-green-6", ""), clear6, low6)}
	for range 7 {
		eight.Gaps = append(eight.Gaps, gap(12))
	}
	thinGaps := &glazing.Makeup{ID: "thin-gaps", Panes: place(clear6, clear6, clear6), Gaps: []glazing.Gap{filled(t, 0.2, argon90), filled(t, 3, three)}}
	return map[string]*glazing.Makeup{
		"single":   {ID: "single", Panes: place(lib("soda-lime-4", ""))},
		"double":   {ID: "double", Panes: append(place(clear6), turned(low6)), Gaps: []glazing.Gap{gap(16)}},
		"triple":   {ID: "triple", Panes: append(place(lib("invented-low-e-4", ""), lib("soda-lime-4", "")), turned(lib("invented-low-e-4", ""))), Gaps: []glazing.Gap{gap(14), filled(t, 14, map[string]float64{"krypton": 1})}},
		"laminate": {ID: "laminate", Tilt: glazing.TiltDeg(30), Panes: place(low6, laminate("soda-lime-8", "roof-lam", 4, 0.76, 4, 1.52, 6)), Gaps: []glazing.Gap{gap(16)}},
		"eight":    eight,
		"foil":     {ID: "foil", Panes: place(lib("soda-lime-19", ""), foil, lib("soda-grey-19", "")), Gaps: []glazing.Gap{filled(t, 12, three), gap(12)}},
		"wide":     {ID: "wide", Panes: place(clear6, low6, lib("soda-bronze-10", "")), Gaps: []glazing.Gap{filled(t, 100, map[string]float64{"air": 1}), gap(60)}},
		"switch":   {ID: "switch", Panes: append(place(lib("invented-dimming-7", "")), turned(low6)), Gaps: []glazing.Gap{gap(16)}},
		"sloped":   {ID: "sloped", Tilt: glazing.TiltDeg(115), Panes: append(place(lib("soda-green-6", "Ткацкий-зал")), turned(lib("invented-low-e-6", "ὑαλος-λευκή-βορρᾶ"))), Gaps: []glazing.Gap{gap(16)}},
		"long":     {ID: long64, Panes: append(place(lib("soda-lime-6", long64)), turned(lib("invented-low-e-6", "W"+long64[1:]))), Gaps: []glazing.Gap{filled(t, 16, three)}},
		"thin":     thinGaps,
	}
}

// random returns a make-up of random panes and gaps.
func random(t testing.TB, r *rand.Rand) *glazing.Makeup {
	ids := library.IDs()
	m := &glazing.Makeup{ID: fmt.Sprintf("R%d", r.IntN(1000)), Tilt: glazing.TiltDeg(float64(r.IntN(181)))}
	n := 1 + r.IntN(glazing.MaxPanes)
	tints := 1
	for k := range n {
		p := lib(ids[r.IntN(len(ids))], long64[:1+r.IntN(64)])
		if tints *= len(p.Tints); tints > 64 {
			p.Tints, tints = p.Tints[:1], tints/len(p.Tints)
		}
		switch r.IntN(4) {
		case 0:
			p.Plies = []glazing.Ply{{ThicknessMM: 0.02 + 3*r.Float64()*r.Float64(), ConductivityWMK: 1, DensityKGM3: 2500}}
		case 1:
			p.Plies = laminate("soda-lime-6", "", 1+10*r.Float64(), 0.38*float64(1+r.IntN(6)), 3+9*r.Float64()).Plies
		}
		m.Panes = append(m.Panes, glazing.Placed{Pane: p, Turned: r.IntN(2) == 0})
		if k < n-1 {
			gas := []map[string]float64{argon90, three, {"air": 1}, {"argon": 0.333333, "krypton": 0.222222, "xenon": 0.111111, "air": 0.333334}}[r.IntN(4)]
			m.Gaps = append(m.Gaps, filled(t, []float64{0.1, 2, 6, 12.5, 16, 40, 150}[r.IntN(7)]*(0.5+r.Float64()), gas))
		}
	}
	return m
}
