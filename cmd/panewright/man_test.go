//go:build man

package main

import (
	"bytes"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// macros are the requests that a page may hold; any other line that begins like one is a slip.
var macros = regexp.MustCompile(`^\.(nh|TH|SH|PP|TP|EX|EE)( |$)`)

// Each command has a page with its options and examples, the same bytes every time.
func TestManPages(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "share", "man1")
	write := func(dir string) int {
		var out, remarks bytes.Buffer
		return run([]string{"man", dir}, streams{out: &out, err: &remarks})
	}
	if code := write(dir); code != exitDone {
		t.Fatalf("man exits %d", code)
	}
	pages := map[string][]byte{}
	for _, c := range documented(newRoot(streams{})) {
		if c.Name() == "man" {
			continue
		}
		file := strings.ReplaceAll(c.CommandPath(), " ", "-") + ".1"
		page, err := os.ReadFile(filepath.Join(dir, file))
		if err != nil {
			t.Error(err)
			continue
		}
		pages[file] = page
		text := string(page)
		for _, section := range []string{"NAME", "SYNOPSIS", "DESCRIPTION", "OPTIONS", "EXAMPLE"} {
			if !strings.Contains(text, "\n.SH "+section+"\n") {
				t.Errorf("%s has no section %s", file, section)
			}
		}
		for line := range strings.Lines(c.Example) {
			if !strings.Contains(text, strings.ReplaceAll(strings.TrimRight(line, "\n"), `\`, `\\`)+"\n") {
				t.Errorf("%s lacks the example %s", file, line)
			}
		}
		for line := range strings.Lines(text) {
			if strings.HasPrefix(line, "'") || strings.HasPrefix(line, ".") && !macros.MatchString(strings.TrimSpace(line)) {
				t.Errorf("%s: a line is taken for a request: %s", file, line)
			}
		}
	}
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	if len(entries) != len(pages) {
		t.Errorf("%d files for %d commands", len(entries), len(pages))
	}
	if code := write(dir); code != exitDone {
		t.Errorf("man over its own pages exits %d", code)
	}
	for file, page := range pages {
		if again, err := os.ReadFile(filepath.Join(dir, file)); err != nil || !bytes.Equal(page, again) {
			t.Errorf("%s differs the second time", file)
		}
	}
}

// A file that is no page of ours is left alone, and nothing is written beside it.
func TestManLeavesOthersAlone(t *testing.T) {
	dir := t.TempDir()
	mine := filepath.Join(dir, "panewright-rate.1")
	if err := os.WriteFile(mine, []byte("mine\n"), 0o644); err != nil {
		t.Fatal(err)
	}
	var out, remarks bytes.Buffer
	code := run([]string{"man", dir}, streams{out: &out, err: &remarks})
	if code != exitUsage || !strings.Contains(remarks.String(), "no page of Panewright") {
		t.Errorf("man exits %d: %s", code, remarks.String())
	}
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	if have, err := os.ReadFile(mine); err != nil || string(have) != "mine\n" || len(entries) != 1 {
		t.Errorf("the folder holds %d files; the one that was there reads %q", len(entries), have)
	}
}
