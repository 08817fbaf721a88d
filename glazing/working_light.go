package glazing

// The working of the weighted figures: one sum in full, the others as two sums, and the combination
// of panes at one wavelength.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
)

// weigh adds a weighted figure Σ f·W / Σ W, its two sums put in.
func (c *Chapter) weigh(b *band, symbol, meaning, formula string, values []float64, v Value, clause string) {
	if !v.Known {
		c.lack(symbol, v.Why)
		return
	}
	c.Steps = append(c.Steps, Step{Symbol: symbol, Meaning: meaning, Formula: formula,
		Numbers: put(b.Sum(values)) + "/" + put(b.Total), Value: v.Number, Clause: clause})
}

func workLight(r *Rating) Chapter {
	b := &r.Method.bands[light]
	c := Chapter{Title: "Light: transmittance written out, reflectances in short"}
	if r.Light.Transmittance.Known {
		s := &WeightedSum{Symbol: "τv", Source: b.weighting.Source, NM: b.weighting.NM, Weight: b.weighting.Weight,
			Sum: b.Sum(r.stack.T), Total: b.Total}
		for _, nm := range s.NM {
			at, _ := slices.BinarySearch(r.Method.grid.NM, nm)
			s.Value = append(s.Value, r.stack.T[at])
		}
		c.Sum = s
	}
	c.weigh(b, "τv", "light transmittance", "Σ τ·W / Σ W", r.stack.T, r.Light.Transmittance, "EN 410, 5.2")
	c.weigh(b, "ρv", "light reflectance, outside", "Σ ρ·W / Σ W", r.stack.Ro, r.Light.ReflectanceOutside, "EN 410, 5.3")
	c.weigh(b, "ρv′", "light reflectance, inside", "Σ ρ′·W / Σ W", r.stack.Ri, r.Light.ReflectanceInside, "EN 410, 5.3")
	return c
}

// atNM is the wavelength at which the combination of panes is written out.
const atNM = 550

func workStack(r *Rating) Chapter {
	c := Chapter{Title: fmt.Sprintf("The panes combined, at %d nm", atNM)}
	type pane struct{ t, ro, ri float64 }
	var panes []pane
	for k, p := range r.Makeup.Panes {
		tint := &p.Pane.Tints[r.Ready.States[r.State].Tints[k]].Spectrum
		x := pane{tint.Tau.At(atNM), tint.RhoFront.At(atNM), tint.RhoBack.At(atNM)}
		if p.Turned {
			x.ro, x.ri = x.ri, x.ro
		}
		panes = append(panes, x)
	}
	s := r.Ready.Spectra(r.State, []float64{atNM})
	if math.IsNaN(s.T[0]) {
		c.lack("τ, ρ, ρ′", "a spectrum does not reach this wavelength")
		return c
	}
	outer := panes[0]
	if len(panes) == 1 {
		c.Steps = append(c.Steps, Step{Symbol: "τ", Formula: "τ1", Numbers: put(outer.t), Value: s.T[0], Clause: "EN 410, 5.2"})
		return c
	}
	for k, p := range panes[1:] {
		part, next := fmt.Sprintf("1…%d", k+1), strconv.Itoa(k+2)
		if k == 0 {
			part = "1"
		}
		d := 1 - outer.ri*p.ro
		whole := pane{outer.t * p.t / d, outer.ro + outer.t*outer.t*p.ro/d, p.ri + p.t*p.t*outer.ri/d}
		c.Steps = append(c.Steps,
			Step{Symbol: "D", Meaning: "multiple reflection in gap " + strconv.Itoa(k+1), Formula: "1 − ρ′" + part + "·ρ" + next,
				Numbers: "1 − " + put(outer.ri) + "·" + put(p.ro), Value: d, Clause: "EN 410, 5.2"},
			Step{Symbol: "τ1…" + next, Formula: "τ" + part + "·τ" + next + "/D",
				Numbers: put(outer.t) + "·" + put(p.t) + "/" + put(d), Value: whole.t, Clause: "EN 410, 5.2"},
			Step{Symbol: "ρ1…" + next, Formula: "ρ" + part + " + τ" + part + "^2·ρ" + next + "/D",
				Numbers: put(outer.ro) + " + " + put(outer.t) + "^2·" + put(p.ro) + "/" + put(d), Value: whole.ro, Clause: "EN 410, 5.3"},
			Step{Symbol: "ρ′1…" + next, Formula: "ρ′" + next + " + τ" + next + "^2·ρ′" + part + "/D",
				Numbers: put(p.ri) + " + " + put(p.t) + "^2·" + put(outer.ri) + "/" + put(d), Value: whole.ri, Clause: "EN 410, 5.3"})
		outer = whole
	}
	return c
}

func workSolar(r *Rating) Chapter {
	b := &r.Method.bands[solar]
	c := Chapter{Title: "Solar figures, each a sum over " + strconv.Itoa(len(b.weighting.NM)) + " wavelengths", Note: b.weighting.Source}
	c.weigh(b, "τe", "solar direct transmittance", "Σ τ·S / Σ S", r.stack.T, r.Solar.Transmittance, "EN 410, 5.4.3")
	c.weigh(b, "ρe", "solar direct reflectance, outside", "Σ ρ·S / Σ S", r.stack.Ro, r.Solar.ReflectanceOutside, "EN 410, 5.4.4")
	c.weigh(b, "ρe′", "solar direct reflectance, inside", "Σ ρ′·S / Σ S", r.stack.Ri, r.Solar.ReflectanceInside, "EN 410, 5.4.4")
	for k, a := range r.Absorptance {
		c.weigh(b, fmt.Sprintf("αe%d", k+1), "absorptance of pane "+strconv.Itoa(k+1), "Σ α·S / Σ S", r.stack.A[k], a, "EN 410, 5.4.5")
	}
	return c
}

// workUV writes out what is weighted with the ultraviolet of the sun.
func workUV(r *Rating) Chapter {
	c := Chapter{Title: "Ultraviolet, damage and skin"}
	for _, x := range []struct {
		symbol, meaning, clause string
		band                    int
		value                   Value
	}{
		{"τuv", "ultraviolet transmittance", "EN 410, 5.5", uv, r.UV},
		{"τdf", "damage-weighted transmittance", "ISO 9050, 3.7; CIE 89/3", damage, r.Damage},
		{"τdf,700", "the same to 700 nm", "CIE 89/3", damage700, r.Damage700},
		{"τsk", "skin-weighted transmittance", "ISO 9050, 3.8", skin, r.Skin},
	} {
		b := &r.Method.bands[x.band]
		c.remark(fmt.Sprintf("%s: W of %d wavelengths, %s.", x.symbol, len(b.weighting.NM), b.weighting.Source))
		c.weigh(b, x.symbol, x.meaning, "Σ τ·W / Σ W", r.stack.T, x.value, x.clause)
	}
	return c
}
