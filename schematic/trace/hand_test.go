package trace_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
	"loopwright/schematic/trace"
)

func named(name string) kinds.Values {
	return kinds.Values{"name": kinds.Word(kinds.Text, name)}
}

// paths writes the meshes of a drawing: "m1 drawn -G1 +R1", with the sign of the sense before each reference.
func paths(d *trace.Drawing) []string {
	var list []string
	for _, mesh := range d.Meshes {
		text := mesh.Name + " loop"
		if mesh.Drawn {
			text = mesh.Name + " drawn"
		}
		for _, step := range mesh.Path {
			text += fmt.Sprintf(" %c%s", "-?+"[step.Sense+1], d.Branches[step.Branch].Ref)
		}
		list = append(list, text)
	}
	return list
}

func expect(t *testing.T, what string, got []string, want ...string) {
	t.Helper()
	if !slices.Equal(got, want) {
		t.Errorf("%s\n got %s\nwant %s", what, strings.Join(got, "\n     "), strings.Join(want, "\n     "))
	}
}

// window draws a supply and two resistors as two meshes side by side.
func window(b *sheettest.Builder) {
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Right(kinds.Resistor, nil, 0, 0, false)
	b.Down(kinds.Resistor, nil, 1, 0, false)
	b.Right(kinds.Resistor, nil, 1, 0, false)
	b.Down(kinds.Resistor, nil, 2, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	b.Wire(b.Node(1, 1), b.Node(2, 1))
}

func TestMeshesRunClockwiseInReadingOrder(t *testing.T) {
	b := sheettest.NewBuilder("Window")
	window(b)
	d := trace.Trace(b.Sheet)
	expect(t, "meshes", paths(d), "m1 drawn -G1 +R1 +R2", "m2 drawn +R3 +R4 -R2")
	if center := d.Meshes[1].Center; center.X != 9 || center.Y != 3 || d.Meshes[1].Radius != 3 || len(d.Meshes[1].Outline) != 4 {
		t.Errorf("%+v", d.Meshes[1])
	}
}

func TestACircuitWithinAMeshIsAMeshOfItsOwn(t *testing.T) {
	for _, test := range []struct {
		name string
		tie  func(*sheettest.Builder)
	}{
		{"apart", func(*sheettest.Builder) {}},
		{"hanging by a wire", func(b *sheettest.Builder) { b.Wire(schematic.Point{X: 0, Y: 12}, schematic.Point{X: 6, Y: 12}) }},
		{"hanging by a part", func(b *sheettest.Builder) { b.Right(kinds.Resistor, nil, 0, 2, false) }},
	} {
		b := sheettest.NewBuilder("Within")
		b.Down(kinds.DCSupply, nil, 0, 0, false)
		b.Wire(b.Node(0, 1), b.Node(0, 4), b.Node(4, 4), b.Node(4, 1))
		b.Down(kinds.Resistor, nil, 4, 0, false)
		b.Wire(b.Node(0, 0), b.Node(4, 0))
		b.Down(kinds.Battery, nil, 1, 1, false)
		b.Down(kinds.Resistor, nil, 2, 1, false)
		b.Wire(b.Node(1, 1), b.Node(2, 1))
		b.Wire(b.Node(1, 2), b.Node(2, 2))
		test.tie(b)
		d := trace.Trace(b.Sheet)
		expect(t, test.name, paths(d), "m1 drawn -G1 +R1", "m2 drawn -G2 +R2")
		if center := d.Meshes[0].Center; center.X > 6 && center.X < 12 && center.Y > 6 && center.Y < 12 {
			t.Errorf("%s: the middle of the outer mesh lies within the inner one: %v", test.name, center)
		}
	}
}

func TestDanglingWiresAndPartsAreNoPartOfAMesh(t *testing.T) {
	b := sheettest.NewBuilder("Dangling")
	window(b)
	b.Wire(b.Node(1, 1), schematic.Point{X: 6, Y: 9})
	b.Right(kinds.Resistor, nil, 2, 0, false)
	b.Wire(schematic.Point{X: 0, Y: 6}, schematic.Point{X: 0, Y: 9}, schematic.Point{X: 2, Y: 9})
	expect(t, "meshes", paths(trace.Trace(b.Sheet)), "m1 drawn -G1 +R1 +R2", "m2 drawn +R3 +R4 -R2")
}

func TestARingOfWireIsNoMesh(t *testing.T) {
	b := sheettest.NewBuilder("Ring")
	b.Wire(b.Node(0, 0), b.Node(1, 0), b.Node(1, 1), b.Node(0, 1), b.Node(0, 0))
	b.Down(kinds.DCSupply, nil, 1, 1, false)
	b.Wire(b.Node(1, 1), b.Node(2, 1))
	b.Down(kinds.Resistor, nil, 2, 1, false)
	b.Wire(b.Node(1, 2), b.Node(2, 2))
	expect(t, "beside", paths(trace.Trace(b.Sheet)), "m1 drawn -G1 +R1")

	// The faces within a ring of wire add up to nothing; the one with the most branches goes.
	b = sheettest.NewBuilder("Ring around two circuits")
	b.Wire(b.Node(0, 0), b.Node(3, 0), b.Node(3, 3), b.Node(0, 3), b.Node(0, 0))
	b.Down(kinds.Battery, nil, 1, 2, false)
	b.Down(kinds.Resistor, nil, 2, 2, false)
	b.Wire(b.Node(1, 2), b.Node(2, 2))
	b.Right(kinds.Resistor, nil, 0, 1, false)
	b.Wire(b.Node(1, 1), b.Node(1, 2))
	d := trace.Trace(b.Sheet)
	if len(d.Meshes) != 2 || !d.Meshes[0].Drawn || !d.Meshes[1].Drawn {
		t.Fatalf("%v", paths(d))
	}
	expect(t, "within", paths(d), "m1 drawn +G1 +R2", "m2 drawn -G1 +R1")
}

func TestPartsPinOnPinAndBetweenOnePotentialHaveTheirMesh(t *testing.T) {
	b := sheettest.NewBuilder("Pin on pin")
	b.Part(kinds.DCSupply, nil, schematic.Point{X: 0, Y: 2}, 0)
	b.Part(kinds.Resistor, nil, schematic.Point{X: 2, Y: 0}, 270)
	b.Part(kinds.Resistor, nil, schematic.Point{X: 4, Y: 2}, 0)
	b.Part(kinds.Resistor, nil, schematic.Point{X: 2, Y: 4}, 90)
	expect(t, "a ring of parts", paths(trace.Trace(b.Sheet)), "m1 drawn -G1 +R1 +R2 +R3")

	b = sheettest.NewBuilder("One potential")
	b.Down(kinds.Resistor, nil, 1, 0, false)
	b.Wire(b.Node(1, 0), b.Node(2, 0), b.Node(2, 1), b.Node(1, 1))
	d := trace.Trace(b.Sheet)
	expect(t, "a part on one potential", paths(d), "m1 drawn -R1")
	if d.Branches[0].From != d.Branches[0].To {
		t.Errorf("%+v", d.Branches)
	}

	b = sheettest.NewBuilder("Covered")
	b.Down(kinds.Resistor, nil, 0, 0, false)
	b.Wire(b.Node(0, 0), b.Node(0, 1))
	expect(t, "a part with a wire over it", paths(trace.Trace(b.Sheet)), "m1 loop +R1")
}

// crossed draws a supply with a resistor, and across their mesh the leads of a second resistor, which leave the middle of
// the left side and cross the right one.
func crossed(b *sheettest.Builder) {
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Wire(b.Node(0, 0), b.Node(2, 0))
	b.Wire(b.Node(0, 1), b.Node(0, 2), b.Node(2, 2))
	b.Down(kinds.Resistor, nil, 2, 1, false)
	b.Wire(b.Node(2, 0), b.Node(2, 1))
	b.Wire(schematic.Point{X: 0, Y: 6}, schematic.Point{X: 8, Y: 6}) // to the right of the first pin of R1
	b.Wire(schematic.Point{X: 8, Y: 6}, schematic.Point{X: 8, Y: 4}, schematic.Point{X: 17, Y: 4})
	b.Part(kinds.Resistor, nil, schematic.Point{X: 19, Y: 4}, 270)
	b.Wire(schematic.Point{X: 21, Y: 4}, schematic.Point{X: 24, Y: 4}, schematic.Point{X: 24, Y: -4}, schematic.Point{X: 0, Y: -4}, schematic.Point{X: 0, Y: 0})
}

func TestCrossingsAreNotJoinedUnlessAJointSaysSo(t *testing.T) {
	b := sheettest.NewBuilder("Crossed")
	crossed(b)
	expect(t, "crossing", paths(trace.Trace(b.Sheet)), "m1 loop -G1 +R1", "m2 loop -G1 -R2")

	b = sheettest.NewBuilder("Joined")
	crossed(b)
	b.Sheet.Joints = []schematic.Point{{X: 12, Y: 4}}
	d := trace.Trace(b.Sheet)
	if d.Branches[0].From != d.Branches[0].To {
		t.Errorf("the joint shorts the supply, but it lies between %+v", d.Branches[0])
	}
	for _, mesh := range d.Meshes {
		if !mesh.Drawn {
			t.Errorf("%s is a loop although the joined drawing is plane", mesh.Name)
		}
	}
}

func TestAFaceFreeOfCrossingsStaysDrawn(t *testing.T) {
	b := sheettest.NewBuilder("Half crossed")
	window(b)
	// Another resistor from the first potential to the lower rail, whose lead crosses the right side of the second mesh.
	b.Wire(b.Node(0, 0), schematic.Point{X: 0, Y: -6}, schematic.Point{X: 20, Y: -6}, schematic.Point{X: 20, Y: 0})
	b.Part(kinds.Resistor, nil, schematic.Point{X: 20, Y: 2}, 0)
	b.Wire(schematic.Point{X: 20, Y: 4}, schematic.Point{X: 20, Y: 12}, schematic.Point{X: 9, Y: 12}, schematic.Point{X: 9, Y: 3},
		schematic.Point{X: 10, Y: 3}, schematic.Point{X: 10, Y: 9}, schematic.Point{X: 3, Y: 9}, schematic.Point{X: 3, Y: 6})
	d := trace.Trace(b.Sheet)
	expect(t, "meshes", paths(d)[:1], "m1 drawn -G1 +R1 +R2")
	if len(d.Meshes) != 3 {
		t.Errorf("%v", paths(d))
	}
}

func TestAPartThatRunsOverAnotherPinIsCrossed(t *testing.T) {
	b := sheettest.NewBuilder("Over a pin")
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Right(kinds.Resistor, nil, 0, 0, false)
	b.Down(kinds.Resistor, nil, 1, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	expect(t, "free", paths(trace.Trace(b.Sheet)), "m1 drawn -G1 +R1 +R2")
	b.Part(kinds.Terminal, nil, schematic.Point{X: 6, Y: 3}, 0)
	expect(t, "covered", paths(trace.Trace(b.Sheet)), "m1 loop -G1 +R1 +R2")
}

func TestLoopsThatNamesCloseBeginAtTheirSource(t *testing.T) {
	b := sheettest.NewBuilder("Rails by name")
	b.Part(kinds.Potential, named("L+"), b.Node(0, 0), 0)
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Part(kinds.Potential, named("0V"), b.Node(0, 1), 180)
	for column := 1; column < 4; column++ {
		b.Part(kinds.Potential, named("L+"), b.Node(column, 0), 0)
		b.Down(kinds.Resistor, nil, column, 0, false)
		b.Part(kinds.Potential, named("0V"), b.Node(column, 1), 180)
	}
	d := trace.Trace(b.Sheet)
	expect(t, "meshes", paths(d), "m1 loop -G1 +R1", "m2 loop -G1 +R2", "m3 loop -G1 +R3")
	expect(t, "names", []string{d.Potentials[0].Name, d.Potentials[1].Name}, "0V", "L+")
}
