package glazing

// The reckoning of Step.Numbers, for tests of the working.

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// printedAs is one unit of the sixth significant digit, the last that outputs show.
func printedAs(v float64) float64 {
	if v == 0 {
		return 1e-6
	}
	return math.Pow10(int(math.Floor(math.Log10(math.Abs(v)))) - 5)
}

// evaluated works out what Step.Numbers may hold.
func evaluated(s string) (float64, error) {
	p := &reckoner{s: strings.NewReplacer(" ", "", "−", "-", "·", "*").Replace(s)}
	v := p.sum()
	if p.s != "" || p.bad {
		return 0, fmt.Errorf("cannot be worked out at %q", p.s)
	}
	return v, nil
}

type reckoner struct {
	s   string
	bad bool
}

func (p *reckoner) take(prefix string) bool {
	rest, ok := strings.CutPrefix(p.s, prefix)
	if ok {
		p.s = rest
	}
	return ok
}

func (p *reckoner) need(what string) { p.bad = !p.take(what) || p.bad }

func (p *reckoner) sum() float64 {
	sign := 1.0
	if p.take("-") {
		sign = -1
	}
	v := sign * p.product()
	for {
		switch {
		case p.take("+"):
			v += p.product()
		case p.take("-"):
			v -= p.product()
		default:
			return v
		}
	}
}

func (p *reckoner) product() float64 {
	v := p.power()
	for {
		switch {
		case p.take("*"):
			v *= p.power()
		case p.take("/"):
			v /= p.power()
		default:
			return v
		}
	}
}

func (p *reckoner) power() float64 {
	v := p.atom()
	if p.take("^") {
		v = math.Pow(v, p.atom())
	}
	return v
}

// degree is one in radians.
const degree = math.Pi / 180

func (p *reckoner) atom() float64 {
	for name, of := range map[string]func(float64) float64{
		"exp(": math.Exp, "ln(": math.Log, "(": func(x float64) float64 { return x },
		"sin(": func(x float64) float64 { return math.Sin(x * degree) }, "cos(": func(x float64) float64 { return math.Cos(x * degree) },
		"atan(": func(x float64) float64 { return math.Atan(x) / degree },
	} {
		if p.take(name) {
			v := of(p.sum())
			p.need(")")
			return v
		}
	}
	if p.take("max(") {
		a := p.sum()
		p.need(",")
		b := p.sum()
		p.need(")")
		return math.Max(a, b)
	}
	n := 0
	for n < len(p.s) {
		c := p.s[n]
		exponent := n > 0 && (c == '+' || c == '-') && p.s[n-1] == 'e'
		if !(c >= '0' && c <= '9' || c == '.' || c == 'e' || exponent) {
			break
		}
		n++
	}
	v, err := strconv.ParseFloat(p.s[:n], 64)
	p.bad = p.bad || err != nil
	p.s = p.s[n:]
	return v
}
