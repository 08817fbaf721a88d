package main

// panewright compare: make-ups and tints beside each other.

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
)

func newCompare(s streams) *cobra.Command {
	var p page
	var basis string
	var filesAnywhere bool
	c := &cobra.Command{
		Use:                   "compare PROJECT ID ID … [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Set make-ups or tints beside each other",
		Long: `Prints the figures of make-ups or tints beside those of the first, which is the
reference, with their changes, those under each condition, the differences of
their colours and what differs in what was put in.

An ID is a make-up in each of its tints; ID:TINT is one tint. clear and full
are understood as by rate --tint.

CSV has one row for the reference and one for each option.
` + spreadsheetText + `

--figures takes the names that rate takes: see panewright help rate.`,
		Example: `  panewright compare panewright-demo/project.yaml D1 T1
  panewright compare panewright-demo/project.yaml D1 E1
  panewright compare panewright-demo/project.yaml E1:clear E1:full
  panewright compare panewright-demo/project.yaml D1 E1:clear --figures g,u
  panewright compare panewright-demo/project.yaml D1 T1 --units ip
  panewright compare panewright-demo/project.yaml D1 T1 -o compared.md`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) < 2 || slices.Contains(args, "") {
				return errors.New("compare needs a project and make-ups or tints, such as: panewright compare panewright-demo/project.yaml D1 E1:clear")
			}
			return nil
		},
		RunE: func(_ *cobra.Command, args []string) error {
			form, err := p.form()
			if err != nil {
				return err
			}
			r, err := compared(args[0], args[1:], basis, filesAnywhere)
			if err != nil {
				return err
			}
			if err := p.choose(&r); err != nil {
				return err
			}
			if err := keepInputs(p.output, r.Project); err != nil {
				return err
			}
			out, err := forms[table.Report]{table.Compare, table.CompareJSON, table.CompareMarkdown, table.CompareCSV, nil}.print(p, form, r)
			if err != nil {
				return err
			}
			return s.write(p.output, out)
		},
	}
	c.Flags().StringVar(&basis, "basis", "", "rate under basis `NAME` instead of the project's first: "+strings.Join(glazing.BasisNames(), ", "))
	c.Flags().BoolVar(&filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
	p.flags(c, "table", "json", "csv", "markdown")
	return c
}

// compared rates what a comparison names, each once, in the order named.
func compared(path string, names []string, basis string, filesAnywhere bool) (table.Report, error) {
	r := table.Report{Version: version, Figures: glazing.Figures()}
	p, err := project.Load(path, project.Access{Anywhere: filesAnywhere})
	if err != nil {
		return r, err
	}
	r.Project = p
	b := p.Bases[0]
	if strings.Contains(basis, ",") {
		return r, fmt.Errorf("--basis %s: compare is under one basis; name one", short(basis))
	}
	if basis != "" {
		if b, err = basisNamed(basis); err != nil {
			return r, err
		}
	}
	method := p.Method(b)
	for _, name := range names {
		id, tint, one := strings.Cut(name, ":")
		m, err := makeupNamed(p, id)
		if err != nil {
			return r, err
		}
		ratings, err := p.RateBy(method, m)
		if err != nil {
			return r, err
		}
		found := false
		var known []string
		for i := range ratings {
			rating := &ratings[i]
			known = append(known, rating.Tint)
			if one && (tint == "" || !rating.InTint(tint)) {
				continue
			}
			found = true
			if !slices.ContainsFunc(r.Ratings, func(x glazing.Rating) bool { return x.Makeup == m && x.State == rating.State }) {
				r.Ratings = append(r.Ratings, *rating)
			}
		}
		switch {
		case found:
		case !m.Tintable():
			return r, fmt.Errorf("%s: %s has no pane that switches; write %s", short(name), id, id)
		default:
			return r, fmt.Errorf("%s: %s has no tint %q; %s", short(name), id, short(tint), project.Offer(tint, known))
		}
	}
	if len(r.Ratings) == 1 {
		return r, fmt.Errorf("compare needs two make-ups or tints at least; %s is one", short(names[0]))
	}
	return r, nil
}
