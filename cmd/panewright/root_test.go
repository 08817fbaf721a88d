package main

import (
	"errors"
	"io/fs"
	"os"
	"syscall"
	"testing"
)

// What an error of the file system says of its cause stays; the temporary name under which a file
// is written, and the call, do not show.
func TestCause(t *testing.T) {
	for _, err := range []error{
		&fs.PathError{Op: "open", Path: "/folder/.panewright-123", Err: syscall.EACCES},
		&os.LinkError{Op: "rename", Old: "/folder/.panewright-123", New: "/folder/x", Err: syscall.EACCES},
		syscall.EACCES,
	} {
		if got := (&outputError{"x.csv", cause(err)}).Error(); got != "cannot write x.csv: permission denied" {
			t.Errorf("%v is reported as %q", err, got)
		}
	}
	if err := errors.New("is a folder"); cause(err) != err {
		t.Error("an error of our own is not itself")
	}
}

func TestCheckEnding(t *testing.T) {
	rate := []string{"table", "json", "csv", "xlsx", "markdown"}
	for _, tt := range []struct {
		output, as string
		formats    []string
		want       string // what the error says, "" for none
	}{
		{"", "", rate, ""}, {"plain", "", rate, ""}, {"a.txt", "", rate, ""}, {"a.dat", "csv", rate, ""}, {"v1.2", "", rate, ""},
		{"a.json", "", rate, ""}, {"a.CSV", "", rate, ""}, {"a.md", "markdown", rate, ""}, {"folder.xls/a", "", rate, ""},
		{"a.xls", "", rate, "-o a.xls: rate writes no .xls; it writes .txt, .json, .csv, .xlsx, .md"},
		{"a.XLS", "table", rate, "-o a.XLS is not the name of what --as table writes; end it in .txt"},
		{"a.xls", "xlsx", rate, "-o a.xls is not the name of what --as xlsx writes; end it in .xlsx"},
		{"a.md", "json", rate, "-o a.md is not the name of what --as json writes; end it in .json, or write --as markdown"},
		{"a.xlsx", "", []string{"table"}, "-o a.xlsx: rate writes no .xlsx; it writes .txt"},
		{"a.pdf", "", []string{"pdf"}, ""}, {"a.svg", "", []string{"svg"}, ""},
		{"a.svg", "", []string{"pdf"}, "-o a.svg: rate writes no .svg; it writes .pdf"},
	} {
		got := ""
		if err := checkEnding("rate", tt.output, tt.as, tt.formats); err != nil {
			got = err.Error()
		}
		if got != tt.want {
			t.Errorf("-o %s --as %s: %q, want %q", tt.output, tt.as, got, tt.want)
		}
	}
}
