package draw

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
)

// designations are the places of the designations in a drawing, by reference.
func designations(picture *Picture) map[string]stroke.Point {
	places := map[string]stroke.Point{}
	for _, group := range picture.Groups {
		for _, shape := range group.List {
			if text, ok := shape.(stroke.Text); ok && group.Layer == PartLayer && strings.HasPrefix(text.Text, "-") {
				places[text.Text] = text.At
			}
		}
	}
	return places
}

func TestLetteringStaysInItsPlaceFromCaseToCase(t *testing.T) {
	sheets := demoSheets(t)
	sheets["pump"] = decoded(t, pump)
	for name, sheet := range sheets {
		result := solved(t, sheet)
		first := designations(Compose(sheet, result, Options{Meshes: true}))
		for shown := range sheet.Cases {
			if !result.Cases[shown].Solved {
				continue
			}
			for ref, at := range designations(Compose(sheet, result, Options{Case: shown, Meshes: true})) {
				if first[ref] != at {
					t.Errorf("%s: %s moves from %v to %v in case %d", name, ref, first[ref], at, shown)
				}
			}
		}
	}
}

func TestAnEditLeavesTheLetteringElsewhereWhereItIs(t *testing.T) {
	sheet := ladders(60)
	before := Compose(sheet, sampled(sheet, 0, 1), Options{Meshes: true})
	moved := *sheet
	moved.Parts = append([]schematic.Part(nil), sheet.Parts...)
	moved.Parts[2].At.X += 2 // a resistor of the first rung of the first band
	after := Compose(&moved, sampled(&moved, 0, 1), Options{Meshes: true})
	old := map[string][]byte{}
	for i := range before.Groups {
		old[before.Groups[i].ID] = before.Groups[i].AppendSVG(nil)
	}
	changed := 0
	for i := range after.Groups {
		if group := &after.Groups[i]; group.Layer == PartLayer && !bytes.Equal(old[group.ID], group.AppendSVG(nil)) {
			changed++
		}
	}
	if changed == 0 || changed > 4 {
		t.Errorf("%d parts are drawn otherwise after one was moved by two steps", changed)
	}
}

func TestANameStaysWhereAPersonHasPutIt(t *testing.T) {
	sheet := decoded(t, pump)
	for _, c := range []struct {
		label  schematic.Point
		anchor stroke.Anchor
	}{{schematic.Point{X: 3, Y: -1}, stroke.Start}, {schematic.Point{X: -3, Y: 1}, stroke.End}} {
		sheet.Part("R1").Label = &c.label
		for _, group := range Compose(sheet, solved(t, sheet), Options{}).Groups {
			if group.ID != "part-R1" {
				continue
			}
			for _, shape := range group.List {
				text, ok := shape.(stroke.Text)
				if ok && text.Text == "-R1" && (text.At.X != float64(18+c.label.X) || text.Anchor != c.anchor || math.Abs(text.At.Y-float64(20+c.label.Y)) > 1) {
					t.Errorf("the name lies at %v with anchor %d", text.At, text.Anchor)
				}
			}
		}
	}
}

// Where the current really flows is known by hand: out of the positive pole of the only supply, through the lamp and
// back.
func TestArrowsPointTheWayTheCurrentFlowsOnTheSheet(t *testing.T) {
	const loop = `{"format": "loopwright-sheet/1", "title": "", "system": {"kind": "dc"}, "size": "A4", "symbols": "iec",
	"parts": [
	  {"ref": "G1", "kind": "dc-supply", "at": [5, 10]},
	  {"ref": "R1", "kind": "resistor", "at": [10, 5], "turn": 90},
	  {"ref": "P1", "kind": "lamp", "at": [15, 10], "turn": 180},
	  {"ref": "R2", "kind": "resistor", "at": [10, 15], "turn": 90, "flip": true}],
	"wires": [{"points": [[5, 8], [5, 5], [8, 5]]}, {"points": [[12, 5], [15, 5], [15, 8]]},
	  {"points": [[15, 12], [15, 15], [12, 15]]}, {"points": [[8, 15], [5, 15], [5, 12]]}]}`
	sheet := decoded(t, loop)
	result := solved(t, sheet)
	s := scaleOf(&result.Cases[0], false)
	for i, want := range []stroke.Point{{Y: -1}, {X: 1}, {Y: 1}, {X: -1}} {
		r := readingOf(&sheet.Parts[i], &result.Drawing.Branches[i], &result.Cases[0].Branches[i], s)
		if r.way == nil || *r.way != want {
			t.Errorf("%s: the arrow points to %v, want %v", sheet.Parts[i].Ref, r.way, want)
		}
		if strings.HasPrefix(r.current, "−") || strings.HasPrefix(r.voltage, "−") {
			t.Errorf("%s: %s and %s are shown with a sign", sheet.Parts[i].Ref, r.voltage, r.current)
		}
	}
}

func TestASwitchWithNamedPositionsSaysWhereItStands(t *testing.T) {
	sheet := decoded(t, pump)
	s := placed(sheet.Part("S2"), kinds.IEC, "Auto")
	if len(s.names) != 2 || s.names[1] != "Auto" || !strings.Contains(s.spoken(nil), "Auto, open") {
		t.Errorf("it is lettered %q and called %q", s.names, s.spoken(nil))
	}
}
