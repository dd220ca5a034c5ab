package main

import (
	"encoding/json"
	"errors"
	"maps"
	"slices"
	"strings"
)

// event is a line of go test -json.
type event struct {
	Action  string
	Package string
	Test    string
	Output  string
}

// results folds the events of go test into what a person wants to read.
type results struct {
	ran     int                 // tests that ended, examples and subtests among them
	failed  []string            // tests, and packages that failed otherwise
	skipped []string            // tests
	output  map[source][]string // what each test, and each package by itself, has said and not been asked for so far
}

// source is a test, or a package by itself when Test is empty.
type source struct{ Package, Test string }

func newResults() *results { return &results{output: map[source][]string{}} }

// take takes one line and gives what is to be printed of it: what a test said when it fails or is skipped, and at the end
// of a package go test's own closing line, or all that the package said when it failed. Lines that are no events are
// printed as they are.
func (r *results) take(line []byte) string {
	var e event
	if json.Unmarshal(line, &e) != nil {
		return strings.TrimSuffix(string(line), "\n") + "\n"
	}
	from := source{e.Package, e.Test}
	switch e.Action {
	case "output":
		r.output[from] = append(r.output[from], e.Output)
		return ""
	case "build-output":
		return e.Output
	case "pass", "skip", "fail":
		said := r.output[from]
		delete(r.output, from)
		if e.Test == "" {
			return r.packageEnded(e, said)
		}
		return r.testEnded(e, said)
	}
	return ""
}

// testEnded counts a test, and gives what it said if that is of interest.
func (r *results) testEnded(e event, said []string) string {
	name := e.Package + "." + e.Test
	switch e.Action {
	case "skip":
		r.skipped = append(r.skipped, name)
		return strings.Join(said, "")
	case "fail":
		r.ran++
		r.failed = append(r.failed, name)
		return strings.Join(said, "")
	}
	r.ran++
	return ""
}

// packageEnded gives go test's closing line of a package. Of a package that failed it gives everything, and what the
// tests said that had not ended: that is where the trace of a test that hangs or ends the program is found. Such a
// package is a failure by itself if none of its tests is one.
func (r *results) packageEnded(e event, said []string) string {
	if e.Action != "fail" {
		return closingLine(said)
	}
	inside := func(name string) bool { return strings.HasPrefix(name, e.Package+".") }
	unfinished := r.unfinished(e.Package)
	switch {
	case len(unfinished) > 0:
		r.failed = append(r.failed, e.Package+" (a test did not end)")
	case !slices.ContainsFunc(r.failed, inside):
		r.failed = append(r.failed, e.Package)
	}
	return strings.Join(append(unfinished, said...), "")
}

// unfinished takes out what tests of a package said that have not ended, test by test. Tests that were only waiting for
// their turn said nothing.
func (r *results) unfinished(pkg string) []string {
	var all []string
	waiting := func(line string) bool { return strings.HasPrefix(line, "=== ") }
	for _, from := range slices.SortedFunc(maps.Keys(r.output), func(a, b source) int { return strings.Compare(a.Test, b.Test) }) {
		if from.Package != pkg || from.Test == "" {
			continue
		}
		if said := r.output[from]; slices.ContainsFunc(said, func(line string) bool { return !waiting(line) }) {
			all = append(all, said...)
		}
		delete(r.output, from)
	}
	return all
}

// verdict says in one line what is wrong, if anything is.
func (r *results) verdict() error {
	switch {
	case len(r.failed) > 0:
		return errors.New("failed: " + strings.Join(r.failed, ", "))
	case len(r.skipped) > 0:
		return errors.New("skipped: " + strings.Join(r.skipped, ", "))
	case r.ran == 0:
		return errors.New("no test ran")
	}
	return nil
}

// closingLine is the line with which go test ends a package.
func closingLine(output []string) string {
	for _, line := range slices.Backward(output) {
		if strings.HasPrefix(line, "ok ") || strings.HasPrefix(line, "?  ") || strings.Contains(line, "[no test files]") {
			return line
		}
	}
	return ""
}
