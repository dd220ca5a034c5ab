package cases_test

import (
	"context"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
)

// circuit is a worked example from a published source, as a list of elements. The current of an element counts from Pos
// through the element to Neg, for sources too.
type circuit struct {
	ID       string
	Source   string
	Meshes   int
	Elements []struct {
		Ref, Type, Pos, Neg string
		Value               any
	}
	Published []published
}

// published is an answer as the source prints it.
type published struct {
	Quantity string
	Of       any
	Value    any // a number, or an object for a phasor
	Digits   int
	Exact    bool
	Sense    string
}

func (p published) number() float64 { return p.Value.(float64) }

func circuits(t *testing.T) map[string]circuit {
	t.Helper()
	data, err := os.ReadFile("../../testdata/reference/circuits.json")
	if err != nil {
		t.Fatal(err)
	}
	var file struct{ Examples []circuit }
	if err := json.Unmarshal(data, &file); err != nil {
		t.Fatal(err)
	}
	byID := map[string]circuit{}
	for _, c := range file.Examples {
		byID[c.ID] = c
	}
	return byID
}

func examples(t testing.TB) []string {
	t.Helper()
	files, err := filepath.Glob("../../testdata/examples/*.sheet.json")
	if err != nil || len(files) < 14 {
		t.Fatalf("%d example sheets, %v", len(files), err)
	}
	return files
}

func read(t testing.TB, file string) *schematic.Sheet {
	t.Helper()
	data, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	sheet, err := schematic.Decode(data)
	if err != nil {
		t.Fatalf("%s: %v", file, err)
	}
	return sheet
}

func solve(t testing.TB, sheet *schematic.Sheet) *cases.Result {
	t.Helper()
	result, err := cases.Solve(context.Background(), sheet)
	if err != nil {
		t.Fatal(err)
	}
	return result
}

func TestSheetsOfPublishedExamplesAreTheirCircuits(t *testing.T) {
	known := circuits(t)
	for _, file := range examples(t) {
		id := strings.TrimSuffix(filepath.Base(file), ".sheet.json")
		t.Run(id, func(t *testing.T) {
			example, result := known[id], solve(t, read(t, file))
			drawing := result.Drawing
			if len(drawing.Branches) != len(example.Elements) || len(drawing.Meshes) != example.Meshes {
				t.Fatalf("%d branches and %d meshes, the source has %d and %d", len(drawing.Branches), len(drawing.Meshes), len(example.Elements), example.Meshes)
			}
			for _, mesh := range drawing.Meshes {
				if !mesh.Drawn {
					t.Errorf("%s is not drawn", mesh.Name)
				}
			}
			if len(nodes(t, example, result)) != len(drawing.Potentials) {
				t.Errorf("the source has other nodes than the %d potentials", len(drawing.Potentials))
			}
			for _, element := range example.Elements {
				part := drawing.Sheet.Part(element.Ref)
				value, _ := element.Value.(float64)
				kind, name := map[string]*kinds.Kind{"V": kinds.VoltageSource, "R": kinds.Resistor, "I": kinds.CurrentSource}[element.Type],
					map[string]string{"V": "voltage", "R": "resistance", "I": "current"}[element.Type]
				if part.Kind != kind || part.Fill().Number(name) != value {
					t.Errorf("%s is a %s of %s, the source has %s %g", element.Ref, part.Kind.Title, part.Fill().Exact(name), element.Type, value)
				}
			}
		})
	}
}

// nodes gives the potential of each node of a published circuit, and fails unless they are one to one.
func nodes(t *testing.T, example circuit, result *cases.Result) map[string]int {
	t.Helper()
	known := map[string]int{"0": result.Drawing.Reference}
	taken := map[int]string{result.Drawing.Reference: "0"}
	for _, element := range example.Elements {
		branch := result.Drawing.Branches[branchOf(t, result, element.Ref)]
		ends := map[string]int{element.Pos: branch.From, element.Neg: branch.To}
		if element.Type == "I" {
			ends = map[string]int{element.Pos: branch.To, element.Neg: branch.From}
		}
		for node, potential := range ends {
			first, met := known[node]
			other, used := taken[potential]
			if (met && first != potential) || (used && other != node) {
				t.Fatalf("%s is not joined as in %s: node %s", element.Ref, example.Source, node)
			}
			known[node], taken[potential] = potential, node
		}
	}
	return known
}

func branchOf(t testing.TB, result *cases.Result, ref string) int {
	t.Helper()
	for b, branch := range result.Drawing.Branches {
		if branch.Ref == ref {
			return b
		}
	}
	t.Fatalf("no branch of %s", ref)
	return -1
}

func TestSheetsHaveThePublishedAnswers(t *testing.T) {
	known := circuits(t)
	for _, file := range examples(t) {
		id := strings.TrimSuffix(filepath.Base(file), ".sheet.json")
		t.Run(id, func(t *testing.T) {
			example, result := known[id], solve(t, read(t, file))
			if !result.Cases[0].Solved || !result.Cases[0].Audit.Passed {
				t.Fatalf("not solved: %+v", result.Cases[0].Problem)
			}
			checked := 0
			for _, answer := range example.Published {
				got, ok := measured(t, example, result, answer)
				if !ok {
					continue
				}
				checked++
				if math.Abs(got-answer.number()) > allowed(answer) {
					t.Errorf("%s of %v is %.6g, published is %g, by %s", answer.Quantity, answer.Of, got, answer.number(), example.Source)
				}
			}
			if checked == 0 {
				t.Errorf("nothing of %s was checked", example.Source)
			}
		})
	}
}

// measured gives what a published answer is about; it is false for what no sheet has, such as an equivalent resistance.
func measured(t *testing.T, example circuit, result *cases.Result, answer published) (float64, bool) {
	solved := &result.Cases[0]
	potential := func(name any) float64 {
		return real(solved.Potentials[nodes(t, example, result)[name.(string)]].Voltage)
	}
	switch answer.Quantity {
	case "node-voltage":
		return potential(answer.Of), true
	case "thevenin-voltage":
		pair := answer.Of.([]any)
		return potential(pair[0]) - potential(pair[1]), true
	case "current", "mesh-current", "voltage", "power":
		b := branchOf(t, result, answer.Of.(string))
		sign := 1.0
		if answer.Sense == "neg-to-pos" {
			sign = -sign
		}
		if result.Drawing.Sheet.Parts[result.Drawing.Branches[b].Part].Kind == kinds.CurrentSource {
			sign = -sign
		}
		if answer.Quantity == "mesh-current" {
			checkMeshCurrent(t, result, b, sign*answer.number())
		}
		switch answer.Quantity {
		case "voltage":
			return sign * real(solved.Branches[b].Voltage), true
		case "power":
			return real(solved.Branches[b].Power()), true
		}
		return sign * real(solved.Branches[b].Current), true
	}
	return 0, false
}

// checkMeshCurrent checks that a branch whose current is a published mesh current lies in one mesh only, and that the mesh
// current is that, counted in the sense of the mesh.
func checkMeshCurrent(t *testing.T, result *cases.Result, b int, want float64) {
	t.Helper()
	found := 0
	for m, mesh := range result.Drawing.Meshes {
		for _, step := range mesh.Path {
			if step.Branch != b {
				continue
			}
			found++
			if got := float64(step.Sense) * real(result.Cases[0].Meshes[m]); math.Abs(got-want) > 1e-3*math.Abs(want)+1e-9 {
				t.Errorf("%s is %.6g, published is %g", mesh.Name, got, want)
			}
		}
	}
	if found != 1 {
		t.Errorf("-%s lies in %d meshes, the source has it in one", result.Drawing.Branches[b].Ref, found)
	}
}

// allowed is how far a value may lie from a published one: half a unit of its last digit, or rounding for an exact one.
func allowed(answer published) float64 {
	size := math.Abs(answer.number())
	if answer.Exact {
		return 1e-12 * max(size, 1)
	}
	return 0.5001 * math.Pow(10, math.Floor(math.Log10(size))-float64(answer.Digits)+1)
}
