package draw

import (
	"math"
	"sync"

	"loopwright/schematic/stroke"
)

// led places a block further out, at the nearest free place, with a line that leads to its symbol. A line that covers
// nothing is preferred. Where the paper is full, the block stands beside its symbol over what is there.
func (s *symbol) led(b *block, o *obstacles, taken *stroke.Box) placement {
	const first, reach, further = 1.5, 10.5, 1.0
	center := s.middle()
	var second *placement
	for radius := first; radius <= reach; radius += further {
		for _, way := range ledWays() {
			p := stroke.Point{X: center.X + radius*way.X, Y: center.Y + radius*way.Y}
			at := spot{p.X, p.Y - b.height/2, stroke.Start}
			if way.X < -1e-9 {
				at = spot{p.X - b.width, at.top, stroke.End}
			}
			box := b.box(at)
			if !o.free(box) || (taken != nil && box.Overlaps(*taken)) {
				continue
			}
			found := one(b, at)
			found.leader = s.leader(box)
			if clearLine(found.leader, o) {
				return found
			}
			if second == nil {
				second = &found
			}
		}
		if second != nil && radius > 6 {
			break
		}
	}
	if second != nil {
		return *second
	}
	return one(b, s.beside(b, s.sides()[1], 0))
}

// ledWays are 24 directions of length 1, beginning at the right and going to either side in turn.
var ledWays = sync.OnceValue(func() (ways [24]stroke.Point) {
	for i := range ways {
		angle := float64((i+1)/2) * 360 / float64(len(ways))
		if i%2 == 1 {
			angle = -angle
		}
		ways[i] = onCircle(stroke.Point{}, 1, angle)
	}
	return ways
})

// leader is the line from the box of a block to its symbol.
func (s *symbol) leader(box stroke.Box) []stroke.Point {
	end := nearest(s.body, stroke.Point{X: (box.Left + box.Right) / 2, Y: (box.Top + box.Bottom) / 2})
	return []stroke.Point{nearest(box.Grown(0.05), end), end}
}

// clearLine reports whether a leader crosses nothing on its way, its end at the symbol aside.
func clearLine(leader []stroke.Point, o *obstacles) bool {
	clear := true
	along(leader, 0.3, func(at stroke.Point) bool {
		clear = o.free(around(at, 0.02))
		return clear
	})
	return clear
}

// along visits places on a leader a quarter of a step apart, but for a piece at its end, until the visit says stop.
func along(leader []stroke.Point, short float64, visit func(stroke.Point) bool) {
	if leader == nil {
		return
	}
	from, to := leader[0], leader[1]
	length := math.Hypot(to.X-from.X, to.Y-from.Y)
	for at := 0.2; at < length-short; at += 0.25 {
		t := at / length
		if !visit(stroke.Point{X: from.X + t*(to.X-from.X), Y: from.Y + t*(to.Y-from.Y)}) {
			return
		}
	}
}

// nearest is the point of a box that is nearest to a point.
func nearest(box stroke.Box, p stroke.Point) stroke.Point {
	return stroke.Point{X: min(max(p.X, box.Left), box.Right), Y: min(max(p.Y, box.Top), box.Bottom)}
}
