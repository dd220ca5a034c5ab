package main

import (
	"encoding/json"
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
	ran     int
	failed  []string
	skipped []string
	output  map[string][]string // by package: what its tests have said so far
}

func newResults() *results { return &results{output: map[string][]string{}} }

// take takes one line and gives what is to be printed of it: nothing while a package runs; at its end go test's own
// closing line, and before it the package's whole output when it failed. Lines that are no events are printed as they are.
func (r *results) take(line []byte) string {
	var e event
	if json.Unmarshal(line, &e) != nil {
		return string(line) + "\n"
	}
	if e.Action == "output" || e.Action == "build-output" {
		r.output[e.Package] = append(r.output[e.Package], e.Output)
		if e.Action == "build-output" {
			return e.Output
		}
		return ""
	}
	if e.Test != "" {
		r.count(e)
		return ""
	}
	switch e.Action {
	case "pass", "skip":
		closing := closingLine(r.output[e.Package])
		delete(r.output, e.Package)
		return closing
	case "fail":
		whole := strings.Join(r.output[e.Package], "")
		delete(r.output, e.Package)
		return whole
	}
	return ""
}

func (r *results) count(e event) {
	name := e.Package + "." + e.Test
	switch e.Action {
	case "pass":
		r.ran++
	case "fail":
		r.ran++
		r.failed = append(r.failed, name)
	case "skip":
		r.skipped = append(r.skipped, name)
	}
}

// closingLine is the line with which go test ends a package.
func closingLine(output []string) string {
	for i := len(output) - 1; i >= 0; i-- {
		if strings.HasPrefix(output[i], "ok ") || strings.HasPrefix(output[i], "?  ") || strings.Contains(output[i], "[no test files]") {
			return output[i]
		}
	}
	return ""
}
