package schematic

import (
	"errors"
	"maps"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic/kinds"
)

func (d *draft) add(edit *Edit) error {
	part := *edit.Part
	if part.Ref == "" {
		part.Ref = d.freeRef(part.Kind.Letter)
	}
	if d.Part(part.Ref) != nil {
		return conflict("the reference -%s is taken", part.Ref)
	}
	before := Join(&d.Sheet)
	d.Parts = append(d.Parts, part)
	d.made.Refs = append(d.made.Refs, part.Ref)
	d.insertInSeries(len(d.Parts) - 1)
	d.noteJoins(before, []int{len(d.Parts) - 1})
	return nil
}

// freeRef is the letter with the lowest number that no part has yet.
func (d *draft) freeRef(letter string) string {
	for number := 1; ; number++ {
		if ref := letter + strconv.Itoa(number); d.Part(ref) == nil {
			return ref
		}
	}
}

func (d *draft) set(edit *Edit) error {
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	place := under(d.place, "values")
	members, ok := edit.Values.(object)
	if !ok {
		return refuse(place, "write the values as an object in braces")
	}
	values := maps.Clone(part.Values)
	if values == nil {
		values = kinds.Values{}
	}
	for _, m := range members {
		spec, known := part.Kind.Spec(m.key)
		if !known {
			return refuse(under(place, m.key), "a %s has no value of this name", part.Kind.Title)
		}
		if m.value == nil {
			delete(values, m.key)
			continue
		}
		value, err := spec.Read(m.value)
		if err != nil {
			return refuse(under(place, m.key), "%v", err)
		}
		values[m.key] = value
	}
	changed := *part
	changed.Values = values
	if err := checkPart("", &changed, d.System); err != nil {
		var wrong *PlaceError
		errors.As(err, &wrong)
		return refuse(under(d.place, wrong.Place), "%s", wrong.Message)
	}
	*part = changed
	d.dropPositions(part)
	return nil
}

// dropPositions puts a part back to rest in cases that name a position it no longer has.
func (d *draft) dropPositions(part *Part) {
	for i := range d.Cases {
		position, named := d.Cases[i].Positions[part.Ref]
		if named && (part.Kind.Positions == nil || !slices.Contains(part.Kind.Positions(part.Fill()), position)) {
			d.Cases[i].Positions = without(d.Cases[i].Positions, part.Ref)
		}
	}
}

// without is a copy of the names that lacks one of them.
func without(names map[string]string, name string) map[string]string {
	rest := maps.Clone(names)
	delete(rest, name)
	if len(rest) == 0 {
		return nil
	}
	return rest
}

func (d *draft) rename(edit *Edit) error {
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	if edit.To == edit.Ref {
		return nil
	}
	if err := checkRef(under(d.place, "to"), edit.To); err != nil {
		return err
	}
	if d.Part(edit.To) != nil {
		return conflict("the reference -%s is taken", edit.To)
	}
	part.Ref = edit.To
	for i := range d.Cases {
		if position, named := d.Cases[i].Positions[edit.Ref]; named {
			d.Cases[i].Positions = maps.Clone(d.Cases[i].Positions)
			delete(d.Cases[i].Positions, edit.Ref)
			d.Cases[i].Positions[edit.To] = position
		}
	}
	if pin, found := strings.CutPrefix(d.Reference, edit.Ref+":"); found {
		d.Reference = edit.To + ":" + pin
	}
	return nil
}

func (d *draft) remove(edit *Edit) error {
	if len(edit.Refs)+len(edit.Wires) == 0 {
		return refuse(d.place, "name the parts or wires to remove")
	}
	if _, err := d.parts(edit.Refs); err != nil {
		return err
	}
	if _, err := d.wires(edit.Wires); err != nil {
		return err
	}
	d.Parts = slices.DeleteFunc(d.Parts, func(part Part) bool { return slices.Contains(edit.Refs, part.Ref) })
	d.Wires = slices.DeleteFunc(d.Wires, func(wire Wire) bool { return slices.Contains(edit.Wires, wire.ID) })
	for i := range d.Cases {
		for _, ref := range edit.Refs {
			if _, named := d.Cases[i].Positions[ref]; named {
				d.Cases[i].Positions = without(d.Cases[i].Positions, ref)
			}
		}
	}
	d.dropJoints()
	return nil
}

func (d *draft) label(edit *Edit) error {
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	part.Label = edit.At
	return nil
}

// head changes what stands in the title block and what the sheet is set to.
func (d *draft) head(edit *Edit) error {
	changed := d.Sheet
	if err := readFields(edit.Set, under(d.place, "set"), "the sheet", headReaders(&changed)); err != nil {
		return err
	}
	if err := checkHead(&changed); err != nil {
		var wrong *PlaceError
		errors.As(err, &wrong)
		return refuse(under(under(d.place, "set"), wrong.Place), "%s", wrong.Message)
	}
	d.Sheet = changed
	return nil
}
