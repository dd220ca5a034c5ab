package schematic_test

import (
	"errors"
	"reflect"
	"slices"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// edited applies the text of a list of edits that must be right.
func edited(t *testing.T, sheet *schematic.Sheet, text string) (*schematic.Sheet, schematic.Made) {
	t.Helper()
	edits, err := schematic.DecodeEdits([]byte(text))
	if err != nil {
		t.Fatalf("%v\n%s", err, text)
	}
	written := string(schematic.Encode(sheet))
	after, _, made, err := schematic.Apply(sheet, edits)
	if err != nil {
		t.Fatalf("%v\n%s\n%s", err, text, written)
	}
	if string(schematic.Encode(sheet)) != written {
		t.Fatalf("%s changed the sheet that it was given", text)
	}
	return after, made
}

const bench = `"parts": [
	{"ref": "G1", "kind": "dc-supply", "at": [0, 0]},
	{"ref": "S1", "kind": "switch", "at": [10, 0]},
	{"ref": "S2", "kind": "switch", "at": [20, 0], "values": {"positions": ["off", "hand", "auto"], "closed_in": ["auto"]}},
	{"ref": "R1", "kind": "resistor", "at": [30, 0], "values": {"resistance": "4k7"}}]`

const benchCases = `"cases": [{"name": "Rest"}, {"name": "On", "follows": "Rest", "positions": {"S1": "operated", "S2": "auto"}}, {"name": "Off", "follows": "On"}]`

func benchSheet(t *testing.T) *schematic.Sheet {
	return decoded(t, dcSheet(bench, benchCases, wiresOf(`[0, -2], [0, -6], [10, -6], [10, -2]`, `[5, -9], [5, 9]`), `"reference": "G1:2"`))
}

func TestAddedPartsGetTheNextFreeNumberOfTheirLetter(t *testing.T) {
	after, made := edited(t, benchSheet(t), `[
		{"do": "add", "part": {"kind": "resistor", "at": [40, 20]}},
		{"do": "add", "part": {"kind": "battery", "at": [44, 20]}},
		{"do": "add", "part": {"ref": "R5", "kind": "resistor", "at": [48, 20]}},
		{"do": "add", "part": {"kind": "lamp", "at": [52, 20], "turn": 90, "values": {"voltage": "12 V"}}},
		{"do": "add", "part": {"kind": "earth", "at": [56, 20]}}]`)
	if want := []string{"R2", "G2", "R5", "P1", "XE1"}; !slices.Equal(made.Refs, want) {
		t.Errorf("made %v, want %v", made.Refs, want)
	}
	if lamp := after.Part("P1"); lamp.Kind != kinds.Lamp || lamp.Turn != 90 || lamp.Values["voltage"].Written != "12 V" {
		t.Errorf("%+v", lamp)
	}
}

func TestAPartThatIsPutOnAnotherTellsWhatItTouches(t *testing.T) {
	_, made := edited(t, benchSheet(t), `[{"do": "add", "part": {"ref": "R7", "kind": "resistor", "at": [12, -6], "turn": 270}},
		{"do": "add", "part": {"ref": "R8", "kind": "resistor", "at": [10, 4]}},
		{"do": "add", "part": {"ref": "R9", "kind": "resistor", "at": [16, -6], "turn": 270}}]`)
	want := []string{"-R7:1 now touches wire w1", "-R8:1 now touches -S1:2", "-R9:1 now touches -R7:2"}
	if !slices.Equal(made.Joined, want) {
		t.Errorf("joined %q, want %q", made.Joined, want)
	}
}

func TestSetChangesValuesAndNullBringsTheDefaultBack(t *testing.T) {
	sheet := benchSheet(t)
	after, _ := edited(t, sheet, `[{"do": "set", "ref": "R1", "values": {"power": "1 W"}}]`)
	if r := after.Part("R1"); r.Values["power"].Number != 1 || r.Values["resistance"].Written != "4k7" {
		t.Errorf("%+v", r)
	}
	after, _ = edited(t, sheet, `[{"do": "set", "ref": "R1", "values": {"resistance": null}}]`)
	if r := after.Part("R1"); len(r.Values) != 0 {
		t.Errorf("%+v", r)
	}
	after, _ = edited(t, sheet, `[{"do": "set", "ref": "S2", "values": {"positions": ["off", "hand"], "closed_in": ["hand"]}}]`)
	if c := after.Cases[1]; !reflect.DeepEqual(c.Positions, map[string]string{"S1": "operated"}) {
		t.Errorf("a position that is gone stays in the case: %v", c.Positions)
	}
}

func TestARenamedPartKeepsItsPositionsAndTheReference(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "rename", "ref": "S1", "to": "S11"}, {"do": "rename", "ref": "G1", "to": "G7"}]`)
	if want := (map[string]string{"S11": "operated", "S2": "auto"}); !reflect.DeepEqual(after.Cases[1].Positions, want) {
		t.Errorf("positions %v", after.Cases[1].Positions)
	}
	if after.Reference != "G7:2" || after.Part("G1") != nil {
		t.Errorf("reference %q", after.Reference)
	}
}

func TestARemovedPartLeavesItsWiresAndTheCases(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "remove", "refs": ["S1", "S2"], "wires": []}]`)
	if len(after.Parts) != 2 || len(after.Wires) != 2 || after.Cases[1].Positions != nil {
		t.Errorf("%s", schematic.Encode(after))
	}
	after, _ = edited(t, after, `[{"do": "joint", "at": [5, -6]}, {"do": "remove", "refs": [], "wires": ["w2"]}]`)
	if len(after.Wires) != 1 || len(after.Joints) != 0 {
		t.Errorf("the joint of a wire that is gone stays: %s", schematic.Encode(after))
	}
}

func TestWiresAreDrawnWithoutIdlePlaces(t *testing.T) {
	after, made := edited(t, benchSheet(t), `[{"do": "wire", "points": [[0, 2], [0, 2], [0, 4], [0, 8], [3, 8], [8, 8], [8, 8]]}]`)
	if want := []string{"w3"}; !slices.Equal(made.Wires, want) {
		t.Fatalf("made %v", made.Wires)
	}
	if want := line(p(0, 2), p(0, 8), p(8, 8)); !slices.Equal(after.Wire("w3").Points, want) {
		t.Errorf("drawn %v", after.Wire("w3").Points)
	}
	after, _ = edited(t, after, `[{"do": "reroute", "wire": "w3", "points": [[0, 2], [0, 7], [10, 7], [10, 2]]}]`)
	if want := line(p(0, 2), p(0, 7), p(10, 7), p(10, 2)); !slices.Equal(after.Wire("w3").Points, want) {
		t.Errorf("led %v", after.Wire("w3").Points)
	}
}

func TestANewWireDoesNotTakeTheNameOfOneThatTheSameBatchRemoves(t *testing.T) {
	after, made := edited(t, benchSheet(t), `[{"do": "remove", "wires": ["w1"]}, {"do": "wire", "points": [[0, -2], [0, -3]]}]`)
	if want := []string{"w3"}; !slices.Equal(made.Wires, want) || after.Wire("w1") != nil {
		t.Errorf("made %v", made.Wires)
	}
}

func TestWhatWasMadeIsToldAsItIsAfterTheWholeBatch(t *testing.T) {
	_, made := edited(t, benchSheet(t), `[
		{"do": "add", "part": {"kind": "lamp", "at": [40, 20]}}, {"do": "add", "part": {"kind": "lamp", "at": [50, 20]}},
		{"do": "rename", "ref": "P1", "to": "P9"}, {"do": "wire", "points": [[40, 22], [40, 30]]}, {"do": "remove", "refs": ["P2"], "wires": ["w3"]}]`)
	if !slices.Equal(made.Refs, []string{"P9"}) || len(made.Wires) > 0 {
		t.Errorf("made %v", made)
	}
}

func TestJointsComeAndGo(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "joint", "at": [5, -6]}]`)
	if joins := schematic.Join(after); joins.Wires[0] != joins.Wires[1] {
		t.Error("the crossing is not joined")
	}
	after, _ = edited(t, after, `[{"do": "remove-joint", "at": [5, -6]}]`)
	if len(after.Joints) != 0 {
		t.Errorf("joints %v", after.Joints)
	}
}

func TestLabelsAreMovedAndGivenBack(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "label", "ref": "R1", "at": [3, -1]}]`)
	if label := after.Part("R1").Label; label == nil || *label != p(3, -1) {
		t.Errorf("label %v", label)
	}
	after, _ = edited(t, after, `[{"do": "label", "ref": "R1"}]`)
	if label := after.Part("R1").Label; label != nil {
		t.Errorf("label %v", label)
	}
}

func caseNames(sheet *schematic.Sheet) []string {
	var names []string
	for _, c := range sheet.Cases {
		names = append(names, c.Name)
	}
	return names
}

func TestCasesAreAddedReplacedOrderedRenamedAndRemoved(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[
		{"do": "case", "case": {"name": "Low", "supply": "low", "positions": {"S1": "rest", "S2": "hand"}}, "after": "Rest"},
		{"do": "case", "case": {"name": "Last", "follows": "Off"}}]`)
	if want := []string{"Rest", "Low", "On", "Off", "Last"}; !slices.Equal(caseNames(after), want) {
		t.Fatalf("cases %v", caseNames(after))
	}
	if low := after.Cases[1]; low.Supply != kinds.Low || !reflect.DeepEqual(low.Positions, map[string]string{"S2": "hand"}) {
		t.Errorf("%+v", low)
	}
	after, _ = edited(t, after, `[{"do": "case", "case": {"name": "On", "positions": {"S2": "auto"}}}, {"do": "rename-case", "name": "On", "to": "Run"},
		{"do": "order-cases", "names": ["Low", "Run", "Rest", "Off", "Last"]}]`)
	if want := []string{"Low", "Run", "Rest", "Off", "Last"}; !slices.Equal(caseNames(after), want) || after.Cases[3].Follows != "Run" {
		t.Fatalf("%+v", after.Cases)
	}
	after, _ = edited(t, after, `[{"do": "remove-case", "name": "Off"}]`)
	if want := []string{"Low", "Run", "Rest", "Last"}; !slices.Equal(caseNames(after), want) || after.Cases[3].Follows != "Run" {
		t.Fatalf("%+v", after.Cases)
	}
	after, _ = edited(t, schematic.New(""), `[{"do": "rename-case", "name": "Rest", "to": "A"}, {"do": "remove-case", "name": "A"}]`)
	if want := []string{"Rest"}; !slices.Equal(caseNames(after), want) {
		t.Errorf("cases %v", caseNames(after))
	}
}

func TestOperateSetsOnePositionInOneCase(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "operate", "case": "On", "ref": "S1", "position": "rest"}, {"do": "operate", "case": "Off", "ref": "S2", "position": "hand"}]`)
	if !reflect.DeepEqual(after.Cases[1].Positions, map[string]string{"S2": "auto"}) || !reflect.DeepEqual(after.Cases[2].Positions, map[string]string{"S2": "hand"}) {
		t.Errorf("%+v", after.Cases)
	}
}

func TestTheTitleBlockAndTheSettingsAreSetFieldByField(t *testing.T) {
	after, _ := edited(t, benchSheet(t), `[{"do": "sheet", "set": {"title": "Bench", "size": "A3", "symbols": "ansi", "reference": "", "number": "7", "owner": "o", "author": "a"}}]`)
	if after.Title != "Bench" || after.Size != "A3" || after.Symbols != kinds.ANSI || after.Reference != "" || after.System.Kind != "dc" {
		t.Errorf("%+v", after)
	}
	after, _ = edited(t, schematic.New(""), `[{"do": "sheet", "set": {"system": {"kind": "ac", "hz": 50}}}]`)
	if after.System != (kinds.System{Kind: "ac", Hertz: 50}) {
		t.Errorf("%+v", after.System)
	}
}

func TestEditsThatMakeNoSenseAreRefusedWithTheirPlace(t *testing.T) {
	sheet := benchSheet(t)
	for _, c := range []struct{ place, edits string }{
		{"edits", `{}`},
		{"edits", `[]`},
		{"edits[0]", `[3]`},
		{"edits[0].do", `[{"do": "paint"}]`},
		{"edits[0].do", `[{"do": "undo"}]`},
		{"edits[0].refs", `[{"do": "turn"}]`},
		{"edits[0].by", `[{"do": "move", "refs": ["R1"], "by": [1]}]`},
		{"edits[0].colour", `[{"do": "remove", "refs": ["R1"], "colour": "red"}]`},
		{"edits[0]", `[{"do": "move", "refs": [], "wires": [], "by": [1, 0]}]`},
		{"edits[0]", `[{"do": "move", "refs": ["R1"], "by": [9999, 0]}]`},
		{"edits[0].part.kind", `[{"do": "add", "part": {"kind": "flux", "at": [0, 0]}}]`},
		{"edits[1].part.values.resistance", `[{"do": "sheet", "set": {}}, {"do": "add", "part": {"kind": "resistor", "at": [90, 0], "values": {"resistance": "x"}}}]`},
		{"edits[0].part.values.closed_in", `[{"do": "add", "part": {"kind": "switch", "at": [90, 0], "values": {"closed_in": ["auto"]}}}, {"do": "sheet", "set": {}}]`},
		{"edits[0].values.resistance", `[{"do": "set", "ref": "R1", "values": {"resistance": -5}}]`},
		{"edits[0].values.colour", `[{"do": "set", "ref": "R1", "values": {"colour": null}}]`},
		{"edits[0].values.closed_in[0]", `[{"do": "set", "ref": "S2", "values": {"closed_in": ["on"]}}]`},
		{"edits[0].to", `[{"do": "rename", "ref": "R1", "to": "R 1"}]`},
		{"edits[0].points[2]", `[{"do": "wire", "points": [[0, 40], [0, 40], [4, 41]]}]`},
		{"edits[0].points", `[{"do": "wire", "points": [[0, 40], [4, 40], [0, 40]]}]`},
		{"edits[0].points", `[{"do": "wire", "points": [[0, -6], [5, -6]]}]`},
		{"edits[1].points", `[{"do": "wire", "points": [[10, -6], [20, -6]]}, {"do": "wire", "points": [[5, -6], [15, -6]]}]`},
		{"edits[0].at", `[{"do": "joint", "at": [6, -6]}]`},
		{"edits[0].case.positions.S1", `[{"do": "case", "case": {"name": "New", "positions": {"S1": "auto"}}}]`},
		{"edits[0].case.follows", `[{"do": "case", "case": {"name": "New", "follows": "Off"}, "after": "Rest"}]`},
		{"edits[0]", `[{"do": "case", "case": {"name": "On"}, "after": "Off"}]`},
		{"edits[0]", `[{"do": "order-cases", "names": ["On", "Rest", "Off"]}]`},
		{"edits[0].names[1]", `[{"do": "order-cases", "names": ["Rest", "Rest", "Off"]}]`},
		{"edits[0].position", `[{"do": "operate", "case": "On", "ref": "S1", "position": "auto"}]`},
		{"edits[0].position", `[{"do": "operate", "case": "On", "ref": "R1", "position": "rest"}]`},
		{"edits[0].set.size", `[{"do": "sheet", "set": {"size": "A9"}}]`},
		{"edits[0].set.parts", `[{"do": "sheet", "set": {"parts": []}}]`},
		{"edits[0].set.system", `[{"do": "sheet", "set": {"system": {"kind": "ac", "hz": 50}}}]`},
	} {
		edits, err := schematic.DecodeEdits([]byte(c.edits))
		if err == nil {
			_, _, _, err = schematic.Apply(sheet, edits)
		}
		var wrong *schematic.PlaceError
		if !errors.As(err, &wrong) || wrong.Place != c.place {
			t.Errorf("error %v, want one at %q: %s", err, c.place, c.edits)
		}
	}
}

func TestEditsWhoseTargetIsGoneAreConflicts(t *testing.T) {
	sheet := benchSheet(t)
	for _, text := range []string{
		`[{"do": "move", "refs": ["R9"], "by": [1, 0]}]`,
		`[{"do": "move", "wires": ["w9"], "by": [1, 0]}]`,
		`[{"do": "turn", "refs": ["R9"]}]`,
		`[{"do": "set", "ref": "R9", "values": {}}]`,
		`[{"do": "rename", "ref": "R9", "to": "R8"}]`,
		`[{"do": "rename", "ref": "R1", "to": "S1"}]`,
		`[{"do": "add", "part": {"ref": "R1", "kind": "resistor", "at": [90, 0]}}]`,
		`[{"do": "remove", "refs": ["R1", "R9"]}]`,
		`[{"do": "remove", "refs": ["R1"]}, {"do": "label", "ref": "R1"}]`,
		`[{"do": "reroute", "wire": "w9", "points": [[0, 0], [1, 0]]}]`,
		`[{"do": "remove-joint", "at": [5, -6]}]`,
		`[{"do": "operate", "case": "Dark", "ref": "S1", "position": "rest"}]`,
		`[{"do": "operate", "case": "On", "ref": "S9", "position": "rest"}]`,
		`[{"do": "rename-case", "name": "Dark", "to": "Light"}]`,
		`[{"do": "rename-case", "name": "On", "to": "Off"}]`,
		`[{"do": "remove-case", "name": "Dark"}]`,
		`[{"do": "order-cases", "names": ["Rest", "On"]}]`,
		`[{"do": "case", "case": {"name": "New"}, "after": "Dark"}]`,
	} {
		edits, err := schematic.DecodeEdits([]byte(text))
		if err != nil {
			t.Fatal(err)
		}
		after, change, _, err := schematic.Apply(sheet, edits)
		var conflict *schematic.ConflictError
		if !errors.As(err, &conflict) || after != nil || change != nil {
			t.Errorf("error %v, want a conflict: %s", err, text)
		}
	}
}
