package main

// The root command: what every sub-command shares, from streams and exit codes to the printing of
// errors and the writing of files.

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"panewright/glazing/project"
	"panewright/spectra"
)

// version is printed by --version and on every output.
const version = "0.2.0"

// The exit codes.
const (
	exitDone   = 0
	exitFailed = 1 // the work failed: an output could not be written, a published check is missed
	exitUsage  = 2 // wrong usage or wrong input
	exitNotMet = 3 // not every limit that was checked is met
)

// streams are where a command prints: results to out, all else to err.
type streams struct{ out, err io.Writer }

// run executes the command line and returns the exit code.
func run(args []string, s streams) int {
	out := &checkedWriter{w: s.out}
	s.out = out
	root := newRoot(s)
	root.SetArgs(args)
	if len(args) > 0 && strings.HasPrefix(args[0], cobra.ShellCompRequestCmd) {
		root.SetErr(io.Discard) // what a shell asks for by the way is answered on standard output alone
	}
	err := root.Execute()
	if failed := out.failure(); failed != nil {
		err = failed // the command library ignores it when it prints help
	}
	if err == nil {
		return exitDone
	}
	report(s.err, err)
	return exitOf(err)
}

// exitOf returns the exit code of an error.
func exitOf(err error) int {
	_, unwritten := errors.AsType[*outputError](err)
	_, missed := errors.AsType[*missedError](err)
	if unwritten || missed {
		return exitFailed
	}
	if _, checked := errors.AsType[*notMetError](err); checked {
		return exitNotMet
	}
	return exitUsage
}

func newRoot(s streams) *cobra.Command {
	root := &cobra.Command{
		Use:                   "panewright",
		DisableFlagsInUseLine: true,
		Short:                 "Rate glazing make-ups from the spectra of their panes",
		Long: `Panewright computes, for every tint of a make-up, light and solar transmittance
and reflectance, colour, ultraviolet, solar heat gain (g), emissivity and the
U-value of the centre of the glass, and shows its working.

The figures are calculated: they are neither a certified rating nor a maker's
declaration. Local authorities and licensed practitioners decide.`,
		Example: `  panewright demo
  panewright rate panewright-demo/project.yaml
  panewright explain panewright-demo/project.yaml --makeup D1`,
		Version:       version,
		SilenceUsage:  true,
		SilenceErrors: true,
		Args:          cobra.ArbitraryArgs,
		RunE: func(c *cobra.Command, args []string) error {
			if len(args) == 0 {
				return c.Help()
			}
			return unknownCommand(c, args[0])
		},
	}
	root.SetVersionTemplate("panewright {{.Version}}\n")
	root.SetOut(s.out)
	root.SetErr(s.err)
	root.CompletionOptions.DisableDefaultCmd = true
	root.SetUsageTemplate(usage + "{{if not .HasParent}}\nTopics, such as panewright help formats:\n" + topicList() + "\n{{end}}")
	root.SetFlagErrorFunc(flagError)
	root.PersistentPreRunE = func(c *cobra.Command, _ []string) error { return settle(c) }
	root.AddCommand(newDemo(s), newRate(s), newCompare(s), newCheck(s), newExplain(s), newSection(s), newPlot(s), newSchema(s), newPanes(s), newFilm(s), newSheet(s), newSpectrum(s), newVerify(s), newCompletion(s))
	root.AddCommand(generators(s)...)
	root.SetHelpCommand(newHelp())
	addCompletions(root)
	return root
}

// usage is how a command's use is printed, 80 columns wide.
const usage = `Usage:
  {{.UseLine}}{{if .HasAvailableSubCommands}} COMMAND{{end}}
{{- if .HasExample}}

Examples:
{{.Example}}{{end}}
{{- if .HasAvailableSubCommands}}

Commands:{{range .Commands}}{{if (or .IsAvailableCommand (eq .Name "help"))}}
  {{rpad .Name .NamePadding}} {{.Short}}{{end}}{{end}}{{end}}
{{- if .HasAvailableLocalFlags}}

Options:
{{.LocalFlags.FlagUsagesWrapped 80 | trimTrailingWhitespaces}}{{end}}
`

// settle refuses options whose value is empty, and takes - as the file of -o for standard output.
func settle(c *cobra.Command) error {
	var fault error
	c.Flags().Visit(func(f *pflag.Flag) {
		var values []string
		if list, ok := f.Value.(pflag.SliceValue); ok {
			values = list.GetSlice()
		} else {
			values = []string{f.Value.String()}
		}
		some := slices.ContainsFunc(values, func(s string) bool { return s != "" })
		switch kind, _ := pflag.UnquoteUsage(f); {
		case fault != nil:
		case !some && kind == "FILE":
			fault = fmt.Errorf("--%s needs the name of a file", f.Name)
		case !some:
			fault = fmt.Errorf("--%s is empty; write --%s %s", f.Name, f.Name, kind)
		case slices.Contains(values, ""):
			fault = fmt.Errorf("--%s %s: a name between the commas is empty", f.Name, short(strings.Join(values, ",")))
		case f.Name == "output" && values[0] == "-":
			fault = f.Value.Set("")
		}
	})
	return fault
}

// flagError words what is wrong with an option, and offers those nearest to one that is not known.
func flagError(c *cobra.Command, err error) error {
	if missing, ok := errors.AsType[*pflag.ValueRequiredError](err); ok {
		name := "--" + missing.GetSpecifiedName()
		if missing.GetSpecifiedShortnames() != "" {
			name = name[1:]
		}
		kind, _ := pflag.UnquoteUsage(missing.GetFlag())
		return fmt.Errorf("%s needs a value; write %s %s", name, name, kind)
	}
	if wrong, ok := errors.AsType[*pflag.InvalidValueError](err); ok {
		kind, _ := pflag.UnquoteUsage(wrong.GetFlag()) // "" of an option that is on or off
		name := "--" + wrong.GetFlag().Name
		return fmt.Errorf("%s: %q is no value for it; write %s", name, short(wrong.GetValue()), strings.TrimSpace(name+" "+kind))
	}
	if odd, ok := errors.AsType[*pflag.InvalidSyntaxError](err); ok {
		return fmt.Errorf("%s is no option; see %s --help", short(odd.GetSpecifiedFlag()), c.CommandPath())
	}
	unknown, ok := errors.AsType[*pflag.NotExistError](err)
	if !ok {
		return err
	}
	known := []string{"--help"}
	c.Flags().VisitAll(func(f *pflag.Flag) { known = append(known, "--"+f.Name) })
	name := "--" + unknown.GetSpecifiedName()
	if letters := unknown.GetSpecifiedShortnames(); letters != "" {
		return fmt.Errorf("unknown option -%s; see %s --help", short(letters), c.CommandPath())
	}
	return fmt.Errorf("unknown option %s; %s", short(name), project.Offer(name, known))
}

// checkedWriter remembers that a write failed.
type checkedWriter struct {
	w   io.Writer
	err error
}

func (c *checkedWriter) Write(b []byte) (int, error) {
	n, err := c.w.Write(b)
	if err != nil && c.err == nil {
		c.err = err
	}
	return n, err
}

func (c *checkedWriter) failure() error {
	if c.err == nil {
		return nil
	}
	return &outputError{"standard output", c.err}
}

// An outputError says that an output could not be written.
type outputError struct {
	name string
	err  error
}

func (e *outputError) Error() string { return "cannot write " + e.name + ": " + e.err.Error() }
func (e *outputError) Unwrap() error { return e.err }

const (
	errorsPrinted = 10
	errorLength   = 1400
)

// report prints errors, one a line: those of a project as they are, with file and line, others
// after the program's name.
func report(w io.Writer, err error) {
	all, ok := errors.AsType[project.Errors](err)
	if !ok {
		fmt.Fprintln(w, clip("panewright: "+err.Error()))
		return
	}
	for i, e := range all {
		if i == errorsPrinted {
			fmt.Fprintf(w, "… and %d more\n", len(all)-i)
			return
		}
		fmt.Fprintln(w, clip(e.Error()))
	}
}

// clip keeps a message on one line of bounded length.
func clip(s string) string { return spectra.Clip(strings.ReplaceAll(s, "\n", " "), errorLength) }

// short keeps what the user typed short in a message.
func short(s string) string { return spectra.Clip(s, 60) }

// write writes a result to standard output, or, if a path is given, to that file.
func (s streams) write(path string, content []byte) error {
	if path == "" {
		_, err := s.out.Write(content)
		if err != nil {
			return &outputError{"standard output", err}
		}
		return nil
	}
	if err := writeFile(path, content); err != nil {
		return &outputError{path, cause(err)}
	}
	return nil
}

// ends are the formats that the end of a file's name says; "" of what no command writes. A file of
// any other end, or of none, gets what is asked for, a table at least.
var ends = map[string]string{
	".json": "json", ".csv": "csv", ".xlsx": "xlsx", ".md": "markdown", ".pdf": "pdf", ".svg": "svg",
	".tsv": "", ".xls": "", ".xlsm": "", ".ods": "", ".doc": "", ".docx": "", ".odt": "", ".rtf": "",
	".html": "", ".htm": "", ".xml": "", ".png": "", ".jpg": "", ".jpeg": "",
}

// checkEnding refuses the file of -o if the end of its name says another format than would stand in
// it. as is what --as says, "" where it is absent; formats are those that the command writes, "table"
// among them if it writes text.
func checkEnding(command, output, as string, formats []string) error {
	end := strings.ToLower(filepath.Ext(output))
	format, known := ends[end]
	endOf := func(format string) string {
		switch format {
		case "table":
			return ".txt"
		case "markdown":
			return ".md"
		}
		return "." + format
	}
	offered := slices.Contains(formats, format)
	switch {
	case !known, as == "" && offered, as != "" && as == format:
		return nil
	case as == "":
		var written []string
		for _, f := range formats {
			written = append(written, endOf(f))
		}
		return fmt.Errorf("-o %s: %s writes no %s; it writes %s", short(output), command, end, strings.Join(written, ", "))
	case offered:
		return fmt.Errorf("-o %s is not the name of what --as %s writes; end it in %s, or write --as %s", short(output), as, endOf(as), format)
	}
	return fmt.Errorf("-o %s is not the name of what --as %s writes; end it in %s", short(output), as, endOf(as))
}

// cause returns what lies behind an error of the file system, without the name of the file and of
// the call.
func cause(err error) error {
	if e, ok := errors.AsType[*fs.PathError](err); ok {
		return e.Err
	}
	if e, ok := errors.AsType[*os.LinkError](err); ok {
		return e.Err
	}
	return err
}

// writeFile writes a file under a temporary name in its folder and renames it, so that nothing
// half-written is left. What is no regular file, such as a pipe or a terminal, is written to.
func writeFile(path string, content []byte) (err error) {
	mode := os.FileMode(0o644)
	switch info, err := os.Stat(path); {
	case err != nil:
	case info.IsDir():
		return errors.New("is a folder")
	case !info.Mode().IsRegular():
		return os.WriteFile(path, content, mode)
	default:
		mode = info.Mode().Perm()
		if real, err := filepath.EvalSymlinks(path); err == nil {
			path = real // a link stays, and what it leads to is replaced
		}
	}
	f, err := os.CreateTemp(filepath.Dir(path), ".panewright-*")
	if err != nil {
		switch info, missing := os.Stat(filepath.Dir(path)); {
		case missing == nil && !info.IsDir():
			return fmt.Errorf("%s is no folder", filepath.Dir(path))
		case missing == nil && errors.Is(err, fs.ErrNotExist): // as under /proc
			return fmt.Errorf("no file can be made in %s", filepath.Dir(path))
		case errors.Is(missing, fs.ErrNotExist):
			return fmt.Errorf("there is no folder %s", filepath.Dir(path))
		}
		return err
	}
	defer func() {
		if err != nil {
			os.Remove(f.Name())
		}
	}()
	_, err = f.Write(content)
	if err == nil {
		err = f.Chmod(mode)
	}
	if err == nil {
		err = f.Sync()
	}
	if closing := f.Close(); err == nil {
		err = closing
	}
	if err == nil {
		err = os.Rename(f.Name(), path)
	}
	return err
}
