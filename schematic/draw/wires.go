package draw

import (
	"cmp"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic"
	"loopwright/schematic/stroke"
	"loopwright/schematic/trace"
)

// wireGroups draws the wires, each as it is stored.
func wireGroups(groups []Group, drawing *trace.Drawing, interactive bool) []Group {
	for i := range drawing.Sheet.Wires {
		wire := &drawing.Sheet.Wires[i]
		points := make([]stroke.Point, len(wire.Points))
		places := make([]byte, 0, 8*len(wire.Points))
		for j, p := range wire.Points {
			points[j] = onGrid(p)
			if j > 0 {
				places = append(places, ' ')
			}
			places = strconv.AppendInt(places, int64(p.X), 10)
			places = append(places, ',')
			places = strconv.AppendInt(places, int64(p.Y), 10)
		}
		group := Group{
			ID: "wire-" + safeID(wire.ID), Layer: WireLayer,
			Attributes: []Attribute{
				{"data-wire", wire.ID},
				{"data-potential", drawing.Potentials[drawing.WirePotential[i]].Number},
				{"data-points", string(places)},
			},
			List: stroke.List{stroke.Path{Points: points}},
		}
		if interactive {
			group.Along = points
		}
		groups = append(groups, group)
	}
	return groups
}

// safeID is a name as it can stand in an id, which has no spaces.
func safeID(name string) string { return strings.ReplaceAll(name, " ", "%20") }

// dotRadius is the radius of the dot where wires join, in grid steps.
const dotRadius = 0.15

// joinGroups draws a dot where three or more ways meet.
func joinGroups(groups []Group, dots []schematic.Point) []Group {
	for _, dot := range dots {
		groups = append(groups, Group{
			ID: "join-" + placeID(dot), Layer: JoinLayer,
			List: stroke.List{stroke.Circle{Center: onGrid(dot), Radius: dotRadius, Style: stroke.Style{Filled: true, Weight: stroke.Fine}}},
		})
	}
	return groups
}

func placeID(p schematic.Point) string { return strconv.Itoa(p.X) + "-" + strconv.Itoa(p.Y) }

// blockWires puts wires, dots and loose ends in the way of lettering.
func blockWires(drawing *trace.Drawing, o *obstacles) {
	for _, wire := range drawing.Sheet.Wires {
		for i := 1; i < len(wire.Points); i++ {
			o.add(spanned(wire.Points[i-1], wire.Points[i]).Grown(clearOfLines))
		}
	}
	for _, dot := range drawing.Joins.Dots {
		o.add(around(onGrid(dot), dotRadius+0.05))
	}
}

// spanned is the box between two corners.
func spanned(p, q schematic.Point) stroke.Box {
	a, b := onGrid(p), onGrid(q)
	return stroke.Box{Left: min(a.X, b.X), Top: min(a.Y, b.Y), Right: max(a.X, b.X), Bottom: max(a.Y, b.Y)}
}

// numberGroups writes each potential's wire number near the middle of its longest piece of wire, or of the next one
// where that is crowded. A number that finds no room is left out: the wire's other pieces say what belongs together.
func numberGroups(groups []Group, drawing *trace.Drawing, o *obstacles) []Group {
	pieces := make([][]stroke.Box, len(drawing.Potentials))
	for _, piece := range drawing.Joins.Pieces {
		potential := drawing.WirePotential[piece.Wire]
		pieces[potential] = append(pieces[potential], spanned(piece.From, piece.To))
	}
	for i, list := range pieces {
		text := drawing.Potentials[i].WireNumber
		if text == "" {
			continue
		}
		slices.SortStableFunc(list, func(a, b stroke.Box) int { return cmp.Compare(lengthOf(b), lengthOf(a)) })
		for _, piece := range list {
			if number, ok := numberAt(piece, text, o); ok {
				o.add(capitalBox(number).Grown(0.1))
				groups = append(groups, Group{ID: "pot-" + safeID(drawing.Potentials[i].Number), Layer: MarkLayer, List: stroke.List{number}})
				break
			}
		}
	}
	return groups
}

func lengthOf(piece stroke.Box) float64 { return piece.Right - piece.Left + piece.Bottom - piece.Top }

// numberAt finds room for a wire number at a piece: over a level one or beside an upright one, at its middle or a little
// away from it.
func numberAt(piece stroke.Box, text string, o *obstacles) (stroke.Text, bool) {
	center := stroke.Point{X: (piece.Left + piece.Right) / 2, Y: (piece.Top + piece.Bottom) / 2}
	number := stroke.Text{Text: text, Height: numberHeight, Ink: stroke.Black}
	half := lengthOf(piece) / 2
	for _, shift := range [...]float64{0, -0.75, 0.75, -1.5, 1.5, -2.5, 2.5, -4, 4, -6, 6} {
		if shift > half || -shift > half {
			break
		}
		for _, side := range [...]float64{-1, 1} {
			if piece.Top == piece.Bottom {
				number.Anchor = stroke.Middle
				number.At = stroke.Point{X: center.X + shift, Y: center.Y - 0.22}
				if side > 0 {
					number.At.Y = center.Y + 0.22 + capHeight*numberHeight
				}
			} else {
				number.At = stroke.Point{X: center.X - side*0.22, Y: center.Y + shift + capHeight*numberHeight/2}
				number.Anchor = stroke.Start
				if side > 0 {
					number.Anchor = stroke.End
				}
			}
			if o.free(capitalBox(number).Grown(0.08)) {
				return number, true
			}
		}
	}
	return stroke.Text{}, false
}

// capitalBox is the box of a text without letters that go below the baseline.
func capitalBox(text stroke.Text) stroke.Box {
	box := textBox(text)
	box.Top, box.Bottom = baseline(text)-capHeight*text.Height, baseline(text)
	return box
}
