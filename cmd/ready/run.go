package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"time"
)

// runSteps runs steps up to the first that fails, says how long each took, and reports whether all passed.
func runSteps(ctx context.Context, out io.Writer, chosen []step) bool {
	var summary strings.Builder
	for _, s := range chosen {
		fmt.Fprintf(out, "== %s: %s\n", s.name, s.does)
		start := time.Now()
		err := s.run(ctx)
		fmt.Fprintf(&summary, "%-12s %7.1f s\n", s.name, time.Since(start).Seconds())
		if err != nil {
			fmt.Fprintf(out, "\n%sNOT READY: %s: %v; run it alone with: go run ./cmd/ready %s\n", summary.String(), s.name, err, alone(s))
			return false
		}
	}
	fmt.Fprintf(out, "\n%s", summary.String())
	if len(chosen) == len(steps) {
		fmt.Fprintln(out, "READY")
	}
	return true
}

// alone is the flag that runs just this step.
func alone(s step) string {
	if s.name == benchmarks.name {
		return "-bench"
	}
	return "-only " + s.name
}

// enterModule makes the folder of go.mod the current one, from wherever in the project this was started.
func enterModule(ctx context.Context) error {
	out, err := command(ctx, "go", "env", "GOMOD").Output()
	if err != nil {
		return fmt.Errorf("go env: %w", err)
	}
	file := strings.TrimSpace(string(out))
	if file == "" || file == os.DevNull {
		return errors.New("this is not inside the project; go to the folder of its go.mod")
	}
	return os.Chdir(filepath.Dir(file))
}

// command prepares a command that is interrupted with ctx, so that it can end what it has started itself, and is killed
// when it does not end.
func command(ctx context.Context, name string, arguments ...string) *exec.Cmd {
	c := exec.CommandContext(ctx, name, arguments...)
	c.Cancel = func() error { return c.Process.Signal(os.Interrupt) }
	c.WaitDelay = 10 * time.Second
	return c
}

// show runs a command with its output shown.
func show(ctx context.Context, name string, arguments ...string) error {
	c := command(ctx, name, arguments...)
	c.Stdout, c.Stderr = os.Stdout, os.Stderr
	return c.Run()
}
