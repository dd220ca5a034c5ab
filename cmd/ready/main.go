// Command ready says whether the project is ready to be submitted: it brings what the tests need, and then runs every
// check and every test. It is the one test command; a step that fails ends it.
package main

import (
	"context"
	"flag"
	"fmt"
	"os"
	"os/exec"
	"os/signal"
	"time"
)

// step is one check. Its name is what -only takes.
type step struct {
	name string
	does string
	run  func(context.Context) error
}

// steps are all checks in the order in which they run: what is quick and often wrong comes first.
func steps() []step {
	return []step{
		{"format", "Go files are formatted", checkFormat},
		{"vet", "go vet finds nothing", checkVet},
		{"generated", "generated templates are up to date", checkGenerated},
		{"staticcheck", "staticcheck finds nothing", checkStatic},
		{"test", "all tests but those of the browser pass, and none is skipped", runTests},
		{"browser", "all tests in Chromium pass, and none is skipped", runBrowserTests},
	}
}

func main() {
	only := flag.String("only", "", "run just the step of this name")
	bench := flag.Bool("bench", false, "run the benchmarks instead")
	flag.Parse()
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if *bench {
		os.Exit(report([]step{{"bench", "benchmarks", runBenchmarks}}, ctx))
	}
	chosen := steps()
	if *only != "" {
		chosen = nil
		for _, s := range steps() {
			if s.name == *only {
				chosen = append(chosen, s)
			}
		}
		if chosen == nil {
			fmt.Fprintf(os.Stderr, "ready: there is no step %q\n", *only)
			os.Exit(2)
		}
	}
	code := report(chosen, ctx)
	stop()
	os.Exit(code)
}

// report runs steps up to the first that fails, and says how long each took.
func report(chosen []step, ctx context.Context) int {
	type taken struct {
		name string
		time time.Duration
	}
	var times []taken
	for _, s := range chosen {
		fmt.Printf("== %s: %s\n", s.name, s.does)
		start := time.Now()
		err := s.run(ctx)
		times = append(times, taken{s.name, time.Since(start)})
		if err != nil {
			fmt.Printf("\nNOT READY: %s: %v\nRun it alone with: go run ./cmd/ready -only %s\n", s.name, err, s.name)
			return 1
		}
	}
	fmt.Println()
	for _, t := range times {
		fmt.Printf("%-12s %7.1f s\n", t.name, t.time.Seconds())
	}
	fmt.Println("READY")
	return 0
}

// run runs a command with its output shown.
func run(ctx context.Context, name string, arguments ...string) error {
	command := exec.CommandContext(ctx, name, arguments...)
	command.Stdout, command.Stderr = os.Stdout, os.Stderr
	return command.Run()
}
