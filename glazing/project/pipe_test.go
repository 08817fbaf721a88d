//go:build unix

package project

import (
	"errors"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

// A pipe is refused without waiting for someone to write into it.
func TestPipe(t *testing.T) {
	dir := t.TempDir()
	path := write(t, dir, change(t, "spectrum: b.csv", "spectrum: pipe.csv"), hallFiles())
	pipe := filepath.Join(dir, "pipe.csv")
	if err := syscall.Mkfifo(pipe, 0o644); err != nil {
		t.Skipf("no pipes here: %v", err)
	}
	for _, a := range []Access{{}, {Anywhere: true}} {
		_, err := Load(path, a)
		if p, ok := errors.AsType[*Problem](err); !ok || p.Key != "spectrum" || !strings.Contains(p.Text, "pipe.csv: is not a regular file") {
			t.Errorf("%+v: %v", a, err)
		}
	}
	_, err := Load(pipe, Access{})
	if p, ok := errors.AsType[*Problem](err); !ok || p.File != pipe || p.Text != "is not a regular file" {
		t.Errorf("%v", err)
	}
}
