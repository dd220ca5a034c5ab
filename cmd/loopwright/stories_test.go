package main

import (
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

// TestMain lets the stories call the program by its name.
func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"loopwright": main})
}

func TestStories(t *testing.T) {
	testscript.Run(t, testscript.Params{Dir: "testdata/stories", RequireExplicitExec: true, RequireUniqueNames: true})
}
