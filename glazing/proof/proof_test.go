package proof

import (
	"testing"

	"panewright/reference/checks"
)

// The published figures, each within the tolerance that stands beside it.
func TestRun(t *testing.T) {
	outcomes := Run()
	if len(outcomes) != len(checks.All()) {
		t.Fatalf("%d outcomes of %d checks", len(outcomes), len(checks.All()))
	}
	for _, o := range outcomes {
		switch {
		case o.Err != nil:
			t.Error(o.Err)
		case !o.Pass:
			t.Errorf("%s: %s: got %.9g, want %.9g ± %.2g, unit %s (%s; %s)", o.ID, o.What, o.Got, o.Want, o.Tolerance, o.Unit, o.Source, o.Standing)
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
	for _, c := range checks.All() {
		for _, sign := range []float64{-1, 1} {
			moved := c
			moved.Want += sign * max(2.01*c.Tolerance, 1e-9)
			if o := evaluate(moved); o.Pass {
				t.Errorf("%s passes with %.9g instead of %.9g, unit %s", c.ID, moved.Want, c.Want, c.Unit)
			}
		}
	}
}

// A check with one input more or one fewer has an error and does not pass: no kind ignores an
// input, and none assumes one.
func TestInputsAreNeeded(t *testing.T) {
	for _, c := range checks.All() {
		more := c
		more.Inputs = map[string]string{"colour": "mauve"}
		for name, value := range c.Inputs {
			more.Inputs[name] = value
		}
		if o := evaluate(more); o.Err == nil || o.Pass {
			t.Errorf("%s takes an input that means nothing", c.ID)
		}
		for gone := range c.Inputs {
			fewer := c
			fewer.Inputs = map[string]string{}
			for name, value := range c.Inputs {
				if name != gone {
					fewer.Inputs[name] = value
				}
			}
			if o := evaluate(fewer); o.Err == nil || o.Pass {
				t.Errorf("%s does without its input %s", c.ID, gone)
			}
		}
	}
	if o := evaluate(checks.Check{ID: "x", Kind: "guess"}); o.Err == nil || o.Pass {
		t.Error("an unknown kind was computed")
	}
}
