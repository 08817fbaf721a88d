package main

// panewright verify: the published checks, run on the user's machine.

import (
	"fmt"
	"runtime"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/sheet"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing/project"
	"panewright/glazing/proof"
	"panewright/reference/checks"
)

func newVerify(s streams) *cobra.Command {
	p := page{command: "verify", units: "si", formats: []string{"table", "json", "csv", "markdown", "pdf"}}
	var only string
	c := &cobra.Command{
		Use:                   "verify [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Compute published figures anew and compare",
		Long: `Runs every published check that Panewright carries, on your machine, with the
functions that ratings use. For each it prints what is computed, the computed
and the published figure, their difference, the tolerance and the result, by
standard, with the sources and whether a figure was read there, is from memory,
or is common practice without a source. A summary counts them. CSV and JSON also
have the inputs of each check.

Where two figures are known to differ, the row says known, and the reason stands
under the table. It exits 1 if a check is missed; the rows are printed all the
same. The first and the last line name the program, its Go version and the
machine, so that the page can be handed over.

The make-ups of the test matrix were chosen with the scope of EN 17871 in mind.
Conformity with it, or with any other procedure, is not claimed.`,
		Example: `  panewright verify
  panewright verify --only "EN 673"
  panewright verify --only double
  panewright verify --as json -o checks.json
  panewright verify -o verification.pdf`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) > 0 {
				return fmt.Errorf("verify takes no argument; to run part of the checks, write: panewright verify --only %s", short(args[0]))
			}
			return nil
		},
		RunE: func(*cobra.Command, []string) error { return verify(s, p, only, checks.Groups()) },
	}
	c.Flags().StringVar(&p.as, "as", "", "print as `FORMAT`: "+strings.Join(p.formats, ", ")+"; table when absent, or what the end of -o says")
	c.Flags().StringVar(&only, "only", "", "run only checks whose group or id contains `TEXT`")
	outputFlag(c, &p.output)
	return c
}

// verify runs the checks of groups and prints the outcomes; a missed one is an error.
func verify(s streams, p page, only string, groups []checks.Group) error {
	form, err := p.form()
	if err != nil {
		return err
	}
	if groups, err = containing(groups, only); err != nil {
		return err
	}
	v := table.Verification{Version: version, Go: runtime.Version(), System: runtime.GOOS, Architecture: runtime.GOARCH, Groups: proof.Run(groups)}
	out, err := forms[table.Verification]{table.Verify, table.VerifyJSON, table.VerifyMarkdown, table.VerifyCSV, verification}.print(p, form, v)
	if err != nil {
		return err
	}
	if err := s.write(p.output, out); err != nil {
		return err
	}
	if missed := v.Missed(); missed != nil {
		return &missedError{missed, proof.Count(v.Groups, "", "")}
	}
	return nil
}

// verification returns the outcomes as PDF.
func verification(v table.Verification) ([]byte, error) {
	f, err := sheet.Verification(v)
	return f.PDF, err
}

// containing returns the groups whose title contains a text, and of others the checks whose id
// does, in any case of letters.
func containing(groups []checks.Group, text string) ([]checks.Group, error) {
	text = strings.ToLower(text)
	has := func(s string) bool { return strings.Contains(strings.ToLower(s), text) }
	var list []checks.Group
	for _, g := range groups {
		if !has(g.Title) {
			var some []checks.Check
			for _, c := range g.Checks {
				if has(c.ID) {
					some = append(some, c)
				}
			}
			g.Checks = some
		}
		if len(g.Checks) > 0 {
			list = append(list, g)
		}
	}
	if list == nil {
		return nil, fmt.Errorf("--only %s: no group and no id contains it; %s", short(text), project.Offer(text, families(groups)))
	}
	return list, nil
}

// families returns what ids begin with, each once.
func families(groups []checks.Group) []string {
	var list []string
	for _, g := range groups {
		for _, c := range g.Checks {
			family, _, _ := strings.Cut(c.ID, "-")
			list = append(list, family)
		}
	}
	return unique(list)
}

// familiesAbout completes the value of --only: what ids begin with, and of which group they are.
func familiesAbout() (out []string) {
	for _, g := range checks.Groups() {
		for _, family := range families([]checks.Group{g}) {
			out = append(out, about(family, g.Title))
		}
	}
	return out
}

// A missedError says that checks are missed. Their rows are printed.
type missedError struct {
	ids []string
	of  int
}

func (e *missedError) Error() string {
	const named = 5
	ids := strings.Join(e.ids[:min(named, len(e.ids))], ", ")
	if more := len(e.ids) - named; more > 0 {
		ids += fmt.Sprintf(" and %d more", more)
	}
	return fmt.Sprintf("verify: %d of %d checks missed: %s; their rows say by how much", len(e.ids), e.of, ids)
}
