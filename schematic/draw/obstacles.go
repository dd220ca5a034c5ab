package draw

import (
	"math"

	"loopwright/schematic/stroke"
)

// obstacles are the boxes on a sheet that lettering must not cover. They are kept in square cells, so that asking what
// lies at a place costs no more on a large sheet.
type obstacles struct {
	area    stroke.Box
	columns int
	heads   []int32 // by cell: index in links of its first box, or −1
	links   []link
	boxes   []stroke.Box
}

type link struct{ box, next, cell int32 }

// cellSide is the side of a cell, in grid steps.
const cellSide = 4.0

// newObstacles makes an index for a sheet of paper. What lies beside it is kept in the cells of its edge.
func newObstacles(area stroke.Box, expected int) *obstacles {
	columns := int((area.Right-area.Left)/cellSide) + 1
	rows := int((area.Bottom-area.Top)/cellSide) + 1
	o := &obstacles{
		area: area, columns: columns, heads: make([]int32, columns*rows),
		links: make([]link, 0, 3*expected/2), boxes: make([]stroke.Box, 0, expected),
	}
	for i := range o.heads {
		o.heads[i] = -1
	}
	return o
}

// cells is the range of columns and rows that a box touches.
func (o *obstacles) cells(box stroke.Box) (left, top, right, bottom int) {
	column := func(x float64) int { return min(max(int((x-o.area.Left)/cellSide), 0), o.columns-1) }
	row := func(y float64) int { return min(max(int((y-o.area.Top)/cellSide), 0), len(o.heads)/o.columns-1) }
	return column(box.Left), row(box.Top), column(box.Right), row(box.Bottom)
}

// add puts a box in the way and gives its number.
func (o *obstacles) add(box stroke.Box) int {
	index := int32(len(o.boxes))
	o.boxes = append(o.boxes, box)
	left, top, right, bottom := o.cells(box)
	for row := top; row <= bottom; row++ {
		for column := left; column <= right; column++ {
			cell := row*o.columns + column
			o.links = append(o.links, link{index, o.heads[cell], int32(cell)})
			o.heads[cell] = int32(len(o.links) - 1)
		}
	}
	return int(index)
}

// remove takes a box out of the way again.
func (o *obstacles) remove(number int) {
	nowhere := math.Inf(1)
	o.boxes[number] = stroke.Box{Left: nowhere, Top: nowhere, Right: nowhere, Bottom: nowhere}
}

// rewind takes away all boxes but a first number of them.
func (o *obstacles) rewind(boxes int) {
	for len(o.links) > 0 && int(o.links[len(o.links)-1].box) >= boxes {
		last := o.links[len(o.links)-1]
		o.heads[last.cell] = last.next
		o.links = o.links[:len(o.links)-1]
	}
	o.boxes = o.boxes[:boxes]
}

// free reports whether nothing lies where the box would.
func (o *obstacles) free(box stroke.Box) bool {
	left, top, right, bottom := o.cells(box)
	for row := top; row <= bottom; row++ {
		for column := left; column <= right; column++ {
			for at := o.heads[row*o.columns+column]; at >= 0; at = o.links[at].next {
				if box.Overlaps(o.boxes[o.links[at].box]) {
					return false
				}
			}
		}
	}
	return true
}

// clearance is the distance from a point to the nearest box, at most a limit. Once it is known to be less than what is
// needed, the search ends with what was found so far.
func (o *obstacles) clearance(p stroke.Point, limit, needed float64) float64 {
	nearest, enough := limit*limit, needed*needed
	left, top, right, bottom := o.cells(around(p, limit))
	for row := top; row <= bottom; row++ {
		for column := left; column <= right; column++ {
			for at := o.heads[row*o.columns+column]; at >= 0; at = o.links[at].next {
				box := &o.boxes[o.links[at].box]
				dx := max(box.Left-p.X, 0, p.X-box.Right)
				dy := max(box.Top-p.Y, 0, p.Y-box.Bottom)
				if distance := dx*dx + dy*dy; distance < nearest {
					if nearest = distance; nearest < enough {
						return math.Sqrt(nearest)
					}
				}
			}
		}
	}
	return math.Sqrt(nearest)
}
