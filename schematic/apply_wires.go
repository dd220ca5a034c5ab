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
	wire := Wire{d.wireName(), points}
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
// other than the one with the given index.
func (d *draft) chain(points []Point, but int) ([]Point, error) {
	place := under(d.place, "points")
	if err := checkChain(points, true); err != nil {
		return nil, below(err, place)
	}
	chain := straighten(points)
	if chain == nil {
		return nil, refuse(place, "the wire ends where it begins; draw it to another place")
	}
	for i := 1; i < len(chain); i++ {
		if !d.covered(but, chain[i-1], chain[i]) {
			return chain, nil
		}
	}
	return nil, refuse(place, "this wire is drawn already")
}

// covered reports whether wires other than the one with the given index run along the whole of a straight stretch.
func (d *draft) covered(but int, from, to Point) bool {
	type span struct{ low, high int }
	level := from.Y == to.Y
	along := func(p Point) int {
		if level {
			return p.X
		}
		return p.Y
	}
	var spans []span
	for w := range d.Wires {
		for i := 1; w != but && i < len(d.Wires[w].Points); i++ {
			a, b := d.Wires[w].Points[i-1], d.Wires[w].Points[i]
			if inLine(a, b, from) && inLine(a, b, to) {
				spans = append(spans, span{min(along(a), along(b)), max(along(a), along(b))})
			}
		}
	}
	slices.SortFunc(spans, func(a, b span) int { return a.low - b.low })
	reached, end := min(along(from), along(to)), max(along(from), along(to))
	for _, s := range spans {
		if s.low <= reached {
			reached = max(reached, s.high)
		}
	}
	return reached >= end
}

func (d *draft) joint(edit *Edit) error {
	if slices.Contains(d.Joints, *edit.At) {
		return refuse(under(d.place, "at"), "the crossing is joined already")
	}
	if !slices.Contains(Join(&d.Sheet).Crossings, *edit.At) {
		return refuse(under(d.place, "at"), "no wires cross here without being joined; put the joint on a crossing")
	}
	d.Joints = append(d.Joints, *edit.At)
	return nil
}

func (d *draft) removeJoint(edit *Edit) error {
	i := slices.Index(d.Joints, *edit.At)
	if i < 0 {
		return conflict("there is no joint at %d, %d; somebody may have removed it", edit.At.X, edit.At.Y)
	}
	d.Joints = slices.Delete(d.Joints, i, i+1)
	return nil
}

// noteTouching puts down in words what a new part touches with each of its pins, but for those that a wire was cut for.
func (d *draft) noteTouching(index int, inSeries []int) {
	part := &d.Parts[index]
	for k := range part.Kind.Pins {
		if slices.Contains(inSeries, k) {
			continue
		}
		var touched []string
		place := part.pin(k)
		for i := range d.Parts {
			for o := range d.Parts[i].Kind.Pins {
				if i != index && d.Parts[i].pin(o) == place {
					touched = append(touched, d.pinName(i, o))
				}
			}
		}
		for _, wire := range d.Wires {
			if leadsOver(wire.Points, place) {
				touched = append(touched, "wire "+wire.ID)
			}
		}
		if len(touched) > 0 {
			d.made.Joined = append(d.made.Joined, fmt.Sprintf("%s now touches %s", d.pinName(index, k), inWords(touched)))
		}
	}
}

func (d *draft) pinName(part, pin int) string {
	return "-" + d.Parts[part].Ref + ":" + d.Parts[part].Kind.Pins[pin].Name
}

// inWords lists names as a sentence does: "a, b and c".
func inWords(names []string) string {
	last := len(names) - 1
	if last < 1 {
		return strings.Join(names, "")
	}
	return strings.Join(names[:last], ", ") + " and " + names[last]
}
