package main

import (
	"encoding/json"
	"errors"
	"io"
	"os/exec"
	"slices"
	"strings"
	"testing"
)

// house says what each package of the project may import of the project, the floors from the ground up. A package that
// is not named here, or imports what is not named beside it, breaks the rule.
var house = map[string][]string{
	"static":              {},
	"testdata":            {},
	"solver/wide":         {},
	"solver/sparse":       {"solver/wide"},
	"solver":              {"solver/sparse", "solver/wide"},
	"solver/solvertest":   {"solver"},
	"schematic/stroke":    {},
	"schematic/quantity":  {},
	"schematic/kinds":     {"schematic/stroke", "schematic/quantity"},
	"schematic":           {"schematic/kinds", "schematic/quantity"},
	"schematic/trace":     {"schematic", "schematic/kinds", "schematic/stroke"},
	"schematic/cases":     {"schematic", "schematic/kinds", "schematic/quantity", "schematic/trace", "solver"},
	"schematic/draw":      {"schematic", "schematic/kinds", "schematic/quantity", "schematic/stroke", "schematic/trace", "schematic/cases", "solver", "static"},
	"schematic/sheettest": {"schematic", "schematic/kinds"},
	"web/recent":          {},
	"web/store":           {"schematic", "web/recent"},
	"web/view":            {"schematic", "schematic/kinds", "schematic/quantity", "schematic/trace", "schematic/cases", "schematic/draw"},
	"web":                 {"schematic", "schematic/kinds", "schematic/cases", "schematic/draw", "web/recent", "web/store", "web/view", "static", "testdata"},
	"web/browser":         {},
	"cmd/loopwright":      {"schematic", "schematic/quantity", "schematic/trace", "schematic/cases", "web", "web/store"},
	"cmd/ready":           {},
}

// onlyInTests are packages that no program may hold.
var onlyInTests = []string{"solver/solvertest", "schematic/sheettest"}

const module = "loopwright/"

type listed struct {
	ImportPath string
	Imports    []string
}

func listPackages(t *testing.T) []listed {
	t.Helper()
	command := exec.Command("go", "list", "-json=ImportPath,Imports", module+"...")
	out, err := command.Output()
	if err != nil {
		t.Fatal(err)
	}
	var packages []listed
	for decoder := json.NewDecoder(strings.NewReader(string(out))); ; {
		var p listed
		if err := decoder.Decode(&p); errors.Is(err, io.EOF) {
			return packages
		} else if err != nil {
			t.Fatal(err)
		}
		packages = append(packages, p)
	}
}

func TestImportsPointDown(t *testing.T) {
	for _, p := range listPackages(t) {
		name := strings.TrimPrefix(p.ImportPath, module)
		allowed, known := house[name]
		if !known {
			t.Errorf("%s has no floor in the house; give it one", name)
		}
		for _, imported := range p.Imports {
			lower, own := strings.CutPrefix(imported, module)
			if !own {
				continue
			}
			if !slices.Contains(allowed, lower) {
				t.Errorf("%s -> %s: this arrow does not point down", name, lower)
			}
			if slices.Contains(onlyInTests, lower) {
				t.Errorf("%s -> %s: that is for tests only", name, lower)
			}
		}
	}
}

func TestTheTopLevelHoldsWhatWasAgreed(t *testing.T) {
	out, err := exec.Command("git", "-C", "../..", "ls-files").Output()
	if err != nil {
		t.Logf("not a git checkout: %v", err)
		return
	}
	agreed := []string{"cmd", "web", "solver", "schematic", "static", "testdata", "go.mod", "go.sum", "README.md", "DEVELOPERS.md", "Dockerfile"}
	for line := range strings.Lines(string(out)) {
		top, _, _ := strings.Cut(strings.TrimSpace(line), "/")
		if !strings.HasPrefix(top, ".") && !slices.Contains(agreed, top) {
			t.Errorf("%s is not among the agreed top-level names", top)
		}
	}
}
