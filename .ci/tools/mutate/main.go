// Command mutate changes one number of the program at a time by 1 % and lists those changes that
// no test notices. It changes nothing on disk: each change is an overlay of the Go command.
//
//	go -C .ci/tools run ./mutate [-cells N] [-only SUBSTRING] ROOT
//
// Numbers are the literals of the Go files that calculate, and the cells of the embedded tables;
// of a large table only N cells a column, evenly spread, are tried.
package main

import (
	"encoding/json"
	"flag"
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"log"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"sync"
)

// A mutant is one changed number.
type mutant struct {
	file     string // from the root
	line     int
	from, to string
	content  []byte
}

// calculating are the folders whose literals are tried.
var calculating = []string{"thermal", "spectra", "spectra/colour", "glazing", "glazing/optics", "glazing/film", "glazing/library", "glazing/project"}

// ignored are files whose numbers move no figure.
var ignored = []string{"glazing/project/errors.go", "glazing/project/schema.go", "glazing/project/files.go", "glazing/project/read.go",
	"glazing/library/invented.go"}

func main() {
	cells := flag.Int("cells", 4, "cells tried in each column of a table")
	only := flag.String("only", "", "try only files whose name contains this")
	flag.Parse()
	log.SetFlags(0)
	if flag.NArg() != 1 {
		log.Fatal("usage: mutate [-cells N] [-only SUBSTRING] ROOT")
	}
	root, err := filepath.Abs(flag.Arg(0))
	if err != nil {
		log.Fatal(err)
	}
	var mutants []mutant
	for _, dir := range calculating {
		files, _ := filepath.Glob(filepath.Join(root, dir, "*.go"))
		for _, f := range files {
			name, _ := filepath.Rel(root, f)
			if !strings.HasSuffix(f, "_test.go") && !slices.Contains(ignored, name) && strings.Contains(name, *only) {
				mutants = append(mutants, literals(root, name)...)
			}
		}
	}
	tables, _ := filepath.Glob(filepath.Join(root, "reference/tables/*.csv"))
	for _, f := range tables {
		if name, _ := filepath.Rel(root, f); strings.Contains(name, *only) {
			mutants = append(mutants, cellsOf(root, name, *cells)...)
		}
	}
	fmt.Printf("%d numbers\n", len(mutants))
	var wait sync.WaitGroup
	var lock sync.Mutex
	queue := make(chan mutant)
	survivors, uncompiled := 0, 0
	for range 2 {
		wait.Go(func() {
			for m := range queue {
				noticed, compiled := try(root, m)
				lock.Lock()
				if !compiled {
					uncompiled++
				} else if !noticed {
					survivors++
					fmt.Printf("%s:%d: %s -> %s\n", m.file, m.line, m.from, m.to)
				}
				lock.Unlock()
			}
		})
	}
	for _, m := range mutants {
		queue <- m
	}
	close(queue)
	wait.Wait()
	fmt.Printf("%d survive, %d do not compile, %d noticed\n", survivors, uncompiled, len(mutants)-survivors-uncompiled)
}

// literals returns a mutant for each number in a Go file.
func literals(root, name string) (list []mutant) {
	content, err := os.ReadFile(filepath.Join(root, name))
	if err != nil {
		log.Fatal(err)
	}
	set := token.NewFileSet()
	file, err := parser.ParseFile(set, name, content, 0)
	if err != nil {
		log.Fatal(err)
	}
	ast.Inspect(file, func(n ast.Node) bool {
		lit, ok := n.(*ast.BasicLit)
		if !ok || (lit.Kind != token.FLOAT && lit.Kind != token.INT) {
			return true
		}
		v, err := strconv.ParseFloat(lit.Value, 64)
		if err != nil || v == 0 {
			return true
		}
		at := set.Position(lit.Pos())
		list = append(list, mutant{name, at.Line, lit.Value, changed(v), replaced(content, at.Offset, len(lit.Value), changed(v))})
		return true
	})
	return list
}

// cellsOf returns mutants of n cells of each column of a table.
func cellsOf(root, name string, n int) (list []mutant) {
	content, err := os.ReadFile(filepath.Join(root, name))
	if err != nil {
		log.Fatal(err)
	}
	type cell struct {
		offset, line int
		text         string
	}
	columns := map[int][]cell{}
	offset, head := 0, true
	for i, line := range strings.SplitAfter(string(content), "\n") {
		if !strings.HasPrefix(line, "#") && line != "" {
			if !head {
				at := offset
				for k, text := range strings.Split(strings.TrimSuffix(line, "\n"), ",") {
					if v, err := strconv.ParseFloat(text, 64); err == nil && v != 0 {
						columns[k] = append(columns[k], cell{at, i + 1, text})
					}
					at += len(text) + 1
				}
			}
			head = false
		}
		offset += len(line)
	}
	for k := range len(columns) + 1 {
		list0 := columns[k]
		step := max(1, len(list0)/n)
		for i := step / 2; i < len(list0); i += step {
			c := list0[i]
			v, _ := strconv.ParseFloat(c.text, 64)
			list = append(list, mutant{name, c.line, c.text, changed(v), replaced(content, c.offset, len(c.text), changed(v))})
		}
	}
	return list
}

func changed(v float64) string { return strconv.FormatFloat(v*1.01, 'g', -1, 64) }

func replaced(content []byte, offset, length int, to string) []byte {
	return slices.Concat(content[:offset], []byte(to), content[offset+length:])
}

// try runs the tests with one file replaced.
func try(root string, m mutant) (noticed, compiled bool) {
	dir, err := os.MkdirTemp("", "mutate")
	if err != nil {
		log.Fatal(err)
	}
	defer os.RemoveAll(dir)
	changed := filepath.Join(dir, filepath.Base(m.file))
	overlay, _ := json.Marshal(map[string]any{"Replace": map[string]string{filepath.Join(root, m.file): changed}})
	for path, content := range map[string][]byte{changed: m.content, filepath.Join(dir, "overlay.json"): overlay} {
		if err := os.WriteFile(path, content, 0o644); err != nil {
			log.Fatal(err)
		}
	}
	// The nearest tests first; all only if these notice nothing.
	for _, packages := range [][]string{{"./" + filepath.Dir(m.file)}, {"./reference/...", "./spectra/...", "./thermal/...", "./glazing/...", "./cmd/..."}} {
		if strings.HasPrefix(m.file, "reference/tables") {
			packages[0] = strings.Replace(packages[0], "./reference/tables", "./reference", 1)
		}
		cmd := exec.Command("go", append([]string{"test", "-short", "-vet=off", "-failfast", "-overlay", filepath.Join(dir, "overlay.json")}, packages...)...)
		cmd.Dir = root
		out, err := cmd.CombinedOutput()
		if err != nil {
			return true, !strings.Contains(string(out), "[build failed]")
		}
	}
	return false, true
}
