package draw

import (
	"loopwright/schematic/stroke"
)

// The heights of the lettering, in grid steps. Capitals of values and legends are 2.5 mm high, a nominal size of
// ISO 3098-1 (from memory); designations are a little larger, numbers at wires and pins smaller.
const (
	designationHeight = 0.76
	legendHeight      = 0.685
	figureHeight      = 0.685
	numberHeight      = 0.56
	markHeight        = 0.56
)

// block is a few lines of lettering that stay together.
type block struct {
	lines         []line
	width, height float64 // of its box, in grid steps
}

// line is one line of a block; its text has no place yet.
type line struct {
	text  stroke.Text
	arrow *stroke.Point // the direction of a small arrow before the text; nil for none
	width float64
}

// The arrow before a current: its length, the width of its head, and the gap behind it.
const (
	arrowLength = 0.66
	arrowWidth  = 0.26
	arrowGap    = 0.24
)

// arrowRoom is the width that an arrow takes from its line.
func arrowRoom(direction stroke.Point) float64 {
	if direction.X != 0 {
		return arrowLength + arrowGap
	}
	return arrowWidth + arrowGap
}

// add puts a line below those that are there.
func (b *block) add(text stroke.Text, arrow *stroke.Point) {
	l := line{text, arrow, width(text.Text, text.Bold) * text.Height}
	if arrow != nil {
		l.width += arrowRoom(*arrow)
	}
	if b.lines == nil {
		b.lines = make([]line, 0, 3)
	}
	b.lines = append(b.lines, l)
	b.width = max(b.width, l.width)
	b.height += lineDepth * text.Height
}

// over is the block with another below it.
func (b *block) over(c *block) block {
	lines := append(make([]line, 0, len(b.lines)+len(c.lines)), b.lines...)
	return block{
		lines: append(lines, c.lines...),
		width: max(b.width, c.width), height: b.height + c.height,
	}
}

// spot is where a block is put: the upper left corner of its box, and to which side of the box its lines are set.
type spot struct {
	left, top float64
	anchor    stroke.Anchor
}

// box is the box of the block at a spot.
func (b *block) box(s spot) stroke.Box {
	return stroke.Box{Left: s.left, Top: s.top, Right: s.left + b.width, Bottom: s.top + b.height}
}

// draw appends the block's lettering at a spot, and its arrows after that.
func (b *block) draw(list stroke.List, s spot) stroke.List {
	top := s.top
	for i := range b.lines {
		l := &b.lines[i]
		text := l.text
		text.At.Y = top + lineBase*text.Height
		text.Anchor = s.anchor
		top += lineDepth * text.Height
		left := b.leftOf(l, s)
		switch {
		case s.anchor == stroke.End:
			text.At.X = left + l.width
		case l.arrow != nil:
			text.At.X, text.Anchor = left+arrowRoom(*l.arrow), stroke.Start
		case s.anchor == stroke.Middle:
			text.At.X = left + l.width/2
		default:
			text.At.X = left
		}
		list = append(list, text)
	}
	top = s.top
	for i := range b.lines {
		l := &b.lines[i]
		if l.arrow != nil {
			center := stroke.Point{
				X: b.leftOf(l, s) + (arrowRoom(*l.arrow)-arrowGap)/2,
				Y: top + (lineBase-capHeight/2)*l.text.Height,
			}
			list = appendArrow(list, center, *l.arrow, l.text.Ink)
		}
		top += lineDepth * l.text.Height
	}
	return list
}

// leftOf is where a line of the block begins.
func (b *block) leftOf(l *line, s spot) float64 {
	switch s.anchor {
	case stroke.Middle:
		return s.left + (b.width-l.width)/2
	case stroke.End:
		return s.left + b.width - l.width
	}
	return s.left
}

// appendArrow draws a small arrow about a point in one of the four directions.
func appendArrow(list stroke.List, center, direction stroke.Point, ink stroke.Ink) stroke.List {
	const half, barb, wing = arrowLength / 2, 0.28, arrowWidth/2 - 0.03
	at := func(along, across float64) stroke.Point {
		return stroke.Point{
			X: center.X + along*direction.X - across*direction.Y,
			Y: center.Y + along*direction.Y + across*direction.X,
		}
	}
	points := []stroke.Point{at(-half, 0), at(half-barb, 0), at(half-0.04, 0), at(half-barb, -wing), at(half-barb, wing)}
	style := stroke.Style{Ink: ink, Filled: true}
	return append(list, stroke.Path{Points: points[:2], Style: style}, stroke.Path{Points: points[2:], Closed: true, Style: style})
}
