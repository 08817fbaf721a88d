package proof

// How the kinds read the inputs of a check.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/thermal"
)

// inputs reads the inputs of a check by name, keeps the first fault, and knows which of them
// were asked for.
type inputs struct {
	values map[string]string
	used   map[string]bool
	err    error
	memo   *memo
}

func (in *inputs) fail(format string, args ...any) {
	if in.err == nil {
		in.err = fmt.Errorf(format, args...)
	}
}

// unused is an error if an input was not asked for.
func (in *inputs) unused() error {
	var names []string
	for name := range in.values {
		if !in.used[name] {
			names = append(names, name)
		}
	}
	if len(names) == 0 {
		return nil
	}
	slices.Sort(names)
	return fmt.Errorf("this kind takes no input %s", strings.Join(names, ", "))
}

// has reports whether an input is given.
func (in *inputs) has(name string) bool { return in.values[name] != "" }

func (in *inputs) text(name string) string {
	in.used[name] = true
	if !in.has(name) {
		in.fail("input %s is missing", name)
	}
	return in.values[name]
}

func (in *inputs) parse(name, text string) float64 {
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		in.fail("input %s: %q is not a number", name, text)
	}
	return v
}

func (in *inputs) number(name string) float64 { return in.parse(name, in.text(name)) }

// numbers reads "4/4/6".
func (in *inputs) numbers(name string) []float64 {
	var out []float64
	for part := range strings.SplitSeq(in.text(name), "/") {
		out = append(out, in.parse(name, part))
	}
	return out
}

// gas reads an input such as "argon:0.9/air:0.1".
func (in *inputs) gas(name string) thermal.Mixture { return in.mixture(name, in.text(name)) }

// mixture reads a gas that is part of an input.
func (in *inputs) mixture(name, text string) thermal.Mixture {
	fractions := map[string]float64{}
	for part := range strings.SplitSeq(text, "/") {
		gas, fraction, _ := strings.Cut(part, ":")
		fractions[gas] = in.parse(name, fraction)
	}
	m, err := thermal.Mix(fractions)
	if err != nil {
		in.fail("input %s: %w", name, err)
	}
	return m
}
