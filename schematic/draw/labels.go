package draw

import (
	"strings"

	"loopwright/schematic/stroke"
)

// labels are the blocks of lettering of one part.
type labels struct {
	name    block // designation, values, position
	figures block // voltage and current
	both    block // one over the other
}

// nominal widths keep the figures in their place from case to case, as long as no value is longer.
const (
	nominalVoltage = "888.8 mV"
	nominalCurrent = "888.8 mA"
)

// lettering sets what is written at a part.
func (s *symbol) lettering(r *reading) labels {
	var l labels
	for i, text := range s.names {
		height, bold := legendHeight, false
		if i == 0 {
			height, bold = designationHeight, s.part.Kind.Joins == nil
		}
		l.name.add(stroke.Text{Text: text, Height: height, Bold: bold}, nil)
	}
	if r == nil {
		return l
	}
	l.figures.add(stroke.Text{Text: r.voltage, Height: figureHeight, Ink: stroke.Blue}, nil)
	l.figures.add(stroke.Text{Text: r.current, Height: figureHeight, Ink: stroke.Blue}, r.way)
	l.figures.width = max(l.figures.width, figureHeight*width(nominalVoltage, false),
		figureHeight*width(nominalCurrent, false)+arrowWidth+arrowGap)
	return l
}

// written are the lines that stand at a part apart from its values: its designation, its legend, and where it stands
// when its positions have names. A potential shows only its name.
func (s *symbol) written() []string {
	legend := s.part.Kind.Legend(s.look.Values)
	if s.part.Kind.Joins != nil {
		return []string{legend}
	}
	lines := []string{"-" + s.part.Ref}
	if legend != "" && legend != s.part.Ref {
		lines = append(lines, legend)
	}
	if s.part.Kind.Positions != nil && s.look.Values.Has("positions") {
		lines = append(lines, s.look.Position)
	}
	return lines
}

// spoken is what a screen reader says of the part; it begins with what is written at it.
func (s *symbol) spoken(r *reading) string {
	words := append(make([]string, 0, 8), s.names[0], s.part.Kind.Title)
	words = append(words, s.names[1:]...)
	if s.part.Kind.Positions != nil {
		if !s.look.Values.Has("positions") {
			words = append(words, s.look.Position)
		}
		if s.look.Closed {
			words = append(words, "closed")
		} else {
			words = append(words, "open")
		}
	}
	if r != nil {
		words = append(words, r.voltage, r.current)
	}
	return strings.Join(words, ", ")
}

// markAt is where the marking of a pin is written: beside the line to the pin, on one of its two sides.
func (s *symbol) markAt(pin stroke.Point, text string, side float64) stroke.Text {
	const along, aside = 0.5, 0.26
	mark := stroke.Text{At: pin, Text: text, Height: markHeight, Centred: true, Ink: stroke.Grey}
	if s.level {
		mark.At.X += along * sign(s.at.X-pin.X)
		mark.At.Y -= side * (aside + 0.1)
		mark.Anchor = stroke.Middle
		return mark
	}
	mark.At.X += side * aside
	mark.At.Y += along * sign(s.at.Y-pin.Y)
	if side < 0 {
		mark.Anchor = stroke.End
	}
	return mark
}

func sign(v float64) float64 {
	switch {
	case v > 0:
		return 1
	case v < 0:
		return -1
	}
	return 0
}

// marks writes the markings of the pins, each where nothing is in its way if there is such a side.
func (s *symbol) marks(o *obstacles) stroke.List {
	var list stroke.List
	for _, pin := range s.part.Kind.Pins {
		if pin.Mark == "" {
			continue
		}
		at := onGrid(s.part.Pin(pin))
		mark := s.markAt(at, pin.Mark, 1)
		if !o.free(markBox(mark)) {
			if other := s.markAt(at, pin.Mark, -1); o.free(markBox(other)) {
				mark = other
			}
		}
		list = append(list, mark)
	}
	for _, mark := range list {
		o.add(markBox(mark.(stroke.Text)))
	}
	return list
}

// markBox is the box of a marking, which may come as near to a line as its letters allow.
func markBox(mark stroke.Text) stroke.Box {
	half := capHeight / 2 * mark.Height
	box := textBox(mark)
	box.Top, box.Bottom = mark.At.Y-half, mark.At.Y+half
	return box
}
