package kinds

import "loopwright/schematic/stroke"

// switchANSI draws one pole of a switch after IEEE 315 and NFPA 79: a bar over two small circles for what a hand
// presses, two parallel bars for what another device works, and a blade between two circles for the rest.
func switchANSI(look Look) stroke.List {
	switch actuator := look.Values.Word("actuator"); actuator {
	case "push", "mushroom":
		return buttonANSI(look, actuator == "mushroom")
	case "output", "overload":
		return contactANSI(look, breaksAtRest(look.Values))
	default:
		return bladeANSI(look, actuator)
	}
}

// eyes are the two small circles of a switch, with its leads.
func eyes() stroke.List {
	const gap, radius = 0.7, 0.16
	return append(leads(gap+radius),
		stroke.Circle{Center: stroke.Point{Y: -gap}, Radius: radius},
		stroke.Circle{Center: stroke.Point{Y: gap}, Radius: radius})
}

// buttonANSI draws a push button. The bar lies before the circles for a make contact and behind them for a break
// contact, and touches them when the contact is closed.
func buttonANSI(look Look, mushroom bool) stroke.List {
	const touching, off, cap = 0.16, 0.5, -1.3
	x := -off
	breaks := breaksAtRest(look.Values)
	switch {
	case breaks && look.Closed:
		x = touching
	case breaks:
		x = off
	case look.Closed:
		x = -touching
	}
	bar := stroke.Line(x, -0.95, x, 0.95)
	if look.Closed {
		bar.Weight = stroke.Heavy
	}
	list := append(eyes(), bar, stroke.Line(x, 0, cap, 0))
	if mushroom {
		return append(list, stroke.Line(cap, -0.5, cap, 0.5),
			stroke.Arc{Center: stroke.Point{X: cap}, Radius: 0.5, Start: 90, Sweep: 180})
	}
	return list
}

// contactANSI draws a contact that another device works: two parallel bars, with a stroke across them when it conducts
// at rest. A heavy line joins the bars while it conducts.
func contactANSI(look Look, breaks bool) stroke.List {
	const gap = 0.3
	list := append(leads(gap), stroke.Line(-0.6, -gap, 0.6, -gap), stroke.Line(-0.6, gap, 0.6, gap))
	if breaks {
		list = append(list, stroke.Line(-0.55, 0.6, 0.55, -0.6))
	}
	if look.Closed {
		bridge := stroke.Line(0, -gap, 0, gap)
		bridge.Weight = stroke.Heavy
		list = append(list, bridge)
	}
	return list
}

// bladeANSI draws a blade on the lower circle and the sign of what works it beside the blade.
func bladeANSI(look Look, actuator string) stroke.List {
	tip := stroke.Point{X: -0.85, Y: -0.55}
	breaks := breaksAtRest(look.Values)
	switch {
	case breaks && look.Closed:
		tip = stroke.Point{X: 0.2, Y: -0.95}
	case breaks:
		tip = stroke.Point{X: 0.95, Y: -0.5}
	case look.Closed:
		tip = stroke.Point{X: -0.17, Y: -0.75}
	}
	blade := stroke.Line(0, 0.54, tip.X, tip.Y)
	if look.Closed {
		blade.Weight = stroke.Heavy
	}
	if actuator == "limit" {
		return append(eyes(), blade, wedge(blade.Points[0], tip))
	}
	return append(append(eyes(), blade), workedANSI(actuator, crossing(blade.Points[0], tip).X)...)
}

// workedANSI is the sign of what works a blade whose middle lies at x.
func workedANSI(actuator string, x float64) stroke.List {
	stem := stroke.Line(x, 0, -1.3, 0)
	end := stroke.Point{X: -1.3}
	switch actuator {
	case "float": // a ball
		return stroke.List{stem, stroke.Circle{Center: stroke.Point{X: end.X - 0.3}, Radius: 0.3}}
	case "pressure": // a dome
		return stroke.List{stem, stroke.Line(end.X, -0.45, end.X, 0.45), stroke.Arc{Center: end, Radius: 0.45, Start: 90, Sweep: 180}}
	case "temperature": // a bimetal
		return stroke.List{stem, stroke.Line(end.X, 0, end.X, -0.25, end.X-0.3, -0.25, end.X-0.3, 0.25, end.X-0.6, 0.25, end.X-0.6, 0)}
	case "proximity": // a diamond
		return stroke.List{stem, stroke.Outline(end.X, 0, end.X-0.4, -0.4, end.X-0.8, 0, end.X-0.4, 0.4)}
	case "selector": // a handle that turns
		return stroke.List{dashed(stem), stroke.Line(end.X+0.28, -0.42, end.X, -0.42, end.X, 0.42, end.X-0.28, 0.42)}
	}
	return nil // a toggle is the blade alone
}
