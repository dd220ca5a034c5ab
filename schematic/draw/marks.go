package draw

import (
	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/stroke"
	"loopwright/schematic/trace"
)

// troubled is where the mark about a part lies that a problem names.
func (s *symbol) troubled() stroke.Box { return s.hit().Grown(0.3) }

// problemGroup marks a part that a problem names: a heavy broken line about it, and the sign of a stop at its corner.
func (s *symbol) problemGroup() Group {
	box := s.troubled()
	surround := stroke.Rectangle(box.Left, box.Top, box.Right, box.Bottom)
	surround.Weight, surround.Dashed = stroke.Heavy, true
	x, y := box.Right, box.Top
	sign := stroke.Outline(x, y-0.5, x+0.5, y+0.36, x-0.5, y+0.36)
	sign.Filled = true
	return Group{ID: "problem-" + s.part.Ref, Layer: MarkLayer, List: stroke.List{surround, sign}}
}

// blockProblem puts that mark in the way of lettering.
func (s *symbol) blockProblem(o *obstacles) {
	box := s.troubled()
	const line = 0.1
	o.add(stroke.Box{Left: box.Left - line, Top: box.Top - line, Right: box.Right + line, Bottom: box.Top + line})
	o.add(stroke.Box{Left: box.Left - line, Top: box.Bottom - line, Right: box.Right + line, Bottom: box.Bottom + line})
	o.add(stroke.Box{Left: box.Left - line, Top: box.Top, Right: box.Left + line, Bottom: box.Bottom})
	o.add(stroke.Box{Left: box.Right - line, Top: box.Top, Right: box.Right + line, Bottom: box.Bottom})
	o.add(around(stroke.Point{X: box.Right, Y: box.Top}, 0.6))
}

// looseGroups marks the ends of wires and the pins that hang free, each with a small open square.
func looseGroups(groups []Group, statements []trace.Statement) []Group {
	marked := make(map[schematic.Point]bool, len(statements))
	for _, statement := range statements {
		if statement.At == nil {
			continue
		}
		if marked[*statement.At] {
			continue
		}
		marked[*statement.At] = true
		box := around(onGrid(*statement.At), looseHalf)
		square := stroke.Rectangle(box.Left, box.Top, box.Right, box.Bottom)
		square.Opaque = true
		square.Weight = stroke.Fine
		groups = append(groups, Group{ID: "loose-" + placeID(*statement.At), Layer: MarkLayer, List: stroke.List{square}})
	}
	return groups
}

// looseHalf is half the side of the square at a loose end, in grid steps.
const looseHalf = 0.2

// namedBy reports which references the problem of a case names.
func namedBy(solved *cases.Case) map[string]bool {
	if solved.Problem == nil {
		return nil
	}
	named := make(map[string]bool, len(solved.Problem.Parts))
	for _, ref := range solved.Problem.Parts {
		named[ref] = true
	}
	return named
}
