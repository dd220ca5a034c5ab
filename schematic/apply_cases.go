package schematic

import (
	"maps"
	"slices"

	"loopwright/schematic/kinds"
)

// caseAt finds the case that an edit is about.
func (d *draft) caseAt(name string) (int, error) {
	if i := d.Case(name); i >= 0 {
		return i, nil
	}
	return 0, conflict("there is no case %q any more", name)
}

// putCase puts a case in the place of the one with its name, or behind all others.
func (d *draft) putCase(edit *Edit) error {
	c := *edit.Case
	if i := d.Case(c.Name); i >= 0 {
		d.Cases[i] = c
		return nil
	}
	d.Cases = append(d.Cases, c)
	return nil
}

// operate puts one part into a position in one case.
func (d *draft) operate(edit *Edit) error {
	i, err := d.caseAt(edit.Name)
	if err != nil {
		return err
	}
	part, err := d.part(edit.Ref)
	if err != nil {
		return err
	}
	if err := checkPosition(under(d.place, "position"), part, edit.Ref, edit.Position); err != nil {
		return err
	}
	if part.Kind.Positions(part.Fill())[0] == edit.Position {
		d.Cases[i].Positions = without(d.Cases[i].Positions, edit.Ref)
		return nil
	}
	positions := maps.Clone(d.Cases[i].Positions)
	if positions == nil {
		positions = map[string]string{}
	}
	positions[edit.Ref] = edit.Position
	d.Cases[i].Positions = positions
	return nil
}

func (d *draft) renameCase(edit *Edit) error {
	i, err := d.caseAt(edit.Name)
	if err != nil {
		return err
	}
	if edit.To != edit.Name && d.Case(edit.To) >= 0 {
		return conflict("there is a case %q already", edit.To)
	}
	d.Cases[i].Name = edit.To
	for k := range d.Cases {
		if d.Cases[k].Follows == edit.Name {
			d.Cases[k].Follows = edit.To
		}
	}
	return nil
}

func (d *draft) orderCases(edit *Edit) error {
	if len(edit.Names) != len(d.Cases) {
		return conflict("the sheet has %d cases, and %d were ordered", len(d.Cases), len(edit.Names))
	}
	ordered := make([]Case, 0, len(d.Cases))
	for i, name := range edit.Names {
		k, err := d.caseAt(name)
		if err != nil {
			return err
		}
		if slices.Contains(edit.Names[:i], name) {
			return refuse(at(under(d.place, "names"), i), "the case %q is named twice", name)
		}
		ordered = append(ordered, d.Cases[k])
	}
	d.Cases = ordered
	return nil
}

// removeCase takes a case away; those that followed it follow the one that it followed. The last case becomes Rest.
func (d *draft) removeCase(edit *Edit) error {
	i, err := d.caseAt(edit.Name)
	if err != nil {
		return err
	}
	follows := d.Cases[i].Follows
	d.Cases = slices.Delete(d.Cases, i, i+1)
	for k := range d.Cases {
		if d.Cases[k].Follows == edit.Name {
			d.Cases[k].Follows = follows
		}
	}
	if len(d.Cases) == 0 {
		d.Cases = []Case{{Name: restCase, Supply: kinds.Nominal}}
	}
	return nil
}
