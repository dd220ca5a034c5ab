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
	output  map[source][]string // what each test, and each package by itself, has said so far
}

// source is a test, or a package by itself when Test is empty.
type source struct{ Package, Test string }

func newResults() *results { return &results{output: map[source][]string{}} }

// take takes one line and gives what is to be printed of it: what a test said when it fails, and at the end of a package
// go test's own closing line, or all that the package said by itself when it failed. Lines that are no events are printed
// as they are.
func (r *results) take(line []byte) string {
	var e event
	if json.Unmarshal(line, &e) != nil {
		return string(line) + "\n"
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
		return r.ended(e, said)
	}
	return ""
}

// ended counts the end of a test or package, and gives what is to be printed of what it said.
func (r *results) ended(e event, said []string) string {
	name := e.Package + "." + e.Test
	switch {
	case e.Test == "" && e.Action == "fail":
		return strings.Join(said, "")
	case e.Test == "":
		return closingLine(said)
	case e.Action == "skip":
		r.skipped = append(r.skipped, name)
		return ""
	}
	r.ran++
	if e.Action == "fail" {
		r.failed = append(r.failed, name)
		return strings.Join(said, "")
	}
	return ""
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
