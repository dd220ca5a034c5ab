package main

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"slices"
	"strings"
)

// Packages whose tests are run by steps of their own.
const (
	houseTests   = module + "cmd/ready"   // they ask go and git, whose answers the test cache does not see
	browserTests = module + "web/browser" // they need Chromium
)

// module is what the import path of every package begins with.
const module = "loopwright/"

// testTime bounds each package's tests, so that a test that hangs ends with a trace.
const testTime = "-timeout=20m"

// together is how many packages are built and tested at the same time: a race detector for each of many processors
// would need more memory than small machines have.
const together = "-p=2"

func runHouseTests(ctx context.Context) error {
	return goTest(ctx, nil, "-count=1", testTime, houseTests)
}

func runTests(ctx context.Context) error {
	packages, err := packagesBut(ctx, houseTests, browserTests)
	if err != nil {
		return err
	}
	arguments := []string{testTime, together}
	if err := raceDetector(ctx); err != nil {
		fmt.Println("without the race detector:", err)
	} else {
		arguments = append(arguments, "-race")
	}
	return goTest(ctx, nil, append(arguments, packages...)...)
}

func runBrowserTests(ctx context.Context) error {
	if err := bringChromium(ctx); err != nil {
		return err
	}
	return goTest(ctx, []string{"LOOPWRIGHT_BROWSER=required"}, "-count=1", testTime, browserTests)
}

func runBenchmarks(ctx context.Context) error {
	packages, err := packagesBut(ctx, browserTests)
	if err != nil {
		return err
	}
	return show(ctx, "go", append([]string{"test", "-run=^$", "-bench=.", "-benchmem", testTime}, packages...)...)
}

// packagesBut lists the packages of the project but those.
func packagesBut(ctx context.Context, left ...string) ([]string, error) {
	list := command(ctx, "go", "list", "./...")
	list.Stderr = os.Stderr
	out, err := list.Output()
	if err != nil {
		return nil, fmt.Errorf("go list: %w", err)
	}
	return slices.DeleteFunc(strings.Fields(string(out)), func(name string) bool { return slices.Contains(left, name) }), nil
}

// raceDetector says why the race detector cannot be had, if so. It needs cgo with a C compiler and its headers, on a
// platform that has it; building the package that holds cgo together asks for all of that.
func raceDetector(ctx context.Context) error {
	out, err := command(ctx, "go", "build", "-race", "runtime/cgo").CombinedOutput()
	if err == nil {
		return nil
	}
	lines := strings.Split(strings.TrimSpace(string(out)), "\n")
	return errors.New(lines[len(lines)-1])
}

// goTest runs go test and prints what it says of packages and of tests that fail. A skipped test is a failure: whatever
// the tests need should be there by now.
func goTest(ctx context.Context, environment []string, arguments ...string) error {
	c := command(ctx, "go", append([]string{"test", "-json"}, arguments...)...)
	c.Env = append(os.Environ(), environment...)
	c.Stderr = os.Stderr
	said, err := c.StdoutPipe()
	if err != nil {
		return err
	}
	if err := c.Start(); err != nil {
		return err
	}
	results := newResults()
	readErr := results.readAll(bufio.NewReader(said), os.Stdout)
	if err := c.Wait(); err != nil && len(results.failed) == 0 {
		return fmt.Errorf("go test: %w", err)
	}
	if readErr != nil {
		return fmt.Errorf("reading what go test says: %w", readErr)
	}
	if err := results.verdict(); err != nil {
		return err
	}
	fmt.Printf("%d tests passed\n", results.ran)
	return nil
}

// readAll takes every line, however long, and prints what is to be printed of it.
func (r *results) readAll(lines *bufio.Reader, out io.Writer) error {
	for {
		line, err := lines.ReadBytes('\n')
		if len(line) > 0 {
			if _, err := io.WriteString(out, r.take(line)); err != nil {
				return err
			}
		}
		if errors.Is(err, io.EOF) {
			return nil
		}
		if err != nil {
			return err
		}
	}
}
