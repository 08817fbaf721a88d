package main

// What README and help say is so: their examples run, their options and commands exist, and no line
// is wider than a page.

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"panewright/cmd/panewright/internal/demo"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// documented returns the root command and every command that a user sees.
func documented(root *cobra.Command) []*cobra.Command {
	root.InitDefaultHelpCmd()
	list := []*cobra.Command{root}
	for _, c := range root.Commands() {
		if !c.Hidden {
			list = append(list, c)
		}
	}
	return list
}

// printed runs a command line that must succeed, and returns what it prints.
func printed(t *testing.T, args ...string) string {
	t.Helper()
	var out, remarks bytes.Buffer
	if code := run(args, streams{out: &out, err: &remarks}); code != exitDone {
		t.Fatalf("panewright %s exits %d: %s", strings.Join(args, " "), code, remarks.String())
	}
	return out.String()
}

func readme(t *testing.T) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(moduleRoot(t), "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	return strings.ReplaceAll(string(text), "\r\n", "\n")
}

// TestExamples runs the lines of examples as a person would, in a shell, in the folder that holds
// panewright-demo and two files of an instrument, t.txt and r.txt, one after the other: those of each command, of each topic, and of the fenced
// blocks in README. A line exits 0, or what a comment at its end says (# exit 2), and leaves
// something on standard output or in the file of -o.
func TestExamples(t *testing.T) {
	shell, err := exec.LookPath("sh")
	if err != nil {
		t.Skip("there is no shell")
	}
	sources := map[string]string{"README": fenced(readme(t))}
	for _, c := range documented(newRoot(streams{})) {
		if len(commandLines(c.Example)) == 0 {
			t.Errorf("%s has no example", c.CommandPath())
		}
		sources["the help of "+c.CommandPath()] = c.Example
	}
	for _, topic := range topics() {
		sources["the topic "+topic.name] = topic.text()
	}
	foreign := "nm;%\n" // as an instrument writes it, of a spectrum that is all the same
	for nm := 300; nm <= 2500; nm += 10 {
		foreign += strconv.Itoa(nm) + ";42,5\n"
	}
	ran := 0
	for source, text := range sources {
		dir := t.TempDir()
		if _, err := demo.Write(filepath.Join(dir, "panewright-demo")); err != nil {
			t.Fatal(err)
		}
		for _, name := range []string{"t.txt", "r.txt"} {
			if err := os.WriteFile(filepath.Join(dir, name), []byte(foreign), 0o644); err != nil {
				t.Fatal(err)
			}
		}
		for _, line := range commandLines(text) {
			ran++
			want := 0
			if m := exitComment.FindStringSubmatch(line); m != nil {
				want, _ = strconv.Atoi(m[1])
			}
			var out, remarks bytes.Buffer
			cmd := exec.Command(shell, "-c", line)
			cmd.Dir, cmd.Stdout, cmd.Stderr = dir, &out, &remarks
			code := 0
			if exit, ok := errors.AsType[*exec.ExitError](cmd.Run()); ok {
				code = exit.ExitCode()
			}
			if code != want {
				t.Errorf("%s: %s\nexits %d, want %d: %s", source, line, code, want, remarks.String())
			}
			if m := outputNamed.FindStringSubmatch(line); m != nil {
				if info, err := os.Stat(filepath.Join(dir, m[1])); err != nil || info.Size() == 0 {
					t.Errorf("%s: %s\nwrites nothing into %s", source, line, m[1])
				}
			} else if want == 0 && out.Len() == 0 {
				t.Errorf("%s: %s\nprints nothing", source, line)
			}
		}
	}
	if ran < 15 {
		t.Errorf("%d examples were found", ran)
	}
}

var (
	exitComment = regexp.MustCompile(`# exit (\d+)$`)
	outputNamed = regexp.MustCompile(`(?: -o | --output[ =]|> *)([^ ]+)`)
	// optionTyped is an option in a text; --makeup ID and --as=json count as well.
	optionTyped = regexp.MustCompile(`(?:^|[\s\x60([|])(--[a-z][a-z-]*|-[a-z])\b`)
)

// fenced returns the fenced blocks of a Markdown text.
func fenced(text string) string {
	var b strings.Builder
	for i, block := range strings.Split("\n"+text, "\n```") {
		if i%2 == 1 {
			b.WriteString(block + "\n")
		}
	}
	return b.String()
}

// commandLines returns the lines of a text that are commands: those that begin with the program's
// name or with go run and its folder, blanks before aside. Lines that a backslash ends go on.
func commandLines(text string) (lines []string) {
	for line := range strings.Lines(strings.ReplaceAll(text, "\\\n", "")) {
		line = strings.TrimSpace(line)
		if rest, ok := strings.CutPrefix(line, "go run ./cmd/panewright "); ok {
			line = "panewright " + rest
		}
		if strings.HasPrefix(line, "panewright ") {
			lines = append(lines, line)
		}
	}
	return lines
}

// README shows what the demo really prints.
func TestReadmeShowsTheDemo(t *testing.T) {
	text := readme(t)
	t.Chdir(t.TempDir())
	out := printed(t, "demo")
	for _, block := range strings.Split(text, "```\n") {
		if strings.HasPrefix(block, "Heron Mill") {
			if !strings.HasPrefix(out, block) {
				t.Errorf("README shows\n%s\nthe demo prints\n%s", block, out[:min(len(block), len(out))])
			}
			return
		}
	}
	t.Error("README does not show the demo's output")
}

// Commands, topics and options that README names in backquotes exist, and so do the options that
// help and topics name.
func TestNamedOptionsExist(t *testing.T) {
	root := newRoot(streams{})
	options := map[string]bool{}
	for _, c := range documented(root) {
		c.InitDefaultHelpFlag()
		c.InitDefaultVersionFlag()
		c.Flags().VisitAll(func(f *pflag.Flag) {
			options["--"+f.Name] = true
			if f.Shorthand != "" {
				options["-"+f.Shorthand] = true
			}
		})
	}
	check := func(source, text string) {
		for _, m := range optionTyped.FindAllStringSubmatch(text, -1) {
			if !options[m[1]] {
				t.Errorf("%s names the option %s, which no command has", source, m[1])
			}
		}
	}
	known := append(commandNames(root), topicNames()...)
	quoted := 0
	text := readme(t)
	for i, span := range strings.Split(strings.ReplaceAll(text, "```", "\n"), "`") {
		if i%2 == 0 || strings.HasPrefix(span, "go ") {
			continue
		}
		quoted++
		check("README", span)
		if rest, ok := strings.CutPrefix(span, "panewright "); ok {
			span = rest
		} else if !strings.HasPrefix(span, "help ") {
			continue
		}
		for word := range strings.FieldsSeq(strings.TrimPrefix(span, "help ")) {
			if word[0] != '-' && !slices.Contains(known, word) && strings.ToLower(word) == word {
				t.Errorf("README names %q, which is neither command nor topic", span)
			}
			break
		}
	}
	if quoted < 10 {
		t.Errorf("README has %d words in backquotes", quoted)
	}
	for _, c := range documented(root) {
		check("the help of "+c.CommandPath(), c.Long+"\n"+c.Example+"\n"+c.UseLine())
	}
	for _, topic := range topics() {
		check("the topic "+topic.name, topic.text())
	}
}

// The help of every command and every topic fits a page of 80 columns, and the root's help names
// them all.
func TestHelpIsNarrow(t *testing.T) {
	all := printed(t, "help")
	texts := map[string]string{}
	for _, c := range documented(newRoot(streams{})) {
		texts["help "+c.Name()] = printed(t, append([]string{"help"}, strings.Fields(c.CommandPath())[1:]...)...)
		if c.HasParent() && !strings.Contains(all, "\n  "+c.Name()+" ") {
			t.Errorf("help does not name the command %s", c.Name())
		}
	}
	for _, topic := range topics() {
		texts["help "+topic.name] = printed(t, "help", topic.name)
		if !strings.Contains(all, "\n  "+topic.name+" ") {
			t.Errorf("help does not name the topic %s", topic.name)
		}
	}
	for name, text := range texts {
		for line := range strings.Lines(text) {
			if n := len([]rune(strings.TrimRight(line, "\n"))); n > table.Width {
				t.Errorf("%s: %d columns: %s", name, n, line)
			}
		}
		if !strings.HasSuffix(text, "\n") || strings.HasSuffix(text, "\n\n") {
			t.Errorf("%s does not end with one line feed", name)
		}
	}
}

// The project that the topic formats shows can be rated, with a spectrum of the demo's.
func TestFormatsProject(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "mill")
	if _, err := demo.Write(dir); err != nil {
		t.Fatal(err)
	}
	_, text, _ := strings.Cut(formatsText, "A small one:\n\n")
	text, _, _ = strings.Cut(text, "\n\n")
	path := filepath.Join(dir, "shop.yaml")
	if err := os.WriteFile(path, []byte(strings.ReplaceAll("\n"+text, "\n  ", "\n")), 0o644); err != nil {
		t.Fatal(err)
	}
	if out := printed(t, "rate", path); !strings.Contains(out, "Corner shop") || !strings.Contains(out, "\nA1 ") {
		t.Errorf("rating it prints\n%s", out)
	}
}

// Every figure of the list stands in the topic figures.
func TestFiguresTopicIsWhole(t *testing.T) {
	text := figuresText()
	for _, f := range glazing.Figures() {
		if !strings.Contains(text, " "+f.Key+"\n") || !strings.Contains(text, "  "+f.Alias) {
			t.Errorf("the topic figures lacks %s (%s)", f.Key, f.Alias)
		}
	}
}

// The figures of a balance stand there too.
func TestFiguresTopicHasBalances(t *testing.T) {
	_, text, found := strings.Cut(figuresText(), "u@winter")
	for _, f := range glazing.BalanceFigures() {
		if !found || !strings.Contains(text, " "+f.Key+"\n") || !strings.Contains(text, "\n  "+f.Alias+" ") {
			t.Errorf("the topic figures lacks %s (%s) of a balance", f.Key, f.Alias)
		}
	}
}

// The conditions, the screening, the person and the limits that the topic conditions shows are read and
// rated, with each edge, and its table has every key that the schema has.
func TestConditionsProject(t *testing.T) {
	_, text, _ := strings.Cut(conditionsAbout, "thermal stress.\n\n")
	text, _, _ = strings.Cut(text, "\n\n")
	of := func(key string) string {
		_, text, found := strings.Cut(conditionsUse, "\n  "+key+":")
		if text, _, _ = strings.Cut(text, "\n\n"); !found {
			t.Errorf("the topic shows no %s", key)
		}
		return "\n  " + key + ":" + text
	}
	edges := strings.Split(of("edge"), "\n")[1:]
	content := "project: x\nbasis: na\nmakeups:\n  - {id: A1, outside_to_inside: [{pane: soda-lime-6}]}\n"
	for i, edge := range edges {
		content += fmt.Sprintf("  - {id: E%d, %s, outside_to_inside: [{pane: soda-lime-6}]}\n", i, strings.TrimSpace(edge))
	}
	content += strings.ReplaceAll("\n"+text+of("thermal_stress")+of("comfort")+of("limits")+"\n", "\n  ", "\n")
	if len(edges) != 2 {
		t.Errorf("the topic shows %d edges", len(edges))
	}
	path := filepath.Join(t.TempDir(), "x.yaml")
	if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
		t.Fatal(err)
	}
	out := printed(t, "rate", path)
	for _, want := range []string{"\njanuary-night ", "\njuly-noon ", "\nwinter ", "\nsummer "} {
		if !strings.Contains(out, want) {
			t.Errorf("rating it prints no row of %s:\n%s", want, out)
		}
	}
	schema := printed(t, "schema")
	_, keys, _ := strings.Cut(schema, `"conditions"`)
	keys, _, _ = strings.Cut(keys, `"required"`)
	named := regexp.MustCompile(`"([a-z][a-z0-9_]*(?:_c|_rh|_m_s|_w_m2k|_w_m2|_deg|_m))": \{`).FindAllStringSubmatch(keys, -1)
	if len(named) < 12 {
		t.Errorf("the schema names %d keys of conditions", len(named))
	}
	for _, m := range named {
		if !strings.Contains(conditionsAbout, m[1]+" ") && !strings.Contains(conditionsAbout, m[1]+",") {
			t.Errorf("the topic lacks the key %s", m[1])
		}
	}
}
