//go:build !man

package main

// The program without its generator of man pages; see man.go.

import "github.com/spf13/cobra"

func generators(streams) []*cobra.Command { return nil }
