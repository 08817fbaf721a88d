package main

// The scripts of completion, run or at least read by the shells themselves.

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/spf13/pflag"

	"panewright/cmd/panewright/internal/demo"
)

// bashLine completes a line in bash, whose words it is given as bash splits them, also at = and :,
// and prints what bash would put in the place of the last.
const bashLine = `
source "$1"; shift
compopt() { :; }
COMP_WORDBREAKS=$' \t\n"\'@><=;|&(:'
COMP_LINE=$1 COMP_POINT=${#1} COMP_TYPE=9; shift
COMP_WORDS=("$@") COMP_CWORD=$(($# - 1))
__start_panewright
printf '%s\n' "${COMPREPLY[@]}"
`

// The script for bash completes by itself, without the package bash-completion.
func TestBashCompletes(t *testing.T) {
	bash := outside(t, "bash")
	dir := t.TempDir()
	if _, err := demo.Write(filepath.Join(dir, "mill")); err != nil {
		t.Fatal(err)
	}
	script := filepath.Join(dir, "script")
	if err := os.WriteFile(script, []byte(printed(t, "completion", "bash")), 0o644); err != nil {
		t.Fatal(err)
	}
	const project = "mill/project.yaml"
	for _, x := range []struct {
		words []string // glued where glue says so
		glue  string
		want  []string
	}{
		{[]string{"ra"}, "", []string{"rate"}},
		{[]string{"rate", "mi"}, "", []string{"mill"}},
		{[]string{"rate", "mill/"}, "", []string{project, "mill/spectra"}},
		{[]string{"rate", project, "--makeup", "T"}, "", []string{"T1"}},
		{[]string{"rate", project, "--makeup", "=", "T"}, "=", []string{"T1"}},
		{[]string{"rate", project, "--makeup", "D1,L"}, "", []string{"D1,L1"}},
		{[]string{"compare", project, "D1", "E1", ":", "cl"}, ":", []string{"clear"}},
		{[]string{"compare", project, "E1", ":"}, ":", []string{"clear", "full", "half"}},
		{[]string{"compare", project, "E1", ":", "full", "T"}, ":", []string{"T1"}},
		{[]string{"rate", "nothing.yaml", "--makeup", ""}, "", []string{""}},
		{[]string{"rate", project, "--basis", "na", "--figures", "u", "@", "w"}, "@", []string{"winter"}},
		{[]string{"rate", project, "--basis", "na", "--figures", "u,temperature", "@", "su"}, "@", []string{"summer"}},
		{[]string{"rate", project, "--basis", "na", "--figures", "hottest_p"}, "", []string{"hottest_pane@winter", "hottest_pane@summer", "hottest_pane@january-night", "hottest_pane@july-afternoon"}},
		{[]string{"rate", project, "--figures", "u", "@", "ja"}, "@", []string{"january-night"}},
		{[]string{"rate", project, "--figures", "θ4", "@"}, "@", []string{"january-night", "july-afternoon"}},
	} {
		line := "panewright"
		for i, w := range x.words {
			if !(x.glue != "" && (w == x.glue || i > 0 && x.words[i-1] == x.glue)) {
				line += " "
			}
			line += w
		}
		args := append([]string{"--norc", "--noprofile", "-c", bashLine, "bash", script, line, "panewright"}, x.words...)
		cmd := exec.Command(bash, args...)
		cmd.Dir = dir
		var remarks bytes.Buffer
		cmd.Stderr = &remarks
		out, err := cmd.Output()
		if err != nil || remarks.Len() > 0 {
			t.Errorf("%s: %v: %s", line, err, remarks.String())
			continue
		}
		var got []string
		for reply := range strings.Lines(string(out)) {
			got = append(got, strings.TrimSpace(strings.Split(reply, "  (")[0]))
		}
		slices.Sort(got)
		slices.Sort(x.want)
		if !slices.Equal(got, x.want) {
			t.Errorf("%s: completed by %q, want %q", line, got, x.want)
		}
	}
}

// The shells read the scripts without complaint. zsh and fish are looked at where they are
// installed.
func TestShellsReadTheScripts(t *testing.T) {
	for _, shell := range shells {
		if script := printed(t, "completion", shell); !strings.Contains(script, "__complete") {
			t.Errorf("the script for %s does not ask the program", shell)
		}
	}
	for _, shell := range []string{"bash", "zsh", "fish"} {
		path, err := exec.LookPath(shell)
		if err != nil {
			continue
		}
		script := filepath.Join(t.TempDir(), "script")
		if err := os.WriteFile(script, []byte(printed(t, "completion", shell)), 0o644); err != nil {
			t.Fatal(err)
		}
		if out, err := exec.Command(path, "-n", script).CombinedOutput(); err != nil || len(out) > 0 {
			t.Errorf("%s: %v: %s", shell, err, out)
		}
	}
}

// Every option that takes a value is completed by something: a row of optionOffers or optionEnds.
func TestOptionsAreCompleted(t *testing.T) {
	for _, c := range documented(newRoot(streams{})) {
		c.Flags().VisitAll(func(f *pflag.Flag) {
			if f.NoOptDefVal != "" {
				return
			}
			_, files := optionEnds[f.Name]
			if !files && optionOffers[f.Name] == nil && optionOffers[c.Name()+" --"+f.Name] == nil {
				t.Errorf("%s --%s has no row in optionOffers or optionEnds", c.Name(), f.Name)
			}
		})
		if _, ok := argumentOffers[c.Name()]; !ok && c.ValidArgsFunction == nil {
			t.Errorf("%s has no row in argumentOffers", c.Name())
		}
	}
}
