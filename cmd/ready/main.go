// Command ready says whether the project is ready to be submitted: it brings what the tests need, and then runs every
// check and every test. It is the one test command; the first step that fails ends it.
package main

import (
	"context"
	"flag"
	"fmt"
	"os"
	"os/signal"
	"slices"
	"strings"
)

// step is one check.
type step struct {
	name string // what -only takes
	does string // what holds when it passes
	run  func(context.Context) error
}

// steps are all checks in the order in which they run: what is quick and often wrong comes first.
var steps = []step{
	{"chromium", "Chromium is there for the tests of the page", bringChromium},
	{"format", "Go files are formatted", checkFormat},
	{"vet", "go vet finds nothing", checkVet},
	{"generated", "generated templates are up to date", checkGenerated},
	{"staticcheck", "staticcheck finds nothing", checkStatic},
	{"house", "imports point down, and the top level holds what was agreed", runHouseTests},
	{"test", "all tests but those of the browser pass, and none is skipped", runTests},
	{"browser", "all tests in Chromium pass, and none is skipped", runBrowserTests},
}

// benchmarks is the step of -bench.
var benchmarks = step{"bench", "every benchmark, once", runBenchmarks}

func main() {
	only := flag.String("only", "", "run just the step of this `name`: "+names(steps))
	bench := flag.Bool("bench", false, "run the benchmarks instead")
	flag.Parse()
	chosen, err := choose(*only, *bench)
	if err != nil {
		fmt.Fprintln(os.Stderr, "ready:", err)
		os.Exit(2)
	}
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := enterModule(ctx); err != nil {
		fmt.Fprintln(os.Stderr, "ready:", err)
		os.Exit(2)
	}
	if !runSteps(ctx, os.Stdout, chosen) {
		stop()
		os.Exit(1)
	}
}

// choose gives the steps that the flags ask for.
func choose(only string, bench bool) ([]step, error) {
	switch {
	case bench && only != "":
		return nil, fmt.Errorf("-bench runs no step; leave out -only %s", only)
	case bench:
		return []step{benchmarks}, nil
	case only == "":
		return steps, nil
	}
	at := slices.IndexFunc(steps, func(s step) bool { return s.name == only })
	if at < 0 {
		return nil, fmt.Errorf("there is no step %q; there are %s", only, names(steps))
	}
	return steps[at : at+1], nil
}

func names(all []step) string {
	var list []string
	for _, s := range all {
		list = append(list, s.name)
	}
	return strings.Join(list, ", ")
}
