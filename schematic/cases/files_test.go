package cases_test

import (
	"context"
	"encoding/json"
	"errors"
	"regexp"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/sheettest"
)

// lamp is a supply with inner resistance, a switch and a resistor in a ring, with one case at rest and one operated.
func lamp() *schematic.Sheet {
	b := sheettest.NewBuilder("Lamp")
	b.Down(kinds.DCSupply, values("resistance", 1), 0, 0, false)
	b.Right(kinds.Switch, values("resistance", 1), 0, 0, false)
	b.Down(kinds.Resistor, values("resistance", 46), 1, 0, false)
	b.Wire(b.Node(0, 1), b.Node(1, 1))
	sheettest.Cases(b.Sheet)
	b.Sheet.Cases[0].Name, b.Sheet.Cases[1].Name = "Rest", "=1+1"
	return b.Sheet
}

func TestReadingsAreWrittenAsCommaSeparatedValues(t *testing.T) {
	// 24 V over 1 Ω + 1 Ω + 46 Ω: 0.5 A by Ohm's law.
	want := `case,part,pins,voltage_v,current_a,power_w
Rest,G1,1 to 2,24,0,0
Rest,S1,1 to 2,24,0,0
Rest,R1,1 to 2,0,0,0
'=1+1,G1,1 to 2,23.5,-0.5,-11.75
'=1+1,S1,1 to 2,0.5,0.5,0.25
'=1+1,R1,1 to 2,23,0.5,11.5
`
	if got := string(cases.AppendCSV(nil, solve(t, lamp()))); got != want {
		t.Errorf("got\n%swant\n%s", got, want)
	}
}

func TestPhasorsAreWrittenWithTheirAngles(t *testing.T) {
	sheet := lamp()
	sheet.System = kinds.System{Kind: "ac", Hertz: 50}
	sheet.Parts[0].Kind = kinds.VoltageSource
	sheet.Parts[0].Values = values("voltage", 48, "phase", 90)
	sheet.Parts[2].Values = values("resistance", 47)
	sheet.Cases = sheet.Cases[1:]
	want := `case,part,pins,voltage_v,voltage_deg,current_a,current_deg,power_w,reactive_power_var
'=1+1,G1,1 to 2,48,90,1,-90,-48,0
'=1+1,S1,1 to 2,1,90,1,90,1,0
'=1+1,R1,1 to 2,47,90,1,90,47,0
`
	if got := string(cases.AppendCSV(nil, solve(t, sheet))); got != want {
		t.Errorf("got\n%swant\n%s", got, want)
	}
}

func TestTheSolutionFileHasEveryField(t *testing.T) {
	data, err := json.MarshalIndent(solve(t, lamp()), "", " ")
	if err != nil {
		t.Fatal(err)
	}
	for _, times := range []string{"trace_s", "mesh_s", "solve_s", "audit_s"} {
		if !regexp.MustCompile(`"` + times + `": [0-9.e-]+`).Match(data) {
			t.Errorf("no %s in %s", times, data)
		}
	}
	data = regexp.MustCompile(`(?s)"timing": \{.*?\}`).ReplaceAll(data, []byte(`"timing": {}`))
	data = regexp.MustCompile(`"(kcl|kvl|power|nodal_gap)": [0-9.e-]+`).ReplaceAll(data, []byte(`"$1": 0`))
	var got, want any
	if err := json.Unmarshal(data, &got); err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal([]byte(lampSolution), &want); err != nil {
		t.Fatal(err)
	}
	a, _ := json.MarshalIndent(got, "", " ")
	b, _ := json.MarshalIndent(want, "", " ")
	if string(a) != string(b) {
		t.Errorf("got\n%s\nwant\n%s", a, b)
	}
}

const lampSolution = `{
  "format": "loopwright-solution/1", "title": "Lamp", "system": {"kind": "dc"}, "timing": {},
  "cases": [{
    "name": "Rest", "solved": true, "problem": null, "supply": "nominal", "positions": {"S1": "rest"}, "coils": {},
    "potentials": [
      {"number": "0", "wire_number": "0", "name": "", "pins": ["G1:2", "R1:2"], "voltage": {"re": 0, "im": 0}},
      {"number": "1", "wire_number": "1", "name": "", "pins": ["S1:1", "G1:1"], "voltage": {"re": 24, "im": 0}},
      {"number": "2", "wire_number": "2", "name": "", "pins": ["S1:2", "R1:1"], "voltage": {"re": 0, "im": 0}}
    ],
    "parts": [
      {"ref": "G1", "voltage": {"re": 24, "im": 0}, "current": {"re": 0, "im": 0}, "power": {"re": 0, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 24, "im": 0}, "current": {"re": 0, "im": 0}, "mesh_currents": "−i1"}]},
      {"ref": "S1", "voltage": {"re": 24, "im": 0}, "current": {"re": 0, "im": 0}, "power": {"re": 0, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 24, "im": 0}, "current": {"re": 0, "im": 0}, "mesh_currents": "i1"}]},
      {"ref": "R1", "voltage": {"re": 0, "im": 0}, "current": {"re": 0, "im": 0}, "power": {"re": 0, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 0, "im": 0}, "current": {"re": 0, "im": 0}, "mesh_currents": "i1"}]}
    ],
    "meshes": [{"name": "m1", "current": {"re": 0, "im": 0}, "drawn": true, "path": [
      {"ref": "G1", "pins": ["1", "2"], "sense": -1}, {"ref": "S1", "pins": ["1", "2"], "sense": 1}, {"ref": "R1", "pins": ["1", "2"], "sense": 1}]}],
    "supermeshes": [],
    "equations": [{"of": ["m1"], "symbols": "i1 = 0 (S1 open)", "numbers": "i1 = 0"}],
    "audit": {"kcl": 0, "kvl": 0, "power": 0, "nodal_gap": 0, "passed": true}
  }, {
    "name": "=1+1", "solved": true, "problem": null, "supply": "nominal", "positions": {"S1": "operated"}, "coils": {},
    "potentials": [
      {"number": "0", "wire_number": "0", "name": "", "pins": ["G1:2", "R1:2"], "voltage": {"re": 0, "im": 0}},
      {"number": "1", "wire_number": "1", "name": "", "pins": ["S1:1", "G1:1"], "voltage": {"re": 23.5, "im": 0}},
      {"number": "2", "wire_number": "2", "name": "", "pins": ["S1:2", "R1:1"], "voltage": {"re": 23, "im": 0}}
    ],
    "parts": [
      {"ref": "G1", "voltage": {"re": 23.5, "im": 0}, "current": {"re": -0.5, "im": 0}, "power": {"re": -11.75, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 23.5, "im": 0}, "current": {"re": -0.5, "im": 0}, "mesh_currents": "−i1"}]},
      {"ref": "S1", "voltage": {"re": 0.5, "im": 0}, "current": {"re": 0.5, "im": 0}, "power": {"re": 0.25, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 0.5, "im": 0}, "current": {"re": 0.5, "im": 0}, "mesh_currents": "i1"}]},
      {"ref": "R1", "voltage": {"re": 23, "im": 0}, "current": {"re": 0.5, "im": 0}, "power": {"re": 11.5, "im": 0},
       "branches": [{"pins": ["1", "2"], "voltage": {"re": 23, "im": 0}, "current": {"re": 0.5, "im": 0}, "mesh_currents": "i1"}]}
    ],
    "meshes": [{"name": "m1", "current": {"re": 0.5, "im": 0}, "drawn": true, "path": [
      {"ref": "G1", "pins": ["1", "2"], "sense": -1}, {"ref": "S1", "pins": ["1", "2"], "sense": 1}, {"ref": "R1", "pins": ["1", "2"], "sense": 1}]}],
    "supermeshes": [],
    "equations": [{"of": ["m1"], "symbols": "−E(G1) + R(G1)·i1 + R(S1)·i1 + R(R1)·i1 = 0", "numbers": "−24 + 1·i1 + 1·i1 + 46·i1 = 0"}],
    "audit": {"kcl": 0, "kvl": 0, "power": 0, "nodal_gap": 0, "passed": true}
  }]
}`

func TestWhatFloatsHasNoVoltage(t *testing.T) {
	b := sheettest.NewBuilder("Floating")
	b.Down(kinds.DCSupply, nil, 0, 0, false)
	b.Right(kinds.Switch, nil, 0, 0, false) // to a resistor that hangs free
	b.Down(kinds.Resistor, nil, 1, 0, false)
	var file struct {
		Cases []struct {
			Potentials []struct {
				Pins     []string
				Voltage  *struct{ Re float64 }
				Floating bool
			}
			Parts []struct {
				Ref      string
				Voltage  *struct{ Re float64 }
				Floating bool
			}
		}
	}
	data, err := json.Marshal(solve(t, b.Sheet))
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, &file); err != nil {
		t.Fatal(err)
	}
	for _, p := range file.Cases[0].Potentials {
		if free := p.Pins[0] == "S1:2" || p.Pins[0] == "R1:2"; free != p.Floating || free != (p.Voltage == nil) {
			t.Errorf("potential %+v", p)
		}
	}
	for _, part := range file.Cases[0].Parts {
		if open := part.Ref == "S1"; open != part.Floating || open != (part.Voltage == nil) {
			t.Errorf("part %+v", part)
		}
	}
}

func TestSolvingEndsWithItsContext(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := cases.Solve(ctx, lamp()); !errors.Is(err, context.Canceled) {
		t.Errorf("%v", err)
	}
}
