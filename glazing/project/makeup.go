package project

// From keys to make-ups: panes and gaps in turn.

import (
	"maps"
	"slices"

	"panewright/glazing"
	"panewright/glazing/library"
)

// makeup makes a make-up, or returns nil after reporting why not.
func (b *builder) makeup(s *makeupSpec, specs []paneSpec, panes []*glazing.Pane) *glazing.Makeup {
	m := &glazing.Makeup{ID: s.ID.value, Title: s.Title.value, Tilt: glazing.TiltDeg(s.Tilt.or(90))}
	if s.HeatFlow.value == "down" {
		m.HeatFlow = glazing.FlowDown
	}
	for _, name := range slices.SortedFunc(maps.Keys(s.Typed), func(x, y string) int {
		a, b := s.Typed[x].at, s.Typed[y].at
		return (a.line-b.line)*100000 + a.column - b.column
	}) {
		m.Typed = append(m.Typed, glazing.Typed{Name: name, Text: s.Typed[name].value})
	}
	before := len(b.faults)
	m.Edge = b.edge(s.Edge)
	wantPane, sure := true, true // what may stand next, and whether that is known
	for i := range s.OutsideToInside {
		e := &s.OutsideToInside[i]
		isPane, isGap := e.Pane.given || e.Turned.given || e.Tint.given, e.Gap.given || e.Gas != nil || e.Vacuum != nil
		if e.Faulty && isPane == isGap { // what it was meant to be is not known
			sure = false
			continue
		}
		if e.Faulty {
			wantPane, sure = !isPane, true
			continue
		}
		switch {
		case !sure:
		case isPane && isGap:
			b.fail(e.At, "outside_to_inside", "an item is either a pane or a gap, not both")
		case !isPane && !isGap:
			b.fail(e.At, "outside_to_inside", "an item is a pane ({pane: ID}) or a gap ({gap_mm: 16, gas: {air: 1}})")
		case isPane && !wantPane:
			b.fail(e.At, "pane", "two panes in a row; there is a gap between panes (a laminate is one pane with plies)")
		case isGap && wantPane && i == 0:
			b.fail(e.At, "gap_mm", "a make-up begins with a pane, outside")
		case isGap && wantPane:
			b.fail(e.At, "gap_mm", "two gaps in a row; there is a pane between gaps")
		}
		wantPane, sure = !isPane, true
		if isPane {
			b.place(m, e, specs, panes)
		} else if isGap {
			b.gap(m, e)
		}
	}
	switch last := len(s.OutsideToInside) - 1; {
	case s.Faulty:
	case last < 0:
		b.fail(s.At, "outside_to_inside", "holds no pane")
	case wantPane && len(b.faults) == before:
		b.fail(s.OutsideToInside[last].At, "gap_mm", "a make-up ends with a pane, inside")
	case len(m.Panes) > glazing.MaxPanes:
		b.fail(s.At, "outside_to_inside", "%d panes; at most %d", len(m.Panes), glazing.MaxPanes)
	}
	if s.Faulty || len(b.faults) > before || slices.ContainsFunc(m.Panes, func(p glazing.Placed) bool { return p.Pane == nil }) {
		return nil
	}
	if !b.balanced(s, m) {
		return nil
	}
	if _, err := m.States(); err != nil {
		b.fail(s.At, "outside_to_inside", "%v", err)
		return nil
	}
	return m
}

// place adds a pane to a make-up.
func (b *builder) place(m *glazing.Makeup, e *elementSpec, specs []paneSpec, panes []*glazing.Pane) {
	if !e.Pane.given {
		b.fail(e.At, "pane", "is missing: turned and tint belong to a pane")
		return
	}
	placed := glazing.Placed{Pane: b.paneNamed(e.Pane.value, panes), Turned: e.Turned.value, Tint: e.Tint.value}
	if placed.Pane != nil {
		if names := placed.Pane.TintNames(); placed.Tint != "" && placed.Tint != glazing.SameTint && placed.Pane.TintNamed(placed.Tint) < 0 {
			if placed.Pane.Tintable() {
				b.fail(e.Tint.at, "tint", "pane %s has no tint %q; %s", e.Pane.value, clip(placed.Tint), Offer(placed.Tint, names))
			} else {
				b.fail(e.Tint.at, "tint", "pane %s does not switch", e.Pane.value)
			}
		}
	} else if !slices.ContainsFunc(specs, func(s paneSpec) bool { return s.ID.value == e.Pane.value }) && !b.incomplete["id"] {
		var own []string
		for _, s := range specs {
			own = append(own, s.ID.value)
		}
		offer := "panewright panes lists the built-in ones"
		if all := append(own, library.IDs()...); len(Nearest(e.Pane.value, all)) > 0 {
			offer = Offer(e.Pane.value, all)
		} else if len(own) > 0 {
			offer = Offer(e.Pane.value, own) + ", and those that panewright panes lists"
		}
		if len(own) > 0 || !b.incomplete["panes"] {
			b.fail(e.Pane.at, "pane", "unknown pane %q; %s", clip(e.Pane.value), offer)
		}
	}
	m.Panes = append(m.Panes, placed)
}

// paneNamed returns the pane of an id, of the project or of the library, or nil.
func (b *builder) paneNamed(id string, own []*glazing.Pane) *glazing.Pane {
	if i := slices.IndexFunc(own, func(p *glazing.Pane) bool { return p.ID == id }); i >= 0 {
		return own[i]
	}
	if b.builtIn[id] == nil {
		if p := library.Pane(id); p != nil {
			b.builtIn[id] = p
		}
	}
	return b.builtIn[id]
}

// gap adds a gap to a make-up.
func (b *builder) gap(m *glazing.Makeup, e *elementSpec) {
	switch {
	case !e.Gap.given:
		b.fail(e.At, "gap_mm", "is missing: a gap has a width")
	case e.Vacuum != nil && e.Gas != nil:
		b.fail(e.Vacuum.At, "vacuum", "stands beside gas; give one")
	case e.Vacuum != nil:
		if v := b.vacuum(e.Vacuum); v != nil {
			m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: e.Gap.value, Vacuum: v})
		}
	case e.Gas == nil:
		b.fail(e.Gap.at, "gas", "is missing: a gap has a gas, such as {air: 1} or {argon: 0.9, air: 0.1}, or a vacuum")
	default:
		fractions := map[string]float64{}
		known := glazing.Gases()
		for name, f := range e.Gas {
			fractions[name] = f.value
		}
		for _, name := range slices.Sorted(maps.Keys(e.Gas)) {
			if !slices.Contains(known, name) {
				b.fail(e.Gas[name].name, "gas", "unknown gas %q; %s", clip(name), OfferAll(name, known))
				return
			}
		}
		mixture, err := glazing.Filling(fractions)
		if err != nil {
			b.fail(e.At, "gas", "%v", err)
			return
		}
		m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: e.Gap.value, Gas: mixture})
	}
}

// vacuum makes an evacuated gap, or returns nil after reporting why not.
func (b *builder) vacuum(s *vacuumSpec) *glazing.Vacuum {
	if pillar := 2 * s.Radius.value; pillar >= s.Pitch.value {
		b.fail(s.Pitch.at, "pillar_pitch_mm", "%s is not above %s, the width of a pillar; pillars stand apart", short(s.Pitch.value), short(pillar))
		return nil
	}
	return &glazing.Vacuum{PressurePa: s.Pressure.value, PillarRadiusMM: s.Radius.value, PillarPitchMM: s.Pitch.value, PillarWMK: s.Pillar.orUnknown()}
}
