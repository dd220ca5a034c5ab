package kinds

import (
	"math"

	"loopwright/schematic/stroke"
)

// Lengths that the symbols share, in grid steps of 5 mm. The module M of IEC 60617 is half a step.
const (
	roundRadius = 0.8  // of lamps, meters and ideal sources
	barWidth    = 0.32 // half the width of a resistor or fuse, whose length is three times its width
)

// leads are the two lines from the pins of a two-pin part to its body.
func leads(half float64) stroke.List {
	return stroke.List{stroke.Line(0, -2, 0, -half), stroke.Line(0, half, 0, 2)}
}

// round is a circle in the middle of a two-pin part, with its leads.
func round() stroke.List {
	return append(leads(roundRadius), stroke.Circle{Radius: roundRadius})
}

// diagonals are both diameters of the circle at 45°.
func diagonals(radius float64) stroke.List {
	d := radius * math.Sqrt2 / 2
	return stroke.List{stroke.Line(-d, -d, d, d), stroke.Line(-d, d, d, -d)}
}

// lettered is the circle of a meter with its letter, IEC 60617-8 and IEEE 315 alike.
func lettered(letter string) stroke.List {
	return append(round(), capital(letter, 0, 0))
}

// capital is a capital letter centred within a symbol.
func capital(letter string, x, y float64) stroke.Text {
	return stroke.Text{At: stroke.Point{X: x, Y: y}, Text: letter, Height: 1, Anchor: stroke.Middle, Centred: true}
}

// upright takes shapes about the origin that must be seen as they are drawn, and turns them against the part, so that
// they come out level once the part is placed.
func upright(look Look, list stroke.List) stroke.List {
	list = list.Placed(stroke.Point{}, (360-look.Turn)%360, false)
	if look.Flip {
		list = list.Placed(stroke.Point{}, 0, true)
	}
	return list
}

// arrowhead is a filled triangle with its tip at a point; it points up, as from pin 2 to pin 1.
func arrowhead(x, tip float64) stroke.Path {
	head := stroke.Outline(x, tip, x-0.18, tip+0.5, x+0.18, tip+0.5)
	head.Filled = true
	return head
}

// thick draws a path a step heavier than the rest.
func thick(path stroke.Path) stroke.Path {
	path.Weight = stroke.Medium
	return path
}

// dashed draws a path as a mechanical link.
func dashed(path stroke.Path) stroke.Path {
	path.Dashed = true
	path.Weight = stroke.Fine
	return path
}

// wedge is the cam of a limit switch, on the left of a blade from its pivot to its tip.
func wedge(pivot, tip stroke.Point) stroke.Path {
	at := func(along, aside float64) stroke.Point {
		dx, dy := tip.X-pivot.X, tip.Y-pivot.Y
		length := math.Hypot(dx, dy)
		return stroke.Point{X: pivot.X + along*dx + aside*dy/length, Y: pivot.Y + along*dy - aside*dx/length}
	}
	return stroke.Path{Points: []stroke.Point{at(0.34, 0), at(0.52, 0.42), at(0.7, 0)}}
}

// crossing is where a blade from a pivot on the axis to its tip lies level with the middle of the symbol.
func crossing(pivot, tip stroke.Point) stroke.Point {
	return stroke.Point{X: pivot.Y / (pivot.Y - tip.Y) * tip.X}
}
