package cases_test

import (
	"slices"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
)

// values gives quantities by name.
func values(pairs ...any) kinds.Values {
	v := kinds.Values{}
	for i := 0; i < len(pairs); i += 2 {
		v[pairs[i].(string)] = kinds.Number(float64(pairs[i+1].(int)))
	}
	return v
}

// closed is a switch that conducts at rest, without resistance.
func closed() kinds.Values {
	v := values("resistance", 0)
	v["form"] = kinds.Word(kinds.Choice, "break")
	return v
}

func TestACaseWithoutASolutionSaysWhatToDo(t *testing.T) {
	// The circuits are our own; that each has no solution follows from Kirchhoff's laws.
	for _, test := range []struct {
		name    string
		draw    func(*sheettest.Builder)
		code    string
		parts   []string
		message string
	}{
		{"nothing on the sheet", func(*sheettest.Builder) {}, "empty", []string{},
			"There is nothing to solve yet: no part on the sheet can carry a current. Put a supply and a load on it and join them."},
		{"a supply shorted by a wire", func(b *sheettest.Builder) {
			b.Down(kinds.DCSupply, nil, 0, 0, false)
			b.Wire(b.Node(0, 0), b.Node(1, 0), b.Node(1, 1), b.Node(0, 1))
		}, "shorted-source", []string{"G1"},
			"-G1 is shorted: its pins are one potential. Part the wires at its pins, or give it its inner resistance."},
		{"a supply shorted by a contact", func(b *sheettest.Builder) {
			b.Down(kinds.DCSupply, nil, 0, 0, false)
			b.Right(kinds.Switch, closed(), 0, 0, false)
			b.Wire(b.Node(1, 0), b.Node(1, 1), b.Node(0, 1))
		}, "shorted-source", []string{"G1", "S1"},
			"-G1 is shorted through -S1 without any resistance. Put a load into the way, or give one of them its resistance."},
		{"two supplies that disagree", func(b *sheettest.Builder) {
			b.Down(kinds.DCSupply, nil, 0, 0, false)
			b.Down(kinds.DCSupply, values("voltage", 21), 1, 0, false)
			b.Wire(b.Node(0, 0), b.Node(1, 0))
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "source-loop", []string{"G1", "G2"},
			"-G1 and -G2 are joined without resistance and their voltages differ by 3.000 V. Give one of them its inner resistance, or part them."},
		{"three supplies that disagree", func(b *sheettest.Builder) {
			b.Down(kinds.DCSupply, nil, 0, 0, false)
			b.Right(kinds.DCSupply, nil, 0, 0, false)
			b.Down(kinds.DCSupply, nil, 1, 0, false)
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "source-loop", []string{"G1", "G2", "G3"},
			"-G1, -G2 and -G3 form a loop without resistance whose voltages do not add up by 24.00 V. Give one of them its inner resistance, or open the loop."},
		{"two equal supplies in parallel", func(b *sheettest.Builder) {
			b.Down(kinds.DCSupply, nil, 0, 0, false)
			b.Down(kinds.DCSupply, nil, 1, 0, false)
			b.Wire(b.Node(0, 0), b.Node(1, 0))
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "undetermined", []string{"G1", "G2"},
			"-G1 and -G2 form a loop without any resistance, so that any current could flow around it. Give one of them its resistance."},
		{"a contact without resistance on one potential", func(b *sheettest.Builder) {
			b.Down(kinds.Switch, closed(), 0, 0, false)
			b.Wire(b.Node(0, 0), b.Node(1, 0), b.Node(1, 1), b.Node(0, 1))
		}, "undetermined", []string{"S1"},
			"-S1 has no resistance and both its pins are one potential, so that any current could flow in it. Give it its resistance, or part the wires at its pins."},
		{"a current source before an open contact", func(b *sheettest.Builder) {
			b.Down(kinds.CurrentSource, values("current", 2), 0, 0, false)
			b.Right(kinds.Switch, nil, 0, 0, false)
			b.Down(kinds.Resistor, nil, 1, 0, false)
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "no-return-path", []string{"G1"},
			"The current of -G1, 2.000 A, has no way back. Close -S1, or put a resistance beside -G1."},
		{"a current source that hangs free", func(b *sheettest.Builder) {
			b.Down(kinds.CurrentSource, values("current", 2), 0, 0, false)
			b.Right(kinds.Resistor, nil, 0, 0, false)
		}, "no-return-path", []string{"G1"},
			"The current of -G1, 2.000 A, has no way back. Put a resistance beside it, or join its pins through a load."},
		{"two current sources in series that disagree", func(b *sheettest.Builder) {
			b.Down(kinds.CurrentSource, values("current", 2), 0, 0, false)
			b.Right(kinds.CurrentSource, values("current", 3), 0, 0, true)
			b.Down(kinds.Resistor, nil, 1, 0, false)
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "no-return-path", []string{"G1", "G2"},
			"-G1 and -G2 are in series and their currents differ by 1.000 A. Make them alike, or put a resistance beside one of them."},
		{"two equal current sources in series", func(b *sheettest.Builder) {
			b.Down(kinds.CurrentSource, values("current", 2), 0, 0, false)
			b.Right(kinds.CurrentSource, values("current", 2), 0, 0, true)
			b.Down(kinds.Resistor, nil, 1, 0, false)
			b.Wire(b.Node(0, 1), b.Node(1, 1))
		}, "undetermined", []string{"G1", "G2"},
			"How the voltage divides between -G1 and -G2 is not determined. Put a resistance beside one of them."},
	} {
		t.Run(test.name, func(t *testing.T) {
			b := sheettest.NewBuilder(test.name)
			test.draw(b)
			c := solve(t, b.Sheet).Cases[0]
			if c.Solved || c.Problem == nil {
				t.Fatalf("solved: %+v", c)
			}
			if c.Problem.Code != test.code || !slices.Equal(c.Problem.Parts, test.parts) || c.Problem.Message != test.message {
				t.Errorf("%s %v: %s\nwant %s %v: %s", c.Problem.Code, c.Problem.Parts, c.Problem.Message, test.code, test.parts, test.message)
			}
			if c.Branches != nil || c.Meshes != nil || c.Equations != nil {
				t.Error("there are numbers although there is no solution")
			}
		})
	}
}

func TestOneUnsolvedCaseDoesNotHideTheOthers(t *testing.T) {
	b := sheettest.NewBuilder("Shorted when operated")
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Right(kinds.Switch, values("resistance", 0), 0, 0, false)
	b.Wire(b.Node(1, 0), b.Node(1, 1))
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	sheettest.Cases(b.Sheet)
	result := solve(t, b.Sheet)
	if !result.Cases[0].Solved || result.Cases[1].Solved || result.Cases[1].Problem.Code != "shorted-source" {
		t.Errorf("%+v", result.Cases)
	}
}

func TestEverySentenceEndsAndNamesItsParts(t *testing.T) {
	sheet := schematic.New("Empty")
	problem := solve(t, sheet).Cases[0].Problem
	if problem.Parts == nil || !strings.HasSuffix(problem.Message, ".") {
		t.Errorf("%+v", problem)
	}
}
