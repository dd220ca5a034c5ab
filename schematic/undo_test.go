package schematic_test

import (
	"encoding/json"
	"errors"
	"testing"

	"pgregory.net/rapid"

	"loopwright/schematic"
)

func TestUndoAndRedoAreEachAuthorsOwn(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := handOf(t)
		sheet := schematic.New("two hands")
		var log []schematic.Entry
		states := map[int]string{}
		for range 40 {
			author := []string{"ann", "ben"}[h.pick(2)]
			after, entry, err := act(h, sheet, log, author)
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
		again := schematic.New("two hands")
		for _, entry := range log {
			var err error
			if again, err = schematic.Replay(again, entry.Change); err != nil {
				t.Fatalf("revision %d of the log cannot be replayed: %v", entry.Revision, err)
			}
		}
		if string(schematic.Encode(again)) != string(schematic.Encode(sheet)) {
			t.Fatal("the log gives another sheet")
		}
	})
}

// act undoes, redoes or edits as the hand picks.
func act(h hand, sheet *schematic.Sheet, log []schematic.Entry, author string) (after *schematic.Sheet, entry schematic.Entry, err error) {
	entry = schematic.Entry{Revision: len(log) + 1, Author: author}
	switch h.pick(4) {
	case 0:
		entry.Do = "undo"
		after, entry.Change, entry.Of, err = schematic.Undo(sheet, log, author)
	case 1:
		entry.Do = "redo"
		after, entry.Change, entry.Of, err = schematic.Redo(sheet, log, author)
	default:
		entry.Do = "edit"
		text, _ := json.Marshal([]any{h.edit(sheet)})
		var edits []schematic.Edit
		if edits, err = schematic.DecodeEdits(text); err == nil {
			after, entry.Change, _, err = schematic.Apply(sheet, edits)
		}
	}
	return after, entry, err
}

// desk is a sheet with its log, at which several people sit.
type desk struct {
	t     *testing.T
	sheet *schematic.Sheet
	log   []schematic.Entry
}

// does makes an edit, an undo or a redo for somebody and gives the error.
func (d *desk) does(author, what string) error {
	d.t.Helper()
	entry := schematic.Entry{Revision: len(d.log) + 1, Author: author, Do: what}
	var after *schematic.Sheet
	var err error
	switch what {
	case "undo":
		after, entry.Change, entry.Of, err = schematic.Undo(d.sheet, d.log, author)
	case "redo":
		after, entry.Change, entry.Of, err = schematic.Redo(d.sheet, d.log, author)
	default:
		entry.Do = "edit"
		edits, wrong := schematic.DecodeEdits([]byte("[" + what + "]"))
		if wrong != nil {
			d.t.Fatal(wrong)
		}
		after, entry.Change, _, err = schematic.Apply(d.sheet, edits)
	}
	if err == nil {
		d.sheet, d.log = after, append(d.log, entry)
	}
	return err
}

// do is does for what must succeed.
func (d *desk) do(author string, whats ...string) {
	d.t.Helper()
	for _, what := range whats {
		if err := d.does(author, what); err != nil {
			d.t.Fatalf("%s, %s: %v", author, what, err)
		}
	}
}

// refuses is does for what must be a conflict.
func (d *desk) refuses(author, what string) {
	d.t.Helper()
	var conflict *schematic.ConflictError
	if err := d.does(author, what); !errors.As(err, &conflict) {
		d.t.Fatalf("%s, %s: %v, want a conflict", author, what, err)
	}
}

func titled(title string) string { return `{"do": "sheet", "set": {"title": "` + title + `"}}` }

const (
	addR1    = `{"do": "add", "part": {"ref": "R1", "kind": "resistor", "at": [5, 5]}}`
	moveR1   = `{"do": "move", "refs": ["R1"], "by": [1, 0]}`
	removeR1 = `{"do": "remove", "refs": ["R1"]}`
)

func TestUndoGoesBackStepByStepAndRedoForth(t *testing.T) {
	d := &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", titled("1"), titled("2"), "undo", "undo")
	if d.sheet.Title != "0" {
		t.Errorf("title %q after two undos", d.sheet.Title)
	}
	d.refuses("ann", "undo")
	d.do("ann", "redo", "redo")
	if d.sheet.Title != "2" {
		t.Errorf("title %q after two redos", d.sheet.Title)
	}
	d.refuses("ann", "redo")
	d.do("ann", "undo", titled("3"))
	d.refuses("ann", "redo")
	d.do("ann", "undo", "undo")
	if d.sheet.Title != "0" {
		t.Errorf("title %q", d.sheet.Title)
	}
}

func TestUndoLeavesWhatOthersDidAlone(t *testing.T) {
	d := &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", addR1, titled("1"))
	d.do("ben", `{"do": "sheet", "set": {"number": "7"}}`, `{"do": "add", "part": {"kind": "resistor", "at": [50, 5]}}`)
	d.do("ann", "undo")
	if d.sheet.Title != "0" || d.sheet.Number != "7" || d.sheet.Part("R2") == nil {
		t.Errorf("%s", schematic.Encode(d.sheet))
	}
	d.refuses("cid", "undo")
}

func TestUndoIsRefusedWhenItsTargetHasChangedSince(t *testing.T) {
	d := &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", addR1, moveR1)
	d.do("ben", moveR1)
	d.refuses("ann", "undo")
	d.do("ben", "undo")
	d.do("ann", "undo", "undo")
	if len(d.sheet.Parts) != 0 {
		t.Errorf("%s", schematic.Encode(d.sheet))
	}

	d = &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", addR1, removeR1)
	d.do("ben", addR1)
	d.refuses("ann", "undo") // the reference is taken
	d.do("ben", "undo")
	d.do("ann", "undo")
	if d.sheet.Part("R1") == nil {
		t.Error("the part did not come back")
	}
}

func TestUndoIsRefusedWhenSomethingElseNeedsWhatItTakesAway(t *testing.T) {
	d := &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", `{"do": "case", "case": {"name": "On"}}`)
	d.do("ben", `{"do": "case", "case": {"name": "Off", "follows": "On"}}`)
	d.refuses("ann", "undo")
	d.do("ben", `{"do": "case", "case": {"name": "Off"}}`)
	d.do("ann", "undo")
	if len(d.sheet.Cases) != 2 {
		t.Errorf("%+v", d.sheet.Cases)
	}
}

func TestEditsOfDifferentJointsAndCasesCanBeUndoneEachForItself(t *testing.T) {
	d := &desk{t: t, sheet: decoded(t, dcSheet(wiresOf(`[0, 0], [9, 0]`, `[2, -2], [2, 2]`, `[5, -2], [5, 2]`)))}
	d.do("ann", `{"do": "joint", "at": [2, 0]}`, `{"do": "case", "case": {"name": "On"}}`)
	d.do("ben", `{"do": "joint", "at": [5, 0]}`, `{"do": "case", "case": {"name": "Off"}, "after": "Rest"}`)
	d.do("ann", "undo", "undo")
	if len(d.sheet.Joints) != 1 || d.sheet.Joints[0] != p(5, 0) || len(d.sheet.Cases) != 2 || d.sheet.Cases[1].Name != "Off" {
		t.Errorf("%s", schematic.Encode(d.sheet))
	}
}

func TestALogThatBeginsLaterUndoesOnlyWhatItHolds(t *testing.T) {
	d := &desk{t: t, sheet: schematic.New("0")}
	d.do("ann", titled("1"), titled("2"))
	d.log = d.log[1:]
	d.do("ann", "undo")
	d.refuses("ann", "undo")
	if d.sheet.Title != "1" {
		t.Errorf("title %q", d.sheet.Title)
	}
}

func TestAChangeThatHasBeenDamagedIsRefused(t *testing.T) {
	sheet := decoded(t, dcSheet(resistorWith("")))
	const part = `{"ref": "R1", "kind": "resistor", "at": [0, 0]}`
	for _, change := range []schematic.Change{
		{Parts: []schematic.Touched{{Name: "R1", Before: part, After: `{"ref": "R1"`}}},
		{Parts: []schematic.Touched{{Name: "R1", Before: part, After: `{"ref": "R1", "kind": "flux", "at": [0, 0]}`}}},
		{Parts: []schematic.Touched{{Name: "R2", To: -7, After: `{}`}}},
		{Parts: []schematic.Touched{{Name: "R2", To: 99, After: part}}},
		{Wires: []schematic.Touched{{Name: "w1", After: `{"id": "w1", "points": []}`}}},
		{Joints: []schematic.Touched{{Name: "0,0", After: `[0, 0]`}}},
		{Cases: []schematic.Touched{{Name: "Rest", Before: `{"name": "Rest"}`}}},
		{Head: []schematic.Touched{{Name: "colour", After: `"red"`}}},
		{Head: []schematic.Touched{{Name: "title", After: `7`}}},
		{Head: []schematic.Touched{{Name: "title", After: `"a`}}},
		{Head: []schematic.Touched{{Name: "size", Before: `"A4"`, After: ``}}},
	} {
		if after, err := schematic.Replay(sheet, &change); err == nil {
			t.Errorf("%+v gives %s", change, schematic.Encode(after))
		}
	}
}
