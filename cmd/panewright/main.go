// Panewright rates glazing make-ups from the spectra of their panes. See README.md.
package main

import (
	"os"
)

func main() {
	os.Exit(run(os.Args[1:], streams{out: os.Stdout, err: os.Stderr}))
}
