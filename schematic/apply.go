package schematic

import (
	"errors"
	"slices"
	"strings"
)

// draft is a sheet while a batch of edits is made on it. It shares with the sheet that it began from whatever no edit
// has touched: parts, wires and cases are replaced, never changed in place.
type draft struct {
	Sheet
	made  Made
	place string // of the edit that is being made
}

// Apply makes a batch of edits, all of them or none, and gives the new sheet with what changed. The sheet that it is
// given stays as it is. Errors: a *ConflictError when the target of an edit is gone or a reference is taken, a
// *PlaceError when an edit makes no sense. Undo and redo need the log and are refused here.
func Apply(sheet *Sheet, edits []Edit) (*Sheet, *Change, Made, error) {
	d := &draft{Sheet: *sheet}
	d.Parts = slices.Clone(sheet.Parts)
	d.Wires = slices.Clone(sheet.Wires)
	d.Joints = slices.Clone(sheet.Joints)
	d.Cases = slices.Clone(sheet.Cases)
	for i := range edits {
		d.place = at("edits", i)
		if err := d.apply(&edits[i]); err != nil {
			return nil, nil, Made{}, err
		}
	}
	after := d.Sheet
	if err := Validate(&after); err != nil {
		return nil, nil, Made{}, placed(err, d.place)
	}
	return &after, Compare(sheet, &after), d.made, nil
}

// placed says of an error that Validate found which edit brought it about; when there are several, the last.
func placed(err error, place string) error {
	var wrong *PlaceError
	if !errors.As(err, &wrong) {
		return err
	}
	_, field, found := strings.Cut(wrong.Place, ".values.")
	if found {
		return &PlaceError{under(under(place, "values"), field), wrong.Message}
	}
	return &PlaceError{place, wrong.Message}
}

func (d *draft) apply(edit *Edit) error {
	switch edit.Do {
	case "add":
		return d.add(edit)
	case "move":
		return d.move(edit)
	case "turn", "flip":
		return d.turn(edit)
	case "set":
		return d.set(edit)
	case "rename":
		return d.rename(edit)
	case "remove":
		return d.remove(edit)
	case "wire":
		return d.wire(edit)
	case "reroute":
		return d.reroute(edit)
	case "joint":
		return d.joint(edit)
	case "remove-joint":
		return d.removeJoint(edit)
	case "label":
		return d.label(edit)
	case "case":
		return d.putCase(edit)
	case "operate":
		return d.operate(edit)
	case "rename-case":
		return d.renameCase(edit)
	case "order-cases":
		return d.orderCases(edit)
	case "remove-case":
		return d.removeCase(edit)
	case "sheet":
		return d.head(edit)
	}
	return refuse(under(d.place, "do"), "%q cannot be made here", edit.Do)
}

// part finds the part that an edit is about.
func (d *draft) part(ref string) (*Part, error) {
	if part := d.Part(ref); part != nil {
		return part, nil
	}
	return nil, conflict("there is no part -%s on the sheet any more", ref)
}

// parts finds several parts and gives their indices, in the order of the sheet and each once.
func (d *draft) parts(refs []string) ([]int, error) {
	wanted := make(map[string]bool, len(refs))
	for _, ref := range refs {
		wanted[ref] = true
	}
	var found []int
	for i := range d.Parts {
		if wanted[d.Parts[i].Ref] {
			found = append(found, i)
			delete(wanted, d.Parts[i].Ref)
		}
	}
	for _, ref := range refs {
		if wanted[ref] {
			return nil, conflict("there is no part -%s on the sheet any more", ref)
		}
	}
	return found, nil
}

// wires finds several wires and gives their indices, in the order of the sheet and each once.
func (d *draft) wires(ids []string) ([]int, error) {
	wanted := make(map[string]bool, len(ids))
	for _, id := range ids {
		wanted[id] = true
	}
	var found []int
	for i := range d.Wires {
		if wanted[d.Wires[i].ID] {
			found = append(found, i)
			delete(wanted, d.Wires[i].ID)
		}
	}
	for _, id := range ids {
		if wanted[id] {
			return nil, conflict("there is no wire %s on the sheet any more", id)
		}
	}
	return found, nil
}

// dropJoints leaves out joints at which wires no longer cross.
func (d *draft) dropJoints() {
	if len(d.Joints) == 0 {
		return
	}
	places := make(map[Point]bool, len(d.Joints))
	for _, joint := range d.Joints {
		places[joint] = true
	}
	level, upright := passes(&d.Sheet, places)
	d.Joints = slices.DeleteFunc(d.Joints, func(p Point) bool { return !level[p] || !upright[p] })
}
