package spectra

// What a column of a spectrum is like: range, steps, gaps, extremes, noise; and whether the columns
// of a pane keep the energy.

import (
	"fmt"
	"math"
	"slices"
)

// Facts are what there is to say of one column.
type Facts struct {
	Count           int
	FirstNM, LastNM float64
	Steps           []Steps // of each part of the range in which there are any
	Gaps            []Gap   // ascending
	Least, Greatest Extreme // up to 2500 nm
	// InfraredLeast and InfraredGreatest are those from 5 µm on; zero where nothing stands there.
	InfraredLeast, InfraredGreatest Extreme
	Below, Above                    int // how many values lie below 0 and above 1
	Noise                           []Noise
}

// Steps are the distances between points in one part of the range, in nm: the least, the median and
// the greatest, and where that is. Marked gaps are no steps.
type Steps struct {
	Part                     Span
	Least, Usual, GreatestNM float64
	Greatest                 Span
}

// A Gap is a stretch without values: marked as missing in the file, or only a step several times as
// wide as those on either side.
type Gap struct {
	Span
	Marked bool
}

// An Extreme is a least or greatest value and where it is.
type Extreme struct{ NM, Value float64 }

// Noise is an estimate of the standard deviation of the noise of the values in one part of the
// range; Points is how many it rests on. It is unknown, for the reason Why, where they are too few.
type Noise struct {
	Part   Span
	Sigma  float64
	Points int
	Why    string
}

// The parts of the range by which steps and noise are told.
var (
	stepParts  = [...]Span{{0, stepEdgeNM}, {stepEdgeNM, SolarLastNM}, {InfraredFirstNM, math.Inf(1)}}
	noiseParts = [...]Span{{SolarFirstNM, 380}, {380, 780}, {780, SolarLastNM}}
)

// Survey returns what there is to say of a column.
func Survey(c Column) Facts {
	f := Facts{Count: c.Len(), FirstNM: c.First(), LastNM: c.Last()}
	solar, infrared := c.solar(), c.cut(InfraredFirstNM, math.Inf(1))
	for _, part := range stepParts {
		curve := solar
		if part.FromNM == InfraredFirstNM {
			curve = infrared
		}
		if s, ok := stepsIn(curve, part); ok {
			f.Steps = append(f.Steps, s)
		}
	}
	f.Gaps = append(wideSteps(solar, c.Gaps), wideSteps(infrared, c.Gaps)...)
	for _, g := range c.Gaps {
		f.Gaps = append(f.Gaps, Gap{g, true})
	}
	slices.SortFunc(f.Gaps, func(a, b Gap) int { return int(math.Copysign(1, a.FromNM-b.FromNM)) })
	f.Least, f.Greatest = extremes(solar)
	f.InfraredLeast, f.InfraredGreatest = extremes(infrared)
	for _, v := range c.Value {
		switch {
		case v < 0:
			f.Below++
		case v > 1:
			f.Above++
		}
	}
	for _, part := range noiseParts {
		f.Noise = append(f.Noise, noiseIn(solar, part, f.Gaps))
	}
	return f
}

// stepsIn returns the steps that begin in a part of the range.
func stepsIn(c Curve, part Span) (s Steps, ok bool) {
	var all []float64
	s = Steps{Part: part}
	gap := 0
	for i := 1; i < c.Len(); i++ {
		for gap < len(c.Gaps) && c.Gaps[gap].FromNM < c.NM[i-1] {
			gap++
		}
		if c.NM[i-1] < part.FromNM || c.NM[i-1] >= part.ToNM || gap < len(c.Gaps) && c.Gaps[gap].FromNM == c.NM[i-1] {
			continue
		}
		step := c.NM[i] - c.NM[i-1]
		if all = append(all, step); step > s.GreatestNM {
			s.GreatestNM, s.Greatest = step, Span{c.NM[i-1], c.NM[i]}
		}
	}
	if all == nil {
		return s, false
	}
	s.Least, s.Usual = slices.Min(all), median(all)
	return s, true
}

const (
	wideStep   = 3 // how many times as wide as its neighbours a step is to count as a gap
	neighbours = 4 // how many steps on either side are looked at
)

// wideSteps returns the steps of a curve that are more than three times as wide as the usual step
// just before and the usual step just after. Marked gaps are not counted again.
func wideSteps(c Curve, marked []Span) (out []Gap) {
	steps := make([]float64, max(c.Len()-1, 0))
	for i := range steps {
		steps[i] = c.NM[i+1] - c.NM[i]
	}
	usual := func(list []float64) float64 {
		if len(list) == 0 {
			return 0
		}
		return median(slices.Clone(list))
	}
	if len(steps) < neighbours {
		return nil
	}
	m := 0
	for i, step := range steps {
		for m < len(marked) && marked[m].FromNM < c.NM[i] {
			m++
		}
		before := usual(steps[max(i-neighbours, 0):i])
		after := usual(steps[i+1 : min(i+1+neighbours, len(steps))])
		if step > wideStep*max(before, after) && !(m < len(marked) && marked[m].FromNM == c.NM[i]) {
			out = append(out, Gap{Span{c.NM[i], c.NM[i+1]}, false})
		}
	}
	return out
}

func extremes(c Curve) (least, greatest Extreme) {
	for i, v := range c.Value {
		if i == 0 || v < least.Value {
			least = Extreme{c.NM[i], v}
		}
		if i == 0 || v > greatest.Value {
			greatest = Extreme{c.NM[i], v}
		}
	}
	return least, greatest
}

const (
	// NoisePoints is the least number of points, with a neighbour on either side, that an estimate of
	// noise rests on: those of 300 to 380 nm by 5 nm.
	NoisePoints = 15
	normalMAD   = 1.4826 // standard deviation over median absolute deviation of a normal distribution, 1/Φ⁻¹(3/4)
)

// noiseIn estimates the noise of a part of a curve. Of each point that which lies on the line
// between its neighbours is taken off; with w and 1 − w their shares in the line, noise of standard
// deviation σ leaves a remainder of σ·√(1 + w² + (1 − w)²). The median of the absolute remainders,
// each over that root, times 1.4826 is the estimate. Of even steps the remainder is half the second
// difference and the root √1.5, and that is the estimate of F. Stoehr et al., ADASS XVII, ASP
// Conf. Ser. 394 (2008) 505 (from memory), who take neighbours two points away. Curvature of the
// spectrum itself counts as noise, so the estimate is high where steps are wide. Points beside a
// gap do not count.
func noiseIn(c Curve, part Span, gaps []Gap) Noise {
	n := Noise{Part: part}
	var all []float64
	g := 0
	for i := 1; i < c.Len()-1; i++ {
		if c.NM[i-1] < part.FromNM || c.NM[i+1] > part.ToNM {
			continue
		}
		for g < len(gaps) && gaps[g].ToNM <= c.NM[i-1] {
			g++
		}
		if g < len(gaps) && gaps[g].FromNM < c.NM[i+1] {
			continue
		}
		w := (c.NM[i+1] - c.NM[i]) / (c.NM[i+1] - c.NM[i-1])
		line := float64(w*c.Value[i-1]) + float64((1-w)*c.Value[i+1])
		all = append(all, math.Abs(c.Value[i]-line)/math.Sqrt(1+float64(w*w)+float64((1-w)*(1-w))))
	}
	if n.Points = len(all); n.Points < NoisePoints {
		n.Why = fmt.Sprintf("%s with neighbours on both sides; %d are needed", plural(n.Points, "point"), NoisePoints)
		return n
	}
	n.Sigma = normalMAD * median(all)
	return n
}

// median sorts a list and returns its median, of an even number the mean of both in the middle.
func median(list []float64) float64 {
	slices.Sort(list)
	if n := len(list); n%2 == 0 {
		return (list[n/2-1] + list[n/2]) / 2
	}
	return list[len(list)/2]
}

// An EnergyCheck is of a transmittance and a reflectance: where they add to most, and at how many
// points to more than 1 by more than Slack, as binary numbers leave it. There is no energy left to
// be absorbed there.
type EnergyCheck struct {
	Greatest Extreme // NM is 0 where the columns have no wavelength in common
	Beyond   int
	Points   int
}

// Energy checks that transmittance and reflectance add to at most 1, at the points of both within
// the range of the other and outside its gaps, each value set into 0…1 first, as Join does.
func Energy(tau, rho Column) EnergyCheck {
	var e EnergyCheck
	tau, rho = tau.bounded(), rho.bounded()
	look := func(c, other Curve, also bool) {
		values := make([]float64, c.Len())
		other.Sample(values, c.NM)
		at, gap := 0, 0 // the first point of the other at or beyond nm, and its first gap that ends beyond
		for i, nm := range c.NM {
			for gap < len(other.Gaps) && other.Gaps[gap].ToNM <= nm {
				gap++
			}
			if nm < other.First() || nm > other.Last() || gap < len(other.Gaps) && other.Gaps[gap].FromNM < nm {
				continue
			}
			for at < other.Len() && other.NM[at] < nm {
				at++
			}
			if !also && other.NM[at] == nm {
				continue // seen already
			}
			sum := c.Value[i] + values[i]
			if e.Points++; e.Points == 1 || sum > e.Greatest.Value {
				e.Greatest = Extreme{nm, sum}
			}
			if sum > 1+Slack+binary {
				e.Beyond++
			}
		}
	}
	if tau.Len() > 0 && rho.Len() > 0 {
		look(rho.Curve, tau.Curve, true)
		look(tau.Curve, rho.Curve, false)
	}
	return e
}

// SolarPart returns what a rating sees of a column up to 2500 nm, values within Slack of 0…1 set
// into it.
func (c Column) SolarPart() Curve { return c.bounded().solar() }

// bounded returns the column with its values set into 0…1.
func (c Column) bounded() Column {
	if len(c.Line) != c.Len() { // it was not read from a file
		c.Line = make([]int, c.Len())
	}
	return bound(c, &rowList{})
}

// InfraredPart returns what a rating sees of a face's reflectance from 5 to 50 µm, empty where
// nothing stands there. The face is named in messages. An error is Errors.
func (c Column) InfraredPart(face string) (Curve, error) {
	var cautions []Caution
	curve, err := infrared(c.bounded(), Column{}, face, &rowList{}, &cautions)
	if err != nil {
		return Curve{}, Errors{err}
	}
	return curve, nil
}

// InfraredRows returns the rows of a transmittance from 5 µm on; empty where none stand there.
func (c Column) InfraredRows() Curve {
	if far := c.bounded().cut(InfraredFirstNM, math.Inf(1)); far.Last() > InfraredFirstNM {
		return far
	}
	return Curve{}
}
