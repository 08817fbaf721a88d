//go:build man

package main

// panewright man: the manual pages, one a command. It stands behind the build tag man, so that the
// program itself does not carry what turns text into pages:
//
//	go run -tags man ./cmd/panewright man DIR

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"time"

	"github.com/spf13/cobra"
	"github.com/spf13/cobra/doc"
	"github.com/spf13/pflag"
)

// released is the month that pages name, of the version that they are of.
var released = time.Date(2026, time.December, 1, 0, 0, 0, 0, time.UTC)

func generators(s streams) []*cobra.Command { return []*cobra.Command{newMan(s)} }

func newMan(s streams) *cobra.Command {
	return &cobra.Command{
		Use:                   "man DIR",
		DisableFlagsInUseLine: true,
		Short:                 "Write the manual pages into a folder",
		Long: `Writes a manual page for each command into DIR, which is made if need be. Pages
of Panewright that are there are replaced; a file of such a name that is none is
left alone, and then nothing is written. Prints the names of what was written.`,
		Example: "  panewright man man1",
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) != 1 || args[0] == "" {
				return errors.New("man needs one folder, such as: panewright man man1")
			}
			return nil
		},
		RunE: func(c *cobra.Command, args []string) error {
			pages, err := manPages(c.Root())
			if err != nil {
				return err
			}
			return writePages(s, args[0], pages)
		},
	}
}

// A manPage is the page of a command, under the name of its file.
type manPage struct {
	file string
	text []byte
}

// manPages makes the pages of all commands but man, which a user does not have.
func manPages(root *cobra.Command) ([]manPage, error) {
	commands := []*cobra.Command{root}
	for _, c := range root.Commands() {
		if c.Name() == "man" {
			root.RemoveCommand(c)
			continue
		}
		commands = append(commands, c) // help too, which the command library leaves out of a tree
	}
	var pages []manPage
	for _, c := range commands {
		forMarkdown(c)
	}
	for _, c := range commands {
		var b bytes.Buffer
		header := &doc.GenManHeader{Section: "1", Date: &released, Source: "Panewright " + version, Manual: "Panewright"}
		if err := doc.GenMan(c, header, &b); err != nil {
			return nil, err
		}
		pages = append(pages, manPage{strings.ReplaceAll(c.CommandPath(), " ", "-") + "." + header.Section, b.Bytes()})
	}
	return pages, nil
}

// forMarkdown readies a command for the command library, which takes its texts for Markdown: they
// are escaped, and what is laid out in columns stands as it is. The options become a section of the
// text, for the library prints values that nobody typed.
func forMarkdown(c *cobra.Command) {
	c.DisableAutoGenTag = true
	c.InitDefaultHelpFlag()
	c.InitDefaultVersionFlag()
	var b strings.Builder
	for paragraph := range strings.SplitSeq(c.Long, "\n\n") {
		if columns.MatchString(paragraph) {
			b.WriteString("```\n" + paragraph + "\n```\n\n")
		} else {
			b.WriteString(markdown.Replace(paragraph) + "\n\n")
		}
	}
	b.WriteString("# OPTIONS\n\n")
	c.Flags().VisitAll(func(f *pflag.Flag) {
		f.Hidden = true // from the library
		if f.Shorthand != "" {
			b.WriteString("**-" + f.Shorthand + "**, ")
		}
		b.WriteString("**--" + f.Name + "**")
		name, usage := pflag.UnquoteUsage(f)
		if name != "" {
			b.WriteString(" *" + markdown.Replace(name) + "*")
		}
		b.WriteString("\n: " + markdown.Replace(usage) + "\n\n")
	})
	c.Use, c.Short, c.Long = markdown.Replace(c.Use), markdown.Replace(c.Short), b.String()
}

// columns is what marks a paragraph that is laid out: a line that begins with a blank, or blanks
// within one.
var columns = regexp.MustCompile(`(?m)^ |\S  `)

// markdown escapes what Markdown would read as more than a sign.
var markdown = func() *strings.Replacer {
	var pairs []string
	for _, c := range "\\`*_[]<>#|~" {
		pairs = append(pairs, string(c), `\`+string(c))
	}
	return strings.NewReplacer(pairs...)
}()

// writePages writes pages into a folder, or none if a file is in the way.
func writePages(s streams, dir string, pages []manPage) error {
	for _, p := range pages {
		path := filepath.Join(dir, p.file)
		switch have, err := os.ReadFile(path); {
		case errors.Is(err, fs.ErrNotExist):
		case err != nil:
			return &outputError{path, err}
		case !bytes.Contains(have, []byte(`.TH "PANEWRIGHT`)):
			return fmt.Errorf("%s is there already and is no page of Panewright; it was left alone: name another folder", path)
		}
	}
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return &outputError{dir, err}
	}
	for _, p := range pages {
		path := filepath.Join(dir, p.file)
		if err := s.write(path, p.text); err != nil {
			return err
		}
		fmt.Fprintln(s.out, path)
	}
	return nil
}
