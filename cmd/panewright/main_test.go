package main

import (
	"encoding/json"
	"errors"
	"os/exec"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"

	"panewright/cmd/panewright/internal/demo"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"panewright": main})
}

// Each script is one behaviour of the command line, as a user types it.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{Dir: "testdata/script", Setup: func(e *testscript.Env) error {
		_, err := demo.Write(filepath.Join(e.WorkDir, "mill"))
		return err
	}, Cmds: map[string]func(ts *testscript.TestScript, neg bool, args []string){
		"exits":   exits,
		"narrow":  narrow,
		"figures": figuresEqual,
	}})
}

// exits runs the program and asserts its exit code, which testscript itself only logs:
// exits 2 rate nothing.yaml
func exits(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 1 {
		ts.Fatalf("usage: exits CODE ARGUMENT…")
	}
	code := 0
	if err := ts.Exec("panewright", args[1:]...); err != nil {
		exit, ok := errors.AsType[*exec.ExitError](err)
		if !ok {
			ts.Fatalf("%v", err)
		}
		code = exit.ExitCode()
	}
	out, remarks := ts.ReadFile("stdout"), ts.ReadFile("stderr")
	if got := strconv.Itoa(code); got != args[0] {
		ts.Fatalf("panewright %s exits %s, want %s\n%s", strings.Join(args[1:], " "), got, args[0], remarks)
	}
	if code != 0 && code != exitNotMet && out != "" {
		ts.Fatalf("panewright %s fails and yet prints\n%s", strings.Join(args[1:], " "), out)
	}
	for _, bad := range []string{"goroutine ", "panic:", ".go:"} {
		if strings.Contains(remarks, bad) {
			ts.Fatalf("panewright %s prints %q", strings.Join(args[1:], " "), remarks)
		}
	}
}

// narrow asserts that no line of a file is wider than 80 columns: narrow stdout
func narrow(ts *testscript.TestScript, _ bool, args []string) {
	for i, line := range strings.Split(ts.ReadFile(args[0]), "\n") {
		if n := len([]rune(line)); n > 80 {
			ts.Fatalf("line %d is %d columns wide: %s", i+1, n, line)
		}
	}
}

// figuresEqual asserts that the ratings of the first JSON file are those of the others together,
// to the letter: figures all.json one.json another.json
func figuresEqual(ts *testscript.TestScript, _ bool, args []string) {
	ratings := func(name string) (list []string) {
		var doc struct {
			Ratings []json.RawMessage `json:"ratings"`
		}
		ts.Check(json.Unmarshal([]byte(ts.ReadFile(name)), &doc))
		for _, r := range doc.Ratings {
			list = append(list, string(r))
		}
		return list
	}
	var parts []string
	for _, name := range args[1:] {
		parts = append(parts, ratings(name)...)
	}
	if all := ratings(args[0]); !slices.Equal(all, parts) {
		ts.Fatalf("%s does not hold the ratings of %v", args[0], args[1:])
	}
}
