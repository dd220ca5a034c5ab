package schematic_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"loopwright/schematic"
)

// Sheets for the gestures below. R1 stands at the left and R2 at the right; pin 1 of an upright resistor is above.
const (
	loopOfTwo = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 10]}, {"ref": "R2", "kind": "resistor", "at": [10, 10]}],
		"wires": [{"points": [[0, 8], [0, 4], [10, 4], [10, 8]]}, {"points": [[0, 12], [0, 16], [10, 16], [10, 12]]}]`
	lineOfTwo = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 10], "turn": 90}, {"ref": "R2", "kind": "resistor", "at": [10, 10], "turn": 90}],
		"wires": [{"points": [[2, 10], [8, 10]]}]`
	teeOfThree = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 10], "turn": 90}, {"ref": "R2", "kind": "resistor", "at": [10, 10], "turn": 90},
		{"ref": "R3", "kind": "resistor", "at": [5, 14]}],
		"wires": [{"points": [[2, 10], [8, 10]]}, {"points": [[5, 10], [5, 12]]}]`
	rungs = `"parts": [{"ref": "R1", "kind": "resistor", "at": [10, 3]}, {"ref": "R2", "kind": "resistor", "at": [4, 2]}],
		"wires": [{"points": [[0, 0], [20, 0]]}, {"points": [[0, 6], [20, 6]]}, {"points": [[10, 0], [10, 1]]}, {"points": [[10, 5], [10, 6]]},
			{"points": [[16, 0], [16, 6]]}, {"points": [[4, 4], [4, 6]]}]`
	crossed = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 7]}, {"ref": "R2", "kind": "resistor", "at": [5, -4]}],
		"wires": [{"points": [[0, 5], [0, 0], [10, 0]]}, {"points": [[5, -2], [5, 10]]}], "joints": [[5, 0]]`
	touching = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 2]}, {"ref": "R2", "kind": "resistor", "at": [0, 6]}]`
	apart    = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 10], "turn": 270}, {"ref": "R2", "kind": "resistor", "at": [20, 10], "turn": 270},
		{"ref": "R3", "kind": "resistor", "at": [10, 20], "turn": 270}],
		"wires": [{"points": [[2, 10], [18, 10]]}, {"points": [[12, 20], [16, 20]]}]`
)

func TestWiresFollowAsAHandWouldDrawThem(t *testing.T) {
	for _, c := range []struct{ name, sheet, edit, want string }{
		{"a stretch along the motion is stretched", loopOfTwo, `"move", "refs": ["R2"], "by": [0, -1]`,
			"w1 0,8 0,4 10,4 10,7; w2 0,12 0,16 10,16 10,11"},
		{"a stretch across the motion is shifted", loopOfTwo, `"move", "refs": ["R2"], "by": [3, 0]`,
			"w1 0,8 0,4 13,4 13,8; w2 0,12 0,16 13,16 13,12"},
		{"both at once", loopOfTwo, `"move", "refs": ["R2"], "by": [3, 2]`,
			"w1 0,8 0,4 13,4 13,10; w2 0,12 0,16 13,16 13,14"},
		{"a wire does not run over the part that it ends at", loopOfTwo, `"move", "refs": ["R2"], "by": [0, -6]`,
			"w1 0,8 0,2 10,2; w2 0,12 0,16 10,16 10,6"},
		{"wires between moved parts move as they are", loopOfTwo, `"move", "refs": ["R1", "R2"], "by": [2, 1]`,
			"w1 2,9 2,5 12,5 12,9; w2 2,13 2,17 12,17 12,13"},
		{"wires follow a turn", loopOfTwo, `"turn", "refs": ["R2"]`,
			"w1 0,8 0,4 12,4 12,10; w2 0,12 0,16 8,16 8,10"},
		{"wires between turned parts turn with them", loopOfTwo, `"turn", "refs": ["R1", "R2"]`,
			"w1 7,5 11,5 11,15 7,15; w2 3,5 -1,5 -1,15 3,15"},
		{"wires between mirrored parts are mirrored", loopOfTwo, `"flip", "refs": ["R1", "R2"]`,
			"w1 10,8 10,4 0,4 0,8; w2 10,12 10,16 0,16 0,12"},
		{"a straight wire gets a jog", lineOfTwo, `"move", "refs": ["R2"], "by": [0, 3]`,
			"w1 2,10 5,10 5,13 8,13"},
		{"a straight wire is stretched", lineOfTwo, `"move", "refs": ["R2"], "by": [3, 0]`,
			"w1 2,10 11,10"},
		{"a wire whose ends meet is gone", lineOfTwo, `"move", "refs": ["R2"], "by": [-6, 0]`,
			""},
		{"what hangs on the middle of a wire stays", teeOfThree, `"move", "refs": ["R2"], "by": [0, 3]`,
			"w1 2,10 6,10 6,13 8,13; w2 5,10 5,12"},
		{"an end slides along the wire that it ends on", teeOfThree, `"move", "refs": ["R3"], "by": [2, 0]`,
			"w1 2,10 8,10; w2 7,10 7,12"},
		{"what ends on a moved wire follows", teeOfThree, `"move", "wires": ["w1"], "by": [0, -2]`,
			"w1 2,10 2,8 8,8 8,10; w2 5,8 5,12"},
		{"a wire that moves along itself stays", teeOfThree, `"move", "wires": ["w1"], "by": [2, 0]`,
			"w1 2,10 8,10; w2 5,10 5,12"},
		{"a rung slides along the rails", rungs, `"move", "wires": ["w5"], "by": [-2, 0]`,
			"w1 0,0 20,0; w2 0,6 20,6; w3 10,0 10,1; w4 10,5 10,6; w5 14,0 14,6; w6 4,4 4,6"},
		{"a rung with a part slides along the rails", rungs, `"move", "refs": ["R1"], "by": [3, 0]`,
			"w1 0,0 20,0; w2 0,6 20,6; w3 13,0 13,1; w4 13,5 13,6; w5 16,0 16,6; w6 4,4 4,6"},
		{"a pin that lies on a wire slides along it", rungs, `"move", "refs": ["R2"], "by": [2, 0]`,
			"w1 0,0 20,0; w2 0,6 20,6; w3 10,0 10,1; w4 10,5 10,6; w5 16,0 16,6; w6 6,4 6,6"},
		{"a pin that is pulled off a wire gets a new one", rungs, `"move", "refs": ["R2"], "by": [2, 1]`,
			"w1 0,0 20,0; w2 0,6 20,6; w3 10,0 10,1; w4 10,5 10,6; w5 16,0 16,6; w6 6,5 6,6; w7 6,1 6,0"},
		{"a joint moves along with the crossing", crossed, `"move", "wires": ["w2"], "by": [2, 0]`,
			"w1 0,5 0,0 10,0; w2 5,-2 7,-2 7,10; joint 7,0"},
		{"a joint on the way stays", crossed, `"move", "refs": ["R2"], "by": [2, 0]`,
			"w1 0,5 0,0 10,0; w2 7,-2 7,-1 5,-1 5,10; joint 5,0"},
		{"pins that touch and are pulled apart get a wire", touching, `"move", "refs": ["R2"], "by": [0, 3]`,
			"w1 0,4 0,7"},
		{"pins that touch and move together do not", touching, `"move", "refs": ["R1", "R2"], "by": [4, 3]`,
			""},
		{"a part that is put on a wire goes in series", apart, `"move", "refs": ["R3"], "by": [0, -10]`,
			"w1 2,10 8,10; w2 12,10 12,20 16,20; w3 12,10 18,10"},
	} {
		t.Run(c.name, func(t *testing.T) {
			after, _ := edited(t, decoded(t, dcSheet(c.sheet)), `[{"do": `+c.edit+`}]`)
			if got := inShort(after); got != c.want {
				t.Errorf("drawn\n%s\nwant\n%s", got, c.want)
			}
		})
	}
}

// inShort writes the wires and joints of a sheet in a line.
func inShort(sheet *schematic.Sheet) string {
	var list []string
	for _, wire := range sheet.Wires {
		text := wire.ID
		for _, p := range wire.Points {
			text += fmt.Sprintf(" %d,%d", p.X, p.Y)
		}
		list = append(list, text)
	}
	for _, p := range sheet.Joints {
		list = append(list, fmt.Sprintf("joint %d,%d", p.X, p.Y))
	}
	return strings.Join(list, "; ")
}

func TestAWireIsLedRoundWhatItMustNotJoin(t *testing.T) {
	// The jog in the middle would touch R3's pins, and the straight way down at R2 the end of a wire.
	sheet := decoded(t, dcSheet(`"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 10], "turn": 90}, {"ref": "R2", "kind": "resistor", "at": [10, 10], "turn": 90},
		{"ref": "R3", "kind": "resistor", "at": [5, 14]}],
		"wires": [{"points": [[2, 10], [8, 10]]}, {"points": [[8, 11], [12, 11]]}]`))
	after, made := edited(t, sheet, `[{"do": "move", "refs": ["R2"], "by": [0, 5]}]`)
	joins := schematic.Join(after)
	wire := joins.Pins[0][0]
	if joins.Pins[1][1] != wire || joins.Pins[2][0] == wire || joins.Pins[2][1] == wire || joins.Wires[1] == wire || len(made.Joined) > 0 {
		t.Errorf("%s: %q", inShort(after), made.Joined)
	}
}

func TestWhatAMoveCannotHelpJoiningIsTold(t *testing.T) {
	_, made := edited(t, decoded(t, dcSheet(apart)), `[{"do": "move", "refs": ["R3"], "by": [0, -8]}]`)
	if len(made.Joined) > 0 {
		t.Errorf("joined %q", made.Joined)
	}
	_, made = edited(t, decoded(t, dcSheet(apart)), `[{"do": "move", "refs": ["R2"], "by": [-14, 10]}]`)
	if want := []string{"-R2:2 and -R3:1 are joined now"}; !slices.Equal(made.Joined, want) {
		t.Errorf("joined %q, want %q", made.Joined, want)
	}
}

func TestAPartGoesInSeriesWhereItIsPut(t *testing.T) {
	const two = `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 2]}], "wires": [{"points": [[0, 0], [20, 0], [20, 9]]}, {"points": [[12, 0], [12, 5]]}]`
	for _, c := range []struct{ name, part, want string }{
		{"in the middle", `"at": [5, 0], "turn": 270`, "w1 0,0 3,0; w2 12,0 12,5; w3 7,0 20,0 20,9"},
		{"at the beginning, touching a pin", `"at": [2, 0], "turn": 270`, "w1 4,0 20,0 20,9; w2 12,0 12,5"},
		{"on the last stretch", `"at": [20, 5]`, "w1 0,0 20,0 20,3; w2 12,0 12,5; w3 20,7 20,9"},
		{"not where something hangs between", `"at": [13, 0], "turn": 270`, "w1 0,0 20,0 20,9; w2 12,0 12,5"},
		{"where something hangs at a pin", `"at": [14, 0], "turn": 270`, "w1 0,0 12,0; w2 12,0 12,5; w3 16,0 20,0 20,9"},
		{"not round a corner", `"at": [20, 1]`, "w1 0,0 20,0 20,9; w2 12,0 12,5"},
	} {
		t.Run(c.name, func(t *testing.T) {
			after, made := edited(t, decoded(t, dcSheet(two)), `[{"do": "add", "part": {"ref": "R9", "kind": "resistor", `+c.part+`}}]`)
			if got := inShort(after); got != c.want {
				t.Errorf("drawn %s\nwant  %s", got, c.want)
			}
			if cut := len(after.Wires) > 2; cut != (len(made.Wires) == 1) {
				t.Errorf("made %v", made.Wires)
			}
		})
	}
}
