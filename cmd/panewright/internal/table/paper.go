package table

// What the pages on paper say as the pages here do: the same words and cells.

import (
	"fmt"

	"panewright/glazing/proof"
)

// Notice returns the sentences that stand on every output of a check.
func (c Check) Notice() []string { return checkNotice }

// Rows returns the rows of results, in their order, below the headings of the page here.
func (c Check) Rows() (rows [][]string) {
	for _, g := range c.groups() {
		rows = append(rows, g.rows...)
	}
	return rows
}

// Entered returns the limits in words, numbered as results name them.
func (c Check) Entered() (lines []string) {
	for k, l := range c.used() {
		lines = append(lines, fmt.Sprintf("%d  %s; %s; %s.", k+1, l, l.Terms(), l.Origin()))
	}
	return lines
}

// Reasons returns why results are too close to call or cannot be judged.
func (c Check) Reasons() []string { return c.reasons() }

// Remarked returns the cautions on the limits.
func (c Check) Remarked() (lines []string) {
	for _, x := range c.remarks() {
		lines = append(lines, x.Text)
	}
	return append(lines, c.files()...)
}

// Counts returns how many results have each verdict.
func (c Check) Counts() []string { return c.counts() }

// Machine returns which program computed the figures where.
func (v Verification) Machine() string { return v.machine() }

// Said returns what is said around the checks.
func (v Verification) Said() []string {
	return []string{verifyTitle, verifyAbout, verifyMeans, verifyScope}
}

// Summary returns the rows of the summary, heads first.
func (v Verification) Summary() (rows [][]string) {
	names, counts := v.summary()
	rows = append(rows, append([]string{"standing"}, countHeads()...))
	for i, name := range names {
		rows = append(rows, append([]string{name}, counts[i]...))
	}
	return rows
}

// VerifyHeads are the headings of the columns of outcomes, and VerifyCells what stands below them.
func VerifyHeads() []string { return append([]string{"check", "what"}, numberHeads...) }

// VerifyCells returns a row of outcomes.
func VerifyCells(o proof.Outcome) []string {
	what := o.What
	if o.Subject != "" {
		what = o.Subject + ": " + what
	}
	if o.Unit != "1" {
		what += ", " + o.Unit
	}
	return append([]string{o.ID, what}, numbersOf(o)...)
}

// VerifyNotes returns what is said under the tables of a group.
func VerifyNotes(g proof.Group) (lines []string) {
	for _, n := range notes(g) {
		lines = append(lines, n[0]+": "+n[1])
	}
	return lines
}
