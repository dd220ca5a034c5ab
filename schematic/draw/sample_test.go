package draw

import (
	"math"
	"math/rand/v2"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/trace"
)

// sampled gives a sheet readings that are invented, so that laying out can be tested apart from solving.
func sampled(sheet *schematic.Sheet, shown int, seed uint64) *cases.Result {
	drawing := trace.Trace(sheet)
	random := rand.New(rand.NewPCG(seed, 1))
	solved := cases.Case{Name: sheet.Cases[shown].Name, Solved: true, Positions: map[string]string{}}
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		if part.Kind.Positions != nil {
			solved.Positions[part.Ref] = sheet.Cases[shown].Position(part)
		}
	}
	for range drawing.Branches {
		solved.Branches = append(solved.Branches, cases.Reading{
			Voltage: complex(24*random.Float64(), 0), Current: complex(random.NormFloat64()*math.Pow(10, -3*random.Float64()), 0),
			Floating: random.IntN(12) == 0,
		})
	}
	for range drawing.Meshes {
		solved.Meshes = append(solved.Meshes, complex(0.3*random.NormFloat64(), 0))
	}
	list := make([]cases.Case, len(sheet.Cases))
	list[shown] = solved
	return &cases.Result{Drawing: drawing, Cases: list}
}

const pump = `{
  "format": "loopwright-sheet/1",
  "title": "Pump P2 start and stop", "number": "HL-1002", "owner": "Harrow Lane Glasshouses", "author": "",
  "system": {"kind": "dc"}, "symbols": "iec", "size": "A4", "reference": "0V",
  "parts": [
    {"ref": "G1", "kind": "dc-supply", "at": [6, 18], "values": {"voltage": "24 V", "resistance": 0.05, "rated_current": 2.5}},
    {"ref": "F1", "kind": "fuse", "at": [11, 6], "turn": 90, "values": {"rating": 1}},
    {"ref": "S0", "kind": "switch", "at": [18, 9], "values": {"form": "break", "actuator": "mushroom"}},
    {"ref": "S1", "kind": "switch", "at": [18, 14], "values": {"form": "make", "actuator": "push"}},
    {"ref": "S2", "kind": "switch", "at": [26, 14], "values": {"positions": ["Hand", "Off", "Auto"], "closed_in": ["Hand"], "actuator": "selector"}},
    {"ref": "R1", "kind": "resistor", "at": [18, 20], "values": {"resistance": "4k7"}},
    {"ref": "P2", "kind": "lamp", "at": [18, 26], "values": {"voltage": 24, "power": 4}},
    {"ref": "B1", "kind": "switch", "at": [34, 10], "values": {"form": "break", "actuator": "float"}},
    {"ref": "P3", "kind": "ammeter", "at": [34, 17]},
    {"ref": "P1", "kind": "lamp", "at": [34, 23], "values": {"voltage": 24, "power": 2}},
    {"ref": "P4", "kind": "voltmeter", "at": [43, 23]},
    {"ref": "X1", "kind": "terminal", "at": [18, 30]},
    {"ref": "V0", "kind": "potential", "at": [6, 30], "turn": 270, "values": {"name": "0V"}},
    {"ref": "V1", "kind": "potential", "at": [6, 6], "values": {"name": "L+"}},
    {"ref": "XE1", "kind": "earth", "at": [12, 30]}
  ],
  "wires": [
    {"points": [[6, 16], [6, 6], [9, 6]]},
    {"points": [[13, 6], [34, 6], [34, 8]]},
    {"points": [[18, 6], [18, 7]]},
    {"points": [[18, 11], [18, 12]]},
    {"points": [[18, 12], [26, 12]]},
    {"points": [[18, 16], [26, 16]]},
    {"points": [[18, 16], [18, 18]]},
    {"points": [[18, 22], [18, 24]]},
    {"points": [[18, 28], [18, 30]]},
    {"points": [[34, 12], [34, 15]]},
    {"points": [[34, 19], [34, 21]]},
    {"points": [[34, 20], [43, 20], [43, 21]]},
    {"points": [[43, 25], [43, 30], [34, 30]]},
    {"points": [[34, 25], [34, 30], [6, 30], [6, 20]]}
  ],
  "cases": [{"name": "Rest"}, {"name": "Start held", "positions": {"S1": "operated", "B1": "operated", "F1": "operated"}}]
}`

func decoded(t testing.TB, text string) *schematic.Sheet {
	t.Helper()
	sheet, err := schematic.Decode([]byte(text))
	if err != nil {
		t.Fatal(err)
	}
	return sheet
}

// quarrel has two ideal sources in parallel that disagree, a wire that ends nowhere and a part that nothing joins.
const quarrel = `{
  "format": "loopwright-sheet/1", "title": "Two sources that disagree", "number": "HL-1099", "owner": "Harrow Lane Glasshouses",
  "system": {"kind": "dc"}, "symbols": "iec", "size": "A",
  "parts": [
    {"ref": "G1", "kind": "voltage-source", "at": [8, 12], "values": {"voltage": "24 V"}},
    {"ref": "G2", "kind": "voltage-source", "at": [20, 12], "values": {"voltage": "12 V"}},
    {"ref": "R1", "kind": "resistor", "at": [30, 12]},
    {"ref": "R2", "kind": "resistor", "at": [40, 12], "turn": 90}
  ],
  "wires": [
    {"points": [[8, 10], [8, 6], [30, 6], [30, 10]]}, {"points": [[20, 6], [20, 10]]},
    {"points": [[8, 14], [8, 18], [30, 18], [30, 14]]}, {"points": [[20, 18], [20, 14]]},
    {"points": [[30, 6], [36, 6]]}
  ]
}`

// bridge is an AC sheet.
const bridge = `{
  "format": "loopwright-sheet/1", "title": "Phasors", "number": "HL-1098", "owner": "Harrow Lane Glasshouses", "author": "second drawer",
  "system": {"kind": "ac", "hz": 50}, "symbols": "ansi", "size": "A4", "reference": "N",
  "parts": [
    {"ref": "G1", "kind": "voltage-source", "at": [8, 14], "values": {"voltage": "120 V", "resistance": 1}},
    {"ref": "G2", "kind": "voltage-source", "at": [40, 14], "turn": 180, "values": {"voltage": "120 V", "phase": -120}},
    {"ref": "R1", "kind": "resistor", "at": [16, 6], "turn": 270, "values": {"resistance": "47"}},
    {"ref": "R2", "kind": "resistor", "at": [24, 14], "turn": 180, "flip": true, "values": {"resistance": "4k7"}},
    {"ref": "G3", "kind": "current-source", "at": [32, 6], "turn": 90, "values": {"current": "2 A", "phase": 30}},
    {"ref": "N1", "kind": "potential", "at": [8, 22], "turn": 270, "values": {"name": "N"}}
  ],
  "wires": [
    {"points": [[8, 12], [8, 6], [14, 6]]}, {"points": [[18, 6], [30, 6]]}, {"points": [[24, 6], [24, 12]]},
    {"points": [[34, 6], [40, 6], [40, 12]]}, {"points": [[8, 16], [8, 22], [40, 22], [40, 16]]}, {"points": [[24, 16], [24, 22]]}
  ]
}`
