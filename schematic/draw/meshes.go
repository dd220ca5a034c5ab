package draw

import (
	"math"

	"loopwright/schematic/cases"
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
	"loopwright/schematic/trace"
)

// The arrows of mesh currents, in grid steps.
const (
	largestArrow  = 2.3
	wantedArrow   = 0.8 // for which lettering makes room
	smallestArrow = 0.55
	smallestName  = 0.3  // half the room of a name without an arrow
	arrowClear    = 0.25 // between an arrow and what is around it
)

// room is where the arrow of a mesh may lie, and how large it may be there.
type room struct {
	center stroke.Point
	radius float64
}

// findRooms finds the room in each drawn mesh, and says in how many it is less than wanted. Rooms that were found before
// and are still free stay.
func findRooms(rooms []room, drawing *trace.Drawing, o *obstacles) (crowded int) {
	for i := range rooms {
		mesh, before := &drawing.Meshes[i], rooms[i]
		if !mesh.Drawn || before.radius >= wantedArrow && o.clearance(before.center, before.radius+arrowClear, 0) >= before.radius+arrowClear-1e-9 {
			continue
		}
		if rooms[i] = roomIn(mesh, before.center, o); rooms[i].radius < wantedArrow {
			crowded++
		}
	}
	return crowded
}

// meshGroups draws the arrow of every mesh that is a face of the drawing. Where there is room for nothing, its group
// stays empty; the margin lists all mesh currents.
func meshGroups(groups []Group, drawing *trace.Drawing, rooms []room, solved *cases.Case, s scale) []Group {
	for i, room := range rooms {
		mesh := &drawing.Meshes[i]
		if !mesh.Drawn {
			continue
		}
		group := Group{ID: "mesh-" + mesh.Name, Layer: MeshLayer, Attributes: []Attribute{{"data-mesh", mesh.Name}}}
		value := ""
		if solved.Solved {
			current := rounded(solved.Meshes[i], s.amperes)
			value = quantity.Phasor(current, quantity.Ampere, digits)
			group.Attributes = append(group.Attributes, Attribute{"data-current", siNumber(solved.Meshes[i], s.ac)})
		}
		switch {
		case room.radius >= smallestArrow:
			group.List = meshArrow(room.center, room.radius, mesh.Name, value)
		case room.radius >= smallestName:
			group.List = appendMeshName(nil, room.center, mesh.Name, 1.6*room.radius)
		}
		groups = append(groups, group)
	}
	return groups
}

// roomIn finds the room for the arrow of a mesh: at its own centre if there is enough, else at the roomiest place near
// it, where each step away costs a little. It looks first at a place that was good before, then at a grid of places, and
// then around the best of them.
func roomIn(mesh *trace.Mesh, before stroke.Point, o *obstacles) room {
	const limit = largestArrow
	found := room{mesh.Center, o.clearance(mesh.Center, limit+arrowClear, 0) - arrowClear}
	if found.radius >= limit {
		return found
	}
	best := found.radius
	look := func(p stroke.Point) {
		cost := 0.06 * math.Hypot(p.X-mesh.Center.X, p.Y-mesh.Center.Y)
		if limit-cost <= best {
			return
		}
		free := o.clearance(p, limit+arrowClear, best+cost+arrowClear) - arrowClear
		if free-cost > best+1e-9 && inside(p, mesh.Outline) {
			best, found = free-cost, room{p, free}
		}
	}
	lookAround := func(middle stroke.Point, reach int, step float64) {
		for row := -reach; row <= reach; row++ {
			for column := -reach; column <= reach; column++ {
				look(stroke.Point{X: middle.X + float64(column)*step, Y: middle.Y + float64(row)*step})
			}
		}
	}
	look(before)
	lookAround(mesh.Center, 3, 1.5)
	lookAround(found.center, 1, 0.7)
	lookAround(found.center, 1, 0.35)
	return found
}

// inside reports whether a point lies within a closed outline, by the number of its lines to the right of the point.
func inside(p stroke.Point, outline []stroke.Point) bool {
	in := false
	for i, a := range outline {
		b := outline[(i+1)%len(outline)]
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(p.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X) {
			in = !in
		}
	}
	return in
}

// meshArrow draws a clockwise arrow of 300° with the name of the mesh current and, where the circle is wide enough, its
// value.
func meshArrow(center stroke.Point, radius float64, name, value string) stroke.List {
	const start, sweep = 135.0, 285.0
	style := stroke.Style{Ink: stroke.Blue, Dashed: true, Weight: stroke.Fine}
	list := stroke.List{stroke.Arc{Center: center, Radius: radius, Start: start, Sweep: sweep, Style: style}}
	list = append(list, arcHead(center, radius, start+sweep))
	height := valueHeight(value, radius-0.25)
	withValue := height > 0
	y := center.Y
	if withValue {
		y -= 0.55 * height
		list = append(list, stroke.Text{
			At: stroke.Point{X: center.X, Y: center.Y + 0.75*height}, Text: value, Height: height, Anchor: stroke.Middle,
			Centred: true, Ink: stroke.Blue,
		})
	}
	return appendMeshName(list, stroke.Point{X: center.X, Y: y}, name, min(0.8, 1.1*radius))
}

// valueHeight is the height at which a value fits into a circle below the name of its mesh; 0 when it does not fit.
func valueHeight(value string, radius float64) float64 {
	const largest, least = 0.64, 0.53
	if value == "" {
		return 0
	}
	// Half the width of the value, and how far its line reaches below the centre, both in parts of its height.
	fits := radius / math.Hypot(width(value, false)/2, 1.1)
	if fits < least {
		return 0
	}
	return min(fits, largest)
}

// arcHead is the arrowhead at the end of a clockwise arc.
func arcHead(center stroke.Point, radius, end float64) stroke.Path {
	const long, half = 0.5, 0.17
	back := end - long/radius*180/math.Pi
	tip := onCircle(center, radius, end)
	head := stroke.Path{Closed: true, Style: stroke.Style{Ink: stroke.Blue, Weight: stroke.Fine, Filled: true}}
	head.Points = []stroke.Point{tip, onCircle(center, radius+half, back), onCircle(center, radius-half, back)}
	return head
}

// appendMeshName sets i with the number of the mesh as its index: mesh m2 has the current i₂.
func appendMeshName(list stroke.List, at stroke.Point, name string, height float64) stroke.List {
	letter := stroke.Text{Text: "i", Height: height, Italic: true, Centred: true, Ink: stroke.Blue}
	index := stroke.Text{Text: name[1:], Height: 0.68 * height, Ink: stroke.Blue}
	letterWidth := width(letter.Text, false) * letter.Height
	wide := letterWidth + width(index.Text, false)*index.Height
	letter.At = stroke.Point{X: at.X - wide/2, Y: at.Y}
	index.At = stroke.Point{X: letter.At.X + letterWidth + 0.03, Y: at.Y + (capHeight/2+0.16)*height}
	return append(list, letter, index)
}
