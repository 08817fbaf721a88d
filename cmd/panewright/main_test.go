package main

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
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
	var out, err bytes.Buffer
	was, werr := os.Getwd()
	ts.Check(werr)
	ts.Check(os.Chdir(ts.Getenv("WORK")))
	defer func() { ts.Check(os.Chdir(was)) }()
	code := run(args[1:], streams{out: &out, err: &err})
	if got := string(rune('0' + code)); got != args[0] {
		ts.Fatalf("panewright %s exits %s, want %s\n%s", strings.Join(args[1:], " "), got, args[0], err.String())
	}
	if code != 0 && out.Len() > 0 {
		ts.Fatalf("panewright %s fails and yet prints\n%s", strings.Join(args[1:], " "), out.String())
	}
	for _, bad := range []string{"goroutine ", "panic:", ".go:"} {
		if strings.Contains(err.String(), bad) {
			ts.Fatalf("panewright %s prints %q", strings.Join(args[1:], " "), err.String())
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

// figuresEqual asserts that two JSON files hold the same ratings: figures a.json b.json
func figuresEqual(ts *testscript.TestScript, _ bool, args []string) {
	var parts []string
	for _, name := range args {
		var doc struct {
			Ratings json.RawMessage `json:"ratings"`
		}
		ts.Check(json.Unmarshal([]byte(ts.ReadFile(name)), &doc))
		parts = append(parts, string(doc.Ratings))
	}
	if parts[0] != parts[1] {
		ts.Fatalf("%s and %s hold different ratings", args[0], args[1])
	}
}
