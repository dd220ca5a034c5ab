package draw

import (
	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/stroke"
)

// symbol is a part as it lies on the sheet. Its boxes hold it in every position, so that lettering stays in its place
// from case to case.
type symbol struct {
	part  *schematic.Part
	look  kinds.Look
	list  stroke.List
	names []string     // the lines of lettering that stand at it apart from its values
	boxes []stroke.Box // of its shapes
	body  stroke.Box   // of the symbol without the lines to its pins
	whole stroke.Box   // of the symbol with them
	at    stroke.Point // the origin of the part
	level bool         // its pins lie side by side, not one above the other
}

// placed draws the symbol of a part in a position.
func placed(part *schematic.Part, set kinds.SymbolSet, position string) symbol {
	s := symbol{part: part, at: onGrid(part.At), level: part.Turn%180 != 0}
	s.look = kinds.Look{Values: part.Fill(), Set: set, Turn: part.Turn, Flip: part.Flip}
	s.whole = around(s.at, 0)
	s.boxes = make([]stroke.Box, 0, 12)
	if part.Kind.Positions == nil {
		s.look.Position, s.look.Closed = position, true
		s.list = s.drawn()
		s.measure(s.list)
	} else {
		s.drawInAll(part.Kind.Positions(s.look.Values), position)
	}
	s.settle()
	s.names = s.written()
	return s
}

// drawInAll draws the symbol in the position where it stands, and measures it open and closed.
func (s *symbol) drawInAll(positions []string, position string) {
	var measured [2]bool
	for _, other := range positions {
		s.look.Position, s.look.Closed = other, s.part.Kind.Closed(s.look.Values, other)
		state := 0
		if s.look.Closed {
			state = 1
		}
		if other == position {
			s.list = s.drawn()
			s.measure(s.list)
		} else if !measured[state] {
			s.measure(s.drawn())
		}
		measured[state] = true
	}
	s.look.Position, s.look.Closed = position, s.part.Kind.Closed(s.look.Values, position)
}

// drawn is the symbol as it looks now, on the sheet.
func (s *symbol) drawn() stroke.List {
	return s.part.Kind.Symbol(s.look).Placed(s.at, s.part.Turn, s.part.Flip)
}

func onGrid(p schematic.Point) stroke.Point {
	return stroke.Point{X: float64(p.X), Y: float64(p.Y)}
}

// measure takes the shapes of the symbol into its boxes.
func (s *symbol) measure(list stroke.List) {
	for _, shape := range list {
		box, ok := boundsOf(shape)
		if !ok {
			continue
		}
		s.boxes = append(s.boxes, box)
		s.whole = s.whole.Around(box)
		switch {
		case s.isLead(shape):
		case s.body == stroke.Box{}:
			s.body = box
		default:
			s.body = s.body.Around(box)
		}
	}
}

// settle makes up for symbols that are hardly more than a line, so that lettering keeps its distance from that.
func (s *symbol) settle() {
	const least = 0.32
	if s.body == (stroke.Box{}) {
		s.body = s.whole
	}
	switch {
	case len(s.part.Kind.Pins) < 2:
	case s.level:
		s.body.Top, s.body.Bottom = min(s.body.Top, s.at.Y-least), max(s.body.Bottom, s.at.Y+least)
	default:
		s.body.Left, s.body.Right = min(s.body.Left, s.at.X-least), max(s.body.Right, s.at.X+least)
	}
}

// boundsOf is the box of one shape that is not a text.
func boundsOf(shape stroke.Shape) (stroke.Box, bool) {
	switch s := shape.(type) {
	case stroke.Path:
		box := stroke.Box{Left: s.Points[0].X, Top: s.Points[0].Y, Right: s.Points[0].X, Bottom: s.Points[0].Y}
		for _, p := range s.Points[1:] {
			box.Left, box.Top = min(box.Left, p.X), min(box.Top, p.Y)
			box.Right, box.Bottom = max(box.Right, p.X), max(box.Bottom, p.Y)
		}
		return box, true
	case stroke.Circle:
		return around(s.Center, s.Radius), true
	case stroke.Arc:
		return arcBounds(s), true
	}
	return stroke.Box{}, false
}

func around(p stroke.Point, radius float64) stroke.Box {
	return stroke.Box{Left: p.X, Top: p.Y, Right: p.X, Bottom: p.Y}.Grown(radius)
}

// arcBounds is the box of the points of an arc at every 15°, which for the arcs of symbols holds them all.
func arcBounds(arc stroke.Arc) stroke.Box {
	p := onCircle(arc.Center, arc.Radius, arc.Start)
	box := around(p, 0)
	for i := 1; i <= 24; i++ {
		box = box.Around(around(onCircle(arc.Center, arc.Radius, arc.Start+arc.Sweep*float64(i)/24), 0))
	}
	return box
}

// isLead reports whether a shape is a single line that ends on a pin.
func (s *symbol) isLead(shape stroke.Shape) bool {
	path, ok := shape.(stroke.Path)
	if !ok || len(path.Points) != 2 {
		return false
	}
	for _, pin := range s.part.Kind.Pins {
		if at := onGrid(s.part.Pin(pin)); path.Points[0] == at || path.Points[1] == at {
			return true
		}
	}
	return false
}

// clearOfLines is how far lettering stays from lines and symbols, in grid steps.
const clearOfLines = 0.12

// block puts every shape of the symbol in the way of lettering.
func (s *symbol) block(o *obstacles) {
	for _, box := range s.boxes {
		o.add(box.Grown(clearOfLines))
	}
}

// hit is where a pointer takes hold of the part: its symbol from pin to pin, but never less than a finger finds.
func (s *symbol) hit() stroke.Box {
	const least = 0.75
	box := s.whole
	switch {
	case len(s.part.Kind.Pins) > 1 && s.level:
		box.Top, box.Bottom = min(box.Top, s.at.Y-least), max(box.Bottom, s.at.Y+least)
	case len(s.part.Kind.Pins) > 1:
		box.Left, box.Right = min(box.Left, s.at.X-least), max(box.Right, s.at.X+least)
	default:
		// Beside the pin, from which a wire is drawn, there must be enough to take hold of.
		box = box.Grown(0.1).Around(around(s.middle(), 0.65))
	}
	return box
}
