package trace

import (
	"fmt"
	"slices"
	"strings"

	"loopwright/schematic"
)

// state says what hangs free, what floats, and which names are not what they seem.
func (d *Drawing) state() {
	d.stateNames()
	ways := make([]int, len(d.Joins.Places)) // pieces of wire that meet at each place, and pins that lie there
	for _, piece := range d.Joins.Pieces {
		ways[d.Joins.Node[piece.From]]++
		ways[d.Joins.Node[piece.To]]++
	}
	for _, pins := range d.places {
		for _, place := range pins {
			ways[place]++
		}
	}
	d.stateOpenPins(ways)
	d.stateDanglingEnds(ways)
	d.stateFloating()
}

// stateOpenPins names the pins of branches to which nothing is joined.
func (d *Drawing) stateOpenPins(ways []int) {
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		if part.Kind.Branches == nil {
			continue
		}
		for k, pin := range part.Kind.Pins {
			if ways[d.places[i][k]] > 1 {
				continue
			}
			at := part.Pin(pin)
			d.Statements = append(d.Statements, Statement{
				Rule: "open-pin", Says: fmt.Sprintf("-%s:%s is joined to nothing.", part.Ref, pin.Name), Refs: []string{part.Ref}, At: &at,
			})
		}
	}
}

// stateDanglingEnds names the ends of wires at which nothing else is.
func (d *Drawing) stateDanglingEnds(ways []int) {
	for w := range d.Sheet.Wires {
		points := d.Sheet.Wires[w].Points
		for _, end := range []schematic.Point{points[0], points[len(points)-1]} {
			if ways[d.Joins.Node[end]] == 1 {
				at := end
				d.Statements = append(d.Statements, Statement{
					Rule: "dangling-end", Says: fmt.Sprintf("A wire of potential %s ends at nothing.", d.Potentials[d.WirePotential[w]].WireNumber),
					Wire: d.Sheet.Wires[w].ID, At: &at,
				})
			}
		}
	}
}

// stateFloating names the parts that no way of branches connects to the reference.
func (d *Drawing) stateFloating() {
	if len(d.Branches) == 0 {
		return
	}
	sets := newSets(len(d.Potentials))
	for _, branch := range d.Branches {
		sets.union(branch.From, branch.To)
	}
	apart := map[int][]string{}
	var order []int
	for _, branch := range d.Branches {
		root := sets.find(branch.From)
		if root == sets.find(d.Reference) {
			continue
		}
		if apart[root] == nil {
			order = append(order, root)
		}
		if refs := apart[root]; !slices.Contains(refs, branch.Ref) {
			apart[root] = append(refs, branch.Ref)
		}
	}
	for _, root := range order {
		refs := apart[root]
		d.Statements = append(d.Statements, Statement{
			Rule: "floating", Refs: refs,
			Says: fmt.Sprintf("%s no connection to the reference potential 0, so that voltages to it are not defined there.", have(refs)),
		})
	}
}

// have names up to four parts and says "has" or "have".
func have(refs []string) string {
	const most = 4
	if len(refs) == 1 {
		return "-" + refs[0] + " has"
	}
	if len(refs) > most {
		return fmt.Sprintf("-%s and %d more parts have", strings.Join(refs[:most], ", -"), len(refs)-most)
	}
	return "-" + strings.Join(refs[:len(refs)-1], ", -") + " and -" + refs[len(refs)-1] + " have"
}
