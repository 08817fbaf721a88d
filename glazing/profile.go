package glazing

// The temperatures through a make-up, for drawings.

import (
	"math"

	"panewright/thermal"
)

// A ProfilePoint is a place in a temperature profile.
type ProfilePoint struct {
	DistanceMM   float64 // from surface 1 towards the inside
	TemperatureC float64
}

// Profile returns the temperatures through the panes in the state of one of the rating's balances, with
// its sun, from surface 1 to the last: at the bounds of every ply, and where a ply is warmer within than
// at either bound. It is nil where the balance is not known.
func (r *Rating) Profile(b *Balance) (points []ProfilePoint) {
	if b.why() != "" {
		return nil
	}
	m, system := r.Makeup, r.Ready.prepared[r.State].system
	var plies []thermal.Ply
	at := 0.0
	for k, placed := range m.Panes {
		plies = system.Plies(plies[:0], &b.Lit, k)
		points = append(points, ProfilePoint{at, celsius(b.Lit.SurfaceK[2*k])})
		for i, p := range plies {
			if placed.Turned {
				i = len(plies) - 1 - i
			}
			mm := placed.Pane.Plies[i].ThicknessMM
			if share := crest(p); share > 0 && share < 1 {
				points = append(points, ProfilePoint{at + float64(share*mm), celsius(p.PeakK)})
			}
			at += mm
			points = append(points, ProfilePoint{at, celsius(p.InnerK)})
		}
		if k < len(m.Gaps) {
			at += m.Gaps[k].WidthMM
		}
	}
	return points
}

// crest returns where a ply is warmest, as a part of its thickness from its outer bound. A parabola
// falls from its crest by the square of the distance.
func crest(p thermal.Ply) float64 {
	outer, inner := math.Sqrt(p.PeakK-p.OuterK), math.Sqrt(p.PeakK-p.InnerK)
	if outer+inner == 0 {
		return 0
	}
	return outer / (outer + inner)
}
