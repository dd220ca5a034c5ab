package main

import (
	"bufio"
	"context"
	"fmt"
	"os"
	"os/exec"
	"strings"
)

// browserTests is the package whose tests need Chromium.
const browserTests = "loopwright/web/browser"

// testTime bounds each package's tests, so that a test that hangs ends with a trace.
const testTime = "-timeout=20m"

func runTests(ctx context.Context) error {
	out, err := exec.CommandContext(ctx, "go", "list", "./...").Output()
	if err != nil {
		return fmt.Errorf("go list: %w", err)
	}
	arguments := []string{"test", "-json", testTime}
	if hasCompiler(ctx) {
		arguments = append(arguments, "-race")
	} else {
		fmt.Println("no C compiler was found: the race detector is left out")
	}
	for name := range strings.FieldsSeq(string(out)) {
		if name != browserTests {
			arguments = append(arguments, name)
		}
	}
	return goTest(ctx, nil, arguments...)
}

func runBrowserTests(ctx context.Context) error {
	if err := bringChromium(ctx); err != nil {
		return err
	}
	return goTest(ctx, []string{"LOOPWRIGHT_BROWSER=required"}, "test", "-json", "-count=1", testTime, browserTests)
}

func runBenchmarks(ctx context.Context) error {
	return run(ctx, "go", "test", "-run=^$", "-bench=.", "-benchmem", "./...")
}

// hasCompiler reports whether cgo, which the race detector needs, has its C compiler.
func hasCompiler(ctx context.Context) bool {
	out, err := exec.CommandContext(ctx, "go", "env", "CC").Output()
	if err != nil {
		return false
	}
	fields := strings.Fields(string(out))
	if len(fields) == 0 {
		return false
	}
	_, err = exec.LookPath(fields[0])
	return err == nil
}

// goTest runs go test and prints what it says, in full for packages that fail. A skipped test is a failure: whatever the
// tests need should be there by now.
func goTest(ctx context.Context, environment []string, arguments ...string) error {
	command := exec.CommandContext(ctx, "go", arguments...)
	command.Env = append(os.Environ(), environment...)
	command.Stderr = os.Stderr
	out, err := command.StdoutPipe()
	if err != nil {
		return err
	}
	if err := command.Start(); err != nil {
		return err
	}
	results := newResults()
	lines := bufio.NewScanner(out)
	lines.Buffer(nil, 16<<20)
	for lines.Scan() {
		if said := results.take(lines.Bytes()); said != "" {
			fmt.Print(said)
		}
	}
	if err := command.Wait(); err != nil {
		return fmt.Errorf("%d of %d tests failed: %s", len(results.failed), results.ran, strings.Join(results.failed, ", "))
	}
	if len(results.skipped) > 0 {
		return fmt.Errorf("tests were skipped: %s", strings.Join(results.skipped, ", "))
	}
	if results.ran == 0 {
		return fmt.Errorf("no test ran")
	}
	fmt.Printf("%d tests passed\n", results.ran)
	return nil
}
