package cases_test

import (
	"context"
	"encoding/json"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/sheettest"
)

// drawn is a random circuit without crossings, with a case for every pattern of its switches.
func drawn(t *rapid.T, ideal bool, columns, rows int) *schematic.Sheet {
	b := sheettest.NewBuilder("Random")
	sheettest.Lattice(t, b, sheettest.Choice{Columns: columns, Rows: rows, Ideal: ideal, Switches: 6})
	sheettest.Cases(b.Sheet)
	return b.Sheet
}

func solveDrawn(t *rapid.T, sheet *schematic.Sheet) *cases.Result {
	result, err := cases.Solve(context.Background(), sheet)
	if err != nil {
		t.Fatal(err)
	}
	return result
}

func TestEveryPatternOfSwitchesIsSolvedAndPassesItsAudit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		sheet := drawn(t, false, 4, 4)
		result := solveDrawn(t, sheet)
		nets := flooded(sheet)
		for i := range result.Cases {
			c := &result.Cases[i]
			if len(result.Drawing.Branches) == 0 {
				if c.Problem.Code != "empty" {
					t.Fatalf("%+v", c.Problem)
				}
				continue
			}
			if !c.Solved || !c.Audit.Passed {
				t.Fatalf("%s: %+v %+v", c.Name, c.Problem, c.Audit)
			}
			checkByGeometry(t, result, c, nets)
		}
	})
}

func TestACircuitOfIdealSourcesIsSolvedOrSaysWhyNot(t *testing.T) {
	codes := []string{"shorted-source", "source-loop", "no-return-path", "undetermined", "empty"}
	rapid.Check(t, func(t *rapid.T) {
		result := solveDrawn(t, drawn(t, true, 4, 3))
		for i := range result.Cases {
			switch c := &result.Cases[i]; {
			case c.Solved && !c.Audit.Passed:
				t.Fatalf("%s: %+v", c.Name, c.Audit)
			case !c.Solved && (!slices.Contains(codes, c.Problem.Code) || !strings.HasSuffix(c.Problem.Message, ".")):
				t.Fatalf("%s: %+v", c.Name, c.Problem)
			case !c.Solved && c.Problem.Code != "empty" && len(c.Problem.Parts) == 0:
				t.Fatalf("%s names no part: %s", c.Name, c.Problem.Message)
			}
		}
	})
}

// flooded numbers the places of a sheet without crossings by what is joined, filling from grid point to grid point along
// the wires.
func flooded(sheet *schematic.Sheet) map[schematic.Point]int {
	beside := map[schematic.Point][]schematic.Point{}
	for _, wire := range sheet.Wires {
		for i := 1; i < len(wire.Points); i++ {
			a, b := wire.Points[i-1], wire.Points[i]
			for a != b {
				next := schematic.Point{X: a.X + sign(b.X-a.X), Y: a.Y + sign(b.Y-a.Y)}
				beside[a], beside[next] = append(beside[a], next), append(beside[next], a)
				a = next
			}
		}
	}
	nets := map[schematic.Point]int{}
	var fill func(p schematic.Point, net int)
	fill = func(p schematic.Point, net int) {
		if _, known := nets[p]; known {
			return
		}
		nets[p] = net
		for _, next := range beside[p] {
			fill(next, net)
		}
	}
	for i := range sheet.Parts {
		for _, pin := range sheet.Parts[i].Kind.Pins {
			fill(sheet.Parts[i].Pin(pin), len(nets))
		}
	}
	return nets
}

func sign(n int) int {
	return max(min(n, 1), -1)
}

// checkByGeometry checks a case against the drawing alone: what flows into the pins that are joined adds up to nothing, a
// branch has the difference of the voltages at its pins, and its current is that of the meshes through it.
func checkByGeometry(t *rapid.T, result *cases.Result, c *cases.Case, nets map[schematic.Point]int) {
	drawing := result.Drawing
	sum, total := map[int]complex128{}, 0.0
	through := make([]complex128, len(drawing.Branches))
	largest := 0.0
	for m, mesh := range drawing.Meshes {
		largest = max(largest, math.Abs(real(c.Meshes[m])))
		for _, step := range mesh.Path {
			through[step.Branch] += complex(float64(step.Sense), 0) * c.Meshes[m]
		}
	}
	for b, branch := range drawing.Branches {
		part := &drawing.Sheet.Parts[branch.Part]
		reading := c.Branches[b]
		sum[nets[part.Pin(part.Kind.Pins[0])]] += reading.Current
		sum[nets[part.Pin(part.Kind.Pins[1])]] -= reading.Current
		total = max(total, math.Abs(real(reading.Current)))
		if math.Abs(real(reading.Current-through[b])) > 1e-14*largest {
			t.Fatalf("%s: -%s carries %g, its meshes %g", c.Name, branch.Ref, real(reading.Current), real(through[b]))
		}
		from, to := c.Potentials[drawing.PinPotential[branch.Part][0]], c.Potentials[drawing.PinPotential[branch.Part][1]]
		if !reading.Floating && !from.Floating && !to.Floating {
			if gap := math.Abs(real(from.Voltage - to.Voltage - reading.Voltage)); gap > 1e-9*24 {
				t.Fatalf("%s: -%s has %g V between potentials %g V apart", c.Name, branch.Ref, real(reading.Voltage), real(from.Voltage-to.Voltage))
			}
		}
	}
	for _, current := range sum {
		if math.Abs(real(current)) > 1e-9*total {
			t.Fatalf("%s: %g A vanish at a potential", c.Name, real(current))
		}
	}
}

func TestMeshesHaveTheSameNamesInEveryCase(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		data, err := json.Marshal(solveDrawn(t, drawn(t, false, 4, 3)))
		if err != nil {
			t.Fatal(err)
		}
		var file struct {
			Cases []struct {
				Meshes []struct {
					Name string
					Path any
				}
			}
		}
		if err := json.Unmarshal(data, &file); err != nil {
			t.Fatal(err)
		}
		first, _ := json.Marshal(file.Cases[0].Meshes)
		for _, c := range file.Cases {
			if meshes, _ := json.Marshal(c.Meshes); string(meshes) != string(first) {
				t.Fatalf("%s is not %s", meshes, first)
			}
		}
	})
}

func TestWhateverIsDrawnIsSolvedOrSaysWhyNot(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := sheettest.NewBuilder("Soup")
		sheettest.Soup(t, b)
		for _, c := range solveDrawn(t, b.Sheet).Cases {
			if c.Solved != c.Audit.Passed || c.Solved != (c.Problem == nil) {
				t.Fatalf("%+v", c)
			}
		}
	})
}
