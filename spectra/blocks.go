package spectra

// Which spectrum of a JCAMP-DX file is meant: the one of a quantity, or one that is named behind the
// file, FILE#N or FILE#TITLE.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// BlockSign stands between the name of a file and the number or title of a spectrum in it.
const BlockSign = "#"

// OneOf returns the one spectrum of a file that has a quantity ("": any), or that of them which is
// named by its number, from 1 among all spectra of the file, or by its title. An error is Errors; it
// says what may be written.
func OneOf(blocks []Block, q Quantity, file, which string) (Block, error) {
	fail := func(format string, args ...any) (Block, error) {
		return Block{}, Errors{{File: file, Text: fmt.Sprintf(format, args...)}}
	}
	of := ""
	if q != "" {
		of = " of " + string(q)
	}
	var fit, others []int // places in blocks
	for i, b := range blocks {
		if q == "" || b.Quantity == q {
			fit = append(fit, i)
		} else {
			others = append(others, i)
		}
	}
	all := slices.Sorted(slices.Values(slices.Concat(fit, others)))
	if n, err := strconv.Atoi(which); err == nil && n >= 1 && isDigits(which) {
		switch {
		case n > len(blocks):
			return fail("has no spectrum number %d, but: %s", n, names(blocks, all, file))
		case !slices.Contains(fit, n-1):
			return fail("number %d is a spectrum of %s, and one%s is needed: %s", n, blocks[n-1].Quantity, of, names(blocks, all, file))
		}
		return blocks[n-1], nil
	}
	if which != "" {
		named := slices.DeleteFunc(slices.Clone(fit), func(i int) bool { return !strings.EqualFold(title(blocks[i]), which) })
		if len(named) == 0 {
			return fail("holds no spectrum%s titled %q, but: %s", of, clip(which), names(blocks, all, file))
		}
		fit = named
	}
	switch {
	case len(fit) == 1:
		return blocks[fit[0]], nil
	case len(fit) > 1:
		return fail("holds several spectra%s; write which: %s", of, names(blocks, fit, file))
	}
	return fail("holds no spectrum%s, but: %s", of, names(blocks, all, file))
}

// names lists some of the spectra of a file as they may be written.
func names(blocks []Block, some []int, file string) string {
	const listed = 6
	var list []string
	for k, i := range some {
		if k == listed {
			list = append(list, "and others")
			break
		}
		list = append(list, fmt.Sprintf("%s (%s, %q)", BlockName(file, i+1), blocks[i].Quantity, clip(title(blocks[i]))))
	}
	return strings.Join(list, "; ")
}

// BlockName names a spectrum of a file by its number, from 1.
func BlockName(file string, number int) string { return file + BlockSign + strconv.Itoa(number) }

// title returns that of a spectrum, or a word where it has none.
func title(b Block) string {
	if b.Title == "" {
		return "untitled"
	}
	return b.Title
}
