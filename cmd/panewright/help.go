package main

// panewright help: the help of a command, and topics that belong to no command.

import (
	"fmt"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"
	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
	"panewright/reference"
)

// A topic is a help text that belongs to no command.
type topic struct {
	name, short string
	text        func() string
}

func topics() []topic {
	return []topic{
		{"formats", "the project file, spectra, outputs, exit codes", func() string { return formatsText }},
		{"figures", "every figure: short name, symbol, unit, key", figuresText},
		{"bases", "the standards that a basis stands for", basesText},
		{"conditions", "heat balances: temperatures, wind and sun of a project or a basis", conditionsText},
		{"cautions", "the cautions, and when each applies", cautionsText},
		{"notices", "the data and code that Panewright carries", noticesText},
	}
}

func newHelp() *cobra.Command {
	return &cobra.Command{
		Use:                   "help [COMMAND | TOPIC]",
		DisableFlagsInUseLine: true,
		Short:                 "Print the help of a command, or on a topic",
		Long:                  "Prints the help of a command, or a topic:\n\n" + topicList(),
		Example:               "  panewright help rate\n  panewright help figures",
		ValidArgsFunction:     first(helpWords),
		RunE: func(c *cobra.Command, args []string) error {
			for _, t := range topics() {
				if len(args) == 1 && t.name == args[0] {
					_, err := fmt.Fprint(c.OutOrStdout(), t.text())
					return err
				}
			}
			about, rest, err := c.Root().Find(args)
			if err != nil || len(rest) > 0 {
				return unknownTopic(c.Root(), args)
			}
			about.InitDefaultHelpFlag()
			about.InitDefaultVersionFlag()
			return about.Help()
		},
	}
}

// topicList has a line for each topic.
func topicList() string {
	var b strings.Builder
	for _, t := range topics() {
		fmt.Fprintf(&b, "  %-10s %s\n", t.name, t.short)
	}
	return strings.TrimSuffix(b.String(), "\n")
}

func commandNames(root *cobra.Command) (names []string) {
	for _, x := range root.Commands() {
		if !x.Hidden {
			names = append(names, x.Name())
		}
	}
	return names
}

func topicNames() (names []string) {
	for _, t := range topics() {
		names = append(names, t.name)
	}
	return names
}

// helpWords completes what help is asked about.
func helpWords(c *cobra.Command, _ []string, _ string) (out []string) {
	for _, x := range c.Root().Commands() {
		if !x.Hidden {
			out = append(out, about(x.Name(), x.Short))
		}
	}
	for _, t := range topics() {
		out = append(out, about(t.name, t.short))
	}
	return out
}

func unknownTopic(root *cobra.Command, args []string) error {
	known := append(commandNames(root), topicNames()...)
	for _, name := range known {
		if name == args[0] {
			return fmt.Errorf("help is on one command or topic; after %s stands %q", name, short(args[1]))
		}
	}
	return fmt.Errorf("help: no command or topic %q; %s", short(args[0]), project.Offer(args[0], known))
}

func unknownCommand(root *cobra.Command, name string) error {
	for _, t := range topics() {
		if t.name == name {
			return fmt.Errorf("%s is a topic and no command: panewright help %s", name, name)
		}
	}
	return fmt.Errorf("unknown command %q; %s", short(name), project.Offer(name, commandNames(root)))
}

// fold writes a text after what leads its first line, folded at the page's width; further lines
// begin with blanks as wide as that.
func fold(b *strings.Builder, lead, words string) {
	indent := text.StringWidth(lead)
	for i, line := range strings.Split(text.WrapSoft(words, table.Width-indent), "\n") {
		if i > 0 {
			lead = strings.Repeat(" ", indent)
		}
		b.WriteString(strings.TrimRight(lead+line, " ") + "\n")
	}
}

// groups are the headings over figures, by the first part of their keys. Keys of one part stand
// under the first; a part without a row is its own heading.
var groups = map[string]string{
	"light":   "Light",
	"solar":   "Sun and heat gain",
	"uv":      "Ultraviolet",
	"colour":  "Colour",
	"gaps":    "Gaps, # from outside",
	"outside": "Surface coefficients", "inside": "Surface coefficients",
	"surfaces":       "Surfaces, # from outside",
	"thermal_stress": "Thermal stress, a screening, # the pane from outside",
	"moisture":       "Moisture",
	"comfort":        "Comfort",
}

func figuresText() string {
	var b strings.Builder
	fold(&b, "", "The figures of a rating, as --figures takes them. A figure has a short name, a symbol, and a key, which is its path in JSON and its column in CSV and XLSX. In the place of # stands the number of the pane, gap or surface, counted from 1 from outside; the short name stands for all of them.")
	listFigures(&b, glazing.Figures(), "The make-up as a whole")
	b.WriteString("\n")
	fold(&b, "", "Under a condition, named after @, as in u@winter or θ4@winter, or in the key, as in balances.winter.u_w_m2k, there are these; see panewright help conditions. In JSON they stand in the list balances, by condition.")
	var balances []glazing.Figure
	for _, f := range glazing.BalanceFigures() {
		balances = append(balances, f.Figure)
	}
	listFigures(&b, balances, "The balance as a whole")
	b.WriteString("\n")
	for _, f := range glazing.InchPound(glazing.Figures()) {
		if f.Alias == "u" {
			fold(&b, "", "With --units ip a key ends in its other unit: that of U is then "+f.Key+", in "+f.Unit+". JSON is always in SI.")
		}
	}
	return b.String()
}

// listFigures writes figures under the headings of the first parts of their keys; whole stands over
// those whose key is one part, or one part by number.
func listFigures(b *strings.Builder, list []glazing.Figure, whole string) {
	var order []string
	under := map[string][]glazing.Figure{}
	for _, f := range list {
		part, _, dotted := strings.Cut(strings.TrimSuffix(f.Key, ".#"), ".")
		heading, ok := groups[part]
		switch {
		case !dotted:
			heading = whole
		case !ok:
			heading = part
		}
		if under[heading] == nil {
			order = append(order, heading)
		}
		under[heading] = append(under[heading], f)
	}
	for _, heading := range order {
		b.WriteString("\n" + heading + "\n")
		for _, f := range under[heading] {
			alias := f.Alias
			if alias == "" {
				alias = "–"
			}
			b.WriteString("  " + text.Pad(alias, 25, ' ') + " " + text.Pad(f.Symbol+f.Mark, 9, ' ') + " " + f.Key + "\n")
			meaning := f.Meaning
			if f.Unit != "" {
				meaning += ", " + f.Unit
			}
			fold(b, "      ", meaning)
		}
	}
}

func basesText() string {
	var b strings.Builder
	fold(&b, "", "A basis is a family of standards used together; basis: in the project names it, or --basis. Several stand side by side: --basis en,iso. Which editions a contract asks for is yours to settle.")
	b.WriteString("\n")
	for _, basis := range glazing.Bases() {
		fold(&b, text.Pad(basis.Name, 10, ' '), glazing.NewMethod(basis, glazing.Options{}).Editions())
	}
	b.WriteString("\n")
	fold(&b, "", "coefficients: in the project puts other surface coefficients in the place of those of en and iso, sun: another solar spectrum. Under na and iso15099 U is that of their condition winter and g that of summer; see panewright help conditions.")
	b.WriteString("\n")
	var methods []*glazing.Method
	for _, basis := range glazing.Bases() {
		methods = append(methods, glazing.NewMethod(basis, glazing.Options{}))
	}
	fold(&b, "", strings.ReplaceAll(glazing.BasesDiffer(methods), "\u00a0", " "))
	return b.String()
}

func cautionsText() string {
	var b strings.Builder
	for _, code := range glazing.CautionCodes() {
		fold(&b, text.Pad(code[0], 24, ' '), code[1])
	}
	return b.String()
}

// noticesText folds the long lines of the notices.
func noticesText() string {
	var b strings.Builder
	for line := range strings.Lines(reference.Notices()) {
		if line = strings.TrimRight(line, "\n"); text.StringWidth(line) <= table.Width {
			b.WriteString(line + "\n")
			continue
		}
		lead := "" // of further lines
		if strings.HasPrefix(line, "|") {
			lead = "  "
		}
		first, rest, _ := strings.Cut(text.WrapSoft(line, table.Width-len(lead)), "\n")
		b.WriteString(strings.TrimRight(first, " ") + "\n")
		fold(&b, lead, strings.ReplaceAll(rest, "\n", " "))
	}
	return b.String()
}
