package main

import (
	"fmt"
	"runtime/debug"
)

type versionCommand struct{}

// Run writes the version that the program was built from.
func (versionCommand) Run(s streams) error {
	version := "development"
	if info, ok := debug.ReadBuildInfo(); ok && info.Main.Version != "" && info.Main.Version != "(devel)" {
		version = info.Main.Version
	}
	fmt.Fprintln(s.out, "loopwright "+version)
	return nil
}
