package main

// panewright check: the figures of a project held against the limits that the user typed in.

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/limits"
	"panewright/glazing/project"
)

// A notMetError says that a check was made and printed, and that not every limit is met.
type notMetError struct{ met, of int }

func (e *notMetError) Error() string {
	return fmt.Sprintf("not every limit is met: %d of %d results meet the entered limit", e.met, e.of)
}

func newCheck(s streams) *cobra.Command {
	var p page
	var o selection
	var files []string
	c := &cobra.Command{
		Use:                   "check PROJECT [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Hold the figures of a project against the limits you typed in",
		Long: `Holds the figures of each make-up against the limits of the project: those under
limits:, those of limits_file:, and those of each file that --limits names.

A limit has a figure, at_most or at_least in the unit of the figure, and

  tint      clear, full, each (when absent), worst, or the name of a tint. clear
            is that of the highest light transmittance, full that of the lowest;
            each gives one result a tint, worst one of the tint that is farthest
            past the limit or nearest to it
  basis     absent, the project's, if it has just one. Another than the project
            has is rated for the limit
  scope     centre (when absent) or window
  condition an id of the project's conditions, or winter or summer under na and
            iso15099: the figure is that of the balance under it
  makeups   ids; all when absent
  source, date

A figure of panes, gaps or surfaces without a number stands for all of them, and
the worst counts. Both the figure as outputs round it and the unrounded one are
held against the limit. A figure that only balances have, as inside_surface,
needs a condition. The results are:

  meets the entered limit   both meet it
  does not meet             neither meets it
  too close to call         one of them meets it
  cannot be judged          the figure is not known, or the limit is for a tint,
                            basis, scope or condition that it is not of

The margin is the distance of the unrounded figure to the limit, above 0 where
it is met. Where the limit leaves out basis or scope a caution says what was
taken.

A file of limits is YAML: limits: as in a project and, if you like, name: and
author:. Its limits for make-ups that the project does not have are left out,
with a caution.

The exit code is 0 if every result meets the entered limit, else 3. Limits are
yours; the local authority and licensed practice decide.`,
		Example: `  panewright check panewright-demo/project.yaml # exit 3
  panewright check panewright-demo/project.yaml --makeup E1
  panewright check panewright-demo/project.yaml --as json # exit 3
  panewright check panewright-demo/project.yaml -o checked.md # exit 3`,
		Args: oneProject,
		RunE: func(_ *cobra.Command, args []string) error {
			form, err := p.form()
			if err != nil {
				return err
			}
			r, err := checked(args[0], o, files)
			if err != nil {
				return err
			}
			if err := keepInputs(p.output, r.Project); err != nil {
				return err
			}
			out, err := forms[table.Check]{table.CheckText, table.CheckJSON, table.CheckMarkdown, table.CheckCSV, nil}.print(p, form, r)
			if err != nil {
				return err
			}
			if err := s.write(p.output, out); err != nil {
				return err
			}
			if !limits.AllMet(r.Results) {
				return &notMetError{limits.Count(r.Results, limits.Meets), len(r.Results)}
			}
			return nil
		},
	}
	c.Flags().StringSliceVar(&o.makeups, "makeup", nil, "check only make-up `ID` (may be repeated)")
	c.Flags().StringArrayVar(&files, "limits", nil, "also check the limits of `FILE` (may be repeated)")
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
	p.formatFlags(c, "table", "json", "csv", "markdown")
	return c
}

// checked reads a project and limits, and holds what is selected against them.
func checked(path string, o selection, files []string) (table.Check, error) {
	p, err := project.Load(path, project.Access{Anywhere: o.filesAnywhere})
	if err != nil {
		return table.Check{}, err
	}
	return held(p, path, o, files)
}

// held holds what is selected of a project against limits.
func held(p *project.Project, path string, o selection, files []string) (table.Check, error) {
	c := table.Check{Report: table.Report{Version: version, Figures: glazing.Figures()}}
	p.Cautions = slices.DeleteFunc(p.Cautions, func(x glazing.Caution) bool { return x.Code == project.LimitsNotChecked })
	c.Project = p
	if p.LimitsFile != nil {
		c.Files = append(c.Files, p.LimitsFile)
	}
	named, err := limitsFiles(unique(files))
	if err != nil {
		return c, err
	}
	for _, f := range named {
		p.Files = append(p.Files, f.File)
		if !slices.ContainsFunc(c.Files, func(x *project.LimitsFile) bool { return x.Digest == f.Digest }) {
			c.Files = append(c.Files, f)
		}
	}
	makeups, err := o.makeupsOf(p)
	if err != nil {
		return c, err
	}
	c.Limits, c.Remarks = p.AllLimits(named...)
	switch {
	case len(p.Makeups) == 0:
		return c, fmt.Errorf("%s has no make-up to check", path)
	case len(c.Limits) == 0 && len(c.Remarks) > 0:
		return c, fmt.Errorf("no limit is for a make-up of %s", path)
	case len(c.Limits) == 0:
		return c, fmt.Errorf("%s has no limit to check: give it limits: or limits_file:, or name a file of limits with --limits", path)
	}
	if c.Ratings, err = ratingsFor(p, makeups, c.Limits); err != nil {
		return c, err
	}
	c.Results = limits.Judge(c.Limits, makeups, p.Bases, c.Ratings)
	for _, m := range makeups {
		if !slices.ContainsFunc(c.Results, func(x limits.Result) bool { return x.Makeup == m }) {
			c.Remarks = append(c.Remarks, glazing.Caution{Code: "no_limit",
				Text: "No limit is for the make-up " + m.ID + ": nothing of it was held against one."})
		}
	}
	if len(c.Results) == 0 {
		return c, fmt.Errorf("no limit is for %s", strings.Join(unique(o.makeups), ", "))
	}
	return c, nil
}

// ratingsFor rates each make-up under the bases of the limits that are for it.
func ratingsFor(p *project.Project, makeups []*glazing.Makeup, list []glazing.Limit) (all []glazing.Rating, err error) {
	methods := map[string]*glazing.Method{}
	for _, m := range makeups {
		var done []string
		for i := range list {
			name := limits.BasisOf(&list[i], p.Bases)
			if !list[i].For(m.ID) || name == "" || slices.Contains(done, name) {
				continue
			}
			done = append(done, name)
			if methods[name] == nil {
				basis, err := glazing.BasisNamed(name)
				if err != nil {
					return nil, err
				}
				methods[name] = p.Method(basis)
			}
			ratings, err := p.RateBy(methods[name], m)
			if err != nil {
				return nil, err
			}
			all = append(all, ratings...)
		}
	}
	return all, nil
}

// limitsFiles reads files of limits, and returns the faults of all.
func limitsFiles(paths []string) (list []*project.LimitsFile, err error) {
	var faults project.Errors
	for _, path := range paths {
		if path == "" {
			return nil, errors.New("--limits needs the name of a file")
		}
		f, err := project.LoadLimits(path)
		if found, ok := errors.AsType[project.Errors](err); ok {
			faults = append(faults, found...)
		} else if err != nil {
			return nil, err
		}
		list = append(list, f)
	}
	if len(faults) > 0 {
		return nil, faults
	}
	return list, nil
}
