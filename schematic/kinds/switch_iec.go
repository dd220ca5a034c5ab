package kinds

import "loopwright/schematic/stroke"

// switchSymbol draws one pole of a switch with what operates it. What conducts has a heavy blade, what is open has a
// thin one that stands off.
func switchSymbol(look Look) stroke.List {
	if look.Set == ANSI {
		return switchANSI(look)
	}
	blade, list := contactIEC(look)
	return append(append(list, blade), actuatorIEC(look.Values.Word("actuator"), blade)...)
}

// hinge is how far the fixed ends of a contact lie from its middle.
const hinge = 0.8

// contactIEC gives the blade of a contact of IEC 60617-7, from its pivot to its tip, and what else is drawn of it. A make
// contact stands open to the left, a break contact lies against a stop at the right; either moves to the right when
// operated.
func contactIEC(look Look) (blade stroke.Path, list stroke.List) {
	list = leads(hinge)
	breaks := breaksAtRest(look.Values)
	if breaks {
		list = append(list, stroke.Line(0, -hinge, 0.5, -hinge))
	}
	tip := stroke.Point{X: -0.75, Y: -0.7}
	switch {
	case breaks && look.Closed:
		tip = stroke.Point{X: 0.56, Y: -1.05}
	case breaks:
		tip = stroke.Point{X: 1.15, Y: -0.6}
	case look.Closed:
		tip = stroke.Point{Y: -hinge}
	}
	blade = stroke.Line(0, hinge, tip.X, tip.Y)
	if look.Closed {
		blade.Weight = stroke.Heavy
	}
	return blade, list
}

// breaksAtRest reports whether a switch conducts at rest and is therefore drawn as a break contact.
func breaksAtRest(values Filled) bool {
	if values.Has("positions") {
		return switchClosed(values, values.Names("positions")[0])
	}
	return values.Word("form") == "break"
}

// head is where the link from an actuator to its contact begins.
const head = -1.7

// actuatorIEC draws what operates a contact after IEC 60617-2, at the left, with a dashed link to the blade.
func actuatorIEC(actuator string, blade stroke.Path) stroke.List {
	pivot, tip := blade.Points[0], blade.Points[1]
	if actuator == "limit" {
		return stroke.List{wedge(pivot, tip)} // IEC 60617-7: on the blade itself
	}
	link := dashed(stroke.Line(crossing(pivot, tip).X, 0, head, 0))
	return append(stroke.List{link}, actuatorHead(actuator)...)
}

// actuatorHead is the sign of an actuator, which touches the link at (head, 0) from the left.
func actuatorHead(actuator string) stroke.List {
	const h, arm = 0.42, 0.28
	switch actuator {
	case "mushroom":
		return stroke.List{
			stroke.Line(head, -0.5, head, 0.5),
			stroke.Arc{Center: stroke.Point{X: head}, Radius: 0.5, Start: 90, Sweep: 180},
		}
	case "selector":
		return stroke.List{stroke.Line(head+arm, -h, head, -h, head, h, head-arm, h)}
	case "toggle":
		return stroke.List{
			stroke.Line(head, 0, head-0.33, -0.52),
			stroke.Circle{Center: stroke.Point{X: head - 0.42, Y: -0.67}, Radius: 0.17},
		}
	case "float":
		return stroke.List{
			stroke.Circle{Center: stroke.Point{X: head - 0.35}, Radius: 0.35},
			stroke.Line(head-0.95, 0, head-0.7, 0), stroke.Line(head-0.95, 0.5, head+0.25, 0.5),
		}
	case "proximity":
		return stroke.List{stroke.Outline(head, 0, head-0.5, -0.5, head-1, 0, head-0.5, 0.5)}
	case "pressure":
		return boxed("p")
	case "temperature":
		return boxed("θ")
	case "output":
		return boxed("Q")
	case "overload":
		return append(stroke.List{square()}, stroke.Line(head-0.45, -0.45, head-0.45, -0.2, head-0.7, -0.2, head-0.7, 0.2, head-0.45, 0.2, head-0.45, 0.45))
	}
	return stroke.List{stroke.Line(head+arm, -h, head, -h, head, h, head+arm, h)} // push
}

// square is the box of an actuator that a process or another device works.
func square() stroke.Path { return stroke.Rectangle(head-0.9, -0.45, head, 0.45) }

// boxed is that box with the letter of the quantity, or of the output (IEC 61131-3 writes Q), that works it.
func boxed(letter string) stroke.List {
	sign := capital(letter, head-0.45, 0)
	sign.Height = 0.75
	return stroke.List{square(), sign}
}
