package main

import (
	"bytes"
	"errors"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"panewright/reference/checks"
)

// A missed check exits 1 and is named; all rows are printed all the same, also into a file.
func TestVerifyMissed(t *testing.T) {
	groups := checks.Groups()
	for i := range groups {
		groups[i].Checks = slices.Clone(groups[i].Checks)
		groups[i].Checks[0].Want += 2 * max(groups[i].Checks[0].Tolerance, 0.1)
	}
	file := filepath.Join(t.TempDir(), "checks.csv")
	for _, p := range []page{{units: "si", formats: []string{"table"}}, {units: "si", formats: []string{"csv"}, output: file}} {
		var out bytes.Buffer
		err := verify(streams{out: &out}, p, "", groups)
		if exitOf(err) != exitFailed {
			t.Fatalf("error %v exits %d, want %d", err, exitOf(err), exitFailed)
		}
		missed, ok := errors.AsType[*missedError](err)
		if !ok || len(missed.ids) != len(groups) || missed.of != len(checks.All()) {
			t.Fatalf("error %v, want one that names %d checks", err, len(groups))
		}
		if want := missed.ids[0] + ", " + missed.ids[1]; !strings.Contains(err.Error(), want) || !strings.Contains(err.Error(), " more;") {
			t.Errorf("the error is %q, want %q and how many more in it", err, want)
		}
		text := out.String()
		if p.output != "" {
			content, err := os.ReadFile(file)
			if err != nil || text != "" {
				t.Fatalf("%v; on standard output stands %q", err, text)
			}
			text = string(content)
		}
		for _, c := range checks.All() {
			if !strings.Contains(text, c.ID) {
				t.Errorf("%s is not printed", c.ID)
			}
		}
		if n := strings.Count(text, "missed"); n < len(groups) {
			t.Errorf("missed stands %d times, want %d at least", n, len(groups))
		}
	}
}

// All checks together take well below a second.
func TestVerifyIsQuick(t *testing.T) {
	if testing.Short() {
		t.Skip("times")
	}
	start := time.Now()
	printed(t, "verify")
	if took := time.Since(start); took > 5*time.Second { // ten times what a slow machine needs
		t.Errorf("verify took %v", took)
	}
}

// --only keeps groups by their title and checks by their id, in any case of letters.
func TestVerifyOnly(t *testing.T) {
	all := checks.Groups()
	for _, tt := range []struct {
		text           string
		groups, checks int
	}{
		{"", len(all), len(checks.All())},
		{"en ISO 10077-1", 1, 59},
		{"FL8", 1, 4},
		{"Single-07-", 1, 13},
		{"cie142", 1, 34},
	} {
		got, err := containing(all, tt.text)
		if err != nil {
			t.Errorf("%q: %v", tt.text, err)
			continue
		}
		n := 0
		for _, g := range got {
			n += len(g.Checks)
		}
		if len(got) != tt.groups || n != tt.checks {
			t.Errorf("%q: %d groups with %d checks, want %d with %d", tt.text, len(got), n, tt.groups, tt.checks)
		}
	}
	if _, err := containing(all, "en637"); err == nil || !strings.Contains(err.Error(), "did you mean en673") || exitOf(err) != exitUsage {
		t.Errorf("error %v", err)
	}
}
