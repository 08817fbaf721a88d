package main

import (
	"bytes"
	"os"
	"strings"
	"testing"
)

// The README shows what the demo really prints.
func TestReadmeShowsTheDemo(t *testing.T) {
	readme, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	t.Chdir(t.TempDir())
	var out, remarks bytes.Buffer
	if code := run([]string{"demo"}, streams{out: &out, err: &remarks}); code != exitDone {
		t.Fatalf("demo exits %d: %s", code, remarks.String())
	}
	for _, block := range strings.Split(strings.ReplaceAll(string(readme), "\r\n", "\n"), "```\n") {
		if strings.HasPrefix(block, "Heron Mill") {
			if !strings.HasPrefix(out.String(), block) {
				t.Errorf("README shows\n%s\nthe demo prints\n%s", block, out.String()[:min(len(block), out.Len())])
			}
			return
		}
	}
	t.Error("README does not show the demo's output")
}
