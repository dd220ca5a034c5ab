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

// floor is a package and what it may import of the project.
type floor struct {
	name      string
	mayImport []string
}

// house is the project from the ground up: no floor may rest on one that comes later. A package that is not named here,
// or imports what is not named beside it, breaks the rule. Tests may import what they like.
var house = []floor{
	{"static", nil},
	{"testdata", nil},
	{"solver/wide", nil},
	{"solver/sparse", []string{"solver/wide"}},
	{"solver", []string{"solver/sparse", "solver/wide"}},
	{"solver/solvertest", []string{"solver"}},
	{"schematic/stroke", nil},
	{"schematic/quantity", nil},
	{"schematic/kinds", []string{"schematic/stroke", "schematic/quantity"}},
	{"schematic", []string{"schematic/kinds", "schematic/quantity"}},
	{"schematic/sheettest", []string{"schematic", "schematic/kinds"}},
	{"schematic/trace", []string{"schematic", "schematic/kinds", "schematic/stroke"}},
	{"schematic/cases", []string{"schematic", "schematic/kinds", "schematic/quantity", "schematic/trace", "solver"}},
	{"schematic/draw", []string{"schematic", "schematic/kinds", "schematic/quantity", "schematic/stroke", "schematic/trace", "schematic/cases", "solver", "static"}},
	{"web/recent", nil},
	{"web/store", []string{"schematic", "web/recent"}},
	{"web/view", []string{"schematic", "schematic/kinds", "schematic/quantity", "schematic/trace", "schematic/cases", "schematic/draw"}},
	{"web", []string{"schematic", "schematic/kinds", "schematic/cases", "schematic/draw", "web/recent", "web/store", "web/view", "static", "testdata"}},
	{"web/browser", nil},
	{"cmd/loopwright", []string{"schematic", "schematic/quantity", "schematic/trace", "schematic/cases", "web", "web/store"}},
	{"cmd/ready", nil},
}

// onlyInTests are packages that no program may hold.
var onlyInTests = []string{"solver/solvertest", "schematic/sheettest"}

// topLevel is what the repository holds at its top, beside names that begin with a dot.
var topLevel = []string{"cmd", "web", "solver", "schematic", "static", "testdata", "go.mod", "go.sum", "README.md", "DEVELOPERS.md", "Dockerfile"}

// importsOf lists the packages of the project, each with what it imports of the project outside its tests. The go command
// leaves folders called testdata out of patterns, so that one is named.
func importsOf(t *testing.T) map[string][]string {
	t.Helper()
	out, err := exec.Command("go", "list", "-json=ImportPath,Imports", module+"...", module+"testdata").Output()
	if err != nil {
		t.Fatal(err)
	}
	imports := map[string][]string{}
	for decoder := json.NewDecoder(strings.NewReader(string(out))); ; {
		var listed struct {
			ImportPath string
			Imports    []string
		}
		if err := decoder.Decode(&listed); errors.Is(err, io.EOF) {
			return imports
		} else if err != nil {
			t.Fatal(err)
		}
		var own []string
		for _, path := range listed.Imports {
			if name, ok := strings.CutPrefix(path, module); ok {
				own = append(own, name)
			}
		}
		imports[strings.TrimPrefix(listed.ImportPath, module)] = own
	}
}

// broken names every arrow, or floor, that breaks the rule of a house.
func broken(house []floor, testOnly []string, imports map[string][]string) []string {
	var faults []string
	allowed := map[string][]string{}
	for _, f := range house {
		for _, lower := range f.mayImport {
			if _, below := allowed[lower]; !below {
				faults = append(faults, f.name+" -> "+lower+": the house itself has this arrow point up")
			}
		}
		allowed[f.name] = f.mayImport
		if _, exists := imports[f.name]; !exists {
			faults = append(faults, f.name+": the house has a floor for this, and there is no such package")
		}
	}
	for name, own := range imports {
		if _, known := allowed[name]; !known {
			faults = append(faults, name+": has no floor in the house; give it one")
			continue
		}
		for _, lower := range own {
			switch {
			case slices.Contains(testOnly, lower):
				faults = append(faults, name+" -> "+lower+": that is for tests only")
			case !slices.Contains(allowed[name], lower):
				faults = append(faults, name+" -> "+lower+": this arrow is not allowed")
			}
		}
	}
	slices.Sort(faults)
	return faults
}

func TestImportsPointDown(t *testing.T) {
	for _, fault := range broken(house, onlyInTests, importsOf(t)) {
		t.Error(fault)
	}
}

func TestABrokenRuleIsNamed(t *testing.T) {
	small := []floor{{"ground", nil}, {"aid", []string{"ground"}}, {"upper", []string{"ground", "roof"}}, {"roof", nil}}
	got := broken(small, []string{"aid"}, map[string][]string{"ground": {"upper"}, "aid": {"ground"}, "upper": {"ground", "aid"}, "shed": nil})
	want := []string{
		"ground -> upper: this arrow is not allowed",
		"roof: the house has a floor for this, and there is no such package",
		"shed: has no floor in the house; give it one",
		"upper -> aid: that is for tests only",
		"upper -> roof: the house itself has this arrow point up",
	}
	if !slices.Equal(got, want) {
		t.Errorf("got\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
}

func TestTheTopLevelHoldsWhatWasAgreed(t *testing.T) {
	out, err := exec.Command("git", "-C", "../..", "ls-files").Output()
	if err != nil {
		t.Logf("git cannot tell what belongs to the project: %v", err)
		return
	}
	for line := range strings.Lines(string(out)) {
		top, _, _ := strings.Cut(strings.TrimSpace(line), "/")
		if !strings.HasPrefix(top, ".") && !slices.Contains(topLevel, top) {
			t.Errorf("%s is not among the agreed top-level names", top)
		}
	}
}
