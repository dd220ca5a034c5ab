package stroke

import "math"

// Turned is the point after mirroring left-right (when flip is set) and then turning clockwise by a multiple of 90°
// about the origin: a quarter turn takes (x, y) to (−y, x).
func (p Point) Turned(turn int, flip bool) Point {
	if flip {
		p.X = -p.X
	}
	switch turn {
	case 90:
		return Point{-p.Y, p.X}
	case 180:
		return Point{-p.X, -p.Y}
	case 270:
		return Point{p.Y, -p.X}
	}
	return p
}

// Add is the point moved by another.
func (p Point) Add(q Point) Point { return Point{p.X + q.X, p.Y + q.Y} }

// Placed is the list mirrored, turned and then moved so that its origin lies at a point. Texts move but stay level.
func (l List) Placed(at Point, turn int, flip bool) List {
	move := func(p Point) Point { return p.Turned(turn, flip).Add(at) }
	placed := make(List, len(l))
	points := make([]Point, 0, l.corners())
	for i, shape := range l {
		switch s := shape.(type) {
		case Path:
			first := len(points)
			for _, p := range s.Points {
				points = append(points, move(p))
			}
			s.Points = points[first:len(points):len(points)]
			placed[i] = s
		case Circle:
			s.Center = move(s.Center)
			placed[i] = s
		case Arc:
			s.Center = move(s.Center)
			if flip {
				s.Start, s.Sweep = 180-s.Start, -s.Sweep
			}
			s.Start += float64(turn)
			placed[i] = s
		case Text:
			s.At = move(s.At)
			placed[i] = s
		}
	}
	return placed
}

// corners is the number of points of all paths.
func (l List) corners() int {
	sum := 0
	for _, shape := range l {
		if path, ok := shape.(Path); ok {
			sum += len(path.Points)
		}
	}
	return sum
}

// Box is an upright rectangle on the sheet. The zero Box is empty at the origin.
type Box struct{ Left, Top, Right, Bottom float64 }

// Around is the smallest box that holds both boxes.
func (b Box) Around(c Box) Box {
	return Box{math.Min(b.Left, c.Left), math.Min(b.Top, c.Top), math.Max(b.Right, c.Right), math.Max(b.Bottom, c.Bottom)}
}

// Grown is the box with each side moved outwards by a margin.
func (b Box) Grown(margin float64) Box {
	return Box{b.Left - margin, b.Top - margin, b.Right + margin, b.Bottom + margin}
}

// Overlaps reports whether the two boxes share any area.
func (b Box) Overlaps(c Box) bool {
	return b.Left < c.Right && c.Left < b.Right && b.Top < c.Bottom && c.Top < b.Bottom
}

// Overlap is the area that two boxes share, in square grid steps.
func (b Box) Overlap(c Box) float64 {
	width := math.Min(b.Right, c.Right) - math.Max(b.Left, c.Left)
	height := math.Min(b.Bottom, c.Bottom) - math.Max(b.Top, c.Top)
	if width <= 0 || height <= 0 {
		return 0
	}
	return width * height
}

// Bounds is the smallest box that holds every line, circle and arc of the list; texts do not
// count, since their width is only known where they are set. The second result is false for a list
// without such shapes.
func (l List) Bounds() (Box, bool) {
	var box Box
	found := false
	include := func(b Box) {
		if found {
			b = b.Around(box)
		}
		box, found = b, true
	}
	for _, shape := range l {
		switch s := shape.(type) {
		case Path:
			for _, p := range s.Points {
				include(Box{p.X, p.Y, p.X, p.Y})
			}
		case Circle:
			include(Box{s.Center.X - s.Radius, s.Center.Y - s.Radius, s.Center.X + s.Radius, s.Center.Y + s.Radius})
		case Arc:
			include(s.bounds())
		}
	}
	return box, found
}

// bounds is the smallest box that holds the arc: its ends, and each of the four outermost points of its circle that it
// passes.
func (a Arc) bounds() Box {
	at := func(degrees float64) Box {
		sin, cos := math.Sincos(degrees * math.Pi / 180)
		x, y := a.Center.X+a.Radius*cos, a.Center.Y+a.Radius*sin
		return Box{x, y, x, y}
	}
	from, to := min(a.Start, a.Start+a.Sweep), max(a.Start, a.Start+a.Sweep)
	box := at(from).Around(at(to))
	for quarter := math.Ceil(from/90) * 90; quarter <= to; quarter += 90 {
		box = box.Around(at(quarter))
	}
	return box
}
