package schematic_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// hand draws random edits from a small sheet area, so that things meet often.
type hand struct{ pick func(n int) int }

func (h hand) point() [2]int { return [2]int{h.pick(14), h.pick(12)} }

func (h hand) chain() [][2]int {
	points := [][2]int{h.point()}
	for range 1 + h.pick(3) {
		last := points[len(points)-1]
		next := h.point()
		if h.pick(2) == 0 {
			next[0] = last[0]
		} else {
			next[1] = last[1]
		}
		points = append(points, next)
	}
	return points
}

func (h hand) ref(sheet *schematic.Sheet) string {
	if len(sheet.Parts) == 0 {
		return "R9"
	}
	return sheet.Parts[h.pick(len(sheet.Parts))].Ref
}

func (h hand) wire(sheet *schematic.Sheet) string {
	if len(sheet.Wires) == 0 {
		return "w9"
	}
	return sheet.Wires[h.pick(len(sheet.Wires))].ID
}

// edit is one random edit as the API takes it. Many make no sense and must be refused.
func (h hand) edit(sheet *schematic.Sheet) string {
	write := func(fields map[string]any) string {
		data, _ := json.Marshal(fields)
		return string(data)
	}
	switch h.pick(16) {
	case 0, 1, 2:
		all := kinds.All()
		kind := all[h.pick(len(all))]
		return write(map[string]any{"do": "add", "part": map[string]any{"kind": kind.Name, "at": h.point(), "turn": 90 * h.pick(4), "values": kind.Tray[0].Values}})
	case 3, 4, 5:
		return write(map[string]any{"do": "wire", "points": h.chain()})
	case 6, 7, 8:
		return write(map[string]any{"do": "move", "refs": []string{h.ref(sheet)}, "by": [2]int{h.pick(7) - 3, h.pick(7) - 3}})
	case 9:
		return write(map[string]any{"do": "move", "refs": []string{h.ref(sheet), h.ref(sheet)}, "wires": []string{h.wire(sheet)}, "by": [2]int{h.pick(5) - 2, h.pick(5) - 2}})
	case 10:
		return write(map[string]any{"do": []string{"turn", "flip"}[h.pick(2)], "refs": []string{h.ref(sheet)}})
	case 11:
		return write(map[string]any{"do": "remove", "refs": []string{h.ref(sheet)}, "wires": []string{}})
	case 12:
		return write(map[string]any{"do": "joint", "at": h.point()})
	case 13:
		return write(map[string]any{"do": "rename", "ref": h.ref(sheet), "to": fmt.Sprintf("Q%d", h.pick(6))})
	case 14:
		return write(map[string]any{"do": "case", "case": map[string]any{"name": fmt.Sprintf("Case %d", h.pick(3)), "positions": map[string]string{h.ref(sheet): "operated"}}})
	}
	return write(map[string]any{"do": "operate", "case": "Rest", "ref": h.ref(sheet), "position": "operated"})
}

// play makes up to n random edits, and calls each for those that are taken.
func play(h hand, n int, each func(before, after *schematic.Sheet, change *schematic.Change, edit string)) *schematic.Sheet {
	sheet := schematic.New("random")
	for range n {
		text := h.edit(sheet)
		edits, err := schematic.DecodeEdits([]byte("[" + text + "]"))
		if err != nil {
			continue
		}
		after, change, _, err := schematic.Apply(sheet, edits)
		if err != nil {
			continue
		}
		each(sheet, after, change, text)
		sheet = after
	}
	return sheet
}

func handOf(t *rapid.T) hand {
	return hand{func(n int) int { return rapid.IntRange(0, n-1).Draw(t, "pick") }}
}

func TestAnySequenceOfEditsLeavesAValidSheetAndItsChangeUndoesItExactly(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		play(handOf(t), 30, func(before, after *schematic.Sheet, change *schematic.Change, edit string) {
			written := schematic.Encode(after)
			again, err := schematic.Decode(written)
			if err != nil {
				t.Fatalf("after %s the sheet is refused: %v\n%s", edit, err, written)
			}
			if !bytes.Equal(schematic.Encode(again), written) {
				t.Fatalf("after %s writing back gives other bytes:\n%s\n%s", edit, written, schematic.Encode(again))
			}
			data, err := json.Marshal(change)
			if err != nil {
				t.Fatal(err)
			}
			var logged schematic.Change
			if err := json.Unmarshal(data, &logged); err != nil {
				t.Fatal(err)
			}
			forth, err := schematic.Replay(before, &logged)
			if err != nil || !bytes.Equal(schematic.Encode(forth), written) {
				t.Fatalf("replaying %s gives another sheet (%v)", edit, err)
			}
			back, err := schematic.Replay(after, logged.Inverse())
			if err != nil || !bytes.Equal(schematic.Encode(back), schematic.Encode(before)) {
				t.Fatalf("undoing %s gives another sheet (%v):\n%s\n%s", edit, err, schematic.Encode(before), schematic.Encode(back))
			}
		})
	})
}

// joined lists, for every pin and wire that is on both sheets, its group.
func joined(sheet *schematic.Sheet) map[string]int {
	joins := schematic.Join(sheet)
	groups := map[string]int{}
	for i, part := range sheet.Parts {
		for k, pin := range part.Kind.Pins {
			groups[part.Ref+":"+pin.Name] = joins.Pins[i][k]
		}
	}
	for i, wire := range sheet.Wires {
		groups["wire "+wire.ID] = joins.Wires[i]
	}
	return groups
}

// parted names two things that were joined before and are not any more.
func parted(before, after *schematic.Sheet) string {
	was, is := joined(before), joined(after)
	first := map[int]string{}
	for _, part := range before.Parts {
		for _, pin := range part.Kind.Pins {
			name := part.Ref + ":" + pin.Name
			if _, here := is[name]; !here {
				continue
			}
			if other, known := first[was[name]]; known && is[other] != is[name] {
				return other + " and " + name
			}
			first[was[name]] = name
		}
	}
	return ""
}

func TestMovingAndTurningNeverPartsWhatWasJoined(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		play(handOf(t), 30, func(before, after *schematic.Sheet, _ *schematic.Change, edit string) {
			if !strings.Contains(edit, `"do":"move"`) && !strings.Contains(edit, `"do":"turn"`) && !strings.Contains(edit, `"do":"flip"`) {
				return
			}
			if what := parted(before, after); what != "" {
				t.Fatalf("%s parted %s:\n%s\n%s", edit, what, schematic.Encode(before), schematic.Encode(after))
			}
		})
	})
}

func TestUndoAndRedoAreEachAuthorsOwn(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := handOf(t)
		sheet := schematic.New("two hands")
		var log []schematic.Entry
		states := map[int]string{}
		for range 40 {
			author := []string{"ann", "ben"}[h.pick(2)]
			entry := schematic.Entry{Revision: len(log) + 1, Author: author}
			var after *schematic.Sheet
			var err error
			switch h.pick(4) {
			case 0:
				entry.Do = "undo"
				after, entry.Change, entry.Of, err = schematic.Undo(sheet, log, author)
			case 1:
				entry.Do = "redo"
				after, entry.Change, entry.Of, err = schematic.Redo(sheet, log, author)
			default:
				entry.Do = "edit"
				var edits []schematic.Edit
				if edits, err = schematic.DecodeEdits([]byte("[" + h.edit(sheet) + "]")); err == nil {
					after, entry.Change, _, err = schematic.Apply(sheet, edits)
				}
			}
			if err != nil {
				var conflict *schematic.ConflictError
				if entry.Do != "edit" && !errors.As(err, &conflict) {
					t.Fatalf("%s failed otherwise than by a conflict: %v", entry.Do, err)
				}
				continue
			}
			if entry.Do != "edit" && log[entry.Of-1].Author != author {
				t.Fatalf("%s of revision %d by %s, which is %s's", entry.Do, entry.Of, author, log[entry.Of-1].Author)
			}
			states[len(log)] = string(schematic.Encode(sheet))
			log = append(log, entry)
			if entry.Do == "undo" && entry.Of == len(log)-1 && string(schematic.Encode(after)) != states[entry.Of-1] {
				t.Fatalf("undoing the last edit gives another sheet")
			}
			sheet = after
		}
	})
}

func FuzzDecode(f *testing.F) {
	f.Add([]byte(`{"format":"loopwright-sheet/1","system":{"kind":"dc"},"parts":[{"ref":"R1","kind":"resistor","at":[1,2],"values":{"resistance":"4k7"}}],"wires":[{"points":[[1,0],[5,0]]}]}`))
	f.Add([]byte(`{"format":"loopwright-sheet/1","system":{"kind":"ac","hz":50},"cases":[{"name":"A"},{"name":"B","follows":"A"}]}`))
	f.Add([]byte(`[`))
	f.Fuzz(func(t *testing.T, data []byte) {
		sheet, err := schematic.Decode(data)
		if err != nil {
			return
		}
		written := schematic.Encode(sheet)
		again, err := schematic.Decode(written)
		if err != nil {
			t.Fatalf("what was written is refused: %v\n%s", err, written)
		}
		if !bytes.Equal(schematic.Encode(again), written) {
			t.Fatalf("writing back gives other bytes:\n%s\n%s", written, schematic.Encode(again))
		}
	})
}

func FuzzEdits(f *testing.F) {
	f.Add([]byte(`[{"do":"add","part":{"kind":"lamp","at":[3,4]}},{"do":"wire","points":[[3,2],[9,2]]},{"do":"move","refs":["P1"],"by":[1,0]}]`))
	f.Add([]byte(`[{"do":"set","ref":"P1","values":{"voltage":null,"power":"2 W"}}]`))
	start := play(hand{rand.New(rand.NewPCG(1, 2)).IntN}, 40, func(*schematic.Sheet, *schematic.Sheet, *schematic.Change, string) {})
	f.Fuzz(func(t *testing.T, data []byte) {
		edits, err := schematic.DecodeEdits(data)
		if err != nil {
			return
		}
		after, change, _, err := schematic.Apply(start, edits)
		if err != nil {
			return
		}
		back, err := schematic.Replay(after, change.Inverse())
		if err != nil || !bytes.Equal(schematic.Encode(back), schematic.Encode(start)) {
			t.Fatalf("undo gives another sheet (%v)", err)
		}
	})
}
