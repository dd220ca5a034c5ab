package schematic

import "slices"

// draft is a sheet while a batch of edits is made on it. It shares with the sheet that it began from whatever no edit
// has touched: parts, wires and cases are replaced, their maps and lists never changed in place.
type draft struct {
	Sheet
	made     Made
	place    string        // of the edit that is being made
	wireName func() string // gives the next name for a new wire, never one that the batch has taken away
}

// Apply makes a batch of edits, all of them or none, and gives the new sheet with what changed. The sheet that it is
// given stays as it is. Errors: a *ConflictError when the target of an edit is gone or a reference is taken, a
// *PlaceError when an edit makes no sense. Undo and redo need the log and are refused here.
func Apply(sheet *Sheet, edits []Edit) (*Sheet, *Change, Made, error) {
	d := &draft{Sheet: *sheet, wireName: newWireNames(sheet)}
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
		return nil, nil, Made{}, atPlace(err, d.place)
	}
	d.made.Refs = slices.DeleteFunc(d.made.Refs, func(ref string) bool { return after.Part(ref) == nil })
	d.made.Wires = slices.DeleteFunc(d.made.Wires, func(id string) bool { return after.Wire(id) == nil })
	return &after, Compare(sheet, &after), d.made, nil
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
	return nil, goneFrom("part -", ref)
}

func goneFrom(what, name string) error {
	return conflict("there is no %s%s on the sheet; somebody may have removed or renamed it", what, name)
}

// parts finds several parts and gives their indices, in the order of the sheet and each once.
func (d *draft) parts(refs []string) ([]int, error) {
	return find(len(d.Parts), func(i int) string { return d.Parts[i].Ref }, refs, "part -")
}

// wires finds several wires and gives their indices, in the order of the sheet and each once.
func (d *draft) wires(ids []string) ([]int, error) {
	return find(len(d.Wires), func(i int) string { return d.Wires[i].ID }, ids, "wire ")
}

func find(count int, name func(int) string, names []string, what string) ([]int, error) {
	wanted := make(map[string]bool, len(names))
	for _, each := range names {
		wanted[each] = true
	}
	var found []int
	for i := range count {
		if wanted[name(i)] {
			found = append(found, i)
			delete(wanted, name(i))
		}
	}
	for _, each := range names {
		if wanted[each] {
			return nil, goneFrom(what, each)
		}
	}
	return found, nil
}

// dropJoints leaves out joints at which wires no longer cross.
func (d *draft) dropJoints() {
	crossed := crossedAt(d.Wires, d.Joints)
	d.Joints = slices.DeleteFunc(d.Joints, func(p Point) bool { return !crossed[p] })
}
