package schematic

import (
	"errors"
	"fmt"
	"maps"
	"slices"
	"strings"

	"loopwright/schematic/kinds"
)

// caseAt finds the case that an edit is about.
func (d *draft) caseAt(name string) (int, error) {
	if i := d.Case(name); i >= 0 {
		return i, nil
	}
	return 0, conflict("there is no case %q; somebody may have removed or renamed it", name)
}

// putCase puts a case in the place of the one with its name, or behind the case that the edit names, or behind all.
func (d *draft) putCase(edit *Edit) error {
	c := *edit.Case
	i := d.Case(c.Name)
	switch {
	case edit.After != "" && edit.After == c.Name:
		return refuse(under(d.place, "after"), "a case cannot stand behind itself")
	case edit.After != "":
		if i >= 0 {
			d.Cases = slices.Delete(d.Cases, i, i+1)
		}
		before, err := d.caseAt(edit.After)
		if err != nil {
			return err
		}
		i = before + 1
		d.Cases = slices.Insert(d.Cases, i, c)
	case i >= 0:
		d.Cases[i] = c
	default:
		i = len(d.Cases)
		d.Cases = append(d.Cases, c)
	}
	if err := d.checkCases(i, under(d.place, "case")); err != nil {
		return err
	}
	d.Cases[i] = d.Cases[i].withoutRest(d.byRef())
	return nil
}

// checkCases checks all cases; what is wrong with the case of the given index is told at the given place, and what is
// wrong with another one at the edit.
func (d *draft) checkCases(index int, place string) error {
	err := checkCases(&d.Sheet)
	wrong := (*PlaceError)(nil)
	if !errors.As(err, &wrong) {
		return err
	}
	if field, mine := strings.CutPrefix(wrong.Place, at("cases", index)+"."); mine {
		return &PlaceError{under(place, field), wrong.Message}
	}
	other := 0
	if _, err := fmt.Sscanf(wrong.Place, "cases[%d]", &other); err == nil && other < len(d.Cases) {
		return refuse(d.place, "this does not go together with the case %q: %s", d.Cases[other].Name, wrong.Message)
	}
	return atPlace(err, d.place)
}

// withoutRest is the case without positions that say no more than that a part is at rest.
func (c Case) withoutRest(parts map[string]*Part) Case {
	positions := make(map[string]string, len(c.Positions))
	for ref, position := range c.Positions {
		if position != parts[ref].rest() {
			positions[ref] = position
		}
	}
	if c.Positions = positions; len(positions) == 0 {
		c.Positions = nil
	}
	return c
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
	if err := checkPosition(part, edit.Ref, edit.Position); err != nil {
		return below(err, under(d.place, "position"))
	}
	if part.rest() == edit.Position {
		d.Cases[i].Positions = without(d.Cases[i].Positions, edit.Ref)
	} else {
		d.Cases[i].Positions = with(d.Cases[i].Positions, edit.Ref, edit.Position)
	}
	return nil
}

// with is a copy of names that holds one more.
func with(names map[string]string, name, text string) map[string]string {
	more := maps.Clone(names)
	if more == nil {
		more = map[string]string{}
	}
	more[name] = text
	return more
}

// without is a copy of names that lacks one of them; nil when none is left.
func without(names map[string]string, name string) map[string]string {
	if _, named := names[name]; !named {
		return names
	}
	rest := maps.Clone(names)
	delete(rest, name)
	if len(rest) == 0 {
		return nil
	}
	return rest
}

func (d *draft) renameCase(edit *Edit) error {
	i, err := d.caseAt(edit.Name)
	if err != nil {
		return err
	}
	if edit.To != edit.Name && d.Case(edit.To) >= 0 {
		return conflict("there is a case %q already; take another name", edit.To)
	}
	d.Cases[i].Name = edit.To
	d.refollow(edit.Name, edit.To)
	return d.checkCases(i, d.place)
}

// refollow lets the cases that follow one case follow another.
func (d *draft) refollow(from, to string) {
	for k := range d.Cases {
		if d.Cases[k].Follows == from {
			d.Cases[k].Follows = to
		}
	}
}

func (d *draft) orderCases(edit *Edit) error {
	if len(edit.Names) != len(d.Cases) {
		return conflict("the sheet has %d cases, and %d were put in order; somebody may have added or removed one", len(d.Cases), len(edit.Names))
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
	return d.checkCases(-1, d.place)
}

// removeCase takes a case away; those that followed it follow the one that it followed. The last case becomes Rest.
func (d *draft) removeCase(edit *Edit) error {
	i, err := d.caseAt(edit.Name)
	if err != nil {
		return err
	}
	follows := d.Cases[i].Follows
	d.Cases = slices.Delete(d.Cases, i, i+1)
	d.refollow(edit.Name, follows)
	if len(d.Cases) == 0 {
		d.Cases = []Case{{Name: restCase, Supply: kinds.Nominal}}
	}
	return nil
}
