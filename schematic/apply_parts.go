package schematic

import (
	"maps"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic/kinds"
)

func (d *draft) add(edit *Edit) error {
	part := *edit.Part
	part.Values = maps.Clone(part.Values)
	if part.Ref == "" {
		part.Ref = d.freeRef(part.Kind.Letter)
	}
	if err := checkPart(&part, d.System); err != nil {
		return below(err, under(d.place, "part"))
	}
	if d.Part(part.Ref) != nil {
		return conflict("the reference -%s is taken; take another one", part.Ref)
	}
	part.dropDefaults()
	d.Parts = append(d.Parts, part)
	d.made.Refs = append(d.made.Refs, part.Ref)
	index := len(d.Parts) - 1
	anyWire := func(string, int, int) bool { return true }
	d.noteTouching(index, d.insertInSeries(index, anyWire))
	return nil
}

// freeRef is the letter with the lowest number that no part has yet.
func (d *draft) freeRef(letter string) string {
	taken := make(map[string]bool, len(d.Parts))
	for i := range d.Parts {
		taken[d.Parts[i].Ref] = true
	}
	for number := 1; ; number++ {
		if ref := letter + strconv.Itoa(number); !taken[ref] {
			return ref
		}
	}
}

func (d *draft) set(edit *Edit) error {
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	changed := *part
	if changed.Values, err = d.setValues(part, edit.Values); err != nil {
		return err
	}
	if err := checkPart(&changed, d.System); err != nil {
		return below(err, d.place)
	}
	changed.dropDefaults()
	*part = changed
	d.keepPositions(part)
	return nil
}

// setValues is a copy of the values of a part with some of them changed; null takes one back to its default.
func (d *draft) setValues(part *Part, change any) (kinds.Values, error) {
	place := under(d.place, "values")
	members, ok := change.(object)
	if !ok {
		return nil, refuse(place, "write the values as an object in braces")
	}
	values := make(kinds.Values, len(part.Values)+len(members))
	maps.Copy(values, part.Values)
	for _, m := range members {
		spec, known := part.Kind.Spec(m.key)
		if !known {
			return nil, refuse(under(place, m.key), "%s has no value of this name", oneOf(part))
		}
		if m.value == nil {
			delete(values, m.key)
			continue
		}
		value, err := spec.Read(m.value)
		if err != nil {
			return nil, refuse(under(place, m.key), "%v", err)
		}
		values[m.key] = value
	}
	return values, nil
}

// keepPositions puts a part whose values have changed back to rest in cases that name a position it no longer has.
func (d *draft) keepPositions(part *Part) {
	for i := range d.Cases {
		position, named := d.Cases[i].Positions[part.Ref]
		if named && (position == part.rest() || checkPosition(part, part.Ref, position) != nil) {
			d.Cases[i].Positions = without(d.Cases[i].Positions, part.Ref)
		}
	}
}

func (d *draft) rename(edit *Edit) error {
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	if edit.To == edit.Ref {
		return nil
	}
	if err := checkRef(edit.To); err != nil {
		return below(err, under(d.place, "to"))
	}
	if d.Part(edit.To) != nil {
		return conflict("the reference -%s is taken; take another one", edit.To)
	}
	part.Ref = edit.To
	if i := slices.Index(d.made.Refs, edit.Ref); i >= 0 {
		d.made.Refs[i] = edit.To
	}
	for i := range d.Cases {
		c := &d.Cases[i]
		c.Positions = renamed(c.Positions, edit.Ref, edit.To)
		c.Timers = renamed(c.Timers, edit.Ref, edit.To)
	}
	if pin, found := strings.CutPrefix(d.Reference, edit.Ref+":"); found {
		d.Reference = edit.To + ":" + pin
	}
	return nil
}

// renamed is a copy of names in which one is called otherwise.
func renamed(names map[string]string, from, to string) map[string]string {
	text, named := names[from]
	if !named {
		return names
	}
	return with(without(names, from), to, text)
}

// remove takes parts and wires away. Wires that ended at a part stay; cases forget its positions.
func (d *draft) remove(edit *Edit) error {
	parts, err := d.parts(edit.Refs)
	if err != nil {
		return err
	}
	wires, err := d.wires(edit.Wires)
	if err != nil {
		return err
	}
	if len(parts)+len(wires) == 0 {
		return refuse(d.place, "name the parts or wires to remove")
	}
	for i := range d.Cases {
		for _, part := range parts {
			d.Cases[i].Positions = without(d.Cases[i].Positions, d.Parts[part].Ref)
			d.Cases[i].Timers = without(d.Cases[i].Timers, d.Parts[part].Ref)
		}
	}
	d.Parts = leaveOut(d.Parts, parts)
	d.Wires = leaveOut(d.Wires, wires)
	d.dropJoints()
	return nil
}

// leaveOut removes the items at some indices, which ascend, in place.
func leaveOut[T any](list []T, indices []int) []T {
	kept := list[:0]
	for i, item := range list {
		if len(indices) > 0 && indices[0] == i {
			indices = indices[1:]
			continue
		}
		kept = append(kept, item)
	}
	return kept
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
	place := under(d.place, "set")
	changed := d.Sheet
	if err := readFields(edit.Set, place, "the sheet", headReaders(&changed)); err != nil {
		return err
	}
	if err := checkHead(&changed); err != nil {
		return below(err, place)
	}
	if changed.System != d.System {
		for i := range changed.Parts {
			if err := checkPart(&changed.Parts[i], changed.System); err != nil {
				return atPlace(err, under(place, "system"))
			}
		}
	}
	d.Sheet = changed
	return nil
}
