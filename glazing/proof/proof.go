// Package proof runs the published check values of reference/checks through the calculations
// that every rating uses and sets the computed figure beside the expected one. The
// test of this package fails on each that does not pass.
//
// A check names its kind; the table of kinds says which function computes it. A further figure
// of a known kind is one more row in reference/checks/tables, a new kind one more row here. A
// kind must use every input of its check, so that no input is taken for granted and ignored.
package proof

import (
	"fmt"
	"math"

	"panewright/reference/checks"
)

// An Outcome is a check with what the program makes of it.
type Outcome struct {
	checks.Check
	Got       float64
	Deviation float64 // Got − Want, in the check's unit
	Pass      bool
	Err       error // why nothing could be computed; then Pass is false
}

// Run evaluates every check, in the order of checks.All.
func Run() []Outcome {
	list := checks.All()
	outcomes := make([]Outcome, len(list))
	for i, c := range list {
		outcomes[i] = evaluate(c)
	}
	return outcomes
}

// A kind computes the figure of a check from its inputs.
type kind struct {
	name  string
	value func(*inputs) (float64, error)
}

// kinds returns the table of kinds.
func kinds() []kind {
	return []kind{
		{"u", uValue},
		{"u_rounded", uRounded},
		{"u_nusselt_between", uNusseltBetween},
		{"grey_pane", greyPane},
		{"qi_double", qiDouble},
		{"g_double", gDouble},
		{"emissivity_ratio", emissivityRatio},
		{"emissivity_corrected", emissivityCorrected},
		{"glass_emissivity", glassEmissivity},
		{"glass_emissivity_hemispherical", glassHemispherical},
		{"slab", slabShare},
		{"slab_hemispherical", slabHemispherical},
		{"glass", glassFigure},
		{"mass", mass},
		{"damage_weight", damageWeight},
		{"erythema_weight", erythemaWeight},
	}
}

// evaluate computes one check.
func evaluate(c checks.Check) Outcome {
	out := Outcome{Check: c}
	out.Got, out.Err = compute(c)
	if out.Err != nil {
		out.Err = fmt.Errorf("check %s: %w", c.ID, out.Err)
		return out
	}
	out.Deviation = out.Got - c.Want
	out.Pass = math.Abs(out.Deviation) <= c.Tolerance // false for NaN
	return out
}

func compute(c checks.Check) (float64, error) {
	for _, k := range kinds() {
		if k.name != c.Kind {
			continue
		}
		in := &inputs{values: c.Inputs, used: map[string]bool{}}
		got, err := k.value(in)
		if in.err != nil { // comes first: a figure made from a misread input means nothing
			return 0, in.err
		}
		if err != nil {
			return 0, err
		}
		return got, in.unused()
	}
	return 0, fmt.Errorf("unknown kind %q", c.Kind)
}
