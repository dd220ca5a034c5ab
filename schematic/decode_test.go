package schematic_test

import (
	"errors"
	"fmt"
	"reflect"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// dcSheet is the text of a DC sheet with further fields.
func dcSheet(fields ...string) string {
	return strings.Join(append([]string{`{"format": "loopwright-sheet/1", "system": {"kind": "dc"}`}, fields...), ", ") + "}"
}

// acSheet is the text of an AC sheet with further fields.
func acSheet(fields ...string) string {
	return strings.Join(append([]string{`{"format": "loopwright-sheet/1", "system": {"kind": "ac", "hz": 50}`}, fields...), ", ") + "}"
}

// decoded reads the text of a sheet that must be right.
func decoded(t *testing.T, text string) *schematic.Sheet {
	t.Helper()
	sheet, err := schematic.Decode([]byte(text))
	if err != nil {
		t.Fatalf("%v\n%.2000s", err, text)
	}
	return sheet
}

const motor = `{
  "format": "loopwright-sheet/1",
  "title": "Pump P2 start", "number": "HL-1002", "owner": "Harrow Lane Glasshouses", "author": "",
  "system": {"kind": "dc"},
  "symbols": "ansi", "size": "A3", "reference": "0V",
  "parts": [
    {"ref": "G1", "kind": "dc-supply", "at": [6, 10], "turn": 0, "values": {"voltage": "24 V", "resistance": 0.05}},
    {"ref": "S1", "kind": "switch", "at": [12, 6], "turn": 90, "flip": true, "label": [-1, 3], "values": {"form": "make", "actuator": "push"}},
    {"ref": "K1:1", "kind": "resistor", "at": [20, 10], "values": {"resistance": "4k7"}}
  ],
  "wires": [{"points": [[6, 8], [6, 6], [10, 6]]}, {"id": "w1", "points": [[14, 6], [20, 6], [20, 8]]}, {"points": [[13, 3], [13, 9]]},
    {"points": [[18, 3], [18, 9]]}],
  "joints": [[18, 6]],
  "cases": [
    {"name": "Rest"},
    {"name": "Start held", "follows": "Rest", "positions": {"S1": "operated"}},
    {"name": "Running", "follows": "Start held", "positions": {"S1": "rest"}, "supply": "low"}
  ]
}`

func TestASheetFileIsReadWhole(t *testing.T) {
	sheet := decoded(t, motor)
	label := p(-1, 3)
	want := &schematic.Sheet{
		Title: "Pump P2 start", Number: "HL-1002", Owner: "Harrow Lane Glasshouses",
		System: kinds.System{Kind: "dc"}, Symbols: kinds.ANSI, Size: "A3", Reference: "0V",
		Parts: []schematic.Part{
			{Ref: "G1", Kind: kinds.DCSupply, At: p(6, 10), Values: kinds.Values{"resistance": kinds.Number(0.05)}},
			{Ref: "S1", Kind: kinds.Switch, At: p(12, 6), Turn: 90, Flip: true, Label: &label, Values: kinds.Values{}},
			{Ref: "K1:1", Kind: kinds.Resistor, At: p(20, 10), Values: kinds.Values{"resistance": {Form: kinds.Quantity, Number: 4700, Written: "4k7"}}},
		},
		Wires: []schematic.Wire{
			{ID: "w2", Points: line(p(6, 8), p(6, 6), p(10, 6))}, {ID: "w1", Points: line(p(14, 6), p(20, 6), p(20, 8))},
			{ID: "w3", Points: line(p(13, 3), p(13, 9))}, {ID: "w4", Points: line(p(18, 3), p(18, 9))},
		},
		Joints: line(p(18, 6)),
		Cases: []schematic.Case{
			{Name: "Rest", Supply: kinds.Nominal},
			{Name: "Start held", Follows: "Rest", Supply: kinds.Nominal, Positions: map[string]string{"S1": "operated"}},
			{Name: "Running", Follows: "Start held", Supply: kinds.Low},
		},
	}
	if !reflect.DeepEqual(sheet, want) {
		t.Errorf("read %+v\nwant %+v", sheet, want)
	}
}

func TestASheetWithoutCasesHasTheCaseRest(t *testing.T) {
	for _, text := range []string{dcSheet(), dcSheet(`"cases": []`)} {
		sheet := decoded(t, text)
		want := []schematic.Case{{Name: "Rest", Supply: kinds.Nominal}}
		if !reflect.DeepEqual(sheet.Cases, want) || sheet.Size != "A4" || sheet.Symbols != kinds.IEC {
			t.Errorf("%+v", sheet)
		}
	}
}

// resistorWith is the text of a list of parts with one resistor R1 that has further fields.
func resistorWith(fields string) string {
	return `"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 0]` + fields + `}]`
}

func wiresOf(chains ...string) string {
	for i := range chains {
		chains[i] = `{"points": [` + chains[i] + `]}`
	}
	return `"wires": [` + strings.Join(chains, ", ") + `]`
}

func TestWhatMakesNoSenseIsRefusedWithItsPlace(t *testing.T) {
	const switches = `"parts": [{"ref": "S1", "kind": "switch", "at": [0, 0]}, {"ref": "R1", "kind": "resistor", "at": [5, 0]}]`
	for _, c := range []struct{ place, text string }{
		{"colour", dcSheet(`"colour": "red"`)},
		{"Title", dcSheet(`"Title": "keys are spelled as they are"`)},
		{"title", dcSheet(`"title": "a"`, `"title": "b"`)},
		{"title", dcSheet(`"title": null`)},
		{"title", dcSheet(`"title": 3`)},
		{"title", dcSheet(`"title": "` + strings.Repeat("x", 201) + `"`)},
		{"owner", dcSheet(`"owner": "a\u0007b"`)},
		{"size", dcSheet(`"size": "A0"`)},
		{"symbols", dcSheet(`"symbols": "IEC"`)},
		{"", `[]`},
		{"format", `{"system": {"kind": "dc"}}`},
		{"format", `{"format": "loopwright-sheet/2", "system": {"kind": "dc"}}`},
		{"system", `{"format": "loopwright-sheet/1"}`},
		{"system.kind", `{"format": "loopwright-sheet/1", "system": {"kind": "mixed"}}`},
		{"system.hz", `{"format": "loopwright-sheet/1", "system": {"kind": "ac"}}`},
		{"system.hz", `{"format": "loopwright-sheet/1", "system": {"kind": "ac", "hz": 0}}`},
		{"system.hz", `{"format": "loopwright-sheet/1", "system": {"kind": "dc", "hz": 50}}`},
		{"parts", dcSheet(`"parts": {}`)},
		{"parts[0]", dcSheet(`"parts": [7]`)},
		{"parts[0].ref", dcSheet(`"parts": [{"kind": "resistor", "at": [0, 0]}]`)},
		{"parts[0].kind", dcSheet(`"parts": [{"ref": "R1", "at": [0, 0]}]`)},
		{"parts[0].kind", dcSheet(`"parts": [{"ref": "R1", "kind": "flux", "at": [0, 0]}]`)},
		{"parts[0].at", dcSheet(`"parts": [{"ref": "R1", "kind": "resistor"}]`)},
		{"parts[0].at", dcSheet(`"parts": [{"ref": "R1", "kind": "resistor", "at": [0.5, 0]}]`)},
		{"parts[0].at", dcSheet(`"parts": [{"ref": "R1", "kind": "resistor", "at": [10001, 0]}]`)},
		{"parts[0].at", dcSheet(`"parts": [{"ref": "R1", "kind": "resistor", "at": [0, 0, 0]}]`)},
		{"parts[0].turn", dcSheet(resistorWith(`, "turn": 45`))},
		{"parts[0].turn", dcSheet(resistorWith(`, "turn": 360`))},
		{"parts[0].flip", dcSheet(resistorWith(`, "flip": 1`))},
		{"parts[0].rotation", dcSheet(resistorWith(`, "rotation": 90`))},
		{"parts[0].values.colour", dcSheet(resistorWith(`, "values": {"colour": "red"}`))},
		{"parts[0].values.resistance", dcSheet(resistorWith(`, "values": {"resistance": "many"}`))},
		{"parts[0].values.resistance", dcSheet(resistorWith(`, "values": {"resistance": "24 V"}`))},
		{"parts[0].values.resistance", dcSheet(resistorWith(`, "values": {"resistance": null}`))},
		{"parts[0].values.resistance", dcSheet(resistorWith(`, "values": {"resistance": 1, "resistance": 2}`))},
		{"parts[0].values.resistance", dcSheet(resistorWith(`, "values": {"resistance": 1e999}`))},
		{"parts[1].ref", dcSheet(`"parts": [{"ref": "R1", "kind": "lamp", "at": [0, 0]}, {"ref": "R1", "kind": "lamp", "at": [9, 0]}]`)},
		{"wires[0]", dcSheet(`"wires": [[[0, 0], [1, 0]]]`)},
		{"wires[0].points", dcSheet(wiresOf(`[0, 0]`))},
		{"wires[0].points[1]", dcSheet(wiresOf(`[0, 0], [0, 0]`))},
		{"wires[0].points[2]", dcSheet(wiresOf(`[0, 0], [4, 0], [5, 1]`))},
		{"wires[0].points[1]", dcSheet(wiresOf(`[0, 0], [4]`))},
		{"wires[1]", dcSheet(wiresOf(`[0, 0], [4, 0], [4, 4]`, `[0, 0], [4, 0], [4, 4]`))},
		{"wires[1]", dcSheet(wiresOf(`[0, 0], [4, 0], [4, 4]`, `[4, 4], [4, 0], [0, 0]`))},
		{"wires[1].id", dcSheet(`"wires": [{"id": "a", "points": [[0, 0], [1, 0]]}, {"id": "a", "points": [[5, 0], [6, 0]]}]`)},
		{"wires[0].id", dcSheet(`"wires": [{"id": "", "points": [[0, 0], [1, 0]]}]`)},
		{"wires[0].id", dcSheet(`"wires": [{"id": "a b", "points": [[0, 0], [1, 0]]}]`)},
		{"joints[0]", dcSheet(`"joints": [[0, 0]]`)},
		{"joints[0]", dcSheet(wiresOf(`[0, 0], [4, 0]`), `"joints": [[2, 0]]`)},
		{"joints[0]", dcSheet(wiresOf(`[0, 0], [4, 0], [4, 4]`), `"joints": [[4, 0]]`)},
		{"joints[0]", dcSheet(wiresOf(`[0, 0], [4, 0]`, `[2, 0], [2, 4]`), `"joints": [[2, 0]]`)},
		{"joints[1]", dcSheet(wiresOf(`[0, 0], [4, 0]`, `[2, -4], [2, 4]`), `"joints": [[2, 0], [2, 0]]`)},
		{"cases[0].name", dcSheet(`"cases": [{}]`)},
		{"cases[0].name", dcSheet(`"cases": [{"name": " "}]`)},
		{"cases[1].name", dcSheet(`"cases": [{"name": "A"}, {"name": "A"}]`)},
		{"cases[0].follows", dcSheet(`"cases": [{"name": "A", "follows": "A"}]`)},
		{"cases[0].follows", dcSheet(`"cases": [{"name": "A", "follows": "B"}, {"name": "B"}]`)},
		{"cases[0].follows", dcSheet(`"cases": [{"name": "A", "follows": "Z"}]`)},
		{"cases[0].supply", dcSheet(`"cases": [{"name": "A", "supply": "full"}]`)},
		{"cases[0].positions.S1", dcSheet(switches, `"cases": [{"name": "A", "positions": {"S1": "pressed"}}]`)},
		{"cases[0].positions.S9", dcSheet(switches, `"cases": [{"name": "A", "positions": {"S9": "operated"}}]`)},
		{"cases[0].positions.R1", dcSheet(switches, `"cases": [{"name": "A", "positions": {"R1": "operated"}}]`)},
		{"cases[0].positions.S1", dcSheet(switches, `"cases": [{"name": "A", "positions": {"S1": "rest", "S1": "operated"}}]`)},
		{"cases[0].timers.S1", dcSheet(switches, `"cases": [{"name": "A", "timers": {"S1": "running"}}]`)},
		{"parts[0].kind", acSheet(`"parts": [{"ref": "G1", "kind": "dc-supply", "at": [0, 0]}]`)},
		{"parts[0].kind", acSheet(`"parts": [{"ref": "G1", "kind": "battery", "at": [0, 0]}]`)},
	} {
		_, err := schematic.Decode([]byte(c.text))
		var wrong *schematic.PlaceError
		if !errors.As(err, &wrong) || wrong.Place != c.place || wrong.Message == "" {
			t.Errorf("error %v, want one at %q: %s", err, c.place, c.text)
		}
		if syntax := (*schematic.SyntaxError)(nil); errors.As(err, &syntax) {
			t.Errorf("this is JSON: %s", c.text)
		}
	}
}

func TestReferencesAreCheckedAsTheyAreWritten(t *testing.T) {
	for ref, right := range map[string]bool{
		"K1": true, "K1:1": true, "K1:12": true, "QA1.2": true, "X_1-a+b/c": true, "Ä7": true, "Кл1": true, "R": true, "12345678901234567890": true,
		"": false, "-K1": false, "K 1": false, "K1:": false, "K1:A": false, ":1": false, "K1:1:1": false, "K1\t": false, "K\u200b": false,
		"123456789012345678901": false, "K1,2": false,
	} {
		text := dcSheet(fmt.Sprintf(`"parts": [{"ref": %q, "kind": "resistor", "at": [0, 0]}]`, ref))
		_, err := schematic.Decode([]byte(text))
		var wrong *schematic.PlaceError
		if right && err != nil || !right && (!errors.As(err, &wrong) || wrong.Place != "parts[0].ref") {
			t.Errorf("%q: %v", ref, err)
		}
	}
}

func TestTextThatIsNoJSONIsToldFromJSONThatMakesNoSense(t *testing.T) {
	for _, c := range []struct{ place, text string }{
		{"", "\ufeff" + dcSheet()},
		{"", "{\"format\": \"\xff\"}"},
		{"line 1", ""},
		{"line 1", "{"},
		{"line 2", "{\"format\":\n oops}"},
		{"line 1", dcSheet() + "{}"},
		{"line 1", dcSheet() + "x"},
		{"line 1", `{"title": "\ud800"}`},
		{"line 1", `{"title": "a",}`},
		{"line 1", `{title: "a"}`},
	} {
		_, err := schematic.Decode([]byte(c.text))
		var syntax *schematic.SyntaxError
		if !errors.As(err, &syntax) || syntax.Place != c.place || syntax.Message == "" {
			t.Errorf("error %v, want one at %q: %s", err, c.place, c.text)
		}
		if wrong := (*schematic.PlaceError)(nil); !errors.As(err, &wrong) || wrong.Place != c.place {
			t.Errorf("a text that is no JSON has no place either: %v", err)
		}
	}
}

func TestNestingWithoutEndIsRefused(t *testing.T) {
	for _, text := range []string{strings.Repeat("[", 1_000_000), strings.Repeat(`{"parts":`, 1_000_000)} {
		if _, err := schematic.Decode([]byte(text)); err == nil {
			t.Error("no error")
		}
	}
}

func TestAReferenceThatNamesNothingIsKept(t *testing.T) {
	for _, name := range []string{"0V", "G9:2"} {
		if sheet := decoded(t, dcSheet(`"reference": "`+name+`"`)); sheet.Reference != name {
			t.Errorf("reference %q, want %q", sheet.Reference, name)
		}
	}
}
