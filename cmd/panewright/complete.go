package main

// panewright completion: the script by which a shell completes a command line, and the tables of
// what completes an argument or the value of an option. Completing reads the project that the line
// names, writes nothing and fails in silence.

import (
	"bytes"
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"panewright/glazing"
	"panewright/glazing/library"
	"panewright/glazing/project"
	"panewright/spectra"
)

func newCompletion(s streams) *cobra.Command {
	var output string
	c := &cobra.Command{
		Use:                   "completion SHELL [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Print the script by which your shell completes commands",
		Long: `Prints a script for SHELL: bash, zsh, fish or powershell. With it the tab key
completes commands and options, and what a project holds: the ids of its
make-ups, its tints, the names of figures.

bash        put this line into ~/.bashrc:
              source <(panewright completion bash)
zsh         write the script as _panewright into a folder that $fpath names
            before compinit runs
fish        write it as ~/.config/fish/completions/panewright.fish
powershell  put this line into the file that $PROFILE names:
              panewright completion powershell | Out-String | Invoke-Expression

It works from the next shell on.`,
		Example: `  panewright completion bash
  panewright completion zsh -o _panewright
  panewright completion fish -o panewright.fish`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) != 1 {
				return errors.New("completion needs one shell: " + strings.Join(shells, ", "))
			}
			return nil
		},
		RunE: func(c *cobra.Command, args []string) error {
			script, err := completionScript(c.Root(), args[0])
			if err != nil {
				return err
			}
			return s.write(output, script)
		},
	}
	outputFlag(c, &output)
	return c
}

var shells = []string{"bash", "zsh", "fish", "powershell"}

func completionScript(root *cobra.Command, shell string) ([]byte, error) {
	var b bytes.Buffer
	var err error
	switch shell {
	case "bash":
		var script bytes.Buffer
		if err = root.GenBashCompletionV2(&script, true); err == nil {
			b.WriteString(bashCommas.Replace(script.String()) + bashAlone)
		}
	case "zsh":
		err = root.GenZshCompletion(&b)
	case "fish":
		err = root.GenFishCompletion(&b, true)
	case "powershell":
		err = root.GenPowerShellCompletionWithDesc(&b)
	default:
		err = fmt.Errorf("unknown shell %q; %s", short(shell), project.OfferAll(shell, shells))
	}
	return b.Bytes(), err
}

// bashCommas keeps the script for bash from escaping commas, which no list that it offers would then
// match, and from taking @, which stands before conditions, for the end of a word.
var bashCommas = strings.NewReplacer(
	`[[ $comp == "$cur"* ]]`, `comp=${comp//\\,/,}; [[ $comp == "$cur"* ]]`,
	`    __panewright_handle_special_char "$cur" :`, `    COMPREPLY=("${COMPREPLY[@]//\\,/,}")
    __panewright_handle_special_char "$cur" @
    __panewright_handle_special_char "$cur" :`,
	"init_completion -n =: ||", "init_completion -n =:@ ||")

// bashAlone follows the command library's script for bash, which calls functions of the package
// bash-completion. Where that package is not loaded, these stand in: bash splits a line at = : and @,
// and the first puts together again what has no blank between; the second lists files.
const bashAlone = `
if ! declare -F _get_comp_words_by_ref >/dev/null; then
    __panewright_init_completion()
    {
        local i word before=" " line=$COMP_LINE
        COMPREPLY=() words=() cword=0
        for i in "${!COMP_WORDS[@]}"; do
            word=${COMP_WORDS[i]}
            if [[ $line != [[:blank:]]* && ($word == [=:@]* || $before == *[=:@]) ]]; then
                words[${#words[@]}-1]+=$word
            else
                words+=("$word")
            fi
            line=${line#"${line%%[![:blank:]]*}"}
            line=${line#"$word"}
            before=$word
            ((i == COMP_CWORD)) && cword=$((${#words[@]} - 1))
        done
        cur=${words[cword]} prev=${words[cword > 0 ? cword - 1 : 0]}
    }
fi
if ! declare -F _filedir >/dev/null; then
    _filedir()
    {
        local name ends="\\.(${1%|})\$"
        while IFS= read -r name; do
            if [[ -d ${name/#\~/$HOME} || ($1 != -d && (-z $1 || $name =~ $ends)) ]]; then
                COMPREPLY+=("$name")
            fi
        done < <(compgen -f -- "$cur")
        compopt -o filenames 2>/dev/null
    }
fi
`

// An offer lists what may stand in a place, each perhaps with a tab and words about it. What does
// not begin with the word is left out later.
type offer func(c *cobra.Command, args []string, word string) []string

// optionOffers completes the values of options, by name, or by command and name where commands
// differ. Those of other options are completed by the names of files. Rows may name what no command
// has.
var optionOffers = map[string]offer{
	"makeup":               makeupIDs,
	"tint":                 tintNames,
	"panes --tint":         tintsOfPane,
	"basis":                always(basisNames),
	"figures":              figureNamesAbout,
	"as":                   formats,
	"units":                words("si\tmetric", "ip\tinch-pound"),
	"separator":            words("comma", "semicolon", "tab"),
	"spectrum --separator": words("tab", "blank"),
	"spectra":              words("all\tthe wavelengths of the basis"),
	"unit":                 always(spectra.LayoutUnits),
	"columns":              always(layoutColumns),
	"only":                 always(familiesAbout),
	"conditions":           conditionsToShow,
	"angle":                words("0\tnormal incidence", "45", "60"),
	"at":                   words("all\tthose of the standards and of the infrared"),
	"polarisation":         words("s\tacross the plane of incidence", "p\tin the plane of incidence", "mean\tof both"),
}

// optionEnds are the ends of the files that options name; none for files of any kind.
var optionEnds = map[string][]string{"project": projectEnds, "limits": projectEnds, "output": {}, "each": {}}

// lists are the options whose values are mostly lists with commas: no blank follows an element.
var lists = []string{"figures", "columns", "conditions"}

var projectEnds = []string{"yaml", "yml", "json"}

// argumentOffers completes the arguments of commands, by name.
var argumentOffers = map[string]cobra.CompletionFunc{
	"panewright": cobra.NoFileCompletions,
	"demo":       folder,
	"man":        folder,
	"rate":       projectThen(nil),
	"explain":    projectThen(nil),
	"section":    projectThen(nil),
	"plot":       projectThen(nil),
	"check":      projectThen(nil),
	"sheet":      projectThen(nil),
	"compare":    projectThen(makeupsAndTints),
	"panes":      first(paneIDs),
	"film":       projectThen(filmPanes),
	"spectrum":   spectrumFiles,
	"schema":     cobra.NoFileCompletions,
	"verify":     cobra.NoFileCompletions,
	"completion": first(always(func() []string { return shells })),
}

// addCompletions gives every command and option of a tree what completes it.
func addCompletions(c *cobra.Command) {
	if f, ok := argumentOffers[c.Name()]; ok {
		c.ValidArgsFunction = f
	}
	c.Flags().VisitAll(func(f *pflag.Flag) {
		if ends, ok := optionEnds[f.Name]; ok {
			f.Annotations = map[string][]string{cobra.BashCompFilenameExt: ends}
			return
		}
		of := optionOffers[c.Name()+" --"+f.Name]
		if of == nil {
			of = optionOffers[f.Name]
		}
		if of != nil {
			// the error says that the option has a completion already
			_ = c.RegisterFlagCompletionFunc(f.Name, optionValue(f, of))
		}
	})
	for _, sub := range c.Commands() {
		addCompletions(sub)
	}
}

const inOrder = cobra.ShellCompDirectiveNoFileComp | cobra.ShellCompDirectiveKeepOrder

// optionValue completes the value of an option; of a list with commas, its last element.
func optionValue(f *pflag.Flag, of offer) cobra.CompletionFunc {
	return func(c *cobra.Command, args []string, word string) ([]string, cobra.ShellCompDirective) {
		directive := inOrder
		if slices.Contains(lists, f.Name) {
			directive |= cobra.ShellCompDirectiveNoSpace
		}
		list, many := f.Value.(pflag.SliceValue)
		if !many && !slices.Contains(lists, f.Name) {
			return beginning(of(c, args, word), "", word), directive
		}
		before := word[:strings.LastIndex(word, ",")+1]
		taken := strings.Split(before, ",")
		if many {
			taken = append(taken, list.GetSlice()...)
		}
		open := slices.DeleteFunc(of(c, args, word[len(before):]), func(x string) bool {
			return slices.ContainsFunc(taken, func(t string) bool {
				return t == nameOf(x) || strings.HasSuffix(x, "=") && strings.HasPrefix(t, x)
			})
		})
		return beginning(open, before, word), directive
	}
}

// beginning returns those of a list that, after what stands before, begin with a word.
func beginning(list []string, before, word string) (out []string) {
	for _, x := range list {
		if strings.HasPrefix(before+x, word) {
			out = append(out, before+x)
		}
	}
	return out
}

// nameOf returns an offer without the words about it.
func nameOf(x string) string {
	name, _, _ := strings.Cut(x, "\t")
	return name
}

func about(name, words string) string { return name + "\t" + strings.ReplaceAll(words, "\n", " ") }

func always(f func() []string) offer {
	return func(*cobra.Command, []string, string) []string { return slices.Clone(f()) }
}

func words(list ...string) offer { return always(func() []string { return list }) }

// first completes the first argument; there is no second.
func first(of offer) cobra.CompletionFunc {
	return func(c *cobra.Command, args []string, word string) ([]string, cobra.ShellCompDirective) {
		if len(args) > 0 {
			return nil, cobra.ShellCompDirectiveNoFileComp
		}
		return beginning(of(c, args, word), "", word), inOrder
	}
}

// projectThen completes a project file, and after it what a project holds, each once.
func projectThen(of offer) cobra.CompletionFunc {
	return func(c *cobra.Command, args []string, word string) ([]string, cobra.ShellCompDirective) {
		switch {
		case len(args) == 0:
			return projectEnds, cobra.ShellCompDirectiveFilterFileExt
		case of == nil:
			return nil, cobra.ShellCompDirectiveNoFileComp
		}
		open := slices.DeleteFunc(of(c, args, word), func(x string) bool { return slices.Contains(args[1:], nameOf(x)) })
		return beginning(open, "", word), inOrder
	}
}

func folder(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
	if len(args) > 0 {
		return nil, cobra.ShellCompDirectiveNoFileComp
	}
	return nil, cobra.ShellCompDirectiveFilterDirs
}

// spectrumFiles completes the key of KEY=FILE once it is begun, and files.
func spectrumFiles(_ *cobra.Command, _ []string, word string) (out []string, _ cobra.ShellCompDirective) {
	for _, key := range spectrumKeys {
		if word != "" && strings.HasPrefix(key+"=", word) && key+"=" != word {
			out = append(out, key+"=")
		}
	}
	if len(out) > 0 {
		return out, cobra.ShellCompDirectiveNoSpace
	}
	return nil, cobra.ShellCompDirectiveDefault
}

// projectNamed reads the project that a line names by --project or as its first argument. It is
// nil where none is named or it cannot be read.
func projectNamed(c *cobra.Command, args []string) *project.Project {
	path := ""
	if f := c.Flags().Lookup("project"); f != nil {
		path = f.Value.String()
	} else if len(args) > 0 {
		path = args[0]
	}
	if path == "" {
		return nil
	}
	anywhere, _ := c.Flags().GetBool("files-anywhere") // false where there is no such option
	p, err := project.Load(path, project.Access{Anywhere: anywhere})
	if err != nil {
		return nil
	}
	return p
}

// makeupsOf returns the make-ups of the project that a line names.
func makeupsOf(c *cobra.Command, args []string) []*glazing.Makeup {
	if p := projectNamed(c, args); p != nil {
		return p.Makeups
	}
	return nil
}

func makeupIDs(c *cobra.Command, args []string, _ string) (out []string) {
	for _, m := range makeupsOf(c, args) {
		out = append(out, about(m.ID, m.Title))
	}
	return out
}

// tintsOf returns the names of the states of a make-up, if it switches.
func tintsOf(m *glazing.Makeup) (names []string) {
	states, err := m.States()
	if err != nil {
		return nil
	}
	for _, s := range states {
		if s.Name != "" {
			names = append(names, s.Name)
		}
	}
	return names
}

// withExtremes adds clear and full to tints that are called otherwise.
func withExtremes(tints []string) []string {
	for _, x := range []string{"clear\thighest light transmittance", "full\tlowest light transmittance"} {
		if !slices.ContainsFunc(tints, func(t string) bool { return nameOf(t) == nameOf(x) }) && len(tints) > 0 {
			tints = append(tints, x)
		}
	}
	return tints
}

// tintNames lists the tints of the make-ups that a line selects.
func tintNames(c *cobra.Command, args []string, _ string) []string {
	selected, _ := c.Flags().GetStringSlice("makeup") // none where there is no such option
	var names []string
	of := map[string][]string{} // the make-ups of each tint
	for _, m := range makeupsOf(c, args) {
		if len(selected) > 0 && !slices.Contains(selected, m.ID) {
			continue
		}
		for _, t := range tintsOf(m) {
			if !slices.Contains(names, t) {
				names = append(names, t)
			}
			of[t] = append(of[t], m.ID)
		}
	}
	for i, t := range names {
		names[i] = about(t, strings.Join(of[t], ", "))
	}
	return withExtremes(names)
}

// makeupsAndTints lists the make-ups of a project, and with a tint those that switch.
func makeupsAndTints(c *cobra.Command, args []string, _ string) (out []string) {
	for _, m := range makeupsOf(c, args) {
		out = append(out, about(m.ID, m.Title))
		for _, t := range withExtremes(tintsOf(m)) {
			out = append(out, m.ID+":"+t)
		}
	}
	return out
}

// paneIDs lists the panes of a project that a line names, and the built-in ones.
func paneIDs(c *cobra.Command, args []string, _ string) (out []string) {
	if p := projectNamed(c, args); p != nil {
		for _, pane := range p.Panes {
			out = append(out, about(pane.ID, "of the project"))
		}
	}
	for _, e := range library.Entries() {
		out = append(out, about(e.ID, e.About))
	}
	return out
}

// tintsOfPane lists the tints of the pane that a line names.
func tintsOfPane(c *cobra.Command, args []string, _ string) []string {
	if len(args) == 0 {
		return nil
	}
	pane := library.Pane(args[0])
	if p := projectNamed(c, args); p != nil {
		for _, own := range p.Panes {
			if own.ID == args[0] {
				pane = own
			}
		}
	}
	if pane == nil || !pane.Tintable() {
		return nil
	}
	return withExtremes(pane.TintNames())
}

func basisNames() (out []string) {
	for _, b := range glazing.Bases() {
		out = append(out, about(b.Name, b.Editions))
	}
	return out
}

// figureNamesAbout lists the short names of figures, and after @ the conditions that the project or its
// bases have; where none begins with the word, the keys, with the numbers that the panes, gaps and
// surfaces of the project's make-ups have.
func figureNamesAbout(c *cobra.Command, args []string, word string) (out []string) {
	for _, f := range glazing.Figures() {
		if f.Alias != "" && strings.HasPrefix(f.Alias, word) {
			out = append(out, about(f.Alias, f.Meaning))
		}
	}
	if alone, _, at := strings.Cut(word, "@"); at || len(out) == 0 {
		ids := conditionIDs(c, args)
		for _, f := range glazing.BalanceFigures() {
			name := f.Alias
			switch { // before @ also a symbol or a key, with the number of a place
			case at && !f.Named(alone), !at && !strings.HasPrefix(f.Alias, alone):
				continue
			case at:
				name = alone
			}
			for _, id := range ids {
				out = append(out, about(name+"@"+id, f.Meaning))
			}
		}
	}
	if len(out) > 0 {
		return out
	}
	panes := 1
	for _, m := range makeupsOf(c, args) {
		panes = max(panes, len(m.Panes))
	}
	count := map[glazing.Per]int{glazing.PerMakeup: 1, glazing.PerPane: panes, glazing.PerGap: max(1, panes-1), glazing.PerSurface: 2 * panes}
	list := glazing.Figures()
	for _, id := range conditionIDs(c, args) {
		for _, f := range glazing.BalanceFigures() {
			list = append(list, f.At(id))
		}
	}
	for _, f := range list {
		for i := range count[f.Per] {
			out = append(out, about(f.KeyAt(i+1), f.Meaning))
		}
	}
	return out
}

// conditionIDs lists the conditions that a rating of the project has: those of the bases, if they have
// any, and the project's own.
func conditionIDs(c *cobra.Command, args []string) (ids []string) {
	p := projectNamed(c, args)
	if p == nil {
		return nil
	}
	bases := p.Bases
	if f := c.Flags().Lookup("basis"); f != nil && f.Changed {
		bases = nil
		for name := range strings.SplitSeq(strings.Trim(f.Value.String(), "[]"), ",") {
			if b, err := glazing.BasisNamed(name); err == nil {
				bases = append(bases, b)
			}
		}
	}
	if slices.ContainsFunc(bases, glazing.Basis.Balances) {
		ids = append(ids, glazing.Winter, glazing.Summer)
	}
	for _, x := range p.Conditions {
		ids = append(ids, x.ID)
	}
	return ids
}

// formats lists those that the help of --as names.
func formats(c *cobra.Command, _ []string, _ string) (out []string) {
	usage := c.Flags().Lookup("as").Usage
	for _, x := range []string{"table\t80 columns", "json\tall digits, for programs", "csv\tall digits, for programs", "xlsx\tspreadsheet", "markdown\tfor a report"} {
		if strings.Contains(usage, nameOf(x)) {
			out = append(out, x)
		}
	}
	return out
}

func layoutColumns() (out []string) {
	for _, name := range spectra.LayoutColumns() {
		out = append(out, name+"=")
	}
	return out
}
