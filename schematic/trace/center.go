package trace

import (
	"math"

	"loopwright/schematic/stroke"
)

// widest finds, on a raster of at most 24 by 24 points, the point within an outline that is farthest from it, and that
// distance. Of equally good points it takes the one nearest to the middle of the outline's box.
func widest(outline []stroke.Point) (center stroke.Point, radius float64) {
	box := stroke.Box{Left: math.Inf(1), Top: math.Inf(1), Right: math.Inf(-1), Bottom: math.Inf(-1)}
	for _, p := range outline {
		box = box.Around(stroke.Box{Left: p.X, Top: p.Y, Right: p.X, Bottom: p.Y})
	}
	const points = 24
	step := math.Max(0.5, math.Max(box.Right-box.Left, box.Bottom-box.Top)/points)
	middle := stroke.Point{X: (box.Left + box.Right) / 2, Y: (box.Top + box.Bottom) / 2}
	center = middle
	best := math.Inf(-1)
	for y := box.Top + step/2; y < box.Bottom; y += step {
		for x := box.Left + step/2; x < box.Right; x += step {
			p := stroke.Point{X: x, Y: y}
			room := clearance(p, outline)
			if score := room - 0.01*math.Hypot(x-middle.X, y-middle.Y); score > best {
				center, radius, best = p, room, score
			}
		}
	}
	return center, math.Max(radius, 0)
}

// clearance is how far a point lies from an outline, negative outside of it.
func clearance(p stroke.Point, outline []stroke.Point) float64 {
	least, within := math.Inf(1), false
	for i, a := range outline {
		b := outline[(i+1)%len(outline)]
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(p.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X) {
			within = !within
		}
		dx, dy := b.X-a.X, b.Y-a.Y
		t := 0.0
		if length := dx*dx + dy*dy; length > 0 {
			t = math.Max(0, math.Min(1, ((p.X-a.X)*dx+(p.Y-a.Y)*dy)/length))
		}
		least = math.Min(least, math.Hypot(p.X-a.X-t*dx, p.Y-a.Y-t*dy))
	}
	if !within {
		return -least
	}
	return least
}
