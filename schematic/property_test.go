package schematic_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"maps"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"loopwright/schematic"
)

func handOf(t *rapid.T) hand {
	return hand{pick: func(n int) int { return rapid.IntRange(0, n-1).Draw(t, "pick") }}
}

func TestAnySequenceOfEditsLeavesAValidSheetAndItsChangeUndoesItExactly(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		play(handOf(t), 30, func(s step) {
			written := schematic.Encode(s.after)
			again, err := schematic.Decode(written)
			if err != nil {
				t.Fatalf("the sheet is refused: %v\n%v", err, s)
			}
			if !reflect.DeepEqual(plain(again), plain(s.after)) {
				t.Fatalf("reading back gives another sheet: %s\n%v", schematic.Encode(again), s)
			}
			logged := throughJSON(t, s.change)
			forth, err := schematic.Replay(s.before, logged)
			if err != nil || !bytes.Equal(schematic.Encode(forth), written) {
				t.Fatalf("replaying gives another sheet (%v): %s\n%v", err, schematic.Encode(forth), s)
			}
			back, err := schematic.Replay(s.after, logged.Inverse())
			if err != nil || !bytes.Equal(schematic.Encode(back), schematic.Encode(s.before)) {
				t.Fatalf("undoing gives another sheet (%v): %s\n%v", err, schematic.Encode(back), s)
			}
			if s.change.Empty() != bytes.Equal(schematic.Encode(s.before), written) {
				t.Fatalf("the change is empty: %v\n%v", s.change.Empty(), s)
			}
		})
	})
}

// plain is a sheet in which empty lists and maps are nil.
func plain(sheet *schematic.Sheet) schematic.Sheet {
	list := *sheet
	list.Parts = append([]schematic.Part(nil), sheet.Parts...)
	list.Wires = append([]schematic.Wire(nil), sheet.Wires...)
	list.Joints = append([]schematic.Point(nil), sheet.Joints...)
	for i := range list.Parts {
		if len(list.Parts[i].Values) == 0 {
			list.Parts[i].Values = nil
		}
	}
	return list
}

// throughJSON is a change as it comes out of a log.
func throughJSON(t *rapid.T, change *schematic.Change) *schematic.Change {
	data, err := json.Marshal(change)
	if err != nil {
		t.Fatal(err)
	}
	logged := new(schematic.Change)
	if err := json.Unmarshal(data, logged); err != nil {
		t.Fatal(err)
	}
	return logged
}

// joined lists the group of every pin and wire of a sheet. For the parts named, the pins of one part count as joined, as
// a part that lies in series in a wire joins for a net what it parts for the circuit.
func joined(sheet *schematic.Sheet, short map[string]bool) map[string]int {
	joins := schematic.Join(sheet)
	merged := make([]int, joins.Groups)
	for i := range merged {
		merged[i] = i
	}
	for i, part := range sheet.Parts {
		for _, group := range joins.Pins[i][1:] {
			if from, to := merged[group], merged[joins.Pins[i][0]]; short[part.Ref] {
				for k := range merged {
					if merged[k] == from {
						merged[k] = to
					}
				}
			}
		}
	}
	groups := map[string]int{}
	for i, part := range sheet.Parts {
		for k, pin := range part.Kind.Pins {
			groups[part.Ref+":"+pin.Name] = merged[joins.Pins[i][k]]
		}
	}
	for i, wire := range sheet.Wires {
		groups["wire "+wire.ID] = merged[joins.Wires[i]]
	}
	return groups
}

// parted names two things that are joined in the first grouping and not in the second.
func parted(was, is map[string]int) string {
	first := map[int]string{}
	for _, name := range slices.Sorted(maps.Keys(was)) {
		if _, here := is[name]; !here {
			continue
		}
		other, known := first[was[name]]
		if known && is[other] != is[name] {
			return other + " and " + name
		}
		first[was[name]] = name
	}
	return ""
}

func moves(edit map[string]any) bool {
	return edit["do"] == "move" || edit["do"] == "turn" || edit["do"] == "flip"
}

func TestMovingAndTurningPartsNothingAndTellsWhatItJoins(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := handOf(t)
		h.refused = func(sheet *schematic.Sheet, edit map[string]any, err error) {
			var wrong *schematic.PlaceError
			if errors.As(err, &wrong) && moves(edit) && !strings.HasPrefix(wrong.Message, "name the parts") {
				t.Fatalf("%v is refused: %v\n%s", edit, err, schematic.Encode(sheet))
			}
		}
		play(h, 30, func(s step) {
			if !moves(s.edit) {
				return
			}
			short := map[string]bool{}
			refs, _ := s.edit["refs"].([]string)
			for _, ref := range refs {
				short[ref] = true
			}
			if what := parted(joined(s.before, nil), joined(s.after, short)); what != "" {
				t.Fatalf("%s were parted by %v", what, s)
			}
			if what := parted(joined(s.after, nil), joined(s.before, nil)); what != "" && len(s.made.Joined) == 0 {
				t.Fatalf("%s were joined without a word by %v", what, s)
			}
		})
	})
}

func TestMovingAllMovesTheDrawingAsItIs(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := handOf(t)
		before := play(h, 25, func(step) {})
		if len(before.Parts)+len(before.Wires) == 0 {
			return
		}
		edit := schematic.Edit{Do: "move", By: schematic.Point{X: h.pick(9) - 4, Y: h.pick(9) - 4}}
		for _, part := range before.Parts {
			edit.Refs = append(edit.Refs, part.Ref)
		}
		for _, wire := range before.Wires {
			edit.Wires = append(edit.Wires, wire.ID)
		}
		after, _, made, err := schematic.Apply(before, []schematic.Edit{edit})
		if err != nil {
			t.Fatal(err)
		}
		want := *before
		want.Parts, want.Wires, want.Joints = slices.Clone(before.Parts), slices.Clone(before.Wires), slices.Clone(before.Joints)
		for i := range want.Parts {
			want.Parts[i].At = plus(want.Parts[i].At, edit.By)
		}
		for i := range want.Joints {
			want.Joints[i] = plus(want.Joints[i], edit.By)
		}
		for i, wire := range before.Wires {
			points := make([]schematic.Point, len(wire.Points))
			for k, p := range wire.Points {
				points[k] = plus(p, edit.By)
			}
			want.Wires[i].Points = points
		}
		if !bytes.Equal(schematic.Encode(after), schematic.Encode(&want)) || len(made.Joined)+len(made.Wires) > 0 {
			t.Fatalf("%v\nbefore %s\nafter %s", made, schematic.Encode(before), schematic.Encode(after))
		}
	})
}

func plus(p, by schematic.Point) schematic.Point {
	return schematic.Point{X: p.X + by.X, Y: p.Y + by.Y}
}

func TestFourTurnsAndTwoFlipsBringPartsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := handOf(t)
		before := play(h, 25, func(step) {})
		refs := h.some(h.ref, before)
		if len(refs) == 0 || len(before.Parts) == 0 {
			return
		}
		for _, round := range []struct {
			do    string
			times int
		}{{"turn", 4}, {"flip", 2}} {
			after := before
			for range round.times {
				var err error
				if after, _, _, err = schematic.Apply(after, []schematic.Edit{{Do: round.do, Refs: refs}}); err != nil {
					t.Fatal(err)
				}
			}
			if !reflect.DeepEqual(after.Parts, before.Parts) {
				t.Fatalf("%s %d times %v: %s\n%s", round.do, round.times, refs, schematic.Encode(before), schematic.Encode(after))
			}
		}
	})
}
