package schematic

import (
	"fmt"
	"slices"
	"strings"
)

func (d *draft) wire(edit *Edit) error {
	points, err := d.chain(edit.Points, -1)
	if err != nil {
		return err
	}
	wire := Wire{newWireNames(&d.Sheet)(), points}
	d.Wires = append(d.Wires, wire)
	d.made.Wires = append(d.made.Wires, wire.ID)
	return nil
}

func (d *draft) reroute(edit *Edit) error {
	found, err := d.wires([]string{edit.Wire})
	if err != nil {
		return err
	}
	points, err := d.chain(edit.Points, found[0])
	if err != nil {
		return err
	}
	d.Wires[found[0]].Points = points
	d.dropJoints()
	return nil
}

// chain checks the places of a wire that is to be drawn, straightens them, and refuses what is drawn already by wires
// other than the one given.
func (d *draft) chain(points []Point, but int) ([]Point, error) {
	place := under(d.place, "points")
	if err := checkChain(place, dropRepeats(points)); err != nil {
		return nil, err
	}
	chain := straighten(points)
	if chain == nil {
		return nil, refuse(place, "the wire ends where it begins; draw it to another place")
	}
	others := d.Sheet
	others.Parts, others.Joints = nil, nil
	others.Wires = slices.Clone(d.Wires)
	if but >= 0 {
		others.Wires = slices.Delete(others.Wires, but, but+1)
	}
	others.Wires = append(others.Wires, Wire{"", chain})
	for _, piece := range Join(&others).Pieces {
		if piece.Wire == len(others.Wires)-1 {
			return chain, nil
		}
	}
	return nil, refuse(place, "this wire is drawn already")
}

// dropRepeats leaves out places that repeat the one before, as a hesitating hand gives them.
func dropRepeats(points []Point) []Point { return slices.Compact(slices.Clone(points)) }

func (d *draft) joint(edit *Edit) error {
	if slices.Contains(d.Joints, *edit.At) {
		return refuse(under(d.place, "at"), "the crossing is joined already")
	}
	if !slices.Contains(Join(&d.Sheet).Crossings, *edit.At) {
		return refuse(under(d.place, "at"), "no wires cross here without being joined")
	}
	d.Joints = append(d.Joints, *edit.At)
	return nil
}

func (d *draft) removeJoint(edit *Edit) error {
	i := slices.Index(d.Joints, *edit.At)
	if i < 0 {
		return conflict("there is no joint at %d, %d any more", edit.At.X, edit.At.Y)
	}
	d.Joints = slices.Delete(d.Joints, i, i+1)
	return nil
}

// dropDoubles leaves out wires that are exactly like an earlier one.
func (d *draft) dropDoubles() {
	seen := make(map[string]bool, len(d.Wires))
	d.Wires = slices.DeleteFunc(d.Wires, func(wire Wire) bool {
		key := chainKey(wire.Points)
		double := seen[key]
		seen[key] = true
		return double
	})
}

// noteJoins puts down in words what is joined now and was not before, for the parts that were added or moved.
func (d *draft) noteJoins(before *Joins, parts []int) {
	after := Join(&d.Sheet)
	was := map[int]map[int]string{} // group now → groups before, each with one pin of it
	for i := range before.Pins {
		for k, pin := range d.Parts[i].Kind.Pins {
			now := after.Pins[i][k]
			if was[now] == nil {
				was[now] = map[int]string{}
			}
			if group := before.Pins[i][k]; was[now][group] == "" || slices.Contains(parts, i) {
				was[now][group] = "-" + d.Parts[i].Ref + ":" + pin.Name
			}
		}
	}
	for now := range after.Groups {
		if len(was[now]) < 2 {
			continue
		}
		var names []string
		for _, name := range was[now] {
			names = append(names, name)
		}
		slices.Sort(names)
		d.made.Joined = append(d.made.Joined, fmt.Sprintf("%s are joined now", strings.Join(names, " and ")))
	}
}
