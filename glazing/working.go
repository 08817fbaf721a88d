package glazing

// The working: a rating as a hand calculation, for explain. This file has its parts and its order;
// the files working_*.go write the chapters.

import (
	"math"
	"slices"
	"strconv"
	"strings"
)

// A Step is one line of a hand calculation: what is computed, by which formula, the formula with
// the numbers put in, and what comes out. Numbers can be evaluated as it stands: + − · / ^ and
// brackets, max(a, b), exp and ln, and sin, cos and atan with angles in degrees. A − before a number
// in brackets is its sign.
type Step struct {
	Symbol, Meaning string
	Formula         string
	Numbers         string
	Value           float64
	Unit            string
	Clause          string
}

// Printed returns the value with the six digits that outputs show.
func (s Step) Printed() string { return strconv.FormatFloat(s.Value, 'g', 6, 64) }

// A Chapter is a part of a hand calculation: the rows of a sum, a small table, steps; any of them
// may be missing.
type Chapter struct {
	Title string
	Note  string // "" or remarks, among them why a figure is not known
	Sum   *WeightedSum
	Rows  *Rows
	Steps []Step

	lacking []lacking
}

// WeightedSum is a weighted figure written out: Σ f W over the wavelengths of the table.
type WeightedSum struct {
	Symbol     string
	Source     string
	NM         []float64
	Value      []float64 // f
	Weight     []float64 // W
	Sum, Total float64   // Σ f W and Σ W
}

// Rows is a small table: heads, and rows of as many cells, the first of them a label.
type Rows struct {
	Head  []string
	Cells [][]string
}

func (r *Rows) add(cells ...string) { r.Cells = append(r.Cells, cells) }

// lacking are figures that are not known for one reason.
type lacking struct {
	symbols []string
	why     string
}

// lack remembers that a figure is not known.
func (c *Chapter) lack(symbol, why string) {
	at := slices.IndexFunc(c.lacking, func(l lacking) bool { return l.why == why })
	if at < 0 {
		at = len(c.lacking)
		c.lacking = append(c.lacking, lacking{why: why})
	}
	c.lacking[at].symbols = append(c.lacking[at].symbols, symbol)
}

// step adds a step.
func (c *Chapter) step(symbol, meaning, formula, numbers string, value float64, unit, clause string) {
	c.Steps = append(c.Steps, Step{symbol, meaning, formula, numbers, value, unit, clause})
}

// remark adds a sentence to the note.
func (c *Chapter) remark(text string) { c.Note = strings.TrimSpace(c.Note + " " + text) }

// digits are as many as enter a formula at least: enough for six in the result.
const digits = 9

// put writes a number as it enters a formula.
func put(v float64) string { return putDigits(v, digits) }

func putDigits(v float64, n int) string {
	s := strconv.FormatFloat(v, 'g', n, 64)
	if v < 0 {
		return "(−" + s[1:] + ")"
	}
	return s
}

// plain writes a number in a sentence.
func plain(v float64) string {
	return strings.Replace(strconv.FormatFloat(v, 'g', 6, 64), "-", "−", 1)
}

// putFor writes a number that enters a formula whose result is so much smaller that leading digits
// cancel: with as many as six in the result need.
func putFor(v, result float64) string {
	n := digits
	if lost := math.Log10(math.Abs(v / result)); lost > 0 {
		n = digits - 1 + int(math.Ceil(min(lost, digits)))
	}
	return putDigits(v, n)
}

// minus writes a − b.
func minus(a, b float64) string { return putFor(a, a-b) + " − " + putFor(b, a-b) }

// Working returns the calculation of a rating in the order of a hand calculation, from the
// intermediates that the rating keeps: thickness and mass, the weighted figures, the combination of panes at one
// wavelength, colours, emissivities, every gap, U and g; under each condition its heat balance and what
// follows from it; thermal stress; then U of other gas fills and the sensitivities, each of which is
// rated anew.
func Working(r *Rating) []Chapter {
	out := []Chapter{workMass(r), workLight(r), workStack(r), workSolar(r), workUV(r)}
	out = append(out, workColours(r)...)
	out = append(out, workRendering(r)...)
	out = append(out, workEmissivities(r))
	switch {
	case r.Method.Basis.Balances():
	case r.U.Known:
		out = append(out, workHeat(r)...)
	default:
		c := Chapter{Title: "U-value and g-value"}
		c.lack("U, g", r.U.Why)
		out = append(out, c)
	}
	out = append(out, workBalances(r)...)
	out = append(out, workStress(r), workFills(r), workSensitivities(r))
	for i := range out {
		for _, l := range out[i].lacking {
			out[i].remark("Not known: " + strings.Join(l.symbols, ", ") + ": " + l.why + ".")
		}
	}
	r.Method.Basis.nameClauses(out)
	return out
}

// clauses that ISO standards have in the place of EN ones, whose formulas they share: by the
// beginning of the EN name. What is not listed has no other name.
var clausesISO = []struct{ en, iso string }{
	{"EN 673", "ISO 10292"},
	{"EN 410, 5.2", "ISO 9050, 3.3"},
	{"EN 410, 5.3", "ISO 9050, 3.4"},
	{"EN 410, 5.4", "ISO 9050, 3.5"},
	{"EN 410, 5.5", "ISO 9050, 3.6"},
	{"EN 410, 5.6", "ISO 9050, 3.9"},
}

// nameClauses gives the clauses of the steps, which bear the names of EN standards, those of the
// basis.
func (b Basis) nameClauses(chapters []Chapter) {
	for _, c := range chapters {
		for i := range c.Steps {
			s := &c.Steps[i]
			switch b.Name {
			case ISO.Name, ISO15099.Name:
				for _, x := range clausesISO {
					if strings.HasPrefix(s.Clause, x.en) {
						s.Clause = x.iso
						break
					}
				}
			case NA.Name: // light and sun: other weights in the same formulas
				for _, x := range []string{"EN 410, 5.2", "EN 410, 5.3", "EN 410, 5.4"} {
					if strings.HasPrefix(s.Clause, x) {
						s.Clause = "as " + s.Clause
						break
					}
				}
			}
		}
	}
}
