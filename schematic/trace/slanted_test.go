package trace_test

import (
	"slices"
	"testing"

	"pgregory.net/rapid"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
	"loopwright/schematic/trace"
)

// fork is a kind with two branches that leave one pin aslant.
func fork() *kinds.Kind {
	return &kinds.Kind{
		Name: "fork", Letter: "U",
		Pins: []kinds.Pin{{Name: "1", Y: -2}, {Name: "2", X: -2, Y: 2}, {Name: "4", X: 2, Y: 2}},
		Branches: func(kinds.Filled, kinds.Condition) []kinds.Branch {
			return []kinds.Branch{{From: "1", To: "2", Law: kinds.Impedance(1, 0)}, {From: "1", To: "4", Law: kinds.Impedance(1, 0)}}
		},
	}
}

// forked draws a fork below a supply, with a resistor from either tine back to it.
func forked() *sheettest.Builder {
	b := sheettest.NewBuilder("Fork")
	b.Part(fork(), nil, schematic.Point{X: 0, Y: 2}, 0)
	b.Part(kinds.Resistor, nil, schematic.Point{X: -2, Y: 6}, 0)
	b.Part(kinds.Resistor, nil, schematic.Point{X: 2, Y: 6}, 0)
	b.Wire(schematic.Point{X: -2, Y: 8}, schematic.Point{X: 2, Y: 8})
	b.Part(kinds.DCSupply, nil, schematic.Point{X: 8, Y: 4}, 0)
	b.Wire(schematic.Point{X: 0, Y: 0}, schematic.Point{X: 8, Y: 0}, schematic.Point{X: 8, Y: 2})
	b.Wire(schematic.Point{X: 8, Y: 6}, schematic.Point{X: 8, Y: 8}, schematic.Point{X: 2, Y: 8})
	return b
}

func TestSlantedBranchesAreSidesOfMeshes(t *testing.T) {
	b := forked()
	d := trace.Trace(b.Sheet)
	expect(t, "meshes", paths(d), "m1 drawn +U1 +R2 -R1 -U1", "m2 drawn +G1 -R2 -U1")
	if d.Branches[0].Index != 0 || d.Branches[1].Index != 1 || d.Branches[1].Pins != [2]string{"1", "4"} {
		t.Errorf("%+v", d.Branches[:2])
	}

	b.Wire(schematic.Point{X: -1, Y: 3}, schematic.Point{X: -1, Y: 4})
	b.Wire(schematic.Point{X: 1, Y: 6}, schematic.Point{X: 1, Y: 1}) // across the right tine
	expect(t, "a wire across the right tine", paths(trace.Trace(b.Sheet)), "m1 loop -G1 +U1 +R1", "m2 loop -G1 +U1 +R2")

	b = forked()
	b.Part(kinds.Terminal, nil, schematic.Point{X: -1, Y: 2}, 0)
	expect(t, "a terminal on the left tine", paths(trace.Trace(b.Sheet)), "m1 drawn +G1 -R2 -U1", "m2 loop -G1 +U1 +R1")
}

func TestMeshesDoNotDependOnWhereTheSheetIsDrawn(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		first := sheettest.NewBuilder("Somewhere")
		sheettest.Lattice(t, first, sheettest.Choice{Columns: 4, Rows: 3, Ideal: true, Switches: 20})
		sheettest.Names(t, first, 4)
		want := trace.Trace(first.Sheet)
		by := schematic.Point{X: rapid.IntRange(-500, 500).Draw(t, "right"), Y: rapid.IntRange(-500, 500).Draw(t, "down")}
		for i := range first.Sheet.Parts {
			first.Sheet.Parts[i].At.X += by.X
			first.Sheet.Parts[i].At.Y += by.Y
		}
		for _, wire := range first.Sheet.Wires {
			for i := range wire.Points {
				wire.Points[i].X += by.X
				wire.Points[i].Y += by.Y
			}
		}
		got := trace.Trace(first.Sheet)
		if a, b := paths(want), paths(got); !slices.Equal(a, b) {
			t.Fatalf("%v became %v", a, b)
		}
		for m, mesh := range got.Meshes {
			if mesh.Drawn && (mesh.Center.X-float64(by.X) != want.Meshes[m].Center.X || mesh.Radius != want.Meshes[m].Radius) {
				t.Fatalf("the middle of %s moved from %v to %v by %v", mesh.Name, want.Meshes[m].Center, mesh.Center, by)
			}
		}
	})
}
