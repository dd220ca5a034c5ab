package schematic_test

import (
	"testing"

	"loopwright/schematic"
)

func TestASheetIsWrittenOneThingALine(t *testing.T) {
	const want = `{
  "format": "loopwright-sheet/1",
  "title": "Pump P2 start", "number": "HL-1002", "owner": "Harrow Lane Glasshouses",
  "system": {"kind": "dc"},
  "symbols": "ansi", "size": "A3", "reference": "0V",
  "parts": [
    {"ref": "G1", "kind": "dc-supply", "at": [6, 10], "values": {"resistance": 0.05}},
    {"ref": "S1", "kind": "switch", "at": [12, 6], "turn": 90, "flip": true, "label": [-1, 3]},
    {"ref": "K1:1", "kind": "resistor", "at": [20, 10], "values": {"resistance": "4k7"}}
  ],
  "wires": [
    {"id": "w2", "points": [[6, 8], [6, 6], [10, 6]]},
    {"id": "w1", "points": [[14, 6], [20, 6], [20, 8]]},
    {"id": "w3", "points": [[13, 3], [13, 9]]},
    {"id": "w4", "points": [[18, 3], [18, 9]]}
  ],
  "joints": [[18, 6]],
  "cases": [
    {"name": "Rest"},
    {"name": "Start held", "follows": "Rest", "positions": {"S1": "operated"}},
    {"name": "Running", "follows": "Start held", "supply": "low"}
  ]
}
`
	if got := string(schematic.Encode(decoded(t, motor))); got != want {
		t.Errorf("written\n%s\nwant\n%s", got, want)
	}
}

func TestAnEmptySheetIsWrittenInAFewLines(t *testing.T) {
	const want = `{
  "format": "loopwright-sheet/1",
  "title": "A \"B\" <C> é",
  "system": {"kind": "dc"},
  "symbols": "iec", "size": "A4",
  "parts": [],
  "wires": []
}
`
	if got := string(schematic.Encode(schematic.New(`A "B" <C> é`))); got != want {
		t.Errorf("written\n%s\nwant\n%s", got, want)
	}
}

func TestWhatSaysNoMoreThanTheDefaultIsLeftOut(t *testing.T) {
	text := dcSheet(`"parts": [
		{"ref": "R1", "kind": "resistor", "at": [0, 0], "turn": 0, "flip": false, "values": {"resistance": "1k", "power": "500 mW"}},
		{"ref": "R2", "kind": "resistor", "at": [5, 0], "values": {"resistance": 1000, "power": 0.5}}]`,
		`"cases": [{"name": "Rest", "supply": "nominal", "positions": {}, "timers": {}}]`)
	const want = `{
  "format": "loopwright-sheet/1",
  "system": {"kind": "dc"},
  "symbols": "iec", "size": "A4",
  "parts": [
    {"ref": "R1", "kind": "resistor", "at": [0, 0], "values": {"power": "500 mW"}},
    {"ref": "R2", "kind": "resistor", "at": [5, 0], "values": {"power": 0.5}}
  ],
  "wires": []
}
`
	if got := string(schematic.Encode(decoded(t, text))); got != want {
		t.Errorf("written\n%s\nwant\n%s", got, want)
	}
}

func TestAnACSheetIsWrittenWithItsFrequency(t *testing.T) {
	const text = `{
  "format": "loopwright-sheet/1",
  "system": {"kind": "ac", "hz": 60},
  "symbols": "iec", "size": "A4",
  "parts": [
    {"ref": "G1", "kind": "voltage-source", "at": [0, 0], "values": {"voltage": 120, "phase": "30°"}}
  ],
  "wires": []
}
`
	if got := string(schematic.Encode(decoded(t, text))); got != text {
		t.Errorf("written\n%s\nwant\n%s", got, text)
	}
}
